"""What every law does with impossible numbers, with rows that have no figure, and with the bounds of its range."""

from __future__ import annotations

import numpy as np
import pytest

from auditor.mechanics.kienzle import CHIP_THICKNESS
from auditor.mechanics.validity import ValidRange, between, not_negative, positive
from tests.mechanics.docstrings import laws

ARRAY_LAWS = [law for law in laws() if all(text.startswith("array_like (...)") for text in law.documented.values())]
FRACTIONS = {"efficiency", "n", "mc", "mf", "mp", "mn", "feed", "damping", "material_scatter"}
ANGLES = {"edge_angle": 75.0, "minor_angle": 8.0, "included_angle": 80.0, "point_angle": 118.0, "phi": 25.0}


def plausible(argument: str) -> float:
    """A number every law accepts for an argument of that name."""
    if argument in FRACTIONS:
        return 0.25
    small = {"inner": 1.0, "pilot": 1.0, "position": 1.0, "heel": 1.0, "depth_before": 1.0, "small": 1.0}
    return ANGLES.get(argument, small.get(argument, 10.0))


def law_name(law):
    return law.name


def outputs(value: object) -> list[np.ndarray]:
    return [np.asarray(part) for part in value] if isinstance(value, tuple) else [np.asarray(value)]


@pytest.mark.parametrize("law", ARRAY_LAWS, ids=law_name)
def test_a_row_without_figures_stays_without_and_leaves_its_neighbours_alone(law):
    """NaN in, NaN out, no warning (warnings are errors here), and the other rows as if alone."""
    alone = outputs(law.function(*(plausible(name) for name in law.arguments)))
    mixed = outputs(law.function(*(np.array([plausible(name), np.nan]) for name in law.arguments)))
    for one, both in zip(alone, mixed, strict=True):
        assert np.isfinite(one).all()
        assert both[0] == pytest.approx(float(one), rel=1e-12)
        assert np.isnan(both[1])


@pytest.mark.parametrize("law", ARRAY_LAWS, ids=law_name)
def test_arguments_broadcast(law):
    """A column for the first argument, a row for the others: the joint shape comes out."""
    values = [np.full(3, plausible(name)) for name in law.arguments]
    values[0] = np.full((2, 1), plausible(law.arguments[0]))
    for out in outputs(law.function(*values)):
        assert out.shape == (2, 1) if len(values) == 1 else (2, 3)


@pytest.mark.parametrize("law", ARRAY_LAWS, ids=law_name)
def test_infinity_is_refused_in_plain_words(law):
    if law.name == "kinematics.rapid_time":  # acceleration without limit is a way of saying "no ramp"
        return
    for index in range(len(law.arguments)):
        values = [plausible(name) for name in law.arguments]
        values[index] = np.inf
        with pytest.raises(ValueError, match=r"must|lies"):
            law.function(*values)


def test_refusal_names_the_quantity_the_number_and_what_is_wanted():
    with pytest.raises(ValueError, match=r"^feed must be zero or more; found -0\.2 mm/rev$"):
        not_negative("feed", "mm/rev", [0.1, -0.2, np.nan])
    with pytest.raises(ValueError, match=r"^kc1\.1 must be greater than zero; found 0 N/mm2$"):
        positive("kc1.1", "N/mm2", 0.0)
    with pytest.raises(ValueError, match=r"^rake must be between -90 and 90; found 90 deg$"):
        between("rake", "deg", 90.0, -90.0, 90.0)


def test_range_marks_rows_outside_and_rows_without_a_figure():
    assert CHIP_THICKNESS.covers([0.05, 0.1, 1.0, 2.5, 3.0, np.nan]).tolist() == [False, True, True, True, False, False]


def test_range_reads_as_a_sentence():
    feed = ValidRange("feed", "mm/rev", 0.05, 0.5, "table 8")
    assert str(feed) == "feed 0.05 to 0.5 mm/rev (table 8)"
