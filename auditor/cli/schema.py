"""``turnaudit schema``: the JSON Schema of a file, for editors and for programs that read reports."""

from __future__ import annotations

import click


@click.command(short_help="Print the JSON Schema of a job file, a shop file or a report.")
@click.argument("file", type=click.Choice(["job", "shop", "report"]))
def command(file: str) -> None:
    """Print the JSON Schema of that file.

    An editor that knows it completes keys and marks faults while a job file is written.
    """
    if file == "report":
        from importlib.resources import files

        click.echo((files("auditor.reports") / "report.schema.json").read_text(encoding="utf-8"), nl=False)
        return
    import json

    from auditor.declared import schemas

    schema = schemas.job_schema() if file == "job" else schemas.shop_schema()
    click.echo(json.dumps(schema, indent=1))
