"""The rake study agrees with published relations and with the directions of common practice."""

from __future__ import annotations

import math
from itertools import pairwise
from pathlib import Path

import pytest

from auditor.audit import audit_program
from auditor.compare import RakeStudy, study_rake
from auditor.errors import UsageError
from auditor.findings import Run
from tests.compare.stations import LIBRARY, shop

RAKES = (-12.0, -6.0, 0.0, 6.0, 12.0, 18.0)


@pytest.fixture(scope="module")
def run(tmp_path_factory: pytest.TempPathFactory) -> Run:
    return audit_program(shop(tmp_path_factory.mktemp("rake"))).run


@pytest.fixture(scope="module")
def study(run: Run) -> RakeStudy:
    return study_rake(run, 1, RAKES)


def test_more_positive_is_thinner_lighter_weaker(study: RakeStudy) -> None:
    """Common practice; every textbook of metal cutting says the same."""
    for lower, higher in pairwise(study.rows):
        assert higher.shear_angle > lower.shear_angle
        assert higher.chip_ratio > lower.chip_ratio
        assert higher.chip_thickness < lower.chip_thickness
        assert higher.cutting < lower.cutting
        assert higher.passive < lower.passive
        assert higher.motor_power < lower.motor_power
        assert higher.wedge < lower.wedge
        assert higher.clearance < lower.clearance


def test_chip_ratio_and_shear_angle_belong_together(study: RakeStudy) -> None:
    """tan phi = r cos g / (1 - r sin g): Groover, Fundamentals of Modern Manufacturing, ch. 20."""
    for row in study.rows:
        g = math.radians(row.rake)
        phi = math.atan2(row.chip_ratio * math.cos(g), 1.0 - row.chip_ratio * math.sin(g))
        assert math.degrees(phi) == pytest.approx(row.shear_angle, abs=1e-9)
        assert row.chip_ratio * row.chip_thickness == pytest.approx(study.chip)


def test_chips_are_as_thick_as_measured_ones(study: RakeStudy) -> None:
    """Chip compression of steels under carbide: about 1.5 to 3.5 (common practice)."""
    for row in study.rows:
        assert 1.5 < 1.0 / row.chip_ratio < 3.5


def test_force_changes_by_one_and_a_half_per_cent_a_degree(study: RakeStudy) -> None:
    """K = 1 - 1.5 (g - g0) / 100, g0 = 6 for steels (Tschaetsch, Praxis der Zerspantechnik)."""
    at = {row.rake: row for row in study.rows}
    for rake, row in at.items():
        assert row.cutting / at[6.0].cutting == pytest.approx(1.0 - 0.015 * (rake - 6.0), rel=1e-9)
        assert row.motor_power / at[6.0].motor_power == pytest.approx(row.cutting / at[6.0].cutting, rel=1e-9)


def test_angles_of_one_plane_add_up(run: Run, study: RakeStudy) -> None:
    """ISO 3002-1: clearance, wedge and rake of one plane are 90 deg together. The pocket's -6/-6 deg give the
    insert without clearance 5.97 deg (tan gn = tan go cos ls)."""
    seated = math.degrees(math.atan(math.tan(math.radians(6.0)) * math.cos(math.radians(6.0))))
    for row in study.rows:
        assert row.wedge + row.rake + seated == pytest.approx(90.0)
    assert study.now.clearance == pytest.approx(seated)


def test_a_flat_insert_without_clearance_rubs_once_it_is_not_tilted(tmp_path: Path) -> None:
    """Geometry: what a flat face gains in rake the flank below it loses; level, nothing is left."""
    program = shop(tmp_path, LIBRARY["flat"])
    rows = study_rake(audit_program(program).run, 1, (-6.0, 0.0, 6.0)).rows
    assert [row.clearance for row in rows] == pytest.approx([6.0, 0.0, -6.0], abs=0.05)


def test_the_present_cut_is_the_audit_s_own(run: Run, study: RakeStudy) -> None:
    largest = max(force for force in run.prediction.moves.cutting if force == force)
    assert study.now.cutting == pytest.approx(largest, rel=1e-6)
    assert study.move.line == 11


def test_a_rake_beyond_the_model_is_refused(run: Run) -> None:
    with pytest.raises(UsageError, match="found 40; wanted -15 to 26 deg"):
        study_rake(run, 1, (0.0, 40.0))
