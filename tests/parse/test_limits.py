"""Hostile and huge files, and the tables kept in the cache folder.

Time limits here are a hundred times what is needed; they tell "seconds" from "hours" only.
"""

from __future__ import annotations

import time
from collections.abc import Callable, Iterator
from pathlib import Path

import pytest

from auditor.parse import grammar, parse_text
from auditor.parse.blocks import ProgramText

MEGABYTE = 1_000_000


def timed(text: str | bytes) -> tuple[ProgramText, float]:
    start = time.perf_counter()
    return parse_text(text), time.perf_counter() - start


@pytest.mark.parametrize(
    "text",
    [
        "G0 X" + "1" * 20_000,
        "G0 X" + "1" * 490,
        "G0 X" + "1." * 4_000,
        "G0 X1" + " 1" * 4_000,
        "G0 X1" + " " * 9_900 + "1",
        "#1=" + "[" * 5_000,
        "#1=" + "-" * 490 + "1",
        "(" * 9_900,
        ")" * 9_900,
        "X1." * 3_000,
        "%" * 9_900,
        "G1 X1." * (10 * MEGABYTE // 6),
        "(" + "A" * (10 * MEGABYTE),
        "\x00" * (10 * MEGABYTE),
    ],
    ids=lambda text: f"{text[:8]!r} of {len(text)}",
)
def test_one_line_takes_no_time(text: str) -> None:
    program, seconds = timed(text)

    assert len(program.blocks) <= 1
    assert seconds < 5


@pytest.mark.parametrize(
    "text",
    ["G0 X1. (A\n" * 20_000, ")\n" * 20_000, "%\n" * 20_000, "%\nO1\n%\n" * 7_000, "\x1a" * 200_000, "\r\n" * 200_000],
    ids=["unclosed comments", "stray parentheses", "marks", "programs", "end-of-file bytes", "empty lines"],
)
def test_many_odd_lines_take_time_in_proportion(text: str) -> None:
    assert timed(text)[1] < 20


def test_noise_is_read_to_its_end() -> None:
    """A photograph given instead of a program: faults and nothing else."""
    noise = bytes((31 * i * i + i // 7) % 256 for i in range(MEGABYTE // 4))
    program, seconds = timed(noise)

    assert seconds < 20
    assert all(block.fault for block in program.blocks if len(block.text) > 40 and not block.comments)


def test_a_sum_as_long_as_a_block_may_be_is_no_deep_recursion() -> None:
    (block,) = parse_text("#1=" + "+".join(["1"] * 248)).blocks

    assert block.fault is None
    assert repr(block.statement).count("Binary") == 247


@pytest.fixture
def fresh_tables() -> Iterator[Callable[[], None]]:
    def forget() -> None:
        grammar._lark.cache_clear()
        grammar._word_patterns.cache_clear()

    forget()
    yield forget
    forget()


def test_tables_are_kept_between_runs(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, fresh_tables: Callable[[], None]
) -> None:
    monkeypatch.setenv("XDG_CACHE_HOME", str(tmp_path))
    monkeypatch.setenv("LOCALAPPDATA", str(tmp_path))
    first = parse_text("G0 X[#1+2.]").blocks
    fresh_tables()

    assert len(list(tmp_path.rglob("*.tables"))) == 1
    assert parse_text("G0 X[#1+2.]").blocks == first


def test_spoilt_tables_are_built_anew(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, fresh_tables: Callable[[], None]
) -> None:
    monkeypatch.setenv("XDG_CACHE_HOME", str(tmp_path))
    monkeypatch.setenv("LOCALAPPDATA", str(tmp_path))
    parse_text("G0")
    (tables,) = tmp_path.rglob("*.tables")
    tables.write_bytes(tables.read_bytes()[:1000])
    fresh_tables()

    assert parse_text("G0 X[#1]").blocks[0].fault is None


@pytest.mark.parametrize("root", ["file", "relative", ""])
def test_a_cache_that_cannot_be_written_does_not_matter(
    root: str, tmp_path: Path, monkeypatch: pytest.MonkeyPatch, fresh_tables: Callable[[], None]
) -> None:
    blocked = tmp_path / "file"
    blocked.write_text("in the way", encoding="utf-8")
    where = str(blocked) if root == "file" else root
    monkeypatch.setenv("HOME", str(blocked))
    monkeypatch.setenv("XDG_CACHE_HOME", where)
    monkeypatch.setenv("LOCALAPPDATA", where)

    assert parse_text("G0 X[#1]").blocks[0].fault is None
