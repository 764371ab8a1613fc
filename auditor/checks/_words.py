"""How figures are said: rounded as a machinist would, and the cutting situation in one line."""

from __future__ import annotations

import math
from collections.abc import Callable

from auditor.checks._judging import Excess
from auditor.declared.model import Point
from auditor.findings import Finding, Level, Run

INCH = 25.4
MOST_PLACES = 4


def figure(value: float, decimals: int = 1) -> str:
    """A number without trailing zeros."""
    text = f"{value:.{decimals}f}"
    text = text.rstrip("0").rstrip(".") if "." in text else text
    return "0" if text == "-0" else text


def feed(value: float) -> str:
    """Feed per revolution as written on a drawing: 0.45, 0.075."""
    return f"{value:.2f}" if abs(value * 100 - round(value * 100)) < 1e-6 else f"{value:.3f}"


def depth(value: float) -> str:
    """A depth of cut: tenths, below 1 mm hundredths."""
    return figure(value, 2) if value < 1.0 else f"{value:.1f}"


def force(value: float) -> str:
    """A force to 10 N, with its unit."""
    return f"{round(value, -1):.0f} N" if abs(value) >= 100 else f"{value:.0f} N"


def percent(share: float) -> str:
    """A share as a load meter shows it."""
    return f"{100 * share:.0f} %"


def angle(value: float) -> str:
    """A signed angle to whole degrees."""
    return f"{value:+.0f} deg"


def x_word(run: Run, radius: float) -> str:
    """An X word as the program would write the place: a diameter, inch in inch programs."""
    diameter = 2.0 * radius if run.job.control.x_words == "diameter" else radius
    return f"X{figure(diameter / INCH, 4)}" if run.path.units == "in" else f"X{figure(diameter, 2)}"


def z_word(run: Run, z: float) -> str:
    """A Z word as the program would write it."""
    return f"Z{figure(z / INCH, 4)}" if run.path.units == "in" else f"Z{figure(z, 2)}"


def length(run: Run, value: float, decimals: int = 2) -> str:
    """A length in the program's units; what rounds to nothing gets more places, never "0 in"."""
    if run.path.units == "in":
        value, decimals, unit = value / INCH, decimals + 1, "in"
    else:
        unit = "mm"
    while decimals < MOST_PLACES and value != 0.0 and round(value, decimals) == 0.0:
        decimals += 1
    return f"{figure(value, decimals)} {unit}"


def feed_rate(run: Run, value: float) -> str:
    """A feed per revolution in the program's unit, without naming it."""
    return f"{value / INCH:.4f}" if run.path.units == "in" else feed(value)


def thousandths(run: Run, value: float) -> str:
    """A small length: thousandths of a millimetre, in inch programs tenths of a thousandth of an inch."""
    return f"{value / INCH:.4f} in" if run.path.units == "in" else f"{value:.3f} mm"


def tool_name(run: Run, number: int | None) -> str:
    """What a setter calls the tool."""
    if number is None:
        return "no tool"
    tool = run.job.tools.get(number)
    return tool.name if tool else f"T{number}"


def situation(run: Run, row: int) -> str:
    """T1 CNMG 120408 at X46, depth 5.0, feed 0.45, 180 m/min, cutting force 4460 N, effective rake +6 deg."""
    loads = run.prediction.loads
    move = run.path.moves[int(loads.move[row])]
    inches = "{:.4f}".format if run.path.units == "in" else None
    unit = INCH if inches else 1.0
    parts = [
        f"{tool_name(run, move.tool)} at {x_word(run, float(loads.r[row]))}",
        _known("depth {}", float(loads.depth[row]) / unit, inches or depth),
        _known("feed {}", float(loads.feed[row]) / unit, inches or feed),
        _known("{} m/min", loads.speed_high[row], "{:.0f}".format),
        _known("cutting force {}", loads.cutting[row], force),
        _known("effective rake {}", loads.rake[row], angle),
    ]
    return ", ".join(part for part in parts if part)


def _known(template: str, value: float, words: Callable[[float], str]) -> str:
    number = float(value)
    return template.format(words(number)) if math.isfinite(number) else ""


def finding_over(run: Run, check: str, excess: Excess, message: str, unit: str, remedy: str | None) -> Finding:
    """The finding of the default rule: value, band, limit, place and situation filled in, the feed word marked."""
    figures = {"value": excess.value, "band": excess.band, "limit": excess.limit, "unit": unit, "remedy": remedy}
    return finding_at(run, check, excess.level, excess.row, message, words=("F",), **figures)


def finding_at(run: Run, check: str, level: Level, row: int, message: str, **figures: object) -> Finding:
    """A finding at one row of Loads, with its place and situation."""
    loads = run.prediction.loads
    move = run.path.moves[int(loads.move[row])]
    place = Point(float(loads.z[row]), float(loads.r[row]))
    return run.finding(check, level, move, message, at=place, situation=situation(run, row), **figures)
