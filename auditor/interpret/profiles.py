"""The profile P to Q of a multiple cycle: found in the text and carried out from the start point."""

from __future__ import annotations

import copy
from dataclasses import dataclass, replace

from auditor.declared.control_settings import switch
from auditor.interpret.compensated_run import CompensatedRun
from auditor.interpret.cycles.call import CycleFault, Stroke
from auditor.interpret.expressions import ExpressionFault
from auditor.interpret.jumps import check_repeated
from auditor.interpret.library import Program
from auditor.interpret.moves import Kind
from auditor.interpret.reading import UnknownValues, read_block
from auditor.interpret.run import NotUnderstood, Run, Side
from auditor.interpret.systems import MULTIPLE_CYCLES, group_of
from auditor.interpret.travel import settle
from auditor.interpret.words import BlockWords
from auditor.parse.blocks import Block

# what may stand in a profile besides motion
_ALLOWED_GROUPS = frozenset({"motion", "speed", "absolute", "feed mode", "compensation", "plane"})
_ALLOWED_ONCE = frozenset({"dwell", "exact stop", "exact stop mode", "cutting mode"})
_FORBIDDEN_M = frozenset({2, 30, 98, 99, 198})


@dataclass(frozen=True, slots=True)
class Profile:
    """A profile carried out: its strokes, and what a cycle asks about its first block."""

    strokes: tuple[Stroke, ...]
    spans: frozenset[str]  # axis letters in block ns
    rapid_mode: bool  # block ns is G0
    last: int  # index of block nf
    first: int  # index of block ns
    side: Side  # compensation within


def carry_out_profile(run: Run, words: BlockWords, *, finishing: bool) -> Profile:
    """Find block P to block Q and carry them out without writing moves.

    Raises
    ------
    CycleFault
        When the profile is missing or holds what a profile must not hold.
    """
    program = run.flow.frame.program
    first, last = _bounds(run, words, program)
    blocks = program.blocks[first : last + 1]
    keep = run.state, run.compensated, run.words, run.stock_in_doubt
    run.state = copy.deepcopy(run.state)
    run.compensated, run.collected, run.profile_is_cut = CompensatedRun(), [], finishing
    compensate = finishing or switch(run.control, "rough_compensation")
    if not compensate:
        run.state.compensation = "off"
    try:
        ready = _carry_out(run, blocks, compensate)
        strokes = tuple(run.collected)
    finally:
        within = run.state
        run.state, run.compensated, run.words, run.stock_in_doubt = keep
        run.collected, run.profile_is_cut = None, False
    if finishing:  # feed and speed of the profile stay in force behind the finishing cycle
        run.state.feed, run.state.spindle = within.feed, within.spindle
    ns = ready[0]
    spans = frozenset(letter for letter in ("X", "Z", "U", "W") if ns.has(letter))
    rapid_mode = not strokes or strokes[0].kind is Kind.RAPID
    return Profile(strokes, spans, rapid_mode, last, first, run.profile_side)


def _bounds(run: Run, words: BlockWords, program: Program) -> tuple[int, int]:
    ns, nf = words.integer("P"), words.integer("Q")
    if ns is None or nf is None:
        text = "the cycle needs P and Q, the block numbers of its profile"
        raise CycleFault("cycle-profile-missing", text, ("P", "Q"))
    here = run.flow.frame.index - 1
    first = program.find(ns, here, from_start=run.flow.from_start)
    if first is None:
        raise CycleFault("cycle-profile-missing", f"N{ns}, where the profile begins, is not in the program", ("P",))
    if nf not in program.places:
        raise CycleFault("cycle-profile-missing", f"N{nf}, where the profile ends, is not in the program", ("Q",))
    last = next((place for place in program.places[nf] if place >= first), None)
    if last is None:
        raise CycleFault("cycle-profile-bad", f"N{nf} stands before N{ns}: the profile has no end", ("P", "Q"))
    for number in (ns, nf):
        check_repeated(run, number)
    return first, last


def _carry_out(run: Run, blocks: tuple[Block, ...], compensate: bool) -> list[BlockWords]:
    from auditor.interpret.execute import act  # the executor calls cycles, cycles call it for their profile

    ready: list[BlockWords] = []
    run.profile_side = run.state.compensation
    for block in blocks:
        if block.skip is not None and run.control.block_skip:
            continue
        line, label = run.flow.place(block)
        run.words = BlockWords(line, label, block.text, ())
        if block.fault is not None or block.statement is not None:
            what = "a statement" if block.fault is None else "a block that cannot be read"
            raise CycleFault("cycle-profile-bad", f"{what} stands in the profile (line {line})", line=line)
        try:
            words = run.words = read_block(run, block)
            _check_allowed(words)
            if not ready:
                _check_first(run, words)
            if not run.profile_is_cut:  # roughing along the tip path has no use for the move that leaves it
                words = _without_compensation(words, off_only=compensate)
            act(run, words)
        except (NotUnderstood, ExpressionFault, UnknownValues) as problem:
            text = f"the profile cannot be followed (line {line}): {problem}"
            raise CycleFault("cycle-profile-bad", text, line=line) from None
        ready.append(words)
        if run.state.compensation != "off":
            run.profile_side = run.state.compensation
    settle(run)
    return ready


def _without_compensation(words: BlockWords, *, off_only: bool) -> BlockWords:
    dropped = {"compensation off"} if off_only else {"compensation off", "compensation left", "compensation right"}
    return replace(words, functions=tuple(function for function in words.functions if function not in dropped))


def _check_first(run: Run, words: BlockWords) -> None:
    motions = [function for function in words.functions if group_of(function) == "motion"]
    if not motions or motions[-1] not in ("rapid", "feed"):
        raise CycleFault(
            "cycle-profile-bad", "the first block of a profile has to carry G0 or G1", ("G",), line=words.line
        )


def _check_allowed(words: BlockWords) -> None:
    for function in words.functions:
        single = function.endswith(" cycle") or function in MULTIPLE_CYCLES
        if single or (group_of(function) not in _ALLOWED_GROUPS and function not in _ALLOWED_ONCE):
            raise CycleFault("cycle-profile-bad", f"{function} must not stand in a profile", ("G",), line=words.line)
    if words.unknown_codes:
        raise CycleFault("cycle-profile-bad", "an unknown G code stands in the profile", ("G",), line=words.line)
    if _FORBIDDEN_M & set(words.m_codes):
        raise CycleFault("cycle-profile-bad", "calls and ends must not stand in a profile", ("M",), line=words.line)
