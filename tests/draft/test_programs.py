"""Whole programs, drafted: every tool, what it does, what the comments say; judged by what was written into them."""

from __future__ import annotations

import json
import re
import tomllib
from contextlib import suppress
from pathlib import Path

import pytest

from auditor.audit import audit_program
from auditor.declared.jobs import load_job
from auditor.draft import Draft, draft_job, open_faults
from auditor.errors import ProgramError, TurnauditError

HOUSE = Path(__file__).parents[2]
PROGRAMS = HOUSE / "fixtures" / "draft"

# What a setter reads out of the files, by key path; "?" is not to be found in the program at all.
EXPECTED = {
    "inch-flange": {
        "control.system": "A", "control.units": "in", "workpiece.material": "EN AW-6061",
        "workpiece.diameter": "4.5 in", "workpiece.bore": "2.75 in", "workpiece.length": "0.53 in",
        "workholding.kind": "chuck", "workholding.stick_out": "?", "tools.1.kind": "turning",
        "tools.1.nose_radius": "0.031 in", "tools.1.included_angle": "80 deg", "tools.3.kind": "boring",
        "tools.3.included_angle": "55 deg", "tools.5.kind": "grooving", "tools.5.width": "0.125 in",
        "tools.7.kind": "threading", "tools.7.included_angle": "60 deg", "machine.power": "?",
    },
    "bague": {
        "control.units": "mm", "workpiece.material": "X8CrNiS18-9", "workpiece.diameter": "50 mm",
        "workpiece.length": "52 mm", "workholding.kind": "chuck", "workholding.stick_out": "38 mm",
        "tools.1.kind": "turning", "tools.1.holder": "PCLNR2525-12", "tools.1.insert": "?", "tools.4.kind": "drilling",
        "tools.4.diameter": "18 mm", "tools.6.kind": "boring", "tools.6.nose_radius": "0.4 mm",
        "tools.8.kind": "parting", "tools.8.width": "3 mm",
    },
    "welle": {
        "workpiece.material": "42CrMo4", "workpiece.diameter": "45 mm", "workpiece.length": "180 mm",
        "workholding.kind": "chuck+tailstock", "workholding.stick_out": "140 mm", "tools.2.insert": "CNMG 120412",
        "tools.2.holder": "PCLNR 2525 M12", "tools.4.insert": "DNMG 150604", "tools.4.holder": "PDJNR 2525 M15",
        "tools.6.kind": "threading", "tools.8.kind": "grooving", "tools.8.width": "2 mm",
    },
    "perno": {
        "workpiece.material": "X2CrNiMo17-12-2", "workpiece.diameter": "30 mm", "workpiece.length": "80 mm",
        "workholding.kind": "collet", "tools.1.insert": "CNMG 120408", "tools.1.holder": "?",
        "tools.3.kind": "drilling", "tools.3.diameter": "8.5 mm", "tools.5.kind": "drilling",
        "tools.5.diameter": "10 mm",
    },
    "casquillo": {
        "workpiece.material": "brass", "workpiece.diameter": "40 mm", "workpiece.length": "60 mm",
        "workholding.jaws": 3, "workholding.stick_out": "45 mm", "tools.1.kind": "turning",
        "tools.1.nose_radius": "0.8 mm", "tools.2.kind": "drilling", "tools.2.diameter": "?",
        "tools.4.kind": "parting", "tools.4.width": "2.5 mm",
    },
    "silent": {
        "workpiece.material": "?", "tools.1.kind": "turning", "tools.2.kind": "boring", "tools.3.kind": "threading",
        "tools.4.kind": "?", "tools.5.kind": "grooving", "workpiece.bore": "40 mm",
    },
    "metric-list": {
        "workpiece.material": "11SMnPb30", "workpiece.section": "hexagon", "tools.1.insert": "CNMG 120408",
        "tools.1.holder": "PCLNR2525-12", "tools.12.insert": "CNMG 432", "tools.12.kind": "turning",
        "tools.3.insert": "CCMT 09T304", "tools.3.holder": "S20S-SCLCR09", "tools.3.kind": "boring",
    },
}  # fmt: skip


@pytest.fixture(autouse=True)
def own_shop(tmp_path: Path) -> None:
    """An empty shop file, so that none further up the folders is found."""
    (tmp_path / "shop.toml").write_text("", encoding="utf-8")


def drafted(name: str, folder: Path) -> Draft:
    return draft_job(PROGRAMS / f"{name}.nc", folder / f"{name}.job.toml")


def flat(table: dict[str, object], prefix: str = "") -> dict[str, object]:
    found: dict[str, object] = {}
    for key, value in table.items():
        found.update(flat(value, f"{prefix}{key}.") if isinstance(value, dict) else {f"{prefix}{key}": value})
    return found


@pytest.mark.parametrize("name", EXPECTED)
def test_the_draft_holds_what_the_program_says(name: str, tmp_path: Path) -> None:
    found = flat(tomllib.loads(drafted(name, tmp_path).text()))
    assert {key: found.get(key) for key in EXPECTED[name]} == EXPECTED[name]


@pytest.mark.parametrize("name", EXPECTED)
def test_every_guess_says_how_sure_and_from_where(name: str, tmp_path: Path) -> None:
    draft = drafted(name, tmp_path)
    lines = (PROGRAMS / f"{name}.nc").read_text(encoding="utf-8").splitlines()
    for path, entry in draft.entries():
        if entry.state == "said" and path != "program":
            assert entry.remark.startswith(("sure: ", "likely: ", "guess: ")), path
        for quote, number in re.findall(r"\(([^()]+)\) in line (\d+)", entry.remark):
            assert quote in " ".join(lines[int(number) - 1].split()), path
    assert draft.text().count("TO BE DECIDED") == len(draft.open) > 0


def many_programs() -> list[Path]:
    found = sorted(PROGRAMS.glob("*.nc")) + sorted((HOUSE / "fixtures" / "programs").rglob("*.nc"))
    return found + sorted((HOUSE / "fixtures" / "checks").rglob("*.nc"))[::7]


def test_what_a_draft_leaves_open_is_exactly_what_is_refused(tmp_path: Path) -> None:
    for program in many_programs():
        target = tmp_path / f"{program.stem}.job.toml"
        draft = draft_job(program, target)
        faults = open_faults(draft.text(), program, target)
        assert sorted(str(fault.key) for fault in faults) == sorted(draft.open), program


def test_any_text_gives_a_whole_draft_or_a_reason(tmp_path: Path) -> None:
    """The small texts of the language cases: odd syntax of every kind."""
    cases = json.loads((HOUSE / "fixtures" / "language" / "snippets.json").read_text(encoding="utf-8"))["snippets"]
    for number, case in enumerate(cases[::4]):
        program = tmp_path / f"{number}.nc"
        program.write_text(case["code"], encoding="utf-8")
        target = tmp_path / f"{number}.job.toml"
        with suppress(ProgramError):  # no motion in it
            draft = draft_job(program, target)
            faults = open_faults(draft.text(), program, target)
            assert sorted(str(fault.key) for fault in faults) == sorted(draft.open), case["code"]


def test_kinds_are_those_the_set_up_people_declared(tmp_path: Path) -> None:
    """Against the job files that stand beside the sound programs; a blade may be declared for what it does once."""
    right = wrong = 0
    for program in sorted((HOUSE / "fixtures" / "programs" / "clean").glob("*.nc")):
        try:
            declared = load_job(program.with_name(f"{program.stem}.job.toml"), program=program).tools
        except TurnauditError:
            continue
        entries = dict(draft_job(program, tmp_path / f"{program.stem}.job.toml").entries())
        for number, tool in declared.items():
            entry = entries.get(f"tools.{number}.kind")
            right += entry is not None and entry.value == f'"{tool.kind}"'
            wrong += entry is not None and entry.value != f'"{tool.kind}"'
    assert right >= 20
    assert wrong <= 0.1 * right


def test_a_draft_that_is_filled_in_is_a_job(tmp_path: Path) -> None:
    target = tmp_path / "welle.job.toml"
    draft = drafted("welle", tmp_path)
    filled = draft.answered({"machine.speed_limit": '"4000 rpm"', "machine.power": '"15 kW"'})
    assert filled.open == ()
    target.write_text(filled.text(), encoding="utf-8")
    audit = audit_program(PROGRAMS / "welle.nc", target)
    assert audit.run.job.workpiece.diameter == 45.0
    assert audit.totals.removed > 0.0
    assert not any(finding.check == "tool-undeclared" for finding in audit.findings)


def test_the_program_is_named_from_where_the_job_stands(tmp_path: Path) -> None:
    program = tmp_path / "parts" / 'odd "name".min'
    program.parent.mkdir()
    program.write_text("G21\nT0101\nG0 X50. Z2.\nG1 Z-10. F0.2\nM30\n", encoding="utf-8")
    draft = draft_job(program, tmp_path / "jobs" / "a.job.toml")
    assert tomllib.loads(draft.text())["program"] == '../parts/odd "name".min'


def test_a_program_without_a_tool_word_gets_one_tool(tmp_path: Path) -> None:
    program = tmp_path / "bare.nc"
    program.write_text("G21\nG0 X50. Z2.\nG1 Z-10. F0.2\nX60.\nM30\n", encoding="utf-8")
    assert tomllib.loads(draft_job(program, tmp_path / "bare.job.toml").text())["tools"]["1"]["kind"] == "turning"


def test_numbers_that_can_only_be_increments_are_noticed(tmp_path: Path) -> None:
    """X50000 is 50 mm on a control that counts in 0.001 mm; a lathe of 50 m swing is not meant."""
    program = tmp_path / "old.nc"
    program.write_text("G21\nT0101\nG0 X50000 Z2000\nG1 Z-10000 F.2\nX60000\nM30\n", encoding="utf-8")
    found = tomllib.loads(draft_job(program, tmp_path / "old.job.toml").text())
    assert found["control"]["whole_numbers"] == "increments"
    assert found["workpiece"]["diameter"] == "60 mm"


def test_the_shop_file_is_used(tmp_path: Path) -> None:
    (tmp_path / "shop.toml").write_text(
        '[machines.slant]\nspeed_limit = "4000 rpm"\npower = "15 kW"\n'
        '[workholdings.small]\nstick_out = "60 mm"\n[workholdings.large]\nstick_out = "140 mm"\n'
        '[tools.thread-60]\nkind = "threading"\n', encoding="utf-8")
    program = tmp_path / "welle.nc"
    text = (PROGRAMS / "welle.nc").read_text(encoding="utf-8").replace("AUSSENGEWINDE", "THREAD-60 AUSSENGEWINDE")
    program.write_text(text, encoding="utf-8")
    draft = draft_job(program, tmp_path / "welle.job.toml")
    found = tomllib.loads(draft.text())
    assert (found["machine"], found["workholding"]) == ("slant", "large")
    assert found["tools"]["6"] == "thread-60"
    assert draft.open == ()
    assert open_faults(draft.text(), program, tmp_path / "welle.job.toml") == ()


def test_several_machines_of_the_shop_are_a_question(tmp_path: Path) -> None:
    entry = 'speed_limit = "4000 rpm"\npower = "15 kW"\n'
    (tmp_path / "shop.toml").write_text(f"[machines.one]\n{entry}[machines.two]\n{entry}", encoding="utf-8")
    draft = drafted("welle", tmp_path)
    assert draft.open == ("machine",)
    faults = open_faults(draft.text(), PROGRAMS / "welle.nc", tmp_path / "welle.job.toml")
    assert [fault.key for fault in faults] == ["machine"]


def test_what_cannot_stand_together_is_taken_back_and_said(tmp_path: Path) -> None:
    """A corner of 2 mm does not fit a blade of 2 mm: half the width at most (geometry)."""
    program = tmp_path / "blade.nc"
    program.write_text("G21\nT0101 (GROOVE W2 R2)\nG0 X50. Z-10.\nG1 X40. F0.1\nX50.\nM30\n", encoding="utf-8")
    draft = draft_job(program, tmp_path / "blade.job.toml")
    assert tomllib.loads(draft.text())["tools"]["1"] == {"kind": "grooving", "width": "2 mm"}
    assert '"2 mm" (likely: (GROOVE W2 R2) in line 2) cannot stand here' in draft.text().replace("\n#   ", " ")
