"""Goes through a job file table by table, collects every fault, and builds the Job when there is none."""

from __future__ import annotations

import re
from dataclasses import replace
from pathlib import Path
from typing import TypeVar

from pydantic import BaseModel

from auditor.declared import materials, tables, units
from auditor.declared.faults import Place, explain_stray, explain_unknown, is_stray, nearest, read_table, shown
from auditor.declared.machines import control_of, machine_of, model_of, workholding_of
from auditor.declared.model import (
    Acceptance,
    Control,
    Job,
    LimitValue,
    Machine,
    Material,
    Model,
    Tool,
    Workholding,
    Workpiece,
)
from auditor.declared.notes import Notes
from auditor.declared.shops import Shop, Written, read_tool
from auditor.declared.stock import material_of, workpiece_of
from auditor.declared.toml_text import TomlFile
from auditor.declared.tools import tool_of
from auditor.errors import DeclarationError, Fault

Row = TypeVar("Row", bound=BaseModel)

_TOOL_NUMBER = re.compile(r"[1-9][0-9]{0,3}")
_LARGEST_LIMIT = 1e12
_LIMIT_DIMENSIONS = ("length", "angle", "force", "power", "speed", "rotation", "time")


class JobReader:
    """One reading of one job file."""

    def __init__(self, toml: TomlFile) -> None:
        self.toml = toml
        self.top = Place(toml.path, "", toml.lines)
        self.shop = Shop(Path(toml.path))
        self.faults: list[Fault] = []
        self.notes: list[Notes] = []

    def job(self, path: str, program: Path | Fault) -> Job:
        """The job, or a DeclarationError with every fault."""
        head = self._head()
        unattended = self._noted("").other("unattended", head.unattended if head else None, False, "someone stands by")
        control = self._control()
        machine = self._machine()
        workpiece = self._workpiece()
        workholding = self._workholding(workpiece)
        tools = self._tools()
        limits = self._limits()
        model = self._model(unattended)
        accepted = self._accepted()
        if isinstance(program, Fault):
            self.faults.insert(0, program)
        if self.faults or isinstance(program, Fault) or machine is None or workpiece is None or workholding is None:
            raise DeclarationError(*dict.fromkeys(_left_open(fault) for fault in self.faults))
        return Job(
            path=path,
            sha256=self.toml.sha256,
            program=str(program),
            control=control,
            machine=machine,
            workholding=workholding,
            workpiece=workpiece,
            tools=tools,
            limits=limits,
            model=model,
            accepted=accepted,
            assumptions=tuple(entry for notes in self.notes for entry in notes.entries),
            batch=head.batch if head else None,
            unattended=unattended,
        )

    def _noted(self, about: str) -> Notes:
        notes = Notes(about)
        self.notes.append(notes)
        return notes

    def _place(self, key: str) -> Place:
        return Place(self.top.file, key, self.top.lines)

    def _head(self) -> tables.JobHead | None:
        """The keys above the first header; whatever else stands at the top is known or a fault."""
        known = tables.JobHead.model_fields
        for key, value in self.toml.content.items():
            if key not in known:
                self.faults.append(explain_unknown(key, value, tables.JobHead, self.top))
        plain = {key: self.toml.content[key] for key in ("program", "batch", "unattended") if key in self.toml.content}
        return read_table(tables.JobHead, plain, self.top, self.faults)

    def _written(self, key: str, section: str) -> Written | None:
        """A required table or the shop entry named in its place."""
        if key not in self.toml.content:
            wanted = f'[{key}], or {key} = "NAME" of a shop entry'
            self.faults.append(self.top.fault("a required table is missing", key, wanted=wanted))
            return None
        return self.shop.take(section, self.toml.content[key], self._place(key), self.faults)

    def _control(self) -> Control:
        notes = self._noted("control")
        row: tables.ControlCore | None = None
        if "control" in self.toml.content:
            written = self._written("control", "controls")
            row = read_table(tables.ControlTable, written.raw, written.place, self.faults) if written else None
        return control_of(row, notes)

    def _machine(self) -> Machine | None:
        written = self._written("machine", "machines")
        if written is None:
            return None
        self._one_of(written, "power", "power_curve")
        row = read_table(tables.MachineTable, written.raw, written.place, self.faults)
        if row is None or (row.power is None and row.power_curve is None):
            return None
        return machine_of(row, written.name or "machine", self._noted("machine"))

    def _workholding(self, workpiece: Workpiece | None) -> Workholding | None:
        written = self._written("workholding", "workholdings")
        row = read_table(tables.WorkholdingTable, written.raw, written.place, self.faults) if written else None
        if written is None or row is None:
            return None
        diameter = workpiece.diameter if workpiece else None
        return workholding_of(row, written.name or "workholding", diameter, self._noted("workholding"))

    def _workpiece(self) -> Workpiece | None:
        place = self._place("workpiece")
        raw = self.toml.content.get("workpiece")
        if not isinstance(raw, dict):
            found = shown(raw) if "workpiece" in self.toml.content else None
            self.faults.append(place.fault("a required table is missing", found=found, wanted="[workpiece]"))
            return None
        self._one_of(Written(raw, place), "diameter", "profile", "stock")
        self._one_of(Written(raw, place), "length", "stock")
        material = self._material(raw.get("material"), self._place("workpiece.material"))
        rest = {key: value for key, value in raw.items() if key != "material"}
        row = read_table(tables.WorkpieceTable, rest, place, self.faults)
        if row is None or material is None or not (row.stock or (row.length and (row.diameter or row.profile))):
            return None
        return workpiece_of(row, material, place, self._noted("workpiece"), self.faults)

    def _material(self, raw: object, place: Place) -> Material | None:
        """A table, a shop entry or, failing that, a catalogue entry."""
        if raw is None:
            self.faults.append(place.fault("a required key is missing", wanted="a material: its name or a table"))
            return None
        written = self.shop.find("materials", raw, self.faults) if isinstance(raw, str) else Written(raw, place)
        if written is None:
            return self._from_catalogue(str(raw), place)
        row = read_table(tables.MaterialTable, written.raw, written.place, self.faults)
        return material_of(row, written.name or "material", self._noted("workpiece.material")) if row else None

    def _from_catalogue(self, name: str, place: Place) -> Material | None:
        material = materials.find(name)
        if material is None:
            close = [nearest(name, self.shop.names("materials", self.faults)), *materials.nearest(name)]
            wanted = " or ".join(f'"{known}"' for known in close if known)
            wanted = (f"{wanted}; `turnaudit materials` lists all" if wanted else
                      "a name of the catalogue (`turnaudit materials` lists them) or of the shop file, or a table")
            self.faults.append(place.fault("no such material", found=f'"{name}"', wanted=wanted))
        return material

    def _one_of(self, written: Written, *keys: str) -> None:
        """Of several ways to say the same, one is needed."""
        if isinstance(written.raw, dict) and not any(key in written.raw for key in keys):
            self.faults.append(written.place.fault("a required key is missing", keys[0], wanted=" or ".join(keys)))

    def _tools(self) -> dict[int, Tool]:
        entries = self.toml.content.get("tools", {})
        if not isinstance(entries, dict):
            self.faults.append(self.top.fault("not a table", "tools", found=shown(entries), wanted="[tools.1]"))
            return {}
        tools: dict[int, Tool] = {}
        for key, raw in entries.items():
            place = self._place(f"tools.{key}")
            if is_stray(key, self._place("tools")):
                self.faults.append(explain_stray(key, raw, self._place("tools")))
                continue
            if not _TOOL_NUMBER.fullmatch(key):
                wanted = "the number of the T word, like [tools.1]"
                self.faults.append(place.fault("not a tool number", found=key, wanted=wanted))
                continue
            tool = self._tool(int(key), raw, place)
            if tool is not None:
                tools[tool.number] = tool
        return tools

    def _tool(self, number: int, raw: object, place: Place) -> Tool | None:
        written = self.shop.take("tools", raw, place, self.faults)
        row = read_tool(written.raw, written.place, self.faults) if written else None
        if written is None or row is None:
            return None
        return tool_of(number, row, written.name, written.place, self._noted(f"tools.{number}"), self.faults)

    def _limits(self) -> dict[str, LimitValue]:
        entries = self.toml.content.get("limits", {})
        if not isinstance(entries, dict):
            self.faults.append(self.top.fault("not a table", "limits", found=shown(entries), wanted="a table [limits]"))
            return {}
        table = self._place("limits")
        strays = [key for key in entries if is_stray(key, table)]
        self.faults.extend(explain_stray(key, entries[key], table) for key in strays)
        named = {key: value for key, value in entries.items() if key not in strays}
        limits = {key: self._limit(value, self._place(f"limits.{key}")) for key, value in named.items()}
        return {key: limit for key, limit in limits.items() if limit is not None}

    def _limit(self, value: object, place: Place) -> LimitValue | None:
        wanted = 'a number, or a quantity like "0.02 mm"'
        if isinstance(value, int | float) and not isinstance(value, bool):
            if 0 <= value < _LARGEST_LIMIT:
                return LimitValue(float(value), "number", shown(value))
            self.faults.append(place.fault("out of bounds", found=shown(value), wanted="a number not below zero"))
            return None
        try:
            found = units.measure(value, wanted)
        except units.QuantityError as error:
            self.faults.append(place.fault(error.message, found=shown(value), wanted=error.wanted))
            return None
        if found.value < 0 or found.dimension not in _LIMIT_DIMENSIONS:
            message = "a negative value" if found.value < 0 else f"no limit is {units.with_article(found.dimension)}"
            self.faults.append(place.fault(message, found=shown(value), wanted=wanted))
            return None
        return LimitValue(found.value, found.dimension, str(value))

    def _model(self, unattended: bool) -> Model:
        row: tables.ModelTable | None = None
        if "model" in self.toml.content:
            row = read_table(tables.ModelTable, self.toml.content["model"], self._place("model"), self.faults)
        return model_of(row, unattended, self._noted("model"))

    def _accepted(self) -> tuple[Acceptance, ...]:
        entries = self.toml.content.get("accepted", [])
        if not isinstance(entries, list):
            found = shown(entries)
            self.faults.append(self.top.fault("one table too few", "accepted", found=found, wanted="[[accepted]]"))
            return ()
        rows = [
            read_table(tables.AcceptedTable, raw, self._place(f"accepted.{index}"), self.faults)
            for index, raw in enumerate(entries, start=1)
        ]
        return tuple(Acceptance(row.check, row.reason, row.line, row.tool, row.until) for row in rows if row)


def _left_open(fault: Fault) -> Fault:
    """A "?" that a draft left is no wrong value: nobody has decided it yet."""
    if fault.found is None or not fault.found.startswith('"?"'):
        return fault
    wanted = fault.wanted
    if wanted is not None and fault.found != '"?"':  # a code: its first letter alone is no help
        outright = wanted.partition("; or declared outright")
        wanted = "its code" + "".join(outright[1:])
    return replace(fault, message="still to be decided", found=None, wanted=wanted)
