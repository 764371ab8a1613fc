"""The tables of a job or shop file other than tools, as people write them."""

from __future__ import annotations

import datetime
from itertools import pairwise
from typing import Annotated, Any, Literal

from pydantic import ConfigDict, Field, create_model, model_validator

from auditor.declared.control_settings import SETTINGS, ControlSetting
from auditor.declared.fields import (
    Density,
    DiameterAndPlace,
    Force,
    Hardness,
    Length,
    LengthOrNone,
    Mass,
    Place,
    PlaceAndDiameter,
    PlaceRange,
    Power,
    Pressure,
    Reads,
    Rotation,
    RotationAndPower,
    Roughness,
    Share,
    Speed,
    SpeedRange,
    Table,
    Text,
    Tilt,
    Time,
    complaint,
)


class JobHead(Table):
    """The keys of a job file; tables are read one by one, so that every fault is found."""

    program: Text | None = None
    batch: Annotated[int, Field(ge=1)] | None = None
    unattended: bool | None = None
    control: Any = None
    machine: Any = None
    workholding: Any = None
    workpiece: Any = None
    tools: Any = None
    limits: Any = None
    model: Any = None
    accepted: Any = None


class ControlCore(Table):
    """[control]: how the program text is to be read, the keys every job may need."""

    system: Literal["A", "B", "C"] | None = None
    units: Literal["mm", "in"] | None = None
    x_words: Literal["diameter", "radius"] | None = None
    whole_numbers: Literal["units", "increments"] | None = None
    increment: Length | None = None
    block_skip: bool | None = None
    arcs: Literal["standard", "mirrored"] | None = None

    def settings(self) -> dict[str, str | float | bool]:
        """The points on which controls differ that this table settles."""
        declared = {name: getattr(self, name, None) for name in SETTINGS}
        return {name: value for name, value in declared.items() if value is not None}


def _type_of(entry: ControlSetting) -> Any:
    if entry.choices:
        return Literal[entry.choices]
    if isinstance(entry.default, bool):
        return bool
    if entry.dimension == "number":
        whole = isinstance(entry.default, int)
        high = entry.high if entry.high != float("inf") else None
        return Annotated[int if whole else float, Field(ge=entry.low, le=high)]
    if entry.dimension == "angle":
        return Annotated[float, Reads("angle", least=entry.low, most=entry.high)]
    return Annotated[float, Reads("length", least=entry.low)]


ControlTable: type[ControlCore] = create_model(
    "ControlTable",
    __base__=ControlCore,
    **{name: (_type_of(entry) | None, Field(None, description=entry.touches)) for name, entry in SETTINGS.items()},
)  # type: ignore[call-overload]


class ThrustTable(Table):
    """machine.thrust: what the axes can push."""

    x: Force | None = None
    z: Force | None = None


class RapidTable(Table):
    """machine.rapid: how fast the axes run."""

    x: Speed | None = None
    z: Speed | None = None


class MachineTable(Table):
    """[machine]: spindle, axes, reference points."""

    model_config = ConfigDict(json_schema_extra={"anyOf": [{"required": ["power"]}, {"required": ["power_curve"]}]})

    speed_limit: Rotation
    power: Power | None = None
    base_speed: Rotation | None = None
    power_curve: list[RotationAndPower] | None = Field(None, min_length=1)
    peak_power: Power | None = None
    peak_time: Time | None = None
    efficiency: Share | None = None
    thrust: ThrustTable | None = None
    rapid: RapidTable | None = None
    turret: Literal["behind", "front"] | None = None
    tool_change: DiameterAndPlace | None = None
    home: DiameterAndPlace | None = None
    second_home: DiameterAndPlace | None = None
    machine_zero: DiameterAndPlace | None = None

    @model_validator(mode="after")
    def _power_is_told_once(self) -> MachineTable:
        if self.power_curve is None:
            return self
        if self.power is not None or self.base_speed is not None:
            raise complaint("power_curve stands instead of power and base_speed", "one or the other")
        speeds = [speed for speed, _ in self.power_curve]
        if any(later <= earlier for earlier, later in pairwise(speeds)):
            raise complaint("the speeds of power_curve do not rise", "each speed above the one before")
        return self

    @model_validator(mode="after")
    def _peak_is_above(self) -> MachineTable:
        continuous = self.power or max((power for _, power in self.power_curve or ()), default=0.0)
        if self.peak_power is not None and self.peak_power < continuous:
            raise complaint("peak_power is below the continuous power", f"at least {continuous:g} kW")
        return self


class TailstockTable(Table):
    """workholding.tailstock: where the centre sits."""

    point: DiameterAndPlace
    diameter: Length | None = None


class WorkholdingTable(Table):
    """[workholding]: chuck, collet, centres."""

    kind: Literal["chuck", "collet", "chuck+tailstock", "centres"] | None = None
    stick_out: Length
    speed_limit: Rotation | None = None
    grip_force: Force | None = None
    grip_diameter: Length | None = None
    grip_inside: bool | None = None
    jaws: Annotated[int, Field(ge=2, le=12)] | None = None
    jaw_mass: Mass | None = None
    jaw_radius: Length | None = None
    friction: Annotated[float, Field(gt=0.0, le=1.0)] | None = None
    tail: LengthOrNone | None = None
    tail_guided: bool | None = None
    tailstock: TailstockTable | None = None

    @model_validator(mode="after")
    def _tailstock_fits_kind(self) -> WorkholdingTable:
        if self.tailstock is not None and self.kind not in ("chuck+tailstock", "centres"):
            raise complaint(
                f'tailstock is given, but kind is "{self.kind or "chuck"}"', 'kind = "chuck+tailstock" or "centres"'
            )
        return self


class MaterialTable(Table):
    """A material of the shop's own or of one job: force per area of cut, and where it comes from."""

    group: Literal["P", "M", "K", "N", "S", "H", "O"]
    kc11: Pressure | None = None
    mc: Annotated[float, Field(ge=0.0, lt=1.0)] | None = None
    reference_rake: Tilt | None = None
    kn11: Pressure | None = None
    mn: Annotated[float, Field(ge=-1.0, lt=1.0)] | None = None
    scatter: Annotated[float, Field(ge=0.0, lt=1.0)] | None = None
    source: Text
    title: Text | None = None
    tensile_strength: Pressure | None = None
    hardness: Hardness | None = None
    modulus: Pressure | None = None
    density: Density | None = None
    chips: Literal["long", "short"] | None = None
    work_hardening: bool | None = None
    built_up_edge: SpeedRange | None = None

    @model_validator(mode="after")
    def _pairs_are_whole(self) -> MaterialTable:
        if (self.kc11 is None) != (self.mc is None):
            raise complaint("kc11 and mc belong together", "both")
        if self.kc11 is None and self.group != "O":
            raise complaint("kc11 and mc are missing", 'both; only group "O" may do without')
        if (self.kn11 is None) != (self.mn is None):
            raise complaint("kn11 and mn belong together", "both or neither")
        return self


class EarlierPartTable(Table):
    """workpiece.stock: the part as an earlier job leaves it."""

    model_config = ConfigDict(validate_by_alias=True, validate_by_name=False)

    job: Text = Field(alias="from")
    flipped: bool = False


class WorkpieceTable(Table):
    """[workpiece]: the raw stock and what is asked of the part."""

    model_config = ConfigDict(
        json_schema_extra={
            "anyOf": [
                {"required": ["diameter", "length"]},
                {"required": ["profile", "length"]},
                {"required": ["stock"]},
            ]
        }
    )

    material: MaterialTable | None = None  # a name is looked up before this table is read
    diameter: Length | None = None
    profile: list[PlaceAndDiameter] | None = Field(None, min_length=2)
    stock: EarlierPartTable | None = None
    length: Length | None = None
    face: Place | None = None
    bore: LengthOrNone | None = None
    skin: Literal["bright", "hot rolled", "cast", "forged", "sawn"] | None = None
    diameter_spread: LengthOrNone | None = None
    section: Literal["round", "hexagon", "square"] | None = None
    interrupted: list[PlaceRange] | None = None
    diameter_tolerance: Length | None = None
    roughness: Roughness | None = None
    finished: list[PlaceAndDiameter] | None = Field(None, min_length=2)
    finished_bore: list[PlaceAndDiameter] | None = Field(None, min_length=2)

    @model_validator(mode="after")
    def _stock_is_told_once(self) -> WorkpieceTable:
        if self.diameter is not None and self.profile is not None:
            raise complaint("diameter and profile are both given", "one of them")
        if self.stock is not None:
            told = [key for key in ("diameter", "profile", "length", "bore") if getattr(self, key) is not None]
            if told:
                raise complaint(f"stock and {told[0]} are both given", "stock alone: the earlier job says the rest")
        if self.profile is not None:
            _check_outline(self.profile)
        if self.bore and self.bore >= max(size for _, size in self.profile or [(0.0, self.diameter or 0.0)]):
            raise complaint("the bore leaves no wall", "a bore smaller than the stock's diameter")
        return self


def _check_outline(profile: list[tuple[float, float]]) -> None:
    places = [z for z, _ in profile]
    steps = [later - earlier for earlier, later in pairwise(places)]
    if any(step > 0 for step in steps) and any(step < 0 for step in steps):
        raise complaint("the profile runs to and fro along Z", "points in one direction, as along the axis")
    if places[0] == places[-1]:
        raise complaint("the profile has no length", "points at different Z")


class ModelTable(Table):
    """[model]: how the prediction is made."""

    speed_correction: bool | None = None
    operation_factor: bool | None = None
    wear_factor: Annotated[float, Field(ge=1.0, le=5.0)] | None = None


class AcceptedTable(Table):
    """[[accepted]]: a person's decision, with a reason."""

    check: Text
    reason: Text
    line: Annotated[int, Field(ge=1)] | None = None
    tool: Annotated[int, Field(ge=1)] | None = None
    until: datetime.date | None = None
