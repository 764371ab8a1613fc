"""[tools.N]: one model a kind, so that a key a kind has no use for is an error."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field

from auditor.declared.fields import (
    Clearance,
    EdgeAngle,
    Force,
    Length,
    LengthOrNone,
    LengthRange,
    Place,
    Speed,
    SpeedRange,
    Table,
    Text,
    Tilt,
)


class TaylorTable(Table):
    """tools.N.taylor: cutting speed for a life of one minute, and n of v T^n = C."""

    speed: Speed
    exponent: Annotated[float, Field(gt=0.0, lt=2.0)]


class AnyTool(Table):
    """What every cutting tool may say."""

    substrate: (
        Literal["high-speed steel", "carbide", "coated carbide", "cermet", "ceramic", "cbn", "pcd"] | None
    ) = None
    speed: SpeedRange | None = None
    taylor: TaylorTable | None = None
    force_limit: Force | None = None
    overhang: Length | None = None
    hand: Literal["right", "left", "neutral"] | None = None
    centre_height: Place | None = None
    tip: Annotated[int, Field(ge=0, le=9)] | None = None
    edge_radius: LengthOrNone | None = None


class InsertTool(AnyTool):
    """A tool with one cutting edge held in a shank: all but drills."""

    insert: Text | None = None
    holder: Text | None = None
    nose_radius: LengthOrNone | None = None
    cutting_edge_angle: EdgeAngle | None = None
    clearance_angle: Clearance | None = None
    pocket_rake: Tilt | None = None
    pocket_inclination: Tilt | None = None
    face_rake: Tilt | None = None
    land_width: LengthOrNone | None = None
    land_rake: Tilt | None = None
    breaker_feed: LengthRange | None = None
    breaker_depth: LengthRange | None = None
    bar_diameter: Length | None = None
    shank_height: Length | None = None
    shank_width: Length | None = None
    bar_material: Literal["steel", "heavy metal", "carbide"] | None = None
    insert_faces: Literal["up", "down"] | None = None


class CornerTool(InsertTool):
    """A tool with one corner between two edges."""

    included_angle: EdgeAngle | None = None


class TurningTool(CornerTool):
    """Outside turning and facing."""

    kind: Literal["turning"]


class BoringTool(CornerTool):
    """Turning inside."""

    kind: Literal["boring"]


class ThreadingTool(CornerTool):
    """Single-point threading."""

    kind: Literal["threading"]


class SlotTool(InsertTool):
    """A blade of parallel sides."""

    width: Length | None = None


class GroovingTool(SlotTool):
    """Grooves in the diameter."""

    kind: Literal["grooving"]


class FaceGroovingTool(SlotTool):
    """Grooves in the face."""

    kind: Literal["face grooving"]


class PartingTool(SlotTool):
    """Parting off."""

    kind: Literal["parting"]


class DrillingTool(AnyTool):
    """Drills on the spindle axis."""

    kind: Literal["drilling"]
    diameter: Length | None = None
    point_angle: EdgeAngle | None = None
    flutes: Annotated[int, Field(ge=1, le=8)] | None = None


class BarStop(Table):
    """A bar stop: touches the stock by design."""

    kind: Literal["stop"]
    tip: Annotated[int, Field(ge=0, le=9)] | None = None


EdgeTool = TurningTool | BoringTool | ThreadingTool | GroovingTool | FaceGroovingTool | PartingTool
CuttingTool = EdgeTool | DrillingTool | BarStop
ToolTable = Annotated[CuttingTool, Field(discriminator="kind")]

KINDS: dict[str, type[Table]] = {
    "turning": TurningTool,
    "boring": BoringTool,
    "grooving": GroovingTool,
    "face grooving": FaceGroovingTool,
    "parting": PartingTool,
    "threading": ThreadingTool,
    "drilling": DrillingTool,
    "stop": BarStop,
}
