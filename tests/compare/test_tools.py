"""Another tool in the station gives what a job that declares that tool outright gives."""

from __future__ import annotations

import dataclasses
import math
from pathlib import Path

import numpy as np
import pytest

from auditor.audit import audit_program
from auditor.compare import Comparison, compare_tools
from auditor.compare.changes import changes
from auditor.declared.jobs import load_job
from auditor.errors import DeclarationError, UsageError
from auditor.findings import Level
from tests.compare.stations import LIBRARY, PROGRAM, shop
from tests.reports import builders


@pytest.fixture(scope="module")
def comparison(tmp_path_factory: pytest.TempPathFactory) -> Comparison:
    program = shop(tmp_path_factory.mktemp("shop"))
    return compare_tools(load_job(program.with_name("pin.job.toml")), 1, list(LIBRARY))


@pytest.mark.parametrize("name", ["positive", "flat"])
def test_a_library_tool_gives_what_declaring_it_gives(comparison: Comparison, name: str, tmp_path: Path) -> None:
    declared = audit_program(shop(tmp_path, LIBRARY[name]))
    variant = next(other for other in comparison.others if other.name == name)
    figures = declared.run.prediction.moves
    assert variant.figures.cutting == pytest.approx(max(figures.cutting[~_nan(figures.cutting)]))
    assert variant.figures.motor_power == pytest.approx(max(figures.motor_power[~_nan(figures.motor_power)]))
    assert [finding.fingerprint for finding in variant.audit.findings] == [
        finding.fingerprint for finding in declared.findings
    ]
    assert {entry.about for entry in variant.audit.assumptions} == {entry.about for entry in declared.assumptions}


def _nan(values: object) -> object:
    return values != values


def test_directions_are_those_of_practice(comparison: Comparison) -> None:
    """Common practice: a positive insert cuts lighter, a flat one heavier; a larger nose leaves a finer surface and
    pushes the work away harder."""
    base = comparison.base.figures
    positive, flat, _ = (other.figures for other in comparison.others)
    for light, middle, heavy in ((positive, base, flat),):
        assert light.cutting < middle.cutting < heavy.cutting
        assert light.motor_power < middle.motor_power < heavy.motor_power
        assert light.passive < middle.passive < heavy.passive
        assert light.wedge < middle.wedge < heavy.wedge
        assert light.roughness > middle.roughness > heavy.roughness


def test_roughness_is_that_of_the_thread_the_tool_leaves(comparison: Comparison) -> None:
    """Average height of the profile drawn here point by point: nose arc of 0.8 mm, behind it the trailing edge that
    the insert (80 deg) and the edge angle (95 deg) leave at 5 deg, every 0.3 mm. Times real over ideal, which is 1 to
    1.25 above 100 m/min on ductile metal (Groover, at second hand)."""
    feed, nose, minor = 0.3, 0.8, math.radians(5.0)
    x = np.linspace(-feed / 2, feed / 2, 20001)

    def height(away: np.ndarray) -> np.ndarray:
        tangent = nose * math.sin(minor)
        line = nose * (1.0 - math.cos(minor)) + (away - tangent) * math.tan(minor)
        return np.where(away > tangent, line, nose - np.sqrt(nose**2 - np.minimum(away**2, nose**2)))

    surface = np.min([height(x - turn * feed) for turn in range(-3, 4)], axis=0)
    ideal = 1000.0 * float(np.mean(np.abs(surface - surface.mean())))
    assert comparison.base.figures.roughness is not None
    assert ideal <= comparison.base.figures.roughness <= 1.25 * ideal


def test_edges_used_follow_taylor(comparison: Comparison) -> None:
    """T = (C / v)^(1/n); v is held at 180 m/min at the tip and rises to the outside of the cut: 180 * 60 / 56 in the
    first pass, 180 * 56 / 50 in the second, so the share lies between that at 180 and that at the higher speeds."""
    lasting = comparison.others[2]
    minutes = lasting.audit.totals.cutting_time / 60.0
    low, high = (minutes / (320.0 / speed) ** 4 for speed in (180.0, 180.0 * 56 / 50))
    assert lasting.figures.edges is not None
    assert low < lasting.figures.edges < high
    assert comparison.base.figures.edges is None


def test_the_same_tool_changes_nothing(comparison: Comparison) -> None:
    lasting = comparison.others[2]
    assert {change.what for change in lasting.changes} == {"left"}
    same = dataclasses.replace(lasting.figures, edges=None)
    assert same == comparison.base.figures


def test_changes_are_told_by_level() -> None:
    """Made by hand: one of each."""
    stop, review = builders.power_finding(), builders.review_finding()
    gone = builders.note_finding(fingerprint="gone")
    eased = dataclasses.replace(stop, level=Level.REVIEW, value=14.0)
    worse = dataclasses.replace(review, level=Level.STOP)
    new = builders.note_finding(fingerprint="new")
    same = builders.note_finding(fingerprint="same")
    found = changes([stop, review, gone, same], [eased, worse, new, same])
    assert [(change.what, change.finding.fingerprint) for change in found] == [
        ("new", "new"), ("worse", review.fingerprint), ("left", "same"), ("eased", stop.fingerprint), ("fixed", "gone"),
    ]  # fmt: skip


def test_what_cannot_be_compared_is_said(tmp_path: Path) -> None:
    program = shop(tmp_path)
    job = load_job(tmp_path / "pin.job.toml")
    with pytest.raises(UsageError, match=r"tools\.2.*not declared.*declared tools: 1"):
        compare_tools(job, 2, ["flat"])
    with pytest.raises(DeclarationError, match=r'"flot".*wanted "flat"'):
        compare_tools(job, 1, ["flot"])
    (tmp_path / "shop.toml").write_text('[tools.half]\nkind = "turning"\ninsert = "CNMG 120408"\n', encoding="utf-8")
    with pytest.raises(DeclarationError, match=r"tools\.half\.cutting_edge_angle"):
        compare_tools(job, 1, ["half"])
    program.write_text(PROGRAM.replace("T0101", "T0303"), encoding="utf-8")
    with pytest.raises(UsageError, match="never calls T1"):
        compare_tools(job, 1, [])
