"""Rapid through the stock: does a rapid move hit something, or end too near it?

What
    Follows every rapid move with the tool's outline through what is left of the stock at that moment: in a
    straight line, and along the bent path of two axes that each run at their own rate. Also: contact with chuck
    and tailstock, rapids that end close to a raw surface, and pieces that come loose other than by parting.

Why
    Nothing stops a rapid. It hits at full speed; the insert is the least of what breaks. Raw stock varies in
    size, so a rapid that ends a hair off the drawing size may end inside the bar. A ring that comes loose flies.

Formula and source
    Geometry of the half-section, exact. Stop: contact in the straight path; contact in the bent path (review
    when the machine's rapid rates are not declared, since they shape it); contact with chuck or tailstock.
    A tool that draws away from the surface it has just cut and grazes less than 0.05 mm: a note. One that lifts
    off along the shoulder it has cut wipes away the wedge its edge left: a note up to 0.2 mm, a review up to 0.6.
    Review: a rapid that ends nearer to a raw surface than rapid_clearance (rolled, cast or forged) or
    rapid_clearance_bright (bright or sawn); a loose piece. Common practice.

Remedy
    Move one axis after the other, or start the rapid further out; feed the last millimetre to a raw surface.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import shapely
from shapely.geometry.base import BaseGeometry

from auditor.checks._judging import origin, threshold
from auditor.checks._solids import entered, jaw_zone, outlines, tailstock_zone
from auditor.checks._words import figure, length, x_word, z_word
from auditor.declared.model import Point
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Kind, Move
from auditor.simulate.samples import Contact, LoosePiece
from auditor.simulate.tool_outline import tool_outline

CHECK = "rapid-in-stock"
LIMITS = (
    Limit("rapid_clearance", 1.0, "mm", "common practice", "least distance from a rolled, cast or forged surface"),
    Limit("rapid_clearance_bright", 0.5, "mm", "common practice", "least distance from a bright or sawn surface"),
)
TRUE_SKINS = ("bright", "sawn")  # known to a few tenths of a millimetre
SMALLEST_PIECE = 5.0  # mm3; what is smaller is swarf
GRAZE = 0.05  # mm; a wipe of the surface the tool is just leaving
LIFT_OFF = 0.2  # mm; what a 95 degree edge leaves at a shoulder over the usual lift-off
SHOULDER_WEDGE = 0.6  # mm
LEAST_SINE = 1e-6  # a rapid flatter than this to the surface does not leave it
CUTS_OFF = ("parting", "grooving", "face grooving")


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Rapids that touch, rapids that end too near, and pieces that come loose."""
    for contact in run.simulation.contacts:
        yield from _judge_contact(run, contact)
    for name, zone in (("chuck", jaw_zone(run)), ("tailstock", tailstock_zone(run.job.workholding))):
        if zone is not None:
            yield from _judge_body(run, name, zone)
    for piece in run.simulation.loose:
        yield from _judge_piece(run, piece)


def _judge_contact(run: Run, contact: Contact) -> Iterator[Finding]:
    move = run.path.moves[contact.move]
    at = Point(contact.z, contact.r)
    place = f"at {x_word(run, contact.r)} {z_word(run, contact.z)}"
    deep = length(run, contact.depth)
    remedy = "Move one axis after the other, or start the rapid further out."
    if contact.kind == "near":
        clearance = LIMITS[1 if run.job.workpiece.skin in TRUE_SKINS else 0]
        if contact.depth >= threshold(run, clearance) - 1e-6:
            return
        level, message = Level.REVIEW, f"The rapid ends {deep} from raw stock {place}; raw sizes vary. " \
            f"{origin(run, (clearance,))}"
        remedy = f"Stop the rapid {length(run, threshold(run, clearance))} or more short, and feed from there."
    elif contact.depth < GRAZE and _leaves(run, move):
        level, remedy = Level.NOTE, "Feed the lift-off if the mark matters."
        message = f"The tool grazes the surface it is leaving as it draws away at rapid, {deep} {place}."
    elif contact.kind == "rapid" and _lifts_off(run, move, contact):
        level = Level.NOTE if contact.depth <= LIFT_OFF else Level.REVIEW
        message = f"The tool wipes along the shoulder it has just cut at rapid {place}, {deep} deep."
        remedy = "Feed the lift-off, or lift off along Z first."
    elif contact.kind == "rapid":
        level, message = Level.STOP, f"The tool hits the stock at rapid {place}, {deep} deep. " \
            "What it would have broken out is counted as cut from here on."
    elif contact.kind == "dogleg":
        assumed = any(item.about.startswith("machine.rapid") for item in run.job.assumptions)
        level = Level.REVIEW if assumed else Level.STOP
        message = "The two axes do not run in a straight line: each runs at its own rapid rate, and the bent " \
            f"path goes through the stock {place}, {deep} deep." + (" The rates are assumed." if assumed else "")
    else:
        return
    yield run.finding(CHECK, level, move, message, at=at, value=contact.depth, unit="mm", remedy=remedy)


def _leaves(run: Run, move: Move) -> bool:
    """Whether a rapid draws away from the surface that the same tool cut up to the rapid's start."""
    before = run.path.moves[move.index - 1] if move.index else None
    start, end = move.start, move.end
    if before is None or before.kind in (Kind.RAPID, Kind.THREAD) or before.tool != move.tool:
        return False
    normal = _away(run, before)
    if normal is None or start is None or end is None or before.end != start:
        return False
    along = normal[0] * (end.z - start.z) + normal[1] * (end.r - start.r)
    return along > LEAST_SINE * math.hypot(end.z - start.z, end.r - start.r)


def _away(run: Run, cut: Move) -> tuple[float, float] | None:
    """Unit vector (z, r) square to where a cut ends, from the surface it leaves towards the tool's body."""
    tool = run.job.tools.get(cut.tool) if cut.tool is not None else None
    if tool is None or cut.start is None or cut.end is None:
        return None
    dz, dr = cut.end.z - cut.start.z, cut.end.r - cut.start.r
    if cut.centre is not None:  # an arc ends square to its radius
        dz, dr = cut.centre.r - cut.end.r, cut.end.z - cut.centre.z
    size = math.hypot(dz, dr)
    if size == 0.0:
        return None
    middle = tool_outline(tool).hull().mean(axis=0)
    side = 1.0 if middle[1] * dz - middle[0] * dr > 0.0 else -1.0
    return -side * dr / size, side * dz / size


def _lifts_off(run: Run, move: Move, contact: Contact) -> bool:
    """Whether the tool only draws away from its own surface and takes the wedge its edge left at the shoulder."""
    start, end = move.start, move.end
    if start is None or end is None or contact.depth > SHOULDER_WEDGE or abs(end.z - start.z) > 1e-6:
        return False
    tool = run.job.tools.get(move.tool) if move.tool is not None else None
    inside = tool is not None and tool.kind == "boring"
    away = start.r - end.r if inside else end.r - start.r
    return away > 0.0 and abs(contact.r - start.r) < 0.1


def _judge_body(run: Run, name: str, zone: BaseGeometry) -> Iterator[Finding]:
    """Rapids through the chuck's jaws or the tailstock."""
    low, bottom, high, top = zone.bounds
    shapes = outlines(run)
    for move in run.path.moves:
        start, end = move.start, move.end
        if move.kind is not Kind.RAPID or move.tool not in shapes or start is None or end is None:
            continue
        shape = shapes[move.tool]
        if min(start.z, end.z) + shape[:, 0].min() > high or max(start.z, end.z) + shape[:, 0].max() < low:
            continue
        if min(start.r, end.r) + shape[:, 1].min() > top or max(start.r, end.r) + shape[:, 1].max() < bottom:
            continue
        inside = entered(shape, move, zone)
        if inside is not None:
            z, r = float(shapely.bounds(inside)[2]), float(shapely.bounds(inside)[3])
            message = f"The tool hits the {name} at rapid at {x_word(run, r)} {z_word(run, z)}."
            yield run.finding(CHECK, Level.STOP, move, message, at=Point(z, r),
                              remedy="Move one axis after the other, or start the rapid further out.")


def _judge_piece(run: Run, piece: LoosePiece) -> Iterator[Finding]:
    move = run.path.moves[piece.move]
    tool = run.job.tools.get(move.tool) if move.tool is not None else None
    if piece.volume < SMALLEST_PIECE or (tool is not None and tool.kind in CUTS_OFF):
        return
    message = f"A piece of {figure(piece.volume / 1000.0, 2)} cm3 between {z_word(run, piece.z[0])} and " \
              f"{z_word(run, piece.z[1])} comes loose here and flies; no parting tool is at work."
    yield run.finding(CHECK, Level.REVIEW, move, message, remedy="Take that stock off in chips before this move.")
