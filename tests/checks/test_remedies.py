"""A computed remedy cures: with it the finding is gone, 5 % beyond it the finding is back."""

from __future__ import annotations

import re
from dataclasses import replace
from pathlib import Path

import pytest

from auditor.audit import audit
from auditor.checks import rules
from auditor.findings import Finding, Level
from tests.checks.cases import FOLDER, job_of, of_check

CURED = [
    ("spindle-power", "heavy"), ("spindle-torque", "large-diameter"), ("axis-thrust", "weak-slide"),
    ("axis-thrust", "wide-drill"),
]  # fmt: skip


def with_feed(program: Path, folder: Path, feed: float) -> Path:
    text = program.read_text(encoding="utf-8")
    changed = folder / program.name
    changed.write_text(re.sub(r"F\d*\.?\d+", f"F{feed:.4f}", text), encoding="utf-8")
    return changed


def with_depth(program: Path, folder: Path, cut_from: float, depth: float) -> Path:
    """Every X word of a cut inside the bar, moved to the depth."""
    text = program.read_text(encoding="utf-8")
    changed = folder / program.name
    inside = lambda match: f"X{cut_from - 2 * depth:.3f}" if float(match[1]) < cut_from else match[0]  # noqa: E731
    changed.write_text(re.sub(r"X(\d+\.?\d*)", inside, text), encoding="utf-8")
    return changed


def judged(program: Path, original: Path, check: str) -> list[Finding]:
    return of_check(audit(replace(job_of(original), program=str(program))), check)


@pytest.mark.parametrize(("check", "name"), CURED)
def test_feed_cures(check: str, name: str, tmp_path: Path) -> None:
    program = FOLDER / check / f"{name}.nc"
    (finding,) = judged(program, program, check)
    found = [float(text) for text in re.findall(r"F(\d+\.\d+)", finding.remedy or "")]

    def levels(feed: float) -> list[Level]:
        return [found.level for found in judged(with_feed(program, tmp_path, feed), program, check)]

    assert levels(found[0]) == [Level.REVIEW]
    assert levels(max(1.05 * found[0], found[0] + 0.005)) == [Level.STOP]
    for clear in found[1:]:  # left out where only a rubbing feed would clear the band
        assert levels(clear) == []
        assert levels(max(1.05 * clear, clear + 0.005)) == [Level.REVIEW]


@pytest.mark.parametrize(("check", "name", "diameter"), [
    ("spindle-power", "heavy", 60.0), ("spindle-torque", "large-diameter", 200.0), ("axis-thrust", "weak-slide", 60.0),
])  # fmt: skip
def test_depth_cures(check: str, name: str, diameter: float, tmp_path: Path) -> None:
    program = FOLDER / check / f"{name}.nc"
    (finding,) = judged(program, program, check)
    found = [float(text) for text in re.findall(r"depth (\d+\.?\d*) mm", finding.remedy or "")]
    assert len(found) == 2

    def levels(depth: float) -> list[Level]:
        return [found.level for found in judged(with_depth(program, tmp_path, diameter, depth), program, check)]

    assert levels(found[0]) == [Level.REVIEW]
    assert levels(1.05 * found[0]) == [Level.STOP]
    assert levels(found[1]) == []
    assert levels(1.05 * found[1]) == [Level.REVIEW]


def test_grip_remedy_holds(tmp_path: Path) -> None:
    program = FOLDER / "chuck-grip" / "thin-grip.nc"
    (finding,) = judged(program, program, "chuck-grip")
    (feed,) = [float(text) for text in re.findall(r"F(\d+\.\d+)", finding.remedy or "")]
    (depth,) = [float(text) for text in re.findall(r"depth (\d+\.?\d*) mm", finding.remedy or "")]

    def levels(changed: Path) -> list[Level]:
        return [found.level for found in judged(changed, program, "chuck-grip")]

    assert levels(with_feed(program, tmp_path, feed)) == [Level.REVIEW]
    assert levels(with_feed(program, tmp_path, 1.05 * feed)) == [Level.STOP]
    assert levels(with_depth(program, tmp_path, 60.0, depth)) == [Level.REVIEW]
    assert levels(with_depth(program, tmp_path, 60.0, 1.05 * depth)) == [Level.STOP]


def test_edge_remedy_cures(tmp_path: Path) -> None:
    program = FOLDER / "depth-over-edge" / "deep.nc"
    (finding,) = judged(program, program, "depth-over-edge")
    (depth,) = [float(text) for text in re.findall(r"Depth (\d+\.?\d*) mm", finding.remedy or "")]
    assert judged(with_depth(program, tmp_path, 60.0, depth), program, "depth-over-edge") == []
    assert judged(with_depth(program, tmp_path, 60.0, 1.05 * depth), program, "depth-over-edge")


@pytest.mark.parametrize(("check", "name"), [("feed-over-nose", "thread-like"), ("surface-roughness", "too-much-feed")])
def test_feed_of_geometry_cures(check: str, name: str, tmp_path: Path) -> None:
    program = FOLDER / check / f"{name}.nc"
    finding = judged(program, program, check)[0]
    feed = float(re.findall(r"F(\d+\.\d+)", finding.remedy or "")[0])
    assert judged(with_feed(program, tmp_path, feed), program, check) == []
    assert judged(with_feed(program, tmp_path, 1.05 * feed), program, check)


def test_rules_hold_a_limit_of_one_meaning() -> None:
    meanings: dict[str, object] = {}
    for rule in rules().values():
        for limit in rule.limits:
            assert meanings.setdefault(limit.name, limit) == limit
