"""Every check trips on its fixture programs and keeps silent on the near misses.

What each program must bring forth stands, with its reason, in fixtures/checks/NAME/cases.toml; the reasons are
closed forms, published figures or common practice, worked out by hand.
"""

from __future__ import annotations

import pytest

from auditor.checks import rules
from tests.checks.cases import Case, audited, audited_with, cases, of_check


def name_of(case: Case) -> str:
    return f"{case.check}/{case.name}"


@pytest.mark.parametrize("case", cases(), ids=name_of)
def test_case(case: Case) -> None:
    found = of_check(audited(case.program), case.check)
    told = [(finding.level.value, finding.line, finding.message) for finding in found]
    if case.level == "none":
        assert not found, told
    else:
        gravest = min(found, key=lambda finding: ["stop", "review", "note"].index(finding.level), default=None)
        assert gravest is not None, "no finding"
        assert gravest.level == case.level, told
        if case.line is not None:
            assert case.line in [finding.line for finding in found if finding.level == case.level], told


@pytest.mark.parametrize("case", [case for case in cases() if case.trips_with], ids=name_of)
def test_near_miss_is_near(case: Case) -> None:
    limits = {limit.name: limit for limit in rules()[case.check].limits}
    for name, value in case.trips_with.items():
        assert value == pytest.approx(limits[name].default, rel=0.101)
    before = of_check(audited(case.program), case.check)
    after = of_check(audited_with(case.program, case.trips_with), case.check)
    assert [(item.level, item.line) for item in after] != [(item.level, item.line) for item in before]


def test_one_finding_a_block() -> None:
    for case in cases():
        found = [finding.line for finding in of_check(audited(case.program), case.check)]
        assert len(found) == len(set(found)), name_of(case)


def test_every_check_has_a_tripping_program_and_a_near_miss() -> None:
    levels: dict[str, set[str]] = {}
    for case in cases():
        levels.setdefault(case.check, set()).add("silent" if case.level == "none" else "trips")
    assert {name for name in rules() if "trips" not in levels.get(name, set())} == set()
    assert set(levels) <= set(rules())


@pytest.mark.parametrize("name", sorted(rules()))
def test_text_is_worth_reading(name: str) -> None:
    rule = rules()[name]
    assert rule.title.endswith("?"), "the title asks the check's question"
    assert "\t" not in rule.text
    for limit in rule.limits:
        assert len(limit.meaning.split()) > 1, limit.name
        assert limit.meaning.split()[-1] not in ("under", "over", "than", "above", "from", "least"), limit.meaning
