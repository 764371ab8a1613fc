"""The raw stock and its material, with every default written down."""

from __future__ import annotations

from pathlib import Path
from typing import Literal

from auditor.declared import tables
from auditor.declared.faults import Place
from auditor.declared.model import EarlierPart, Material, Point, Workpiece
from auditor.declared.notes import Notes
from auditor.errors import Fault

# Young's modulus (MPa), density (g/cm3), friction angle (deg): common handbook figures of each ISO 513 group.
_GROUP_FIGURES: dict[str, tuple[float, float, float]] = {
    "P": (210_000.0, 7.85, 32.0),
    "M": (195_000.0, 7.9, 33.0),
    "K": (120_000.0, 7.2, 27.0),
    "N": (70_000.0, 2.7, 32.0),
    "S": (200_000.0, 8.2, 32.0),
    "H": (210_000.0, 7.85, 32.0),
    "O": (3_000.0, 1.4, 32.0),
}
_TITANIUM = (110_000.0, 4.5, 22.0)  # group S under 5 g/cm3
_SCATTER = 0.25  # one-sided, a pair found in a book rather than measured on this stock


def material_of(table: tables.MaterialTable, name: str, notes: Notes) -> Material:
    """A declared material; what it leaves open follows its group."""
    modulus, density, friction_angle = _GROUP_FIGURES[table.group]
    if table.group == "S" and table.density is not None and table.density < 5.0:
        modulus, density, friction_angle = _TITANIUM
    usual = f"usual in group {table.group}"
    long_or_short: Literal["long", "short"] = "short" if table.group == "K" else "long"
    rake = 2.0 if table.group == "K" else 6.0
    if table.kc11 is not None:
        notes.number("scatter", table.scatter, _SCATTER, "", "usual for a pair not measured on this stock")
        notes.number("reference_rake", table.reference_rake, rake, "deg", usual)
    return Material(
        name=name,
        group=table.group,
        title=table.title or name,
        source=table.source,
        provenance="declared",
        kc11=table.kc11,
        mc=table.mc,
        reference_rake=table.reference_rake if table.reference_rake is not None else rake,
        scatter=table.scatter if table.scatter is not None else _SCATTER,
        kn11=table.kn11,
        mn=table.mn,
        friction_angle=friction_angle,
        tensile_strength=table.tensile_strength,
        hardness=table.hardness,
        modulus=notes.number("modulus", table.modulus, modulus, "MPa", usual),
        density=notes.number("density", table.density, density, "g/cm^3", usual),
        chips=notes.other("chips", table.chips, long_or_short, usual),
        work_hardening=notes.other("work_hardening", table.work_hardening, table.group in "MS", usual),
        built_up_edge=table.built_up_edge,
    )


def workpiece_of(
    table: tables.WorkpieceTable, material: Material, place: Place, notes: Notes, faults: list[Fault]
) -> Workpiece | None:
    """The raw stock as a half-section, and what is asked of the part."""
    earlier: EarlierPart | None = None
    outline: tuple[Point, ...] = ()
    if table.stock is not None:
        face = notes.number("face", table.face, 0.0, "mm", "the raw face lies at Z0")
        earlier = EarlierPart(str(Path(place.file).parent / table.stock.job), table.stock.flipped, face)
    else:
        bore = notes.number("bore", table.bore, 0.0, "mm", "solid stock")
        outer = _outer_line(table, place, notes, faults)
        if outer is None:
            return None
        outline = _half_section(outer, bore / 2.0)
    return Workpiece(
        material=material,
        outline=outline,
        length=table.length or 0.0,
        diameter=2.0 * max((corner.r for corner in outline), default=0.0),
        skin=notes.other("skin", table.skin, "bright", "drawn or turned stock"),
        diameter_spread=notes.number("diameter_spread", table.diameter_spread, 0.0, "mm", "stock of its nominal size"),
        section=notes.other("section", table.section, "round", "round stock"),
        interrupted=tuple((min(span), max(span)) for span in table.interrupted or ()),
        diameter_tolerance=table.diameter_tolerance,
        roughness=table.roughness,
        finished=_line(table.finished),
        finished_bore=_line(table.finished_bore),
        earlier=earlier,
    )


def _line(pairs: list[tuple[float, float]] | None) -> tuple[Point, ...]:
    return tuple(Point(z, diameter / 2.0) for z, diameter in pairs or ())


def _outer_line(
    table: tables.WorkpieceTable, place: Place, notes: Notes, faults: list[Fault]
) -> tuple[Point, ...] | None:
    """The raw outer line from the front face towards the chuck."""
    if table.diameter is not None:
        face = notes.number("face", table.face, 0.0, "mm", "the raw face lies at Z0")
        return (Point(face, table.diameter / 2.0), Point(face - (table.length or 0.0), table.diameter / 2.0))
    drawn = _line(table.profile)
    if drawn[0].z < drawn[-1].z:
        drawn = drawn[::-1]
    front = table.face if table.face is not None else drawn[0].z
    length = table.length or 0.0
    back = front - length
    if front < drawn[0].z:
        wanted = f"at least {drawn[0].z:g} mm, where the profile begins"
        faults.append(place.fault("the profile begins before the face", "face", found=f"{front:g} mm", wanted=wanted))
        return None
    if back > drawn[-1].z + 1e-9:
        wanted = f"at least {front - drawn[-1].z:g} mm, to the end of the profile"
        faults.append(
            place.fault("the stock is shorter than its profile", "length", found=f"{length:g} mm", wanted=wanted)
        )
        return None
    head = (Point(front, drawn[0].r),) if front > drawn[0].z else ()
    tail = (Point(back, drawn[-1].r),) if back < drawn[-1].z else ()
    return head + drawn + tail


def _half_section(outer: tuple[Point, ...], bore: float) -> tuple[Point, ...]:
    """Close the outer line along the bore or the axis."""
    walls = [Point(corner.z, max(corner.r, bore)) for corner in outer]
    corners = [Point(outer[0].z, bore), *walls, Point(outer[-1].z, bore)]
    kept = [corner for corner, before in zip(corners, [None, *corners], strict=False) if corner != before]
    return tuple(kept)
