"""The JSON report against the form that users rely on: names, units, nulls."""

from __future__ import annotations

import json
import math
from collections.abc import Iterator
from dataclasses import replace
from datetime import date

import numpy as np
import pytest

from auditor.declared.model import Acceptance, Point
from auditor.errors import Fault
from auditor.interpret.moves import Kind
from auditor.reports import Unreadable, View, report
from tests.reports import builders

# The names promised to users, level by level (written down from the promise, not from the code).
WHOLE = {"report", "program", "job", "verdict", "coverage", "not_judged", "assumptions", "totals", "moves", "findings"}
MOVE = {
    "line", "block", "tool", "kind", "from", "to", "feed_mm_per_rev", "spindle_rpm", "cutting_speed_m_per_min",
    "depth_of_cut_mm", "edge_engaged_mm", "chip_thickness_mm", "chip_area_mm2", "effective_rake_deg",
    "cutting_force_N", "feed_force_N", "passive_force_N", "torque_Nm", "cutting_power_kW", "motor_power_kW",
    "removed_mm3", "time_s",
}
FINDING = {
    "check", "level", "line", "block", "tool", "at", "value", "band", "limit", "unit", "message", "remedy", "accepted",
    "fingerprint",
}


def written(outcome: object, **view: bool) -> dict[str, object]:
    return json.loads(report("json").render(outcome, View(**view)), parse_constant=_refuse)


def _refuse(constant: str) -> float:
    raise AssertionError(f"{constant} is no JSON number")


def test_has_exactly_the_promised_names() -> None:
    body = written(builders.faulty())
    assert set(body) == WHOLE
    assert set(body["program"]) == {"path", "sha256", "lines", "system", "units"}
    assert set(body["job"]) == {"path", "sha256"}
    assert set(body["coverage"]) == {"motion_blocks", "audited", "not_audited"}
    assert set(body["totals"]) == {"time_s", "cutting_time_s", "air_feed_time_s", "removed_mm3"}
    assert set(body["not_judged"][0]) == {"check", "why"}
    assert set(body["assumptions"][0]) == {"about", "value", "why"}
    assert set(body["moves"][1]) == MOVE
    assert set(body["moves"][2]) == MOVE | {"centre", "clockwise"}
    assert all(set(finding) == FINDING for finding in body["findings"])
    assert body["report"] == "turnaudit/1"


def test_not_audited_block_is_told_with_its_reason() -> None:
    body = written(builders.audit(not_audited=[builders.NOT_AUDITED], verdict="incomplete"))
    assert body["coverage"]["not_audited"] == [
        {"line": 10, "text": "N80 G65 P9100 Z-5.", "reason": "subprogram 9100 is not in this file"}
    ]


def test_x_is_a_diameter_and_radii_stay_inside() -> None:
    body = written(builders.faulty())
    assert body["moves"][1]["from"] == {"x": 56.0, "z": 2.0}
    assert body["moves"][1]["to"] == {"x": 56.0, "z": -40.0}
    assert body["moves"][2]["centre"] == {"x": 56.0, "z": -42.0}
    assert body["findings"][1]["at"] == {"x": 50.0, "z": -12.0}


def test_figures_stand_under_their_units() -> None:
    move = written(builders.faulty())["moves"][1]
    assert move["cutting_force_N"] == 1320.0
    assert move["spindle_rpm"] == [1023.1, 1023.1]
    assert move["cutting_speed_m_per_min"] == [180.0, 192.9]
    assert move["effective_rake_deg"] == 7.5
    assert (move["removed_mm3"], move["time_s"]) == (15112.0, 8.2)


def test_unknown_places_and_figures_are_null_axis_by_axis() -> None:
    rapid = builders.moves()[0]
    half_known = replace(rapid, index=1, start_z=5.0, end_r=None)
    body = written(builders.audit(moved=[rapid, half_known, *builders.moves()[2:]]))
    assert body["moves"][0]["from"] is None
    assert body["moves"][1]["from"] == {"x": None, "z": 5.0}
    assert body["moves"][1]["to"] == {"x": None, "z": 2.0}
    assert body["moves"][0]["cutting_force_N"] is None
    assert body["moves"][2]["removed_mm3"] is None


def test_never_nan_nor_infinite_however_odd_the_figures() -> None:
    finding = builders.power_finding(value=math.nan, band=(-math.inf, math.inf), limit=np.float64(13.5))
    audit = builders.audit([finding])
    odd = replace(audit.totals, time=math.inf, removed=math.nan)
    body = written(replace(audit, totals=odd), series=True)
    assert body["totals"]["time_s"] is None
    assert body["findings"][0]["band"] is None
    assert all(math.isfinite(number) for number in _numbers(body))


def _numbers(value: object) -> Iterator[float]:
    if isinstance(value, dict):
        value = list(value.values())
    if isinstance(value, list):
        for item in value:
            yield from _numbers(item)
    elif isinstance(value, float):
        yield value


def test_provisional_is_said_of_moves_and_their_findings_only_where_it_holds() -> None:
    body = written(builders.audit([builders.power_finding(), builders.note_finding(move=3)]))
    assert [move.get("provisional") for move in body["moves"]] == [None, None, None, True]
    assert [finding.get("provisional") for finding in body["findings"]] == [None, True]


def test_accepted_finding_keeps_level_and_carries_reason() -> None:
    accepted = Acceptance("spindle-power", "free-cutting bar", line=7, until=date(2027, 6, 30))
    finding = written(builders.audit([builders.power_finding(accepted=accepted)]))["findings"][0]
    assert finding["level"] == "stop"
    assert finding["accepted"] == {"reason": "free-cutting bar", "until": "2027-06-30"}


def test_no_job_file_is_null() -> None:
    assert written(builders.audit(declared=builders.job(path=None, sha256=None)))["job"] is None


def test_kinds_are_the_promised_words() -> None:
    assert {str(kind) for kind in Kind} == {"rapid", "feed", "arc", "thread", "drill"}


def test_unreadable_gives_every_fault_with_all_its_names() -> None:
    fault = Fault("negative size", file="a.job.toml", line=3, key="workpiece.diameter", found="-3 mm", wanted="> 0 mm")
    body = written(Unreadable("a.nc", (fault, Fault("nothing else known"))))
    assert body["verdict"] == "unreadable"
    assert body["program"] == {"path": "a.nc"}
    assert body["errors"][0] == {
        "file": "a.job.toml", "line": 3, "key": "workpiece.diameter", "found": "-3 mm", "wanted": "> 0 mm",
        "message": "negative size",
    }
    assert set(body["errors"][1].values()) == {None, "nothing else known"}


def test_one_program_is_an_object_and_several_are_a_set() -> None:
    part = report("json").render(builders.faulty(), View())
    alone = json.loads(report("json").join([part], several=False))
    assert alone["report"] == "turnaudit/1"
    together = json.loads(report("json").join([part, part], several=True))
    assert together["report"] == "turnaudit-set/1"
    assert together["audits"] == [alone, alone]
    assert json.loads(report("json").join([], several=True))["audits"] == []


@pytest.mark.parametrize("source", ["N10 G1 (\x1b[2J\x00 \u202e ü \ud800)", "(" + "9" * 5000 + ")"])
def test_hostile_text_is_escaped(source: str) -> None:
    block = replace(builders.NOT_AUDITED, text=source)
    text = report("json").render(builders.audit(not_audited=[block], source=source), View())
    assert text.isascii()
    assert json.loads(text)["coverage"]["not_audited"][0]["text"] == source


def test_series_gives_curves_of_equal_length_with_units() -> None:
    series = written(builders.faulty(), series=True)["series"]
    assert [(curve["move"], curve["line"]) for curve in series] == [(1, 7)]
    assert series[0]["x_mm"] == [56.0, 56.0]
    assert series[0]["motor_power_kW"] == [None, 4.8]
    assert {len(curve) for curve in series[0].values() if isinstance(curve, list)} == {2}


def test_centre_on_the_axis_has_no_negative_zero() -> None:
    arc = replace(builders.moves()[2], centre=Point(-0.0, -0.0))
    text = report("json").render(builders.audit(moved=[*builders.moves()[:2], arc, builders.moves()[3]]), View())
    assert "-0.0" not in text
