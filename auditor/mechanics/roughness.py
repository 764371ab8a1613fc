"""The surface a turning tool leaves: kinematic roughness, exactly, and what practice adds to it."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, angle, not_negative, positive

FEED_TO_RADIUS: Final = ValidRange("feed / nose radius", "", 0.0, 2.0, "geometry: beyond, arcs do not meet")


def arc_limit_feed(nose_radius: ArrayLike, minor_angle: ArrayLike) -> Floats:
    """Largest feed at which the rounded corner alone leaves the surface, 2 r sin kr'.

    Parameters
    ----------
    nose_radius : array_like (...), mm
        Corner radius.
    minor_angle : array_like (...), deg
        Angle kr' between the trailing edge and the surface.

    Returns
    -------
    ndarray (...), mm/rev
        Beyond this feed the straight trailing edge takes part.

    Raises
    ------
    ValueError
        Radius negative, kr' not between 0 and 180 degrees.

    Examples
    --------
    >>> round(float(arc_limit_feed(0.8, 5.0)), 4)
    0.1394

    References
    ----------
    Qu and Shih, Machining Science and Technology 7 (2003) 281-294, tool geometry cases.
    """
    k = np.minimum(angle("minor edge angle", minor_angle, 0.0, 180.0), np.pi / 2.0)
    return np.asarray(2.0 * not_negative("nose radius", "mm", nose_radius) * np.sin(k))


def peak_to_valley(feed: ArrayLike, nose_radius: ArrayLike, edge_angle: ArrayLike, minor_angle: ArrayLike) -> Floats:
    """Kinematic roughness depth Rt of arc, trailing edge and main edge, each where it takes part.

    Arc alone: r - sqrt(r^2 - f^2/4). Arc and trailing edge: (1 - cos k) r + f sin k cos k - sqrt(2 f r sin^3 k -
    f^2 sin^4 k), k = kr'. Both straight edges: (f - r tan(kr/2) - r tan(kr'/2)) / (cot kr + cot kr'), which for a sharp
    corner is f / (cot kr + cot kr').

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed.
    nose_radius : array_like (...), mm
        Corner radius; 0 is a sharp corner.
    edge_angle : array_like (...), deg
        Cutting edge angle of the leading edge against the surface, 0 to 180.
    minor_angle : array_like (...), deg
        Angle of the trailing edge against the surface, above 0; edge angle and this less than 180 together.

    Returns
    -------
    ndarray (...), um
        Rt, for a depth of cut of at least Rt.

    Raises
    ------
    ValueError
        Feed or radius negative, an angle outside its bounds.

    Examples
    --------
    >>> round(float(peak_to_valley(0.2, 0.8, 95.0, 32.0)), 3)
    6.275

    References
    ----------
    Qu and Shih, Machining Science and Technology 7 (2003) 281-294; Ghosh and Mallik, Manufacturing Science, problem
    4.24 (sharp corner).
    """
    f, r, kr, kn = _tool(feed, nose_radius, edge_angle, minor_angle)
    return np.asarray(1000.0 * _cusp(f, r, kr, kn))


def average_roughness(feed: ArrayLike, nose_radius: ArrayLike, edge_angle: ArrayLike, minor_angle: ArrayLike) -> Floats:
    """Kinematic average roughness Ra of the exact profile (no parabola), about the profile's mean line.

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed.
    nose_radius : array_like (...), mm
        Corner radius; 0 is a sharp corner.
    edge_angle : array_like (...), deg
        Cutting edge angle of the leading edge against the surface, 0 to 180.
    minor_angle : array_like (...), deg
        Angle of the trailing edge against the surface, above 0.

    Returns
    -------
    ndarray (...), um
        Ra, Rt/4 for a sharp corner, about f^2/(18 sqrt(3) r) for an arc.

    Raises
    ------
    ValueError
        Feed or radius negative, an angle outside its bounds.

    Examples
    --------
    >>> round(float(average_roughness(0.2, 0.8, 95.0, 32.0)), 3)
    1.609

    References
    ----------
    ISO 4287 (definition of Ra) on the profile of Qu and Shih, Machining Science and Technology 7 (2003) 281-294.
    """
    f, r, kr, kn = _tool(feed, nose_radius, edge_angle, minor_angle)
    top = _cusp(f, r, kr, kn)
    pitch = np.where(f == 0.0, 1.0, f)
    mean = top - (_groove_area(top, r, kr) + _groove_area(top, r, kn)) / pitch
    below = _groove_area(mean, r, kr) + _groove_area(mean, r, kn)
    return np.asarray(1000.0 * 2.0 * below / pitch)


def parabola_peak(feed: ArrayLike, nose_radius: ArrayLike) -> Floats:
    """Workshop rule for the roughness depth of a rounded corner, Rt = f^2 / (8 r).

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed.
    nose_radius : array_like (...), mm
        Corner radius.

    Returns
    -------
    ndarray (...), um
        Rt, within 1.6 % for a feed below half the radius.

    Raises
    ------
    ValueError
        Feed negative, radius not above zero.

    Examples
    --------
    >>> round(float(parabola_peak(0.2, 0.8)), 3)
    6.25

    References
    ----------
    Ghosh and Mallik, Manufacturing Science, problem 4.24 and example 4.31; error bound: Qu and Shih 2003.
    """
    f, r = not_negative("feed", "mm/rev", feed), positive("nose radius", "mm", nose_radius)
    return np.asarray(1000.0 * f**2 / (8.0 * r))


def parabola_average(feed: ArrayLike, nose_radius: ArrayLike) -> Floats:
    """Average roughness of parabolic cusps, Ra = f^2 / (18 sqrt(3) r).

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed.
    nose_radius : array_like (...), mm
        Corner radius.

    Returns
    -------
    ndarray (...), um
        Ra.

    Raises
    ------
    ValueError
        Feed negative, radius not above zero.

    Examples
    --------
    >>> round(float(parabola_average(0.2, 0.8)), 3)
    1.604

    References
    ----------
    Qu and Shih, Machining Science and Technology 7 (2003) 281-294, parabolic approximation.
    """
    f, r = not_negative("feed", "mm/rev", feed), positive("nose radius", "mm", nose_radius)
    return np.asarray(1000.0 * f**2 / (18.0 * np.sqrt(3.0) * r))


def rule_average(feed: ArrayLike, nose_radius: ArrayLike) -> Floats:
    """Textbook rule for the ideal average roughness, Ra = f^2 / (32 r).

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed.
    nose_radius : array_like (...), mm
        Corner radius.

    Returns
    -------
    ndarray (...), um
        Ra.

    Raises
    ------
    ValueError
        Feed negative, radius not above zero.

    Examples
    --------
    >>> round(float(rule_average(0.25, 1.2)), 3)
    1.628

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 23, example 23.2.
    """
    f, r = not_negative("feed", "mm/rev", feed), positive("nose radius", "mm", nose_radius)
    return np.asarray(1000.0 * f**2 / (32.0 * r))


def real_to_ideal(vc: ArrayLike, free_cutting: bool = False) -> Floats:
    """Real over ideal roughness at a cutting speed.

    Parameters
    ----------
    vc : array_like (...), m/min
        Cutting speed.
    free_cutting : bool, true or false
        True for free-cutting work, false for ductile metal.

    Returns
    -------
    ndarray (...), dimensionless
        Ductile: 2 up to 50 m/min (built-up edge), 1.25 at 100, 1.1 from 150 on; free-cutting 1.5, 1.1 and 1.0.

    Raises
    ------
    ValueError
        Speed negative.

    Examples
    --------
    >>> float(real_to_ideal(100.0))
    1.25

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 23, figure of actual to theoretical roughness (1.25 at 100 m/min,
    ductile); ends of the lines: Ghosh and Mallik, peak at 30 to 50 m/min, and common practice. Straight lines: model.
    """
    v = not_negative("cutting speed", "m/min", vc)
    return np.asarray(np.interp(v, [50.0, 100.0, 150.0], [1.5, 1.1, 1.0] if free_cutting else [2.0, 1.25, 1.1]))


def brammertz_peak(feed: ArrayLike, nose_radius: ArrayLike, minimum_chip: ArrayLike) -> Floats:
    """Roughness depth with the ridge a minimum chip leaves, f^2/(8 r) + (h_min/2)(1 + r h_min / f^2).

    Parameters
    ----------
    feed : array_like (...), mm/rev
        Feed, above zero.
    nose_radius : array_like (...), mm
        Corner radius.
    minimum_chip : array_like (...), mm
        Minimum chip thickness.

    Returns
    -------
    ndarray (...), um
        Rt; smallest near f = sqrt(2 r h_min), a lower feed makes the surface rougher.

    Raises
    ------
    ValueError
        Feed or radius not above zero, minimum chip negative.

    Examples
    --------
    >>> round(float(brammertz_peak(0.1, 0.8, 0.01)), 2)
    10.56

    References
    ----------
    Brammertz, Industrie-Anzeiger 83 (1961), from memory.
    """
    f, r = positive("feed", "mm/rev", feed), positive("nose radius", "mm", nose_radius)
    h = not_negative("minimum chip thickness", "mm", minimum_chip)
    return np.asarray(1000.0 * (f**2 / (8.0 * r) + 0.5 * h * (1.0 + r * h / f**2)))


def _tool(
    feed: ArrayLike, nose_radius: ArrayLike, edge_angle: ArrayLike, minor_angle: ArrayLike
) -> tuple[Floats, Floats, Floats, Floats]:
    f, r = not_negative("feed", "mm/rev", feed), not_negative("nose radius", "mm", nose_radius)
    kr = angle("cutting edge angle", edge_angle, 0.0, 180.0)
    kn = angle("minor edge angle", minor_angle, 0.0, 180.0)
    if np.any(kr + kn >= np.pi):
        raise ValueError("cutting edge angle and minor edge angle must be less than 180 deg together")
    return f, r, kr, kn


def _cusp(f: Floats, r: Floats, kr: Floats, kn: Floats) -> Floats:
    """Height at which the groove of a tool, as wide as the feed, meets its neighbour (mm)."""
    both_edges = f > _half_width(r, kr, kn) + _half_width(r, kn, kr)
    straight = (f - r * np.tan(kr / 2.0) - r * np.tan(kn / 2.0)) / (1.0 / np.tan(kr) + 1.0 / np.tan(kn))
    arcs = r - np.sqrt(np.maximum(r**2 - f**2 / 4.0, 0.0))
    low = np.minimum(kr, kn)
    joint = _arc_and_edge(f, r, low)
    one_edge = f > 2.0 * r * np.sin(np.minimum(low, np.pi / 2.0))
    return np.asarray(np.where(both_edges, straight, np.where(one_edge, joint, arcs)))


def _half_width(r: Floats, own: Floats, other: Floats) -> Floats:
    """Half-width of the groove on one side at the height where the higher of the two arcs ends."""
    own_, other_ = np.minimum(own, np.pi / 2.0), np.minimum(other, np.pi / 2.0)
    top = r * (1.0 - np.cos(np.maximum(own_, other_)))
    arc = np.sqrt(np.maximum(2.0 * r * top - top**2, 0.0))
    line = top / np.tan(own_) + r * np.tan(own_ / 2.0)
    return np.asarray(np.where(own_ >= other_, arc, line))


def _arc_and_edge(f: Floats, r: Floats, k: Floats) -> Floats:
    under = np.maximum(2.0 * f * r * np.sin(k) ** 3 - f**2 * np.sin(k) ** 4, 0.0)
    return np.asarray((1.0 - np.cos(k)) * r + f * np.sin(k) * np.cos(k) - np.sqrt(under))


def _groove_area(height: Floats, r: Floats, k: Floats) -> Floats:
    """Area of one side of the groove up to a height: circle segment, then the wedge along the straight edge."""
    end = r * (1.0 - np.cos(k))
    in_arc = np.clip(height, 0.0, end)
    share = np.divide(in_arc, r, out=np.zeros(np.broadcast(in_arc, r).shape), where=r > 0.0)
    t = np.arccos(np.clip(1.0 - share, -1.0, 1.0))
    above = np.maximum(height - end, 0.0)
    wedge = above * (r * np.sin(k)) + above**2 / (2.0 * np.tan(k))
    return np.asarray(r**2 * (t / 2.0 - np.sin(2.0 * t) / 4.0) + wedge)
