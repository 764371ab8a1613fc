"""Roughness and minimum chip (G rows), edge life (H rows)."""

from __future__ import annotations

import pytest

from auditor.mechanics import life, roughness, windows
from tests.published.rows import Row, read, unused

ROWS = read("roughness") | read("edge_life")


def exact_peak(r: Row):
    """The exact form with edges that leave the arc alone (kr 95, kr' 32)."""
    return roughness.peak_to_valley(r["f"], r["r"], 95.0, 32.0)


def fit(r: Row):
    if "v1" in r.inputs:
        return life.taylor_fit([r["v1"], r["v2"]], [r["T1"], r["T2"]])
    return life.taylor_fit(r.series["v"], r.series["T"])


def constants(r: Row):
    pair = life.taylor_constants(r.text["tool"])
    speeds = (pair.speed_other, pair.speed_steel)
    # a blank in the table is a blank in the law
    return [pair.exponent, *(0.0 if speed is None else speed for speed in speeds)]


LAWS = {
    "G01": lambda r: roughness.rule_average(r["f"], r["r"]),
    "G02": lambda r: roughness.rule_average(r["f"], r["r"]) * roughness.real_to_ideal(r["vc"]),
    "G03": lambda r: roughness.peak_to_valley(r["f"], 0.0, r["kappa_r"], r["kappa_n"]),
    "G04": lambda r: roughness.parabola_peak(r["f"], r["r"]),
    "G05": lambda r: roughness.parabola_peak(r["f"], r["r"]),
    "G06": exact_peak,
    "G07": lambda r: roughness.parabola_peak(r["f"], r["r"]),
    "G08": lambda r: roughness.parabola_average(r["f"], r["r"]),
    "G09": lambda r: roughness.rule_average(r["f"], r["r"]),
    "G10": lambda r: roughness.peak_to_valley(r["f"], r["r"], 95.0, r["kappa_n"]),
    "G11": lambda r: roughness.arc_limit_feed(r["r"], r["kappa_n"]),
    "G12": lambda r: [windows.minimum_chip(r["r_beta"], share) for share in (0.25, 0.33)],
    "H01": lambda r: fit(r)[1],
    "H02": lambda r: fit(r)[0],
    "H10": lambda r: fit(r)[1],
    "H11": lambda r: fit(r)[0],
    "H12": lambda r: life.extended_taylor_speed(r["T"], r["S"], r["t"], r["Cv"], r["m"], r["y"], r["x"]),
    **{name: constants for name in ROWS if name.startswith("H_T_")},
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
