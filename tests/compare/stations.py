"""One station with a negative insert, a shop with others, and the program they all cut."""

from __future__ import annotations

from pathlib import Path

PROGRAM = """\
%
O0001 (PIN)
N10 G50 S3000
N20 T0101
N30 G96 S180 M3
N40 G0 X56. Z2. M8
N50 G1 Z-40. F0.3
N60 X62.
N70 G0 Z2.
N80 X50.
N90 G1 Z-40. F0.3
N100 X62.
N110 G0 X100. Z100. M9
N120 M5
N130 M30
%
"""
JOB = """\
[control]
system = "A"
units = "mm"
[machine]
speed_limit = "4500 rpm"
power = "7 kW"
base_speed = "1150 rpm"
tool_change = ["200 mm", "150 mm"]
[workholding]
stick_out = "95 mm"
[workpiece]
material = "C45"
diameter = "60 mm"
length = "125 mm"
diameter_tolerance = "0.05 mm"
roughness = "Ra 1.6 um"
"""
DECLARED = 'kind = "turning"\ninsert = "CNMG 120408"\nholder = "PCLNR 2525 M12"\n'
LIBRARY = {
    "positive": 'kind = "turning"\ninsert = "CCMT 120404"\nholder = "SCLCR 2525 M12"\n',
    "flat": 'kind = "turning"\ninsert = "CNMA 120412"\nholder = "PCLNR 2525 M12"\n',
    "lasting": DECLARED + 'taylor = { speed = "320 m/min", exponent = 0.25 }\n',
}


def shop(folder: Path, declared: str = DECLARED) -> Path:
    """A folder with the program, its job and a shop file; gives the program."""
    program = folder / "pin.nc"
    program.write_text(PROGRAM, encoding="utf-8")
    (folder / "pin.job.toml").write_text(f"{JOB}[tools.1]\n{declared}", encoding="utf-8")
    entries = "".join(f"[tools.{name}]\n{table}" for name, table in LIBRARY.items())
    (folder / "shop.toml").write_text(entries, encoding="utf-8")
    return program
