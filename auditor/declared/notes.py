"""Collects what was taken for granted, so that every report can show it."""

from __future__ import annotations

from typing import TypeVar

from auditor.declared.model import Assumption
from auditor.declared.units import show

Value = TypeVar("Value")


class Notes:
    """The assumptions of one table; ``about`` is the table's key path."""

    def __init__(self, about: str) -> None:
        self.about = about
        self.entries: list[Assumption] = []

    def add(self, key: str, value: str, why: str) -> None:
        """Write down one assumption about a key of this table."""
        self.entries.append(Assumption(".".join(part for part in (self.about, key) if part), value, why))

    def number(self, key: str, declared: float | None, default: float, unit: str, why: str) -> float:
        """The declared number, or the default, written down."""
        if declared is not None:
            return declared
        self.add(key, show(default, unit), f"not declared; {why}")
        return default

    def other(self, key: str, declared: Value | None, default: Value, why: str) -> Value:
        """The declared word, switch or count, or the default, written down."""
        if declared is not None:
            return declared
        shown = ("yes" if default else "no") if isinstance(default, bool) else str(default)
        self.add(key, shown, f"not declared; {why}")
        return default
