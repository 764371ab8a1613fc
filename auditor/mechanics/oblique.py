"""Oblique cutting from an orthogonal database, and the database of Ti-6Al-4V."""

from __future__ import annotations

from typing import Final, NamedTuple

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.shear import shear_angle
from auditor.mechanics.validity import Floats, ValidRange, angle, finite, positive

TITANIUM_THICKNESS: Final = ValidRange("uncut chip thickness", "mm", 0.02, 0.2, "Budak, Altintas and Armarego 1996")
TITANIUM_RAKE: Final = ValidRange("rake", "deg", 0.0, 15.0, "Budak, Altintas and Armarego 1996")
TITANIUM_SHEAR_STRENGTH: Final = 613.0  # MPa, from memory
TITANIUM_EDGE_FORCES: Final = (24.0, 43.0)  # N/mm of edge, cutting and feed direction, from memory


class ObliqueCoefficients(NamedTuple):
    """Force per chip section, N/mm2: along the cutting speed, normal to edge and speed, along the edge's run."""

    cutting: Floats
    thrust: Floats
    radial: Floats


def oblique_coefficients(
    tau: ArrayLike, phi_n: ArrayLike, beta_n: ArrayLike, normal_rake: ArrayLike, inclination: ArrayLike
) -> ObliqueCoefficients:
    """Cutting coefficients of an inclined edge, chip flow angle equal to the inclination.

    Parameters
    ----------
    tau : array_like (...), MPa
        Shear strength in the shear plane.
    phi_n : array_like (...), deg
        Normal shear angle.
    beta_n : array_like (...), deg
        Normal friction angle.
    normal_rake : array_like (...), deg
        Normal rake.
    inclination : array_like (...), deg
        Inclination i of the edge; 0 gives orthogonal cutting.

    Returns
    -------
    ObliqueCoefficients of ndarray (...), N/mm2
        Ktc, Kfc and Krc.

    Raises
    ------
    ValueError
        tau not above zero, an angle outside its bounds.

    Examples
    --------
    >>> k = oblique_coefficients(613.0, 39.32, 19.1, 0.0, 0.0)
    >>> round(float(k.cutting)), round(float(k.thrust)), round(float(k.radial))
    (1746, 604, 0)

    References
    ----------
    Altintas, Manufacturing Automation, ch. 2, oblique cutting coefficients (Armarego and Brown); chip flow rule of
    Stabler, J. Inst. Production Eng. 30 (1951).
    """
    t, p = positive("shear strength", "MPa", tau), angle("normal shear angle", phi_n, 0.0)
    b, g = angle("normal friction angle", beta_n), angle("normal rake", normal_rake)
    i = angle("inclination", inclination)
    flow = np.tan(i)  # Stabler: chip flow angle = inclination
    whole = np.sqrt(np.cos(p + b - g) ** 2 + flow**2 * np.sin(b) ** 2)
    scale = t / (np.sin(p) * whole)
    return ObliqueCoefficients(
        np.asarray(scale * (np.cos(b - g) + np.tan(i) * flow * np.sin(b))),
        np.asarray(scale / np.cos(i) * np.sin(b - g)),
        np.asarray(scale * (np.cos(b - g) * np.tan(i) - flow * np.sin(b))),
    )


def titanium_shear_angle(rake: ArrayLike, h: ArrayLike) -> Floats:
    """Shear angle of Ti-6Al-4V, from rc = (1.755 - 0.028 g) h^(0.331 - 0.0082 g).

    Parameters
    ----------
    rake : array_like (...), deg
        Rake, 0 to 15.
    h : array_like (...), mm
        Uncut chip thickness, 0.02 to 0.2.

    Returns
    -------
    ndarray (...), deg
        phi; ranges `TITANIUM_RAKE` and `TITANIUM_THICKNESS`.

    Raises
    ------
    ValueError
        Thickness not above zero, rake so large that no chip ratio is left.

    Examples
    --------
    >>> round(float(titanium_shear_angle(0.0, 0.1)), 2)
    39.32

    References
    ----------
    Budak, Altintas and Armarego, ASME J. Eng. Ind. 118 (1996), orthogonal database of Ti-6Al-4V.
    """
    g, thickness = finite("rake", "deg", rake), positive("chip thickness", "mm", h)
    return shear_angle((1.755 - 0.028 * g) * thickness ** (0.331 - 0.0082 * g), g)


def titanium_friction_angle(rake: ArrayLike) -> Floats:
    """Friction angle of Ti-6Al-4V, 19.1 + 0.29 g.

    Parameters
    ----------
    rake : array_like (...), deg
        Rake, 0 to 15.

    Returns
    -------
    ndarray (...), deg
        beta; range `TITANIUM_RAKE`.

    Raises
    ------
    ValueError
        Rake infinite.

    Examples
    --------
    >>> float(titanium_friction_angle(10.0))
    22.0

    References
    ----------
    Budak, Altintas and Armarego, ASME J. Eng. Ind. 118 (1996), orthogonal database of Ti-6Al-4V.
    """
    return np.asarray(19.1 + 0.29 * finite("rake", "deg", rake))
