"""Type II roughing: a profile with pockets, every level only where it lies above the profile.

Firm are the levels, their open stretches, and that nothing goes below the moved profile. The order of
the pockets, following the wall and the way into a pocket are one choice among those that controls make.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from auditor.declared.control_settings import choice
from auditor.interpret.cycles.frame import SAME, Piece, Spot
from auditor.interpret.cycles.roughing_path import RoughingPath
from auditor.interpret.cycles.stretches import Stretch, floor_before, open_stretches, wall_strokes

SETTINGS = ("pocket_order", "pocket_wall")


@dataclass(frozen=True, slots=True)
class _Cut:
    """One stretch of one level (1-based) with the height of the level above."""

    level: int
    height: float
    above: float
    stretch: Stretch

    def holds(self, other: _Cut) -> bool:
        """Whether ``other`` lies in this stretch, one level further down."""
        inside = self.stretch.start - SAME <= other.stretch.start and other.stretch.end <= self.stretch.end + SAME
        return other.level == self.level + 1 and inside


def rough_pockets(path: RoughingPath, levels: list[float]) -> tuple[str, ...]:
    """Cut all levels; the settings of the control that the path rests on."""
    profile = path.profile
    pieces = floor_before(profile.pieces, profile.origin, profile.first)
    cuts = [
        _Cut(index + 1, height, levels[index - 1] if index else profile.origin.height, stretch)
        for index, height in enumerate(levels)
        for stretch in open_stretches(pieces, height, profile.origin.along)
    ]
    ordered = iter(cuts) if choice(path.call.control, "pocket_order") == "level by level" else _depth_first(cuts)
    before: _Cut | None = None
    for cut in ordered:
        path.next_pass()
        _enter(path, cut, before)
        _cut(path, pieces, cut)
        before = cut
    if path.here.along > profile.origin.along + SAME:
        _clear(path, profile.origin.along)
    return SETTINGS


def _depth_first(cuts: list[_Cut]) -> Iterator[_Cut]:
    """Each stretch, then everything below it, nearest first."""
    below: dict[int, list[_Cut]] = {}
    for cut in cuts:
        below.setdefault(cut.level, []).append(cut)
    waiting = list(reversed(below.get(1, [])))
    while waiting:
        cut = waiting.pop()
        yield cut
        waiting += reversed([deeper for deeper in below.get(cut.level + 1, []) if cut.holds(deeper)])


def _open_at_start(path: RoughingPath, cut: _Cut) -> bool:
    return cut.stretch.start <= path.profile.origin.along + SAME


def _enter(path: RoughingPath, cut: _Cut, before: _Cut | None) -> None:
    """To the beginning of the stretch at its level."""
    if _open_at_start(path, cut):
        if path.here.along > path.profile.origin.along + SAME:
            _clear(path, path.profile.origin.along)
        path.infeed(cut.height)
        return
    if before is not None and before.holds(cut) and not _open_at_start(path, before):
        path.rapid(Spot(cut.stretch.start, path.here.height))
    else:
        _clear(path, cut.stretch.start)
        path.rapid(Spot(cut.stretch.start, min(cut.above + path.retract, path.profile.origin.height)))
    path.feed(Spot(cut.stretch.start, cut.height))


def _clear(path: RoughingPath, along: float) -> None:
    """Out of the work and over to a place along it."""
    top = max(path.profile.origin.height, path.here.height)
    path.rapid(Spot(path.here.along, top))
    path.rapid(Spot(along, top))


def _cut(path: RoughingPath, pieces: tuple[Piece, ...], cut: _Cut) -> None:
    """Along the level, up the wall, and off it."""
    path.feed(Spot(cut.stretch.end, cut.height))
    if choice(path.call.control, "pocket_wall") == "follow":
        for stroke, spot in wall_strokes(path.profile.frame, pieces, cut.stretch.wall, cut.height, cut.above):
            path.follow(stroke, spot)
        path.escape(Spot(path.here.along, path.here.height + path.retract))
    else:
        back = max(path.here.along - path.retract, cut.stretch.start)
        path.escape(Spot(back, path.here.height + path.retract))
    if _open_at_start(path, cut):
        path.rapid(Spot(path.profile.origin.along, path.here.height))
