"""Blocks to Moves: the program carried out on paper, the way the declared control would."""

from __future__ import annotations

from auditor.interpret.program import interpret

__all__ = ["interpret"]
