"""The T word: tool and offset in one number, in the forms that shops write."""

from __future__ import annotations

from collections.abc import Container
from dataclasses import dataclass

from auditor.declared.control_settings import amount, choice, switch
from auditor.declared.model import Control
from auditor.interpret.registry import Phase, word
from auditor.interpret.run import Run
from auditor.interpret.travel import settle
from auditor.interpret.words import BlockWords
from auditor.parse.blocks import Number


@dataclass(frozen=True, slots=True)
class ToolCall:
    """What a T word says; ``tool`` None: the tool stays, ``offset`` None: none is called."""

    tool: int | None
    offset: int | None
    doubt: str | None = None  # the other reading, when there is one


def read_tool_word(number: Number, control: Control, declared: Container[int]) -> ToolCall:
    """Split a T word into tool and offset.

    Example
    -------
    >>> read_tool_word(Number(203, False, "0203"), Control(), {2})
    ToolCall(tool=2, offset=3, doubt=None)
    """
    digits = _digits(number)
    if switch(control, "offset_in_d_word"):
        return ToolCall(int(digits) or None, None)
    last = int(amount(control, "offset_digits"))
    if len(digits) > last:
        tool, offset = int(digits[:-last]), int(digits[-last:])
        if len(digits) > 4 and last == 2 and tool not in declared:
            return _long_form(digits)
        return ToolCall(tool or None, offset)
    value = int(digits)
    if value == 0:
        return ToolCall(None, 0)
    if choice(control, "short_tool_word") == "offset":
        return ToolCall(None, value)
    return ToolCall(value, value, f"read as tool {value} with its own offset; some controls take it as offset {value}")


def _digits(number: Number) -> str:
    """The digits as written: leading zeros count."""
    text = "".join(character for character in number.text if character.isdigit())
    return text if text and not number.has_point else str(abs(round(number.value)))


def _long_form(digits: str) -> ToolCall:
    """2 + 2 + 2, 2 + 3 or 4 + 4 digits."""
    if len(digits) == 8:
        return ToolCall(int(digits[:4]) or None, int(digits[4:]))
    tool, rest = int(digits[:2]), digits[2:]
    offset = int(rest[-2:]) if len(rest) == 4 else int(rest)
    doubt = f"read as tool {tool} with offset {offset}; how many digits count is a setting"
    return ToolCall(tool or None, offset, doubt)


@word(Phase.TOOL)
def tool_word(run: Run, words: BlockWords) -> None:
    """T of the block: the turret indexes, then the offset acts."""
    number = words.number("T")
    if number is None:
        return
    settle(run)
    if run.state.compensation != "off":
        run.remark(
            "compensation-left-on",
            "nose-radius compensation is on at a tool call",
            "T",
            remedy="cancel with G40 in a move before the tool call",
        )
    call = read_tool_word(number, run.control, run.job.tools)
    edge = words.number("D")
    tool = run.state.tool
    offset = round(edge.value) if edge is not None else call.offset
    if call.doubt and edge is None and 6 not in words.m_codes:
        run.remark("tool-ambiguous", f"T{number.text}: {call.doubt}", "T")
        run.lean_on("offset_digits", "the tool word")
        run.lean_on("short_tool_word", "the tool word")
    if call.tool is not None:
        _index(run, words, call.tool)
    if offset is not None and offset != tool.offset:
        _shift_at_once(run, number)
    tool.offset, tool.line, tool.certain = offset, words.line, True
    if call.tool is not None and offset not in (None, 0, call.tool):
        run.remark(
            "offset-foreign",
            f"tool {call.tool} is called with offset {offset}",
            "T",
            remedy=f"offset {call.tool}, unless a second offset is meant",
        )


def _shift_at_once(run: Run, number: Number) -> None:
    """Controls that shift the axes with the T word itself: harmless only at the places made for it."""
    if choice(run.control, "offset_acts") != "at once":
        return
    machine = run.job.machine
    if run.state.position in (machine.tool_change, machine.home, machine.second_home):
        return
    run.remark(
        "tool-in-motion",
        f"T{number.text} moves the axes by its offset at once, by an amount that only the control knows",
        "T",
        remedy="call the tool at its change position",
    )


def _index(run: Run, words: BlockWords, number: int) -> None:
    changes = number != run.state.tool.number
    run.state.tool.number = number
    run.log.tools_called.setdefault(number, words.line)
    if number not in run.job.tools and run.log.first_time("tool-undeclared", number):
        run.remark(
            "tool-undeclared",
            f"tool {number} is called and not declared; its cuts are not audited",
            "T",
            remedy=f"declare [tools.{number}] in the job file",
        )
    at_rest = any(words.calls(function) for function in ("dwell", "preset", "data input", "local zero"))
    if words.has("X", "Z", "U", "W") and not at_rest and changes:
        run.remark(
            "tool-in-motion",
            "a tool call in a block with motion: indexing and move may overlap",
            "T",
            remedy="give the tool call a block of its own",
        )
