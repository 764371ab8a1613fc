"""Bending, chatter (I rows), clamping (J rows), drilling and threads (K rows)."""

from __future__ import annotations

import numpy as np
import pytest

from auditor.mechanics import (
    bars,
    bending,
    chatter,
    clamping,
    drilling,
    kienzle,
    kinematics,
    power,
    power_law,
    threading,
)
from tests.published.rows import Row, read, unused

ROWS = read("bending") | read("clamping") | read("drilling_and_threads")


def tube_force(r: Row):
    """us in kW min/cm3: a specific force of 60000 us N/mm2 that does not depend on h (mc = 0)."""
    return kienzle.cutting_force(60_000.0 * r["us"], 0.0, r["f"], r["d"])


def tube_bending(r: Row):
    moment = bending.second_moment(r["Do"], r["Di"])
    return tube_force(r) * bending.cantilever_compliance(r["L"], r["E"], moment)


def tube_power(r: Row):
    return power.cutting_power(tube_force(r), kinematics.cutting_speed(r["D"], r["N"]))


def worst_position(r: Row):
    positions = np.linspace(0.0, r["L"], 20_001)
    return positions[np.argmax(bending.fixed_pinned_compliance(positions, r["L"], 1.0, 1.0))]


def stepped(r: Row):
    rigidity = r["E"] * bending.second_moment([r["d1"], r["d2"]])
    length = r["L1"] + r["L2"]
    return r["F"] * bending.stepped_compliance([r["L1"], length], rigidity, length)


def drill_kc(r: Row):
    return kienzle.specific_force(r["kc1.1"], r["mc"], drilling.drill_chip_thickness(r["f"], r["sigma"]))


def drill_rate(r: Row):
    return power.ring_removal_rate(r["d"], 0.0, r["f"] * r["N"])


def rod(r: Row):
    return bending.second_moment(r["d"])


LAWS = {
    "I01": tube_force,
    "I02": tube_bending,
    "I04": tube_power,
    "I05": lambda r: r["F"] * bending.cantilever_compliance(r["L"], r["E"], rod(r)),
    "I06": lambda r: r["F"] * bending.fixed_pinned_compliance(r["a"], r["L"], r["E"], rod(r)),
    "I07": worst_position,
    "I08": lambda r: r["F"] * bending.centres_compliance(r["L"] / 2.0, r["L"], r["E"], rod(r)),
    "I09": stepped,
    "I10": lambda r: r["F"] * bars.bar_compliance(r["L"], r["d"], r["E"]),
    "I11": lambda r: r["F"] * bars.bar_compliance(r["L"], r["d"], r["E"]),
    "I12": lambda r: chatter.limiting_width(r["k"] / 1000.0, r["zeta"], r["Kf"]),
    "J01": lambda r: clamping.centrifugal_force(r["m"], 1000.0 * r["r_s"], r["n"], r["jaws"]),
    "J02": lambda r: clamping.centrifugal_force(r["m"], 1000.0 * r["r_s"], r["n"], r["jaws"]),
    "J03": lambda r: clamping.grip_with_safety(r["F_spz"], r["S_z"]),
    "J04": lambda r: clamping.static_grip(r["F_sp"], r["F_c"], safety=r["S_sp"]),
    "J05": lambda r: clamping.centrifugal_limit(r["F_sp0"]),
    "J06": lambda r: clamping.grip_for_cut(r["Fc"], 0.0, r["d_cut"], r["d_grip"], r["mu"]),
    "K01": lambda r: drill_rate(r) * 1000.0 / 60.0,
    "K02": lambda r: power.torque_from_power(power.power_from_removal(drill_rate(r), 1000.0 * r["u"]), r["N"]),
    "K03": lambda r: drilling.drill_chip_thickness(r["f"], r["sigma"]),
    "K04": lambda r: drilling.drill_torque(drill_kc(r), r["f"], r["d"]),
    "K05": lambda r: drilling.drill_thrust(drill_kc(r), r["f"], r["d"], r["sigma"]),
    "K06": lambda r: power_law.power_law_drill_torque(r["D"], r["S"], r["Cm"], r["q"], r["y"]),
    "K07": lambda r: power_law.power_law_drill_thrust(r["D"], r["S"], r["Cp"], r["q"], r["y"]),
    "K08": lambda r: drilling.feed_factor(r["f"]),
    "K09": lambda r: [drilling.thrust_factor(r["D"]), drilling.torque_factor(r["D"])],
    "K10": lambda r: list(drilling.STANDARD_CHISEL),
    "K11": lambda r: drilling.handbook_torque(r["D"], r["f"], r["Kd"]),
    "K12": lambda r: drilling.handbook_thrust(r["D"], r["f"], r["Kd"]),
    "K13": lambda r: threading.external_depth(r["P"]),
    "K14": lambda r: threading.constant_area_depths(r["h3"], int(r["N"])).tolist(),
    "K15": lambda r: power_law.power_law_thread_force(r["P"], r["i"]),
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
