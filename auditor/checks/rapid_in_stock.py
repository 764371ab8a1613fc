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
    A tool that only lifts off along the shoulder it has cut wipes away the wedge its edge left: a note up to
    0.2 mm, a review up to 0.6. Review: a rapid that ends nearer than rapid_clearance to a raw surface; a loose
    piece. Common practice.

Remedy
    Move one axis after the other, or start the rapid further out; feed the last millimetre to a raw surface.
"""

from __future__ import annotations

from collections.abc import Iterator

import shapely
from shapely.geometry.base import BaseGeometry

from auditor.checks._judging import origin, threshold
from auditor.checks._remedy import length
from auditor.checks._solids import entered, jaw_zone, outlines, tailstock_zone
from auditor.checks._words import figure, x_word, z_word
from auditor.declared.model import Point
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Kind, Move
from auditor.simulate.samples import Contact, LoosePiece

CHECK = "rapid-in-stock"
LIMITS = (Limit("rapid_clearance", 1.0, "mm", "common practice", "least distance of a rapid's end from a raw surface"),)
SMALLEST_PIECE = 5.0  # mm3; what is smaller is swarf
GRAZE = 0.2  # mm; what a 95 degree edge leaves at a shoulder over the usual lift-off
SHOULDER_WEDGE = 0.6  # mm
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
    match contact.kind:
        case "rapid" if _pulls_off(run, move, contact):
            level = Level.NOTE if contact.depth <= GRAZE else Level.REVIEW
            message = f"The tool wipes along the shoulder it has just cut at rapid {place}, {deep} deep."
        case "rapid":
            level, message = Level.STOP, f"The tool hits the stock at rapid {place}, {deep} deep. " \
                "What it would have broken out is counted as cut from here on."
        case "dogleg":
            assumed = any(item.about.startswith("machine.rapid") for item in run.job.assumptions)
            level = Level.REVIEW if assumed else Level.STOP
            message = "The two axes do not run in a straight line: each runs at its own rapid rate, and the bent " \
                f"path goes through the stock {place}, {deep} deep." + (" The rates are assumed." if assumed else "")
        case _:
            if contact.kind != "near" or contact.depth >= threshold(run, LIMITS[0]) - 0.01:
                return
            level, message = Level.REVIEW, f"The rapid ends {figure(contact.depth, 2)} mm from raw stock {place}; " \
                f"raw sizes vary. {origin(run, LIMITS)}"
    remedy = "Move one axis after the other, or start the rapid further out."
    if contact.kind == "near":
        remedy = "Feed the last millimetre."
    elif level is not Level.STOP and contact.kind == "rapid":
        remedy = "Feed the lift-off, or lift off along Z first."
    yield run.finding(CHECK, level, move, message, at=at, value=contact.depth, unit="mm", remedy=remedy)


def _pulls_off(run: Run, move: Move, contact: Contact) -> bool:
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
