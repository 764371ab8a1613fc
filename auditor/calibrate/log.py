"""Reads a log of spindle load: a CSV with one column that says where, and one that says how much.

Where: ``time_s`` (seconds since the start of the cycle), ``line`` (line of the program file) or ``block`` (N word).
How much: ``power_kW``, ``load_percent`` (of what the motor can give at that speed, as load meters show it) or
``rated_percent`` (of its largest continuous power). Other columns are left alone; lines that begin with # too.
"""

from __future__ import annotations

import csv
import hashlib
import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from auditor.errors import Fault, UsageError

Floats = NDArray[np.float64]
Place = Literal["time_s", "line", "block"]
Quantity = Literal["power_kW", "load_percent", "rated_percent"]

PLACES: tuple[Place, ...] = ("line", "block", "time_s")  # the first that is there is taken: it needs no laying over
QUANTITIES: tuple[Quantity, ...] = ("power_kW", "load_percent", "rated_percent")
MOST_FAULTS = 5
MOST_ROWS = 2_000_000


@dataclass(frozen=True, slots=True)
class LoadLog:
    """The rows of a log, in the order of the file; shape (rows,)."""

    path: str
    sha256: str
    place: Place
    quantity: Quantity
    where: Floats  # s, source line, or number of the N word
    reading: Floats  # kW or percent
    empty: int  # rows without a reading


def read_log(path: str | Path) -> LoadLog:
    """Read a log of spindle load.

    Raises
    ------
    UsageError
        No such file, columns missing or named twice, cells that are no numbers: with their lines.
    """
    data = _bytes(Path(path))
    try:
        text = data.decode("utf-8-sig")
    except UnicodeDecodeError:
        text = data.decode("latin-1")
    lines = [(number, line) for number, line in enumerate(text.splitlines(), start=1)
             if line.strip() and not line.lstrip().startswith("#")]
    if len(lines) < 2 or len(lines) > MOST_ROWS:
        raise UsageError(Fault("a log needs a line of column names and rows below it", file=str(path),
                               found=f"{len(lines)} lines"))
    separator = _separator(lines[0][1])
    heads = [head.strip().strip('"') for head in lines[0][1].split(separator)]
    place, quantity = _columns(heads, str(path), lines[0][0])
    rows = list(_numbers(lines[1:], separator, heads, (place, quantity), str(path)))
    known = [row for row in rows if not math.isnan(row[1])]
    where, reading = np.array(known, dtype=np.float64).reshape(-1, 2).T
    return LoadLog(str(path), hashlib.sha256(data).hexdigest(), place, quantity, where, reading, len(rows) - len(known))


def _bytes(path: Path) -> bytes:
    try:
        return path.read_bytes()
    except OSError as problem:
        raise UsageError(Fault(f"cannot be read ({problem.strerror or problem})", file=str(path),
                               wanted="a CSV log of spindle load")) from None


def _separator(heads: str) -> str:
    return max((";", "\t", ","), key=heads.count)


def _columns(heads: Sequence[str], path: str, line: int) -> tuple[Place, Quantity]:
    """The column that says where and the one that says how much."""
    lower = [head.lower() for head in heads]
    place = next((name for name in PLACES if name.lower() in lower), None)
    quantities = [name for name in QUANTITIES if name.lower() in lower]
    faults = []
    if place is None:
        faults.append(Fault("no column says where a reading belongs", file=path, line=line, found=", ".join(heads),
                            wanted="time_s, line or block"))
    if len(quantities) != 1:
        faults.append(Fault("one column must say how much", file=path, line=line, found=", ".join(heads),
                            wanted="one of power_kW, load_percent, rated_percent"))
    if faults or place is None:
        raise UsageError(*faults)
    return place, quantities[0]


def _numbers(
    lines: Sequence[tuple[int, str]], separator: str, heads: Sequence[str], wanted: tuple[Place, Quantity], path: str
) -> Iterator[tuple[float, float]]:
    lower = [head.lower() for head in heads]
    columns = [lower.index(name.lower()) for name in wanted]
    comma = separator != ","
    faults: list[Fault] = []
    for (number, _), cells in zip(lines, csv.reader((line for _, line in lines), delimiter=separator), strict=False):
        values = [_value(cells[column] if column < len(cells) else "", comma) for column in columns]
        if values[0] is None or values[1] is None or math.isnan(values[0]):
            faults.append(Fault("not numbers", file=path, line=number, found=separator.join(cells),
                                wanted=f"{wanted[0]} and {wanted[1]}"))
            if len(faults) == MOST_FAULTS:
                break
            continue
        yield values[0], values[1]
    if faults:
        raise UsageError(*faults)


def _value(cell: str, comma: bool) -> float | None:
    """A cell's number; NaN where it is empty, None where it is no number. N70 counts as 70."""
    text = cell.strip().strip('"').removesuffix("%").strip().lstrip("Nn")
    if not text:
        return math.nan
    try:
        value = float(text.replace(",", ".") if comma else text)
    except ValueError:
        return None
    return value if math.isfinite(value) else None
