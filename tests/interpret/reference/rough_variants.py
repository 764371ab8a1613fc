"""Random roughing, repeating and finishing, written by a pen and meant by the reference. Bounds are in mm."""

from __future__ import annotations

from tests.interpret.reference.contours import placed, pocketed, rising
from tests.interpret.reference.nose import compensated
from tests.interpret.reference.pen import Pen
from tests.interpret.reference.roughing import Contour, Rough, finish, pattern, rough
from tests.interpret.reference.steps import Frame, Piece, Step


def _rough_words(pen: Pen, outside: bool, towards: bool) -> Rough:
    du = pen.rng.choice([0.0, pen.size(0.2, 1.0, 0.1)]) * (1 if outside else -1)
    dw = pen.rng.choice([0.0, pen.size(0.05, 0.3, 0.05)]) * (1 if towards else -1)
    retract = pen.size(0.2, 1.0, 0.1)
    return Rough(pen.size(0.8, 3.0, 0.05), retract, du, dw)


def roughing(pen: Pen) -> None:
    """Rough turning type I: four directions, both forms, with finishing behind it."""
    _roughing(pen, facing=False)


def rough_facing(pen: Pen) -> None:
    """Rough facing type I."""
    _roughing(pen, facing=True)


def _roughing(pen: Pen, facing: bool) -> None:
    outside, towards = pen.rng.random() < 0.6, pen.rng.random() < 0.75
    words = _rough_words(pen, outside, towards)
    pieces = rising(pen, 0.0, 0.0, pen.rng.randint(1, 4))
    reach, height = -pieces[-1].z1, pieces[-1].r1
    ahead, above = pen.size(1, 4), pen.size(0.5, 4)
    # in the frame: contour from (0, 0) falls in z and rises in r; the start stands at z = ahead, r = height + above
    if facing:
        frame = Frame(True, 1 if outside else -1, 1 if towards else -1)
        # frame z is the real radius: outside cuts fall in r
        base_r = pen.size(3, 10) + reach if outside else pen.size(8, 15) + reach
        base_z = -pen.size(20, 40)
    else:
        frame = Frame(False, 1 if towards else -1, 1 if outside else -1)
        base_r = pen.size(5, 15) if outside else height + above + pen.size(5, 10)
        base_z = pen.size(-2, 2)
    first = frame.back(Step("R", 0.0, 0.0))
    corner = frame.back(Step("R", 2 * (height + above), ahead))
    ns = frame.back(Step("R", 0.0, ahead))
    assert (first.x, first.z) == (0, 0)
    zs, rs = round(corner.z + base_z, 6), round(corner.x / 2 + base_r, 6)
    mode = pen.rng.choice(["R", "F"])
    start_piece = Piece("F", ahead, 0.0, 0.0, 0.0)
    shape = placed([start_piece, *pieces], frame, base_z, base_r)
    contour = Contour(mode, round(ns.z + base_z, 6), round(ns.x / 2 + base_r, 6), shape)
    pen.start(2 * rs, zs)
    numbers = _call(pen, "rough face" if facing else "rough", words, "W" if facing else "U")
    pen.note(*rough(zs, rs, contour, words, facing, pockets=False))
    side = 1 if frame.turns else -1
    on, off = _compensation(pen, contour, side)
    pen.contour(contour, numbers, with_z=facing, with_x=not facing, first=on, last=off)
    pen.x, pen.z = 2 * rs, zs
    _after_rough(pen, contour, numbers, zs, rs, side if on else 0)


def _compensation(pen: Pen, contour: Contour, side: int) -> tuple[list[str], list[str]]:
    """Now and then G41 or G42 in block ns and G40 in nf, which acts in the finishing cycle alone."""
    tight = any(piece.is_arc and piece.radius < 2 * pen.mm(0.4) for piece in contour.pieces)
    if tight or pen.rng.random() < 0.6:
        return [], []
    pen.nose, pen.tip = 0.4, pen.rng.choice([1, 2, 3, 4, 8])
    return [pen.g("G42" if side < 0 else "G41")], ["G40"]


def _after_rough(pen: Pen, contour: Contour, numbers: tuple[int, int], zs: float, rs: float, side: int = 0) -> None:
    """The finishing cycle now and then, compensated when the contour says so, and away."""
    if pen.rng.random() < 0.5:
        pen.write(pen.g("finish"), f"P{numbers[0]}", f"Q{numbers[1]}")
        steps = finish(zs, rs, contour)
        if not side:
            pen.note_finish(*([step] for step in steps))
        else:
            opening, path = compensated(contour.pieces[:-1], side, pen.mm(pen.nose), pen.tip)
            pen.note_finish([opening._replace(kind=contour.mode)], *path, *([step] for step in steps[-2:]))
    pen.rapid(None, pen.size(50, 90), always=True)


def _call(pen: Pen, name: str, words: Rough, depth_letter: str, two_block: bool | None = None) -> tuple[int, int]:
    """The cycle's own blocks, two-block or one-block form."""
    numbers = pen.rng.choice([(10, 20), (70, 130), (100, 101), (1, 99)])
    code = pen.g(name)
    two = pen.rng.random() < 0.7 if two_block is None else two_block
    allowances = [pen.x_word(words.du, "U"), "W" + pen.number(words.dw)]
    if words.du == 0 and pen.rng.random() < 0.3:
        allowances = allowances[1:]
    if not two:
        pen.settings["rough_retract"] = words.retract * (25.4 if pen.inch else 1.0)
    if two:
        pen.write(code, depth_letter + pen.number(words.depth), "R" + pen.number(words.retract))
        pen.write(code, f"P{numbers[0]}", f"Q{numbers[1]}", *allowances, pen.feed_word(pen.size(0.1, 0.4, 0.01)))
    else:
        pen.write(
            code, f"P{numbers[0]}", f"Q{numbers[1]}", *allowances, "D" + pen.counted(words.depth),
            pen.feed_word(pen.size(0.1, 0.4, 0.01)),
        )  # fmt: skip
    return numbers


def pockets(pen: Pen) -> None:
    """Rough turning type II with pockets, out- and inside."""
    _pockets(pen, facing=False)


def face_pockets(pen: Pen) -> None:
    """Rough facing type II."""
    _pockets(pen, facing=True)


def _pockets(pen: Pen, facing: bool) -> None:
    outside, towards = pen.rng.random() < 0.7, pen.rng.random() < 0.8
    words = _rough_words(pen, outside, towards)
    odd = 0.0003 if pen.inch else 0.007  # no level on a cylinder of the contour: whether it cuts there is open
    words = Rough(words.depth + odd, words.retract, 0.0 if facing else words.du, words.dw if facing else 0.0)
    pieces = pocketed(pen, 0.0, 0.0, pen.rng.randint(1, 3))
    reach, height = -pieces[-1].z1, max(piece.r1 for piece in pieces)
    low = min(0.0, *(piece.cr - piece.radius for piece in pieces if piece.is_arc), *(p.r1 for p in pieces))
    ahead, above = pen.size(1, 4), pen.size(0.5, 3)
    if facing:
        frame = Frame(True, 1 if outside else -1, 1 if towards else -1)
        base_r = pen.size(3, 10) + reach if outside else pen.size(8, 15) + reach
        base_z = -pen.size(20, 40)
    else:
        frame = Frame(False, 1 if towards else -1, 1 if outside else -1)
        base_r = pen.size(5, 15) - low if outside else height + above + pen.size(5, 10)
        base_z = pen.size(-2, 2)
    corner = frame.back(Step("R", 2 * (height + above), ahead))
    ns = frame.back(Step("R", 0.0, ahead))
    zs, rs = round(corner.z + base_z, 6), round(corner.x / 2 + base_r, 6)
    shape = placed([Piece("F", ahead, 0.0, 0.0, 0.0), *pieces], frame, base_z, base_r)
    contour = Contour("R", round(ns.z + base_z, 6), round(ns.x / 2 + base_r, 6), shape)
    pen.start(2 * rs, zs)
    numbers = _call(pen, "rough face" if facing else "rough", words, "W" if facing else "U")
    pen.note(*rough(zs, rs, contour, words, facing, pockets=True))
    pen.contour(contour, numbers, with_z=True, with_x=True)
    pen.x, pen.z = 2 * rs, zs
    _after_rough(pen, contour, numbers, zs, rs)


def repeating(pen: Pen) -> None:
    """Pattern repeating."""
    outside = pen.rng.random() < 0.7
    frame = Frame(False, 1, 1 if outside else -1)
    pieces = rising(pen, 0.0, 0.0, pen.rng.randint(1, 4))
    height = pieces[-1].r1
    base_r = pen.size(6, 12) if outside else height + pen.size(8, 12)
    shape = placed([Piece("F", pen.mm(1.0) if not pen.inch else 0.04, 0.0, 0.0, 0.0), *pieces], frame, 0.0, base_r)
    contour = Contour(pen.rng.choice(["R", "F"]), shape[0].z0, shape[0].r0, shape)
    zs, rs = pen.size(3, 8), base_r + frame.sr * (height + pen.size(2, 6))
    words = Rough(
        0.0, 0.0, frame.sr * pen.rng.choice([0.0, pen.size(0.2, 1)]), pen.rng.choice([0.0, pen.size(0.05, 0.3, 0.05)])
    )
    shift = (pen.rng.choice([0.0, pen.size(1, 4)]), frame.sr * pen.size(1, 5))
    count = pen.rng.randint(1, 5)
    step_in = pen.rng.random() < 0.2
    if step_in:
        pen.settings["pattern_first_pass"] = "one step in"
    pen.start(2 * rs, zs)
    numbers = pen.rng.choice([(10, 20), (70, 130)])
    code = pen.g("pattern")
    pen.write(code, "U" + pen.number(shift[1]), "W" + pen.number(shift[0]), f"R{count}")
    pen.write(code, f"P{numbers[0]}", f"Q{numbers[1]}", pen.x_word(words.du, "U"), "W" + pen.number(words.dw),
              pen.feed_word(0.2))  # fmt: skip
    pen.note(*pattern(zs, rs, contour, words, shift, count, step_in))
    pen.contour(contour, numbers, with_z=True, with_x=True)
    pen.x, pen.z = 2 * rs, zs
    _after_rough(pen, contour, numbers, zs, rs)
