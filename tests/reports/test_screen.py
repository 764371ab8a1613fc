"""The terminal report: what a person sees first, and what a poor terminal can still show."""

from __future__ import annotations

import re
import unicodedata

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from rich.cells import cell_len

from auditor.declared.model import Assumption
from auditor.errors import Fault
from auditor.findings import Audit, Level, NotJudged
from auditor.predict.spindle import power_at
from auditor.reports import Unreadable, View, report
from auditor.reports._uses import uses
from auditor.reports.screen.gauge import CELLS, draw
from auditor.reports.screen.paper import Paper
from tests.reports import builders

VERDICTS = ("stop", "incomplete", "review", "clear")
LONG = "G1 X20.123456 " * 20


def shown(outcome: object, **view: object) -> str:
    return report("screen").render(outcome, View(**view))


def rich_audits() -> list[Audit]:
    return [
        builders.faulty(),
        builders.audit([builders.power_finding(line=1)], source=LONG + "F0.3"),
        builders.audit([builders.power_finding(message="x" * 300, remedy="schöner " * 40, situation="y" * 200)]),
        builders.audit(path="folder/" * 30 + "part.nc", not_audited=[builders.NOT_AUDITED] * 30),
        builders.audit(not_judged=[NotJudged(f"check-{number}", "not declared " * 12) for number in range(30)]),
        builders.audit(assumptions=[Assumption(f"tools.{number}.x", "1 mm", "z" * 120) for number in range(9)]),
    ]


@pytest.mark.parametrize("audit", rich_audits())
@pytest.mark.parametrize("width", [60, 80])
@pytest.mark.parametrize("plain", [True, False])
def test_no_line_is_wider_than_the_terminal(audit: Audit, width: int, plain: bool) -> None:
    text = shown(audit, width=width, plain=plain)
    assert max(cell_len(line) for line in text.splitlines()) <= width


@pytest.mark.parametrize("audit", rich_audits())
def test_plain_is_ascii_and_uncoloured(audit: Audit) -> None:
    text = shown(audit, plain=True)
    assert text.isascii()
    assert "\x1b" not in text


def test_verdict_comes_first_in_a_word_and_a_shape() -> None:
    first = shown(builders.faulty()).splitlines()[0]
    assert first.startswith("■ STOP  drive-stub.nc")
    assert "1 must be fixed, 1 to decide, 1 to know" in first


@pytest.mark.parametrize("verdict", VERDICTS)
def test_every_verdict_is_told_apart_without_colour(verdict: str) -> None:
    for plain in (True, False):
        assert len({shown(builders.audit(verdict=other), plain=plain)[0] for other in VERDICTS}) == 4
    assert verdict.upper() in shown(builders.audit(verdict=verdict)).splitlines()[0]


def test_colour_changes_no_letter() -> None:
    coloured = shown(builders.faulty(), colour=True)
    assert "\x1b[" in coloured
    assert re.sub(r"\x1b\[[0-9;]*m", "", coloured) == shown(builders.faulty())


def test_findings_stand_in_program_order_with_their_line_marked() -> None:
    lines = shown(builders.faulty(), plain=True).splitlines()
    order = [index for index, line in enumerate(lines) if re.match(r"[-#^] line \d", line)]
    assert [lines[index].split()[3] for index in order] == ["N40", "N50", "N60"]
    marked, below = lines[order[1]], lines[order[1] + 1]
    start, end = below.index("~"), below.rindex("~") + 1
    assert marked[start:end] == "F0.3"
    assert "stop spindle-power" in below


def test_two_words_at_fault_are_both_marked() -> None:
    lines = shown(builders.audit([builders.review_finding()]), plain=True).splitlines()
    at = next(index for index, line in enumerate(lines) if "N60 G2" in line)
    marks = [(match.start(), match.end()) for match in re.finditer("~+", lines[at + 1])]
    assert [lines[at][start:end] for start, end in marks] == ["X60.", "R2."]


def test_word_far_right_in_a_long_line_is_still_seen() -> None:
    lines = shown(builders.audit([builders.power_finding(line=1)], source=LONG + "F0.3"), plain=True).splitlines()
    at = next(index for index, line in enumerate(lines) if "~" in line)
    start, end = lines[at].index("~"), lines[at].rindex("~") + 1
    assert lines[at - 1][start:end] == "F0.3"


def test_wide_letters_before_the_word_do_not_shift_the_mark() -> None:
    source = "(旋盤) N10 G1 Z-4. F0.3"
    lines = shown(builders.audit([builders.power_finding(line=1)], source=source)).splitlines()
    at = next(index for index, line in enumerate(lines) if "‾" in line)
    before = lines[at - 1][: lines[at - 1].index("F0.3")]
    assert cell_len(before) == lines[at].index("‾")


def test_figure_band_limit_and_way_out_are_told() -> None:
    text = shown(builders.faulty())
    assert "predicted 16.9 kW (14.4 to 19.4), limit 13.5 kW" in text
    assert "125 %" in text  # 16.9 / 13.5
    assert "Way out: Within the limit at F0.22" in text


def test_figure_and_unit_stay_on_one_line() -> None:
    for length in range(60, 76):
        told = "x" * length + " needs 4460 N and 15.7 kW at 250 m/min"
        lines = shown(builders.audit([builders.power_finding(message=told)])).splitlines()
        assert not [line for line in lines if line.strip().startswith(("N ", "kW", "m/min"))]
        assert "4460 N" in "".join(lines)


def test_only_a_figure_with_a_band_is_called_predicted() -> None:
    text = shown(builders.audit([builders.power_finding(value=0.45, band=None, limit=0.4, unit="mm/rev")]))
    assert "    0.45 mm/rev, limit 0.40 mm/rev" in text


def test_reasons_for_not_judging_are_gathered_by_check() -> None:
    items = [NotJudged("axis-thrust", "machine.thrust.x is not declared"), NotJudged("axis-thrust", "nor is z")]
    assert "axis-thrust: machine.thrust.x is not declared; nor is z" in shown(builders.audit(not_judged=items))


def test_equal_notes_come_once_with_all_their_lines() -> None:
    notes = [builders.note_finding(line=line) for line in (6, 8, 9)]
    text = shown(builders.audit(notes))
    assert text.count("A feed move that cuts nothing.") == 1
    assert "also line 8, 9" in text


def test_clear_never_stands_alone() -> None:
    items = [NotJudged("bar-whip", "no tail"), NotJudged("edge-life", "no pair"), NotJudged("chuck-grip", "no force")]
    beside = shown(builders.audit(not_judged=items)).splitlines()[1]
    assert beside.strip() == "clear of what was judged; not judged: chuck-grip, bar-whip, edge-life"
    brief = shown(builders.audit(not_judged=items), brief=True)
    assert brief == "○ CLEAR  drive-stub.nc   not judged: chuck-grip, bar-whip, edge-life\n"
    several = [NotJudged(f"check-with-a-long-name-{number}", "why") for number in range(9)] + items
    line = shown(builders.audit(not_judged=several), brief=True)
    assert "not judged: chuck-grip" in line
    assert line.endswith(" more\n")
    assert len(line) <= 81
    assert "no promise" in shown(builders.audit())


def test_what_was_not_checked_is_in_the_heading_and_listed() -> None:
    text = shown(builders.audit(not_audited=[builders.NOT_AUDITED], verdict="incomplete"))
    assert "1 of 5 motion blocks NOT checked" in text
    assert "subprogram 9100 is not in this file" in text


def test_accepted_decision_is_shown_and_not_counted() -> None:
    text = shown(builders.audit([builders.power_finding(accepted=builders.ACCEPTED)]))
    assert "no findings" in text.splitlines()[0]
    assert "Accepted: runs like this for years" in " ".join(text.split())


def test_caution_closes_every_full_report() -> None:
    assert "a clear verdict is no promise" in " ".join(shown(builders.audit()).split())


def test_five_assumptions_at_most_the_material_first() -> None:
    told = [Assumption(f"tools.1.thing_{number}", "1", "default") for number in range(8)]
    told.append(Assumption("workpiece.material.kc11", "1800 N/mm2", "nearest row"))
    text = shown(builders.audit(assumptions=told))
    section = text.split("Assumed", 1)[1].split("───", 1)[0].strip().splitlines()
    assert len(section) == 6  # the title's rest and five lines
    assert "kc11" in section[1]


def test_same_assumption_about_several_tools_is_said_once() -> None:
    told = [Assumption(f"tools.{number}.edge_radius", "0.04 mm", "not declared") for number in (1, 3)]
    assert "tool 1, 3: edge_radius = 0.04 mm (not declared)" in shown(builders.audit(assumptions=told))


@pytest.mark.parametrize("hostile", [
    "\x1b[2J\x1b]0;owned\x07", "[bold red]not markup[/bold red]", ":warning:", "\u202eevil", "a\u2028b", "\udcff",
    "{0}%s",
])
def test_hostile_text_is_shown_and_not_obeyed(hostile: str) -> None:
    finding = builders.power_finding(line=1, message=hostile, remedy=hostile)
    for plain in (True, False):
        text = shown(builders.audit([finding], source=f"G1 ({hostile}) F1.", path=hostile), plain=plain)
        assert "\x1b" not in text
        assert not {sign for sign in text if unicodedata.category(sign) in {"Cf", "Cs"} or sign in "\x07\x00\u2028"}
        text.encode("ascii" if plain else "utf-8")
    if hostile.isascii() and "\x1b" not in hostile:
        assert hostile in text


def test_unreadable_gives_its_reasons() -> None:
    text = shown(Unreadable("a.nc", (Fault("no such file", file="a.nc"), Fault("bad", key="machine.power"))))
    assert text.splitlines()[0].startswith("✕ UNREADABLE  a.nc")
    assert "no such file" in text
    assert "machine.power: bad" in text


def test_several_programs_open_with_an_overview() -> None:
    parts = [shown(builders.faulty()), shown(builders.audit(path="other.nc"))]
    lines = report("screen").join(parts, several=True).splitlines()
    assert lines[0].startswith("■ STOP  drive-stub.nc")
    assert lines[1].startswith("○ CLEAR  other.nc")
    assert lines[2] == ""


FIGURES = st.floats(-1e6, 1e6, allow_nan=False)


@given(FIGURES, FIGURES, FIGURES, FIGURES)
def test_gauge_shows_the_figure_on_its_side_of_the_limit(value: float, limit: float, down: float, up: float) -> None:
    row = draw(Paper(View(plain=True)), value, (value - abs(down), value + abs(up)), limit)
    assert len(row) == CELLS
    assert row.count("o") == row.count("|") == 1
    if value != limit:
        assert (row.index("o") > row.index("|")) == (value > limit)


def test_power_the_spindle_has() -> None:
    # Constant torque below base speed: half the speed, half the power. Constant power above.
    machine = builders.job().machine
    assert power_at(machine, np.array([575.0, 1150.0, 4000.0])).tolist() == [7.5, 15.0, 15.0]


def test_a_line_for_each_tool_with_its_largest_figures() -> None:
    (use,) = uses(builders.faulty())
    assert (use.number, use.kind, use.depth, use.feed, use.speed, use.force) == (1, "turning", 2.0, 0.3, 192.9, 1320.0)
    # 4.8 kW at 1023.1 rpm, below the base speed of 1150 rpm, where 15 kW shrink in proportion
    assert use.share == pytest.approx(4.8 / (15.0 * 1023.1 / 1150.0))


def test_levels_are_counted_without_accepted_ones() -> None:
    audit = builders.audit([builders.power_finding(), builders.power_finding(accepted=builders.ACCEPTED)])
    assert audit.count(Level.STOP) == 1
