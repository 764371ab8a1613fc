"""What comments say about material, stock and chuck."""

from __future__ import annotations

import math
import re
from collections.abc import Iterable, Iterator, Sequence
from functools import cache

from auditor.declared.material_files import key_of
from auditor.declared.materials import entries
from auditor.draft.guesses import Guess, Sure, quantity, text_value
from auditor.draft.sayings import Saying
from auditor.draft.sizes import Role, Size, sizes
from auditor.draft.vocabulary import (
    FAMILIES,
    GRIP_INSIDE,
    HOLDING,
    JAWS_BORED,
    MATERIAL_LABELS,
    SECTIONS,
    SKINS,
    STICK_OUT_LABELS,
    STOCK_LABELS,
    TOOL_KINDS,
    holds,
    named,
    without,
)

LONGEST_NAME = 4  # words of a material's name
FAMILY_DIGITS = 3  # AL 6061, SS 304
SURE_LETTERS = 4  # a shorter name may stand for something else (C15 is a chamfer too)
_WORD = re.compile(r"[A-Z0-9][A-Z0-9.+/%-]*")
_NUMBERED = re.compile(r"\d\.\d{4}|(?=.*[A-Z])(?=.*\d).{3,}")  # 1.4301; letters and digits mixed
_GLUED_FAMILY = re.compile(r"^(?:SS|SST|AL|ALU|VA|INOX|AISI|SAE|EN)[ -]?(?=\d)|(?<=\d)[ -]?(?:SS|AL|ALU|INOX)$")
_BESIDE_LABEL = re.compile(r"^[\s:=.#-]+")
_BARS_OF_TOOLS = {kind: TOOL_KINDS[kind] for kind in ("boring", "stop")}  # a boring bar is no bar stock
_SIDES = re.compile(r"\b[OI]\.?D\b\.?")  # OD and ID name sizes of stock as often as sides of a tool
_JAWS = re.compile(r"(?<![A-Z0-9])([2-8])[ -]?(?:JAWS?|BACKEN|MORS|GRIFFE|GARRAS)")


def work_said(said: Sequence[Saying], unit: str) -> Iterator[tuple[str, Guess]]:
    """Everything said about the work, by key path, the more believable first."""
    about_work = [saying for saying in said if not (saying.marked or _is_tool(saying))]
    yield from _material(about_work, unit)
    yield from _stock(about_work, unit)
    yield from _holding(about_work, unit)


def _is_tool(saying: Saying) -> bool:
    """Whether a comment is about a tool or its cut rather than about the work."""
    return not is_about_work(saying) and bool(named(_SIDES.sub(" ", saying.text), TOOL_KINDS))


def is_about_work(saying: Saying) -> bool:
    """Whether a comment names material, stock or chuck, though it may stand right above a tool call."""
    text = without(saying.text, _BARS_OF_TOOLS)
    labels = (*MATERIAL_LABELS, *STOCK_LABELS, *STICK_OUT_LABELS)
    return not saying.marked and bool(holds(text, labels) or named(text, HOLDING))


def _material(said: Iterable[Saying], unit: str) -> Iterator[tuple[str, Guess]]:
    """The surest first: a labelled name, a name that can be nothing else, a labelled family."""
    ranked: list[tuple[int, Guess]] = []
    for saying in said:
        label, stock = holds(saying.text, MATERIAL_LABELS), holds(saying.text, STOCK_LABELS)
        rest = _BESIDE_LABEL.sub("", saying.text[label.end() :]) if label else saying.text
        found = _catalogue_name(rest, labelled=label is not None, beside_stock=stock is not None)
        found = found or (_inch_grade(rest) if unit == "in" else None)
        family = named(rest, FAMILIES)[:1]
        if found:
            ranked.append((0 if label else 1, Guess(text_value(found), "sure" if label else "likely", saying.place)))
        elif family and (label or stock):
            ranked.append((2, Guess(text_value(family[0]), "guess", f"a family of materials: {saying.place}")))
    for _, guess in sorted(ranked, key=lambda pair: pair[0]):
        yield "workpiece.material", guess


def material_hint(said: Iterable[Saying]) -> str | None:
    """The first comment with a label of material whose material the catalogue does not have."""
    return next((saying.place for saying in said if holds(saying.text, MATERIAL_LABELS)), None)


def _catalogue_name(text: str, *, labelled: bool, beside_stock: bool) -> str | None:
    """The catalogue's name for the longest run of words that is one.

    Without a label only words count that can hardly be anything else: 1.4301, 42CrMo4, 304 SS.
    """
    words = _WORD.findall(text)
    for length in range(min(LONGEST_NAME, len(words)), 0, -1):
        for first in range(len(words) - length + 1):
            run = " ".join(words[first : first + length]).strip(".-/")
            bare = _GLUED_FAMILY.sub("", run)
            for spelling in (run, bare):
                name = _known().get(key_of(spelling))
                mixed = _NUMBERED.fullmatch(spelling) and (beside_stock or len(key_of(spelling)) >= SURE_LETTERS)
                family = bare != run and (beside_stock or len(key_of(bare)) >= FAMILY_DIGITS)
                if name and (labelled or mixed or family):
                    return name
    return None


def _inch_grade(text: str) -> str | None:
    """A steel or alloy by its four digits, as inch shops write it: no size in inches has four without a point."""
    grades = (word for word in _WORD.findall(text) if re.fullmatch(r"\d{4}", word))
    return next((_known()[word] for word in grades if word in _known()), None)


@cache
def _known() -> dict[str, str]:
    """The catalogue's names and other names, letters and digits alone."""
    return {
        key_of(name): item.material.name for item in entries() for name in (*item.aliases, item.material.name)
    }


def _stock(said: Iterable[Saying], unit: str) -> Iterator[tuple[str, Guess]]:
    for saying in said:
        label = holds(saying.text, STOCK_LABELS)
        text = _without_names(saying.text)
        found = list(_measures(text))
        roles = {size.role for size in found}
        about_part = "diameter" in roles and (
            _catalogue_name(saying.text, labelled=False, beside_stock=False)
            or (unit == "in" and _inch_grade(saying.text))
        )
        if label or {"diameter", "length"} <= roles or about_part:
            yield from _by_role(saying, found, unit, "likely" if label else "guess")
            yield from _words(saying)


def _without_names(text: str) -> str:
    """The text without names of materials and words for sections, whose digits are no sizes, up to the stick-out."""
    codes = "|".join(re.escape(word) for word in _WORD.findall(text) if key_of(word) in _known())
    taken = [rf"(?<![A-Z0-9])(?:{codes})(?![A-Z0-9])"] if codes else []
    taken += [rf"(?<![A-Z0-9]){re.escape(word)}(?![A-Z0-9])" for words in SECTIONS.values() for word in words]
    bare = re.sub("|".join(taken), " ", text)
    stick_out = holds(bare, STICK_OUT_LABELS)
    return bare[: stick_out.start()] if stick_out else bare


def _measures(text: str) -> Iterator[Size]:
    """Numbers that can be sizes of stock: marked, right behind the label, or joined to another by an X."""
    found = sizes(text)
    joined = [size.lead == "X" for size in found] + [False]
    for number, size in enumerate(found):
        label = holds(size.lead, STOCK_LABELS)
        placed = joined[number] or joined[number + 1] or (label is not None and label.end() == len(size.lead))
        if size.value > 0.0 and (size.role in _KEYS or (size.role is None and placed)):
            yield size


_IN_ORDER: tuple[tuple[Role, ...], ...] = ((), ("diameter",), ("diameter", "length"), ("diameter", "inside", "length"))
_KEYS: dict[Role, str] = {"diameter": "diameter", "inside": "bore", "length": "length"}
_CORNERS = {"hexagon": 1.0 / math.cos(math.pi / 6.0), "square": math.sqrt(2.0)}  # across corners over across flats


def _by_role(saying: Saying, found: Sequence[Size], unit: str, sure: Sure) -> Iterator[tuple[str, Guess]]:
    """Sizes by their marks; those without one by their order: outside, inside, length."""
    unit = next((size.unit for size in found if size.unit), unit)  # one unit said counts for the comment
    roles = _marked(found)
    bare = [size for size in found if size.role is None]
    count = len(bare) + len(roles)
    free = [role for role in _IN_ORDER[count] if role not in roles] if count < len(_IN_ORDER) else []
    section = next(iter(named(saying.text, SECTIONS)), None)
    for role, size in {**dict(zip(free, bare, strict=False)), **roles}.items():
        if role == "diameter" and section is not None:
            corners = quantity(round(size.value * _CORNERS[section], 3), size.unit or unit)
            why = f"across corners of {size.value:g} across flats: {saying.place}"
            yield "workpiece.diameter", Guess(corners, "guess", why)
        else:
            yield f"workpiece.{_KEYS[role]}", Guess(quantity(size.value, size.unit or unit), sure, saying.place)


def _marked(found: Sequence[Size]) -> dict[Role, Size]:
    """Sizes by their marks; of two diameters the smaller is the bore."""
    roles: dict[Role, Size] = {}
    across = sorted((size for size in found if size.role == "diameter"), key=lambda size: -size.value)
    roles.update(zip(("diameter", "inside"), across, strict=False))
    for size in found:
        if size.role is not None and size.role != "diameter":
            roles[size.role] = size
    return roles


def _words(saying: Saying) -> Iterator[tuple[str, Guess]]:
    for key, words in (("skin", SKINS), ("section", SECTIONS)):
        for name in named(saying.text, words)[:1]:
            yield f"workpiece.{key}", Guess(text_value(name), "likely", saying.place)


def _kind_of_holding(said: Sequence[Saying]) -> Iterator[tuple[str, Guess]]:
    """The most particular first: a chuck in one comment and a live centre in another are a chuck with tailstock."""
    for name in ("centres", "chuck+tailstock", "collet", "chuck"):
        for saying in said:
            if name in named(saying.text, HOLDING):
                yield "workholding.kind", Guess(text_value(name), "likely", saying.place)


def _holding(said: Sequence[Saying], unit: str) -> Iterator[tuple[str, Guess]]:
    yield from _kind_of_holding(said)
    for saying in said:
        kinds = named(saying.text, HOLDING)
        jaws = _JAWS.search(saying.text)
        if jaws:
            yield "workholding.jaws", Guess(jaws[1], "likely", saying.place)
        bored = holds(saying.text, JAWS_BORED) if "chuck" in kinds else None
        for size in sizes(saying.text[bored.end() :])[:1] if bored else []:
            yield "workholding.grip_diameter", Guess(quantity(size.value, size.unit or unit), "guess", saying.place)
        if holds(saying.text, GRIP_INSIDE):
            yield "workholding.grip_inside", Guess("true", "likely", saying.place)
        label = holds(saying.text, STICK_OUT_LABELS)
        for size in sizes(saying.text[label.end() :])[:1] if label else []:
            yield "workholding.stick_out", Guess(quantity(size.value, size.unit or unit), "likely", saying.place)
