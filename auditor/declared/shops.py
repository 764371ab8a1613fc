"""The shop file: the nearest one up the folder tree, and its entries where a job names them."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from pathlib import Path

from auditor.declared.faults import Place, explain_strays, nearest, read_table, shown
from auditor.declared.fields import Table
from auditor.declared.tables import ControlTable, MachineTable, MaterialTable, WorkholdingTable
from auditor.declared.toml_text import read_toml
from auditor.declared.tool_tables import KINDS, CuttingTool
from auditor.errors import DeclarationError, Fault

SHOP_FILE = "shop.toml"
SECTIONS: dict[str, type[Table]] = {
    "machines": MachineTable,
    "workholdings": WorkholdingTable,
    "materials": MaterialTable,
    "controls": ControlTable,
}


@dataclass(frozen=True, slots=True)
class Written:
    """A table as written, where that was, and its name if it came from the shop file."""

    raw: object
    place: Place
    name: str | None = None


class Shop:
    """What a job may call by name; read when the first name is looked up."""

    def __init__(self, job_path: Path) -> None:
        self._folder = job_path.absolute().parent
        self._content: Mapping[str, object] | None = None
        self._place = Place(SHOP_FILE, "", {})

    def take(self, section: str, raw: object, place: Place, faults: list[Fault]) -> Written | None:
        """The table itself, or the shop entry whose name stands in its place."""
        if not isinstance(raw, str):
            return Written(raw, place)
        found = self.find(section, raw, faults)
        if found is None:
            faults.append(self._not_there(section, raw, place))
        return found

    def find(self, section: str, name: str, faults: list[Fault]) -> Written | None:
        """A shop entry by name."""
        entries = self._section(section, faults)
        if name not in entries:
            return None
        place = Place(self._place.file, f"{section}.{name}", self._place.lines)
        return Written(entries[name], place, name)

    def names(self, section: str, faults: list[Fault]) -> tuple[str, ...]:
        """The names of a section."""
        return tuple(self._section(section, faults))

    def _not_there(self, section: str, name: str, place: Place) -> Fault:
        if self._content == {}:
            return place.fault(
                f"a name stands here, but no {SHOP_FILE} was found in this folder or above",
                found=f'"{name}"',
                wanted=f"a table, or a {SHOP_FILE} with [{section}.{name}]",
            )
        known = self.names(section, [])
        close = nearest(name, known)
        wanted = f'"{close}"' if close else ", ".join(f'"{entry}"' for entry in known) or f"an entry [{section}.{name}]"
        return place.fault(f"no such entry in [{section}] of {self._place.file}", found=f'"{name}"', wanted=wanted)

    def _section(self, section: str, faults: list[Fault]) -> Mapping[str, object]:
        if self._content is None:
            self._content = self._read(faults)
        entries = self._content.get(section)
        return entries if isinstance(entries, dict) else {}

    def _read(self, faults: list[Fault]) -> Mapping[str, object]:
        path = find_shop(self._folder)
        if path is None:
            return {}
        try:
            toml = read_toml(path)
        except DeclarationError as error:
            faults.extend(error.faults)
            return {}
        self._place = Place(toml.path, "", toml.lines)
        check_shop(toml.content, self._place, faults)
        return toml.content


def find_shop(folder: Path) -> Path | None:
    """The shop file of this folder or of the nearest folder above that has one."""
    places = (place / SHOP_FILE for place in (folder, *folder.parents))
    return next((path for path in places if path.is_file()), None)


def check_shop(content: Mapping[str, object], place: Place, faults: list[Fault]) -> None:
    """Validate every entry of a shop file, used or not."""
    for section, entries in content.items():
        if section != "tools" and section not in SECTIONS:
            close = nearest(section, (*SECTIONS, "tools"))
            wanted = close or ", ".join((*SECTIONS, "tools"))
            faults.append(place.fault("unknown key", section, found=section, wanted=wanted))
        elif not isinstance(entries, dict):
            faults.append(place.fault("not a table", section, found=shown(entries), wanted=f"tables [{section}.NAME]"))
        else:
            for name, raw in entries.items():
                entry = Place(place.file, place.key(section, name), place.lines)
                if section == "tools":
                    read_tool(raw, entry, faults)
                else:
                    read_table(SECTIONS[section], raw, entry, faults)


def read_tool(raw: object, place: Place, faults: list[Fault]) -> CuttingTool | None:
    """A tool table, read by the model of its kind."""
    if not isinstance(raw, dict):
        faults.append(place.fault("not a table", found=shown(raw), wanted=f"a table [{place.prefix}]"))
        return None
    kind = raw.get("kind")
    model = KINDS.get(kind) if isinstance(kind, str) else None
    if model is None:
        wanted = " or ".join(f'"{word}"' for word in KINDS)
        message = "not one of the kinds of tool" if "kind" in raw else "a required key is missing"
        found = shown(kind) if "kind" in raw else None
        faults.append(place.fault(message, "kind", found=found, wanted=wanted))
        explain_strays(raw, place, faults)
        return None
    return read_table(model, raw, place, faults)  # type: ignore[return-value]
