"""From findings to a verdict: coverage, levels, a person's decisions, limits, fingerprints, totals."""

from __future__ import annotations

import datetime
from pathlib import Path

import pytest

from auditor.audit import audit, audit_program
from auditor.declared.jobs import load_job
from auditor.errors import DeclarationError, ProgramError
from auditor.findings import Audit, Level
from tests.predict.shop import audited, turning

CALM = "G21 G99 G50 S3000\nG96 S180 M3\nT0101\nG0 X56. Z2.\nG1 Z-30. F0.25\nX64.\nG0 X200. Z150.\nM30\n"


def heavy(tmp_path: Path, before: str = "", program: str | None = None) -> Audit:
    """Eight millimetres a side at half a millimetre: far over the power of the spindle."""
    text = program or CALM.replace("X56.", "X44.").replace("F0.25", "F0.5")
    return audited(tmp_path, text, turning(), before=before)


def levels(result: Audit, check: str) -> list[Level]:
    return [finding.level for finding in result.findings if finding.check == check and finding.accepted is None]


def test_over_the_limit_stops(tmp_path: Path) -> None:
    result = heavy(tmp_path)
    assert Level.STOP in levels(result, "spindle-power")
    assert result.verdict == "stop"


def test_what_was_not_understood_keeps_a_program_from_being_clear(tmp_path: Path) -> None:
    result = audited(tmp_path, CALM.replace("M30", "G65 P9100 X5.\nM30"), turning())
    assert result.coverage.audited < result.coverage.motion_blocks
    assert [entry.line for entry in result.coverage.not_audited] == [8]
    assert result.verdict in ("incomplete", "stop")


def test_coverage_counts_lines_not_passes(tmp_path: Path) -> None:
    """Two motion lines run three times over are two."""
    program = CALM.replace("G0 X200. Z150.\nM30", "M98 P30002\nG0 X200. Z150.\nM30\nO0002\nG0 Z2.\nG1 Z-30.\nM99")
    result = audited(tmp_path, program, turning())
    assert result.coverage.motion_blocks == 6
    assert result.coverage.audited == 6
    assert len(result.run.path.moves) == 4 + 3 * 2


ACCEPT = '[[accepted]]\ncheck = "spindle-power"\n{}reason = "new spindle next week"\n'


def accepted(tmp_path: Path, rest: str) -> Audit:
    audited(tmp_path, CALM.replace("X56.", "X44.").replace("F0.25", "F0.5"), turning() + ACCEPT.format(rest))
    job = load_job(tmp_path / "part.job.toml")
    return audit(job, today=datetime.date(2026, 6, 1))


def test_a_decision_takes_a_finding_out_of_the_verdict_but_not_out_of_the_report(tmp_path: Path) -> None:
    result = accepted(tmp_path, "")
    assert levels(result, "spindle-power") == []
    covered = [finding for finding in result.findings if finding.check == "spindle-power"]
    assert covered
    assert all(finding.accepted is not None for finding in covered)
    assert all(finding.accepted.reason == "new spindle next week" for finding in covered if finding.accepted)


@pytest.mark.parametrize(
    ("rest", "covers"),
    [
        ("line = 5\n", True), ("line = 6\n", False), ("tool = 1\n", True), ("tool = 2\n", False),
        ("until = 2026-06-01\n", True), ("until = 2026-05-31\n", False),
    ],
)  # fmt: skip
def test_a_decision_holds_for_what_it_names_and_as_long_as_it_says(tmp_path: Path, rest: str, covers: bool) -> None:
    result = accepted(tmp_path, rest)
    on_line = [finding for finding in result.findings if finding.check == "spindle-power" and finding.line == 5]
    assert on_line
    assert all((finding.accepted is not None) == covers for finding in on_line)


def test_unknown_limits_and_checks_are_faults_together(tmp_path: Path) -> None:
    with pytest.raises(DeclarationError) as caught:
        audited(
            tmp_path, CALM, turning() + '[limits]\nno_such = 1\npower_share = "3 mm"\n'
            '[[accepted]]\ncheck = "spindle-powr"\nreason = "x"\n',
        )  # fmt: skip
    keys = {fault.key for fault in caught.value.faults}
    assert {"limits.no_such", "limits.power_share"} <= keys
    assert any("spindle-powr" in fault.message for fault in caught.value.faults)


def test_a_jobs_own_limit_is_in_force(tmp_path: Path) -> None:
    """The same cut passes at the whole of the spindle's power and is stopped at a tenth of it."""
    calm = audited(tmp_path, CALM, turning())
    strict = audited(tmp_path, CALM, turning() + "[limits]\npower_share = 0.1\n")
    assert levels(calm, "spindle-power") == []
    assert Level.STOP in levels(strict, "spindle-power")


def test_fingerprints_outlive_edits_elsewhere(tmp_path: Path) -> None:
    text = CALM.replace("X56.", "X44.").replace("F0.25", "F0.5")
    first = heavy(tmp_path, program=text)
    later = heavy(tmp_path, program="(TOUCHED)\nG40\n" + text.replace("G1 Z-30.", "G1  Z-30. "))
    marks = [{f.fingerprint for f in result.findings if f.check == "spindle-power"} for result in (first, later)]
    assert marks[0] == marks[1] != set()


def test_fingerprints_are_one_a_finding(tmp_path: Path) -> None:
    text = CALM.replace("X56.", "X44.").replace("F0.25", "F0.5")
    twice = text.replace("X64.\n", "X64.\nG0 Z2.\nX30.\nG1 Z-30. F0.5\nX64.\n")
    findings = heavy(tmp_path, program=twice).findings
    assert len({finding.fingerprint for finding in findings}) == len(findings)


def test_findings_stand_in_program_order(tmp_path: Path) -> None:
    lines = [finding.line for finding in heavy(tmp_path).findings]
    assert lines == sorted(lines)


def test_totals_are_sums_of_the_moves(tmp_path: Path) -> None:
    result = audited(tmp_path, CALM, turning())
    moves = result.run.prediction.moves
    assert result.totals.removed == pytest.approx(result.run.simulation.removed.sum())
    assert result.totals.time == pytest.approx(moves.time.sum())
    feeds = [move.index for move in result.run.path.moves if move.kind != "rapid"]
    assert result.totals.cutting_time + result.totals.air_feed_time == pytest.approx(moves.time[feeds].sum())


def test_assumptions_name_what_the_program_leans_on(tmp_path: Path) -> None:
    sparse = '[tools.1]\nkind = "turning"\ninsert = "CNMG 120408"\nholder = "PCLNR 2525 M12"\n'
    sparse += '[tools.9]\nkind = "turning"\ninsert = "DNMG 150604"\nholder = "PDJNR 2525 M15"\n'
    about = {assumption.about for assumption in audited(tmp_path, CALM, sparse).assumptions}
    assert "tools.1.edge_radius" in about
    assert not any(key.startswith("tools.9.") for key in about)  # never called


def test_the_same_again_gives_the_same(tmp_path: Path) -> None:
    one, other = heavy(tmp_path), audit_program(tmp_path / "part.nc")
    assert one.findings == other.findings
    assert one.totals == other.totals


def test_a_program_without_a_job_and_one_without_motion(tmp_path: Path) -> None:
    (tmp_path / "alone.nc").write_text(CALM, encoding="utf-8")
    with pytest.raises(DeclarationError, match=r"alone\.job\.toml"):
        audit_program(tmp_path / "alone.nc")
    with pytest.raises(ProgramError, match="motion"):
        audited(tmp_path, "%\n(NOTHING HERE)\nM30\n%\n", turning())
