"""Shear plane, force circle and titanium database against textbook examples (E rows)."""

from __future__ import annotations

import numpy as np
import pytest

from auditor.mechanics import chip, force_circle, kinematics, oblique, power, shear, thrust
from tests.published.rows import Row, read, unused

ROWS = read("shear_plane")
PSI, INCH, POUND = 6894.757e-6, 25.4, 4.448222  # N/mm2, mm, N


def shear_angle(r: Row, thick: str, cut: str):
    return shear.shear_angle(shear.chip_ratio(r[thick], r[cut]), r["alpha"])


def merchant(r: Row, constant: float = 90.0):
    beta = np.degrees(np.arctan(r["mu"]))
    phi = shear.merchant_shear_angle(beta, r["alpha"], constant)
    return force_circle.force_from_shear(r["tau"], r["t"], r["w"], phi, beta, r["alpha"])


def lee_shaffer(r: Row, rake: float, h: float, b: float):
    beta = np.degrees(np.arctan(r["mu"]))
    phi = shear.lee_shaffer_shear_angle(beta, rake)
    return force_circle.force_from_shear(r["tau"], h, b, phi, beta, rake)


def inclined_edge(r: Row):
    """Longitudinal turning with a slanted edge: h = f sin kr, b = ap / sin kr, thrust split by kr = 90 - SCEA."""
    kr = 90.0 - r["SCEA"]
    h = chip.largest_thickness(r["d"], r["f"], 0.0, kr)
    fc, ft = lee_shaffer(r, r.inputs.get("alpha_n", r.inputs.get("alpha")), h, chip.engaged_length(r["d"], 0.0, kr))
    return [fc, ft, *thrust.resolve_thrust(ft, kr)]


def pounds(r: Row, rake: float, ratio: float):
    """Merchant's solution for the rake and chip ratio of the inch examples: fc, ft in lbf."""
    phi = shear.shear_angle(ratio, rake)
    beta = 90.0 + rake - 2.0 * float(phi)
    h, b = r["t0_in"] * INCH, r["w_in"] * INCH
    fc, ft = force_circle.force_from_shear(r["tau_psi"] * PSI, h, b, phi, beta, rake)
    return float(fc) / POUND, float(ft) / POUND


def titanium(r: Row):
    phi, beta = oblique.titanium_shear_angle(r["alpha"], r["h"]), oblique.titanium_friction_angle(r["alpha"])
    return oblique.oblique_coefficients(r["tau"], phi, beta, r["alpha"], 0.0).cutting


def turning_power(r: Row):
    return power.cutting_power(r["Pz"], kinematics.cutting_speed(r["D"], r["n"]))


LAWS = {
    "E01": lambda r: shear_angle(r, "t0", "tc"),
    "E02": lambda r: shear.shear_strain(shear_angle(r, "t0", "tc"), r["alpha"]),
    "E03": lambda r: force_circle.shear_stress(r["Fc"], r["Ft"], r["phi"], r["t0"], r["w"]),
    "E04": lambda r: force_circle.measured_friction_angle(r["Fc"], r["Ft"], r["alpha"]),
    "E05": lambda r: force_circle.friction_coefficient(
        force_circle.measured_friction_angle(r["Fc"], r["Ft"], r["alpha"])
    ),
    "E06": lambda r: 1000.0 * power.cutting_power(r["Fc"], r["v"]),
    "E07": lambda r: power.specific_energy(r["Fc"], r["w"] * r["t0"]) / 1000.0,
    "E08": lambda r: shear.shear_angle(r["r"], r["alpha"]),
    "E09": lambda r: pounds(r, r["alpha"], r["r"])[0],
    "E10": lambda r: shear.shear_angle(r["r"], r["alpha"]),
    "E11": lambda r: pounds(r, r["alpha"], r["r"])[0],
    "E12": lambda r: [pounds(r, r[f"alpha_{n}"], r[f"r_{n}"])[1] for n in (1, 2)],
    "E13": lambda r: shear_angle(r, "t0", "tc"),
    "E14": lambda r: shear.shear_strain(shear_angle(r, "t0", "tc"), r["alpha"]),
    "E15": lambda r: merchant(r)[0],
    "E16": lambda r: merchant(r)[1],
    "E17": lambda r: merchant(r, r["C"])[0],
    "E18": lambda r: lee_shaffer(r, r["alpha"], r["t"], r["w"])[0],
    "E19": inclined_edge,
    "E20": lambda r: inclined_edge(r)[0],
    "E21": lambda r: force_circle.shear_stress(r["Fc"], r["Fz"], shear_angle(r, "a", "ac"), r["a"], r["b"]),
    "E22": lambda r: shear_angle(r, "a", "ac"),
    "E23": lambda r: force_circle.face_stress(r["Fc"], r["Fz"], r["alpha"], r["contact"], r["b"]),
    "E24": lambda r: 100.0 * force_circle.friction_energy_share(r["Fc"], r["Fz"], r["alpha"], r["a"] / r["ac"]),
    "E25": lambda r: 100.0 * force_circle.friction_energy_share(r["Fc"], r["Ft"], r["alpha"], r["t"] / r["tc"]),
    "E26": lambda r: force_circle.shear_force(r["Fc"], r["Ft"], shear_angle(r, "t", "tc")),
    "E27": lambda r: force_circle.measured_friction_angle(r["Fc"], r["Ft"], r["alpha"]),
    "E28": lambda r: power.specific_energy(r["Fc"], r["t"] * r["b"]),
    "E29": lambda r: shear_angle(r, "t", "tc"),
    "E30": turning_power,
    **{f"E4{rake}t": titanium for rake in (0, 5, 10, 15)},
    **{f"E4{rake}p": lambda r: oblique.titanium_shear_angle(r["alpha"], r["h"]) for rake in (0, 5, 10, 15)},
}


@pytest.mark.parametrize("name", LAWS)
def test_published_value(name):
    row = ROWS[name]
    value = LAWS[name](row)
    values = value if isinstance(value, list) else [value]
    assert row.agrees(*(float(one) for one in values))


def test_every_row_is_used_or_listed():
    assert set(LAWS) | set(unused()) >= set(ROWS)
    assert not set(LAWS) & set(unused())
