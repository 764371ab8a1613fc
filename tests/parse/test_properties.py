"""What must hold for any text at all."""

from __future__ import annotations

import re

from hypothesis import given, settings
from hypothesis import strategies as st

from auditor.parse import caret, parse_text
from auditor.parse.blocks import Number, ProgramText

unhurried = settings(deadline=None)  # a busy machine is no fault

PIECES = [
    *"GXZUWIKRFSTMPQNOL#[]=,;()%/<>+-.*'\"é−ßı\x00\x1a\x85\ufeff",
    *("1", "20", "2.5", ".5", "0005", "IF", "GOTO", "THEN", "WHILE", "DO", "END", "SIN", "ATAN", "EQ", "AND"),
    *(" ", "\t", "\n", "\r", "\r\n", "DPRNT", "M98", "#101", "(A)", "%\n", "O1\n", "l"),
]
ADDRESSES = [*"ABCDEFGHIJKLMPQRSTUVWXYZ", ",C", ",R", ",A"]
numbers = st.from_regex(r"[+-]?([0-9]{1,4}(\.[0-9]{0,3})?|\.[0-9]{1,3})", fullmatch=True)
typed_words = st.tuples(st.sampled_from(ADDRESSES), numbers).map("".join)
typed_blocks = st.lists(typed_words, min_size=1, max_size=8)
options = st.fixed_dictionaries(
    {"semicolon": st.sampled_from(["comment", "end of block"]), "comment_nesting": st.booleans()}
)


def check_places(program: ProgramText) -> None:
    for block in program.blocks:
        assert program.lines[block.line - 1] == block.text
        for word in block.words:
            assert block.text[word.start].upper() == word.letter[0]
            assert 0 <= word.start < word.end <= len(block.text)
        for comment in block.comments:
            assert block.text[comment.start] in "(;"
            assert comment.text in block.text[comment.start : comment.end]
        if block.fault:
            assert 0 <= block.fault.start < block.fault.end <= len(block.text)
            assert not block.words
            assert "^" in caret(block)
    assert all(1 <= note.line <= max(len(program.lines), 1) for note in program.notes)


@unhurried
@given(st.binary(max_size=400))
def test_any_bytes(data: bytes) -> None:
    check_places(parse_text(data))


@unhurried
@given(st.text(max_size=200), options)
def test_any_text(text: str, how: dict[str, object]) -> None:
    check_places(parse_text(text, **how))  # type: ignore[arg-type]


@settings(unhurried, max_examples=400)
@given(st.lists(st.sampled_from(PIECES), max_size=40).map("".join), options)
def test_any_pieces_of_code(text: str, how: dict[str, object]) -> None:
    check_places(parse_text(text, **how))  # type: ignore[arg-type]


def plain(text: str) -> list[list[str]]:
    found = []
    for block in parse_text(text).blocks:
        assert block.fault is None, caret(block)
        found.append([word.letter + word.value.text for word in block.words if isinstance(word.value, Number)])
    return found


@unhurried
@given(st.lists(typed_blocks, min_size=1, max_size=6))
def test_what_is_typed_comes_back(blocks: list[list[str]]) -> None:
    assert plain("\n".join("".join(words) for words in blocks)) == blocks
    assert plain("\n".join(f"N{10 * i} {' '.join(words)}" for i, words in enumerate(blocks))) == blocks


@unhurried
@given(typed_words)
def test_a_number_keeps_its_value_and_its_point(text: str) -> None:
    (word,) = parse_text(text).blocks[0].words
    assert isinstance(word.value, Number)
    written = text[text.index(word.letter[-1]) + 1 :]
    assert word.value == Number(float(written), "." in written, written)


@unhurried
@given(typed_blocks, st.data())
def test_blanks_case_and_comments_do_not_matter(words: list[str], data: st.DataObject) -> None:
    gaps = st.sampled_from(["", "", " ", "\t", "  ", "(a)", "( x; )", "\x7f"])
    scattered = "".join(character + data.draw(gaps) for character in "".join(words))
    cased = data.draw(st.sampled_from([str.upper, str.lower]))(scattered)
    assert plain(cased) == [words]


@unhurried
@given(typed_blocks, st.sampled_from(["", "N10", "/", "/2N10", "N7/3", "O1234", "O12N10", "<SHAFT>"]))
def test_what_stands_in_front_changes_nothing_behind_it(words: list[str], front: str) -> None:
    text = "".join(words)
    behind = parse_text(front + text).blocks[0]
    assert behind.words == tuple(
        type(word)(word.letter, word.value, word.start + len(front), word.end + len(front))
        for word in parse_text(text).blocks[0].words
    )
    number = re.search(r"N(\d+)", front)
    assert behind.number == (int(number[1]) if number else None)


@unhurried
@given(st.lists(st.lists(st.sampled_from(PIECES[:40]), max_size=8).map("".join), max_size=6), st.integers(1, 3))
def test_a_line_reads_the_same_wherever_it_stands(lines: list[str], times: int) -> None:
    """Blocks once read are remembered: no line number, comment or fault may leak from one to the next."""
    lines = [re.sub(r"[%\r\n\x1a()\ufeff]", "", line) for line in lines]
    alone = [parse_text(line).blocks for line in lines]
    program = parse_text("G0\n" + "\n".join(lines * times))
    for offset, expected in enumerate(alone * times):
        together = [block for block in program.blocks if block.line == offset + 2]
        assert [(b.words, b.statement, b.fault, b.number) for b in together] == [
            (b.words, b.statement, b.fault, b.number) for b in expected
        ]
