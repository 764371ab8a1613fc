"""Kienzle's law, its factors and the power laws beside it (C rows), and the Koenig-Essel and Kienzle-Victor sets."""

from __future__ import annotations

import pytest

from auditor.mechanics import energy_tables, factors, kienzle, power_law
from tests.published.rows import Row, lines, read, unused

ROWS = read("kienzle_and_factors")
COMPONENTS = ("Pz", "Py", "Px")


def rake_line(slope: float):
    return lambda r: factors.rake_factor(r["gamma"], r["gamma0"], slope)


def steel_with_edge_angle(r: Row):
    force = power_law.power_law_force(power_law.STEEL_CARBIDE, r["t"], r["S"], r["v"])
    return force * power_law.edge_angle_correction(r["kappa_r"])


def handbook(r: Row):
    group = r.text.get("group") or f"{r['group']:.0f}"
    return energy_tables.power_constant(group, r["hardness"])


LAWS = {
    "C01": lambda r: kienzle.specific_force(r["kc1.1"], r["mc"], r["h"]),
    "C02": lambda r: kienzle.cutting_force(r["kc1.1"], r["mc"], r["h"], r["b"]),
    "C03": rake_line(1.5),
    "C04": rake_line(1.0),
    "C05": lambda r: factors.speed_factor(r["vc"]),
    "C06": lambda r: factors.speed_factor(r["vc"]),
    "C07": lambda r: kienzle.coefficient_from_force(r["mc"], r["h"], r["kc"] * r["h"], 1.0),
    "C20": lambda r: power_law.power_law_force(power_law.STEEL_CARBIDE, r["t"], r["S"], r["v"]),
    "C21": steel_with_edge_angle,
    "C22": lambda r: power_law.rake_correction(r["gamma"]),
    "C23": lambda r: [power_law.rake_correction(r["gamma"], part) for part in COMPONENTS],
    "C24": lambda r: [power_law.rake_correction(r["gamma"], part) for part in COMPONENTS],
    **{f"C2{n}": handbook for n in range(5, 9)},
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


# ---- printed specific forces (classic set) and forces per mm of width at h = 0.2 (Koenig and Essel)


SETS = ("König", "Kienzle")


def constants(row: str, figure: str) -> tuple[float, float]:
    """Constant and exponent of a printed row: specific forces of the classic set, components of the other."""
    letter = "c" if figure == "kc" else figure[1]
    column = f"k{letter}11_N_mm2"
    (line,) = [
        line
        for line in lines("material_kienzle")
        if line["row"] == row and line[column] and line["source"].startswith(SETS[figure == "kc"])
    ]
    return float(line[column]), float(line[f"m{letter}"])


@pytest.mark.parametrize("line", lines("material_force_checks"), ids=lambda line: line["id"])
def test_printed_force(line):
    constant, exponent = constants(line["row"], line["figure"])
    h, expected = float(line["h_mm"]), float(line["expected"])
    if line["figure"] == "kc":
        value = float(kienzle.specific_force(constant, exponent, h))
    else:
        value = float(kienzle.cutting_force(constant, exponent, h, 1.0))
    assert value == pytest.approx(expected, rel=float(line["tolerance_percent"]) / 100.0)


def test_sources_of_one_steel_lie_as_far_apart_as_published():
    """kc of 42CrMo4 and 16MnCr5 at h = 0.2 mm: classic set, Koenig and Essel (comparison of published sets)."""
    assert float(kienzle.specific_force(2500.0, 0.26, 0.2)) == pytest.approx(3799.0, abs=0.5)
    assert float(kienzle.specific_force(1773.0, 0.17, 0.2)) == pytest.approx(2331.0, abs=0.5)
    assert float(kienzle.specific_force(2100.0, 0.26, 0.2)) == pytest.approx(3191.0, abs=0.5)
    assert float(kienzle.specific_force(1411.0, 0.30, 0.2)) == pytest.approx(2287.0, abs=0.5)
