"""Cutting forces after the power laws of Kosilova and Meshcheryakov: a second opinion beside Kienzle's law."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Final, Literal

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, finite, positive

Component = Literal["Pz", "Py", "Px"]
EDGE_ANGLE: Final = ValidRange("cutting edge angle", "deg", 30.0, 90.0, "Kosilova and Meshcheryakov, table 23")
RAKE: Final = ValidRange("rake", "deg", -15.0, 10.0, "Kosilova and Meshcheryakov, table 23")
REFERENCE_STRENGTH: Final = 750.0  # MPa, steel of the tables


@dataclass(frozen=True, slots=True)
class PowerLaw:
    """P = 10 C t^x S^y v^n: constant and exponents of depth, feed and cutting speed."""

    C: float
    x: float
    y: float
    n: float = 0.0
    source: str = "Kosilova and Meshcheryakov, vol. 2 (1986), table 22, from memory"


STEEL_CARBIDE: Final = PowerLaw(300.0, 1.0, 0.75, -0.15, "Kosilova and Meshcheryakov, vol. 2 (1986), table 22")
STEEL_CARBIDE_PASSIVE: Final = PowerLaw(243.0, 0.9, 0.6, -0.3)
STEEL_CARBIDE_FEED: Final = PowerLaw(339.0, 1.0, 0.5, -0.4)
STEEL_CARBIDE_GROOVE: Final = PowerLaw(408.0, 0.72, 0.8)
STEEL_HIGH_SPEED: Final = PowerLaw(200.0, 1.0, 0.75)
GREY_IRON_CARBIDE: Final = PowerLaw(92.0, 1.0, 0.75)
STAINLESS_CARBIDE: Final = PowerLaw(204.0, 1.0, 0.75)

_EDGE_ANGLES: Final = (30.0, 45.0, 60.0, 90.0)
_EDGE_FACTORS: Final = {
    "Pz": (1.08, 1.0, 0.94, 0.89),
    "Py": (1.30, 1.0, 0.77, 0.50),
    "Px": (0.78, 1.0, 1.11, 1.17),
}
_RAKES: Final = (-15.0, 0.0, 10.0)
_RAKE_FACTORS: Final = {"Pz": (1.25, 1.10, 1.0), "Py": (2.0, 1.4, 1.0), "Px": (2.0, 1.4, 1.0)}
_STRENGTH_EXPONENTS: Final = {"Pz": 0.75, "Py": 1.35, "Px": 1.0}


def power_law_force(law: PowerLaw, depth: ArrayLike, feed: ArrayLike, vc: ArrayLike = 1.0) -> Floats:
    """Force component of the power law, 10 C t^x S^y v^n, with all corrections 1.

    Parameters
    ----------
    law : PowerLaw, N mm and m/min
        Constants of the component, work and tool.
    depth : array_like (...), mm
        Depth of cut; in grooving the width.
    feed : array_like (...), mm/rev
        Feed.
    vc : array_like (...), m/min
        Cutting speed.

    Returns
    -------
    ndarray (...), N
        Pz (cutting), Py (passive) or Px (feed force), by the law given.

    Raises
    ------
    ValueError
        An argument not above zero.

    Examples
    --------
    >>> round(float(power_law_force(STEEL_CARBIDE, 3.0, 0.18, 200.0)), 1)
    1123.4

    References
    ----------
    Kosilova and Meshcheryakov, Spravochnik tekhnologa-mashinostroitelya, vol. 2 (1986), table 22.
    """
    t, s = positive("depth of cut", "mm", depth), positive("feed", "mm/rev", feed)
    return np.asarray(10.0 * law.C * t**law.x * s**law.y * positive("cutting speed", "m/min", vc) ** law.n)


def edge_angle_correction(edge_angle: ArrayLike, component: Component = "Pz") -> Floats:
    """Correction for the cutting edge angle, carbide on steel.

    Parameters
    ----------
    edge_angle : array_like (...), deg
        kappa_r, 30 to 90; held at the ends, see `EDGE_ANGLE`.
    component : str, name of the component
        "Pz" (cutting), "Py" (passive) or "Px" (feed).

    Returns
    -------
    ndarray (...), dimensionless
        K_phi, straight lines between the rows 30, 45, 60, 90.

    Raises
    ------
    ValueError
        Angle infinite, component unknown.

    Examples
    --------
    >>> float(edge_angle_correction(90.0))
    0.89

    References
    ----------
    Kosilova and Meshcheryakov, Spravochnik tekhnologa-mashinostroitelya, vol. 2 (1986), table 23.
    """
    return _from_table(finite("cutting edge angle", "deg", edge_angle), _EDGE_ANGLES, _EDGE_FACTORS, component)


def rake_correction(rake: ArrayLike, component: Component = "Pz") -> Floats:
    """Correction for the rake, carbide on steel: 1 % a degree on Pz, 4 % on Py and Px.

    Parameters
    ----------
    rake : array_like (...), deg
        Rake, -15 to 10; held at the ends, see `RAKE`.
    component : str, name of the component
        "Pz" (cutting), "Py" (passive) or "Px" (feed).

    Returns
    -------
    ndarray (...), dimensionless
        K_gamma, straight lines between the rows -15, 0, 10.

    Raises
    ------
    ValueError
        Rake infinite, component unknown.

    Examples
    --------
    >>> float(rake_correction(-15.0)), float(rake_correction(-15.0, "Py"))
    (1.25, 2.0)

    References
    ----------
    Kosilova and Meshcheryakov, Spravochnik tekhnologa-mashinostroitelya, vol. 2 (1986), table 23.
    """
    return _from_table(finite("rake", "deg", rake), _RAKES, _RAKE_FACTORS, component)


def strength_correction(tensile_strength: ArrayLike, component: Component = "Pz") -> Floats:
    """Correction for the strength of the steel, (Rm / 750)^n.

    Parameters
    ----------
    tensile_strength : array_like (...), MPa
        Tensile strength.
    component : str, name of the component
        "Pz" (n 0.75), "Py" (1.35) or "Px" (1.0).

    Returns
    -------
    ndarray (...), dimensionless
        K_M.

    Raises
    ------
    ValueError
        Strength not above zero, component unknown.

    Examples
    --------
    >>> round(float(strength_correction(600.0)), 3)
    0.846

    References
    ----------
    Kosilova and Meshcheryakov, Spravochnik tekhnologa-mashinostroitelya, vol. 2 (1986), table 9; exponents of Py and Px
    from memory.
    """
    if component not in _STRENGTH_EXPONENTS:
        raise ValueError(f"component must be Pz, Py or Px; found {component!r}")
    strength = positive("tensile strength", "MPa", tensile_strength)
    return np.asarray((strength / REFERENCE_STRENGTH) ** _STRENGTH_EXPONENTS[component])


def power_law_drill_torque(
    diameter: ArrayLike, feed: ArrayLike, C: float = 0.0345, q: float = 2.0, y: float = 0.8
) -> Floats:
    """Drilling torque of the power law, 10 C D^q S^y.

    Parameters
    ----------
    diameter : array_like (...), mm
        Drill diameter.
    feed : array_like (...), mm/rev
        Feed.
    C : float, N m
        Constant; 0.0345 for steel of 750 MPa, high-speed steel.
    q : float, dimensionless
        Exponent of the diameter.
    y : float, dimensionless
        Exponent of the feed.

    Returns
    -------
    ndarray (...), N m
        M.

    Raises
    ------
    ValueError
        Diameter or feed not above zero.

    Examples
    --------
    >>> round(float(power_law_drill_torque(10.0, 0.2)), 2)
    9.52

    References
    ----------
    Kosilova and Meshcheryakov, Spravochnik tekhnologa-mashinostroitelya, vol. 2 (1986), table of drilling, from memory.
    """
    return np.asarray(10.0 * C * positive("diameter", "mm", diameter) ** q * positive("feed", "mm/rev", feed) ** y)


def power_law_drill_thrust(
    diameter: ArrayLike, feed: ArrayLike, C: float = 68.0, q: float = 1.0, y: float = 0.7
) -> Floats:
    """Drilling thrust of the power law, 10 C D^q S^y.

    Parameters
    ----------
    diameter : array_like (...), mm
        Drill diameter.
    feed : array_like (...), mm/rev
        Feed.
    C : float, N
        Constant; 68 for steel of 750 MPa, high-speed steel.
    q : float, dimensionless
        Exponent of the diameter.
    y : float, dimensionless
        Exponent of the feed.

    Returns
    -------
    ndarray (...), N
        Thrust.

    Raises
    ------
    ValueError
        Diameter or feed not above zero.

    Examples
    --------
    >>> round(float(power_law_drill_thrust(10.0, 0.2)))
    2204

    References
    ----------
    Kosilova and Meshcheryakov, Spravochnik tekhnologa-mashinostroitelya, vol. 2 (1986), table of drilling, from memory.
    """
    return np.asarray(10.0 * C * positive("diameter", "mm", diameter) ** q * positive("feed", "mm/rev", feed) ** y)


def power_law_thread_force(pitch: ArrayLike, passes: ArrayLike) -> Floats:
    """Cutting force of threading steel with carbide, 10 * 148 P^1.7 / i^0.71.

    Parameters
    ----------
    pitch : array_like (...), mm
        Pitch.
    passes : array_like (...), dimensionless
        Number of passes.

    Returns
    -------
    ndarray (...), N
        Pz.

    Raises
    ------
    ValueError
        Pitch or passes not above zero.

    Examples
    --------
    >>> round(float(power_law_thread_force(1.5, 6)))
    826

    References
    ----------
    Kosilova and Meshcheryakov, Spravochnik tekhnologa-mashinostroitelya, vol. 2 (1986), table of threading, from
    memory.
    """
    return np.asarray(1480.0 * positive("pitch", "mm", pitch) ** 1.7 / positive("number of passes", "", passes) ** 0.71)


def _from_table(
    x: Floats, rows: tuple[float, ...], table: Mapping[str, tuple[float, ...]], component: Component
) -> Floats:
    if component not in table:
        raise ValueError(f"component must be Pz, Py or Px; found {component!r}")
    return np.asarray(np.interp(x, rows, table[component]))
