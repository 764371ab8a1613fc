"""Holder codes against the letter tables of ISO 5608 and ISO 6261."""

from __future__ import annotations

import contextlib

import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.declared.iso_codes import CodeError
from auditor.declared.iso_holders import decode_holder
from tests.declared.published import by_id, rows

STYLES = [row for row in rows("iso_codes.csv") if row["table"] == "cutting edge angle"]
HOLDER_ROWS = rows("iso_codes_holders.csv")


@pytest.mark.parametrize("row", STYLES, ids=by_id)
def test_style_letter_gives_the_cutting_edge_angle(row):
    for code in (f"PC{row['letter']}NR 2525 M12", f"S25T-PC{row['letter']}NR 12"):
        angle = decode_holder(code).cutting_edge_angle
        assert angle == pytest.approx(float(row["expected"]), abs=float(row["tolerance"]))


@pytest.mark.parametrize("style", "XZ")
def test_styles_that_fix_no_angle_say_so(style):
    holder = decode_holder(f"SC{style}CR 2525 M12")
    assert holder.cutting_edge_angle is None
    assert "cutting_edge_angle" in holder.notes[0]


@pytest.mark.parametrize("row", [row for row in HOLDER_ROWS if row["table"] == "length"], ids=by_id)
def test_length_letter(row):
    assert decode_holder(f"PCLNR 2525 {row['letter']}12").length == float(row["value_mm"])
    assert decode_holder(f"S25{row['letter']}-PCLNR 12").length == float(row["value_mm"])


@pytest.mark.parametrize("row", [row for row in HOLDER_ROWS if row["table"] == "bar"], ids=by_id)
def test_bar_letter(row):
    bar = decode_holder(f"{row['letter']}25T-PCLNR 12")
    assert (bar.kind, bar.bar_diameter, bar.bar_material) == ("bar", 25.0, row["material"])
    assert (bar.damped, bar.coolant) == (row["damped"] == "yes", row["coolant"] == "yes")


@pytest.mark.parametrize(
    "code", ["PCLNR 2525 M12", "PCLNR2525M12", "pclnr-2525-m-12", "PCLNR 25 25 M 12", " P C L N R 2525 M12"]
)
def test_blanks_dashes_and_case_do_not_matter(code):
    holder = decode_holder(code)
    assert (holder.clamp, holder.insert_shape, holder.style, holder.clearance, holder.hand) == (
        "P", "C", "L", "N", "right",
    )  # fmt: skip
    assert (holder.shank_height, holder.shank_width, holder.length, holder.insert_size) == (25.0, 25.0, 150.0, "12")


@pytest.mark.parametrize(
    ("code", "height", "width", "length", "size"),
    [
        ("PCLNR2525-12", 25.0, 25.0, None, "12"),
        ("MDJNL 2020K15", 20.0, 20.0, 125.0, "15"),
        ("SCLCR 0810 D06", 8.0, 10.0, 60.0, "06"),
        ("PSBNR 3225 P12", 32.0, 25.0, 170.0, "12"),
        ("CKJNR 2525 X16", 25.0, 25.0, None, "16"),  # X: special length
    ],
)
def test_shank(code, height, width, length, size):
    holder = decode_holder(code)
    assert (holder.shank_height, holder.shank_width, holder.length, holder.insert_size) == (height, width, length, size)


@pytest.mark.parametrize(("letter", "hand"), [("R", "right"), ("L", "left"), ("N", "neutral")])
def test_hand(letter, hand):
    assert decode_holder(f"SVVB{letter} 2525 M16").hand == hand
    assert decode_holder(f"A20R-SCLC{letter}09").hand == hand


def test_end_styles_of_a_cross_standing_shank_are_measured_from_the_x_feed():
    """ISO 5608: C F K U W Y cut with the end; the feed runs along the shank. A bar lies along Z."""
    ends = {style for style in "ABCDEFGHJKLMNRSTUVWY" if decode_holder(f"PC{style}NR 2525 M12").end_style}
    assert ends == set("CFKUWY")
    assert not decode_holder("C12M-SDUCR 07").end_style


@pytest.mark.parametrize(
    ("code", "included"),
    [("SVVBN 2525 M16", 35.0), ("DDPNN 2525 M15", 55.0), ("SSDCN 2020 K12", 90.0), ("MTENN 2525 M22", 60.0)],
)
def test_a_neutral_holder_shows_both_edges_alike(code, included):
    """Both edges at the same angle to the feed: kappa = (180 - included angle) / 2. Geometry."""
    assert decode_holder(code).cutting_edge_angle == pytest.approx((180.0 - included) / 2.0)


@pytest.mark.parametrize(
    ("code", "position", "found"),
    [
        ("", "clamping", ""),
        ("QCLNR 2525 M12", "clamping", "Q"),
        ("PQLNR 2525 M12", "shape", "Q"),
        ("PCINR 2525 M12", "style", "I"),
        ("PCLXR 2525 M12", "clearance", "X"),
        ("PCLNX 2525 M12", "hand", "X"),
        ("PCLNR", "shank", ""),
        ("PCLNR 25 M12", "shank", "25 M12"),
        ("PCLNR 2525 O12", "length", "O"),
        ("K25T-PCLNR 12", "bar", "K"),
        ("S250T-PCLNR 12", "bar diameter", "250"),
        ("S25I-PCLNR 12", "length", "I"),
        ("PCLNR 0000 M12", "shank", "0000"),
        ("S25T-PCLNR 125", "insert size", "125"),
    ],
)
def test_a_code_that_cannot_be_read_says_where(code, position, found):
    with pytest.raises(CodeError) as caught:
        decode_holder(code)
    assert position in caught.value.position
    assert caught.value.found == found
    assert caught.value.wanted


@given(st.text(max_size=24))
def test_any_text_is_read_or_refused(text):
    with contextlib.suppress(CodeError):
        assert decode_holder(text).hand


@given(st.from_regex(r"\A([A-K][0-9]{2}[A-Z]?[ -]?)?[A-Z]{4,5}[ -]?[0-9]{2,5}[ -]?[A-Z]?[0-9]{0,3}\Z"))
def test_near_codes_are_read_or_refused(text):
    try:
        holder = decode_holder(text)
    except CodeError:
        return
    assert (holder.bar_diameter or holder.shank_height) > 0.0
