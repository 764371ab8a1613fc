"""Geometry of the shear plane: chip ratio, shear angle and its rival theories, strain."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, angle, finite, positive

SHEAR_ANGLE: Final = ValidRange("shear angle", "deg", 5.0, 50.0, "continuous chips, orthogonal tests of the textbooks")
IDEAL_CONSTANT: Final = 90.0  # deg, 2 phi + beta - g of Merchant's minimum-energy solution


def chip_ratio(thickness: ArrayLike, chip_thickness: ArrayLike) -> Floats:
    """Chip thickness ratio, uncut over cut thickness.

    Parameters
    ----------
    thickness : array_like (...), mm
        Uncut chip thickness h.
    chip_thickness : array_like (...), mm
        Thickness of the chip.

    Returns
    -------
    ndarray (...), dimensionless
        r_c.

    Raises
    ------
    ValueError
        A thickness not above zero.

    Examples
    --------
    >>> round(float(chip_ratio(0.5, 1.125)), 3)
    0.444

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20, example 20.1.
    """
    return np.asarray(
        positive("chip thickness", "mm", thickness) / positive("thickness of the chip", "mm", chip_thickness)
    )


def shear_angle(chip_ratio: ArrayLike, rake: ArrayLike) -> Floats:
    """Shear angle from the chip ratio, tan phi = rc cos g / (1 - rc sin g).

    Parameters
    ----------
    chip_ratio : array_like (...), dimensionless
        Uncut over cut chip thickness.
    rake : array_like (...), deg
        Rake.

    Returns
    -------
    ndarray (...), deg
        phi, see `SHEAR_ANGLE`.

    Raises
    ------
    ValueError
        Ratio not above zero, rake not between -90 and 90 degrees.

    Examples
    --------
    >>> round(float(shear_angle(0.5 / 1.125, 10.0)), 2)
    25.37

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20, example 20.1; Merchant, J. Appl. Phys. 16 (1945) 267.
    """
    rc, g = positive("chip ratio", "", chip_ratio), angle("rake", rake)
    return np.asarray(np.degrees(np.arctan2(rc * np.cos(g), 1.0 - rc * np.sin(g))))


def shear_strain(phi: ArrayLike, rake: ArrayLike) -> Floats:
    """Shear strain of the chip, cot phi + tan(phi - g).

    Parameters
    ----------
    phi : array_like (...), deg
        Shear angle.
    rake : array_like (...), deg
        Rake.

    Returns
    -------
    ndarray (...), dimensionless
        Strain.

    Raises
    ------
    ValueError
        phi not between 0 and 90, rake not between -90 and 90 degrees.

    Examples
    --------
    >>> round(float(shear_strain(25.37, 10.0)), 2)
    2.38

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20, example 20.1.
    """
    p, g = angle("shear angle", phi, 0.0), angle("rake", rake)
    return np.asarray(1.0 / np.tan(p) + np.tan(p - g))


def merchant_shear_angle(friction_angle: ArrayLike, rake: ArrayLike, constant: ArrayLike = IDEAL_CONSTANT) -> Floats:
    """Merchant's shear angle, phi = (C + g - beta) / 2.

    Parameters
    ----------
    friction_angle : array_like (...), deg
        beta at the rake face.
    rake : array_like (...), deg
        Rake g.
    constant : array_like (...), deg
        Machining constant C = 2 phi + beta - g: 90 ideal; steels 65 to 76, stainless 304 82.

    Returns
    -------
    ndarray (...), deg
        phi, see `SHEAR_ANGLE`.

    Raises
    ------
    ValueError
        An angle infinite.

    Examples
    --------
    >>> round(float(merchant_shear_angle(26.565, 10.0)), 2)
    36.72

    References
    ----------
    Merchant, J. Appl. Phys. 16 (1945) 267, 318; Ghosh and Mallik, Manufacturing Science, problems 4.3 and 4.4
    (constants machine-read from a scan).
    """
    beta, g = finite("friction angle", "deg", friction_angle), finite("rake", "deg", rake)
    return np.asarray(0.5 * (finite("machining constant", "deg", constant) + g - beta))


def lee_shaffer_shear_angle(friction_angle: ArrayLike, rake: ArrayLike) -> Floats:
    """Shear angle of Lee and Shaffer, phi = 45 + g - beta.

    Parameters
    ----------
    friction_angle : array_like (...), deg
        beta at the rake face.
    rake : array_like (...), deg
        Rake g.

    Returns
    -------
    ndarray (...), deg
        phi, see `SHEAR_ANGLE`.

    Raises
    ------
    ValueError
        An angle infinite.

    Examples
    --------
    >>> round(float(lee_shaffer_shear_angle(26.5, 10.0)), 2)
    28.5

    References
    ----------
    Lee and Shaffer, J. Appl. Mech. 18 (1951) 405; Ghosh and Mallik, Manufacturing Science, problem 4.4, p. 194.
    """
    return np.asarray(45.0 + finite("rake", "deg", rake) - finite("friction angle", "deg", friction_angle))
