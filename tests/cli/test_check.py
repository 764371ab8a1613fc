"""``turnaudit check``: exit statuses, which programs are audited, which files are written."""

from __future__ import annotations

import json
import os
import subprocess
import sys
from collections.abc import Callable
from pathlib import Path

import pytest
from click.testing import CliRunner, Result

from auditor.cli import _answers, turnaudit
from auditor.cli._inputs import Task
from auditor.errors import DeclarationError, Fault
from auditor.findings import Audit
from auditor.reports import Outcome, Unreadable
from tests.reports import builders

Check = Callable[..., Result]


def outcome_of(task: Task) -> Outcome:
    """An audit made by hand, by the program's name."""
    if task.faults:
        return Unreadable(str(task.program), task.faults)
    path, name = str(task.program), task.program.stem
    if name.startswith("broken"):
        fault = Fault("negative", file=str(task.job), key="workpiece.diameter", found="-1 mm", wanted="more than 0 mm")
        return Unreadable(path, DeclarationError(fault).faults)
    if name.startswith("crash"):
        raise ZeroDivisionError("division by zero")
    return _by_name(name, path)


def _by_name(name: str, path: str) -> Audit:
    stop, review, note = builders.power_finding(), builders.review_finding(), builders.note_finding()
    made = {
        "stop": ([stop, note], "stop", []), "review": ([review], "review", []), "note": ([note], "clear", []),
        "clear": ([], "clear", []), "part": ([note], "incomplete", [builders.NOT_AUDITED]),
        "partstop": ([stop], "stop", [builders.NOT_AUDITED]),
        "accepted": ([builders.power_finding(accepted=builders.ACCEPTED)], "clear", []),
        "worse": ([builders.power_finding(value=18.0)], "stop", []),
    }
    findings, verdict, not_audited = made[name.split("-")[0]]
    return builders.audit(findings, verdict=verdict, path=path, not_audited=not_audited)


@pytest.fixture
def check(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Check:
    """The command in an empty folder, with audits made by hand."""
    monkeypatch.chdir(tmp_path)
    monkeypatch.setattr(_answers, "_audit", outcome_of)
    return lambda *arguments: CliRunner().invoke(turnaudit, ["check", *map(str, arguments)])


def declare(*names: str, program: str | None = None) -> None:
    """Programs with their job files; a name may hold a folder."""
    for name in names:
        path = Path(name)
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text(builders.PROGRAM, encoding="utf-8")
        named = "" if program is None else f'program = "{program}"\n'
        path.with_name(path.stem + ".job.toml").write_text(named, encoding="utf-8")


def verdicts(result: Result) -> list[tuple[str, str]]:
    body = json.loads(result.stdout)
    return [(Path(audit["program"]["path"]).name, audit["verdict"]) for audit in body.get("audits", [body])]


# Exit status: 0 nothing at or above --fail-on, 1 something, 2 something could not be audited; the worst wins.
@pytest.mark.parametrize(("names", "options", "status"), [
    ("clear", "", 0), ("note", "", 0), ("review", "", 0), ("stop", "", 1), ("accepted", "", 0),
    ("review", "--fail-on review", 1), ("note", "--fail-on review", 0), ("stop", "--fail-on never", 0),
    ("accepted", "--fail-on review", 0),
    ("part", "", 2), ("part", "--allow-incomplete", 0), ("part", "--fail-on never", 2),
    ("partstop", "", 2), ("partstop", "--allow-incomplete", 1), ("partstop", "--allow-incomplete --fail-on never", 0),
    ("broken", "", 2), ("broken", "--allow-incomplete --fail-on never", 2), ("crash", "", 2),
    ("clear stop", "", 1), ("clear stop part", "", 2), ("stop broken clear", "", 2), ("clear review", "", 0),
])
@pytest.mark.parametrize("form", ["screen", "json"])
def test_exit_status(check: Check, names: str, options: str, status: int, form: str) -> None:
    programs = [f"{name}.nc" for name in names.split()]
    declare(*programs)
    assert check(*programs, "--format", form, *options.split()).exit_code == status


@pytest.mark.parametrize("arguments", [
    (), ("--format", "nonsense", "clear.nc"), ("--shard", "0/3", "clear.nc"), ("--shard", "4/3", "clear.nc"),
    ("--shard", "x", "clear.nc"), ("--workers", "0", "clear.nc"), ("--fail-on", "note", "clear.nc"),
    ("--against", "missing.json", "clear.nc"), ("--against", "clear.nc", "clear.nc"), ("--nonsense", "clear.nc"),
    ("--job", "clear.job.toml", "clear.job.toml"), ("--job", "clear.job.toml", "."),
])
def test_usage_errors_give_two_and_no_traceback(check: Check, arguments: tuple[str, ...]) -> None:
    declare("clear.nc")
    result = check(*arguments)
    assert result.exit_code == 2
    assert result.stderr
    assert "Traceback" not in result.output


@pytest.mark.parametrize("form", ["screen", "json"])
def test_missing_file_and_folder_without_program(check: Check, form: str) -> None:
    Path("empty").mkdir()
    for name in ("missing.nc", "empty"):
        result = check(name, "--format", form)
        assert result.exit_code == 2
        assert name in result.stderr


def test_missing_file_does_not_keep_the_others_from_being_audited(check: Check) -> None:
    declare("clear.nc")
    result = check("missing.nc", "clear.nc", "--format", "json")
    assert verdicts(result) == [("missing.nc", "unreadable"), ("clear.nc", "clear")]


def test_unreadable_is_json_on_standard_output_and_words_on_standard_error(check: Check) -> None:
    declare("broken.nc")
    result = check("broken.nc", "--format", "json")
    body = json.loads(result.stdout)
    assert (body["report"], body["verdict"]) == ("turnaudit/1", "unreadable")
    assert body["errors"][0]["key"] == "workpiece.diameter"
    assert "workpiece.diameter" in result.stderr
    assert "-1 mm" in result.stderr


def test_own_failure_is_said_plainly_and_does_not_stop_the_others(check: Check) -> None:
    declare("crash.nc", "clear.nc")
    result = check("crash.nc", "clear.nc", "--format", "json")
    assert verdicts(result) == [("crash.nc", "unreadable"), ("clear.nc", "clear")]
    assert "ZeroDivisionError" in result.stderr
    assert "Traceback" not in result.output


def test_folder_takes_job_files_and_undeclared_programs_of_all_levels(check: Check) -> None:
    declare("a/clear-1.nc", "a/deep/stop-1.cnc")
    declare("a/odd.job.nc", program="review-1.eia")
    Path("a/odd.job.nc").rename("a/review-1.eia")
    Path("a/odd.job.job.toml").rename("a/odd.job.toml")
    Path("a/lonely.tap").write_text("G0 X1\n", encoding="utf-8")
    Path("a/setup.txt").write_text("Clamp at 60 mm.\n", encoding="utf-8")
    Path("a/sub.TXT").write_text("%\nO2\nG1 X1.\n", encoding="utf-8")
    Path("a/.hidden").mkdir()
    Path("a/.hidden/clear-2.nc").write_text("G0\n", encoding="utf-8")
    result = check("a", "--format", "json")
    assert sorted(verdicts(result)) == [
        ("clear-1.nc", "clear"), ("lonely.tap", "unreadable"), ("review-1.eia", "review"), ("stop-1.cnc", "stop"),
        ("sub.TXT", "unreadable"),
    ]
    assert "not declared" in result.stderr
    assert result.exit_code == 2


def test_job_file_leads_to_its_program(check: Check) -> None:
    declare("clear.cnc")
    assert verdicts(check("clear.job.toml", "--format", "json")) == [("clear.cnc", "clear")]


def test_program_finds_the_job_file_that_names_it(check: Check) -> None:
    declare("stop.nc", program="stop.nc")
    Path("stop.job.toml").rename("other.job.toml")
    assert verdicts(check("stop.nc", "--format", "json")) == [("stop.nc", "stop")]


def test_broken_job_file_is_told_once_with_its_program(check: Check) -> None:
    declare("f/stop.nc")
    Path("f/stop.job.toml").write_text("machine = = 3\n", encoding="utf-8")
    for path in ("f", "f/stop.job.toml"):
        result = check(path, "--format", "json")
        assert verdicts(result) == [("stop.nc", "unreadable")]
        assert "stop.job.toml" in result.stderr


def test_job_file_without_a_program_is_told(check: Check) -> None:
    declare("gone.nc")
    Path("gone.nc").unlink()
    result = check("gone.job.toml", "--format", "json")
    assert (result.exit_code, verdicts(result)) == (2, [("gone.job.toml", "unreadable")])


def test_same_program_named_twice_is_audited_once(check: Check) -> None:
    declare("clear.nc")
    assert verdicts(check("clear.nc", ".", "clear.job.toml", "--format", "json")) == [("clear.nc", "clear")]


def test_shards_together_are_the_whole_and_overlap_nowhere(check: Check) -> None:
    declare(*(f"f/clear-{number}.nc" for number in range(7)))
    seen = []
    for number in (1, 2, 3):
        result = check("f", "--shard", f"{number}/3", "--format", "json")
        assert json.loads(result.stdout)["report"] == "turnaudit-set/1"
        seen += [name for name, _ in verdicts(result)]
    assert sorted(seen) == [f"clear-{number}.nc" for number in range(7)]


def test_empty_shard_is_no_failure(check: Check) -> None:
    declare("f/clear-1.nc", "f/clear-2.nc")
    result = check("f", "--shard", "3/3", "--format", "json")
    assert (result.exit_code, json.loads(result.stdout)["audits"]) == (0, [])


def test_output_goes_to_the_file_and_words_to_standard_error(check: Check) -> None:
    declare("stop.nc")
    result = check("stop.nc", "--format", "json", "--output", "report.json")
    assert (result.exit_code, result.stdout) == (1, "")
    assert json.loads(Path("report.json").read_text(encoding="utf-8"))["verdict"] == "stop"
    assert "stop.nc: stop (1 stop, 1 note)" in result.stderr


def test_quiet_leaves_only_the_verdict(check: Check) -> None:
    declare("stop.nc")
    assert check("stop.nc", "--quiet").stdout.splitlines() == ["■ STOP  stop.nc   1 must be fixed, 1 to know"]
    assert check("stop.nc", "--quiet", "--format", "json").stderr == ""


def test_quiet_is_one_line_a_program_and_says_why_on_standard_error(check: Check) -> None:
    declare("stop.nc", "clear.nc")
    result = check("stop.nc", "clear.nc", "missing.nc", "--quiet")
    assert [line[:9].strip() for line in result.stdout.splitlines()] == ["■ STOP  s", "○ CLEAR", "✕ UNREADA"]
    assert "missing.nc: no such file" in result.stderr


def test_screen_file_holds_every_sign(check: Check) -> None:
    declare("stop.nc")
    check("stop.nc", "--output", "report.txt")
    assert Path("report.txt").read_text(encoding="utf-8").startswith("■ STOP")


@pytest.mark.parametrize("target", ["stop.nc", "stop.job.toml", "./stop.nc", "shop.toml", "old.json", "linked.nc"])
def test_output_never_replaces_an_input(check: Check, target: str) -> None:
    declare("stop.nc")
    Path("shop.toml").write_text("# shop\n", encoding="utf-8")
    check("stop.nc", "--format", "json", "--output", "old.json")
    Path("linked.nc").hardlink_to("stop.nc")
    before = Path(target).read_bytes()
    result = check("stop.nc", "--format", "json", "--output", target, "--against", "old.json")
    assert result.exit_code == 2
    assert Path(target).name in result.stderr
    assert Path(target).read_bytes() == before


@pytest.mark.parametrize("target", ["nowhere/report.json", "folder"])
def test_output_that_cannot_be_written_is_refused_before_the_work(check: Check, target: str) -> None:
    declare("clear.nc")
    Path("folder").mkdir()
    result = check("clear.nc", "--output", target)
    assert result.exit_code == 2
    assert "Traceback" not in result.output


def test_failed_writing_leaves_the_old_file_and_no_remains(check: Check, monkeypatch: pytest.MonkeyPatch) -> None:
    declare("clear.nc")
    Path("report.json").write_text("old", encoding="utf-8")

    def full(*_: object) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(os, "fsync", full)
    result = check("clear.nc", "--format", "json", "--output", "report.json")
    assert result.exit_code == 2
    assert "No space left on device" in result.stderr
    assert Path("report.json").read_text(encoding="utf-8") == "old"
    assert sorted(path.name for path in Path().iterdir()) == ["clear.job.toml", "clear.nc", "report.json"]


@pytest.mark.skipif(sys.platform == "win32", reason="permission bits of POSIX")
def test_output_keeps_the_permissions_of_the_file_it_replaces(check: Check) -> None:
    declare("clear.nc")
    Path("report.json").write_text("old", encoding="utf-8")
    Path("report.json").chmod(0o640)
    check("clear.nc", "--format", "json", "--output", "report.json")
    assert Path("report.json").stat().st_mode & 0o777 == 0o640
    check("clear.nc", "--format", "json", "--output", "fresh.json")
    mask = os.umask(0)
    os.umask(mask)
    assert Path("fresh.json").stat().st_mode & 0o777 == 0o666 & ~mask


@pytest.mark.skipif(not Path("/dev/null").exists(), reason="needs a device to write to")
def test_device_is_written_to_and_not_replaced(check: Check) -> None:
    declare("clear.nc")
    assert check("clear.nc", "--output", "/dev/null").exit_code == 0
    assert Path("/dev/null").is_char_device()


def test_against_counts_only_what_is_new_or_worse(check: Check) -> None:
    declare("stop.nc", "worse.nc")
    check("stop.nc", "--format", "json", "--output", "old.json")
    assert check("stop.nc", "--against", "old.json").exit_code == 0
    body = json.loads(Path("old.json").read_text(encoding="utf-8"))
    for change, status in (
        ({"value": 15.0}, 1), ({"value": 16.9}, 0), ({"value": 20.0}, 0), ({"level": "review"}, 1),
        ({"fingerprint": "other"}, 1), ({"accepted": {"reason": "r", "until": None}}, 1),
    ):
        changed = {**body, "findings": [{**item, **change} for item in body["findings"]]}
        Path("changed.json").write_text(json.dumps(changed), encoding="utf-8")
        assert check("stop.nc", "--against", "changed.json").exit_code == status, change


def test_against_works_on_sets_and_by_program(check: Check) -> None:
    declare("f/stop-1.nc", "f/clear.nc", "f/stop-2.nc")
    check("f/stop-1.nc", "f/clear.nc", "--format", "json", "--output", "old.json")
    assert check("f/stop-1.nc", "--against", "old.json").exit_code == 0
    assert check("f", "--against", "old.json").exit_code == 1  # the same finding in another program is new


def test_screen_falls_back_to_ascii_when_the_encoding_holds_no_more(check: Check) -> None:
    declare("stop.nc")
    for charset, ascii_only in (("cp437", True), ("cp1252", True), ("ascii", True), ("utf-8", False)):
        result = CliRunner(charset=charset).invoke(turnaudit, ["check", "stop.nc"])
        assert result.stdout_bytes.isascii() == ascii_only
        assert result.exit_code == 1
    result = CliRunner(env={"TERM": "dumb"}).invoke(turnaudit, ["check", "stop.nc"])
    assert result.stdout_bytes.isascii()


def test_hostile_name_and_code_page_do_not_break_standard_error(check: Check) -> None:
    name = "br\u00f6ken\x1b[31m\u2264.nc"
    result = CliRunner(charset="ascii").invoke(turnaudit, ["check", name])
    assert result.exit_code == 2
    assert "\x1b" not in result.output
    assert result.stderr_bytes.isascii()


def test_help_is_quick_and_imports_nothing_heavy() -> None:
    code = (
        "import sys; from click.testing import CliRunner; from auditor.cli import turnaudit; "
        "r = CliRunner().invoke(turnaudit, ['--help']); assert r.exit_code == 0, r.output; "
        "print([m for m in ('numpy', 'shapely', 'pint', 'pydantic', 'lark', 'rich') if m in sys.modules])"
    )
    found = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert found.stdout.strip() == "[]"
