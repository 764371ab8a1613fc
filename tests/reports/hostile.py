"""An audit in which every text that a stranger can write is written by one who means harm."""

from __future__ import annotations

from dataclasses import replace

from auditor.declared.model import Acceptance, Assumption
from auditor.findings import Audit, NotJudged
from auditor.interpret.moves import NotAudited
from tests.reports import builders

# Breaks out of attributes, elements, comments and CDATA; runs a script; turns the line round; clears a screen.
TEXT = (
    "\"'`><script>alert(1)</script><img src=x onerror=alert(1)>]]>--><!--</style></svg>{{7*7}}{%x%}"
    "\x1b[2J\u202e\x00&lt;"
)


def audit() -> Audit:
    """Names, comments, reasons and values, all of them hostile."""
    declared = builders.job()
    work = declared.workpiece
    tool = replace(declared.tools[1], name=TEXT, insert=TEXT, holder=TEXT)
    material = replace(work.material, name=TEXT, title=TEXT, source=TEXT)
    declared = replace(
        declared, path=TEXT, tools={1: tool}, workpiece=replace(work, material=material),
        machine=replace(declared.machine, name=TEXT), workholding=replace(declared.workholding, name=TEXT),
    )
    finding = builders.power_finding(message=TEXT, remedy=TEXT, situation=TEXT, block=TEXT, unit=TEXT)
    return builders.audit(
        [finding, builders.power_finding(accepted=Acceptance("spindle-power", TEXT), fingerprint="2"),
         builders.review_finding()],
        verdict="stop", path=f"{TEXT}.nc",
        source=builders.PROGRAM.replace("DRIVE STUB", TEXT).replace("N50", "N50 <b>"),
        not_audited=[NotAudited(10, TEXT, TEXT)], not_judged=[NotJudged(TEXT, TEXT)],
        assumptions=[Assumption(TEXT, TEXT, TEXT)], declared=declared,
    )
