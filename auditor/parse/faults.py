"""Blocks that the grammar is not even asked about: foreign characters, limits passed, comments left open."""

from __future__ import annotations

import re
import unicodedata

from auditor.parse.blocks import Comment, SyntaxFault
from auditor.parse.clean import CleanCode

LONGEST_BLOCK = 500  # characters of code; the longest block a control takes is about half of it
LONGEST_LINE = 10_000
DEEPEST_BRACKET = 5
MOST_DIGITS = 8

_DASHES = "\u2010\u2011\u2012\u2013\u2014\u2015\u2212\u00ad\x96\x97\ufe63\uff0d"
_WIDE_BLANKS = "\u00a0\u2000\u2001\u2002\u2003\u2004\u2005\u2006\u2007\u2008\u2009\u200a\u200b\u202f\u205f\u2060\u3000"
_LONG_NUMBER = re.compile(r"[0-9.]{9,}")
_NOT_ASCII = re.compile(r"[^\x00-\x7f]")
_BRACKET = re.compile(r"[\[\]]")
_ONE_AS_LETTER = re.compile(r"[0-9A-Z.+-]l")


def fault_before_reading(code: CleanCode, line: str) -> SyntaxFault | None:
    """What the grammar should not even be asked about: foreign characters, endless numbers, deep brackets."""
    text = code.text
    if not text.isascii():
        return _foreign_character(code)
    if len(text) > LONGEST_BLOCK:
        return SyntaxFault(
            f"the block holds {len(text)} characters of code and was not read",
            code.start(0),
            code.end(len(text)),
            f"blocks of up to {LONGEST_BLOCK} are read; is a line end missing?",
        )
    if "[" in text and (fault := _deep_bracket(code)):
        return fault
    return _long_number(code) or _letter_l(code, line)


def long_line(line: str) -> SyntaxFault:
    """A line beyond any block, such as a whole file without line ends."""
    return SyntaxFault(
        f"the line holds {len(line)} characters and was not read",
        0,
        len(line),
        f"lines of up to {LONGEST_LINE} are read; are the line ends missing?",
    )


def unclosed_comment(comment: Comment, line: int, closing: int | None) -> SyntaxFault:
    """A comment without its ``)``: controls differ in how much of the program it swallows."""
    swallow = "the rest of the program" if closing is None else f"everything up to the ) in line {closing}"
    return SyntaxFault(
        f"the comment opened in column {comment.start + 1} is never closed",
        comment.start,
        comment.end,
        f"the rest of line {line} was taken as the comment; some controls would swallow {swallow}",
    )


def fault_between(code: CleanCode, start: int, end: int, message: str, hint: str | None = None) -> SyntaxFault:
    """A fault at a stretch of the clean text, with its columns in the source line."""
    first = code.start(start)
    return SyntaxFault(message, first, max(code.end(end), first), hint)


def _foreign_character(code: CleanCode) -> SyntaxFault:
    found = _NOT_ASCII.search(code.text)
    assert found is not None
    character, position = found[0], found.start()
    name = unicodedata.name(character, "no character of text")
    message = f"{name} (U+{ord(character):04X}) outside a comment"
    hint = "only plain letters, digits and signs are code"
    if character in _DASHES:
        hint = "a typographic minus; type the plain -"
    elif character in _WIDE_BLANKS:
        hint = "a non-breaking or special blank; type a plain one"
    elif unicodedata.decimal(character, None) is not None:
        hint = "not the plain digit it looks like"
    return fault_between(code, position, position + 1, message, hint)


def _long_number(code: CleanCode) -> SyntaxFault | None:
    for found in _LONG_NUMBER.finditer(code.text):
        digits = len(found[0]) - found[0].count(".")
        if digits > MOST_DIGITS and found[0].count(".") <= 1:
            message = f"a number of {digits} digits; numbers have up to {MOST_DIGITS}"
            return fault_between(code, found.start(), found.end(), message)
    return None


def _deep_bracket(code: CleanCode) -> SyntaxFault | None:
    depth = 0
    for bracket in _BRACKET.finditer(code.text):
        depth += 1 if bracket[0] == "[" else -1
        if depth > DEEPEST_BRACKET:
            message = f"brackets stand more than {DEEPEST_BRACKET} deep"
            return fault_between(code, bracket.start(), bracket.end(), message)
    return None


def _letter_l(code: CleanCode, line: str) -> SyntaxFault | None:
    """A lone small l among capitals is a 1 mistyped, and would else be read as the address L."""
    if code.text.count("L") != 1:
        return None
    column = code.columns[code.text.index("L")]
    written = "".join(line[column] for column in code.columns)
    if _ONE_AS_LETTER.search(written) is None or written.replace("l", "") != written.replace("l", "").upper():
        return None
    return SyntaxFault("a small letter l among capitals", column, column + 1, "letter l typed for the digit 1?")
