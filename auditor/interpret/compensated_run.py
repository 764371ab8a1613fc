"""The stretch of path under G41 or G42: held back until it is complete, then turned into the tip path."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, field, replace

from auditor.declared.control_settings import choice
from auditor.declared.model import Control, Point, Tool
from auditor.interpret.compensation import TIP_VECTORS, OffsetPath, offset_path
from auditor.interpret.cycles.call import CycleRemark, Stroke
from auditor.interpret.moves import Kind
from auditor.interpret.nose import Side


@dataclass(slots=True)
class CompensatedRun:
    """Strokes programmed under compensation, and where the tip really stands when it is not on its point."""

    side: Side | None = None
    start: Point | None = None
    strokes: list[Stroke] = field(default_factory=list)
    blind: set[int] = field(default_factory=set)
    blank_blocks: int = 0  # blocks without motion since the last stroke
    cancelling: bool = False  # G40 was read, the next stroke is the cancel move
    tip: Point | None = None  # where the tip stands when compensation was left on

    @property
    def open(self) -> bool:
        """Whether strokes are being held back."""
        return bool(self.strokes)

    def hold(self, start: Point, stroke: Stroke, side: Side) -> None:
        """Take a stroke of the programmed contour."""
        if not self.strokes:
            self.start = self.tip or start
            self.side = side
        elif self.blank_blocks >= 2:
            self.blind.add(len(self.strokes))
        self.blank_blocks = 0
        self.strokes.append(stroke)

    def release(self, control: Control, tool: Tool | None) -> OffsetPath:
        """Give the tip path of what was held, starting at ``start``."""
        strokes, side, start = tuple(self.strokes), self.side, self.start
        cancelled, blind = self.cancelling, frozenset(self.blind)
        assert side is not None
        assert start is not None
        self.forget()
        if tool is None or tool.nose_radius <= 0.0:
            return OffsetPath(strokes)
        doubts = _side_remarks(start, strokes[:-1] if cancelled else strokes, side, tool)
        path = offset_path(
            start,
            strokes,
            side,
            tool.nose_radius,
            tool.tip,
            cancelled=cancelled,
            blind=blind,
            startup="intersection" if choice(control, "compensation_start") == "intersection" else "perpendicular",
            acute="arc" if choice(control, "compensation_corner") == "arc" else "line",
        )
        if not cancelled and path.strokes:
            self.tip = path.strokes[-1].end
        return replace(path, remarks=(*doubts, *path.remarks))

    def forget(self) -> None:
        """Drop what is held back."""
        self.strokes.clear()
        self.blind.clear()
        self.blank_blocks = 0
        self.cancelling = False
        self.side = self.start = self.tip = None


def joined(start: Point, strokes: tuple[Stroke, ...]) -> Iterator[tuple[Point, Stroke]]:
    """Every stroke with the point it starts from."""
    for stroke in strokes:
        yield start, stroke
        start = stroke.end


def _side_remarks(start: Point, strokes: tuple[Stroke, ...], side: Side, tool: Tool) -> tuple[CycleRemark, ...]:
    """Whether the tip points away from the work: with the right side it points from the nose to the contour."""
    tip = TIP_VECTORS[tool.tip]
    away, first = 0.0, None
    for point, stroke in joined(start, strokes):
        if stroke is strokes[0] or stroke.kind is Kind.RAPID:
            continue
        first = first or stroke
        dz, dr = stroke.end.z - point.z, stroke.end.r - point.r
        to_nose = Point(-dr, dz) if side == "left" else Point(dr, -dz)
        away += to_nose.z * tip.z + to_nose.r * tip.r
    if away <= 0.0 or first is None:
        return ()
    code, other = ("G41", "G42") if side == "left" else ("G42", "G41")
    message = (
        f"{code} puts the nose where the tip of tool {tool.number} (tip number {tool.tip}) does not point: "
        f"{other} fits it; on the wrong side the part is off by two nose radii"
    )
    return (CycleRemark("compensation-side", message, ("G",), first.line),)
