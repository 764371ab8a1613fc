"""Quantities: the form people must write, and the factors against pint's own registry."""

from __future__ import annotations

import time

import pint
import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.declared.units import (
    DAILY,
    EXAMPLE,
    UNIT,
    QuantityError,
    hardness,
    measure,
    quantity,
    roughness,
)

OWN_SPELLING = {"rotation": "revolution / minute", "density": "g/cm**3"}


@pytest.fixture(scope="module")
def pints_own() -> pint.UnitRegistry:
    return pint.UnitRegistry()


@pytest.mark.parametrize("unit", DAILY)
def test_daily_units_agree_with_pint(unit: str, pints_own: pint.UnitRegistry) -> None:
    dimension, factor = DAILY[unit]
    judged = pints_own.Quantity(1.0, unit).to(OWN_SPELLING.get(dimension, UNIT[dimension]))
    assert factor == pytest.approx(judged.magnitude, rel=1e-12)


@pytest.mark.parametrize(
    ("text", "dimension", "unit"),
    [
        ("0.375 inch", "length", "inch"), ("3 thou", "length", "thou"), ("2 cm", "length", "cm"),
        ("600 ft/min", "speed", "ft/min"), ("3 m/s", "speed", "m/s"), ("20 hp", "power", "hp"),
        ("150 W", "power", "W"), ("500 lbf", "force", "lbf"), ("90 kgf", "force", "kgf"), ("1.5 rad", "angle", "rad"),
        ("45 s", "time", "s"), ("4 lb", "mass", "lb"), ("210000 psi", "pressure", "psi"),
        ("7850 kg/m^3", "density", "kg/m**3"), ("0.284 lb/in^3", "density", "lb/in**3"),
    ],
)  # fmt: skip
def test_rarer_units_agree_with_pint(text: str, dimension: str, unit: str, pints_own: pint.UnitRegistry) -> None:
    judged = pints_own.Quantity(float(text.split()[0]), unit).to(OWN_SPELLING.get(dimension, UNIT[dimension]))
    assert quantity(text, dimension) == pytest.approx(judged.magnitude, rel=1e-9)


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("1800 N/mm2", 1800.0), ("1800 N/mm^2", 1800.0), ("1800 N/mm²", 1800.0), ("1800 N/mm**2", 1800.0),
        ("1.8 GPa", 1800.0), ("1800 MPa", 1800.0),
    ],
)  # fmt: skip
def test_force_per_area_in_every_spelling(text: str, value: float) -> None:
    assert quantity(text, "pressure") == pytest.approx(value)


def test_spindle_speed_in_every_spelling() -> None:
    assert [quantity(text, "rotation") for text in ("900 rpm", "900 1/min", "900 min^-1", "15 Hz")] == [900.0] * 4


@pytest.mark.parametrize("text", ["35 um", "35 µm", "35 μm"])
def test_micrometres_in_every_spelling(text: str) -> None:
    assert quantity(text, "length") == pytest.approx(0.035)


@pytest.mark.parametrize(
    ("text", "hint"),
    [
        ("15", "unit is missing"), ("1,5 mm", "decimal comma"), ("15mm", "one space"), (" 15 mm", "one space"),
        ("15  mm", "one space"), ("9.5 mm + 2 mm", "not a quantity"), ("9**9**9 mm", "not a quantity"),
        ("2 * 3 mm", "not a quantity"), ("mm", "not a quantity"), ("", "not a quantity"), ("1 mm mm", "not a quantity"),
        ("nan mm", "not a quantity"), ("inf mm", "not a quantity"), ("1e999 mm", "not a quantity"),
        ("١٥ mm", "not a quantity"), ("15 __import__('os')", "not a quantity"), ("15 furlong", "no unit of use here"),
        ("15 Nm", "no unit of use here"), ("9" * 5000 + " mm", "too long"), ("15 " + "m" * 5000, "too long"),
    ],
)  # fmt: skip
def test_anything_else_is_refused_at_once(text: str, hint: str) -> None:
    measure("1 m/s")  # wakes pint, so that its import is not timed
    began = time.perf_counter()
    with pytest.raises(QuantityError, match=hint):
        quantity(text, "length")
    assert time.perf_counter() - began < 0.5


@pytest.mark.parametrize("thing", [15, 15.0, True, None, ["15 mm"], {"mm": 15}])
def test_a_quantity_is_a_text(thing: object) -> None:
    with pytest.raises(QuantityError, match="in quotes"):
        quantity(thing, "length")


def test_another_dimension_is_named() -> None:
    with pytest.raises(QuantityError, match="this is a length, not a power; wanted a power like"):
        quantity("15 mm", "power")


@pytest.mark.parametrize("dimension", EXAMPLE)
def test_what_is_shown_as_wanted_is_accepted(dimension: str) -> None:
    assert measure(EXAMPLE[dimension]).dimension == dimension


@given(st.text(max_size=40))
def test_no_text_breaks_it(text: str) -> None:
    try:
        found = measure(text)
    except QuantityError:
        return
    assert found.value == found.value


@given(st.floats(-1e6, 1e6).map(lambda number: round(number, 6)))
def test_inches_are_25_4_mm(number: float) -> None:
    assert quantity(f"{number:.6f} in", "length") == pytest.approx(25.4 * number, abs=1e-9)


def test_hardness_and_roughness() -> None:
    assert hardness("190 HB") == 190.0
    assert roughness("Ra 1.6 um") == ("Ra", pytest.approx(1.6))
    assert roughness("Rz 0.0063 mm") == ("Rz", pytest.approx(6.3))


@pytest.mark.parametrize("text", ["190", "190 HRC", "HB 190", "190 HB soft", 190])
def test_other_hardness_is_refused(text: object) -> None:
    with pytest.raises(QuantityError, match="190 HB"):
        hardness(text)


@pytest.mark.parametrize("text", ["1.6 um", "Ra 1.6", "Rt 6 um", "Ra 1,6 um", "Ra  1.6 um", 1.6])
def test_other_roughness_is_refused(text: object) -> None:
    with pytest.raises(QuantityError, match=r"Ra 1\.6 um"):
        roughness(text)
