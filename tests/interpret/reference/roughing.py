"""Rough turning, rough facing, pattern repeating and finishing as lists of steps.

Rules (trade knowledge of the code tables, from memory): levels count from the start shifted by the allowances, the
last layer goes with the profile pass, 45 degree escape at rapid, type II depth first with the nearest stretch first,
walls followed up to the level before, pockets entered by a plunge at their near end.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field

from tests.interpret.reference.steps import NEAR, Frame, Piece, Step, risers


@dataclass(frozen=True)
class Contour:
    """Blocks ns..nf: the mode of ns (R or F), where it ends, and the pieces behind it."""

    mode: str
    z: float
    r: float
    pieces: tuple[Piece, ...]

    def moved(self, dz: float, dr: float) -> Contour:
        return Contour(self.mode, self.z + dz, self.r + dr, tuple(piece.moved(dz, dr) for piece in self.pieces))

    def placed(self, frame: Frame) -> Contour:
        return Contour(self.mode, *frame(self.z, self.r), tuple(piece.placed(frame) for piece in self.pieces))

    def end(self) -> tuple[float, float]:
        return self.pieces[-1].z1, self.pieces[-1].r1

    def steps(self) -> list[Step]:
        return [Step(self.mode, 2 * self.r, self.z), *(piece.step() for piece in self.pieces)]


@dataclass(frozen=True)
class Rough:
    """The words of a roughing cycle: depth and retract, allowances (X as a diameter), all as programmed."""

    depth: float
    retract: float
    du: float
    dw: float


def finish(z: float, r: float, contour: Contour) -> list[Step]:
    """The contour once as written, then straight back."""
    return [*contour.steps(), Step("R", 2 * r, z)]


def pattern(
    z: float, r: float, contour: Contour, words: Rough, shift: tuple[float, float], passes: int, step_in: bool = False
) -> list[Step]:
    """The contour again and again, nearer by equal shifts (dk, di)."""
    steps = []
    for number in range(1, passes + 1):
        share = (passes - number) / (passes if step_in else passes - 1) if passes > 1 else 0.0
        dz, dr = share * shift[0] + words.dw, share * shift[1] + words.du / 2
        steps += [Step("R", 2 * (r + dr), z + dz), *contour.moved(dz, dr).steps()]
    return [*steps, Step("R", 2 * r, z)]


def rough(z: float, r: float, contour: Contour, words: Rough, facing: bool, pockets: bool) -> list[Step]:
    """Roughing along Z, or along X for facing; `pockets` is type II."""
    frame = _frame(z, r, contour, facing)
    cz, cr = frame(z + words.dw, r + words.du / 2)
    shape = contour.moved(words.dw, words.du / 2).placed(frame)
    path = _Pockets(cz, cr, shape, words).steps() if pockets else _levels(cz, cr, shape, words)
    first = Step("R", 2 * r + words.du, z + words.dw)
    return [first, *(frame.back(step) for step in path), Step("R", 2 * r, z)]


def _frame(z: float, r: float, contour: Contour, facing: bool) -> Frame:
    """The frame in which depth goes towards -r and cuts go towards -z."""
    end_z, end_r = contour.end()
    if facing:
        along, across = end_r - r, contour.z - z
    else:
        along, across = end_z - z, contour.r - r
    return Frame(facing, 1 if along < 0 else -1, 1 if across < 0 else -1)


def _levels(cz: float, cr: float, shape: Contour, words: Rough) -> list[Step]:
    steps = []
    level = cr - words.depth
    while level > shape.r + NEAR:
        stop = _reached(shape.pieces, level)
        steps += [Step(shape.mode, 2 * level, cz), Step("F", 2 * level, stop)]
        level += words.retract
        steps += [Step("R", 2 * level, stop + words.retract), Step("R", 2 * level, cz)]
        level -= words.retract + words.depth
    return [*steps, *shape.steps()]


def _reached(pieces: Sequence[Piece], level: float) -> float:
    """Z of the first point of a rising contour at a level."""
    for piece in risers(pieces):
        if piece.r1 > level - NEAR:
            return piece.z_at(level)
    return pieces[-1].z1


@dataclass(frozen=True)
class Stretch:
    """Where a level lies outside the contour: from near to far, and the piece that closes it."""

    near: float
    far: float
    wall: int | None


@dataclass
class _Pockets:
    """Type II: depth first, nearest stretch first."""

    cz: float
    cr: float
    shape: Contour
    words: Rough
    path: list[Step] = field(default_factory=list)
    parent: Stretch | None = None  # the stretch cut last

    def steps(self) -> list[Step]:
        self.rising = risers(self.shape.pieces)
        for stretch in self.stretches(1):
            self.visit(1, stretch, None)
        if self.path and abs(self.path[-1].z - self.cz) > NEAR:
            self.clear(self.path[-1].z)
            self.go(self.path[-1].x / 2, self.cz)
        return [*self.path, *self.shape.steps()]

    def go(self, r: float, z: float, kind: str = "R") -> None:
        self.path.append(Step(kind, 2 * r, z))

    def level(self, k: int) -> float:
        return self.cr - k * self.words.depth

    def stretches(self, k: int) -> list[Stretch]:
        level = self.level(k)
        found = []
        start = self.cz if self.shape.r < level - NEAR else None
        for number, piece in enumerate(self.rising):
            below, ends_below = piece.r0 < level - NEAR, piece.r1 < level - NEAR
            if below and not ends_below:
                assert start is not None
                found.append(Stretch(start, piece.z_at(level), number))
                start = None
            elif ends_below and not below:
                start = piece.z_at(level)
        if start is not None:
            found.append(Stretch(start, self.rising[-1].z1, None))
        return found

    def visit(self, k: int, stretch: Stretch, parent: Stretch | None) -> None:
        level = self.level(k)
        front = abs(stretch.near - self.cz) < NEAR
        if front:
            self.go(level, self.cz, self.shape.mode)
        else:
            self.enter(k, stretch, parent)
        self.go(level, stretch.far, "F")
        self.climb(stretch, self.level(k - 1))
        self.go(self.path[-1].x / 2 + self.words.retract, self.path[-1].z)
        if front:
            self.go(self.path[-1].x / 2, self.cz)
        self.parent = stretch
        for inner in self.stretches(k + 1):
            if inner.near <= stretch.near + NEAR and inner.far >= stretch.far - NEAR:
                self.visit(k + 1, inner, stretch)

    def enter(self, k: int, stretch: Stretch, parent: Stretch | None) -> None:
        """To the near end of a pocket: straight over it from its own outer level, else clear of everything."""
        inside = parent is not None and self.parent is parent and abs(parent.near - self.cz) > NEAR
        if inside:
            self.go(self.path[-1].x / 2, stretch.near)
        else:
            self.clear(self.path[-1].z if self.path else self.cz)
            self.go(self.path[-1].x / 2 if self.path else self.cr, stretch.near)
            if self.level(k - 1) + self.words.retract < self.cr - NEAR:
                self.go(self.level(k - 1) + self.words.retract, stretch.near)
        self.go(self.level(k), stretch.near, "F")

    def clear(self, z: float) -> None:
        """Out to the level of the start, unless the retract led further already."""
        if self.path and self.path[-1].x / 2 < self.cr - NEAR:
            self.go(self.cr, z)

    def climb(self, stretch: Stretch, top: float) -> None:
        if stretch.wall is None:
            return
        piece = self.rising[stretch.wall]
        rest = [piece.cut_at(self.path[-1].x / 2)[1], *self.rising[stretch.wall + 1 :]]
        for piece in rest:
            if piece.r1 <= piece.r0 + NEAR or piece.r0 >= top - NEAR:
                return
            if piece.r1 > top + NEAR:
                self.path.append(piece.cut_at(top)[0].step())
                return
            self.path.append(piece.step())
