"""What insert and holder codes share: the letters of shape, clearance and hand, and the error of a bad code.

Letter tables as commonly reprinted, from memory unless a test names a copy they were confirmed in.
"""

from __future__ import annotations

from typing import Literal

Hand = Literal["right", "left", "neutral"]

INCLUDED_ANGLE: dict[str, float | None] = {
    "A": 85.0, "B": 82.0, "C": 80.0, "D": 55.0, "E": 75.0, "H": 120.0, "K": 55.0, "L": 90.0, "M": 86.0,
    "O": 135.0, "P": 108.0, "R": None, "S": 90.0, "T": 60.0, "V": 35.0, "W": 80.0,
}  # fmt: skip
CLEARANCE_ANGLE: dict[str, float | None] = {
    "N": 0.0, "A": 3.0, "B": 5.0, "C": 7.0, "P": 11.0, "D": 15.0, "E": 20.0, "F": 25.0, "G": 30.0, "O": None,
}  # fmt: skip
HANDS: dict[str, Hand] = {"R": "right", "L": "left", "N": "neutral"}


class CodeError(ValueError):
    """An insert or holder code that cannot be read: which position, what stands there, what is wanted."""

    def __init__(self, code: str, position: str, found: str, wanted: str) -> None:
        self.code = code
        self.position = position
        self.found = found
        self.wanted = wanted
        super().__init__(f"{code!r}, {position}: found {found or 'nothing'}, wanted {wanted}")


class InsertCodeError(CodeError):
    """A code that is not ISO 1832 or ANSI B212.4."""
