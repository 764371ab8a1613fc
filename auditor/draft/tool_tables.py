"""The [tools.N] tables of a draft: kind by words and deeds, codes or outright values by words."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from auditor.declared.model import ToolKind
from auditor.draft.deeds import Deeds
from auditor.draft.guesses import Guess, text_value
from auditor.draft.sheet import Entry, Section
from auditor.draft.sizes import upper
from auditor.draft.tool_words import ToolSaid

# Cutting edge angle that holders for a corner usually have, deg (common practice; styles L, J, G of ISO 5608).
USUAL_EDGE_ANGLES = {'"80 deg"': "95", '"55 deg"': "93", '"35 deg"': "93", '"60 deg"': "93"}
CORNER: tuple[ToolKind, ...] = ("turning", "boring")
SLOTS: tuple[ToolKind, ...] = ("grooving", "face grooving", "parting")
_KINDS = "turning, boring, grooving, face grooving, parting, threading, drilling or stop"


def tool_section(
    deeds: Deeds, said: ToolSaid, library: Mapping[str, str], unit: str, decided: ToolKind | None = None
) -> Section:
    """One tool; ``library`` holds the shop's tools by name with their kinds."""
    kind = kind_of(deeds, said) if decided is None else Guess(f'"{decided}"', "sure", "answered")
    remarks = [_does(deeds, unit), *said.quotes]
    word = kind.word if kind else ""
    same = [name for name, other in library.items() if other == word]
    if same:
        how = f'{deeds.tool} = "NAME" under [tools] takes one instead of this table'
        remarks.append(f"for {word} shop.toml has {', '.join(same)}: {how}")
    return Section(f"tools.{deeds.tool}", tuple(_entries(kind, said)), tuple(remarks))


def named_in_shop(said: ToolSaid, library: Mapping[str, str]) -> Guess | None:
    """The shop's tool whose name a comment has, if it is one alone."""
    found = {name: place for place in said.quotes for name in library if _letters(name) in _letters(upper(place))}
    if len(found) != 1:
        return None
    (name, place), = found.items()
    return Guess(text_value(name), "likely", place)


def _letters(text: str) -> str:
    return f" {' '.join(upper(text).replace('-', ' ').replace('_', ' ').split())} "


def kind_of(deeds: Deeds, said: ToolSaid) -> Guess | None:
    """Words and deeds together: sure when they agree."""
    by_words, by_deeds = said.kinds, deeds.kind
    if not by_words and by_deeds is None:
        return None
    if not by_words:
        return Guess(f'"{by_deeds}"', "likely" if deeds.clear else "guess", f"it {' and '.join(deeds.acts)}")
    if by_deeds is None:
        return Guess(f'"{by_words[0]}"', "likely", said.kind_place)
    if by_deeds in by_words or (by_deeds == "turning" and deeds.inside and "boring" in by_words):
        kind = by_deeds if by_deeds in by_words else "boring"
        return Guess(f'"{kind}"', "sure", f"it {' and '.join(deeds.acts)}, and {said.kind_place}")
    if by_words[0] in SLOTS and by_deeds in SLOTS:  # a plunge looks alike, whatever it is for
        return Guess(f'"{by_words[0]}"', "likely", said.kind_place)
    return Guess(f'"{by_words[0]}"', "guess", f"{said.kind_place}, yet it {' and '.join(deeds.acts)}")


def _does(deeds: Deeds, unit: str) -> str:
    """What the tool does in this program, in one line."""
    scale = 25.4 if unit == "in" else 1.0
    if deeds.lines is None:
        return f"T{deeds.tool}, called in line {deeds.line}: no feed move"
    first, last = deeds.lines
    where = f"line {first}" if first == last else f"lines {first} to {last}"
    parts = [f"T{deeds.tool} {' and '.join(deeds.acts) or 'feeds'} in {where}"]
    if deeds.x is not None and deeds.z is not None:
        x = [_short(2.0 * end / scale) for end in reversed(deeds.x)]
        z = [_short(end / scale) for end in reversed(deeds.z)]
        parts.append(f"X{x[0]} to X{x[1]}, Z{z[0]} to Z{z[1]}")
    if deeds.feeds is not None:
        parts.append(f"F{_span(deeds.feeds, scale)}")
    if deeds.speeds is not None:
        low, high = (f"{speed:.0f}" for speed in deeds.speeds)
        parts.append(f"{low if low == high else f'{low} to {high}'} {'rpm' if deeds.by_rpm else 'm/min'}")
    return ", ".join(parts)


def _span(ends: tuple[float, float], scale: float) -> str:
    low, high = (_short(end / scale) for end in ends)
    return low if low == high else f"{low} to {high}"


def _short(value: float) -> str:
    return f"{value:.4f}".rstrip("0").rstrip(".") or "0"


def _entries(kind: Guess | None, said: ToolSaid) -> Iterator[Entry]:
    yield Entry.of("kind", kind, _KINDS)
    values = said.values
    word = kind.word if kind else ""
    if word in CORNER:
        yield from _corner(word, values)
    elif word in SLOTS:
        yield Entry.of("width", values.get("width"), 'of the insert, such as "3 mm"')
        yield Entry.optional("nose_radius", values.get("nose_radius"), '"0.2 mm"', "corners of the insert")
    elif word == "threading":
        yield Entry.optional("included_angle", values.get("included_angle"), '"60 deg"', "of the thread")
        yield from _codes(values)
    elif word == "drilling":
        yield Entry.of("diameter", values.get("diameter"), 'of the drill, such as "12 mm"')
        yield Entry.optional("point_angle", values.get("point_angle"), '"118 deg"', "the common twist drill")
    if word and word != "stop":
        yield from _common(word, values)


def _corner(word: str, values: Mapping[str, Guess]) -> Iterator[Entry]:
    """Codes, or outright what codes would say."""
    bar = word == "boring"
    insert, holder = ("CCMT 09T304", "S20S-SCLCR 09") if bar else ("CNMG 120408", "PCLNR 2525 M12")
    outright = "insert" not in values and {"nose_radius", "included_angle"} <= set(values)
    if outright:
        yield Entry.optional("insert", None, f'"{insert}"', "its code (ISO 1832) tells more than the two values below")
    else:
        yield Entry.of("insert", values.get("insert"), f'its code (ISO 1832), such as "{insert}"')
    if "insert" not in values:
        yield from (Entry.of(key, values[key], "") for key in ("nose_radius", "included_angle") if key in values)
    if outright and "holder" not in values:
        usual = USUAL_EDGE_ANGLES.get(values["included_angle"].value)
        hint = f", usual for this corner: {usual} deg" if usual else ' such as "95 deg"'
        yield Entry.of("cutting_edge_angle", None, f'of the holder{hint}; or holder = "{holder}"')
    else:
        code = "ISO 6261" if bar else "ISO 5608"
        yield Entry.of("holder", values.get("holder"), f'its code ({code}), such as "{holder}"')


def _codes(values: Mapping[str, Guess]) -> Iterator[Entry]:
    yield from (Entry.of(key, values[key], "") for key in ("insert", "holder", "nose_radius") if key in values)


def _common(word: str, values: Mapping[str, Guess]) -> Iterator[Entry]:
    if "hand" in values:
        yield Entry.of("hand", values["hand"], "")
    yield Entry.optional("substrate", values.get("substrate"), '"coated carbide"', "or carbide, high-speed steel ...")
    yield Entry.optional("overhang", None, '"35 mm"', "how far it stands out: without it its bending is not judged")
    if word == "boring":
        yield Entry.optional("bar_diameter", values.get("bar_diameter"), '"20 mm"', "if the bar's code does not tell")
    if word != "drilling":
        yield Entry.optional("speed", None, '["150 m/min", "300 m/min"]', "range the insert is made for")


