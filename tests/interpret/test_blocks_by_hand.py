"""Blocks whose moves were worked out by hand from the rules of the code tables (trade knowledge, from memory).

The machine stands at X200 Z100 first; its reference point and machine zero lie at X300 Z200.
"""

from __future__ import annotations

from typing import Any

import pytest

from auditor.declared.model import Control, Point
from tests.interpret.programs import Row, carried_out, declared, rows

R, F, T = "R", "F", "T"
TURN = "M3 S500 F.2\nG0 X62. Z2.\n"
DRILL = "M3 S500 F.2\nG90 G0 X0 Z10.\n"
SHORT = "N10 G0 X58.\nG1 Z-10.\nN20 X62.\n"
SUB = "M30\nO100\nG0 U-5.\nM99"


def box(x: float, z: float, taper: float = 0.0) -> list[Row]:
    return [(R, x + 2 * taper, 2), (F, x, z), (F, 62, z), (R, 62, 2)]


def rough(*levels: float) -> list[Row]:
    """SHORT roughed from X62 Z2 with e = 0.5: the levels, then the profile."""
    steps: list[Row] = [(R, 62, 2)]
    for x in levels:
        steps += [(R, x, 2), (F, x, -10), (R, x + 1, -9.5), (R, x + 1, 2)]
    return [*steps, (R, 58, 2), (F, 58, -10), (F, 62, -10), (R, 62, 2)]


CASES: list[tuple[str, list[Row], dict[str, Any]]] = [
    # variables and statements
    ("#1=10.\n#2=-#1\n#3=-[#2]\nG0 X#3 Z#2", [(R, 10, -10)], {}),
    ("#1=2\n#2=3\n#[#1]=50.\nG0 X##1", [(R, 50, 100)], {}),
    ("#1=ATAN[-1]/[-1]\nG0 X#1", [(R, 225, 100)], {}),
    ("#1=ATAN[-1]/[-1]\nG0 X#1", [(R, -135, 100)], {"atan_range": "-180 to 180"}),
    ("#1=10MOD3\n#2=12AND10\n#3=12OR3\n#4=12XOR10\nG0 X#1 Z#2\nX#3 Z#4", [(R, 1, 8), (R, 15, 6)], {}),
    ("#1=BIN[18]\n#2=BCD[12]\nG0 X#1 Z#2", [(R, 12, 18)], {}),
    ("#9=1\nF.2 M3 S100\nG#9 X10.", [(F, 10, 100)], {}),
    ("while[#1le2]do1\n#1=#1+1\ng0 x[#1*10.]\nend1", [(R, 10, 100), (R, 20, 100), (R, 30, 100)], {}),
    ("DO1\n#1=#1+1\nG0 X#1\nIF[#1GE2]GOTO5\nEND1\nN5 G0 Z0", [(R, 1, 100), (R, 2, 100), (R, 2, 0)], {}),
    ("#1=20\nGOTO#1\nN10 G0 X1.\nN20 G0 X2.", [(R, 2, 100)], {}),
    ("IF [[1 EQ 1] AND [2 GT 1]] GOTO 10\nG0 X1.\nN10G0 Z2.", [(R, 200, 2)], {}),
    # codes in force, kept and restored
    ("M3 S9 F.2\nG1 X50.\n#33=#4001\nG0 X5.\nG#33 X6.", [(F, 50, 100), (R, 5, 100), (F, 6, 100)], {}),
    ("G90 G0 X50.\n#3=#4003\nG91 X1.\nG#3 X5.", [(R, 50, 100), (R, 51, 100), (R, 5, 100)], {"system": "B"}),
    ("G20 G0 X1.\n#6=#4006\nG21 X9.\nG#6 X2.", [(R, 25.4, 100), (R, 9, 100), (R, 50.8, 100)], {}),
    # calls
    ("G65 P100 K1. I2. J3. I7.\nM30\nO100\nG0 X#6 Z#4\nX#5 Z#7\nM99", [(R, 1, 2), (R, 3, 7)], {}),
    (f"M98 P100 L2\n{SUB}", [(R, 195, 100), (R, 190, 100)], {}),
    (f"M98 P20100\n{SUB}", [(R, 195, 100), (R, 190, 100)], {}),
    ("#1=3.\nM98 P100\nG0 X#1\nM30\nO100\n#1=7.\nM99", [(R, 7, 100)], {}),
    ("#1=3.\nG65 P100 A5.\nG0 X#1\nM30\nO100\n#1=9.\nM99", [(R, 3, 100)], {}),
    ("G66 P100 A5.\nG0 X50.\nG67\nZ0\nM30\nO100\nG0 U-#1\nM99", [(R, 50, 100), (R, 45, 100), (R, 45, 0)], {}),
    ("M98 H100\nG0 Z0\nM30\nN100 G0 X10.\nM99", [(R, 10, 100), (R, 10, 0)], {}),
    ("M98 Q100\nG0 Z0\nM30\nN100 G0 X10.\nM99", [(R, 10, 100), (R, 10, 0)], {}),
    ("M98 P100\nN10 G0 X1.\nN20 G0 X2.\nM30\nO100\nM99 P20", [(R, 2, 100)], {}),
    # where the tool stands
    ("G0 X40. Z2.\nG50 U10. W5.\nG0 X40. Z2.", [(R, 40, 2), (R, 40, 2)], {}),
    ("G0 X40. Z2.\nG52 X10. Z-3.\nG0 X40. Z2.", [(R, 40, 2), (R, 50, -1)], {}),
    ("G0 X40. Z2.\nG28 U10.\nG28 W0", [(R, 40, 2), (R, 50, 2), (R, 300, 2), (R, 300, 200)], {}),
    ("G90 G0 X40. Z2.\nG91 G28 X0 Z0\nG90 G0 X5. Z3.", [(R, 40, 2), (R, 300, 200), (R, 5, 3)], {"system": "B"}),
    ("G0 X40. Z2.\nG53 X-100. Z-50.", [(R, 40, 2), (R, 200, 150)], {}),
    (
        "M3 S9 F.2\nG0 X40. Z2.\nG1 G53 X-20. Z-10.\nG0 X5.",
        [(R, 40, 2), (F, 280, 190), (R, 5, 190)],
        {"machine_position_move": "active"},
    ),
    ("G20\nG0 X1. Z1.\nG21\nX25. Z2.", [(R, 25.4, 25.4), (R, 25, 2)], {}),
    ("G0 X10000 Z5000", [(R, 100, 50)], {"increment": 0.01, "whole_numbers": "increments"}),
    # single cycles
    (TURN + "G90 U-6. W-32.\nU-12.\nU-12. W-20.", [(R, 62, 2), *box(56, -30), *box(50, -30), *box(50, -18)], {}),
    (TURN + "G90 X56. Z-30.\nG4 X1.\nX50.\nM8\nX46.", [(R, 62, 2), *box(56, -30), *box(50, -30), *box(46, -30)], {}),
    (TURN + "G90 X56. Z-30. R-2.\nX50. R0\nX48.", [(R, 62, 2), *box(56, -30, -2), *box(50, -30), *box(48, -30)], {}),
    (TURN + "G90 X56. Z-30. R-2.\nX50.", [(R, 62, 2), *box(56, -30, -2), *box(50, -30)], {"taper_stays": False}),
    (TURN + "G90 X56. Z-30. I-2.", [(R, 62, 2), *box(56, -30, -2)], {"taper_letter": "I or K"}),
    # roughing
    (TURN + "G71 U1.5 R.5\nG71 P10 Q20\n" + SHORT, [(R, 62, 2), *rough(59)], {}),
    (TURN + "G71 P10 Q20 D1.5 U0 W0\n" + SHORT, [(R, 62, 2), *rough(59)], {}),
    (TURN + "G71 P10 Q20 D1 U0 W0\n" + SHORT, [(R, 62, 2), *rough(60)], {"cycle_depth_word": "units"}),
    (TURN + "G71 U1. R.5\nG71 P10 Q20\nM30\n" + SHORT + "G0 X70.", [(R, 62, 2), *rough(60), (R, 70, 2)], {}),
    ("N10 M3 S500\nN20 F.2\n" + TURN + "G71 U1. R.5\nG71 P10 Q20\n" + SHORT, [(R, 62, 2), *rough(60)], {}),
    (
        TURN + "G73 U4. W2. R2\nG73 P10 Q20 U0 W0\n" + SHORT,
        [(R, 62, 2), (R, 70, 4), (R, 66, 4), (F, 66, -8), (F, 70, -8), *rough()],
        {},
    ),
    (
        TURN + "G72 W1. R.2\nG72 P10 Q20 U0 W0\nN10 G0 Z0\nG1 X20.\nN20 Z2.",
        [
            *[(R, 62, 2), (R, 62, 2), (R, 62, 1), (F, 20, 1), (R, 20.4, 1.2), (R, 62, 1.2)],
            *[(R, 62, 0), (F, 20, 0), (F, 20, 2), (R, 62, 2)],
        ],
        {},
    ),
    # a profile that ends further out than the start: the wall is followed to the level of the start, once
    (
        TURN + "G71 U1. R.5\nG71 P10 Q20\nN10 G0 X58. W0\nG1 Z-4.\nX62. Z-6.\nN20 X64.",
        [
            *[(R, 62, 2), (R, 62, 2), (R, 60, 2), (F, 60, -5), (F, 62, -6), (R, 63, -6), (R, 63, 2)],
            *[(R, 58, 2), (F, 58, -4), (F, 62, -6), (F, 64, -6), (R, 62, 2)],
        ],
        {},
    ),
    # drilling
    (DRILL + "G83 Z-20. R-7. K2", [(R, 0, 10)] + [(R, 0, 3), (F, 0, -20), (R, 0, 3), (R, 0, 10)] * 2, {"system": "A"}),
    (
        DRILL + "G99 G83 Z-20. R3.\nG98 Z-30.",
        [(R, 0, 10), (R, 0, 3), (F, 0, -20), (R, 0, 3), (F, 0, -30), (R, 0, 3), (R, 0, 10)],
        {"system": "B"},
    ),
    (
        DRILL + "G91 G99 G83 Z-23. R-7. K2",
        [(R, 0, 10), (R, 0, 3), (F, 0, -20), (R, 0, 3), (F, 0, -20), (R, 0, 3)],
        {"system": "B"},
    ),
    # threads
    ("M3 S9\nG0 X40. Z1.\nG32 W-20. U2. F2.\nW-5.", [(R, 40, 1), (T, 42, -19), (T, 42, -24)], {}),
]


def control_of(given: dict[str, Any]) -> Control:
    fields = {key: given[key] for key in ("system", "increment", "whole_numbers") if key in given}
    settings = {key: value for key, value in given.items() if key not in fields}
    return Control(system_declared=True, units="mm", settings=settings, **fields)


@pytest.mark.parametrize(("text", "wanted", "given"), CASES, ids=range(len(CASES)))
def test_moves_by_hand(text: str, wanted: list[Row], given: dict[str, Any]) -> None:
    if given.get("system") == "A":
        text = text.replace("G90 ", "")
    job = declared(control_of(given), start=Point(100.0, 100.0), fixed=Point(200.0, 150.0))
    found = carried_out(text, job)
    assert found.not_audited == ()
    assert [kind for kind, _, _ in rows(found)] == [kind for kind, _, _ in wanted]
    for one, other in zip(rows(found), wanted, strict=True):
        assert one[1:] == pytest.approx(other[1:], abs=1e-9)
