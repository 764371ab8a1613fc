"""The profile P to Q as the roughing cycles see it: moved by the allowances, its own feeds and speeds ignored."""

from __future__ import annotations

import math
from collections.abc import Iterable
from dataclasses import dataclass, replace

from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleCall, CycleFault, CycleRemark, Stroke
from auditor.interpret.cycles.frame import Frame, Piece, Spot, pieces_of
from auditor.interpret.cycles.readings import has, radius_of

ROUNDED = 0.005  # mm; end points rounded to the increment may run back by so much
ARC_END = 0.02  # mm; the same for arcs, whose ends may lie off their circle by the arc tolerance


def allowance(call: CycleCall) -> Point:
    """The finishing allowance as a shift of the profile: W along Z, half of U along the radius."""
    return Point(call.length("W") or 0.0, radius_of(call, "U") or 0.0)


def shifted(point: Point, by: Point) -> Point:
    """The point moved by the allowance."""
    return Point(point.z + by.z, point.r + by.r)


def cut_strokes(profile: Iterable[Stroke], by: Point) -> tuple[Stroke, ...]:
    """The profile's strokes moved; feed, speed and source line are those of the cycle."""
    return tuple(
        replace(
            stroke,
            end=shifted(stroke.end, by),
            centre=None if stroke.centre is None else shifted(stroke.centre, by),
            feed=None,
            spindle=None,
            line=None,
            block=None,
        )
        for stroke in profile
    )


@dataclass(frozen=True, slots=True)
class RoughProfile:
    """The moved profile in the frame of its cycle: cuts run along, depth is taken off the height."""

    frame: Frame
    origin: Spot  # C: the start point moved by the allowances
    first: Spot  # A' moved
    pieces: tuple[Piece, ...]
    strokes: tuple[Stroke, ...]  # behind A', moved
    lines: tuple[int | None, ...]  # source line of each piece
    by: Point


def rough_profile(call: CycleCall, *, facing: bool) -> RoughProfile:
    """Move the profile by the allowances and lay it into the frame of the cycle.

    Raises
    ------
    CycleFault
        When there is no profile, or its first block does not feed in.
    """
    if len(call.profile) < 2:
        raise CycleFault("cycle-profile-missing", "the roughing cycle needs a profile of two or more moves", ("P", "Q"))
    first, last = call.profile[0].end, call.profile[-1].end
    infeed = first.z - call.start.z if facing else first.r - call.start.r
    if abs(infeed) <= ROUNDED:
        axis = "Z" if facing else "X"
        raise CycleFault(
            "cycle-profile-bad",
            f"the first block of the profile does not move {axis} away from the start point: there is nothing to rough",
            line=call.profile[0].line,
        )
    run = last.r - first.r if facing else last.z - first.z
    frame = Frame(facing, _sign(run), -_sign(infeed))
    by = allowance(call)
    strokes = cut_strokes(call.profile[1:], by)
    a_prime = shifted(first, by)
    pieces, lines = pieces_of(frame, a_prime, strokes, [stroke.line for stroke in call.profile[1:]])
    return RoughProfile(frame, frame.spot(shifted(call.start, by)), frame.spot(a_prime), pieces, strokes, lines, by)


def _sign(value: float) -> int:
    return 1 if value > 0 else -1


def check_rising(profile: RoughProfile, *, height: bool) -> None:
    """Stop at a profile that runs back along the cut or, for ``height`` (type I), dips.

    Raises
    ------
    CycleFault
        Topic ``cycle-not-monotonic`` with the line of the profile block.
    """
    for piece, line in zip(profile.pieces, profile.lines, strict=True):
        slack = ROUNDED if piece.centre is None else ARC_END
        back = piece.start.along - piece.end.along
        dip = piece.start.height - piece.end.height
        if back > slack:
            raise _not_rising(profile, piece, "runs back along the cut", line)
        if height and dip > slack:
            raise _not_rising(profile, piece, "dips into a pocket, which type I cannot cut", line)


def _not_rising(profile: RoughProfile, piece: Piece, what: str, line: int | None) -> CycleFault:
    start, end = (_as_written(profile, spot) for spot in (piece.start, piece.end))
    return CycleFault(
        "cycle-not-monotonic",
        f"the profile {what}: from {start} to {end}",
        line=line,
    )


def _as_written(profile: RoughProfile, spot: Spot) -> str:
    """The point in the words of the program, X as a diameter."""
    point = profile.frame.point(spot)
    return f"X{2 * (point.r - profile.by.r):.6g} Z{point.z - profile.by.z:.6g}"


def two_axis_start(call: CycleCall) -> bool:
    """Whether block ns carries both axes, which chooses type II."""
    return bool(call.profile_spans & {"X", "U"}) and bool(call.profile_spans & {"Z", "W"})


def sign_remarks(call: CycleCall, frame: Frame) -> tuple[CycleRemark, ...]:
    """Allowances whose sign takes metal off the finished part instead of leaving some."""
    by = frame.spot(allowance(call))
    height_word, along_word = ("W", "U") if frame.facing else ("U", "W")
    remarks = []
    if by.height < 0.0:
        remarks.append(_sign_remark(call, height_word))
    if by.along > 0.0:
        remarks.append(_sign_remark(call, along_word))
    return tuple(remarks)


def _sign_remark(call: CycleCall, word: str) -> CycleRemark:
    size = call.words[word].text
    effect = "diameters past their finished size" if word == "U" else "shoulders past their finished length"
    return CycleRemark(
        "cycle-allowance-sign", f"the allowance {word}{size} points into the part: it roughs {effect}", (word,)
    )


def start_remarks(profile: RoughProfile) -> tuple[CycleRemark, ...]:
    """A start point that lies inside the profile's own span."""
    highest = max(piece.end.height for piece in profile.pieces)
    if highest <= profile.origin.height + math.sqrt(2) * ROUNDED:
        return ()
    axis = "Z" if profile.frame.facing else "X"
    return (
        CycleRemark(
            "cycle-start",
            f"the start point of the cycle lies lower in {axis} than the end of the profile: the last cut and"
            " the way back run through the part",
        ),
    )


def unmodelled_words(call: CycleCall) -> None:
    """Semi-finish allowances of some one-block forms are not carried out.

    Raises
    ------
    CycleFault
        When I or K stands in the roughing block.
    """
    if has(call, "I", "K"):
        raise CycleFault("unsupported", "semi-finish allowances I, K in a roughing cycle are not modelled", ("I", "K"))
