"""Outlines of every kind of tool, judged by the corner geometry of ISO 1832 and ISO 5608."""

from __future__ import annotations

import math
from dataclasses import replace

import pytest

from auditor.declared.model import Tool
from tests.simulate.judge import corner_edge
from tests.simulate.workshop import ROUGHER, Path, bar, cut, deepest, edge_length, shaped, stretches_at

ROUND = Tool(1, "round", "turning", shape="R", nose_radius=5.0)
TRIGON = Tool(1, "trigon", "turning", shape="W", nose_radius=0.8, cutting_edge_angle=95.0, included_angle=80.0,
              edge_length=8.69)  # fmt: skip
END = Tool(1, "end style", "turning", shape="S", nose_radius=0.8, cutting_edge_angle=75.0, included_angle=90.0,
           edge_faces_end=True, edge_length=12.7)  # fmt: skip
BLADE = Tool(1, "blade", "grooving", nose_radius=0.2, width=3.0)


@pytest.mark.parametrize(
    ("tool", "length"),
    [(ROUND, 5.0 * math.acos(1.0 - 2.0 / 5.0)), (TRIGON, corner_edge(2.0, 0.8, 95.0))],
)
def test_edge_in_a_cylinder_pass(tool: Tool, length: float) -> None:
    simulation = cut(Path(2.0, 28.0).to(-30.0, 28.0), bar(), [tool])
    assert deepest(simulation, 0) == pytest.approx(2.0, abs=1e-9)
    (low, high), = stretches_at(simulation, 0, 20.0)
    assert edge_length(simulation, 0, low, high) == pytest.approx(length, abs=3e-3)


def test_an_end_style_has_its_edge_angle_against_the_cross_feed() -> None:
    simulation = cut(Path(-2.0, 32.0).to(-2.0, -1.0), bar(), [END])
    (low, high), = stretches_at(simulation, 0, 15.0)
    assert deepest(simulation, 0) == pytest.approx(2.0, abs=1e-9)
    assert edge_length(simulation, 0, low, high) == pytest.approx(corner_edge(2.0, 0.8, 75.0), abs=3e-3)
    assert simulation.removed[0] == pytest.approx(math.pi * 900.0 * 2.0, rel=1e-5)


def test_a_left_hand_tool_turns_away_from_the_chuck() -> None:
    relief = shaped((0.0, 0.0), (-100.0, 0.0), (-100.0, 27.0), (-40.0, 27.0), (-40.0, 30.0), (0.0, 30.0))
    simulation = cut(Path(-45.0, 28.0).to(2.0, 28.0), relief, [replace(ROUGHER, hand="left", tip=4)])
    assert deepest(simulation, 0) == pytest.approx(2.0, abs=1e-9)
    (low, high), = stretches_at(simulation, 0, 20.0)
    assert edge_length(simulation, 0, low, high) == pytest.approx(corner_edge(2.0, 0.8, 95.0), abs=3e-3)


@pytest.mark.parametrize("end", [-10.0, -20.0])
def test_a_blade_turns_sideways_with_its_flank(end: float) -> None:
    """Either way: plunge beside, then the corner and the flank take the ring of 2 mm at 10 mm length."""
    path = Path(-30.0 - end, 31.0).to(-30.0 - end, 28.0).to(end, 28.0)
    simulation = cut(path, bar(), [BLADE])
    assert deepest(simulation, 1) == pytest.approx(2.0, abs=1e-9)
    # what the plunge left in its corner and the end leaves in its own are alike: a ring of exactly 10 mm
    assert simulation.removed[1] == pytest.approx(math.pi * (900.0 - 784.0) * 10.0, rel=1e-9)
    (low, high), = stretches_at(simulation, 1, 5.0)
    assert edge_length(simulation, 1, low, high) == pytest.approx(0.2 * math.pi / 2.0 + 1.8, abs=2e-3)


def test_the_tip_number_says_which_point_is_programmed() -> None:
    """Imaginary tips of ISO controls: nose centre plus radius times a vector of signs (Z, X)."""
    vectors = {0: (0, 0), 3: (-1, -1), 7: (-1, 0), 8: (0, -1), 9: (0, 0)}
    for tip, (z, r) in vectors.items():
        # the nose centre runs at radius 29: the surface lies a nose radius below, whatever the programmed point
        path = Path(2.0 + 0.8 * z, 29.0 + 0.8 * r).to(-20.0 + 0.8 * z, 29.0 + 0.8 * r)
        simulation = cut(path, bar(), [replace(ROUGHER, tip=tip)])
        assert deepest(simulation, 0) == pytest.approx(1.8, abs=1e-9), tip


def test_a_thread_in_a_bore() -> None:
    """V of 0.5 mm with a round tip of 0.1: (t + r)^2 tan 30 less what the tip lacks of the apex."""
    inside = Tool(1, "inside thread", "threading", nose_radius=0.1, cutting_edge_angle=60.0, included_angle=60.0, tip=6)
    simulation = cut(Path(6.0, 10.5).thread(-20.0, 10.5, 2.0), bar(bore=20.0), [inside])
    samples = simulation.samples
    area = 0.6**2 * math.tan(math.radians(30.0)) - 0.01 * (math.sqrt(3.0) - math.pi / 3.0)
    chip = samples.infeed * (samples.high - samples.low)
    assert chip[2:-2] == pytest.approx([area] * (len(chip) - 4), rel=5e-3)
