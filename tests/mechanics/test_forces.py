"""Cutting force and thrust: against sums over slices, published ratios, rival laws; and how they must grow."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.mechanics import energy_tables, power_law
from auditor.mechanics.chip import (
    chord_angle,
    chord_through,
    engaged_length,
    equivalent_thickness,
    largest_thickness,
    mean_thickness,
    nose_angle,
    straight_length,
)
from auditor.mechanics.factors import (
    force_scatter,
    operation_factor,
    rake_factor,
    speed_factor,
    tool_material_factor,
)
from auditor.mechanics.kienzle import (
    cutting_force,
    edge_force_coefficients,
    edge_form_force,
    nose_cutting_force,
    specific_force,
)
from auditor.mechanics.thrust import (
    bounded_thrust,
    friction_angle,
    friction_thrust,
    inclination_factor,
    pair_thrust,
    resolve_thrust,
    resultant_thrust,
    thrust_rake_factor,
)
from tests.published.rows import lines

KC11, MC = 1659.0, 0.21  # Ck45N, Koenig and Essel as reprinted by Klocke
SETS = [line for line in lines("material_kienzle") if line["kf11_N_mm2"]]

depth = st.floats(0.02, 5.0)
feed = st.floats(0.02, 0.5)
nose = st.floats(0.1, 2.4)
edge = st.floats(20.0, 115.0)
rake = st.floats(-40.0, 40.0)


def sliced(ap: float, f: float, r: float, kr: float) -> tuple[float, float, float]:
    """Edge walked in 20,000 slices of equal depth: length, section and force summed (mm, mm2, N)."""
    y = (np.arange(20_000) + 0.5) * ap / 20_000
    k = np.radians(kr)
    theta = np.where(y < r * (1.0 - np.cos(k)), np.arccos(np.clip(1.0 - y / r, -1.0, 1.0)), k)
    db = ap / 20_000 / np.sin(theta)
    h = f * np.sin(theta)
    return float(db.sum()), float((db * h).sum()), float((KC11 * h ** (1.0 - MC) * db).sum())


@given(depth, feed, nose, st.floats(20.0, 90.0))
def test_engaged_edge_and_force_are_those_of_its_slices(ap, f, r, kr):
    length, section, force = sliced(ap, f, r, kr)
    assert float(engaged_length(ap, r, kr)) == pytest.approx(length, rel=0.01)
    assert section == pytest.approx(ap * f, rel=1e-9)
    assert float(nose_cutting_force(KC11, MC, ap, f, r, kr)) == pytest.approx(force, rel=3e-3)


@given(depth, feed, nose, edge)
def test_mean_thickness_gives_the_force_within_the_published_margin(ap, f, r, kr):
    """Kienzle at h_m on the whole edge: never less, at most (2 - mc) / 2^(1 - mc) more (thickness rising from zero)."""
    length = engaged_length(ap, r, kr)
    at_mean = float(cutting_force(KC11, MC, mean_thickness(ap * f, length), length))
    integrated = float(nose_cutting_force(KC11, MC, ap, f, r, kr))
    assert integrated <= at_mean * (1.0 + 1e-6)
    assert at_mean / integrated <= (2.0 - MC) / 2.0 ** (1.0 - MC) + 1e-6


@given(depth, depth, feed, nose, edge)
def test_force_rises_with_depth(ap, more, f, r, kr):
    small, large = nose_cutting_force(KC11, MC, [ap, ap + more], f, r, kr)
    assert small < large


@given(depth, feed, st.floats(0.001, 0.3), nose, edge)
def test_force_rises_with_feed_and_specific_force_falls(ap, f, more, r, kr):
    small, large = nose_cutting_force(KC11, MC, ap, [f, f + more], r, kr)
    assert small < large
    assert large / (f + more) < small / f


@given(rake, st.floats(0.0, 30.0))
def test_force_falls_with_rake(g, more):
    """Never rises, and falls wherever the factor is not held."""
    blunt, sharp = rake_factor([g, g + more], 6.0)
    assert sharp <= blunt
    assert 0.70 <= sharp <= blunt <= 1.40


@given(rake, st.floats(0.0, 30.0))
def test_thrust_falls_with_rake(g, more):
    for branch in (
        friction_thrust(1000.0, 32.0, [g, g + more], 6.0),
        pair_thrust(900.0, 0.4, 0.2, 1.0, [g, g + more], 6.0),
        resultant_thrust(521.0, 0.49, 309.0, 0.40, 0.2, 1.0, [g, g + more], 6.0),
    ):
        assert branch[1] <= branch[0]


@given(st.floats(1.0, 1000.0), st.floats(0.0, 800.0))
def test_force_falls_with_speed(vc, more):
    """A thousandth of a step at the joint of the two published branches is allowed."""
    slow, fast = speed_factor([vc, vc + more])
    assert fast <= slow * 1.0005


def test_speed_factor_is_held_outside_its_range():
    assert speed_factor([0.0, 5.0, 20.0]) == pytest.approx(2.023 / 20.0**0.153)
    assert speed_factor([600.0, 2000.0]) == pytest.approx(1.380 / 600.0**0.07)
    assert float(speed_factor(100.0)) == pytest.approx(1.0, abs=5e-4)


@given(st.floats(0.0, 0.3), st.floats(0.05, 0.45))
def test_edge_form_touches_the_curve_and_stays_on_one_side_of_it(h, mc):
    """A tangent to a concave curve lies above it; from 0.1 mm on it is the curve."""
    law, form = float(cutting_force(KC11, mc, h, 1.0)), float(edge_form_force(KC11, mc, h, 1.0))
    assert form >= law - 1e-9
    if h >= 0.1:
        assert form == pytest.approx(law)


def test_edge_form_has_the_slope_of_the_curve():
    kt, ke = edge_force_coefficients(KC11, MC)
    step = 1e-6
    slope = (cutting_force(KC11, MC, 0.1 + step, 1.0) - cutting_force(KC11, MC, 0.1 - step, 1.0)) / (2.0 * step)
    assert float(kt) == pytest.approx(float(slope), rel=1e-6)
    assert float(kt * 0.1 + ke) == pytest.approx(float(cutting_force(KC11, MC, 0.1, 1.0)))


def test_no_chip_no_force_and_no_specific_force():
    assert cutting_force(KC11, MC, [0.0, 0.1], [1.0, 0.0]).tolist() == [0.0, 0.0]
    assert np.isnan(specific_force(KC11, MC, 0.0))
    assert np.isnan(equivalent_thickness(0.0, 0.0, 0.2))
    assert np.isnan(mean_thickness(0.0, 0.0))


# ---- thrust


def catalogue(line: dict[str, str], h: float) -> tuple[float, float]:
    """Cutting force and thrust per mm of a printed row at its own rake."""
    fc = cutting_force(float(line["kc11_N_mm2"]), float(line["mc"]), h, 1.0)
    figures = (float(line[key]) for key in ("kf11_N_mm2", "mf", "kp11_N_mm2", "mp"))
    return float(fc), float(resultant_thrust(*figures, h, 1.0, 6.0, 6.0))


@pytest.mark.parametrize("line", SETS, ids=lambda line: line["row"])
def test_thrust_ratio_of_the_catalogue_at_h_02(line):
    """Fn/Fc of 0.35 to 0.60 over the whole Koenig and Essel set, worked out from the printed constants."""
    fc, fn = catalogue(line, 0.2)
    assert 0.345 <= fn / fc <= 0.605


def test_edge_form_tames_the_thin_chip():
    """E360: the plain powers run to Fn/Fc 1.46 at 0.05 mm (worked out by hand); the edge form stays well below."""
    (line,) = [line for line in SETS if line["row"].startswith("E360")]
    plain = np.hypot(228.0 * 0.05**-0.07, 152.0 * 0.05**0.10)
    fc, fn = catalogue(line, 0.05)
    assert plain / fc == pytest.approx(1.46, abs=0.01)
    assert fn < plain
    assert fn / fc < 1.45


def test_thrust_is_bounded_by_the_cutting_force():
    assert bounded_thrust([1.0, 700.0, 9000.0], 1000.0).tolist() == [350.0, 700.0, 2000.0]
    assert friction_thrust(1000.0, 32.0, [60.0, -70.0], 6.0).tolist() == pytest.approx([350.0, 2000.0])


def test_thrust_factors_are_never_negative_and_held():
    assert thrust_rake_factor([6.0, 60.0], 6.0).tolist() == [1.0, 0.0]
    assert inclination_factor([-20.0, 20.0]).tolist() == [1.8, 0.6]


@given(depth, feed, nose, edge)
def test_components_make_up_the_thrust(ap, f, r, kr):
    ff, fp = resolve_thrust(500.0, chord_angle(ap, f, r, kr))
    assert float(np.hypot(ff, fp)) == pytest.approx(500.0)


@pytest.mark.parametrize(
    ("ap", "f", "r", "kr", "ratio"),
    [
        (3.0, 0.3, 0.8, 95.0, 0.26),
        (1.0, 0.2, 0.8, 95.0, 0.89),
        (0.5, 0.15, 0.8, 95.0, 1.65),
        (0.3, 0.1, 0.8, 93.0, 2.3),
        (0.1, 0.08, 0.4, 93.0, 3.1),
    ],
)
def test_passive_over_feed_force_grows_as_the_cut_gets_shallow(ap, f, r, kr, ratio):
    """Worked out by hand from the chord construction (Colwell)."""
    ff, fp = resolve_thrust(1.0, chord_angle(ap, f, r, kr))
    assert float(fp / ff) == pytest.approx(ratio, abs=0.06)


@given(st.floats(0.8, 6.0))
def test_chord_of_a_square_shoulder_is_colwells(ap):
    """kappa_r 90, vanishing feed: cot kappa_eq = r / ap (published form)."""
    kappa = np.radians(float(chord_angle(ap, 1e-9, 0.8, 90.0)))
    assert 1.0 / np.tan(kappa) == pytest.approx(0.8 / ap, rel=1e-6)


def test_sharp_corner_has_the_edge_for_a_chord():
    assert float(chord_angle(2.0, 0.2, 0.0, 75.0)) == pytest.approx(75.0)
    assert float(nose_angle(2.0, 0.0, 75.0)) == pytest.approx(75.0)
    assert float(largest_thickness(2.0, 0.2, 0.0, 95.0)) == pytest.approx(0.2 * np.sin(np.radians(95.0)))


def test_largest_thickness_past_the_crest_of_the_corner_is_the_feed():
    assert float(largest_thickness(2.0, 0.2, 0.8, 95.0)) == pytest.approx(0.2)
    assert float(largest_thickness(0.01, 0.2, 0.8, 95.0)) == pytest.approx(0.2 * np.sqrt(2.0 * 0.01 / 0.8), rel=0.01)


@given(st.floats(-5.0, 5.0), st.floats(-5.0, 5.0), st.floats(0.1, 5.0))
def test_chord_does_not_care_where_the_origin_is(x, y, across):
    assert float(chord_through(x, y, x + 1.0, y + across)) == pytest.approx(float(chord_through(0.0, 0.0, 1.0, across)))


def test_straight_edge_begins_where_the_corner_ends():
    """kr 90: the corner takes r of the depth, the straight edge the rest (plane geometry)."""
    assert straight_length([0.5, 0.8, 3.0], 0.8, 90.0) == pytest.approx([0.0, 0.0, 2.2])


def test_friction_angle_follows_rake_as_published_for_titanium():
    """19.1 + 0.29 g of Ti-6Al-4V between 0 and 15 deg (Budak, Altintas and Armarego) within half a degree."""
    rakes = np.array([0.0, 5.0, 10.0, 15.0])
    assert friction_angle(19.1, rakes, 0.0) == pytest.approx(19.1 + 0.29 * rakes, abs=0.5)


# ---- factors and scatter


def test_factors_of_cutting_material_and_operation():
    """Tschaetsch, table of correction factors, from memory."""
    materials = ("carbide", "coated carbide", "high-speed steel", "ceramic")
    assert [tool_material_factor(name) for name in materials] == [1.0, 1.0, 1.2, 0.9]
    kinds = ("turning", "boring", "grooving", "face grooving", "parting", "drilling")
    assert [operation_factor(kind) for kind in kinds] == [1.0, 1.2, 1.3, 1.3, 1.3, 1.2]


def test_names_that_are_not_known_are_refused_with_the_known_ones():
    with pytest.raises(ValueError, match="one of high-speed steel, carbide"):
        tool_material_factor("stone")
    with pytest.raises(ValueError, match="one of turning, boring"):
        operation_factor("milling")


def test_scatter_steps_where_the_sources_say():
    """Law limited to h >= 0.1 mm (Horvath 2015), another branch below; 0.03 mm and -15 deg: model."""
    assert force_scatter(0.15, [0.1, 0.0999, 0.03, 0.0299], 0.0).tolist() == [0.15, 0.40, 0.40, 1.0]
    assert force_scatter(0.15, 0.2, [-15.0, -15.1]).tolist() == [0.15, 1.0]
    assert float(force_scatter(0.5, 0.05, 0.0)) == 0.5


@given(st.floats(0.0, 1.0), st.floats(0.0, 1.0), st.floats(-60.0, 40.0))
def test_a_thinner_chip_is_never_more_certain(h, more, g):
    thin, thick = force_scatter(0.25, [h, h + more], g)
    assert 0.25 <= thick <= thin <= 1.0


# ---- rival laws beside each other


def test_handbook_constant_beside_kienzle():
    """Plain carbon steel, 180 to 200 HB: handbook 2.24 kW s/cm3, Ck45N at h 0.3 mm 5 % below (published comparison)."""
    handbook = 1000.0 * energy_tables.power_constant("plain carbon", 190.0)
    assert float(specific_force(KC11, MC, 0.3)) / handbook == pytest.approx(0.95, abs=0.01)


RIVALS = [  # power law, Kienzle pair (E295 at 750 MPa has no row: 40Mn4V, Rm 755), operation factor
    (power_law.STEEL_CARBIDE, 1691.0, 0.22, 1.0, 0.20),
    (power_law.GREY_IRON_CARBIDE, 900.0, 0.28, 1.0, 0.25),
    (power_law.STAINLESS_CARBIDE, 2000.0, 0.21, 1.0, 0.20),
    (power_law.STEEL_HIGH_SPEED, 1691.0, 0.22, 1.2, 0.25),
]


@pytest.mark.parametrize(("law", "kc11", "mc", "factor", "apart"), RIVALS)
@pytest.mark.parametrize("f", [0.2, 0.4])
def test_power_law_beside_kienzle(law, kc11, mc, factor, apart, f):
    """Two independent handbooks on ap 2, vc 100 m/min: within the scatter of catalogue constants."""
    soviet = float(power_law.power_law_force(law, 2.0, f, 100.0))
    assert factor * float(cutting_force(kc11, mc, f, 2.0)) == pytest.approx(soviet, rel=apart)


def test_power_law_of_a_groove_lies_above_turning():
    """t is the groove's width there; the operation factor 1.3 says the same."""
    groove = float(power_law.power_law_force(power_law.STEEL_CARBIDE_GROOVE, 3.0, 0.1))
    turning = float(power_law.power_law_force(power_law.STEEL_HIGH_SPEED, 3.0, 0.1))
    assert groove / turning == pytest.approx(operation_factor("grooving"), rel=0.2)


def test_power_laws_of_the_three_components_stand_in_the_usual_order():
    """ap 2, f 0.3, vc 100: feed and passive force are 0.3 to 0.6 of the cutting force."""
    cut = power_law.power_law_force(power_law.STEEL_CARBIDE, 2.0, 0.3, 100.0)
    for law in (power_law.STEEL_CARBIDE_PASSIVE, power_law.STEEL_CARBIDE_FEED):
        assert 0.3 <= float(power_law.power_law_force(law, 2.0, 0.3, 100.0) / cut) <= 0.6


@given(st.floats(-15.0, 0.0))
def test_rake_corrections_agree_in_slope(g):
    """1 % a degree on Pz against 1.0 to 1.5 in the Kienzle factor; 4 % on Py against 4.5 in the thrust factor."""
    step = power_law.rake_correction(g, "Pz") / power_law.rake_correction(10.0, "Pz")
    assert float(step) - 1.0 == pytest.approx(0.01 * (10.0 - g), abs=0.011)
    assert float(power_law.rake_correction(g, "Py")) - 1.0 == pytest.approx(0.04 * (10.0 - g), rel=0.01)


def test_unknown_component_and_material_group_are_refused():
    with pytest.raises(ValueError, match="Pz, Py or Px"):
        power_law.edge_angle_correction(60.0, "P")  # type: ignore[arg-type]
    with pytest.raises(ValueError, match="Pz, Py or Px"):
        power_law.strength_correction(600.0, "P")  # type: ignore[arg-type]
    with pytest.raises(ValueError, match="work material group"):
        energy_tables.unit_energy("wood", 50.0)
    with pytest.raises(ValueError, match="no figure for brass of 300 HB"):
        energy_tables.unit_energy("brass", 300.0)
