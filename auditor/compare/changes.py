"""Which findings another tool fixes, leaves or breaks."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Literal

from auditor.findings import Finding, Level

What = Literal["fixed", "eased", "left", "worse", "new"]
ORDER: tuple[What, ...] = ("new", "worse", "left", "eased", "fixed")
_GRAVITY = {Level.STOP: 2, Level.REVIEW: 1, Level.NOTE: 0}


@dataclass(frozen=True, slots=True)
class Change:
    """One finding before and after; ``before`` or ``after`` is None where there is none."""

    what: What
    before: Finding | None
    after: Finding | None

    @property
    def finding(self) -> Finding:
        """The finding as it stands now, or stood before it was fixed."""
        found = self.after or self.before
        assert found is not None
        return found


def changes(before: Sequence[Finding], after: Sequence[Finding]) -> tuple[Change, ...]:
    """Findings matched by their fingerprints, which do not hold any figure: what is new and worse stands first."""
    found = sorted(_matched(before, after), key=lambda change: (ORDER.index(change.what), change.finding.line))
    return tuple(found)


def _matched(before: Sequence[Finding], after: Sequence[Finding]) -> Iterator[Change]:
    earlier = {finding.fingerprint: finding for finding in before}
    for finding in after:
        old = earlier.pop(finding.fingerprint, None)
        yield Change(_what(old, finding), old, finding)
    yield from (Change("fixed", finding, None) for finding in earlier.values())


def _what(old: Finding | None, new: Finding) -> What:
    if old is None:
        return "new"
    step = _GRAVITY[new.level] - _GRAVITY[old.level]
    return "worse" if step > 0 else "eased" if step < 0 else "left"
