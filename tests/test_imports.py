"""Who may import whom: the solver knows only arrays and records, and only the window knows Qt.

Read from the source, imports inside functions included, and seen once more with Qt blocked.
"""

from __future__ import annotations

import ast
import os
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parent.parent
SOLVER_MAY = {"solver", "numpy", "scipy", "msgspec"}
QT = {"PySide6", "shiboken6", "pyqtgraph", "PyQt5", "PyQt6", "qtpy"}
WINDOW_DOOR = "app.gui.main"  # the one part of app.gui that others name, and only when a window is wanted


def modules(folder: str) -> list[Path]:
    return sorted((ROOT / folder).rglob("*.py"))


def imported(path: Path) -> Iterator[str]:
    """Every module name that a file imports, at any depth."""
    for node in ast.walk(ast.parse(path.read_text("utf-8"))):
        if isinstance(node, ast.Import):
            yield from (alias.name for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, f"{path}: relative import"
            yield node.module or ""
            yield from (f"{node.module}.{alias.name}" for alias in node.names)
        elif isinstance(node, ast.Call) and ast.unparse(node.func) in {
            "__import__",
            "importlib.import_module",
        }:
            pytest.fail(f"{path}: imports by name, which no contract can see")


def tops(path: Path) -> set[str]:
    return {name.partition(".")[0] for name in imported(path)}


def outside_window() -> list[Path]:
    return [path for path in modules("app") if "gui" not in path.relative_to(ROOT).parts]


@pytest.mark.parametrize("path", modules("solver"), ids=lambda path: path.stem)
def test_the_solver_imports_its_short_list_only(path: Path) -> None:
    assert tops(path) - SOLVER_MAY - sys.stdlib_module_names == set()


@pytest.mark.parametrize("path", outside_window(), ids=lambda path: path.stem)
def test_nothing_outside_the_window_imports_qt(path: Path) -> None:
    assert tops(path) & QT == set()
    door = {name for name in imported(path) if name.startswith("app.gui")}
    allowed = {WINDOW_DOOR, f"{WINDOW_DOOR}.run"} if path.name == "commands.py" else set()
    assert door <= allowed


def test_the_window_is_entered_by_its_door_only_when_wanted() -> None:
    tree = ast.parse((ROOT / "app" / "commands.py").read_text("utf-8"))
    at_top = {node.module for node in tree.body if isinstance(node, ast.ImportFrom)}
    assert WINDOW_DOOR not in at_top


@pytest.mark.parametrize("name", ["start", "environment", "qt_libraries", "words", "catalogue", "__init__"])
def test_what_a_bare_python_runs_needs_only_the_standard_library(name: str) -> None:
    top_level = ast.parse((ROOT / "app" / f"{name}.py").read_text("utf-8")).body
    names = {node.module for node in top_level if isinstance(node, ast.ImportFrom) and node.module}
    names |= {alias.name for node in top_level if isinstance(node, ast.Import) for alias in node.names}
    bare = {"app.environment", "app.qt_libraries", "app.words", "app.catalogue", "app.samples"}
    assert {module for module in names if module.partition(".")[0] not in sys.stdlib_module_names} <= bare


def test_the_first_command_starts_on_a_python_with_nothing_installed() -> None:
    """-S and -E: no site-packages at all; importing is enough, running would install."""
    run = subprocess.run(
        [sys.executable, "-S", "-E", "-c", "import app.start, tests.__main__"],
        cwd=ROOT,
        capture_output=True,
        text=True,
        check=False,
    )
    assert run.returncode == 0, run.stderr


EVERYTHING = "import importlib, sys; [importlib.import_module(name) for name in sys.argv[1:]]"


def run_without_qt(*arguments: str) -> subprocess.CompletedProcess[str]:
    path = os.pathsep.join([str(ROOT / "tests" / "without_qt"), str(ROOT)])
    return subprocess.run(
        [sys.executable, *arguments],
        cwd=ROOT,
        env=os.environ | {"PYTHONPATH": path},
        capture_output=True,
        text=True,
        encoding="utf-8",
        check=False,
    )


def module_name(path: Path) -> str:
    return ".".join(path.relative_to(ROOT).with_suffix("").parts).removesuffix(".__init__")


def test_all_but_the_window_is_imported_with_qt_blocked() -> None:
    names = [module_name(path) for path in (*modules("solver"), *outside_window())]
    run = run_without_qt("-c", EVERYTHING, *(name for name in names if not name.endswith("__main__")))
    assert run.returncode == 0, run.stderr


def test_the_block_blocks() -> None:
    run = run_without_qt("-c", EVERYTHING, "app.gui.main")
    assert run.returncode == 1
    assert "blocked by tests/without_qt" in run.stderr


def test_a_member_is_checked_with_qt_blocked() -> None:
    run = run_without_qt("-m", "app", "check", "sample_projects/hoist_shaft.barwright.json")
    assert run.returncode == 0, run.stderr
    assert "Warm running" in run.stdout
