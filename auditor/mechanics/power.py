"""Power, torque and removal rate at the spindle, and independent figures of the energy a cut takes."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, between, not_negative, positive, ratio


def cutting_power(Fc: ArrayLike, vc: ArrayLike) -> Floats:
    """Power at the cutting edge, Pc = Fc vc / 60000.

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force.
    vc : array_like (...), m/min
        Cutting speed.

    Returns
    -------
    ndarray (...), kW
        Pc.

    Raises
    ------
    ValueError
        Force or speed negative.

    Examples
    --------
    >>> round(float(cutting_power(4019.0, 240.0)), 2)
    16.08

    References
    ----------
    ISO 3002-4 (1984), cutting power; Groover, Fundamentals of Modern Manufacturing, ch. 20.
    """
    return np.asarray(not_negative("cutting force", "N", Fc) * not_negative("cutting speed", "m/min", vc) / 60_000.0)


def power_from_torque(torque: ArrayLike, rpm: ArrayLike) -> Floats:
    """Power of a torque at a spindle speed.

    Parameters
    ----------
    torque : array_like (...), N m
        Torque at the spindle nose.
    rpm : array_like (...), rpm
        Spindle speed.

    Returns
    -------
    ndarray (...), kW
        P = M 2 pi n / 60000.

    Raises
    ------
    ValueError
        Torque or speed negative.

    Examples
    --------
    >>> round(float(power_from_torque(120.0, 1150.0)), 2)
    14.45

    References
    ----------
    Mechanics of rotation, P = M omega (Groover, Fundamentals of Modern Manufacturing, ch. 20).
    """
    return np.asarray(not_negative("torque", "N m", torque) * not_negative("speed", "rpm", rpm) * np.pi / 30_000.0)


def torque_from_power(power: ArrayLike, rpm: ArrayLike) -> Floats:
    """Torque a power gives at a spindle speed.

    Parameters
    ----------
    power : array_like (...), kW
        Power at the spindle nose.
    rpm : array_like (...), rpm
        Spindle speed.

    Returns
    -------
    ndarray (...), N m
        M = 60000 P / (2 pi n); NaN at standstill.

    Raises
    ------
    ValueError
        Power or speed negative.

    Examples
    --------
    >>> round(float(torque_from_power(15.0, 1150.0)), 1)
    124.6

    References
    ----------
    Mechanics of rotation, P = M omega (Groover, Fundamentals of Modern Manufacturing, ch. 20).
    """
    return ratio(not_negative("power", "kW", power) * 30_000.0 / np.pi, not_negative("speed", "rpm", rpm))


def spindle_torque(Fc: ArrayLike, diameter: ArrayLike) -> Floats:
    """Torque of the cutting force about the spindle axis, M = Fc d / 2000.

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force.
    diameter : array_like (...), mm
        Diameter at which it acts.

    Returns
    -------
    ndarray (...), N m
        M.

    Raises
    ------
    ValueError
        Force or diameter negative.

    Examples
    --------
    >>> round(float(spindle_torque(1960.0, 60.0)), 1)
    58.8

    References
    ----------
    Statics (Groover, Fundamentals of Modern Manufacturing, ch. 20).
    """
    return np.asarray(not_negative("cutting force", "N", Fc) * not_negative("diameter", "mm", diameter) / 2000.0)


def motor_power(Pc: ArrayLike, efficiency: ArrayLike) -> Floats:
    """Motor power behind a power at the cutting edge.

    Parameters
    ----------
    Pc : array_like (...), kW
        Cutting power.
    efficiency : array_like (...), dimensionless
        Spindle nose power over motor power: 0.75 to 0.85 geared, 0.85 to 0.95 direct drive.

    Returns
    -------
    ndarray (...), kW
        Pc / efficiency.

    Raises
    ------
    ValueError
        Power negative, efficiency not between 0 and 1 (1 included).

    Examples
    --------
    >>> round(float(motor_power(16.08, 0.75)), 1)
    21.4

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20 (gross power); ranges of efficiency: common practice.
    """
    share = between("efficiency", "", efficiency, 0.0, 1.0 + 1e-12)
    return np.asarray(not_negative("cutting power", "kW", Pc) / share)


def removal_rate(depth: ArrayLike, feed: ArrayLike, vc: ArrayLike) -> Floats:
    """Metal removed in unit time, Q = ap f vc.

    Parameters
    ----------
    depth : array_like (...), mm
        Depth of cut.
    feed : array_like (...), mm/rev
        Feed.
    vc : array_like (...), m/min
        Cutting speed at the mean diameter of the cut.

    Returns
    -------
    ndarray (...), cm3/min
        Q.

    Raises
    ------
    ValueError
        An argument negative.

    Examples
    --------
    >>> round(float(removal_rate(2.6, 0.3, 108.0)), 2)
    84.24

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20, eq. of material removal rate in turning.
    """
    section = not_negative("depth of cut", "mm", depth) * not_negative("feed", "mm/rev", feed)
    return np.asarray(section * not_negative("cutting speed", "m/min", vc))


def ring_removal_rate(outer: ArrayLike, inner: ArrayLike, feed_speed: ArrayLike) -> Floats:
    """Metal removed in unit time, from the ring between two diameters and the feed speed.

    Parameters
    ----------
    outer : array_like (...), mm
        Larger diameter of the ring taken off.
    inner : array_like (...), mm
        Smaller diameter; 0 for a drill in solid stock.
    feed_speed : array_like (...), mm/min
        Feed speed along the axis.

    Returns
    -------
    ndarray (...), cm3/min
        Q = pi (D^2 - d^2) vf / 4000.

    Raises
    ------
    ValueError
        An argument negative, inner diameter above the outer.

    Examples
    --------
    >>> round(float(ring_removal_rate(12.5, 12.0, 200.0)), 3)
    1.924

    References
    ----------
    Kalpakjian and Schmid, Manufacturing Engineering and Technology, example 23.1 and drilling, p. 632.
    """
    big, small = not_negative("outer diameter", "mm", outer), not_negative("inner diameter", "mm", inner)
    if np.any(small > big):
        raise ValueError("inner diameter must not exceed the outer one")
    return np.asarray(np.pi * (big**2 - small**2) * not_negative("feed speed", "mm/min", feed_speed) / 4000.0)


def power_from_removal(rate: ArrayLike, kc: ArrayLike) -> Floats:
    """Cutting power from removal rate and specific cutting force, Pc = Q kc / 60000.

    Parameters
    ----------
    rate : array_like (...), cm3/min
        Metal removed in unit time.
    kc : array_like (...), N/mm2
        Specific cutting force; the same number as the specific energy in J/cm3.

    Returns
    -------
    ndarray (...), kW
        Pc.

    Raises
    ------
    ValueError
        Rate negative, kc not above zero.

    Examples
    --------
    >>> round(float(power_from_removal(1.924, 4000.0)), 4)
    0.1283

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20, unit power; 1 N/mm2 = 1 J/cm3.
    """
    return np.asarray(not_negative("removal rate", "cm3/min", rate) * positive("kc", "N/mm2", kc) / 60_000.0)


def specific_energy(Fc: ArrayLike, area: ArrayLike) -> Floats:
    """Specific cutting energy of a measured cut, u = Fc / A.

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force.
    area : array_like (...), mm2
        Chip section.

    Returns
    -------
    ndarray (...), N/mm2
        u, a thousand times the figure in N m/mm3; NaN where nothing is cut.

    Raises
    ------
    ValueError
        Force or area negative.

    Examples
    --------
    >>> round(float(specific_energy(1559.0, 1.5)))
    1039

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20, eq. of unit power (specific energy).
    """
    return ratio(not_negative("cutting force", "N", Fc), not_negative("chip area", "mm2", area))
