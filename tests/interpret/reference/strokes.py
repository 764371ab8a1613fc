"""Single cycles, threads, pecking and drilling as lists of steps (trade knowledge of the code tables, from memory)."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from math import copysign, radians, sqrt, tan

from tests.interpret.reference.steps import NEAR, Step


def box(xs: float, zs: float, x: float, z: float, taper: float) -> list[Step]:
    """Single turning cycle."""
    return [Step("R", x + 2 * taper, zs), Step("F", x, z), Step("F", xs, z), Step("R", xs, zs)]


def face(xs: float, zs: float, x: float, z: float, taper: float) -> list[Step]:
    """Single facing cycle."""
    return [Step("R", xs, z + taper), Step("F", x, z), Step("F", x, zs), Step("R", xs, zs)]


@dataclass(frozen=True)
class RunOut:
    """Length of the run-out and its angle."""

    length: float = 0.0
    angle: float = 45.0


def stroke(xs: float, zs: float, x: float, z: float, slope: float, run_out: RunOut) -> list[Step]:
    """The threading stroke to (x, z) from Z `zs`; slope is the change of X per mm of Z."""
    if run_out.length < NEAR:
        return [Step("T", x, z)]
    back = copysign(run_out.length, zs - z)
    turn = x + slope * back
    out = copysign(2 * run_out.length * tan(radians(run_out.angle)), xs - x)
    return [Step("T", turn, z + back), Step("T", turn + out, z)]


def thread(xs: float, zs: float, x: float, z: float, taper: float, run_out: RunOut) -> list[Step]:
    """Single thread cycle."""
    slope = 2 * taper / (zs - z)
    return [
        Step("R", x + 2 * taper, zs),
        *stroke(xs, zs, x, z, slope, run_out),
        Step("R", xs, z),
        Step("R", xs, zs),
    ]


@dataclass(frozen=True)
class Thread:
    """Words of the multi-pass thread cycle."""

    x: float
    z: float
    height: float
    first: float
    least: float = 0.0
    allowance: float = 0.0
    finishing: int = 1
    angle: float = 60.0
    taper: float = 0.0
    method: int = 1


def depths(words: Thread) -> list[float]:
    """Depth of each pass: constant chip area (1, 2) or constant depth (3, 4), then the finishing passes."""
    found: list[float] = []
    end = words.height - words.allowance
    while not found or found[-1] < end - NEAR:
        n = len(found) + 1
        before = found[-1] if found else 0.0
        wanted = words.first * (sqrt(n) if words.method in (1, 2) else n)
        found.append(min(end, max(wanted, before + words.least)))
    return found + [words.height] * words.finishing


def passes(xs: float, zs: float, words: Thread, run_out: RunOut, shift: str = "lead") -> list[Step]:
    """All passes of the multi-pass thread cycle."""
    steps = []
    inside = xs < words.x
    slope = 2 * words.taper / (zs - words.z)
    for depth in depths(words):
        x = words.x - 2 * (words.height - depth) if inside else words.x + 2 * (words.height - depth)
        lean = tan(radians(words.angle / 2))
        lead = {"lead": depth * lean, "root": -(words.height - depth) * lean, "none": 0.0}[shift]
        start = zs + copysign(1, words.z - zs) * lead
        if abs(start - zs) > NEAR:
            steps.append(Step("R", xs, start))
        steps += [
            Step("R", x + slope * (start - words.z), start),
            *stroke(xs, zs, x, words.z, slope, run_out),
            Step("R", xs, words.z),
            Step("R", xs, zs),
        ]
    return steps


def _towards(start: float, end: float, size: float | None) -> Iterable[float]:
    """Positions from start to end in steps of a size, the end always among them."""
    if not size:
        yield end
        return
    way = copysign(size, end - start)
    place = start + way
    while abs(place - start) < abs(end - start) - NEAR:
        yield place
        place += way
    yield end


@dataclass(frozen=True)
class Peck:
    """Words of the pecking cycles in their own plane: along the pecks, across the steps."""

    end: float
    peck: float | None
    last: float | None = None  # position across of the last column
    step: float | None = None
    retract: float = 0.5
    relief: float = 0.0


def pecking(start: float, across: float, words: Peck) -> list[tuple[str, float, float]]:
    """Columns of pecks: (kind, along, across) with both as plain lengths."""
    columns = [across]
    if words.last is not None and abs(words.last - across) > NEAR:
        columns += list(_towards(across, words.last, words.step))
    steps = []
    back = copysign(words.retract, start - words.end)
    for number, column in enumerate(columns):
        if number:
            steps.append(("R", start, column))
        for place in _towards(start, words.end, words.peck):
            steps.append(("F", place, column))
            if abs(place - words.end) > NEAR:
                steps.append(("R", place + back, column))
        out = column
        if words.relief and words.last is not None:
            out = column - copysign(words.relief, words.last - across)
            steps.append(("R", words.end, out))
        steps.append(("R", start, out))
    if len(columns) > 1 or abs(steps[-1][2] - across) > NEAR:
        steps.append(("R", start, across))
    return steps


def peck_along_z(xs: float, zs: float, words: Peck) -> list[Step]:
    """Pecking along Z: across is a radius."""
    return [Step(kind, 2 * across, along) for kind, along, across in pecking(zs, xs / 2, words)]


def peck_along_x(xs: float, zs: float, words: Peck) -> list[Step]:
    """Pecking along X: along is a radius."""
    return [Step(kind, 2 * along, across) for kind, along, across in pecking(xs / 2, zs, words)]


@dataclass(frozen=True)
class Drill:
    """A drilling cycle: kind drill, tap or bore."""

    kind: str
    x: float
    z: float
    level: float
    peck: float | None = None
    full: bool = False
    retract: float = 0.5
    to_level: bool = False  # returns to the R level only


def drilling(initial: float, x_before: float, words: Drill, feed: float, out_factor: float = 2.0) -> list[Step]:
    """One hole; a boring tool comes out at a multiple of its feed."""
    steps = [] if abs(words.x - x_before) < NEAR else [Step("R", words.x, initial)]
    steps.append(Step("R", words.x, words.level))
    if words.kind == "tap":
        steps += [Step("T", words.x, words.z), Step("T", words.x, words.level)]
    elif words.kind == "bore":
        steps += [Step("F", words.x, words.z), Step("F", words.x, words.level, feed=out_factor * feed)]
    else:
        steps += [*_pecks(words), Step("R", words.x, words.level)]
    return steps if words.to_level else [*steps, Step("R", words.x, initial)]


def _pecks(words: Drill) -> Iterable[Step]:
    back = copysign(words.retract, words.level - words.z)
    for place in _towards(words.level, words.z, words.peck):
        yield Step("F", words.x, place)
        if abs(place - words.z) > NEAR:
            if words.full:
                yield Step("R", words.x, words.level)
            yield Step("R", words.x, place + back)
