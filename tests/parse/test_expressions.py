"""Expressions and statements: structure and precedence.

Precedence is judged by Python's own: for ``+ - * /`` and brackets both languages agree. The rest is
common practice of macro programs, from memory.
"""

from __future__ import annotations

import math
import operator
from collections.abc import Callable

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from auditor.parse import parse_text
from auditor.parse.blocks import Assign, Binary, Do, End, Expression, Goto, IfThen, Number, Statement, Unary, Variable

unhurried = settings(deadline=None)  # a busy machine is no fault

ARITHMETIC: dict[str, Callable[[float, float], float]] = {
    "+": operator.add,
    "-": operator.sub,
    "*": operator.mul,
    "/": operator.truediv,
    "MOD": math.fmod,
    "AND": lambda a, b: int(a) & int(b),
    "OR": lambda a, b: int(a) | int(b),
    "XOR": lambda a, b: int(a) ^ int(b),
    "EQ": operator.eq,
    "LT": operator.lt,
    "ATAN": lambda a, b: math.degrees(math.atan2(a, b)),
    "POW": operator.pow,
}
FUNCTIONS: dict[str, Callable[[float], float]] = {
    "-": operator.neg,
    "SIN": lambda a: math.sin(math.radians(a)),
    "SQRT": math.sqrt,
    "ROUND": round,
    "ATAN": lambda a: math.degrees(math.atan(a)),
}


def statement(text: str) -> Statement:
    (block,) = parse_text(text).blocks
    assert block.statement is not None, block.fault
    return block.statement


def value(expression: Expression, variables: dict[float, float]) -> float:
    """A few lines of arithmetic, independent of the interpreter's."""
    if isinstance(expression, Number):
        return expression.value
    if isinstance(expression, Variable):
        return variables[value(expression.number, variables)]
    if isinstance(expression, Unary):
        return FUNCTIONS[expression.name](value(expression.argument, variables))
    return ARITHMETIC[expression.name](value(expression.left, variables), value(expression.right, variables))


def worth(text: str, **variables: float) -> float:
    """What ``#9 = text`` assigns, with v1=… for #1."""
    assignment = statement(f"#9={text}")
    assert isinstance(assignment, Assign)
    return value(assignment.value, {float(name[1:]): number for name, number in variables.items()})


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("2+3*4", 14),
        ("[2+3]*4", 20),
        ("10-4-3", 3),
        ("16/4/2", 2),
        ("-2*3", -6),
        ("2*-3", -6),
        ("5-[2]/[4]", 4.5),
        ("[1]/[4]*8", 2),
        ("7MOD4+1", 4),
        ("1+6AND3", 3),  # AND binds like *, so 1 + (6 AND 3)
        ("1OR6AND4", 5),
        ("5XOR1", 4),
        ("SQRT[16]+SQR[9]", 7),
        ("ROUND[2.6]+RND[1.2]", 4),
        ("SIN[30.]*2", 1),
        ("ATAN[1]/[1]", 45),
        ("ATAN[1,1]", 45),
        ("2*ATAN[1]/[1]", 90),
        ("ATAN[1]/5", 9),
        ("ATAN[1]/[1]/[5]", 9),
        ("POW[2,3]", 8),
        ("#1+#2", 12),
        ("#[#1+1]", 7),
        ("##3", 5),
        ("-#1", -5),
        ("+.5", 0.5),
    ],
)
def test_worth(text: str, expected: float) -> None:
    assert worth(text, v1=5, v2=7, v3=1, v6=7) == pytest.approx(expected)


def python_and_program(depth: int = 3) -> st.SearchStrategy[str]:
    """Arithmetic in Python's spelling; the program's has square brackets and #1 for v1."""
    plain = st.integers(0, 999).map(str) | st.sampled_from(["2.5", "0.25", "v1", "v2"])
    return st.recursive(
        plain,
        lambda inner: st.tuples(inner, st.sampled_from("+-*"), inner).map("".join)
        | inner.map("({})".format).filter(lambda text: text.count("(") <= depth)
        | inner.map("-({})".format),
        max_leaves=12,
    )


@unhurried
@given(python_and_program())
def test_precedence_agrees_with_python(text: str) -> None:
    program = text.translate(str.maketrans("()v", "[]#"))
    if max_depth(text) <= 5:
        assert worth(program, v1=3.0, v2=-0.5) == pytest.approx(eval(text, {"v1": 3.0, "v2": -0.5}))


def max_depth(text: str) -> int:
    depth = deepest = 0
    for character in text:
        depth += (character == "(") - (character == ")")
        deepest = max(deepest, depth)
    return deepest


def test_words_with_expressions() -> None:
    (block,) = parse_text("G#9 X[#101+2.] Z-#101 U-[#1*2] W#[#1+1] R+#4 ,C#5 FSQRT[4]").blocks
    one, hundred = Variable(Number(1.0, False, "1")), Variable(Number(101.0, False, "101"))
    two, two_point = Number(2.0, False, "2"), Number(2.0, True, "2.")

    assert [word.letter for word in block.words] == ["G", "X", "Z", "U", "W", "R", ",C", "F"]
    assert [word.value for word in block.words] == [
        Variable(Number(9.0, False, "9")),
        Binary("+", hundred, two_point),
        Unary("-", hundred),
        Unary("-", Binary("*", one, two)),
        Variable(Binary("+", one, Number(1.0, False, "1"))),
        Variable(Number(4.0, False, "4")),
        Variable(Number(5.0, False, "5")),
        Unary("SQRT", Number(4.0, False, "4")),
    ]


def test_a_word_ends_where_its_expression_does() -> None:
    text = "G1 X[ #1 + 2. ] Z#2F.2"
    (block,) = parse_text(text).blocks

    assert [text[word.start : word.end] for word in block.words] == ["G1", "X[ #1 + 2. ]", "Z#2", "F.2"]


def test_flow() -> None:
    five = Variable(Number(5.0, False, "5"))
    null = Variable(Number(0.0, False, "0"))
    is_null = Binary("EQ", five, null)
    twenty = Number(20.0, False, "20")

    assert statement("GOTO 20") == Goto(twenty)
    assert statement("GOTO#5") == Goto(five)
    assert statement("GOTO[#5+20]") == Goto(Binary("+", five, twenty))
    assert statement("IF [#5 EQ #0] GOTO 20") == Goto(twenty, is_null)
    assert statement("if[#5eq#0]then#5=20") == IfThen(is_null, Assign(five, twenty))
    assert statement("WHILE[#5EQ#0]DO2") == Do(2, is_null)
    assert statement("DO1") == Do(1)
    assert statement("END1") == End(1)
    assert statement("##5=20") == Assign(Variable(five), twenty)


def test_conditions_joined() -> None:
    found = statement("IF[[#1GT2]AND[#1LT9]]GOTO5")
    assert isinstance(found, Goto)
    assert isinstance(found.condition, Binary)
    assert [found.condition.name, found.condition.left.name, found.condition.right.name] == ["AND", "GT", "LT"]  # type: ignore[union-attr]


def test_statement_with_number_skip_and_message() -> None:
    (block,) = parse_text("/N40 #3000=12 (NO STOCK)").blocks

    assert (block.number, block.skip, block.comments[0].text) == (40, 1, "NO STOCK")
    assert isinstance(block.statement, Assign)


@pytest.mark.parametrize("text", ["M98 <SUB-1> L3", "M98<sub-1>L3", "M198 <SUB-1> L3"])
def test_call_by_name(text: str) -> None:
    (block,) = parse_text(text).blocks

    assert block.called == "SUB-1"
    assert [word.letter for word in block.words] == ["M", "L"]
    assert [text[word.start : word.end] for word in block.words][1] == "L3"


def test_data_output_is_kept_as_it_stands() -> None:
    assert [block.statement.text for block in parse_text("N1 popen\nDPRNT[Dia*X#100[43] %]").blocks] == [  # type: ignore[union-attr]
        "popen",
        "DPRNT[Dia*X#100[43] %]",
    ]
