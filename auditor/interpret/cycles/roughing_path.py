"""The strokes of a roughing cycle while they are being made, in the frame of the cycle."""

from __future__ import annotations

from dataclasses import dataclass, field, replace

from auditor.declared.control_settings import choice
from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleCall, Stroke
from auditor.interpret.cycles.frame import SAME, Spot
from auditor.interpret.cycles.profile import RoughProfile
from auditor.interpret.moves import Kind


@dataclass(slots=True)
class RoughingPath:
    """Where the tool is and what it has done so far; begins with the rapid to the shifted start."""

    call: CycleCall
    profile: RoughProfile
    retract: float
    strokes: list[Stroke] = field(default_factory=list)
    here: Spot = field(init=False)
    number: int = 0  # of the pass

    def __post_init__(self) -> None:
        self.here = self.profile.origin
        self.strokes.append(Stroke(Kind.RAPID, self.profile.frame.point(self.here), cycle_pass=1))

    def next_pass(self) -> None:
        """Count a pass."""
        self.number += 1

    def rapid(self, spot: Spot) -> None:
        """Rapid to a spot."""
        self._straight(Kind.RAPID, spot)

    def feed(self, spot: Spot) -> None:
        """Feed straight to a spot."""
        self._straight(Kind.FEED, spot)

    def infeed(self, height: float) -> None:
        """Down to a level, as block ns moves: in rapid or at feed."""
        self._straight(self.infeed_kind, Spot(self.here.along, height))

    def escape(self, spot: Spot) -> None:
        """Off the work by the retract."""
        self._straight(Kind.FEED if choice(self.call.control, "rough_escape") == "feed" else Kind.RAPID, spot)

    def follow(self, stroke: Stroke, spot: Spot) -> None:
        """A stroke along the profile that ends at the spot."""
        self.strokes.append(replace(stroke, cycle_pass=self.number))
        self.here = spot

    def finish(self, home: Point) -> None:
        """Down to the profile, along all of it, and straight back to the start of the cycle."""
        self.next_pass()
        self._straight(self.infeed_kind, self.profile.first)
        self.strokes += [replace(stroke, cycle_pass=self.number) for stroke in self.profile.strokes]
        self.strokes.append(Stroke(Kind.RAPID, home, cycle_pass=self.number))

    @property
    def infeed_kind(self) -> Kind:
        """How block ns moves."""
        return Kind.RAPID if self.call.rapid_mode else Kind.FEED

    def _straight(self, kind: Kind, spot: Spot) -> None:
        if abs(spot.along - self.here.along) > SAME or abs(spot.height - self.here.height) > SAME:
            self.strokes.append(Stroke(kind, self.profile.frame.point(spot), cycle_pass=self.number or 1))
        self.here = spot
