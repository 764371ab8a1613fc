"""The report with pictures: one self-contained file, readable without script or network, fit for a sign-off on paper.

In this order: may this run, what must change, why believe it.
"""

from __future__ import annotations

import hashlib
import json
from collections.abc import Sequence

from auditor.reports import Outcome, Unreadable, View
from auditor.reports.html.pages import Entry, fragment, page
from auditor.reports.html.sheet import name_of, sheet, unreadable_sheet

__all__ = ["join", "render"]


def render(outcome: Outcome, view: View) -> str:
    """One program's sheet, with what a list of several programs says of it."""
    if isinstance(outcome, Unreadable):
        key = _key(outcome.path)
        made = unreadable_sheet(outcome)
        return json.dumps([key, "unreadable", name_of(outcome.path), made.counts,
                           fragment("unreadable.html", sheet=made, key=key)])
    key = _key(outcome.run.text.path)
    whole = sheet(outcome, key)
    return json.dumps([key, outcome.verdict, whole.name, whole.counts, fragment("sheet.html", sheet=whole, key=key)])


def join(parts: Sequence[str], several: bool) -> str:
    """All sheets in one page, behind a list of them when there are several."""
    read = [json.loads(part) for part in parts]
    entries = [Entry(key, verdict, name, counts) for key, verdict, name, counts, _ in read]
    title = f"{entries[0].verdict.upper()}: {entries[0].name}" if len(entries) == 1 else f"{len(entries)} programs"
    return page(title, "".join(body for *_, body in read), entries if several else [])


def _key(path: str) -> str:
    """What the names in a sheet begin with, so that several sheets can stand in one page."""
    return "p" + hashlib.sha256(path.encode("utf-8", "replace")).hexdigest()[:6] + "-"
