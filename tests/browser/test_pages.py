"""The report with pictures in a real browser: no network, no dead link, no empty picture, and it prints."""

from __future__ import annotations

import os
import re
from collections.abc import Iterator
from itertools import pairwise
from pathlib import Path

import pytest
from click.testing import CliRunner

from auditor.cli import turnaudit
from auditor.errors import Fault
from auditor.reports import Unreadable, View, report
from tests.browser.devtools import NAMES, Tab, browser
from tests.reports import builders, hostile

CHROMIUM = browser()
pytestmark = [
    pytest.mark.skipif(os.name == "nt", reason="speaks to the browser over inherited pipes, which POSIX has"),
    pytest.mark.skipif(CHROMIUM is None, reason=f"no browser on this machine (looked for {', '.join(NAMES)}); "
                                                "on Debian: apt-get install chromium"),
]
DEMO = Path(__file__).parents[2] / "fixtures" / "demo"


@pytest.fixture(scope="module")
def tab() -> Iterator[Tab]:
    with Tab(CHROMIUM or "") as opened:
        yield opened


@pytest.fixture(scope="module")
def pages(tmp_path_factory: pytest.TempPathFactory) -> dict[str, Path]:
    """The demo, several programs with one unreadable, and a program full of hostile text."""
    place = tmp_path_factory.mktemp("pages")
    made = {name: place / f"{name}.html" for name in ("demo", "several", "hostile")}
    result = CliRunner().invoke(turnaudit, ["check", str(DEMO / "drive-stub.nc"), "--html", str(made["demo"])])
    assert result.exit_code == 1
    html = report("html")
    lost = Unreadable("lost.nc", (Fault("no such file", file="lost.nc"),))
    parts = [html.render(outcome, View()) for outcome in (builders.faulty(), builders.audit(path="b.nc"), lost)]
    made["several"].write_text(html.join(parts, True), encoding="utf-8")
    made["hostile"].write_text(html.join([html.render(hostile.audit(), View())], False), encoding="utf-8")
    return made


@pytest.fixture(params=["demo", "several", "hostile"])
def shown(request: pytest.FixtureRequest, tab: Tab, pages: dict[str, Path]) -> Tab:
    tab.open(pages[request.param])
    return tab


def test_nothing_leaves_the_file_and_nothing_is_complained_about(shown: Tab) -> None:
    shown.evaluate("1")  # lets late messages come in
    assert [url.partition(":")[0] for url in shown.requests()] == ["file"]
    assert shown.complaints() == []


def test_every_link_has_its_target_and_every_name_is_given_once(shown: Tab) -> None:
    targets = shown.evaluate("[...document.querySelectorAll('a')].map(a => a.getAttribute('href'))")
    assert targets
    names = shown.evaluate("[...document.querySelectorAll('[id]')].map(e => e.id)")
    assert len(names) == len(set(names))
    assert {target[:1] for target in targets} == {"#"}
    assert {target[1:] for target in targets} <= set(names)


def test_every_picture_shows_something_and_says_what(shown: Tab) -> None:
    pictures = shown.evaluate("""
        [...document.querySelectorAll('figure > svg, .figure > svg')].map(svg => {
          const said = (svg.getAttribute('aria-labelledby') || '').split(' ').map(id => document.getElementById(id));
          const box = svg.getBoundingClientRect();
          const drawn = [...svg.querySelectorAll('path,rect,circle')].filter(e => {
            const b = e.getBBox(); return b.width + b.height > 0; });
          return [svg.id, box.width, box.height, drawn.length, said.every(e => e && e.textContent.length > 3)];
        })""")
    assert pictures
    for name, width, height, drawn, said in pictures:
        assert min(width, height) >= 20, name
        assert drawn >= 2, name
        assert said, name


def test_no_coordinate_is_broken(shown: Tab) -> None:
    written = shown.evaluate("[...document.querySelectorAll('svg, svg *')].flatMap(e => "
                             "[...e.attributes].map(a => a.value)).join(' ')")
    assert not re.search(r"\b(nan|inf|NaN|None)\b", written)


def test_nothing_moves_and_nothing_runs(shown: Tab) -> None:
    assert shown.evaluate("document.querySelectorAll('script, animate, animateTransform, iframe, object').length") == 0
    assert shown.evaluate("document.getAnimations().length") == 0
    assert shown.evaluate("[...document.querySelectorAll('*')].every(e => "
                          "[...e.attributes].every(a => !a.name.startsWith('on')))")


@pytest.mark.parametrize("width", [1280, 768, 390])
def test_page_fits_its_window(shown: Tab, width: int) -> None:
    shown.ask("Emulation.setDeviceMetricsOverride", width=width, height=900, deviceScaleFactor=1, mobile=False)
    assert shown.evaluate("document.documentElement.scrollWidth") <= width
    shown.ask("Emulation.clearDeviceMetricsOverride")


def _channel(value: float) -> float:
    value /= 255.0
    return value / 12.92 if value <= 0.04045 else ((value + 0.055) / 1.055) ** 2.4


def _contrast(first: str, second: str) -> float:
    """Contrast ratio of two colours, WCAG 2.1."""
    luminance = []
    for colour in (first, second):
        red, green, blue = (_channel(float(part)) for part in re.findall(r"[\d.]+", colour)[:3])
        luminance.append(0.2126 * red + 0.7152 * green + 0.0722 * blue)
    return (max(luminance) + 0.05) / (min(luminance) + 0.05)


@pytest.mark.parametrize("scheme", ["light", "dark"])
def test_text_can_be_read_in_both_schemes(tab: Tab, pages: dict[str, Path], scheme: str) -> None:
    tab.open(pages["demo"])
    tab.ask("Emulation.setEmulatedMedia", media="screen",
            features=[{"name": "prefers-color-scheme", "value": scheme}])
    colours = tab.evaluate("""
        [...document.querySelectorAll('h1,h2,h3,p,dt,dd,td,th,.tag,.quote code,.listing code,.legend li')].map(e => {
          let b = e; while (b && getComputedStyle(b).backgroundColor === 'rgba(0, 0, 0, 0)') b = b.parentElement;
          return [e.className || e.tagName, getComputedStyle(e).color, getComputedStyle(b || document.body)
            .backgroundColor]; })""")
    dark = scheme == "dark"
    body = tab.evaluate("getComputedStyle(document.body).backgroundColor")
    assert (_contrast(body, "rgb(255, 255, 255)") > 4.5) is dark
    # WCAG 2.1, success criterion 1.4.3: at least 4.5 to 1 for text
    assert [row for row in colours if _contrast(row[1], row[2]) < 4.5] == []
    tab.ask("Emulation.setEmulatedMedia", media="", features=[])


def test_classes_of_the_path_differ_in_width_and_in_grey(tab: Tab, pages: dict[str, Path]) -> None:
    tab.open(pages["demo"])
    for scheme in ("light", "dark"):
        tab.ask("Emulation.setEmulatedMedia", media="screen",
                features=[{"name": "prefers-color-scheme", "value": scheme}])
        drawn = tab.evaluate("""['s0','s1','s2','s3','s4'].map(c => {
          const s = getComputedStyle(document.querySelector('.legend .' + c));
          return [parseFloat(s.strokeWidth), s.stroke]; })""")
        widths = [width for width, _ in drawn]
        assert all(b > 1.2 * a for a, b in pairwise(widths))
        paper = "rgb(255, 253, 248)" if scheme == "light" else "rgb(23, 35, 42)"
        contrasts = [_contrast(stroke, paper) for _, stroke in drawn[:4]]
        assert contrasts == sorted(contrasts)
    tab.ask("Emulation.setEmulatedMedia", media="", features=[])


def test_a_finding_leads_to_its_mark_and_back(tab: Tab, pages: dict[str, Path]) -> None:
    tab.open(pages["demo"])
    pairs = tab.evaluate("""
        [...document.querySelectorAll('.card')].map(card => [card.id,
          [...card.querySelectorAll('.links a')].map(a => a.getAttribute('href').slice(1))])""")
    marks = tab.evaluate("[...document.querySelectorAll('.section .mark a')].map(a => a.getAttribute('href').slice(1))")
    for card, links in pairs:
        places = [link for link in links if re.search(r"-m\d+$", link)]
        assert bool(places) == (card in marks)
        assert any(re.search(r"-L\d+$", link) for link in links)


def test_it_prints(shown: Tab) -> None:
    data = shown.pdf()
    assert data.startswith(b"%PDF")
    sheets = len(re.findall(rb"/Type\s*/Page\b", data))
    assert 1 <= sheets <= 20
    boxes = re.findall(rb"/MediaBox\s*\[\s*0\s+0\s+([\d.]+)\s+([\d.]+)", data)
    assert boxes
    # A4 is 210 x 297 mm: 595 x 842 points
    assert all(abs(float(width) - 595) < 2 and abs(float(height) - 842) < 2 for width, height in boxes)
