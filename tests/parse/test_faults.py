"""A block that cannot be read: the right place, and what was probably meant."""

from __future__ import annotations

import pytest

from auditor.parse import caret, parse_text
from auditor.parse.blocks import SyntaxFault

# The block, the piece of it the caret must stand under, and a word the message or hint must hold.
TYPED = [
    ("G0 XO.5", "X", "digit 0"),
    ("G0 X1O.5", "O", "digit 0"),
    ("G0 X4O.", "O", "number of X4O."),
    ("GO X5.", "G", "digit 0"),
    ("G0 Xl0.", "l", "digit 1"),
    ("G0 X1l.5", "l", "digit 1"),
    ("G0 XI0.", "X", "digit 1"),
    ("G0 X10,5", "X10,5", "decimal comma"),
    ("#1=10,5", "10,5", "decimal comma"),
    ("G0 X--5.", "X--5.", "two signs"),
    ("G0 X+-5.", "X+-5.", "two signs"),
    ("G0 X5.-", "X5.-", "sign behind"),
    ("G0 X−5.", "−", "typographic minus"),
    ("G0 X–5.", "–", "typographic minus"),
    ("G0 X\u00a05.", "\u00a0", "non-breaking"),
    ("G0\u202fX5.", "\u202f", "non-breaking"),
    ("G0 X１0.", "１", "plain digit"),
    ("G0 X5.Ø", "Ø", "U+00D8"),
    ("G0 X Z5.", "X", "no value"),
    ("G0 X", "X", "no value"),
    ("G0 X-", "X-", "sign without"),
    ("G1 Z-5.,R", ",R", "no value"),
    ("G0 X.", "X.", "no digit"),
    ("G0 X-.", "X-.", "no digit"),
    ("G0 X1.2.3 Z5.", "X1.2.3", "two decimal points"),
    ("G0 X..5", "X..5", "two decimal points"),
    ("G0 X123456789.", "123456789.", "9 digits"),
    ("N123456789 G0", "123456789", "9 digits"),
    ("G0 X[#1+2.", "[#1+2.", "never closed"),
    ("G0 X[#1+2. Z5.", "[#1+2.", "never closed"),
    ("#1=SQRT[2*[3+4]", "[2*[3+4]", "never closed"),
    ("G0 X#1]", "]", "without its ["),
    ("#1=5]", "]", "without its ["),
    ("G0 X[[[[[[1]]]]]]", "[", "5 deep"),
    ("G0 X5. $", "$", "no code"),
    ("G0 X5. 'OUT", "'", "parentheses"),
    ("G0 X5. %", "%", "front of a line"),
    ("G0 X5. /Z5.", "/", "block skip"),
    ("//G0 X5.", "/", "twice"),
    ("G0 X5. N20", "N", "first"),
    ("G0 X5. O20", "O", "first"),
    ("N-5 G0", "N", "whole number"),
    ("10 G0", "10", "letter missing"),
    ("G0 #1", "#", "address letter"),
    ("G1 X40.,D2.", "X40.,", "chamfer"),
    ("DRAWING 4711", "D", "parentheses"),
    ("R1=20", "=", "another dialect"),
    ('T="ROUGHER"', "=", "another dialect"),
    ("G0 X#<depth>", "<", "named variables"),
    ("#<depth>=5.", "<", "named variables"),
    ("G0 X\x015.", "\x01", "01 hex"),
    ("#1", "1", "#i = value"),
    ("#1=", "=", "number, #i"),
    ("#1=2+", "+", "number, #i"),
    ("#1=SIN30", "3", "brackets"),
    ("IF[#1EQ2]", "]", "GOTO or THEN"),
    ("IF[#1EQ2]G0X5.", "G", "GOTO or THEN"),
    ("IF[#1=2]GOTO5", "=", "EQ NE"),
    ("IF#1EQ2GOTO5", "#", "brackets"),
    ("IF[#1EQ2]THENG0X5.", "G", "assignment"),
    ("WHILE[#1LT5]", "]", "DO1"),
    ("WHILE[#1LT5]DO4", "4", "1, 2 or 3"),
    ("END7", "7", "1, 2 or 3"),
    ("GOTON20", "N", "without the letter N"),
    ("G0 X5. (OUT", "(OUT", "never closed"),
    ("(OUT", "(OUT", "never closed"),
]


def fault_of(text: str) -> SyntaxFault:
    (block,) = parse_text(text).blocks
    assert block.fault is not None, text
    assert not block.words
    assert block.statement is None
    return block.fault


@pytest.mark.parametrize(("text", "piece", "said"), TYPED)
def test_place_and_meaning(text: str, piece: str, said: str) -> None:
    fault = fault_of(text)

    assert said in f"{fault.message} ({fault.hint})"
    last_of = {"[": text.rfind("["), "/": text.rfind("/"), "]": text.rfind("]")}
    assert fault.start == last_of.get(piece, text.find(piece, 0 if text.find(piece, 1) < 0 else 1))
    assert text[fault.start : fault.end] == piece


def test_the_rest_is_still_read() -> None:
    program = parse_text("N1 G0 X1.\nN2 G0 X..\nN3 G0 X3.")

    assert [block.fault is None for block in program.blocks] == [True, False, True]
    assert [block.label for block in program.blocks] == ["N1", "N2", "N3"]


def test_front_of_a_faulty_block_is_known() -> None:
    """Jumps and calls still find the block."""
    (block,) = parse_text("/2 O7 N30 G0 X--1.").blocks

    assert (block.skip, block.program, block.number) == (2, 7, 30)
    assert block.fault is not None


@pytest.mark.parametrize(
    ("following", "swallowed"),
    [("G0 Z5.\nM8 (COOLANT)\nM30", "the ) in line 3"), ("G0 Z5.\nM30", "the rest of the program")],
)
def test_unclosed_comment_says_what_other_controls_swallow(following: str, swallowed: str) -> None:
    fault = parse_text(f"G0 X5. (MOVE OUT\n{following}").blocks[0].fault

    assert fault is not None
    assert swallowed in (fault.hint or "")


def test_small_l_in_a_small_letter_program_is_an_address() -> None:
    (block,) = parse_text("m98 p1000 l3").blocks

    assert [word.letter for word in block.words] == ["M", "P", "L"]


def test_too_long_a_block_and_too_long_a_line() -> None:
    assert "501 characters" in fault_of("X1." * 167).message
    assert fault_of("G0 X5." + " " * 10_000).hint == "lines of up to 10000 are read; are the line ends missing?"
    assert parse_text(f"G0 X5. ({'A' * 9_000})").blocks[0].fault is None


def test_caret_under_the_place() -> None:
    program = parse_text("G0 X1.\nN20\tG0 X10,5 Z1.")

    assert caret(program.blocks[0]) == ""
    assert caret(program.blocks[1]).splitlines()[1:] == ["    N20 G0 X10,5 Z1.", "           ^^^^^"]


def test_caret_in_a_long_line_shows_the_place() -> None:
    (block,) = parse_text("(" + "A" * 300 + ") G0 X10,5 Z1.").blocks
    _, shown, marks = caret(block).splitlines()

    assert len(shown) <= 104
    assert shown[marks.index("^") : marks.rindex("^") + 1] == "X10,5"
