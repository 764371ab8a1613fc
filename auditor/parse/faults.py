"""What is wrong with a block that cannot be read, in the words of the person who typed it."""

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
_VALUE = re.compile(r"[+\-.,0-9]*")
_ONE_AS_LETTER = re.compile(r"[0-9A-Z.+-]l")
_FRONT = {"O": "the program number", "N": "the block number", "/": "a block skip"}


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


def fault_at(code: CleanCode, position: int) -> SyntaxFault:
    """Why the grammar stopped at ``position`` of the code."""
    bracket = _unclosed_bracket(code, position)
    if bracket is not None:
        return bracket
    if position >= len(code.text):
        return _cut_short(code)
    character = code.text[position]
    if character.isalpha():
        return _letter(code, position)
    if character in "+-.,0123456789":
        return _number(code, position)
    return _sign(code, position)


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


def _fault(code: CleanCode, start: int, end: int, message: str, hint: str | None = None) -> SyntaxFault:
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
    return _fault(code, position, position + 1, message, hint)


def _long_number(code: CleanCode) -> SyntaxFault | None:
    for found in _LONG_NUMBER.finditer(code.text):
        digits = len(found[0]) - found[0].count(".")
        if digits > MOST_DIGITS and found[0].count(".") <= 1:
            message = f"a number of {digits} digits; no control takes more than {MOST_DIGITS}"
            return _fault(code, found.start(), found.end(), message)
    return None


def _deep_bracket(code: CleanCode) -> SyntaxFault | None:
    depth = 0
    for bracket in _BRACKET.finditer(code.text):
        depth += 1 if bracket[0] == "[" else -1
        if depth > DEEPEST_BRACKET:
            message = f"brackets stand more than {DEEPEST_BRACKET} deep"
            return _fault(code, bracket.start(), bracket.end(), message)
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


def _unclosed_bracket(code: CleanCode, position: int) -> SyntaxFault | None:
    open_brackets: list[int] = []
    for bracket in _BRACKET.finditer(code.text, 0, position):
        if bracket[0] == "[":
            open_brackets.append(bracket.start())
        elif open_brackets:
            open_brackets.pop()
    if open_brackets and code.text.find("]", position) < 0:
        start = open_brackets[-1]
        return _fault(code, start, position, f"the bracket [ in column {code.start(start) + 1} is never closed")
    return None


def _cut_short(code: CleanCode) -> SyntaxFault:
    """The block ends where something more is wanted."""
    text, end = code.text, len(code.text)
    if text.startswith(("IF", "WHILE", "GOTO", "DO", "END")):
        wanted = "GOTO or THEN" if text.startswith("IF") else "DO1, DO2 or DO3"
        if text.endswith("]"):
            return _fault(code, 0, end, f"the statement breaks off; {wanted} is missing")
        return _fault(code, 0, end, "the statement breaks off; a number or value is missing at its end")
    if text.startswith("#"):
        return _fault(code, 0, end, "the assignment breaks off; #i = value is wanted")
    return _no_value(code, end)


def _no_value(code: CleanCode, end: int, hint: str | None = None) -> SyntaxFault:
    """The word that ends before ``end`` has a letter and perhaps a sign, but no value."""
    start = end - 1
    while start and code.text[start] in "+-.":
        start -= 1
    word = code.text[start:end]
    if word.endswith("."):
        return _fault(code, start, end, f"{word}: a point without a digit", hint)
    if word.endswith(("+", "-")) and word[0].isalpha():
        return _fault(code, start, end, f"{word}: a sign without a value", hint)
    return _fault(code, start, end, f"{word} has no value", hint)


def _letter(code: CleanCode, position: int) -> SyntaxFault:
    text, letter = code.text, code.text[position]
    before = text[position - 1] if position else ""
    hint = {
        "O": "letter O typed for the digit 0?",
        "L": "letter l typed for the digit 1?",
        "I": "letter I typed for the digit 1?",
    }.get(letter)
    if before.isalpha() or (before and before in "+-."):
        return _no_value(code, position, hint)
    if letter in _FRONT:
        message = f"{letter} cannot stand here: {_FRONT[letter]} comes first in a block"
        return _fault(code, position, position + 1, message, hint if letter == "O" else None)
    return _fault(code, position, position + 1, f"{letter} cannot stand here")


def _number(code: CleanCode, position: int) -> SyntaxFault:
    """Something is wrong with the number that the word beginning before ``position`` carries."""
    text = code.text
    start = position
    while start and text[start - 1] in "+-.,0123456789":
        start -= 1
    letter = text[start - 1] if start and text[start - 1].isalpha() else ""
    match = _VALUE.match(text, start)
    end = match.end() if match else position + 1
    value = text[start:end]
    word = letter + value
    start -= len(letter)
    if "," in value:
        hint = "decimal comma? a decimal point is wanted"
        if not re.search(r"[0-9],[0-9]", value):
            hint = "behind a comma only C (chamfer), R (rounding) or A (angle) can stand"
        return _fault(code, start, end, f"{word}: a comma inside a number", hint)
    if re.search(r"[+-]{2}", value):
        return _fault(code, start, end, f"{word}: two signs", "one of them is too many")
    if value.count(".") > 1:
        return _fault(code, start, end, f"{word}: two decimal points")
    if not re.search("[0-9]", value):
        return _no_value(code, end)
    if re.search(r"[0-9.][+-]", value):
        return _fault(code, start, end, f"{word}: a sign behind the number", "sums need brackets [ ]")
    return _fault(code, start, end, f"{word}: a number without an address letter")


def _sign(code: CleanCode, position: int) -> SyntaxFault:
    character = code.text[position]
    message, hint = f"{character} cannot stand here", None
    if character == "=":
        message = "words with = belong to another dialect and are not read"
    elif character == "/":
        message = "a / inside a block: some controls leave out the rest of the block, some refuse it"
        hint = "put block skip at the front, or divide inside brackets [ ]"
    elif character in "'\"*":
        message, hint = f"{character} is no code here", "comments stand in parentheses ( )"
    elif character == "%":
        message, hint = "% inside a block", "the mark for start and end of the program stands at the front of a line"
    elif character in "<>":
        message = "names in angle brackets are read as a program's name or behind M98 only"
    elif character == "]":
        message = "a bracket ] without its ["
    elif character == "#" or character == "[":
        message = f"{character} cannot stand here: an address letter is missing in front of it"
    elif not character.isprintable():
        message = f"a control byte ({ord(character):02X} hex) outside a comment"
    return _fault(code, position, position + 1, message, hint)
