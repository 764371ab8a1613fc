"""Where a tool's value comes from: written outright, else said by a code, else the usual one."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Any, TypeVar

from auditor.declared.faults import Place
from auditor.declared.iso_holders import Holder, decode_holder
from auditor.declared.iso_inserts import CLEARANCE_ANGLE, INCLUDED_ANGLE, CodeError, Insert, decode_insert
from auditor.declared.notes import Notes
from auditor.declared.tool_tables import AnyTool, CornerTool, InsertTool, SlotTool
from auditor.declared.units import show
from auditor.errors import Fault

Word = TypeVar("Word", bound=str)

_CODES = {"nose_radius": "an insert code", "included_angle": "an insert code", "cutting_edge_angle": "a holder code"}
_HOLDER_KINDS = {"bar": "a boring bar", "external": "an outside holder"}
_SHANKS = (("shank_height", "shank_width"), ("bar_diameter",))


@dataclass(frozen=True, slots=True)
class Codes:
    """What a tool's codes say; None: no code, or one that every declared value makes needless."""

    insert: Insert | None = None
    holder: Holder | None = None

    @property
    def insert_name(self) -> str:
        """The insert code as written."""
        return self.insert.code if self.insert else ""

    @property
    def holder_name(self) -> str:
        """The holder code as written."""
        return self.holder.code if self.holder else ""

    def of_holder(self, name: str) -> tuple[Any, str]:
        """A value of the holder code, and the code as written."""
        return getattr(self.holder, name, None), self.holder_name

    def of_insert(self, name: str) -> tuple[Any, str]:
        """A value of the insert code, and the code as written."""
        return getattr(self.insert, name, None), self.insert_name

    @property
    def included_angle(self) -> tuple[float | None, str]:
        """Included angle by the insert's shape letter, or the one the holder is made for."""
        if self.insert:
            return self.insert.included_angle, self.insert_name
        return (INCLUDED_ANGLE[self.holder.insert_shape], self.holder_name) if self.holder else (None, "")

    @property
    def clearance_angle(self) -> tuple[float | None, str]:
        """Clearance by the insert's letter, or the one the holder is made for."""
        if self.insert:
            return self.insert.clearance_angle, self.insert_name
        return (CLEARANCE_ANGLE[self.holder.clearance], self.holder_name) if self.holder else (None, "")


@dataclass(slots=True)
class Sources:
    """Looks values up for one tool, noting what was assumed and what is missing."""

    table: AnyTool
    place: Place
    notes: Notes
    faults: list[Fault] = field(default_factory=list)
    excused: set[str] = field(default_factory=set)  # missing only because a code is not understood

    def number(
        self, key: str, said: tuple[float | None, str], unit: str, usual: float | None = None, why: str = ""
    ) -> float:
        """Declared, else said by a code, else usual; without any of them the tool lacks it."""
        declared: float | None = getattr(self.table, key)
        by_code, code = said
        if declared is not None:
            if by_code is not None and abs(declared - by_code) > 1e-6:
                self._note_contradiction(key, show(declared, unit), code, show(by_code, unit))
            return declared
        if by_code is not None:
            return by_code
        if usual is not None:
            return self.notes.number(key, None, usual, unit, why)
        self.missing(key)
        return 0.0

    def optional(self, key: str, said: tuple[float | None, str], unit: str) -> float | None:
        """Declared, else said by a code, else left open."""
        if getattr(self.table, key) is None and said[0] is None:
            return None
        return self.number(key, said, unit)

    def word(self, key: str, said: tuple[Word | None, str], usual: Word, why: str) -> Word:
        """The same for a word."""
        declared: Word | None = getattr(self.table, key)
        by_code, code = said
        if declared is not None:
            if by_code is not None and declared != by_code:
                self._note_contradiction(key, declared, code, by_code)
            return declared
        return by_code if by_code is not None else self.notes.other(key, None, usual, why)

    def missing(self, key: str) -> None:
        """A value this kind of tool cannot do without."""
        if key in self.excused:
            return
        wanted = f"{key}, or {_CODES[key]}" if key in _CODES else key
        self.faults.append(self.place.fault("a required value is missing", key, wanted=wanted))

    def codes(self) -> Codes:
        """Read the codes; one that is not understood is a fault unless all it would say is declared."""
        if not isinstance(self.table, InsertTool):
            return Codes()
        codes = Codes(self._insert(self.table), self._holder(self.table))
        self._note_misfit(codes)
        for code in (codes.insert, codes.holder):
            for remark in code.notes if code else ():
                self.notes.add("insert" if code is codes.insert else "holder", code.code if code else "", remark)
        return codes

    def _insert(self, table: InsertTool) -> Insert | None:
        if table.insert is None:
            return None
        try:
            return decode_insert(table.insert)
        except CodeError as error:
            self._not_understood("insert", table.insert, error, self._lacking(*_said_by_insert(table)))
            return None

    def _holder(self, table: InsertTool) -> Holder | None:
        if table.holder is None:
            return None
        try:
            return decode_holder(table.holder)
        except CodeError as error:
            shank = next((keys for keys in _SHANKS if not self._lacking(*keys)), _SHANKS[0])
            needed = ("hand", *shank) if isinstance(table, SlotTool) else ("cutting_edge_angle", "hand", *shank)
            self._not_understood("holder", table.holder, error, self._lacking(*needed))
            return None

    def _lacking(self, *keys: str) -> list[str]:
        return [key for key in keys if getattr(self.table, key) is None]

    def _not_understood(self, key: str, code: str, error: CodeError, lacking: list[str]) -> None:
        if not lacking:
            self.notes.add(key, code, "this code is not understood; every value it would give is declared")
            return
        self.excused.update(lacking)
        self.faults.append(
            self.place.fault(
                f"this {key} code is not understood at {error.position}",
                key,
                found=f'"{code}", there {error.found or "nothing"}',
                wanted=f"{error.wanted}; or declared outright: {', '.join(lacking)}",
            )
        )

    def _note_contradiction(self, key: str, declared: str, code: str, by_code: str) -> None:
        """Listed under the code, for the declared value itself is no assumption."""
        room = "insert" if code == getattr(self.table, "insert", None) else "holder"
        self.notes.add(room, code, f"says {key} {by_code}; the declared {declared} is used")

    def _note_misfit(self, codes: Codes) -> None:
        """An insert or a kind of work that the holder is not made for; the insert's own figures are used."""
        insert, holder = codes.insert, codes.holder
        kind = getattr(self.table, "kind", "")
        if holder is not None and (holder.kind, kind) in (("bar", "turning"), ("external", "boring")):
            self.notes.add("holder", holder.code, f"{_HOLDER_KINDS[holder.kind]} on a {kind} tool")
        if insert is None or holder is None:
            return
        if insert.shape != holder.insert_shape:
            self.notes.add("holder", holder.code, f"made for shape {holder.insert_shape}, the insert is {insert.shape}")
        if insert.clearance_angle != holder.clearance_angle:
            self.notes.add("holder", holder.code, f"made for clearance {holder.clearance}, the insert has another")


def _said_by_insert(table: InsertTool) -> tuple[str, ...]:
    if isinstance(table, SlotTool):
        return ("width", "nose_radius")
    if isinstance(table, CornerTool) and getattr(table, "kind", "") == "threading":
        return ("included_angle", "nose_radius")
    return ("nose_radius", "included_angle", "clearance_angle")
