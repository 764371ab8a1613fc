"""Expressions against arithmetic done by Python itself, and the rules for variables without a value."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.interpret.expressions import Calculator, ExpressionFault
from auditor.interpret.variables import Variables
from auditor.parse import parse_text
from auditor.parse.blocks import Assign, Binary, Expression, IfThen, Number, Unary, Variable
from tests.interpret.programs import carried_out, rows


def expression(text: str) -> Expression:
    statement = parse_text(f"#1={text}").blocks[0].statement
    assert isinstance(statement, Assign)
    return statement.value


def value(text: str, variables: Variables | None = None, **calculator: object) -> float | None:
    return Calculator(variables or Variables(), **calculator).value(expression(text))  # type: ignore[arg-type]


@pytest.mark.parametrize(
    ("text", "wanted"),
    [
        ("2+3*4", 14.0), ("[2+3]*4", 20.0), ("7-2-1", 4.0), ("8/4/2", 1.0), ("-2*-3", 6.0), ("7MOD4", 3.0),
        ("6AND3", 2.0), ("6OR3", 7.0), ("6XOR3", 5.0), ("SIN[30]", 0.5), ("COS[60]", 0.5), ("TAN[45]", 1.0),
        ("ASIN[.5]", 30.0), ("ACOS[.5]", 60.0), ("ATAN[1]/[1]", 45.0), ("ATAN[-1]/[-1]", 225.0), ("ATAN[1,-1]", 135.0),
        ("SQRT[16]", 4.0), ("ABS[-3.5]", 3.5), ("ROUND[2.5]", 3.0), ("ROUND[-2.5]", -3.0), ("FIX[-2.7]", -2.0),
        ("FUP[2.1]", 3.0), ("FUP[-2.1]", -3.0), ("LN[EXP[2]]", 2.0), ("POW[2,3]", 8.0), ("BIN[18]", 12.0),
        ("BCD[12]", 18.0),
    ],
)  # fmt: skip
def test_functions_and_precedence(text: str, wanted: float) -> None:
    assert value(text) == pytest.approx(wanted)


def test_atan_within_half_turns() -> None:
    assert value("ATAN[-1]/[-1]", atan_signed=True) == pytest.approx(-135.0)


def test_round_to_the_increment_inside_a_word() -> None:
    assert rows(carried_out("#1=1.23456\nG0 X[ROUND[#1]] Z0"))[0][1] == pytest.approx(1.235)
    whole = carried_out("#1=1.23456\nG0 X[ROUND[#1]] Z0", settings={"round_in_word": "integer"})
    assert rows(whole)[0][1] == 1.0


@pytest.mark.parametrize(
    "text",
    ["1/0", "5MOD0", "SQRT[-1]", "ASIN[2]", "LN[0]", "EXP[9999]", "POW[0,-1]", "POW[-8,.5]", "BIN[-1]", "#[-1]",
     "BIN[10]"],
)
def test_what_has_no_value_is_a_fault(text: str) -> None:
    with pytest.raises(ExpressionFault):
        value(text)


def test_an_empty_variable_is_null_not_zero() -> None:
    def holds(text: str) -> bool:
        statement = parse_text(f"IF[{text}]THEN#9=1").blocks[0].statement
        assert isinstance(statement, IfThen)
        return Calculator(Variables()).holds(statement.condition)

    assert holds("#5EQ#0")
    assert not holds("#5EQ0")
    assert holds("#5NE0")
    assert holds("#5GE0")
    assert not holds("#5GT0")
    assert value("#5+3") == 3.0
    assert value("#5") is None


def test_too_deep_is_a_fault_not_a_crash() -> None:
    deep: Expression = Number(1.0, False, "1")
    for _ in range(5000):
        deep = Unary("-", deep)
    with pytest.raises(ExpressionFault):
        Calculator(Variables()).value(deep)


def test_locals_belong_to_a_call() -> None:
    variables = Variables()
    variables.write(1, 5.0)
    variables.write(100, 7.0)
    variables.enter({1: 9.0})
    assert (variables.read(1), variables.read(2), variables.read(100)) == (9.0, None, 7.0)
    variables.leave()
    assert variables.read(1) == 5.0


def test_values_that_only_the_control_knows_stay_unknown_when_copied() -> None:
    variables = Variables()
    assert variables.read(500) is None
    assert variables.take_unknown() == {500}
    variables.write_unknown(1)
    variables.read(1)
    assert variables.take_unknown() == {1}
    variables.write(1, 2.0)
    assert variables.read(1) == 2.0
    assert not variables.take_unknown()


numbers = st.floats(-100, 100, allow_nan=False).map(lambda number: round(number, 3))


@given(numbers, numbers, numbers, st.sampled_from("+-*"), st.sampled_from("+-*"))
def test_arithmetic_is_that_of_python(a: float, b: float, c: float, one: str, two: str) -> None:
    variables = Variables(common={101: a, 102: b, 103: c})
    wanted = eval(f"a{one}b{two}c", {"a": a, "b": b, "c": c})
    assert value(f"#101{one}#102{two}#103", variables) == pytest.approx(wanted)


@given(st.recursive(
    st.one_of(
        st.floats(-1e6, 1e6).map(lambda number: Number(number, True, str(number))),
        st.integers(0, 600).map(lambda number: Variable(Number(number, False, str(number)))),
    ),
    lambda part: st.one_of(
        st.builds(Unary, st.sampled_from(["-", "SIN", "TAN", "SQRT", "LN", "EXP", "BIN", "BCD", "FUP", "NONE"]), part),
        st.builds(Binary, st.sampled_from(["+", "/", "MOD", "POW", "AND", "ATAN", "EQ", "GT", "NONE"]), part, part),
    ),
    max_leaves=12,
))  # fmt: skip
def test_any_expression_has_a_finite_value_or_a_fault(tree: Expression) -> None:
    try:
        found = Calculator(Variables()).value(tree)
    except ExpressionFault:
        return
    assert found is None or math.isfinite(found)
