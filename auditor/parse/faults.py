"""What is wrong with a block that cannot be read, in the words of the person who typed it."""

from __future__ import annotations

import re
import unicodedata

from auditor.parse.blocks import Comment, SyntaxFault
from auditor.parse.clean import CleanCode
from auditor.parse.grammar import begins_statement

LONGEST_BLOCK = 500  # characters of code; the longest block a control takes is about half of it
LONGEST_LINE = 10_000
DEEPEST_BRACKET = 5
MOST_DIGITS = 8

_DASHES = "\u2010\u2011\u2012\u2013\u2014\u2015\u2212\u00ad\x96\x97\ufe63\uff0d"
_WIDE_BLANKS = "\u00a0\u2000\u2001\u2002\u2003\u2004\u2005\u2006\u2007\u2008\u2009\u200a\u200b\u202f\u205f\u2060\u3000"
_LONG_NUMBER = re.compile(r"[0-9.]{9,}")
_NOT_ASCII = re.compile(r"[^\x00-\x7f]")
_BRACKET = re.compile(r"[\[\]]")
_OF_A_NUMBER = "+-.,0123456789"
_NO_VALUE = re.compile(r"(?P<address>,?[A-Z])[+-]?\.?$")
_ONE_AS_LETTER = re.compile(r"[0-9A-Z.+-]l")

_FRONT = {"O": "the program number", "N": "the block number"}
_FRONT_WORD = re.compile(r"[ON][0-9]+(?![0-9.])")
_LETTER_FOR_DIGIT = {
    "O": "letter O typed for the digit 0?",
    "L": "letter l typed for the digit 1?",
    "I": "letter I typed for the digit 1?",
}

# Faults of a number, the likeliest reading first: what is found in it, what to say, what was meant.
_NUMBER_FAULTS = (
    (re.compile("[0-9],[0-9]"), "has a comma inside its number", "decimal comma? a decimal point is wanted"),
    (re.compile(","), "cannot be read", "behind a comma only C (chamfer), R (rounding) or A (angle) can stand"),
    (re.compile("[+-][+-]"), "has two signs", "one of them is too many"),
    (re.compile("[0-9.][+-]"), "has a sign behind its number", "sums stand in brackets [ ]"),
    (re.compile(r"\..*\."), "has two decimal points", None),
    (re.compile(r"^[+-]?\.?$"), "has no digit", None),
)

_FUNCTION = r"(?<![A-Z])[A-Z]{2,5}(?<!EQ|NE|GT|GE|LT|LE|OR)(?<!AND|MOD|XOR)$"

# What is wanted inside statements and expressions, by what stands before.
_WANTED = tuple(
    (re.compile(before), wanted)
    for before, wanted in (
        (r"(?:IF|WHILE)$", "a condition in brackets [ ] is wanted here"),
        (r"^IF\[.*\]$", "GOTO or THEN is wanted behind the condition"),
        (r"^WHILE\[.*\]$", "DO1, DO2 or DO3 is wanted behind the condition"),
        (r"(?:DO|END)$", "loops are numbered 1, 2 or 3"),
        (r"GOTO$", "GOTO wants a block number, #i or an expression in brackets [ ]"),
        (r"THEN$", "only an assignment #i = value is read behind THEN"),
        (r"#$", "# wants the number of a variable"),
        (r"(?:^|THEN)#[^=]*$", "an assignment is wanted: #i = value"),
        (_FUNCTION, "a function wants its value in brackets [ ]"),
        (r"(?:[-+*/=\[,]|[A-Z])$", "a number, #i or an expression in brackets [ ] is wanted here"),
    )
)

_SIGNS = {
    "=": ("words with = belong to another dialect and are not read", None),
    "/": (
        "a / inside a block: some controls leave out the rest of the block, some refuse it",
        "put block skip at the front, or divide inside brackets [ ]",
    ),
    "'": ("' is no code", "comments stand in parentheses ( )"),
    '"': ('" is no code', "comments stand in parentheses ( )"),
    "*": ("* is no code", "comments stand in parentheses ( ), products in brackets [ ]"),
    "%": ("% inside a block", "% opens and ends a program at the front of a line only"),
    "<": ("a name in angle brackets is read as a program's name or behind M98 only", None),
    "]": ("a bracket ] without its [", None),
    "#": ("an address letter is missing in front of #", None),
    "[": ("an address letter is missing in front of [", None),
    ":": ("a program number comes first in a block", None),
}


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
    text, before = code.text, code.text[:position]
    bracket = _unclosed_bracket(code, position)
    if bracket is not None:
        return bracket
    if position < len(text) and text[position] in ".," and before[-1:].isdigit():
        return _number(code, position)
    if begins_statement(text) or before.endswith("#") or before.count("[") > before.count("]"):
        return _expression(code, position)
    if position == len(text) or text[position].isalpha():
        return _letter(code, position)
    if text[position] in _OF_A_NUMBER:
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
            message = f"a number of {digits} digits; numbers have up to {MOST_DIGITS}"
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


def _expression(code: CleanCode, position: int) -> SyntaxFault:
    """Inside a statement or an expression: what was wanted follows from what stands before."""
    text = code.text
    found = text[position : position + 1]
    hint = None
    message = next((wanted for before, wanted in _WANTED if before.search(text, 0, position)), None)
    if message is None:
        message = "a bracket ] without its [" if found == "]" else f"{found} cannot stand here"
    if found == "=" and not text.startswith("#"):
        hint = "relations are written EQ NE GT GE LT LE"
    elif found == "N" and text.endswith("GOTO", 0, position):
        hint = "without the letter N"
    elif found in "<_" and found and text[position - 1] == "#":
        hint = "named variables belong to another dialect and are not read"
    if not found:
        return _fault(code, position - 1, position, message, hint)
    return _fault(code, position, position + 1, message, hint)


def _letter(code: CleanCode, position: int) -> SyntaxFault:
    """A letter, or the end, where a value is missing or no word can begin."""
    text, letter = code.text, code.text[position : position + 1]
    hint = _LETTER_FOR_DIGIT.get(letter)
    word = _NO_VALUE.search(text, 0, position)
    if word is not None:
        problem = "has no value"
        if len(word[0]) > len(word["address"]):
            problem = "has a point without a digit" if word[0].endswith(".") else "has a sign without a number"
        if _is_plain_text(code, word.start()):
            hint = "text that is no code belongs in parentheses ( )"
        return _fault(code, word.start(), position, f"{word[0]} {problem}", hint)
    if letter in _FRONT:
        glued = position > 0 and code.columns[position] == code.columns[position - 1] + 1
        if position == 0 and not _FRONT_WORD.match(text):
            message = f"{letter} wants a whole number of up to {MOST_DIGITS} digits behind it"
        else:
            message = f"{letter} cannot stand here: {_FRONT[letter]} comes first in a block"
        return _fault(code, position, position + 1, message, hint if glued else None)
    return _fault(code, position, position + 1, f"{letter} cannot stand here")


def _is_plain_text(code: CleanCode, position: int) -> bool:
    """Three letters in a row, as no code has them."""
    letters = code.text[position : position + 3]
    return len(letters) == 3 and letters.isalpha() and code.columns[position + 2] == code.columns[position] + 2


def _number(code: CleanCode, position: int) -> SyntaxFault:
    """Something is wrong with the number around ``position``, or with the word that carries it."""
    text = code.text
    start = end = position
    while start and text[start - 1] in _OF_A_NUMBER:
        start -= 1
    while end < len(text) and text[end] in _OF_A_NUMBER:
        end += 1
    value = text[start:end]
    if start and text[start - 1].isalpha():
        start -= 1
    word = text[start:end]
    for pattern, problem, hint in _NUMBER_FAULTS:
        if pattern.search(value):
            return _fault(code, start, end, f"{word} {problem}", hint)
    return _fault(code, start, end, f"{word} has no address letter", "is a letter missing in front?")


def _sign(code: CleanCode, position: int) -> SyntaxFault:
    """A character that no word begins with."""
    character = code.text[position]
    message, hint = _SIGNS.get(character, (f"{character} is no code", None))
    if not character.isprintable():
        message = f"a control byte ({ord(character):02X} hex) outside a comment"
    elif character == "/" and position == 0:
        message, hint = "block skip stands twice", None
    return _fault(code, position, position + 1, message, hint)
