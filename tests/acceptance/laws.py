"""The forces of a steady cut worked out by hand: an independent second opinion on the figures of the report.

Kienzle's law integrated along the engaged edge (Kienzle 1952), the thrust across the chord of the engaged edge
(Colwell 1954), corner geometry by plane trigonometry. One straight edge with a rounded corner, in slices; no stock,
no polygons.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import acos, asin, atan, atan2, cos, degrees, hypot, pi, radians, sin, sqrt, tan


@dataclass(frozen=True)
class Edge:
    """A turning edge: cutting edge angle and angles in degrees, lengths in mm."""

    kappa: float
    nose: float
    pocket_rake: float
    inclination: float
    face: float
    land: float
    land_rake: float = 0.0


@dataclass(frozen=True)
class Law:
    """Kienzle pair of the force and of the thrust, N/mm2, and the rake they were measured at."""

    kc11: float = 1700.0
    mc: float = 0.22
    kn11: float = 800.0
    mn: float = 0.4
    rake: float = 6.0


@dataclass(frozen=True)
class Cut:
    """What a cut comes to: mm, mm2, degrees, N, Nm."""

    length: float
    thickest: float
    area: float
    rake: float
    force: float
    feed: float
    passive: float
    torque: float


def cut(
    edge: Edge, law: Law, depth: float, feed: float, tip_radius: float, outwards: int = 1, factor: float = 1.0
) -> Cut:
    """Forces of a steady cut along the work; `outwards` -1 where the depth points towards the axis (boring)."""
    pieces = list(_pieces(edge, depth))
    length = sum(piece[1] for piece in pieces)
    area = depth * feed
    rake = effective_rake(edge, area / length)
    share = factor * min(1.4, max(0.7, 1 - 0.015 * (rake - law.rake)))
    forces = [share * law.kc11 * (feed * sin(angle)) ** (1 - law.mc) * db for angle, db, _ in pieces]
    torque = sum(force * (tip_radius + outwards * y) for force, (_, _, y) in zip(forces, pieces, strict=True)) / 1000
    thrust = factor * law.kn11 * (area / length) ** (1 - law.mn) * length * (1 - 0.045 * (rake - law.rake))
    direction = chord_angle(edge, depth, feed)
    return Cut(
        length=length,
        thickest=max(feed * sin(angle) for angle, _, _ in pieces),
        area=area,
        rake=rake,
        force=sum(forces),
        feed=thrust * sin(direction),
        passive=abs(thrust * cos(direction)),
        torque=torque,
    )


def _pieces(edge: Edge, depth: float):  # type: ignore[no-untyped-def]
    """Small pieces of the engaged edge: local cutting edge angle, length, height over the finished surface."""
    steps = 4000
    kappa = radians(edge.kappa)
    top = edge.nose * (1 - cos(kappa))
    end = kappa if depth >= top else acos(1 - depth / edge.nose)
    if edge.nose:
        for i in range(steps):
            angle = end * (i + 0.5) / steps
            yield angle, edge.nose * end / steps, edge.nose * (1 - cos(angle))
    if depth > top:
        straight = (depth - top) / sin(kappa)
        for i in range(steps):
            yield kappa, straight / steps, top + (depth - top) * (i + 0.5) / steps


def effective_rake(edge: Edge, thickness: float) -> float:
    """Rake felt by the chip: land and face weighed by the contact length, two thicknesses long."""
    pocket = degrees(atan(tan(radians(edge.pocket_rake)) * cos(radians(edge.inclination))))
    on_land = min(1.0, edge.land / (2 * thickness)) if edge.land else 0.0
    return pocket + on_land * edge.land_rake + (1 - on_land) * edge.face


def chord_angle(edge: Edge, depth: float, feed: float) -> float:
    """Angle between the chord of the engaged edge and the feed, its lower end half a feed behind the tip."""
    r, kappa = edge.nose, radians(edge.kappa)
    top = r * (1 - cos(kappa))
    x1, y1 = (-feed / 2, r - sqrt(r * r - feed * feed / 4)) if r else (0.0, 0.0)
    if depth >= top:
        x2, y2 = r * sin(kappa) + (depth - top) / tan(kappa), depth
    else:
        x2, y2 = r * sin(acos(1 - depth / r)), depth
    return atan2(y2 - y1, x2 - x1)


def rough_surface(feed: float, nose: float) -> tuple[float, float]:
    """Exact kinematic Rt and Ra (both in um) of a row of circular arcs."""
    peak = nose - sqrt(nose * nose - feed * feed / 4)
    half, steps = feed / 2, 20_000
    heights = [nose - sqrt(nose * nose - (half * (i + 0.5) / steps) ** 2) for i in range(steps)]
    mean = sum(heights) / steps
    return peak * 1000, sum(abs(h - mean) for h in heights) / steps * 1000


def facing_time(d1: float, d2: float, speed: float, clamp: float, feed: float) -> float:
    """Seconds to face from one diameter to a smaller one at constant surface speed with a clamp."""
    critical = 1000 * speed / (pi * clamp)
    upper = pi * (d1**2 - max(d2, critical) ** 2) / (4000 * speed * feed)
    lower = (max(0.0, critical - d2)) / (2 * clamp * feed)
    return 60 * (upper + lower)


__all__ = ["Cut", "Edge", "Law", "asin", "cut", "facing_time", "hypot", "rough_surface"]
