"""The robust fit: measured power against predicted power, outliers held down, the uncertainty from the residuals.

Model: measured = idle + idle' (speed - mean speed) + factor x predicted, with a spread that grows with the cut. Huber's
M-estimator by iterated reweighting; its covariance after Huber (Robust Statistics, 1981, ch. 7.6); Student's t for
the few cuts a log holds.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from statistics import NormalDist

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]
Bools = NDArray[np.bool_]

HUBER = 1.345  # residuals beyond this many spreads are held down; 95 % efficient on clean data (Huber)
ROUNDS = 30
CLOSE = 1e-6  # relative change of the solution at which the rounds end
MEDIAN_TO_SPREAD = 1.4826  # of a normal distribution
SMALLEST_SPREAD = 0.002  # of the largest reading: what a meter resolves
SMALLEST_RELATIVE, LARGEST_RELATIVE = 0.01, 1.0  # single cuts never agree better than that with any model
ENOUGH_IDLE = 4  # air cuts from which their own scatter tells the noise of the meter
SPEEDS_DIFFER = 1.2  # ratio of speeds among air cuts from which idle power may follow the speed


@dataclass(frozen=True, slots=True)
class Fit:
    """A fitted factor; arrays have shape (points,)."""

    factor: float
    error: float  # standard error of the factor
    freedom: int  # degrees of freedom left for it
    idle: float  # kW at the mean speed
    idle_slope: float  # kW per 1000 rpm
    between: float  # relative spread of single cuts about the fit
    weights: Floats  # 1: full, less: held down as an outlier
    residuals: Floats  # kW, measured less fitted

    def interval(self, confidence: float = 0.95) -> tuple[float, float]:
        """Limits between which the factor lies with that confidence."""
        half = student_t(confidence, self.freedom) * self.error
        return self.factor - half, self.factor + half


def robust_fit(predicted: Floats, measured: Floats, rpm: Floats, *, with_idle: bool) -> Fit:
    """Fit the factor; ``with_idle`` says that the points hold air cuts (predicted power zero).

    Raises
    ------
    ValueError
        Fewer than two degrees of freedom are left.
    """
    air = predicted <= 0.0
    design = _design(predicted, rpm, air, with_idle)
    freedom = int((~air).sum()) - (2 if with_idle else 3)  # the factor, the spread and, without air cuts, idle
    if freedom < 1 or len(measured) <= design.shape[1]:
        raise ValueError("too few cuts for a fit")
    floor = SMALLEST_SPREAD * float(np.max(np.abs(measured), initial=1e-9))
    spread = _joined(floor, 0.1 * predicted)
    weights = np.ones(len(measured), dtype=np.float64)
    solution = np.zeros(design.shape[1])
    for _ in range(ROUNDS):
        before = solution
        solution = _weighted(design, measured, weights / spread**2)
        residuals: Floats = measured - design @ solution
        noise = _noise(residuals[air], floor)
        relative = _relative(residuals[~air], solution[0] * predicted[~air], noise, freedom + 1)
        spread = _joined(noise, relative * abs(float(solution[0])) * predicted)
        weights = _huber(residuals / spread)
        if np.allclose(before, solution, rtol=CLOSE, atol=CLOSE):
            break
    error = _standard_error(design / spread[:, None], residuals / spread, air)
    slope = float(solution[2]) if design.shape[1] > 2 else 0.0
    return Fit(float(solution[0]), error, freedom, float(solution[1]), slope, relative, weights, residuals)


def _joined(noise: float, share: Floats) -> Floats:
    """Noise of the meter and a share of the cut in quadrature."""
    return np.asarray(np.hypot(noise, share), dtype=np.float64)


def _design(predicted: Floats, rpm: Floats, air: Bools, with_idle: bool) -> Floats:
    """Columns: predicted power, idle, and idle over speed where air cuts at several speeds tell it."""
    columns = [predicted, np.ones(len(predicted))]
    speeds = rpm[air]
    if with_idle and len(speeds) >= ENOUGH_IDLE and speeds.min() > 0.0 and speeds.max() / speeds.min() >= SPEEDS_DIFFER:
        columns.append((rpm - rpm.mean()) / 1000.0)
    return np.stack(columns, axis=1)


def _weighted(design: Floats, measured: Floats, weights: Floats) -> Floats:
    heavy = design * weights[:, None]
    return np.asarray(np.linalg.solve(design.T @ heavy, heavy.T @ measured), dtype=np.float64)


def _noise(residuals: Floats, floor: float) -> float:
    if len(residuals) < ENOUGH_IDLE:
        return floor
    return max(MEDIAN_TO_SPREAD * float(np.median(np.abs(residuals))), floor)


def _relative(residuals: Floats, cutting: Floats, noise: float, freedom: int) -> float:
    """Relative spread of single cuts: from the median residual, less what the meter's noise explains of it."""
    share = len(residuals) / freedom  # the fit itself has taken up some of the residuals
    size = np.maximum(np.abs(cutting), 1e-12)
    whole = share * (MEDIAN_TO_SPREAD * float(np.median(np.abs(residuals) / size))) ** 2
    left = whole - float(np.median(noise / size)) ** 2
    return min(max(math.sqrt(max(left, 0.0)), SMALLEST_RELATIVE), LARGEST_RELATIVE)


def _huber(standardised: Floats) -> Floats:
    size = np.abs(standardised)
    return np.asarray(np.where(size <= HUBER, 1.0, HUBER / np.maximum(size, 1e-300)))


def _standard_error(design: Floats, standardised: Floats, air: Bools) -> float:
    """Huber's covariance of an M-estimate, of the first column; the spread is judged by the cuts alone."""
    points, columns = design.shape
    judged = ~air if (~air).sum() > 2 else np.ones(points, dtype=bool)
    held = np.clip(standardised, -HUBER, HUBER)
    inside = float(np.mean(np.abs(standardised[judged]) <= HUBER)) or 1.0 / points
    correction = 1.0 + columns / points * (1.0 - inside) / inside
    count = int(judged.sum())
    used = min(columns, 1 if air.any() else 2)
    variance = float(np.sum(held[judged] ** 2)) / max(count - used, 1) / inside**2
    inverse = np.linalg.pinv(design.T @ design)
    return float(correction * math.sqrt(max(variance, 0.0) * float(inverse[0, 0])))


def student_t(confidence: float, freedom: int) -> float:
    """Two-sided quantile of Student's distribution.

    Exact for one and two degrees of freedom, else the Cornish-Fisher expansion (Abramowitz and Stegun 26.7.5),
    good to 0.3 % from three on.

    Example
    -------
    >>> round(student_t(0.95, 10), 3), round(student_t(0.95, 2), 3)
    (2.228, 4.303)
    """
    p = 0.5 * (1.0 + confidence)
    if freedom == 1:
        return math.tan(math.pi * (p - 0.5))
    if freedom == 2:
        return (2.0 * p - 1.0) * math.sqrt(2.0 / (4.0 * p * (1.0 - p)))
    z = NormalDist().inv_cdf(p)
    terms = (
        (z**3 + z) / 4.0,
        (5.0 * z**5 + 16.0 * z**3 + 3.0 * z) / 96.0,
        (3.0 * z**7 + 19.0 * z**5 + 17.0 * z**3 - 15.0 * z) / 384.0,
        (79.0 * z**9 + 776.0 * z**7 + 1482.0 * z**5 - 1920.0 * z**3 - 945.0 * z) / 92160.0,
    )
    return z + math.fsum(term / freedom ** (power + 1) for power, term in enumerate(terms))
