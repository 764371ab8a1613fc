"""Audits made by hand, so that reports are judged without the stages before them."""

from __future__ import annotations

import hashlib
import re
from collections.abc import Mapping, Sequence
from dataclasses import fields, replace
from types import MappingProxyType

import numpy as np
from shapely import Polygon

from auditor.declared.model import (
    Acceptance,
    Assumption,
    Control,
    Job,
    Machine,
    Material,
    Point,
    Tool,
    Workholding,
    Workpiece,
)
from auditor.findings import Audit, Coverage, Finding, Level, Limit, NotJudged, Rule, Run, Totals
from auditor.interpret.moves import Feed, Interpretation, Kind, Move, NotAudited, Spindle
from auditor.parse.blocks import Block, Number, ProgramText, Word
from auditor.predict.loads import Loads, MoveFigures, Prediction
from auditor.simulate.samples import Samples, Simulation

PROGRAM = """\
%
O0001 (DRIVE STUB)
N10 G50 S3000
N20 T0101
N30 G96 S180 M3
N40 G0 X56. Z2.
N50 G1 Z-40. F0.3
N60 G2 X60. Z-42. R2.
N70 G0 X100. Z100.
N80 G65 P9100 Z-5.
N90 M30
%
"""

_WORD = re.compile(r"([A-Z])([-+]?[\d.]+)")


def program_text(source: str = PROGRAM, path: str = "drive-stub.nc") -> ProgramText:
    """The text with the words of every block found by a plain pattern."""
    lines = tuple(source.splitlines())
    return ProgramText(
        path=path, sha256=hashlib.sha256(source.encode("utf-8", "replace")).hexdigest(), lines=lines,
        blocks=tuple(_block(number, line) for number, line in enumerate(lines, 1)),
    )


def _block(number: int, line: str) -> Block:
    code = re.sub(r"\(.*?\)", lambda match: " " * len(match[0]), line)
    words = tuple(
        Word(match[1], Number(float(match[2]), "." in match[2], match[2]), match.start(), match.end())
        for match in _WORD.finditer(code) if match[1] not in "NO"
    )
    label = re.match(r"N(\d+)", code)
    return Block(number, line, words=words, number=int(label[1]) if label else None)


def job(**changed: object) -> Job:
    """A job with one turning tool; any field may be given anew."""
    material = Material("C45", "P", "C45 normalised", "test", "declared", 1800.0, 0.24)
    whole = Job(
        path="drive-stub.job.toml", sha256="0" * 64, program="drive-stub.nc", control=Control(units="mm"),
        machine=Machine("slant-15", 4500.0, ((1150.0, 15.0), (4500.0, 15.0)), 1150.0),
        workholding=Workholding("chuck", "chuck", 95.0),
        workpiece=Workpiece(material, (Point(1.5, 0.0), Point(1.5, 30.0), Point(-123.5, 30.0), Point(-123.5, 0.0)),
                            125.0, 60.0),
        tools={1: Tool(1, "T1 CNMG 120408", "turning", nose_radius=0.8)},
    )
    return replace(whole, **changed)  # type: ignore[arg-type]


def moves() -> tuple[Move, ...]:
    """A rapid from an unknown place, a cut, an arc and a rapid away."""
    turning = Spindle(1, "surface", 180.0, 3000.0)
    feed = Feed("rev", 0.3)
    return (
        Move(0, 6, "N40", 1, Kind.RAPID, None, None, 2.0, 28.0, None, turning),
        Move(1, 7, "N50", 1, Kind.FEED, 2.0, 28.0, -40.0, 28.0, feed, turning),
        Move(2, 8, "N60", 1, Kind.ARC, -40.0, 28.0, -42.0, 30.0, feed, turning, centre=Point(-42.0, 28.0),
             clockwise=True),
        Move(3, 9, "N70", 1, Kind.RAPID, -42.0, 30.0, 100.0, 50.0, None, turning, provisional=True),
    )


# Figures of the cutting move as the contract's example of a move gives them.
CUT = {
    "time": 8.2, "cutting_time": 7.8, "feed_rev": 0.3, "rpm_low": 1023.1, "rpm_high": 1023.1, "speed_low": 180.0,
    "speed_high": 192.9, "depth": 2.0, "length": 2.46, "chip_max": 0.299, "area": 0.6, "rake": 7.5, "cutting": 1320.0,
    "feed_force": 640.0, "passive": 410.0, "torque": 38.2, "power": 4.1, "motor_power": 4.8,
}
NOWHERE = {"time": 1.0, "cutting_time": 0.0}


def figures(rows: Sequence[Mapping[str, float]] = (NOWHERE, CUT, NOWHERE, NOWHERE)) -> MoveFigures:
    """Figures per move; NaN where a row gives none."""
    columns = {field.name: np.array([row.get(field.name, np.nan) for row in rows]) for field in fields(MoveFigures)}
    return MoveFigures(**columns)


def loads(move: Sequence[int] = (1, 1), **given: Sequence[float]) -> Loads:
    """Loads at some positions; NaN where nothing is given."""
    nothing = [np.nan] * len(move)
    columns = {field.name: np.array(given.get(field.name, nothing), dtype=float) for field in fields(Loads)}
    columns["move"] = np.array(move, dtype=np.int64)
    return Loads(**columns)


def no_samples() -> Samples:
    """Samples without a row."""
    return Samples(**{field.name: np.array([]) for field in fields(Samples)})


def simulation(removed: Sequence[float] = (0.0, 15112.0, np.nan, 0.0)) -> Simulation:
    """A simulation of which a report reads the volumes."""
    raw = Polygon([(1.5, 0.0), (1.5, 30.0), (-123.5, 30.0), (-123.5, 0.0)])
    return Simulation(
        samples=no_samples(), edges=(), removed=np.array(removed), final_surface=np.zeros(len(removed), dtype=bool),
        contacts=(), loose=(), raw=raw, final=raw, stock_before={},
    )


def power_finding(**changed: object) -> Finding:
    """Too much power in the cut of line 7."""
    whole = Finding(
        "spindle-power", Level.STOP, 7, "N50", 1, "The cut takes more than the spindle gives at this speed.",
        at=Point(-12.0, 25.0), value=16.9, band=(14.4, 19.4), limit=13.5, unit="kW",
        remedy="Within the limit at F0.22, or at depth 1.5 mm.", words=("F",),
        situation="T1 CNMG 120408 at X50, depth 2.0, feed 0.30, 180 m/min, cutting force 1320 N", move=1,
        fingerprint="f00d",
    )
    return replace(whole, **changed)  # type: ignore[arg-type]


def review_finding(**changed: object) -> Finding:
    """A question about the arc of line 8."""
    return power_finding(**{
        "check": "surface-roughness", "level": Level.REVIEW, "line": 8, "block": "N60", "value": 1.5,
        "band": (1.1, 1.9), "limit": 1.6, "unit": "um", "message": "The surface may come out rougher than asked.",
        "remedy": None, "words": ("X", "R"), "move": 2, "fingerprint": "beef", **changed,
    })


def note_finding(**changed: object) -> Finding:
    """Something worth knowing."""
    return Finding(**{
        "check": "air-time", "level": Level.NOTE, "line": 6, "block": "N40", "tool": 1,
        "message": "A feed move that cuts nothing.", "fingerprint": "cafe", **changed,
    })  # type: ignore[arg-type]


RULES = ("air-time", "chuck-grip", "spindle-power", "surface-roughness")


def rule(name: str = "spindle-power") -> Rule:
    """A check's text."""
    text = "Power: does the spindle carry the cut?\n\nWhat\n    Compares.\n"
    limit = Limit("power_share", 1.0, "", "common practice", "share of the spindle's power that may be used")
    return Rule(name, text.split("\n", 1)[0], text, (limit,), lambda run: iter(()))


def audit(
    findings: Sequence[Finding] = (), *, verdict: str = "clear", source: str = PROGRAM, path: str = "drive-stub.nc",
    not_audited: Sequence[NotAudited] = (), not_judged: Sequence[NotJudged] = (),
    assumptions: Sequence[Assumption] = (), declared: Job | None = None, moved: Sequence[Move] | None = None,
    prediction: Prediction | None = None, simulated: Simulation | None = None,
) -> Audit:
    """A whole audit around some findings."""
    path_taken = moves() if moved is None else tuple(moved)
    cut = loads(position=[0.0, 42.0], z=[2.0, -40.0], r=[28.0, 28.0], motor_power=[np.nan, 4.8], rpm=[1023.1, 1023.1],
                cutting=[np.nan, 1320.0])
    run = Run(
        job=job() if declared is None else declared, text=program_text(source, path),
        path=Interpretation(path_taken, (), tuple(not_audited), frozenset({6, 7, 8, 9}), "A", "mm"),
        simulation=simulation() if simulated is None else simulated,
        prediction=Prediction(cut, figures(), 1.0) if prediction is None else prediction, limits={},
    )
    count = 4 + len(not_audited)
    return Audit(
        run=run, verdict=verdict, coverage=Coverage(count, 4, tuple(not_audited)),  # type: ignore[arg-type]
        findings=tuple(findings), not_judged=tuple(not_judged), assumptions=tuple(assumptions),
        totals=Totals(212.4, 171.0, 12.2, 96540.2), rules=MappingProxyType({name: rule(name) for name in RULES}),
    )


ACCEPTED = Acceptance("spindle-power", "runs like this for years", line=7)
NOT_AUDITED = NotAudited(10, "N80 G65 P9100 Z-5.", "subprogram 9100 is not in this file")
NO_GRIP = NotJudged("chuck-grip", "workholding.grip_force is not declared")
EDGE = Assumption("tools.1.edge_radius", "0.04 mm", "not declared; usual for roughing geometries")


def faulty() -> Audit:
    """One of everything, as a stop."""
    return audit(
        [note_finding(), power_finding(), review_finding()], verdict="stop", not_judged=[NO_GRIP], assumptions=[EDGE],
    )
