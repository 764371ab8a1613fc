"""Turns what pydantic says about a table into faults a setter can act on."""

from __future__ import annotations

import difflib
import typing
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any, TypeVar

from pydantic import BaseModel, ValidationError
from pydantic_core import ErrorDetails

from auditor.declared import tables
from auditor.declared.tool_tables import KINDS
from auditor.errors import Fault

Row = TypeVar("Row", bound=BaseModel)

TOP_KEYS = ("program", "batch", "unattended", "machine", "control", "workholding")
_OWNERS: dict[str, type[BaseModel]] = {
    "control": tables.ControlTable,
    "machine": tables.MachineTable,
    "workholding": tables.WorkholdingTable,
    "workpiece": tables.WorkpieceTable,
    "model": tables.ModelTable,
    "accepted": tables.AcceptedTable,
}
_WANTED = {
    "missing": "this key",
    "bool_type": "true or false",
    "int_type": "a whole number",
    "float_type": "a number",
    "finite_number": "a finite number",
    "string_type": "a text in quotes",
    "string_too_short": "a text that is not empty",
    "string_pattern_mismatch": "a text that is not empty",
    "list_type": "a list in square brackets",
    "too_short": "more entries",
    "model_type": "a table",
    "date_type": "a date like 2027-06-30, without quotes",
}


@dataclass(frozen=True, slots=True)
class Place:
    """Where a table was written: in the job file, or in the shop file it was taken from."""

    file: str
    prefix: str  # key path of the table, "" for the top
    lines: Mapping[str, int]

    def key(self, *parts: str | int) -> str:
        """The full key path."""
        return ".".join(str(part) for part in (self.prefix, *parts) if part != "")

    def fault(
        self, message: str, *parts: str | int, found: str | None = None, wanted: str | None = None
    ) -> Fault:
        """A fault at a key of this table, on the nearest line that is known."""
        key = self.key(*parts)
        at, line = key, self.lines.get(key)
        while line is None and "." in at:
            at = at.rpartition(".")[0]
            line = self.lines.get(at)
        return Fault(message, file=self.file, line=line, key=key or None, found=found, wanted=wanted)


def read_table(model: type[Row], raw: object, place: Place, faults: list[Fault]) -> Row | None:
    """Validate one table; what is wrong goes to ``faults`` and nothing comes back."""
    if not isinstance(raw, dict):
        faults.append(place.fault("not a table", found=shown(raw), wanted=f"a table [{place.prefix}]"))
        return None
    try:
        return model.model_validate(raw)
    except ValidationError as error:
        faults.extend(_fault(detail, model, place) for detail in error.errors(include_url=False))
        return None


def shown(value: object) -> str:
    """A value as it stands in the file, shortened."""
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, dict):
        return "a table"
    if isinstance(value, str):
        return f'"{value}"' if len(value) <= 60 else f'"{value[:57]}…"'
    text = str(value)
    return text if len(text) <= 60 else text[:57] + "…"


def nearest(name: str, known: typing.Iterable[str]) -> str | None:
    """The known name that looks most like this one."""
    by_lower = {word.lower(): word for word in known}
    matches = difflib.get_close_matches(name.lower(), by_lower, n=1, cutoff=0.6)
    return by_lower[matches[0]] if matches else None


def is_stray(key: str, place: Place) -> bool:
    """Whether a key that belongs above the first header stands in a table."""
    return key in TOP_KEYS and bool(place.prefix)


def explain_stray(key: str, value: object, place: Place) -> Fault:
    """TOML gives every key to the header above it; say so."""
    return place.fault(
        f"{key} stands after the header [{place.prefix}] and so belongs to that table",
        key,
        found=shown(value),
        wanted=f"{key} above the first header of the file",
    )


def explain_unknown(key: str, value: object, model: type[BaseModel], place: Place) -> Fault:
    """Say why a key is not known where it stands, and where it may belong."""
    if is_stray(key, place):
        return explain_stray(key, value, place)
    kinds = [kind for kind, other in KINDS.items() if key in other.model_fields]
    own_kind = next((kind for kind, other in KINDS.items() if other is model), None)
    if own_kind is not None and kinds:
        message = f"a {own_kind} tool has no use for this key" if own_kind != "stop" else "a bar stop cuts nothing"
        return place.fault(message, key, found=shown(value), wanted=f"only with kind {_either(kinds)}")
    close = nearest(key, model.model_fields)
    if close is not None and isinstance(value, dict):
        return place.fault("unknown table", key, found=f"[{key}]", wanted=f"[{close}]")
    owners = [f"[{name}]" for name, other in _OWNERS.items() if key in other.model_fields]
    if kinds:
        owners.append("[tools.N]")
    if owners:
        return place.fault("unknown key here", key, found=key, wanted=f"{key} in {' or '.join(owners)}")
    if close is not None:
        return place.fault("unknown key", key, found=key, wanted=close)
    return place.fault("unknown key", key, found=key, wanted="one of " + ", ".join(sorted(model.model_fields)))


def explain_strays(raw: Mapping[str, object], place: Place, faults: list[Fault]) -> None:
    """In a tool table whose kind is not known: the keys that no kind of tool has."""
    known = {key for model in KINDS.values() for key in model.model_fields}
    widest = KINDS["turning"]
    faults.extend(explain_unknown(key, value, widest, place) for key, value in raw.items() if key not in known)


def _either(words: list[str]) -> str:
    return " or ".join(f'"{word}"' for word in words)


def _fault(detail: ErrorDetails, model: type[BaseModel], place: Place) -> Fault:
    parts = detail["loc"]
    kind = detail["type"]
    context = detail.get("ctx") or {}
    if kind == "extra_forbidden":
        table, deep = _model_at(model, parts[:-1]), Place(place.file, place.key(*parts[:-1]), place.lines)
        return explain_unknown(str(parts[-1]), detail["input"], table, deep)
    if kind == "missing":
        return place.fault("a required key is missing", *parts, wanted=str(parts[-1]))
    found = None if isinstance(detail["input"], dict) and kind != "model_type" else shown(detail["input"])
    if kind == "declared":
        return place.fault(detail["msg"], *parts, found=found, wanted=str(context["wanted"]))
    if kind == "literal_error":
        return place.fault("not one of the words known here", *parts, found=found, wanted=_words(context))
    if kind in _WANTED:
        return place.fault("not the right kind of value", *parts, found=found, wanted=_WANTED[kind])
    return place.fault("out of bounds", *parts, found=found, wanted=_bounds(context, detail["msg"]))


def _words(context: Mapping[str, Any]) -> str:
    return str(context["expected"]).replace("'", '"')


def _bounds(context: Mapping[str, Any], otherwise: str) -> str:
    words = {"gt": "above", "ge": "at least", "lt": "below", "le": "at most"}
    told = [f"{word} {context[name]:g}" for name, word in words.items() if name in context]
    return "a number " + " and ".join(told) if told else otherwise


def _model_at(model: type[BaseModel], parts: tuple[int | str, ...]) -> type[BaseModel]:
    """The model of the inner table that a path leads to."""
    for part in parts:
        annotation = model.model_fields[str(part)].annotation
        model = next(
            member
            for member in (annotation, *typing.get_args(annotation))
            if isinstance(member, type) and issubclass(member, BaseModel)
        )
    return model
