"""A comparison for other programs: one JSON object, every unit in its key."""

from __future__ import annotations

import json
import math
from dataclasses import fields

from auditor.compare.changes import Change
from auditor.compare.figures import ToolFigures
from auditor.compare.library import Comparison, Variant
from auditor.compare.rake_study import RakeRow, RakeStudy

FORM = "turnaudit-compare/1"
DECIMALS = 6

# field -> key in the document
_FIGURES = {
    "rake": "effective_rake_deg", "clearance": "clearance_deg", "wedge": "wedge_deg", "cutting": "cutting_force_N",
    "feed_force": "feed_force_N", "passive": "passive_force_N", "torque": "torque_Nm", "motor_power": "motor_power_kW",
    "spindle_share": "spindle_share", "work_bend": "diameter_error_mm", "tool_bend": "bar_push_off_mm",
    "roughness": "roughness_Ra_um", "edges": "edges_per_part", "time": "time_s",
}  # fmt: skip
_RAKE = {
    "rake": "effective_rake_deg", "shear_angle": "shear_angle_deg", "chip_ratio": "chip_ratio",
    "chip_thickness": "chip_thickness_out_mm", "cutting": "cutting_force_N", "feed_force": "feed_force_N",
    "passive": "passive_force_N", "motor_power": "motor_power_kW", "wedge": "wedge_deg",
    "clearance": "clearance_if_tilted_deg",
}  # fmt: skip


def comparison_document(
    program: str, job: str | None, number: int, comparison: Comparison | None, study: RakeStudy | None
) -> str:
    """The whole document."""
    body: dict[str, object] = {"report": FORM, "program": program, "job": job, "tool": number}
    if comparison is not None:
        body["tools"] = [_variant(variant) for variant in (comparison.base, *comparison.others)]
    if study is not None:
        body["rake_study"] = _study(study)
    return json.dumps(body, indent=1, allow_nan=False) + "\n"


def _variant(variant: Variant) -> dict[str, object]:
    return {
        "name": variant.name,
        "verdict": variant.audit.verdict,
        "figures": _named(variant.figures, _FIGURES),
        "changes": [_change(change) for change in variant.changes],
    }


def _change(change: Change) -> dict[str, object]:
    finding = change.finding
    before, after = change.before, change.after
    return {
        "what": change.what, "check": finding.check, "line": finding.line, "block": finding.block,
        "tool": finding.tool, "fingerprint": finding.fingerprint, "accepted": finding.accepted is not None,
        "level": [None if side is None else str(side.level) for side in (before, after)],
        "value": [None if side is None else _number(side.value) for side in (before, after)],
        "limit": _number(finding.limit), "unit": finding.unit, "message": finding.message,
    }  # fmt: skip


def _study(study: RakeStudy) -> dict[str, object]:
    return {
        "line": study.move.line, "depth_of_cut_mm": _number(study.depth), "feed_mm_per_rev": _number(study.feed),
        "cutting_speed_m_per_min": _number(study.speed), "mean_chip_thickness_mm": _number(study.chip),
        "now": _named(study.now, _RAKE), "rows": [_named(row, _RAKE) for row in study.rows],
    }  # fmt: skip


def _named(record: ToolFigures | RakeRow, keys: dict[str, str]) -> dict[str, float | None]:
    return {keys[field.name]: _number(getattr(record, field.name)) for field in fields(record)}


def _number(value: float | None) -> float | None:
    if value is None or not math.isfinite(value):
        return None
    return round(float(value), DECIMALS) + 0.0  # + 0.0 turns -0.0 into 0.0
