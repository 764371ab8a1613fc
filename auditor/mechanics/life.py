"""Edge life: Taylor's law and its extensions, wear limits, drift of size."""

from __future__ import annotations

from typing import Final, NamedTuple

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, angle, finite, not_negative, positive

LIFE: Final = ValidRange("edge life", "min", 5.0, 120.0, "ISO 3685 tests; three laboratories differ by up to 2 (AIST)")
FLANK_WEAR_LIMIT: Final = 0.3  # mm, regular flank wear VB_B, carbide and ceramic (ISO 3685, from memory)
UNATTENDED_SHARE: Final = 0.65  # of the predicted life that an unattended run may use (common practice 0.6 to 0.7)


class TaylorPair(NamedTuple):
    """Constants of v T^n = C: speed for a life of one minute, m/min, and exponent; None where none is published."""

    exponent: float
    speed_other: float | None
    speed_steel: float | None


_TAYLOR: Final = {
    "plain carbon tool steel": TaylorPair(0.1, 70.0, 20.0),
    "high-speed steel": TaylorPair(0.125, 120.0, 70.0),
    "carbide": TaylorPair(0.25, 900.0, 500.0),
    "cermet": TaylorPair(0.25, None, 600.0),
    "coated carbide": TaylorPair(0.25, None, 700.0),
    "ceramic": TaylorPair(0.6, None, 3000.0),
}


def taylor_life(vc: ArrayLike, C: ArrayLike, n: ArrayLike) -> Floats:
    """Edge life at a cutting speed, T = (C / v)^(1/n).

    Parameters
    ----------
    vc : array_like (...), m/min
        Cutting speed.
    C : array_like (...), m/min
        Speed for a life of one minute.
    n : array_like (...), dimensionless
        Taylor exponent, above 0 and below 1.

    Returns
    -------
    ndarray (...), min
        T, scattering by a factor of two, see `LIFE`.

    Raises
    ------
    ValueError
        Speed or C not above zero, n not between 0 and 1.

    Examples
    --------
    >>> round(float(taylor_life(100.0, 229.2, 0.2234)), 0)
    41.0

    References
    ----------
    Taylor 1907; ISO 3685 (1993); Groover, Fundamentals of Modern Manufacturing, ch. 23, eq. of Taylor.
    """
    return np.asarray((positive("C", "m/min", C) / positive("cutting speed", "m/min", vc)) ** (1.0 / _exponent(n)))


def taylor_speed(life: ArrayLike, C: ArrayLike, n: ArrayLike) -> Floats:
    """Cutting speed for a life, v = C / T^n.

    Parameters
    ----------
    life : array_like (...), min
        Edge life wanted.
    C : array_like (...), m/min
        Speed for a life of one minute.
    n : array_like (...), dimensionless
        Taylor exponent, above 0 and below 1.

    Returns
    -------
    ndarray (...), m/min
        v.

    Raises
    ------
    ValueError
        Life or C not above zero, n not between 0 and 1.

    Examples
    --------
    >>> round(float(taylor_speed(15.0, 320.0, 0.25)))
    163

    References
    ----------
    Taylor 1907; ISO 3685 (1993), range see `LIFE`.
    """
    return np.asarray(positive("C", "m/min", C) / positive("life", "min", life) ** _exponent(n))


def taylor_fit(vc: ArrayLike, life: ArrayLike) -> tuple[float, float]:
    """Taylor's constants through two or more tests, a straight line in log v over log T.

    Parameters
    ----------
    vc : array_like (k,), m/min
        Cutting speeds of the tests.
    life : array_like (k,), min
        Lives reached.

    Returns
    -------
    tuple of float, m/min and dimensionless
        C and n.

    Raises
    ------
    ValueError
        Fewer than two tests with different lives, a speed or life not above zero.

    Examples
    --------
    >>> C, n = taylor_fit([160.0, 100.0], [5.0, 41.0])
    >>> round(C, 1), round(n, 4)
    (229.2, 0.2234)

    References
    ----------
    ISO 3685 (1993), evaluation of tool-life data; Groover, Fundamentals of Modern Manufacturing, ch. 23, example.
    """
    x = np.log(np.atleast_1d(positive("life", "min", life)))
    y = np.log(np.atleast_1d(positive("cutting speed", "m/min", vc)))
    if x.shape != y.shape or x.ndim != 1 or np.ptp(x) == 0.0:
        raise ValueError("Taylor's constants need as many lives as speeds, at least two different ones")
    centred = x - x.mean()
    slope = float(centred @ (y - y.mean()) / (centred @ centred))
    return float(np.exp(y.mean() - slope * x.mean())), -slope


def taylor_constants(tool_material: str) -> TaylorPair:
    """Textbook constants for a feed of 0.25 mm/rev and a depth of 2.5 mm.

    Parameters
    ----------
    tool_material : str, name of the cutting material
        "plain carbon tool steel", "high-speed steel", "carbide", "cermet", "coated carbide" or "ceramic".

    Returns
    -------
    TaylorPair, dimensionless and m/min
        Exponent; speed for one minute in non-steel and in steel.

    Raises
    ------
    ValueError
        The name is none of these.

    Examples
    --------
    >>> taylor_constants("coated carbide").speed_steel
    700.0

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, table 23.2, from memory.
    """
    if tool_material not in _TAYLOR:
        raise ValueError(f"cutting material must be one of {', '.join(_TAYLOR)}; found {tool_material!r}")
    return _TAYLOR[tool_material]


def extended_taylor_life(
    vc: ArrayLike,
    feed: ArrayLike,
    depth: ArrayLike,
    C: ArrayLike,
    n: ArrayLike,
    feed_exponent: ArrayLike,
    depth_exponent: ArrayLike,
) -> Floats:
    """Edge life with feed and depth, v T^n f^y d^x = C.

    Parameters
    ----------
    vc : array_like (...), m/min
        Cutting speed.
    feed : array_like (...), mm/rev
        Feed.
    depth : array_like (...), mm
        Depth of cut.
    C : array_like (...), m/min
        Constant: speed for one minute at feed and depth 1.
    n : array_like (...), dimensionless
        Taylor exponent: carbide on steel 0.20 to 0.25, high-speed steel 0.15.
    feed_exponent : array_like (...), dimensionless
        y: carbide 0.2 to 0.45, high-speed steel 0.6.
    depth_exponent : array_like (...), dimensionless
        x: 0.15.

    Returns
    -------
    ndarray (...), min
        T, see `LIFE`.

    Raises
    ------
    ValueError
        Speed, feed, depth or C not above zero, n not between 0 and 1.

    Examples
    --------
    >>> round(float(extended_taylor_life(96.7, 1.0, 1.0, 243.0, 0.2, 0.4, 0.15)))
    100

    References
    ----------
    Kronenberg, Machining Science and Application (extended Taylor equation); Kosilova and Meshcheryakov, Spravochnik
    tekhnologa-mashinostroitelya, vol. 2 (1986), table 17 (form Cv / (T^m t^x S^y)).
    """
    section = _section(feed, depth, feed_exponent, depth_exponent)
    slowed = positive("C", "m/min", C) / (positive("cutting speed", "m/min", vc) * section)
    return np.asarray(slowed ** (1.0 / _exponent(n)))


def extended_taylor_speed(
    life: ArrayLike,
    feed: ArrayLike,
    depth: ArrayLike,
    C: ArrayLike,
    n: ArrayLike,
    feed_exponent: ArrayLike,
    depth_exponent: ArrayLike,
) -> Floats:
    """Cutting speed for a life with feed and depth, v = C / (T^n f^y d^x).

    Parameters
    ----------
    life : array_like (...), min
        Edge life wanted.
    feed : array_like (...), mm/rev
        Feed.
    depth : array_like (...), mm
        Depth of cut.
    C : array_like (...), m/min
        Constant: speed for one minute at feed and depth 1.
    n : array_like (...), dimensionless
        Taylor exponent.
    feed_exponent : array_like (...), dimensionless
        y.
    depth_exponent : array_like (...), dimensionless
        x.

    Returns
    -------
    ndarray (...), m/min
        v.

    Raises
    ------
    ValueError
        Life, feed, depth or C not above zero, n not between 0 and 1.

    Examples
    --------
    >>> round(float(extended_taylor_speed(100.0, 1.0, 1.0, 243.0, 0.2, 0.4, 0.15)), 1)
    96.7

    References
    ----------
    Kosilova and Meshcheryakov, Spravochnik tekhnologa-mashinostroitelya, vol. 2 (1986), table 17; range see `LIFE`.
    """
    section = _section(feed, depth, feed_exponent, depth_exponent)
    return np.asarray(positive("C", "m/min", C) / (positive("life", "min", life) ** _exponent(n) * section))


def crater_limit(feed: ArrayLike) -> Floats:
    """Crater depth at the end of edge life, KT = 0.06 + 0.3 f.

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed.

    Returns
    -------
    ndarray (...), mm
        KT.

    Raises
    ------
    ValueError
        Feed negative.

    Examples
    --------
    >>> round(float(crater_limit(0.2)), 2)
    0.12

    References
    ----------
    ISO 3685 (1993), tool-life criteria for carbide, from memory.
    """
    return np.asarray(0.06 + 0.3 * not_negative("feed", "mm/rev", feed))


def size_drift(flank_wear: ArrayLike, clearance: ArrayLike) -> Floats:
    """Growth of the diameter as the flank wears, 2 VB tan a.

    Parameters
    ----------
    flank_wear : array_like (...), mm
        Width VB of the wear land.
    clearance : array_like (...), deg
        Working clearance.

    Returns
    -------
    ndarray (...), mm
        Change of the diameter.

    Raises
    ------
    ValueError
        Wear negative, clearance not between -90 and 90 degrees.

    Examples
    --------
    >>> round(float(size_drift(0.3, 6.0)), 3)
    0.063

    References
    ----------
    Plane geometry of the wear land (edge set back by VB tan a), eq. of a right triangle; VB as in ISO 3685.
    """
    return np.asarray(2.0 * not_negative("flank wear", "mm", flank_wear) * np.tan(angle("clearance", clearance)))


def _exponent(n: ArrayLike) -> Floats:
    x = positive("Taylor exponent", "", n)
    if np.any(x >= 1.0):
        raise ValueError("Taylor exponent must be below 1")
    return x


def _section(feed: ArrayLike, depth: ArrayLike, feed_exponent: ArrayLike, depth_exponent: ArrayLike) -> Floats:
    y, x = finite("feed exponent", "", feed_exponent), finite("depth exponent", "", depth_exponent)
    return np.asarray(positive("feed", "mm/rev", feed) ** y * positive("depth of cut", "mm", depth) ** x)
