"""One block at a time: words evaluated, then each in the order in which a control lets it act."""

from __future__ import annotations

from auditor.declared.control_settings import amount, choice
from auditor.interpret import calls, cycle_calls, dwell, modes, reference, speeds, toolwords, zeros  # noqa: F401
from auditor.interpret.cycles.call import CycleFault
from auditor.interpret.expressions import ExpressionFault
from auditor.interpret.left_out import known_words, not_understood, skip_unreadable, without_value
from auditor.interpret.mcodes import WITHOUT_EFFECT, note_unknown
from auditor.interpret.motion import has_axis_words
from auditor.interpret.numbers import check_numbers
from auditor.interpret.registry import ACTIONS, M_CODES, MODAL, MOTIONS, WORDS, Phase
from auditor.interpret.run import NotUnderstood, Run
from auditor.interpret.statements import carry_out_statement
from auditor.interpret.systems import DRILLING_CYCLES, code_text, group_of, known_elsewhere
from auditor.interpret.words import LIVE_LETTERS, BlockWords
from auditor.parse.blocks import Block

# functions that turning does not follow: what they are, for the reason of a block not audited
NOT_TURNING = {
    "skip feed": "a feed that ends by a signal",
    "return from reference": "a return from the reference point",
    "circular thread clockwise": "a thread on an arc",
    "circular thread counter-clockwise": "a thread on an arc",
    "side drilling": "drilling from the side with a driven tool",
    "side tapping": "tapping from the side with a driven tool",
    "side boring": "boring from the side with a driven tool",
}
CALLS = frozenset({98, 99, 198})  # their H and other letters are no axes
ARC_MOTIONS = frozenset({"arc clockwise", "arc counter-clockwise"})
LIVE_MODES = {
    "polar interpolation": "polar interpolation off",
    "cylindrical interpolation": "cylindrical interpolation",
    "polygon turning": "polygon turning off",
    "opposite turret": "opposite turret off",
}


def carry_out(run: Run, block: Block) -> None:
    """Carry out one block; whatever is wrong with it is written down, never raised."""
    line, label = run.flow.place(block)
    run.words = BlockWords(line, label, block.text, ())
    run.called_name = block.called
    if block.fault is not None:
        skip_unreadable(run, block)
        return
    strokes = run.strokes
    try:
        if block.statement is not None:
            carry_out_statement(run, block)
            return
        words = known_words(run, block)
        if words is None:
            return
        run.words = words
        act(run, words)
    except ExpressionFault as fault:
        without_value(run, block, str(fault))
    except NotUnderstood as problem:
        not_understood(run, problem)
    except CycleFault as fault:
        run.note(fault)
        run.not_audited(fault.message)
    if run.strokes == strokes and run.words.values:
        if run.chain is None or run.chain.words[-1] is not run.words:  # a line held for its corner does move
            run.compensated.blank_blocks += 1
    elif run.strokes != strokes:
        calls.call_after_motion(run)


def act(run: Run, words: BlockWords) -> None:
    """Let every word of the block take effect, in the order of a control."""
    if run.state.data_input and not words.calls("data input end"):
        return
    refused = _check_repeats(run, words)
    check_numbers(run, words)
    if words.only_moves:
        _act_once_or_move(run, words, refused)
        return
    try:
        if not _takes_all_words(words):
            for phase in (Phase.READING, Phase.FEED, Phase.SPEED, Phase.TOOL, Phase.START, Phase.MODE):
                _take_effect(run, words, phase)
            _check_codes(run, words)
            _set_motion(run, words)
        _act_once_or_move(run, words, refused)
    finally:  # a motion that cannot be followed takes no end and no call away
        _take_effect(run, words, Phase.AFTER)


def _takes_all_words(words: BlockWords) -> bool:
    """Macro calls take every letter as an argument."""
    return words.calls("macro call") or words.calls("modal macro call")


def _take_effect(run: Run, words: BlockWords, phase: Phase) -> None:
    for function in dict.fromkeys(words.functions):
        entry = MODAL.get(function)
        if entry is not None and entry[0] is phase:
            entry[1](run, words)
    if phase in WORDS:
        WORDS[phase](run, words)
    if _takes_all_words(words):
        return
    for code in dict.fromkeys(words.m_codes):
        found = M_CODES.get(code)
        if found is not None and found[0] is phase:
            found[1](run, words)
        elif found is None and phase is Phase.START and code not in WITHOUT_EFFECT:
            note_unknown(run, code)


def _check_codes(run: Run, words: BlockWords) -> None:
    """Codes that are not followed: fatal for the block when it carries axis words, else said."""
    for code in words.unknown_codes:
        elsewhere = known_elsewhere(run.system, code)
        known = "; " + ", ".join(f"in system {s} it is {name}" for s, name in elsewhere.items()) if elsewhere else ""
        text = f"{code_text(code)} is not a code of system {run.system}{known}"
        run.remark("unknown-g", text, "G")
        if has_axis_words(words):
            run.state.motion = None
            raise NotUnderstood(text)
    for function in words.functions:
        if function in LIVE_MODES:
            run.state.live_mode = None if words.integer("C") == 0 else function
        elif function in LIVE_MODES.values():
            run.state.live_mode = None
        if function in NOT_TURNING:
            run.state.motion = None
            raise NotUnderstood(f"{NOT_TURNING[function]} is not followed", "unsupported", ("G",))


def _set_motion(run: Run, words: BlockWords) -> None:
    """The motion code in force; one of its group ends a drilling cycle."""
    for function in words.functions:
        group = group_of(function)
        if group == "motion":
            if function != run.state.motion:
                run.state.stored.pop(function, None)
            run.state.motion, run.state.drilling = function, None
        elif group == "drilling":
            if function != run.state.drilling:
                run.state.stored.pop(function, None)
            run.state.drilling = function if function in DRILLING_CYCLES else None


def _act_once_or_move(run: Run, words: BlockWords, refused: str | None) -> None:
    if refused is not None:
        raise NotUnderstood(refused)
    once = [function for function in words.functions if function in ACTIONS]
    if once:
        ACTIONS[once[-1]](run, words)
        return
    live = [] if CALLS.intersection(words.m_codes) else sorted(words.by_letter.keys() & LIVE_LETTERS)
    circle = run.state.motion in ARC_MOTIONS and words.has("I", "K")
    if not has_axis_words(words) and not live and not circle and not words.has(",A", ",C", ",R"):
        return
    if live or run.state.live_mode is not None:
        _refuse_live(run, live)
    motion = run.state.drilling or run.state.motion
    if motion is None:
        run.state.forget_position()
        raise NotUnderstood("which motion code is in force is not known here", "position-unknown")
    MOTIONS[motion](run, words)


def _refuse_live(run: Run, live: list[str]) -> None:
    plain_corners = choice(run.control, "corner_words") == "comma or plain"
    if run.state.live_mode is None and set(live) <= {"A", "C"} and run.state.motion == "feed" and plain_corners:
        return
    what = run.state.live_mode or "the axis of " + " and ".join(live)
    raise NotUnderstood(f"{what}: milling and second spindles are not followed", "axis-not-modelled", tuple(live))


def _check_repeats(run: Run, words: BlockWords) -> str | None:
    """Words and code groups that stand twice: the last acts, or the control refuses the block, for the reason given."""
    if _takes_all_words(words):
        return None
    refused = None
    if len(words.values) > len(words.by_letter) + len(words.functions) + len(words.unknown_codes) + len(words.m_codes):
        refused = _note_repeated(run, words)
    if not words.only_moves:
        _check_repeated_codes(run, words)
    return refused


def _check_repeated_codes(run: Run, words: BlockWords) -> None:
    groups = [group_of(function) for function in set(words.functions)]
    for group in sorted(set(groups) - {"one-shot"}):
        if groups.count(group) > 1:
            run.remark("code-group-repeated", f"two codes of the {group} group in one block: the last one acts", "G")
    most = int(amount(run.control, "m_codes_per_block"))
    if len(words.m_codes) > most:
        run.remark(
            "m-codes-many",
            f"{len(words.m_codes)} M codes in one block, the control takes {most}",
            "M",
            value=float(len(words.m_codes)),
            limit=float(most),
        )


def _note_repeated(run: Run, words: BlockWords) -> str | None:
    """Say which words stand twice; why the control refuses the block, if it does."""
    refuses = choice(run.control, "repeated_words") == "refuse"
    seen: set[str] = set()
    refused = None
    for value in words.values:
        if value.letter in seen and value.letter not in "GM":
            twice = f"{value.letter} stands twice in the block"
            acts = "this control refuses it" if refuses else "the last one acts"
            run.remark("word-repeated", f"{twice}: {acts}", value.letter)
            refused = twice if refuses else None
        seen.add(value.letter)
    return refused
