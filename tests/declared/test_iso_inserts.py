"""Insert codes against the letter tables of ISO 1832 and ANSI B212.4, and against plane geometry."""

from __future__ import annotations

import contextlib
import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.declared.iso_inserts import (
    CLEARANCE_ANGLE,
    EDGE_CONDITIONS,
    CodeError,
    decode_insert,
)
from auditor.declared.iso_sizes import edge_length
from tests.declared.published import by_id, rows

CODES = rows("iso_codes.csv")


def table(name: str) -> list[dict[str, str]]:
    found = [row for row in CODES if row["table"] == name]
    assert found
    return found


@pytest.mark.parametrize("row", table("included angle"), ids=by_id)
def test_shape_letter_gives_the_included_angle(row):
    letter = row["letter"]
    digits = "16" if letter in "ABKL" else f"{math.floor(edge_length(letter, 12.7)):02d}"
    assert decode_insert(f"{letter}NMG {digits}0408").included_angle == float(row["expected"])


@pytest.mark.parametrize("row", table("clearance angle"), ids=by_id)
def test_clearance_letter(row):
    assert decode_insert(f"C{row['letter']}MT 120408").clearance_angle == float(row["expected"])


def test_letter_o_leaves_the_clearance_open():
    assert decode_insert("COMT 120408").clearance_angle is None


@pytest.mark.parametrize("row", table("edge length"), ids=by_id)
def test_edge_length_from_the_inscribed_circle(row):
    circle = float(row["inscribed_circle_mm"])
    assert edge_length(row["letter"], circle) == pytest.approx(float(row["expected"]), abs=float(row["tolerance"]))


@pytest.mark.parametrize("row", table("thickness"), ids=by_id)
def test_thickness(row):
    insert = decode_insert(f"CNMG 12 {row['letter']} 08")
    assert insert.thickness == pytest.approx(float(row["expected"]), abs=float(row["tolerance"]))


@pytest.mark.parametrize("row", table("corner radius"), ids=by_id)
def test_corner_radius(row):
    assert decode_insert(f"CNMG 1204{row['letter']}").corner_radius == pytest.approx(float(row["expected"]))


def test_corner_radius_of_the_inch_form():
    (row,) = table("corner radius, inch")
    radius = decode_insert(f"CNMG 43{row['letter']}").corner_radius
    assert radius == pytest.approx(float(row["expected"]), abs=float(row["tolerance"]))


@pytest.mark.parametrize("row", rows("iso_codes_sizes.csv"), ids=by_id)
def test_size_digits_give_the_standard_circle_and_its_edge(row):
    corner = "00" if row["shape"] == "R" else "08"
    insert = decode_insert(f"{row['shape']}NMG {row['digits']}04{corner}")
    assert insert.inscribed_circle == pytest.approx(float(row["inscribed_circle_mm"]))
    if row["edge_length_mm"]:  # printed to two digits, in some cells to one
        assert insert.edge_length == pytest.approx(float(row["edge_length_mm"]), abs=0.05)


# Geometry, worked with corner points instead of the closed forms: a tangential polygon has its corners at
# r / sin(half corner angle) from the centre of its inscribed circle of radius r.
def corners(angles: list[float], circle: float) -> list[tuple[float, float]]:
    turned, points = 0.0, []
    for index, angle in enumerate(angles):
        reach = circle / 2.0 / math.sin(math.radians(angle) / 2.0)
        points.append((reach * math.cos(turned), reach * math.sin(turned)))
        following = angles[(index + 1) % len(angles)]
        turned += math.radians((180.0 - angle) / 2.0 + (180.0 - following) / 2.0)
    assert turned == pytest.approx(2.0 * math.pi)
    return points


@pytest.mark.parametrize(
    ("shape", "angles"),
    [
        ("C", [80.0, 100.0] * 2),
        ("D", [55.0, 125.0] * 2),
        ("E", [75.0, 105.0] * 2),
        ("M", [86.0, 94.0] * 2),
        ("V", [35.0, 145.0] * 2),
        ("W", [80.0, 160.0] * 3),
        ("S", [90.0] * 4),
        ("T", [60.0] * 3),
        ("P", [108.0] * 5),
        ("H", [120.0] * 6),
        ("O", [135.0] * 8),
    ],
)
def test_edge_length_is_that_of_the_polygon_round_the_circle(shape, angles):
    points = corners(angles, 12.7)
    sides = [math.dist(here, there) for here, there in zip(points, points[1:] + points[:1], strict=True)]
    assert sides == pytest.approx([sides[0]] * len(sides))
    assert edge_length(shape, 12.7) == pytest.approx(sides[0], rel=1e-4)


@pytest.mark.parametrize("row", rows("iso_codes_twins.csv"), ids=by_id)
def test_inch_code_and_its_metric_twin_are_one_insert(row):
    inch, metric = decode_insert(row["inch"]), decode_insert(row["metric"])
    assert (inch.form, metric.form) == ("inch", "metric")
    assert (inch.shape, inch.clearance_angle, inch.faces) == (metric.shape, metric.clearance_angle, metric.faces)
    assert inch.inscribed_circle == pytest.approx(metric.inscribed_circle, abs=0.001)
    assert inch.thickness == pytest.approx(metric.thickness, abs=0.01)
    assert inch.corner_radius == pytest.approx(metric.corner_radius, abs=0.016)  # 3/64 in against 1.2 mm


def test_small_inch_sizes_are_counted_in_32nds():
    """Under 1/4 in a plain 7 is 7/32 in and the thickness follows: common practice for small boring inserts."""
    small = decode_insert("TPG 731")
    assert small.inscribed_circle == pytest.approx(7 / 32 * 25.4, abs=0.001)
    assert small.thickness == pytest.approx(3 / 32 * 25.4, abs=0.001)
    assert small.notes


@pytest.mark.parametrize(
    ("fixing", "hole", "breaker", "faces"),  # ISO 1832 position 4, from memory
    [
        ("N", False, False, 2), ("R", False, True, 1), ("F", False, True, 2), ("A", True, False, 2),
        ("M", True, True, 1), ("G", True, True, 2), ("W", True, False, 1), ("T", True, True, 1),
        ("Q", True, False, 2), ("U", True, True, 2), ("B", True, False, 1), ("H", True, True, 1),
        ("C", True, False, 2), ("J", True, True, 2), ("X", None, None, None),
    ],
)  # fmt: skip
def test_fixing_letter(fixing, hole, breaker, faces):
    insert = decode_insert(f"SNM{fixing} 120408")
    assert (insert.has_hole, insert.breaker, insert.faces) == (hole, breaker, faces)


def test_an_insert_with_clearance_has_one_cutting_face():
    assert decode_insert("SPGN 120308").faces == 1
    assert decode_insert("SNGN 120308").faces == 2


@pytest.mark.parametrize("code", ["CNMG120408", "CNMG 12 04 08", "cnmg-120408", " C N M G 12 04 08 ", "CNMG_1204_08"])
def test_blanks_dashes_and_case_do_not_matter(code):
    plain, written = decode_insert("CNMG 120408"), decode_insert(code)
    assert (written.inscribed_circle, written.corner_radius, written.maker_code) == (
        plain.inscribed_circle, plain.corner_radius, None,
    )  # fmt: skip


@pytest.mark.parametrize(
    ("code", "diameter"),
    [("RCMT 1003M0", 10.0), ("RCMX 1204M0", 12.0), ("RNMG 120400", 12.7), ("RCGT 0602M0", 6.0), ("RNMG 090300", 9.525)],
)
def test_round_inserts_say_their_diameter(code, diameter):
    """M0 marks the metric series, 00 the inch series."""
    insert = decode_insert(code)
    assert insert.inscribed_circle == pytest.approx(diameter)
    assert insert.corner_radius == pytest.approx(diameter / 2.0)
    assert insert.included_angle is None


@pytest.mark.parametrize(
    ("code", "edge", "hand", "width", "angle", "maker"),
    [
        ("SNGN 120408 T02020", "chamfered", None, 0.20, 20.0, None),
        ("SNGN 120408 T 02020", "chamfered", None, 0.20, 20.0, None),
        ("CNGA120408S01025", "chamfered and honed", None, 0.10, 25.0, None),
        ("CNGA 120408 TN01020", "chamfered", "neutral", 0.10, 20.0, None),
        ("SNG 432 T0820", "chamfered", None, 0.2032, 20.0, None),  # inch: 0.008 in at 20 deg
        ("TNMG 160408 ER", "honed", "right", None, None, None),
        ("CCGT 09T304 FL", "sharp", "left", None, None, None),
        ("CNMG 120408-PM", None, None, None, None, "PM"),
        ("CNMG 120408-F", None, None, None, None, "F"),  # after a dash: a maker's name, not the letter of the edge
        ("CNMG 120408 PR", None, None, None, None, "PR"),
        ("CNMG 120408 EN-MF2", "honed", "neutral", None, None, "MF2"),
        ("KNUX 160405 R11", None, "right", None, None, "11"),
    ],
)
def test_edge_hand_and_chamfer(code, edge, hand, width, angle, maker):
    insert = decode_insert(code)
    assert (insert.edge_condition, insert.hand, insert.maker_code) == (edge, hand, maker)
    assert (insert.chamfer_width, insert.chamfer_angle) == (pytest.approx(width), pytest.approx(angle))


@pytest.mark.parametrize(
    ("code", "position", "found"),
    [
        ("", "letter 1", ""),
        ("XNMG 120408", "letter 1", "X"),
        ("CXMG 120408", "letter 2", "X"),
        ("CNXG 120408", "letter 3", "X"),
        ("CNMD 120408", "letter 4", "D"),
        ("CNMG", "size", ""),
        ("CNMG 990408", "position 5", "99"),
        ("CNMG 121908", "position 6", "19"),
        ("CNMG 1204M0", "position 7", "M0"),
        ("RCMT 100308", "position 7", "08"),
        ("CNMG 1204080", "after position 7", "0"),
        ("CNGA 120408 T020", "chamfer", "020"),
        ("CNMG 438.5", "size", "438.5"),
        ("CNMG 932", "position 5", "9"),
        ("KNUX 432", "position 5", "4"),
    ],
)
def test_a_code_that_cannot_be_read_says_where(code, position, found):
    with pytest.raises(CodeError) as caught:
        decode_insert(code)
    assert position in caught.value.position
    assert caught.value.found == found
    assert caught.value.wanted


@given(st.text(max_size=24))
def test_any_text_is_read_or_refused(text):
    with contextlib.suppress(CodeError):
        assert decode_insert(text).edge_length > 0.0


@given(st.from_regex(r"\A[A-Z]{3,4}[ -]?[0-9T.M]{2,7}[ -]?[A-Z0-9-]{0,8}\Z"))
def test_near_codes_are_read_or_refused(text):
    try:
        insert = decode_insert(text)
    except CodeError:
        return
    assert insert.edge_length > 0.0
    assert insert.thickness > 0.0


LETTERS = st.tuples(*map(st.sampled_from, ("CDSTVW", [*CLEARANCE_ANGLE], "CEGMU", "NRFAMGWTQUBHCJ")))


@given(LETTERS, st.sampled_from(["04", "06", "T3"]), st.integers(0, 32), st.sampled_from([*EDGE_CONDITIONS, ""]))
def test_what_is_written_is_read_back(letters, thickness, corner, edge):
    digits = {"C": "12", "D": "15", "S": "12", "T": "22", "V": "22", "W": "08"}[letters[0]]
    insert = decode_insert("".join(letters) + f" {digits}{thickness}{corner:02d}{edge}")
    assert (insert.shape, insert.tolerance, insert.fixing) == (letters[0], letters[2], letters[3])
    assert insert.inscribed_circle == pytest.approx(12.7)
    assert insert.corner_radius == pytest.approx(corner / 10.0)
    assert insert.edge_condition == EDGE_CONDITIONS.get(edge)
