"""What must hold for every program: units, code systems, subprograms and cycles change the writing, not the path."""

from __future__ import annotations

import json
import re
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from auditor.declared.model import Control, Point
from auditor.interpret import interpret
from auditor.interpret.moves import Interpretation, Kind, Move
from auditor.parse import parse_text
from tests.interpret.programs import carried_out, declared

FIXTURE = Path(__file__).parents[2] / "fixtures" / "language" / "cycle_examples.json"
EXAMPLES = json.loads(FIXTURE.read_text(encoding="utf-8"))["examples"]
FEW = settings(max_examples=60, deadline=None)

# all lengths are whole hundredths of an inch, so that both ways of writing them are exact
sizes = st.integers(10, 1500).map(lambda n: 0.254 * n)
depths = st.integers(-3000, 200).map(lambda n: 0.254 * n)
HEAD = ("T0101", "G50 S2500", "G96 S152.4 M3", "G0 X60.96 Z5.08")  # 152.4 m/min are 500 ft/min


@st.composite
def turning_blocks(draw: st.DrawFn) -> list[str]:
    """Blocks in system A without incremental words: straight moves, arcs, threads, box cycles."""
    blocks: list[str] = []
    for _ in range(draw(st.integers(1, 6))):
        x, z = draw(sizes), draw(depths)
        here, out = f"X{x:.3f} Z{z:.3f}", f"X{x + 10.16:.3f}"
        kind = draw(st.sampled_from(["rapid", "feed", "bare", "arc", "thread", "box", "face box", "dwell", "clamp"]))
        blocks += {
            "rapid": [f"G0 {here}"],
            "feed": [f"G1 {here} F0.254"],
            "bare": [f"G1 Z{z:.3f} F0.2032", f"X{x:.3f}"],
            "arc": [f"G0 {here}", f"G3 {out} Z{z - 5.08:.3f} R5.08 F0.1016"],
            "thread": [f"G0 {here}", f"G32 Z{z - 20.32:.3f} F1.524"],
            "box": [f"G0 {out} Z{z:.3f}", f"G90 X{x:.3f} Z{z - 12.7:.3f} F0.3048", f"X{x - 1.27:.3f}", f"G0 {out}"],
            "face box": [f"G0 {out} Z{z:.3f}", f"G94 X{x:.3f} Z{z - 1.27:.3f} F0.3048", f"G0 {out}"],
            "dwell": ["G4 X0.5"],
            "clamp": ["G50 S1800", "G98 G1 X50.8 F101.6", "G99 F0.2032"],
        }[kind]
    return blocks


def program(blocks: list[str]) -> str:
    return "\n".join([*HEAD, *blocks, "G0 X101.6 Z50.8", "M5", "M30"])


def path(found: Interpretation) -> list[tuple[object, ...]]:
    """Everything about the moves that the writing must not change."""
    return [
        (
            move.kind,
            tuple(None if value is None else round(value, 6) for value in (*(move.start or ()), *(move.end or ()))),
            move.centre and tuple(round(value, 6) for value in move.centre),
            move.clockwise,
            move.feed and (move.feed.mode, round(move.feed.value, 6)),
            move.spindle.mode,
            move.spindle.value and round(move.spindle.value, 6),
            move.spindle.clamp,
            move.lead and round(move.lead, 6),
            move.cycle,
        )
        for move in found.moves
    ]


# -- units ---------------------------------------------------------------------------------------------


def in_inches(text: str) -> str:
    """The metric text with every length, feed and surface speed in inches."""

    def converted(match: re.Match[str]) -> str:
        letter, value = match[1], float(match[2])
        return f"{letter}{value / 25.4:.5f}"

    lines = []
    for line in text.split("\n"):
        if "G4" in line.split() or line.startswith(("T", "M")):
            lines.append(line)
        elif "G96" in line:
            lines.append(line.replace("S152.4", "S500"))
        else:
            lines.append(re.sub(r"\b([XZRF])(-?[0-9.]+)", converted, line))
    return "\n".join(["G20", *lines])


@FEW
@given(turning_blocks())
def test_an_inch_program_is_its_metric_twin(blocks: list[str]) -> None:
    metric, inch = carried_out(program(blocks)), carried_out(in_inches(program(blocks)))
    assert path(inch) == path(metric)
    assert (metric.units, inch.units) == ("mm", "in")


# -- code systems --------------------------------------------------------------------------------------

TO_B = {"G32": "G33", "G50": "G92", "G90": "G77", "G92": "G78", "G94": "G79", "G98": "G94", "G99": "G95"}
TO_C = {
    "G32": "G33", "G50": "G92", "G90": "G20", "G92": "G21", "G94": "G24", "G98": "G94", "G99": "G95",
    "G20": "G70", "G21": "G71", **{f"G{n}": f"G{n + 2}" for n in range(70, 77)},
}  # fmt: skip


def translated(text: str, table: dict[str, str]) -> str:
    return re.sub(r"G[0-9]+", lambda match: table.get(match[0], match[0]), text)


@FEW
@given(turning_blocks())
def test_a_program_means_the_same_in_all_three_systems(blocks: list[str]) -> None:
    text = program(blocks)
    wanted = path(carried_out(text, system="A"))
    assert path(carried_out(translated(text, TO_B), system="B")) == wanted
    assert path(carried_out(translated(text, TO_C), system="C")) == wanted


@pytest.mark.parametrize("name", [name for name in EXAMPLES if name.startswith("C") and name < "C17" and name != "C08"])
def test_cycles_mean_the_same_in_all_three_systems(name: str) -> None:
    example = EXAMPLES[name]
    found = []
    for system, table in (("A", {}), ("B", TO_B), ("C", TO_C)):
        control = Control(system=system, system_declared=True, units="mm", settings=example.get("settings", {}))
        text = translated(example["code"], table)
        found.append(path(interpret(parse_text(text), declared(control, start=Point(100.0, 100.0)))))
    assert found[0] == found[1] == found[2]


# -- subprograms ---------------------------------------------------------------------------------------


@FEW
@given(turning_blocks(), st.data())
def test_splitting_into_subprograms_changes_nothing(blocks: list[str], data: st.DataObject) -> None:
    first = data.draw(st.integers(0, len(blocks)))
    last = data.draw(st.integers(first, len(blocks)))
    split = program([*blocks[:first], "M98 P1234", *blocks[last:]])
    split += "\nO1234\n" + "\n".join([*blocks[first:last], "M99"])
    assert path(carried_out(split)) == path(carried_out(program(blocks)))


@FEW
@given(turning_blocks())
def test_a_program_called_twice_is_the_program_written_twice(blocks: list[str]) -> None:
    called = program(["M98 P7 L2"]) + "\nO7\n" + "\n".join([*blocks, "M99"])
    assert path(carried_out(called)) == path(carried_out(program([*blocks, *blocks])))


@FEW
@given(turning_blocks())
def test_a_loop_is_its_body_written_out(blocks: list[str]) -> None:
    looped = program(["#1=0", "WHILE[#1LT3]DO1", *blocks, "#1=#1+1", "END1"])
    assert path(carried_out(looped)) == path(carried_out(program([*blocks, *blocks, *blocks])))


# -- cycles --------------------------------------------------------------------------------------------


def written_out(move: Move) -> str:
    """A move as one block of system A."""
    assert move.end is not None
    target = f"X{2 * move.end.r:.5f} Z{move.end.z:.5f}"
    if move.kind is Kind.RAPID:
        return f"G0 {target}"
    assert move.feed is not None
    feed = f"F{move.feed.value:.5f}"
    if move.kind is Kind.ARC:
        assert move.centre is not None
        assert move.start is not None
        code = "G2" if move.clockwise else "G3"
        offset = f"I{move.centre.r - move.start.r:.5f} K{move.centre.z - move.start.z:.5f}"
        return f"{code} {target} {offset} {feed}"
    return f"{'G32' if move.kind is Kind.THREAD else 'G1'} {target} {feed}"


@pytest.mark.parametrize("name", [name for name in EXAMPLES if name.startswith("C") and name != "C19"])
def test_a_cycle_is_its_path_written_out(name: str) -> None:
    # C19 is left out: a tap on its way out turns the spindle round, which no single block says
    example = EXAMPLES[name]
    job = declared(Control(system_declared=True, units="mm", settings=example.get("settings", {})))
    cycle = interpret(parse_text(example["code"]), job)
    text = "\n".join(["T0101", "G50 S2500", "G97 S800 M3", "G99", *map(written_out, cycle.moves), "M30"])
    plain = interpret(parse_text(text), job)
    assert len(plain.moves) == len(cycle.moves)
    for one, other in zip(plain.moves, cycle.moves, strict=True):
        assert one.kind == other.kind
        assert one.end == pytest.approx(other.end, abs=1e-5)
        assert (one.feed and one.feed.value) == pytest.approx(other.feed and other.feed.value)
        if other.centre is not None:
            assert one.centre == pytest.approx(other.centre, abs=1e-4)


# -- anything at all -----------------------------------------------------------------------------------

words = st.builds(
    lambda letter, value: f"{letter}{value}",
    st.sampled_from([*"GXZUWIKRPQFSTMDALEHCYBNO", ",R", ",C", ",A", "G", "G", "G", "M", "X", "Z", "#", "[", "]", "/"]),
    st.one_of(
        st.integers(-150, 120).map(str), st.integers(-9999, 9999).map(lambda n: f"{n / 100}"),
        st.sampled_from(["", ".", "#1", "#500", "[#1+2.]", "[1/0]", "98", "99", "65", "70", "71", "73", "76", "1000"]),
    ),
)  # fmt: skip
statements = st.sampled_from(
    ["#1=5", "#1=#500", "GOTO10", "IF[#1EQ5]GOTO20", "WHILE[1EQ1]DO1", "END1", "DO2", "END2", "M98P1", "M99", "O1", "%",
     "N10", "N20", "G71P10Q20U1W1D1000", "G71U2R1", "G70P10Q20", "G66P1", "(", ")", "IF[#1GT", "#3000=1(X)", "G41",
     "G42", "G40", "G10L50", "T0101", "T9", "G91", "G28U0W0", "G53X0", "G55", "G52Z5."]
)  # fmt: skip
lines = st.one_of(st.lists(words, max_size=7).map("".join), statements)


@settings(max_examples=300, deadline=None)
@given(st.lists(lines, max_size=15).map("\n".join), st.sampled_from(["A", "B", "C"]), st.booleans())
def test_words_at_random_never_raise(text: str, system: str, declare: bool) -> None:
    job = declared(Control(system=system, system_declared=declare))  # type: ignore[arg-type]
    found = interpret(parse_text(text), job)
    assert [move.index for move in found.moves] == list(range(len(found.moves)))
    assert {move.line for move in found.moves} <= found.motion_lines
    assert {entry.line for entry in found.not_audited} <= found.motion_lines


@settings(max_examples=200, deadline=None)
@given(st.binary(max_size=200))
def test_bytes_at_random_never_raise(data: bytes) -> None:
    interpret(parse_text(data), declared())
