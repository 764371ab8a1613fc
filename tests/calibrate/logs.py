"""A program with cuts of several weights and feeds in air, and logs of it made up with a known factor and noise.

The loads are worked out here from the program's own numbers: chip area by hand, Kienzle's law for the factor-free
force is left to the audit, but what the made-up machine measures (factor, idle, noise, delays) is this file's alone.
"""

from __future__ import annotations

from pathlib import Path

import numpy as np

from auditor.findings import Run

DEPTHS = (1.0, 2.5, 1.5, 3.0, 2.0, 1.2, 2.8, 1.8, 1.9, 1.7)
JOB = """\
[control]
system = "A"
units = "mm"
[machine]
speed_limit = "4500 rpm"
power = "15 kW"
base_speed = "1150 rpm"
efficiency = 0.85
tool_change = ["200 mm", "150 mm"]
[workholding]
stick_out = "95 mm"
[workpiece]
material = "C45"
diameter = "90 mm"
length = "160 mm"
[tools.1]
kind = "turning"
insert = "CNMG 120408"
holder = "PCLNR 2525 M12"
[tools.2]
kind = "turning"
insert = "DNMG 150608"
holder = "PDJNR 2525 M15"
"""


def program() -> str:
    """Passes by two tools, each a little shorter than the one before and with a feed in air of 8 mm before it."""
    lines = ["%", "O0001"]
    number, diameter, end = 0, 90.0, -45.0

    def block(text: str) -> None:
        nonlocal number
        number += 10
        lines.append(f"N{number} {text}")

    block("G21")
    for tool, depths in ((1, DEPTHS[:5]), (2, DEPTHS[5:])):
        block(f"T0{tool}0{tool}")
        block("G97 S800 M3")
        block(f"G0 X{diameter + 2:.1f} Z12.")
        for depth in depths:
            diameter -= 2.0 * depth
            block(f"G0 X{diameter:.1f}")
            block("G1 Z4. F0.25")
            block(f"G1 Z{end:.1f}")
            end += 1.5
            block(f"G0 X{diameter + 20:.1f}")
            block("G0 Z12.")
        block("G0 X200. Z150.")
    block("M30")
    return "\n".join([*lines, "%", ""])


def place(folder: Path, job: str = JOB) -> Path:
    """The program and its job file in a folder of their own, with a shop file to stop the search."""
    path = folder / "shaft.nc"
    path.write_text(program(), encoding="utf-8")
    (folder / "shaft.job.toml").write_text(job, encoding="utf-8")
    (folder / "shop.toml").write_text("", encoding="utf-8")
    return path


def feeds(run: Run) -> list[tuple[int, float, float, float]]:
    """Line, mean predicted motor power, speed and seconds of every feed move, from the audit's largest figures.

    All cuts are straight passes at constant depth and speed that end in front of the shoulder before: but for the
    run-in of the first half millimetre the largest power is the mean over the engaged part of the move.
    """
    figures = run.prediction.moves
    found = []
    for move in run.path.moves:
        if move.feed is not None and str(move.kind) == "feed":
            share = figures.cutting_time[move.index] / figures.time[move.index]
            power = float(np.nan_to_num(figures.motor_power[move.index])) * float(share)
            found.append((move.line, power, float(figures.rpm_high[move.index]), float(figures.time[move.index])))
    return found


def by_line(
    run: Run, seed: int, *, factor: float = 1.2, idle: float = 0.7, spread: float = 0.05, noise: float = 0.03,
    air: bool = True, odd: int = 0,
) -> str:  # fmt: skip
    """A log by line in kW: every cut off by its own relative error, every reading by the meter's noise."""
    chance = np.random.default_rng(seed)
    rows = ["line,power_kW"]
    cuts = 0
    for line, power, _, _ in feeds(run):
        if power <= 0.0 and not air:
            continue
        cuts += power > 0.0
        reading = idle + factor * power * (1.0 + spread * chance.standard_normal()) + noise * chance.standard_normal()
        if power > 0.0 and cuts <= odd:
            reading += 4.0
        rows.append(f"{line},{reading:.4f}")
    return "\n".join(rows) + "\n"
