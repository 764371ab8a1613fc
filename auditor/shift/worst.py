"""The worst figures of a job: what comes nearest to its limit, or goes over it."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from auditor.findings import Audit
from auditor.reports._shares import Floats, shares


@dataclass(frozen=True, slots=True)
class Worst:
    """The largest share of a limit, and where it is used."""

    what: str
    share: float
    line: int
    tool: int | None


def worst(judged: Audit) -> tuple[Worst, ...]:
    """Largest shares of spindle, axis thrust and tool force, as far as limits are declared; the largest first."""
    found = shares(judged.run)
    named = (("spindle", found.spindle), ("axis thrust", found.thrust), ("tool force", found.tool))
    made = [_worst(what, values, judged) for what, values in named if np.isfinite(values).any()]
    return tuple(sorted(made, key=lambda each: -each.share))


def _worst(what: str, values: Floats, judged: Audit) -> Worst:
    row = int(np.nanargmax(values))
    move = judged.run.path.moves[int(judged.run.prediction.loads.move[row])]
    return Worst(what, float(values[row]), move.line, move.tool)
