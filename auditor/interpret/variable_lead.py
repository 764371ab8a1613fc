"""Threads whose lead grows or falls from turn to turn."""

from __future__ import annotations

import math

from auditor.interpret.cycles.call import CycleFault


def turns(travel: float, lead: float, change: float) -> float:
    """Turns of the spindle along a thread of changing lead.

    The travel after n turns is ``lead n + change n^2 / 2``.

    Parameters
    ----------
    travel : float
        Length along the axis of the lead, mm, > 0.
    lead : float
        Lead at the start, mm, > 0.
    change : float
        Change of the lead a turn, mm; below zero the lead falls.

    Raises
    ------
    CycleFault
        When the lead falls to nothing before the end.

    Examples
    --------
    72 mm that begin with a lead of 8 mm growing by 0.3 mm a turn:

    >>> round(turns(72.0, 8.0, 0.3), 3)
    7.846
    """
    under_root = lead**2 + 2.0 * change * travel
    if lead <= 0.0 or under_root <= 0.0:
        raise CycleFault("feed-zero", "the lead of the thread falls to nothing before its end", ("F", "K"))
    return 2.0 * travel / (lead + math.sqrt(under_root))


def mean_lead(travel: float, lead: float, change: float) -> float:
    """Travel a turn on the average over the whole thread, mm.

    Examples
    --------
    >>> round(mean_lead(72.0, 8.0, 0.3), 3)
    9.177
    """
    return travel / turns(travel, lead, change)
