"""``python -m tests.benchmarks``: how fast and how big, as ratios to yardsticks measured in the same run.

Ratios mean the same on a slow and on a fast machine; nothing here is a test that can fail. ``--quick`` leaves out what
takes minutes.
"""

from __future__ import annotations

import argparse
from collections.abc import Iterator

from tests.benchmarks import cutting, parse_rate, whole
from tests.benchmarks.timing import Row


def main() -> None:
    """Measure and print the table, a row as soon as it is known."""
    parser = argparse.ArgumentParser(prog="python -m tests.benchmarks", description=__doc__.split("\n\n")[0])
    parser.add_argument("--quick", action="store_true", help="10,000 points and 20 programs instead of 100,000 and 160")
    quick = parser.parse_args().quick
    _line("what", "yardstick", "measured", "aim", "")
    for row in _rows(quick):
        sign = ">=" if row.higher_is_better else "<="
        measured, aim = f"{row.measured:.2f} {row.unit}", f"{sign} {row.aim:g} {row.unit}"
        _line(row.what, row.yardstick, measured, aim, "" if row.reached else "missed")


def _rows(quick: bool) -> Iterator[Row]:
    dense = 10_000 if quick else 100_000
    for what, ratio, aim in parse_rate.rows():
        yield Row(what, "bare word scan of the same text", ratio, aim)
    yield from cutting.rows(dense)
    yield from whole.rows(20 if quick else 160, dense)


def _line(what: str, yardstick: str, measured: str, aim: str, remark: str) -> None:
    print(f"{what:<56} {yardstick:<44} {measured:>10}  {aim:<10} {remark}".rstrip(), flush=True)  # noqa: T201


if __name__ == "__main__":
    main()
