"""The house keeps its shape: the fixed top level, one direction through the stages, rooms of a readable size."""

from __future__ import annotations

import ast
import tomllib
from collections.abc import Iterator
from importlib import import_module
from pathlib import Path

import pytest

HOUSE = Path(__file__).parent.parent
SETTINGS = tomllib.loads((HOUSE / "pyproject.toml").read_text(encoding="utf-8"))
TOP = {"README.md", "DEVELOPERS.md", "LICENSE", "pyproject.toml", "auditor", "grammar", "tests", "fixtures"}
MADE_BY_TOOLS = {"build", "dist", "__pycache__"}
LONGEST_ROOM = 450  # lines
SOURCES = sorted((HOUSE / "auditor").rglob("*.py"))


def module_name(path: Path) -> str:
    parts = path.relative_to(HOUSE).with_suffix("").parts
    return ".".join(parts[:-1] if parts[-1] == "__init__" else parts)


MODULES = {module_name(path): path for path in SOURCES}


def test_top_level_is_fixed() -> None:
    found = {path.name for path in HOUSE.iterdir() if not path.name.startswith(".")} - MADE_BY_TOOLS
    assert {name for name in found if not name.endswith(".egg-info")} <= TOP
    assert TOP - found == set()


def test_grammar_holds_grammars_and_nothing_else() -> None:
    assert {path.suffix for path in (HOUSE / "grammar").rglob("*") if path.is_file()} <= {".lark"}


def test_fixtures_hold_no_code() -> None:
    assert not list((HOUSE / "fixtures").rglob("*.py"))


# One direction: a module imports from its own layer's modules or from lower layers, never from a higher one, and
# layers that stand side by side never import each other. The order is read from where import-linter reads it.
LAYERS = [
    {name.strip() for name in layer.split("|")}
    for layer in SETTINGS["tool"]["importlinter"]["contracts"][0]["layers"]
]


def layer_of(module: str) -> tuple[int, str] | None:
    for height, layer in enumerate(LAYERS):
        for name in layer:
            if module == name or module.startswith(f"{name}."):
                return height, name
    return None


def imported(path: Path) -> Iterator[str]:
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.Import):
            yield from (alias.name for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, f"{path}: imports by full name only"
            yield from (f"{node.module}.{alias.name}" for alias in node.names)


@pytest.mark.parametrize("module", MODULES)
def test_imports_run_one_way(module: str) -> None:
    here = layer_of(module)
    for name in imported(MODULES[module]):
        there = layer_of(name)
        if here is None or there is None or here[1] == there[1]:
            continue
        assert there[0] > here[0], f"{module} imports {name}, which stands above or beside it"


def test_laws_import_numpy_and_nothing_else() -> None:
    allowed = {"__future__", "collections", "dataclasses", "typing", "math", "enum", "functools", "numpy", "auditor"}
    for module, path in MODULES.items():
        if module.startswith("auditor.mechanics"):
            assert {name.split(".")[0] for name in imported(path)} <= allowed, module


@pytest.mark.parametrize("module", [name for name, path in MODULES.items() if "__all__" in path.read_text("utf-8")])
def test_public_names_are_sorted_and_exist(module: str) -> None:
    """Constants, then classes, then functions, each in the order of the alphabet (as ruff sorts them)."""
    loaded = import_module(module)
    names = list(loaded.__all__)
    assert names == sorted(set(names), key=lambda name: (not name.isupper(), not name[0].isupper(), name))
    assert [name for name in names if not hasattr(loaded, name)] == []


def test_rooms_are_of_a_readable_size() -> None:
    long = {module: lines for module, path in MODULES.items()
            if (lines := len(path.read_text(encoding="utf-8").splitlines())) > LONGEST_ROOM}
    assert long == {}


def test_text_files_are_opened_with_their_encoding() -> None:
    """A code page of the machine must never decide how a program reads."""
    data = {"read_text": 0, "write_text": 1}  # arguments that come before the encoding
    for module, path in MODULES.items():
        for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
            if isinstance(node, ast.Call) and isinstance(node.func, ast.Attribute) and node.func.attr in data:
                named = {keyword.arg for keyword in node.keywords}
                assert "encoding" in named or len(node.args) > data[node.func.attr], f"{module}:{node.lineno}"

