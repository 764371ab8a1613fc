"""Text to Blocks."""

from __future__ import annotations

from auditor.parse.caret import caret
from auditor.parse.reader import parse_text, read_program

__all__ = ["caret", "parse_text", "read_program"]
