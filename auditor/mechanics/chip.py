"""The chip before it is cut: engaged edge, thickness, and the way it flows."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, angle, finite, not_negative, ratio

FEED_TO_RADIUS: Final = ValidRange("feed / nose radius", "", 0.0, 0.8, "common practice: slices along the corner")


def nose_angle(depth: ArrayLike, nose_radius: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Angle over which the rounded corner is engaged, from its lowest point.

    Parameters
    ----------
    depth : array_like (...), mm
        Depth of cut across the feed.
    nose_radius : array_like (...), mm
        Corner radius; 0 is a sharp corner.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180.

    Returns
    -------
    ndarray (...), deg
        theta2 = arccos(1 - ap/r), at most kappa_r; it is the local cutting edge angle where engagement ends.

    Raises
    ------
    ValueError
        A length negative, kappa_r outside 0 to 180 degrees.

    Examples
    --------
    >>> round(float(nose_angle(0.3, 0.8, 93.0)), 1)
    51.3

    References
    ----------
    Plane geometry of ISO 3002-1 (1982): local kappa_r along a rounded corner.
    """
    a = not_negative("depth of cut", "mm", depth)
    r = not_negative("nose radius", "mm", nose_radius)
    kappa = angle("cutting edge angle", edge_angle, 0.0, 180.0)
    whole = a >= r * (1.0 - np.cos(kappa))
    share = np.clip(1.0 - ratio(a, r), -1.0, 1.0)
    return np.asarray(np.degrees(np.where(whole, kappa + 0.0 * a, np.arccos(share))))


def straight_length(depth: ArrayLike, nose_radius: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Engaged length of the straight main edge behind the corner.

    Parameters
    ----------
    depth : array_like (...), mm
        Depth of cut across the feed.
    nose_radius : array_like (...), mm
        Corner radius.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180.

    Returns
    -------
    ndarray (...), mm
        b_s = (ap - r (1 - cos kappa_r)) / sin kappa_r, zero where only the corner cuts.

    Raises
    ------
    ValueError
        A length negative, kappa_r outside 0 to 180 degrees.

    Examples
    --------
    >>> round(float(straight_length(3.0, 0.8, 95.0)), 3)
    2.138

    References
    ----------
    Plane geometry of ISO 3002-1 (1982).
    """
    a = not_negative("depth of cut", "mm", depth)
    r = not_negative("nose radius", "mm", nose_radius)
    kappa = angle("cutting edge angle", edge_angle, 0.0, 180.0)
    return np.asarray(np.maximum(a - r * (1.0 - np.cos(kappa)), 0.0) / np.sin(kappa))


def engaged_length(depth: ArrayLike, nose_radius: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Engaged edge length b: the arc of the corner and the straight edge behind it.

    Parameters
    ----------
    depth : array_like (...), mm
        Depth of cut across the feed.
    nose_radius : array_like (...), mm
        Corner radius.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180.

    Returns
    -------
    ndarray (...), mm
        b = r theta2 + b_s.

    Raises
    ------
    ValueError
        A length negative, kappa_r outside 0 to 180 degrees.

    Examples
    --------
    >>> round(float(engaged_length(3.0, 0.8, 95.0)), 4)
    3.4649

    References
    ----------
    Plane geometry of ISO 3002-1 (1982); the leading side only, the scallop behind the tip is not chip.
    """
    r = not_negative("nose radius", "mm", nose_radius)
    arc = r * np.radians(nose_angle(depth, r, edge_angle))
    return np.asarray(arc + straight_length(depth, r, edge_angle))


def mean_thickness(area: ArrayLike, length: ArrayLike) -> Floats:
    """Mean uncut chip thickness h_m = A / b.

    Parameters
    ----------
    area : array_like (...), mm2
        Chip section, depth times feed.
    length : array_like (...), mm
        Engaged edge length b.

    Returns
    -------
    ndarray (...), mm
        h_m; NaN where nothing is engaged.

    Raises
    ------
    ValueError
        Area or length negative.

    Examples
    --------
    >>> round(float(mean_thickness(0.9, 3.4649)), 4)
    0.2597

    References
    ----------
    ISO 3002-3 (1984), nominal thickness of cut from section and edge length.
    """
    return ratio(not_negative("chip area", "mm2", area), not_negative("edge length", "mm", length))


def equivalent_thickness(area: ArrayLike, length: ArrayLike, feed: ArrayLike) -> Floats:
    """Equivalent chip thickness of Woxen and Bromssen, h_e = A / (b + f/2).

    Half a feed of edge behind the tip takes part on a rounded corner; where the stretch does not end at a finished
    surface on such a corner, give feed 0 and get the mean thickness.

    Parameters
    ----------
    area : array_like (...), mm2
        Chip section, depth times feed.
    length : array_like (...), mm
        Engaged edge length b.
    feed : array_like (...), mm/rev
        Feed, or 0 where there is no scallop behind the tip.

    Returns
    -------
    ndarray (...), mm
        h_e; NaN where nothing is engaged.

    Raises
    ------
    ValueError
        Area, length or feed negative.

    Examples
    --------
    >>> round(float(equivalent_thickness(0.9, 3.4649, 0.3)), 3)
    0.249

    References
    ----------
    Woxen, 1932 (equivalent chip thickness), with Bromssen's engaged length; from memory. Feed up to the corner
    radius.
    """
    a = not_negative("chip area", "mm2", area)
    b = not_negative("edge length", "mm", length)
    f = not_negative("feed", "mm/rev", feed)
    return ratio(a, np.where(b == 0.0, 0.0, b + 0.5 * f))


def largest_thickness(depth: ArrayLike, feed: ArrayLike, nose_radius: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Largest local chip thickness along the engaged edge.

    Parameters
    ----------
    depth : array_like (...), mm
        Depth of cut across the feed.
    feed : array_like (...), mm/rev
        Feed.
    nose_radius : array_like (...), mm
        Corner radius.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180.

    Returns
    -------
    ndarray (...), mm
        f sin theta2 while the corner alone cuts, f sin kappa_r behind it; f where the corner passes 90 degrees.

    Raises
    ------
    ValueError
        A length negative, kappa_r outside 0 to 180 degrees.

    Examples
    --------
    >>> round(float(largest_thickness(0.1, 0.1, 0.8, 95.0)), 4)
    0.0484

    References
    ----------
    Plane geometry of ISO 3002-1 (1982), h = f sin kappa_r; for ap << r it tends to f sqrt(2 ap / r).
    """
    f = not_negative("feed", "mm/rev", feed)
    end = nose_angle(depth, nose_radius, edge_angle)
    kappa = np.where(not_negative("nose radius", "mm", nose_radius) == 0.0, end, np.minimum(end, 90.0))
    return np.asarray(f * np.sin(np.radians(kappa)))


def chord_angle(depth: ArrayLike, feed: ArrayLike, nose_radius: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Angle between the feed and the chord through the ends of the engaged edge.

    The chip flows, and the thrust in the reference plane acts, at right angles to that chord. One end lies half a
    feed behind the tip, on the finished surface; the other where the edge leaves the raw surface.

    Parameters
    ----------
    depth : array_like (...), mm
        Depth of cut across the feed.
    feed : array_like (...), mm/rev
        Feed, below twice the corner radius where there is one.
    nose_radius : array_like (...), mm
        Corner radius; 0 is a sharp corner, and then the chord is the edge.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180.

    Returns
    -------
    ndarray (...), deg
        kappa_eq; for kappa_r 90 and a small feed its cotangent is r/ap.

    Raises
    ------
    ValueError
        A length negative, kappa_r outside 0 to 180 degrees.

    Examples
    --------
    >>> round(float(chord_angle(1.0, 0.2, 0.8, 95.0)), 2)
    48.29

    References
    ----------
    Colwell, Transactions of the ASME 76 (1954) 199 (form tan = r/ap for kappa_r 90); general ends: geometry.
    """
    a = not_negative("depth of cut", "mm", depth)
    f = not_negative("feed", "mm/rev", feed)
    r = not_negative("nose radius", "mm", nose_radius)
    theta2 = np.radians(nose_angle(a, r, edge_angle))
    straight = straight_length(a, r, edge_angle)
    kappa = angle("cutting edge angle", edge_angle, 0.0, 180.0)
    half = np.minimum(0.5 * f, r)
    return chord_through(-half, r - np.sqrt(r**2 - half**2), r * np.sin(theta2) + straight * np.cos(kappa), a)


def chord_through(along_low: ArrayLike, across_low: ArrayLike, along_high: ArrayLike, across_high: ArrayLike) -> Floats:
    """Angle between the feed and the chord through two given ends of an engaged stretch.

    Parameters
    ----------
    along_low : array_like (...), mm
        End on the finished side, measured along the feed.
    across_low : array_like (...), mm
        The same end, measured across the feed towards the raw side.
    along_high : array_like (...), mm
        End on the raw side, along the feed.
    across_high : array_like (...), mm
        The same end, across the feed.

    Returns
    -------
    ndarray (...), deg
        kappa_eq, 0 to 180 while the raw end lies on the raw side.

    Raises
    ------
    ValueError
        A coordinate infinite.

    Examples
    --------
    >>> round(float(chord_through(0.0, 0.0, 1.0, 1.0)), 1)
    45.0

    References
    ----------
    Colwell, Transactions of the ASME 76 (1954) 199, p. 199: chip flow at right angles to the chord.
    """
    along = finite("end of the edge", "mm", along_high) - finite("end of the edge", "mm", along_low)
    across = finite("end of the edge", "mm", across_high) - finite("end of the edge", "mm", across_low)
    return np.asarray(np.degrees(np.arctan2(across, along)))
