"""Declared tools: what the codes say, what is written over them, and what is taken for granted."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from typing import Literal

from auditor.declared import tool_tables as rows
from auditor.declared.faults import Place
from auditor.declared.model import Tool, ToolKind
from auditor.declared.notes import Notes
from auditor.declared.tool_sources import Codes, Sources
from auditor.errors import Fault

Hand = Literal["right", "left", "neutral"]
NOTHING: tuple[None, str] = (None, "")  # no code says it


@dataclass(frozen=True, slots=True)
class EdgeForm:
    """Rake face and edge that an insert is taken to have when nobody says (model)."""

    face_rake: float  # deg
    land_width: float  # mm
    edge_radius: float  # mm
    why: str


WITH_BREAKER = EdgeForm(12.0, 0.15, 0.040, "usual for an insert with a chip-breaker, by letter 4")
WITHOUT_BREAKER = EdgeForm(0.0, 0.0, 0.025, "usual for an insert without a chip-breaker, by letter 4")
PLAIN = EdgeForm(0.0, 0.0, 0.025, "no insert code tells of a chip-breaker")
NEGATIVE_TILT = -6.0  # deg, rake and inclination of common pockets for inserts without clearance (common practice)
USUAL_CLEARANCE = 7.0  # deg, ISO 1832 letter C
BLADE_CORNER = 0.2  # mm
ROUND = 60.0  # deg, stands in for the included angle that a round insert has not
THREAD_CORNER = 0.1  # mm
THREAD_ANGLE = 60.0  # deg, ISO 68-1
POINT_ANGLE = 118.0  # deg, common twist drill


@dataclass(frozen=True, slots=True)
class Pocket:
    """How the insert sits: its clearance and the tilt of the seat, deg."""

    clearance: float
    rake: float
    inclination: float
    known: bool  # False: no certain verdict on clearance may rest on these


def tool_of(
    number: int, table: rows.CuttingTool, name: str | None, place: Place, notes: Notes, faults: list[Fault]
) -> Tool | None:
    """One tool; None when a value it needs is neither declared nor in its codes."""
    if isinstance(table, rows.BarStop):
        tip = table.tip if table.tip is not None else 3
        return Tool(number=number, name=name or f"T{number} bar stop", kind="stop", tip=tip)
    sources = Sources(table, place, notes)
    if isinstance(table, rows.DrillingTool):
        tool = _drill(number, table, name, sources)
    else:
        tool = _insert_tool(number, table, name, sources)
        if not sources.faults:
            _check_corner(tool, sources)
    faults.extend(sources.faults)
    return None if sources.faults else tool


def tip_of(kind: ToolKind, hand: Hand, inside: bool) -> int:
    """The imaginary tip number a tool usually has: towards the chuck, outside 3, inside 2.

    Example
    -------
    >>> tip_of("turning", "right", inside=False), tip_of("boring", "right", inside=True)
    (3, 2)
    """
    if kind == "drilling":
        return 7
    if kind == "threading":
        return 6 if inside else 8
    if inside:
        return 2
    if kind == "turning":
        return {"right": 3, "left": 4, "neutral": 8}[hand]
    return 3  # blades are programmed with a corner: nearer the chuck, or in the face nearer the axis


def _common(number: int, kind: ToolKind, name: str, hand: Hand, table: rows.AnyTool, notes: Notes) -> Tool:
    """What every cutting tool has."""
    return Tool(
        number=number,
        name=name,
        kind=kind,
        substrate=notes.other("substrate", table.substrate, "coated carbide", "the usual cutting material"),
        speed=table.speed,
        taylor=(table.taylor.speed, table.taylor.exponent) if table.taylor else None,
        force_limit=table.force_limit,
        overhang=table.overhang,
        hand=hand,
        centre_height=notes.number("centre_height", table.centre_height, 0.0, "mm", "on centre"),
    )


def _drill(number: int, table: rows.DrillingTool, name: str | None, sources: Sources) -> Tool:
    notes = sources.notes
    if table.diameter is None:
        sources.missing("diameter")
    called = name or f"T{number} drill {table.diameter or 0.0:g} mm"
    hand: Hand = notes.other("hand", table.hand, "right", "the usual hand")
    return replace(
        _common(number, "drilling", called, hand, table, notes),
        edge_radius=notes.number("edge_radius", table.edge_radius, PLAIN.edge_radius, "mm", "usual for a drill"),
        point_angle=notes.number("point_angle", table.point_angle, POINT_ANGLE, "deg", "the common twist drill"),
        diameter=table.diameter,
        flutes=notes.other("flutes", table.flutes, 2, "the common twist drill"),
        tip=notes.other("tip", table.tip, tip_of("drilling", "right", inside=False), "the point of the drill"),
    )


def _insert_tool(number: int, table: rows.EdgeTool, name: str | None, sources: Sources) -> Tool:
    codes = sources.codes()
    kind, holder = table.kind, codes.holder
    called = f"T{number} {table.insert or name or kind}"
    hand: Hand = sources.word("hand", codes.of_holder("hand"), "right", "the usual hand")
    inside = kind == "boring" or (holder is not None and holder.kind == "bar")
    pocket = _pocket(kind, codes, sources)
    included = _included(kind, codes, sources)
    tool = replace(
        _common(number, kind, called, hand, table, sources.notes),
        insert=table.insert,
        holder=table.holder,
        shape=_shape(codes),
        nose_radius=_nose_radius(kind, codes, sources),
        cutting_edge_angle=_edge_angle(kind, codes, included, sources),
        edge_faces_end=holder.end_style if holder else kind in ("grooving", "parting"),
        included_angle=included,
        edge_length=codes.of_insert("edge_length")[0],
        insert_clearance=pocket.clearance,
        pocket_rake=pocket.rake,
        pocket_inclination=pocket.inclination,
        pocket_known=pocket.known,
        width=_width(table, sources),
        insert_faces=table.insert_faces,
        tip=sources.notes.other("tip", table.tip, tip_of(kind, hand, inside), "by kind, hand and holder"),
    )
    return _with_shank(_with_edge(tool, table, codes, sources), codes, sources)


def _with_edge(tool: Tool, table: rows.EdgeTool, codes: Codes, sources: Sources) -> Tool:
    """Rake face, land and edge: by letter 4 of the insert code unless written."""
    form = _form(codes)
    chamfer, code = codes.of_insert("chamfer_angle")
    sloping = (None if chamfer is None else -chamfer, code)
    return replace(
        tool,
        face_rake=sources.number("face_rake", NOTHING, "deg", form.face_rake, form.why),
        land_width=sources.number("land_width", codes.of_insert("chamfer_width"), "mm", form.land_width, form.why),
        land_rake=sources.number("land_rake", sloping, "deg", 0.0, form.why),
        edge_radius=sources.number("edge_radius", NOTHING, "mm", form.edge_radius, form.why),
        breaker_declared=form is WITH_BREAKER or table.breaker_feed is not None or table.breaker_depth is not None,
        breaker_feed=table.breaker_feed,
        breaker_depth=table.breaker_depth,
    )


def _with_shank(tool: Tool, codes: Codes, sources: Sources) -> Tool:
    return replace(
        tool,
        bar_diameter=sources.optional("bar_diameter", codes.of_holder("bar_diameter"), "mm"),
        shank_height=sources.optional("shank_height", codes.of_holder("shank_height"), "mm"),
        shank_width=sources.optional("shank_width", codes.of_holder("shank_width"), "mm"),
        bar_material=sources.word("bar_material", codes.of_holder("bar_material"), "steel", "the usual shank"),
    )


def _shape(codes: Codes) -> str | None:
    if codes.insert:
        return codes.insert.shape
    return codes.holder.insert_shape if codes.holder else None


def _form(codes: Codes) -> EdgeForm:
    """The rake face by letter 4; letter X says nothing."""
    breaker = codes.insert.breaker if codes.insert else None
    if breaker is None:
        return PLAIN
    return WITH_BREAKER if breaker else WITHOUT_BREAKER


def _included(kind: ToolKind, codes: Codes, sources: Sources) -> float:
    if not isinstance(sources.table, rows.CornerTool):
        return 90.0  # a blade of parallel sides
    if _shape(codes) == "R":
        return ROUND
    if kind == "threading":
        return sources.number("included_angle", codes.included_angle, "deg", THREAD_ANGLE, "ISO metric thread")
    return sources.number("included_angle", codes.included_angle, "deg")


def _nose_radius(kind: ToolKind, codes: Codes, sources: Sources) -> float:
    said = codes.of_insert("corner_radius")
    if kind == "threading":
        return sources.number("nose_radius", said, "mm", THREAD_CORNER, "a sharp thread insert")
    if isinstance(sources.table, rows.SlotTool):
        return sources.number("nose_radius", said, "mm", BLADE_CORNER, "usual corner of a grooving insert")
    return sources.number("nose_radius", said, "mm")


def _edge_angle(kind: ToolKind, codes: Codes, included: float, sources: Sources) -> float:
    said = codes.of_holder("cutting_edge_angle")
    if kind == "threading":
        both_alike = (180.0 - included) / 2.0
        return sources.number("cutting_edge_angle", NOTHING, "deg", both_alike, "both flanks alike")
    if isinstance(sources.table, rows.SlotTool):
        return sources.number("cutting_edge_angle", NOTHING, "deg", 90.0, "a front edge square to the plunge")
    angle = sources.number("cutting_edge_angle", said, "deg")
    if _shape(codes) != "R" and angle + included > 180.0 + 1e-9:
        message = "the cutting edge angle and the included angle leave no angle for the minor edge"
        found = f"{angle:g} deg and {included:g} deg"
        fault = sources.place.fault(message, "cutting_edge_angle", found=found, wanted="together not over 180 deg")
        sources.faults.append(fault)
    return angle


def _pocket(kind: ToolKind, codes: Codes, sources: Sources) -> Pocket:
    """Clearance of the insert and tilt of its seat; an insert without clearance gets it by tilting."""
    table, said = sources.table, codes.clearance_angle
    guessed = isinstance(table, rows.InsertTool) and table.clearance_angle is None and said[0] is None
    clearance = sources.number("clearance_angle", said, "deg", USUAL_CLEARANCE, "a common positive insert")
    tilt = NEGATIVE_TILT if clearance == 0.0 else 0.0
    why = "an insert without clearance gets it by tilting" if tilt else "an insert with clearance sits flat"
    if kind == "boring":
        why = "boring bars differ: no certain verdict on clearance rests on this tilt"
    tilted = [key for key in ("pocket_rake", "pocket_inclination") if getattr(table, key) is not None]
    return Pocket(
        clearance=clearance,
        rake=sources.number("pocket_rake", NOTHING, "deg", tilt, why),
        inclination=sources.number("pocket_inclination", NOTHING, "deg", tilt, why),
        known=not guessed and (kind != "boring" or len(tilted) == 2),
    )


def _check_corner(tool: Tool, sources: Sources) -> None:
    """The corner must fit on the edges it rounds: tangent length r / tan(epsilon / 2)."""
    if tool.shape == "R":
        return
    room, what = tool.edge_length, "edge"
    reach = tool.nose_radius / math.tan(math.radians(tool.included_angle) / 2.0)
    if tool.width is not None:
        room, what, reach = tool.width, "width", 2.0 * tool.nose_radius
    if room is not None and reach > room + 1e-9:
        message = f"the corner does not fit on the {what} of the insert, {room:.4g} mm"
        wanted = f"at most {tool.nose_radius * room / reach:.4g} mm"
        fault = sources.place.fault(message, "nose_radius", found=f"{tool.nose_radius:g} mm", wanted=wanted)
        sources.faults.append(fault)


def _width(table: rows.InsertTool, sources: Sources) -> float | None:
    if not isinstance(table, rows.SlotTool):
        return None
    if table.width is None:
        sources.missing("width")
    return table.width
