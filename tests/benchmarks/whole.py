"""The command as a person runs it: process start, memory, folders with more than one worker."""

from __future__ import annotations

import sys
import tempfile
import time
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path

from tests.benchmarks.programs import dense_points, wavy_strokes, written
from tests.benchmarks.timing import Row, python, seconds, side_by_side

RUN = "import sys; from auditor.cli import main; sys.argv[0] = 'turnaudit'; main()"
PEAK = """\
import pathlib, resource, sys
from auditor.cli import main
try:
    main()
except SystemExit:
    pass
status = pathlib.Path("/proc/self/status")
if status.exists():  # the other measure starts at what the parent process had
    kilobytes = next(int(line.split()[1]) for line in status.read_text().splitlines() if line.startswith("VmHWM"))
else:
    kilobytes = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / (1024 if sys.platform == "darwin" else 1)
sys.stderr.write(f"\\npeak {kilobytes / 1024.0}")
"""
DEMO = Path(__file__).resolve().parents[2] / "fixtures" / "demo"


def rows(programs: int = 160, dense: int = 100_000) -> Iterator[Row]:
    """Start to end of one program, a folder with 2 workers, peak memory."""
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        command = Command(folder / "compiled")
        yield _one_program(folder, command)
        yield _two_workers(folder / "many", programs, command)
        if sys.platform != "win32":  # there is no such measure in its standard library
            demo = sorted(DEMO.glob("*.nc"))
            if demo:
                yield Row("peak memory, demo", "aim in MB", command.peak(demo[0]), 120.0, "MB")
            big = written(folder, dense_points(dense), "big")
            yield Row(f"peak memory, {dense:,} moves", "aim in MB", command.peak(big), 350.0, "MB")


@dataclass(frozen=True)
class Command:
    """The command in processes of their own that share a folder of compiled modules."""

    compiled: Path

    def check(self, *arguments: str) -> None:
        """Audit; a report with findings is as good as one without."""
        done = python(["-c", RUN, "check", *arguments], self.compiled)
        if done.returncode not in (0, 1):
            raise RuntimeError(f"check {' '.join(arguments)} ended with {done.returncode}: {done.stderr[-2000:]}")

    def imports(self) -> None:
        """The least a program of this kind has to load."""
        python(["-c", "import numpy, shapely, lark"], self.compiled)

    def peak(self, program: Path) -> float:
        """Largest memory of a check of one program, MB."""
        done = python(["-c", PEAK, "check", str(program), "--format", "json"], self.compiled)
        return float(done.stderr.rsplit("peak ", 1)[1])


def _one_program(folder: Path, command: Command) -> Row:
    program = str(written(folder, wavy_strokes(165)))
    command.check(program)  # grammar and modules are compiled once and remembered
    command.imports()
    ratio = side_by_side(lambda: command.check(program), command.imports, 9, time.perf_counter)
    return Row("whole check of 200 moves, new process", "a process that imports numpy, shapely, lark", ratio, 3.0)


def _two_workers(folder: Path, programs: int, command: Command) -> Row:
    folder.mkdir()
    for number in range(programs):
        written(folder, wavy_strokes(165), f"part{number:03d}")
    one = seconds(lambda: command.check(str(folder), "--format", "json"), time.perf_counter)
    two = seconds(lambda: command.check(str(folder), "--format", "json", "--workers", "2"), time.perf_counter)
    return Row(f"{programs} programs, 2 workers", "1 worker", one / two, 1.7, higher_is_better=True)
