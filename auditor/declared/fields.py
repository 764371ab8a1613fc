"""How a value of a job or shop file is read: pydantic types for quantities, pairs and plain numbers."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Annotated, Any, Literal

from pydantic import BaseModel, ConfigDict, Field, GetCoreSchemaHandler, GetJsonSchemaHandler
from pydantic.json_schema import JsonSchemaValue
from pydantic_core import CoreSchema, PydanticCustomError, core_schema

from auditor.declared import units
from auditor.declared.units import Dimension, QuantityError


def complaint(message: str, wanted: str) -> PydanticCustomError:
    """A fault in our own words, to be raised while pydantic validates."""
    escaped = message.replace("{", "(").replace("}", ")")
    return PydanticCustomError("declared", escaped, {"wanted": wanted})


class Table(BaseModel):
    """A table of a job or shop file: nothing converted, nothing unknown, nothing infinite."""

    model_config = ConfigDict(extra="forbid", strict=True, frozen=True, allow_inf_nan=False, defer_build=True)


@dataclass(frozen=True, slots=True)
class Reads:
    """One quantity of a dimension, within bounds given in the program's unit."""

    dimension: Dimension
    above: float | None = None
    least: float | None = None
    most: float | None = None
    below: float | None = None

    @property
    def wanted(self) -> str:
        """What a person should write."""
        unit = units.UNIT[self.dimension]
        bounds = (
            ("above", self.above), ("not below", self.least), ("not over", self.most), ("below", self.below),
        )  # fmt: skip
        told = " and ".join(f"{word} {bound:g} {unit}" for word, bound in bounds if bound is not None)
        return f"{units.wanted(self.dimension)}, {told}" if told else units.wanted(self.dimension)

    def read(self, text: object) -> float:
        """The value in the program's unit."""
        try:
            value = units.quantity(text, self.dimension)
        except QuantityError as error:
            raise complaint(error.message, error.wanted) from None
        if not self._allows(value):
            raise complaint("a negative value" if value < 0 else "out of bounds", self.wanted)
        return value

    def _allows(self, value: float) -> bool:
        return (
            (self.above is None or value > self.above)
            and (self.least is None or value >= self.least)
            and (self.most is None or value <= self.most)
            and (self.below is None or value < self.below)
        )

    def __get_pydantic_core_schema__(self, source: Any, handler: GetCoreSchemaHandler) -> CoreSchema:
        return core_schema.no_info_plain_validator_function(self.read)

    def __get_pydantic_json_schema__(self, schema: CoreSchema, handler: GetJsonSchemaHandler) -> JsonSchemaValue:
        return _text_schema(self.wanted, units.PATTERN)


@dataclass(frozen=True, slots=True)
class ReadsPair:
    """Two quantities in square brackets; ``rising``: the second may not be smaller."""

    first: Reads
    second: Reads
    rising: bool = False

    @property
    def wanted(self) -> str:
        """What a person should write."""
        one, two = units.EXAMPLE[self.first.dimension], units.EXAMPLE[self.second.dimension]
        return f'a pair like ["{one}", "{two}"]'

    def read(self, value: object) -> tuple[float, float]:
        """Both values in the program's units."""
        if not isinstance(value, list | tuple) or len(value) != 2:
            raise complaint("not a pair", self.wanted)
        pair = self.first.read(value[0]), self.second.read(value[1])
        if self.rising and pair[0] > pair[1]:
            raise complaint("the first is larger than the second", "the smaller value first")
        return pair

    def __get_pydantic_core_schema__(self, source: Any, handler: GetCoreSchemaHandler) -> CoreSchema:
        return core_schema.no_info_plain_validator_function(self.read)

    def __get_pydantic_json_schema__(self, schema: CoreSchema, handler: GetJsonSchemaHandler) -> JsonSchemaValue:
        items = [_text_schema(part.wanted, units.PATTERN) for part in (self.first, self.second)]
        return {"type": "array", "prefixItems": items, "minItems": 2, "maxItems": 2}


@dataclass(frozen=True, slots=True)
class ReadsText:
    """A value with a form of its own: hardness, roughness."""

    reader: Callable[[object], Any]
    description: str
    pattern: str

    def read(self, text: object) -> Any:
        """Whatever the reader makes of it."""
        try:
            return self.reader(text)
        except QuantityError as error:
            raise complaint(error.message, error.wanted) from None

    def __get_pydantic_core_schema__(self, source: Any, handler: GetCoreSchemaHandler) -> CoreSchema:
        return core_schema.no_info_plain_validator_function(self.read)

    def __get_pydantic_json_schema__(self, schema: CoreSchema, handler: GetJsonSchemaHandler) -> JsonSchemaValue:
        return _text_schema(self.description, self.pattern)


def _text_schema(description: str, pattern: str) -> JsonSchemaValue:
    return {"type": "string", "pattern": pattern, "description": description}


_SIZE = Reads("length", above=0.0)
_PLACE = Reads("length")
_SPEED = Reads("speed", above=0.0)

Length = Annotated[float, _SIZE]  # above zero, mm
LengthOrNone = Annotated[float, Reads("length", least=0.0)]  # zero or more, mm
Place = Annotated[float, _PLACE]  # either sign, mm
Rotation = Annotated[float, Reads("rotation", above=0.0)]  # rpm
Power = Annotated[float, Reads("power", above=0.0)]  # kW
Force = Annotated[float, Reads("force", above=0.0)]  # N
Speed = Annotated[float, _SPEED]  # m/min
Time = Annotated[float, Reads("time", above=0.0)]  # min
Mass = Annotated[float, Reads("mass", above=0.0)]  # kg
Pressure = Annotated[float, Reads("pressure", above=0.0)]  # MPa
Density = Annotated[float, Reads("density", above=0.0)]  # g/cm3
EdgeAngle = Annotated[float, Reads("angle", above=0.0, below=180.0)]  # deg
Clearance = Annotated[float, Reads("angle", least=0.0, below=60.0)]  # deg
Tilt = Annotated[float, Reads("angle", least=-60.0, most=60.0)]  # deg
Hardness = Annotated[float, ReadsText(units.hardness, 'a Brinell hardness like "190 HB"', r"^[0-9.]+ HBW?$")]
Roughness = Annotated[
    tuple[Literal["Ra", "Rz"], float],
    ReadsText(units.roughness, 'a roughness like "Ra 1.6 um"', r"^R[az] [0-9.]+ \S+$"),
]

LengthRange = Annotated[tuple[float, float], ReadsPair(_SIZE, _SIZE, rising=True)]
SpeedRange = Annotated[tuple[float, float], ReadsPair(_SPEED, _SPEED, rising=True)]
PlaceRange = Annotated[tuple[float, float], ReadsPair(_PLACE, _PLACE)]
PlaceAndDiameter = Annotated[tuple[float, float], ReadsPair(_PLACE, Reads("length", least=0.0))]
DiameterAndPlace = Annotated[tuple[float, float], ReadsPair(_PLACE, _PLACE)]
RotationAndPower = Annotated[tuple[float, float], ReadsPair(Reads("rotation", above=0.0), Reads("power", above=0.0))]

Text = Annotated[str, Field(min_length=1, pattern=r"\S")]
Share = Annotated[float, Field(gt=0.0, le=1.0)]
