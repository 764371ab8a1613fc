"""What a reader needs to weigh a verdict, in the order of its weight."""

from __future__ import annotations

from collections.abc import Iterable

from auditor.findings import NotJudged

# Checks that guard people come first where something could not be judged.
_GRAVEST = ("chuck-grip", "spindle-speed", "jaw-contact", "tailstock-contact", "bar-whip")

CAUTION = (
    "A prediction from published laws, not a prove-out. Guards, the speed and grip limits of the machine and chuck "
    "manuals, local rules and qualified people decide; a clear verdict is no promise."
)


def by_weight(items: Iterable[NotJudged]) -> list[NotJudged]:
    """Not-judged items, those that guard people first."""
    return sorted(items, key=lambda item: _GRAVEST.index(item.check) if item.check in _GRAVEST else len(_GRAVEST))
