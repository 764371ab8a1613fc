"""Work holding: what a cut asks of the chuck, and what speed leaves of its grip."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, finite, not_negative, positive

GRIP_SAFETY: Final = 1.5  # S_z and S_sp, smallest (VDI 3106)
CENTRIFUGAL_SHARE: Final = 0.67  # of the static grip the jaws may lose (EN 1550)
TILTING_FACTOR: Final = 3.0  # C of the tilting term: 2 to 4 for three jaws without an end stop (model)
FRICTION: Final = ValidRange("jaw friction", "", 0.07, 0.25, "VDI 3106, smooth jaws 0.07 to serrated 0.25, from memory")


def centrifugal_force(jaw_mass: ArrayLike, jaw_radius: ArrayLike, rpm: ArrayLike, jaws: ArrayLike = 1) -> Floats:
    """Grip that the jaws lose at a speed, F_c = sum m r (pi n / 30)^2.

    Parameters
    ----------
    jaw_mass : array_like (...), kg
        Mass of one jaw.
    jaw_radius : array_like (...), mm
        Radius of its centre of mass.
    rpm : array_like (...), rpm
        Spindle speed.
    jaws : array_like (...), dimensionless
        Number of jaws.

    Returns
    -------
    ndarray (...), N
        F_c of all jaws.

    Raises
    ------
    ValueError
        An argument negative.

    Examples
    --------
    >>> round(float(centrifugal_force(0.6, 60.0, 4000.0, 3)))
    18950

    References
    ----------
    VDI 3106, eq. of the centrifugal force of the jaws, as restated in chuck manuals.
    """
    moment = not_negative("jaw mass", "kg", jaw_mass) * not_negative("jaw radius", "mm", jaw_radius) / 1000.0
    turning = not_negative("speed", "rpm", rpm) * np.pi / 30.0
    return np.asarray(not_negative("number of jaws", "", jaws) * moment * turning**2)


def grip_for_cut(
    Fc: ArrayLike,
    axial: ArrayLike,
    cut_diameter: ArrayLike,
    grip_diameter: ArrayLike,
    friction: ArrayLike,
) -> Floats:
    """Grip needed against turning and axial slip, sqrt((Fc d/D)^2 + Fa^2) / mu.

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force.
    axial : array_like (...), N
        Force on the work along the spindle axis.
    cut_diameter : array_like (...), mm
        Diameter at which the cutting force acts.
    grip_diameter : array_like (...), mm
        Diameter at which the jaws hold.
    friction : array_like (...), dimensionless
        Coefficient of friction at the jaws, see `FRICTION`.

    Returns
    -------
    ndarray (...), N
        Total over the jaws, no safety in it.

    Raises
    ------
    ValueError
        Fc or the cut diameter negative, grip diameter or friction not above zero.

    Examples
    --------
    >>> round(float(grip_for_cut(3000.0, 0.0, 60.0, 80.0, 0.1)))
    22500

    References
    ----------
    VDI 3106, gripping force for torque and axial force; friction figures from memory.
    """
    turning = (
        not_negative("cutting force", "N", Fc)
        * not_negative("cut diameter", "mm", cut_diameter)
        / positive("grip diameter", "mm", grip_diameter)
    )
    slip = np.hypot(turning, finite("axial force", "N", axial))
    return np.asarray(slip / positive("friction", "", friction))


def grip_for_tilting(
    Fc: ArrayLike,
    Fp: ArrayLike,
    lever: ArrayLike,
    grip_diameter: ArrayLike,
    factor: float = TILTING_FACTOR,
) -> Floats:
    """Grip needed against tilting out of the jaws, C hypot(Fc, Fp) l / D.

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force.
    Fp : array_like (...), N
        Passive force.
    lever : array_like (...), mm
        Distance l from the jaw face to the cut.
    grip_diameter : array_like (...), mm
        Diameter at which the jaws hold.
    factor : float, dimensionless
        C, 2 to 4 for three jaws without an end stop.

    Returns
    -------
    ndarray (...), N
        Total over the jaws, no safety in it; an estimate.

    Raises
    ------
    ValueError
        A force, lever or the factor negative, grip diameter not above zero.

    Examples
    --------
    >>> round(float(grip_for_tilting(1200.0, 500.0, 90.0, 60.0)))
    5850

    References
    ----------
    Model in the structure of VDI 3106; both forces across the axis tilt the work, so their resultant counts.
    """
    across = np.hypot(not_negative("cutting force", "N", Fc), not_negative("passive force", "N", Fp))
    arm = not_negative("lever", "mm", lever) / positive("grip diameter", "mm", grip_diameter)
    return np.asarray(not_negative("tilting factor", "", factor) * across * arm)


def grip_with_safety(needed: ArrayLike, safety: float = GRIP_SAFETY) -> Floats:
    """Effective gripping force, F_sp = S_z F_spz.

    Parameters
    ----------
    needed : array_like (...), N
        Grip that the cut needs.
    safety : float, dimensionless
        S_z, at least 1.5.

    Returns
    -------
    ndarray (...), N
        F_sp.

    Raises
    ------
    ValueError
        Grip negative, safety not above zero.

    Examples
    --------
    >>> float(grip_with_safety(3000.0))
    4500.0

    References
    ----------
    VDI 3106, eq. F_sp = S_z F_spz, as restated in chuck manuals.
    """
    return np.asarray(positive("safety", "", safety) * not_negative("grip needed", "N", needed))


def static_grip(
    effective: ArrayLike, centrifugal: ArrayLike, inside: bool = False, safety: float = GRIP_SAFETY
) -> Floats:
    """Grip to be set at standstill, F_sp0 = S_sp (F_sp + F_c) outside, S_sp F_sp inside.

    Parameters
    ----------
    effective : array_like (...), N
        Grip needed at speed.
    centrifugal : array_like (...), N
        Centrifugal force of the jaws at that speed.
    inside : bool, true or false
        True when the jaws press outwards in a bore; the gain by speed is not credited.
    safety : float, dimensionless
        S_sp, at least 1.5.

    Returns
    -------
    ndarray (...), N
        F_sp0.

    Raises
    ------
    ValueError
        A force negative, safety not above zero.

    Examples
    --------
    >>> float(static_grip(4500.0, 5000.0))
    14250.0

    References
    ----------
    VDI 3106, eq. F_sp0 = S_sp (F_sp +/- F_c); no credit for inside grip: model, on the safe side.
    """
    need, lost = not_negative("effective grip", "N", effective), not_negative("centrifugal force", "N", centrifugal)
    return np.asarray(positive("safety", "", safety) * (need + (0.0 * lost if inside else lost)))


def grip_left(static: ArrayLike, centrifugal: ArrayLike, inside: bool = False) -> Floats:
    """Grip left at speed of a static gripping force.

    Parameters
    ----------
    static : array_like (...), N
        Total static gripping force.
    centrifugal : array_like (...), N
        Centrifugal force of the jaws.
    inside : bool, true or false
        True when the jaws press outwards in a bore; the gain by speed is not credited.

    Returns
    -------
    ndarray (...), N
        Static less centrifugal, not below zero.

    Raises
    ------
    ValueError
        A force negative.

    Examples
    --------
    >>> float(grip_left(45000.0, 18950.0))
    26050.0

    References
    ----------
    VDI 3106, eq. of the gripping force under speed; no credit for inside grip: model, on the safe side.
    """
    held, lost = not_negative("static grip", "N", static), not_negative("centrifugal force", "N", centrifugal)
    return np.asarray(held + 0.0 * lost if inside else np.maximum(held - lost, 0.0))


def permitted_speed(
    static: ArrayLike,
    effective: ArrayLike,
    jaw_mass: ArrayLike,
    jaw_radius: ArrayLike,
    jaws: ArrayLike = 3,
    safety: float = GRIP_SAFETY,
) -> Floats:
    """Speed at which an outside grip is down to what the cut needs.

    Parameters
    ----------
    static : array_like (...), N
        Total static gripping force F_sp0.
    effective : array_like (...), N
        Grip needed at speed F_sp.
    jaw_mass : array_like (...), kg
        Mass of one jaw.
    jaw_radius : array_like (...), mm
        Radius of its centre of mass.
    jaws : array_like (...), dimensionless
        Number of jaws.
    safety : float, dimensionless
        S_sp.

    Returns
    -------
    ndarray (...), rpm
        n = (30/pi) sqrt((F_sp0 / S_sp - F_sp) / sum m r); zero where the grip is too small at standstill.

    Raises
    ------
    ValueError
        A force negative, mass, radius, number or safety not above zero.

    Examples
    --------
    >>> round(float(permitted_speed(45000.0, 9000.0, 1.8, 70.0)))
    2251

    References
    ----------
    VDI 3106, permitted speed, as restated in chuck manuals (older restatements leave S_sp out).
    """
    spare = not_negative("static grip", "N", static) / positive("safety", "", safety) - not_negative(
        "effective grip", "N", effective
    )
    mass, radius = positive("jaw mass", "kg", jaw_mass), positive("jaw radius", "mm", jaw_radius)
    moment = positive("number of jaws", "", jaws) * mass * radius / 1000.0
    return np.asarray(30.0 / np.pi * np.sqrt(np.maximum(spare, 0.0) / moment))


def centrifugal_limit(static: ArrayLike) -> Floats:
    """Largest centrifugal force a chuck may be run to, 0.67 of its static grip.

    Parameters
    ----------
    static : array_like (...), N
        Total static gripping force.

    Returns
    -------
    ndarray (...), N
        Limit of F_c.

    Raises
    ------
    ValueError
        Grip negative.

    Examples
    --------
    >>> round(float(centrifugal_limit(30000.0)))
    20100

    References
    ----------
    EN 1550, F_c <= 0.67 F_sp0, as restated in a chuck manual.
    """
    return np.asarray(CENTRIFUGAL_SHARE * not_negative("static grip", "N", static))
