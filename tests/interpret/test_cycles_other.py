"""Single, pattern, peck, thread and drilling cycles beyond the worked examples.

Expected points are worked out by hand from the rules of each cycle; the infeed law against its closed form.
"""

from __future__ import annotations

import itertools
import math
import re
from collections.abc import Mapping
from dataclasses import replace

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from auditor.declared.model import Control, Point
from auditor.interpret.cycles import find, registry
from auditor.interpret.cycles.call import CycleCall, CycleFault, Stroke
from auditor.interpret.cycles.multi_pass_thread import Infeed, depths
from auditor.interpret.moves import Feed, Kind, Spindle
from auditor.interpret.topics import TOPICS
from auditor.parse.blocks import Number

LETTERS = {Kind.RAPID: "R", Kind.FEED: "F", Kind.THREAD: "T", Kind.ARC: "A"}
TURNING = Feed("rev", 0.2)
TOPIC_NAMES = frozenset().union(*TOPICS.values())


def words(text: str) -> dict[str, Number]:
    found = re.findall(r"([A-Z])([-+]?\d*\.?\d*)", text.replace(" ", ""))
    return {letter: Number(float(value), "." in value, value) for letter, value in found}


def call(
    name: str, start: tuple[float, float], text: str, stored: Mapping[str, float] | None = None,
    control: Control | None = None, *, inch: bool = False, feed: Feed | None = TURNING,
) -> CycleCall:
    """``start`` is X as a diameter and Z."""
    return CycleCall(
        name, 1, Point(start[1], start[0] / 2), words(text), control or Control(), inch, feed,
        Spindle(1, "rpm", 800.0), stored=stored or {},
    )


def path(made: CycleCall) -> list[tuple[str, float, float]]:
    return [
        (LETTERS[stroke.kind], round(2 * stroke.end.r, 4), round(stroke.end.z, 4))
        for stroke in find(made.name)(made).strokes
    ]


def remarks(made: CycleCall) -> list[str]:
    found = [remark.topic for remark in find(made.name)(made).remarks]
    assert set(found) <= TOPIC_NAMES
    return found


def fault(made: CycleCall) -> CycleFault:
    with pytest.raises(CycleFault) as caught:
        find(made.name)(made)
    assert caught.value.topic in TOPIC_NAMES
    return caught.value


def test_registry_names() -> None:
    assert set(registry()) == {
        "turning cycle", "facing cycle", "thread cycle", "rough turning", "rough facing", "pattern repeating",
        "finishing", "peck along z", "peck along x", "multi-pass thread", "drill", "tap", "bore",
    }
    with pytest.raises(KeyError):
        find("planing")


# --- single cycles ----------------------------------------------------------------------------------


def test_turning_cycle_in_a_bore_away_from_the_chuck() -> None:
    made = call("turning cycle", (28.0, -42.0), "X34. Z2. R1.")
    assert path(made) == [("R", 36.0, -42.0), ("F", 34.0, 2.0), ("F", 28.0, 2.0), ("R", 28.0, -42.0)]


def test_words_of_a_single_cycle_hold_for_the_next_block() -> None:
    first = find("turning cycle")(call("turning cycle", (64.0, 2.0), "X60. Z-30. R-4."))
    follow_up = call("turning cycle", (64.0, 2.0), "X54.", first.stored)
    assert path(follow_up) == [("R", 46.0, 2.0), ("F", 54.0, -30.0), ("F", 64.0, -30.0), ("R", 64.0, 2.0)]
    assert "taper_stays" in find("turning cycle")(follow_up).leaned_on
    cleared = replace(follow_up, words=words("X54. R0."))
    assert path(cleared)[0] == ("R", 54.0, 2.0)
    resets = replace(follow_up, control=Control(settings={"taper_stays": False}))
    assert path(resets)[0] == ("R", 54.0, 2.0)


def test_incremental_words_count_from_the_start() -> None:
    assert path(call("turning cycle", (62.0, 2.0), "U-6. W-32."))[1] == ("F", 56.0, -30.0)
    incremental = replace(call("turning cycle", (62.0, 2.0), "X-6. Z-32."), absolute=False)
    assert path(incremental)[1] == ("F", 56.0, -30.0)


def test_older_taper_words() -> None:
    assert path(call("turning cycle", (64.0, 2.0), "X60. Z-30. I-4."))[0] == ("R", 52.0, 2.0)
    assert path(call("facing cycle", (64.0, 3.0), "X20. Z-3. K-4."))[0] == ("R", 64.0, -7.0)


def test_inch_and_radius_words() -> None:
    made = call("facing cycle", (101.6, 2.54), "X1. Z-.1", inch=True)
    assert path(made)[1] == ("F", 25.4, -2.54)
    made = call("turning cycle", (62.0, 2.0), "X28. Z-30.", control=Control(x_words="radius"))
    assert path(made)[1] == ("F", 56.0, -30.0)
    made = call("turning cycle", (62.0, 2.0), "X56000 Z-30000", control=Control(whole_numbers="increments"))
    assert path(made)[1] == ("F", 56.0, -30.0)


def test_run_out_ends_at_the_start_diameter_when_there_is_no_room_for_it() -> None:
    made = call("thread cycle", (21.0, 6.0), "X19.2 Z-25. F1.5", control=Control(settings={"thread_run_out": 1.0}))
    assert path(made) == [("R", 19.2, 6.0), ("T", 19.2, -23.5), ("T", 21.0, -25.0), ("R", 21.0, 6.0)]


def test_run_out_of_an_inside_thread_at_60_degrees() -> None:
    control = Control(settings={"thread_run_out": 1.0, "thread_run_out_angle": 60.0})
    made = call("thread cycle", (16.0, 6.0), "X24. Z-25. F1.", control=control)
    assert path(made)[2] == ("T", round(24.0 - 2 * math.sqrt(3.0), 4), -25.0)


def test_thread_lead_comes_from_the_block_then_from_the_block_before() -> None:
    first = find("thread cycle")(call("thread cycle", (24.0, 5.0), "X19.2 Z-20. F1.5"))
    assert [stroke.lead for stroke in first.strokes if stroke.kind is Kind.THREAD] == [1.5]
    second = find("thread cycle")(call("thread cycle", (24.0, 5.0), "X18.7", first.stored, feed=Feed("min", 100.0)))
    assert [stroke.lead for stroke in second.strokes if stroke.kind is Kind.THREAD] == [1.5]
    inch = find("thread cycle")(call("thread cycle", (25.4, 5.0), "X.75 Z-1. F.0625", inch=True))
    assert inch.stored["lead"] == pytest.approx(1.5875)  # 16 threads an inch
    assert fault(call("thread cycle", (24.0, 5.0), "X19.2 Z-20.", feed=None)).topic == "feed-missing"
    assert fault(call("thread cycle", (24.0, 5.0), "X19.2 Z-20. F0.")).topic == "feed-zero"


def test_a_single_cycle_that_goes_nowhere() -> None:
    assert fault(call("turning cycle", (62.0, 2.0), "X62. Z2.")).topic == "cycle-depth"


# --- pattern repeating ------------------------------------------------------------------------------


def patterned(text: str, stored: Mapping[str, float] | None = None, control: Control | None = None) -> CycleCall:
    profile = (
        Stroke(Kind.RAPID, Point(1.0, 10.0), line=5),
        Stroke(Kind.FEED, Point(-20.0, 10.0), feed=Feed("rev", 0.1), line=6),
        Stroke(Kind.FEED, Point(-20.0, 20.0), line=7),
    )
    return replace(call("pattern repeating", (70.0, 5.0), text, stored, control), profile=profile)


def test_pattern_shares() -> None:
    # 4 passes: 3/3 2/3 1/3 0/3 of the shift, or 3/4 2/4 1/4 0/4
    stored = find("pattern repeating")(call("pattern repeating", (70.0, 5.0), "U6. W3. R4")).stored
    passes = path(patterned("P10 Q20 U0.8 W0.2", stored))
    cylinders = [x for kind, x, z in passes if kind == "F" and z < -10][::2]
    assert cylinders == [20.8 + 12, 20.8 + 8, 20.8 + 4, 20.8]
    one_in = patterned("P10 Q20 U0.8 W0.2", stored, Control(settings={"pattern_first_pass": "one step in"}))
    cylinders = [x for kind, x, z in path(one_in) if kind == "F" and z < -10][::2]
    assert cylinders == [20.8 + 9, 20.8 + 6, 20.8 + 3, 20.8]


def test_pattern_of_one_pass_and_one_block_form() -> None:
    stored = {"shift_r": 6.0, "shift_z": 3.0, "passes": 1.0}
    assert path(patterned("P10 Q20 U0. W0.", stored))[:2] == [("R", 70.0, 5.0), ("R", 20.0, 1.0)]
    assert path(patterned("P10 Q20 I6. K3. U0. W0. D2"))[0] == ("R", 82.0, 8.0)


def test_pattern_ignores_feeds_and_lines_of_the_profile() -> None:
    strokes = find("pattern repeating")(patterned("P10 Q20", {"shift_r": 6.0, "passes": 2.0})).strokes
    assert {stroke.feed for stroke in strokes} == {None}
    assert {stroke.line for stroke in strokes} == {None}


def test_pattern_faults_and_signs() -> None:
    assert fault(patterned("P10 Q20 U0.8 W0.2")).topic == "cycle-depth"
    assert fault(patterned("P10 Q20", {"shift_r": 6.0, "passes": 0.0})).topic == "cycle-depth"
    missing = replace(patterned("P10 Q20", {"shift_r": 6.0, "passes": 2.0}), profile=())
    assert fault(missing).topic == "cycle-profile-missing"
    assert remarks(patterned("P10 Q20 U0.8", {"shift_r": 6.0, "passes": 2.0})) == []
    assert remarks(patterned("P10 Q20 U0.8", {"shift_r": -6.0, "passes": 2.0})) == ["cycle-allowance-sign"]
    assert remarks(patterned("P10 Q20 U-0.8", {"shift_r": 6.0, "passes": 2.0})) == ["cycle-allowance-sign"]


# --- pecking ----------------------------------------------------------------------------------------


def test_groove_inside_a_bore_away_from_the_chuck() -> None:
    made = call("peck along x", (30.0, -20.0), "X40. Z-18. P3000 Q1500", {"retract": 0.4})
    assert path(made) == [
        ("F", 36.0, -20.0), ("R", 35.2, -20.0), ("F", 40.0, -20.0), ("R", 30.0, -20.0),
        ("R", 30.0, -18.5), ("F", 36.0, -18.5), ("R", 35.2, -18.5), ("F", 40.0, -18.5), ("R", 30.0, -18.5),
        ("R", 30.0, -18.0), ("F", 36.0, -18.0), ("R", 35.2, -18.0), ("F", 40.0, -18.0), ("R", 30.0, -18.0),
        ("R", 30.0, -20.0),
    ]


def test_face_groove_in_one_stroke_each() -> None:
    made = call("peck along z", (50.0, 2.0), "X46. Z-6. P2000", {"retract": 0.5})
    assert path(made) == [
        ("F", 50.0, -6.0), ("R", 50.0, 2.0), ("R", 46.0, 2.0), ("F", 46.0, -6.0), ("R", 46.0, 2.0), ("R", 50.0, 2.0),
    ]


def test_peck_that_divides_the_depth_exactly() -> None:
    made = call("peck along z", (0.0, 0.0), "Z-30. Q10000", {"retract": 1.0})
    assert [z for kind, _, z in path(made) if kind == "F"] == [-10.0, -20.0, -30.0]


def test_peck_in_inches_counts_ten_thousandths() -> None:
    made = call("peck along z", (0.0, 2.54), "Z-.9 Q5000", {"retract": 1.0}, inch=True)
    assert [z for kind, _, z in path(made) if kind == "F"] == [2.54 - 12.7, -22.86]


def test_retract_of_a_peck_cycle() -> None:
    first = find("peck along z")(call("peck along z", (0.0, 2.0), "R0.7"))
    assert (first.strokes, first.stored) == ((), {"retract": 0.7})
    made = call("peck along z", (0.0, 2.0), "Z-20. Q8000")
    assert path(made)[1] == ("R", 0.0, -5.5)
    assert find("peck along z")(made).leaned_on == ("peck_retract",)


def test_peck_faults_and_remarks() -> None:
    assert fault(call("peck along z", (50.0, 2.0), "X42. Z-6. Q4000")).words == ("P",)
    assert fault(call("peck along x", (62.0, -20.0), "X50. Z-26. P2500")).words == ("Q",)
    assert fault(call("peck along z", (50.0, 2.0), "X42. P3000 Q4000")).topic == "cycle-peck"
    assert fault(call("peck along z", (0.0, 2.0), "Z-200. Q1")).topic == "cycle-peck"
    refusing = Control(settings={"cycle_words_with_point": "refuse"})
    assert fault(call("peck along z", (0.0, 2.0), "Z-20. Q8.", control=refusing)).topic == "cycle-word-with-point"
    made = call("peck along z", (0.0, 2.0), "Z-20. Q8.")
    assert path(made)[0] == ("F", 0.0, -6.0)
    assert remarks(made) == ["cycle-word-with-point"]
    wide = call("peck along x", (62.0, -20.0), "X50. Z-26. P2500 Q3200 R0.1")
    assert remarks(replace(wide, tool_width=3.0)) == ["cycle-relief", "cycle-groove-step"]
    assert remarks(replace(wide, tool_width=4.0)) == ["cycle-relief"]


# --- multi-pass thread ------------------------------------------------------------------------------


def threaded(start: tuple[float, float], first: str, second: str, control: Control | None = None) -> CycleCall:
    stored = find("multi-pass thread")(call("multi-pass thread", start, first)).stored
    return call("multi-pass thread", start, second, stored, control)


def passes(made: CycleCall) -> list[Stroke]:
    return [stroke for stroke in find(made.name)(made).strokes if stroke.kind is Kind.THREAD]


@settings(deadline=None)
@given(height=st.floats(0.3, 4.0), first=st.floats(0.1, 0.6), share=st.floats(0.0, 0.5))
def test_equal_area_without_least_infeed(height: float, first: float, share: float) -> None:
    # closed form: the pass number is the square of depth over first depth
    allowance = round(share * height, 3)
    made = depths(Infeed(height, first, 0.0, allowance, 2))
    rough = made[:-2]
    assert len(rough) == math.ceil(((height - allowance) / first) ** 2 - 1e-6) or len(rough) == 1
    assert made[-2:] == [height, height]
    for number, depth in enumerate(rough[:-1], start=1):
        assert depth**2 == pytest.approx(number * first**2)


@settings(deadline=None)
@given(height=st.floats(0.3, 4.0), first=st.floats(0.1, 0.6), least=st.floats(0.0, 0.3),
       method=st.sampled_from([1, 2, 3, 4]))
def test_infeed_never_below_the_least_and_never_past_the_height(
    height: float, first: float, least: float, method: int
) -> None:
    made = [0.0, *depths(Infeed(height, first, least, 0.02, 1, method))]
    steps = [two - one for one, two in itertools.pairwise(made)]
    assert all(step >= min(least, first) - 1e-9 for step in steps[:-2])
    assert made[-1] == height
    assert max(made) <= height + 1e-12
    if method in (3, 4) and least <= first:
        assert steps[:-2] == pytest.approx([first] * (len(steps) - 2))


def test_inside_taper_thread_to_the_chuck() -> None:
    made = threaded((20.0, 4.0), "P010060 Q50 R0.02", "X25. Z-16. R0.5 P900 Q300 F1.5")
    one = passes(made)[0]
    assert one.thread_depth == 0.3
    assert 2 * one.end.r == pytest.approx(25.0 - 2 * 0.6)
    strokes = find(made.name)(made).strokes
    infeed = strokes[1].end  # behind the shift
    assert infeed.r == pytest.approx(one.end.r + 0.5 * (infeed.z + 16.0) / 20.0)
    assert 2 * passes(made)[-1].end.r == pytest.approx(25.0)


def test_straight_plunge_has_no_shift() -> None:
    made = threaded((28.0, 6.0), "P010000 Q100 R0.05", "X20.32 Z-30. P1840 Q400 F3.")
    assert {z for _, _, z in path(made)} == {6.0, -30.0}
    assert "thread_shift" not in find(made.name)(made).leaned_on


def test_left_out_first_block_is_said() -> None:
    made = call("multi-pass thread", (28.0, 6.0), "X20.32 Z-30. P1840 Q400 F3.")
    assert remarks(made) == ["cycle-stored-value"]
    # (1.84/0.4)^2 = 21.2: 22 roughing passes, and one more at full depth
    assert len(passes(made)) == 23


def test_zig_zag_takes_both_flanks_and_stays_inside_the_thread() -> None:
    made = call("multi-pass thread", (28.0, 6.0), "X20.32 Z-30. K1.84 D400 A60 F3. P2")
    tangent = math.tan(math.radians(30.0))
    strokes = find(made.name)(made).strokes
    root = 6.0 - 1.84 * tangent
    seen = set()
    for before, stroke in itertools.pairwise(strokes):
        if stroke.kind is Kind.THREAD:
            assert stroke.thread_depth is not None
            off = before.end.z - root
            assert abs(off) == pytest.approx((1.84 - stroke.thread_depth) * tangent, abs=1e-9)
            seen.add(math.copysign(1.0, off))
    assert seen == {-1.0, 1.0}


def test_shift_settings() -> None:
    text = "X20.32 Z-30. K1.84 D400 A60 F3."
    tangent = math.tan(math.radians(30.0))
    root = call("multi-pass thread", (28.0, 6.0), text, control=Control(settings={"thread_shift": "root"}))
    assert path(root)[0] == ("R", 28.0, round(6.0 + (1.84 - 0.4) * tangent, 4))
    none = call("multi-pass thread", (28.0, 6.0), text, control=Control(settings={"thread_shift": "none"}))
    assert path(none)[0] == ("R", 23.2, 6.0)


def test_first_block_of_the_thread_cycle() -> None:
    stored = find("multi-pass thread")(call("multi-pass thread", (28.0, 6.0), "P021055 Q80 R0.04")).stored
    assert stored == {"finishing": 2.0, "run_out": 1.0, "angle": 55.0, "least": 0.08, "allowance": 0.04}
    short = find("multi-pass thread")(call("multi-pass thread", (28.0, 6.0), "P10060")).stored
    assert short == {"finishing": 1.0, "run_out": 0.0, "angle": 60.0}


def test_thread_faults_and_remarks() -> None:
    name = "multi-pass thread"
    assert fault(call(name, (28.0, 6.0), "P1010060 Q100")).topic == "cycle-depth"
    assert fault(call(name, (28.0, 6.0), "X20.32 P1840 Q400 F3.")).topic == "cycle-depth"
    assert fault(call(name, (28.0, 6.0), "X20.32 Z-30. P1840 F3.")).topic == "cycle-depth"
    assert fault(call(name, (28.0, 6.0), "X20.32 Z-30. K1.84 D400 F3. P7")).topic == "cycle-depth"
    assert fault(call(name, (28.0, 6.0), "X20.32 Z-30. K1.84 D1 F3.")).topic == "cycle-depth"
    assert fault(call(name, (28.0, 6.0), "X20.32 Z-30. K1.84 D400", feed=None)).topic == "feed-missing"
    assert fault(threaded((28.0, 6.0), "P010060 Q100 R2.", "X20.32 Z-30. P1840 Q400 F3.")).topic == "cycle-depth"
    assert remarks(threaded((23.0, 6.0), "P010060 Q100 R.05", "X20.32 Z-30. P1840 Q400 F3.")) == ["cycle-start"]


# --- drilling ---------------------------------------------------------------------------------------


def test_levels_by_system() -> None:
    control = Control(system="B")
    made = call("drill", (0.0, 10.0), "Z-10. R3.", control=control)
    assert path(replace(made, return_to_initial=False)) == [("R", 0.0, 3.0), ("F", 0.0, -10.0), ("R", 0.0, 3.0)]
    assert path(made)[-1] == ("R", 0.0, 10.0)
    incremental = replace(call("drill", (0.0, 10.0), "Z-13. R-7.", control=control), absolute=False)
    assert path(incremental)[:2] == [("R", 0.0, 3.0), ("F", 0.0, -10.0)]
    absolute = call("drill", (0.0, 10.0), "Z-10. R3.", control=Control(settings={"drill_level": "absolute"}))
    assert path(absolute)[0] == ("R", 0.0, 3.0)


def test_drilling_words_hold_and_repeat() -> None:
    first = find("drill")(call("drill", (0.0, 10.0), "Z-20. R-7. Q10000"))
    again = call("drill", (0.0, 10.0), "X0. Q15000", first.stored)
    assert [z for kind, _, z in path(again) if kind == "F"] == [-12.0, -20.0]
    assert path(call("drill", (0.0, 10.0), "Z-20. R-7. K0")) == []
    twice = path(call("drill", (0.0, 10.0), "Z-20. R-7. K2"))
    assert twice == path(call("drill", (0.0, 10.0), "Z-20. R-7.")) * 2


def test_depth_from_the_r_level() -> None:
    assert path(call("drill", (0.0, 10.0), "W-23. R-7."))[1] == ("F", 0.0, -20.0)


def test_goes_to_x_first() -> None:
    assert path(call("bore", (40.0, 10.0), "X16. Z-30. R-8."))[:2] == [("R", 16.0, 10.0), ("R", 16.0, 2.0)]


def test_tap_pitch_from_feed_per_minute() -> None:
    made = replace(call("tap", (0.0, 10.0), "Z-18. R-5. F1000."), feed=Feed("min", 1000.0))
    strokes = find("tap")(made).strokes
    assert [(s.lead, s.reversed_spindle) for s in strokes if s.kind is Kind.THREAD] == [(1.25, False), (1.25, True)]
    stopped = replace(made, spindle=Spindle())
    assert fault(stopped).topic == "feed-missing"


def test_bore_feeds_out_by_its_factor() -> None:
    made = call("bore", (16.0, 10.0), "Z-30. R-8.", control=Control(settings={"bore_out_factor": 1.0}))
    assert [s.feed for s in find("bore")(made).strokes if s.kind is Kind.FEED] == [None, Feed("rev", 0.2)]


def test_drilling_faults() -> None:
    assert fault(call("drill", (0.0, 10.0), "R-7.")).topic == "cycle-depth"
    assert fault(call("drill", (0.0, 10.0), "Z3. R-7.")).topic == "cycle-depth"
    assert fault(call("drill", (0.0, 10.0), "Z-200. R-7. Q1")).topic == "cycle-peck"


def test_finishing_goes_home_and_keeps_lines() -> None:
    made = replace(patterned("P10 Q20"), name="finishing")
    strokes = find("finishing")(made).strokes
    assert [stroke.line for stroke in strokes] == [5, 6, 7, None]
    assert strokes[-1].end == made.start
    assert strokes[1].feed == Feed("rev", 0.1)
    assert fault(replace(made, profile=())).topic == "cycle-profile-missing"
