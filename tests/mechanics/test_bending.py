"""Stepped beams against finite elements, closed forms and series; nothing here repeats the law's integrals."""

from __future__ import annotations

from itertools import pairwise

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.mechanics.bending import (
    Supports,
    cantilever_compliance,
    centres_compliance,
    diameter_error,
    fixed_pinned_compliance,
    ring_lobing,
    second_moment,
    stepped_compliance,
    whipping_speed,
)

STEEL = 210_000.0
ENDS = np.array([40.0, 90.0, 150.0])
SECTIONS = STEEL * np.asarray(second_moment([40.0, 25.0, 30.0], [0.0, 10.0, 12.0]))
POSITIONS = np.array([0.0, 20.0, 40.0, 66.0, 90.0, 120.0, 150.0])


def element(length: float, rigidity: float) -> np.ndarray:
    """Stiffness of a Bernoulli beam element: deflection and slope at either end (textbook of finite elements)."""
    a, b = 12.0 * rigidity / length**3, 6.0 * rigidity / length**2
    c, d = 4.0 * rigidity / length, 2.0 * rigidity / length
    return np.array([[a, b, -a, b], [b, c, -b, d], [-a, -b, a, -b], [b, d, -b, c]])


def finite_elements(ends: np.ndarray, rigidity: np.ndarray, load: float, supports: Supports) -> float:
    """Deflection at the load by the direct stiffness method, one node at every step and at the load."""
    nodes = np.unique(np.concatenate([[0.0], ends, [load]]))
    matrix = np.zeros((2 * len(nodes), 2 * len(nodes)))
    for i, (low, high) in enumerate(pairwise(nodes)):
        section = int(np.searchsorted(ends, 0.5 * (low + high)))
        matrix[2 * i : 2 * i + 4, 2 * i : 2 * i + 4] += element(high - low, rigidity[section])
    stiff = 1e14  # stands for a rigid support
    matrix[0, 0] += min(supports.slide, stiff)
    if supports.holding != "centres":
        matrix[1, 1] += min(supports.tilt, stiff)
    if supports.holding != "chuck":
        matrix[-2, -2] += min(supports.tail, stiff)
    force = np.zeros(2 * len(nodes))
    at = int(np.argmin(np.abs(nodes - load)))
    force[2 * at] = 1.0
    return float(np.linalg.solve(matrix, force)[2 * at])


@pytest.mark.parametrize("holding", ["chuck", "chuck+tailstock", "centres"])
@pytest.mark.parametrize("give", [{}, {"slide": 1.5e5, "tilt": 4e8, "tail": 3e4}], ids=["rigid", "yielding"])
def test_stepped_part_against_finite_elements(holding, give):
    supports = Supports(holding, **give)
    expected = [finite_elements(ENDS, SECTIONS, at, supports) for at in POSITIONS]
    assert stepped_compliance(ENDS, SECTIONS, POSITIONS, supports) == pytest.approx(expected, rel=2e-4, abs=2e-12)


@pytest.mark.parametrize(
    ("holding", "closed"),
    [
        ("chuck", lambda a: cantilever_compliance(a, STEEL, second_moment(25.0))),
        ("chuck+tailstock", lambda a: fixed_pinned_compliance(a, 150.0, STEEL, second_moment(25.0))),
        ("centres", lambda a: centres_compliance(a, 150.0, STEEL, second_moment(25.0))),
    ],
)
def test_a_plain_bar_written_in_steps_is_a_plain_bar(holding, closed):
    rigidity = np.full(3, STEEL * float(second_moment(25.0)))
    assert stepped_compliance(ENDS, rigidity, POSITIONS, Supports(holding)) == pytest.approx(
        closed(POSITIONS), rel=1e-9, abs=1e-18
    )


def test_tailstock_that_gives_endlessly_is_no_tailstock():
    loose = stepped_compliance(ENDS, SECTIONS, POSITIONS, Supports("chuck+tailstock", tail=1e-9))
    assert loose == pytest.approx(stepped_compliance(ENDS, SECTIONS, POSITIONS), rel=1e-6)


def test_a_position_without_figure_has_no_compliance():
    out = stepped_compliance(ENDS, SECTIONS, [np.nan, 150.0], Supports("chuck+tailstock"))
    assert np.isnan(out[0])
    assert out[1] == pytest.approx(0.0, abs=1e-15)


def test_a_thin_neck_far_out_bends_as_its_own_integral_says():
    """Nearly parted off: 2 mm neck, 3 mm wide, 190 mm from the jaws of a 40 mm bar, load just beyond (sum by hand)."""
    thick, thin = STEEL * float(second_moment(40.0)), STEEL * float(second_moment(2.0))
    own = ((200.0**3 - 10.0**3) / 3.0 + (7.0**3) / 3.0) / thick + (10.0**3 - 7.0**3) / 3.0 / thin
    assert float(stepped_compliance([190.0, 193.0, 200.0], [thick, thin, thick], 200.0)) == pytest.approx(own, rel=1e-9)


def test_load_inside_the_jaws_bends_nothing_and_beyond_the_end_is_refused():
    assert stepped_compliance(ENDS, SECTIONS, [-5.0, 0.0]).tolist() == [0.0, 0.0]
    with pytest.raises(ValueError, match="beyond the end of the part at 150 mm"):
        stepped_compliance(ENDS, SECTIONS, 151.0)


@pytest.mark.parametrize(("ends", "rigidity"), [([50.0, 40.0], [1e9, 1e9]), ([50.0], [1e9, 1e9])])
def test_sections_that_do_not_rise_or_match_are_refused(ends, rigidity):
    with pytest.raises(ValueError, match="must rise"):
        stepped_compliance(ends, rigidity, 10.0)


def test_a_support_of_no_stiffness_is_refused():
    with pytest.raises(ValueError, match="stiffness of a support"):
        Supports("chuck", slide=0.0)


def test_a_bore_as_large_as_the_bar_is_refused():
    with pytest.raises(ValueError, match="bore must be smaller"):
        second_moment(20.0, 20.0)


@given(st.floats(5.0, 149.0), st.floats(0.1, 1.0))
def test_a_tailstock_never_makes_it_softer(position, thinner):
    rigidity = SECTIONS * np.array([1.0, thinner, 1.0])
    held = float(stepped_compliance(ENDS, rigidity, position, Supports("chuck+tailstock")))
    free = float(stepped_compliance(ENDS, rigidity, position))
    assert 0.0 <= held <= free
    assert free >= float(stepped_compliance(ENDS, SECTIONS, position)) * (1.0 - 1e-9)


def test_positions_may_have_any_shape():
    grid = np.linspace(1.0, 149.0, 12).reshape(3, 4)
    assert stepped_compliance(ENDS, SECTIONS, grid).shape == (3, 4)


def test_diameter_error_against_the_exact_circle():
    """Tip on radius d/2, work pushed away by y and down by y_t: the radius it cuts is the distance to the axis."""
    y, y_t, d = 0.02, 0.1, 30.0
    assert float(diameter_error(y, y_t, d)) == pytest.approx(2.0 * np.hypot(d / 2.0 + y, y_t) - d, rel=2e-3)


def test_whipping_speed_by_the_frequency_equation_of_a_cantilever():
    """First root of cos x cosh x = -1 is 1.8751; omega = x^2 sqrt(EI / (rho A L^4)), written out in SI."""
    d, length, e, rho = 0.010, 1.0, 210e9, 7850.0
    omega = 1.87510407**2 * np.sqrt(e * np.pi * d**4 / 64.0 / (rho * np.pi * d**2 / 4.0 * length**4))
    assert float(whipping_speed(1000.0, 10.0, STEEL, 7.85)) == pytest.approx(omega * 30.0 / np.pi, rel=1e-4)
    assert float(whipping_speed(1000.0, 10.0, STEEL, 7.85)) == pytest.approx(434.0, abs=0.5)


def test_ring_lobing_by_fourier_series():
    """Thin ring that does not stretch, three radial forces: w = P R^3/(pi EI) sum 3 cos(n t)/(n^2 - 1)^2, n = 3, 6 …"""
    k = 3.0 * np.arange(1, 200)
    lobes = 3.0 / (np.pi * (k**2 - 1.0) ** 2)
    under, between = lobes.sum(), (lobes * np.cos(k * np.pi / 3.0)).sum()
    force, radius, moment = 3000.0, 40.0, 208.333
    expected = (under - between) * force * radius**3 / (STEEL * moment)
    assert float(ring_lobing(force, radius, STEEL, moment)) == pytest.approx(expected, rel=0.01)
