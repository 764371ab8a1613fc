"""Comments about work and tools, in five languages, by what a setter would read out of them."""

from __future__ import annotations

import pytest

from auditor.draft.sayings import Saying
from auditor.draft.sizes import upper
from auditor.draft.tool_words import tool_said
from auditor.draft.work_words import work_said

WORK = [
    ("MATERIAL: 6061 AL", {"material": "EN AW-6061"}),
    ("MATERIAL - 4140 HT 28-32 RC", {"material": "42CrMo4"}),
    ("MATERIAL: 17-4 PH H900", {"material": "X5CrNiCuNb16-4"}),
    ("WERKSTOFF 1.4305 D60 X 100", {"material": "X8CrNiS18-9", "diameter": "60 mm", "length": "100 mm"}),
    ("MATIERE: LAITON", {"material": "brass"}),
    ("MATERIALE: ACCIAIO INOX 316L", {"material": "X2CrNiMo17-12-2"}),
    ("BARRA DE 40 LATON", {"material": "brass", "diameter": "40 mm"}),
    ("STOCK 2.5 IN DIA 304 SS", {"material": "X5CrNi18-10", "diameter": "2.5 in"}),
    ("BRUT: PHI50 X 52MM", {"diameter": "50 mm", "length": "52 mm"}),
    ("4.5OD X 2.75 ID X .53L", {"diameter": "4.5 mm", "bore": "2.75 mm", "length": "0.53 mm"}),
    ("STOCK SIZE 2.0 X 6.0", {"diameter": "2 mm", "length": "6 mm"}),
    ("ROHTEIL: RD 60 X 125", {"diameter": "60 mm", "length": "125 mm"}),
    ("304SS BAR 1.25 IN DIA", {"material": "X5CrNi18-10", "diameter": "1.25 in"}),
    ("SAFETY: CHUCK PRESSURE 20 BAR", {"workholding.kind": "chuck"}),
    ("TUBE 50X30X100", {"diameter": "50 mm", "bore": "30 mm", "length": "100 mm"}),
    ("RING BLANK D110 X 62 - CORED D48", {"diameter": "110 mm", "bore": "48 mm", "length": "62 mm"}),
    ("KNOB EN AW-6082 D40", {"material": "EN AW-6082", "diameter": "40 mm"}),
    ("CASTING GG25", {"material": "EN-GJL-250", "skin": "cast"}),
    ("STANGE 6KT 32 11SMnPb30", {"material": "11SMnPb30", "section": "hexagon", "diameter": "36.95 mm"}),
]
SILENT = ["FINISH X1.5 C15", "DRILL DIA 12 X 40 LG", "HUB - 4 MM OVER ALL", "REV2", "OP 10", "BORING BAR D20"]


def said(text: str) -> dict[str, str]:
    found = work_said([Saying(1, upper(text), text)], "mm")
    return {key.removeprefix("workpiece."): guess.word for key, guess in reversed(list(found))}


@pytest.mark.parametrize(("text", "expected"), WORK)
def test_material_and_stock(text: str, expected: dict[str, str]) -> None:
    """36.95 mm: 32 mm across flats over cos 30 deg, geometry of the hexagon."""
    assert said(text) == expected


@pytest.mark.parametrize("text", SILENT)
def test_comments_about_tools_and_cuts_are_no_stock(text: str) -> None:
    assert said(text) == {}


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("JAWS: SOFT, BORED TO 60", {"workholding.kind": "chuck", "workholding.grip_diameter": "60 mm"}),
        ("3 JAW CHUCK", {"workholding.kind": "chuck", "workholding.jaws": "3"}),
        ("MANDRIN, SERRAGE INTERIEUR", {"workholding.kind": "chuck", "workholding.grip_inside": "true"}),
        ("AUSSPANNLÄNGE 65 MM, REITSTOCK", {"workholding.kind": "chuck+tailstock", "workholding.stick_out": "65 mm"}),
        ("PINZA", {"workholding.kind": "collet"}),
        ("ENTRE POINTES", {"workholding.kind": "centres"}),
        ("MORS DURS - SORTIE 38", {"workholding.kind": "chuck", "workholding.stick_out": "38 mm"}),
    ],
)
def test_chuck(text: str, expected: dict[str, str]) -> None:
    assert said(text) == expected


@pytest.mark.parametrize(
    ("text", "kind", "values"),
    [
        ("80* ROUGH TURNING TOOL .031 TNR", "turning", {"included_angle": "80 deg", "nose_radius": "0.031 in"}),
        ("CNMG 432 OD TURN", "turning", {"insert": "CNMG 432"}),
        ("PCLNR2525-12", None, {"holder": "PCLNR2525-12"}),
        ("S20S-SCLCR09 BORE CCMT 09T304", "boring", {"insert": "CCMT 09T304", "holder": "S20S-SCLCR09"}),
        ("SCHRUPPEN CNMG120412 / PCLNR 2525 M12", "turning", {"insert": "CNMG120412", "holder": "PCLNR 2525 M12"}),
        ("EINSTICH BREITE 2 MM", "grooving", {"width": "2 mm"}),
        ("ABSTECHEN 3MM", "parting", {"width": "3 mm"}),
        ("TRONCONNAGE LARG 3", "parting", {"width": "3 mm"}),
        ("FACE GROOVE .125 IN WIDE", "face grooving", {"width": "0.125 in"}),
        ("INNENGEWINDE M20", "threading", {}),
        ("GEWINDEBOHRER M10", "drilling", {"diameter": "10 mm"}),
        ("MASCHIO M8", "drilling", {"diameter": "8 mm"}),
        ("HSS DRILL 1/2 IN", "drilling", {"diameter": "0.5 in", "substrate": "high-speed steel"}),
        ("FORET D6,8", "drilling", {"diameter": "6.8 mm"}),
        ("BORE D10 BAR R0.4", "boring", {"nose_radius": "0.4 mm", "bar_diameter": "10 mm"}),
        ("ALESAGE RAYON 0,4", "boring", {"nose_radius": "0.4 mm"}),
        ("CILINDRADO 80 GRADOS R0.8", "turning", {"included_angle": "80 deg", "nose_radius": "0.8 mm"}),
        ("STANGENANSCHLAG", "stop", {}),
        ("LH TURNING TOOL", "turning", {"hand": "left"}),
        ("STECHER 3MM", "grooving", {"width": "3 mm"}),
        ("OUTIL A CHARIOTER", "turning", {}),
        ("TRONCATORE B=3", "parting", {"width": "3 mm"}),
        ("DRILL D12 POINT 140 DEG", "drilling", {"diameter": "12 mm", "point_angle": "140 deg"}),
        ("MGMN300 GROOVE", "grooving", {}),
        ("GO HOME", None, {}),
    ],
)
def test_tools(text: str, kind: str | None, values: dict[str, str]) -> None:
    found = tool_said([Saying(1, upper(text), text, 1, marked=True)], "mm")
    assert (found.kinds[0] if found.kinds else None) == kind
    assert {key: guess.word for key, guess in found.values.items()} == values


def test_a_corner_no_insert_has_in_the_program_s_unit_is_meant_in_the_other() -> None:
    """0.031 is 1/32 in, a common corner; 0.8 mm another. An insert with a corner of 0.031 mm or 0.8 in is not made."""
    inch = tool_said([Saying(1, ".031 TNR", "")], "in").values["nose_radius"]
    metric = tool_said([Saying(1, "R0.8", "")], "in").values["nose_radius"]
    assert (inch.word, inch.sure) == ("0.031 in", "likely")
    assert (metric.word, metric.sure) == ("0.8 mm", "guess")
