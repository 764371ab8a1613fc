"""A measured row, and how times are taken on a machine that does other things besides."""

from __future__ import annotations

import os
import statistics
import subprocess
import sys
import time
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from pathlib import Path


@dataclass(frozen=True)
class Row:
    """One line of the table: a ratio to a yardstick measured in the same run, and the ratio aimed at."""

    what: str
    yardstick: str
    measured: float
    aim: float
    unit: str = "x"
    higher_is_better: bool = False

    @property
    def reached(self) -> bool:
        return self.measured >= self.aim if self.higher_is_better else self.measured <= self.aim


def seconds(work: Callable[[], object], clock: Callable[[], float] = time.process_time) -> float:
    """What the work takes of this process's own time; with another clock of the time that passes."""
    start = clock()
    work()
    return clock() - start


def side_by_side(
    work: Callable[[], object], yardstick: Callable[[], object], runs: int = 3,
    clock: Callable[[], float] = time.process_time,
) -> float:  # fmt: skip
    """Ratio of both, taken turn by turn so that a busy machine slows both alike: the middle of the ratios."""
    return statistics.median(seconds(work, clock) / seconds(yardstick, clock) for _ in range(runs))


def python(arguments: Sequence[str], compiled: Path) -> subprocess.CompletedProcess[str]:
    """A fresh Python with this project on its path; modules are compiled once, as in any installation."""
    root = str(Path(__file__).resolve().parents[2])
    paths = os.pathsep.join(part for part in (root, os.environ.get("PYTHONPATH", "")) if part)
    environment = {**os.environ, "PYTHONPATH": paths, "PYTHONPYCACHEPREFIX": str(compiled)}
    environment.pop("PYTHONDONTWRITEBYTECODE", None)
    return subprocess.run(
        [sys.executable, *arguments], capture_output=True, text=True, encoding="utf-8", check=False, env=environment
    )
