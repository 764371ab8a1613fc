"""Quantities as people write them in job and shop files: one number, a space, one unit.

The form is checked before anything looks at the unit, so ``"9.5 mm + 2 mm"``, ``"1,5 mm"`` or
``"9**9**9 mm"`` are refused at once. Pint is asked about the unit alone, and only for units that are
not in daily use: importing it costs more than reading a whole job file.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from functools import cache
from typing import TYPE_CHECKING, Literal

if TYPE_CHECKING:
    from pint import UnitRegistry

Dimension = Literal[
    "length", "angle", "force", "power", "speed", "rotation", "time", "mass", "pressure", "density"
]
UNIT: dict[Dimension, str] = {
    "length": "mm", "angle": "deg", "force": "N", "power": "kW", "speed": "m/min", "rotation": "rpm",
    "time": "min", "mass": "kg", "pressure": "MPa", "density": "g/cm^3",
}  # the unit in which the program keeps a dimension  # fmt: skip
EXAMPLE: dict[Dimension, str] = {
    "length": "15 mm", "angle": "95 deg", "force": "6 kN", "power": "15 kW", "speed": "180 m/min",
    "rotation": "4500 rpm", "time": "30 min", "mass": "1.8 kg", "pressure": "1800 N/mm^2", "density": "7.85 g/cm^3",
}  # fmt: skip
DAILY: dict[str, tuple[Dimension, float]] = {
    "mm": ("length", 1.0), "um": ("length", 0.001), "in": ("length", 25.4), "deg": ("angle", 1.0),
    "N": ("force", 1.0), "kN": ("force", 1000.0), "kW": ("power", 1.0), "m/min": ("speed", 1.0),
    "rpm": ("rotation", 1.0), "min": ("time", 1.0), "kg": ("mass", 1.0), "MPa": ("pressure", 1.0),
    "N/mm^2": ("pressure", 1.0), "GPa": ("pressure", 1000.0), "g/cm^3": ("density", 1.0),
}  # what nearly every job is written in, without waking pint  # fmt: skip

_DEFINITIONS = (
    "giga- = 1e9 = G-", "mega- = 1e6 = M-", "kilo- = 1e3 = k-", "deka- = 10 = da-", "deci- = 0.1 = d-",
    "centi- = 1e-2 = c-", "milli- = 1e-3 = m-", "micro- = 1e-6 = u- = µ- = μ-", "nano- = 1e-9 = n-",
    "meter = [length] = m = metre", "second = [time] = s = sec", "gram = [mass] = g", "degree = [angle] = deg = °",
    "radian = 180 / 3.141592653589793 * degree = rad", "revolution = [] = rev",
    "minute = 60 * second = min", "hour = 60 * minute = h", "rpm = 1 / minute", "hertz = 1 / second = Hz",
    "newton = kilogram * meter / second ** 2 = N", "pascal = newton / meter ** 2 = Pa", "bar = 1e5 * pascal",
    "joule = newton * meter = J", "watt = joule / second = W", "tonne = 1000 * kilogram = t",
    "inch = 0.0254 * meter = in", "foot = 12 * inch = ft", "thou = 0.001 * inch", "sfm = foot / minute",
    "pound = 0.45359237 * kilogram = lb", "pound_force = 4.4482216152605 * newton = lbf",
    "kilogram_force = 9.80665 * newton = kgf", "psi = pound_force / inch ** 2", "ksi = 1000 * psi",
    "horsepower = 550 * foot * pound_force / second = hp",
    "metric_horsepower = 75 * kilogram_force * meter / second = PS",
)  # fmt: skip

_NUMBER = r"[+-]?(?:[0-9]{1,15}(?:\.[0-9]{0,15})?|\.[0-9]{1,15})(?:[eE][+-]?[0-9]{1,2})?"
_FACTOR = r"[^\W\d_]+(?:(?:\^|\*\*)?-?[1-4])?"
_NAME = rf"(?:1|°|{_FACTOR})(?:[/*·](?:{_FACTOR})){{0,3}}"
_QUANTITY = re.compile(rf"({_NUMBER}) ({_NAME})")
_COMMA = re.compile(r"[+-]?\d+,\d+.*", re.DOTALL)
_GLUED = re.compile(rf"({_NUMBER})\s*({_NAME})")
_BARE = re.compile(_NUMBER)
_POWER = re.compile(r"(?<=[^\W\d_])(?:\*\*)?(-?[1-4])")
_LONGEST = 60
_LIKENESS: dict[Dimension, str] = {
    "length": "meter", "angle": "degree", "force": "newton", "power": "watt", "speed": "meter / second",
    "rotation": "1 / second", "time": "second", "mass": "gram", "pressure": "pascal", "density": "gram / meter ** 3",
}  # fmt: skip

PATTERN = rf"^{_NUMBER} \S+$"  # for editors: a number, a space, a unit


class QuantityError(ValueError):
    """A text that is no quantity, or one of the wrong kind: what is the matter, and what is wanted."""

    def __init__(self, message: str, wanted: str) -> None:
        self.message = message
        self.wanted = wanted
        super().__init__(f"{message}; wanted {wanted}")


@dataclass(frozen=True, slots=True)
class Quantity:
    """A number in the program's own unit of its dimension."""

    value: float
    dimension: Dimension


def with_article(dimension: Dimension) -> str:
    """'a length', 'an angle', 'a spindle speed'."""
    word = {"rotation": "spindle speed", "pressure": "force per area"}.get(dimension, dimension)
    return f"an {word}" if word == "angle" else f"a {word}"


def wanted(dimension: Dimension) -> str:
    """What a person should write for that dimension."""
    return f'{with_article(dimension)} like "{EXAMPLE[dimension]}"'


def measure(text: object, wish: str = 'one number, a space, one unit, like "15 mm"') -> Quantity:
    """Read a quantity of any dimension.

    Raises
    ------
    QuantityError
        When the text is not exactly one number, a space and one known unit.

    Example
    -------
    >>> measure("0.5 in")
    Quantity(value=12.7, dimension='length')
    """
    if not isinstance(text, str):
        raise QuantityError("a quantity is written in quotes, with its unit", wish)
    match = _QUANTITY.fullmatch(text) if len(text) <= _LONGEST else None
    if match is None:
        raise QuantityError(_what_is_wrong(text), wish)
    unit = _meaning(_plain(match[2]))
    if unit is None:
        raise QuantityError(f"{match[2]} is no unit of use here", wish)
    return Quantity(float(match[1]) * unit[1], unit[0])


def quantity(text: object, dimension: Dimension) -> float:
    """Read a quantity of one dimension, as a number in the program's unit of it.

    Raises
    ------
    QuantityError
        When the text is no quantity, or one of another dimension.

    Example
    -------
    >>> quantity("1800 N/mm2", "pressure")
    1800.0
    """
    found = measure(text, wanted(dimension))
    if found.dimension != dimension:
        message = f"this is {with_article(found.dimension)}, not {with_article(dimension)}"
        raise QuantityError(message, wanted(dimension))
    return found.value


def hardness(text: object) -> float:
    """A Brinell hardness: ``"190 HB"``."""
    wish = 'a Brinell hardness like "190 HB"'
    if not isinstance(text, str):
        raise QuantityError("a hardness is written in quotes, with its scale", wish)
    match = re.fullmatch(rf"({_NUMBER}) (HB|HBW)", text[:_LONGEST])
    if match is None:
        raise QuantityError("not a Brinell hardness", wish)
    return float(match[1])


def roughness(text: object) -> tuple[Literal["Ra", "Rz"], float]:
    """A roughness, parameter and um: ``"Ra 1.6 um"`` or ``"Rz 6.3 um"``."""
    wish = 'a roughness like "Ra 1.6 um" or "Rz 6.3 um"'
    if not isinstance(text, str) or not text.startswith(("Ra ", "Rz ")):
        raise QuantityError("a roughness says first whether it is Ra or Rz", wish)
    try:
        value = quantity(text[3:], "length")
    except QuantityError as error:
        raise QuantityError(error.message, wish) from None
    return ("Ra" if text.startswith("Ra") else "Rz"), value * 1000.0


def show(value: float, unit: str) -> str:
    """A number and its unit as a person reads it."""
    return f"{value:.6g} {unit}".rstrip()


def _what_is_wrong(text: str) -> str:
    if len(text) > _LONGEST:
        return "too long for a quantity"
    if _BARE.fullmatch(text.strip()):
        return "the unit is missing"
    if _COMMA.fullmatch(text.strip()):
        return "a decimal comma: write a point"
    glued = _GLUED.fullmatch(text.strip())
    if glued:
        return f'one space belongs between number and unit: "{glued[1]} {glued[2]}"'
    return "not a quantity"


def _plain(unit: str) -> str:
    """One spelling of the powers: mm2, mm² and mm**2 are mm^2."""
    return _POWER.sub(r"^\1", unit.replace("²", "^2").replace("³", "^3"))


def _meaning(unit: str) -> tuple[Dimension, float] | None:
    return DAILY.get(unit) or _asked_of_pint(unit)


@cache
def _asked_of_pint(unit: str) -> tuple[Dimension, float] | None:
    from pint.errors import PintError

    registry = _registry()
    try:
        one = registry.Quantity(1.0, registry.parse_units(unit.replace("°", "degree").replace("·", "*")))
        for dimension, likeness in _LIKENESS.items():
            if one.is_compatible_with(likeness):
                return dimension, float(one.to(UNIT[dimension].replace("^", "**")).magnitude)
    except (PintError, ValueError, TypeError, AttributeError):
        return None
    return None


@cache
def _registry() -> UnitRegistry[float]:
    """A registry of the workshop's units only: pint's own takes half a second to build."""
    from pint import UnitRegistry

    registry: UnitRegistry[float] = UnitRegistry(None)
    for definition in _DEFINITIONS:
        registry.define(definition)
    return registry
