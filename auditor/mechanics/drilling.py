"""Drilling on the axis: chip, torque, thrust by three published routes, and depth without pecking."""

from __future__ import annotations

from typing import Final, NamedTuple

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, angle, not_negative, positive

DIAMETER: Final = ValidRange("drill diameter", "mm", 3.2, 22.0, "Machinery's Handbook 31, tables 8 and 9 as held here")
FEED: Final = ValidRange("feed", "mm/rev", 0.05, 0.40, "Machinery's Handbook 31, table 8 as held here")
FEED_SHARE: Final = ValidRange("feed / drill diameter", "1/rev", 0.01, 0.02, "common practice, high-speed steel")
FIRST_PECK: Final = 3.0  # diameters (common practice 2.5 to 3); 1, later 0.5 for the following
PILOT_DEPTH: Final = 10.0  # diameters from which carbide drills want a pilot hole (common practice)
_UNPECKED: Final = {"high-speed steel": 4.0, "carbide": 8.0, "coated carbide": 8.0}

_FEEDS: Final = (0.05, 0.10, 0.15, 0.20, 0.25, 0.30, 0.40)
_FEED_FACTORS: Final = (0.091, 0.158, 0.219, 0.276, 0.330, 0.382, 0.480)
_DIAMETERS: Final = (3.2, 4.8, 6.4, 8.0, 9.5, 12.5, 16.0, 22.0)
_THRUST_FACTORS: Final = (2.54, 3.51, 4.42, 5.28, 6.06, 7.54, 9.19, 11.86)
_TORQUE_FACTORS: Final = (8.12, 16.84, 28.26, 42.22, 57.53, 94.28, 147.0, 260.8)


class ChiselFactors(NamedTuple):
    """Share of the chisel edge in torque (A) and thrust (B, J) for a chisel over drill diameter."""

    A: float
    B: float
    J: float


STANDARD_CHISEL: Final = ChiselFactors(1.085, 1.355, 0.030)  # chisel edge 0.18 of the diameter
SPLIT_POINT: Final = ChiselFactors(1.000, 1.100, 0.001)  # 0.03 of the diameter


def drill_chip_thickness(feed: ArrayLike, point_angle: ArrayLike, flutes: ArrayLike = 2) -> Floats:
    """Uncut chip thickness of a drill, h = (f / z) sin(sigma / 2).

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed per revolution.
    point_angle : array_like (...), deg
        Point angle sigma, 0 to 180.
    flutes : array_like (...), dimensionless
        Number of lips.

    Returns
    -------
    ndarray (...), mm
        h.

    Raises
    ------
    ValueError
        Feed negative, point angle not up to 180 degrees, no lips.

    Examples
    --------
    >>> round(float(drill_chip_thickness(0.2, 118.0)), 4)
    0.0857

    References
    ----------
    ISO 3002-3 (1984), thickness of cut with kappa_r = sigma / 2.
    """
    half = angle("half point angle", np.asarray(point_angle, dtype=np.float64) / 2.0, 0.0, 90.0 + 1e-9)
    return np.asarray(not_negative("feed", "mm/rev", feed) / positive("number of lips", "", flutes) * np.sin(half))


def drill_torque(kc: ArrayLike, feed: ArrayLike, diameter: ArrayLike, pilot: ArrayLike = 0.0) -> Floats:
    """Torque of a drill from the specific cutting force, M = kc f (d^2 - d0^2) / 8.

    Parameters
    ----------
    kc : array_like (...), N/mm2
        Specific cutting force at the drill's chip thickness, factors in it.
    feed : array_like (...), mm/rev
        Feed.
    diameter : array_like (...), mm
        Drill diameter.
    pilot : array_like (...), mm
        Diameter of a hole already there.

    Returns
    -------
    ndarray (...), N m
        M; about 25 % uncertain.

    Raises
    ------
    ValueError
        kc not above zero, feed or diameter negative, pilot above the diameter.

    Examples
    --------
    >>> round(float(drill_torque(2780.0, 0.2, 10.0)), 2)
    6.95

    References
    ----------
    Tschaetsch, Praxis der Zerspantechnik, ch. on drilling: force of a lip kc d f / 4 at d / 4 from the axis; from
    memory.
    """
    return np.asarray(_ring(kc, feed, diameter, pilot) / 8000.0)


def drill_thrust(kc: ArrayLike, feed: ArrayLike, diameter: ArrayLike, point_angle: ArrayLike) -> Floats:
    """Thrust of a drill in solid stock, lips and chisel edge, kc f (d / 2) sin(sigma / 2).

    Parameters
    ----------
    kc : array_like (...), N/mm2
        Specific cutting force at the drill's chip thickness, factors in it.
    feed : array_like (...), mm/rev
        Feed.
    diameter : array_like (...), mm
        Drill diameter.
    point_angle : array_like (...), deg
        Point angle sigma, 0 to 180.

    Returns
    -------
    ndarray (...), N
        Thrust; half of it from the lips. About 30 % uncertain.

    Raises
    ------
    ValueError
        kc not above zero, feed or diameter negative, point angle not up to 180 degrees.

    Examples
    --------
    >>> round(float(drill_thrust(2780.0, 0.2, 10.0, 118.0)))
    2383

    References
    ----------
    Common practice for the lips (half of kc f d/2 sin(sigma/2)); Ghosh and Mallik, Manufacturing Science: chisel edge
    about half of the thrust (machine-read).
    """
    half = angle("half point angle", np.asarray(point_angle, dtype=np.float64) / 2.0, 0.0, 90.0 + 1e-9)
    section = not_negative("feed", "mm/rev", feed) * not_negative("diameter", "mm", diameter) / 2.0
    return np.asarray(positive("kc", "N/mm2", kc) * section * np.sin(half))


def handbook_torque(
    diameter: ArrayLike,
    feed: ArrayLike,
    work_factor: ArrayLike,
    chisel: ChiselFactors = STANDARD_CHISEL,
    wear_factor: float = 1.0,
) -> Floats:
    """Torque of a drill after Shaw and Oxford as the handbook writes it, M = 2.5e-5 Kd Ff FM A W.

    Parameters
    ----------
    diameter : array_like (...), mm
        Drill diameter, 3.2 to 22; NaN outside, see `DIAMETER`.
    feed : array_like (...), mm/rev
        Feed, 0.05 to 0.40; NaN outside, see `FEED`.
    work_factor : array_like (...), N/mm2
        Kd; steel of 200 HB about 16500.
    chisel : ChiselFactors, dimensionless
        Chisel-edge factors of the point.
    wear_factor : float, dimensionless
        W.

    Returns
    -------
    ndarray (...), N m
        M.

    Raises
    ------
    ValueError
        Diameter, feed or Kd not above zero.

    Examples
    --------
    >>> round(float(handbook_torque(9.5, 0.2, 16500.0)), 2)
    7.11

    References
    ----------
    Machinery's Handbook, 31st ed., p. 1152 and tables 7 to 9 (Shaw and Oxford, Trans. ASME 79, 1957); Kd from memory.
    """
    scale = 2.5e-5 * positive("work factor", "N/mm2", work_factor) * positive("wear factor", "", wear_factor)
    return np.asarray(scale * feed_factor(feed) * torque_factor(diameter) * chisel.A)


def handbook_thrust(
    diameter: ArrayLike,
    feed: ArrayLike,
    work_factor: ArrayLike,
    chisel: ChiselFactors = STANDARD_CHISEL,
    wear_factor: float = 1.0,
) -> Floats:
    """Thrust of a drill after Shaw and Oxford, T = 0.05 Kd Ff FT B W + 0.007 Kd D^2 J W.

    Parameters
    ----------
    diameter : array_like (...), mm
        Drill diameter, 3.2 to 22; NaN outside, see `DIAMETER`.
    feed : array_like (...), mm/rev
        Feed, 0.05 to 0.40; NaN outside, see `FEED`.
    work_factor : array_like (...), N/mm2
        Kd; steel of 200 HB about 16500.
    chisel : ChiselFactors, dimensionless
        Chisel-edge factors of the point.
    wear_factor : float, dimensionless
        W.

    Returns
    -------
    ndarray (...), N
        T.

    Raises
    ------
    ValueError
        Diameter, feed or Kd not above zero.

    Examples
    --------
    >>> round(float(handbook_thrust(9.5, 0.2, 16500.0)))
    2182

    References
    ----------
    Machinery's Handbook, 31st ed., p. 1152 and tables 7 to 9 (Shaw and Oxford, Trans. ASME 79, 1957); Kd from memory.
    """
    scale = positive("work factor", "N/mm2", work_factor) * positive("wear factor", "", wear_factor)
    lips = 0.05 * feed_factor(feed) * thrust_factor(diameter) * chisel.B
    return np.asarray(scale * (lips + 0.007 * positive("diameter", "mm", diameter) ** 2 * chisel.J))


def feed_factor(feed: ArrayLike) -> Floats:
    """Feed factor Ff of the handbook's drilling formulas.

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed, 0.05 to 0.40, see `FEED`.

    Returns
    -------
    ndarray (...), dimensionless
        Ff between the table's rows by straight lines in log-log; NaN outside.

    Raises
    ------
    ValueError
        Feed not above zero.

    Examples
    --------
    >>> round(float(feed_factor(0.2)), 3)
    0.276

    References
    ----------
    Machinery's Handbook, 31st ed., table 8, p. 1153.
    """
    return _between_rows(positive("feed", "mm/rev", feed), _FEEDS, _FEED_FACTORS)


def thrust_factor(diameter: ArrayLike) -> Floats:
    """Diameter factor FT for the thrust.

    Parameters
    ----------
    diameter : array_like (...), mm
        Drill diameter, 3.2 to 22, see `DIAMETER`.

    Returns
    -------
    ndarray (...), dimensionless
        FT between the table's rows by straight lines in log-log; NaN outside.

    Raises
    ------
    ValueError
        Diameter not above zero.

    Examples
    --------
    >>> round(float(thrust_factor(9.5)), 2)
    6.06

    References
    ----------
    Machinery's Handbook, 31st ed., table 9, p. 1153.
    """
    return _between_rows(positive("diameter", "mm", diameter), _DIAMETERS, _THRUST_FACTORS)


def torque_factor(diameter: ArrayLike) -> Floats:
    """Diameter factor FM for the torque.

    Parameters
    ----------
    diameter : array_like (...), mm
        Drill diameter, 3.2 to 22, see `DIAMETER`.

    Returns
    -------
    ndarray (...), dimensionless
        FM between the table's rows by straight lines in log-log; NaN outside.

    Raises
    ------
    ValueError
        Diameter not above zero.

    Examples
    --------
    >>> round(float(torque_factor(9.5)), 2)
    57.53

    References
    ----------
    Machinery's Handbook, 31st ed., table 9, p. 1153.
    """
    return _between_rows(positive("diameter", "mm", diameter), _DIAMETERS, _TORQUE_FACTORS)


def depth_without_peck(substrate: str) -> float:
    """Deepest hole, in drill diameters, that is drilled in one stroke.

    Parameters
    ----------
    substrate : str, name of the cutting material
        "high-speed steel", "carbide" or "coated carbide" (with coolant through the drill).

    Returns
    -------
    float, dimensionless
        4 for high-speed steel (3 to 4), 8 for carbide (5 to 8).

    Raises
    ------
    ValueError
        The name is none of these.

    Examples
    --------
    >>> depth_without_peck("high-speed steel")
    4.0

    References
    ----------
    Common practice, table of drilling depths.
    """
    if substrate not in _UNPECKED:
        raise ValueError(f"cutting material of a drill must be one of {', '.join(_UNPECKED)}; found {substrate!r}")
    return _UNPECKED[substrate]


def _ring(kc: ArrayLike, feed: ArrayLike, diameter: ArrayLike, pilot: ArrayLike) -> Floats:
    d, d0 = not_negative("diameter", "mm", diameter), not_negative("pilot diameter", "mm", pilot)
    if np.any(d0 > d):
        raise ValueError("the pilot hole must not be larger than the drill")
    return np.asarray(positive("kc", "N/mm2", kc) * not_negative("feed", "mm/rev", feed) * (d**2 - d0**2))


def _between_rows(x: Floats, rows: tuple[float, ...], values: tuple[float, ...]) -> Floats:
    out = np.exp(np.interp(np.log(x), np.log(rows), np.log(values)))
    return np.asarray(np.where((x >= rows[0]) & (x <= rows[-1]), out, np.nan))
