"""A calibrated material put into the shop file: after a yes, and whole or not at all."""

from __future__ import annotations

import tomllib
from pathlib import Path

import click

from auditor.calibrate import Calibration, LoadLog, shop_lines
from auditor.calibrate.shop_lines import material_name
from auditor.cli import _files
from auditor.declared.model import Job
from auditor.declared.shops import find_shop
from auditor.errors import Fault, UsageError


def append_lines(calibration: Calibration, job: Job, log: LoadLog) -> None:
    """Ask, then put the lines behind those of the shop file nearest to the job; no answer is a no.

    Raises
    ------
    UsageError
        There is no shop file, it has such a material already, or it cannot be written.
    """
    shop = find_shop(Path(job.path or job.program).absolute().parent)
    if shop is None:
        raise UsageError(Fault("there is no shop file to append to", file=job.path,
                               wanted="a shop.toml in this folder or above"))
    before = shop.read_bytes()
    after = _joined(before, shop_lines(calibration, job, log), material_name(job), str(shop))
    click.echo(err=True)
    try:
        agreed = click.confirm(f"Append these lines to {shop}?", default=False, err=True)
    except click.Abort:  # nobody there to answer
        agreed = False
    if agreed and shop.read_bytes() != before:
        raise UsageError(Fault("somebody changed it meanwhile: nothing is written", file=str(shop)))
    if agreed:
        _files.replace(shop, after)
    click.echo(f"Appended to {shop}." if agreed else "Nothing is written.", err=True)


def _joined(before: bytes, lines: str, name: str, shop: str) -> str:
    """The shop file with the lines behind its own, its line ends kept; read once more before it counts."""
    old = before.decode("utf-8")  # the audit has read it already
    known = tomllib.loads(old.removeprefix("\ufeff")).get("materials", {})
    if name in known:
        raise UsageError(Fault("this material is there already: nothing is written", file=shop,
                               key=f"materials.{name}", wanted="the old lines taken out by hand"))
    text = f"{old}{'' if old.endswith(chr(10)) or not old else chr(10)}\n{lines}"
    if "\r\n" in old:
        text = text.replace("\r\n", "\n").replace("\n", "\r\n")
    try:
        read = tomllib.loads(text.removeprefix("\ufeff"))
    except tomllib.TOMLDecodeError as problem:
        raise UsageError(Fault(f"with the lines behind it, it is no TOML: {problem}", file=shop)) from None
    assert name in read["materials"]
    return text
