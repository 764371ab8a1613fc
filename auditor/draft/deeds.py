"""What each tool does in the program, by its moves and cycles: the kind of tool that would do such things."""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import NamedTuple

from auditor.declared.model import ToolKind
from auditor.interpret.moves import Interpretation, Kind, Move

ON_AXIS = 0.05  # mm of radius within which a tool that feeds along Z drills
TO_CENTRE = 0.6  # mm of radius to which facing and parting go
BEHIND = 3.0  # mm behind the front face from which a plunge to the centre parts off
STEEP = 5.0  # a move is along one axis when it goes this many times further along it
SHORT = 0.05  # mm; a shorter move is no deed


class Act(NamedTuple):
    """One thing a tool does, and which kind of tool does it."""

    what: str
    kind: ToolKind


TURN, BORE, FACE = Act("turns", "turning"), Act("turns inside", "boring"), Act("faces", "turning")
GROOVE, PART, FACE_GROOVE = Act("grooves", "grooving"), Act("parts off", "parting"), Act("grooves", "face grooving")
THREAD, DRILL, TAP = Act("cuts a thread", "threading"), Act("drills", "drilling"), Act("taps", "drilling")


@dataclass(frozen=True, slots=True)
class Deeds:
    """What a tool does."""

    tool: int
    line: int  # where it is first called
    kind: ToolKind | None  # None: it does nothing that tells
    clear: bool  # most of what it does speaks for that kind
    acts: tuple[str, ...]
    lines: tuple[int, int] | None  # first and last source line with a feed move
    x: tuple[float, float] | None  # radii of the feed moves, mm
    z: tuple[float, float] | None
    feeds: tuple[float, float] | None  # mm/rev
    speeds: tuple[float, float] | None  # commanded m/min, or rpm below
    by_rpm: bool
    inside: bool


def all_deeds(path: Interpretation) -> tuple[Deeds, ...]:
    """The tools in the order of their first call."""
    front = _front(path.moves)
    return tuple(_deeds(number, line, path.moves, front) for number, line in path.tools_called)


def _front(moves: Sequence[Move]) -> float:
    """Z of the finished front face: the deepest facing to the centre near the start, else Z0."""
    faced = [move.end_z for move in moves if _feeds(move) and _radial(move) and move.end_r is not None
             and abs(move.end_r) <= TO_CENTRE and move.end_z is not None and move.end_z > -BEHIND]
    return min((z for z in faced if z is not None), default=0.0)


def _deeds(number: int, line: int, moves: Sequence[Move], front: float) -> Deeds:
    own = [index for index, move in enumerate(moves) if move.tool == number]
    feeding = [moves[index] for index in own if _feeds(moves[index])]
    votes = Counter(act for index in own for act in _acts(moves, index, front))
    kinds: Counter[ToolKind] = Counter()
    for act, count in votes.items():
        kinds[act.kind] += count
    kind, most = kinds.most_common(1)[0] if kinds else (None, 0)
    inside = votes[BORE] > votes[TURN]
    if kind == "grooving" and PART in votes:  # it opens the groove it parts off in
        kind = "parting"
    return Deeds(
        tool=number, line=line, kind=kind, clear=most >= 0.8 * kinds.total() > 0,
        acts=tuple(dict.fromkeys(act.what for act in votes)),
        lines=_span([move.line for move in feeding]),
        x=_range([r for move in feeding for r in (move.start_r, move.end_r) if r is not None]),
        z=_range([z for move in feeding for z in (move.start_z, move.end_z) if z is not None]),
        feeds=_range([move.feed.value for move in feeding if move.feed is not None and move.feed.mode == "rev"]),
        speeds=_range([move.spindle.value for move in feeding if move.spindle.value is not None]),
        by_rpm=any(move.spindle.mode == "rpm" for move in feeding), inside=inside,
    )  # fmt: skip


def _acts(moves: Sequence[Move], index: int, front: float) -> Iterator[Act]:
    move = moves[index]
    named = _of_cycle(move)
    if named is not None:
        yield named
    elif move.kind is Kind.THREAD:
        yield THREAD
    elif _feeds(move) and _length(move) > SHORT:
        act = _plain(moves, index, front)
        if act is not None:
            yield act


def _of_cycle(move: Move) -> Act | None:
    """What the name of a cycle tells without a look at its path."""
    if not _feeds(move):
        return None
    on_axis = move.end_r is not None and abs(move.end_r) <= ON_AXIS
    cycles = {
        "tap": TAP, "drill": DRILL, "rough facing": FACE, "facing cycle": FACE, "multi-pass thread": THREAD,
        "thread cycle": THREAD, "peck along z": DRILL if on_axis else FACE_GROOVE, "peck along x": GROOVE,
    }  # fmt: skip
    return cycles.get(move.cycle or "")


def _plain(moves: Sequence[Move], index: int, front: float) -> Act | None:
    """What a single feed move does, by its direction and by where the tool goes next."""
    move = moves[index]
    assert move.start is not None
    assert move.end is not None
    if _axial(move):
        if max(abs(move.start.r), abs(move.end.r)) <= ON_AXIS:
            return DRILL
        return None if _starts_facing(moves, index, front) else _by_way_out(moves, index)
    if _radial(move):
        return _across(move, _next_step(moves, index), front)
    return _by_way_out(moves, index)  # a taper or an arc


def _starts_facing(moves: Sequence[Move], index: int, front: float) -> bool:
    """Whether a feed along Z only brings the tool to the face it then cuts."""
    end, after = moves[index].end, moves[index + 1] if index + 1 < len(moves) else None
    if after is None or after.tool != moves[index].tool or not _feeds(after) or not _radial(after):
        return False
    to_centre = after.start_r is not None and after.end_r is not None and after.end_r <= min(TO_CENTRE, after.start_r)
    return to_centre and end is not None and end.z >= front - SHORT


def _by_way_out(moves: Sequence[Move], index: int) -> Act | None:
    """A pass is inside when the tool leaves the surface towards the axis."""
    way = _way_out(moves, index)
    return TURN if way > 0.0 else BORE if way < 0.0 else None


def _across(move: Move, after: tuple[float, float] | None, front: float) -> Act | None:
    """A move along X: facing, parting, a groove, or the way out along a shoulder."""
    if move.start is None or move.end is None:
        return None
    inwards = abs(move.end.r) < abs(move.start.r) or move.end.r < 0.0
    back = after is not None and abs(after[1]) > STEEP * abs(after[0])
    turns_back = back and after is not None and after[1] * (move.end.r - move.start.r) < 0.0
    if inwards and move.end.r <= TO_CENTRE:
        return PART if move.end.z < front - BEHIND else FACE
    if turns_back and move.end.z < front - SHORT:
        return GROOVE
    lifts_off = after is not None and after[0] > STEEP * abs(after[1])
    return FACE if inwards and lifts_off and move.end.z >= front - SHORT else None


def _way_out(moves: Sequence[Move], index: int) -> float:
    """Which way the tool leaves the surface it cuts: above 0 outwards, below 0 inwards, 0 when it just backs off."""
    onwards = math.copysign(1.0, (moves[index].end_z or 0.0) - (moves[index].start_z or 0.0))
    for move in moves[index + 1 :]:
        if move.tool != moves[index].tool or move.start is None or move.end is None:
            break
        dz, dr = move.end.z - move.start.z, abs(move.end.r) - abs(move.start.r)
        if abs(dr) > SHORT:
            return dr
        if dz * onwards < -SHORT:
            break
    return 0.0


def _next_step(moves: Sequence[Move], index: int) -> tuple[float, float] | None:
    """(dz, dr) of the next move of the same tool that goes anywhere."""
    for move in moves[index + 1 :]:
        if move.tool != moves[index].tool or move.start is None or move.end is None:
            return None
        step = (move.end.z - move.start.z, move.end.r - move.start.r)
        if math.hypot(*step) > 1e-6:
            return step
    return None


def _feeds(move: Move) -> bool:
    return move.kind is not Kind.RAPID and move.start is not None and move.end is not None


def _length(move: Move) -> float:
    if move.start is None or move.end is None:
        return 0.0
    return math.hypot(move.end.z - move.start.z, move.end.r - move.start.r)


def _axial(move: Move) -> bool:
    return _straight(move, along_z=True)


def _radial(move: Move) -> bool:
    return _straight(move, along_z=False)


def _straight(move: Move, *, along_z: bool) -> bool:
    if move.start is None or move.end is None or move.centre is not None:
        return False
    dz, dr = abs(move.end.z - move.start.z), abs(move.end.r - move.start.r)
    return dz > STEEP * dr if along_z else dr > STEEP * dz


def _range(values: Sequence[float]) -> tuple[float, float] | None:
    return (min(values), max(values)) if values else None


def _span(values: Sequence[int]) -> tuple[int, int] | None:
    return (min(values), max(values)) if values else None
