"""ISO 3002-1 conversions, effective rake and clearance against published and hand-worked values (A rows)."""

from __future__ import annotations

import numpy as np
import pytest

from auditor.mechanics import clearance, copying, rake
from tests.published.rows import Row, read, unused

ROWS = read("rake_and_clearance")


def from_side_and_back(convert):
    return lambda r: convert(r["gamma_f"], r["gamma_p"], r["kappa_r"])


def from_orthogonal(convert):
    return lambda r: convert(r["gamma_o"], r["lambda_s"], r["kappa_r"])


def normal_from_side_and_back(r: Row):
    orthogonal = rake.orthogonal_rake(r["gamma_f"], r["gamma_p"], r["kappa_r"])
    return rake.normal_rake(orthogonal, rake.inclination(r["gamma_f"], r["gamma_p"], r["kappa_r"]))


def insert_in_pocket(r: Row):
    normal = clearance.normal_clearance(r["alpha_insert"], r["gamma_n"])
    return clearance.orthogonal_clearance(normal, r.inputs.get("lambda_s", 0.0))


def met_rake(r: Row):
    blend = rake.effective_rake(r["gamma_pocket"], r["gamma_cb"], r["gamma_land"], r["b_gamma"], r["h"])
    return rake.edge_limited_rake(blend, r["r_beta"], r["h"])


def minor_edge(r: Row):
    return copying.minor_edge_angle(r["kappa_r"], r["epsilon"])


LAWS = {
    "A01": from_side_and_back(rake.orthogonal_rake),
    "A02": from_side_and_back(rake.inclination),
    "A03": from_orthogonal(rake.back_rake),
    "A04": from_orthogonal(rake.side_rake),
    "A05": lambda r: np.tan(np.radians(rake.inclination(r["gamma_f"], r["gamma_p"], r["kappa_r"]))),
    "A06": normal_from_side_and_back,
    **{f"A1{n}f": from_orthogonal(rake.side_rake) for n in range(4)},
    **{f"A1{n}p": from_orthogonal(rake.back_rake) for n in range(4)},
    "A20": lambda r: rake.normal_rake(r["gamma_o"], r["lambda_s"]),
    "A21": insert_in_pocket,
    "A22": insert_in_pocket,
    "A30": lambda r: clearance.feed_angle(r["f"], r["d"]),
    "A31": lambda r: clearance.feed_angle(r["f"], r["d"]),
    "A32": lambda r: clearance.vanishing_diameter(r["f"], r["alpha"]),
    "A33": lambda r: clearance.height_angle(r["h"], r["d"]),
    "A34": lambda r: clearance.height_angle(r["h"], r["d"]),
    "A35": lambda r: clearance.height_radius_error(r["r"], r["e"]),
    **{f"A4{n}": met_rake for n in range(6)},
    **{f"A5{n}": minor_edge for n in range(5)},
    "A55": lambda r: clearance.bore_heel_clearance(r["R"], r["v"]),
}


@pytest.mark.parametrize("name", LAWS)
def test_published_value(name):
    row = ROWS[name]
    assert row.agrees(float(LAWS[name](row)))


def test_every_row_is_used_or_listed():
    assert set(LAWS) | set(unused()) >= set(ROWS)
    assert not set(LAWS) & set(unused())
