"""183 small program texts against the moves and marks written down for them by hand.

Source and provenance stand in the fixture. The marks there are the fixture's own short names; the table
below says by which topic the interpreter notices the same thing.
"""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

import pytest

from auditor.declared.model import Control, Point, Tool
from auditor.interpret import interpret
from auditor.interpret.moves import Interpretation
from auditor.parse import parse_text
from tests.interpret.programs import TURNING, declared, rows, topics

FIXTURE = Path(__file__).parents[2] / "fixtures" / "language" / "snippets.json"
SNIPPETS: list[dict[str, Any]] = json.loads(FIXTURE.read_text(encoding="utf-8"))["snippets"]
HOME = Point(200.0, 150.0)  # the reference point that the fixture assumes: X300 Z200

TOPICS: dict[str, frozenset[str]] = {
    "I-BOM": frozenset({"encoding"}),
    "W-COMMENT": frozenset({"comment-unclosed"}),
    "E-SYNTAX": frozenset({"syntax"}),
    "E-NUMBER": frozenset({"syntax"}),
    "E-NOVALUE": frozenset({"syntax"}),
    "E-BRACKET": frozenset({"syntax"}),
    "E-UNSUPPORTED": frozenset({"syntax", "unsupported", "axis-not-modelled"}),
    "E-DIV0": frozenset({"arithmetic"}),
    "E-ALARM": frozenset({"alarm"}),
    "E-LOOP": frozenset({"endless"}),
    "E-SEQ": frozenset({"target-missing", "cycle-profile-missing"}),
    "E-SUB": frozenset({"subprogram-missing"}),
    "E-PQ": frozenset({"cycle-profile-bad", "cycle-profile-missing"}),
    "E-PROFILE": frozenset({"cycle-profile-bad"}),
    "E-DEPTH": frozenset({"cycle-depth"}),
    "E-MONO": frozenset({"cycle-not-monotonic"}),
    "E-CORNER": frozenset({"cycle-corner"}),
    "E-ARC": frozenset({"arc-impossible"}),
    "E-ARCEND": frozenset({"arc-ends-differ"}),
    "E-NOFEED": frozenset({"feed-missing"}),
    "E-FEED0": frozenset({"feed-zero"}),
    "E-FEEDMODE": frozenset({"feed-implausible", "feed-mode-without-feed"}),
    "E-SPINDLE": frozenset({"spindle-off"}),
    "E-DWELL": frozenset({"dwell"}),
    "E-OFFSET": frozenset({"offset-cancelled", "offset-missing"}),
    "E-COMPARC": frozenset({"compensation-in-arc"}),
    "E-COMPSMALL": frozenset({"compensation-too-small"}),
    "E-COMPSIDE": frozenset({"compensation-side"}),
    "W-COMPACTIVE": frozenset({"compensation-left-on"}),
    "W-COMPBLANK": frozenset({"compensation-blank-blocks"}),
    "W-TIP": frozenset({"compensation-tip"}),
    "W-CSSCLAMP": frozenset({"clamp-missing"}),
    "W-CLAMPHIGH": frozenset({"clamp-too-high"}),
    "W-THREADCSS": frozenset({"speed-in-thread"}),
    "W-DUP": frozenset({"word-repeated"}),
    "W-DUPN": frozenset({"number-repeated"}),
    "W-GGROUP": frozenset({"code-group-repeated"}),
    "W-GCODE": frozenset({"unknown-g"}),
    "W-MCODE": frozenset({"unknown-m"}),
    "W-SYSTEM": frozenset({"code-systems-mixed", "code-system-conflict"}),
    "W-TOOLOFFSET": frozenset({"offset-foreign"}),
    "W-TOOLAMBIG": frozenset({"tool-ambiguous"}),
    "W-TMOVE": frozenset({"tool-in-motion"}),
    "W-NOEND": frozenset({"end-missing"}),
    "W-M99MAIN": frozenset({"repeats-main"}),
    "I-PRESET": frozenset({"preset"}),
}
# seen in the moves together with the stock or the machine, by the checks behind the interpreter
JUDGED_LATER = {"E-RAPIDHIT", "W-TCHANGE", "E-PARTING", "E-THREADFEED", "W-THREADRUN", "E-PASTCENTRE"}
# a fact about the path taken, not about the text: pockets are cut, nothing has to be decided
NOT_REMARKED = {"I-TYPE2"}

# Where this interpreter does otherwise than the snippet says, and why.
DISAGREEMENTS = {
    "S015": "a block with an unclosed comment is not audited, because controls differ in what they swallow; "
    "its X is unknown behind it",
    "S026": "the job declares one switch for all blocks with /, not nine",
    "S088": "a code that the system lacks is not audited when axis words stand beside it (the snippet says so itself)",
    "S098": "the same: what G95 does with X under system A is not known",
    "S151": "nothing is cut in the snippet; the remark comes with the first cut",
    "S157": "the arc of the snippet cannot be drawn from its start point; see test_compensation_starts_in_an_arc",
    "S158": "the same arc; see test_compensation_ends_in_an_arc",
    "S159": "the step behind the start-up is long enough here; see test_inside_arc_smaller_than_the_nose",
}


def control_of(snippet: dict[str, Any]) -> Control:
    given = snippet.get("control", {})
    settings: dict[str, str | float | bool] = {}
    if given.get("peck") == "full":
        settings["peck"] = "full retract"
    if "thread_chamfer" in given:
        settings["thread_run_out"] = given["thread_chamfer"]
    return Control(
        system=given.get("gsys", "A"),
        system_declared=True,
        units="mm",
        whole_numbers="increments" if given.get("no_point") == "lii" else "units",
        block_skip="slash" in given,
        settings=settings,
    )


def interpreted(snippet: dict[str, Any]) -> Interpretation:
    tip = 0 if "TIP 0" in snippet["code"] else 3
    tool = Tool(1, "T1", "turning", nose_radius=TURNING.nose_radius, tip=tip)
    job = declared(control_of(snippet), {1: tool}, start=Point(100.0, 50.0), fixed=HOME)
    preamble = "G97 S500 M3 F.2\n" if snippet.get("preamble") else ""
    semicolon = "end of block" if snippet.get("control", {}).get("semicolon") == "eob" else "comment"
    return interpret(parse_text(preamble + snippet["code"], semicolon=semicolon), job)


def named(snippet: dict[str, Any]) -> str:
    return str(snippet["id"])


@pytest.mark.parametrize("snippet", [s for s in SNIPPETS if "moves" in s and s["id"] not in DISAGREEMENTS], ids=named)
def test_moves(snippet: dict[str, Any]) -> None:
    found = rows(interpreted(snippet))
    wanted = [tuple(move) for move in snippet["moves"] if move[0] != "D"]
    assert [kind for kind, _, _ in found] == [kind for kind, _, _ in wanted]
    for (_, x, z), (_, wanted_x, wanted_z) in zip(found, wanted, strict=True):
        assert (x, z) == pytest.approx((wanted_x, wanted_z), abs=1e-4)


@pytest.mark.parametrize("snippet", [s for s in SNIPPETS if "marks" in s and s["id"] not in DISAGREEMENTS], ids=named)
def test_marks(snippet: dict[str, Any]) -> None:
    found = topics(interpreted(snippet))
    for mark in snippet["marks"]:
        if mark not in JUDGED_LATER | NOT_REMARKED:
            assert TOPICS[mark] & found, f"{mark} is not among {sorted(found)}"


@pytest.mark.parametrize("snippet", [s for s in SNIPPETS if "ended" in s], ids=named)
def test_end(snippet: dict[str, Any]) -> None:
    assert interpreted(snippet).ended == snippet["ended"]


UNMARKED = [s for s in SNIPPETS if s.get("moves") and not s.get("marks") and s["id"] not in DISAGREEMENTS]


@pytest.mark.parametrize("snippet", UNMARKED, ids=named)
def test_a_text_without_marks_is_wholly_audited(snippet: dict[str, Any]) -> None:
    assert interpreted(snippet).not_audited == ()


def snippet_of(name: str) -> Interpretation:
    return interpreted(next(snippet for snippet in SNIPPETS if snippet["id"] == name))


def test_unclosed_comment_leaves_x_unknown() -> None:
    found = snippet_of("S015")
    assert [entry.line for entry in found.not_audited] == [1]
    assert rows(found) == [("R", None, 5.0)]
    assert "comment-unclosed" in topics(found)


def test_code_of_another_system_with_axis_words_is_not_audited() -> None:
    for name in ("S088", "S098"):
        found = snippet_of(name)
        assert len(found.not_audited) == 1
        assert {"unknown-g", "code-systems-mixed"} <= topics(found)


def test_offset_cancelled_is_said_at_the_cut() -> None:
    found = interpreted({"code": "T0100\nG0 X50. Z2.\nG1 Z-5. F.2", "preamble": True})
    assert "offset-cancelled" in topics(found)


def test_compensation_starts_in_an_arc() -> None:
    text = "T0101\nG0 X20. Z0.\nG42 G3 X30. Z-5. R5. F.1\nG1 Z-20.\nG40 G0 X50."
    assert "compensation-in-arc" in topics(interpreted({"code": text, "preamble": True}))


def test_compensation_ends_in_an_arc() -> None:
    text = "T0101\nG0 X20. Z2.\nG42 G1 Z0 F.1\nG1 Z-10.\nG40 G2 X30. Z-15. R5.\nG0 X50."
    assert "compensation-in-arc" in topics(interpreted({"code": text, "preamble": True}))


def test_inside_arc_smaller_than_the_nose() -> None:
    text = "T0101\nG0 X20. Z2.\nG42 G1 Z0 F.1\nZ-10.\nG2 X21. Z-10.5 R.5\nG1 X30.\nG40 G0 X50."
    assert "compensation-too-small" in topics(interpreted({"code": text, "preamble": True}))
