"""JUnit XML: a test suite per program, a test case per check, for CI systems that show tests.

A case fails exactly where the run would (``--fail-on``); what counts less stands in its output. What could not be
judged is skipped, a block that could not be audited is an error.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Sequence
from xml.etree.ElementTree import Element, SubElement, fromstring, indent, tostring

from auditor.findings import Audit, Finding
from auditor.reports import Outcome, Unreadable, View
from auditor.reports._figures import figure
from auditor.reports._inert import lines, one_line, told

_COUNTED = {"failures": "failure", "errors": "error", "skipped": "skipped"}


def render(outcome: Outcome, view: View) -> str:
    """One program's suite."""
    path = outcome.path if isinstance(outcome, Unreadable) else outcome.run.text.path
    suite = Element("testsuite", name=one_line(path))
    if isinstance(outcome, Unreadable):
        _unreadable(suite, outcome)
    else:
        _audit(suite, outcome, view)
    _count(suite, suite.iter("testcase"))
    return tostring(suite, encoding="unicode")


def join(parts: Sequence[str], several: bool) -> str:
    """All suites in one document."""
    whole = Element("testsuites", name="turnaudit")
    whole.extend(fromstring(part) for part in parts)
    _count(whole, whole.iter("testcase"))
    indent(whole)
    return f'<?xml version="1.0" encoding="UTF-8"?>\n{tostring(whole, encoding="unicode")}\n'


def _count(parent: Element, cases: Iterable[Element]) -> None:
    found = list(cases)
    parent.set("tests", str(len(found)))
    for attribute, tag in _COUNTED.items():
        parent.set(attribute, str(sum(case.find(tag) is not None for case in found)))
    parent.set("time", "0")


def _case(suite: Element, name: str) -> Element:
    return SubElement(suite, "testcase", classname=suite.get("name", ""), name=one_line(name), time="0")


def _unreadable(suite: Element, outcome: Unreadable) -> None:
    case = _case(suite, "readable")
    error = SubElement(case, "error", type="unreadable", message="not audited")
    error.text = "\n".join(one_line(str(fault)) for fault in outcome.faults)


def _audit(suite: Element, audit: Audit, view: View) -> None:
    coverage = _case(suite, "every motion block audited")
    if audit.coverage.not_audited:
        missing = audit.coverage.not_audited
        error = SubElement(coverage, "error", type="incomplete", message=f"{len(missing)} motion blocks not audited")
        error.text = "\n".join(one_line(f"line {block.line}: {block.text}: {block.reason}") for block in missing)
    found: dict[str, list[Finding]] = defaultdict(list)
    for finding in audit.findings:
        found[finding.check].append(finding)
    whys: dict[str, list[str]] = defaultdict(list)
    for item in audit.not_judged:
        whys[item.check].append(item.why)
    for name in sorted({*audit.rules, *found}):
        _judged(_case(suite, name), found[name], whys[name], view)


def _judged(case: Element, findings: Sequence[Finding], whys: Sequence[str], view: View) -> None:
    failed = [finding for finding in findings if finding.level in view.failing and finding.accepted is None]
    if failed:
        worst = failed[0]
        failure = SubElement(case, "failure", type=str(worst.level), message=one_line(worst.message))
        failure.text = "\n".join(map(_said, failed))
    elif whys:
        SubElement(case, "skipped", message=one_line("not judged: " + "; ".join(whys)))
    other = [finding for finding in findings if finding not in failed]
    if other:
        SubElement(case, "system-out").text = "\n".join(map(_said, other))


def _said(finding: Finding) -> str:
    block = f" {finding.block}" if finding.block else ""
    text = f"{finding.level} line {finding.line}{block}: {told(finding.message, finding.remedy)}"
    if finding.value is not None and finding.limit is not None:
        text += f" ({figure(finding.value, finding.unit)}, limit {figure(finding.limit, finding.unit)})"
    if finding.accepted is not None:
        text += f" Accepted: {finding.accepted.reason}"
    return lines(text)
