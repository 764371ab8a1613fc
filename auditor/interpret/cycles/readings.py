"""How the words of a cycle block are read: end points, depths in least increments, thread leads."""

from __future__ import annotations

from auditor.declared.control_settings import amount, choice
from auditor.declared.model import Point
from auditor.interpret.cycles.call import INCH, CycleCall, CycleFault, CycleRemark, Stroke
from auditor.interpret.moves import Kind

FINEST_PECK = 0.05  # mm (common practice); smaller ones are a slip of the unit
SAME = 1e-7  # mm; points nearer than this are one


def radius_of(call: CycleCall, letter: str) -> float | None:
    """An X or U word as a radius, mm."""
    value = call.length(letter)
    if value is None:
        return None
    return value / 2 if call.control.x_words == "diameter" else value


def end_r(call: CycleCall) -> float | None:
    """The end radius from X or U, None when the block has neither; U counts from the start point."""
    absolute = radius_of(call, "X")
    if absolute is not None:
        return absolute if call.absolute else call.start.r + absolute
    step = radius_of(call, "U")
    return None if step is None else call.start.r + step


def end_z(call: CycleCall) -> float | None:
    """The end length from Z or W, None when the block has neither; W counts from the start point."""
    absolute = call.length("Z")
    if absolute is not None:
        return absolute if call.absolute else call.start.z + absolute
    step = call.length("W")
    return None if step is None else call.start.z + step


def has(call: CycleCall, *letters: str) -> bool:
    """Whether the block carries any of the letters."""
    return any(letter in call.words for letter in letters)


def fine_word(call: CycleCall, letter: str) -> float | None:
    """P or Q of a pecking or multi-pass cycle, mm: least increments unless written with a point."""
    refuse_point(call, letter)
    return call.increments(letter)


def depth_word(call: CycleCall, letter: str = "D") -> float | None:
    """D of a one-block cycle, mm; without a point by the setting ``cycle_depth_word``."""
    refuse_point(call, letter)
    if letter in call.words and choice(call.control, "cycle_depth_word") == "units":
        return call.words[letter].value * (INCH if call.inch else 1.0)
    return call.increments(letter)


def refuse_point(call: CycleCall, letter: str) -> None:
    """Controls set so stop at a decimal point in P, Q or D of a cycle."""
    number = call.words.get(letter)
    if number is not None and number.has_point and choice(call.control, "cycle_words_with_point") == "refuse":
        raise CycleFault(
            "cycle-word-with-point", f"{letter}{number.text} has a decimal point, which this control refuses", (letter,)
        )


def point_remarks(call: CycleCall, *letters: str) -> tuple[CycleRemark, ...]:
    """A remark for each of the letters written with a decimal point."""
    return tuple(
        CycleRemark(
            "cycle-word-with-point",
            f"{letter}{call.words[letter].text} has a decimal point; read as a length,"
            " but many controls refuse it or read least increments",
            (letter,),
        )
        for letter in letters
        if letter in call.words and call.words[letter].has_point
    )


def peck_remarks(letter: str, peck: float) -> tuple[CycleRemark, ...]:
    """A remark where a peck is too small to be meant: a number of millimetres read as least increments."""
    if not SAME < peck < FINEST_PECK:
        return ()
    message = f"{letter} makes pecks of {peck:.4g} mm: it counts least increments, not millimetres"
    return (CycleRemark("cycle-peck", message, (letter,)),)


def thread_lead(call: CycleCall) -> float:
    """Lead of a thread cycle, mm: F (or E) of the block, else that of the block before, else the feed per turn."""
    for letter in ("F", "E"):
        number = call.words.get(letter)
        if number is None:
            continue
        plain = not number.has_point and call.control.whole_numbers == "increments"
        scale = amount(call.control, "feed_increment") if plain else 1.0
        return _positive(number.value * scale * (INCH if call.inch else 1.0), letter)
    if "lead" in call.stored:
        return call.stored["lead"]
    if call.feed is not None and call.feed.mode == "rev":
        return _positive(call.feed.value, "F")
    raise CycleFault("feed-missing", "the thread cycle has no lead: F is missing", ("F",))


def _positive(lead: float, letter: str) -> float:
    if lead <= 0.0:
        raise CycleFault("feed-zero", "the lead of the thread is not above zero", (letter,))
    return lead


def count_word(call: CycleCall, letter: str) -> int | None:
    """A word that counts: passes, repeats; its decimal point does not matter."""
    number = call.words.get(letter)
    return None if number is None else round(number.value)


def moved(here: Point, strokes: list[Stroke], kind: Kind, end: Point, cycle_pass: int | None = None) -> Point:
    """Append a straight stroke unless it would stand still; the point reached."""
    if abs(end.z - here.z) > SAME or abs(end.r - here.r) > SAME:
        strokes.append(Stroke(kind, end, cycle_pass=cycle_pass))
    return end
