"""The width of cut below which no regenerative chatter can start: an indicator, never a pass."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.kienzle import specific_force
from auditor.mechanics.validity import Floats, ValidRange, not_negative, positive

DAMPING: Final = ValidRange(
    "damping ratio",
    "",
    0.01,
    0.15,
    "common practice: steel bar 0.01 to 0.03, structure 0.03 to 0.06, damped bar to 0.15",
)
DIRECTION: Final = ValidRange("directional factor", "", 0.3, 0.6, "common practice, radial mode in turning")


def dynamic_coefficient(kc11: ArrayLike, mc: ArrayLike, h: ArrayLike, direction: ArrayLike) -> Floats:
    """Force per width and per change of thickness along the mode, K = mu (1 - mc) kc.

    Parameters
    ----------
    kc11 : array_like (...), N/mm2
        Kienzle constant.
    mc : array_like (...), dimensionless
        Kienzle exponent.
    h : array_like (...), mm
        Chip thickness about which it vibrates.
    direction : array_like (...), dimensionless
        Directional factor mu, see `DIRECTION`.

    Returns
    -------
    ndarray (...), N/mm2
        K.

    Raises
    ------
    ValueError
        Constants or thickness impossible, directional factor negative.

    Examples
    --------
    >>> round(float(dynamic_coefficient(1659.0, 0.21, 0.2, 0.45)))
    827

    References
    ----------
    Slope of Kienzle's law, d(kc h)/dh = (1 - mc) kc; Altintas, Manufacturing Automation, ch. 4 (orientation factor).
    """
    slope = (1.0 - np.asarray(mc, dtype=np.float64)) * specific_force(kc11, mc, h)
    return np.asarray(not_negative("directional factor", "", direction) * slope)


def limiting_width(stiffness: ArrayLike, damping: ArrayLike, coefficient: ArrayLike) -> Floats:
    """Width of cut stable at every speed, b_lim = 2 k zeta (1 + zeta) / K.

    It is -1 / (2 K Re[G]min) with Re[G]min = -1 / (4 k zeta (1 + zeta)) of one mode.

    Parameters
    ----------
    stiffness : array_like (...), N/mm
        Static stiffness k of the mode.
    damping : array_like (...), dimensionless
        Damping ratio zeta, see `DAMPING`.
    coefficient : array_like (...), N/mm2
        Force per width and change of thickness, see `dynamic_coefficient`.

    Returns
    -------
    ndarray (...), mm
        b_lim; between the lobes more can be stable.

    Raises
    ------
    ValueError
        An argument not above zero.

    Examples
    --------
    >>> round(float(limiting_width(2e4, 0.03, 2000.0)), 3)
    0.618

    References
    ----------
    Tlusty and Polacek 1963; Altintas, Manufacturing Automation, ch. 4, absolute stability limit.
    """
    k, zeta = positive("stiffness", "N/mm", stiffness), positive("damping ratio", "", damping)
    return np.asarray(2.0 * k * zeta * (1.0 + zeta) / positive("dynamic coefficient", "N/mm2", coefficient))
