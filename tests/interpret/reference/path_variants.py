"""Random plain paths: arcs, broken corners, nose radius compensation. Bounds are in mm."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import chain
from math import hypot, pi

from tests.interpret.reference.contours import placed
from tests.interpret.reference.corners import Corner, Place, angle, broken
from tests.interpret.reference.nose import compensated
from tests.interpret.reference.pen import Pen
from tests.interpret.reference.steps import Frame, Piece, Step, arc


def arcs(pen: Pen) -> None:
    """Arcs by R and by I and K, straight moves between them, incremental words."""
    pen.start(pen.size(20, 40), 0.0)
    for _ in range(pen.rng.randint(2, 6)):
        z, r = pen.here()
        if pen.rng.random() < 0.4:
            words = pen.axes(pen.x + pen.size(-8, 12), z - pen.size(0, 8))
            pen.write(pen.g("G1"), *words)
            pen.note(Step("F", pen.x, pen.z))
            continue
        kind = pen.rng.choice(["CW", "CCW"])
        z1, r1 = z - pen.size(1, 8), r + pen.size(-3, 6)
        chord = hypot(z1 - z, r1 - r)
        piece = arc(kind, z, r, z1, r1, round(chord * pen.rng.uniform(0.55, 2.0), 2 if not pen.inch else 3))
        centre = pen.arc_words(piece)
        words = pen.axes(2 * r1, z1)
        pen.write(pen.g({"CW": "G2", "CCW": "G3"}[kind]), *words, *centre, pen.feed_word(0.1))
        pen.note(piece.step())
    pen.rapid(pen.size(90, 120), None)


def corner_words(pen: Pen) -> None:
    """Chamfers and fillets between straight moves."""
    pen.start(0.0 if pen.rng.random() < 0.5 else pen.size(10, 20), pen.size(0, 2))
    start: Place = pen.here()
    points: list[tuple[Place, Corner]] = []
    place = start
    turn = pen.rng.random() < 0.5
    for _ in range(pen.rng.randint(2, 5)):
        turn = not turn
        dz, dr = -pen.size(8, 16), pen.size(6, 12)
        mix = pen.rng.random() < 0.3
        place = (
            round(place[0] + (dz if turn or mix else 0.0), 6),
            round(place[1] + (dr if not turn or mix else 0.0), 6),
        )
        word: Corner = pen.rng.choice([None, ("C", pen.size(0.5, 2)), ("R", pen.size(0.5, 2))])
        points.append((place, word))
    points[-1] = (points[-1][0], None)
    corners = [start, *(p for p, _ in points)]
    points = [
        (p, None if w and abs(angle(corners[i], p, corners[i + 2]) - pi) < 0.05 else w)
        for i, (p, w) in enumerate(points[:-1])
    ] + [points[-1]]
    steps = broken(start, points)
    for (z, r), word in points:
        words = pen.axes(2 * r, z)
        pen.write(pen.g("G1"), *words, *([f",{word[0]}" + pen.number(word[1])] if word else []))
        pen.note(steps.pop(0), *([steps.pop(0)] if word else []))
    pen.rapid(pen.size(120, 140), None)


def compensation(pen: Pen) -> None:
    """Nose radius compensation along lines and arcs, plain."""
    _compensated(pen, in_finish=False)


def compensated_finish(pen: Pen) -> None:
    """Compensation within the finishing cycle."""
    _compensated(pen, in_finish=True)


def _compensated(pen: Pen, in_finish: bool) -> None:
    outside, towards = pen.rng.random() < 0.7, pen.rng.random() < 0.8
    frame = Frame(False, 1 if towards else -1, 1 if outside else -1)
    pen.nose = pen.rng.choice([0.4, 0.8, 1.2])
    pen.tip = pen.rng.choice([{(1, 1): 3, (1, -1): 2, (-1, 1): 4, (-1, -1): 1}[frame.sz, frame.sr]] * 3 + [8, 7, 6, 9])
    side = 1 if frame.turns else -1
    pieces = _bent(pen)
    height = max(piece.r1 for piece in pieces)
    base = pen.size(5, 12) if outside else height + pen.size(5, 10)
    shape = placed(pieces, frame, pen.size(0, 2), base)
    sign = 1 if outside else -1
    xs, zs = 2 * (shape[0].r0 + sign * pen.size(3, 6)), shape[0].z0 + frame.sz * pen.size(3, 6)
    opening, path = compensated(shape, side, pen.mm(pen.nose), pen.tip)
    away = 2 * (shape[-1].r1 + sign * pen.size(3, 6)), shape[-1].z1
    comp = pen.g("G42" if side < 0 else "G41")
    pen.start(xs, zs)
    if in_finish:
        _finish_compensated(pen, shape, [opening, *chain(*path)], comp, away, xs, zs)
        return
    if pen.rng.random() < 0.3:
        pen.write(comp)
        comp = ""
    mode = pen.rng.choice(["G0", "G1", "G1"])
    words = pen.axes(2 * shape[0].r0, shape[0].z0)
    pen.write(comp, pen.g(mode), *words, pen.feed_word(0.1))
    pen.note(opening if mode == "G1" else opening._replace(kind="R"))
    for piece, steps in zip(shape, path, strict=True):
        code = pen.g({"F": "G1", "CW": "G2", "CCW": "G3"}[piece.kind])
        centre = pen.arc_words(piece) if piece.is_arc else []
        pen.write(code, *pen.axes(2 * piece.r1, piece.z1), *centre)
        pen.note(*steps)
    words = pen.axes(away[0], None)
    pen.write("G40", pen.g("G1"), *words)
    pen.note(Step("F", away[0], away[1]))
    pen.rapid(pen.size(120, 150), 50.0)


def _bent(pen: Pen) -> list[Piece]:
    """A contour with every sort of corner, from (0, 0) towards -z."""
    pieces: list[Piece] = [Piece("F", 0.0, 0.0, -pen.size(3, 6), pen.size(1, 5))]
    for _ in range(pen.rng.randint(2, 5)):
        z, r = pieces[-1].z1, pieces[-1].r1
        dz, dr = pen.size(4, 10), pen.size(3, 6)
        kind = pen.rng.choice(["cylinder", "taper", "shoulder", "fillet", "round", "dip", "hollow", "ball"])
        if kind == "cylinder":
            pieces.append(Piece("F", z, r, z - dz, r))
        elif kind == "taper":
            pieces.append(Piece("F", z, r, z - dz, r + dr))
        elif kind == "shoulder":
            pieces += [Piece("F", z, r, z - dz, r), Piece("F", z - dz, r, z - dz, r + dr)]
        elif kind == "fillet":
            pieces += [Piece("F", z, r, z - dz, r), arc("CW", z - dz, r, z - dz - dr, r + dr, dr)]
            z, r = pieces[-1].z1, pieces[-1].r1
            pieces.append(Piece("F", z, r, z, r + dr))
        elif kind == "round":
            pieces += [
                Piece("F", z, r, z, r + dr),
                arc("CCW", z, r + dr, z - dr, r + 2 * dr, dr),
                Piece("F", z - dr, r + 2 * dr, z - dr - dz, r + 2 * dr),
            ]
        elif kind == "dip":  # an acute corner to go round: out along a face, back down a falling flank
            pieces += [Piece("F", z, r, z, r + 2 * dr), Piece("F", z, r + 2 * dr, z - 2 * dr, r + dr * 1.5)]
            z, r = pieces[-1].z1, pieces[-1].r1
            pieces.append(Piece("F", z, r, z - dz, r))
        else:  # an arc that meets its neighbours at an angle
            turn = "CW" if kind == "hollow" else "CCW"
            pieces += [Piece("F", z, r, z - dz, r), arc(turn, z - dz, r, z - 2 * dz, r + dr, round(dz * 1.5, 3))]
            z, r = pieces[-1].z1, pieces[-1].r1
            pieces.append(Piece("F", z, r, z - dz, r + (dr if kind == "hollow" else 0.0)))
    z, r = pieces[-1].z1, pieces[-1].r1
    return [*pieces, Piece("F", z, r, z, r + pen.size(3, 5))]


def _finish_compensated(
    pen: Pen, pieces: Sequence[Piece], steps: list[Step], comp: str, away: tuple[float, float], xs: float, zs: float
) -> None:
    """Compensation on in ns and off in nf."""
    numbers = (10, 20)
    mode = pen.rng.choice(["G0", "G1"])
    opening = Step("R" if mode == "G0" else "F", steps[0].x, steps[0].z)
    pen.write(pen.g("finish"), "P10", "Q20")
    pen.note(opening, *steps[1:], Step("F", away[0], away[1]), Step("R", xs, zs))
    pen.write("M30")
    words = pen.axes(2 * pieces[0].r0, pieces[0].z0)
    pen.write(comp, pen.g(mode), *words, n=numbers[0])
    for piece in pieces:
        code = pen.g({"F": "G1", "CW": "G2", "CCW": "G3"}[piece.kind])
        centre = pen.arc_words(piece) if piece.is_arc else []
        words = pen.axes(2 * piece.r1, piece.z1)
        pen.write(code, *words, *centre)
    words = pen.axes(away[0], None)
    pen.write("G40", pen.g("G1"), *words, n=numbers[1])
