"""Where a law may be trusted, and the guard at every law's door."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike, NDArray

Floats = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class ValidRange:
    """The range of one quantity in which a law was measured, derived or is used by the trade."""

    quantity: str
    unit: str
    low: float
    high: float
    source: str

    def covers(self, values: ArrayLike) -> NDArray[np.bool_]:
        """Which of the values lie inside, bounds included; NaN lies outside.

        Parameters
        ----------
        values : array_like (...), the range's own unit
            Values to be judged.

        Returns
        -------
        ndarray (...), true or false
            Inside or not.

        Examples
        --------
        >>> ValidRange("feed", "mm/rev", 0.1, 0.5, "example").covers([0.05, 0.3]).tolist()
        [False, True]
        """
        x = np.asarray(values, dtype=np.float64)
        inside: NDArray[np.bool_] = (x >= self.low) & (x <= self.high)
        return np.asarray(inside)

    def __str__(self) -> str:
        return f"{self.quantity} {self.low:g} to {self.high:g} {self.unit} ({self.source})"


def _refuse(name: str, unit: str, wrong: Floats, wanted: str) -> ValueError:
    found = f"{float(wrong.flat[0]):g} {unit}".rstrip()
    return ValueError(f"{name} must be {wanted}; found {found}")


def finite(name: str, unit: str, values: ArrayLike) -> Floats:
    """The values as floats, refusing infinity (NaN passes: a row without that figure)."""
    x = np.asarray(values, dtype=np.float64)
    wrong = np.isinf(x)
    if wrong.any():
        raise _refuse(name, unit, x[wrong], "a finite number")
    return x


def positive(name: str, unit: str, values: ArrayLike) -> Floats:
    """The values as floats, refusing zero and less."""
    x = finite(name, unit, values)
    wrong = x <= 0.0
    if wrong.any():
        raise _refuse(name, unit, x[wrong], "greater than zero")
    return x


def not_negative(name: str, unit: str, values: ArrayLike) -> Floats:
    """The values as floats, refusing less than zero."""
    x = finite(name, unit, values)
    wrong = x < 0.0
    if wrong.any():
        raise _refuse(name, unit, x[wrong], "zero or more")
    return x


def between(name: str, unit: str, values: ArrayLike, low: float, high: float) -> Floats:
    """The values as floats, refusing what does not lie strictly between the bounds."""
    x = finite(name, unit, values)
    wrong = (x <= low) | (x >= high)
    if wrong.any():
        raise _refuse(name, unit, x[wrong], f"between {low:g} and {high:g}")
    return x


def angle(name: str, degrees: ArrayLike, low: float = -90.0, high: float = 90.0) -> Floats:
    """An angle in radians from degrees, refusing what does not lie strictly between the bounds."""
    return np.asarray(np.radians(between(name, "deg", degrees, low, high)))


def ratio(numerator: Floats, denominator: Floats) -> Floats:
    """Numerator over denominator, NaN where the denominator is zero or too small to divide by."""
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        out = np.divide(numerator, denominator)
    return np.asarray(np.where(np.isinf(out), np.nan, out))
