"""What is said to the person at the keyboard, beside the reports; all of it on standard error."""

from __future__ import annotations

import os
import shutil
import sys
from collections.abc import Callable, Iterable, Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import TYPE_CHECKING

import click

from auditor.errors import Fault

if TYPE_CHECKING:
    from auditor.reports import View

_WIDEST, _NARROWEST = 80, 60


def say(text: str) -> None:
    """One message, fit for whatever standard error can show."""
    from auditor.reports._figures import harmless, plain

    safe = harmless(text)
    click.echo(safe if _holds(sys.stderr.encoding, safe) else plain(safe), err=True)


def tell(text: str) -> None:
    """An answer on standard output, in ASCII where its encoding holds no more."""
    if not _holds(sys.stdout.encoding, text):
        from auditor.reports._figures import plain

        text = "\n".join(map(plain, text.split("\n")))
    click.echo(text)


def complain(faults: Iterable[Fault]) -> None:
    """Why something could not be done, one line a reason."""
    for fault in faults:
        say(f"turnaudit: {fault}")


def view_of(
    output: Path | None, brief: bool, series: bool, failing: frozenset[str] = frozenset({"stop"})
) -> View:
    """How a report is to be written for its target: a file holds every sign, a terminal what it says it holds."""
    from auditor.reports import View

    if output is not None:
        return View(brief=brief, series=series, failing=failing)
    from auditor.reports.screen import signs

    terminal = sys.stdout.isatty()
    dumb = os.environ.get("TERM") == "dumb"
    columns = shutil.get_terminal_size((_WIDEST, 24)).columns if terminal else _WIDEST
    return View(
        width=min(_WIDEST, max(_NARROWEST, columns - (sys.platform == "win32"))),
        plain=dumb or not _holds(sys.stdout.encoding, signs()),
        colour=terminal and not dumb and not os.environ.get("NO_COLOR"),
        brief=brief, series=series, failing=failing,
    )


def _holds(encoding: str | None, text: str) -> bool:
    try:
        text.encode(encoding or "ascii")
    except (UnicodeError, LookupError):
        return False
    return True


@contextmanager
def progress(programs: int, quiet: bool) -> Iterator[Callable[[str], None]]:
    """A bar over several programs, when somebody watches; yields what is to be called after each."""
    if quiet or programs < 2 or not sys.stderr.isatty():
        yield lambda name: None
        return
    from rich.console import Console
    from rich.markup import escape
    from rich.progress import Progress

    with Progress(console=Console(stderr=True), transient=True) as bar:
        task = bar.add_task("auditing", total=programs)
        yield lambda name: bar.update(task, advance=1, description=escape(Path(name).name))
