"""Writes the README's pictures from what the tool itself puts out for the demo: ``python tests/demo_pictures.py``.

They are files in fixtures/demo/ because a README shows pictures only from files. Both stand alone: no font, style or
picture is fetched from anywhere.
"""

from __future__ import annotations

import os
import re
import sys
from importlib.resources import files
from io import StringIO
from pathlib import Path

from rich.console import Console
from rich.text import Text

from auditor.audit import audit_program
from auditor.findings import Audit
from auditor.reports import View, report

HOUSE = Path(__file__).parents[1]
DEMO = HOUSE / "fixtures" / "demo"
LINES = 46  # of the terminal's sheet at most; the rest is for the terminal

_PAPER = """\
<svg viewBox="0 0 {width} {height}" width="{width}" xmlns="http://www.w3.org/2000/svg">
<style>
.{unique_id}-matrix {{ font-family: "DejaVu Sans Mono", Menlo, Consolas, monospace; font-size: {char_height}px;
  line-height: {line_height}px; font-variant-east-asian: full-width; }}
{styles}
</style>
<defs><clipPath id="{unique_id}-clip-terminal">
<rect x="0" y="0" width="{terminal_width}" height="{terminal_height}"/></clipPath>
{lines}
</defs>
<rect width="{width}" height="{height}" fill="#1b2529"/>
<g transform="translate({terminal_x}, {terminal_y})" clip-path="url(#{unique_id}-clip-terminal)">
{backgrounds}
<g class="{unique_id}-matrix">
{matrix}
</g>
</g>
</svg>
"""


def screen(audit: Audit) -> str:
    """The terminal's sheet, as rich draws it."""
    sheet = report("screen").render(audit, View(colour=True)).splitlines()[:LINES]
    whole = max(number for number, line in enumerate(sheet) if not line.strip())
    console = Console(record=True, width=82, file=StringIO(), force_terminal=True, color_system="standard")
    for line in ["$ turnaudit check fixtures/demo/drive-stub.nc", *sheet[:whole], "", "  [...]"]:
        console.print(Text.from_ansi(line), no_wrap=True, crop=False)
    return console.export_svg(code_format=_PAPER, unique_id="screen")


def half_section(audit: Audit) -> str:
    """The half-section of the HTML report, with the page's style inside it."""
    html = report("html")
    page = html.join([html.render(audit, View())], False)
    picture = re.search(r'<svg id="[^"]*section".*?</svg>', page, re.DOTALL)
    assert picture is not None
    style = (files("auditor.reports.html") / "style.css").read_text(encoding="utf-8")
    style += "\nsvg { background: var(--sheet); font-family: var(--drawn); }\n"
    head, _, rest = picture[0].partition(">")
    return f"{head} width=\"1000\"><style>{style}</style>{rest}\n"


def main() -> None:
    """Write both pictures."""
    os.chdir(HOUSE)
    audit = audit_program("fixtures/demo/drive-stub.nc")
    for name, draw in (("screen", screen), ("half-section", half_section)):
        (DEMO / f"{name}.svg").write_text(draw(audit), encoding="utf-8", newline="\n")


if __name__ == "__main__":
    sys.exit(main())
