"""Speeds and times of a lathe move: constant surface speed, clamp, lines, arcs, rapids."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, finite, not_negative, positive, ratio


def cutting_speed(diameter: ArrayLike, rpm: ArrayLike) -> Floats:
    """Cutting speed, vc = pi d n / 1000.

    Parameters
    ----------
    diameter : array_like (...), mm
        Diameter; its sign (past the centre) does not count.
    rpm : array_like (...), rpm
        Spindle speed.

    Returns
    -------
    ndarray (...), m/min
        vc.

    Raises
    ------
    ValueError
        Spindle speed negative.

    Examples
    --------
    >>> round(float(cutting_speed(60.0, 1000.0)), 1)
    188.5

    References
    ----------
    ISO 3002-3 (1984), cutting speed.
    """
    return np.asarray(np.pi * np.abs(finite("diameter", "mm", diameter)) * not_negative("speed", "rpm", rpm) / 1000.0)


def spindle_speed(vc: ArrayLike, diameter: ArrayLike, rpm_limit: ArrayLike) -> Floats:
    """Spindle speed for a surface speed, min(1000 vc / (pi d), limit).

    Parameters
    ----------
    vc : array_like (...), m/min
        Surface speed programmed.
    diameter : array_like (...), mm
        Diameter; its sign does not count, at the axis the limit holds.
    rpm_limit : array_like (...), rpm
        Lower of programmed clamp and machine limit.

    Returns
    -------
    ndarray (...), rpm
        n.

    Raises
    ------
    ValueError
        Surface speed negative, limit not above zero.

    Examples
    --------
    >>> spindle_speed(200.0, [100.0, 10.0], 3000.0).round(1).tolist()
    [636.6, 3000.0]

    References
    ----------
    ISO 6983-1, G96 with speed limit; kinematics n = 1000 vc / (pi d).
    """
    v, limit = not_negative("surface speed", "m/min", vc), positive("speed limit", "rpm", rpm_limit)
    around = np.pi * np.abs(finite("diameter", "mm", diameter))
    clamped = around * limit <= 1000.0 * v
    free = ratio(1000.0 * v, around)
    return np.asarray(np.where(v == 0.0, 0.0, np.where(clamped, limit, free)))


def clamp_diameter(vc: ArrayLike, rpm_limit: ArrayLike) -> Floats:
    """Diameter at which constant surface speed meets the speed limit, 1000 vc / (pi n).

    Parameters
    ----------
    vc : array_like (...), m/min
        Surface speed.
    rpm_limit : array_like (...), rpm
        Lower of programmed clamp and machine limit.

    Returns
    -------
    ndarray (...), mm
        Below this diameter the cutting speed falls with the diameter.

    Raises
    ------
    ValueError
        Surface speed negative, limit not above zero.

    Examples
    --------
    >>> round(float(clamp_diameter(200.0, 3000.0)), 2)
    21.22

    References
    ----------
    ISO 6983-1, G96 with speed limit; kinematics d = 1000 vc / (pi n).
    """
    v, limit = not_negative("surface speed", "m/min", vc), positive("speed limit", "rpm", rpm_limit)
    return np.asarray(1000.0 * v / (np.pi * limit))


def feed_time(length: ArrayLike, feed: ArrayLike, rpm: ArrayLike) -> Floats:
    """Time of a move at constant spindle speed, 60 L / (f n); a thread's lead is its feed.

    Parameters
    ----------
    length : array_like (...), mm
        Length of path.
    feed : array_like (...), mm/rev
        Feed, or lead.
    rpm : array_like (...), rpm
        Spindle speed.

    Returns
    -------
    ndarray (...), s
        NaN where feed or spindle stand still.

    Raises
    ------
    ValueError
        An argument negative.

    Examples
    --------
    >>> float(feed_time(100.0, 0.2, 1000.0))
    30.0

    References
    ----------
    Kinematics vf = f n (ISO 3002-3, feed speed).
    """
    speed = not_negative("feed", "mm/rev", feed) * not_negative("speed", "rpm", rpm)
    return ratio(60.0 * not_negative("length", "mm", length), speed)


def surface_speed_line_time(
    start_radius: ArrayLike,
    end_radius: ArrayLike,
    length: ArrayLike,
    feed: ArrayLike,
    vc: ArrayLike,
    rpm_limit: ArrayLike,
) -> Floats:
    """Time of a straight move at constant surface speed with a speed limit, exact for any slope.

    Parameters
    ----------
    start_radius : array_like (...), mm
        Radius at the start; negative past the centre.
    end_radius : array_like (...), mm
        Radius at the end; negative past the centre.
    length : array_like (...), mm
        Length of path in the half-section.
    feed : array_like (...), mm/rev
        Feed.
    vc : array_like (...), m/min
        Surface speed.
    rpm_limit : array_like (...), rpm
        Lower of programmed clamp and machine limit.

    Returns
    -------
    ndarray (...), s
        60 times the integral of max(pi D / (1000 v), 1 / n_max) ds / f; NaN where nothing moves.

    Raises
    ------
    ValueError
        Length negative; feed, surface speed or limit negative or zero limit.

    Examples
    --------
    >>> round(float(surface_speed_line_time(50.0, 0.0, 50.0, 0.2, 200.0, 3000.0)), 4)
    12.3115

    References
    ----------
    Kinematics: n = min(1000 v / (pi D), n_max), vf = f n, eq. integrated along the line (ISO 6983-1, G96).
    """
    r1, r2 = finite("radius", "mm", start_radius), finite("radius", "mm", end_radius)
    held = 0.5 * clamp_diameter(vc, rpm_limit)
    run = r2 - r1
    level = np.abs(run) <= 1e-9 * (np.abs(r1) + np.abs(r2) + held)
    mean = ratio(_radius_integral(r2, held) - _radius_integral(r1, held), run)
    radius = np.where(level, np.maximum(np.abs(0.5 * (r1 + r2)), held), mean)
    return _surface_time(radius * not_negative("length", "mm", length), feed, vc)


def surface_speed_arc_time(
    centre_radius: ArrayLike,
    arc_radius: ArrayLike,
    start_angle: ArrayLike,
    end_angle: ArrayLike,
    feed: ArrayLike,
    vc: ArrayLike,
    rpm_limit: ArrayLike,
) -> Floats:
    """Time of an arc at constant surface speed with a speed limit, exact.

    Parameters
    ----------
    centre_radius : array_like (...), mm
        Distance of the arc's centre from the spindle axis; may be negative.
    arc_radius : array_like (...), mm
        Radius of the arc.
    start_angle : array_like (...), deg
        Angle of the start about the centre, from the direction of +Z, so that r = centre + arc sin(angle).
    end_angle : array_like (...), deg
        Angle of the end; the sweep is at most one turn.
    feed : array_like (...), mm/rev
        Feed.
    vc : array_like (...), m/min
        Surface speed.
    rpm_limit : array_like (...), rpm
        Lower of programmed clamp and machine limit.

    Returns
    -------
    ndarray (...), s
        60 times the integral of max(pi D / (1000 v), 1 / n_max) ds / f; NaN where nothing moves.

    Raises
    ------
    ValueError
        Arc radius not above zero, sweep above one turn, another argument impossible.

    Examples
    --------
    >>> round(float(surface_speed_arc_time(15.0, 5.0, 0.0, 90.0, 0.12, 180.0, 1e6)), 4)
    2.4925

    References
    ----------
    Kinematics: n = min(1000 v / (pi D), n_max), eq. integrated piecewise between the angles where the limit takes hold
    (ISO 6983-1, G96).
    """
    a1, a2 = np.radians(finite("angle", "deg", start_angle)), np.radians(finite("angle", "deg", end_angle))
    if np.any(np.abs(a2 - a1) > 2.0 * np.pi * (1.0 + 1e-9)):
        raise ValueError("an arc must not sweep more than one turn")
    arc = positive("arc radius", "mm", arc_radius)
    centre, held = finite("centre radius", "mm", centre_radius), 0.5 * clamp_diameter(vc, rpm_limit)
    c, r, low, high, h = np.broadcast_arrays(centre, arc, np.minimum(a1, a2), np.maximum(a1, a2), held)
    cuts = np.concatenate([np.stack([low, high], axis=-1), _limit_angles(c, r, low, high, h)], axis=-1)
    ends = np.sort(np.clip(cuts, low[..., np.newaxis], high[..., np.newaxis]), axis=-1)
    left, right = ends[..., :-1], ends[..., 1:]
    c, r, h = c[..., np.newaxis], r[..., np.newaxis], h[..., np.newaxis]
    free = np.abs(c * (right - left) - r * (np.cos(right) - np.cos(left)))
    limited = np.abs(c + r * np.sin(0.5 * (left + right))) <= h
    return _surface_time(np.sum(np.where(limited, h * (right - left), free) * r, axis=-1), feed, vc)


def rapid_time(distance: ArrayLike, rapid: ArrayLike, acceleration: ArrayLike = np.inf) -> Floats:
    """Time of one axis at rapid, from rest to rest; a move takes as long as its slower axis.

    Parameters
    ----------
    distance : array_like (...), mm
        Travel of the axis (X as a radius).
    rapid : array_like (...), mm/min
        Rapid speed of the axis.
    acceleration : array_like (...), mm/s2
        Acceleration; infinite for none.

    Returns
    -------
    ndarray (...), s
        d/v + v/a, or 2 sqrt(d/a) when full speed is not reached.

    Raises
    ------
    ValueError
        Rapid speed or acceleration not above zero.

    Examples
    --------
    >>> round(float(rapid_time(100.0, 24000.0, 4000.0)), 4)
    0.35

    References
    ----------
    Kinematics of a trapezoidal speed profile, eq. d = v t - v^2/a.
    """
    d = np.abs(finite("distance", "mm", distance))
    v = positive("rapid", "mm/min", rapid) / 60.0
    a = np.asarray(acceleration, dtype=np.float64)
    if np.any(a <= 0.0):
        raise ValueError("acceleration must be greater than zero")
    travel = np.where(d == 0.0, 1.0, d)
    full = travel * a >= v**2
    return np.asarray(np.where(d == 0.0, 0.0, np.where(full, travel / v + v / a, 2.0 * np.sqrt(travel / a))))


def surface_speed_acceleration(vc: ArrayLike, feed: ArrayLike, radius: ArrayLike) -> Floats:
    """Spindle acceleration that facing inwards at constant surface speed asks for.

    Parameters
    ----------
    vc : array_like (...), m/min
        Surface speed.
    feed : array_like (...), mm/rev
        Feed towards the axis.
    radius : array_like (...), mm
        Radius reached; largest just before the speed limit takes hold.

    Returns
    -------
    ndarray (...), rpm/s
        dn/dt = (1000 v / (2 pi))^2 f / r^3 / 60.

    Raises
    ------
    ValueError
        Surface speed or feed negative, radius not above zero.

    Examples
    --------
    >>> round(float(surface_speed_acceleration(200.0, 0.2, 10.61033)))
    2827

    References
    ----------
    Kinematics: derivative of n = 1000 v / (2 pi r) with dr/dt = -f n, eq. of facing (ISO 6983-1, G96).
    """
    turns = 1000.0 * not_negative("surface speed", "m/min", vc) / (2.0 * np.pi)
    return np.asarray(turns**2 * not_negative("feed", "mm/rev", feed) / positive("radius", "mm", radius) ** 3 / 60.0)


def _radius_integral(r: Floats, held: Floats) -> Floats:
    """Integral of max(|u|, held) du from 0 to r."""
    size = np.abs(r)
    return np.asarray(np.sign(r) * np.where(size > held, 0.5 * (size**2 + held**2), held * size))


def _surface_time(radius_path: Floats, feed: ArrayLike, vc: ArrayLike) -> Floats:
    speed = not_negative("feed", "mm/rev", feed) * not_negative("surface speed", "m/min", vc) * 1000.0
    return ratio(60.0 * 2.0 * np.pi * radius_path, speed)


def _limit_angles(c: Floats, r: Floats, low: Floats, high: Floats, held: Floats) -> Floats:
    """Angles, seen from the arc's range, where the diameter passes the clamp diameter on either side of the axis."""
    found = []
    for side in (1.0, -1.0):
        sine = np.clip((side * held - c) / r, -1.0, 1.0)
        for root in (np.arcsin(sine), np.pi - np.arcsin(sine)):
            first = root + 2.0 * np.pi * np.ceil((low - root) / (2.0 * np.pi))
            found += [first, first + 2.0 * np.pi]
    return np.stack([np.where(angle <= high, angle, high) for angle in found], axis=-1)
