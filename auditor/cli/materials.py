"""``turnaudit materials``: the catalogue, with every figure's source and what others say."""

from __future__ import annotations

import textwrap
from collections.abc import Iterator
from typing import TYPE_CHECKING

import click

from auditor.cli._talk import tell

if TYPE_CHECKING:
    from auditor.declared.material_files import Entry, Figure
    from auditor.declared.model import Material

_WIDTH = 80
_GROUPS = {
    "P": "steel",
    "M": "stainless steel",
    "K": "cast iron",
    "N": "non-ferrous metals",
    "S": "heat-resistant alloys and titanium",
    "H": "hardened steel and cast iron",
    "O": "plastics",
}
_WORDS = {
    "kc11": "cutting force at h = b = 1 mm, kc1.1",
    "mc": "its exponent mc",
    "kf11": "feed force at h = b = 1 mm, kf1.1",
    "mf": "its exponent mf",
    "kp11": "passive force at h = b = 1 mm, kp1.1",
    "mp": "its exponent mp",
    "reference_rake": "rake these were measured at",
    "friction_angle": "friction angle",
    "scatter": "scatter of a force, one side",
    "tensile_strength": "tensile strength",
    "modulus": "modulus of elasticity",
    "built_up_edge": "built-up edge at",
    "work_hardening": "hardens under the tool",
}
_DEPTH, _FEED = 2.0, 0.2  # mm, of the worked figure


@click.command(short_help="Show the material catalogue with its sources.")
@click.argument("name", required=False)
def command(name: str | None) -> None:
    """Show the material catalogue: every figure, where it comes from and how well it is known.

    Without a NAME: the list of all materials. A NAME may be a material number or another country's name.
    """
    from auditor.declared import materials
    from auditor.errors import DeclarationError

    try:
        if name is None:
            tell("\n".join(_listed(materials.entries())))
            return
        found = materials.entry(name)
        if found is None:
            raise click.BadParameter(_unknown(name, materials.nearest(name)), param_hint="NAME")
    except DeclarationError as error:
        raise click.ClickException(str(error)) from error
    tell("\n".join(_described(found)))


def _listed(entries: tuple[Entry, ...]) -> Iterator[str]:
    """All materials by group, with the force pair and how well it is known."""
    width = max(len(item.material.name) for item in entries)
    group = ""
    for item in entries:
        material = item.material
        if material.group != group:
            group = material.group
            yield from ("", f"{group}  {_GROUPS[group]}") if group != "P" else (f"{group}  {_GROUPS[group]}",)
        pair = "no force pair" if material.kc11 is None else f"{material.kc11:5.0f}  {material.mc:.2f}"
        how = "" if material.kc11 is None else material.provenance
        yield f"  {material.name:<{width}}  {pair:<13}  {how}".rstrip()
    yield from ("", "Figures: kc1.1 in N/mm^2 and mc. `turnaudit materials NAME` says more about one of them.")


def _unknown(name: str, near: tuple[str, ...]) -> str:
    meant = f"did you mean {' or '.join(near)}?" if near else "`turnaudit materials` lists them all."
    return f"{name!r} is not in the catalogue; {meant}"


def _described(item: Entry) -> Iterator[str]:
    material = item.material
    yield material.name
    yield "=" * len(material.name)
    yield from _wrapped(f"{material.title}. Group {material.group}, {_GROUPS[material.group]}.")
    numbers = _numbered(item.figures)
    names = [figure for figure in item.figures if figure.key == "aliases"]
    for figure in names:
        yield from _wrapped(f"Also called {figure.text} ({_known(figure, numbers)}).")
    yield ""
    for figure in item.figures:
        if figure not in names:
            words = _WORDS.get(figure.key, figure.key)
            yield f"  {words:<38}{_value(figure):<21}{_known(figure, numbers)}"
    yield from ("", "Sources")
    for (source, row), number in numbers.items():
        yield from _wrapped(f"[{number}] {source}" + (f"; row {row}" if row else ""), "  ", "      ")
    if item.others:
        yield from ("", "What other sources say")
    for other in item.others:
        name = f"{other.source}; row {other.row}" if other.row else other.source
        yield from _wrapped(f"{str(other)[0].upper()}{str(other)[1:]}: {name} ({other.provenance}).", "  ", "      ")
    yield from ("", "Worked figure")
    yield from _wrapped(_worked(material), "  ", "  ")


def _numbered(figures: tuple[Figure, ...]) -> dict[tuple[str, str | None], int]:
    """Every source once, numbered in the order of the figures."""
    used = dict.fromkeys((figure.source, figure.row) for figure in figures)
    return {source: number for number, source in enumerate(used, start=1)}


def _known(figure: Figure, numbers: dict[tuple[str, str | None], int]) -> str:
    return f"{figure.provenance} [{numbers[figure.source, figure.row]}]"


def _value(figure: Figure) -> str:
    return f"{float(figure.text) * 100:.0f} %" if figure.key == "scatter" else figure.text.replace(", ", " to ")


def _worked(material: Material) -> str:
    if material.kc11 is None or material.mc is None:
        return "No force pair is published for this material: forces stay open, the rules of geometry still apply."
    from auditor.mechanics.kienzle import cutting_force

    force = float(cutting_force(material.kc11, material.mc, _FEED, _DEPTH))
    low, high = (force * (1.0 + side * material.scatter) for side in (-1.0, 1.0))
    return (
        f"Depth {_DEPTH:g} mm, feed {_FEED:g} mm, cutting edge at 90 deg, rake {material.reference_rake:+g} deg, "
        f"sharp: h = {_FEED:g} mm, b = {_DEPTH:g} mm, cutting force {material.kc11:g} x {_DEPTH:g} x {_FEED:g}"
        f"^(1 - {material.mc:g}) = {force:.0f} N ({low:.0f} to {high:.0f} N)."
    )


def _wrapped(text: str, first: str = "", later: str = "") -> list[str]:
    return textwrap.wrap(text, _WIDTH, initial_indent=first, subsequent_indent=later, break_long_words=False)
