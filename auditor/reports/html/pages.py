"""Templates to text: every value from a stranger's file is escaped, control signs become question marks."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cache
from importlib.metadata import version
from importlib.resources import files

from jinja2 import Environment, FunctionLoader, StrictUndefined
from markupsafe import Markup

from auditor.reports._figures import harmless
from auditor.reports._grounds import CAUTION


@dataclass(frozen=True, slots=True)
class Entry:
    """A program in the list at the head of a page."""

    key: str
    verdict: str
    name: str
    counts: str


def fragment(name: str, **values: object) -> str:
    """A part of a page."""
    return _environment().get_template(name).render(**values)


def page(title: str, body: str, entries: Sequence[Entry] = ()) -> str:
    """A whole page round markup that came from ``fragment``."""
    return fragment("page.html", title=title, body=Markup(body), entries=entries, style=Markup(_text("style.css")))


@cache
def _environment() -> Environment:
    made = Environment(
        loader=FunctionLoader(lambda name: _text(f"templates/{name}")), autoescape=True, undefined=StrictUndefined,
        trim_blocks=True, lstrip_blocks=True, finalize=_harmless,
    )
    made.globals.update(version=version("turnaudit"), caution=CAUTION)
    return made


def _harmless(value: object) -> object:
    """What a template may write: markup as it is, any other text without signs that a reader's program obeys."""
    return harmless(value) if isinstance(value, str) and not isinstance(value, Markup) else value


@cache
def _text(name: str) -> str:
    return (files(__package__) / name).read_text(encoding="utf-8")
