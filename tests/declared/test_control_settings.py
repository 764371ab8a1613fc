"""The table of settings on which controls differ."""

from __future__ import annotations

import re

import pytest

from auditor.declared.control_settings import SETTINGS, amount, choice, setting, switch
from auditor.declared.model import Control


@pytest.mark.parametrize("entry", SETTINGS.values(), ids=SETTINGS)
def test_every_setting_is_whole(entry) -> None:  # type: ignore[no-untyped-def]
    assert re.fullmatch(r"[a-z_]+", entry.name)
    assert entry.touches
    assert entry.wanted
    if entry.choices:
        assert entry.default == entry.choices[0]
        assert len(set(entry.choices)) == len(entry.choices) >= 2
    elif not isinstance(entry.default, bool):
        assert entry.low <= entry.default <= entry.high


def test_declared_beats_usual() -> None:
    control = Control(settings={"rapid_path": "straight", "rough_retract": 0.3, "nested_comments": True})
    assert choice(control, "rapid_path") == "straight"
    assert amount(control, "rough_retract") == 0.3
    assert switch(control, "nested_comments") is True
    assert setting(Control(), "rapid_path") == "dogleg"


def test_a_misspelt_name_in_the_code_is_loud() -> None:
    with pytest.raises(KeyError):
        setting(Control(), "rapid_paht")
    with pytest.raises(TypeError):
        amount(Control(), "rapid_path")
    with pytest.raises(TypeError):
        choice(Control(), "rough_retract")
    with pytest.raises(TypeError):
        switch(Control(), "rough_retract")
    with pytest.raises(TypeError):
        amount(Control(), "nested_comments")
