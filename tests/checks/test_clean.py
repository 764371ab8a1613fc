"""Usual good practice stays unflagged: these programs are what a careful shop runs every day."""

from __future__ import annotations

from pathlib import Path

import pytest

from auditor.findings import Level
from tests.checks.cases import FOLDER, audited

CLEAN = sorted((FOLDER / "clean").glob("*.nc"))


@pytest.mark.parametrize("program", CLEAN, ids=lambda program: program.stem)
def test_no_stop(program: Path) -> None:
    stops = [(item.check, item.line, item.message) for item in audited(program).findings if item.level is Level.STOP]
    assert stops == []


@pytest.mark.parametrize("program", CLEAN, ids=lambda program: program.stem)
def test_all_of_it_is_audited(program: Path) -> None:
    assert audited(program).coverage.not_audited == ()


@pytest.mark.parametrize("program", CLEAN, ids=lambda program: program.stem)
def test_few_questions(program: Path) -> None:
    """More than one review in a good program would teach people not to read them."""
    asked = [(item.check, item.line, item.message) for item in audited(program).findings if item.level is Level.REVIEW]
    assert len(asked) <= 1, asked
