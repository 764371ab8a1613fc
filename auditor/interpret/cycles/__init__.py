"""Fixed cycles: one file a family, each turns a call into strokes.

A family is a module of this folder with ``NAMES`` (what it can carry out) and ``expand``;
putting a file here is all it takes to add one.
"""

from __future__ import annotations

import importlib
import pkgutil
from collections.abc import Callable
from functools import cache

from auditor.interpret.cycles.call import CycleCall, Expansion

Expand = Callable[[CycleCall], Expansion]


@cache
def registry() -> dict[str, Expand]:
    """Every cycle name of the folder and the function that carries it out."""
    found: dict[str, Expand] = {}
    for module_info in pkgutil.iter_modules(__path__):
        module = importlib.import_module(f"{__name__}.{module_info.name}")
        for name in getattr(module, "NAMES", ()):
            if name in found:
                raise ValueError(f"two files carry out the cycle {name!r}")
            found[name] = module.expand
    return found


def find(name: str) -> Expand:
    """The function that carries out the cycle ``name``.

    Raises
    ------
    KeyError
        When no file of the folder carries out such a cycle.

    Examples
    --------
    >>> find("finishing").__module__
    'auditor.interpret.cycles.finishing'
    """
    return registry()[name]
