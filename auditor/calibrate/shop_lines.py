"""The lines for the shop file that a calibration asks for: printed for a person to paste, never written."""

from __future__ import annotations

import math
import re
from collections.abc import Iterator

from auditor.calibrate.calibration import Calibration
from auditor.calibrate.log import LoadLog
from auditor.declared.model import Job, Material
from auditor.mechanics.thrust import resultant_thrust

THIN, THICK = 0.1, 0.4  # mm, between which the catalogue's two thrust pairs are joined to one


def shop_lines(calibration: Calibration, job: Job, log: LoadLog) -> str:
    """A material table with the fitted constant, and the efficiency it was fitted with."""
    return "\n".join([*_material(calibration, job, log), *_machine(job)]) + "\n"


def material_name(job: Job) -> str:
    """A name of its own for the calibrated material: a shop entry beats a catalogue entry of the same name."""
    base = re.sub(r"[^A-Za-z0-9_-]+", "-", job.workpiece.material.name).strip("-") or "material"
    return base if base.endswith("-fitted") else f"{base}-fitted"


def _material(calibration: Calibration, job: Job, log: LoadLog) -> Iterator[str]:
    material = job.workpiece.material
    low, high = calibration.interval
    assert material.kc11 is not None
    yield f"[materials.{material_name(job)}]"
    yield f'group = "{material.group}"'
    yield f'kc11 = "{material.kc11 * calibration.factor:.0f} N/mm^2"'
    yield f"mc = {material.mc:g}"
    yield f'reference_rake = "{material.reference_rake:g} deg"'
    yield f"scatter = {calibration.scatter:.2f}"
    pair = _thrust(material)
    if pair is not None:
        yield f'kn11 = "{pair[0]:.0f} N/mm^2"        # thrust as before: a spindle load does not tell it'
        yield f"mn = {pair[1]:.3f}"
    times = f"times {calibration.factor:.3f} ({low:.3f} to {high:.3f}, 95 %)"
    log_name = f"{_plain(_name(log.path))} {log.sha256[:12]}"
    yield (f'source = "{_plain(material.name)} {times}, fitted to {calibration.cuts} cuts of '
           f'{_plain(_name(job.program))}, log {log_name}"')
    yield from _rest(material)


def _rest(material: Material) -> Iterator[str]:
    """What the calibration leaves as it is."""
    yield f'modulus = "{material.modulus / 1000.0:g} GPa"'
    yield f'density = "{material.density:g} g/cm^3"'
    yield f'chips = "{material.chips}"'
    yield f"work_hardening = {'true' if material.work_hardening else 'false'}"
    if material.tensile_strength is not None:
        yield f'tensile_strength = "{material.tensile_strength:g} MPa"'
    if material.hardness is not None:
        yield f'hardness = "{material.hardness:g} HB"'
    if material.built_up_edge is not None:
        low, high = material.built_up_edge
        yield f'built_up_edge = ["{low:g} m/min", "{high:g} m/min"]'


def _thrust(material: Material) -> tuple[float, float] | None:
    """The declared thrust pair, or the catalogue's feed and passive pairs joined to one between two thicknesses."""
    if material.kn11 is not None and material.mn is not None:
        return material.kn11, material.mn
    if material.kf11 is None or material.mf is None or material.kp11 is None or material.mp is None:
        return None
    thin, thick = (
        float(resultant_thrust(material.kf11, material.mf, material.kp11, material.mp, h, 1.0,
                               material.reference_rake, material.reference_rake))
        for h in (THIN, THICK)
    )
    slope = math.log(thick / thin) / math.log(THICK / THIN)
    return thick / THICK**slope, 1.0 - slope


def _machine(job: Job) -> Iterator[str]:
    if any(entry.about.endswith("machine.efficiency") for entry in job.assumptions):
        yield ""
        yield f"# and in the table of {_plain(job.machine.name)}, since the factor holds with it alone:"
        yield f"# efficiency = {job.machine.efficiency:g}"


def _name(path: str) -> str:
    return re.split(r"[\\/]", path)[-1]


def _plain(text: str) -> str:
    """Text that can stand in a TOML string and in a comment."""
    return "".join(sign if sign.isprintable() and sign not in '"\\' else "?" for sign in text)
