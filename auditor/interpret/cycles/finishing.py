"""Finishing: the profile once as written, with its own feeds and speeds, then straight back to the start."""

from __future__ import annotations

from dataclasses import replace

from auditor.interpret.cycles.call import CycleCall, CycleFault, Expansion, Stroke
from auditor.interpret.moves import Kind

NAMES = ("finishing",)


def expand(call: CycleCall) -> Expansion:
    """Run the profile of ``call`` and return to its start point in rapid.

    The profile is taken as handed over: where nose-radius compensation is on in it, the strokes
    already are the compensated tip path.
    """
    if not call.profile:
        raise CycleFault("cycle-profile-missing", "the finishing cycle needs P and Q of a profile", ("P", "Q"))
    home = Stroke(Kind.RAPID, call.start)
    strokes = (*call.profile, home)
    return Expansion(tuple(replace(stroke, cycle_pass=1) for stroke in strokes))
