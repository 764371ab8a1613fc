"""What a program already says about its job, and how sure that is."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

Sure = Literal["sure", "likely", "guess"]
OPEN = "?"  # stands where only a person can decide; the reader of job files refuses it by name


@dataclass(frozen=True, slots=True)
class Guess:
    """A value read or guessed: as it will stand in the file, how sure, and from where."""

    value: str  # a TOML value: '"60 mm"', 'true'
    sure: Sure
    why: str  # "(BAR D60) in line 3"

    @property
    def word(self) -> str:
        """The value without its quotes."""
        return self.value.strip('"')

    @property
    def told(self) -> str:
        """The remark behind the value."""
        return f"{self.sure}: {self.why}"


def text_value(text: str) -> str:
    """A text as TOML writes it.

    >>> text_value('5" bar')
    '"5\\\\" bar"'
    """
    return f'"{"".join(map(_escaped, text))}"'


def _escaped(sign: str) -> str:
    if sign in '"\\':
        return f"\\{sign}"
    return sign if sign >= " " and sign != "\x7f" else f"\\u{ord(sign):04X}"


def quantity(number: float, unit: str) -> str:
    """A quantity as TOML value, without a tail of zeros.

    >>> quantity(60.0, "mm"), quantity(0.0315, "in")
    ('"60 mm"', '"0.0315 in"')
    """
    return f'"{number:.6g} {unit}"' if abs(number) >= 1e-4 or number == 0 else f'"{number:.6f} {unit}"'


def remark_text(text: str) -> str:
    """Any text made fit to stand in a TOML comment of one line.

    >>> remark_text("BAR\\tD60 \\x1b[0m")
    'BAR D60 ?[0m'
    """
    return " ".join("".join(sign if sign.isprintable() else " " if sign.isspace() else "?" for sign in text).split())
