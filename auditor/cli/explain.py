"""``turnaudit explain``: what a check computes, with its thresholds and where they come from."""

from __future__ import annotations

from collections.abc import Mapping
from typing import TYPE_CHECKING

import click

from auditor.cli._talk import tell

if TYPE_CHECKING:
    from auditor.findings import Limit, Rule


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
    lines = [f"{name:<{width}}  {rule.title}" for name, rule in sorted(known.items())]
    return "\n".join([*lines, "", "turnaudit explain CHECK says more about one of them."])


def _unknown(check: str, name: str, known: Mapping[str, Rule]) -> str:
    from difflib import get_close_matches

    near = get_close_matches(name, known, n=3)
    meant = f"did you mean {' or '.join(near)}?" if near else "`turnaudit explain` lists them all."
    return f"{check!r} is no check; {meant}"


def _explained(rule: Rule) -> str:
    lines = [rule.name, "=" * len(rule.name), "", rule.text.strip()]
    if rule.limits:
        lines += ["", "Thresholds, to be set in [limits] of the job file:"]
        lines += [_threshold(limit) for limit in rule.limits]
    return "\n".join(lines)


def _threshold(limit: Limit) -> str:
    default = f"{limit.default:g} {limit.unit}".rstrip()
    return f"  {limit.name} = {default}  ({limit.provenance}): {limit.meaning}"
