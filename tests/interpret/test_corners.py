"""Corner and angle words against the worked example, trigonometry by hand and geometric properties."""

from __future__ import annotations

import json
import math
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from auditor.declared.model import Point
from auditor.interpret.corners import Leg, draw
from auditor.interpret.cycles.call import CycleFault
from auditor.interpret.moves import Kind
from tests.interpret.programs import carried_out, rows

FIXTURE = Path(__file__).parents[2] / "fixtures" / "language" / "cycle_examples.json"


def test_worked_example() -> None:
    # fixture C22: G1 X30.,C1.5 / Z-20.,R3. / X50.,R2. / Z-35. / X70.,A150. / Z-60.
    legs = [
        Leg(end_r=15.0, chamfer=1.5), Leg(end_z=-20.0, rounding=3.0), Leg(end_r=25.0, rounding=2.0),
        Leg(end_z=-35.0), Leg(end_r=35.0, angle=150.0), Leg(end_z=-60.0),
    ]
    wanted = json.loads(FIXTURE.read_text(encoding="utf-8"))["examples"]["C22"]["moves"][1:]
    strokes = draw(Point(0.0, 0.0), legs)
    assert len(strokes) == len(wanted)
    for stroke, move in zip(strokes, wanted, strict=True):
        assert (2 * stroke.end.r, stroke.end.z) == pytest.approx((move["x"], move["z"]), abs=1e-4)
        assert (stroke.kind is Kind.ARC) == (move["kind"] != "F")
        if stroke.kind is Kind.ARC:
            assert stroke.clockwise == (move["kind"] == "CW")
            assert stroke.centre is not None
            assert (2 * stroke.centre.r, stroke.centre.z) == pytest.approx((move["cx"], move["cz"]), abs=1e-4)


def test_chamfer_at_a_slanted_corner_cuts_each_side_by_its_size() -> None:
    # cylinder to Z-10, then a 30 degree cone: 2 mm along each side
    path = draw(Point(0.0, 10.0), [Leg(end_z=-10.0, chamfer=2.0), Leg(end_z=-30.0, angle=150.0)])
    assert path[0].end == pytest.approx((-8.0, 10.0))
    assert path[1].end == pytest.approx((-10.0 - 2 * math.cos(math.pi / 6), 10.0 + 2 * math.sin(math.pi / 6)))


def test_two_lines_known_by_their_angles_meet() -> None:
    # from (0, 10) at 180 degrees and into (-20, 20) at 135 degrees: they meet at (-10, 10)
    path = draw(Point(0.0, 10.0), [Leg(angle=180.0), Leg(end_z=-20.0, end_r=20.0, angle=135.0)])
    assert path[0].end == pytest.approx((-10.0, 10.0))
    assert path[1].end == pytest.approx((-20.0, 20.0))


def test_corner_words_act_where_two_lines_meet() -> None:
    path = draw(Point(0.0, 10.0), [Leg(angle=180.0, rounding=3.0), Leg(end_z=-20.0, end_r=20.0, angle=135.0)])
    cut = 3.0 / math.tan(math.radians(135.0 / 2))  # inside angle 135 degrees
    assert path[0].end == pytest.approx((-10.0 + cut, 10.0))
    assert path[1].clockwise is True  # a fillet on the outside, cut towards the chuck


@pytest.mark.parametrize(
    ("legs", "says"),
    [
        ([Leg(end_z=-18.0, chamfer=2.0)], "no straight move follows"),
        ([Leg(angle=150.0)], "needs a following line"),
        ([Leg(angle=150.0), Leg(end_z=-5.0)], "needs a following line"),
        ([Leg(angle=150.0), Leg(end_z=-5.0, end_r=20.0, angle=-30.0)], "parallel"),
        ([Leg(end_z=-1.0, chamfer=5.0), Leg(end_r=20.0)], "3 mm long, the corners take 5 mm"),
        ([Leg(end_z=-18.0, chamfer=2.0), Leg(end_r=11.0)], "1 mm long, the corners take 2 mm"),
        ([Leg(end_z=-18.0, rounding=2.0), Leg(end_r=13.0, rounding=2.0), Leg(end_z=-40.0)], "3 mm long"),
        ([Leg(end_z=-18.0, rounding=2.0), Leg(end_z=-40.0)], "no corner to break"),
        ([Leg(end_z=-18.0, rounding=2.0), Leg()], "no length"),
        ([Leg(end_r=20.0, angle=180.0)], "Z cannot follow"),
        ([Leg(end_r=20.0, angle=0.0)], "Z cannot follow"),
        ([Leg(end_z=-5.0, angle=90.0)], "X cannot follow"),
        ([Leg(end_z=-5.0, angle=270.0)], "X cannot follow"),
        ([Leg(end_z=-18.0, chamfer=2.0, turn=-1), Leg(end_r=20.0)], "sign of the corner word"),
        ([Leg(end_z=-18.0, chamfer=2.0, turn=1), Leg(end_r=20.0, end_z=-25.0)], "pure Z and a pure X"),
    ],
)
def test_faults(legs: list[Leg], says: str) -> None:
    with pytest.raises(CycleFault) as caught:
        draw(Point(2.0, 10.0), legs)
    assert caught.value.topic == "cycle-corner"
    assert says in caught.value.message


def test_strokes_carry_the_line_of_their_leg() -> None:
    path = draw(Point(2.0, 10.0), [Leg(end_z=-20.0, chamfer=2.0, line=7, block="N70"), Leg(end_r=20.0, line=8)])
    assert [(stroke.line, stroke.block) for stroke in path] == [(7, "N70"), (7, "N70"), (8, None)]


@settings(deadline=None)
@given(
    first=st.floats(-170.0, 170.0), turn=st.floats(10.0, 170.0), sense=st.sampled_from([-1, 1]),
    radius=st.floats(0.1, 2.0),
)
def test_rounding_touches_both_sides(first: float, turn: float, sense: int, radius: float) -> None:
    # a circle tangent to two lines: its centre lies one radius off both, its ends at right angles below it
    one, two = math.radians(first), math.radians(first + sense * turn)
    corner = Point(100.0 * math.cos(one), 100.0 * math.sin(one))
    last = Point(corner.z + 100.0 * math.cos(two), corner.r + 100.0 * math.sin(two))
    path = draw(Point(0.0, 0.0), [Leg(corner.z, corner.r, rounding=radius), Leg(last.z, last.r)])
    begin, arc = path[0].end, path[1]
    assert arc.centre is not None
    for point, direction in ((begin, one), (arc.end, two)):
        across = (arc.centre.z - point.z, arc.centre.r - point.r)
        assert math.hypot(*across) == pytest.approx(radius, abs=1e-9)
        assert across[0] * math.cos(direction) + across[1] * math.sin(direction) == pytest.approx(0.0, abs=1e-9)
    assert arc.clockwise == (sense < 0)


# found by the second statement (tests/interpret/reference): distances were taken twice from a block with a corner word
@pytest.mark.parametrize(
    ("system", "blocks"),
    [
        ("A", "G1 U20.,C1. F.1\nW-20.,R2.\nU10."),
        ("B", "G91 G1 X20.,C1. F.1\nZ-20.,R2.\nX10."),
        ("A", "G1 X20.,C1. F.1\nZ-20.,R2.\nX30."),
    ],
)
def test_distances_to_broken_corners(system: str, blocks: str) -> None:
    found = carried_out(f"G97 S500 M3\nG0 X0. Z0.\n{blocks}", system=system)
    assert rows(found)[1:] == [
        ("F", 18.0, 0.0),
        ("F", 20.0, -1.0),
        ("F", 20.0, -18.0),
        ("CW", 24.0, -20.0),
        ("F", 30.0, -20.0),
    ]


def test_a_distance_from_a_corner_that_an_angle_gives() -> None:
    found = carried_out("G97 S500 M3\nG0 X20. Z0.\nG1 X40.,A135.,C1. F.1\nW-10.")
    assert rows(found)[-1] == ("F", 40.0, pytest.approx(-20.0))  # 10 mm of radius at 45 degrees, then 10 mm more
