"""Rows of the published tables, for the tests of this room."""

from __future__ import annotations

import csv
from pathlib import Path

FOLDER = Path(__file__).parents[2] / "fixtures" / "published"


def rows(name: str) -> list[dict[str, str]]:
    with (FOLDER / name).open(encoding="utf-8", newline="") as file:
        return list(csv.DictReader(file))


def by_id(row: dict[str, str]) -> str:
    return row.get("id") or "-".join(list(row.values())[:2])
