"""A comparison for a person at a terminal: tools side by side, what each fixes and breaks, and the rake table."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Sequence
from dataclasses import dataclass
from io import StringIO

from rich import box
from rich.console import Console
from rich.table import Table

from auditor.compare.changes import Change
from auditor.compare.figures import ToolFigures
from auditor.compare.library import Comparison, Variant
from auditor.compare.rake_study import RakeRow, RakeStudy
from auditor.reports import View
from auditor.reports._figures import duration, figure
from auditor.reports.screen.paper import Paper

AT_ONCE = 2  # other tools beside the declared one in one table of 80 columns
SAME = 0.005  # a smaller relative change is not worth a percentage


@dataclass(frozen=True, slots=True)
class Line:
    """One line of the table: what it is called and how its value is said."""

    label: str
    value: Callable[[ToolFigures], float | None]
    said: Callable[[float], str]
    compared: bool = True  # with the change in per cent


LINES = (
    Line("effective rake", lambda f: f.rake, lambda v: f"{v:+.0f} deg", compared=False),
    Line("clearance, seated", lambda f: f.clearance, lambda v: f"{v:.1f} deg", compared=False),
    Line("wedge behind the land", lambda f: f.wedge, lambda v: f"{v:.0f} deg", compared=False),
    Line("cutting force", lambda f: f.cutting, lambda v: figure(v, "N")),
    Line("feed force", lambda f: f.feed_force, lambda v: figure(v, "N")),
    Line("passive force", lambda f: f.passive, lambda v: figure(v, "N")),
    Line("torque", lambda f: f.torque, lambda v: figure(v, "N m")),
    Line("motor power", lambda f: f.motor_power, lambda v: figure(v, "kW")),
    Line("share of the spindle", lambda f: f.spindle_share, lambda v: f"{100 * v:.0f} %", compared=False),
    Line("work comes out larger", lambda f: f.work_bend, lambda v: f"{v:.3f} mm"),
    Line("bar springs away", lambda f: f.tool_bend, lambda v: f"{v:.3f} mm"),
    Line("roughness Ra", lambda f: f.roughness, lambda v: f"{v:.1f} um"),
    Line("edges used a part", lambda f: f.edges, lambda v: f"{v:.3f}"),
    Line("time of the tool", lambda f: f.time, duration, compared=False),
)
_WORDS = {"new": "breaks", "worse": "makes worse", "left": "leaves", "eased": "eases", "fixed": "fixes"}
_STYLES = {"new": "red", "worse": "red", "left": "", "eased": "green", "fixed": "green"}


def comparison_sheet(comparison: Comparison | None, study: RakeStudy | None, view: View) -> str:
    """The whole sheet, no wider than the view."""
    paper = Paper(view)
    if comparison is not None:
        _side_by_side(paper, comparison)
        for variant in comparison.others:
            _changed(paper, variant, comparison)
    if study is not None:
        if comparison is not None:
            paper.gap()
        _rake_table(paper, study)
    return paper.text()


def _table(paper: Paper, heads: Sequence[str], rows: Iterable[Sequence[str]]) -> None:
    """A table; all columns but the first stand to the right."""
    drawn = Table(box=None if paper.view.plain else box.SIMPLE_HEAD, pad_edge=False, show_edge=False)
    for number, head in enumerate(heads):
        drawn.add_column(paper.clean(head), justify="right" if number else "left")
    for row in rows:
        drawn.add_row(*(paper.clean(cell) for cell in row))
    file = StringIO()
    Console(file=file, width=paper.view.width - 2, color_system=None, legacy_windows=False, _environ={}).print(drawn)
    for line in file.getvalue().splitlines():
        paper.row(f"  {line.rstrip()}")


def _side_by_side(paper: Paper, comparison: Comparison) -> None:
    base = comparison.base
    paper.paragraph((f"{base.audit.run.text.path}   T{comparison.number} with other tools", "bold"))
    paper.paragraph(f"job {base.audit.run.job.path}; largest figures over all cuts of T{comparison.number}", margin=2)
    for first in range(0, len(comparison.others), AT_ONCE):
        shown = [base, *comparison.others[first : first + AT_ONCE]]
        paper.gap()
        heads = [f"T{comparison.number}", *(variant.name for variant in shown)]
        _table(paper, heads, list(_table_rows(comparison.number, shown)))
    paper.gap()
    share = base.audit.run.job.workpiece.material.scatter
    paper.paragraph(
        f"All columns share the uncertainty of the material's force constant (about {100 * share:.0f} %): the "
        "difference between two tools is known better than either figure.", margin=2)


def _table_rows(number: int, shown: Sequence[Variant]) -> Iterator[list[str]]:
    base = shown[0].figures
    yield ["tool", *(_tool_word(variant, number) for variant in shown)]
    yield ["verdict", *(variant.audit.verdict for variant in shown)]
    for line in LINES:
        values = [line.value(variant.figures) for variant in shown]
        if any(value is not None for value in values):
            yield [line.label, *(_cell(line, value, line.value(base)) for value in values)]


def _tool_word(variant: Variant, number: int) -> str:
    tool = variant.audit.run.job.tools[number]
    return tool.insert or tool.kind


def _cell(line: Line, value: float | None, base: float | None) -> str:
    if value is None:
        return "-"
    said = line.said(value)
    if line.compared and base and abs(value / base - 1.0) > SAME:
        said = f"{said} {100 * (value / base - 1.0):+.0f} %"
    return said


def _changed(paper: Paper, variant: Variant, comparison: Comparison) -> None:
    paper.gap()
    counts = [
        f"{_WORDS[what]} {number}" for what in _WORDS
        if (number := sum(change.what == what and change.finding.accepted is None for change in variant.changes))
    ]
    paper.paragraph((f"{variant.name}: {', '.join(counts) or 'no finding before or after'}", "bold"))
    kind, own = (one.audit.run.job.tools[comparison.number].kind for one in (variant, comparison.base))
    if kind != own:
        paper.paragraph(f"a {kind} tool where the job has one for {own}: the program was not made for it", margin=2)
    for change in variant.changes:
        if change.what != "left":
            paper.paragraph((_change_line(change), _STYLES[change.what]), margin=2, hang=6)
    for text in _left_lines(variant.changes):
        paper.paragraph(text, margin=2, hang=6)


def _left_lines(changes: Sequence[Change]) -> list[str]:
    """What stays as it is, one line a check."""
    lines: dict[str, list[str]] = {}
    for change in changes:
        if change.what == "left":
            finding = change.finding
            what = f"{finding.level} {finding.check}{' (accepted)' if finding.accepted else ''}"
            lines.setdefault(what, []).append(str(finding.line))
    return [
        f"leaves {what} in line{'s' if len(where) > 1 else ''} {', '.join(dict.fromkeys(where))}"
        for what, where in lines.items()
    ]


def _change_line(change: Change) -> str:
    finding = change.finding
    level = str(finding.level)
    if change.before is not None and change.after is not None and change.before.level is not change.after.level:
        level = f"{change.before.level} to {change.after.level}"
    figures = ""
    if finding.value is not None:
        values = [side.value for side in (change.before, change.after) if side is not None]
        said = list(dict.fromkeys(figure(value, finding.unit) for value in values))
        limit = "" if finding.limit is None else f", limit {figure(finding.limit, finding.unit)}"
        figures = f": {' to '.join(said)}{limit}"
    accepted = " (accepted)" if finding.accepted else ""
    return f"{_WORDS[change.what]} {level} {finding.check} in line {finding.line}{figures}{accepted}"


def _rake_table(paper: Paper, study: RakeStudy) -> None:
    head = (f"Rake on the heaviest cut, line {study.move.line}: depth {study.depth:.2f} mm, feed {study.feed:.2f} mm, "
            f"{study.speed:.0f} m/min, mean chip {study.chip:.3f} mm")
    paper.paragraph((head, "bold"))
    paper.gap()
    rows = sorted([*((row, False) for row in study.rows), (study.now, True)], key=lambda pair: (pair[0].rake, pair[1]))
    heads = ("rake", "shear angle", "chip ratio", "chip mm", "force N", "passive N", "kW", "wedge", "if tilted")
    _table(paper, heads, [_rake_cells(row, now) for row, now in rows])
    paper.gap()
    for text in _READING:
        paper.paragraph(text, margin=2)


_READING = (
    "rake: effective, in deg; * is the tool as it is. chip mm: thickness of the chip that leaves. wedge: strength of "
    "the edge in deg when the rake is ground or pressed into the face. if tilted: clearance left when the same insert "
    "is tilted to that rake instead; at 0 and below it rubs.",
    "More positive: thinner chip, less force and power, weaker edge. More negative: thicker chip, more push on slender "
    "work, stronger edge for interrupted and scaled cuts. Shear angles: one shear plane (Merchant), known to about "
    "5 deg; forces: within the material's uncertainty.",
)


def _rake_cells(row: RakeRow, now: bool) -> list[str]:
    rubs = " rubs" if row.clearance <= 0.0 else ""
    return [
        f"{row.rake:+.1f} *" if now else f"{row.rake:+g}", f"{row.shear_angle:.0f}", f"{row.chip_ratio:.2f}",
        f"{row.chip_thickness:.2f}", _bare(row.cutting, "N"), _bare(row.passive, "N"), _bare(row.motor_power, "kW"),
        f"{row.wedge:.0f}", f"{row.clearance:.0f}{rubs}",
    ]  # fmt: skip


def _bare(value: float | None, unit: str) -> str:
    return figure(value, unit).removesuffix(f" {unit}")
