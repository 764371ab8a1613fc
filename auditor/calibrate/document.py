"""A calibration for other programs: one JSON object, every unit in its key."""

from __future__ import annotations

import json

from auditor.calibrate.calibration import Calibration
from auditor.calibrate.log import LoadLog
from auditor.calibrate.shop_lines import material_name, shop_lines
from auditor.declared.model import Job

FORM = "turnaudit-calibration/1"


def calibration_document(calibration: Calibration, job: Job, log: LoadLog) -> str:
    """The whole document."""
    body = {
        "report": FORM, "program": job.program, "job": job.path, "log": log.path, "log_sha256": log.sha256,
        "material": job.workpiece.material.name, "factor": round(calibration.factor, 6),
        "factor_95_percent": [round(end, 6) for end in calibration.interval],
        "idle_power_kW": round(calibration.idle, 6), "idle_power_kW_per_1000_rpm": round(calibration.idle_slope, 6),
        "cuts": calibration.cuts, "air_cuts": calibration.air_cuts, "outlier_lines": list(calibration.held_down),
        "spread_between_cuts": round(calibration.between, 6), "scatter": round(calibration.scatter, 4),
        "scatter_before": calibration.scatter_before, "scatter_why": calibration.scatter_why,
        "tools": [
            {"tool": one.tool, "cuts": len(one.residuals), "mean_residual": round(one.mean, 6),
             "residuals": [round(value, 6) for value in one.residuals]}
            for one in calibration.tools
        ],
        "points": [
            {"line": point.line, "tool": point.tool, "predicted_kW": round(point.predicted, 6),
             "measured_kW": round(point.measured, 6), "rpm": round(point.rpm, 3)}
            for point in calibration.matched.points
        ],
        "not_used": [{"what": one.what, "why": one.why} for one in calibration.matched.left_out],
        "warnings": list(calibration.warnings),
        "shop_material": material_name(job), "shop_lines": shop_lines(calibration, job, log),
    }  # fmt: skip
    return json.dumps(body, indent=1, allow_nan=False) + "\n"
