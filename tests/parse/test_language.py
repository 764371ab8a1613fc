"""The language as shop programs contain it; the cases and their sources stand in fixtures/language."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

import pytest

from auditor.parse import parse_text
from auditor.parse.blocks import Block, Number

CASES = json.loads(
    (Path(__file__).parents[2] / "fixtures" / "language" / "lexing.json").read_text(encoding="utf-8")
)["cases"]


def written(block: Block) -> list[str] | None:
    """The words of a block as they would be typed; None for a block at fault."""
    if block.fault:
        return None
    return [word.letter + word.value.text for word in block.words if isinstance(word.value, Number)]


@pytest.mark.parametrize("case", CASES, ids=lambda case: case["id"])
def test_case(case: dict[str, Any]) -> None:
    program = parse_text(case["text"], **case.get("settings", {}))

    assert [written(block) for block in program.blocks] == case["blocks"]
    assert [note.topic for note in program.notes] == case.get("notes", [])
    for key, attribute in (("programs", "program"), ("numbers", "number"), ("skips", "skip")):
        if key in case:
            assert [getattr(block, attribute) for block in program.blocks] == case[key]


def test_every_case_has_its_own_name() -> None:
    assert len({case["id"] for case in CASES}) == len(CASES)
