"""Random single cycles, threads, pecking and drilling. Bounds are in mm."""

from __future__ import annotations

from tests.interpret.reference.pen import Pen
from tests.interpret.reference.steps import Step
from tests.interpret.reference.strokes import (
    Drill,
    Peck,
    RunOut,
    Thread,
    box,
    drilling,
    face,
    passes,
    peck_along_x,
    peck_along_z,
    stroke,
    thread,
)


def single_cycle(pen: Pen) -> None:
    """Single turning and facing cycles, straight and tapered, repeated by lone words."""
    xs, zs = pen.size(60, 80), pen.size(1, 5)
    pen.start(xs, zs)
    for _ in range(pen.rng.randint(1, 2)):
        kind = pen.rng.choice(["box", "face"])
        make = box if kind == "box" else face
        x, z = (pen.size(40, 58), -pen.size(5, 40)) if kind == "box" else (pen.size(10, 40), -pen.size(0, 3))
        taper = pen.rng.choice([0.0, -pen.size(0.5, 4), pen.size(0.1, 0.4)])
        words = far_corner(pen, xs, zs, x, z)
        if taper:
            words.append("R" + pen.number(taper))
        pen.write(pen.g(kind), *words, pen.feed_word(pen.size(0.1, 0.4, 0.01)))
        pen.note(*make(xs, zs, x, z, taper))
        for _ in range(pen.rng.randint(0, 3)):
            if kind == "box":
                x = x - pen.size(1, 6)
                words = [pen.x_word(x)] if not pen.incremental else [pen.x_word(x - xs)]
            else:
                z = z - pen.size(0.5, 2)
                words = ["Z" + pen.number(z)] if not pen.incremental else ["Z" + pen.number(z - zs)]
            pen.write(*words)
            pen.note(*make(xs, zs, x, z, taper))
        if taper:  # the next cycle starts without the taper of this one
            pen.rapid(xs, zs, steady=True)
            pen.write(pen.g("G1"), pen.x_word(xs) if not pen.incremental else pen.x_word(0.0))
            pen.note(Step("F", xs, zs))
    pen.rapid(pen.size(80, 120), pen.size(20, 50))


def far_corner(pen: Pen, xs: float, zs: float, x: float, z: float) -> list[str]:
    """Words to the far corner of a cycle; the pen stays where it is."""
    words = pen.axes(x, z)
    pen.x, pen.z = xs, zs
    return words


def thread_cycle(pen: Pen) -> None:
    """Single thread cycle: straight, tapered, run-out, in and outside."""
    inside = pen.rng.random() < 0.3
    leads = pen.rng.choice([0.0, 0.0, 1.0, 0.5, 1.2])
    angle_of = pen.rng.choice([45.0, 45.0, 30.0])
    pen.settings |= {"thread_run_out": leads, "thread_run_out_angle": angle_of}
    lead = pen.size(1, 3, 0.25)
    x = pen.size(20, 40)
    xs = x - pen.size(10, 14) if inside else x + pen.size(12, 16)
    zs, z = pen.size(4, 8), -pen.size(15, 40)
    if pen.rng.random() < 0.15:
        zs, z = z, zs
    taper = pen.rng.choice([0.0, 0.0, -pen.size(0.2, 1.5), pen.size(0.2, 1.0)])
    run_out = RunOut(leads * lead, angle_of)
    pen.start(xs, zs)
    words = far_corner(pen, xs, zs, x, z)
    pen.write(pen.g("thread"), *words, *(["R" + pen.number(taper)] if taper else []), pen.feed_word(lead))
    pen.note(*thread(xs, zs, x, z, taper, run_out))
    for _ in range(pen.rng.randint(0, 3)):
        x += pen.size(0.1, 0.5) if inside else -pen.size(0.1, 0.5)
        pen.write(pen.x_word(x - xs if pen.incremental else x))
        pen.note(*thread(xs, zs, x, z, taper, run_out))
    pen.rapid(None, 60.0)


def pecking_z(pen: Pen) -> None:
    """Pecking along Z: on centre, and face grooves with steps and relief."""
    single = pen.rng.random() < 0.4
    zs, z = pen.size(1, 5), -pen.size(3, 30)
    xs = 0.0 if single and pen.rng.random() < 0.7 else pen.size(40, 60)
    x = None if single else xs + pen.rng.choice([-1, 1]) * pen.size(4, 14)
    peck = pen.rng.choice([None, pen.size(2, 12), pen.size(2, 12)])
    _peck(pen, "peck z", xs, zs, x, z, peck, None if single else pen.size(1, 4))


def pecking_x(pen: Pen) -> None:
    """Pecking along X: single and wide grooves, in and outside."""
    single = pen.rng.random() < 0.3
    inside = pen.rng.random() < 0.3
    xs = pen.size(40, 60)
    x = xs + (1 if inside else -1) * pen.size(4, 20)
    zs = -pen.size(10, 30)
    z = None if single else zs + pen.rng.choice([-1, 1]) * pen.size(2, 14)
    peck = pen.rng.choice([None, pen.size(1, 4), pen.size(1, 4)])
    _peck(pen, "peck x", xs, zs, x, z, peck, None if single else pen.size(1, 3))


def _peck(
    pen: Pen, name: str, xs: float, zs: float, x: float | None, z: float | None, peck: float | None, step: float | None
) -> None:
    pen.start(xs, zs)
    retract = pen.size(0.2, 1.0)
    relief = pen.rng.choice([0.0, pen.size(0.1, 0.3)]) if step is not None else 0.0
    if pen.rng.random() < 0.8:
        pen.write(pen.g(name), "R" + pen.number(retract))
    else:
        pen.settings["peck_retract"] = retract * (25.4 if pen.inch else 1.0)
    words = pen.axes(x, z)
    pen.x, pen.z = xs, zs
    along, across = (peck, step) if name == "peck x" else (step, peck)
    if along is not None:
        words.append("P" + pen.counted(along))
    if across is not None:
        words.append("Q" + pen.counted(across))
    if relief:
        words.append("R" + pen.number(relief))
    pen.write(pen.g(name), *words, pen.feed_word(0.1))
    if name == "peck z":
        last = None if x is None else x / 2
        pen.note(*peck_along_z(xs, zs, Peck(z or 0.0, peck, last, step, retract, relief)))
    else:
        pen.note(*peck_along_x(xs, zs, Peck((x or 0.0) / 2, peck, z, step, retract, relief)))
    pen.rapid(pen.size(80, 100), None)


def multi_pass(pen: Pen) -> None:
    """Multi-pass threads in two blocks."""
    inside = pen.rng.random() < 0.3
    lead = pen.size(1, 4, 0.25)
    height = pen.size(0.6, 2.4, 0.01)
    x = pen.size(20, 40)
    xs = x - 2 * height - pen.size(4, 8) if inside else x + 2 * height + pen.size(4, 8)
    zs, z = pen.size(6, 10), -pen.size(15, 40)
    tenths = pen.rng.choice([0, 0, 10, 5, 12])
    taper = pen.rng.choice([0.0, 0.0, -pen.size(0.2, 1.5), pen.size(0.2, 1.0)])
    allowance = pen.rng.choice([0.0, pen.size(0.02, 0.08, 0.01)])
    finishing, flank = pen.rng.randint(1, 3), pen.rng.choice([80, 60, 55, 30, 29, 0])
    first, least = pen.size(0.2, 0.5, 0.01), pen.size(0, 0.1, 0.01)
    words = Thread(x, z, height, first, least, allowance, finishing, flank, taper)
    shift = pen.rng.choice(["lead", "lead", "root", "none"])
    pen.settings["thread_shift"] = shift
    run_out = RunOut(tenths / 10 * lead)
    if run_out.length > abs(xs - x) / 2 - height:
        run_out = RunOut()
        tenths = 0
    pen.start(xs, zs)
    code = pen.g("passes")
    pen.write(code, f"P{words.finishing:02d}{tenths:02d}{words.angle:02d}", "Q" + pen.counted(words.least),
              "R" + pen.number(words.allowance))  # fmt: skip
    places = far_corner(pen, xs, zs, x, z)
    pen.write(code, *places, *(["R" + pen.number(taper)] if taper else []), "P" + pen.counted(height),
              "Q" + pen.counted(words.first), pen.feed_word(lead))  # fmt: skip
    pen.note(*passes(xs, zs, words, run_out, shift))
    pen.rapid(None, pen.size(50, 80))


def one_block_thread(pen: Pen) -> None:
    """Multi-pass threads in one block, infeed laws 1 and 3."""
    inside = pen.rng.random() < 0.3
    lead = pen.size(1, 3, 0.25)
    height = pen.size(0.6, 2.0, 0.01)
    x = pen.size(20, 40)
    xs = x - 2 * height - pen.size(6, 8) if inside else x + 2 * height + pen.size(6, 8)
    zs, z = pen.size(6, 10), -pen.size(15, 40)
    taper = pen.rng.choice([0.0, 0.0, -pen.size(0.2, 1.5)])
    method = pen.rng.choice([1, 3])
    words = Thread(
        x, z, height, pen.size(0.2, 0.5, 0.01), angle=pen.rng.choice([60, 55, 0]), taper=taper, method=method
    )
    pen.start(xs, zs)
    places = far_corner(pen, xs, zs, x, z)
    pen.write(
        pen.g("passes"), *places, *(["I" + pen.number(taper)] if taper else []), "K" + pen.number(height),
        "D" + pen.counted(words.first), f"A{words.angle:g}", *([f"P{method}"] if method != 1 else []),
        pen.feed_word(lead),
    )  # fmt: skip
    pen.note(*passes(xs, zs, words, RunOut()))
    pen.rapid(None, pen.size(50, 80))


def strokes(pen: Pen) -> None:
    """Threads block by block, joined and tapered."""
    xs, zs = pen.size(30, 40), pen.size(4, 8)
    pen.start(xs, zs)
    for _ in range(pen.rng.randint(1, 3)):
        pen.rapid(xs - pen.size(1, 8), None)
        x, z = pen.x, -pen.size(10, 30)
        words = pen.axes(None if pen.rng.random() < 0.5 else x, z)
        pen.write(pen.g("stroke"), *words, pen.feed_word(pen.size(1, 3, 0.25)))
        pen.note(*stroke(xs, zs, x, z, 0.0, RunOut()))
        if pen.rng.random() < 0.5:
            words = pen.axes(pen.x + pen.size(0.5, 4), pen.z - pen.size(3, 8))
            pen.write(*words)
            pen.note(Step("T", pen.x, pen.z))
        pen.rapid(xs, None)
        pen.rapid(None, zs)


def holes(pen: Pen) -> None:
    """Drilling, tapping and boring on the axis."""
    kind, code = pen.rng.choice([("drill", "G83"), ("drill", "G83"), ("tap", "G84"), ("bore", "G85")])
    x = 0.0 if kind != "bore" else pen.size(10, 20)
    initial, level, z = pen.size(8, 30), pen.size(1, 4), -pen.size(8, 50)
    peck = pen.rng.choice([None, pen.size(4, 15)]) if kind == "drill" else None
    full = pen.rng.random() < 0.3
    back = pen.size(0.2, 1.0) if pen.rng.random() < 0.3 else pen.mm(0.5)
    if abs(back - pen.mm(0.5)) > 1e-9:
        pen.settings["drill_retract"] = back * (25.4 if pen.inch else 1.0)
    if full:
        pen.settings["peck"] = "full retract"
    pen.start(x, initial)
    words = []
    to_level = False
    if pen.system == "A":
        words = ["Z" + pen.number(z), "R" + pen.number(level - initial)]
    else:
        words += pen.absolute()
        to_level = pen.rng.random() < 0.5
        words += [pen.rng.choice(["G99"]) if to_level else "G98", "Z" + pen.number(z), "R" + pen.number(level)]
    if peck is not None:
        words.append("Q" + pen.counted(peck))
    if pen.rng.random() < 0.3:
        words.append("P200")
    hole = Drill(kind, x, z, level, peck, full, back, to_level)
    pen.write(code, *words, pen.feed_word(pen.size(0.5, 1.5, 0.25)))
    pen.note(*drilling(initial, x, hole, pen.feed))
    pen.write("G80")
    pen.z = level if to_level else initial
    pen.rapid(pen.size(80, 100), pen.size(60, 100))
