"""From a program to the drafted job file, and back from the file to what it leaves open."""

from __future__ import annotations

import os
import tomllib
from collections.abc import Iterator, Mapping
from pathlib import Path

from auditor.declared.job_reader import JobReader
from auditor.declared.model import ToolKind
from auditor.declared.shops import SHOP_FILE, Shop, find_shop
from auditor.declared.toml_text import TomlFile, key_lines
from auditor.draft.deeds import Deeds, all_deeds
from auditor.draft.guesses import Guess, text_value
from auditor.draft.reading import Reading, read
from auditor.draft.sheet import Draft, Entry, Section
from auditor.draft.tool_tables import named_in_shop, tool_section
from auditor.draft.tool_words import ToolSaid, tool_said
from auditor.draft.work import known_of_work
from auditor.draft.work_tables import (
    control_section,
    machine_section,
    named_entry,
    workholding_section,
    workpiece_section,
)
from auditor.draft.work_words import is_about_work
from auditor.errors import DeclarationError, Fault, ProgramError

TRIES = 3  # faults that only show once others are gone


def draft_job(program: str | Path, job_path: str | Path, kinds: Mapping[int, ToolKind] | None = None) -> Draft:
    """The job file that could stand at ``job_path`` for a program, with all that the program says filled in.

    ``kinds`` are kinds of tools by number that a person has decided.

    Raises
    ------
    ProgramError
        The program cannot be read, or nothing in it is understood as motion.
    DeclarationError
        The nearest shop file cannot be read.
    """
    job = Path(job_path)
    reading = read(Path(program))
    if not reading.path.moves:
        fault = Fault("nothing in this file is understood as motion", file=str(program), wanted="a turning program")
        raise ProgramError(fault)
    shop = _ShopNames(job)
    deeds = all_deeds(reading.path)
    known = known_of_work(reading, deeds)
    head, sections = _surroundings(reading, known, shop)
    first = Entry("program", text_value(_beside(Path(program), job)), "", "said")
    batch = Entry.optional("batch", None, "50", "parts in the run: with it edge life is judged")
    alone = Entry.optional("unattended", None, "false", "true: nobody watches, worn edges are reckoned with")
    draft = Draft(
        program=Path(program).name,
        lines_read=len(reading.text.lines),
        sections=(Section("", (first, batch, alone, *head)), control_section(reading), *sections,
                  workpiece_section(reading, known, shop.names("materials")),
                  *_tools(reading, deeds, shop, kinds or {})),
    )  # fmt: skip
    return _without_impossible(draft, program, job)


def _without_impossible(draft: Draft, program: str | Path, job: Path) -> Draft:
    """The draft without what the reader of job files would refuse: sizes in comments need not fit together."""
    for _ in range(TRIES):
        faults = {
            path: fault.message
            for fault in open_faults(draft.text(), program, job)
            if fault.key not in draft.open
            for path in _in_doubt(draft, fault.key or "")
        }
        if not faults:
            break
        draft = draft.taken_back(faults)
    return draft


def _in_doubt(draft: Draft, key: str) -> list[str]:
    """The values that a fault at a key may stem from: that key, its table's optional ones, or all of the table."""
    said = {path: entry for path, entry in draft.entries() if entry.state == "said"}
    if key in said:
        return [key]
    table = key if any(path.startswith(f"{key}.") for path in said) else key.rpartition(".")[0]
    others = [path for path in said if path.startswith(f"{table}.") and not path.endswith(".kind")]
    return [path for path in others if said[path].usual] or others


def open_faults(text: str, program: str | Path, job_path: str | Path) -> tuple[Fault, ...]:
    """What a job file with this text would be refused for."""
    toml = TomlFile(str(job_path), tomllib.loads(text), "", key_lines(text))
    try:
        JobReader(toml).job(str(job_path), Path(program))
    except DeclarationError as problem:
        return problem.faults
    return ()


def _beside(program: Path, job: Path) -> str:
    """The program as the job file names it: from its own folder, with slashes on every system."""
    try:
        found = os.path.relpath(program.absolute(), job.absolute().parent)
    except ValueError:  # another drive
        found = str(program.absolute())
    return found.replace("\\", "/")


class _ShopNames:
    """What the nearest shop file offers."""

    def __init__(self, job: Path) -> None:
        self._shop = Shop(job)
        found = find_shop(job.absolute().parent)
        self.where = _beside(found, job) if found else SHOP_FILE  # it may stand folders above, and be another shop's

    def names(self, section: str) -> tuple[str, ...]:
        """The names of a section; none where there is no shop file."""
        faults: list[Fault] = []
        found = self._shop.names(section, faults)
        if faults:
            raise DeclarationError(*faults)
        return found

    def value(self, section: str, name: str, key: str) -> str | None:
        """One value of an entry, as TOML text."""
        written = self._shop.find(section, name, [])
        raw = written.raw if written is not None else None
        found = raw.get(key) if isinstance(raw, dict) else None
        return text_value(found) if isinstance(found, str) else None

    def tools(self) -> dict[str, str]:
        """The shop's tools with their kinds."""
        return {name: (self.value("tools", name, "kind") or "").strip('"') for name in self.names("tools")}


def _surroundings(
    reading: Reading, known: Mapping[str, Guess], shop: _ShopNames
) -> tuple[list[Entry], list[Section]]:
    """Machine and chuck: names of the shop file at the head, or tables to fill in."""
    head: list[Entry] = []
    sections: list[Section] = []
    machine = named_entry("machine", shop.names("machines"), shop.where)
    if machine is None:
        sections.append(machine_section(reading))
    else:
        head.append(machine)
    chucks = shop.names("workholdings")
    stick_out = known.get("workholding.stick_out")
    wanted = stick_out.value if stick_out else None
    fitting = [name for name in chucks if wanted and shop.value("workholdings", name, "stick_out") == wanted]
    chuck = named_entry("workholding", fitting if len(fitting) == 1 else chucks, shop.where)
    if chuck is None or (stick_out and not fitting):  # a chuck of the shop with another stick-out is another set-up
        sections.append(workholding_section(reading, known))
    else:
        head.append(chuck)
    return head, sections


def _tools(
    reading: Reading, deeds: tuple[Deeds, ...], shop: _ShopNames, kinds: Mapping[int, ToolKind]
) -> Iterator[Section]:
    """The tools of the shop file by name, then a table a tool."""
    library = shop.tools()
    by_name: list[Entry] = []
    tables: list[Section] = []
    for deed in sorted(deeds, key=lambda one: one.tool):
        about = (saying for saying in reading.said if saying.tool == deed.tool and not is_about_work(saying))
        said: ToolSaid = tool_said(about, reading.unit)
        name = named_in_shop(said, library)
        if name is not None:
            by_name.append(Entry.of(str(deed.tool), name, ""))
        else:
            tables.append(tool_section(deed, said, library, reading.unit, kinds.get(deed.tool)))
    if by_name:
        yield Section("tools", tuple(by_name))
    yield from tables
