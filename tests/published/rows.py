"""Rows of the published tables: what goes in, what the source prints, how far off a law may be."""

from __future__ import annotations

import csv
from dataclasses import dataclass
from pathlib import Path

FOLDER = Path(__file__).parents[2] / "fixtures" / "published"
TABLES = (
    "rake_and_clearance",
    "kienzle_and_factors",
    "engaged_edge",
    "shear_plane",
    "power_and_time",
    "move_times",
    "roughness",
    "edge_life",
    "bending",
    "clamping",
    "drilling_and_threads",
    "measured",
)


@dataclass(frozen=True, slots=True)
class Row:
    """One published value. ``inputs`` are numbers by the source's own symbols; ``text`` keeps what is no number."""

    id: str
    inputs: dict[str, float]
    series: dict[str, list[float]]
    text: dict[str, str]
    expected: list[float | None]
    tolerance: str

    def __getitem__(self, symbol: str) -> float:
        return self.inputs[symbol]

    def allows(self, value: float, expected: float) -> bool:
        """Whether a value agrees with the printed one; a tolerance of 0 means every printed digit."""
        if self.tolerance.endswith("%"):
            room = float(self.tolerance.rstrip("% ")) / 100.0 * abs(expected)
        else:
            room = float(self.tolerance)
        return abs(value - expected) <= max(room, 1e-9 * max(abs(expected), 1.0))

    def agrees(self, *values: float) -> bool:
        """Whether all values agree with all printed ones."""
        assert len(values) == len(self.expected)
        return all(
            want is None or self.allows(float(got), want) for got, want in zip(values, self.expected, strict=True)
        )


def lines(table: str) -> list[dict[str, str]]:
    with (FOLDER / f"{table}.csv").open(encoding="utf-8", newline="") as file:
        return list(csv.DictReader(file))


def read(table: str) -> dict[str, Row]:
    """The rows of a table by their id."""
    return {line["id"]: _row(line) for line in lines(table)}


def unused() -> dict[str, str]:
    """Rows that no law can be held against, with the reason."""
    return {line["id"]: line["reason"] for line in lines("unused")}


def _row(line: dict[str, str]) -> Row:
    pairs = [part.split("=", 1) for part in line["inputs"].split(";") if part]
    inputs: dict[str, float] = {}
    series: dict[str, list[float]] = {}
    text: dict[str, str] = {}
    for symbol, value in pairs:
        try:
            numbers = [float(part) for part in value.split("|")]
        except ValueError:
            text[symbol] = value
            continue
        series[symbol] = numbers
        inputs[symbol] = numbers[0]
    expected = [float(part) if part else None for part in line["expected"].split("|")] if line["expected"] else []
    return Row(line["id"], inputs, series, text, expected, line["tolerance"])
