"""How far the work bends away under the tool: plain and stepped beams in chuck, tailstock and centres."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Final, Literal

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, ValidRange, finite, not_negative, positive

Holding = Literal["chuck", "chuck+tailstock", "centres"]
SLENDERNESS: Final = ValidRange("length / diameter", "", 3.0, 100.0, "Bernoulli beam: shear neglected below about 3")
CERTAINTY: Final = 0.002  # mm, below which no bending figure means anything (common practice)


@dataclass(frozen=True, slots=True)
class Supports:
    """How a part is held and how much its supports give; a stiffness of infinity gives nothing.

    ``slide`` and ``tail`` in N/mm at the chuck (or headstock centre) and at the tailstock, ``tilt`` in N mm per
    radian at the chuck. Common practice: quill 20 to 60 N/um, spindle 100 to 300 N/um.
    """

    holding: Holding = "chuck"
    slide: float = np.inf
    tilt: float = np.inf
    tail: float = np.inf

    def __post_init__(self) -> None:
        if min(self.slide, self.tilt, self.tail) <= 0.0:
            raise ValueError("the stiffness of a support must be greater than zero")


RIGID_CHUCK: Final = Supports("chuck")


def second_moment(outer: ArrayLike, inner: ArrayLike = 0.0) -> Floats:
    """Second moment of area of a round section, I = pi (D^4 - d^4) / 64.

    Parameters
    ----------
    outer : array_like (...), mm
        Outer diameter.
    inner : array_like (...), mm
        Bore diameter, below the outer one.

    Returns
    -------
    ndarray (...), mm4
        I.

    Raises
    ------
    ValueError
        Outer diameter not above zero, bore negative or not below the outer diameter.

    Examples
    --------
    >>> round(float(second_moment(20.0)))
    7854

    References
    ----------
    Roark's Formulas for Stress and Strain, table of properties of sections.
    """
    big, small = positive("outer diameter", "mm", outer), not_negative("bore", "mm", inner)
    if np.any(small >= big):
        raise ValueError("the bore must be smaller than the outer diameter")
    return np.asarray(np.pi * (big**4 - small**4) / 64.0)


def cantilever_compliance(length: ArrayLike, modulus: ArrayLike, moment: ArrayLike) -> Floats:
    """Give of a bar held at one end, at the load: y/F = a^3 / (3 E I).

    Parameters
    ----------
    length : array_like (...), mm
        Distance a of the load from the jaws.
    modulus : array_like (...), MPa
        Modulus of elasticity E.
    moment : array_like (...), mm4
        Second moment of area I.

    Returns
    -------
    ndarray (...), mm/N
        Deflection at the load for a unit force.

    Raises
    ------
    ValueError
        Length negative, E or I not above zero.

    Examples
    --------
    >>> round(float(200.0 * cantilever_compliance(100.0, 210000.0, second_moment(20.0))), 5)
    0.04042

    References
    ----------
    Roark's Formulas for Stress and Strain, table of straight beams, case 1a. Slender bars, see `SLENDERNESS`.
    """
    a = not_negative("length", "mm", length)
    return np.asarray(a**3 / (3.0 * _rigidity(modulus, moment)))


def fixed_pinned_compliance(position: ArrayLike, span: ArrayLike, modulus: ArrayLike, moment: ArrayLike) -> Floats:
    """Give of a plain bar in chuck and tailstock, at the load: a^3 b^2 (3L + b) / (12 E I L^3).

    Parameters
    ----------
    position : array_like (...), mm
        Distance a of the load from the jaws, 0 to the span.
    span : array_like (...), mm
        Distance L from the jaws to the tailstock.
    modulus : array_like (...), MPa
        Modulus of elasticity E.
    moment : array_like (...), mm4
        Second moment of area I.

    Returns
    -------
    ndarray (...), mm/N
        Deflection at the load for a unit force; largest, 0.00981 L^3/(EI), at a = 0.586 L.

    Raises
    ------
    ValueError
        Position outside the span, E or I not above zero.

    Examples
    --------
    >>> round(float(200.0 * fixed_pinned_compliance(100.0, 200.0, 210000.0, second_moment(20.0))), 6)
    0.008842

    References
    ----------
    Roark's Formulas for Stress and Strain, table of straight beams, case 1c. Slender bars, see `SLENDERNESS`.
    """
    a, b, span_ = _on_span(position, span)
    return np.asarray(a**3 * b**2 * (3.0 * span_ + b) / (12.0 * _rigidity(modulus, moment) * span_**3))


def centres_compliance(position: ArrayLike, span: ArrayLike, modulus: ArrayLike, moment: ArrayLike) -> Floats:
    """Give of a plain bar between centres, at the load: a^2 b^2 / (3 E I L).

    Parameters
    ----------
    position : array_like (...), mm
        Distance a of the load from the headstock centre, 0 to the span.
    span : array_like (...), mm
        Distance L between the centres.
    modulus : array_like (...), MPa
        Modulus of elasticity E.
    moment : array_like (...), mm4
        Second moment of area I.

    Returns
    -------
    ndarray (...), mm/N
        Deflection at the load for a unit force.

    Raises
    ------
    ValueError
        Position outside the span, E or I not above zero.

    Examples
    --------
    >>> round(float(200.0 * centres_compliance(100.0, 200.0, 210000.0, second_moment(20.0))), 5)
    0.02021

    References
    ----------
    Roark's Formulas for Stress and Strain, table of straight beams, case 1e. Slender bars, see `SLENDERNESS`.
    """
    a, b, span_ = _on_span(position, span)
    return np.asarray(a**2 * b**2 / (3.0 * _rigidity(modulus, moment) * span_))


def stepped_compliance(
    section_ends: ArrayLike, rigidity: ArrayLike, positions: ArrayLike, supports: Supports = RIGID_CHUCK
) -> Floats:
    """Give of a stepped part at each load position, its supports included.

    Parameters
    ----------
    section_ends : array_like (n,), mm
        Distance from the jaws (or headstock centre) to the end of each section, rising; the last is the free end, or
        the tailstock.
    rigidity : array_like (n,), N mm2
        E I of each section.
    positions : array_like (...), mm
        Distances of the load from the jaws; below zero (inside the jaws) counts as zero.
    supports : Supports, N/mm and N mm/rad
        How the part is held and what the supports give.

    Returns
    -------
    ndarray (...), mm/N
        Deflection at the load for a unit force at the load.

    Raises
    ------
    ValueError
        Section ends not rising from zero, rigidity not above zero, a position beyond the last section.

    Examples
    --------
    >>> rigidity = 210000.0 * second_moment([30.0, 20.0])
    >>> round(float(200.0 * stepped_compliance([60.0, 120.0], rigidity, 120.0)), 4)
    0.0208

    References
    ----------
    Unit-load theorem (Timoshenko, Strength of Materials, part I, ch. on energy), y = sum of int m^2/(EI) over the
    sections; the tailstock as the redundant support. Slender parts, see `SLENDERNESS`.
    """
    ends = positive("end of a section", "mm", section_ends)
    ei = positive("rigidity", "N mm2", rigidity)
    if ends.ndim != 1 or ends.shape != ei.shape or np.any(np.diff(ends) <= 0.0):
        raise ValueError("the ends of the sections must rise and each section needs one rigidity")
    load = np.maximum(finite("load position", "mm", positions), 0.0)
    if np.any(load > ends[-1] * (1.0 + 1e-9)):
        raise ValueError(f"a load position lies beyond the end of the part at {ends[-1]:g} mm")
    beam, tail = _Flexibility.of(ends, ei), np.asarray(ends[-1])
    if supports.holding == "centres":
        return _between_centres(beam, load, tail, supports)
    free = _overhung(beam, load, load, supports)
    if supports.holding == "chuck":
        return free
    cross = _overhung(beam, load, tail, supports)
    held = free - cross**2 / (_overhung(beam, tail, tail, supports) + 1.0 / supports.tail)
    return np.asarray(np.maximum(held, 0.0))  # rounding, right at a rigid tailstock


def diameter_error(push_off: ArrayLike, tangential: ArrayLike, diameter: ArrayLike) -> Floats:
    """Error of the diameter from the work's bending, 2 y + 2 y_t^2 / d.

    Parameters
    ----------
    push_off : array_like (...), mm
        Bending y away from the tool (by the passive force).
    tangential : array_like (...), mm
        Bending y_t along the cutting speed (by the cutting force).
    diameter : array_like (...), mm
        Diameter being cut.

    Returns
    -------
    ndarray (...), mm
        The part comes out that much too large.

    Raises
    ------
    ValueError
        Diameter not above zero.

    Examples
    --------
    >>> round(float(diameter_error(0.010, 0.05, 20.0)), 5)
    0.02025

    References
    ----------
    Geometry of a circle moved off the tip: r^2 = (d/2 + y)^2 + y_t^2, second order terms of y dropped.
    """
    d = positive("diameter", "mm", diameter)
    return np.asarray(2.0 * finite("bending", "mm", push_off) + 2.0 * finite("bending", "mm", tangential) ** 2 / d)


def whipping_speed(length: ArrayLike, outer: ArrayLike, modulus: ArrayLike, density: ArrayLike) -> Floats:
    """Critical speed of the unguided tail of a round bar behind the spindle.

    Parameters
    ----------
    length : array_like (...), mm
        Free length of the tail.
    outer : array_like (...), mm
        Diameter of the bar.
    modulus : array_like (...), MPa
        Modulus of elasticity.
    density : array_like (...), g/cm3
        Density.

    Returns
    -------
    ndarray (...), rpm
        First bending frequency of a cantilever, 3.516/(2 pi) sqrt(E I / (rho A L^4)), per minute.

    Raises
    ------
    ValueError
        An argument not above zero.

    Examples
    --------
    >>> round(float(whipping_speed(1000.0, 10.0, 210000.0, 7.85)))
    434

    References
    ----------
    Den Hartog, Mechanical Vibrations, table of cantilever frequencies (3.516); whirling speed = bending frequency.
    """
    tail, d = positive("length", "mm", length), positive("diameter", "mm", outer)
    e, rho = positive("modulus", "MPa", modulus), positive("density", "g/cm3", density)
    gyration = d / 4.0  # sqrt(I/A) of a round section, mm
    wave = np.sqrt(e / (rho * 1e-9)) * gyration / tail**2  # 1/s; E in N/mm2, density in t/mm3
    return np.asarray(3.516 / (2.0 * np.pi) * wave * 60.0)


def ring_lobing(force: ArrayLike, mean_radius: ArrayLike, modulus: ArrayLike, moment: ArrayLike) -> Floats:
    """Out-of-roundness of a thin ring under three jaws, (0.0159 + 0.0143) P R^3 / (E I).

    Parameters
    ----------
    force : array_like (...), N
        Radial force P of one jaw.
    mean_radius : array_like (...), mm
        Radius R of the ring's middle line.
    modulus : array_like (...), MPa
        Modulus of elasticity.
    moment : array_like (...), mm4
        Second moment of the wall's section, width times wall^3 / 12.

    Returns
    -------
    ndarray (...), mm
        Radius between the jaws less radius under the jaws.

    Raises
    ------
    ValueError
        Force negative, another argument not above zero.

    Examples
    --------
    >>> round(float(ring_lobing(3000.0, 40.0, 210000.0, 20.0 * 5.0**3 / 12.0)), 4)
    0.1325

    References
    ----------
    Roark's Formulas for Stress and Strain, table of circular rings under equally spaced radial forces, from memory.
    Wall below about a tenth of the diameter.
    """
    p, radius = not_negative("jaw force", "N", force), positive("ring radius", "mm", mean_radius)
    return np.asarray((0.0159 + 0.0143) * p * radius**3 / _rigidity(modulus, moment))


def _rigidity(modulus: ArrayLike, moment: ArrayLike) -> Floats:
    return np.asarray(positive("modulus", "MPa", modulus) * positive("second moment", "mm4", moment))


def _on_span(position: ArrayLike, span: ArrayLike) -> tuple[Floats, Floats, Floats]:
    a, span_ = not_negative("load position", "mm", position), positive("span", "mm", span)
    if np.any(a > span_):
        raise ValueError("the load position must lie on the span")
    return a, np.asarray(span_ - a), span_


@dataclass(frozen=True, slots=True)
class _Flexibility:
    """Running integrals of x^k / (E I) from the jaws, k = 0, 1, 2: every bending integral is made of these."""

    starts: Floats
    rigidity: Floats
    before: tuple[Floats, ...]  # up to the start of each section

    @classmethod
    def of(cls, ends: Floats, rigidity: Floats) -> _Flexibility:
        starts = np.concatenate(([0.0], ends[:-1]))
        whole = [(ends**k - starts**k) / (k * rigidity) for k in (1, 2, 3)]
        return cls(starts, rigidity, tuple(np.cumsum(part) - part for part in whole))

    def up_to(self, x: Floats) -> tuple[Floats, Floats, Floats]:
        section = np.clip(np.searchsorted(self.starts, x, side="right") - 1, 0, len(self.starts) - 1)
        start, ei = self.starts[section], self.rigidity[section]
        first, second, third = (
            np.asarray(self.before[k - 1][section] + (x**k - start**k) / (k * ei)) for k in (1, 2, 3)
        )
        return first, second, third


def _overhung(beam: _Flexibility, load: Floats, at: Floats, supports: Supports) -> Floats:
    """Deflection at ``at`` for a unit force at ``load`` (at >= load), the part held in the chuck alone."""
    j0, j1, j2 = beam.up_to(load)
    bent = load * at * j0 - (load + at) * j1 + j2  # int (load - x)(at - x) / EI dx
    return np.asarray(bent + 1.0 / supports.slide + load * at / supports.tilt)


def _between_centres(beam: _Flexibility, load: Floats, span: Floats, supports: Supports) -> Floats:
    j0, j1, j2 = beam.up_to(load)
    k0, k1, k2 = beam.up_to(span)
    share = load / span
    right = span**2 * (k0 - j0) - 2.0 * span * (k1 - j1) + (k2 - j2)  # int (span - x)^2 / EI dx beyond the load
    bent = (1.0 - share) ** 2 * j2 + share**2 * right
    return np.asarray(bent + (1.0 - share) ** 2 / supports.slide + share**2 / supports.tail)
