"""An earlier JSON report: what was known then does not count again, unless it got worse."""

from __future__ import annotations

import json
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path

from auditor.errors import Fault, UsageError

_RANK = {"note": 0, "review": 1, "stop": 2}
_NOTICEABLE = 0.01  # a figure counts as worse when it moved by more than this share of its limit


@dataclass(frozen=True, slots=True)
class Known:
    """A finding, as far as it matters whether a later one is worse."""

    fingerprint: str
    level: str
    value: float | None
    limit: float | None
    band: tuple[float, float] | None
    accepted: bool

    def bad_side(self) -> int:
        """Where bad figures lie: +1 above the limit, -1 below it, 0 when there is nothing to compare."""
        if self.value is None or self.limit is None or self.value == self.limit:
            return 0
        beyond = 1 if self.value > self.limit else -1
        within = self.band is not None and self.band[0] <= self.limit <= self.band[1]
        return -beyond if within and self.level != "stop" else beyond


@dataclass(frozen=True, slots=True)
class Earlier:
    """Findings of an earlier report, by program."""

    programs: Mapping[str, Mapping[str, Known]]

    def counts(self, program: str, finding: Known) -> bool:
        """Whether a finding is new, or worse than it was."""
        known = self._of(program).get(finding.fingerprint)
        if known is None or _RANK[finding.level] > _RANK[known.level] or (known.accepted and not finding.accepted):
            return True
        if finding.value is None or known.value is None or not finding.limit:
            return False
        moved = (finding.value - known.value) * finding.bad_side()
        return moved > _NOTICEABLE * abs(finding.limit)

    def _of(self, program: str) -> Mapping[str, Known]:
        """The findings about a program: by its path, else by its file name."""
        if program in self.programs:
            return self.programs[program]
        alike = [path for path in self.programs if Path(path).name == Path(program).name]
        if len(alike) == 1:
            return self.programs[alike[0]]
        return {}


def read(path: Path) -> Earlier:
    """An earlier report, of one program or of several.

    Raises
    ------
    UsageError
        The file is missing or is no JSON report of this tool.
    """
    try:
        body = json.loads(path.read_text(encoding="utf-8"))
    except (OSError, ValueError) as problem:
        raise UsageError(_fault(path, str(problem))) from problem
    try:
        audits = body["audits"] if body["report"] == "turnaudit-set/1" else [body]
        return Earlier({
            audit["program"]["path"]: {known.fingerprint: known for known in _findings(audit)} for audit in audits
        })
    except (KeyError, TypeError, AttributeError, ValueError) as problem:
        raise UsageError(_fault(path, f"{type(problem).__name__} {problem}")) from problem


def _findings(audit: Mapping[str, object]) -> Iterator[Known]:
    if audit["report"] != "turnaudit/1":
        raise ValueError(audit["report"])
    listed = audit.get("findings", [])
    if not isinstance(listed, list):
        raise TypeError("findings")
    for item in listed:
        band = item["band"]
        if item["level"] not in _RANK:
            raise ValueError(item["level"])
        yield Known(
            item["fingerprint"], item["level"], item["value"], item["limit"],
            None if band is None else (band[0], band[1]), item["accepted"] is not None,
        )


def _fault(path: Path, found: str) -> Fault:
    return Fault("no earlier report that can be compared with", file=str(path), found=found,
                 wanted="a file written with --format json")
