"""How fast programs are read: 10,000 typical blocks against a bare scan of the same text for its words.

Run it alone, or let a benchmark command collect `rows`.
"""

from __future__ import annotations

import random
import re
import time
from collections.abc import Callable

from auditor.parse import parse_text

BLOCKS = 10_000
AIM = 25.0  # reading may take so many times the scan

_SCAN = re.compile(r"[A-Z][+-]?(?:[0-9]+(?:\.[0-9]*)?|\.[0-9]+)")


def rows() -> list[tuple[str, float, float]]:
    """What was measured, the ratio to the bare scan, and the ratio aimed at."""
    text = typical_program()
    parse_text("G0 X1.")
    scan, read = _quickest(lambda: [_SCAN.findall(line) for line in text.splitlines()], lambda: parse_text(text))
    return [(f"parse {BLOCKS:,} typical blocks ({BLOCKS / read:,.0f} a second)", read / scan, AIM)]


def typical_program(blocks: int = BLOCKS, seed: int = 1) -> str:
    """Roughing strokes, turned by hand: numbered blocks, half of them met before, some comments.

    >>> print(typical_program(4))
    N10 T0101 (ROUGHING)
    N20 G50 S3000
    N30 G96 S220 M3
    N40 G0 X62. Z2. M8
    """
    chance = random.Random(seed)
    lines: list[str] = []
    while len(lines) < blocks:
        lines += _operation(chance)
    return "\n".join(f"N{10 * number} {line}" for number, line in enumerate(lines[:blocks], start=1))


def _operation(chance: random.Random) -> list[str]:
    lines = ["T0101 (ROUGHING)", "G50 S3000", "G96 S220 M3", "G0 X62. Z2. M8"]
    diameter, length = 62.0, chance.uniform(20, 80)
    for _ in range(8):
        diameter -= 4.0
        lines += [f"G0 X{diameter:.1f}", f"G1 Z-{length:.2f} F.3", "U1. W.5", "G0 Z2."]
    for _ in range(16):
        x, z = chance.uniform(20, 60), chance.uniform(0, 80)
        lines += [f"G1 X{x:.3f} Z-{z:.3f} F.15", f"X{x + 1:.3f}"]
    lines += [f"G3 X{x + 4:.3f} Z-{z + 2:.3f} R2.", "G0 X100. Z50. M9", "G97 S800", "M1"]
    return lines


def _quickest(*works: Callable[[], object], runs: int = 7) -> list[float]:
    """The quickest of some runs of each, in turns: those that other programs disturbed least."""
    times = [[_seconds(work) for work in works] for _ in range(runs)]
    return [min(column) for column in zip(*times, strict=True)]


def _seconds(work: Callable[[], object]) -> float:
    start = time.perf_counter()
    work()
    return time.perf_counter() - start


if __name__ == "__main__":
    for what, ratio, aim in rows():
        print(f"{what}: {ratio:.1f} x the bare scan, aim {aim:.0f} x")  # noqa: T201
