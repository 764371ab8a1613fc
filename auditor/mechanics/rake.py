"""Rake and inclination: ISO 3002-1 conversions, and the rake the chip really meets."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, angle, finite, not_negative, positive, ratio

CONTACT_RATIO: Final = 2.0  # chip-tool contact length over chip thickness; 1.5 to 3 after Poletika, from memory
EFFECTIVE_RAKE: Final = ValidRange(
    "effective rake", "deg", -15.0, 26.0, "model: below, forces are an order of magnitude; above, K_g is clamped"
)


def side_rake(orthogonal: ArrayLike, inclination_angle: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Side rake gamma_f (working plane) from orthogonal rake and inclination.

    Parameters
    ----------
    orthogonal : array_like (...), deg
        Rake gamma_o in the orthogonal plane.
    inclination_angle : array_like (...), deg
        Inclination lambda_s, ISO sign: positive when the corner is the highest point of the edge.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180.

    Returns
    -------
    ndarray (...), deg
        gamma_f: tan gf = tan go sin kr - tan ls cos kr.

    Raises
    ------
    ValueError
        Rake or inclination not between -90 and 90, kappa_r not between 0 and 180 degrees.

    Examples
    --------
    >>> round(float(side_rake(-6.0, -6.0, 95.0)), 2)
    -6.5

    References
    ----------
    ISO 3002-1 (1982), conversion equations of tool angles.
    """
    go, ls = angle("orthogonal rake", orthogonal), angle("inclination", inclination_angle)
    kr = angle("cutting edge angle", edge_angle, 0.0, 180.0)
    return np.asarray(np.degrees(np.arctan(np.tan(go) * np.sin(kr) - np.tan(ls) * np.cos(kr))))


def back_rake(orthogonal: ArrayLike, inclination_angle: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Back rake gamma_p (back plane) from orthogonal rake and inclination.

    Parameters
    ----------
    orthogonal : array_like (...), deg
        Rake gamma_o in the orthogonal plane.
    inclination_angle : array_like (...), deg
        Inclination lambda_s, ISO sign.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180.

    Returns
    -------
    ndarray (...), deg
        gamma_p: tan gp = tan go cos kr + tan ls sin kr.

    Raises
    ------
    ValueError
        Rake or inclination not between -90 and 90, kappa_r not between 0 and 180 degrees.

    Examples
    --------
    >>> round(float(back_rake(-6.0, -6.0, 95.0)), 2)
    -5.46

    References
    ----------
    ISO 3002-1 (1982), conversion equations of tool angles.
    """
    go, ls = angle("orthogonal rake", orthogonal), angle("inclination", inclination_angle)
    kr = angle("cutting edge angle", edge_angle, 0.0, 180.0)
    return np.asarray(np.degrees(np.arctan(np.tan(go) * np.cos(kr) + np.tan(ls) * np.sin(kr))))


def orthogonal_rake(side: ArrayLike, back: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Orthogonal rake gamma_o from side and back rake.

    Parameters
    ----------
    side : array_like (...), deg
        Side rake gamma_f.
    back : array_like (...), deg
        Back rake gamma_p.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180; along a rounded corner the local one.

    Returns
    -------
    ndarray (...), deg
        gamma_o: tan go = tan gf sin kr + tan gp cos kr.

    Raises
    ------
    ValueError
        A rake not between -90 and 90, kappa_r not between 0 and 180 degrees.

    Examples
    --------
    >>> round(float(orthogonal_rake(4.0, 8.0, 75.0)), 3)
    5.933

    References
    ----------
    ISO 3002-1 (1982), conversion equations of tool angles.
    """
    gf, gp = angle("side rake", side), angle("back rake", back)
    kr = angle("cutting edge angle", edge_angle, 0.0, 180.0)
    return np.asarray(np.degrees(np.arctan(np.tan(gf) * np.sin(kr) + np.tan(gp) * np.cos(kr))))


def inclination(side: ArrayLike, back: ArrayLike, edge_angle: ArrayLike) -> Floats:
    """Inclination lambda_s of the edge from side and back rake.

    Parameters
    ----------
    side : array_like (...), deg
        Side rake gamma_f.
    back : array_like (...), deg
        Back rake gamma_p.
    edge_angle : array_like (...), deg
        Tool cutting edge angle kappa_r, 0 to 180; along a rounded corner the local one.

    Returns
    -------
    ndarray (...), deg
        lambda_s: tan ls = tan gp sin kr - tan gf cos kr.

    Raises
    ------
    ValueError
        A rake not between -90 and 90, kappa_r not between 0 and 180 degrees.

    Examples
    --------
    >>> round(float(inclination(4.0, 8.0, 75.0)), 2)
    6.71

    References
    ----------
    ISO 3002-1 (1982), conversion equations of tool angles; Ghosh and Mallik, Manufacturing Science, problem 4.11.
    """
    gf, gp = angle("side rake", side), angle("back rake", back)
    kr = angle("cutting edge angle", edge_angle, 0.0, 180.0)
    return np.asarray(np.degrees(np.arctan(np.tan(gp) * np.sin(kr) - np.tan(gf) * np.cos(kr))))


def normal_rake(orthogonal: ArrayLike, inclination: ArrayLike) -> Floats:
    """Normal rake gamma_n from orthogonal rake and inclination.

    Parameters
    ----------
    orthogonal : array_like (...), deg
        Rake gamma_o in the orthogonal plane.
    inclination : array_like (...), deg
        Inclination lambda_s.

    Returns
    -------
    ndarray (...), deg
        gamma_n: tan gn = tan go cos ls.

    Raises
    ------
    ValueError
        An angle not between -90 and 90 degrees.

    Examples
    --------
    >>> round(float(normal_rake(-6.0, -6.0)), 3)
    -5.967

    References
    ----------
    ISO 3002-1 (1982), conversion equations of tool angles.
    """
    go, ls = angle("orthogonal rake", orthogonal), angle("inclination", inclination)
    return np.asarray(np.degrees(np.arctan(np.tan(go) * np.cos(ls))))


def effective_rake(
    normal_pocket_rake: ArrayLike,
    face_rake: ArrayLike,
    land_rake: ArrayLike,
    land_width: ArrayLike,
    h: ArrayLike,
    contact_ratio: float = CONTACT_RATIO,
) -> Floats:
    """Rake the chip meets: land and face weighted by their share of the contact length.

    This is the rake of force laws; they hold the blunting of a round edge already in the rise of kc with thin chips.

    Parameters
    ----------
    normal_pocket_rake : array_like (...), deg
        Normal rake the pocket gives a flat insert.
    face_rake : array_like (...), deg
        Chip-breaker face against the plane of the insert.
    land_rake : array_like (...), deg
        Primary land against the plane of the insert.
    land_width : array_like (...), mm
        Width of the land; 0 for none.
    h : array_like (...), mm
        Chip thickness of the cut (mean or equivalent, not the programmed feed).
    contact_ratio : float, dimensionless
        Contact length over chip thickness, 1.5 to 3.

    Returns
    -------
    ndarray (...), deg
        Effective normal rake; about 3 degrees uncertain, see `EFFECTIVE_RAKE`.

    Raises
    ------
    ValueError
        Land width or thickness negative, contact ratio not above zero.

    Examples
    --------
    >>> [round(float(g), 1) for g in effective_rake(-6.0, 16.0, 0.0, 0.15, [0.3, 0.1, 0.05])]
    [6.0, -2.0, -6.0]

    References
    ----------
    Model. Contact length after Poletika, lc = h (2.05 zeta - 0.55), and controlled-contact tools, from memory;
    wedge angles add in the normal plane: ISO 3002-1 (1982).
    """
    pocket = finite("pocket rake", "deg", normal_pocket_rake)
    face, land = finite("face rake", "deg", face_rake), finite("land rake", "deg", land_rake)
    width = not_negative("land width", "mm", land_width)
    contact = positive("contact ratio", "", contact_ratio) * not_negative("chip thickness", "mm", h)
    on_land = np.where(width == 0.0, 0.0, np.where(contact <= width, 1.0, ratio(width, contact)))
    return np.asarray(pocket + on_land * land + (1.0 - on_land) * face)


def edge_limited_rake(blended_rake: ArrayLike, edge_radius: ArrayLike, h: ArrayLike) -> Floats:
    """Rake at a rounded edge: for thin chips the round edge, not the face, is what they meet.

    For geometry rules (rubbing, ploughing); never for force, which would count the size effect twice.

    Parameters
    ----------
    blended_rake : array_like (...), deg
        Effective rake from land and face, see `effective_rake`.
    edge_radius : array_like (...), mm
        Radius of the edge rounding.
    h : array_like (...), mm
        Chip thickness of the cut.

    Returns
    -------
    ndarray (...), deg
        The smaller of the blend and asin(h / rb - 1) where h < rb (1 + sin g), else the blend.

    Raises
    ------
    ValueError
        Edge radius or thickness negative, blend not between -90 and 90 degrees.

    Examples
    --------
    >>> round(float(edge_limited_rake(-6.0, 0.04, 0.02)), 1)
    -30.0

    References
    ----------
    Model: geometry of a circular edge, rake where the chip's free surface meets it; from memory (edge-radius models
    after Albrecht 1960). Continuous at the switch.
    """
    blend = angle("blended rake", blended_rake)
    rb = not_negative("edge radius", "mm", edge_radius)
    thickness = not_negative("chip thickness", "mm", h)
    on_round = np.arcsin(np.clip(ratio(thickness, rb) - 1.0, -1.0, 1.0))
    thin = thickness < rb * (1.0 + np.sin(blend))
    return np.asarray(np.degrees(np.where(thin, np.minimum(blend, on_round), blend + 0.0 * thickness)))
