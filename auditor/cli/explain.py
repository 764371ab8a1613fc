"""``turnaudit explain``: what a check computes, with its thresholds and where they come from."""

from __future__ import annotations

import itertools
import textwrap
from collections.abc import Iterator, Mapping
from typing import TYPE_CHECKING

import click

from auditor.cli._talk import tell

if TYPE_CHECKING:
    from auditor.findings import Limit, Rule

_WIDTH = 80


@click.command(short_help="Say what a check computes, and from what.")
@click.argument("check", required=False)
def command(check: str | None) -> None:
    """Say what a check computes: formula, thresholds and where they come from, what to do about it.

    Without a CHECK: the list of all checks.
    """
    from auditor.checks import rules

    known = rules()
    if check is None:
        tell(_listed(known))
        return
    name = check.replace("_", "-").lower()
    if name not in known:
        raise click.BadParameter(_unknown(check, name, known), param_hint="CHECK")
    tell(_explained(known[name]))


def _listed(known: Mapping[str, Rule]) -> str:
    width = max(map(len, known), default=0)
    lines = []
    for name, rule in sorted(known.items()):
        lead = f"{name:<{width}}  "
        lines += textwrap.wrap(rule.title, _WIDTH, initial_indent=lead, subsequent_indent=" " * len(lead))
    return "\n".join([*lines, "", "turnaudit explain CHECK says more about one of them."])


def _unknown(check: str, name: str, known: Mapping[str, Rule]) -> str:
    from difflib import get_close_matches

    near = get_close_matches(name, known, n=3)
    meant = f"did you mean {' or '.join(near)}?" if near else "`turnaudit explain` lists them all."
    return f"{check!r} is no check; {meant}"


def _explained(rule: Rule) -> str:
    lines = [rule.name, "=" * len(rule.name), "", *_narrowed(rule.text.strip())]
    if rule.limits:
        lines += ["", "Thresholds, to be set in [limits] of the job file"]
        for limit in rule.limits:
            lines += textwrap.wrap(_threshold(limit), _WIDTH, initial_indent="    ", subsequent_indent="        ")
    return "\n".join(lines)


def _narrowed(text: str) -> Iterator[str]:
    """The text with those paragraphs wrapped anew that are too wide for a terminal."""
    for (margin, _), group in itertools.groupby(text.splitlines(), key=lambda line: (_margin(line), not line.strip())):
        lines = list(group)
        if max(map(len, lines)) <= _WIDTH:
            yield from lines
        else:
            words = " ".join(line.strip() for line in lines)
            yield from textwrap.wrap(words, _WIDTH, initial_indent=margin, subsequent_indent=margin)


def _margin(line: str) -> str:
    return line[: len(line) - len(line.lstrip())]


def _threshold(limit: Limit) -> str:
    default = f"{limit.default:g} {limit.unit}".rstrip()
    return f"{limit.name} = {default} ({limit.provenance}): {limit.meaning}"
