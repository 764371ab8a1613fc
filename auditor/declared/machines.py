"""Control, machine, workholding and prediction settings, with every default written down."""

from __future__ import annotations

from typing import Literal

from auditor.declared import tables
from auditor.declared.model import Control, Machine, Model, Point, Workholding
from auditor.declared.notes import Notes

Holding = Literal["chuck", "collet", "chuck+tailstock", "centres"]

BASE_SPEED_SHARE = 0.25  # base speed / speed limit of a common lathe spindle (common practice)
FRICTION = 0.12  # smooth jaws on raw stock, VDI 3106, from memory; the lowest of its raw-surface figures
WORN = 1.3  # force of an edge at the end of its life against a sharp one


def control_of(table: tables.ControlCore | None, notes: Notes) -> Control:
    """How the program text is to be read."""
    given = table or tables.ControlCore()
    usual = "the usual setting of lathe controls"
    return Control(
        system=given.system or "A",
        system_declared=given.system is not None,
        units=given.units,
        x_words=notes.other("x_words", given.x_words, "diameter", usual),
        whole_numbers=notes.other("whole_numbers", given.whole_numbers, "units", "5 without a point is 5 mm"),
        increment=notes.number("increment", given.increment, 0.001, "mm", "least input increment of most controls"),
        block_skip=notes.other("block_skip", given.block_skip, False, "blocks that start with / are carried out"),
        arcs=notes.other("arcs", given.arcs, "standard", "G2 clockwise with Z to the right and X up"),
        settings=given.settings(),
    )


def machine_of(table: tables.MachineTable, name: str, notes: Notes) -> Machine:
    """Spindle, axes and reference points."""
    curve, base_speed = _power(table, notes)
    rapid = table.rapid or tables.RapidTable()
    thrust = table.thrust or tables.ThrustTable()
    strongest = max(power for _, power in curve)
    if table.peak_power is not None and table.peak_time is None:
        notes.add("peak_time", "no limit", "not declared; the short-time rating is taken to last")
    return Machine(
        name=name,
        speed_limit=table.speed_limit,
        power_curve=curve,
        base_speed=base_speed,
        peak_factor=table.peak_power / strongest if table.peak_power else 1.0,
        peak_time=table.peak_time,
        efficiency=notes.number("efficiency", table.efficiency, 0.85, "", "spindle nose power over motor power, usual"),
        thrust_x=thrust.x,
        thrust_z=thrust.z,
        rapid_x=1000.0 * notes.number("rapid.x", rapid.x, 12.0, "m/min", "a moderate lathe"),
        rapid_z=1000.0 * notes.number("rapid.z", rapid.z, 16.0, "m/min", "a moderate lathe"),
        turret=table.turret,
        tool_change=point(table.tool_change),
        home=point(table.home),
        second_home=point(table.second_home),
        machine_zero=point(table.machine_zero),
    )


def workholding_of(
    table: tables.WorkholdingTable, name: str, raw_diameter: float | None, notes: Notes
) -> Workholding:
    """Chuck, collet or centres; ``raw_diameter`` of the stock, mm, for the grip when none is declared."""
    tailstock = table.tailstock
    diameter, friction, jaws = table.grip_diameter, table.friction, table.jaws
    kind: Holding = notes.other("kind", table.kind, "chuck", "the usual way to hold")
    if table.grip_force is not None and kind != "centres":
        if raw_diameter is not None:
            diameter = notes.number("grip_diameter", diameter, raw_diameter, "mm", "gripped on the raw diameter")
        friction = notes.number("friction", friction, FRICTION, "", "smooth jaws on raw stock")
        jaws = notes.other("jaws", jaws, 3, "the usual chuck")
    guided = table.tail_guided
    if table.tail:
        guided = notes.other("tail_guided", guided, False, "the bar behind the spindle is taken to be free")
    return Workholding(
        name=name,
        kind=kind,
        stick_out=table.stick_out,
        speed_limit=table.speed_limit,
        grip_force=table.grip_force,
        grip_diameter=diameter,
        grip_inside=bool(table.grip_inside),
        jaws=jaws or 3,
        jaw_mass=table.jaw_mass,
        jaw_radius=table.jaw_radius,
        friction=friction,
        tail=table.tail,
        tail_guided=bool(guided),
        tailstock_point=point(tailstock.point) if tailstock else None,
        tailstock_diameter=tailstock.diameter if tailstock else None,
    )


def model_of(table: tables.ModelTable | None, unattended: bool, notes: Notes) -> Model:
    """How the prediction is made; a run without an operator is judged with a worn edge."""
    given = table or tables.ModelTable()
    worn, why = (WORN, "the run is unattended: edges wear") if unattended else (1.0, "edges taken as sharp")
    return Model(
        speed_correction=notes.other("speed_correction", given.speed_correction, True, "forces follow cutting speed"),
        operation_factor=notes.other("operation_factor", given.operation_factor, True, "forces follow the operation"),
        wear_factor=notes.number("wear_factor", given.wear_factor, worn, "", why),
    )


def point(pair: tuple[float, float] | None) -> Point | None:
    """A point from what people write: X as a diameter, then Z."""
    return None if pair is None else Point(z=pair[1], r=pair[0] / 2.0)


def _power(table: tables.MachineTable, notes: Notes) -> tuple[tuple[tuple[float, float], ...], float]:
    """The power curve and the speed from which power, not torque, is the bound."""
    if table.power_curve is not None:
        strongest = max(power for _, power in table.power_curve)
        base = next(speed for speed, power in table.power_curve if power >= 0.999 * strongest)
        return tuple(table.power_curve), base
    if table.power is None:
        raise ValueError("a machine without power or power_curve is refused before it comes here")
    share = f"{BASE_SPEED_SHARE:g} of speed_limit, usual"
    base = notes.number("base_speed", table.base_speed, BASE_SPEED_SHARE * table.speed_limit, "rpm", share)
    return ((base, table.power),), base
