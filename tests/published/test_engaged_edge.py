"""Engaged edge, chip thickness, chord and integrated force of eight cuts (D rows)."""

from __future__ import annotations

import pytest

from auditor.mechanics import chip, kienzle
from tests.published.rows import Row, read, unused

ROWS = read("engaged_edge")


def section(r: Row):
    """Mean thickness times engaged length: the section the law distributes along the edge."""
    length = chip.engaged_length(r["ap"], r["r_eps"], r["kappa_r"])
    return chip.mean_thickness(r["ap"] * r["f"], length) * length


def equivalent(r: Row):
    length = chip.engaged_length(r["ap"], r["r_eps"], r["kappa_r"])
    return chip.equivalent_thickness(r["ap"] * r["f"], length, r["f"])


def force(r: Row):
    return kienzle.nose_cutting_force(r["kc1.1"], r["mc"], r["ap"], r["f"], r["r_eps"], r["kappa_r"])


KINDS = (
    section,
    lambda r: chip.engaged_length(r["ap"], r["r_eps"], r["kappa_r"]),
    equivalent,
    lambda r: chip.chord_angle(r["ap"], r["f"], r["r_eps"], r["kappa_r"]),
    force,
)
LAWS = {f"D{cut}{kind}": law for cut in range(8) for kind, law in enumerate(KINDS)}


@pytest.mark.parametrize("name", LAWS)
def test_published_value(name):
    row = ROWS[name]
    assert row.agrees(float(LAWS[name](row)))


def test_every_row_is_used_or_listed():
    assert set(LAWS) | set(unused()) >= set(ROWS)
