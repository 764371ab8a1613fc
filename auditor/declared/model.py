"""The declared world as the stages see it: plain numbers in mm, N, kW, rpm, degrees.

Positions are ``Point(z, r)`` in program coordinates: ``r`` is a **radius** (half the X word),
``z`` the length, zero at the programmed Z0. Everything here is read-only.
"""

from __future__ import annotations

import datetime
from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal, NamedTuple

System = Literal["A", "B", "C"]
ToolKind = Literal[
    "turning", "boring", "grooving", "face grooving", "parting", "threading", "drilling", "stop"
]


class Point(NamedTuple):
    """A point of the half-section: length ``z`` and radius ``r``, mm."""

    z: float
    r: float


@dataclass(frozen=True, slots=True)
class Assumption:
    """A default that a result leaned on; shown in every report."""

    about: str  # key path, e.g. "tools.1.edge_radius"
    value: str  # as a person reads it, e.g. "0.04 mm"
    why: str


@dataclass(frozen=True, slots=True)
class Control:
    """How the program text is to be read: the [control] table."""

    system: System = "A"
    system_declared: bool = False  # False: the reader scores the marks and says what it took
    units: Literal["mm", "in"] | None = None  # None: neither declared; the program must say
    x_words: Literal["diameter", "radius"] = "diameter"
    whole_numbers: Literal["units", "increments"] = "units"
    increment: float = 0.001  # mm (0.0001 in when the program is in inches)
    block_skip: bool = False
    arcs: Literal["standard", "mirrored"] = "standard"
    settings: Mapping[str, str | float | bool] = field(default_factory=dict)  # see interpret.settings


@dataclass(frozen=True, slots=True)
class Machine:
    """Spindle, axes and reference points."""

    name: str
    speed_limit: float  # rpm
    power_curve: tuple[tuple[float, float], ...]  # (rpm, motor kW), rising rpm; constant torque below the first
    base_speed: float  # rpm from which power, not torque, is the bound
    peak_factor: float = 1.0  # short-time rating / continuous rating
    peak_time: float | None = None  # min
    efficiency: float = 0.85  # spindle nose power / motor power
    thrust_x: float | None = None  # N
    thrust_z: float | None = None  # N
    rapid_x: float = 12_000.0  # mm/min
    rapid_z: float = 16_000.0  # mm/min
    turret: Literal["behind", "front"] | None = None
    tool_change: Point | None = None
    home: Point | None = None
    second_home: Point | None = None
    machine_zero: Point | None = None


@dataclass(frozen=True, slots=True)
class Workholding:
    """Chuck, collet, centres: where the work is held and how strongly."""

    name: str
    kind: Literal["chuck", "collet", "chuck+tailstock", "centres"]
    stick_out: float  # mm, jaw face to programmed Z0: the jaw face is at z = -stick_out
    speed_limit: float | None = None  # rpm
    grip_force: float | None = None  # N, total static
    grip_diameter: float | None = None  # mm
    grip_inside: bool = False
    jaws: int = 3
    jaw_mass: float | None = None  # kg
    jaw_radius: float | None = None  # mm
    friction: float | None = None
    tail: float | None = None  # mm of bar behind the spindle
    tail_guided: bool = False
    tailstock_point: Point | None = None
    tailstock_diameter: float | None = None  # mm


@dataclass(frozen=True, slots=True)
class Disagreement:
    """Another source's figure for the same constant, and how far apart they are."""

    source: str
    text: str


@dataclass(frozen=True, slots=True)
class Material:
    """A work material: Kienzle pairs and what the geometry rules need."""

    name: str
    group: Literal["P", "M", "K", "N", "S", "H", "O"]
    title: str
    source: str
    provenance: str  # "confirmed" | "from memory" | "common practice" | "declared"
    kc11: float | None  # N/mm2; None: no published pair (plastics), forces are null
    mc: float | None  # exponent m, not 1 - m
    reference_rake: float = 6.0  # deg
    scatter: float = 0.25  # one-sided relative
    kn11: float | None = None  # declared in-plane thrust pair
    mn: float | None = None
    kf11: float | None = None  # catalogue feed / passive pairs, only as an in-plane resultant
    mf: float | None = None
    kp11: float | None = None
    mp: float | None = None
    friction_angle: float = 32.0  # deg at the reference rake
    tensile_strength: float | None = None  # MPa
    hardness: float | None = None  # HB
    modulus: float = 210_000.0  # MPa
    density: float = 7.85  # g/cm3
    chips: Literal["long", "short"] = "long"
    work_hardening: bool = False
    built_up_edge: tuple[float, float] | None = None  # m/min
    disagreements: tuple[Disagreement, ...] = ()


@dataclass(frozen=True, slots=True)
class EarlierPart:
    """Stock that an earlier job leaves: its job file, and whether the part is turned round for this one."""

    job: str
    flipped: bool
    face: float  # mm of stock in front of Z0


@dataclass(frozen=True, slots=True)
class Workpiece:
    """The raw stock and what is asked of the finished part."""

    material: Material
    outline: tuple[Point, ...]  # raw half-section, closed implicitly, r >= 0; empty until an earlier job gave it
    length: float
    diameter: float  # largest raw diameter, mm
    skin: str = "bright"
    diameter_spread: float = 0.0
    section: Literal["round", "hexagon", "square"] = "round"
    interrupted: tuple[tuple[float, float], ...] = ()  # (z low, z high)
    diameter_tolerance: float | None = None  # mm
    roughness: tuple[Literal["Ra", "Rz"], float] | None = None  # um
    finished: tuple[Point, ...] = ()
    finished_bore: tuple[Point, ...] = ()
    earlier: EarlierPart | None = None


@dataclass(frozen=True, slots=True)
class Tool:
    """One turret station: cutting geometry by ISO 3002, shank, windows."""

    number: int
    name: str  # what a setter reads: "T1 CNMG 120408"
    kind: ToolKind
    insert: str | None = None
    holder: str | None = None
    shape: str | None = None  # ISO 1832 letter
    nose_radius: float = 0.0  # mm
    cutting_edge_angle: float = 90.0  # deg, kappa_r against the feed of its style
    edge_faces_end: bool = False  # True: kappa_r is measured from the X feed (end styles, face work)
    included_angle: float = 80.0  # deg, epsilon_r
    edge_length: float | None = None  # mm along the main edge
    minor_edge_length: float | None = None  # mm; None: as the main edge
    insert_clearance: float = 0.0  # deg, by the second letter
    pocket_rake: float = 0.0  # deg, orthogonal
    pocket_inclination: float = 0.0  # deg
    pocket_known: bool = True  # False: no `stop` for clearance may rest on the tilt
    face_rake: float = 0.0  # deg against the insert's plane
    land_width: float = 0.0  # mm
    land_rake: float = 0.0  # deg against the insert's plane
    edge_radius: float = 0.025  # mm
    breaker_declared: bool = False  # the tool was declared with a chip-breaker (letter or window)
    breaker_feed: tuple[float, float] | None = None  # mm/rev
    breaker_depth: tuple[float, float] | None = None  # mm
    substrate: str = "coated carbide"
    speed: tuple[float, float] | None = None  # m/min
    taylor: tuple[float, float] | None = None  # (C m/min, n)
    force_limit: float | None = None  # N
    overhang: float | None = None  # mm
    bar_diameter: float | None = None  # mm
    shank_height: float | None = None  # mm
    shank_width: float | None = None  # mm
    bar_material: Literal["steel", "heavy metal", "carbide"] = "steel"
    width: float | None = None  # mm, grooving and parting
    point_angle: float = 118.0  # deg, drilling
    diameter: float | None = None  # mm, drilling
    flutes: int = 2
    hand: Literal["right", "left", "neutral"] = "right"
    insert_faces: Literal["up", "down"] | None = None
    centre_height: float = 0.0  # mm above (+) the spindle axis
    tip: int = 3  # imaginary tip number, 0 to 9


@dataclass(frozen=True, slots=True)
class Model:
    """How the prediction is made."""

    speed_correction: bool = True
    operation_factor: bool = True
    wear_factor: float = 1.0  # enters the upper edge of the band only


@dataclass(frozen=True, slots=True)
class Acceptance:
    """A person's decision to live with a finding."""

    check: str
    reason: str
    line: int | None = None
    tool: int | None = None
    until: datetime.date | None = None


@dataclass(frozen=True, slots=True)
class LimitValue:
    """One entry of [limits]: a number in base units (mm, N, kW, rpm, deg, m/min, min) and its dimension."""

    value: float
    dimension: str  # "number" | "length" | "angle" | "force" | "power" | "speed" | "rotation" | "time"
    text: str  # as written


@dataclass(frozen=True, slots=True)
class Job:
    """Everything declared about one program."""

    path: str | None  # as given; None: no job file
    sha256: str | None
    program: str  # path of the program text
    control: Control
    machine: Machine
    workholding: Workholding
    workpiece: Workpiece
    tools: Mapping[int, Tool]
    limits: Mapping[str, LimitValue] = field(default_factory=dict)
    model: Model = Model()
    accepted: tuple[Acceptance, ...] = ()
    assumptions: tuple[Assumption, ...] = ()
    batch: int | None = None
    unattended: bool = False
