"""Single-point threading of 60 degree threads: depth, infeed, chip area and force of each pass."""

from __future__ import annotations

from typing import Final, Literal

import numpy as np
from numpy.typing import ArrayLike

from auditor.mechanics.kienzle import cutting_force
from auditor.mechanics.validity import Floats, ValidRange, angle, finite, not_negative, positive

Infeed = Literal["radial", "flank", "alternating"]
V_CHIP_FACTOR: Final = 1.3  # of the force when both flanks cut at once, 1.2 to 1.4 (model)
FIRST_PASS: Final = ValidRange(
    "depth of a pass", "mm", 0.05, 0.40, "common practice; 0.08 at least in austenitic steel"
)
FLANK_CLEARANCE: Final = ValidRange("flank clearance at the helix", "deg", 2.0, 90.0, "common practice")
RUN_IN_PITCHES: Final = 3.0  # pitches in front of the thread, more at high speed (common practice 2 to 3)
_FLANK: Final = np.radians(30.0)
_PASSES: Final = (
    (0.5, 4, 4),
    (0.75, 4, 5),
    (1.0, 5, 6),
    (1.25, 6, 7),
    (1.5, 6, 8),
    (1.75, 8, 8),
    (2.0, 8, 10),
    (2.5, 10, 10),
    (3.0, 12, 12),
    (4.0, 14, 14),
    (5.0, 16, 16),
    (6.0, 16, 18),
)


def external_depth(pitch: ArrayLike) -> Floats:
    """Depth of an external metric thread, h3 = 0.61343 P.

    Parameters
    ----------
    pitch : array_like (...), mm
        Pitch.

    Returns
    -------
    ndarray (...), mm
        h3.

    Raises
    ------
    ValueError
        Pitch not above zero.

    Examples
    --------
    >>> round(float(external_depth(1.5)), 3)
    0.92

    References
    ----------
    ISO 68-1 and ISO 724, basic profile with rounded root, from memory.
    """
    return np.asarray(0.61343 * positive("pitch", "mm", pitch))


def internal_depth(pitch: ArrayLike) -> Floats:
    """Depth of an internal metric thread, H1 = 0.54127 P.

    Parameters
    ----------
    pitch : array_like (...), mm
        Pitch.

    Returns
    -------
    ndarray (...), mm
        H1 = (5/8) (sqrt(3)/2) P.

    Raises
    ------
    ValueError
        Pitch not above zero.

    Examples
    --------
    >>> round(float(internal_depth(1.5)), 3)
    0.812

    References
    ----------
    ISO 68-1, basic profile.
    """
    return np.asarray(0.54127 * positive("pitch", "mm", pitch))


def pass_area(depth_before: ArrayLike, depth_after: ArrayLike, tip_width: ArrayLike = 0.0) -> Floats:
    """Chip section of one pass, (t2^2 - t1^2) tan 30 + w0 (t2 - t1).

    Parameters
    ----------
    depth_before : array_like (...), mm
        Depth t1 reached by the pass before.
    depth_after : array_like (...), mm
        Depth t2 of this pass; equal to t1 on a spring pass.
    tip_width : array_like (...), mm
        Width w0 of the insert's flat or rounded tip.

    Returns
    -------
    ndarray (...), mm2
        Section.

    Raises
    ------
    ValueError
        A length negative, the pass shallower than the one before.

    Examples
    --------
    >>> round(float(pass_area(0.376, 0.531)), 4)
    0.0812

    References
    ----------
    Plane geometry of the 60 degree profile of ISO 68-1.
    """
    t1, t2 = not_negative("depth before", "mm", depth_before), not_negative("depth after", "mm", depth_after)
    if np.any(t2 < t1):
        raise ValueError("a thread pass must not be shallower than the pass before")
    return np.asarray((t2**2 - t1**2) * np.tan(_FLANK) + not_negative("tip width", "mm", tip_width) * (t2 - t1))


def constant_area_depths(depth: float, passes: int) -> Floats:
    """Depth after each pass when every pass takes the same chip section, t_i = h sqrt(i / N).

    Parameters
    ----------
    depth : float, mm
        Full depth h of the thread.
    passes : int, dimensionless
        Number N of passes.

    Returns
    -------
    ndarray (N,), mm
        Depths, the last one full.

    Raises
    ------
    ValueError
        Depth not above zero, fewer than one pass.

    Examples
    --------
    >>> constant_area_depths(0.920, 6).round(3).tolist()
    [0.376, 0.531, 0.651, 0.751, 0.84, 0.92]

    References
    ----------
    Plane geometry of a sharp V (section grows with the square of the depth), eq. of equal steps.
    """
    if passes < 1:
        raise ValueError(f"a thread needs at least one pass; found {passes}")
    return np.asarray(positive("thread depth", "mm", depth) * np.sqrt(np.arange(1, passes + 1) / passes))


def thread_chip_thickness(step: ArrayLike, infeed: Infeed = "radial") -> Floats:
    """Chip thickness of a pass: on both flanks radially, on one with flank or alternating infeed.

    Parameters
    ----------
    step : array_like (...), mm
        Depth added by the pass, radially.
    infeed : str, way of feeding in
        "radial" (two flanks, step sin 30) or "flank" and "alternating" (one flank, the step itself).

    Returns
    -------
    ndarray (...), mm
        h.

    Raises
    ------
    ValueError
        Step negative, way of feeding in unknown.

    Examples
    --------
    >>> round(float(thread_chip_thickness(0.2)), 2), float(thread_chip_thickness(0.2, "flank"))
    (0.1, 0.2)

    References
    ----------
    Plane geometry of the 60 degree profile of ISO 68-1, distance between two positions of a flank.
    """
    t = not_negative("step", "mm", step)
    if infeed == "radial":
        return np.asarray(t * np.sin(_FLANK))
    if infeed in ("flank", "alternating"):
        return t
    raise ValueError(f"infeed must be radial, flank or alternating; found {infeed!r}")


def thread_force(kc11: ArrayLike, mc: ArrayLike, area: ArrayLike, h: ArrayLike, infeed: Infeed = "radial") -> Floats:
    """Cutting force of a thread pass, kc(h) A, times 1.3 where both flanks feed one V-shaped chip.

    Parameters
    ----------
    kc11 : array_like (...), N/mm2
        Kienzle constant.
    mc : array_like (...), dimensionless
        Kienzle exponent.
    area : array_like (...), mm2
        Chip section of the pass.
    h : array_like (...), mm
        Chip thickness of the pass, see `thread_chip_thickness`.
    infeed : str, way of feeding in
        "radial", "flank" or "alternating".

    Returns
    -------
    ndarray (...), N
        Fc, zero on a spring pass.

    Raises
    ------
    ValueError
        Constants, area or thickness impossible, way of feeding in unknown.

    Examples
    --------
    >>> round(float(thread_force(1659.0, 0.21, 0.0812, 0.0775)))
    300

    References
    ----------
    Kienzle 1952; factor of the V-shaped chip: model (1.2 to 1.4).
    """
    if infeed not in ("radial", "flank", "alternating"):
        raise ValueError(f"infeed must be radial, flank or alternating; found {infeed!r}")
    section, thickness = not_negative("chip area", "mm2", area), not_negative("chip thickness", "mm", h)
    width = np.where(thickness == 0.0, 0.0, section / np.where(thickness == 0.0, 1.0, thickness))
    crowding = V_CHIP_FACTOR if infeed == "radial" else 1.0
    return np.asarray(crowding * cutting_force(kc11, mc, thickness, width))


def lead_angle(lead: ArrayLike, diameter: ArrayLike) -> Floats:
    """Helix (lead) angle of a thread, tan = L / (pi d).

    Parameters
    ----------
    lead : array_like (...), mm
        Lead: pitch times starts.
    diameter : array_like (...), mm
        Pitch diameter.

    Returns
    -------
    ndarray (...), deg
        The leading flank loses that much clearance, the trailing one gains it.

    Raises
    ------
    ValueError
        Lead or diameter not above zero.

    Examples
    --------
    >>> round(float(lead_angle(1.5, 9.026)), 2)
    3.03

    References
    ----------
    ISO 5408 (thread terms), lead angle.
    """
    return np.asarray(
        np.degrees(np.arctan(positive("lead", "mm", lead) / (np.pi * positive("pitch diameter", "mm", diameter))))
    )


def leading_flank_clearance(clearance: ArrayLike, lead: ArrayLike, diameter: ArrayLike) -> Floats:
    """Clearance left at the leading flank of a thread.

    Parameters
    ----------
    clearance : array_like (...), deg
        Side clearance of the insert at the flank, tilt of the holder in it.
    lead : array_like (...), mm
        Lead of the thread.
    diameter : array_like (...), mm
        Pitch diameter.

    Returns
    -------
    ndarray (...), deg
        Side clearance less lead angle; at least 2 is wanted, see `FLANK_CLEARANCE`.

    Raises
    ------
    ValueError
        Clearance infinite, lead or diameter not above zero.

    Examples
    --------
    >>> round(float(leading_flank_clearance(4.0, 1.5, 9.026)), 2)
    0.97

    References
    ----------
    ISO 3002-1 (1982), resultant cutting direction with the lead as feed; 2 degrees: common practice.
    """
    return np.asarray(finite("clearance", "deg", clearance) - lead_angle(lead, diameter))


def profile_flank_clearance(face_clearance: ArrayLike, flank_angle: float = 30.0) -> Floats:
    """Side clearance at the flank of a profile from the clearance of the whole insert.

    Parameters
    ----------
    face_clearance : array_like (...), deg
        Clearance at the tip, towards the spindle axis.
    flank_angle : float, deg
        Half the profile angle.

    Returns
    -------
    ndarray (...), deg
        tan(side) = tan(tip) tan(flank angle), in the working plane of the flank.

    Raises
    ------
    ValueError
        An angle not between 0 and 90 degrees.

    Examples
    --------
    >>> round(float(profile_flank_clearance(11.0)), 2)
    6.4

    References
    ----------
    Geometry of a profile moved along its clearance direction, eq. of the sideways recess per height.
    """
    tip = angle("clearance", face_clearance, 0.0)
    return np.asarray(np.degrees(np.arctan(np.tan(tip) * np.tan(angle("flank angle", flank_angle, 0.0)))))


def usual_passes(pitch: float) -> tuple[int, int]:
    """Usual number of passes for a pitch; judge by force, these tables run their own first pass too deep from P 2 on.

    Parameters
    ----------
    pitch : float, mm
        Pitch, 0.5 to 6; the next larger row counts.

    Returns
    -------
    tuple of int, dimensionless
        Fewest and most passes.

    Raises
    ------
    ValueError
        Pitch not above zero or above 6.

    Examples
    --------
    >>> usual_passes(1.5)
    (6, 8)

    References
    ----------
    Common practice, table of passes.
    """
    wanted = float(positive("pitch", "mm", pitch))
    for row, fewest, most in _PASSES:
        if wanted <= row * (1.0 + 1e-9):
            return fewest, most
    raise ValueError(f"no table row for a pitch above {_PASSES[-1][0]:g} mm; found {wanted:g} mm")
