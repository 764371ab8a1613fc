"""Tool change clearance: does the turret index where its tools can swing into the part?

What
    Looks where the tool stands when the turret is called to another station: inside the envelope of the part and
    the chuck, or closer to it than a set distance in both X and Z.

Why
    The turret swings all its tools. A drill or bar that sticks out further than the tool just used sweeps through
    the place where that one stood.

Formula and source
    Distance of the tool point from the box around the remaining stock. Stop: it stands inside. Review: nearer
    than index_clearance, plus what the longest declared overhang of an axial tool sticks out beyond this one's.
    Common practice. Positions after a return to a reference point are taken as safe; after a block that
    is not audited nothing is judged.

Remedy
    Rapid out to a safe index position before the T word: first X, then Z from outside cuts, Z first out of a bore.
"""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise

from auditor.checks._judging import threshold
from auditor.checks._words import length, x_word, z_word
from auditor.declared.model import Point
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Move

CHECK = "tool-change-clearance"
LIMITS = (Limit("index_clearance", 5.0, "mm", "common practice", "least distance from the stock on indexing"),)
AXIAL = ("boring", "drilling")


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Index positions inside or near the part."""
    for before, behind in pairwise(run.path.moves):
        if before.tool == behind.tool or before.tool is None or behind.tool is None:
            continue
        at = behind.start  # unknown after a return whose place is not declared, or after a block not understood
        if at is not None:
            yield from _judge_place(run, before, behind, at)
        elif any(before.line < block.line <= behind.line for block in run.path.not_audited):
            yield NotJudged(CHECK, f"a block before T{behind.tool} is called is not audited: where the turret stands "
                                   "then is not known")


def _judge_place(run: Run, before: Move, behind: Move, at: Point) -> Iterator[Finding]:
    front, radius = _envelope(run, behind)
    gap_z, gap_r = at.z - front, abs(at.r) - radius
    wanted = threshold(run, LIMITS[0])
    wanted_z = wanted + _sticks_out_further(run, before)
    if gap_r >= wanted or gap_z >= wanted_z:
        return
    inside = gap_r < 0.0 and gap_z < 0.0
    lines = [line for number, line in run.path.tools_called if number == behind.tool and line <= behind.line]
    line = lines[-1] if lines else behind.line
    blocks = {block.line: block.label for block in run.text.blocks}
    where = "inside the part's envelope" if inside else f"{length(run, max(gap_z, gap_r), 1)} from the part"
    place = f"{x_word(run, at.r)} {z_word(run, at.z)}"
    message = f"The turret indexes to T{behind.tool} with the tool at {place}, {where}; {length(run, wanted, 1)} " \
              f"aside or {length(run, wanted_z, 1)} in front are wanted."
    yield Finding(
        CHECK, Level.STOP if inside else Level.REVIEW, line, blocks.get(line), behind.tool, message, at=at,
        value=max(gap_z, gap_r), limit=wanted, unit="mm", words=("T",), move=behind.index,
        remedy="Rapid out to a safe position before this T word.",
    )


def _envelope(run: Run, behind: Move) -> tuple[float, float]:
    """Front face and largest radius of the stock when the turret indexes: as the next cut meets it."""
    later = [index for index in run.simulation.stock_before if index >= behind.index]
    stock = run.simulation.stock_before[min(later)] if later else run.simulation.final
    _, _, front, radius = (stock if not stock.is_empty else run.simulation.raw).bounds
    return float(front), float(radius)


def _sticks_out_further(run: Run, before: Move) -> float:
    """How much further than this tool the longest axial tool reaches in front of the turret."""
    longest = max((tool.overhang or 0.0 for tool in run.job.tools.values() if tool.kind in AXIAL), default=0.0)
    own = run.job.tools.get(before.tool) if before.tool is not None else None
    reach = own.overhang if own is not None and own.overhang is not None and own.kind in AXIAL else 0.0
    return max(0.0, longest - reach) if longest else 0.0
