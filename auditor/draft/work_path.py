"""The stock that the path itself tells of, where comments are silent: never better than a guess."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from auditor.draft.deeds import Deeds
from auditor.draft.guesses import Guess, quantity
from auditor.interpret.moves import Interpretation, Kind, Move

TO_HOLD = 30.0  # mm of stock taken to be held behind the deepest cut
SAME = 0.001  # mm
OUTSIDE = ("turning", "grooving", "parting", "threading")


def work_by_path(path: Interpretation, deeds: Sequence[Deeds]) -> Iterator[tuple[str, Guess]]:
    """Diameter, length and bore of the stock by where the tools feed."""
    scale, unit = (25.4, "in") if path.units == "in" else (1.0, "mm")
    outside = {deed.tool for deed in deeds if deed.kind in OUTSIDE and not deed.inside}
    widest = _widest(path.moves, outside)
    if widest is not None and not _turns_at(path.moves, widest[0]):
        radius, line = widest
        why = f"the tools feed out to X{_short(2 * radius / scale)} in line {line}; the stock may be smaller"
        yield "workpiece.diameter", Guess(quantity(2 * radius / scale, unit), "guess", why)
    deepest = _deepest(path.moves)
    if deepest is not None:
        z, line = deepest
        why = f"deepest cut Z{_short(z / scale)} in line {line}, and {_short(TO_HOLD / scale)} {unit} to be held"
        yield "workpiece.length", Guess(quantity(round((TO_HOLD - z) / scale, 1), unit), "guess", why)
    yield from _bore(path.moves, deeds, scale, unit)


def deepest_cut(path: Interpretation) -> str | None:
    """How far from Z0 the program cuts, as a hint for the stick-out."""
    deepest = _deepest(path.moves)
    if deepest is None:
        return None
    scale, unit = (25.4, "in") if path.units == "in" else (1.0, "mm")
    return f"the program cuts to Z{_short(deepest[0] / scale)} in line {deepest[1]}: more than " \
           f"{_short(-deepest[0] / scale)} {unit}"


def _short(value: float) -> str:
    return f"{value:.4f}".rstrip("0").rstrip(".")


def _ends(moves: Sequence[Move]) -> Iterator[tuple[int | None, float, float, int]]:
    """Tool, z, radius and source line of every end of a feed move."""
    for move in moves:
        if move.kind is not Kind.RAPID and move.end is not None:
            yield move.tool, move.end.z, abs(move.end.r), move.line


def _widest(moves: Sequence[Move], outside: set[int]) -> tuple[float, int] | None:
    """Largest radius that outside tools feed to behind the front face; without any, from where they face."""
    cuts = [move for move in moves if move.tool in outside and move.kind is not Kind.RAPID and move.end is not None]
    behind = [move for move in cuts if move.end is not None and move.end.z < 0.0]
    reached = [(abs(point.r), -move.line) for move in behind or cuts for point in (move.start, move.end) if point]
    radius, line = max(reached, default=(0.0, 0))
    return (radius, -line) if radius > 0.0 else None


def _turns_at(moves: Sequence[Move], radius: float) -> bool:
    """Whether a pass along Z lies at a radius: what is turned to that was larger before, nobody knows by how much."""
    return any(
        move.kind is not Kind.RAPID and move.start is not None and move.end is not None and move.end.z < 0.0
        and move.end.z < move.start.z and min(move.start.r, move.end.r) >= radius - SAME
        for move in moves
    )  # fmt: skip


def _deepest(moves: Sequence[Move]) -> tuple[float, int] | None:
    return min(((z, line) for _, z, _, line in _ends(moves) if z < 0.0), default=None)


def _bore(moves: Sequence[Move], deeds: Sequence[Deeds], scale: float, unit: str) -> Iterator[tuple[str, Guess]]:
    """An inside tool at work where nothing was drilled: there must be a bore already."""
    if any(deed.kind == "drilling" for deed in deeds):
        return
    inside = {deed.tool for deed in deeds if deed.inside}
    deep = [(radius, line) for tool, z, radius, line in _ends(moves) if tool in inside and z < 0.0]
    if deep:
        radius, line = min(deep)
        why = f"T{min(inside)} works inside at X{_short(2 * radius / scale)} in line {line} and nothing drills"
        yield "workpiece.bore", Guess(quantity(2 * radius / scale, unit), "guess", why)
