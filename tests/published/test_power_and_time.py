"""Power, torque, removal rate, energy tables (F rows) and times of moves (TM rows)."""

from __future__ import annotations

import pytest

from auditor.mechanics import energy_tables, kienzle, kinematics, power, power_law
from tests.published.rows import Row, read, unused

ROWS = read("power_and_time") | read("move_times")
INCH, POUND, HORSEPOWER = 25.4, 4.448222, 0.7456999  # mm, N, kW
CUBIC_INCH = INCH**3 / 1000.0  # cm3
TEXTBOOK_CUT = power_law.PowerLaw(159.3, 0.98, 0.85, source="textbook example, Fc = 1593 f^0.85 d^0.98")


def inch_rate(r: Row):
    """cm3/min of the turning example given in inches."""
    return power.ring_removal_rate(r["D0_in"] * INCH, r["Df_in"] * INCH, r["vf_in"] * INCH)


def unit_force(r: Row, outer: float, inner: float, feed_speed: float, energy: float):
    """Force of a constant specific energy (Kienzle with mc = 0) on the example's chip section."""
    return kienzle.cutting_force(energy, 0.0, feed_speed / r["N"], (outer - inner) / 2.0)


def textbook_force(r: Row):
    return power_law.power_law_force(TEXTBOOK_CUT, r["d"], r["f"])


def textbook_power(r: Row):
    return power.cutting_power(textbook_force(r), 60.0 * r["v"])


def line_time(r: Row):
    return kinematics.surface_speed_line_time(r["r1"], r["r2"], r["L"], r["f"], r["vc"], r["n_max"])


def arc_time(r: Row):
    return kinematics.surface_speed_arc_time(r["rc"], r["R"], r["a1"], r["a2"], r["f"], r["vc"], r["n_max"])


LAWS = {
    "F01": lambda r: inch_rate(r) / CUBIC_INCH,
    "F02": lambda r: power.power_from_removal(inch_rate(r), 2730.0 * r["u_hp"]) / HORSEPOWER,
    "F03": lambda r: unit_force(r, r["D0_in"] * INCH, r["Df_in"] * INCH, r["vf_in"] * INCH, 2730.0 * r["u_hp"]) / POUND,
    "F04": lambda r: 1000.0 * power.ring_removal_rate(r["Do"], r["Df"], r["vf"]),
    "F05": lambda r: (
        1000.0 * power.power_from_removal(power.ring_removal_rate(r["Do"], r["Df"], r["vf"]), 1000.0 * r["u"])
    ),
    "F06": lambda r: unit_force(r, r["Do"], r["Df"], r["vf"], 1000.0 * r["u"]),
    "F07": lambda r: power.motor_power(power.cutting_power(r["kc"] * r["A"], r["vc"]), r["eta"]),
    "F08": lambda r: power.cutting_power(r["Fc"], r["vc"]),
    "F09": lambda r: power.motor_power(power.cutting_power(r["Fc"], r["vc"]), r["eta"]),
    "F10": textbook_force,
    "F11": textbook_power,
    "F12": lambda r: power.motor_power(textbook_power(r), r["eta"]),
    "F13": lambda r: power.specific_energy(textbook_force(r), r["f"] * r["d"]),
    "F14": lambda r: power.removal_rate(r["d"], r["f"], 60.0 * r["v"]) * 1000.0 / 60.0,
    "F15": lambda r: kinematics.clamp_diameter(r["vc"], r["n_max"]),
    "F16": lambda r: kinematics.surface_speed_line_time(r["d"] / 2.0, 0.0, r["d"] / 2.0, r["f"], r["vc"], r["n_max"]),
    # 1 hp in a cubic inch a minute, as energy per volume
    "F17": lambda r: HORSEPOWER / float(power.power_from_removal(CUBIC_INCH, 1000.0)) * r["hp_per_in3_min"],
    **{
        name: lambda r: energy_tables.unit_energy(r.text["group"], r["hardness"])
        for name in ROWS
        if name.startswith("F_u_")
    },
    "TM1": lambda r: kinematics.feed_time(r["L"], r["f"], r["n"]),
    **{f"TM{n}": line_time for n in (2, 3, 4, 5)},
    "TM6": arc_time,
    **{f"TM{n}": lambda r: kinematics.feed_time(r["L"], r["f"], r["n"]) for n in (7, 11, 14)},
    **{f"TM{n}": lambda r: kinematics.rapid_time(r["d"], r["v"], r["a"]) for n in ("8", "9x", "9z", "10x", "10z")},
    "TM15": lambda r: kinematics.surface_speed_acceleration(r["vc"], r["f"], r["r"]),
}


@pytest.mark.parametrize("name", LAWS)
def test_published_value(name):
    row = ROWS[name]
    assert row.agrees(float(LAWS[name](row)))


def test_every_row_is_used_or_listed():
    assert set(LAWS) | set(unused()) >= set(ROWS)
    assert not set(LAWS) & set(unused())
