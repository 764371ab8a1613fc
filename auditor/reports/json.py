"""The report for other programs: one JSON object a program, every unit in its key.

Lengths in X are diameters here and nowhere else; a figure that does not apply is ``null``, never NaN.
Letters beyond ASCII are escaped, so that no code page between here and the reader can spoil them.
"""

from __future__ import annotations

import json
from collections.abc import Iterator, Mapping, Sequence

import numpy as np

from auditor.declared.model import Acceptance, Point
from auditor.findings import Audit, Finding
from auditor.interpret.moves import Move
from auditor.predict.loads import Loads
from auditor.reports import Outcome, Unreadable, View
from auditor.reports._rows import between, diameter, largest, number, provisional

Value = str | int | float | bool | None | Sequence["Value"] | Mapping[str, "Value"]
Object = dict[str, Value]

_FORM = "turnaudit/1"
_SET = "turnaudit-set/1"

# report key -> field of the loads, for the curves along a cut
_CURVES = {
    "path_mm": "position", "depth_of_cut_mm": "depth", "edge_engaged_mm": "length", "chip_thickness_mm": "chip_max",
    "chip_area_mm2": "area", "effective_rake_deg": "rake", "spindle_rpm": "rpm", "cutting_force_N": "cutting",
    "feed_force_N": "feed_force", "passive_force_N": "passive", "torque_Nm": "torque", "cutting_power_kW": "power",
    "motor_power_kW": "motor_power", "push_off_mm": "bend",
}


def render(outcome: Outcome, view: View) -> str:
    """One program's object."""
    body = _unreadable(outcome) if isinstance(outcome, Unreadable) else _audit(outcome, view)
    return "{\n" + ",\n".join(f" {json.dumps(key)}: {_laid_out(value)}" for key, value in body.items()) + "\n}"


def join(parts: Sequence[str], several: bool) -> str:
    """A single program's object as it stands; several in a set."""
    if not several and len(parts) == 1:
        return parts[0] + "\n"
    return f'{{"report": "{_SET}", "audits": [' + ",\n".join(parts) + "]}\n"


def _laid_out(value: Value) -> str:
    """A list of objects takes a line an object, so that a difference between two reports can be read."""
    if isinstance(value, list) and value:
        return "[\n  " + ",\n  ".join(json.dumps(item, allow_nan=False) for item in value) + "\n ]"
    return json.dumps(value, allow_nan=False)


def _unreadable(outcome: Unreadable) -> Object:
    errors: list[Object] = [
        {"file": fault.file, "line": fault.line, "key": fault.key, "found": fault.found, "wanted": fault.wanted,
         "message": fault.message}
        for fault in outcome.faults
    ]
    return {"report": _FORM, "program": {"path": outcome.path}, "verdict": "unreadable", "errors": errors}


def _audit(audit: Audit, view: View) -> Object:
    run, coverage, totals = audit.run, audit.coverage, audit.totals
    moves = run.path.moves
    body: Object = {
        "report": _FORM,
        "program": {
            "path": run.text.path, "sha256": run.text.sha256, "lines": len(run.text.lines),
            "system": run.path.system, "units": run.path.units,
        },
        "job": None if run.job.path is None else {"path": run.job.path, "sha256": run.job.sha256},
        "verdict": audit.verdict,
        "coverage": {
            "motion_blocks": coverage.motion_blocks, "audited": coverage.audited,
            "not_audited": [
                {"line": block.line, "text": block.text, "reason": block.reason} for block in coverage.not_audited
            ],
        },
        "not_judged": [{"check": item.check, "why": item.why} for item in audit.not_judged],
        "assumptions": [{"about": item.about, "value": item.value, "why": item.why} for item in audit.assumptions],
        "totals": {
            "time_s": number(totals.time), "cutting_time_s": number(totals.cutting_time),
            "air_feed_time_s": number(totals.air_feed_time), "removed_mm3": number(totals.removed),
        },
        "moves": [_move(move, row, audit) for row, move in enumerate(moves)],
        "findings": [_finding(finding, moves) for finding in audit.findings],
    }
    if view.series:
        body["series"] = list(_series(run.prediction.loads, moves))
    return body


def _move(move: Move, row: int, audit: Audit) -> Object:
    figures = audit.run.prediction.moves
    body: Object = {
        "line": move.line, "block": move.block, "tool": move.tool, "kind": str(move.kind),
        "from": None if move.start_z is None and move.start_r is None else _place(move.start_z, move.start_r),
        "to": _place(move.end_z, move.end_r),
        "feed_mm_per_rev": number(figures.feed_rev[row]),
        "spindle_rpm": between(figures.rpm_low[row], figures.rpm_high[row]),
        "cutting_speed_m_per_min": between(figures.speed_low[row], figures.speed_high[row]),
    }
    if move.centre is not None:
        body["centre"] = _point(move.centre)
        body["clockwise"] = move.clockwise
    body.update(largest(figures, row))
    body["removed_mm3"] = number(audit.run.simulation.removed[row])
    body["time_s"] = number(figures.time[row])
    if provisional(move):
        body["provisional"] = True
    return body


def _finding(finding: Finding, moves: Sequence[Move]) -> Object:
    body: Object = {
        "check": finding.check, "level": str(finding.level), "line": finding.line, "block": finding.block,
        "tool": finding.tool, "at": None if finding.at is None else _point(finding.at),
        "value": number(finding.value),
        "band": None if finding.band is None else between(*finding.band),
        "limit": number(finding.limit), "unit": finding.unit, "message": finding.message, "remedy": finding.remedy,
        "accepted": None if finding.accepted is None else _acceptance(finding.accepted),
        "fingerprint": finding.fingerprint,
    }
    if finding.move is not None and provisional(moves[finding.move]):
        body["provisional"] = True
    return body


def _acceptance(accepted: Acceptance) -> Object:
    until = None if accepted.until is None else accepted.until.isoformat()
    return {"reason": accepted.reason, "until": until}


def _series(loads: Loads, moves: Sequence[Move]) -> Iterator[Object]:
    rows, first = np.unique(loads.move, return_index=True)
    ends = np.append(first[1:], loads.move.size)
    for index, start, end in zip(rows, first, ends, strict=True):
        span = slice(int(start), int(end))
        body: Object = {"move": int(index), "line": moves[int(index)].line}
        body["x_mm"] = [diameter(float(r)) for r in loads.r[span]]
        body["z_mm"] = [number(z) for z in loads.z[span]]
        for key, field in _CURVES.items():
            body[key] = [number(value) for value in getattr(loads, field)[span]]
        yield body


def _point(point: Point) -> Object:
    return _place(point.z, point.r)


def _place(z: float | None, r: float | None) -> Object:
    """A point as the report gives it: X as a diameter."""
    return {"x": diameter(r), "z": number(z)}
