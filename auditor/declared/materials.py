"""The material catalogue: one TOML file a material, every figure with its source.

Adding a material means adding a file to ``catalogue/``, named after the material in lower case.
A file is opened only when its material is asked for, so that a check starts quickly; the whole
folder is read for lists, suggestions and the test that no two materials share a name.
"""

from __future__ import annotations

import re
from functools import lru_cache
from pathlib import Path

from auditor.declared.material_files import GROUPS, Entry, key_of, letters_of, read_entry
from auditor.declared.model import Material
from auditor.errors import DeclarationError, Fault

CATALOGUE = Path(__file__).with_name("catalogue")


def find(name: str) -> Material | None:
    """Look a material up by name or other name; case, blanks and punctuation do not matter.

    >>> find("ck 45").name
    'C45'
    >>> find("unobtainium") is None
    True
    """
    found = entry(name)
    return found.material if found else None


def entry(name: str) -> Entry | None:
    """Look an entry up with all its sources; None where the catalogue has no such name.

    Raises
    ------
    DeclarationError
        The material's file is faulty, or two files claim the name.
    """
    wanted = key_of(name)
    if not wanted:
        return None
    for path in _paths(CATALOGUE):
        if key_of(path.stem) == wanted:
            return read_entry(path)
    return _by_other_name(wanted)


def names() -> tuple[str, ...]:
    """Every material's name, by group and then alphabetically."""
    return tuple(item.material.name for item in entries())


def nearest(name: str) -> tuple[str, ...]:
    """Up to five catalogue names that ``name`` may have meant, the likeliest first.

    >>> nearest("42CrMo5")[0]
    '42CrMo4'
    """
    from difflib import get_close_matches  # only after a slip of the pen

    wanted = key_of(name)
    owners = {key: item.material.name for item in entries() for key in _keys(item)}
    numbers = set(re.findall(r"\d{3,}", name))  # "brand name 718" means Alloy 718
    alike = [owner for key, owner in owners.items() if numbers & set(re.findall(r"\d{3,}", key))]
    alike += [owners[key] for key in get_close_matches(wanted, owners, n=8, cutoff=0.6)]
    alike += [owner for key, owner in owners.items() if len(wanted) > 2 and wanted in key]
    return tuple(dict.fromkeys(alike))[:5]


@lru_cache(maxsize=1)
def entries() -> tuple[Entry, ...]:
    """The whole catalogue, by group and then alphabetically."""
    return read_catalogue(CATALOGUE)


def read_catalogue(folder: Path) -> tuple[Entry, ...]:
    """Read every file of a catalogue folder.

    Raises
    ------
    DeclarationError
        With every faulty file and every name that two materials claim.
    """
    faults: list[Fault] = []
    found: list[Entry] = []
    owners: dict[str, str] = {}
    for path in _paths(folder):
        try:
            item = read_entry(path)
        except DeclarationError as error:
            faults += error.faults
            continue
        found.append(item)
        for key in _keys(item):
            if key in owners:
                message = f"the name {key!r} belongs to {owners[key]} already"
                faults.append(Fault(message, file=path.name, wanted="a name of its own for every material"))
            owners[key] = path.name
    if faults:
        raise DeclarationError(*faults)
    return tuple(sorted(found, key=lambda item: (GROUPS.index(item.material.group), item.material.name.casefold())))


def _keys(item: Entry) -> set[str]:
    return {key_of(name) for name in (item.material.name, *item.aliases)}


def _paths(folder: Path) -> list[Path]:
    return sorted(folder.glob("*.toml"))


def _by_other_name(wanted: str) -> Entry | None:
    """The owner of an alias. Only files whose letters hold the alias at all are parsed."""
    owners = [
        item
        for path in _paths(CATALOGUE)
        if wanted in letters_of(path.read_text(encoding="utf-8"))
        for item in [read_entry(path)]
        if wanted in _keys(item)
    ]
    if len(owners) > 1:
        claimed = " and ".join(item.material.name for item in owners)
        raise DeclarationError(Fault(f"the name {wanted!r} is claimed by {claimed}", wanted="one owner"))
    return owners[0] if owners else None
