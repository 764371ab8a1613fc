"""Properties of the roughing cycles on random profiles, judged by a height field of the test's own.

Profiles are made in a plane of their own (``along`` the cut, ``height`` over the finished side) and laid
into the half-section in all eight ways: turning and facing, outside and inside, to the chuck and away.
"""

from __future__ import annotations

import itertools
import math
from dataclasses import dataclass, replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from numpy.typing import NDArray

from auditor.declared.model import Control, Point
from auditor.interpret.cycles import find
from auditor.interpret.cycles.call import CycleCall, CycleFault, Expansion, Stroke
from auditor.interpret.moves import Feed, Kind, Spindle
from auditor.parse.blocks import Number

FAR = 200.0  # keeps radii positive whichever way a profile lies


@dataclass(frozen=True)
class Way:
    """How the test's plane lies in the half-section."""

    facing: bool
    along_sign: int
    height_sign: int

    def point(self, along: float, height: float) -> Point:
        a, h = self.along_sign * along, self.height_sign * height
        return Point(h, FAR + a) if self.facing else Point(a, FAR + h)

    def back(self, point: Point) -> tuple[float, float]:
        a, h = (point.r - FAR, point.z) if self.facing else (point.z, point.r - FAR)
        return self.along_sign * a, self.height_sign * h

    def clockwise(self, sense: bool) -> bool:
        # in the first way, along is Z and height is X; each mirror and the exchange turn the sense round
        return sense ^ (self.along_sign < 0) ^ (self.height_sign < 0) ^ self.facing


WAYS = [Way(*each) for each in itertools.product([False, True], [-1, 1], [-1, 1])]


@dataclass(frozen=True)
class Task:
    """A profile with its cycle words, all in the test's plane."""

    start: tuple[float, float]
    first: tuple[float, float]
    elements: tuple[tuple[float, float, tuple[float, float] | None], ...]  # end along, end height, arc centre
    depth: float
    retract: float
    allow_along: float  # how far the profile is moved against the cut
    allow_height: float
    pockets: bool

    def senses(self) -> list[bool]:
        """Clockwise for each element in the test's plane; arcs here are quarter turns."""
        found, here = [], self.first
        for along, height, centre in self.elements:
            turn = False
            if centre is not None:
                one = (here[0] - centre[0], here[1] - centre[1])
                two = (along - centre[0], height - centre[1])
                turn = one[0] * two[1] - one[1] * two[0] < 0
            found.append(turn)
            here = (along, height)
        return found

    def height_at(self, grid: NDArray[np.float64]) -> NDArray[np.float64]:
        """Height of the moved profile; the lower one where it stands upright."""
        heights = np.full_like(grid, np.inf)
        here = self.first
        for along, height, centre in self.elements:
            heights = np.minimum(heights, _over(grid + self.allow_along, here, (along, height), centre))
            here = (along, height)
        return heights + self.allow_height


def _over(
    grid: NDArray[np.float64], start: tuple[float, float], end: tuple[float, float], centre: tuple[float, float] | None
) -> NDArray[np.float64]:
    """Height of one element over the grid, infinite beside it."""
    low, high = min(start[0], end[0]), max(start[0], end[0])
    if high - low < 1e-9:
        return np.full_like(grid, np.inf)
    if centre is None:
        heights = start[1] + (grid - start[0]) * (end[1] - start[1]) / (end[0] - start[0])
    else:
        radius = math.dist(centre, end)
        upper = max(start[1], end[1]) > centre[1] + 1e-9
        reach = np.sqrt(np.maximum(0.0, radius**2 - (grid - centre[0]) ** 2))
        heights = centre[1] + (reach if upper else -reach)
    return np.where((grid >= low - 1e-9) & (grid <= high + 1e-9), heights, np.inf)


def number(value: float) -> Number:
    return Number(value, True, f"{value:.4f}")


def call_of(task: Task, way: Way, control: Control | None = None) -> CycleCall:
    profile = [Stroke(Kind.RAPID, way.point(*task.first), line=1)]
    for (along, height, centre), sense in zip(task.elements, task.senses(), strict=True):
        stroke = Stroke(Kind.FEED, way.point(along, height), line=len(profile) + 1)
        if centre is not None:
            stroke = replace(stroke, kind=Kind.ARC, centre=way.point(*centre), clockwise=way.clockwise(sense))
        profile.append(stroke)
    on_height, on_along = way.height_sign * task.allow_height, -way.along_sign * task.allow_along
    u, w = (on_along, on_height) if way.facing else (on_height, on_along)
    spans = {"X", "Z"} if task.pockets else {"Z" if way.facing else "X"}
    return CycleCall(
        "rough facing" if way.facing else "rough turning", 1, way.point(*task.start),
        {"P": Number(10, False, "10"), "Q": Number(20, False, "20"), "U": number(2 * u), "W": number(w)},
        control or Control(), False, Feed("rev", 0.2), Spindle(1, "rpm", 800.0),
        profile=tuple(profile), profile_spans=frozenset(spans),
        stored={"depth": task.depth, "retract": task.retract},
    )


@st.composite
def tasks(draw: st.DrawFn, *, pockets: bool) -> Task:
    along, height = 2.0, draw(st.sampled_from([0.0, 3.0, 4.5]))
    first = (0.0, height)
    elements: list[tuple[float, float, tuple[float, float] | None]] = [(along, height, None)]
    kinds = ["flat", "wall", "slope", "fillet", "round"]
    if pockets:
        kinds += ["dip", "drop", "round off", "sweep down"]
    for _ in range(draw(st.integers(2, 8))):
        kind = draw(st.sampled_from(kinds))
        run, rise = draw(st.sampled_from([1.0, 2.0, 3.7])), draw(st.sampled_from([0.5, 2.0, 3.3]))
        centre = None
        if kind == "flat":
            end = (along + run, height)
        elif kind == "wall":
            end = (along, height + rise)
        elif kind == "slope":
            end = (along + run, height + rise)
        elif kind == "dip":
            end = (along + run, height - rise)
        elif kind == "drop":
            end = (along, height - rise)
        else:
            down = kind in ("round off", "sweep down")
            end = (along + run, height - run if down else height + run)
            level_first = kind in ("fillet", "round off")  # leaves along the cut
            centre = (along, end[1]) if level_first else (end[0], height)
        along, height = end
        elements.append((along, height, centre))
    top = max(first[1], *(element[1] for element in elements))
    end_height = max(height, top) if not pockets else top + draw(st.sampled_from([0.0, 0.7]))
    if end_height > height:
        elements.append((along, end_height, None))
    return Task(
        start=(0.0, end_height + draw(st.sampled_from([0.5, 1.0, 2.0]))), first=first, elements=tuple(elements),
        depth=draw(st.sampled_from([0.8, 1.0, 1.5, 2.5])), retract=draw(st.sampled_from([0.3, 0.5])),
        allow_along=0.0 if pockets else draw(st.sampled_from([0.0, 0.1])),
        allow_height=draw(st.sampled_from([0.0, 0.2, 0.3])), pockets=pockets,
    )


@dataclass
class Field:
    """Stock as a height over a grid along the cut; cut by feeds, and no rapid may touch it."""

    grid: NDArray[np.float64]
    height: NDArray[np.float64]
    largest_bite: float = 0.0

    def carry_out(self, path: list[tuple[float, float]], kind: Kind) -> None:
        along = np.array([spot[0] for spot in path])
        height = np.array([spot[1] for spot in path])
        if along[0] > along[-1]:
            along, height = along[::-1], height[::-1]
        inside = (self.grid >= along[0]) & (self.grid <= along[-1])
        if not inside.any() or along[-1] - along[0] < 1e-9:
            return
        tool = np.interp(self.grid[inside], along, height)
        bite = self.height[inside] - tool
        if kind is Kind.RAPID:
            assert bite.max() < 1e-6, "a rapid goes through stock"
            return
        self.largest_bite = max(self.largest_bite, float(bite.max()))
        self.height[inside] = np.minimum(self.height[inside], tool)


def spots(way: Way, here: Point, stroke: Stroke) -> list[tuple[float, float]]:
    """The stroke in the test's plane, arcs finely divided where they are steep."""
    if stroke.centre is None:
        return [way.back(here), way.back(stroke.end)]
    one = math.atan2(here.r - stroke.centre.r, here.z - stroke.centre.z)
    two = math.atan2(stroke.end.r - stroke.centre.r, stroke.end.z - stroke.centre.z)
    turn = -((one - two) % math.tau) if stroke.clockwise else (two - one) % math.tau
    radius = math.dist(stroke.centre, stroke.end)
    shares = (1.0 - np.cos(np.linspace(0.0, math.pi, 400))) / 2  # dense at both ends, where quarter turns stand upright
    return [
        way.back(Point(stroke.centre.z + radius * math.cos(angle), stroke.centre.r + radius * math.sin(angle)))
        for angle in one + turn * shares
    ]


def field_of(task: Task) -> Field:
    end = task.elements[-1][0] - task.allow_along
    # stock up to the start point; off the corners, where a height field cannot tell the sides of a wall apart
    grid = np.arange(0.0137, end, 0.0211)
    return Field(grid, np.full_like(grid, task.start[1]))


def carried_out(task: Task, way: Way, control: Control | None = None) -> tuple[Field, Expansion]:
    call = call_of(task, way, control)
    expansion = find(call.name)(call)
    field, here = field_of(task), call.start
    for stroke in expansion.strokes[:-1]:
        field.carry_out(spots(way, here, stroke), stroke.kind)
        here = stroke.end
    return field, expansion


def check(task: Task, way: Way, control: Control | None = None) -> Expansion:
    field, expansion = carried_out(task, way, control)
    assert field.largest_bite <= task.depth + 1e-5
    assert field.height == pytest.approx(task.height_at(field.grid), abs=2e-4)  # nothing below, nothing left
    assert expansion.strokes[-1] == replace(expansion.strokes[-1], kind=Kind.RAPID, end=way.point(*task.start))
    return expansion


@settings(deadline=None, max_examples=60)
@given(task=tasks(pockets=False), way=st.sampled_from(WAYS))
def test_type_one(task: Task, way: Way) -> None:
    expansion = check(task, way)
    assert expansion.remarks == ()
    # levels: d, 2d, 3d ... below the moved start, as long as they are above the moved A'
    wanted = task.start[1] + task.allow_height - np.arange(1, 200) * task.depth
    wanted = wanted[wanted > task.first[1] + task.allow_height + 1e-6]
    cut = [way.back(stroke.end)[1] for stroke in expansion.strokes if stroke.kind is Kind.FEED]
    profile = len(task.elements) - sum(centre is not None for *_, centre in task.elements)
    assert cut[: len(cut) - profile] == pytest.approx(list(wanted))


@settings(deadline=None, max_examples=60)
@given(task=tasks(pockets=True), way=st.sampled_from(WAYS), order=st.sampled_from(["depth first", "level by level"]),
       wall=st.sampled_from(["follow", "leave"]))
def test_type_two(task: Task, way: Way, order: str, wall: str) -> None:
    check(task, way, Control(settings={"pocket_order": order, "pocket_wall": wall}))


@settings(deadline=None, max_examples=30)
@given(task=tasks(pockets=False), way=st.sampled_from(WAYS))
def test_own_pass_for_the_last_layer(task: Task, way: Way) -> None:
    control = Control(settings={"rough_last_layer": "own pass", "rough_escape": "feed", "rough_levels_from": "start"})
    check(task, way, control)


@settings(deadline=None, max_examples=30)
@given(task=st.booleans().flatmap(lambda pockets: tasks(pockets=pockets)), way=st.sampled_from(WAYS[1:]))
def test_every_way_is_the_mirror_image_of_the_first(task: Task, way: Way) -> None:
    one, two = call_of(task, WAYS[0]), call_of(task, way)
    for first, second in zip(find(one.name)(one).strokes, find(two.name)(two).strokes, strict=True):
        assert first.kind is second.kind
        assert WAYS[0].back(first.end) == pytest.approx(way.back(second.end), abs=1e-9)
        assert first.cycle_pass == second.cycle_pass


@pytest.mark.parametrize("way", WAYS)
def test_two_pockets_with_one_inside_the_other_level(way: Way) -> None:
    # a wide pocket whose floor has a peak in the middle: two lobes under one common level, by hand
    elements = ((2.0, 8.0, None), (4.0, 4.0, None), (5.0, 2.0, None), (6.0, 4.0, None), (7.0, 2.0, None),
                (10.0, 8.0, None), (10.0, 10.0, None))
    task = Task((0.0, 10.0), (0.0, 8.0), elements, 2.5, 0.5, 0.0, 0.0, pockets=True)
    expansion = check(task, way)
    cuts = [
        (way.back(before.end)[0], *way.back(stroke.end))
        for before, stroke in itertools.pairwise(expansion.strokes)
        if stroke.kind is Kind.FEED and stroke.cycle_pass != expansion.strokes[-1].cycle_pass
        and way.back(before.end)[1] == pytest.approx(way.back(stroke.end)[1])
    ]
    # levels 7.5 and 5.0 are one stretch each, 2.5 is two
    assert cuts == [
        pytest.approx(each)
        for each in [(2.25, 9.75, 7.5), (3.5, 8.5, 5.0), (4.75, 5.25, 2.5), (6.75, 7.25, 2.5)]
    ]


def faulty(**changes: object) -> CycleCall:
    task = Task((0.0, 10.0), (0.0, 0.0), ((5.0, 0.0, None), (9.0, 4.0, None)), 2.0, 0.5, 0.1, 0.2, pockets=False)
    return replace(call_of(task, Way(False, -1, 1)), **changes)  # type: ignore[arg-type]


@pytest.mark.parametrize(
    ("call", "topic", "says"),
    [
        (faulty(stored={}), "cycle-depth", "no depth of a pass"),
        (faulty(stored={"depth": 0.0}), "cycle-depth", "zero"),
        (faulty(stored={"depth": 1e-5}), "cycle-depth", "more than"),
        (faulty(profile=()), "cycle-profile-missing", "two or more"),
        (faulty(start=Point(2.0, FAR)), "cycle-profile-bad", "does not move X away"),
        (faulty(words={**faulty().words, "I": number(0.2)}), "unsupported", "semi-finish"),
    ],
)
def test_faults(call: CycleCall, topic: str, says: str) -> None:
    with pytest.raises(CycleFault) as caught:
        find(call.name)(call)
    assert caught.value.topic == topic
    assert says in caught.value.message


def test_pocket_in_type_one_names_the_block() -> None:
    task = Task((0.0, 12.0), (0.0, 5.0), ((5.0, 5.0, None), (8.0, 3.0, None), (9.0, 11.0, None)), 2.0, 0.5, 0.0, 0.0,
                pockets=False)
    with pytest.raises(CycleFault) as caught:
        find("rough turning")(call_of(task, Way(False, -1, 1)))
    assert (caught.value.topic, caught.value.line) == ("cycle-not-monotonic", 3)
    assert "from X410 Z-5 to X406 Z-8" in caught.value.message


def topics(call: CycleCall) -> list[str]:
    return [remark.topic for remark in find(call.name)(call).remarks]


@pytest.mark.parametrize("way", WAYS)
def test_signs_of_the_allowances(way: Way) -> None:
    task = Task((0.0, 10.0), (0.0, 0.0), ((5.0, 0.0, None), (9.0, 4.0, None)), 2.0, 0.5, 0.1, 0.2, pockets=False)
    right = call_of(task, way)
    assert topics(right) == []
    for word in "UW":
        turned = number(-right.words[word].value)
        assert topics(replace(right, words={**right.words, word: turned})) == ["cycle-allowance-sign"]


def test_shift_along_the_cut_with_a_pocket() -> None:
    elements = ((2.0, 8.0, None), (4.0, 4.0, None), (8.0, 9.0, None))
    task = Task((0.0, 10.0), (0.0, 8.0), elements, 2.5, 0.5, 0.1, 0.0, pockets=True)
    assert topics(call_of(task, WAYS[0])) == ["cycle-shift-with-pocket"]


def test_start_inside_the_profile() -> None:
    task = Task((0.0, 3.0), (0.0, 0.0), ((5.0, 0.0, None), (9.0, 6.0, None)), 2.0, 0.5, 0.0, 0.0, pockets=False)
    assert topics(call_of(task, WAYS[0])) == ["cycle-start"]


def test_retract_from_the_control_is_said() -> None:
    expansion = find("rough turning")(faulty(stored={"depth": 2.0}))
    assert [remark.topic for remark in expansion.remarks] == ["cycle-stored-value"]
    assert "rough_retract" in expansion.leaned_on


@pytest.mark.parametrize(
    ("text", "point", "control", "depth"),
    [
        ("1500", False, Control(), 1.5),  # least increments
        ("1.5", True, Control(), 1.5),
        ("2", False, Control(settings={"cycle_depth_word": "units"}), 2.0),
    ],
)
def test_one_block_depth(text: str, point: bool, control: Control, depth: float) -> None:
    words = {**faulty().words, "D": Number(float(text), point, text)}
    strokes = find("rough turning")(faulty(words=words, stored={}, control=control)).strokes
    assert strokes[0].end.r - strokes[1].end.r == pytest.approx(depth)


def test_first_block_stores_depth_and_retract_as_radius_values() -> None:
    call = faulty(words={"U": number(2.5), "R": number(0.5)}, stored={})
    assert find("rough turning")(call) == Expansion((), stored={"depth": 2.5, "retract": 0.5})
    inch = replace(call, inch=True, words={"U": number(0.1)})
    assert find("rough turning")(inch).stored == {"depth": pytest.approx(2.54)}
    facing = replace(call, name="rough facing", words={"W": number(2.0), "R": number(0.3)})
    assert find("rough facing")(facing).stored == {"depth": 2.0, "retract": 0.3}
