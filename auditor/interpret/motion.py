"""G0, G1, G2, G3 and thread strokes: from axis words to strokes."""

from __future__ import annotations

import math

from auditor.declared.control_settings import amount, choice
from auditor.declared.model import Point
from auditor.interpret.arcs import Arc, arc_by_centre, arc_by_radius
from auditor.interpret.corners import Leg, sharp_end
from auditor.interpret.cutting_conditions import check_cut
from auditor.interpret.cycles.call import CycleFault, Stroke
from auditor.interpret.moves import Feed, Kind
from auditor.interpret.registry import motion
from auditor.interpret.run import CornerChain, NotUnderstood, Run
from auditor.interpret.travel import close_chain, rapid_partly_known, settle, travel, unknown_start
from auditor.interpret.variable_lead import mean_lead
from auditor.interpret.words import BlockWords, length

AXIS_LETTERS = ("X", "Z", "U", "W")
IDLE = frozenset({"E", "L", "P", "Q"})  # letters that mean something in other blocks only
HARMLESS = frozenset({"F", "S", "T", "D"}) | IDLE  # no effect on where a motion goes


PLAIN_LETTERS = frozenset(AXIS_LETTERS)
PLAIN_MOTION = PLAIN_LETTERS | HARMLESS


def has_axis_words(words: BlockWords) -> bool:
    """Whether the block says where to go."""
    return words.has(*AXIS_LETTERS)


def millimetres(run: Run, words: BlockWords, letter: str) -> float | None:
    """A length word in mm as written, None when absent."""
    number = words.number(letter)
    return None if number is None else length(number, run.control, inch=run.state.inch)


def x_factor(run: Run) -> float:
    """What turns an X or U word into a radius."""
    return 0.5 if run.control.x_words == "diameter" else 1.0


def end_point(run: Run, words: BlockWords) -> tuple[float | None, float | None]:
    """Where the axis words lead, (z, r); None where that is not known."""
    state = run.state
    incremental = run.system != "A" and not state.absolute
    z = millimetres(run, words, "Z")
    r = millimetres(run, words, "X")
    half = x_factor(run)
    z = state.z if z is None else _added(state.z, z) if incremental else z + state.shift.z
    r = state.r if r is None else _added(state.r, r * half) if incremental else r * half + state.shift.r
    return _with_increments(run, words, z, r, half) if words.has("U", "W") else (z, r)


def _with_increments(
    run: Run, words: BlockWords, z: float | None, r: float | None, half: float
) -> tuple[float | None, float | None]:
    """U and W, which are distances in system A."""
    if run.system != "A":
        raise NotUnderstood("U and W are words of other axes in this code system", "axis-not-modelled", ("U", "W"))
    for absolute, other in (("X", "U"), ("Z", "W")):
        if words.has(absolute) and words.has(other):
            run.remark("word-repeated", f"{absolute} and {other} in one block name the same axis", absolute, other)
    u, w = millimetres(run, words, "U"), millimetres(run, words, "W")
    z = z if w is None or words.has("Z") else _added(run.state.z, w)
    r = r if u is None or words.has("X") else _added(run.state.r, u * half)
    return z, r


def _added(here: float | None, distance: float) -> float | None:
    return None if here is None else here + distance


def refuse_letters(run: Run, words: BlockWords, allowed: frozenset[str]) -> None:
    """Words that have no meaning with this motion make the block something else than it seems."""
    idle = words.by_letter.keys() & IDLE
    if idle and not words.m_codes and not allowed & idle and len(words.functions) < 2:
        text = f"{' and '.join(sorted(idle))} has no meaning in this block and is left out"
        run.remark("unsupported", text, *sorted(idle))
    strange = words.by_letter.keys() - allowed - HARMLESS
    if strange:
        letters = " and ".join(sorted(strange))
        raise NotUnderstood(f"{letters} is not understood in this block", "unsupported", tuple(sorted(strange)))


def known_start(run: Run, end: tuple[float | None, float | None]) -> Point:
    """The point a cut starts from; a cut from an unknown point is not audited but restates its end."""
    start = run.state.position
    if start is None or None in end:
        reason = unknown_start(run)
        run.state.z, run.state.r = end
        raise NotUnderstood(reason, "position-unknown")
    return start


@motion("rapid")
def rapid(run: Run, words: BlockWords) -> None:
    """G0: both axes at their own rates to the end point."""
    close_chain(run)
    refuse_letters(run, words, PLAIN_LETTERS)
    z, r = end_point(run, words)
    if run.state.position is None or z is None or r is None:
        rapid_partly_known(run, z, r)
    else:
        travel(run, Stroke(Kind.RAPID, Point(z, r)))


@motion("feed")
def straight(run: Run, words: BlockWords) -> None:
    """G1, with corner and angle words where the block carries them."""
    if run.chain is None and words.by_letter.keys() <= PLAIN_MOTION:
        refuse_letters(run, words, PLAIN_LETTERS)
        end = end_point(run, words)
        known_start(run, end)
        check_cut(run)
        travel(run, Stroke(Kind.FEED, Point(*_both(end))))
        return
    leg = read_leg(run, words)
    if run.chain is None:
        run.chain = CornerChain(run.state.position or known_start(run, (leg.end_z, leg.end_r)))
    run.chain.legs.append(leg)
    run.chain.words.append(words)
    check_cut(run)
    if leg.needs_following:
        start = None if leg.angle_only else run.state.position
        run.state.z, run.state.r = (leg.end_z, leg.end_r) if start is None else sharp_end(start, leg)
    else:
        close_chain(run)


def _both(end: tuple[float | None, float | None]) -> tuple[float, float]:
    z, r = end
    assert z is not None
    assert r is not None
    return z, r


def read_leg(run: Run, words: BlockWords) -> Leg:
    """The block as one leg of a chain of straight lines."""
    plain = choice(run.control, "corner_words") == "comma or plain"
    allowed = frozenset((*AXIS_LETTERS, ",C", ",R", ",A", *("C", "R", "A", "I", "K") * plain))
    refuse_letters(run, words, allowed)
    z, r = end_point(run, words)
    if (words.has("W") and z is None) or (words.has("U") and r is None):
        text = "a distance from a corner that is known by its angle only: give the point"
        raise CycleFault("cycle-corner", text, ("U", "W"))
    chamfer, rounding, turn = _corner_words(run, words)
    angle = words.number(",A") or (words.number("A") if plain else None)
    return Leg(
        end_z=z if words.has("Z", "W") or angle is None else None,
        end_r=r if words.has("X", "U") or angle is None else None,
        angle=None if angle is None else angle.value,
        chamfer=chamfer,
        rounding=rounding,
        turn=turn,
        feed=run.state.feed.command() if run.state.feed.certain else None,
        line=words.line,
        block=words.label,
    )


def _corner_words(run: Run, words: BlockWords) -> tuple[float | None, float | None, int | None]:
    """Size of chamfer and rounding, and the sign that the old words carry."""
    chamfer, rounding, turn = millimetres(run, words, ",C"), millimetres(run, words, ",R"), None
    for letter in ("I", "K", "C", "R"):  # reach this place only where the control reads them as corners
        size = millimetres(run, words, letter)
        if size is None:
            continue
        if letter in "IK" or size < 0:
            turn = int(math.copysign(1, size))
        if letter == "R":
            rounding = abs(size)
        else:
            chamfer = abs(size)
    return chamfer or None, rounding or None, turn


@motion("arc clockwise", "arc counter-clockwise")
def arc(run: Run, words: BlockWords) -> None:
    """G2 and G3 in the ZX plane, by R or by I and K."""
    close_chain(run)
    if run.state.plane != "plane ZX":
        raise NotUnderstood("an arc outside the ZX plane is no turning", "axis-not-modelled")
    refuse_letters(run, words, frozenset((*AXIS_LETTERS, "R", "I", "K")))
    end = end_point(run, words)
    start = known_start(run, end)
    target = Point(*_both(end))
    clockwise = (run.state.motion == "arc clockwise") != (run.control.arcs == "mirrored")
    try:
        made = _arc(run, words, start, target, clockwise)
    except CycleFault:
        run.state.z, run.state.r = target  # the block says where it ends, whatever its circle
        raise
    check_cut(run)
    if made.sweep > 180.0 + 1e-6:
        run.remark(
            "arc-over-half",
            f"the arc turns through {made.sweep:.0f} degrees",
            "I",
            "K",
            value=made.sweep,
            limit=180.0,
            unit="deg",
        )
    run.log.arc_sweeps.append(made.sweep)
    travel(run, Stroke(Kind.ARC, target, centre=made.centre, clockwise=clockwise))


def _arc(run: Run, words: BlockWords, start: Point, end: Point, clockwise: bool) -> Arc:
    tolerance = amount(run.control, "arc_tolerance")
    radius = millimetres(run, words, "R")
    if radius is not None:
        if radius < 0 and choice(run.control, "negative_arc_radius") == "refuse":
            raise CycleFault("arc-impossible", "a negative R is refused by most lathe controls", ("R",))
        return arc_by_radius(start, end, clockwise, radius, tolerance)
    i, k = millimetres(run, words, "I"), millimetres(run, words, "K")
    if i is None and k is None:
        raise CycleFault("arc-impossible", "an arc needs R, or I and K")
    if choice(run.control, "arc_centres") == "absolute":
        shift = run.state.shift
        centre = Point(start.z if k is None else k + shift.z, start.r if i is None else i + shift.r)
    else:
        centre = Point(start.z + (k or 0.0), start.r + (i or 0.0))
    return arc_by_centre(start, end, clockwise, centre, tolerance)


@motion("thread", "variable thread")
def thread_stroke(run: Run, words: BlockWords) -> None:
    """G32 or G33: one stroke in step with the spindle; F (or E) is the lead."""
    settle(run)
    if run.state.compensation != "off":
        text = "nose-radius compensation is on at a thread, which is cut without it"
        run.remark("compensation-left-on", text, "G", remedy="cancel with G40 in a move before it")
    refuse_letters(run, words, frozenset((*AXIS_LETTERS, "Q", "E", *("K",) * (run.state.motion == "variable thread"))))
    end = end_point(run, words)
    start = known_start(run, end)
    lead = millimetres(run, words, "E") or (run.state.feed.value if run.state.feed.certain else None)
    lead = None if lead is None or lead <= 0.0 else lead
    check_cut(run, thread=True)
    change, target = millimetres(run, words, "K"), Point(*_both(end))
    distance = max(abs(target.z - start.z), abs(target.r - start.r))
    if lead and change and distance:
        lead = mean_lead(distance, lead, change)
    feed = Feed("rev", lead) if lead else None
    travel(run, Stroke(Kind.THREAD, target, feed=feed, lead=lead))
