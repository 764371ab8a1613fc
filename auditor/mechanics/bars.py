"""Boring bars and shanks: how far they bend and how far they may hang out."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.bending import cantilever_compliance, second_moment
from auditor.mechanics.validity import Floats, ValidRange, positive

BAR_TO_BORE: Final = ValidRange("bar / bore diameter", "", 0.0, 0.8, "common practice: room for chips")
CLAMPED_LENGTH: Final = ValidRange("clamped length / bar diameter", "", 3.0, np.inf, "common practice: 3 to 4")
SHANK_OVERHANG: Final = ValidRange("overhang / shank height", "", 0.0, 1.5, "common practice: 1 to 1.5, 2 at most")
_MODULUS: Final = {"steel": 210_000.0, "heavy metal": 350_000.0, "carbide": 600_000.0}
_OVERHANG: Final = {
    "steel": ValidRange("overhang / bar diameter", "", 0.0, 4.0, "common practice: 3 safe, 4 at most"),
    "heavy metal": ValidRange("overhang / bar diameter", "", 0.0, 6.0, "common practice: 5 to 6"),
    "carbide": ValidRange("overhang / bar diameter", "", 0.0, 6.0, "common practice: 6, light cuts 7"),
}


def bar_modulus(material: str) -> float:
    """Modulus of elasticity of a bar or shank.

    Parameters
    ----------
    material : str, name of the bar material
        "steel", "heavy metal" or "carbide".

    Returns
    -------
    float, MPa
        210000, 350000 (340 to 370 GPa) or 600000 (580 to 630 GPa).

    Raises
    ------
    ValueError
        The name is none of these.

    Examples
    --------
    >>> bar_modulus("carbide")
    600000.0

    References
    ----------
    Common practice: usual moduli of bar materials.
    """
    if material not in _MODULUS:
        raise ValueError(f"bar material must be one of {', '.join(_MODULUS)}; found {material!r}")
    return _MODULUS[material]


def overhang_limit(material: str) -> ValidRange:
    """Overhang over diameter a bar of a material may have.

    Parameters
    ----------
    material : str, name of the bar material
        "steel", "heavy metal" or "carbide".

    Returns
    -------
    ValidRange, dimensionless
        From 0 to the largest ratio, with its source.

    Raises
    ------
    ValueError
        The name is none of these.

    Examples
    --------
    >>> overhang_limit("steel").high
    4.0

    References
    ----------
    Common practice, table of overhang ratios by bar material.
    """
    if material not in _OVERHANG:
        raise ValueError(f"bar material must be one of {', '.join(_OVERHANG)}; found {material!r}")
    return _OVERHANG[material]


def bar_compliance(overhang: ArrayLike, diameter: ArrayLike, modulus: ArrayLike) -> Floats:
    """Give of a round bar at its tip, L^3 / (3 E I).

    Parameters
    ----------
    overhang : array_like (...), mm
        Length from the clamping to the edge.
    diameter : array_like (...), mm
        Bar diameter.
    modulus : array_like (...), MPa
        Modulus of elasticity, see `bar_modulus`.

    Returns
    -------
    ndarray (...), mm/N
        Deflection of the tip for a unit force across the bar; the stiffness is its inverse.

    Raises
    ------
    ValueError
        Overhang negative, diameter or modulus not above zero.

    Examples
    --------
    >>> round(float(300.0 * bar_compliance(64.0, 16.0, 210000.0)), 4)
    0.0388

    References
    ----------
    Roark's Formulas for Stress and Strain, table of straight beams, case 1a; overhang of at least twice the diameter.
    """
    return cantilever_compliance(overhang, modulus, second_moment(diameter))


def shank_compliance(overhang: ArrayLike, height: ArrayLike, width: ArrayLike, modulus: ArrayLike) -> Floats:
    """Give of a rectangular shank at its tip along its height, 4 L^3 / (E b h^3).

    Parameters
    ----------
    overhang : array_like (...), mm
        Length from the clamping to the edge.
    height : array_like (...), mm
        Side of the section along the force.
    width : array_like (...), mm
        Other side of the section.
    modulus : array_like (...), MPa
        Modulus of elasticity.

    Returns
    -------
    ndarray (...), mm/N
        Deflection of the tip for a unit force.

    Raises
    ------
    ValueError
        Overhang negative, another argument not above zero.

    Examples
    --------
    >>> round(float(1000.0 * shank_compliance(35.0, 25.0, 25.0, 210000.0)), 5)
    0.00209

    References
    ----------
    Roark's Formulas for Stress and Strain, table of straight beams, case 1a, I = b h^3 / 12.
    """
    section = positive("shank width", "mm", width) * positive("shank height", "mm", height) ** 3 / 12.0
    return cantilever_compliance(overhang, modulus, section)
