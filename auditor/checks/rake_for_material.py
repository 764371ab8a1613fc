"""Rake for the material: does the edge suit what it cuts?

What
    Compares effective rake, clearance and edge rounding of each tool's main cut with what the work material wants:
    plastics, aluminium and copper, brass, hardened steel, titanium and nickel alloys.

Why
    Soft and sticky materials want a sharp edge and a steep face, or they smear, weld and burr. Brass pulls a steep
    edge into itself. Hard work breaks a slim one. Titanium and nickel harden under a blunt one.

Formula and source
    Common practice. Plastics: effective rake 0 deg or more, clearance 7 deg or more (a note under 10), edge radius
    20 um at most.
    Aluminium and copper: rake 5 deg or more, edge radius 20 um at most. Brass and other short-chip non-ferrous: rake
    5 deg at most (note). Work over 45 HRC with ceramic or CBN: rake -5 deg or less, or a chamfered land. Titanium
    and nickel alloys: no negative rake in finishing cuts, feed 0.05 or more. Review, once a tool; a note where the
    rake face or edge of the tool is assumed and not declared.

Remedy
    A geometry made for the material; or declare face_rake, land_width and edge_radius of the insert in use.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._cuts import Cut, cuts
from auditor.checks._words import angle, figure, finding_at
from auditor.declared.model import Material, Tool
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.mechanics.clearance import normal_clearance

CHECK = "rake-for-material"
LIMITS: tuple[Limit, ...] = ()
SHARP = 0.020  # mm of edge radius
LEAST_CLEARANCE, GOOD_CLEARANCE = 7.0, 10.0  # deg, plastics
HARD = 425.0  # HB, about 45 HRC
HARD_CUTTERS = ("ceramic", "cbn")


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Tools whose edge does not suit the work material."""
    loads, material = run.prediction.loads, run.job.workpiece.material
    main: dict[int, Cut] = {}
    for cut in cuts(run):
        known = main.get(cut.tool.number)
        if known is None or cut.largest(loads.area) > known.largest(loads.area):
            main[cut.tool.number] = cut
    for cut in main.values():
        row = cut.row_of_largest(loads.area)
        fault = _fault(run, material, cut, float(loads.rake[row]))
        if fault is not None:
            yield _finding(run, cut, row, fault)
        elif material.group == "O" and _clearance(cut.tool) < GOOD_CLEARANCE:
            message = f"Clearance {figure(_clearance(cut.tool))} deg is usual in {material.name}; " \
                      f"{GOOD_CLEARANCE:.0f} deg or more is preferred (common practice)."
            yield finding_at(run, CHECK, Level.NOTE, row, message)


def _fault(run: Run, material: Material, cut: Cut, rake: float) -> str | None:
    """What does not suit, in words."""
    tool = cut.tool
    if material.group == "O":
        poor = [*_under(rake, 0.0, "rake"), *_under(_clearance(tool), LEAST_CLEARANCE, "clearance"), *_dull(tool)]
        return f"plastic smears and is pushed away instead of cut ({'; '.join(poor)})" if poor else None
    if material.group == "N" and material.chips == "long":
        poor = [*_under(rake, 5.0, "rake"), *_dull(tool)]
        return f"it welds on and burrs ({'; '.join(poor)})" if poor else None
    if material.group == "N":
        return f"a steep edge digs in (rake {angle(rake)}, +5 deg at most is wanted)" if rake > 5.0 else None
    if material.group == "H" or (material.hardness or 0.0) > HARD:
        flat = tool.land_width == 0.0 or tool.land_rake >= 0.0
        if tool.substrate in HARD_CUTTERS and rake > -5.0 and flat:
            return f"a {tool.substrate} edge breaks without a chamfer or a rake of -5 deg or less (rake {angle(rake)})"
        return None
    return _heat_resistant(run, cut, rake) if material.group == "S" else None


def _clearance(tool: Tool) -> float:
    return float(normal_clearance(tool.insert_clearance, tool.pocket_rake))


def _under(has: float, wanted: float, name: str) -> list[str]:
    """The fault in words, where an angle is smaller than wanted."""
    return [f"{name} {figure(has)} deg, {wanted:.0f} or more is wanted"] if has < wanted - 1e-6 else []


def _dull(tool: Tool) -> list[str]:
    """The fault in words, where the edge is rounded too much."""
    rounded, most = tool.edge_radius * 1000.0, SHARP * 1000.0
    return [f"edge rounded {figure(rounded)} um, {most:.0f} at most is wanted"] if tool.edge_radius > SHARP else []


def _heat_resistant(run: Run, cut: Cut, rake: float) -> str | None:
    loads = run.prediction.loads
    if run.simulation.final_surface[cut.move.index] and rake < 0.0:
        return f"a blunt edge hardens the surface it leaves (rake {angle(rake)})"
    if cut.largest(loads.feed) < 0.05:
        return f"feed {figure(cut.largest(loads.feed), 3)} runs in the hardened skin of the turn before"
    return None


def _finding(run: Run, cut: Cut, row: int, fault: str) -> Finding:
    material, number = run.job.workpiece.material, cut.tool.number
    guessed = {f"tools.{number}.{key}" for key in ("face_rake", "land_width", "edge_radius")}
    assumed = any(item.about in guessed for item in run.job.assumptions)
    brass = material.group == "N" and material.chips == "short"
    level = Level.NOTE if assumed or brass else Level.REVIEW
    message = f"The edge does not suit {material.name}: {fault}. Common practice."
    if assumed:
        message += " Part of the insert's geometry is assumed."
    return finding_at(run, CHECK, level, row, message, remedy="A geometry made for this material.")
