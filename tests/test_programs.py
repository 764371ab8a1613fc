"""Whole programs as shops write them, each with the job it is meant for.

Two dozen clean ones of all three code tables: every motion block is understood, none is stopped, and what they take off
is the difference of two solids of revolution that are written down here by hand from the drawing. Ten with blocks that
cannot be read or followed: exactly those are named, the rest is still audited.
"""

from __future__ import annotations

import math
import tomllib
from dataclasses import dataclass
from functools import cache
from itertools import pairwise
from pathlib import Path
from typing import Any

import pytest

from auditor.audit import audit_program
from auditor.findings import Audit, Level

PROGRAMS = Path(__file__).parent.parent / "fixtures" / "programs"
Outline = tuple[tuple[float, float], ...]  # (z, diameter) from the front towards the chuck, mm


def fillet(z: float, diameter: float, radius: float) -> Outline:
    """The hollow between a cylinder and the shoulder behind it, about its centre."""
    return tuple(
        (z - radius * math.sin(math.radians(step)), diameter - 2.0 * radius * math.cos(math.radians(step)))
        for step in range(0, 91, 5)
    )


def rounding(z: float, diameter: float, radius: float) -> Outline:
    """The rounded edge between a face and the cylinder behind it, about its centre."""
    return tuple(
        (z + radius * math.cos(math.radians(step)), diameter + 2.0 * radius * math.sin(math.radians(step)))
        for step in range(0, 91, 5)
    )


def inches(*points: tuple[float, float]) -> Outline:
    return tuple((25.4 * z, 25.4 * diameter) for z, diameter in points)


def volume(outline: Outline) -> float:
    """Volume of the frustums under an outline, mm3."""
    return sum(
        math.pi / 12.0 * (near[0] - far[0]) * (near[1] ** 2 + near[1] * far[1] + far[1] ** 2)
        for near, far in pairwise(outline)
    )


def thread(depth: float, pitch: float, length: float, middle: float) -> float:
    """Volume of a 60 degree groove with a root radius of 0.1 mm, mm3: section times way round, turn by turn."""
    root = 0.1
    sharp = depth + root * (1.0 / math.sin(math.radians(30.0)) - 1.0)
    tip = root**2 * (1.0 / math.tan(math.radians(30.0)) - math.radians(60.0))
    section = sharp**2 * math.tan(math.radians(30.0)) - tip
    return section * math.pi * middle * length / pitch


@dataclass(frozen=True)
class Left:
    """What a program leaves of the stock: outside, bore, and what a thread takes off besides (mm3)."""

    outer: Outline
    bore: Outline = ()
    thread: float = 0.0


CLEAN: dict[str, Left] = {
    "flange-nut": Left(
        ((0, 24), (-3, 30), *fillet(-22, 34, 2), (-24, 44), (-25, 46), (-40, 46), (-40, 24), (-43, 24), (-43, 46),
         (-44, 46)),
        ((0, 28), (-2, 24), (-44, 24), (-44, 20), (-46.36, 20), (-50, 0)),
    ),
    "spigot-inch": Left(
        inches((0, 1.1), (-0.075, 1.25), *fillet(-0.94, 1.37, 0.06), (-1, 1.75), (-1.625, 1.75), (-1.625, 2.1),
               (-1.65, 2.15)),
    ),
    "shaft-tail": Left(
        ((0, 26), (-2, 30), (-37, 30), (-37, 27), (-40, 27), (-40, 35), (-150, 35), (-150, 41), (-152, 45)),
        thread=thread(1.227, 2.0, 37.0, 29.2),
    ),
    "bush-b": Left(
        ((0, 46), (-2, 50), (-30, 50), (-30, 62), (-34, 70)),
        ((0, 36), (-2, 32), (-50, 32), (-50, 20), (-58.36, 20), (-62, 0)),
    ),
    "pin-c": Left(
        (*rounding(-3, 18, 3), (-30, 24), (-30, 34), (-31, 36), (-40, 36)), thread=thread(0.92, 1.5, 20.0, 23.4),
    ),
    "nipple-inch": Left(
        inches((0, 0.9), (-0.05, 1), (-1.1319, 1), (-1.1319, 0.88), (-1.25, 0.88), (-1.25, 1.38), (-1.31, 1.5)),
        thread=thread(1.298, 2.1167, 28.75, 24.5),
    ),
    "bush-pom": Left(
        ((0, 22), (-1, 24), (-20, 24), (-20, 12), (-23, 12)),
        ((0, 12), (-22.395, 12), (-26, 0)),
    ),
    "knob-alu": Left(
        ((0, 22), (-2, 26), *fillet(-13, 30, 2), *rounding(-17, 34, 2), (-21, 38), (-21, 34), (-24, 34), (-24, 20),
         (-27, 20), (-27, 38), (-28, 38), (-28, 0), (-31, 0)),
    ),
    "disc-facing": Left(((0, 40), (-6, 40), (-6, 76), (-8, 80), (-12, 80))),
    "pulley": Left(
        ((0, 138), (-1, 140), (-12, 140), (-12, 120), (-17, 120), (-17, 140), (-24, 140), (-24, 120), (-29, 120),
         (-29, 140), (-42, 140)),
    ),
    "bearing-housing": Left(
        ((0, 108), (-1, 110)),
        ((0, 74), (-1, 72), (-17.984, 72), (-17.984, 64), (-30, 64), (-30, 62), (-31, 60), (-60, 60)),
    ),
    "stepped-macro": Left(((0, 30), (-2, 34), (-28, 34), (-28, 58), (-29, 60))),
    "cap-duplicate-n": Left(
        ((0, 30), (-2, 34), (-20, 34), (-20, 50), (-22, 54), (-35, 54)),
        ((0, 28), (-1.5, 25), (-30, 25), (-30, 20), (-36.36, 20), (-40, 0)),
    ),
    "fitting-brass": Left(
        ((0, 12), (-2, 16), (-15, 16), (-15, 13.5), (-18, 13.5), (-18, 24), (-25, 24), (-25, 0), (-28, 0)),
        thread=thread(0.92, 1.5, 15.0, 15.4),
    ),
    "hub-casting": Left(
        ((0, 46), (-2, 50), *fillet(-30, 58, 4), *rounding(-39, 70, 5), (-52, 80)), ((0, 30), (-52, 30)),
    ),
    "ring-hard": Left(((0, 78), (-1, 80), (-20, 80)), ((0, 60), (-20, 60))),
    "taper-shaft-centres": Left(((0, 36.4), (-60, 40), (-80, 40), (-80, 42), (-81, 44), (-120, 44))),
    "nut-internal-thread": Left(
        ((0, 72), (-2, 76), (-26, 76)), ((0, 44), (-2.625, 38.75), (-31, 38.75)),
        thread=thread(1.625, 3.0, 29.0, 39.8),
    ),
    "sleeve-c": Left(((0, 58), (-2, 62), (-40, 62)), ((0, 46), (-2, 42), (-45, 42))),
    "spool-type-two": Left(((0, 44), (-12, 44), (-22, 36), (-40, 36), (-46, 44), (-62, 44))),
    "gland-oneblock": Left(
        ((0, 22), (-1, 24), (-27, 24), (-27, 20.5), (-30, 20.5)), thread=thread(0.92, 1.5, 27.0, 23.4),
    ),
    "step-macro-call": Left(((0, 38), (-25, 38))),
    "step-incremental": Left(((0, 42), *fillet(-20, 46, 2), (-30, 46))),
    "cap-c": Left(
        ((0, 20), (-2, 20), (-2, 42), (-22, 42), (-22, 36), (-27, 36), (-27, 42), (-40, 42)),
        ((0, 20), (-26.36, 20), (-30, 0)),
        thread=thread(0.92, 1.5, 18.0, 41.4),
    ),
}

NOT_AUDITED: dict[str, dict[int, str]] = {
    "arc-without-centre": {14: "R, or I and K"},
    "foreign-statement": {11: "=", 16: "cannot be read"},
    "house-macro": {10: "O9015"},
    "live-tool": {18: "polar"},
    "missing-subprogram": {11: "O7777"},
    "profile-missing": {12: "N190"},
    "typing-slips": {11: "comma", 12: "position", 15: "cannot be read"},
    "unclosed-comment": {12: "comment", 13: "position"},
    "unknown-code": {11: "G177"},
    "work-zero-unknown": {11: "position"},
}


@cache
def audited(folder: str, name: str) -> Audit:
    return audit_program(PROGRAMS / folder / f"{name}.nc")


def stops(audit: Audit) -> list[tuple[int, str, str]]:
    return [(found.line, found.check, found.message) for found in audit.findings if found.level is Level.STOP]


@pytest.mark.parametrize("name", CLEAN)
def test_a_clean_program_is_understood_wholly_and_not_stopped(name: str) -> None:
    audit = audited("clean", name)
    assert audit.coverage.not_audited == ()
    assert stops(audit) == []


@pytest.mark.parametrize("name", CLEAN)
def test_a_clean_program_takes_off_what_the_drawing_says(name: str) -> None:
    """Nose radii in corners and the lean of the edge at shoulders are left out of the drawing: 1 % or 40 mm3."""
    expected = _taken_off(name, CLEAN[name])
    assert audited("clean", name).totals.removed == pytest.approx(expected, rel=0.01, abs=40.0)


@pytest.mark.parametrize("name", NOT_AUDITED)
def test_what_cannot_be_followed_is_named_and_the_rest_is_audited(name: str) -> None:
    audit = audited("broken", name)
    named = {left_out.line: left_out.reason for left_out in audit.coverage.not_audited}
    assert set(named) == set(NOT_AUDITED[name])
    assert all(word in named[line] for line, word in NOT_AUDITED[name].items())
    assert audit.verdict in ("incomplete", "stop")
    assert audit.coverage.audited == audit.coverage.motion_blocks - len(named)
    last = max(audit.run.path.moves, key=lambda move: move.line).line
    assert last > max(named)


def test_every_program_of_the_folders_is_tried() -> None:
    for folder, names in (("clean", CLEAN), ("broken", NOT_AUDITED)):
        assert {path.stem for path in (PROGRAMS / folder).glob("*.nc")} == set(names)


def _taken_off(name: str, left: Left) -> float:
    """Stock in front of the last cut less what is left of it, by the job file's own words (mm3)."""
    work = _workpiece(name)
    raw_bore = math.pi / 4.0 * _millimetres(work.get("bore", "0 mm")) ** 2
    raw = _raw(work, left.outer[-1][0])
    bore = volume(left.bore) + raw_bore * left.bore[-1][0] if left.bore else 0.0
    return volume(raw) - raw_bore * raw[0][0] - volume(left.outer) + bore + left.thread


def _workpiece(name: str) -> dict[str, Any]:
    job = PROGRAMS / "clean" / f"{name}.job.toml"
    workpiece: dict[str, Any] = tomllib.loads(job.read_text(encoding="utf-8"))["workpiece"]
    return workpiece


def _raw(work: dict[str, Any], end: float) -> Outline:
    """The raw outline as far as the program goes."""
    if "profile" in work:
        points = [(_millimetres(z), _millimetres(size)) for z, size in work["profile"]]
    else:
        face, size = _millimetres(work["face"]), _millimetres(work["diameter"])
        points = [(face, size), (face - _millimetres(work["length"]), size)]
    outline = [points[0]]
    for near, far in pairwise(points):
        if far[0] <= end:
            share = (near[0] - end) / (near[0] - far[0])
            return (*outline, (end, near[1] + share * (far[1] - near[1])))
        outline.append(far)
    raise ValueError("the program goes beyond the stock")


def _millimetres(quantity: str) -> float:
    number, unit = quantity.split()
    return float(number) * {"mm": 1.0, "in": 25.4}[unit]
