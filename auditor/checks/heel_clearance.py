"""Heel clearance: does the flank below the edge rub on the work?

What
    Works out the clearance that is left under the edge in each cut: the insert's own, plus what the tilt of the
    pocket gives, less what the feed, an edge off centre height and a bore's curvature take.

Why
    Without clearance the flank stands on the work. The tool is pushed away, squeals and burns; it wears in
    minutes, and no feed or speed cures it. The classic cases: an insert without clearance in a pocket that does
    not tilt, and a thick insert in a small bore.

Formula and source
    Normal clearance = insert letter (ISO 1832) less pocket rake (ISO 3002-1: wedge, rake and clearance of one plane
    add up to 90 degrees). The feed turns the cutting direction by atan(f / pi d), which the main edge loses; an
    edge above centre loses asin(2 e / d) outside and gains it in a bore. In a bore of radius R an insert of
    thickness v needs atan((R - sqrt(R^2 - v^2)) / v), or its heel touches. Stop: nothing left. Review: under
    least_clearance, or rake and clearance turned by more than height_turn (common practice). Near the centre, where
    feeding inwards takes all clearance, nothing is judged. Where the tilt of the pocket is not known no stop rests
    on it.

Remedy
    An insert with clearance (letters B, C, P, D), a pocket that tilts more, the edge on centre height, or for a
    bore a thinner insert.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.typing import NDArray

from auditor.checks._cuts import Cut, cuts
from auditor.checks._judging import origin, threshold
from auditor.checks._words import figure, finding_at, length, x_word
from auditor.declared.iso_inserts import decode_insert
from auditor.declared.model import Tool, ToolKind
from auditor.errors import TurnauditError
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.mechanics.clearance import (
    bore_heel_clearance,
    feed_angle,
    height_angle,
    height_effect,
    normal_clearance,
    orthogonal_clearance,
)
from auditor.mechanics.rake import normal_rake

CHECK = "heel-clearance"
LIMITS = (
    Limit("least_clearance", 3.0, "deg", "common practice", "least working clearance"),
    Limit("height_turn", 2.0, "deg", "common practice", "largest turn of rake and clearance by height"),
)
KINDS: tuple[ToolKind, ...] = ("turning", "boring", "grooving", "parting")
CENTRE = 5.0  # mm of diameter within which a tool that feeds to the centre is not judged

Floats = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Left:
    """Clearance left at the worst place of a cut, and what was taken from it there; deg."""

    row: int
    angle: float
    by_insert: float
    by_pocket: float
    by_feed: float
    by_height: float


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts whose flank rubs or nearly does."""
    loads = run.prediction.loads
    turned = np.asarray(feed_angle(np.nan_to_num(loads.feed), 2.0 * np.abs(loads.r)))
    for cut in cuts(run, KINDS):
        left = _left(run, cut, turned[cut.rows])
        if left is not None and left.angle < threshold(run, LIMITS[0]):
            yield _finding(run, cut, left)
            continue
        finding = _judge_height(run, cut) or (_judge_heel(run, cut) if cut.tool.kind == "boring" else None)
        if finding is not None:
            yield finding


def _left(run: Run, cut: Cut, turned: Floats) -> Left | None:
    """The worst place of the cut, with the feed's turn of the cutting direction; None when all lies in the centre."""
    loads, tool = run.prediction.loads, cut.tool
    own = _own_clearance(tool.insert_clearance, tool.pocket_rake, tool.pocket_inclination)
    diameter = 2.0 * np.abs(loads.r[cut.rows])
    judged = loads.depth[cut.rows] > 0.0
    if _to_centre(cut):
        judged &= diameter >= CENTRE
    if not judged.any():
        return None
    by_feed, by_height = _taken(cut, turned, diameter)
    left = np.where(judged, own - by_feed - by_height, np.inf)
    worst = int(np.argmin(left))
    return Left(cut.rows.start + worst, float(left[worst]), tool.insert_clearance, own - tool.insert_clearance,
                float(by_feed[worst]), float(by_height[worst]))


@cache
def _own_clearance(insert: float, pocket_rake: float, inclination: float) -> float:
    """Orthogonal clearance of the insert in its pocket, deg."""
    normal = float(normal_clearance(insert, normal_rake(pocket_rake, inclination)))
    return float(orthogonal_clearance(normal, inclination))


def _to_centre(cut: Cut) -> bool:
    return cut.move.end is not None and cut.move.end.r < CENTRE / 2.0 and _crosses(cut)


def _crosses(cut: Cut) -> bool:
    """Whether the tool travels along X rather than along Z."""
    start, end = cut.move.start, cut.move.end
    return start is not None and end is not None and abs(end.r - start.r) > abs(end.z - start.z)


def _taken(cut: Cut, turned: Floats, diameter: Floats) -> tuple[Floats, Floats]:
    """What feed and height take, deg: the feed acts on the main edge, the height in the plane across the axis."""
    tool = cut.tool
    by_height = np.zeros(len(diameter))
    if tool.centre_height:
        by_height = -np.asarray(height_effect(tool.centre_height, diameter, internal=tool.kind == "boring")[1])
    square = np.sin(np.radians(tool.cutting_edge_angle if tool.kind in ("turning", "boring") else 90.0))
    by_feed = turned * square
    if _crosses(cut):
        return by_feed, by_height * square
    # along Z the feed acts on the main edge and the height at the tip: the worse of the two places
    at_tip = by_height > by_feed
    return np.where(at_tip, 0.0, by_feed), np.where(at_tip, by_height, 0.0)


def _finding(run: Run, cut: Cut, left: Left) -> Finding:
    assumed = any(item.about == f"tools.{cut.tool.number}.clearance_angle" for item in run.job.assumptions)
    certain = cut.tool.pocket_known and not assumed
    level = Level.STOP if left.angle <= 0.0 and certain else Level.REVIEW
    shares = f"insert {figure(left.by_insert)} deg"
    for name, given in (("pocket", left.by_pocket), ("feed", -left.by_feed), ("height", -left.by_height)):
        if abs(given) >= 0.05:
            shares += f", {name} {given:+.1f}"
    if left.angle <= 0.0:
        fate = f"No working clearance is left ({figure(left.angle)} deg: {shares}): the flank rubs"
    else:
        fate = f"The flank nearly rubs on the work: {figure(left.angle)} deg of working clearance are left ({shares})"
    message = f"{fate}. {origin(run, LIMITS[:1])}"
    if not certain:
        message += " The tilt of the pocket is assumed."
    return finding_at(run, CHECK, level, left.row, message, value=left.angle, limit=threshold(run, LIMITS[0]),
                      unit="deg", remedy=_remedy(cut.tool))


def _remedy(tool: Tool) -> str:
    if tool.centre_height:
        return "Set the edge on centre height."
    if tool.insert_clearance == 0.0:
        return "An insert with clearance (letters B, C, P, D), or a pocket tilted to about -6 deg."
    return "An insert with more clearance."


def _judge_height(run: Run, cut: Cut) -> Finding | None:
    """An edge so far off centre that rake and clearance are not what they seem, though none is used up."""
    loads, height = run.prediction.loads, cut.tool.centre_height
    diameter = 2.0 * np.abs(loads.r[cut.rows])[loads.depth[cut.rows] > 0.0]
    if _to_centre(cut):
        diameter = diameter[diameter >= CENTRE]
    if not height or not len(diameter):
        return None
    turn, most = float(height_angle(abs(height), diameter.min())), threshold(run, LIMITS[1])
    if turn <= most:
        return None
    side = "above" if height > 0.0 else "below"
    message = f"The edge stands {figure(abs(height), 2)} mm {side} centre: " \
              f"at {x_word(run, 0.5 * float(diameter.min()))} that turns rake and clearance by {figure(turn)} deg. " \
              f"{origin(run, LIMITS[1:])}"
    return finding_at(run, CHECK, Level.REVIEW, cut.row_of_largest(loads.depth), message, value=turn, limit=most,
                      unit="deg", remedy="Set the edge on centre height.")


def _judge_heel(run: Run, cut: Cut) -> Finding | None:
    """A flat flank, as deep as the insert is thick, inside the bore it cuts."""
    loads, tool = run.prediction.loads, cut.tool
    thick = thickness(tool)
    radii = np.abs(loads.r[cut.rows])[loads.depth[cut.rows] > 0.0]
    if thick is None or _crosses(cut) or not len(radii) or radii.min() <= thick:
        return None
    radius = float(radii.min())
    pocket = float(normal_rake(tool.pocket_rake, tool.pocket_inclination))
    has = float(normal_clearance(tool.insert_clearance, pocket))
    needs = float(bore_heel_clearance(radius, thick))
    if has >= needs:
        return None
    message = f"The heel of the {figure(thick, 2)} mm thick insert touches the bore of {length(run, 2 * radius, 1)}: " \
              f"it needs {figure(needs)} deg of clearance and has {figure(has)} (geometry)."
    level = Level.STOP if tool.pocket_known else Level.NOTE if tool.insert_clearance else Level.REVIEW
    if not tool.pocket_known:
        message += " The tilt of the bar's pocket is not declared; small bars tilt to buy this clearance."
    return finding_at(run, CHECK, level, cut.row_of_largest(loads.depth), message, value=has, limit=needs, unit="deg",
                      remedy="An insert with more clearance or less thickness.")


def thickness(tool: Tool) -> float | None:
    """Thickness of the insert, mm, from its code; None when there is none."""
    if tool.insert is None:
        return None
    try:
        return decode_insert(tool.insert).thickness
    except TurnauditError:
        return None
