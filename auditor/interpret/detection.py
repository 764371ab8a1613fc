"""Which of the three code systems a program is written in, by the marks that only one of them leaves."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

from auditor.declared.model import System
from auditor.interpret.systems import canonical_code, code_text
from auditor.parse.blocks import Block, Number

_ALL: tuple[System, ...] = ("A", "B", "C")


@dataclass(frozen=True, slots=True)
class Mark:
    """A block that makes sense in some systems only."""

    systems: frozenset[System]
    line: int
    text: str  # what was seen: "G50 with S"
    weight: int = 2  # 1: only a hint

    @property
    def strong(self) -> bool:
        """Whether the block would be nonsense in the other systems."""
        return self.weight >= 2


@dataclass(frozen=True, slots=True)
class _Seen:
    """A block as the marks look at it."""

    codes: frozenset[float]
    letters: frozenset[str]

    def has(self, letters: str) -> bool:
        return any(letter in self.letters for letter in letters)

    @property
    def moves(self) -> bool:
        return bool(self.codes & {0.0, 1.0, 2.0, 3.0})

    @property
    def bare(self) -> bool:
        return not self.letters - set("GNMT")


_Rule = tuple[str, Callable[[float, _Seen], bool], int]  # systems, when, weight

_CODE_RULES: dict[float, tuple[_Rule, ...]] = {
    20: (("C", lambda _, seen: seen.has("XZ") and seen.has("F") and not seen.moves, 2), ("AB", lambda _, s: s.bare, 2)),
    21: (("C", lambda _, seen: seen.has("XZ") and seen.has("F") and not seen.moves, 2), ("AB", lambda _, s: s.bare, 2)),
    24: (("C", lambda _, seen: seen.has("XZ"), 2),),
    32: (("A", lambda _, seen: seen.has("XZUW"), 2),),
    33: (("BC", lambda _, seen: seen.has("XZ"), 2),),
    50: (("A", lambda _, seen: seen.has("SXZUW"), 2),),
    70: (("C", lambda _, seen: not seen.has("PQ"), 2), ("AB", lambda _, seen: seen.has("PQ"), 2)),
    71: (("C", lambda _, seen: not seen.has("PQURD"), 2), ("AB", lambda _, seen: seen.has("PQURD"), 2)),
    72: (("C", lambda _, seen: seen.has("PQ") and not seen.has("UWRD"), 1),),
    73: (("C", lambda _, seen: seen.has("U") and seen.has("R") and not seen.has("WPQ"), 1),),
    77: (("B", lambda _, seen: seen.has("X") and seen.has("Z") and not seen.has("PQR"), 2),),
    78: (("B", lambda _, seen: seen.has("XZ") and not seen.has("PQKD"), 2), ("C", lambda _, seen: seen.has("PQKD"), 2)),
    79: (("B", lambda _, seen: seen.has("XZ"), 2),),
    90: (
        ("A", lambda _, seen: seen.has("XZUW") and seen.has("F") and not seen.moves, 1),
        ("BC", lambda _, seen: seen.moves or not seen.has("XZUW"), 2),
    ),
    91: (("BC", lambda _, seen: True, 2),),
    92: (
        ("BC", lambda _, seen: seen.has("S") and not seen.has("XZ"), 2),
        ("A", lambda _, seen: seen.has("XZUW") and seen.has("F"), 2),
    ),
    94: (
        ("BC", lambda _, seen: not seen.has("XZUW") or seen.moves, 2),
        ("A", lambda _, seen: seen.has("XZUW") and seen.has("F") and not seen.moves, 1),
    ),
    95: (("BC", lambda _, seen: True, 2),),
    98: (("A", lambda _, seen: not seen.codes & {83.0, 84.0, 85.0}, 1),),
    99: (("A", lambda _, seen: not seen.codes & {83.0, 84.0, 85.0}, 1),),
}


def marks_of(blocks: Sequence[Block]) -> list[Mark]:
    """Every mark of a code system in a program."""
    found: list[Mark] = []
    for block in blocks:
        seen = _seen(block)
        for code in seen.codes:
            for systems, applies, weight in _CODE_RULES.get(code, ()):
                if applies(code, seen):
                    found.append(Mark(_systems(systems), block.line, _text(code, seen), weight))
        if seen.has("UW") and seen.codes <= {0.0, 1.0, 2.0, 3.0, 28.0, 30.0} and not seen.has("PQRD"):
            found.append(Mark(_systems("A"), block.line, "U or W in a motion block"))
    return found


def _systems(letters: str) -> frozenset[System]:
    return frozenset(system for system in _ALL if system in letters)


def _seen(block: Block) -> _Seen:
    codes = [
        canonical_code(word.value.value)
        for word in block.words
        if word.letter == "G" and isinstance(word.value, Number)
    ]
    return _Seen(frozenset(codes), frozenset(word.letter for word in block.words))


def _text(code: float, seen: _Seen) -> str:
    others = "".join(sorted(seen.letters & set("SXZUWPQF")))
    return f"{code_text(code)} with {' '.join(others)}" if others else f"{code_text(code)} alone"


@dataclass(frozen=True, slots=True)
class Detection:
    """The system taken, and why; ``conflict`` holds strong marks that speak against it."""

    system: System
    why: str
    conflict: tuple[Mark, ...]


def detect(marks: Sequence[Mark], fallback: System) -> Detection:
    """The system with most marks; without any, the usual one."""
    scores = {system: sum(mark.weight for mark in marks if system in mark.systems) for system in _ALL}
    best = max(scores.values(), default=0)
    system = fallback if scores[fallback] == best else next(s for s in _ALL if scores[s] == best)
    reasons = list(dict.fromkeys(f"{mark.text} (line {mark.line})" for mark in marks if system in mark.systems))
    why = "not declared; " + (f"marks: {', '.join(reasons[:4])}" if reasons else "no mark of a system found")
    return Detection(system, why, against(marks, system))


def against(marks: Sequence[Mark], system: System) -> tuple[Mark, ...]:
    """Strong marks of other systems."""
    return tuple(mark for mark in marks if mark.strong and system not in mark.systems)
