"""The fit alone: the stated interval holds the truth as often as it says, and outliers do not move it."""

from __future__ import annotations

import math

import numpy as np
import pytest

from auditor.calibrate.fit import Fit, robust_fit, student_t

FACTOR, IDLE = 1.2, 0.6
SEEDS = 160


def one(seed: int, *, cuts: int = 12, air: int = 6, spread: float = 0.05, noise: float = 0.05, odd: int = 0) -> Fit:
    """Cuts of 0.5 to 8 kW, each with a relative error of its own, readings with a noise; some readings far off."""
    chance = np.random.default_rng(seed)
    predicted = np.concatenate([chance.uniform(0.5, 8.0, cuts), np.zeros(air)])
    errors = 1.0 + spread * chance.standard_normal(cuts + air)
    measured = IDLE + FACTOR * predicted * errors + noise * chance.standard_normal(cuts + air)
    measured[:odd] += 3.0 * chance.choice([-1.0, 1.0], odd)
    return robust_fit(predicted, measured, np.full(cuts + air, 1000.0), with_idle=air > 0)


@pytest.mark.parametrize(
    "case",
    [
        {}, {"cuts": 5}, {"cuts": 4, "air": 4}, {"air": 0}, {"spread": 0.15}, {"spread": 0.0, "noise": 0.2}, {"odd": 1},
        {"cuts": 20, "odd": 2},
    ],
    ids=str,
)  # fmt: skip
def test_the_interval_holds_the_truth_as_often_as_it_says(case: dict[str, float]) -> None:
    """95 % is stated; of 160 made-up logs 95 % give 152 with a standard deviation of 2.8: at least 143 must hold it,
    and the mean factor may be off by a quarter of the interval's half width at most."""
    fits = [one(seed, **case) for seed in range(SEEDS)]  # type: ignore[arg-type]
    held = sum(low <= FACTOR <= high for low, high in (fit.interval() for fit in fits))
    half = float(np.median([fit.interval()[1] - fit.factor for fit in fits]))
    assert held >= 143
    assert abs(float(np.mean([fit.factor for fit in fits])) - FACTOR) < 0.25 * half


def test_without_noise_the_truth_comes_back() -> None:
    fit = one(1, spread=0.0, noise=0.0)
    assert fit.factor == pytest.approx(FACTOR, rel=1e-6)
    assert fit.idle == pytest.approx(IDLE, rel=1e-6)


def test_one_wild_reading_is_held_down() -> None:
    """Plain least squares would be drawn off; the robust fit stays within the clean fit's interval."""
    clean, wild = one(3), one(3, odd=1)
    low, high = clean.interval()
    assert low <= wild.factor <= high
    assert wild.weights[0] < 0.5


def test_the_spread_of_single_cuts_is_found() -> None:
    """Made with 10 %; a median of 100 fits of 15 cuts is known to about 2 %."""
    found = [one(seed, cuts=15, spread=0.10, noise=0.01).between for seed in range(100)]
    assert float(np.median(found)) == pytest.approx(0.10, abs=0.02)


def test_idle_may_follow_the_speed() -> None:
    """Idle 0.3 kW and 0.4 kW per 1000 rpm: told by feeds in air at several speeds."""
    rpm = np.array([500.0, 1000.0, 1500.0, 2000.0, 800.0, 1200.0, 1800.0, 900.0])
    predicted = np.array([0.0, 0.0, 0.0, 0.0, 3.0, 5.0, 2.0, 6.0])
    fit = robust_fit(predicted, 0.3 + 0.4 * rpm / 1000.0 + 1.1 * predicted, rpm, with_idle=True)
    assert (fit.factor, fit.idle_slope) == (pytest.approx(1.1), pytest.approx(0.4))


def test_too_few_cuts_are_refused() -> None:
    with pytest.raises(ValueError, match="too few"):
        robust_fit(np.array([1.0, 2.0]), np.array([1.0, 2.0]), np.array([900.0, 900.0]), with_idle=False)


@pytest.mark.parametrize(
    ("freedom", "quantile"), [(1, 12.706), (2, 4.303), (3, 3.182), (5, 2.571), (10, 2.228), (30, 2.042), (120, 1.980)]
)
def test_student_s_quantiles(freedom: int, quantile: float) -> None:
    """The usual table of two-sided 95 % quantiles."""
    assert student_t(0.95, freedom) == pytest.approx(quantile, rel=0.003)
    assert math.isfinite(student_t(0.95, 10_000))
