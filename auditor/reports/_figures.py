"""Figures and texts as a machinist reads them: rounded, with their unit, safe for any screen."""

from __future__ import annotations

import math
import unicodedata

_DECIMALS = {
    "kW": 1, "N": 0, "kN": 1, "N m": 1, "rpm": 0, "m/min": 0, "deg": 1, "mm/rev": 2, "mm2": 2, "min": 1, "s": 0,
    "um": 1, "m": 1, "%": 0,
}
_NAMES = {"degree": "deg", "°": "deg", "newton": "N", "kilowatt": "kW", "millimeter": "mm", "N*m": "N m", "Nm": "N m"}

_SPOKEN = str.maketrans({
    "≤": "<=", "≥": ">=", "×": "x", "Ø": "dia ", "°": " deg", "µ": "u", "μ": "u", "−": "-", "–": "-", "—": "-",
    "²": "2", "³": "3", "·": "*", "…": "...", "±": "+/-", "√": "sqrt", "→": "->", "’": "'", "‘": "'",
    "“": '"', "”": '"', "κ": "kappa", "λ": "lambda", "γ": "gamma", "α": "alpha",
    "ε": "epsilon", "π": "pi", "ß": "ss", "∞": "endless",
})


def figure(value: float | None, unit: str | None) -> str:
    """A figure rounded as a machinist would, with its unit.

    >>> figure(15.68, "kW"), figure(4463.0, "N"), figure(0.0234, "mm"), figure(None, "kW")
    ('15.7 kW', '4460 N', '0.023 mm', '-')
    """
    if value is None or not math.isfinite(value):
        return "-"
    name = _NAMES.get(unit or "", unit or "")
    return f"{_rounded(value, name)} {name}".rstrip()


def _rounded(value: float, unit: str) -> str:
    if unit == "N" and abs(value) >= 100.0:
        return f"{round(value, -1):.0f}"
    if unit in _DECIMALS:
        return f"{value:.{_DECIMALS[unit]}f}"
    small = abs(value)
    return f"{value:.0f}" if small >= 100.0 else f"{value:.2f}" if small >= 0.1 or small == 0.0 else f"{value:.3f}"


def duration(seconds: float) -> str:
    """A time as it is said.

    >>> duration(212.4), duration(42.0), duration(7321.0)
    ('3 min 32 s', '42 s', '2 h 02 min')
    """
    if not math.isfinite(seconds):
        return "-"
    whole = round(seconds)
    if whole >= 3600:
        return f"{whole // 3600} h {whole % 3600 // 60:02d} min"
    return f"{whole // 60} min {whole % 60:02d} s" if whole >= 60 else f"{whole} s"


def harmless(text: str) -> str:
    """Text of a stranger's file for a screen: every control sign becomes a question mark, a tab one blank.

    One sign stays one sign, so that columns keep their meaning.

    >>> harmless("G1\\tX2\\x1b[31m")
    'G1 X2?[31m'
    """
    if text.isascii() and text.isprintable():
        return text
    return "".join(" " if sign == "\t" else "?" if _harmful(sign) else sign for sign in text)


def _harmful(sign: str) -> bool:
    """Control, format and private signs, halves of signs, line separators; and U+..FFFE, U+..FFFF, which are none."""
    return unicodedata.category(sign) in {"Cc", "Cf", "Cs", "Co", "Zl", "Zp"} or ord(sign) & 0xFFFE == 0xFFFE


def plain(text: str) -> str:
    """The same in ASCII, for code pages that hold no more.

    >>> plain("v ≤ 180 m/min, Ø46, façade")
    'v <= 180 m/min, dia 46, facade'
    """
    spoken = unicodedata.normalize("NFKD", text.translate(_SPOKEN))
    kept = (sign for sign in spoken if not unicodedata.combining(sign))
    return "".join(kept).encode("ascii", "replace").decode("ascii")
