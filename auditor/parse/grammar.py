"""The grammar at work: one clean block in, its words or its statement out.

The rules stand in ``grammar/block.lark``; here they are loaded (and remembered between runs in the
user's cache folder) and what they match becomes the types of `auditor.parse.blocks`.
"""

from __future__ import annotations

import os
import re
import sys
from functools import cache
from pathlib import Path
from typing import Any, NamedTuple

from lark import Lark, Token, Transformer, UnexpectedCharacters, UnexpectedInput, UnexpectedToken, v_args

from auditor.parse.blocks import Assign, Binary, Do, End, Expression, Goto, IfThen, Number, Statement, Unary, Variable

_BEGINS_STATEMENT = re.compile(r"#|IF|WHILE|DO[0-9]|END[0-9]|GOTO")
_SAME_FUNCTION = {"SQR": "SQRT", "RND": "ROUND"}


class UnreadableError(Exception):
    """The grammar stops at ``position`` of the clean text (its length: more was wanted)."""

    def __init__(self, position: int) -> None:
        super().__init__(position)
        self.position = position


class FoundWord(NamedTuple):
    """A word and where it starts in the clean text; it ends where the next one starts."""

    letter: str
    value: Expression
    start: int


def begins_statement(text: str) -> bool:
    """Whether a clean block is a statement (assignment, jump, loop) and not words."""
    return _BEGINS_STATEMENT.match(text) is not None


def read_words(text: str) -> list[FoundWord]:
    """The words of a clean block in their order."""
    plain = _plain_words(text)
    if plain is not None:
        return plain
    words: list[FoundWord] = _parse(text, "words")
    return words


def read_statement(text: str) -> Statement:
    """The statement that a clean block is."""
    statement: Statement = _parse(text, "statement")
    return statement


def _plain_words(text: str) -> list[FoundWord] | None:
    """Words with plain numbers and nothing else: the bulk of any program, cut up by the grammar's own
    terminal in a third of the time that a run of the parser takes.
    """
    one, many = _word_patterns()
    if many.fullmatch(text) is None:
        return None
    return [_word(found[0], found.start()) for found in one.finditer(text)]


def _word(text: str, start: int) -> FoundWord:
    at = 2 if text[0] == "," else 1
    return FoundWord(text[:at], _number(text[at:]), start)


def _number(text: str) -> Number:
    return Number(float(text), "." in text, text)


def _parse(text: str, start: str) -> Any:
    try:
        return _lark().parse(text, start)
    except (UnexpectedToken, UnexpectedCharacters) as stopped:
        at_end = isinstance(stopped, UnexpectedToken) and stopped.token.type == "$END"
        raise UnreadableError(len(text) if at_end else stopped.pos_in_stream or 0) from None
    except UnexpectedInput:
        raise UnreadableError(len(text)) from None


@cache
def _lark() -> Lark:
    path = _grammar_file("block.lark")
    return Lark(
        path.read_text(encoding="utf-8"),
        parser="lalr",
        start=["words", "statement"],
        maybe_placeholders=False,
        transformer=_Builder(),
        cache=_cache_file(path.stem) or False,
    )


@cache
def _word_patterns() -> tuple[re.Pattern[str], re.Pattern[str]]:
    word = _lark().get_terminal("WORD").pattern.to_regexp()
    return re.compile(word), re.compile(f"(?:{word})+")


def _grammar_file(name: str) -> Path:
    """Installed, the grammar lies inside the package; in a checkout, beside it."""
    package = Path(__file__).resolve().parents[1]
    inside = package / "grammar" / name
    return inside if inside.is_file() else package.parent / "grammar" / name


def _cache_file(name: str) -> str | None:
    """Where the built parse tables are kept; None where nothing can be written."""
    if sys.platform == "win32":
        root = os.environ.get("LOCALAPPDATA")
    else:
        root = os.environ.get("XDG_CACHE_HOME") or os.path.expanduser("~/.cache")  # noqa: PTH111 - never raises
    if not root or not Path(root).is_absolute():
        return None
    folder = Path(root) / "turnaudit"
    try:
        folder.mkdir(parents=True, exist_ok=True)
    except OSError:
        return None
    return str(folder / f"{name}-{sys.version_info.major}.{sys.version_info.minor}.tables")


@v_args(inline=True)
class _Builder(Transformer[Token, object]):
    """Turns what a rule matched into the type that stands for it, while parsing."""

    def WORD(self, token: Token) -> FoundWord:  # noqa: N802 - the terminals' names
        return _word(str(token), token.start_pos or 0)

    def NUMBER(self, token: Token) -> Number:  # noqa: N802
        return _number(str(token))

    def VARIABLE(self, token: Token) -> Variable:  # noqa: N802
        return Variable(_number(token[1:]))

    @v_args(inline=False)
    def words(self, words: list[FoundWord]) -> list[FoundWord]:
        return words

    def computed_word(self, address: Token, value: Expression) -> FoundWord:
        return FoundWord(str(address), value, address.start_pos or 0)

    def signed_value(self, sign: Token, value: Expression) -> Expression:
        return Unary("-", value) if sign == "-" else value

    signed_number = signed_value

    def computed_variable(self, number: Expression) -> Variable:
        return Variable(number)

    def sum(self, left: Expression, operator: Token, right: Expression) -> Binary:
        return Binary(str(operator), left, right)

    relation = product = sum

    def quotient(self, left: Expression, right: Expression) -> Binary:
        return Binary("/", left, right)

    def function(self, name: Token, *arguments: Expression) -> Expression:
        return _call(_SAME_FUNCTION.get(name, str(name)), *arguments)

    def arctangent(self, *arguments: Expression) -> Expression:
        return _call("ATAN", *arguments)

    def assignment(self, target: Variable, value: Expression) -> Assign:
        return Assign(target, value)

    def goto(self, target: Expression) -> Goto:
        return Goto(target)

    def if_goto(self, condition: Expression, target: Expression) -> Goto:
        return Goto(target, condition)

    def if_then(self, condition: Expression, then: Assign) -> IfThen:
        return IfThen(condition, then)

    def while_do(self, condition: Expression, label: Token) -> Do:
        return Do(int(label), condition)

    def do(self, label: Token) -> Do:
        return Do(int(label))

    def end(self, label: Token) -> End:
        return End(int(label))


def _call(name: str, first: Expression, second: Expression | None = None) -> Expression:
    return Unary(name, first) if second is None else Binary(name, first, second)
