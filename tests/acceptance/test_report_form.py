"""The moves list, coverage, verdicts, exit statuses, acceptance and limits as a user of the report relies on them."""

from __future__ import annotations

import json
import math
from pathlib import Path

import pytest

from tests.acceptance.bench import DRILL, GROOVER, NO_CORRECTIONS, ROUGHER, THREADER, check, finite, job_text, run

HEAD = "O1\nG18 G21 G40 G80 G99\nG28 U0 W0\nT0101\nG50 S2500\nG96 S200 M3\n"
TAIL = "G28 U0 W0\nM5\nM30\n"
GOOD = HEAD + "G0 X56. Z3. M8\nG1 Z-40. F0.3\nX62.\nG0 Z3.\n" + TAIL
MOVE_KEYS = {
    "line", "block", "tool", "kind", "from", "to", "feed_mm_per_rev", "spindle_rpm", "cutting_speed_m_per_min",
    "depth_of_cut_mm", "edge_engaged_mm", "chip_thickness_mm", "chip_area_mm2", "effective_rake_deg",
    "cutting_force_N", "feed_force_N", "passive_force_N", "torque_Nm", "cutting_power_kW", "motor_power_kW",
    "removed_mm3", "time_s",
}  # fmt: skip
FINDING_KEYS = {
    "check", "level", "line", "block", "tool", "at", "value", "band", "limit", "unit", "message", "remedy", "accepted",
    "fingerprint",
}  # fmt: skip


def job(**tables: object) -> str:
    return job_text({1: ROUGHER}, **tables)  # type: ignore[arg-type]


def test_a_good_program_is_clear(tmp_path: Path) -> None:
    report = check(tmp_path, GOOD, job())
    assert (report.status, report.verdict) == (0, "clear"), report.stops
    assert report.document["report"] == "turnaudit/1"
    assert report.document["program"]["system"] == "A"
    assert report.document["program"]["units"] == "mm"
    assert report.document["program"]["lines"] == GOOD.count("\n")
    assert report.document["coverage"] == {"motion_blocks": 6, "audited": 6, "not_audited": []}
    assert set(report.document["totals"]) >= {"time_s", "cutting_time_s", "air_feed_time_s", "removed_mm3"}
    assert finite(report.document)


def test_every_move_has_every_key(tmp_path: Path) -> None:
    report = check(tmp_path, GOOD, job())
    for move in report.moves:
        assert set(move) >= MOVE_KEYS
    cut = report.only_cut() if len([m for m in report.cuts() if m["removed_mm3"]]) == 1 else report.cuts()[0]
    assert cut["from"] == {"x": 56.0, "z": 3.0}
    assert cut["to"] == {"x": 56.0, "z": -40.0}
    assert cut["kind"] == "feed"
    assert cut["tool"] == 1
    assert cut["line"] == 8
    assert cut["block"] is None


def test_findings_have_every_key_and_a_stable_fingerprint(tmp_path: Path) -> None:
    bad = GOOD.replace("G50 S2500\n", "")
    one = check(tmp_path, bad, job())
    two = check(tmp_path, bad.replace("O1\n", "O1\n(A NEW REMARK)\n(AND ANOTHER)\n"), job(), name="edited")
    assert one.findings
    for finding in one.findings:
        assert set(finding) == FINDING_KEYS
        assert finding["level"] in {"stop", "review", "note"}
    assert [f["fingerprint"] for f in one.findings] == [f["fingerprint"] for f in two.findings]
    assert [f["line"] + 2 for f in one.findings] == [f["line"] for f in two.findings]


def test_block_names_and_cycle_lines(tmp_path: Path) -> None:
    program = HEAD + "N10 G0 X62. Z2.\nN20 G90 X56. Z-30. F0.2\nN30 X52.\nN40 G0 X80.\n" + TAIL
    report = check(tmp_path, program, job())
    box = [m for m in report.moves if m["line"] == 8]
    assert [m["kind"] for m in box] == ["rapid", "feed", "feed", "rapid"]
    assert [(m["to"]["x"], m["to"]["z"]) for m in box] == [(56, 2), (56, -30), (62, -30), (62, 2)]
    assert {m["block"] for m in box} == {"N20"}
    assert {m["line"] for m in report.moves if m["block"] == "N30"} == {9}


def test_all_moves_of_a_roughing_cycle_carry_the_line_of_the_cycle(tmp_path: Path) -> None:
    program = (
        HEAD + "G0 X62. Z2.\nG71 U2. R0.5\nG71 P100 Q140 U0.4 W0.1 F0.25\n"
        "N100 G0 X40.\nN110 G1 Z-20.\nN120 X50. Z-30.\nN130 Z-40.\nN140 X62.\nG70 P100 Q140\nG0 X80.\n" + TAIL
    )
    report = check(tmp_path, program, job())
    assert {m["line"] for m in report.cuts()} == {9, 15}
    assert {9, 15} <= {m["line"] for m in report.moves}
    rough = [m for m in report.cuts() if m["line"] == 9]
    assert min(m["to"]["x"] for m in rough) == pytest.approx(40.4)
    along = [m for m in rough if m["from"]["x"] == m["to"]["x"] and m["to"]["z"] > -26]
    assert [m["depth_of_cut_mm"] for m in along[:-1]] == pytest.approx([2.0] * (len(along) - 1), abs=1e-3)


def test_arcs_carry_centre_and_sense(tmp_path: Path) -> None:
    program = HEAD + "G0 X46. Z2.\nG1 Z0. F0.2\nG3 X56. Z-5. R5.\nG1 Z-20.\nG2 X60. Z-22. I2. K0.\nG0 X80.\n" + TAIL
    report = check(tmp_path, program, job())
    convex, concave = (m for m in report.moves if m["kind"] == "arc")
    assert (convex["clockwise"], concave["clockwise"]) == (False, True)
    assert convex["centre"] == {"x": pytest.approx(46.0), "z": pytest.approx(-5.0)}
    assert concave["centre"] == {"x": pytest.approx(60.0), "z": pytest.approx(-20.0)}


def test_kinds_of_thread_and_drill(tmp_path: Path) -> None:
    program = (
        "O1\nG18 G21 G99\nT0202\nG97 S900 M3\nG0 X0. Z5.\nG1 Z-15. F0.1\nG0 Z5.\nG28 U0 W0\n"
        "T0303\nG97 S600 M3\nG0 X64. Z8.\nG92 X59.4 Z-20. F2.\nX59.0\nG28 U0 W0\nM30\n"
    )
    report = check(tmp_path, program, job_text({2: DRILL, 3: {**THREADER}}))
    assert {m["kind"] for m in report.moves if m["line"] == 6} == {"drill"}
    thread = [m for m in report.moves if m["kind"] == "thread"]
    assert {m["line"] for m in thread} == {12, 13}
    assert thread[0]["feed_mm_per_rev"] == pytest.approx(2.0)


def test_from_is_null_after_home_without_a_declared_place(tmp_path: Path) -> None:
    """The first rapid that restates both axes is audited with an unknown start; the path is said to be unchecked."""
    machine = {"home": None, "tool_change": None}
    report = check(tmp_path, GOOD, job(machine=machine))
    first = next(m for m in report.moves if m["line"] == 7)
    assert first["from"] is None or first["from"] == {"x": None, "z": None}
    assert first["from"] is None
    assert report.document["coverage"]["not_audited"] == []
    assert report.verdict in {"clear", "review"}
    after = next(m for m in report.moves if m["line"] == 11)
    assert after["from"] == {"x": 62.0, "z": 3.0}


def test_feed_from_an_unknown_position_is_not_audited(tmp_path: Path) -> None:
    program = GOOD.replace("G0 X56. Z3. M8\n", "M8\n")
    report = check(tmp_path, program, job(machine={"home": None, "tool_change": None}))
    lines = [entry["line"] for entry in report.document["coverage"]["not_audited"]]
    assert 8 in lines
    assert report.verdict in {"stop", "incomplete"}
    assert report.status == 2


def test_first_move_starts_at_the_tool_change_position(tmp_path: Path) -> None:
    program = GOOD.replace("G28 U0 W0\nT0101", "T0101", 1)
    with_it = check(tmp_path, program, job(machine={"tool_change": ["210 mm", "120 mm"]}))
    assert with_it.moves[0]["from"] == {"x": 210.0, "z": 120.0}
    without = check(tmp_path, program, job(machine={"tool_change": None}), name="unknown")
    assert without.moves[0]["from"] is None


def test_unknown_coordinates_are_null_axis_by_axis(tmp_path: Path) -> None:
    program = HEAD.replace("G28 U0 W0\n", "") + "G0 X56.\nG0 Z3.\nG1 Z-40. F0.3\nX62.\nG0 X100. Z50.\nM30\n"
    report = check(tmp_path, program, job(machine={"home": None, "tool_change": None}))
    assert report.moves[0]["to"] == {"x": 56.0, "z": None}


def test_radius_programming(tmp_path: Path) -> None:
    half = GOOD.replace("X56.", "X28.").replace("X62.", "X31.")
    one = check(tmp_path, GOOD, job())
    two = check(tmp_path, half, job(control={"x_words": "radius"}), name="half")
    assert [(m["to"], m["removed_mm3"]) for m in one.moves] == [(m["to"], m["removed_mm3"]) for m in two.moves]


def test_whole_numbers_as_increments(tmp_path: Path) -> None:
    small = GOOD.replace("X56.", "X56000").replace("Z3.", "Z3000").replace("Z-40.", "Z-40000").replace("X62.", "X62000")
    two = check(tmp_path, small, job(control={"whole_numbers": "increments"}))
    one = check(tmp_path, GOOD, job(), name="points")
    assert [m["to"] for m in one.moves] == [m["to"] for m in two.moves]


def test_inch_program_is_reported_in_millimetres(tmp_path: Path) -> None:
    inch = (
        "O1\nG18 G20 G40 G80 G99\nG28 U0 W0\nT0101\nG50 S2500\nG96 S656.168 M3\n"
        "G0 X2.2047 Z0.1181 M8\nG1 Z-1.5748 F0.0118\nX2.4409\nG0 Z0.1181\nG28 U0 W0\nM5\nM30\n"
    )
    one, two = check(tmp_path, GOOD, job()), check(tmp_path, inch, job(control={"units": "in"}), name="inch")
    assert two.document["program"]["units"] == "in"
    cut_mm, cut_in = (next(m for m in r.moves if m["line"] == 8) for r in (one, two))
    assert cut_in["to"]["x"] == pytest.approx(2.2047 * 25.4, abs=1e-4)
    assert cut_in["to"]["z"] == pytest.approx(-1.5748 * 25.4, abs=1e-4)
    assert cut_in["feed_mm_per_rev"] == pytest.approx(0.0118 * 25.4)
    assert cut_in["spindle_rpm"] == pytest.approx(cut_mm["spindle_rpm"], rel=1e-3)
    assert cut_in["cutting_force_N"] == pytest.approx(cut_mm["cutting_force_N"], rel=5e-3)


B_HEAD = HEAD.replace("G99", "G95").replace("G28 U0 W0", "G91 G28 X0 Z0\nG90").replace("G50", "G92")


@pytest.mark.parametrize(
    ("system", "program"),
    [
        ("B", B_HEAD + "G0 X62. Z2.\nG77 X56. Z-30. F0.2\nX52.\nG0 X80.\nG91 G28 X0 Z0\nM30\n"),
        ("C", B_HEAD.replace("G21", "G71") + "G0 X62. Z2.\nG20 X56. Z-30. F0.2\nX52.\nG0 X80.\nG91 G28 X0 Z0\nM30\n"),
    ],
)  # fmt: skip
def test_systems_b_and_c(tmp_path: Path, system: str, program: str) -> None:
    plain = HEAD + "G0 X62. Z2.\nG90 X56. Z-30. F0.2\nX52.\nG0 X80.\n" + TAIL
    a = check(tmp_path, plain, job())
    other = check(tmp_path, program, job(control={"system": system}), name="other")
    assert other.document["program"]["system"] == system
    assert [(m["kind"], m["to"]) for m in a.cuts()] == [(m["kind"], m["to"]) for m in other.cuts()]
    assert [m["spindle_rpm"] for m in a.cuts()] == [m["spindle_rpm"] for m in other.cuts()]
    assert other.document["coverage"]["not_audited"] == []


def test_feed_per_minute(tmp_path: Path) -> None:
    program = GOOD.replace("G96 S200", "G97 S1000").replace("G1 Z-40. F0.3", "G98 G1 Z-40. F300.")
    report = check(tmp_path, program, job())
    move = next(m for m in report.moves if m["line"] == 8)
    assert move["feed_mm_per_rev"] == pytest.approx(0.3)
    assert move["time_s"] == pytest.approx(43 / 300 * 60, rel=1e-6)


def test_a_cut_with_a_stopped_spindle(tmp_path: Path) -> None:
    """It is a stop, it still takes the stock away, and what depends on the rate is null."""
    report = check(tmp_path, GOOD.replace(" M3\n", "\n"), job())
    assert report.of("spindle-off", "stop")
    assert report.of("spindle-off", "stop")[0]["line"] == 8
    move = next(m for m in report.moves if m["line"] == 8)
    assert move["removed_mm3"] == pytest.approx(math.pi / 4 * (60**2 - 56**2) * 41.5, rel=5e-3)
    for key in ("cutting_power_kW", "motor_power_kW", "time_s"):
        assert move[key] is None, key


def test_a_cut_with_no_feed(tmp_path: Path) -> None:
    report = check(tmp_path, GOOD.replace(" F0.3", ""), job())
    assert report.of("feed-missing", "stop")[0]["line"] == 8
    move = next(m for m in report.moves if m["line"] == 8)
    assert move["removed_mm3"] > 10_000
    for key in ("feed_mm_per_rev", "chip_area_mm2", "chip_thickness_mm", "cutting_force_N", "time_s"):
        assert move[key] is None, key
    assert move["depth_of_cut_mm"] == pytest.approx(2.0, abs=1e-3)


def test_syntax_fault_is_not_audited_and_what_it_held_is_unknown(tmp_path: Path) -> None:
    program = GOOD.replace("G0 X56. Z3. M8", "G0 X5O. Z3. F0.3")
    report = check(tmp_path, program, job())
    assert report.document["coverage"]["not_audited"][0]["line"] == 7
    assert report.verdict in {"stop", "incomplete"}
    assert report.status == 2
    assert report.of("not-understood")


def test_unclosed_comment_is_not_audited(tmp_path: Path) -> None:
    report = check(tmp_path, GOOD.replace("X62.\n", "X62. (CLEAR OF THE WORK\n"), job())
    assert 9 in [entry["line"] for entry in report.document["coverage"]["not_audited"]]
    assert report.verdict in {"incomplete", "stop"}


def test_unknown_codes(tmp_path: Path) -> None:
    m_code = check(tmp_path, GOOD.replace("M5\n", "M5\nM77\n"), job())
    assert m_code.verdict == "clear"
    assert [f["level"] for f in m_code.of("not-understood")] == ["note"]
    g_code = check(tmp_path, GOOD.replace("M5\n", "M5\nG105\n"), job(), name="g")
    assert [f["level"] for f in g_code.of("not-understood")] == ["review"]
    assert g_code.verdict == "review"
    axis = check(tmp_path, GOOD.replace("X62.\n", "G105 X62.\n"), job(), name="axis")
    assert axis.verdict == "incomplete"
    assert axis.status == 2
    allowed = check(tmp_path, GOOD.replace("X62.\n", "G105 X62.\n"), job(), "--allow-incomplete", name="allowed")
    assert allowed.verdict == "incomplete"
    assert allowed.status == 0


def test_missing_subprogram(tmp_path: Path) -> None:
    report = check(tmp_path, GOOD.replace("G0 Z3.\n", "M98 P7777\nG0 X70. Z3.\n"), job())
    assert [f for f in report.of("program-flow") if "7777" in f["message"]]
    assert report.verdict in {"stop", "incomplete"}
    assert report.status == 2
    last = [m for m in report.moves if m["line"] == 11]
    assert last, "the rapid that restates both axes is audited again"


def test_undeclared_tool(tmp_path: Path) -> None:
    report = check(tmp_path, GOOD.replace("T0101", "T0404"), job())
    assert report.of("tool-undeclared", "stop")[0]["line"] == 4
    assert [entry["line"] for entry in report.document["coverage"]["not_audited"]] == [8, 9]
    assert report.verdict == "stop"
    assert report.status == 2
    move = next(m for m in report.moves if m["line"] == 8)
    assert move["removed_mm3"] == 0.0  # what it would have cut still stands
    assert (move["depth_of_cut_mm"], move["cutting_force_N"], move["torque_Nm"]) == (None, None, None)
    assert all(m.get("provisional") for m in report.moves if m["line"] > 8)


def test_stock_left_standing_makes_what_follows_provisional(tmp_path: Path) -> None:
    program = HEAD + "G0 X56. Z3.\nG105 Z-40. F0.3\nG0 X62. Z3.\nX52.\nG1 Z-40. F0.3\nX62.\nG0 Z3.\n" + TAIL
    report = check(tmp_path, program, job())
    move = next(m for m in report.moves if m["line"] == 11)
    assert move.get("provisional") is True
    assert move["depth_of_cut_mm"] == pytest.approx(4.0, abs=1e-2)


FACING = GOOD.replace("G0 X56. Z3. M8\nG1 Z-40. F0.3\nX62.\n", "G0 X64. Z0. M8\nG1 X-1.6 F0.2\n")
UNCLAMPED = FACING.replace("G50 S2500\n", "")


def test_accepted_and_until(tmp_path: Path) -> None:
    bad = UNCLAMPED
    entry = {"check": "speed-unclamped", "line": 5, "reason": "the machine's own gear is low"}
    plain = check(tmp_path, bad, job())
    (finding,) = plain.of("speed-unclamped")
    assert plain.verdict == finding["level"] == "stop"
    assert plain.status == 1
    entry["line"] = finding["line"]
    accepted = check(tmp_path, bad, job(accepted=[entry]), name="accepted")
    (same,) = accepted.of("speed-unclamped")
    assert same["level"] == "stop"
    assert same["accepted"]["reason"] == "the machine's own gear is low"
    assert accepted.verdict == "clear"
    assert accepted.status == 0
    job_of_old = job(accepted=[entry]) + "until = 2020-01-31\n"
    over = check(tmp_path, bad, job_of_old, name="over")
    assert over.verdict == "stop"
    assert over.status == 1
    elsewhere = check(tmp_path, bad, job(accepted=[{**entry, "line": 1}]), name="elsewhere")
    assert elsewhere.verdict == "stop"


def test_fail_on(tmp_path: Path) -> None:
    question = GOOD.replace("M5\n", "M5\nG105\n")
    assert check(tmp_path, question, job()).status == 0
    assert check(tmp_path, question, job(), "--fail-on", "review", name="b").status == 1
    bad = GOOD.replace(" M3\n", "\n")
    assert check(tmp_path, bad, job(), "--fail-on", "never", name="c").status == 0
    assert check(tmp_path, bad, job(), "--fail-on", "review", name="d").status == 1


def test_power_share(tmp_path: Path) -> None:
    """The job's share of what the spindle can give moves the limit, not the value."""
    text = {"machine": {"power": "8 kW", "base_speed": "500 rpm"}, "model": NO_CORRECTIONS}
    full = check(tmp_path, GOOD, job(**text))
    power = next(m for m in full.moves if m["line"] == 8)["motor_power_kW"]
    assert power < 8
    assert not full.of("spindle-power", "stop")
    share = 0.9 * power / 8
    tight = check(tmp_path, GOOD, job(**text, limits={"power_share": round(share, 3)}), name="tight")
    (finding,) = tight.of("spindle-power", "stop")
    assert finding["limit"] == pytest.approx(8 * round(share, 3), rel=1e-6)


def test_missing_declarations_are_not_judged_and_said(tmp_path: Path) -> None:
    report = check(tmp_path, GOOD, job(workholding={"grip_force": None, "speed_limit": None}))
    why = {entry["check"]: entry["why"] for entry in report.document["not_judged"]}
    assert "grip_force" in why["chuck-grip"]
    assert next(iter(why)) in {"chuck-grip", "spindle-speed"}
    assert report.verdict == "clear"


def test_assumptions_name_what_was_left_out(tmp_path: Path) -> None:
    tool = {**ROUGHER, "edge_radius": None, "land_width": None, "face_rake": None}
    report = check(tmp_path, GOOD, job_text({1: tool}))
    about = {entry["about"] for entry in report.document["assumptions"]}
    assert {"tools.1.edge_radius", "tools.1.land_width", "tools.1.face_rake"} <= about


def test_block_skip_is_tried_both_ways(tmp_path: Path) -> None:
    program = FACING.replace("G50 S2500\n", "/G50 S2500\n")
    taken = check(tmp_path, program, job())
    assert not taken.of("speed-unclamped", "stop")
    assert taken.verdict == "review"
    left_out = check(tmp_path, program, job(control={"block_skip": True}), name="skip")
    assert left_out.of("speed-unclamped", "stop")


@pytest.mark.parametrize("name", ["missing", "binary", "empty", "bad-toml", "bad-key"])
def test_what_cannot_be_read(tmp_path: Path, name: str) -> None:
    program = tmp_path / "part.nc"
    declared = tmp_path / "part.job.toml"
    declared.write_text(job(), encoding="utf-8")
    if name == "binary":
        program.write_bytes(bytes(range(256)) * 8)
    elif name == "empty":
        program.write_text("", encoding="utf-8")
    elif name != "missing":
        program.write_text(GOOD, encoding="utf-8")
    if name == "bad-toml":
        declared.write_text("[machine\nx=", encoding="utf-8")
    elif name == "bad-key":
        declared.write_text(job(machine={"powr": "15 kW", "power": "15 mm"}), encoding="utf-8")
    report = run("check", str(program), "--format", "json")
    assert report.status == 2
    assert report.verdict == "unreadable"
    assert report.document["report"] == "turnaudit/1"
    for error in report.document["errors"]:
        assert set(error) == {"file", "line", "key", "found", "wanted", "message"}
    assert report.words.strip()
    if name == "bad-key":
        assert {error["key"] for error in report.document["errors"]} >= {"machine.powr", "machine.power"}


def test_several_programs_make_a_set_and_the_worst_status_counts(tmp_path: Path) -> None:
    texts = {"good": GOOD, "bad": GOOD.replace(" M3\n", "\n"), "odd": "(NOTHING)\n"}
    for name, text in texts.items():
        (tmp_path / f"{name}.nc").write_text(text, encoding="utf-8")
        (tmp_path / f"{name}.job.toml").write_text(job(), encoding="utf-8")
    report = run("check", str(tmp_path), "--format", "json")
    assert report.status == 2
    assert report.document["report"] == "turnaudit-set/1"
    verdicts = {Path(a["program"]["path"]).stem: a["verdict"] for a in report.document["audits"]}
    assert verdicts == {"good": "clear", "bad": "stop", "odd": "unreadable"}
    two = run("check", str(tmp_path / "good.nc"), str(tmp_path / "bad.nc"), "--format", "json")
    assert two.status == 1
    one = run("check", str(tmp_path / "good.job.toml"), "--format", "json")
    assert one.status == 0
    assert one.verdict == "clear"


def test_against_an_earlier_report(tmp_path: Path) -> None:
    bad = GOOD.replace(" M3\n", "\n")
    earlier = tmp_path / "earlier.json"
    before = check(tmp_path, bad, job())
    earlier.write_text(json.dumps(before.document), encoding="utf-8")
    same = check(tmp_path, bad, job(), "--against", str(earlier))
    assert same.status == 0
    worse = check(tmp_path, bad.replace(" F0.3", ""), job(), "--against", str(earlier))
    assert worse.status == 1


def test_output_goes_to_a_file_and_never_over_an_input(tmp_path: Path) -> None:
    check(tmp_path, GOOD, job())
    program = tmp_path / "part.nc"
    target = tmp_path / "report.json"
    wrote = run("check", str(program), "--format", "json", "--output", str(target))
    assert wrote.status == 0
    assert json.loads(target.read_text(encoding="utf-8"))["verdict"] == "clear"
    refused = run("check", str(program), "--format", "json", "--output", str(program))
    assert refused.status == 2
    assert program.read_text(encoding="utf-8") == GOOD


def test_grooving_point_is_the_corner_nearer_the_chuck(tmp_path: Path) -> None:
    """A plunge at Z-20 with a 3 mm insert opens the groove from -20 to -17."""
    program = HEAD + "G0 X64. Z-20.\nG1 X50. F0.1\nG0 X64.\nZ-25.\nG1 X50. F0.1\nG0 X64.\n" + TAIL
    report = check(tmp_path, program, job_text({1: {**GROOVER, "nose_radius": "0 mm"}}))
    one, two = (next(m for m in report.moves if m["line"] == line) for line in (8, 11))
    ring = math.pi / 4 * (60**2 - 50**2) * 3
    assert one["removed_mm3"] == pytest.approx(ring, rel=1e-3)
    assert two["removed_mm3"] == pytest.approx(ring, rel=1e-3)


def test_coverage_counts_source_lines_once(tmp_path: Path) -> None:
    program = (
        HEAD + "G0 X62. Z2.\nM98 P20 L3\nG0 X100.\n" + TAIL
        + "O20\nG0 U-3.\nG1 Z-20. F0.2\nG0 U1.\nZ2.\nM99\n"
    )  # fmt: skip
    report = check(tmp_path, program, job())
    assert report.document["coverage"]["motion_blocks"] == 4 + 4
    cuts = [m for m in report.moves if m["line"] == 15]
    assert [m["to"]["x"] for m in cuts] == pytest.approx([59.0, 57.0, 55.0])
    assert cuts[0]["depth_of_cut_mm"] == pytest.approx(0.5, abs=1e-3)


def test_blocks_never_executed_need_no_coverage(tmp_path: Path) -> None:
    program = GOOD.replace("G0 Z3.\n", "G0 Z3.\nGOTO 90\nG1 X10. Z-500.\nG105 X3.\nN90\n")
    report = check(tmp_path, program, job())
    assert report.verdict == "clear"


def test_dog_leg_and_straight_rapid_through_stock(tmp_path: Path) -> None:
    straight = check(tmp_path, GOOD.replace("G0 X56. Z3. M8", "G0 X50. Z3.\nG0 X50. Z-5."), job())
    (hit,) = [f for f in straight.of("rapid-in-stock", "stop")]
    assert hit["line"] == 8
    assert next(m for m in straight.moves if m["line"] == 8)["removed_mm3"] > 0


def test_a_move_after_m3_in_the_same_block_turns(tmp_path: Path) -> None:
    program = GOOD.replace("G96 S200 M3\n", "G96 S200\n").replace("G1 Z-40. F0.3", "G1 Z-40. F0.3 M3")
    report = check(tmp_path, program, job())
    assert not report.of("spindle-off", "stop")
