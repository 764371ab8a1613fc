"""Bars, tools and hand-written paths for the simulation's tests; lengths in mm, positions as (z, radius)."""

from __future__ import annotations

import math
from collections.abc import Iterable
from dataclasses import dataclass, field, replace

import numpy as np

from auditor.declared.model import Control, Job, Machine, Material, Point, Tool, Workholding, Workpiece
from auditor.interpret.moves import Feed, Interpretation, Kind, Move, Spindle
from auditor.simulate import simulate
from auditor.simulate.samples import Floats, Simulation

MATERIAL = Material("steel", "P", "steel", "invented", "declared", 1800.0, 0.25)
MACHINE = Machine("lathe", 4500.0, ((1000.0, 15.0), (4500.0, 15.0)), 1000.0)
CHUCK = Workholding("chuck", "chuck", 95.0)

ROUGHER = Tool(1, "T1", "turning", shape="C", nose_radius=0.8, cutting_edge_angle=95.0, included_angle=80.0,
               edge_length=12.9)  # fmt: skip
COPIER = Tool(2, "T2", "turning", shape="D", nose_radius=0.4, cutting_edge_angle=93.0, included_angle=55.0,
              edge_length=11.63)  # fmt: skip
KNIFE = Tool(3, "T3", "turning", shape="C", nose_radius=0.0, cutting_edge_angle=90.0, included_angle=80.0,
             edge_length=12.9)  # fmt: skip
BLADE = Tool(4, "T4", "grooving", nose_radius=0.0, width=3.0)
DRILL = Tool(5, "T5", "drilling", diameter=12.0, point_angle=140.0)
BORER = Tool(6, "T6", "boring", shape="C", nose_radius=0.4, cutting_edge_angle=95.0, included_angle=80.0,
             edge_length=6.45, tip=2)  # fmt: skip
CUTTER_OFF = Tool(7, "T7", "parting", nose_radius=0.2, width=3.0)
THREADER = Tool(8, "T8", "threading", nose_radius=0.0, cutting_edge_angle=60.0, included_angle=60.0, edge_length=9.5,
                tip=8)  # fmt: skip
TOOLS = (ROUGHER, COPIER, KNIFE, BLADE, DRILL, BORER, CUTTER_OFF, THREADER)


def bar(diameter: float = 60.0, length: float = 100.0, face: float = 0.0, bore: float = 0.0) -> Workpiece:
    """A bar whose front face stands at z = face."""
    outer, inner = diameter / 2.0, bore / 2.0
    corners = ((face, inner), (face - length, inner), (face - length, outer), (face, outer))
    return Workpiece(MATERIAL, tuple(Point(*corner) for corner in corners), length, diameter)


def shaped(*corners: tuple[float, float]) -> Workpiece:
    """Stock of any half-section."""
    points = tuple(Point(*corner) for corner in corners)
    return Workpiece(MATERIAL, points, 100.0, 2.0 * max(point.r for point in points))


@dataclass
class Path:
    """Moves strung together from a first point."""

    z: float
    r: float
    tool: int = 1
    feed: float = 0.3
    moves: list[Move] = field(default_factory=list)

    def to(self, z: float, r: float, kind: Kind = Kind.FEED, **more: object) -> Path:
        """One more move; a feed unless said otherwise."""
        move = Move(
            index=len(self.moves), line=len(self.moves) + 1, block=None, tool=self.tool, kind=kind,
            start_z=self.z, start_r=self.r, end_z=z, end_r=r,
            feed=None if kind is Kind.RAPID else Feed("rev", self.feed), spindle=Spindle(1, "rpm", 1000.0),
        )  # fmt: skip
        self.moves.append(replace(move, **more))  # type: ignore[arg-type]
        self.z, self.r = z, r
        return self

    def rapid(self, z: float, r: float, *, dogleg: bool = False) -> Path:
        """A rapid; straight unless the dog-leg is asked for."""
        return self.to(z, r, Kind.RAPID, dogleg=dogleg)

    def arc(self, z: float, r: float, centre: tuple[float, float], *, clockwise: bool) -> Path:
        """An arc about a centre."""
        return self.to(z, r, Kind.ARC, centre=Point(*centre), clockwise=clockwise)

    def thread(self, z: float, r: float, lead: float) -> Path:
        """A thread pass."""
        return self.to(z, r, Kind.THREAD, lead=lead)

    def with_tool(self, number: int) -> Path:
        """From here on another tool."""
        self.tool = number
        return self


def job(workpiece: Workpiece, tools: Iterable[Tool] = TOOLS, machine: Machine = MACHINE) -> Job:
    """A job on the lathe above."""
    return Job(None, None, "part.nc", Control(units="mm"), machine, CHUCK, workpiece,
               {tool.number: tool for tool in tools})  # fmt: skip


def interpreted(path: Path) -> Interpretation:
    """The moves as an interpreter would hand them on."""
    return Interpretation(tuple(path.moves), (), (), frozenset(), "A", "mm")


def cut(path: Path, workpiece: Workpiece, tools: Iterable[Tool] = TOOLS, machine: Machine = MACHINE) -> Simulation:
    """The path carried out on the stock."""
    return simulate(interpreted(path), job(workpiece, tools, machine))


def depths(simulation: Simulation, move: int) -> tuple[Floats, Floats]:
    """Positions of a move and the depth there: extents of all stretches summed."""
    samples = simulation.samples
    rows = samples.move == move
    first = np.flatnonzero(samples.stretch[rows] == 0)
    if len(first) == 0:
        return np.empty(0), np.empty(0)
    return samples.position[rows][first], np.add.reduceat((samples.high - samples.low)[rows], first)


def depth_at(simulation: Simulation, move: int, position: float) -> float:
    """Depth at a position of a move, read between the stored points."""
    positions, depth = depths(simulation, move)
    return float(np.interp(position, positions, depth)) if len(positions) else 0.0


def deepest(simulation: Simulation, move: int) -> float:
    """Largest depth along a move."""
    return float(depths(simulation, move)[1].max(initial=0.0))


def stretches_at(simulation: Simulation, move: int, position: float) -> list[tuple[float, float]]:
    """Across-intervals engaged in a stored piece round a position that lies between two stored ones."""
    samples = simulation.samples
    rows = np.flatnonzero(samples.move == move)
    before = rows[samples.position[rows] <= position]
    last = samples.position[before].max()
    kept = before[samples.position[before] == last]
    # of a jump the later rows count: those from the last row with stretch 0 on
    kept = kept[np.flatnonzero(samples.stretch[kept] == 0)[-1]:]
    return [(float(samples.low[row]), float(samples.high[row])) for row in kept if samples.high[row] > samples.low[row]]


def edge_length(simulation: Simulation, move: int, low: float, high: float) -> float:
    """Length of a move's leading edge between two across-coordinates, summed side by side."""
    edge = simulation.edges[int(simulation.samples.edge[np.flatnonzero(simulation.samples.move == move)[0]])]
    total = 0.0
    for index in range(len(edge.sine)):
        share = min(high, edge.across[index + 1]) - max(low, edge.across[index])
        if share > 0.0:
            rise = (edge.along[index + 1] - edge.along[index]) / (edge.across[index + 1] - edge.across[index])
            total += share * math.hypot(1.0, rise)
    return total
