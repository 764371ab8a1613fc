"""Printed figures of the energy a cut takes, to hold predicted powers against."""

from __future__ import annotations

from typing import Final, NamedTuple


class Band(NamedTuple):
    """A printed figure for a band of Brinell hardness."""

    low: float
    high: float
    value: float


_UNIT_ENERGY: Final = {
    "carbon steel": (Band(150, 200, 1.6), Band(201, 250, 2.2), Band(251, 300, 2.8)),
    "alloy steel": (Band(200, 250, 2.2), Band(251, 300, 2.8), Band(301, 350, 3.6), Band(351, 400, 4.4)),
    "cast iron": (Band(125, 175, 1.1), Band(175, 250, 1.6)),
    "stainless steel": (Band(150, 250, 2.8),),
    "aluminium": (Band(50, 100, 0.7),),
    "aluminium alloy": (Band(100, 150, 0.8),),
    "brass": (Band(100, 150, 2.2),),
    "bronze": (Band(100, 150, 2.2),),
    "magnesium alloy": (Band(50, 100, 0.4),),
}


def _steps(first: float, width: float, *values: float) -> tuple[Band, ...]:
    return tuple(Band(first + i * width, first + (i + 1) * width, value) for i, value in enumerate(values))


_POWER_CONSTANT: Final = {
    "plain carbon": _steps(80, 20, 1.72, 1.80, 1.88, 2.02, 2.13, 2.24, 2.32, 2.43, 2.51, 2.59, 2.73, 2.81, 2.89, 3.11),
    "4140": (
        *(Band(140, 160, 1.69), Band(180, 200, 1.88), Band(220, 240, 2.07), Band(260, 280, 2.29)),
        *(Band(280, 300, 2.38), Band(300, 320, 2.48), Band(340, 360, 2.73)),
    ),
    "8620": (
        *(Band(140, 160, 1.53), Band(180, 200, 1.69), Band(220, 240, 1.91)),
        *(Band(260, 280, 2.10), Band(320, 340, 2.43)),
    ),
    "52100": (Band(160, 180, 2.16), Band(180, 200, 2.27), Band(200, 220, 2.38)),
}


def unit_energy(work: str, hardness: float) -> float:
    """Energy per volume of a sharp tool at a chip thickness of 0.25 mm.

    Parameters
    ----------
    work : str, name of the work material group
        "carbon steel", "alloy steel", "cast iron", "stainless steel", "aluminium", "aluminium alloy", "brass",
        "bronze" or "magnesium alloy".
    hardness : float, HB
        Brinell hardness, inside the bands of the table.

    Returns
    -------
    float, N m/mm3
        Specific energy; times 1000 it is a specific cutting force in N/mm2.

    Raises
    ------
    ValueError
        Group unknown or hardness outside its bands.

    Examples
    --------
    >>> unit_energy("carbon steel", 180.0)
    1.6

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, table 20.2 (21.2 in later editions).
    """
    return _look_up(_UNIT_ENERGY, work, hardness)


def power_constant(group: str, hardness: float) -> float:
    """Handbook power constant at a feed of about 0.3 mm/rev, sharp tool.

    Parameters
    ----------
    group : str, name of the steel group
        "plain carbon", "4140" (with 4340, 5140, 8640), "8620" (with 4130) or "52100" (with 1330 to 1340).
    hardness : float, HB
        Brinell hardness, inside the bands of the table.

    Returns
    -------
    float, kW/(cm3/s)
        Kp; times 1000 it is a specific cutting force in N/mm2.

    Raises
    ------
    ValueError
        Group unknown or hardness outside its bands.

    Examples
    --------
    >>> power_constant("plain carbon", 190.0)
    2.24

    References
    ----------
    Machinery's Handbook, 31st ed., table 1b, p. 1147 (columns of the alloy groups read from flattened text).
    """
    return _look_up(_POWER_CONSTANT, group, hardness)


def _look_up(table: dict[str, tuple[Band, ...]], group: str, hardness: float) -> float:
    if group not in table:
        raise ValueError(f"work material group must be one of {', '.join(table)}; found {group!r}")
    for band in table[group]:
        if band.low <= hardness <= band.high:
            return band.value
    raise ValueError(f"no figure for {group} of {hardness:g} HB")
