"""Carries the moves out on the stock: what each cuts, what it touches, what is left."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, fields, replace
from typing import Any

import numpy as np
from numpy.typing import NDArray
from shapely.geometry.base import BaseGeometry

from auditor.declared.model import Job, Point, Tool
from auditor.interpret.moves import Interpretation, Kind, Move
from auditor.simulate.engage import Stretches, engagement
from auditor.simulate.outline import Outline
from auditor.simulate.pieces import Piece, path_length, pieces, straight
from auditor.simulate.rapids import arrival_contact, dogleg_contact, near_contact
from auditor.simulate.runs import runs
from auditor.simulate.samples import Contact, Edge, Floats, Ints, LoosePiece, Samples, Simulation
from auditor.simulate.shares import swept_volume
from auditor.simulate.stock import boundary_segments, enclosed_volume, raw_stock, split_loose, swept, volume, without
from auditor.simulate.surface import final_surface
from auditor.simulate.threads import thread_pass
from auditor.simulate.tool_outline import tool_outline

JOINT = 2e-6  # mm: a row this close to the joint of two merged moves lies on it
SCRATCH = 0.005  # mm: a rapid that only grazes a cut surface is no contact


@dataclass(frozen=True, slots=True)
class Stretch:
    """Rows of Samples that one straight piece contributes."""

    move: int
    edge: int
    piece: Piece
    position: Floats  # from the start of the piece
    low: Floats
    high: Floats
    stretch: Ints
    infeed: float | Floats = np.nan


def _samples(parts: list[Stretch]) -> Samples:
    """All rows of the program as read-only arrays."""
    counts = [len(part.position) for part in parts]
    local = _joined([part.position for part in parts])
    directions = np.array([part.piece.direction for part in parts]).reshape(-1, 2)
    origins = np.array([(*part.piece.start, part.piece.offset) for part in parts]).reshape(-1, 3)
    directions, origins = np.repeat(directions, counts, axis=0), np.repeat(origins, counts, axis=0)
    samples = Samples(
        move=np.repeat(np.array([part.move for part in parts], dtype=np.int64), counts),
        piece=np.repeat(np.arange(len(parts)), counts),
        edge=np.repeat(np.array([part.edge for part in parts], dtype=np.int64), counts),
        position=local + origins[:, 2],
        z=origins[:, 0] + local * directions[:, 0],
        r=origins[:, 1] + local * directions[:, 1],
        low=_joined([part.low for part in parts]),
        high=_joined([part.high for part in parts]),
        stretch=_joined([part.stretch for part in parts]).astype(np.int64),
        infeed=_joined([np.broadcast_to(part.infeed, len(part.position)) for part in parts]),
    )
    for column in fields(samples):
        getattr(samples, column.name).setflags(write=False)
    return samples


def _joined(columns: Sequence[NDArray[Any]]) -> Floats:
    return np.concatenate(columns) if columns else np.empty(0)


class Follower:
    """The stock and everything noticed while the moves run."""

    def __init__(self, job: Job, moves: int) -> None:
        self.job = job
        self.raw = raw_stock(job.workpiece)
        self.stock: BaseGeometry = self.raw
        self.sides = boundary_segments(self.stock)
        self.volume = enclosed_volume(self.sides)
        self.parts: list[Stretch] = []
        self.edges: list[Edge] = []
        self.edge_numbers: dict[tuple[int, tuple[float, float]], int] = {}
        self.outlines: dict[int, Outline] = {}
        self.removed = np.zeros(moves)
        self.contacts: list[Contact] = []
        self.loose: list[LoosePiece] = []
        self.stock_before: dict[int, BaseGeometry] = {}

    def follow(self, run: Sequence[Move]) -> None:
        """Carry out one move, or a run of cuts that lie on one line."""
        move = run[0]
        tool = self.job.tools.get(move.tool) if move.tool is not None else None
        if tool is None or tool.kind == "stop" or move.end is None:
            return
        outline = self._outline(tool)
        if move.start is None:
            self._arrive(move, outline)
        elif move.kind is Kind.RAPID:
            self._rapid(move, outline)
        elif move.kind is Kind.THREAD and tool.kind == "threading":
            self._thread(move, outline)
        elif len(run) > 1:
            self._cut_run(run, outline)
        else:
            self._cut(move, outline)
        self._drop_loose(run[-1])

    def _outline(self, tool: Tool) -> Outline:
        if tool.number not in self.outlines:
            self.outlines[tool.number] = tool_outline(tool)
        return self.outlines[tool.number]

    def _cut(self, move: Move, outline: Outline) -> float:
        """Engage and remove, piece by piece; returns the greatest depth met."""
        deepest = 0.0
        for piece in pieces(move):
            facing = outline.facing(piece.direction)
            stretches = engagement(facing.edge, self.sides, piece.start, piece.length)
            if not stretches.engaged:
                continue
            self._add(move, facing.edge, piece, stretches)
            deepest = max(deepest, float((stretches.high - stretches.low).max()))
            self._remove(move, facing.swept(piece.length, piece.start))
        return deepest

    def _cut_run(self, run: Sequence[Move], outline: Outline) -> None:
        """Cut a run of collinear moves at once; each move gets its own rows and its share of the volume."""
        whole = straight(run[0].start, run[-1].end)
        if whole is None:
            return
        bounds = np.concatenate(([0.0], np.cumsum([path_length(move) for move in run])))
        bounds *= whole.length / bounds[-1]
        facing = outline.facing(whole.direction)
        stretches = engagement(facing.edge, self.sides, whole.start, whole.length, bounds[1:-1])
        if not stretches.engaged:
            return
        shares = np.zeros(len(run))
        for number, move in enumerate(run):
            begin, end = float(bounds[number]), float(bounds[number + 1])
            rows = (stretches.position > begin - JOINT) & (stretches.position < end + JOINT)
            own = stretches.only(rows)
            self._add(move, facing.edge, replace(whole, offset=-begin), own)
            shares[number] = swept_volume(own, facing.edge, whole)
            self.stock_before[move.index] = self.stock
        before = self.volume
        self._remove(run[0], facing.swept(whole.length, whole.start))
        taken = before - self.volume
        self.removed[[move.index for move in run]] = taken * shares / (shares.sum() or 1.0)

    def _add(self, move: Move, edge: Edge, piece: Piece, stretches: Stretches) -> None:
        self.parts.append(
            Stretch(
                move.index, self._edge_number(edge), piece,
                stretches.position, stretches.low, stretches.high, stretches.stretch,
            )
        )  # fmt: skip

    def _edge_number(self, edge: Edge) -> int:
        key = (edge.tool, edge.direction)
        if key not in self.edge_numbers:
            self.edge_numbers[key] = len(self.edges)
            self.edges.append(edge)
        return self.edge_numbers[key]

    def _remove(self, move: Move, area: BaseGeometry) -> None:
        self.stock_before.setdefault(move.index, self.stock)
        self.stock = without(self.stock, area)
        self.sides = boundary_segments(self.stock)
        left = enclosed_volume(self.sides)
        self.removed[move.index] += self.volume - left
        self.volume = left

    def _rapid(self, move: Move, outline: Outline) -> None:
        before = self.stock
        first = len(self.parts)
        deepest = self._cut(move, outline)
        if deepest > SCRATCH:
            at = self._first_engaged(first)
            self.contacts.append(Contact(move.index, "rapid", at.z, at.r, deepest))
        if move.dogleg:
            self._note(dogleg_contact(move, outline, before, self.job.machine, SCRATCH))
        self._note(near_contact(move, outline, before, self.raw))

    def _arrive(self, move: Move, outline: Outline) -> None:
        """A rapid from a place not known: its way is not judged, but it must not end inside the stock."""
        contact = arrival_contact(move, outline, self.stock, SCRATCH) if move.kind is Kind.RAPID else None
        if contact is not None and move.end is not None:
            self.contacts.append(contact)
            self._remove(move, swept(outline.hull(), (0.0, 0.0), move.end))

    def _first_engaged(self, first: int) -> Point:
        """Where the programmed point stands when the edge first meets the stock."""
        part = self.parts[first]
        reach = float(part.position[np.argmax(part.high > part.low)])
        piece = part.piece
        return Point(piece.start.z + piece.direction[0] * reach, piece.start.r + piece.direction[1] * reach)

    def _note(self, contact: Contact | None) -> None:
        if contact is not None:
            self.contacts.append(contact)

    def _thread(self, move: Move, outline: Outline) -> None:
        cut = thread_pass(move, outline, self.stock)
        if cut is None:
            return
        number = self._edge_number(cut.edge)
        self.parts.append(
            Stretch(move.index, number, cut.piece, cut.position, cut.low, cut.high, cut.stretch, cut.infeed)
        )
        self._remove(move, cut.area)

    def _drop_loose(self, move: Move) -> None:
        held, cut_off = split_loose(self.stock)
        if not cut_off:
            return
        for part in cut_off:
            low, _, high, _ = part.bounds
            self.loose.append(LoosePiece(move.index, volume(part), (low, high)))
        self.stock = held
        self.sides = boundary_segments(held)
        self.volume = enclosed_volume(self.sides)


def simulate(path: Interpretation, job: Job) -> Simulation:
    """Cut the program in the half-section."""
    follower = Follower(job, len(path.moves))
    for run in runs(path.moves):
        follower.follow(run)
    samples = _samples(follower.parts)
    edges = tuple(follower.edges)
    return Simulation(
        samples=samples,
        edges=edges,
        removed=follower.removed,
        final_surface=final_surface(samples, edges, follower.stock, len(path.moves)),
        contacts=tuple(follower.contacts),
        loose=tuple(follower.loose),
        raw=follower.raw,
        final=follower.stock,
        stock_before=follower.stock_before,
    )
