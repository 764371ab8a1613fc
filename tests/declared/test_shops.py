"""Names of shop entries: where they are found, what they bring, and how faults in them are told."""

from __future__ import annotations

from pathlib import Path

import pytest

from tests.declared.job_files import MACHINE, SOUND, TOOL, WORKHOLDING, WORKPIECE, assumed, faults, only_fault, read

SHOP = """\
[machines.slant-15]
speed_limit = "5000 rpm"
power = "22 kW"
base_speed = "1500 rpm"
[workholdings.three-jaw]
stick_out = "80 mm"
[materials.house-steel]
group = "P"
kc11 = "1800 N/mm^2"
mc = 0.24
source = "own measurement"
[materials.C45]
group = "P"
kc11 = "1234 N/mm^2"
mc = 0.2
source = "own measurement"
[tools.rougher]
kind = "turning"
insert = "CNMG 120408"
holder = "PCLNR 2525 M12"
[controls.old]
system = "A"
whole_numbers = "increments"
"""
BY_NAME = """\
machine = "slant-15"
workholding = "three-jaw"
control = "old"
[workpiece]
material = "house-steel"
diameter = "60 mm"
length = "125 mm"
[tools]
1 = "rougher"
"""


def shop(folder: Path, text: str = SHOP) -> Path:
    path = folder / "shop.toml"
    path.write_text(text, encoding="utf-8")
    return path


def test_names_stand_for_tables(tmp_path: Path) -> None:
    shop(tmp_path)
    job = read(tmp_path, BY_NAME)
    assert (job.machine.name, job.machine.speed_limit) == ("slant-15", 5000.0)
    assert (job.workholding.name, job.workholding.stick_out) == ("three-jaw", 80.0)
    assert (job.workpiece.material.name, job.workpiece.material.kc11) == ("house-steel", 1800.0)
    assert job.control.whole_numbers == "increments"
    assert job.tools[1].nose_radius == 0.8


def test_assumptions_stay_under_the_jobs_own_keys(tmp_path: Path) -> None:
    shop(tmp_path)
    found = assumed(read(tmp_path, BY_NAME))
    assert {"machine.efficiency", "tools.1.edge_radius", "workpiece.material.modulus"} <= set(found)
    assert not [about for about in found if "rougher" in about or "slant" in about]


def test_the_nearest_shop_file_up_the_tree(tmp_path: Path) -> None:
    shop(tmp_path)
    deep = tmp_path / "parts" / "pins"
    deep.mkdir(parents=True)
    assert read(deep, BY_NAME).machine.speed_limit == 5000.0
    shop(tmp_path / "parts", SHOP.replace("5000 rpm", "3000 rpm"))
    assert read(deep, BY_NAME).machine.speed_limit == 3000.0


def test_a_shop_material_beats_the_catalogue(tmp_path: Path) -> None:
    catalogue = read(tmp_path, SOUND).workpiece.material
    shop(tmp_path)
    own = read(tmp_path, SOUND).workpiece.material
    assert own.kc11 == 1234.0
    assert catalogue.kc11 != 1234.0


def test_a_catalogue_material_needs_no_entry(tmp_path: Path) -> None:
    shop(tmp_path)
    assert read(tmp_path, SOUND.replace("C45", "C60")).workpiece.material.name == "C60"


def test_no_shop_file_is_said(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    # Whatever lies in the folders above the test's own is none of its business.
    monkeypatch.setattr("auditor.declared.shops.find_shop", lambda folder: None)
    fault = only_fault(tmp_path, 'machine = "slant-15"\n' + WORKHOLDING + WORKPIECE + TOOL)
    assert (fault.key, fault.line, fault.found) == ("machine", 1, '"slant-15"')
    assert "no shop.toml was found" in fault.message


def test_a_name_that_is_not_there_gets_the_nearest(tmp_path: Path) -> None:
    path = shop(tmp_path)
    fault = only_fault(tmp_path, BY_NAME.replace("slant-15", "slant15"))
    assert (fault.key, fault.wanted) == ("machine", '"slant-15"')
    assert str(path) in fault.message


@pytest.mark.parametrize(
    ("old", "new", "key"),
    [
        ('"22 kW"', '"22 mm"', "machines.slant-15.power"),
        ('base_speed = "1500 rpm"', 'base_sped = "1500 rpm"', "machines.slant-15.base_sped"),
        ('power = "22 kW"\nbase_speed = "1500 rpm"\n', "", "machines.slant-15.power"),
        ('insert = "CNMG 120408"', 'insert = "CNMG"', "tools.rougher.insert"),
        ('holder = "PCLNR 2525 M12"\n', "", "tools.rougher.cutting_edge_angle"),
        ('kind = "turning"', 'kind = "turnin"', "tools.rougher.kind"),
        ("mc = 0.24\n", "", "materials.house-steel"),
        ("[controls.old]", "[control.old]", "control"),
    ],
)
def test_faults_are_told_where_they_stand(tmp_path: Path, old: str, new: str, key: str) -> None:
    assert old in SHOP
    path = shop(tmp_path, SHOP.replace(old, new))
    found = [fault for fault in faults(tmp_path, BY_NAME) if fault.file == str(path)]
    assert [fault.key for fault in found] == [key]
    assert found[0].line is not None


def test_an_entry_nobody_uses_is_read_too(tmp_path: Path) -> None:
    path = shop(tmp_path, SHOP + '[tools.spare]\nkind = "drilling"\ndiamter = "9 mm"\n')
    fault = only_fault(tmp_path, BY_NAME)
    assert (fault.file, fault.key, fault.wanted) == (str(path), "tools.spare.diamter", "diameter")


def test_a_shop_file_of_no_concern_is_left_alone(tmp_path: Path) -> None:
    shop(tmp_path, "not toml")
    own = '{ group = "P", kc11 = "1800 N/mm^2", mc = 0.24, source = "x" }'
    assert read(tmp_path, SOUND.replace('"C45"', own)).machine.speed_limit == 4500.0


def test_a_shop_file_that_is_no_toml(tmp_path: Path) -> None:
    path = shop(tmp_path, "[machines\n")
    assert (str(path), 1) in [(fault.file, fault.line) for fault in faults(tmp_path, BY_NAME)]


def test_names_and_tables_mix(tmp_path: Path) -> None:
    shop(tmp_path)
    job = read(tmp_path, 'workholding = "three-jaw"\n' + MACHINE + WORKPIECE + TOOL + '[tools]\n2 = "rougher"\n')
    assert sorted(job.tools) == [1, 2]
