"""Edge life laws against each other; windows against the table of the trade."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.mechanics.life import (
    crater_limit,
    extended_taylor_life,
    extended_taylor_speed,
    size_drift,
    taylor_constants,
    taylor_fit,
    taylor_life,
    taylor_speed,
)
from auditor.mechanics.windows import (
    minimum_chip,
    roughing_feed,
    smallest_feed,
    smallest_finishing_depth,
    usable_edge,
)

exponent = st.floats(0.1, 0.6)


@given(st.floats(20.0, 600.0), st.floats(100.0, 900.0), exponent)
def test_speed_and_life_undo_each_other(vc, C, n):
    assert float(taylor_speed(taylor_life(vc, C, n), C, n)) == pytest.approx(vc, rel=1e-9)


@given(st.floats(100.0, 900.0), exponent)
def test_fit_finds_the_constants_it_was_made_from(C, n):
    lives = np.array([5.0, 12.0, 40.0])
    fitted = taylor_fit(taylor_speed(lives, C, n), lives)
    assert fitted == pytest.approx((C, n), rel=1e-9)


def test_fit_needs_two_different_lives():
    for speeds, lives in (([100.0], [10.0]), ([100.0, 120.0], [10.0, 10.0]), ([100.0, 120.0], [10.0])):
        with pytest.raises(ValueError, match="two different"):
            taylor_fit(speeds, lives)


@given(st.floats(20.0, 300.0), st.floats(0.05, 0.6), st.floats(0.2, 5.0))
def test_extended_law_undoes_itself_and_is_taylors_at_feed_and_depth_one(vc, f, ap):
    T = extended_taylor_life(vc, f, ap, 420.0, 0.2, 0.2, 0.15)
    assert float(extended_taylor_speed(T, f, ap, 420.0, 0.2, 0.2, 0.15)) == pytest.approx(vc, rel=1e-9)
    assert float(extended_taylor_life(vc, 1.0, 1.0, 420.0, 0.2, 0.2, 0.15)) == pytest.approx(
        float(taylor_life(vc, 420.0, 0.2)), rel=1e-9
    )


def test_life_of_high_speed_steel_falls_with_the_published_powers():
    """T ~ v^-7 f^-4 d^-1 (n 0.15, y 0.6, x 0.15; rounded in print)."""
    base = extended_taylor_life(30.0, 0.2, 2.0, 56.0, 0.15, 0.6, 0.15)
    for changed, power in (((60.0, 0.2, 2.0), 7.0), ((30.0, 0.4, 2.0), 4.0), ((30.0, 0.2, 4.0), 1.0)):
        ratio = float(base / extended_taylor_life(*changed, 56.0, 0.15, 0.6, 0.15))
        assert np.log2(ratio) == pytest.approx(power, abs=0.4)


def test_taylor_exponent_of_one_and_unknown_materials_are_refused():
    with pytest.raises(ValueError, match="below 1"):
        taylor_life(100.0, 300.0, 1.0)
    with pytest.raises(ValueError, match="plain carbon tool steel"):
        taylor_constants("flint")


def test_drift_and_crater():
    """A land of 0.3 mm at 6 deg sets the edge back by 0.0315 mm (tangent by hand); ISO 3685 crater at f 0.2: 0.12."""
    assert float(size_drift(0.3, 6.0)) == pytest.approx(2.0 * 0.03153, abs=1e-4)
    assert float(crater_limit(0.2)) == pytest.approx(0.12)


TABLE = {0.4: (0.2, 0.25), 0.8: (0.4, 0.5), 1.2: (0.6, 0.7), 1.6: (0.8, 1.0), 2.4: (1.2, 1.2)}


@pytest.mark.parametrize("radius", TABLE)
def test_roughing_feed_is_the_table_of_the_trade(radius):
    """Common practice, largest roughing feed by corner radius; in brackets what is sometimes allowed."""
    usual, at_most = TABLE[radius]
    assert usual == pytest.approx(float(roughing_feed(radius)))
    assert float(roughing_feed(radius)) <= at_most


def test_windows_of_land_depth_and_edge():
    """Common practice: half the land but 0.05; a third of the corner; two thirds of a C edge, a quarter of a V."""
    assert smallest_feed([0.0, 0.2]).tolist() == [0.05, 0.1]
    assert float(smallest_finishing_depth(1.2)) == pytest.approx(0.4)
    assert float(usable_edge("C", 12.0)) == pytest.approx(8.0)
    assert float(usable_edge("V", 16.0)) == pytest.approx(4.0)
    assert float(usable_edge("W", 8.0)) == pytest.approx(4.0)
    arc = np.arccos(1.0 - 0.4 * 12.0 / 6.0) * 6.0  # round insert of 12 mm at a depth of 0.4 of its diameter
    assert float(usable_edge("R", 12.0)) == pytest.approx(arc, rel=1e-3)
    with pytest.raises(ValueError, match="insert shape 'Q'"):
        usable_edge("Q", 10.0)


@given(st.floats(0.0, 0.1))
def test_minimum_chip_is_thinner_than_the_edge_is_round(radius):
    assert float(minimum_chip(radius)) <= radius
