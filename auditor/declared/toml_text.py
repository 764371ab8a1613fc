"""Reads TOML files the way shops save them, and knows on which line each key stands."""

from __future__ import annotations

import hashlib
import re
import tomllib
from collections.abc import Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

from auditor.errors import DeclarationError, Fault

_PART = r"""(?:[A-Za-z0-9_-]+|"[^"\n]*"|'[^'\n]*')"""
_DOTTED = rf"{_PART}(?:\s*\.\s*{_PART})*"
_HEADER = re.compile(rf"\s*\[\[?\s*({_DOTTED})\s*\]\]?\s*(?:#.*)?$")
_KEY = re.compile(rf"\s*({_DOTTED})\s*=")
_DEEPEST = 5  # tables inside tables that a job or shop file can have
_PLACE_IN_MESSAGE = re.compile(r" \(at line (\d+), column \d+\)")


@dataclass(frozen=True, slots=True)
class TomlFile:
    """A TOML file as read: its content, where it is, and the line of each key path."""

    path: str
    content: Mapping[str, Any]
    sha256: str
    lines: Mapping[str, int] = field(default_factory=dict)


def read_toml(path: Path) -> TomlFile:
    """Read a TOML file.

    Raises
    ------
    DeclarationError
        No such file, not UTF-8, not TOML: with the line where it is known.
    """
    try:
        data = path.read_bytes()
    except FileNotFoundError:
        raise DeclarationError(Fault("no such file", file=str(path))) from None
    except OSError as error:
        raise DeclarationError(Fault(f"cannot be read ({error.strerror or error})", file=str(path))) from None
    text = _decoded(data, path)
    try:
        content = tomllib.loads(text)
    except ValueError as error:  # TOMLDecodeError, and what a number of thousands of digits raises
        raise DeclarationError(_syntax_fault(str(error), path, text)) from None
    except RecursionError:
        raise DeclarationError(Fault("nested too deeply", file=str(path))) from None
    return TomlFile(str(path), content, hashlib.sha256(data).hexdigest(), key_lines(text))


def key_lines(text: str) -> dict[str, int]:
    """The line on which each key path first stands; approximate inside strings that span lines.

    Example
    -------
    >>> key_lines('batch = 2\\n[tools.1]\\nkind = "turning"\\n')
    {'batch': 1, 'tools': 2, 'tools.1': 2, 'tools.1.kind': 3}
    """
    lines: dict[str, int] = {}
    prefix = ""
    for number, line in enumerate(text.splitlines(), start=1):
        header = _HEADER.match(line)
        key = None if header else _KEY.match(line)
        if header:
            prefix = _joined(header[1])
            parts = prefix.split(".")
            for depth in range(1, min(len(parts), _DEEPEST) + 1):
                lines.setdefault(".".join(parts[:depth]), number)
        elif key:
            name = _joined(key[1])
            lines.setdefault(f"{prefix}.{name}" if prefix else name, number)
    return lines


def _joined(dotted: str) -> str:
    return ".".join(part.strip("\"'") for part in re.findall(_PART, dotted))


def _decoded(data: bytes, path: Path) -> str:
    if data.startswith((b"\xff\xfe", b"\xfe\xff")):
        raise DeclarationError(
            Fault("the file is UTF-16", file=str(path), line=1, wanted="the file saved as UTF-8")
        )
    try:
        return data.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = data.count(b"\n", 0, error.start) + 1
        guess = data[error.start : error.start + 1].decode("latin-1")
        raise DeclarationError(
            Fault(
                "the file is not UTF-8",
                file=str(path),
                line=line,
                found=f"byte 0x{data[error.start]:02X}, {guess!r} in Latin-1",
                wanted="the file saved as UTF-8",
            )
        ) from None


def _syntax_fault(message: str, path: Path, text: str) -> Fault:
    place = _PLACE_IN_MESSAGE.search(message)
    line = int(place[1]) if place else text.rstrip().count("\n") + 1
    lines = text.splitlines()
    found = lines[line - 1].strip()[:60] if 0 < line <= len(lines) else None
    what = _PLACE_IN_MESSAGE.sub("", message).replace(" (at end of document)", "")
    return Fault(f"not TOML: {what[:1].lower()}{what[1:]}", file=str(path), line=line, found=found or None)
