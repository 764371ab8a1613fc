"""Thrust in the reference plane, at right angles to the engaged edge, and its feed and passive components.

Three sources for the thrust Fn: a declared Kienzle pair, the catalogue's feed and passive pairs, or the friction
angle at the rake face. Then `bounded_thrust` and `resolve_thrust`.
"""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.kienzle import cutting_force, edge_form_force
from auditor.mechanics.validity import Floats, ValidRange, finite, not_negative

RAKE_SLOPE: Final = 4.5  # % of the thrust per degree: mean of 5 on Ff and 4 on Fp (Klocke, from memory)
FRICTION_SLOPE: Final = 0.3  # deg of friction angle per degree of rake
THRUST_RATIO: Final = ValidRange("Fn/Fc", "", 0.35, 2.0, "model: ratios of the Koenig and Essel set, and of light cuts")
INCLINATION_FACTOR: Final = ValidRange("inclination factor", "", 0.6, 1.8, "model: Klocke's 10 %/deg held")


def thrust_rake_factor(effective_rake: ArrayLike, reference_rake: ArrayLike) -> Floats:
    """Rake factor of the thrust, 1 - 4.5 (g_eff - g_ref) / 100, never below zero.

    Parameters
    ----------
    effective_rake : array_like (...), deg
        Rake the chip meets.
    reference_rake : array_like (...), deg
        Rake at which the thrust constants were measured.

    Returns
    -------
    ndarray (...), dimensionless
        Factor; zero from 22 degrees above the reference on, where the bound on Fn/Fc takes over.

    Raises
    ------
    ValueError
        A rake infinite.

    Examples
    --------
    >>> round(float(thrust_rake_factor(-6.0, 6.0)), 2)
    1.54

    References
    ----------
    Klocke, Fertigungsverfahren 1, table of corrections: feed force (5 %/deg) and passive force (4 %/deg), from memory.
    """
    g, reference = finite("effective rake", "deg", effective_rake), finite("reference rake", "deg", reference_rake)
    return np.asarray(np.maximum(1.0 - RAKE_SLOPE * (g - reference) / 100.0, 0.0))


def pair_thrust(
    kn11: ArrayLike,
    mn: ArrayLike,
    h: ArrayLike,
    b: ArrayLike,
    effective_rake: ArrayLike,
    reference_rake: ArrayLike,
) -> Floats:
    """Thrust from a declared pair of Kienzle's form, Fn = kn1.1 b h^(1-mn) K_g.

    Parameters
    ----------
    kn11 : array_like (...), N/mm2
        Thrust at h = b = 1 mm.
    mn : array_like (...), dimensionless
        Its exponent (not 1 - mn).
    h : array_like (...), mm
        Mean chip thickness; the pair is used as it stands at every thickness.
    b : array_like (...), mm
        Engaged edge length.
    effective_rake : array_like (...), deg
        Rake the chip meets.
    reference_rake : array_like (...), deg
        Rake at which the pair was measured.

    Returns
    -------
    ndarray (...), N
        Fn before speed, operation and tool factors.

    Raises
    ------
    ValueError
        kn11 not above zero, h or b negative.

    Examples
    --------
    >>> round(float(pair_thrust(900.0, 0.4, 0.2, 1.0, 6.0, 6.0)), 1)
    342.7

    References
    ----------
    Kienzle and Victor, Werkstattstechnik und Maschinenbau 47 (1957) 224-225 (same form for all components); rake as
    in `thrust_rake_factor`.
    """
    return np.asarray(cutting_force(kn11, mn, h, b) * thrust_rake_factor(effective_rake, reference_rake))


def resultant_thrust(
    kf11: ArrayLike,
    mf: ArrayLike,
    kp11: ArrayLike,
    mp: ArrayLike,
    h: ArrayLike,
    b: ArrayLike,
    effective_rake: ArrayLike,
    reference_rake: ArrayLike,
) -> Floats:
    """Thrust as the in-plane resultant of the catalogue's feed and passive pairs.

    The pairs hold the edge angle and corner of their own tests, so only their resultant is carried over to another
    tool. Below 0.1 mm each pair is replaced by its tangent with an edge force, for the powers go astray there.

    Parameters
    ----------
    kf11 : array_like (...), N/mm2
        Feed force at h = b = 1 mm.
    mf : array_like (...), dimensionless
        Its exponent (not 1 - mf).
    kp11 : array_like (...), N/mm2
        Passive force at h = b = 1 mm.
    mp : array_like (...), dimensionless
        Its exponent (not 1 - mp).
    h : array_like (...), mm
        Mean chip thickness; measured 0.1 to 0.8 mm.
    b : array_like (...), mm
        Engaged edge length.
    effective_rake : array_like (...), deg
        Rake the chip meets.
    reference_rake : array_like (...), deg
        Rake at which the pairs were measured.

    Returns
    -------
    ndarray (...), N
        Fn before speed, operation and tool factors.

    Raises
    ------
    ValueError
        A constant not above zero, h or b negative.

    Examples
    --------
    >>> round(float(resultant_thrust(521.0, 0.49, 309.0, 0.40, 0.2, 1.0, 6.0, 6.0)), 1)
    257.7

    References
    ----------
    Koenig and Essel, Spezifische Schnittkraftwerte, 1973, as reprinted by Klocke (pairs; kappa_r 70, r 0.8, ap 3);
    resultant, rake slope and edge-force form below 0.1 mm: model, see `auditor.mechanics.kienzle.edge_form_force`.
    """
    feed, passive = edge_form_force(kf11, mf, h, b), edge_form_force(kp11, mp, h, b)
    return np.asarray(np.hypot(feed, passive) * thrust_rake_factor(effective_rake, reference_rake))


def friction_angle(reference_angle: ArrayLike, effective_rake: ArrayLike, reference_rake: ArrayLike) -> Floats:
    """Apparent friction angle at the rake face, beta = beta_ref + 0.3 (g_eff - g_ref).

    Parameters
    ----------
    reference_angle : array_like (...), deg
        beta_ref at the reference rake: steel 32, stainless 33, cast iron 27, aluminium 32, titanium 22, copper and
        brass 28, all within about 6.
    effective_rake : array_like (...), deg
        Rake the chip meets.
    reference_rake : array_like (...), deg
        Reference rake.

    Returns
    -------
    ndarray (...), deg
        beta.

    Raises
    ------
    ValueError
        An angle infinite.

    Examples
    --------
    >>> round(float(friction_angle(32.0, -6.0, 6.0)), 1)
    28.4

    References
    ----------
    Slope: Budak, Altintas and Armarego, ASME J. Eng. Ind. 118 (1996), 0.29 for Ti-6Al-4V; levels: model.
    """
    beta = finite("friction angle", "deg", reference_angle)
    g, reference = finite("effective rake", "deg", effective_rake), finite("reference rake", "deg", reference_rake)
    return np.asarray(beta + FRICTION_SLOPE * (g - reference))


def friction_thrust(
    Fc: ArrayLike, reference_angle: ArrayLike, effective_rake: ArrayLike, reference_rake: ArrayLike
) -> Floats:
    """Thrust from the cutting force and the friction angle, Fn = Fc tan(beta - g_eff).

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force, all its factors in it.
    reference_angle : array_like (...), deg
        Friction angle at the reference rake, see `friction_angle`.
    effective_rake : array_like (...), deg
        Rake the chip meets.
    reference_rake : array_like (...), deg
        Reference rake.

    Returns
    -------
    ndarray (...), N
        Fn, already within the bounds of `THRUST_RATIO` (beyond them the tangent runs away).

    Raises
    ------
    ValueError
        Cutting force negative, an angle infinite.

    Examples
    --------
    >>> round(float(friction_thrust(1000.0, 32.0, 6.0, 6.0)), 1)
    487.7

    References
    ----------
    Merchant, J. Appl. Phys. 16 (1945) 267, force circle; slope of the friction angle as in `friction_angle`.
    """
    force = not_negative("cutting force", "N", Fc)
    beta = friction_angle(reference_angle, effective_rake, reference_rake)
    lean = np.clip(
        beta - finite("effective rake", "deg", effective_rake),
        np.degrees(np.arctan(THRUST_RATIO.low)),
        np.degrees(np.arctan(THRUST_RATIO.high)),
    )
    return np.asarray(force * np.tan(np.radians(lean)))


def bounded_thrust(Fn: ArrayLike, Fc: ArrayLike) -> Floats:
    """Thrust held between 0.35 and 2 times the cutting force.

    Parameters
    ----------
    Fn : array_like (...), N
        Thrust in the reference plane.
    Fc : array_like (...), N
        Cutting force of the same stretch.

    Returns
    -------
    ndarray (...), N
        Fn within 0.35 Fc and 2 Fc.

    Raises
    ------
    ValueError
        A force negative.

    Examples
    --------
    >>> bounded_thrust([100.0, 500.0, 5000.0], 1000.0).tolist()
    [350.0, 500.0, 2000.0]

    References
    ----------
    Model: bounds around the 0.35 to 0.60 of Koenig and Essel 1973 at h 0.2 and the ratios of very light cuts.
    """
    thrust, force = not_negative("thrust", "N", Fn), not_negative("cutting force", "N", Fc)
    return np.asarray(np.clip(thrust, THRUST_RATIO.low * force, THRUST_RATIO.high * force))


def inclination_factor(inclination: ArrayLike) -> Floats:
    """Factor of the passive force for a known inclination, 1 - 0.10 lambda_s.

    Parameters
    ----------
    inclination : array_like (...), deg
        lambda_s, ISO sign: negative (corner lowest) pushes the work away.

    Returns
    -------
    ndarray (...), dimensionless
        Factor, held within 0.6 and 1.8.

    Raises
    ------
    ValueError
        Inclination infinite.

    Examples
    --------
    >>> inclination_factor([-6.0, 0.0, 5.0]).round(2).tolist()
    [1.6, 1.0, 0.6]

    References
    ----------
    Klocke, Fertigungsverfahren 1, 10 %/deg on the passive force, from memory; limits: model.
    """
    line = 1.0 - 0.10 * finite("inclination", "deg", inclination)
    return np.asarray(np.clip(line, INCLINATION_FACTOR.low, INCLINATION_FACTOR.high))


def resolve_thrust(Fn: ArrayLike, chord_angle: ArrayLike) -> tuple[Floats, Floats]:
    """Feed and passive force of a thrust at right angles to the chord of the engaged edge.

    Parameters
    ----------
    Fn : array_like (...), N
        Thrust in the reference plane.
    chord_angle : array_like (...), deg
        Angle kappa_eq between feed and chord.

    Returns
    -------
    tuple of ndarray (...), N and N
        Ff = Fn sin kappa_eq against the feed, Fp = Fn cos kappa_eq off the finished surface.

    Raises
    ------
    ValueError
        Thrust negative, angle infinite.

    Examples
    --------
    >>> ff, fp = resolve_thrust(500.0, 48.29)
    >>> round(float(ff), 1), round(float(fp), 1)
    (373.3, 332.7)

    References
    ----------
    Colwell, Transactions of the ASME 76 (1954) 199; components: ISO 3002-4 (1984).
    """
    thrust = not_negative("thrust", "N", Fn)
    kappa = np.radians(finite("chord angle", "deg", chord_angle))
    return np.asarray(thrust * np.sin(kappa)), np.asarray(thrust * np.cos(kappa))
