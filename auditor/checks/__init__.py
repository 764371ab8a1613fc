"""One file a check. A check is found by walking this folder: adding a file adds a check, nothing else is edited."""

from __future__ import annotations

import importlib
import pkgutil
from collections.abc import Iterator
from functools import cache
from types import ModuleType

from auditor.checks._judging import one_per_block
from auditor.findings import Finding, NotJudged, Rule, Run

SECTIONS = ("What", "Why", "Formula and source", "Remedy")


@cache
def rules() -> dict[str, Rule]:
    """Every check of this folder by name; TypeError with the file's name when one lacks a part."""
    found: dict[str, Rule] = {}
    for entry in pkgutil.iter_modules(__path__):
        if not entry.name.startswith("_"):
            rule = as_rule(importlib.import_module(f"{__name__}.{entry.name}"))
            add(found, rule)
    return found


def add(found: dict[str, Rule], rule: Rule) -> None:
    """Put a rule among the others; two rules of one name, or two meanings of one limit, are refused."""
    if rule.name in found:
        raise TypeError(f"two checks are called {rule.name}: rename one of the files")
    for other in found.values():
        for limit in other.limits:
            if any(own.name == limit.name and own != limit for own in rule.limits):
                raise TypeError(f"limit {limit.name} means one thing in {other.name} and another in {rule.name}")
    found[rule.name] = rule


def as_rule(module: ModuleType) -> Rule:
    """The rule a check file holds."""
    name = module.__name__.rpartition(".")[2].replace("_", "-")
    text = (module.__doc__ or "").strip()
    missing = [section for section in SECTIONS if f"\n{section}\n" not in text]
    missing += [part for part in ("LIMITS", "judge") if not hasattr(module, part)]
    if missing:
        raise TypeError(f"check {name} ({module.__file__}) lacks: {', '.join(missing)}")

    def judge(run: Run) -> Iterator[Finding | NotJudged]:
        return one_per_block(module.judge(run))

    return Rule(name=name, title=text.partition("\n")[0], text=text, limits=module.LIMITS, judge=judge)
