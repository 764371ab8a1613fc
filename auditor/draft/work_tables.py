"""The tables of a draft for control, machine, chuck and stock."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from auditor.draft.guesses import OPEN, Guess, text_value
from auditor.draft.reading import Reading
from auditor.draft.sheet import Entry, Section
from auditor.draft.work_path import deepest_cut
from auditor.draft.work_words import material_hint
from auditor.interpret.moves import Move

Known = Mapping[str, Guess]  # by key path


def control_section(reading: Reading) -> Section:
    """How the program is to be read."""
    return Section("control", (
        Entry.of("system", reading.system, ""),
        Entry.of("units", reading.units, ""),
        Entry.optional("whole_numbers", reading.whole_numbers, '"units"', '"increments": 5 without a point is 0.005'),
        Entry.optional("x_words", None, '"diameter"', 'or "radius"'),
    ))  # fmt: skip


def named_entry(key: str, names: Sequence[str], shop: str) -> Entry | None:
    """A machine or chuck of the shop file in place of a table; None where the shop has none."""
    if not names:
        return None
    if len(names) == 1:
        return Entry(key, text_value(names[0]), f"likely: the only one in {shop}; or a table [{key}]", "said")
    listed = " or ".join(text_value(name) for name in names)
    return Entry(key, f'"{OPEN}"', f"{listed} of {shop}, or a table [{key}]", "open")


def machine_section(reading: Reading) -> Section:
    """Nothing in a program tells of its machine but the speeds it asks for."""
    fastest = _fastest(reading.path.moves)
    hint = f"; the program asks for up to {fastest[0]:g} rpm (in force in line {fastest[1]})" if fastest else ""
    return Section("machine", (
        Entry.of("speed_limit", None, f'of the spindle, such as "4500 rpm"{hint}'),
        Entry.of("power", None, 'of the motor, such as "15 kW"'),
        Entry.optional("base_speed", None, '"1150 rpm"', "from here on full power; below, torque is the bound"),
        Entry.optional("efficiency", None, "0.85", "spindle nose power over motor power"),
        Entry.optional("thrust", None, '{ x = "5 kN", z = "8 kN" }', "without it axis thrust is not judged"),
        Entry.optional("tool_change", None, '["200 mm", "150 mm"]', "X (diameter) and Z where the turret indexes"),
        Entry.optional("home", None, '["200 mm", "150 mm"]', "X (diameter) and Z of G28"),
    ))  # fmt: skip


def _fastest(moves: Sequence[Move]) -> tuple[float, int] | None:
    """Highest speed that is programmed, as rpm or as a limit of constant surface speed, and its line."""
    speeds = [(move.spindle.value, -move.line) for move in moves
              if move.spindle.mode == "rpm" and move.spindle.value is not None]
    speeds += [(move.spindle.clamp, -move.line) for move in moves if move.spindle.clamp is not None]
    rpm, line = max(speeds, default=(0.0, 0))
    return (rpm, -line) if rpm > 0.0 else None


def workholding_section(reading: Reading, known: Known) -> Section:
    """Chuck, collet or centres."""
    deepest = deepest_cut(reading.path)
    hint = f"; {deepest}" if deepest else ""
    entries = [
        Entry.optional("kind", known.get("workholding.kind"), '"chuck"', "or collet, chuck+tailstock, centres"),
        Entry.of("stick_out", known.get("workholding.stick_out"), f"from the jaws to the programmed Z0{hint}"),
        Entry.optional("speed_limit", None, '"4000 rpm"', "of the chuck, by its plate: without it it is not judged"),
        Entry.optional("grip_force", None, '"45 kN"', "total, static: without it the grip is not judged"),
    ]
    if "workholding.grip_inside" in known:
        entries.append(Entry.of("grip_inside", known["workholding.grip_inside"], ""))
    entries += [
        Entry.optional("grip_diameter", known.get("workholding.grip_diameter"), '"60 mm"', "where the jaws grip"),
        Entry.optional("jaws", known.get("workholding.jaws"), "3", "how many"),
        Entry.optional("jaw_mass", None, '"1.8 kg"', "with jaw_radius: how much grip the speed takes"),
        Entry.optional("jaw_radius", None, '"70 mm"', "centre of mass of a jaw"),
        Entry.optional("tail", None, '"0 mm"', "bar behind the spindle: without it whipping is not judged"),
    ]
    return Section("workholding", tuple(entries))


def workpiece_section(reading: Reading, known: Known, materials: Sequence[str]) -> Section:
    """Stock, and what is asked of the part."""
    hint = material_hint(reading.said)
    shop = f"; shop.toml has {', '.join(materials)}" if materials else ""
    about = "a name of the catalogue (`turnaudit materials` lists them) or of shop.toml" + shop
    material = f"{about}; the program says {hint}" if hint else about
    entries = [
        Entry.of("material", known.get("workpiece.material"), material),
        Entry.of("diameter", known.get("workpiece.diameter"), 'of the stock, such as "60 mm"'),
        Entry.of("length", known.get("workpiece.length"), "from the front face of the stock towards the chuck"),
        Entry.optional("face", None, '"0 mm"', "stock in front of Z0"),
        Entry.optional("bore", known.get("workpiece.bore"), '"0 mm"', "through bore of the stock"),
        Entry.optional("skin", known.get("workpiece.skin"), '"bright"', "or hot rolled, cast, forged, sawn"),
        Entry.optional("section", known.get("workpiece.section"), '"round"', "or hexagon, square: across corners"),
        Entry.optional("diameter_tolerance", None, '"0.05 mm"', "of finished diameters: what bending is judged by"),
        Entry.optional("roughness", None, '"Ra 1.6 um"', "asked of the finished surface"),
    ]
    return Section("workpiece", tuple(entries))
