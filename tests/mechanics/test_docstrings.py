"""Every law says what goes in, in which unit, what comes out, what it refuses and who published it."""

from __future__ import annotations

import importlib
import re

import pytest

from auditor.mechanics.validity import ValidRange
from tests.mechanics.docstrings import laws, modules

LAWS = laws()
UNITS = {
    *("mm", "mm2", "mm4", "um", "mm/rev", "mm/min", "mm/s2", "m/min", "cm3/min", "deg", "%/deg", "N", "N m", "kW"),
    *("N/mm2", "N/mm", "mm/N", "MPa", "N mm2", "kW/(cm3/s)", "N m/mm3", "rpm", "rpm/s", "s", "min", "kg", "g/cm3"),
    *("HB", "dimensionless", "true or false", "N/mm and N mm/rad", "N mm and m/min"),
}
NAMES = ("name of", "ISO 1832 letter", "way of feeding in")


def law_name(law):
    return law.name


def test_laws_are_found():
    assert len(LAWS) > 90


@pytest.mark.parametrize("law", LAWS, ids=law_name)
def test_documented_arguments_are_those_of_the_signature(law):
    assert list(law.documented) == law.arguments


@pytest.mark.parametrize("law", LAWS, ids=law_name)
def test_every_argument_has_a_unit_and_arrays_a_shape(law):
    for argument, text in law.documented.items():
        kind, _, unit = text.partition(", ")
        assert unit in UNITS or unit.startswith(NAMES), f"{argument}: {text}"
        if kind.startswith("array_like"):
            assert re.fullmatch(r"array_like \((\.\.\.|n,|k,)\)", kind), f"{argument}: {text}"


@pytest.mark.parametrize("law", LAWS, ids=law_name)
def test_result_has_a_unit(law):
    first = law.sections["Returns"].splitlines()[0]
    units = first.split(", ", 1)[1].split(" and ")
    assert all(part in UNITS for unit in units for part in unit.split(", ")), first


@pytest.mark.parametrize("law", LAWS, ids=law_name)
def test_refusals_example_and_reference_are_given(law):
    assert "ValueError" in law.sections["Raises"]
    assert ">>>" in law.sections["Examples"]
    reference = law.sections["References"]
    # a year, an edition, a standard, a table, a page, an equation; or it says that none exists
    assert re.search(r"\d{3,4}|ISO \d+|ed\.|table|ch\.|p\.|eq\.|[Cc]ommon practice|[Mm]odel", reference), reference


@pytest.mark.parametrize("name", [name for name in modules() if not name.endswith("validity")])
def test_every_subject_states_where_it_is_valid(name):
    """Ranges stand as data in the module, or its laws are exact geometry and statics, which hold everywhere."""
    exact = {"copying", "kinematics", "power", "energy_tables", "force_circle"}
    module = importlib.import_module(name)
    ranges = [value for value in vars(module).values() if isinstance(value, ValidRange)]
    assert ranges or name.rsplit(".", 1)[1] in exact
    for item in ranges:
        assert item.low < item.high
        assert item.source
