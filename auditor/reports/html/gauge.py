"""A figure with its band against its limit, as a small picture."""

from __future__ import annotations

import math

from markupsafe import Markup

from auditor.findings import Finding
from auditor.reports._figures import figure
from auditor.reports.html.svg import Drawing

WIDTH, HEIGHT = 300.0, 26.0  # px


def draw(finding: Finding, name: str) -> Markup | None:
    """The gauge; None where there is no figure or no limit."""
    value, limit = finding.value, finding.limit
    if value is None or limit is None or not math.isfinite(value) or not math.isfinite(limit):
        return None
    low, high = finding.band if finding.band is not None and all(map(math.isfinite, finding.band)) else (value, value)
    bottom, top = min(0.0, low, limit), max(0.0, high, limit)
    span = (top - bottom) * 1.06 or 1.0

    def x(figure_: float) -> float:
        return 4.0 + (figure_ - bottom) / span * (WIDTH - 8.0)

    words = f"{figure(value, finding.unit)}, limit {figure(limit, finding.unit)}"
    drawing = Drawing(name, WIDTH, HEIGHT, "Figure against its limit", words)
    drawing.add("rect", x=4, y=9, width=WIDTH - 8, height=8, class_="track")
    drawing.add("rect", x=min(x(0.0), x(low)), y=9, width=abs(x(low) - x(0.0)), height=8, class_="sure")
    drawing.add("rect", x=x(low), y=9, width=max(0.0, x(high) - x(low)), height=8, class_="unsure")
    drawing.path([(x(limit), 2), (x(limit), HEIGHT - 2)], "wall")
    drawing.add("circle", cx=x(value), cy=13, r=5, class_="value")
    return drawing.svg("gauge")
