"""A check is a file of the folder; one that lacks a part, or says what another says, is refused by name."""

from __future__ import annotations

import importlib
from dataclasses import replace
from pathlib import Path
from types import ModuleType

import pytest

import auditor.checks
from auditor.checks import SECTIONS, add, as_rule, rules
from auditor.findings import Limit
from auditor.interpret.topics import TOPICS

FILES = sorted(
    path.stem for path in Path(auditor.checks.__file__).parent.glob("*.py") if not path.stem.startswith("_")
)
TEXT = "Is it so?\n\n" + "\n\n".join(f"{section}\n    …" for section in SECTIONS) + "\n"


def module(name: str, text: str = TEXT, **parts: object) -> ModuleType:
    made = ModuleType(f"auditor.checks.{name}", text)
    made.__file__ = f"{name}.py"
    for part, value in parts.items():
        setattr(made, part, value)
    return made


def test_every_file_is_a_check_named_like_it() -> None:
    assert sorted(rules()) == [stem.replace("_", "-") for stem in FILES]


def test_a_check_speaks_under_its_own_name() -> None:
    for stem in FILES:
        assert stem.replace("_", "-") == importlib.import_module(f"auditor.checks.{stem}").CHECK


@pytest.mark.parametrize("missing", ["LIMITS", "judge"])
def test_a_missing_part_is_named(missing: str) -> None:
    parts = {"LIMITS": (), "judge": lambda run: iter(())}
    del parts[missing]
    with pytest.raises(TypeError, match=rf"check half-done \(half_done\.py\) lacks: {missing}"):
        as_rule(module("half_done", **parts))


def test_a_missing_section_is_named() -> None:
    with pytest.raises(TypeError, match="lacks: Remedy"):
        as_rule(module("half_done", TEXT.replace("Remedy\n", "\n"), LIMITS=(), judge=lambda run: iter(())))


def test_two_checks_of_one_name_are_refused() -> None:
    rule = rules()["spindle-power"]
    with pytest.raises(TypeError, match="two checks are called spindle-power"):
        add(dict(rules()), rule)


def test_one_limit_has_one_meaning() -> None:
    other = replace(
        rules()["spindle-power"], name="other", limits=(Limit("power_share", 0.5, "", "declared", "something else"),)
    )
    with pytest.raises(TypeError, match="limit power_share means one thing in spindle-power and another in other"):
        add({"spindle-power": rules()["spindle-power"]}, other)


@pytest.mark.parametrize("check", sorted(TOPICS))
def test_every_topic_has_a_level(check: str) -> None:
    """A new fact about the text wants a decision about its level."""
    levels = getattr(importlib.import_module(f"auditor.checks.{check.replace('-', '_')}"), "LEVELS", None)
    if levels is None:
        pytest.skip("judges its topics one by one")
    elsewhere = {"program-flow": {"stop-unattended"}}  # depends on the job
    assert TOPICS[check] - set(levels) - elsewhere.get(check, set()) == set()
