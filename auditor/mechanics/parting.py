"""Grooving and parting: depth, the centre, and the side force of a slanted front edge."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, angle, finite, not_negative, positive

DEPTH_TO_WIDTH: Final = ValidRange("groove depth / width", "", 0.0, 8.0, "common practice: 8 to 10, reinforced 16")
PLUNGE_FEED: Final = ValidRange("plunging feed", "mm/rev", 0.05, 0.2, "common practice")
SIDE_DEPTH: Final = ValidRange("side-turning depth / width", "", 0.0, 0.75, "common practice")
FEED_SHARE_AT_CENTRE: Final = 0.5  # of the feed, at most, for the last stretch (common practice 0.25 to 0.5)


def slow_zone_diameter(width: ArrayLike) -> Floats:
    """Diameter inside which the parting feed is taken down.

    Parameters
    ----------
    width : array_like (...), mm
        Width of the insert.

    Returns
    -------
    ndarray (...), mm
        The larger of 3 mm and the width.

    Raises
    ------
    ValueError
        Width not above zero.

    Examples
    --------
    >>> slow_zone_diameter([2.0, 4.0]).tolist()
    [3.0, 4.0]

    References
    ----------
    Common practice: last 2 to 3 mm of diameter, or the width of the insert.
    """
    return np.asarray(np.maximum(positive("insert width", "mm", width), 3.0))


def side_force(Fn: ArrayLike, front_angle: ArrayLike) -> Floats:
    """Force along the spindle axis from a slanted front edge, Fn tan(angle).

    Parameters
    ----------
    Fn : array_like (...), N
        Thrust on the front edge, towards the axis.
    front_angle : array_like (...), deg
        Slant of the front edge, usually 5 to 15.

    Returns
    -------
    ndarray (...), N
        Side force, with the sign of the slant: a blade gives way by it.

    Raises
    ------
    ValueError
        Thrust negative, angle not between -90 and 90 degrees.

    Examples
    --------
    >>> round(float(side_force(1000.0, 10.0)))
    176

    References
    ----------
    Statics of a thrust at right angles to the edge (Colwell 1954); slant of 5 to 15 degrees: common practice.
    """
    return np.asarray(not_negative("thrust", "N", Fn) * np.tan(angle("front angle", front_angle)))


def pip_diameter(height: ArrayLike) -> Floats:
    """Diameter of the pip left on the face by an edge off centre height, 2 |e|.

    Parameters
    ----------
    height : array_like (...), mm
        Height of the edge above (+) or below (-) the spindle axis.

    Returns
    -------
    ndarray (...), mm
        Pip left (below centre) or crushed by the flank (above).

    Raises
    ------
    ValueError
        Height infinite.

    Examples
    --------
    >>> round(float(pip_diameter(-0.1)), 2)
    0.2

    References
    ----------
    Plane geometry: the edge meets the axis no nearer than e, eq. of a chord.
    """
    return np.asarray(2.0 * np.abs(finite("height error", "mm", height)))
