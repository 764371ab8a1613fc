"""From a log and an audited program to the material's force factor, or to the reasons why it cannot be told."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

import numpy as np

from auditor.calibrate.fit import Fit, robust_fit, student_t
from auditor.calibrate.log import LoadLog
from auditor.calibrate.matching import LeftOut, Matched, Point, match
from auditor.calibrate.timeline import timeline_of
from auditor.errors import Fault, UsageError
from auditor.findings import Run

FEWEST_CUTS = 3
LEAST_CONTRAST = 1.5  # strongest over weakest cut, from which idle power can be told without air cuts
WIDEST_INTERVAL = 0.30  # half width over factor, beyond which the log tells too little
PLAUSIBLE = (0.4, 2.5)  # a factor outside is no matter of the material
LEAST_SCATTER = 0.10  # one-sided; no calibration on one part is better than that (common practice)
EFFICIENCY_DOUBT = 0.08  # relative, when the machine's efficiency is taken for granted (usual 0.80 to 0.90)
SPREADS = 2.0  # standard deviations that the scatter of a material stands for
ODD_TOOL = 0.15  # relative residual of one tool that points at the tool rather than at the material
OUTLIER = 0.5  # weight below which a cut is called held down


def grouped(left_out: Sequence[LeftOut], most: int = 5) -> list[str]:
    """What was not used, one text a reason."""
    reasons: dict[str, list[str]] = {}
    for one in left_out:
        reasons.setdefault(one.why, []).append(one.what)
    return [
        f"{', '.join(what[:most])}{f' and {len(what) - most} more' if len(what) > most else ''}: {why}"
        for why, what in reasons.items()
    ]


@dataclass(frozen=True, slots=True)
class ToolResidual:
    """How the cuts of one tool lie about the fit."""

    tool: int | None
    residuals: tuple[float, ...]  # relative to the fitted power, one a cut

    @property
    def mean(self) -> float:
        """Their mean."""
        return float(np.mean(self.residuals))


@dataclass(frozen=True, slots=True)
class Calibration:
    """A fitted force factor, what it rests on and what follows for the material."""

    factor: float
    interval: tuple[float, float]  # 95 %
    idle: float  # kW at the mean speed
    idle_slope: float  # kW per 1000 rpm
    cuts: int
    air_cuts: int
    held_down: tuple[int, ...]  # lines of the outliers
    between: float  # relative spread of single cuts
    scatter: float  # one-sided, for the material from now on
    scatter_before: float
    scatter_why: str
    tools: tuple[ToolResidual, ...]
    matched: Matched
    warnings: tuple[str, ...]


def calibrate(run: Run, log: LoadLog, *, peak: bool = False) -> Calibration:
    """Fit the force factor of the job's material to a log.

    Raises
    ------
    UsageError
        The log does not belong to the program, or does not tell the factor: with the reason and what would.
    """
    material = run.job.workpiece.material
    if material.kc11 is None:
        raise UsageError(Fault(f"{material.name} has no force pair that a factor could be fitted to",
                               file=run.job.path, key="workpiece.material", wanted="a material with kc11 and mc"))
    matched = match(log, run, timeline_of(run), peak=peak)
    points = matched.points
    predicted = np.array([point.predicted for point in points])
    air = predicted <= 0.0
    _refuse_poor(log, points, matched)
    fit = robust_fit(
        predicted, np.array([point.measured for point in points]), np.array([point.rpm for point in points]),
        with_idle=bool(air.any()),
    )  # fmt: skip
    _refuse_vague(log, fit)
    assumed = any(entry.about.endswith("machine.efficiency") for entry in run.job.assumptions)
    scatter, why = _scatter(fit, assumed, run.job.machine.efficiency)
    tools = tuple(_tools(points, fit, predicted))
    return Calibration(
        factor=fit.factor, interval=fit.interval(), idle=fit.idle, idle_slope=fit.idle_slope,
        cuts=int((~air).sum()), air_cuts=int(air.sum()),
        held_down=tuple(point.line for point, weight in zip(points, fit.weights, strict=True) if weight < OUTLIER),
        between=fit.between, scatter=scatter, scatter_before=material.scatter, scatter_why=why, tools=tools,
        matched=matched, warnings=tuple(_warnings(run, fit, tools, assumed)),
    )  # fmt: skip


def _refuse_poor(log: LoadLog, points: tuple[Point, ...], matched: Matched) -> None:
    """Reasons for which no factor can be told, before any fit."""
    powers = sorted(point.predicted for point in points if point.predicted > 0.0)
    air = sum(point.predicted <= 0.0 for point in points)
    reasons = f" (left out: {'; '.join(grouped(matched.left_out))})" if matched.left_out else ""
    if len(powers) < FEWEST_CUTS + (0 if air else 1):
        raise UsageError(Fault(f"too few cuts can be compared{reasons}", file=log.path,
                               found=f"{len(powers)} cuts, {air} in air",
                               wanted=f"{FEWEST_CUTS} cuts and feed in air besides, or {FEWEST_CUTS + 1} cuts"))
    if not air and powers[-1] < LEAST_CONTRAST * powers[0]:
        raise UsageError(Fault(
            "idle power cannot be told from cutting power: there is no feed in air, and all cuts are about as heavy",
            file=log.path, found=f"cuts of {powers[0]:.1f} to {powers[-1]:.1f} kW predicted",
            wanted="a log that holds feed in air, or cuts of different weight"))


def _refuse_vague(log: LoadLog, fit: Fit) -> None:
    """Reasons that only the fit shows."""
    half = student_t(0.95, fit.freedom) * fit.error
    if not math.isfinite(fit.factor) or fit.factor <= 0.0:
        raise UsageError(Fault("the measured load does not rise with the predicted one", file=log.path,
                               wanted="a log of this program, this stock and these tools"))
    if half / fit.factor > WIDEST_INTERVAL:
        raise UsageError(Fault(
            "the log tells too little: the factor is known no better than before", file=log.path,
            found=f"{fit.factor:.2f}, give or take {half:.2f}", wanted="heavier cuts, or more of them"))
    if not PLAUSIBLE[0] <= fit.factor <= PLAUSIBLE[1]:
        raise UsageError(Fault(
            "such a factor is no matter of the material: percent of another power, another efficiency, another stock "
            "or worn edges", file=log.path, found=f"{fit.factor:.2f}",
            wanted=f"{PLAUSIBLE[0]:g} to {PLAUSIBLE[1]:g}; load_percent is of what the motor can give at that speed, "
                   "rated_percent of its largest continuous power"))


def _scatter(fit: Fit, assumed: bool, efficiency: float) -> tuple[float, str]:
    """The band of a single cut from now on, and what makes it up."""
    own = fit.error / fit.factor
    parts = [(fit.between, "spread from cut to cut"), (own, "of the factor itself")]
    if assumed:
        parts.append((EFFICIENCY_DOUBT / SPREADS, f"efficiency {efficiency:g} taken for granted"))
    reckoned = SPREADS * math.sqrt(sum(part**2 for part, _ in parts))
    told = ", ".join(f"{100 * part:.1f} % {what}" for part, what in parts)
    why = f"{SPREADS:g} standard deviations of {told}, in quadrature: {100 * reckoned:.0f} %"
    if reckoned < LEAST_SCATTER:
        why += f"; never below {100 * LEAST_SCATTER:.0f} %, since heat, stock and edges of the next part differ"
    return max(reckoned, LEAST_SCATTER), why


def _tools(points: tuple[Point, ...], fit: Fit, predicted: np.ndarray) -> Iterator[ToolResidual]:
    cutting = fit.factor * predicted
    tools = dict.fromkeys(point.tool for point in points if point.predicted > 0.0)
    for tool in tools:
        own = [index for index, point in enumerate(points) if point.tool == tool and point.predicted > 0.0]
        yield ToolResidual(tool, tuple(float(fit.residuals[index] / cutting[index]) for index in own))


def _warnings(run: Run, fit: Fit, tools: tuple[ToolResidual, ...], assumed: bool) -> Iterator[str]:
    if assumed:
        yield (f"The machine's efficiency is not declared; {run.job.machine.efficiency:g} is taken. Factor and "
               "efficiency cannot be told apart by a load meter: keep both together, on this machine.")
    if fit.idle < 0.0:
        yield "The idle power comes out below zero: the readings may already have it taken off."
    if len(tools) > 1:
        for one in tools:
            if abs(one.mean) > ODD_TOOL:
                side = "more" if one.mean > 0.0 else "less"
                yield (f"T{one.tool} takes {100 * abs(one.mean):.0f} % {side} than the factor says: look at its "
                       "declared geometry or its edge before the material.")
