"""Bytes and lines: encodings, transfer leftovers, line ends and the % marks."""

from __future__ import annotations

import hashlib
from pathlib import Path

import pytest

from auditor.declared.model import Control
from auditor.errors import ProgramError
from auditor.parse import parse_text, read_program
from auditor.parse.blocks import ProgramText

CODE = "N10 G0 X10.\nN20 G1 Z-5. F.2 (Ø20 – FINISH)\n"


def words(program: ProgramText) -> list[list[str]]:
    return [[word.letter for word in block.words] for block in program.blocks]


@pytest.mark.parametrize("encoding", ["utf-8", "utf-8-sig", "utf-16", "utf-16-le", "utf-16-be", "cp1252"])
def test_every_usual_encoding_reads_the_same(encoding: str) -> None:
    program = parse_text(CODE.encode(encoding))

    assert words(program) == [["G", "X"], ["G", "Z", "F"]]
    assert [block.line for block in program.blocks] == [1, 2]
    assert program.blocks[1].comments[0].text.startswith("Ø20")


@pytest.mark.parametrize(
    ("end", "blocks", "last_line"),
    [("\n", 3, 4), ("\r\n", 3, 4), ("\r", 3, 4), ("\n\r", 3, 4), ("\r\r\n", 3, 7)],
)
def test_line_ends(end: str, blocks: int, last_line: int) -> None:
    program = parse_text(end.join(["G0 X1.", "G0 X2.", "", "G0 X3.", ""]))

    assert len(program.blocks) == blocks
    assert program.blocks[-1].line == last_line


def test_mixed_line_ends_in_one_file() -> None:
    program = parse_text("G0 X1.\rG0 X2.\r\nG0 X3.\nG0 X4.\n\rG0 X5.")

    assert [block.line for block in program.blocks] == [1, 2, 3, 4, 5]


@pytest.mark.parametrize("character", ["\x0b", "\x0c", "\x85", "\u2028", "\x1c", "\x1e"])
def test_only_cr_and_lf_end_a_line(character: str) -> None:
    assert len(parse_text(f"(A{character}B)\nG0 X1.").lines) == 2


def test_tape_leader_and_rubouts_are_left_out() -> None:
    program = parse_text(b"\x00\x00\x00%\r\nO1\r\nG0 \x7fX\x001\x11\x130.\r\nM30\r\n%\r\n\x00\x00")

    assert words(program) == [[], ["G", "X"], ["M"]]
    assert program.blocks[1].words[1].value.value == 10.0  # type: ignore[union-attr]
    assert [note.topic for note in program.notes] == ["control-bytes"]


def test_end_of_file_byte_ends_the_file() -> None:
    ended, hiding = parse_text(b"G0 X1.\r\n\x1a\x1a\x00"), parse_text(b"G0 X1.\r\n\x1aG0 X-5.")

    assert words(ended) == words(hiding) == [["G", "X"]]
    assert [note.topic for note in ended.notes] == ["control-bytes"]
    assert [note.topic for note in hiding.notes] == ["after-end"]


def test_two_programs_joined_with_a_mark_between_them() -> None:
    """Files put together keep the byte order mark of the second."""
    one = "\ufeff%\nO1\nM30\n%\n".encode()
    program = parse_text(one + one.replace(b"O1", b"O2"))

    assert [block.program for block in program.blocks] == [1, None, 2, None]


@pytest.mark.parametrize("data", [b"", b"\n\n", b"%\n%", b"\xff\xfe", b"\x1a", b" \t\r\n", "", "\ufeff"])
def test_files_without_a_block(data: bytes | str) -> None:
    assert parse_text(data).blocks == ()


@pytest.mark.parametrize(
    ("text", "lines"),
    [
        ("%\nO1\nM30\n%", [2, 3]),
        ("% SHAFT\nO1\nM30\n%", [2, 3]),
        ("%123\nO1\nM30\n%", [2, 3]),
        ("%O1\nM30\n%", [1, 2]),
        ("%\n%\nO1\nM30\n%", [3, 4]),  # opened twice
        ("O1\nM30\n%\nG0 X5.", [1, 2]),  # an end mark only
        ("BOLT 1 M30\nORDER\n:45 MATERIAL 16CRM2\n%\nO1\nM30", [5, 6]),  # leader
        ("N5 G0 X1.\nN6 M30\n%\nG0 X5.", [1, 2]),
        ("G0 X1.\n%\n\n", [1]),
        ("  %\nG0 X1.\n  %", [2]),
        ("NC PROGRAM OF TODAY\n%\nG0 X1.", [3]),
        ("%\nO1\nM30\n%\nO2\nM99\n%", [2, 3]),  # nothing opens O2
        ("%\nO1\nM30\n%\nG0 X1.\n%\nG0 X2.\n%", [2, 3]),
        ("%\nO1 (50%)\n(% IS TEXT)\nM30\n%", [2, 3, 4]),
        ("G0 X1. (A\n%\nO1\nM30", [3, 4]),
    ],
)
def test_percent_marks(text: str, lines: list[int]) -> None:
    assert [block.line for block in parse_text(text).blocks] == lines


def test_leader_that_looks_like_code_is_pointed_out() -> None:
    notes = parse_text("G0 X10. Z5.\n%\nO1\nM30\n%").notes

    assert [(note.topic, note.line) for note in notes] == [("after-end", 1)]


def test_title_between_percent_and_number_is_no_fault() -> None:
    program = parse_text("%\nSHAFT DRAWING 4711\nO1\nM30\n%")

    assert [block.line for block in program.blocks] == [3, 4]
    assert [(note.topic, note.line) for note in program.notes] == [("comment", 2)]
    assert parse_text("%\nSHAFT DRAWING 4711\nG0 X1.\n%").blocks[0].fault is not None


def test_read_program(tmp_path: Path) -> None:
    path = tmp_path / "Teil Ø.nc"
    path.write_bytes(CODE.encode())
    program = read_program(path, Control())

    assert program.path == str(path)
    assert program.sha256 == hashlib.sha256(path.read_bytes()).hexdigest()
    assert program.lines == tuple(CODE.splitlines())
    assert program == read_program(str(path), Control())


@pytest.mark.parametrize("name", ["missing.nc", ".", "no\0name"])
def test_a_file_that_cannot_be_opened(tmp_path: Path, name: str) -> None:
    with pytest.raises(ProgramError, match="cannot be opened") as caught:
        read_program(tmp_path / name, Control())

    assert caught.value.faults[0].file == str(tmp_path / name)


@pytest.mark.parametrize(
    ("text", "lines"),
    [
        ("%\nO1\nG0 X1.\nM30%", [2, 3, 4]),
        ("%\nO1\nN99 M30 % END\nG0 X5.\n%", [2, 3]),
        ("O1\nM02%\nG0 X5.", [1, 2]),
        ("%\nO1\nM98 P2\nM30%\n%\nO2\nM99 (50%) %\n", [2, 3, 4, 6, 7]),
        ("%\nO1\nG0 X1. M30(50%)\n%\nG0 X5.", [2, 3]),
    ],
)
def test_an_end_mark_behind_the_end_code(text: str, lines: list[int]) -> None:
    program = parse_text(text)
    assert [block.line for block in program.blocks] == lines
    assert all(block.fault is None for block in program.blocks)
    assert any("behind the end code" in note.message for note in program.notes) is ("(50%)\n" not in text)


def test_an_end_mark_behind_another_code_is_a_fault() -> None:
    assert parse_text("%\nO1\nG0 X5. %\nM30\n%").blocks[1].fault is not None
