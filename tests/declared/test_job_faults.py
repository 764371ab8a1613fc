"""Everything that can be wrong in a job file: named with file, line, key, what was found and what is wanted."""

from __future__ import annotations

import contextlib
import datetime
import time
from pathlib import Path

import pytest

from auditor.declared.jobs import load_job
from auditor.errors import DeclarationError
from tests.declared.job_files import (
    EVERYTHING,
    MACHINE,
    SOUND,
    TOOL,
    WORKHOLDING,
    WORKPIECE,
    faults,
    only_fault,
    read,
    write,
)


def test_the_sound_file_is_sound(tmp_path: Path) -> None:
    assert read(tmp_path, SOUND).tools[1].nose_radius == 0.8


@pytest.mark.parametrize(
    ("old", "new", "key", "found", "wanted"),
    [
        ('"60 mm"', '"1,5 mm"', "workpiece.diameter", '"1,5 mm"', "a length"),
        ('"60 mm"', '"9**9**9 mm"', "workpiece.diameter", '"9**9**9 mm"', "a length"),
        ('"60 mm"', '"9.5 mm + 2 mm"', "workpiece.diameter", '"9.5 mm + 2 mm"', "a length"),
        ('"60 mm"', '"15"', "workpiece.diameter", '"15"', "a length"),
        ('"60 mm"', "60", "workpiece.diameter", "60", "a length"),
        ('"60 mm"', '"-60 mm"', "workpiece.diameter", '"-60 mm"', "above 0 mm"),
        ('"60 mm"', '"0 mm"', "workpiece.diameter", '"0 mm"', "above 0 mm"),
        ('"15 kW"', '"15 mm"', "machine.power", '"15 mm"', "a power"),
        ('"4500 rpm"', '"4500 mm"', "machine.speed_limit", '"4500 mm"', "a spindle speed"),
        ('kind = "turning"', 'kind = "milling"', "tools.1.kind", '"milling"', '"turning"'),
        ('stick_out = "95 mm"', "stick_out = true", "workholding.stick_out", "true", "a length"),
        ('material = "C45"', 'material = "C46"', "workpiece.material", '"C46"', '"C45"'),
        ('insert = "CNMG 120408"', 'insert = "CNMG 12"', "tools.1.insert", '"CNMG 12"', "nose_radius"),
        ('holder = "PCLNR 2525 M12"', 'holder = "P1"', "tools.1.holder", '"P1"', "cutting_edge_angle"),
        ("[tools.1]", "[tools.T1]", "tools.T1", "T1", "[tools.1]"),
        ("[tools.1]", "[tools.0]", "tools.0", "0", "[tools.1]"),
    ],
)
def test_one_wrong_value(tmp_path: Path, old: str, new: str, key: str, found: str, wanted: str) -> None:
    assert old in SOUND
    fault = only_fault(tmp_path, SOUND.replace(old, new))
    assert fault.file == str(tmp_path / "pin.job.toml")
    assert fault.key == key
    assert found in (fault.found or "")
    assert wanted in (fault.wanted or "")


@pytest.mark.parametrize(
    ("text", "key", "found", "wanted"),
    [
        ("[control]\nsystem = 'D'\n", "control.system", '"D"', '"A", "B" or "C"'),
        ("[control]\nrapid_path = 'curved'\n", "control.rapid_path", '"curved"', '"dogleg" or "straight"'),
        ("[control]\nrough_retract = 0.5\n", "control.rough_retract", "0.5", "a length"),
        ("[control]\nthread_method = 7\n", "control.thread_method", "7", "at most 4"),
        ("[control]\nblock_skip = 'no'\n", "control.block_skip", '"no"', "true or false"),
        ("[model]\nwear_factor = 0.5\n", "model.wear_factor", "0.5", "at least 1"),
        ("[model]\nwear_factor = nan\n", "model.wear_factor", "nan", "number"),
        ("[limits]\npower_share = -1\n", "limits.power_share", "-1", "not below zero"),
        ("[limits]\npower_share = inf\n", "limits.power_share", "inf", "number"),
        (f"[limits]\npower_share = 1{'0' * 400}\n", "limits.power_share", "1000", "number"),
        ("[limits]\npart_bend = '0,02 mm'\n", "limits.part_bend", '"0,02 mm"', "quantity"),
        ("[limits]\npart_bend = '2 kg'\n", "limits.part_bend", '"2 kg"', "quantity"),
        ("[limits]\npart_bend = true\n", "limits.part_bend", "true", "quantity"),
        ("[[accepted]]\ncheck = 'air-time'\nreason = ' '\n", "accepted.1.reason", '" "', "not empty"),
        ("[[accepted]]\ncheck = 'air-time'\n", "accepted.1.reason", "", "reason"),
        ("[[accepted]]\ncheck = 'a'\nreason = 'b'\nuntil = 'June'\n", "accepted.1.until", '"June"', "2027-06-30"),
        ("[accepted]\ncheck = 'a'\n", "accepted", "a table", "[[accepted]]"),
        ("[tools.2]\nkind = 'parting'\n", "tools.2.width", "", "width"),
        ("[tools.2]\nkind = 'drilling'\n", "tools.2.diameter", "", "diameter"),
        ("[tools.2]\ninsert = 'CNMG 120408'\n", "tools.2.kind", "", '"turning"'),
        ("[tools.2]\nkind = 'stop'\nwidth = '3 mm'\n", "tools.2.width", "3 mm", "kind"),
        ("[tools.2]\nkind='drilling'\ndiameter='9 mm'\nnose_radius='1 mm'\n", "tools.2.nose_radius", "", "turning"),
        ("[tool.2]\nkind = 'stop'\n", "tool", "[tool]", "[tools]"),
    ],
)
def test_one_wrong_addition(tmp_path: Path, text: str, key: str, found: str, wanted: str) -> None:
    fault = only_fault(tmp_path, SOUND + text)
    assert fault.key == key
    assert found in (fault.found or "")
    assert wanted in (fault.wanted or "")


@pytest.mark.parametrize(
    ("text", "key", "wanted"),
    [
        ("pwer = '3 kW'\n", "machine.pwer", "power"),
        ("stick_out = '3 mm'\n", "machine.stick_out", "stick_out in [workholding]"),
        ("thrust = { y = '3 kN' }\n", "machine.thrust.y", "x, z"),
        ("colour = 'grey'\n", "machine.colour", "one of"),
    ],
)
def test_an_unknown_key_gets_the_nearest_known_one(tmp_path: Path, text: str, key: str, wanted: str) -> None:
    fault = only_fault(tmp_path, MACHINE + text + WORKHOLDING + WORKPIECE + TOOL)
    assert fault.key == key
    assert wanted in (fault.wanted or "")


def test_a_key_of_another_kind_of_tool_names_that_kind(tmp_path: Path) -> None:
    fault = only_fault(tmp_path, SOUND + "flutes = 2\n")
    assert fault.key == "tools.1.flutes"
    assert "a turning tool has no use" in fault.message
    assert "drilling" in (fault.wanted or "")


@pytest.mark.parametrize("line", ['machine = "slant-15"', "batch = 60", "unattended = true", 'program = "pin.nc"'])
def test_a_top_key_that_landed_under_a_header_is_explained(tmp_path: Path, line: str) -> None:
    fault = only_fault(tmp_path, SOUND + line + "\n")
    key = line.partition(" ")[0]
    assert fault.key == f"tools.1.{key}"
    assert "after the header [tools.1]" in fault.message
    assert "above the first header" in (fault.wanted or "")


@pytest.mark.parametrize("header", ["limits", "tools", "model", "control"])
def test_that_is_explained_under_every_header(tmp_path: Path, header: str) -> None:
    fault = only_fault(tmp_path, SOUND + f"[{header}]\nbatch = 3\n")
    assert (fault.key, fault.found) == (f"{header}.batch", "3")
    assert f"after the header [{header}]" in fault.message


def test_that_is_explained_in_a_tool_of_unknown_kind_too(tmp_path: Path) -> None:
    found = faults(tmp_path, SOUND + '[tools.2]\nmachine = "slant-15"\n')
    assert {fault.key for fault in found} == {"tools.2.kind", "tools.2.machine"}


@pytest.mark.parametrize(
    ("text", "key", "wanted"),
    [
        (WORKHOLDING + WORKPIECE + TOOL, "machine", "[machine]"),
        (MACHINE + WORKPIECE + TOOL, "workholding", "[workholding]"),
        (MACHINE + WORKHOLDING + TOOL, "workpiece", "[workpiece]"),
        (SOUND.replace('speed_limit = "4500 rpm"\n', ""), "machine.speed_limit", "speed_limit"),
        (SOUND.replace('power = "15 kW"\n', ""), "machine.power", "power_curve"),
        (SOUND.replace('stick_out = "95 mm"\n', ""), "workholding.stick_out", "stick_out"),
        (SOUND.replace('material = "C45"\n', ""), "workpiece.material", "material"),
        (SOUND.replace('diameter = "60 mm"\n', ""), "workpiece.diameter", "profile"),
        (SOUND.replace('length = "125 mm"\n', ""), "workpiece.length", "length"),
        (SOUND.replace('kind = "turning"\n', ""), "tools.1.kind", '"turning"'),
        (SOUND.replace('holder = "PCLNR 2525 M12"\n', ""), "tools.1.cutting_edge_angle", "holder code"),
    ],
)
def test_a_required_key_that_is_missing_is_named(tmp_path: Path, text: str, key: str, wanted: str) -> None:
    fault = only_fault(tmp_path, text)
    assert fault.key == key
    assert "missing" in fault.message
    assert wanted in (fault.wanted or "")


def test_several_faults_at_once_each_on_its_line(tmp_path: Path) -> None:
    text = (
        SOUND.replace('"60 mm"', '"60"')
        .replace('"4500 rpm"', '"4500 mm"')
        .replace('power = "15 kW"\n', "")
        .replace('"95 mm"', '"-95 mm"')
        .replace("120408", "12040")
        + "flutes = 2\n[tools.2]\nkind = 'grooving'\n"
    )
    found = {fault.key: fault.line for fault in faults(tmp_path, text)}
    lines = text.splitlines()
    expected = {
        "workpiece.diameter": 'diameter = "60"',
        "machine.speed_limit": 'speed_limit = "4500 mm"',
        "workholding.stick_out": 'stick_out = "-95 mm"',
        "tools.1.flutes": "flutes = 2",
        "machine.power": "[machine]",
        "tools.2.width": "[tools.2]",
    }
    assert found == {key: lines.index(line) + 1 for key, line in expected.items()}


def test_an_empty_file_names_every_missing_table(tmp_path: Path) -> None:
    assert {fault.key for fault in faults(tmp_path, "")} == {"machine", "workholding", "workpiece"}


def test_a_missing_file(tmp_path: Path) -> None:
    with pytest.raises(DeclarationError) as caught:
        load_job(tmp_path / "none.job.toml")
    assert str(caught.value) == f"{tmp_path / 'none.job.toml'}: no such file"


def test_a_folder_in_place_of_a_file(tmp_path: Path) -> None:
    with pytest.raises(DeclarationError, match=r"cannot be read|no such file"):
        load_job(tmp_path)


def test_latin_1_bytes_name_line_and_byte(tmp_path: Path) -> None:
    fault = only_fault(tmp_path, SOUND.encode() + "# Welle für Lüfter\n".encode("latin-1"))
    assert fault.line == SOUND.count("\n") + 1
    assert "0xFC" in (fault.found or "")
    assert "UTF-8" in (fault.wanted or "")


def test_utf_16_is_named(tmp_path: Path) -> None:
    assert "UTF-16" in only_fault(tmp_path, SOUND.encode("utf-16")).message


@pytest.mark.parametrize(
    ("broken", "line"),
    [("machine = \n", 1), ("batch = 1\nbatch = 2\n", 2), ("a = 1\n[machine\n", 2), ("x = 01\n", 1), ("x = 'a\n", 1)],
)
def test_a_syntax_fault_names_its_line(tmp_path: Path, broken: str, line: int) -> None:
    fault = only_fault(tmp_path, broken)
    assert fault.message.startswith("not TOML")
    assert fault.line == line


@pytest.mark.parametrize("text", ["x = " + "[" * 20_000, f"x = {'9' * 20_000}\n", "[a" + ".a" * 20_000 + "]\n"])
def test_hostile_files_end_in_a_fault_and_soon(tmp_path: Path, text: str) -> None:
    began = time.perf_counter()
    assert faults(tmp_path, text)
    assert time.perf_counter() - began < 5.0


def test_crlf_and_byte_order_mark_are_read(tmp_path: Path) -> None:
    text = b"\xef\xbb\xbf" + SOUND.replace("\n", "\r\n").encode()
    assert read(tmp_path, text).machine.speed_limit == 4500.0


def test_crlf_keeps_the_lines(tmp_path: Path) -> None:
    text = SOUND.replace('"60 mm"', '"60"').replace("\n", "\r\n").encode()
    assert only_fault(tmp_path, text).line == SOUND.splitlines().index('diameter = "60 mm"') + 1


def test_a_lone_cr_is_a_fault_not_a_crash(tmp_path: Path) -> None:
    assert faults(tmp_path, SOUND.replace("\n", "\r").encode())


def test_program_not_there(tmp_path: Path) -> None:
    fault = only_fault(tmp_path, 'program = "other.nc"\n' + SOUND)
    assert (fault.key, fault.line) == ("program", 1)


def test_no_program_beside(tmp_path: Path) -> None:
    path = write(tmp_path, SOUND, "bolt.job.toml")
    with pytest.raises(DeclarationError) as caught:
        load_job(path)
    assert "bolt.nc" in (caught.value.faults[0].wanted or "")


@pytest.mark.parametrize(
    ("machine", "message"),
    [
        ('power = "9 kW"\npower_curve = [["500 rpm", "6 kW"]]\n', "instead of"),
        ('power_curve = [["900 rpm", "6 kW"], ["500 rpm", "9 kW"]]\n', "do not rise"),
        ('power_curve = [["500 rpm", "6 mm"]]\n', "not a power"),
        ('power_curve = [["500 rpm"]]\n', "not a pair"),
        ('power_curve = []\n', "not the right kind"),
        ('power = "9 kW"\npeak_power = "8 kW"\n', "below the continuous"),
        ('power = "9 kW"\nefficiency = 1.2\n', "out of bounds"),
        ('power = "9 kW"\nefficiency = true\n', "not the right kind"),
    ],
)  # fmt: skip
def test_a_machine_that_contradicts_itself(tmp_path: Path, machine: str, message: str) -> None:
    text = f'[machine]\nspeed_limit = "4500 rpm"\n{machine}' + WORKHOLDING + WORKPIECE + TOOL
    assert message in only_fault(tmp_path, text).message


def test_a_tailstock_needs_a_kind_that_has_one(tmp_path: Path) -> None:
    text = SOUND.replace(WORKHOLDING, WORKHOLDING + 'tailstock = { point = ["0 mm", "-2 mm"] }\n')
    assert "tailstock" in only_fault(tmp_path, text).message


@pytest.mark.parametrize(
    ("stock", "message"),
    [
        ('diameter = "60 mm"\nbore = "60 mm"\n', "no wall"),
        ('diameter = "60 mm"\nprofile = [["0 mm", "30 mm"], ["-40 mm", "60 mm"]]\n', "both given"),
        ('profile = [["0 mm", "30 mm"], ["-40 mm", "60 mm"], ["-20 mm", "60 mm"]]\n', "to and fro"),
        ('profile = [["0 mm", "30 mm"], ["0 mm", "60 mm"]]\n', "no length"),
        ('profile = [["0 mm", "30 mm"], ["-140 mm", "60 mm"]]\n', "shorter than its profile"),
        ('profile = [["0 mm", "30 mm"], ["-40 mm", "60 mm"]]\nface = "-1 mm"\n', "before the face"),
        ('profile = [["0 mm", "-30 mm"], ["-40 mm", "60 mm"]]\n', "negative"),
    ],
)
def test_stock_that_contradicts_itself(tmp_path: Path, stock: str, message: str) -> None:
    text = SOUND.replace('diameter = "60 mm"\n', stock)
    assert message in only_fault(tmp_path, text).message


@pytest.mark.parametrize(
    ("material", "message"),
    [
        ('{ group = "P", kc11 = "1800 N/mm^2", mc = 0.24 }', "missing"),
        ('{ group = "P", kc11 = "1800 N/mm^2", source = "test bench" }', "belong together"),
        ('{ group = "P", source = "test bench" }', "kc11 and mc are missing"),
        ('{ group = "Z", kc11 = "1800 N/mm^2", mc = 0.24, source = "x" }', "not one of the words"),
        ('{ group = "P", kc11 = "1800 N", mc = 0.24, source = "x" }', "not a force per area"),
        ('{ group = "P", kc11 = "1800 N/mm^2", mc = 1.2, source = "x" }', "out of bounds"),
        ('{ group = "P", kc11 = "1800 N/mm^2", mc = 0.2, source = "x", kn11 = "9 MPa" }', "belong together"),
        ('{ group = "P", kc11 = "1800 N/mm^2", mc = 0.2, source = "x", hardness = "40 HRC" }', "Brinell"),
    ],
)
def test_a_material_that_is_not_whole(tmp_path: Path, material: str, message: str) -> None:
    assert message in only_fault(tmp_path, SOUND.replace('"C45"', material)).message


def test_angles_that_leave_no_minor_edge(tmp_path: Path) -> None:
    text = SOUND.replace("CNMG 120408", "SNMG 120408")
    assert "no angle for the minor edge" in only_fault(tmp_path, text).message


@pytest.mark.parametrize(
    ("text", "room"),
    [
        ('[tools.2]\nkind = "boring"\ninsert = "CCMT 060204"\nholder = "A16R-SCLCR 06"\nnose_radius="6 mm"\n', "edge"),
        ('[tools.2]\nkind = "grooving"\nwidth = "3 mm"\nnose_radius = "1.6 mm"\n', "width"),
    ],
)
def test_a_corner_larger_than_the_insert(tmp_path: Path, text: str, room: str) -> None:
    fault = only_fault(tmp_path, SOUND + text)
    assert fault.key == "tools.2.nose_radius"
    assert f"does not fit on the {room}" in fault.message


ODD = (
    "-1", "0", "1.5", "1e300", "nan", "inf", "9999999999999999999999", "true", '""', '" "', '"x"', '"5 mm"', '"-5 mm"',
    '"9**9**9 mm"', "[]", "[[]]", "[1, 2]", '["1 mm"]', '["5 mm", "1 mm"]', "{}", "{ x = 1 }", "2027-06-30",
    "2027-06-30T10:00:00", "10:00:00",
)  # fmt: skip


@pytest.mark.parametrize("odd", ODD)
def test_an_odd_value_anywhere_is_read_or_refused_in_words(tmp_path: Path, odd: str) -> None:
    lines = EVERYTHING.splitlines()
    for index, line in enumerate(lines):
        key, equals, _ = line.partition(" = ")
        if not equals:
            continue
        path = write(tmp_path, "\n".join([*lines[:index], f"{key} = {odd}", *lines[index + 1 :]]))
        with contextlib.suppress(DeclarationError):
            job = load_job(path)
            assert all(type(entry.until) in (datetime.date, type(None)) for entry in job.accepted)
