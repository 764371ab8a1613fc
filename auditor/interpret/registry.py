"""Who carries out which function: handlers enter themselves here under the function's name."""

from __future__ import annotations

from collections.abc import Callable
from enum import IntEnum

from auditor.interpret.run import Run
from auditor.interpret.words import BlockWords

Handler = Callable[[Run, BlockWords], None]


class Phase(IntEnum):
    """The order in which the words of one block take effect, whatever their order in the text."""

    READING = 1  # units, absolute or incremental: how the other words are read
    FEED = 2
    SPEED = 3
    TOOL = 4
    START = 5  # M codes that act at once
    MODE = 6  # compensation, plane, work zero
    ACTION = 7  # the motion, or the one function that uses the axis words instead
    AFTER = 8  # M codes that act behind the motion


MODAL: dict[str, tuple[Phase, Handler]] = {}  # G functions that change the state
ACTIONS: dict[str, Handler] = {}  # G functions that use the axis words of their own block
MOTIONS: dict[str, Handler] = {}  # what modal motion does with axis words
WORDS: dict[Phase, Handler] = {}  # F, S and T
M_CODES: dict[int, tuple[Phase, Handler]] = {}

Enter = Callable[[Handler], Handler]


def modal(phase: Phase, *functions: str) -> Enter:
    """Enter a handler for functions that change the state in ``phase``."""

    def enter(handler: Handler) -> Handler:
        MODAL.update(dict.fromkeys(functions, (phase, handler)))
        return handler

    return enter


def action(*functions: str) -> Enter:
    """Enter a handler for functions that act once, with the axis words of the block."""

    def enter(handler: Handler) -> Handler:
        ACTIONS.update(dict.fromkeys(functions, handler))
        return handler

    return enter


def motion(*functions: str) -> Enter:
    """Enter a handler for a modal motion or modal cycle."""

    def enter(handler: Handler) -> Handler:
        MOTIONS.update(dict.fromkeys(functions, handler))
        return handler

    return enter


def word(phase: Phase) -> Enter:
    """Enter the reader of F, S or T in ``phase``."""

    def enter(handler: Handler) -> Handler:
        WORDS[phase] = handler
        return handler

    return enter


def m_code(phase: Phase, *codes: int) -> Enter:
    """Enter a handler for M codes."""

    def enter(handler: Handler) -> Handler:
        M_CODES.update(dict.fromkeys(codes, (phase, handler)))
        return handler

    return enter
