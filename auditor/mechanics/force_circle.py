"""Merchant's force circle: cutting force and thrust, shear plane and rake face."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.validity import Floats, angle, finite, not_negative, positive, ratio


def shear_force(Fc: ArrayLike, Ft: ArrayLike, phi: ArrayLike) -> Floats:
    """Force along the shear plane, Fs = Fc cos phi - Ft sin phi.

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force.
    Ft : array_like (...), N
        Thrust, at right angles to it.
    phi : array_like (...), deg
        Shear angle.

    Returns
    -------
    ndarray (...), N
        Fs.

    Raises
    ------
    ValueError
        phi not between 0 and 90 degrees.

    Examples
    --------
    >>> round(float(shear_force(1559.0, 1271.0, 25.37)), 1)
    864.1

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20, example 20.2.
    """
    p = angle("shear angle", phi, 0.0)
    return np.asarray(finite("cutting force", "N", Fc) * np.cos(p) - finite("thrust", "N", Ft) * np.sin(p))


def shear_stress(Fc: ArrayLike, Ft: ArrayLike, phi: ArrayLike, h: ArrayLike, b: ArrayLike) -> Floats:
    """Shear stress on the shear plane, tau = Fs sin phi / (b h).

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force.
    Ft : array_like (...), N
        Thrust.
    phi : array_like (...), deg
        Shear angle.
    h : array_like (...), mm
        Uncut chip thickness.
    b : array_like (...), mm
        Width of cut.

    Returns
    -------
    ndarray (...), MPa
        tau.

    Raises
    ------
    ValueError
        phi not between 0 and 90 degrees, h or b not above zero.

    Examples
    --------
    >>> round(float(shear_stress(1559.0, 1271.0, 25.37, 0.5, 3.0)), 1)
    246.8

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20, example 20.2.
    """
    section = positive("chip thickness", "mm", h) * positive("width of cut", "mm", b)
    return np.asarray(shear_force(Fc, Ft, phi) * np.sin(angle("shear angle", phi, 0.0)) / section)


def measured_friction_angle(Fc: ArrayLike, Ft: ArrayLike, rake: ArrayLike) -> Floats:
    """Friction angle at the rake face from measured forces, beta = g + atan(Ft / Fc).

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force, above zero.
    Ft : array_like (...), N
        Thrust.
    rake : array_like (...), deg
        Rake.

    Returns
    -------
    ndarray (...), deg
        beta; its tangent is the coefficient of friction.

    Raises
    ------
    ValueError
        Cutting force not above zero.

    Examples
    --------
    >>> round(float(measured_friction_angle(1559.0, 1271.0, 10.0)), 1)
    49.2

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20, example 20.3.
    """
    lean = np.arctan2(finite("thrust", "N", Ft), positive("cutting force", "N", Fc))
    return np.asarray(finite("rake", "deg", rake) + np.degrees(lean))


def friction_coefficient(friction_angle: ArrayLike) -> Floats:
    """Coefficient of friction at the rake face, mu = tan beta.

    Parameters
    ----------
    friction_angle : array_like (...), deg
        beta.

    Returns
    -------
    ndarray (...), dimensionless
        mu.

    Raises
    ------
    ValueError
        beta not between -90 and 90 degrees.

    Examples
    --------
    >>> round(float(friction_coefficient(49.2)), 2)
    1.16

    References
    ----------
    Groover, Fundamentals of Modern Manufacturing, ch. 20, example 20.3.
    """
    return np.asarray(np.tan(angle("friction angle", friction_angle)))


def friction_force(Fc: ArrayLike, Ft: ArrayLike, rake: ArrayLike) -> Floats:
    """Friction force along the rake face, F = Fc sin g + Ft cos g.

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force.
    Ft : array_like (...), N
        Thrust.
    rake : array_like (...), deg
        Rake.

    Returns
    -------
    ndarray (...), N
        F.

    Raises
    ------
    ValueError
        Rake not between -90 and 90 degrees.

    Examples
    --------
    >>> float(friction_force(900.0, 600.0, 0.0))
    600.0

    References
    ----------
    Stephenson and Agapiou, Metal Cutting Theory and Practice, example 6.1, p. 436.
    """
    g = angle("rake", rake)
    return np.asarray(finite("cutting force", "N", Fc) * np.sin(g) + finite("thrust", "N", Ft) * np.cos(g))


def friction_energy_share(Fc: ArrayLike, Ft: ArrayLike, rake: ArrayLike, chip_ratio: ArrayLike) -> Floats:
    """Share of the cutting energy that goes into friction at the rake face, F rc / Fc.

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force, above zero.
    Ft : array_like (...), N
        Thrust.
    rake : array_like (...), deg
        Rake.
    chip_ratio : array_like (...), dimensionless
        Uncut over cut chip thickness.

    Returns
    -------
    ndarray (...), dimensionless
        Share, 0 to 1.

    Raises
    ------
    ValueError
        Cutting force or ratio not above zero.

    Examples
    --------
    >>> round(float(friction_energy_share(900.0, 600.0, 0.0, 0.3 / 0.7)), 3)
    0.286

    References
    ----------
    Stephenson and Agapiou, Metal Cutting Theory and Practice, example 6.1, p. 436; Kalpakjian and Schmid, Manufacturing
    Engineering and Technology, example 21.1.
    """
    rc = positive("chip ratio", "", chip_ratio)
    return np.asarray(friction_force(Fc, Ft, rake) * rc / positive("cutting force", "N", Fc))


def force_from_shear(
    tau: ArrayLike, h: ArrayLike, b: ArrayLike, phi: ArrayLike, friction_angle: ArrayLike, rake: ArrayLike
) -> tuple[Floats, Floats]:
    """Cutting force and thrust from the shear strength, Fc = tau b h cos(beta-g) / (sin phi cos(phi+beta-g)).

    Parameters
    ----------
    tau : array_like (...), MPa
        Shear strength in the shear plane.
    h : array_like (...), mm
        Uncut chip thickness.
    b : array_like (...), mm
        Width of cut.
    phi : array_like (...), deg
        Shear angle.
    friction_angle : array_like (...), deg
        beta at the rake face.
    rake : array_like (...), deg
        Rake g.

    Returns
    -------
    tuple of ndarray (...), N and N
        Fc and Ft = Fc tan(beta - g).

    Raises
    ------
    ValueError
        tau not above zero, h or b negative, phi or phi + beta - g not between their bounds.

    Examples
    --------
    >>> fc, ft = force_from_shear(400.0, 0.2, 2.0, 36.72, 26.565, 10.0)
    >>> round(float(fc)), round(float(ft), 1)
    (429, 127.6)

    References
    ----------
    Merchant, J. Appl. Phys. 16 (1945) 267; Ghosh and Mallik, Manufacturing Science, problem 4.3, p. 193.
    """
    area = not_negative("chip thickness", "mm", h) * not_negative("width of cut", "mm", b)
    p = angle("shear angle", phi, 0.0)
    lean = np.radians(finite("friction angle", "deg", friction_angle) - finite("rake", "deg", rake))
    open_angle = angle("phi + beta - g", np.degrees(p + lean))
    fc = positive("shear strength", "MPa", tau) * area * np.cos(lean) / (np.sin(p) * np.cos(open_angle))
    return np.asarray(fc), np.asarray(fc * np.tan(lean))


def face_stress(Fc: ArrayLike, Ft: ArrayLike, rake: ArrayLike, contact_length: ArrayLike, b: ArrayLike) -> Floats:
    """Mean friction stress on the rake face.

    Parameters
    ----------
    Fc : array_like (...), N
        Cutting force.
    Ft : array_like (...), N
        Thrust.
    rake : array_like (...), deg
        Rake.
    contact_length : array_like (...), mm
        Length of contact between chip and face.
    b : array_like (...), mm
        Width of cut.

    Returns
    -------
    ndarray (...), MPa
        Friction force over contact area; NaN where there is no contact.

    Raises
    ------
    ValueError
        Contact length or width negative.

    Examples
    --------
    >>> float(face_stress(900.0, 600.0, 0.0, 0.5, 2.5))
    480.0

    References
    ----------
    Stephenson and Agapiou, Metal Cutting Theory and Practice, example 6.1, p. 436.
    """
    area = not_negative("contact length", "mm", contact_length) * not_negative("width of cut", "mm", b)
    return ratio(friction_force(Fc, Ft, rake), area)
