"""Rapids that touch: straight through stock, on the bent path of independent axes, and close to raw stock."""

from __future__ import annotations

import math
from dataclasses import replace

import pytest

from auditor.declared.model import Point
from tests.simulate.workshop import KNIFE, MACHINE, Path, bar, cut, shaped


def test_a_rapid_through_stock_is_contact_and_takes_the_stock_along() -> None:
    simulation = cut(Path(5.0, 27.0, tool=KNIFE.number).rapid(-10.0, 27.0), bar())
    contact, = simulation.contacts
    assert (contact.kind, contact.move) == ("rapid", 0)
    assert contact.depth == pytest.approx(3.0, abs=1e-6)
    assert (contact.z, contact.r) == pytest.approx((0.0, 27.0), abs=1e-5)
    assert simulation.removed[0] == pytest.approx(math.pi * (900.0 - 729.0) * 10.0, rel=1e-9)


def test_a_rapid_in_air_and_one_along_a_cut_surface_are_none() -> None:
    path = Path(5.0, 27.0).to(-20.0, 27.0).rapid(5.0, 27.0).rapid(50.0, 60.0)
    assert [contact.kind for contact in cut(path, bar()).contacts] == []


def test_the_bent_path_touches_where_the_straight_one_misses() -> None:
    """Both axes at the same rate: 12 mm in each, then 38 mm in Z alone at the lower radius."""
    machine = replace(MACHINE, rapid_x=12_000.0, rapid_z=12_000.0)
    shoulder = shaped((0.0, 0.0), (-100.0, 0.0), (-100.0, 30.0), (-30.0, 30.0), (-30.0, 10.0), (0.0, 10.0))
    path = Path(-28.0, 32.0, tool=KNIFE.number).rapid(22.0, 20.0, dogleg=True)
    assert [contact.kind for contact in cut(path, shoulder, machine=machine).contacts] == []
    # towards the chuck: 12 mm down beside the shoulder's foot, then along Z into it
    into = Path(5.0, 32.0, tool=KNIFE.number).rapid(-45.0, 28.0, dogleg=True)
    straight = cut(Path(5.0, 32.0, tool=KNIFE.number).rapid(-45.0, 31.0, dogleg=False), shoulder, machine=machine)
    assert [contact.kind for contact in straight.contacts] == []
    kinds = {contact.kind for contact in cut(into, shoulder, machine=machine).contacts}
    assert "dogleg" in kinds


def test_only_the_bent_path_touches() -> None:
    """A boss of radius 20 and 10 mm long: over it on the straight line, into it when X is home first."""
    machine = replace(MACHINE, rapid_x=12_000.0, rapid_z=12_000.0)
    boss = shaped((0.0, 0.0), (-100.0, 0.0), (-100.0, 10.0), (-10.0, 10.0), (-10.0, 20.0), (0.0, 20.0))
    path = Path(5.0, 32.0, tool=KNIFE.number).rapid(-40.0, 12.0, dogleg=True)
    # straight: at z = -10 the tip is still at r = 32 - 20 * 15/45 = 25.3; bent: 20 mm of each, then along r = 12;
    # on the way z = -10 is passed at r = 17, inside the boss
    simulation = cut(path, boss, machine=machine)
    contact, = [contact for contact in simulation.contacts if contact.kind != "near"]
    assert contact.kind == "dogleg"
    assert contact.depth > 1.0
    assert simulation.removed[0] == pytest.approx(0.0, abs=1e-9)
    straight = cut(Path(5.0, 32.0, tool=KNIFE.number).rapid(-40.0, 12.0), boss, machine=machine)
    assert [contact.kind for contact in straight.contacts if contact.kind != "near"] == []


@pytest.mark.parametrize(("distance", "kinds"), [(0.4, ["near"]), (2.0, [])])
def test_a_rapid_that_ends_close_to_raw_stock_is_noted(distance: float, kinds: list[str]) -> None:
    simulation = cut(Path(50.0, 25.0, tool=KNIFE.number).rapid(distance, 25.0), bar())
    assert [contact.kind for contact in simulation.contacts] == kinds
    assert all(contact.depth == pytest.approx(distance, abs=1e-9) for contact in simulation.contacts)


def test_close_to_a_turned_surface_is_everyday() -> None:
    path = Path(2.0, 27.0, tool=KNIFE.number).to(-20.0, 27.0).to(-20.0, 32.0).rapid(10.0, 40.0).rapid(-5.0, 27.3)
    assert [contact.kind for contact in cut(path, bar()).contacts] == []


def test_drawing_away_from_raw_stock_is_no_approach() -> None:
    simulation = cut(Path(0.2, 25.0, tool=KNIFE.number).rapid(0.6, 25.0), bar())
    assert simulation.contacts == ()


def test_a_first_rapid_from_nowhere_must_not_end_inside_the_stock() -> None:
    """No tool change position declared: the way is not known, its end is."""
    for end, kinds in ((Point(-20.0, 25.0), ["rapid"]), (Point(2.0, 25.0), [])):
        path = Path(0.0, 0.0, tool=KNIFE.number).rapid(*end)
        path.moves[0] = replace(path.moves[0], start_z=None, start_r=None)
        simulation = cut(path.to(-30.0, 25.0), bar())
        assert [contact.kind for contact in simulation.contacts] == kinds
        assert all(contact.depth > 4.9 for contact in simulation.contacts)
        # the tool stands in a hole of its own shape; the cut begins there
        assert (simulation.removed[0] > 0.0) == bool(kinds)
