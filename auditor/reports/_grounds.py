"""What a reader needs to weigh a verdict, in the order of its weight."""

from __future__ import annotations

from collections.abc import Iterable

from auditor.findings import Audit, Level, NotJudged

# Checks that guard people come first where something could not be judged.
_GRAVEST = ("chuck-grip", "spindle-speed", "jaw-contact", "tailstock-contact", "bar-whip")

CAUTION = (
    "A prediction from published laws, not a prove-out. Guards, the speed and grip limits of the machine and chuck "
    "manuals, local rules and qualified people decide; a clear verdict is no promise."
)


def counts(audit: Audit) -> str:
    """What there is to see to, in words; what was not judged is said wherever the word clear stands."""
    not_judged = len({item.check for item in audit.not_judged}) if audit.verdict == "clear" else 0
    told = (
        (audit.count(Level.STOP), "must be fixed"), (audit.count(Level.REVIEW), "to decide"),
        (audit.count(Level.NOTE), "to know"), (len(audit.coverage.not_audited), "not checked"),
        (not_judged, "not judged"),
    )
    return ", ".join(f"{number} {what}" for number, what in told if number) or "no findings"


def by_weight(items: Iterable[NotJudged]) -> list[NotJudged]:
    """Not-judged items, those that guard people first."""
    return sorted(items, key=lambda item: _GRAVEST.index(item.check) if item.check in _GRAVEST else len(_GRAVEST))
