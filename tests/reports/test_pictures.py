"""The pictures against what they show: angles measured in the drawing, places, times and shares by closed forms."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass, replace
from pathlib import Path

import numpy as np
import pytest
from markupsafe import Markup

from auditor.audit import audit_program
from auditor.declared.model import Machine, Point, Tool
from auditor.findings import Audit
from auditor.interpret.moves import Feed, Kind, Move, Spindle
from auditor.predict.loads import Prediction
from auditor.predict.spindle import torque_at
from auditor.reports import View, report
from auditor.reports._shares import seconds, shares, starts
from auditor.reports.html import crops, path, rake, section, window
from auditor.reports.html.envelope import envelope
from auditor.reports.html.frame import Frame
from auditor.reports.html.labels import placed
from tests.reports import builders

DEMO = Path(__file__).parents[2] / "fixtures" / "demo"


@pytest.fixture(scope="module")
def demo() -> Audit:
    return audit_program(DEMO / "drive-stub.nc")


def points(data: str) -> list[tuple[float, float]]:
    """Places in path data, those of an arc's end too."""
    return [(float(x), float(y)) for x, y in re.findall(r"(-?[\d.]+) (-?[\d.]+)(?=[A-Zz]|$)", data)]


def drawn(picture: Markup, style: str) -> list[str]:
    """Path data of every line of a style."""
    found = re.findall(r"<path ([^>]*)/>", picture)
    return [match[1] for each in found if (match := re.search(r'd="([^"]+)"', each)) and f'class="{style}"' in each]


def falling(start: tuple[float, float], end: tuple[float, float]) -> float:
    """By how many degrees a line falls towards the right."""
    return math.degrees(math.atan2(end[1] - start[1], end[0] - start[0]))


# ------------------------------------------------------------------------------------------------- edges

@pytest.mark.parametrize(("pocket", "face", "land", "land_rake", "clearance"), [
    (-6.0, 18.0, 0.2, 0.0, 0.0), (0.0, 12.0, 0.1, -10.0, 7.0), (-6.0, 0.0, 0.0, 0.0, 0.0), (5.0, 10.0, 0.3, 0.0, 11.0),
])
def test_an_edge_is_drawn_to_its_angles(
    pocket: float, face: float, land: float, land_rake: float, clearance: float
) -> None:
    tool = Tool(1, "T1", "turning", pocket_rake=pocket, face_rake=face, land_width=land, land_rake=land_rake,
                insert_clearance=clearance, edge_radius=0.0)
    picture = rake.draw(builders.audit(declared=builders.job(tools={1: tool})).run, tool, "k")
    (data,) = drawn(picture, "insert")
    outline = points(data)
    edge, first, flank = outline[0], outline[2], outline[-1]
    # ISO 3002-1: rake against the reference plane (level here), positive when the face falls away from the edge
    assert falling(edge, first) == pytest.approx(pocket + (land_rake if land else face), abs=0.4)
    if land and face:
        assert falling(first, outline[3]) == pytest.approx(pocket + face, abs=0.4)
    # tilting the insert by its pocket turns rake into clearance: alpha = insert clearance - pocket rake
    assert falling(edge, flank) == pytest.approx(90.0 - (clearance - pocket), abs=0.4)


def test_a_chip_keeps_its_width_and_leaves_along_the_effective_rake(demo: Audit) -> None:
    tool = demo.run.job.tools[1]
    found = rake.situation(demo.run, tool)
    assert found.thickness is not None
    assert found.shear is not None
    picture = rake.draw(demo.run, tool, "k")
    (chip,), (effective,) = drawn(picture, "chip"), drawn(picture, "effective")
    outline = points(chip)
    assert falling(outline[0], outline[1]) == pytest.approx(found.rake, abs=0.5)
    assert falling(*points(effective)) == pytest.approx(found.rake, abs=0.5)
    (shear,) = drawn(picture, "shear")
    # the shear plane stands at phi against the cutting speed, which points down
    assert falling(*points(shear)) == pytest.approx(found.shear - 90.0, abs=0.5)
    # 2 phi + beta - g = C, Merchant 1945, with C = 70 of steels
    assert 2.0 * found.shear + found.friction - found.rake == pytest.approx(70.0)


# ------------------------------------------------------------------------------------------------- places

def test_one_scale_both_ways_and_x_downwards_for_a_turret_in_front() -> None:
    frame = Frame(-50.0, 10.0, -2.0, 40.0, 5.0, left=10.0, top=20.0)
    assert (frame.x(0.0) - frame.x(-1.0), frame.y(0.0) - frame.y(1.0)) == (5.0, 5.0)
    front = replace(frame, down=True)
    assert front.y(1.0) - front.y(0.0) == 5.0
    assert (frame.width, frame.height) == (300.0, 210.0)


def test_marks_stand_at_their_findings_and_apart(demo: Audit) -> None:
    numbered = list(enumerate(demo.findings, start=1))
    marks = section.marks_of(numbered, demo.run)
    picture = section.draw(demo, shares(demo.run), marks, "k")
    frame = section.frame_of(demo.run)
    spots = re.findall(r'<circle cx="([-\d.]+)" cy="([-\d.]+)" r="2.2" class="spot"', picture)
    wanted = sorted((frame.x(mark.at.z), frame.y(mark.at.r)) for mark in marks)
    for (x, y), (wanted_x, wanted_y) in zip(sorted((float(x), float(y)) for x, y in spots), wanted, strict=True):
        assert math.dist((x, y), (wanted_x, wanted_y)) < 0.15
    labels = placed([(frame.x(mark.at.z), frame.y(mark.at.r)) for mark in marks], (0.0, 0.0, 1000.0, 400.0))
    for index, label in enumerate(labels):
        assert all(math.dist(label.at, other.at) >= 28.9 for other in labels[index + 1:])


def test_path_is_drawn_by_the_share_of_the_limit(demo: Audit) -> None:
    # bounds as the legend names them: 25, 50, 75, 100 %
    assert path.classes(np.array([0.0, 0.2, 0.25, 0.3, 0.6, 0.99, 1.0, 1.01, np.nan])).tolist() == [
        0, 0, 0, 1, 2, 3, 3, 4, 0,
    ]
    run = demo.run
    over = [line for line in path.lines(run, shares(run).worst, section.frame_of(run)) if line.style == "s4"]
    frame = section.frame_of(run)
    stop = next(finding for finding in demo.findings if finding.check == "spindle-power" and finding.level == "stop")
    assert stop.at is not None
    heights = {y for line in over for _, y in points(line.data)}
    assert any(abs(y - frame.y(stop.at.r)) < 0.2 for y in heights)


def test_a_crop_shows_the_moment_of_the_finding(demo: Audit) -> None:
    finding = next(each for each in demo.findings if each.check == "spindle-power")
    picture = crops.draw(crops.Stages.of(demo.run), finding, 1, "k")
    assert picture is not None
    (spot,) = re.findall(r'<circle cx="([\d.]+)" cy="([\d.]+)" r="2.6" class="spot"', picture)
    (chip,) = drawn(picture, "chip")
    # the cut runs towards the chuck, to the left: what it is still to take lies in front of the tool, none behind it
    scale = crops.WIDTH / max(7.0 * 3.5, 8.0 * 1.2)
    assert max(x for x, _ in points(chip)) <= float(spot[0]) + 1.2 * scale + 1.0
    assert min(x for x, _ in points(chip)) == pytest.approx(0.0, abs=0.2)
    # depth 3.5 mm of a cut at X50 in stock of X57
    height = max(y for _, y in points(chip)) - min(y for _, y in points(chip))
    assert height / scale == pytest.approx(3.5, abs=0.15)


def test_dots_of_the_window_chart_stand_to_scale() -> None:
    tool = Tool(1, "T1", "turning", nose_radius=0.8, breaker_feed=(0.1, 0.5), breaker_depth=(1.0, 5.0))
    audit = builders.audit(declared=builders.job(tools={1: tool}))
    picture = window.draw(audit.run, tool, {}, "k")
    assert picture is not None
    (dot,) = re.findall(r'<circle cx="([\d.]+)" cy="([\d.]+)" r="[\d.]+" class="cut"', picture)
    (box,) = re.findall(r'<rect x="([\d.]+)" y="([\d.]+)" width="([\d.]+)" height="([\d.]+)" class="breaker"', picture)
    x, y, width, height = map(float, box)
    # the cut of the builders: feed 0.3, depth 2; half way between 0.1 and 0.5, a quarter of the way from 1 to 5
    assert float(dot[0]) == pytest.approx(x + width * 0.5, abs=0.2)
    assert float(dot[1]) == pytest.approx(y + height * 0.75, abs=0.2)


# ------------------------------------------------------------------------------------------------- times and shares

def test_shares_are_figure_over_limit() -> None:
    tool = replace(builders.job().tools[1], force_limit=2000.0)
    machine = replace(builders.job().machine, thrust_x=1000.0, thrust_z=2000.0)
    loads = builders.loads((1,), motor_power=[7.5], rpm=[575.0], cutting=[1200.0], feed_force=[400.0], passive=[300.0],
                           force_x=[-300.0], force_z=[400.0], position=[0.0], feed=[0.3])
    audit = builders.audit(declared=builders.job(tools={1: tool}, machine=machine),
                           prediction=Prediction(loads, builders.figures(), 1.0))
    found = shares(audit.run)
    assert found.spindle[0] == pytest.approx(1.0)  # half of base speed: half of 15 kW
    assert found.thrust[0] == pytest.approx(0.3)
    assert found.tool[0] == pytest.approx(0.65)  # 1200, 400, 300: 1300 N in all
    assert found.worst[0] == pytest.approx(1.0)


def test_torque_of_the_spindle_is_constant_below_base_speed() -> None:
    machine = Machine("m", 4500.0, ((1000.0, 10.0), (4500.0, 10.0)), 1000.0, efficiency=0.8)
    torque = torque_at(machine, np.array([200.0, 1000.0, 2000.0]))
    # M = P 30 000 / (pi n)
    assert torque == pytest.approx([8.0 * 30_000.0 / (math.pi * 1000.0)] * 2 + [8.0 * 15_000.0 / (math.pi * 1000.0)])


def test_time_runs_on_through_the_program(demo: Audit) -> None:
    run = demo.run
    at, begin = seconds(run), starts(run)
    assert begin[-1] == pytest.approx(demo.totals.time, rel=1e-6)
    move = run.prediction.loads.move
    assert (np.diff(at) >= -1e-9).all()
    assert (at >= begin[move] - 1e-9).all()
    assert (at <= begin[move + 1] + 1e-9).all()


def test_time_within_a_cut_at_fixed_speed() -> None:
    loads = builders.loads((1, 1, 1), position=[0.0, 10.0, 40.0], feed=[0.2] * 3, rpm=[1000.0] * 3)
    rows = [builders.NOWHERE, {**builders.CUT, "time": 12.0}, builders.NOWHERE, builders.NOWHERE]
    audit = builders.audit(prediction=Prediction(loads, builders.figures(rows), 1.0))
    # 200 mm/min: 10 mm in 3 s, 40 mm in 12 s, behind a rapid of 1 s
    assert seconds(audit.run) == pytest.approx([1.0, 4.0, 13.0])


@dataclass
class Figure:
    values: np.ndarray
    low: np.ndarray
    high: np.ndarray
    limit: np.ndarray


def test_a_thinned_curve_keeps_its_peaks_and_its_place() -> None:
    generator = np.random.default_rng(7)
    count = 200_000
    at, values = np.linspace(0.0, 100.0, count), generator.random(count)
    values[123_456] = 9.0
    figure = Figure(values, 0.8 * values, 1.2 * values, np.full(count, 5.0))
    shape = envelope(at, figure, np.zeros(count, dtype=int), 100.0, 900.0)
    assert len(shape.line) <= 900 * 2 * 4 + 4
    assert max(value for _, value in shape.line) == 9.0
    (peak,) = [x for x, value in shape.line if value == 9.0]
    assert peak == pytest.approx(900.0 * 123_456 / (count - 1), abs=0.5)
    ((low, high),) = shape.over
    assert low <= peak <= high
    assert sum(len(stretch) for stretch in shape.limit) == 2


def test_a_curve_falls_to_nothing_between_cuts() -> None:
    at, move = np.array([0.0, 10.0, 50.0, 60.0]), np.array([0, 0, 5, 5])
    ones = np.ones(4)
    shape = envelope(at, Figure(ones, ones, ones, ones * np.nan), move, 100.0, 100.0)
    assert [value for x, value in shape.line if 10.0 <= x <= 50.0] == [1.0, 0.0, 0.0, 1.0]
    assert len(shape.bands) == 2
    assert shape.limit == []


# ------------------------------------------------------------------------------------------------- size

def test_a_program_of_5000_moves_stays_small() -> None:
    count, rows = 5000, 6
    spindle, feed = Spindle(1, "rpm", 800.0), Feed("rev", 0.2)
    moves = [
        Move(index, index + 1, f"N{index}", 1, Kind.FEED, -0.01 * index, 28.0 + 0.1 * (index % 7), -0.01 * (index + 1),
             28.0 + 0.1 * ((index + 1) % 7), feed, spindle)
        for index in range(count)
    ]
    source = "".join(f"N{index} G1 X{56.0 + 0.2 * (index % 7):.3f} Z{-0.01 * index:.3f}\n" for index in range(count))
    generator = np.random.default_rng(11)
    size = count * rows
    owner = np.repeat(np.arange(count), rows)
    step = np.tile(np.linspace(0.0, 1.0, rows), count)
    loads = builders.loads(
        owner.tolist(), position=(0.1 * step).tolist(), z=(-0.01 * (owner + step)).tolist(),
        r=(28.0 + 0.1 * (owner % 7)).tolist(), rpm=[800.0] * size, feed=[0.2] * size, depth=[1.0] * size,
        motor_power=generator.uniform(1.0, 20.0, size).tolist(), torque=generator.uniform(1.0, 90.0, size).tolist(),
        cutting=generator.uniform(100.0, 3000.0, size).tolist(), scatter=[0.25] * size, bend=[0.001] * size,
        bend_tangential=[0.001] * size,
    )
    figures = builders.figures([{**builders.CUT, "time": 0.1, "depth": 1.0 + 0.001 * index} for index in range(count)])
    findings = [
        builders.power_finding(line=index + 1, move=index, at=Point(-0.01 * index, 28.0), message=f"Too much, {index}.",
                               fingerprint=str(index))
        for index in range(0, count, 4)
    ]
    audit = builders.audit(findings, verdict="stop", source=source, moved=moves,
                           prediction=Prediction(loads, figures, 1.0), simulated=builders.simulation([1.0] * count))
    html = report("html")
    page = html.join([html.render(audit, View())], False)
    assert len(page.encode("utf-8")) < 5_000_000
    assert "850 more findings, none of them graver" in page  # 1250 found, 400 told


def test_the_demo_s_page_stays_under_a_megabyte(demo: Audit) -> None:
    html = report("html")
    assert len(html.join([html.render(demo, View())], False).encode("utf-8")) < 1_000_000
