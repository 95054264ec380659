"""Which part may import which: the arrows of the design, read from the code itself."""

from __future__ import annotations

import ast
import subprocess
import sys
from functools import cache
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]

BELOW_THE_WINDOW = {
    "analysis",
    "desktop.errors",
    "desktop.resource_files",
    "desktop.journal",
    "desktop.storage",
    "desktop.exchange",
    "desktop.wording",
    "desktop.edits",
}

CASELOAD = {"desktop.caseload", "desktop.caseload.folder", "desktop.wording.caseload"}

ALLOWED: dict[str, set[str]] = {
    "analysis": {"numpy"},
    "desktop": set(),
    "desktop.errors": set(),
    "desktop.resource_files": set(),
    "desktop.display": {"PySide6"},
    "desktop.faces": {"desktop.resource_files", "PySide6"},
    "desktop.journal": {"analysis"},
    "desktop.storage": {"desktop.errors", "desktop.journal", "sqlite3"},
    "desktop.exchange": {"analysis", "desktop.errors", "desktop.journal"},
    "desktop.caseload": {"analysis", "desktop.errors", "desktop.journal", "desktop.wording", "numpy"},
    "desktop.caseload.folder": {
        "analysis",
        "desktop.caseload",
        "desktop.errors",
        "desktop.journal",
        "desktop.storage",
    },
    "desktop.wording.caseload": {
        "analysis",
        "desktop.caseload",
        "desktop.errors",
        "desktop.journal",
        "desktop.wording",
    },
    "desktop.wording": {"analysis", "desktop.errors", "desktop.journal", "desktop.resource_files", "numpy"},
    "desktop.edits": {"analysis", "desktop.journal", "desktop.storage"},
    "desktop.command": BELOW_THE_WINDOW,
    "desktop.export": BELOW_THE_WINDOW | {"desktop.command"},
    "desktop.models": BELOW_THE_WINDOW | CASELOAD | {"PySide6"},
    "desktop.chart.picture": {
        "analysis",
        "desktop.chart.pieces",
        "desktop.chart.spoken",
        "desktop.journal",
        "desktop.wording",
        "numpy",
    },
    "desktop.chart.pieces": {"analysis", "numpy"},
    "desktop.chart.spoken": set(),
    "desktop.chart.ticks": {"desktop.wording"},
    "desktop.chart": {
        "analysis",
        "desktop.chart.picture",
        "desktop.chart.pieces",
        "desktop.chart.ticks",
        "desktop.journal",
        "desktop.models",
        "desktop.wording",
        "PySide6",
        "pyqtgraph",
        "numpy",
    },
    "desktop.page.content": {
        "analysis",
        "desktop.chart.picture",
        "desktop.chart.pieces",
        "desktop.journal",
        "desktop.wording",
        "numpy",
    },
    "desktop.page": {
        "desktop.chart",
        "desktop.chart.picture",
        "desktop.chart.pieces",
        "desktop.faces",
        "desktop.page.content",
        "desktop.wording",
        "PySide6",
    },
    "desktop.page.command": {
        "analysis",
        "desktop.command",
        "desktop.display",
        "desktop.faces",
        "desktop.page",
        "desktop.page.content",
        "desktop.wording",
        "PySide6",
    },
    # The screens hand edits to the session, files to the importer and the store, errors to the wording.
    "desktop.screens": BELOW_THE_WINDOW
    | CASELOAD
    | {
        "desktop.chart",
        "desktop.chart.picture",
        "desktop.chart.pieces",
        "desktop.export",
        "desktop.faces",
        "desktop.models",
        "desktop.page",
        "desktop.page.content",
        "PySide6",
    },
    "desktop.app": {
        "desktop.display",
        "desktop.faces",
        "desktop.models",
        "desktop.resource_files",
        "desktop.screens",
        "PySide6",
    },
    "desktop.__main__": {"desktop.app", "desktop.command", "desktop.export", "desktop.page.command"},
}
"""For each part, the other parts and the libraries it may import; the standard library but sqlite3 is free."""


def sources() -> list[Path]:
    return sorted(path for top in ("analysis", "desktop") for path in (ROOT / top).rglob("*.py"))


def module_of(path: Path) -> str:
    return ".".join(path.relative_to(ROOT).with_suffix("").parts).removesuffix(".__init__")


def part_of(module: str) -> str | None:
    """The row of a module: its own, or that of the nearest folder around it; None where there is none."""
    folders = module
    while folders:
        # The row of the outermost folder is for its own ``__init__`` only, but for the analysis.
        if folders in ALLOWED and (folders != "desktop" or module == "desktop"):
            return folders
        folders = folders.rpartition(".")[0]
    return None


@cache
def imports_of(path: Path) -> tuple[tuple[int, str], ...]:
    """Line and full name of everything a file imports, at the top, inside functions and for types alike."""
    found: list[tuple[int, str]] = []
    for node in ast.walk(ast.parse(path.read_text("utf-8"))):
        if isinstance(node, ast.Import):
            found += [(node.lineno, alias.name) for alias in node.names]
        elif isinstance(node, ast.ImportFrom):
            base = "." * node.level + (node.module or "")
            found += [(node.lineno, name) for name in _names(base, node)]
    return tuple(found)


def _names(base: str, node: ast.ImportFrom) -> list[str]:
    """``from desktop.chart import plot`` brings in ``desktop.chart.plot``, where that is a module."""
    full = [f"{base}.{alias.name}" for alias in node.names]
    is_module = [(ROOT / name.replace(".", "/")).with_suffix(".py").exists() for name in full]
    return [name if known else base for name, known in zip(full, is_module, strict=True)]


def target_of(name: str) -> str | None:
    """What an import leads to: a part of ours, a library, or None for the free part of the standard library."""
    top = name.split(".")[0]
    if top in ("analysis", "desktop"):
        return part_of(name) or f"{name}, which has no row"
    return top if top == "sqlite3" or top not in sys.stdlib_module_names else None


@pytest.mark.parametrize("path", sources(), ids=module_of)
def test_a_part_imports_only_what_its_arrows_allow(path):
    part = part_of(module_of(path))
    assert part is not None, "a part that has no row"
    allowed = ALLOWED[part] | {part, None}
    wrong = [f"line {line}: {name}" for line, name in imports_of(path) if target_of(name) not in allowed]
    assert wrong == []


def test_imports_are_written_in_full():
    relative = [f"{path}:{line}" for path in sources() for line, name in imports_of(path) if name.startswith(".")]
    assert relative == []


def test_every_row_is_of_a_part_that_is_there():
    assert {part_of(module_of(path)) for path in sources()} == set(ALLOWED)


def test_no_arrow_leads_in_a_circle():
    def reached(part: str) -> set[str]:
        found: set[str] = set()
        waiting = [part]
        while waiting:
            for other in ALLOWED.get(waiting.pop(), set()) - found:
                found.add(other)
                waiting.append(other)
        return found

    assert [part for part in ALLOWED if part in reached(part)] == []


@pytest.mark.parametrize(
    ("library", "home"),
    [("sqlite3", "desktop.storage"), ("pyqtgraph", "desktop.chart")],
)
def test_a_library_has_one_home(library, home):
    users = {
        part_of(module_of(path))
        for path in sources()
        for _, name in imports_of(path)
        if target_of(name) == library
    }
    assert users <= {home}


def test_the_check_sees_imports_inside_functions_and_for_types():
    names = [name for _, name in imports_of(ROOT / "desktop/screens/chart_pane.py")]
    assert names.count("desktop.chart.plot") == 2
    assert target_of("desktop.brand_new.part") == "desktop.brand_new.part, which has no row"


def loaded_after(script: str, **environment: str) -> list[set[str]]:
    """What a fresh interpreter holds each time the script prints ``sys.modules``."""
    done = subprocess.run(
        [sys.executable, "-c", script],
        cwd=ROOT,
        env={"PATH": "/usr/bin:/bin", "QT_QPA_PLATFORM": "offscreen", **environment},
        capture_output=True,
        text=True,
        timeout=120,
        check=True,
    )
    return [set(line.split()) for line in done.stdout.splitlines()]


def test_the_analysis_brings_in_numpy_and_nothing_else_that_is_large():
    (loaded,) = loaded_after("import sys, analysis; print(*sys.modules)")
    assert "numpy" in loaded
    assert not loaded & {"PySide6", "pyqtgraph", "sqlite3", "pandas", "scipy"}


@pytest.mark.parametrize(
    "module", ["desktop.command", "desktop.__main__", "desktop.export", "desktop.page.command"]
)
def test_the_command_runs_without_qt(module):
    (loaded,) = loaded_after(f"import sys, {module}; print(*sys.modules)")
    assert module in loaded
    assert not loaded & {"PySide6", "pyqtgraph", "sqlite3"}


START = """
import sys
from desktop.screens.main_window import MainWindow
from PySide6.QtWidgets import QApplication

load = MainWindow.load_chart

def told(window):
    print(*sys.modules)
    load(window)
    QApplication.processEvents()
    print(*sys.modules)
    QApplication.quit()

MainWindow.load_chart = told
from desktop.app import main
sys.exit(main(["--sample"]))
"""


def test_the_window_is_there_before_the_chart_and_never_has_a_network(tmp_path):
    before, after = loaded_after(START, HOME=str(tmp_path), XDG_DATA_HOME=str(tmp_path))
    assert "desktop.screens.main_window" in before
    assert not before & {"pyqtgraph", "pandas", "scipy", "desktop.screens.page_dialog", "PySide6.QtPrintSupport"}
    assert "pyqtgraph" in after
    assert "PySide6.QtNetwork" not in before | after
