"""SARIF 2.1.0 (OASIS), for code hosts and editors that show results beside the program's lines.

Every check is a rule that carries its own text; a result points at the words at fault. What a person accepted is
suppressed and keeps the reason; a block that was not audited is a notification, and the invocation then counts as
not successful, so that nobody takes silence for a clean program.
"""

from __future__ import annotations

import json
from collections.abc import Iterator, Sequence
from importlib.metadata import version
from typing import Any

from auditor.errors import Fault
from auditor.findings import Audit, Finding, Level, Limit, Rule
from auditor.parse.blocks import ProgramText
from auditor.reports import Outcome, Unreadable, View
from auditor.reports._inert import lines, one_line, told
from auditor.reports._marks import block_at, spans
from auditor.reports._rows import between, diameter, number
from auditor.reports._uri import uri

Object = dict[str, Any]

_SCHEMA = "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json"
_LEVELS = {Level.STOP: "error", Level.REVIEW: "warning", Level.NOTE: "note"}
_FINGERPRINT = "turnaudit/v1"
_BASE = "%SRCROOT%"
_LITERAL = str.maketrans(dict(zip("{}[]", ("{{", "}}", "\\[", "\\]"), strict=True)))


def render(outcome: Outcome, view: View) -> str:
    """What one program adds to the run."""
    part = _unreadable(outcome) if isinstance(outcome, Unreadable) else _audit(outcome)
    return json.dumps(part, allow_nan=False)


def join(parts: Sequence[str], several: bool) -> str:
    """One run over all programs."""
    found = [json.loads(part) for part in parts]
    rules = {rule["id"]: rule for part in found for rule in part["rules"]}
    order = {name: place for place, name in enumerate(sorted(rules))}
    results = [{**result, "ruleIndex": order[result["ruleId"]]} for part in found for result in part["results"]]
    driver = {
        "name": "turnaudit", "version": version("turnaudit"), "semanticVersion": version("turnaudit"),
        "shortDescription": {"text": "Audits CNC lathe programs before they meet metal."},
        "rules": [rules[name] for name in order],
    }
    run = {
        "tool": {"driver": driver},
        "invocations": [{
            "executionSuccessful": all(part["whole"] for part in found),
            "toolExecutionNotifications": [note for part in found for note in part["notifications"]],
        }],
        "artifacts": [part["artifact"] for part in found],
        "results": results,
        "columnKind": "unicodeCodePoints",
        "newlineSequences": ["\r\n", "\n", "\r"],
    }
    return json.dumps({"$schema": _SCHEMA, "version": "2.1.0", "runs": [run]}, indent=1, allow_nan=False) + "\n"


def _audit(audit: Audit) -> Object:
    text = audit.run.text
    return {
        "whole": not audit.coverage.not_audited,
        "artifact": {
            "location": _artifact(text.path), "roles": ["analysisTarget"], "hashes": {"sha-256": text.sha256},
            "properties": {"verdict": audit.verdict},
        },
        "rules": [_rule(rule) for rule in audit.rules.values()],
        "results": [_result(finding, text) for finding in audit.findings],
        "notifications": list(_notifications(audit)),
    }


def _unreadable(outcome: Unreadable) -> Object:
    return {
        "whole": False,
        "artifact": {"location": _artifact(outcome.path), "properties": {"verdict": "unreadable"}},
        "rules": [], "results": [],
        "notifications": [_fault(fault, outcome.path) for fault in outcome.faults],
    }


def _artifact(path: str) -> Object:
    place = uri(path)
    return {"uri": place} if place.startswith("file:") else {"uri": place, "uriBaseId": _BASE}


def _said(text: str) -> Object:
    """A message: SARIF gives braces and square brackets a meaning that a plain text must be kept from."""
    return {"text": text.translate(_LITERAL)}


def _rule(rule: Rule) -> Object:
    thresholds = [_threshold(limit) for limit in rule.limits]
    body = rule.text.strip() + ("\n\nThresholds\n    " + "\n    ".join(thresholds) if thresholds else "")
    return {
        "id": rule.name,
        "name": "".join(word.capitalize() for word in rule.name.split("-")),
        "shortDescription": {"text": rule.title},
        "fullDescription": {"text": rule.title},
        "help": {"text": lines(body)},
    }


def _threshold(limit: Limit) -> str:
    value = f"{limit.default:g} {limit.unit}".rstrip()
    return f"{limit.name} = {value} ({limit.provenance}): {limit.meaning}"


def _result(finding: Finding, text: ProgramText) -> Object:
    block = "" if finding.block is None else f"{finding.block}: "
    suppressions: list[Object] = []
    if finding.accepted is not None:
        reason = one_line(finding.accepted.reason)
        suppressions = [{"kind": "external", "status": "accepted", "justification": reason}]
    return {
        "ruleId": finding.check,
        "level": _LEVELS[finding.level],
        "message": _said(one_line(block + told(finding.message, finding.remedy))),
        "locations": [_location(text.path, _region(finding, text))],
        "partialFingerprints": {_FINGERPRINT: finding.fingerprint},
        "suppressions": suppressions,
        "properties": _properties(finding),
    }


def _properties(finding: Finding) -> Object:
    """The figures, for those who read them from here."""
    at = finding.at
    figures: Object = {
        "tool": finding.tool, "value": number(finding.value), "limit": number(finding.limit), "unit": finding.unit,
        "band": None if finding.band is None else between(*finding.band),
        "x_mm": None if at is None else diameter(at.r), "z_mm": None if at is None else number(at.z),
    }
    return {key: figure for key, figure in figures.items() if figure is not None}


def _region(finding: Finding, text: ProgramText) -> Object:
    """The words at fault, from the first to the last; else the block without the blanks round it."""
    block = block_at(text, finding.line)
    if block is None:
        return {"startLine": max(1, finding.line)}
    marked = spans(finding, block)
    source = block.text
    start = marked[0][0] if marked else len(source) - len(source.lstrip())
    end = marked[-1][1] if marked else len(source.rstrip())
    region: Object = {"startLine": block.line, "startColumn": start + 1, "endLine": block.line, "endColumn": end + 1}
    return {**region, "snippet": {"text": one_line(source[start:end])}} if end > start else {"startLine": block.line}


def _location(path: str, region: Object | None) -> Object:
    physical: Object = {"artifactLocation": _artifact(path)}
    return {"physicalLocation": physical if region is None else {**physical, "region": region}}


def _notifications(audit: Audit) -> Iterator[Object]:
    path = audit.run.text.path
    for block in audit.coverage.not_audited:
        said = f"not audited: {block.reason}: {block.text.strip()}"
        yield {
            "level": "error", "message": _said(one_line(said)),
            "locations": [_location(path, {"startLine": max(1, block.line)})],
        }
    for item in audit.not_judged:
        yield {
            "level": "note", "message": _said(one_line(f"{item.check} not judged: {item.why}")),
            "locations": [_location(path, None)],
        }


def _fault(fault: Fault, path: str) -> Object:
    region = None if fault.line is None else {"startLine": max(1, fault.line)}
    return {
        "level": "error", "message": _said(one_line(str(fault))),
        "locations": [_location(fault.file or path, region)],
    }
