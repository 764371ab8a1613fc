"""The raw half-section and the material, against geometry worked out by hand."""

from __future__ import annotations

from pathlib import Path

import pytest
from shapely import Polygon

from auditor.declared.model import Workpiece
from tests.declared.job_files import SOUND, assumed, read

BAR = 'diameter = "60 mm"\nlength = "125 mm"\n'


def stock(folder: Path, text: str) -> Workpiece:
    return read(folder, SOUND.replace(BAR, text)).workpiece


def test_a_bar_is_a_rectangle_of_the_half_section(tmp_path: Path) -> None:
    work = stock(tmp_path, BAR + 'face = "1.5 mm"\nbore = "10 mm"\n')
    assert {tuple(corner) for corner in work.outline} == {(1.5, 5.0), (1.5, 30.0), (-123.5, 30.0), (-123.5, 5.0)}
    assert Polygon(work.outline).is_valid
    assert Polygon(work.outline).area == pytest.approx(125.0 * 25.0)
    assert work.diameter == 60.0


PROFILE = 'profile = [["0 mm", "30 mm"], ["-40 mm", "60 mm"]]\nlength = "100 mm"\n'


@pytest.mark.parametrize(
    ("extra", "area"),
    [
        ("", 40.0 * 22.5 + 60.0 * 30.0),  # cone (mean radius 22.5) and the rest at radius 30
        ('bore = "10 mm"\n', 40.0 * 17.5 + 60.0 * 25.0),
        ('face = "2 mm"\n', 2.0 * 15.0 + 40.0 * 22.5 + 58.0 * 30.0),
    ],
)
def test_a_profile_runs_on_to_face_and_length(tmp_path: Path, extra: str, area: float) -> None:
    work = stock(tmp_path, PROFILE + extra)
    assert Polygon(work.outline).is_valid
    assert Polygon(work.outline).area == pytest.approx(area)
    assert (work.diameter, work.length) == (60.0, 100.0)


def test_a_profile_may_be_written_from_the_chuck(tmp_path: Path) -> None:
    turned = 'profile = [["-40 mm", "60 mm"], ["0 mm", "30 mm"]]\nlength = "100 mm"\n'
    assert stock(tmp_path, turned).outline == stock(tmp_path, PROFILE).outline


def test_a_stepped_profile_keeps_its_shoulder(tmp_path: Path) -> None:
    stepped = 'profile = [["0 mm", "30 mm"], ["-20 mm", "30 mm"], ["-20 mm", "50 mm"]]\nlength = "60 mm"\n'
    work = stock(tmp_path, stepped)
    assert Polygon(work.outline).area == pytest.approx(20.0 * 15.0 + 40.0 * 25.0)


def test_a_pointed_end_makes_no_double_corner(tmp_path: Path) -> None:
    work = stock(tmp_path, 'profile = [["0 mm", "0 mm"], ["-40 mm", "60 mm"]]\nlength = "50 mm"\n')
    assert len(set(work.outline)) == len(work.outline)
    assert Polygon(work.outline).area == pytest.approx(40.0 * 15.0 + 10.0 * 30.0)


OWN = (
    '{ group = "P", kc11 = "1800 N/mm^2", mc = 0.24, reference_rake = "5 deg", kn11 = "900 N/mm2", mn = 0.4, '
    'scatter = 0.15, source = "test bench, 2024", tensile_strength = "650 MPa", hardness = "190 HB", '
    'modulus = "210 GPa", density = "7.85 g/cm^3", chips = "long", work_hardening = false, '
    'built_up_edge = ["10 m/min", "70 m/min"] }'
)


def test_a_declared_material(tmp_path: Path) -> None:
    job = read(tmp_path, SOUND.replace('"C45"', OWN))
    material = job.workpiece.material
    assert (material.group, material.kc11, material.mc, material.reference_rake) == ("P", 1800.0, 0.24, 5.0)
    assert (material.kn11, material.mn, material.scatter) == (900.0, 0.4, 0.15)
    assert (material.source, material.provenance) == ("test bench, 2024", "declared")
    assert (material.tensile_strength, material.hardness) == (650.0, 190.0)
    assert (material.modulus, material.density) == (210_000.0, 7.85)
    assert (material.chips, material.built_up_edge) == ("long", (10.0, 70.0))
    assert not [about for about in assumed(job) if about.startswith("workpiece.material")]


def test_what_a_declared_material_leaves_open_is_listed(tmp_path: Path) -> None:
    short = '{ group = "K", kc11 = "1000 N/mm^2", mc = 0.26, source = "x" }'
    job = read(tmp_path, SOUND.replace('"C45"', short))
    found = {about: value for about, value in assumed(job).items() if about.startswith("workpiece.material")}
    # 2 deg is the rake at which cast iron pairs are commonly given; the rest are handbook figures of grey iron
    assert found == {
        "workpiece.material.scatter": "0.25", "workpiece.material.reference_rake": "2 deg",
        "workpiece.material.modulus": "120000 MPa", "workpiece.material.density": "7.2 g/cm^3",
        "workpiece.material.chips": "short", "workpiece.material.work_hardening": "no",
    }  # fmt: skip


def test_plastics_may_do_without_a_pair(tmp_path: Path) -> None:
    material = read(tmp_path, SOUND.replace('"C45"', '{ group = "O", source = "x" }')).workpiece.material
    assert (material.kc11, material.mc) == (None, None)


def test_a_catalogue_name_brings_its_source(tmp_path: Path) -> None:
    material = read(tmp_path, SOUND).workpiece.material
    assert material.name == "C45"
    assert material.source
