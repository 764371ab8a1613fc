"""Asks for what a draft leaves open, in the order in which a setter knows the answers."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path

import click

from auditor.declared.model import ToolKind
from auditor.draft import Draft, draft_job, open_faults
from auditor.draft.guesses import OPEN, text_value

# What is asked even where the program told, and in this order; then whatever else is open. Tools come last.
ORDER = (
    "workpiece.material", "workpiece.diameter", "workpiece.length", "workpiece.face", "machine", "machine.speed_limit",
    "machine.power", "machine.base_speed", "workholding", "workholding.kind", "workholding.stick_out",
    "workholding.speed_limit", "workholding.grip_force",
)  # fmt: skip


def asked(draft: Draft, program: Path, target: Path) -> Draft:
    """The draft with the answers in it; Enter keeps what is shown, a lone ``?`` leaves it open."""
    click.echo(f'Enter keeps what stands in brackets; "{OPEN}" leaves it open. Nothing is written before the end.')
    answers: dict[str, str] = {}
    for path in ORDER:
        draft = _ask(path, draft, answers, program, target)
    kinds: dict[int, ToolKind] = {}
    unsure = [path for path, entry in draft.entries() if path.endswith(".kind") and not entry.remark.startswith("sure")]
    for path in (path for path in unsure if path.startswith("tools.")):
        draft = _ask(path, draft, answers, program, target)
        if path in answers and answers[path] != f'"{OPEN}"':
            kinds[int(path.split(".")[1])] = answers[path].strip('"')  # type: ignore[assignment]  # read without fault
    draft = draft_job(program, target, kinds).answered(answers)
    for path in list(draft.open):
        draft = _ask(path, draft, answers, program, target)
    return draft


def _ask(path: str, draft: Draft, answers: dict[str, str], program: Path, target: Path) -> Draft:
    """One question, again until the answer can stand in the file."""
    entry = next((entry for known, entry in draft.entries() if known == path), None)
    if entry is None or path in answers:
        return draft
    shown = entry.value.strip('"') if entry.state == "said" else OPEN
    click.echo(f"\n{entry.remark}" if entry.remark else "")
    while True:
        reply = click.prompt(path, default=shown).strip()
        if reply == shown:
            return draft
        answer = text_value(reply)
        if reply == OPEN:
            return draft
        filled = draft.answered({path: answer})
        problems = list(_problems(filled, path, program, target))
        if not problems:
            answers[path] = answer
            return filled
        for problem in problems:
            click.echo(f"  {problem}")


def _problems(draft: Draft, path: str, program: Path, target: Path) -> Iterator[str]:
    """What the reader of job files says of this answer."""
    for fault in open_faults(draft.text(), program, target):
        if fault.key == path or (fault.key or "").startswith(f"{path}."):
            yield fault.message + (f"; wanted {fault.wanted}" if fault.wanted else "")
