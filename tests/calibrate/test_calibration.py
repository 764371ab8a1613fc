"""Whole calibrations on made-up logs with a known factor, and every reason for which a log is refused."""

from __future__ import annotations

import json
import tomllib
from pathlib import Path

import numpy as np
import pytest
from click.testing import CliRunner, Result

from auditor.audit import audit_program
from auditor.calibrate import Calibration, calibrate, read_log, shop_lines
from auditor.calibrate.timeline import timeline_of
from auditor.cli import turnaudit
from auditor.errors import UsageError
from auditor.findings import Run
from tests.calibrate.logs import JOB, by_line, feeds, place


@pytest.fixture(scope="module")
def shaft(tmp_path_factory: pytest.TempPathFactory) -> Path:
    return place(tmp_path_factory.mktemp("shaft"))


@pytest.fixture(scope="module")
def run(shaft: Path) -> Run:
    return audit_program(shaft).run


def calibrated(run: Run, folder: Path, text: str, *, peak: bool = False) -> Calibration:
    path = folder / "log.csv"
    path.write_text(text, encoding="utf-8")
    return calibrate(run, read_log(path), peak=peak)


def test_the_interval_holds_the_truth_over_many_logs(run: Run, tmp_path: Path) -> None:
    """95 % stated, 60 logs of 10 cuts: at least 53 must hold 1.2 (binomial, 1 in 10000 to fall below)."""
    found = [calibrated(run, tmp_path, by_line(run, seed)) for seed in range(60)]
    held = sum(low <= 1.2 <= high for low, high in (one.interval for one in found))
    assert held >= 53
    assert float(np.mean([one.factor for one in found])) == pytest.approx(1.2, abs=0.02)
    assert float(np.median([one.idle for one in found])) == pytest.approx(0.7, abs=0.05)


def test_percent_and_n_words_tell_the_same(run: Run, tmp_path: Path) -> None:
    """800 rpm lies below the base speed of 1150: constant torque, so the motor can give 15 kW times 800 / 1150."""
    numbers = {block.line: block.number for block in run.text.blocks}
    rows = by_line(run, 5).split()[1:]
    kilowatts = [(int(line), float(power)) for line, power in (row.split(",") for row in rows)]
    there = 15.0 * 800.0 / 1150.0
    load = "".join(f"N{numbers[line]},{100.0 * power / there:.6f}\n" for line, power in kilowatts)
    rated = "".join(f"{line},{100.0 * power / 15.0:.6f}\n" for line, power in kilowatts)
    expected = calibrated(run, tmp_path, by_line(run, 5)).factor
    assert calibrated(run, tmp_path, f"block,load_percent\n{load}").factor == pytest.approx(expected, rel=1e-4)
    assert calibrated(run, tmp_path, f"line,rated_percent\n{rated}").factor == pytest.approx(expected, rel=1e-4)


def test_cuts_of_different_weight_stand_in_for_air(run: Run, tmp_path: Path) -> None:
    found = calibrated(run, tmp_path, by_line(run, 2, air=False, spread=0.01, noise=0.01))
    assert found.air_cuts == 0
    assert found.interval[0] <= 1.2 <= found.interval[1]


def test_a_jammed_reading_is_held_down_and_named(run: Run, tmp_path: Path) -> None:
    found = calibrated(run, tmp_path, by_line(run, 4, spread=0.02, odd=1))
    first_cut = next(line for line, power, _, _ in feeds(run) if power > 0.0)
    assert found.held_down == (first_cut,)
    assert found.factor == pytest.approx(1.2, abs=0.05)


def timed(run: Run, *, delay: float, seed: int = 3, factor: float = 1.2) -> str:
    """Readings every 0.2 s; every tool's work begins ``delay`` later than the tool before it. The clock of the cuts
    is worked out here from lengths, feed and speed of the program's own words: 0.25 mm at 800 rpm is 3.333 mm/s."""
    chance = np.random.default_rng(seed)
    figures, moves = run.prediction.moves, run.path.moves
    begin = np.concatenate(([0.0], np.cumsum(np.nan_to_num(figures.time))))
    time = np.arange(0.0, begin[-1] + 3.0 * delay, 0.2)
    power = np.full(len(time), 0.7)
    for move in moves:
        late = delay * (move.tool or 0)
        own = (time >= begin[move.index] + late) & (time < begin[move.index + 1] + late)
        cutting = np.nan_to_num(figures.motor_power[move.index])
        if cutting > 0.0:
            assert move.start is not None
            z = move.start.z - (time[own] - begin[move.index] - late) * 0.25 * 800.0 / 60.0
            power[own] += factor * cutting * (z <= 0.0)
    power *= 1.0 + 0.03 * chance.standard_normal(len(time))
    rows = (f"{t:.2f};{p:.3f}\n".replace(".", ",") for t, p in zip(time, power, strict=True))
    return "time_s;power_kW\n" + "".join(rows)


@pytest.mark.parametrize("delay", [0.0, 4.0])
def test_a_timed_log_is_laid_over_the_program(run: Run, tmp_path: Path, delay: float) -> None:
    found = calibrated(run, tmp_path, timed(run, delay=delay))
    assert [tool for tool, _ in found.matched.shifts] == [1, 2]
    assert [shift for _, shift in found.matched.shifts] == pytest.approx([delay, 2.0 * delay], abs=0.4)
    assert found.factor == pytest.approx(1.2, abs=0.03)
    assert found.interval[0] <= 1.21
    assert found.interval[1] >= 1.19


def test_the_clock_of_the_prediction_is_that_of_the_program(run: Run) -> None:
    """Feed moves of 8 mm at 0.25 mm and 800 rpm take 2.4 s; the passes begin 4 mm before the face."""
    timeline = timeline_of(run)
    assert min(seconds for _, _, _, seconds in feeds(run)) == pytest.approx(2.4)
    assert timeline.time[-1] == pytest.approx(float(np.nansum(run.prediction.moves.time)))
    for move in run.path.moves:
        if run.prediction.moves.cutting_time[move.index] > 0.0:
            assert move.end is not None
            mean, most, rpm, seconds = timeline.mean(np.array([move.index]))
            assert rpm == pytest.approx(800.0)
            assert seconds == pytest.approx((4.0 - move.end.z) / (0.25 * 800.0 / 60.0))
            assert mean == pytest.approx(most * -move.end.z / (4.0 - move.end.z), rel=0.02)


def test_the_band_narrows_and_says_why(run: Run, tmp_path: Path) -> None:
    found = calibrated(run, tmp_path, by_line(run, 7, spread=0.08, noise=0.01))
    assert 0.10 <= found.scatter < found.scatter_before == 0.25
    assert "spread from cut to cut" in found.scatter_why
    steady = calibrated(run, tmp_path, by_line(run, 7, spread=0.0, noise=0.001))
    assert steady.scatter == 0.10
    assert "never below 10 %" in steady.scatter_why


def test_an_efficiency_taken_for_granted_is_said_and_widens_the_band(tmp_path: Path) -> None:
    known = audit_program(place(tmp_path)).run
    log = by_line(known, 7, spread=0.08)
    unknown = audit_program(place(tmp_path, JOB.replace("efficiency = 0.85\n", ""))).run
    first, second = calibrated(known, tmp_path, log), calibrated(unknown, tmp_path, log)
    assert second.scatter > first.scatter
    assert any("cannot be told apart" in text for text in second.warnings)
    assert "# efficiency = 0.85" in shop_lines(second, unknown.job, read_log(tmp_path / "log.csv"))


def test_the_pasted_lines_make_the_prediction_follow_the_log(run: Run, tmp_path: Path) -> None:
    program = place(tmp_path)
    found = calibrated(run, tmp_path, by_line(run, 9))
    lines = shop_lines(found, run.job, read_log(tmp_path / "log.csv"))
    table = tomllib.loads(lines)["materials"]["C45-fitted"]
    assert table["scatter"] == pytest.approx(found.scatter, abs=0.005)
    (tmp_path / "shop.toml").write_text(lines, encoding="utf-8")
    job = program.with_name("shaft.job.toml")
    job.write_text(JOB.replace('"C45"', '"C45-fitted"'), encoding="utf-8")
    after = audit_program(program).run
    for figure, ratio in (("motor_power", found.factor), ("cutting", found.factor)):
        new, old = (getattr(one.prediction.moves, figure) for one in (after, run))
        cuts = np.nan_to_num(old) > 0.0
        assert new[cuts] / old[cuts] == pytest.approx(ratio, rel=2e-3)
    passive = after.prediction.moves.passive[cuts] / run.prediction.moves.passive[cuts]
    assert passive == pytest.approx(1.0, abs=0.15)  # a spindle load says nothing about the thrust


def test_one_odd_tool_is_pointed_at(run: Run, tmp_path: Path) -> None:
    rows = by_line(run, 6, spread=0.01).split()
    odd = [rows[0]]
    tool_of = {move.line: move.tool for move in run.path.moves}
    for row in rows[1:]:
        line, power = row.split(",")
        odd.append(f"{line},{0.7 + (float(power) - 0.7) * (1.35 if tool_of[int(line)] == 2 else 1.0)}")
    found = calibrated(run, tmp_path, "\n".join(odd) + "\n")
    assert any(text.startswith("T2 takes") for text in found.warnings)


def refused(run: Run, folder: Path, text: str) -> str:
    with pytest.raises(UsageError) as problem:
        calibrated(run, folder, text)
    return str(problem.value)


def test_logs_that_do_not_tell_the_factor_are_refused_with_the_reason(run: Run, tmp_path: Path) -> None:
    cuts = [(line, power) for line, power, _, _ in feeds(run) if power > 0.0]
    alike = sorted(cuts, key=lambda cut: cut[1])[2:6]
    few = "".join(f"{line},{power}\n" for line, power in cuts[:2])
    same = "".join(f"{line},{0.7 + 1.2 * power}\n" for line, power in alike)
    flat = "".join(f"{line},3.0\n" for line, _ in cuts)
    large = "".join(f"{line},{0.7 + 9.0 * power}\n" for line, power in cuts)
    head = "line,power_kW\n"
    assert "too few cuts" in refused(run, tmp_path, head + few)
    assert "idle power cannot be told" in refused(run, tmp_path, head + same)
    assert any(reason in refused(run, tmp_path, head + flat) for reason in ("known no better", "does not rise"))
    assert "no matter of the material" in refused(run, tmp_path, head + large)
    assert "known no better" in refused(run, tmp_path, by_line(run, 1, spread=0.9))
    assert "no reading belongs" in refused(run, tmp_path, head + "900,3\n901,4\n")
    assert "is not in the program" in refused(run, tmp_path, "block,power_kW\nN5,3\nN10,4\n")


def test_a_timed_log_of_another_program_is_refused(run: Run, tmp_path: Path) -> None:
    chance = np.random.default_rng(1)
    rows = "".join(f"{0.2 * row:.1f},{2.0 + chance.standard_normal():.3f}\n" for row in range(1500))
    assert "cannot be laid over" in refused(run, tmp_path, f"time_s,power_kW\n{rows}")


def command(*arguments: object) -> Result:
    return CliRunner().invoke(turnaudit, ["calibrate", *map(str, arguments)])


def test_the_command(shaft: Path, run: Run, tmp_path: Path) -> None:
    log = tmp_path / "log.csv"
    log.write_text(by_line(run, 8), encoding="utf-8")
    before = {path: path.read_bytes() for path in shaft.parent.iterdir()}
    result = command(shaft, "--log", log)
    assert result.exit_code == 0, result.output
    text = result.stdout.replace(str(shaft.parent), "").replace(str(tmp_path), "")
    sheet, _, lines = text.partition("[materials.")
    assert max(map(len, sheet.splitlines())) <= 80
    assert "Force factor 1." in sheet
    assert "The band of the prediction narrows" in sheet
    assert [line.split()[0] for line in sheet.splitlines() if line.startswith("  T")] == ["T1", "T2"]
    assert 'group = "P"' in lines
    assert {path: path.read_bytes() for path in shaft.parent.iterdir()} == before


def test_the_command_in_json(shaft: Path, run: Run, tmp_path: Path) -> None:
    log = tmp_path / "log.csv"
    log.write_text(by_line(run, 8), encoding="utf-8")
    body = json.loads(command(shaft, "--log", log, "--format", "json").stdout)
    assert body["factor_95_percent"][0] < body["factor"] < body["factor_95_percent"][1]
    assert (body["cuts"], body["air_cuts"], len(body["points"])) == (10, 10, 20)
    assert tomllib.loads(body["shop_lines"])["materials"][body["shop_material"]]["scatter"] == round(body["scatter"], 2)


def test_the_command_says_why_it_cannot(shaft: Path, tmp_path: Path) -> None:
    log = tmp_path / "log.csv"
    log.write_text("line,load\n1,2\n", encoding="utf-8")
    result = command(shaft, "--log", log)
    assert result.exit_code == 2
    assert "load_percent" in result.stderr
    assert command(shaft, "--log", tmp_path / "none.csv").exit_code == 2
    assert command(tmp_path / "none.nc", "--log", log).exit_code == 2
