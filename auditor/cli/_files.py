"""Writing reports: a file is replaced whole or not at all, and an input is never overwritten."""

from __future__ import annotations

import os
import tempfile
from collections.abc import Iterable
from contextlib import suppress
from pathlib import Path

from auditor.errors import Fault, UsageError


def refuse_inputs(targets: Iterable[Path], inputs: Iterable[Path]) -> None:
    """Complain about any file to be written that is an input, or that is named twice.

    Raises
    ------
    UsageError
        With one fault for every such file.
    """
    taken = {os.path.realpath(path) for path in inputs}
    faults = []
    for target in targets:
        place = os.path.realpath(target)
        if place in taken or any(_same(target, path) for path in taken):
            faults.append(Fault("this file is an input or is named twice, and would be lost", file=str(target),
                                wanted="another name"))
        elif target.is_dir():
            faults.append(Fault("this is a folder", file=str(target), wanted="the name of a file"))
        elif not Path(place).parent.is_dir():
            faults.append(Fault("its folder does not exist", file=str(target), wanted="an existing folder"))
        taken.add(place)
    if faults:
        raise UsageError(*faults)


def _same(target: Path, other: str) -> bool:
    """Whether two names lead to one file (letter case, hard links)."""
    try:
        return target.samefile(other)
    except OSError:
        return False


def replace(target: Path, text: str) -> None:
    """Write the text beside the target and put it in its place in one step.

    Raises
    ------
    UsageError
        The file cannot be written; what stood there before still stands there.
    """
    place = Path(os.path.realpath(target))
    data = text.encode("utf-8", "replace")
    try:
        if place.exists() and not place.is_file():  # a device or a pipe is written to, never replaced
            place.write_bytes(data)
            return
        _swap(place, data)
    except OSError as problem:
        raise UsageError(Fault(f"cannot be written: {problem.strerror or problem}", file=str(target))) from problem


def _swap(place: Path, data: bytes) -> None:
    mode = place.stat().st_mode & 0o777 if place.exists() else 0o666 & ~_umask()
    handle, name = tempfile.mkstemp(dir=place.parent, prefix=f".{place.name}.")
    try:
        with os.fdopen(handle, "wb") as file:
            file.write(data)
            file.flush()
            os.fsync(file.fileno())
        Path(name).chmod(mode)
        Path(name).replace(place)
    except BaseException:
        with suppress(OSError):
            Path(name).unlink()
        raise


def _umask() -> int:
    mask = os.umask(0)
    os.umask(mask)
    return mask
