"""Clearance: what the pocket leaves, what feed, height and a bore take away."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, angle, finite, not_negative, positive

WORKING_CLEARANCE: Final = ValidRange(
    "working clearance", "deg", 3.0, 30.0, "common practice: 3 finishing, 4 general, 10 for soft and elastic work"
)
HEIGHT_ERROR: Final = ValidRange("height error", "mm", -0.1, 0.1, "common practice; 0.05 below 6 mm diameter")


def normal_clearance(insert_clearance: ArrayLike, normal_pocket_rake: ArrayLike) -> Floats:
    """Normal clearance of an insert in its pocket, a_n = letter - g_n.

    Parameters
    ----------
    insert_clearance : array_like (...), deg
        Clearance of the insert itself (ISO 1832, second letter).
    normal_pocket_rake : array_like (...), deg
        Normal rake the pocket gives a flat insert; a negative pocket buys clearance.

    Returns
    -------
    ndarray (...), deg
        Zero or less means the flank rubs.

    Raises
    ------
    ValueError
        An angle infinite.

    Examples
    --------
    >>> round(float(normal_clearance(0.0, -5.967)), 3)
    5.967

    References
    ----------
    ISO 3002-1 (1982): clearance, wedge and rake of one plane add up to 90 degrees.
    """
    return np.asarray(
        finite("insert clearance", "deg", insert_clearance) - finite("pocket rake", "deg", normal_pocket_rake)
    )


def orthogonal_clearance(normal: ArrayLike, inclination: ArrayLike) -> Floats:
    """Orthogonal clearance from normal clearance and inclination, tan ao = tan an cos ls.

    Parameters
    ----------
    normal : array_like (...), deg
        Normal clearance.
    inclination : array_like (...), deg
        Inclination lambda_s.

    Returns
    -------
    ndarray (...), deg
        alpha_o.

    Raises
    ------
    ValueError
        An angle not between -90 and 90 degrees.

    Examples
    --------
    >>> round(float(orthogonal_clearance(5.967, -6.0)), 3)
    5.935

    References
    ----------
    ISO 3002-1 (1982), conversion equations of tool angles, from memory.
    """
    an, ls = angle("normal clearance", normal), angle("inclination", inclination)
    return np.asarray(np.degrees(np.arctan(np.tan(an) * np.cos(ls))))


def side_clearance(orthogonal: ArrayLike, inclination: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Side clearance (working plane), cot af = cot ao sin kr - tan ls cos kr.

    Parameters
    ----------
    orthogonal : array_like (...), deg
        Orthogonal clearance, 0 to 90.
    inclination : array_like (...), deg
        Inclination lambda_s.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180.

    Returns
    -------
    ndarray (...), deg
        alpha_f, 0 to 180.

    Raises
    ------
    ValueError
        Clearance not between 0 and 90, inclination not between -90 and 90, kappa_r not between 0 and 180 degrees.

    Examples
    --------
    >>> round(float(side_clearance(5.935, -6.0, 95.0)), 2)
    5.96

    References
    ----------
    ISO 3002-1 (1982), conversion equations of tool angles, from memory.
    """
    return _clearance_in(orthogonal, inclination, edge_angle, back=False)


def back_clearance(orthogonal: ArrayLike, inclination: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Back clearance (back plane), cot ap = cot ao cos kr + tan ls sin kr.

    Parameters
    ----------
    orthogonal : array_like (...), deg
        Orthogonal clearance, 0 to 90.
    inclination : array_like (...), deg
        Inclination lambda_s.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180.

    Returns
    -------
    ndarray (...), deg
        alpha_p, 0 to 180.

    Raises
    ------
    ValueError
        Clearance not between 0 and 90, inclination not between -90 and 90, kappa_r not between 0 and 180 degrees.

    Examples
    --------
    >>> round(float(back_clearance(6.0, 0.0, 45.0)), 2)
    8.45

    References
    ----------
    ISO 3002-1 (1982), conversion equations of tool angles, from memory.
    """
    return _clearance_in(orthogonal, inclination, edge_angle, back=True)


def feed_angle(feed: ArrayLike, diameter: ArrayLike) -> Floats:
    """Turn of the cutting direction by the feed, tan eta = f / (pi d).

    The main edge loses that much clearance in the working plane and gains it as rake; a thread's lead counts as feed.

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed, or lead of a thread.
    diameter : array_like (...), mm
        Diameter at the edge; at the axis the angle is 90 degrees.

    Returns
    -------
    ndarray (...), deg
        eta.

    Raises
    ------
    ValueError
        Feed or diameter negative.

    Examples
    --------
    >>> round(float(feed_angle(0.1, 1.0)), 3)
    1.823

    References
    ----------
    ISO 3002-1 (1982), resultant cutting direction, from memory.
    """
    f, d = not_negative("feed", "mm/rev", feed), not_negative("diameter", "mm", diameter)
    return np.asarray(np.degrees(np.arctan2(f, np.pi * d)))


def vanishing_diameter(feed: ArrayLike, clearance: ArrayLike) -> Floats:
    """Diameter at which facing or parting has used up the clearance, d = f / (pi tan a).

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed towards the axis.
    clearance : array_like (...), deg
        Clearance in the working plane, above 0.

    Returns
    -------
    ndarray (...), mm
        Below this diameter the flank rubs.

    Raises
    ------
    ValueError
        Feed negative, clearance not between 0 and 90 degrees.

    Examples
    --------
    >>> round(float(vanishing_diameter(0.1, 7.0)), 4)
    0.2592

    References
    ----------
    ISO 3002-1 (1982), resultant cutting direction, `feed_angle` solved for the diameter.
    """
    return np.asarray(not_negative("feed", "mm/rev", feed) / (np.pi * np.tan(angle("clearance", clearance, 0.0))))


def height_angle(height: ArrayLike, diameter: ArrayLike) -> Floats:
    """Angle by which an edge off centre height sees the cutting direction turned, asin(2 e / d).

    Parameters
    ----------
    height : array_like (...), mm
        Height of the edge above (+) or below (-) the spindle axis.
    diameter : array_like (...), mm
        Diameter at the edge; where 2|e| reaches it the angle is held at 90 degrees.

    Returns
    -------
    ndarray (...), deg
        theta, with the sign of the height.

    Raises
    ------
    ValueError
        Diameter negative.

    Examples
    --------
    >>> round(float(height_angle(0.1, 10.0)), 3)
    1.146

    References
    ----------
    Plane geometry normal to the spindle axis, eq. sin theta = 2 e / d; accepted range of the height, see
    `HEIGHT_ERROR`.
    """
    e, d = finite("height error", "mm", height), not_negative("diameter", "mm", diameter)
    reaches = 2.0 * np.abs(e) >= d
    safe = np.where(d == 0.0, 1.0, d)
    sine = np.where(reaches, np.sign(e), np.clip(2.0 * e / safe, -1.0, 1.0))
    return np.asarray(np.degrees(np.arcsin(np.where(np.isnan(d), np.nan, sine))))


def height_effect(height: ArrayLike, diameter: ArrayLike, internal: bool = False) -> tuple[Floats, Floats]:
    """Change of rake and of clearance by an edge off centre height.

    Parameters
    ----------
    height : array_like (...), mm
        Height of the edge above (+) or below (-) the spindle axis.
    diameter : array_like (...), mm
        Diameter at the edge.
    internal : bool, true or false
        True inside a bore, where the signs turn round.

    Returns
    -------
    tuple of ndarray (...), deg and deg
        What is added to the rake and to the clearance, in the plane normal to the spindle axis.

    Raises
    ------
    ValueError
        Diameter negative.

    Examples
    --------
    >>> rake, clearance = height_effect(0.2, 6.0)
    >>> round(float(rake), 3), round(float(clearance), 3)
    (3.823, -3.823)

    References
    ----------
    Plane geometry normal to the spindle axis (back plane of a longitudinal tool in the terms of ISO 3002-1).
    """
    theta = height_angle(height, diameter)
    return (-theta, theta) if internal else (theta, -theta)


def height_radius_error(set_radius: ArrayLike, height: ArrayLike) -> Floats:
    """Radius cut too large by an edge off centre height, sqrt(r^2 + e^2) - r.

    Parameters
    ----------
    set_radius : array_like (...), mm
        Radius the tool is set to.
    height : array_like (...), mm
        Height of the edge above or below the spindle axis.

    Returns
    -------
    ndarray (...), mm
        Error of the radius.

    Raises
    ------
    ValueError
        Radius negative.

    Examples
    --------
    >>> round(float(height_radius_error(5.0, 0.3)), 5)
    0.00899

    References
    ----------
    Pythagoras, eq. r_act^2 = r^2 + e^2.
    """
    r = not_negative("radius", "mm", set_radius)
    return np.asarray(np.hypot(r, finite("height error", "mm", height)) - r)


def bore_heel_clearance(bore_radius: ArrayLike, heel: ArrayLike) -> Floats:
    """Clearance an insert needs so that its heel clears the bore, tan a = (R - sqrt(R^2 - v^2)) / v.

    Parameters
    ----------
    bore_radius : array_like (...), mm
        Radius of the bore at the edge.
    heel : array_like (...), mm
        Height v of the flank below the edge, below the bore radius.

    Returns
    -------
    ndarray (...), deg
        Smallest clearance.

    Raises
    ------
    ValueError
        Bore radius or heel not above zero, heel beyond the bore radius.

    Examples
    --------
    >>> round(float(bore_heel_clearance(10.0, 3.0)), 2)
    8.73

    References
    ----------
    Plane geometry of a chord in a circle, eq. of the sagitta.
    """
    radius, v = positive("bore radius", "mm", bore_radius), positive("heel height", "mm", heel)
    if np.any(v > radius):
        raise ValueError("the heel must not be higher than the bore radius")
    return np.asarray(np.degrees(np.arctan2(radius - np.sqrt(radius**2 - v**2), v)))


def _clearance_in(orthogonal: ArrayLike, inclination: ArrayLike, edge_angle: ArrayLike, *, back: bool) -> Floats:
    ao, ls = angle("orthogonal clearance", orthogonal, 0.0), angle("inclination", inclination)
    kr = angle("cutting edge angle", edge_angle, 0.0, 180.0)
    along = np.cos(kr) if back else np.sin(kr)
    across = np.sin(kr) if back else -np.cos(kr)
    cotangent = along / np.tan(ao) + np.tan(ls) * across
    return np.asarray(np.degrees(np.arctan2(1.0, cotangent)))
