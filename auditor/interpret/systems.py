"""The three code tables of the trade: which function a G number calls in system A, B and C.

The same number means different things in the three systems (``G90`` is a turning cycle in A, absolute
words in B and C), so everything behind this file speaks of functions by name, never of G numbers.
"""

from __future__ import annotations

from collections.abc import Mapping
from types import MappingProxyType

from auditor.declared.model import System

_COMMON: dict[float, str] = {
    0: "rapid",
    1: "feed",
    2: "arc clockwise",
    3: "arc counter-clockwise",
    4: "dwell",
    7.1: "cylindrical interpolation",
    9: "exact stop",
    10: "data input",
    11: "data input end",
    12.1: "polar interpolation",
    13.1: "polar interpolation off",
    17: "plane XY",
    18: "plane ZX",
    19: "plane YZ",
    22: "stroke check",
    23: "stroke check off",
    25: "speed watch off",
    26: "speed watch",
    27: "reference check",
    28: "reference return",
    29: "return from reference",
    30: "second reference return",
    31: "skip feed",
    34: "variable thread",
    35: "circular thread clockwise",
    36: "circular thread counter-clockwise",
    40: "compensation off",
    41: "compensation left",
    42: "compensation right",
    50.2: "polygon turning off",
    51.2: "polygon turning",
    52: "local zero",
    53: "machine position",
    54: "work zero 1",
    55: "work zero 2",
    56: "work zero 3",
    57: "work zero 4",
    58: "work zero 5",
    59: "work zero 6",
    54.1: "further work zero",
    61: "exact stop mode",
    64: "cutting mode",
    65: "macro call",
    66: "modal macro call",
    67: "modal macro call off",
    68: "opposite turret",
    69: "opposite turret off",
    80: "drilling off",
    83: "drill",
    84: "tap",
    85: "bore",
    87: "side drilling",
    88: "side tapping",
    89: "side boring",
    96: "surface speed",
    97: "rotation speed",
}
_SEVENTIES = (
    "finishing",
    "rough turning",
    "rough facing",
    "pattern repeating",
    "peck along z",
    "peck along x",
    "multi-pass thread",
)

SYSTEMS: Mapping[System, Mapping[float, str]] = MappingProxyType(
    {
        "A": MappingProxyType(
            {
                **_COMMON,
                20: "inch",
                21: "metric",
                32: "thread",
                50: "preset",
                50.3: "work preset",
                **dict(zip(range(70, 77), _SEVENTIES, strict=True)),
                90: "turning cycle",
                92: "thread cycle",
                94: "facing cycle",
                98: "feed per minute",
                99: "feed per revolution",
            }
        ),
        "B": MappingProxyType(
            {
                **_COMMON,
                20: "inch",
                21: "metric",
                33: "thread",
                92: "preset",
                92.1: "work preset",
                **dict(zip(range(70, 77), _SEVENTIES, strict=True)),
                77: "turning cycle",
                78: "thread cycle",
                79: "facing cycle",
                90: "absolute",
                91: "incremental",
                94: "feed per minute",
                95: "feed per revolution",
                98: "return to initial level",
                99: "return to R level",
            }
        ),
        "C": MappingProxyType(
            {
                **_COMMON,
                70: "inch",
                71: "metric",
                33: "thread",
                92: "preset",
                92.1: "work preset",
                **dict(zip(range(72, 79), _SEVENTIES, strict=True)),
                20: "turning cycle",
                21: "thread cycle",
                24: "facing cycle",
                90: "absolute",
                91: "incremental",
                94: "feed per minute",
                95: "feed per revolution",
                98: "return to initial level",
                99: "return to R level",
            }
        ),
    }
)

# three-digit ways of writing decimal G numbers
_ALIASES: dict[float, float] = {107: 7.1, 112: 12.1, 113: 13.1, 250: 50.2, 251: 51.2}

SINGLE_CYCLES = frozenset({"turning cycle", "thread cycle", "facing cycle"})
DRILLING_CYCLES = frozenset({"drill", "tap", "bore"})
PROFILE_CYCLES = frozenset({"finishing", "rough turning", "rough facing", "pattern repeating"})
MULTIPLE_CYCLES = frozenset(_SEVENTIES)

_GROUPS: dict[str, frozenset[str]] = {
    "motion": frozenset(
        {
            "rapid",
            "feed",
            "arc clockwise",
            "arc counter-clockwise",
            "thread",
            "variable thread",
            "circular thread clockwise",
            "circular thread counter-clockwise",
            *SINGLE_CYCLES,
        }
    ),
    "speed": frozenset({"surface speed", "rotation speed"}),
    "absolute": frozenset({"absolute", "incremental"}),
    "feed mode": frozenset({"feed per minute", "feed per revolution"}),
    "units": frozenset({"inch", "metric"}),
    "compensation": frozenset({"compensation off", "compensation left", "compensation right"}),
    "drilling": frozenset({*DRILLING_CYCLES, "side drilling", "side tapping", "side boring", "drilling off"}),
    "return level": frozenset({"return to initial level", "return to R level"}),
    "work zero": frozenset({*(f"work zero {n}" for n in range(1, 7)), "further work zero"}),
    "plane": frozenset({"plane XY", "plane ZX", "plane YZ"}),
}
_GROUP_OF = {name: group for group, names in _GROUPS.items() for name in names}


def canonical_code(code: float) -> float:
    """A G number without its three-digit spelling: ``G112`` is ``G12.1``."""
    number = round(code, 1)
    return _ALIASES.get(number, number)


def function_of(system: System, code: float) -> str | None:
    """What a G number calls in a system; None when the system has no such code.

    Example
    -------
    >>> function_of("A", 90), function_of("B", 90), function_of("A", 95)
    ('turning cycle', 'absolute', None)
    """
    return SYSTEMS[system].get(canonical_code(code))


def group_of(function: str) -> str:
    """The modal group of a function; ``"one-shot"`` when it acts in its own block only."""
    return _GROUP_OF.get(function, "one-shot")


def code_text(code: float) -> str:
    """A G number as it is written: ``G50.3``, ``G1``."""
    return f"G{code:g}"


def code_for(system: System, function: str) -> str:
    """How a system writes a function, for messages; the function's own name when it has no code."""
    code = number_of(system, function)
    return function if code is None else code_text(code)


def number_of(system: System, function: str) -> float | None:
    """The G number of a function in a system, None when the system has none for it."""
    return next((code for code, name in SYSTEMS[system].items() if name == function), None)


def known_elsewhere(system: System, code: float) -> dict[System, str]:
    """What a G number that ``system`` lacks means in the other systems."""
    number = canonical_code(code)
    return {other: table[number] for other, table in SYSTEMS.items() if other != system and number in table}
