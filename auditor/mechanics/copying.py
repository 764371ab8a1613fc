"""Edge angles against the true path: which edge cuts when a tool copies inwards, outwards or faces."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, between, finite, not_negative

COPYING_MARGIN: Final = 2.0  # deg the minor edge keeps free when copying inwards (common practice 2 to 3)
OUT_COPYING_MARGIN: Final = 3.0  # deg the main edge keeps when copying outwards


def minor_edge_angle(edge_angle: ArrayLike, included_angle: ArrayLike) -> Floats:
    """Tool minor cutting edge angle, kr' = 180 - kr - eps.

    Parameters
    ----------
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r.
    included_angle : array_like (...), deg
        Included angle of the corner.

    Returns
    -------
    ndarray (...), deg
        kr'.

    Raises
    ------
    ValueError
        An angle not between 0 and 180 degrees.

    Examples
    --------
    >>> float(minor_edge_angle(93.0, 55.0))
    32.0

    References
    ----------
    ISO 3002-1 (1982), angles in the reference plane.
    """
    kr = between("cutting edge angle", "deg", edge_angle, 0.0, 180.0)
    return np.asarray(180.0 - kr - between("included angle", "deg", included_angle, 0.0, 180.0))


def working_edge_angle(edge_angle: ArrayLike, path_angle: ArrayLike) -> Floats:
    """Cutting edge angle of the main edge against the true direction of motion, kr - phi.

    Parameters
    ----------
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r against the nominal feed.
    path_angle : array_like (...), deg
        Direction of motion against the nominal feed, + away from the axis.

    Returns
    -------
    ndarray (...), deg
        The main edge cuts where this lies between 0 and 180.

    Raises
    ------
    ValueError
        kappa_r not between 0 and 180 degrees, path angle infinite.

    Examples
    --------
    >>> float(working_edge_angle(95.0, 90.0))
    5.0

    References
    ----------
    ISO 3002-1 (1982), working cutting edge angle in the reference plane.
    """
    kr = between("cutting edge angle", "deg", edge_angle, 0.0, 180.0)
    return np.asarray(kr - finite("path angle", "deg", path_angle))


def minor_working_angle(minor_angle: ArrayLike, path_angle: ArrayLike) -> Floats:
    """Cutting edge angle of the minor edge against the true direction of motion, 180 + kr' + phi.

    Parameters
    ----------
    minor_angle : array_like (...), deg
        Tool minor cutting edge angle kr'.
    path_angle : array_like (...), deg
        Direction of motion against the nominal feed, + away from the axis.

    Returns
    -------
    ndarray (...), deg
        The minor edge cuts between 0 and 180; above, it trails with this less 180 as clearance.

    Raises
    ------
    ValueError
        An angle infinite.

    Examples
    --------
    >>> float(minor_working_angle(5.0, -90.0))
    95.0

    References
    ----------
    ISO 3002-1 (1982), working angles in the reference plane.
    """
    return np.asarray(180.0 + finite("minor edge angle", "deg", minor_angle) + finite("path angle", "deg", path_angle))


def steepest_in_copy(minor_angle: ArrayLike, margin: float = COPYING_MARGIN) -> Floats:
    """Steepest path towards the axis that keeps the minor edge free.

    Parameters
    ----------
    minor_angle : array_like (...), deg
        Tool minor cutting edge angle kr'.
    margin : float, deg
        Clearance kept in the reference plane; 2 to 3 in practice.

    Returns
    -------
    ndarray (...), deg
        kr' less the margin, not below zero.

    Raises
    ------
    ValueError
        An angle infinite or the margin negative.

    Examples
    --------
    >>> float(steepest_in_copy(32.0))
    30.0

    References
    ----------
    Geometry of ISO 3002-1 (1982); margin: common practice.
    """
    free = finite("minor edge angle", "deg", minor_angle) - not_negative("margin", "deg", margin)
    return np.asarray(np.maximum(free, 0.0))


def steepest_out_copy(edge_angle: ArrayLike, margin: float = OUT_COPYING_MARGIN) -> Floats:
    """Steepest path away from the axis on which the main edge still cuts.

    Parameters
    ----------
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r.
    margin : float, deg
        Working edge angle kept; 2 to 3 in practice.

    Returns
    -------
    ndarray (...), deg
        kr less the margin, not below zero.

    Raises
    ------
    ValueError
        kappa_r not between 0 and 180 degrees or the margin negative.

    Examples
    --------
    >>> float(steepest_out_copy(93.0))
    90.0

    References
    ----------
    Geometry of ISO 3002-1 (1982); margin: common practice.
    """
    free = between("cutting edge angle", "deg", edge_angle, 0.0, 180.0) - not_negative("margin", "deg", margin)
    return np.asarray(np.maximum(free, 0.0))
