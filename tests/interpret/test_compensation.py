"""Nose-radius compensation against the worked examples, closed forms, and the distance to the contour."""

from __future__ import annotations

import itertools
import json
import math
from collections.abc import Sequence
from pathlib import Path
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from shapely.geometry import LineString

from auditor.declared.model import Point
from auditor.interpret.compensation import TIP_VECTORS, OffsetPath, offset_path
from auditor.interpret.cycles.call import Stroke
from auditor.interpret.moves import Kind

FIXTURE = Path(__file__).parents[2] / "fixtures" / "language" / "cycle_examples.json"
EXAMPLES: dict[str, dict[str, Any]] = json.loads(FIXTURE.read_text(encoding="utf-8"))["examples"]
SIDES = {"G41": "left", "G42": "right"}


def line(z: float, x: float, source: int | None = None) -> Stroke:
    return Stroke(Kind.FEED, Point(z, x / 2), line=source)


def arc(z: float, x: float, centre_z: float, centre_x: float, *, clockwise: bool, source: int | None = None) -> Stroke:
    return Stroke(
        Kind.ARC, Point(z, x / 2), centre=Point(centre_z, centre_x / 2), clockwise=clockwise, line=source
    )


def contour_of(rows: Sequence[Any]) -> list[Stroke]:
    return [
        line(row[1], row[0]) if len(row) == 2 else arc(row[1], row[0], row[4], row[3], clockwise=row[2] == "CW")
        for row in rows
    ]


@pytest.mark.parametrize("name", ["T1", "T2", "T3"])
def test_worked_example(name: str) -> None:
    example = EXAMPLES[name]
    contour = contour_of(example["contour"])
    start = Point(contour[0].end.z + 2.0, contour[0].end.r)
    path = offset_path(start, contour, SIDES[example["side"]], example["r"], example["tip"], cancelled=False)
    assert path.remarks == ()
    assert len(path.strokes) == len(example["path"])
    for stroke, row in zip(path.strokes, example["path"], strict=True):
        assert (2 * stroke.end.r, stroke.end.z) == pytest.approx((row["tx"], row["tz"]), abs=1e-5)
        if row["tip_arc_centre"]:
            assert stroke.centre is not None
            assert [2 * stroke.centre.r, stroke.centre.z] == pytest.approx(row["tip_arc_centre"], abs=1e-5)
            assert math.dist(stroke.centre, stroke.end) == pytest.approx(row["arc_r"], abs=1e-5)


def test_cancel_ends_with_the_tip_on_the_programmed_point() -> None:
    contour = [*contour_of(EXAMPLES["T1"]["contour"]), line(-36.0, 54.0)]
    path = offset_path(Point(4.0, 8.0), contour, "right", 0.8, 3)
    assert 2 * path.strokes[-2].end.r == pytest.approx(46.0)  # square to the last element
    assert path.strokes[-2].end.z == pytest.approx(-36.8)
    assert path.strokes[-1].end == Point(-36.0, 27.0)


@pytest.mark.parametrize("angle", [5, 10, 15, 20, 30, 45, 60, 75])
@pytest.mark.parametrize("radius", [0.4, 0.8, 1.2])
def test_corner_between_cylinder_and_slope(angle: int, radius: float) -> None:
    # hand compensation: the tip turns r (1 - tan(t/2)) nearer to the chuck (elementary geometry)
    slope = math.tan(math.radians(angle))
    contour = [line(0.0, 40.0 - 20.0 * slope), line(-10.0, 40.0), line(-30.0, 40.0)]
    path = offset_path(Point(5.0, 30.0), contour, "right", radius, 3, cancelled=False)
    shift = radius * (1.0 - math.tan(math.radians(angle / 2)))
    assert path.strokes[1].end == pytest.approx((-10.0 - shift, 20.0), abs=1e-9)


@pytest.mark.parametrize("tip", range(10))
def test_a_cylinder_and_a_face_keep_their_size_or_move_by_the_radius(tip: int) -> None:
    # the nose centre runs one radius above the cylinder; the tip lies off it by its vector
    path = offset_path(Point(5.0, 30.0), [line(0.0, 40.0), line(-30.0, 40.0)], "right", 0.8, tip, cancelled=False)
    assert path.strokes[-1].end.r == pytest.approx(20.0 + 0.8 + 0.8 * TIP_VECTORS[tip].r)


def test_start_up_on_the_intersection() -> None:
    # outside corner of 90 degrees between start-up (down the face) and the cylinder
    contour = [line(0.0, 20.0), line(0.0, 40.0), line(-20.0, 40.0)]
    square = offset_path(Point(10.0, 10.0), contour, "right", 0.8, 9, cancelled=False)
    assert square.strokes[0].end == pytest.approx((0.8, 10.0))
    contour = [line(0.0, 40.0), line(-20.0, 40.0)]
    crossing = offset_path(Point(0.0, 10.0), contour, "right", 0.8, 9, cancelled=False, startup="intersection")
    assert crossing.strokes[0].end == pytest.approx((0.8, 20.8))
    square = offset_path(Point(0.0, 10.0), contour, "right", 0.8, 9, cancelled=False)
    assert square.strokes[0].end == pytest.approx((0.0, 20.8))


def test_arc_round_an_acute_corner() -> None:
    contour = contour_of(EXAMPLES["T3"]["contour"])
    path = offset_path(Point(5.0, 8.0), contour, "right", 0.8, 9, cancelled=False, acute="arc")
    link = path.strokes[2]
    assert link.kind is Kind.ARC
    assert link.centre == Point(0.0, 20.0)  # the corner itself
    assert math.dist(link.centre, link.end) == pytest.approx(0.8)
    assert link.clockwise is False  # outside, outwards on the face then back along the diameter


def topics(path: OffsetPath) -> list[tuple[str, int | None]]:
    return [(remark.topic, remark.line) for remark in path.remarks]


def test_inside_arc_smaller_than_the_nose() -> None:
    contour = [line(0.0, 20.0), line(-10.0, 20.0), arc(-10.5, 21.0, -10.0, 21.0, clockwise=True, source=3),
               line(-10.5, 30.0)]
    path = offset_path(Point(2.0, 10.0), contour, "right", 0.8, 3, cancelled=False)
    assert topics(path) == [("compensation-too-small", 3)]
    centre = Point(path.strokes[1].end.z + 0.8, path.strokes[1].end.r + 0.8)
    assert centre == pytest.approx((-9.7, 10.8))  # as deep into the corner as the nose goes


def test_inside_arc_as_large_as_the_nose_is_no_fault() -> None:
    contour = [line(0.0, 20.0), line(-10.0, 20.0), arc(-10.8, 21.6, -10.0, 21.6, clockwise=True), line(-10.8, 30.0)]
    path = offset_path(Point(2.0, 10.0), contour, "right", 0.8, 3, cancelled=False)
    assert path.remarks == ()
    assert path.strokes[1].end == pytest.approx((-10.8, 10.0))


def test_groove_narrower_than_the_nose() -> None:
    contour = [line(0.0, 40.0), line(-10.0, 40.0), line(-10.0, 36.0), line(-11.0, 36.0, source=4), line(-11.0, 40.0),
               line(-30.0, 40.0)]
    path = offset_path(Point(2.0, 20.0), contour, "right", 0.8, 3, cancelled=False)
    assert ("compensation-too-small", 4) in topics(path)


def test_start_up_and_cancel_in_an_arc() -> None:
    contour = [arc(-5.0, 30.0, -5.0, 20.0, clockwise=False, source=1), line(-20.0, 30.0),
               arc(-25.0, 40.0, -20.0, 40.0, clockwise=True, source=3)]
    path = offset_path(Point(0.0, 10.0), contour, "right", 0.4, 3)
    assert topics(path) == [("compensation-in-arc", 1), ("compensation-in-arc", 3)]


def test_lost_look_ahead_ends_square() -> None:
    contour = [line(0.0, 20.0), line(-10.0, 20.0), line(-10.0, 30.0, source=9)]
    path = offset_path(Point(2.0, 10.0), contour, "right", 0.8, 9, cancelled=False, blind=frozenset({2}))
    assert topics(path) == [("compensation-blank-blocks", 9)]
    assert path.strokes[1].end == pytest.approx((-10.0, 10.8))  # runs into the shoulder by one radius
    seeing = offset_path(Point(2.0, 10.0), contour, "right", 0.8, 9, cancelled=False)
    assert seeing.strokes[1].end == pytest.approx((-9.2, 10.8))


def test_lines_and_feeds_stay_with_their_strokes() -> None:
    contour = [line(0.0, 16.0, 1), line(0.0, 40.0, 2), line(-10.0, 36.0, 3), line(-20.0, 36.0, 4)]
    path = offset_path(Point(5.0, 8.0), contour, "right", 0.8, 3, cancelled=False)
    assert [stroke.line for stroke in path.strokes] == [1, 2, 2, 3, 4]


# --- the nose against the contour -------------------------------------------------------------------


def sampled(start: Point, stroke: Stroke, step: float = 0.02) -> list[Point]:
    """Points along a stroke, by its own definition."""
    if stroke.centre is None:
        count = max(1, math.ceil(math.dist(start, stroke.end) / step))
        return [
            Point(start.z + (stroke.end.z - start.z) * i / count, start.r + (stroke.end.r - start.r) * i / count)
            for i in range(count + 1)
        ]
    centre = stroke.centre
    first = math.atan2(start.r - centre.r, start.z - centre.z)
    last = math.atan2(stroke.end.r - centre.r, stroke.end.z - centre.z)
    turn = -((first - last) % math.tau) if stroke.clockwise else (last - first) % math.tau
    radius = math.dist(centre, stroke.end)
    count = max(8, math.ceil(abs(turn) * radius / step))
    angles = [first + turn * i / count for i in range(count + 1)]
    return [Point(centre.z + radius * math.cos(a), centre.r + radius * math.sin(a)) for a in angles]


def run_of(start: Point, strokes: Sequence[Stroke]) -> list[Point]:
    points = [start]
    for stroke in strokes:
        points += sampled(points[-1], stroke)[1:]
    return points


def least_distance(contour: Sequence[Stroke], path: OffsetPath, radius: float, tip: int) -> float:
    """Least distance of the nose centre to the contour behind the start-up, by dense sampling."""
    surface = LineString(run_of(contour[0].end, contour[1:]))
    back = TIP_VECTORS[tip]
    tips = run_of(path.strokes[0].end, path.strokes[1:])
    return float(surface.distance(LineString([(p.z - radius * back.z, p.r - radius * back.r) for p in tips])))


def test_nose_stays_one_radius_off_the_worked_contour() -> None:
    contour = contour_of(EXAMPLES["T1"]["contour"])
    path = offset_path(Point(4.0, 8.0), contour, "right", 0.8, 3, cancelled=False)
    assert least_distance(contour, path, 0.8, 3) == pytest.approx(0.8, abs=1e-4)


@st.composite
def staircases(draw: st.DrawFn) -> list[Stroke]:
    """A shaft towards the chuck: cylinders, shoulders, tapers, undercuts and arcs of a quarter turn."""
    z, x = 0.0, draw(st.floats(10.0, 30.0))
    strokes = [line(z, x)]
    for _ in range(draw(st.integers(2, 6))):
        kind = draw(st.sampled_from(["cylinder", "shoulder", "taper", "undercut", "fillet", "round"]))
        size = draw(st.floats(2.5, 6.0))
        if kind == "cylinder":
            z -= size
            strokes.append(line(z, x))
        elif kind == "shoulder":
            x += 2 * size
            strokes.append(line(z, x))
        elif kind in ("taper", "undercut"):
            z -= size
            slope = draw(st.floats(0.1, 1.5)) * (1 if kind == "taper" else -0.5)
            x = max(6.0, x + 2 * size * slope)
            strokes.append(line(z, x))
        elif kind == "fillet":
            z, x = z - size, x + 2 * size
            strokes.append(arc(z, x, z + size, x, clockwise=True))
        else:
            z, x = z - size, x + 2 * size
            strokes.append(arc(z, x, z, x - 2 * size, clockwise=False))
    return strokes


@settings(deadline=None, max_examples=60)
@given(contour=staircases(), radius=st.sampled_from([0.2, 0.4, 0.8, 1.2]), tip=st.sampled_from([0, 3, 8]))
def test_nose_never_cuts_into_the_contour(contour: list[Stroke], radius: float, tip: int) -> None:
    start = Point(contour[0].end.z + 3.0, contour[0].end.r)
    path = offset_path(start, contour, "right", radius, tip, cancelled=False)
    assert least_distance(contour, path, radius, tip) >= radius - 2e-4 or path.remarks


@settings(deadline=None, max_examples=60)
@given(contour=staircases(), radius=st.sampled_from([0.2, 0.4, 0.8]))
def test_every_element_is_touched(contour: list[Stroke], radius: float) -> None:
    # without interference the nose comes to one radius of every element, not only of the nearest one
    start = Point(contour[0].end.z + 3.0, contour[0].end.r)
    path = offset_path(start, contour, "right", radius, 9, cancelled=False)
    if path.remarks:
        return
    centres = LineString(run_of(path.strokes[0].end, path.strokes[1:]))
    for before, stroke in itertools.pairwise(contour):
        gap = LineString(sampled(before.end, stroke)).distance(centres)
        assert gap == pytest.approx(radius, abs=2e-3)


def rounded(contour: list[Stroke]) -> list[Stroke]:
    """The contour as a program writes it: three decimals, arcs by R, so that joints are not quite tangent."""
    made: list[Stroke] = []
    for stroke in contour:
        end = Point(round(stroke.end.z, 3), round(2 * stroke.end.r, 3) / 2)
        if stroke.centre is None:
            made.append(Stroke(Kind.FEED, end))
            continue
        start, radius = made[-1].end, round(math.dist(stroke.centre, stroke.end), 3)
        dz, dr = end.z - start.z, end.r - start.r
        chord = math.hypot(dz, dr)
        height = math.sqrt(radius**2 - chord**2 / 4) * (-1 if stroke.clockwise else 1)
        centre = Point(start.z + dz / 2 - dr / chord * height, start.r + dr / 2 + dz / chord * height)
        made.append(Stroke(Kind.ARC, end, centre=centre, clockwise=stroke.clockwise))
    return made


@settings(deadline=None, max_examples=60)
@given(contour=staircases(), radius=st.sampled_from([0.4, 0.8, 1.2]))
def test_rounding_of_the_words_raises_no_fault(contour: list[Stroke], radius: float) -> None:
    start = Point(contour[0].end.z + 3.0, contour[0].end.r)
    exact = offset_path(start, contour, "right", radius, 9, cancelled=False)
    written = rounded(contour)
    path = offset_path(start, written, "right", radius, 9, cancelled=False)
    assert len(path.remarks) == len(exact.remarks)
    if not path.remarks:
        assert least_distance(written, path, radius, 9) >= radius - 1e-3
