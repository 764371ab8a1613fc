"""Faults and false alarms that whole programs once brought to light, each as the smallest program that shows it."""

from __future__ import annotations

from pathlib import Path

import pytest

from tests.acceptance.bench import DRILL, ROUGHER, THREADER, Report, check, job_text

TURN = (
    "O1\nG18 G21 G40 G99\nG28 U0 W0\nT0101\nG50 S2500\nG96 S200 M3\nG0 X56. Z3.\nG1 Z-40. F0.3\nX62.\nG0 Z3.\n"
    "G28 U0 W0\nM5\nM30\n"
)
THREAD = (
    "O1\nG18 G21 G40 G99\nG28 U0 W0\nT0303\n{speed} M3\nG0 X64. Z{start}\nG92 X59.2 Z-20. F2.\nX58.6\nX58.1\nX57.7\n"
    "X57.546\nG0 X100.\nG28 U0 W0\nM5\nM30\n"
)


def thread(folder: Path, speed: str = "G97 S600", start: float = 8.0) -> Report:
    return check(folder, THREAD.format(speed=speed, start=start), job_text({3: THREADER}, workpiece={"face": "0 mm"}))


def test_a_feed_meant_per_turn_under_feed_per_minute_is_a_stop(tmp_path: Path) -> None:
    """0.3 mm a minute at 1000 rpm is 0.0003 mm a turn: the tool rubs for hours."""
    report = check(tmp_path, TURN.replace("G99", "G98"), job_text({1: ROUGHER}))
    assert report.of("feed-missing", "stop")[0]["line"] == 8


@pytest.mark.parametrize(("clamp", "level"), [("G50 S1500\n", "review"), ("G50 S4000\n", "stop"), ("", "stop")])
def test_drilling_under_constant_surface_speed(tmp_path: Path, clamp: str, level: str) -> None:
    """At X0 the spindle goes to its limit: pi x 12 x 1500 is 57 m/min, fit for this drill; 4000 are 151, over 140."""
    program = f"O1\nG18 G21 G40 G99\nT0202\n{clamp}G96 S80 M3\nG0 X0. Z5.\nG1 Z-20. F0.12\nG0 Z5.\nG28 U0 W0\nM30\n"
    report = check(tmp_path, program, job_text({2: DRILL}))
    assert [finding["level"] for finding in report.of("drill-depth")] == [level]


def test_thread_passes_at_different_speeds(tmp_path: Path) -> None:
    """Under G96 each pass runs at another diameter, at another speed, and starts at another place of the thread."""
    report = thread(tmp_path, "G50 S3000\nG96 S120")
    assert [finding["level"] for finding in report.of("thread-passes")][:1] == ["stop"]
    assert not report.of("program-flow", "review")
    held = thread(tmp_path, "G50 S500\nG96 S120")  # the limit holds all passes at one speed
    assert {finding["level"] for finding in held.of("thread-passes")} == {"review"}
    assert not thread(tmp_path).of("thread-passes", "stop")


@pytest.mark.parametrize(("start", "said"), [(8.0, False), (4.2, False), (3.5, True), (1.0, True)])
def test_run_in_counts_from_the_start_to_the_metal(tmp_path: Path, start: float, said: bool) -> None:
    """Lead 2: two leads are 4 mm, wherever the turns of the simulation fall."""
    findings = [f for f in thread(tmp_path, start=start).of("thread-passes") if "before the metal" in f["message"]]
    assert bool(findings) is said


def test_a_peck_of_four_thousandths(tmp_path: Path) -> None:
    program = "O1\nG18 G21 G40 G99\nT0202\nG97 S2000 M3\nG0 X0. Z5.\nG83 Z-12. Q4 F0.12\nG80\nG0 Z5.\nG28 U0 W0\nM30\n"
    report = check(tmp_path, program, job_text({2: DRILL}))
    assert any("Q" in finding["message"] and finding["line"] == 6 for finding in report.of("cycle-faults"))
    meant = check(tmp_path, program.replace("Q4 ", "Q4000 "), job_text({2: DRILL}), name="meant")
    assert not meant.of("cycle-faults")


def test_a_thread_is_no_gouge_of_the_finished_outline(tmp_path: Path) -> None:
    """The outline gives the thread's outer diameter; its grooves belong to it."""
    stock = {"face": "0 mm", "finished": [["0 mm", "60 mm"], ["-60 mm", "60 mm"]]}
    report = check(tmp_path, THREAD.format(speed="G97 S600", start=8), job_text({3: THREADER}, workpiece=stock))
    assert not report.of("finished-shape")


def test_the_breaker_finding_names_the_depth_that_lasts(tmp_path: Path) -> None:
    """0.5 mm deep for 40 mm; the entry, where the depth grows from nothing, is not what is meant."""
    tool = {**ROUGHER, "breaker_feed": ["0.15 mm", "0.5 mm"], "breaker_depth": ["1 mm", "5 mm"]}
    report = check(tmp_path, TURN.replace("X56.", "X59."), job_text({1: tool}))
    (finding,) = (f for f in report.of("breaker-window") if f["line"] == 8)
    assert finding["value"] == pytest.approx(0.5, abs=0.01)


def test_work_far_too_slender(tmp_path: Path) -> None:
    """Seven diameters out of a chuck: no cut is made there (common practice refuses over five)."""
    holding = {"stick_out": "420 mm"}
    far = check(tmp_path, TURN, job_text({1: ROUGHER}, workholding=holding, workpiece={"length": "460 mm"}))
    assert far.of("slender-part", "stop")
    assert not check(tmp_path, TURN, job_text({1: ROUGHER}), name="short").of("slender-part")
