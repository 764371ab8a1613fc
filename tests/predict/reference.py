"""The forces of a steady cut worked out afresh: plain sums over many small pieces of the engaged edge.

Nothing of the code under test is used. Laws, as users are promised them:
Kienzle, Fc = integral of kc11 h^(1-mc) along the edge; rake factor 1 - 1.5 %/deg held within 0.7 and 1.4;
speed factor 2.023/v^0.153 up to 100 m/min, 1.380/v^0.07 above, held at 20 and 600 m/min (Paucksch, from memory);
rake: pocket rake in the normal plane, tan gn = tan go cos ls, plus face and land weighted by land width over twice
the mean chip thickness; thrust at right angles to the chord through the ends of the engaged edge (Colwell 1954), its
lower end half a feed behind the tip of a rounded nose.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

PIECES = 20_000


@dataclass(frozen=True)
class Corner:
    """A tool corner and the angles of its face."""

    kappa: float = 95.0  # deg
    nose: float = 0.8  # mm
    pocket_rake: float = 0.0  # deg
    inclination: float = 0.0
    face: float = 0.0
    land: float = 0.0
    land_width: float = 0.0  # mm


@dataclass(frozen=True)
class Law:
    """Material constants and the factors in force."""

    kc11: float = 1800.0
    mc: float = 0.25
    reference_rake: float = 6.0
    friction: float = 32.0  # deg, steel
    kn11: float | None = None
    mn: float | None = None
    pairs: tuple[float, float, float, float] | None = None  # kf11, mf, kp11, mp
    operation: float = 1.0
    substrate: float = 1.0


@dataclass(frozen=True)
class Cut:
    """What a steady cut asks for."""

    depth: float
    length: float
    chip_max: float
    mean: float
    rake: float
    cutting: float
    thrust: float
    feed_force: float
    passive: float
    torque: float  # N m
    area: float


def edge_of(corner: Corner, depth: float) -> list[tuple[float, float, float, float]]:
    """Pieces of the engaged edge: x (along the feed, from the nose centre), y (above the surface), length, sine."""
    kappa, nose = math.radians(corner.kappa), corner.nose
    rounded = nose * (1.0 - math.cos(kappa))
    pieces = []
    end = kappa if depth >= rounded else math.acos(1.0 - depth / nose)
    if nose > 0.0:
        for i in range(PIECES):
            theta = (i + 0.5) / PIECES * end
            x, y = nose * math.sin(theta), nose * (1.0 - math.cos(theta))
            pieces.append((x, y, nose * end / PIECES, math.sin(theta)))
    if depth > rounded:
        straight = (depth - rounded) / math.sin(kappa)
        for i in range(PIECES):
            s = (i + 0.5) / PIECES * straight
            x, y = nose * math.sin(kappa) + s * math.cos(kappa), rounded + s * math.sin(kappa)
            pieces.append((x, y, straight / PIECES, math.sin(kappa)))
    return pieces


def ends_of(corner: Corner, depth: float, feed: float) -> tuple[tuple[float, float], tuple[float, float]]:
    """Ends of the chord, nose centre at (0, nose)."""
    kappa, nose = math.radians(corner.kappa), corner.nose
    rounded = nose * (1.0 - math.cos(kappa))
    half = min(feed / 2.0, nose)
    first = (-half, nose - math.sqrt(nose**2 - half**2))
    if depth >= rounded:
        return first, (nose * math.sin(kappa) + (depth - rounded) / math.tan(kappa), depth)
    theta = math.acos(1.0 - depth / nose)
    return first, (nose * math.sin(theta), depth)


def effective_rake(corner: Corner, mean: float) -> float:
    """Rake the chip meets, deg."""
    seat = math.degrees(
        math.atan(math.tan(math.radians(corner.pocket_rake)) * math.cos(math.radians(corner.inclination)))
    )
    share = min(1.0, corner.land_width / (2.0 * mean))
    return share * (seat + corner.land) + (1.0 - share) * (seat + corner.face)


def speed_factor(speed: float) -> float:
    """Factor of the cutting speed (m/min)."""
    held = min(600.0, max(20.0, speed))
    return 2.023 / held**0.153 if held <= 100.0 else 1.380 / held**0.07


def thrust_of(law: Law, cutting: float, mean: float, length: float, rake: float, factor: float) -> float:
    """Thrust in the reference plane, N."""
    slope = max(0.0, 1.0 - 0.045 * (rake - law.reference_rake))
    if law.kn11 is not None and law.mn is not None:
        return law.kn11 * mean ** (1.0 - law.mn) * length * slope * factor
    if law.pairs is not None:
        kf, mf, kp, mp = law.pairs
        free = math.hypot(_pair(kf, mf, mean), _pair(kp, mp, mean)) * length * slope * factor
        return min(max(free, 0.35 * cutting), 2.0 * cutting)
    beta = law.friction + 0.3 * (rake - law.reference_rake)
    ratio = math.tan(math.radians(beta - rake))
    return cutting * min(max(ratio, 0.35), 2.0)


def _pair(k: float, m: float, h: float) -> float:
    """A catalogue pair per mm of edge; below 0.1 mm its tangent there (edge-force form)."""
    if h >= 0.1:
        return k * h ** (1.0 - m)
    return (1.0 - m) * k * 0.1 ** (-m) * h + m * k * 0.1 ** (1.0 - m)


def steady_cut(
    corner: Corner, law: Law, *, depth: float, feed: float, rpm: float, radius: float, inward: bool = False,
    facing: bool = False,
) -> Cut:  # fmt: skip
    """A cut along a cylinder (or bore: ``inward`` False means external), or across a face.

    ``radius`` is that of the programmed point: turned surface when turning, foremost point when facing.
    """
    pieces = edge_of(corner, depth)
    length = sum(piece[2] for piece in pieces)
    area = depth * feed
    mean = area / length
    rake = effective_rake(corner, mean)
    tip_front = corner.nose  # the programmed point of a rounded nose is its foremost tangent

    def at(x: float, y: float) -> float:
        if facing:
            return radius + tip_front - x
        return radius - y if inward else radius + y

    (x1, y1), (x2, y2) = ends_of(corner, depth, feed)
    middle = 0.5 * (at(0.0, 0.0) + at(x2, y2))
    speed = 2.0 * math.pi * middle * rpm / 1000.0
    factor = speed_factor(speed) * law.operation * law.substrate
    slope = min(1.4, max(0.7, 1.0 - 0.015 * (rake - law.reference_rake)))
    elements = [law.kc11 * (feed * sine) ** (1.0 - law.mc) * size * factor * slope for _, _, size, sine in pieces]
    cutting = sum(elements)
    torque = sum(element * at(x, y) for element, (x, y, _, _) in zip(elements, pieces, strict=True)) / 1000.0
    thrust = thrust_of(law, cutting, mean, length, rake, factor)
    kappa = math.atan2(y2 - y1, x2 - x1)
    return Cut(
        depth=depth, length=length, chip_max=feed * max(piece[3] for piece in pieces), mean=mean, rake=rake,
        cutting=cutting, thrust=thrust, feed_force=thrust * math.sin(kappa), passive=thrust * abs(math.cos(kappa)),
        torque=torque, area=area,
    )  # fmt: skip
