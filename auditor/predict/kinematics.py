"""Spindle speed and feed at any point of a move."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from auditor.declared.model import Machine
from auditor.interpret.moves import Kind, Move
from auditor.predict.loads import Floats, Ints


@dataclass(frozen=True, slots=True)
class Commands:
    """What the moves ask of spindle and feed, one entry a move; NaN where nothing is commanded."""

    surface: np.ndarray  # bool: constant surface speed
    value: Floats  # rpm or m/min; NaN with the spindle stopped or never set
    ceiling: Floats  # rpm: the lower of clamp and machine limit
    per_rev: np.ndarray  # bool
    feed: Floats  # mm/rev or mm/min

    @classmethod
    def of(cls, moves: Sequence[Move], machine: Machine) -> Commands:
        """The commands of a program on a machine."""
        limit = machine.speed_limit
        return cls(
            surface=np.array([move.spindle.mode == "surface" for move in moves], dtype=bool),
            value=np.array([_spindle_value(move) for move in moves], dtype=np.float64),
            ceiling=np.array([min(move.spindle.clamp or limit, limit) for move in moves], dtype=np.float64),
            per_rev=np.array([_is_per_rev(move) for move in moves], dtype=bool),
            feed=np.array([_feed_value(move) for move in moves], dtype=np.float64),
        )

    def rpm(self, move: Ints, radius: Floats) -> Floats:
        """Spindle speed with the programmed point at a radius, rpm; shape of ``radius``."""
        with np.errstate(divide="ignore", invalid="ignore"):
            surface = 1000.0 * self.value[move] / (2.0 * math.pi * np.abs(radius))
        commanded = np.where(self.surface[move], surface, self.value[move])
        return np.minimum(commanded, self.ceiling[move])

    def feed_per_rev(self, move: Ints, rpm: Floats) -> Floats:
        """Feed in mm/rev at a spindle speed; NaN where none is commanded or the spindle stands."""
        with np.errstate(divide="ignore", invalid="ignore"):
            from_minutes = np.where(rpm > 0.0, self.feed[move] / rpm, math.nan)
        feed = np.where(self.per_rev[move], self.feed[move], from_minutes)
        return np.where((feed > 0.0) & (rpm > 0.0), feed, math.nan)


def _spindle_value(move: Move) -> float:
    spindle = move.spindle
    return spindle.value if spindle.value is not None and spindle.direction != 0 else math.nan


def _is_per_rev(move: Move) -> bool:
    return move.kind is Kind.THREAD or move.feed is None or move.feed.mode == "rev"


def _feed_value(move: Move) -> float:
    if move.kind is Kind.RAPID:
        return math.nan
    if move.kind is Kind.THREAD and move.lead is not None:
        return move.lead
    return move.feed.value if move.feed is not None else math.nan
