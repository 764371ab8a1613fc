"""The laws and what their docstrings say, read apart."""

from __future__ import annotations

import importlib
import inspect
import pkgutil
import re
from collections.abc import Callable, Iterator
from dataclasses import dataclass

import auditor.mechanics

GUARDS = "auditor.mechanics.validity"
HEADING = re.compile(r"^(Parameters|Returns|Raises|Examples|References)\n-+\n", re.MULTILINE)


@dataclass(frozen=True, slots=True)
class Law:
    """A public function of the mechanics room."""

    name: str
    function: Callable[..., object]

    @property
    def arguments(self) -> list[str]:
        return list(inspect.signature(self.function).parameters)

    @property
    def sections(self) -> dict[str, str]:
        parts = HEADING.split(inspect.getdoc(self.function) or "")
        return dict(zip(parts[1::2], parts[2::2], strict=True))

    @property
    def documented(self) -> dict[str, str]:
        """Argument and what follows the colon in its first line, in order."""
        return dict(re.findall(r"^(\w+) : (.*)$", self.sections.get("Parameters", ""), re.MULTILINE))


def modules() -> Iterator[str]:
    for module in pkgutil.iter_modules(auditor.mechanics.__path__, "auditor.mechanics."):
        yield module.name


def laws() -> list[Law]:
    found = []
    for name in modules():
        if name == GUARDS:
            continue
        for attribute, value in inspect.getmembers(importlib.import_module(name), inspect.isfunction):
            if not attribute.startswith("_") and value.__module__ == name:
                found.append(Law(f"{name.rsplit('.', 1)[1]}.{attribute}", value))
    return found
