"""Why the grammar stopped where it did, in the words of the person who typed the block."""

from __future__ import annotations

import re

from auditor.parse.blocks import SyntaxFault
from auditor.parse.clean import CleanCode
from auditor.parse.faults import MOST_DIGITS, fault_between
from auditor.parse.grammar import begins_statement

_BRACKET = re.compile(r"[\[\]]")
_OF_A_NUMBER = "+-.,0123456789"
_NO_VALUE = re.compile(r"(?P<address>,?[A-Z])[+-]?\.?$")

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

_AROUND_O = re.compile(r"[A-Z][-+.0-9]*$")
_BEHIND_O = re.compile(r"O[.0-9]*")

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


def _unclosed_bracket(code: CleanCode, position: int) -> SyntaxFault | None:
    open_brackets: list[int] = []
    for bracket in _BRACKET.finditer(code.text, 0, position):
        if bracket[0] == "[":
            open_brackets.append(bracket.start())
        elif open_brackets:
            open_brackets.pop()
    if open_brackets and code.text.find("]", position) < 0:
        start = open_brackets[-1]
        return fault_between(code, start, position, f"the bracket [ in column {code.start(start) + 1} is never closed")
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
        return fault_between(code, position - 1, position, message, hint)
    return fault_between(code, position, position + 1, message, hint)


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
        return fault_between(code, word.start(), position, f"{word[0]} {problem}", hint)
    if letter in _FRONT:
        glued = position > 0 and code.columns[position] == code.columns[position - 1] + 1
        if position == 0 and not _FRONT_WORD.match(text):
            message = f"{letter} wants a whole number of up to {MOST_DIGITS} digits behind it"
        elif letter == "O" and glued and text[position - 1] in _OF_A_NUMBER:
            return _zero(code, position)
        else:
            message = f"{letter} cannot stand here: {_FRONT[letter]} comes first in a block"
        return fault_between(code, position, position + 1, message, hint if glued else None)
    return fault_between(code, position, position + 1, f"{letter} cannot stand here")


def _zero(code: CleanCode, position: int) -> SyntaxFault:
    """The letter O inside a number, named with the whole word: ``X4O.``."""
    word = _AROUND_O.search(code.text, 0, position)
    start = word.start() if word is not None else position
    behind = _BEHIND_O.match(code.text, position)
    end = behind.end() if behind is not None else position + 1
    message = f"the letter O stands in the number of {code.text[start:end]}"
    return fault_between(code, position, position + 1, message, _LETTER_FOR_DIGIT["O"])


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
            return fault_between(code, start, end, f"{word} {problem}", hint)
    return fault_between(code, start, end, f"{word} has no address letter", "is a letter missing in front?")


def _sign(code: CleanCode, position: int) -> SyntaxFault:
    """A character that no word begins with."""
    character = code.text[position]
    message, hint = _SIGNS.get(character, (f"{character} is no code", None))
    if not character.isprintable():
        message = f"a control byte ({ord(character):02X} hex) outside a comment"
    elif character == "/" and position == 0:
        message, hint = "block skip stands twice", None
    return fault_between(code, position, position + 1, message, hint)
