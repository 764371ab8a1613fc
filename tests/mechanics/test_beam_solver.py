"""Bending of stepped parts against a general-purpose frame solver (anastruct, from the package index), within 0.1 %."""

from __future__ import annotations

from itertools import pairwise

import numpy as np
import pytest
from anastruct import SystemElements

from auditor.mechanics.bending import Supports, second_moment, stepped_compliance

MODULUS = 210_000.0  # N/mm2
STIFF = 1e12  # N, so that lengthening plays no part

PARTS = {  # section lengths (mm) and diameters (mm), from the chuck outwards
    "plain": ([120.0], [20.0]),
    "two steps": ([60.0, 60.0], [30.0, 20.0]),
    "slender end": ([40.0, 25.0, 60.0], [50.0, 28.0, 14.0]),
    "waist": ([30.0, 20.0, 50.0, 35.0], [40.0, 18.0, 32.0, 24.0]),
}
HOLDINGS = ("chuck", "chuck+tailstock", "centres")


def frame_compliance(lengths: list[float], diameters: list[float], load: float, holding: str) -> float:
    """Deflection at the load for 1 N, from the frame solver; a node at every step and at the load."""
    ends = np.cumsum(lengths)
    nodes = sorted({0.0, *ends.tolist(), load})
    frame = SystemElements()
    for left, right in pairwise(nodes):
        diameter = diameters[int(np.searchsorted(ends, 0.5 * (left + right)))]
        frame.add_element([[left, 0.0], [right, 0.0]], EA=STIFF, EI=MODULUS * np.pi / 64.0 * diameter**4)
    last = len(nodes)
    if holding == "centres":
        frame.add_support_hinged(1)
    else:
        frame.add_support_fixed(1)
    if holding != "chuck":
        frame.add_support_roll(last, direction="x")
    at = nodes.index(load) + 1
    frame.point_load(at, Fy=-1.0)
    frame.solve()
    return abs(float(frame.get_node_results_system(at)["uy"]))


@pytest.mark.filterwarnings("ignore")  # the solver's own
@pytest.mark.parametrize("holding", HOLDINGS)
@pytest.mark.parametrize("part", PARTS)
def test_stepped_part_agrees_with_a_frame_solver(part: str, holding: str) -> None:
    lengths, diameters = PARTS[part]
    total = sum(lengths)
    rigidity = MODULUS * second_moment(diameters)
    shares = (0.25, 0.55, 0.8) if holding != "chuck" else (0.25, 0.55, 1.0)
    for load in (share * total for share in shares):
        ours = float(stepped_compliance(np.cumsum(lengths), rigidity, load, Supports(holding)))  # type: ignore[arg-type]
        assert ours == pytest.approx(frame_compliance(lengths, diameters, load, holding), rel=1e-3)
