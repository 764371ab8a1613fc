"""Auditing one program after the other, or several at a time: what comes back is small enough to travel."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass

from auditor.cli import EXIT_CLEAN, EXIT_FINDINGS, EXIT_NOT_AUDITED
from auditor.cli._earlier import Earlier, Known
from auditor.cli._inputs import Task
from auditor.errors import Fault, TurnauditError
from auditor.reports import Outcome, Unreadable, View, report

_RANK = {"stop": 2, "review": 1}


@dataclass(frozen=True, slots=True)
class Answer:
    """What is left of an audit once its reports are written."""

    path: str
    verdict: str
    parts: Mapping[str, str]  # format -> this program's part of the report
    faults: tuple[Fault, ...] = ()
    not_audited: int = 0
    findings: tuple[Known, ...] = ()

    def in_words(self) -> str:
        """The verdict in one line."""
        counted = {level: 0 for level in ("stop", "review", "note")}
        for finding in self.findings:
            counted[finding.level] += not finding.accepted
        told = ", ".join(f"{number} {level}" for level, number in counted.items() if number)
        return f"{self.path}: {self.verdict}" + (f" ({told})" if told else "")


@dataclass(frozen=True, slots=True)
class Rating:
    """What makes an audit fail."""

    fail_on: str = "stop"
    allow_incomplete: bool = False
    earlier: Earlier | None = None

    def status(self, answer: Answer) -> int:
        """The exit status that one program asks for."""
        if answer.verdict == "unreadable" or (answer.not_audited and not self.allow_incomplete):
            return EXIT_NOT_AUDITED
        bar = _RANK.get(self.fail_on)
        if bar is None:
            return EXIT_CLEAN
        return EXIT_FINDINGS if any(self._counts(answer.path, known, bar) for known in answer.findings) else EXIT_CLEAN

    def _counts(self, path: str, known: Known, bar: int) -> bool:
        if known.accepted or _RANK.get(known.level, 0) < bar:
            return False
        return self.earlier is None or self.earlier.counts(path, known)


Views = Mapping[str, View]  # the formats to be written, each with its view


def answers(tasks: Sequence[Task], views: Views, workers: int) -> Iterator[tuple[int, Answer]]:
    """The answers with the numbers of their tasks, as they come in."""
    if workers == 1 or len(tasks) < 2:
        yield from ((number, answer(task, views)) for number, task in enumerate(tasks))
        return
    from concurrent.futures import ProcessPoolExecutor, as_completed

    with ProcessPoolExecutor(min(workers, len(tasks))) as pool:
        running = {pool.submit(answer, task, views): number for number, task in enumerate(tasks)}
        for done in as_completed(running):
            number = running[done]
            problem = done.exception()
            yield number, done.result() if problem is None else _lost(tasks[number], problem, views)


def answer(task: Task, views: Views) -> Answer:
    """Audit one program and write its parts of the reports."""
    try:
        outcome = _audit(task)
        return _answer(outcome, views)
    except Exception as problem:  # one program must not take the others down with it
        return _lost(task, problem, views)


def _audit(task: Task) -> Outcome:
    if task.faults:
        return Unreadable(str(task.program), task.faults)
    from auditor.audit import audit_program

    try:
        return audit_program(str(task.program), None if task.job is None else str(task.job))
    except TurnauditError as problem:
        return Unreadable(str(task.program), problem.faults)


def _lost(task: Task, problem: BaseException, views: Views) -> Answer:
    """A program on which this tool itself failed: said plainly, never taken for audited."""
    said = f"{type(problem).__name__}: {problem}".rstrip(": ")
    fault = Fault("turnaudit itself failed on this program; please report it with the program", file=str(task.program),
                  found=said)
    return _answer(Unreadable(str(task.program), (fault,)), views)


def _answer(outcome: Outcome, views: Views) -> Answer:
    parts = {name: report(name).render(outcome, view) for name, view in views.items()}
    if isinstance(outcome, Unreadable):
        return Answer(outcome.path, "unreadable", parts, faults=outcome.faults)
    findings = tuple(
        Known(each.fingerprint, str(each.level), each.value, each.limit, each.band, each.accepted is not None)
        for each in outcome.findings
    )
    return Answer(
        outcome.run.text.path, outcome.verdict, parts, not_audited=len(outcome.coverage.not_audited), findings=findings,
    )
