"""What stops an audit altogether. Faults *of the program* are findings, not exceptions.

    TurnauditError
    ├── UsageError           a path, option or output file that cannot be used
    ├── DeclarationError     job file, shop file, material, insert or holder code
    └── ProgramError         a program that cannot be read at all
"""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Fault:
    """One thing that is wrong in a file: where, what was found, what is wanted."""

    message: str
    file: str | None = None
    line: int | None = None
    key: str | None = None
    found: str | None = None
    wanted: str | None = None

    def __str__(self) -> str:
        place = ":".join(str(part) for part in (self.file, self.line) if part is not None)
        parts = [part for part in (place, self.key) if part]
        text = f"{': '.join(parts)}: {self.message}" if parts else self.message
        if self.found is not None:
            text += f"; found {self.found}"
        if self.wanted is not None:
            text += f"; wanted {self.wanted}"
        return text


class TurnauditError(Exception):
    """Root of everything this package raises: no report is possible. Carries every fault found."""

    def __init__(self, *faults: Fault) -> None:
        self.faults = faults
        super().__init__("\n".join(str(fault) for fault in faults))


class UsageError(TurnauditError):
    """A path, option or output file that cannot be used."""


class DeclarationError(TurnauditError):
    """The declared world does not hold together; all faults of a file are collected first."""


class ProgramError(TurnauditError):
    """The program cannot be read at all, or holds nothing that is understood."""
