"""Random programs of every family against a second, independent statement of what they mean.

The statement stands in ``reference/``: written from the rules of the code tables and cycles (trade knowledge), with
no look at the code under test. Compared: kind, end, centre, feed, source line, and that each move starts where the
last one ended. The texts are in all three code systems, both units, absolute and incremental, and untidy.
"""

from __future__ import annotations

from random import Random

import pytest

from auditor.declared.model import Control, Point, Tool
from auditor.interpret import interpret
from auditor.interpret.moves import Interpretation, Move
from auditor.parse import parse_text
from tests.interpret.programs import declared, row
from tests.interpret.reference.families import FAMILIES
from tests.interpret.reference.pen import Pen
from tests.interpret.reference.steps import Step

SEEDS = 14
NEAR = 1e-4  # mm


def written(family: str, seed: int) -> Pen:
    """A program of a family, in a spelling and for a control that depend on the seed alone."""
    rng = Random(f"{family} {seed}")
    pen = Pen(
        rng,
        system=rng.choice("AABC"),
        inch=rng.random() < 0.15,
        increments=rng.random() < 0.15,
        radius=rng.random() < 0.1,
        mirrored=rng.random() < 0.1,
        untidy=rng.random() < 0.6,
    )
    FAMILIES[family](pen)
    return pen


def carried_out(pen: Pen) -> Interpretation:
    control = Control(system_declared=True, units="mm", **pen.control())
    tools = {1: Tool(1, "T1", "turning", nose_radius=pen.nose or 0.8, tip=pen.tip)}
    pen.lines[0] = "T0101 " + pen.lines[0]
    return interpret(parse_text(pen.text()), declared(control, tools, start=Point(100.0, 100.0)))


def wrong(line: int, step: Step, move: Move, before: Move | None) -> str | None:
    """What is wrong about a move, None when nothing is."""
    kind, x, z = row(move)
    if (kind, move.line) != (step.kind, line):
        return f"{kind} of line {move.line}"
    if x is None or z is None or abs(x - step.x) > NEAR or abs(z - step.z) > NEAR:
        return f"ends at X{x} Z{z}"
    if step.cx is not None and step.cz is not None:
        centre = move.centre
        if centre is None or abs(2 * centre.r - step.cx) > NEAR or abs(centre.z - step.cz) > NEAR:
            return f"centre {centre}"
    if step.feed is not None and (move.feed is None or abs(move.feed.value - step.feed) > 1e-6):
        return f"feed {move.feed}"
    if kind == "T" and move.lead != pytest.approx(step.feed):
        return f"lead {move.lead}"
    if before is not None and (move.start_z, move.start_r) != (before.end_z, before.end_r):
        return "does not start where the last move ended"
    return None


@pytest.mark.parametrize("family", FAMILIES)
def test_both_statements_agree(family: str) -> None:
    for seed in range(SEEDS):
        pen = written(family, seed)
        found = carried_out(pen)
        wanted = pen.noted()
        told = f"\n{family} {seed}: system {pen.system}, {pen.settings}\n{pen.text()}"
        assert not found.not_audited, told + str(found.not_audited)
        before = None
        for (line, step), move in zip(wanted, found.moves, strict=False):
            fault = wrong(line, step, move, before)
            assert fault is None, f"{told}line {line}: wanted {step}, but {fault}"
            before = move
        assert len(found.moves) == len(wanted), told
