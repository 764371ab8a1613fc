"""Steps of the tool and pieces of a contour: plane geometry with Z to the right and X up.

Written from the rules of the trade (from memory, common practice), without regard to the code under test.
"""

from __future__ import annotations

from collections.abc import Iterable
from math import atan2, hypot, pi, sqrt
from typing import NamedTuple

NEAR = 1e-9
TURNED = {"CW": "CCW", "CCW": "CW"}


class Step(NamedTuple):
    """One move: kind R, F, T, CW or CCW, its end with X as a diameter, the centre of an arc, the feed where known."""

    kind: str
    x: float
    z: float
    cx: float | None = None
    cz: float | None = None
    feed: float | None = None


class Piece(NamedTuple):
    """One element of a contour from (z0, r0) to (z1, r1): kind F, CW or CCW."""

    kind: str
    z0: float
    r0: float
    z1: float
    r1: float
    cz: float = 0.0
    cr: float = 0.0

    @property
    def radius(self) -> float:
        return hypot(self.z0 - self.cz, self.r0 - self.cr)

    @property
    def is_arc(self) -> bool:
        return self.kind != "F"

    def moved(self, dz: float, dr: float) -> Piece:
        return Piece(self.kind, self.z0 + dz, self.r0 + dr, self.z1 + dz, self.r1 + dr, self.cz + dz, self.cr + dr)

    def placed(self, frame: Frame) -> Piece:
        """The same piece seen in another frame."""
        kind = TURNED.get(self.kind, self.kind) if frame.turns else self.kind
        first, last, centre = frame(self.z0, self.r0), frame(self.z1, self.r1), frame(self.cz, self.cr)
        return Piece(kind, *first, *last, *centre)

    def step(self) -> Step:
        if self.is_arc:
            return Step(self.kind, 2 * self.r1, self.z1, 2 * self.cr, self.cz)
        return Step("F", 2 * self.r1, self.z1)

    def z_at(self, r: float) -> float:
        """Z where a piece that rises or falls all the way stands at a radius."""
        if not self.is_arc:
            return self.z0 + (self.z1 - self.z0) * (r - self.r0) / (self.r1 - self.r0)
        half = sqrt(max(0.0, self.radius**2 - (r - self.cr) ** 2))
        low, high = min(self.z0, self.z1) - 1e-6, max(self.z0, self.z1) + 1e-6
        return next(z for z in (self.cz - half, self.cz + half) if low <= z <= high)

    def cut_at(self, r: float) -> tuple[Piece, Piece]:
        """The piece in two, divided where it stands at a radius."""
        z = self.z_at(r)
        return self._replace(z1=z, r1=r), self._replace(z0=z, r0=r)


class Frame(NamedTuple):
    """Exchange of the axes and reversal of each; its own inverse is the frame with the same exchange."""

    swap: bool = False
    sz: int = 1
    sr: int = 1

    @property
    def turns(self) -> bool:
        return (self.sz * self.sr < 0) != self.swap

    def __call__(self, z: float, r: float) -> tuple[float, float]:
        """Into the frame: exchanged first, then reversed."""
        if self.swap:
            z, r = r, z
        return self.sz * z, self.sr * r

    def back(self, step: Step) -> Step:
        """A step given in the frame (X as a diameter there too) in the real plane."""
        kind = TURNED.get(step.kind, step.kind) if self.turns else step.kind
        z, r = self._out(step.z, step.x / 2)
        if step.cx is None or step.cz is None:
            return Step(kind, 2 * r, z)
        cz, cr = self._out(step.cz, step.cx / 2)
        return Step(kind, 2 * r, z, 2 * cr, cz)

    def _out(self, z: float, r: float) -> tuple[float, float]:
        z, r = self.sz * z, self.sr * r
        return (r, z) if self.swap else (z, r)


def centre_of(kind: str, z0: float, r0: float, z1: float, r1: float, radius: float) -> tuple[float, float]:
    """Centre of the arc up to 180 degrees: left of the chord for CCW, right of it for CW."""
    dz, dr = z1 - z0, r1 - r0
    chord = hypot(dz, dr)
    rise = sqrt(max(0.0, radius**2 - chord**2 / 4))
    side = rise if kind == "CCW" else -rise
    return (z0 + z1) / 2 - side * dr / chord, (r0 + r1) / 2 + side * dz / chord


def arc(kind: str, z0: float, r0: float, z1: float, r1: float, radius: float) -> Piece:
    """An arc of given radius."""
    return Piece(kind, z0, r0, z1, r1, *centre_of(kind, z0, r0, z1, r1, radius))


def sweep(piece: Piece) -> float:
    """Angle of an arc, positive, radians."""
    first = atan2(piece.r0 - piece.cr, piece.z0 - piece.cz)
    last = atan2(piece.r1 - piece.cr, piece.z1 - piece.cz)
    turn = last - first if piece.kind == "CCW" else first - last
    return turn % (2 * pi)


def risers(pieces: Iterable[Piece]) -> list[Piece]:
    """The contour with its arcs divided at their highest and lowest points, so that each piece rises or falls."""
    found = []
    for piece in pieces:
        if piece.is_arc and min(piece.z0, piece.z1) + NEAR < piece.cz < max(piece.z0, piece.z1) - NEAR:
            top = piece.cr + (
                piece.radius if piece.r0 > piece.cr - NEAR and piece.r1 > piece.cr - NEAR else -piece.radius
            )
            found += [piece._replace(z1=piece.cz, r1=top), piece._replace(z0=piece.cz, r0=top)]
        else:
            found.append(piece)
    return found
