"""Kienzle's law of the specific cutting force, and its form for thin chips."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.chip import nose_angle, straight_length
from auditor.mechanics.validity import Floats, ValidRange, angle, between, not_negative, positive, ratio

CHIP_THICKNESS: Final = ValidRange(
    "uncut chip thickness", "mm", 0.1, 2.5, "Kienzle and Victor 1957; below 0.1 mm extrapolated (Horvath 2015)"
)
WIDTH_TO_THICKNESS: Final = ValidRange("b/h", "", 4.0, np.inf, "Horvath, Acta Polytechnica Hungarica 12(7), 2015")
EXPONENT: Final = ValidRange("mc", "", 0.05, 0.5, "common practice: outside it 1 - mc was printed or the row is wrong")
TANGENT_THICKNESS: Final = 0.1  # mm, where the edge-force form touches Kienzle's curve
_NODES, _WEIGHTS = np.polynomial.legendre.leggauss(24)


def specific_force(kc11: ArrayLike, mc: ArrayLike, h: ArrayLike) -> Floats:
    """Specific cutting force kc = kc1.1 h^(-mc).

    Parameters
    ----------
    kc11 : array_like (...), N/mm2
        Cutting force at h = b = 1 mm.
    mc : array_like (...), dimensionless
        Exponent of the rise towards thin chips (not 1 - mc).
    h : array_like (...), mm
        Uncut chip thickness; measured for 0.1 to 2.5 mm, see `CHIP_THICKNESS`.

    Returns
    -------
    ndarray (...), N/mm2
        kc; NaN where h is zero, for the law has no value there.

    Raises
    ------
    ValueError
        kc11 not above zero, mc not below 1, h negative.

    Examples
    --------
    >>> round(float(specific_force(1780.0, 0.17, 0.1)))
    2633

    References
    ----------
    Kienzle, VDI-Z 94 (1952) 299-305, eq. for ks; Kienzle and Victor, Werkstattstechnik und Maschinenbau 47
    (1957) 224-225.
    """
    k, m, h_ = _pair(kc11, mc, h)
    thickness = np.where(h_ == 0.0, np.nan, h_)
    return np.asarray(k * thickness ** (-m))


def cutting_force(kc11: ArrayLike, mc: ArrayLike, h: ArrayLike, b: ArrayLike) -> Floats:
    """Force of an edge of constant chip thickness, F = kc1.1 b h^(1-mc).

    Parameters
    ----------
    kc11 : array_like (...), N/mm2
        Force at h = b = 1 mm; also kf1.1, kp1.1 or a thrust constant of the same form.
    mc : array_like (...), dimensionless
        Exponent (not 1 - mc). Thrust exponents above 1 are known and allowed.
    h : array_like (...), mm
        Uncut chip thickness; measured for 0.1 to 2.5 mm, see `CHIP_THICKNESS`.
    b : array_like (...), mm
        Engaged edge length.

    Returns
    -------
    ndarray (...), N
        Force, zero where h or b is zero.

    Raises
    ------
    ValueError
        kc11 not above zero, h or b negative.

    Examples
    --------
    >>> round(float(cutting_force(2130.0, 0.18, 0.4, 4.0)))
    4019

    References
    ----------
    Kienzle, VDI-Z 94 (1952) 299-305; Koenig and Essel, Spezifische Schnittkraftwerte, 1973 (same form for feed and
    passive force).
    """
    k = positive("kc1.1", "N/mm2", kc11)
    m = between("mc", "", mc, -3.0, 3.0)
    h_ = not_negative("chip thickness", "mm", h)
    b_ = not_negative("edge length", "mm", b)
    thickness = np.where(h_ == 0.0, np.nan, h_)
    return np.asarray(np.where((h_ == 0.0) | (b_ == 0.0), 0.0, k * b_ * thickness ** (1.0 - m)))


def edge_force_coefficients(kc11: ArrayLike, mc: ArrayLike, tangent_thickness: float = 0.1) -> tuple[Floats, Floats]:
    """Straight line through Kienzle's curve: cutting and edge coefficient of F = Kt b h + Ke b.

    Parameters
    ----------
    kc11 : array_like (...), N/mm2
        Force at h = b = 1 mm.
    mc : array_like (...), dimensionless
        Exponent (not 1 - mc).
    tangent_thickness : float, mm
        Chip thickness h0 where the line touches the curve.

    Returns
    -------
    tuple of ndarray (...), N/mm2 and N/mm
        Kt = (1 - mc) kc1.1 h0^(-mc) and Ke = mc kc1.1 h0^(1-mc).

    Raises
    ------
    ValueError
        kc11 or tangent thickness not above zero.

    Examples
    --------
    >>> kt, ke = edge_force_coefficients(1659.0, 0.21)
    >>> round(float(kt)), round(float(ke), 1)
    (2126, 56.5)

    References
    ----------
    Altintas, Manufacturing Automation, linear edge-force model, ch. 2 (shearing and edge coefficients); tangent to
    the Kienzle curve: algebra.
    """
    k = positive("kc1.1", "N/mm2", kc11)
    m = between("mc", "", mc, -3.0, 3.0)
    h0 = positive("tangent thickness", "mm", tangent_thickness)
    return np.asarray((1.0 - m) * k * h0 ** (-m)), np.asarray(m * k * h0 ** (1.0 - m))


def edge_form_force(kc11: ArrayLike, mc: ArrayLike, h: ArrayLike, b: ArrayLike) -> Floats:
    """Kienzle's force down to h = 0.1 mm and its tangent, with an edge force, below.

    Parameters
    ----------
    kc11 : array_like (...), N/mm2
        Force at h = b = 1 mm.
    mc : array_like (...), dimensionless
        Exponent (not 1 - mc).
    h : array_like (...), mm
        Uncut chip thickness; 0 leaves the edge force alone.
    b : array_like (...), mm
        Engaged edge length.

    Returns
    -------
    ndarray (...), N
        Force; continuous, with continuous slope, at 0.1 mm.

    Raises
    ------
    ValueError
        kc11 not above zero, h or b negative.

    Examples
    --------
    >>> round(float(edge_form_force(1659.0, 0.21, 0.02, 1.0)), 1)
    99.0

    References
    ----------
    Altintas, Manufacturing Automation, linear edge-force model, ch. 2. Range 0 to 0.1 mm for the line, see
    `CHIP_THICKNESS` for the curve. Model: the joint at 0.1 mm is ours.
    """
    h_ = not_negative("chip thickness", "mm", h)
    b_ = not_negative("edge length", "mm", b)
    kt, ke = edge_force_coefficients(kc11, mc, TANGENT_THICKNESS)
    return np.asarray(np.where(h_ < TANGENT_THICKNESS, b_ * (kt * h_ + ke), cutting_force(kc11, mc, h_, b_)))


def nose_cutting_force(
    kc11: ArrayLike, mc: ArrayLike, depth: ArrayLike, feed: ArrayLike, nose_radius: ArrayLike, edge_angle: ArrayLike
) -> Floats:
    """Kienzle's law integrated along a rounded corner and the straight edge behind it.

    F = kc1.1 [ f^(1-mc) r int_0^theta2 sin^(1-mc) theta dtheta + b_s (f sin kappa_r)^(1-mc) ]

    Parameters
    ----------
    kc11 : array_like (...), N/mm2
        Force at h = b = 1 mm.
    mc : array_like (...), dimensionless
        Exponent (not 1 - mc), below 1.
    depth : array_like (...), mm
        Depth of cut across the feed.
    feed : array_like (...), mm/rev
        Feed.
    nose_radius : array_like (...), mm
        Corner radius; 0 is a sharp corner.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r of the main edge, 0 to 180.

    Returns
    -------
    ndarray (...), N
        Cutting force with all factors 1.

    Raises
    ------
    ValueError
        A length negative, kc11 not above zero, mc not below 1, kappa_r outside 0 to 180 degrees.

    Examples
    --------
    >>> round(float(nose_cutting_force(1659.0, 0.21, 1.0, 0.2, 0.8, 95.0)), 1)
    491.7

    References
    ----------
    Kienzle 1952 for the law; slice model h = f sin theta along the corner: geometry, valid for feed below about
    half the corner radius.
    """
    f = not_negative("feed", "mm/rev", feed)
    r = not_negative("nose radius", "mm", nose_radius)
    k, m, _ = _pair(kc11, mc, f)
    kappa = angle("cutting edge angle", edge_angle, 0.0, 180.0)
    theta2 = np.radians(nose_angle(depth, r, edge_angle))
    # theta = theta2 u^2 takes the root-like start of sin^(1-mc) out of the integrand
    u = 0.5 * (_NODES + 1.0)
    theta = theta2[..., np.newaxis] * u**2
    slices = np.sin(theta) ** (1.0 - m[..., np.newaxis]) * 2.0 * theta2[..., np.newaxis] * u
    corner = f ** (1.0 - m) * r * (slices @ (0.5 * _WEIGHTS))
    straight = straight_length(depth, r, edge_angle) * (f * np.sin(kappa)) ** (1.0 - m)
    return np.asarray(k * (corner + straight))


def coefficient_from_force(mc: ArrayLike, h: ArrayLike, force: ArrayLike, b: ArrayLike) -> Floats:
    """kc1.1 that makes Kienzle's law meet a measured force at a given exponent.

    Parameters
    ----------
    mc : array_like (...), dimensionless
        Exponent (not 1 - mc), below 1.
    h : array_like (...), mm
        Uncut chip thickness of the measurement, see `CHIP_THICKNESS`.
    force : array_like (...), N
        Measured cutting force.
    b : array_like (...), mm
        Engaged edge length.

    Returns
    -------
    ndarray (...), N/mm2
        kc1.1; NaN where b or h is zero.

    Raises
    ------
    ValueError
        A force or length negative, mc not below 1.

    Examples
    --------
    >>> round(float(coefficient_from_force(0.259, 0.1, 65.0, 1.0)))
    358

    References
    ----------
    Kienzle, VDI-Z 94 (1952) 299-305, solved for the constant.
    """
    force_ = not_negative("force", "N", force)
    return ratio(force_, cutting_force(1.0, mc, h, b))


def _pair(kc11: ArrayLike, mc: ArrayLike, h: ArrayLike) -> tuple[Floats, Floats, Floats]:
    k = positive("kc1.1", "N/mm2", kc11)
    m = between("mc", "", mc, -1.0, 1.0)
    return k, m, not_negative("chip thickness", "mm", h)
