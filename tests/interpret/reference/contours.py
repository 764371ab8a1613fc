"""Random contours: for roughing of both types, drawn from (0, 0) upwards, then set down in the plane."""

from __future__ import annotations

from tests.interpret.reference.pen import Pen
from tests.interpret.reference.steps import TURNED, Frame, Piece, Step, arc


def rise(pen: Pen, z: float, r: float) -> list[Piece]:
    """One or two elements that rise in r and fall in z, from (z, r)."""
    dz, dr = pen.size(2, 12), pen.size(1, 6)
    kind = pen.rng.choice(["cylinder", "taper", "shoulder", "fillet", "round", "flat arc"])
    if kind == "cylinder":
        return [Piece("F", z, r, z - dz, r)]
    if kind == "taper":
        return [Piece("F", z, r, z - dz, r + dr)]
    if kind == "shoulder":
        return [Piece("F", z, r, z - dz, r), Piece("F", z - dz, r, z - dz, r + dr)]
    if kind == "fillet":
        return [Piece("F", z, r, z - dz, r), arc("CW", z - dz, r, z - dz - dr, r + dr, dr)]
    if kind == "round":
        return [arc("CCW", z, r, z - dr, r + dr, dr), Piece("F", z - dr, r + dr, z - dr - dz, r + dr)]
    least = (dz * dz + dr * dr) / (2 * min(dz, dr))
    radius = round(least * pen.rng.uniform(1.05, 2.5), 1 if not pen.inch else 3)
    radius = max(radius, least)
    radius = round(radius + (0.05 if not pen.inch else 0.002), 2 if not pen.inch else 3)
    return [arc(pen.rng.choice(["CW", "CCW"]), z, r, z - dz, r + dr, radius)]


def rising(pen: Pen, z: float, r: float, count: int) -> list[Piece]:
    """A contour for type I that ends with a rise."""
    pieces: list[Piece] = []
    for _ in range(count):
        pieces += rise(pen, z, r)
        z, r = pieces[-1].z1, pieces[-1].r1
    dz, dr = pen.size(1, 5), pen.size(0.5, 3)
    return [*pieces, Piece("F", z, r, z - dz, r), Piece("F", z - dz, r, z - dz, r + dr)]


def pocketed(pen: Pen, z: float, r: float, count: int) -> list[Piece]:
    """A contour for type II: rises and pockets."""
    pieces: list[Piece] = [Piece("F", z, r, z - pen.size(2, 6), r)]
    for _ in range(count):
        z, r = pieces[-1].z1, pieces[-1].r1
        up = pen.size(3, 8)
        pieces.append(Piece("F", z, r, z - pen.size(0, 4), r + up))
        z, r = pieces[-1].z1, pieces[-1].r1
        pieces.append(Piece("F", z, r, z - pen.size(1, 5), r))
        z, r = pieces[-1].z1, pieces[-1].r1
        down = min(up, pen.size(2, 7))
        kind = pen.rng.choice(["slope", "slope", "bowl"])
        if kind == "bowl":
            width = pen.size(6, 12)
            radius = round(width * pen.rng.uniform(0.55, 0.9), 2 if not pen.inch else 3)
            pieces.append(arc("CW", z, r, z - width, r, radius))
        else:
            pieces.append(Piece("F", z, r, z - pen.size(1, 6), r - down))
            z, r = pieces[-1].z1, pieces[-1].r1
            pieces.append(Piece("F", z, r, z - pen.size(2, 6), r))
    z, r = pieces[-1].z1, pieces[-1].r1
    top = max(piece.r1 for piece in pieces)
    pieces.append(Piece("F", z, r, z - pen.size(1, 5), top + pen.size(1, 4)))
    return pieces


def placed(pieces: list[Piece], frame: Frame, dz: float, dr: float) -> tuple[Piece, ...]:
    """Pieces drawn in a frame, set down in the real plane."""

    def point(z: float, r: float) -> tuple[float, float]:
        step = frame.back(Step("F", 2 * r, z))
        return round(step.z + dz, 9), round(step.x / 2 + dr, 9)

    return tuple(
        Piece(
            TURNED.get(piece.kind, piece.kind) if frame.turns else piece.kind,
            *point(piece.z0, piece.r0),
            *point(piece.z1, piece.r1),
            *point(piece.cz, piece.cr),
        )
        for piece in pieces
    )
