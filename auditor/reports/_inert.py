"""A stranger's text made harmless for the formats that other programs read."""

from __future__ import annotations

from auditor.reports._figures import harmless


def one_line(text: str) -> str:
    """Text without line ends and without signs that a screen obeys or XML cannot hold.

    >>> one_line("G1 X2\\r\\n\\x1b[31m (\\ufffe)")
    'G1 X2 ?[31m (?)'
    """
    return harmless(" ".join(text.splitlines()))


def lines(text: str) -> str:
    """The same, with its line ends kept."""
    return "\n".join(one_line(line) for line in text.splitlines())


def told(message: str, remedy: str | None) -> str:
    """What happens and what would cure it, as one text."""
    return message if remedy is None else f"{message} Way out: {remedy}"
