"""The report with pictures, as text: inert, self-contained, the verdict first, small."""

from __future__ import annotations

import math
import re
from dataclasses import replace
from html.parser import HTMLParser

import pytest

from auditor.declared.model import Acceptance
from auditor.errors import Fault
from auditor.findings import Audit
from auditor.interpret.moves import Kind
from auditor.predict.loads import Prediction
from auditor.reports import Outcome, Unreadable, View, report
from tests.reports import builders, hostile

VOID = {"meta", "br", "hr", "img", "link", "input", "path", "rect", "circle"}


class Reader(HTMLParser):
    """Elements, attributes and texts of a page; complains about what is left open."""

    def __init__(self) -> None:
        super().__init__(convert_charrefs=True)
        self.open: list[str] = []
        self.tags: set[str] = set()
        self.names: set[str] = set()
        self.texts: list[str] = []

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.add(tag)
        self.names.update(name for name, _ in attrs)
        if tag not in VOID:
            self.open.append(tag)

    def handle_startendtag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.add(tag)
        self.names.update(name for name, _ in attrs)

    def handle_endtag(self, tag: str) -> None:
        assert self.open, f"</{tag}> closes nothing"
        assert self.open.pop() == tag

    def handle_data(self, data: str) -> None:
        self.texts.append(data)


def page(*outcomes: Outcome) -> str:
    html = report("html")
    return html.join([html.render(outcome, View()) for outcome in outcomes], len(outcomes) > 1)


def read(text: str) -> Reader:
    reader = Reader()
    reader.feed(text)
    reader.close()
    return reader


def accepted() -> Audit:
    decision = Acceptance("spindle-power", "runs like this for years", until=None)
    return builders.audit([builders.power_finding(accepted=decision)])


@pytest.mark.parametrize("outcome", [
    builders.faulty(), builders.audit(), accepted(),
    builders.audit(not_audited=[builders.NOT_AUDITED], verdict="incomplete"),
    Unreadable("lost.nc", (Fault("no such file", file="lost.nc"),)), hostile.audit(),
])
def test_is_well_formed(outcome: Outcome) -> None:
    reader = read(page(outcome))
    assert reader.open == []


@pytest.mark.parametrize("changed", [
    {"feed_rev": 0.0}, {"feed_rev": 1e-5, "depth": 1e-4},
    {"feed_rev": math.nan}, {"depth": 0.0}, {"time": math.nan}, {"cutting_time": 0.0},
    {"rpm_low": math.nan, "rpm_high": math.nan}, {"cutting": math.nan, "rake": math.nan},
])
def test_odd_figures_make_no_broken_picture(changed: dict[str, float]) -> None:
    prediction = Prediction(
        builders.loads((1, 1), position=[0.0, 42.0], z=[2.0, -40.0], r=[28.0, 28.0]),
        builders.figures([builders.NOWHERE, {**builders.CUT, **changed}, builders.NOWHERE, builders.NOWHERE]), 1.0,
    )
    text = page(builders.audit([builders.power_finding(), builders.power_finding(fingerprint="2", value=math.nan)],
                               verdict="stop", prediction=prediction))
    assert read(text).open == []
    assert not re.search(r'="[^"]*\b(nan|inf)\b', text)


def test_program_that_only_moves_in_the_air_has_a_page() -> None:
    rapids = [move for move in builders.moves() if move.kind is Kind.RAPID]
    moved = [replace(move, index=index) for index, move in enumerate(rapids)]
    prediction = Prediction(builders.loads(()), builders.figures([builders.NOWHERE] * len(moved)), 1.0)
    text = page(builders.audit(moved=moved, prediction=prediction, simulated=builders.simulation([0.0] * len(moved))))
    assert read(text).open == []
    assert "Loads along the program" not in text


def test_hostile_text_stays_text() -> None:
    text = page(hostile.audit(), Unreadable(hostile.TEXT, (Fault(hostile.TEXT, found=hostile.TEXT),)))
    reader = read(text)
    assert reader.open == []
    assert not {"script", "img", "iframe", "b2"} & reader.tags
    assert not any(name.startswith("on") for name in reader.names)
    assert not set("\x1b\x00\u202e") & set(text)
    assert "49" not in "".join(piece for piece in reader.texts if "{{" in piece or "7*7" in piece)
    assert sum("<script>alert(1)</script>" in piece for piece in reader.texts) > 10


def test_nothing_is_fetched() -> None:
    text = page(builders.faulty())
    for word in ("http://", "https://", "src=", "@import", "<script", "<link"):
        assert word not in text.replace("http://www.w3.org/2000/svg", ""), word
    assert "default-src 'none'" in text


def test_verdict_comes_first_and_is_said_in_words() -> None:
    reader = read(page(builders.faulty()))
    body = [piece.strip() for piece in reader.texts if piece.strip()]
    assert body[0] == "STOP: drive-stub.nc"
    words = [piece for piece in body if not piece.startswith(":root")]
    assert words[1:4] == ["STOP", "drive-stub.nc", "1 must be fixed, 1 to decide, 1 to know"]


def test_clear_never_stands_alone() -> None:
    text = " ".join(read(page(builders.audit(not_judged=[builders.NO_GRIP]))).texts)
    beside = "Clear of what was judged: a prediction, no promise. Not judged: chuck-grip."
    assert text.index(beside) < text.index("Where")


def test_says_what_it_rests_on() -> None:
    text = " ".join(" ".join(read(page(builders.faulty())).texts).split())
    for words in (
        "All 4 motion blocks were checked.", "workholding.grip_force is not declared", "tools.1.edge_radius",
        "usual for roughing geometries", "0" * 64, "Signature", "not a prove-out", "C45 normalised", "power_share",
    ):
        assert words in text, words


def test_decisions_of_people_stay_visible() -> None:
    text = " ".join(read(page(accepted())).texts)
    assert text.index("What it rests on") < text.index("runs like this for years")


def test_blocks_not_checked_are_listed_and_marked() -> None:
    text = page(builders.audit(not_audited=[builders.NOT_AUDITED], verdict="incomplete"))
    assert "1 of 5 motion blocks were NOT checked." in text
    assert 'class="unread"' in text
    assert "subprogram 9100 is not in this file" in text


def test_several_programs_stand_behind_a_list_and_share_no_names() -> None:
    text = page(builders.faulty(), builders.audit(path="other/drive-stub.nc"), Unreadable("lost.nc", ()))
    assert text.index("3 programs") < text.index("STOP")
    assert [text.count(f">{word}</b>") for word in ("STOP", "CLEAR", "UNREADABLE")] == [2, 2, 1]


def test_demo_sized_page_is_small() -> None:
    assert len(page(builders.faulty()).encode("utf-8")) < 100_000
