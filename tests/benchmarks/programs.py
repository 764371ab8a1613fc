"""Programs to measure with: strokes over a bar, point programs along a curve, and jobs to audit them under."""

from __future__ import annotations

import math
from pathlib import Path

from auditor.interpret.moves import Kind
from tests.simulate.workshop import COPIER
from tests.simulate.workshop import Path as ToolPath

JOB = """\
[control]
system = "A"
units = "mm"
[machine]
speed_limit = "4500 rpm"
power = "15 kW"
base_speed = "1150 rpm"
tool_change = ["200 mm", "150 mm"]
[workholding]
stick_out = "90 mm"
[workpiece]
material = "C45"
diameter = "60 mm"
length = "125 mm"
[tools.1]
kind = "turning"
insert = "DNMG 110404"
holder = "PDJNR 2525 M11"
"""


def wavy_strokes(cuts: int) -> ToolPath:
    """Strokes of 4 mm long, never collinear cuts along a bar of 60 mm, deeper from stroke to stroke."""
    path = ToolPath(2.0, 35.0, tool=COPIER.number)
    per_stroke = 15
    strokes = max(1, cuts // per_stroke)
    for stroke in range(strokes):
        r = 30.0 - 26.0 * (stroke + 1) / strokes
        path.rapid(2.0, r)
        for i in range(per_stroke):
            z = 2.0 - 4.0 * (i + 1)
            path.to(z, r + 0.1 * math.sin(z + stroke))
        path.rapid(path.z + 0.5, path.r + 0.5).rapid(2.0, r + 0.5)
    return path


def dense_points(points: int) -> ToolPath:
    """A contour given point by point, 0.1 mm apart, in strokes of 500 points one below the other."""
    path = ToolPath(2.0, 35.0, tool=COPIER.number)
    per_stroke = 500
    strokes = max(1, points // per_stroke)
    for stroke in range(strokes):
        r = 29.5 - 20.0 * stroke / strokes
        path.rapid(2.0, r)
        for i in range(per_stroke):
            z = -0.1 * (i + 1)
            path.to(z, r + 0.4 * (1.0 - math.cos(z / 6.0)))
        path.rapid(path.z + 0.5, path.r + 1.0).rapid(2.0, r + 2.0)
    return path


def text_of(path: ToolPath, speed: str = "G50 S3000\nG96 S180 M3") -> str:
    """The path as a program."""
    lines = ["%", "O0001", "G21 G99 G40", "T0101", *speed.split("\n")]
    for move in path.moves:
        feed = "" if move.kind is Kind.RAPID else " F.2"
        lines.append(f"G{0 if move.kind is Kind.RAPID else 1} X{2 * move.end_r:.3f} Z{move.end_z:.3f}{feed}")
    return "\n".join([*lines, "G0 X200. Z150.", "M30", "%", ""])


def written(folder: Path, path: ToolPath, name: str = "part") -> Path:
    """The program and its job in a folder."""
    program = folder / f"{name}.nc"
    program.write_text(text_of(path), encoding="utf-8")
    (folder / f"{name}.job.toml").write_text(JOB, encoding="utf-8")
    return program
