"""What the reader hands on: one Block a line, every word with its place in the line."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal


@dataclass(frozen=True, slots=True)
class Number:
    """A literal number exactly as the program writes it; the point matters."""

    value: float
    has_point: bool
    text: str


@dataclass(frozen=True, slots=True)
class Variable:
    """``#101`` or ``#[#1+1]``: the number of the variable is itself an expression."""

    number: Expression


@dataclass(frozen=True, slots=True)
class Unary:
    """A sign or a function of one argument (``SIN``, ``ABS`` …; ``-`` for negation)."""

    name: str
    argument: Expression


@dataclass(frozen=True, slots=True)
class Binary:
    """``+ - * / MOD AND OR XOR EQ NE GT GE LT LE`` or ``ATAN`` of two arguments."""

    name: str
    left: Expression
    right: Expression


Expression = Number | Variable | Unary | Binary


@dataclass(frozen=True, slots=True)
class Word:
    """An address with its value; ``start:end`` are 0-based columns in the source line."""

    letter: str  # "X", "G", ",C" …
    value: Expression
    start: int
    end: int


@dataclass(frozen=True, slots=True)
class Assign:
    """``#i = expr``."""

    target: Variable
    value: Expression


@dataclass(frozen=True, slots=True)
class Goto:
    """``GOTO n`` or ``IF [..] GOTO n``."""

    target: Expression
    condition: Expression | None = None


@dataclass(frozen=True, slots=True)
class IfThen:
    """``IF [..] THEN #i = expr``."""

    condition: Expression
    then: Assign


@dataclass(frozen=True, slots=True)
class Do:
    """``WHILE [..] DOm`` or ``DOm``."""

    label: int
    condition: Expression | None = None


@dataclass(frozen=True, slots=True)
class End:
    """``ENDm``."""

    label: int


@dataclass(frozen=True, slots=True)
class Opaque:
    """Data output (``DPRNT`` and kin): no motion, not read further."""

    text: str


Statement = Assign | Goto | IfThen | Do | End | Opaque


@dataclass(frozen=True, slots=True)
class Comment:
    """Text of a comment and its columns."""

    text: str
    start: int
    end: int


@dataclass(frozen=True, slots=True)
class SyntaxFault:
    """A place in a block that cannot be read. ``hint`` says what was probably meant."""

    message: str
    start: int
    end: int
    hint: str | None = None


@dataclass(frozen=True, slots=True)
class Block:
    """One line of the program."""

    line: int  # 1-based
    text: str  # the source line without its line end
    words: tuple[Word, ...] = ()
    statement: Statement | None = None
    number: int | None = None  # N
    program: int | str | None = None  # O or :, or a name in angle brackets
    skip: int | None = None  # block skip switch 1..9
    comments: tuple[Comment, ...] = ()
    fault: SyntaxFault | None = None
    called: str | None = None  # the name in M98 <NAME>

    @property
    def label(self) -> str | None:
        """The block's name as a person says it: ``N70``."""
        return None if self.number is None else f"N{self.number}"


@dataclass(frozen=True, slots=True)
class TextNote:
    """Something about the text as a whole: BOM, stray bytes, text after the end …"""

    topic: Literal["encoding", "control-bytes", "after-end", "comment", "paren", "blank-in-number", "semicolon"]
    line: int
    message: str


@dataclass(frozen=True, slots=True)
class ProgramText:
    """A program file, read."""

    path: str
    sha256: str
    lines: tuple[str, ...]
    blocks: tuple[Block, ...]
    notes: tuple[TextNote, ...] = ()
