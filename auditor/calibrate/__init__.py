"""A material's force factor fitted to a logged spindle load, with its uncertainty and what it rests on."""

from __future__ import annotations

from auditor.calibrate.calibration import Calibration, calibrate
from auditor.calibrate.log import LoadLog, read_log
from auditor.calibrate.shop_lines import shop_lines

__all__ = ["Calibration", "LoadLog", "calibrate", "read_log", "shop_lines"]
