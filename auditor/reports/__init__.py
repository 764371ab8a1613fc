"""One file a format: an audit in, text out. Formats are found by walking this folder.

A report is a module (or folder) of this package whose name is the format's name. It offers two functions:

``render(outcome, view) -> str``
    one program's part, from an ``Audit`` or an ``Unreadable``;
``join(parts, several) -> str``
    the document made of those parts; ``several`` is false when a single program was asked for.

The parts are plain text, so that a worker process can send them home cheaply. Names that start with an
underscore are helpers of the reports and no formats.
"""

from __future__ import annotations

import pkgutil
from collections.abc import Sequence
from dataclasses import dataclass
from importlib import import_module
from typing import Protocol, cast

from auditor.errors import Fault
from auditor.findings import Audit

__all__ = ["Outcome", "Report", "Unreadable", "View", "formats", "report"]


@dataclass(frozen=True, slots=True)
class Unreadable:
    """A program or job that could not be audited at all, and every reason known."""

    path: str
    faults: tuple[Fault, ...]


@dataclass(frozen=True, slots=True)
class View:
    """How much of an audit is wanted, and what the reader's screen can show."""

    width: int = 80
    plain: bool = False  # letters and signs of ASCII only
    colour: bool = False
    brief: bool = False  # the verdict alone
    series: bool = False  # with the curves along every cut
    failing: frozenset[str] = frozenset({"stop"})  # levels that make the run fail


Outcome = Audit | Unreadable


class Report(Protocol):
    """What a module of this folder offers."""

    def render(self, outcome: Outcome, view: View) -> str:
        """One program's part."""

    def join(self, parts: Sequence[str], several: bool) -> str:
        """The document made of the parts."""


def formats() -> tuple[str, ...]:
    """Names of the formats there are, without importing any of them.

    >>> {"json", "screen"} <= set(formats())
    True
    """
    found = (module.name for module in pkgutil.iter_modules(__path__))
    return tuple(sorted(name for name in found if not name.startswith("_")))


def report(name: str) -> Report:
    """The report of that name, imported now."""
    return cast(Report, import_module(f"{__name__}.{name}"))
