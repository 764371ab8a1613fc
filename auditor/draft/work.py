"""Words and path about the stock put together: a size that the path contradicts is not believed."""

from __future__ import annotations

from collections.abc import Sequence

from auditor.declared.units import measure
from auditor.draft.deeds import Deeds
from auditor.draft.guesses import Guess
from auditor.draft.reading import Reading
from auditor.draft.work_path import work_by_path
from auditor.draft.work_words import work_said

# A stated size may be this much smaller than what the path reaches: tools run out of the work on every side.
BELIEVED = {"workpiece.diameter": 0.6, "workpiece.length": 0.7}


def known_of_work(reading: Reading, deeds: Sequence[Deeds]) -> dict[str, Guess]:
    """What is known of material, stock and chuck, by key path."""
    by_path = dict(work_by_path(reading.path, deeds))
    deepest = -min((move.end.z for move in reading.path.moves if move.end is not None and move.feed), default=0.0)
    reached = {"workpiece.length": deepest}
    if "workpiece.diameter" in by_path:
        reached["workpiece.diameter"] = _size(by_path["workpiece.diameter"])
    said = [
        (key, guess)
        for key, guess in work_said(reading.said, reading.unit)
        if key not in reached or _size(guess) >= BELIEVED[key] * reached[key]
    ]
    known = by_path | dict(reversed(said))  # the first comment that says a thing is believed
    bore, diameter = known.get("workpiece.bore"), known.get("workpiece.diameter")
    if bore is not None and diameter is not None and _size(bore) >= _size(diameter):
        del known["workpiece.bore"]
    return known


def _size(guess: Guess) -> float:
    """A length in mm."""
    return measure(guess.word, "a length").value
