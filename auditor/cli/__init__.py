"""The command line: only here is anything printed or the process ended.

A command is a module of this folder that holds a click command named ``command``; names that start with an
underscore are helpers. A command's module imports the audit only when it runs, so that help comes at once.
"""

from __future__ import annotations

import pkgutil
import sys
from importlib import import_module
from typing import cast

import click

EXIT_CLEAN, EXIT_FINDINGS, EXIT_NOT_AUDITED, EXIT_INTERRUPTED = 0, 1, 2, 130


class CommandFolder(click.Group):
    """A group whose commands are the modules of this folder."""

    def list_commands(self, ctx: click.Context) -> list[str]:
        """Names of the commands, in alphabetical order."""
        found = (module.name for module in pkgutil.iter_modules(__path__))
        return sorted(name for name in found if not name.startswith("_"))

    def get_command(self, ctx: click.Context, cmd_name: str) -> click.Command | None:
        """The command of that name, imported now."""
        if cmd_name not in self.list_commands(ctx):
            return None
        return cast(click.Command, import_module(f"{__name__}.{cmd_name}").command)


@click.group(cls=CommandFolder, context_settings={"help_option_names": ["-h", "--help"], "max_content_width": 96})
@click.version_option(package_name="turnaudit", prog_name="turnaudit", message="%(prog)s %(version)s")
def turnaudit() -> None:
    """Audits CNC lathe programs before they meet metal.

    A prediction from published laws: it does not replace a prove-out by qualified people.
    """


def main() -> None:
    """Run the command line and end the process with its exit status."""
    try:
        status = turnaudit.main(prog_name="turnaudit", standalone_mode=False)
    except click.ClickException as problem:
        problem.show()
        status = EXIT_NOT_AUDITED
    except click.Abort:
        click.echo("turnaudit: interrupted", err=True)
        status = EXIT_INTERRUPTED
    except Exception as problem:  # a person at a machine is never shown a traceback
        click.echo(f"turnaudit itself failed, please report it: {type(problem).__name__}: {problem}", err=True)
        status = EXIT_NOT_AUDITED
    sys.exit(status if isinstance(status, int) else EXIT_CLEAN)
