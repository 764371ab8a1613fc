"""Bytes to lines: encodings, byte order marks, transfer leftovers, and every kind of line end."""

from __future__ import annotations

import codecs
import re

from auditor.parse.blocks import TextNote

IGNORED = "\x00\x7f\x11\x12\x13\x14\ufeff"  # tape leader, rubouts, reader on/off, a mark inside the file
END_OF_FILE = "\x1a"

_MARKS = (
    (codecs.BOM_UTF8, "utf-8", "UTF-8"),
    (codecs.BOM_UTF16_LE, "utf-16-le", "UTF-16"),
    (codecs.BOM_UTF16_BE, "utf-16-be", "UTF-16"),
)
_LINE_END = re.compile(r"\r\n|\n\r(?!\n)|\n|\r")
_LINE_END_SWAPPED = re.compile(r"\n\r|\r\n|\n|\r")  # files written with LF CR throughout
_STARTS_SWAPPED = re.compile(r"[^\r\n]*\n\r(?!\n)")
_IGNORED = re.compile(f"[{IGNORED}]")


def decode(data: bytes | str) -> tuple[str, list[TextNote]]:
    """The text of a program file. Never fails: only comments may hold more than ASCII."""
    text, mark = (data, None) if isinstance(data, str) else _decode_bytes(data)
    if text.startswith("\ufeff"):
        text, mark = text[1:], mark or "Unicode"
    notes = []
    if mark:
        notes.append(TextNote("encoding", 1, f"the file begins with a {mark} byte order mark; it was left out"))
    return text, notes


def split_lines(text: str) -> tuple[list[str], list[TextNote]]:
    """The lines without their ends, up to an end-of-file byte; controls accept every form of line end."""
    text, end, padding = text.partition(END_OF_FILE)
    pattern = _LINE_END_SWAPPED if _STARTS_SWAPPED.match(text) else _LINE_END
    lines = pattern.split(text)
    if lines and not lines[-1]:
        lines.pop()
    notes = []
    stray = _IGNORED.search(text)
    if stray is not None:
        line = len(pattern.findall(text, 0, stray.start())) + 1
        notes.append(TextNote("control-bytes", line, "control bytes of a tape or a transfer were left out"))
    last = max(len(lines), 1)
    if end and padding.strip(IGNORED + END_OF_FILE + " \t\r\n"):
        notes.append(TextNote("after-end", last, "text behind the end-of-file byte (1A hex) was not read"))
    elif end:
        notes.append(TextNote("control-bytes", last, "an end-of-file byte (1A hex) ends the file; it was left out"))
    return lines, notes


def _decode_bytes(data: bytes) -> tuple[str, str | None]:
    for mark, encoding, name in _MARKS:
        if data.startswith(mark):
            return data[len(mark) :].decode(encoding, errors="replace"), name
    if wide := _unmarked_utf16(data):
        return data.decode(wide, errors="replace"), None
    try:
        return data.decode("utf-8"), None
    except UnicodeDecodeError:
        return data.decode("latin-1"), None


def _unmarked_utf16(data: bytes) -> str | None:
    """UTF-16 saved without its mark: every second byte of plain code is zero."""
    half = len(data) // 2
    if half and len(data) % 2 == 0:
        first, second = data[0::2].count(0), data[1::2].count(0)
        if second > 0.9 * half and first < 0.1 * half:
            return "utf-16-le"
        if first > 0.9 * half and second < 0.1 * half:
            return "utf-16-be"
    return None
