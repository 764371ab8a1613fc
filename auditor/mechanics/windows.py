"""Minimum chip thickness and the trade's windows for feed, depth and edge length."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, not_negative, positive

MINIMUM_CHIP_SHARE: Final = ValidRange(
    "h_min / edge radius", "", 0.25, 0.33, "de Oliveira et al. 2015, AISI 1045 (P20 alike)"
)
CHIP_ASPECT: Final = ValidRange("depth / feed", "", 4.0, 15.0, "common practice in roughing; 5 to 10 preferred")
PRESSED_INSERT_FEED: Final = 0.05  # mm/rev, smallest feed of pressed inserts (common practice)
GENERAL_FEED_SHARE: Final = 0.5  # of the nose radius (common practice)
_USABLE: Final = {"C": 2 / 3, "S": 2 / 3, "E": 2 / 3, "T": 0.5, "D": 0.5, "K": 0.5, "V": 0.25, "W": 0.5, "R": 0.685}


def minimum_chip(edge_radius: ArrayLike, share: float = MINIMUM_CHIP_SHARE.high) -> Floats:
    """Thickness below which the edge rubs instead of cutting, a share of its rounding.

    Parameters
    ----------
    edge_radius : array_like (...), mm
        Radius of the edge rounding.
    share : float, dimensionless
        0.25 to 0.33 of the radius; the upper figure is the careful one.

    Returns
    -------
    ndarray (...), mm
        h_min.

    Raises
    ------
    ValueError
        Radius negative, share not above zero.

    Examples
    --------
    >>> round(float(minimum_chip(0.04)), 4)
    0.0132

    References
    ----------
    de Oliveira et al. 2015 (minimum chip thickness 0.25 to 0.33 of the edge radius), at second hand.
    """
    return np.asarray(not_negative("edge radius", "mm", edge_radius) * positive("share", "", share))


def roughing_feed(nose_radius: ArrayLike) -> Floats:
    """Largest usual roughing feed for a nose radius.

    Parameters
    ----------
    nose_radius : array_like (...), mm
        Corner radius; the table runs from 0.4 to 2.4 mm, half the radius is taken outside.

    Returns
    -------
    ndarray (...), mm/rev
        0.2, 0.4, 0.6, 0.8, 1.2 for radii 0.4, 0.8, 1.2, 1.6, 2.4: half the radius.

    Raises
    ------
    ValueError
        Radius negative.

    Examples
    --------
    >>> roughing_feed([0.4, 0.8]).tolist()
    [0.2, 0.4]

    References
    ----------
    Common practice: table of nose radius and largest roughing feed.
    """
    return np.asarray(GENERAL_FEED_SHARE * not_negative("nose radius", "mm", nose_radius))


def smallest_feed(land_width: ArrayLike) -> Floats:
    """Smallest feed at which chip-breaker and face of a pressed insert still work.

    Parameters
    ----------
    land_width : array_like (...), mm
        Width of the primary land.

    Returns
    -------
    ndarray (...), mm/rev
        Half the land, at least 0.05.

    Raises
    ------
    ValueError
        Land width negative.

    Examples
    --------
    >>> smallest_feed([0.05, 0.2]).tolist()
    [0.05, 0.1]

    References
    ----------
    Common practice.
    """
    return np.asarray(np.maximum(0.5 * not_negative("land width", "mm", land_width), PRESSED_INSERT_FEED))


def usable_edge(shape: str, edge_length: ArrayLike) -> Floats:
    """Longest engaged edge an insert of a shape should be given.

    Parameters
    ----------
    shape : str, ISO 1832 letter
        C, S, E two thirds; T, D, K, W half (W of its short edge); V a quarter; R 0.685 of the
        diameter, the arc engaged at a depth of 0.4 of it.
    edge_length : array_like (...), mm
        Length of the edge; of round inserts the diameter.

    Returns
    -------
    ndarray (...), mm
        Usable engaged length (not depth).

    Raises
    ------
    ValueError
        Letter without a figure, length not above zero.

    Examples
    --------
    >>> round(float(usable_edge("C", 12.9)), 1)
    8.6

    References
    ----------
    Common practice, table by insert shape (letters of ISO 1832).
    """
    if shape not in _USABLE:
        raise ValueError(f"no usable share is known for insert shape {shape!r}; wanted one of {', '.join(_USABLE)}")
    return np.asarray(_USABLE[shape] * positive("edge length", "mm", edge_length))


def smallest_finishing_depth(nose_radius: ArrayLike) -> Floats:
    """Smallest depth of a finishing cut, a third of the nose radius.

    Parameters
    ----------
    nose_radius : array_like (...), mm
        Corner radius.

    Returns
    -------
    ndarray (...), mm
        r/3; two thirds are better.

    Raises
    ------
    ValueError
        Radius negative.

    Examples
    --------
    >>> round(float(smallest_finishing_depth(0.8)), 3)
    0.267

    References
    ----------
    Common practice; below the radius the passive force outgrows the feed force (Colwell 1954).
    """
    return np.asarray(not_negative("nose radius", "mm", nose_radius) / 3.0)
