"""Sizes as shops write them, collected from program comments; what they mean is common practice of the trade."""

from __future__ import annotations

import pytest

from auditor.draft.sizes import sizes, upper


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("T0101: 80* ROUGH TURNING TOOL .031 TNR", [(80.0, None, "angle"), (0.031, None, "radius")]),
        ("BRUT: PHI50 X 52MM", [(50.0, None, "diameter"), (52.0, "mm", None)]),
        ("4.5OD X 2.75 ID X .53L", [(4.5, None, "diameter"), (2.75, None, "inside"), (0.53, None, "length")]),
        ("GROOVE .125W", [(0.125, None, "width")]),
        ("BAR D60 - SAWN TO 190", [(60.0, None, "diameter"), (190.0, None, "length")]),
        ("ROHTEIL 60X125", [(60.0, None, None), (125.0, None, None)]),
        ("D=50 L=120", [(50.0, None, "diameter"), (120.0, None, "length")]),
        ("D50L120", [(50.0, None, "diameter"), (120.0, None, "length")]),
        ("TONDO D. 45 L. 100", [(45.0, None, "diameter"), (100.0, None, "length")]),
        ("Stange Ø 40 x 120 lang", [(40.0, None, "diameter"), (120.0, None, "length")]),
        ('STOCK: 2.5" DIA X 4.0" LONG', [(2.5, "in", "diameter"), (4.0, "in", "length")]),
        ("1-1/2 DIA X 4 LONG", [(1.5, None, "diameter"), (4.0, None, "length")]),
        ("1 1/2 INCH", [(1.5, "in", None)]),
        ("1/2 DRILL", [(0.5, None, None)]),
        ("Alésage rayon 0,4", [(0.4, None, "radius")]),
        ("R.8", [(0.8, None, "radius")]),
        ("BREITE 2 MM", [(2.0, "mm", "width")]),
        ("6 CM", [(60.0, "mm", None)]),
        ("NO NUMBER IN M30", []),
    ],
)
def test_sizes_and_their_roles(text: str, expected: list[tuple[float, str | None, str | None]]) -> None:
    assert [(size.value, size.unit, size.role) for size in sizes(upper(text))] == expected


def test_upper_keeps_what_matters() -> None:
    assert upper("Länge  5″\tÖl ß") == 'LAENGE 5" OEL SS'
