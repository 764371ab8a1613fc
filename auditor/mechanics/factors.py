"""Correction factors of the Kienzle law, and how far a predicted force may be off."""

from __future__ import annotations

from typing import Final

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, finite, not_negative

RAKE_SLOPE: Final = 1.5  # % of the cutting force per degree of rake
RAKE_FACTOR: Final = ValidRange("rake factor", "", 0.70, 1.40, "model: Kienzle's rake line is not followed further")
CUTTING_SPEED: Final = ValidRange("cutting speed", "m/min", 20.0, 600.0, "Paucksch / Degner, from memory")
THRUST_SCATTER: Final = 0.5  # one-sided relative, feed and passive force

_TOOL_MATERIAL: Final = {
    "high-speed steel": 1.2,
    "carbide": 1.0,
    "coated carbide": 1.0,
    "cermet": 1.0,
    "ceramic": 0.9,
    "cbn": 1.0,
    "pcd": 1.0,
}
_OPERATION: Final = {
    "turning": 1.0,
    "boring": 1.2,
    "grooving": 1.3,
    "face grooving": 1.3,
    "parting": 1.3,
    "threading": 1.0,
    "drilling": 1.2,
    "stop": 1.0,
}


def rake_factor(effective_rake: ArrayLike, reference_rake: ArrayLike, slope: float = RAKE_SLOPE) -> Floats:
    """Rake factor of the cutting force, K_g = 1 - slope (g_eff - g_ref) / 100.

    Parameters
    ----------
    effective_rake : array_like (...), deg
        Rake the chip meets.
    reference_rake : array_like (...), deg
        Rake at which kc1.1 was measured: 6 for the steels, 2 for cast iron of the usual tables.
    slope : float, %/deg
        Fall of the force with rake; 1.0 to 1.5 published.

    Returns
    -------
    ndarray (...), dimensionless
        K_g, held within 0.70 and 1.40 (see `RAKE_FACTOR`).

    Raises
    ------
    ValueError
        A rake or slope infinite.

    Examples
    --------
    >>> round(float(rake_factor(-6.0, 6.0)), 2)
    1.18

    References
    ----------
    Tschaetsch, Praxis der Zerspantechnik (1.5 %/deg); Dietrich and Tschaetsch, 11th ed. (1.0 %/deg); both forms in
    Vargas et al., Procedia CIRP 82 (2019) 455-460. Limits of the factor: model.
    """
    g, reference = finite("effective rake", "deg", effective_rake), finite("reference rake", "deg", reference_rake)
    line = 1.0 - finite("rake slope", "%/deg", slope) * (g - reference) / 100.0
    return np.asarray(np.clip(line, RAKE_FACTOR.low, RAKE_FACTOR.high))


def speed_factor(vc: ArrayLike) -> Floats:
    """Cutting-speed factor of the cutting force, 1 at 100 m/min.

    Parameters
    ----------
    vc : array_like (...), m/min
        Cutting speed; held at 20 and at 600 m/min outside these, see `CUTTING_SPEED`.

    Returns
    -------
    ndarray (...), dimensionless
        2.023 / vc^0.153 up to 100 m/min, 1.380 / vc^0.07 above.

    Raises
    ------
    ValueError
        Speed negative or infinite.

    Examples
    --------
    >>> round(float(speed_factor(60.0)), 3), round(float(speed_factor(250.0)), 3)
    (1.081, 0.938)

    References
    ----------
    Paucksch, Zerspantechnik, and Degner, Spanende Formung, table of K_v for carbide; from memory.
    """
    v = np.clip(not_negative("cutting speed", "m/min", vc), CUTTING_SPEED.low, CUTTING_SPEED.high)
    return np.asarray(np.where(v <= 100.0, 2.023 / v**0.153, 1.380 / v**0.07))


def tool_material_factor(substrate: str) -> float:
    """Factor of the cutting force for the cutting material.

    Parameters
    ----------
    substrate : str, name of the cutting material
        "high-speed steel", "carbide", "coated carbide", "cermet", "ceramic", "cbn" or "pcd".

    Returns
    -------
    float, dimensionless
        1.2 for high-speed steel, 0.9 for ceramic, 1.0 for carbide; cermet, CBN and PCD are taken like carbide.

    Raises
    ------
    ValueError
        The name is none of these.

    Examples
    --------
    >>> tool_material_factor("high-speed steel")
    1.2

    References
    ----------
    Tschaetsch, Praxis der Zerspantechnik, table of correction factors, from memory; cermet, CBN, PCD: common
    practice.
    """
    return _named("cutting material", substrate, _TOOL_MATERIAL)


def operation_factor(kind: str) -> float:
    """Factor of the cutting force for the kind of operation.

    Parameters
    ----------
    kind : str, name of the kind of tool
        "turning", "boring", "grooving", "face grooving", "parting", "threading", "drilling" or "stop".

    Returns
    -------
    float, dimensionless
        External turning 1.0, internal turning 1.2, grooving and parting 1.3, drilling 1.2. Threading 1.0: the
        crowding of its V-shaped chip stands in the thread laws.

    Raises
    ------
    ValueError
        The name is none of these.

    Examples
    --------
    >>> operation_factor("parting")
    1.3

    References
    ----------
    Tschaetsch, Praxis der Zerspantechnik, table of correction factors for the operation; from memory.
    """
    return _named("kind of tool", kind, _OPERATION)


def force_scatter(material_scatter: ArrayLike, h: ArrayLike, effective_rake: ArrayLike) -> Floats:
    """One-sided relative uncertainty of a predicted cutting force.

    Parameters
    ----------
    material_scatter : array_like (...), dimensionless
        Scatter of the material's constants: 0.15 calibrated, 0.25 catalogue match, 0.40 group fallback.
    h : array_like (...), mm
        Chip thickness of the cut.
    effective_rake : array_like (...), deg
        Rake the chip meets.

    Returns
    -------
    ndarray (...), dimensionless
        The material's scatter; at least 0.40 where h < 0.1 mm, at least 1.0 (an order of magnitude is all that can be
        said) where h < 0.03 mm or the rake is below -15 degrees.

    Raises
    ------
    ValueError
        Scatter or thickness negative.

    Examples
    --------
    >>> force_scatter(0.25, [0.2, 0.05, 0.02], 0.0).tolist()
    [0.25, 0.4, 1.0]

    References
    ----------
    Model, from: Horvath, Acta Polytechnica Hungarica 12(7) (2015), law limited to h >= 0.1 mm; Biro, Czampa and Szalay
    (2015), branches at 0.1 and 0.01 mm; Stanojkovic et al. (2024), catalogue constants off by 35 to 60 %.
    """
    base = not_negative("scatter", "", material_scatter)
    thickness, g = not_negative("chip thickness", "mm", h), finite("effective rake", "deg", effective_rake)
    thin = np.where(thickness < 0.1, 0.40, 0.0)
    blind = np.where((thickness < 0.03) | (g < -15.0), 1.0, 0.0)
    return np.asarray(np.maximum(np.maximum(base, thin), blind))


def _named(what: str, name: str, table: dict[str, float]) -> float:
    if name not in table:
        raise ValueError(f"{what} must be one of {', '.join(table)}; found {name!r}")
    return table[name]
