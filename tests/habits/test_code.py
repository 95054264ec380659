"""The habits of the code: clean under its tools, tests that can fail, files that can be read in one sitting."""

from __future__ import annotations

import ast
import re
import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]
SOURCES = sorted(path for top in ("analysis", "desktop") for path in (ROOT / top).rglob("*.py"))
TESTS = sorted((ROOT / "tests").rglob("*.py"))
TEST_FILES = [path for path in TESTS if path.name.startswith("test_")]
MOST_LINES = 450


def name_of(path: Path) -> str:
    return str(path.relative_to(ROOT))


@pytest.mark.parametrize("command", ["ruff check", "ruff format --check", "mypy"])
def test_the_code_is_clean_under_its_tools(command):
    done = subprocess.run(
        [sys.executable, "-m", *command.split()], cwd=ROOT, capture_output=True, text=True, timeout=300
    )
    assert done.returncode == 0, done.stdout + done.stderr


def test_no_file_is_too_long_to_be_read():
    lengths = {name_of(path): len(path.read_text("utf-8").splitlines()) for path in [*SOURCES, *TESTS]}
    assert {name: length for name, length in lengths.items() if length > MOST_LINES} == {}


def test_no_file_has_a_name_that_says_nothing():
    empty = {"utils", "util", "helpers", "helper", "common", "misc"}
    named = [name_of(path) for path in [*SOURCES, *TESTS] if empty & {path.stem, path.parent.name}]
    assert named == []


KILLS_AT_RANDOM = ROOT / "tests/desktop/storage/test_kill.py"
"""A writer is killed there at a random moment, which has to be slept for."""


def test_no_test_sleeps():
    sleeping = re.compile(r"\b(?:sleep|msleep|qSleep|qWait)\(")
    watched = [path for path in TESTS if path not in (Path(__file__), KILLS_AT_RANDOM)]
    assert [name_of(path) for path in watched if sleeping.search(path.read_text("utf-8"))] == []


def asserts(function: ast.AST, helpers: frozenset[str] = frozenset()) -> bool:
    """Whether a function holds an assertion, waits for something with a deadline, or calls one that does."""
    for node in ast.walk(function):
        if isinstance(node, ast.Assert):
            return True
        if isinstance(node, ast.Call):
            called = node.func.attr if isinstance(node.func, ast.Attribute) else getattr(node.func, "id", "")
            if called in {"raises", "warns", "waitUntil", "waitSignal", "check", *helpers}:
                return True
    return False


def functions_of(path: Path) -> list[ast.FunctionDef]:
    tree = ast.parse(path.read_text("utf-8"))
    return [node for node in ast.walk(tree) if isinstance(node, ast.FunctionDef)]


@pytest.mark.parametrize("path", TEST_FILES, ids=name_of)
def test_every_test_can_fail(path):
    functions = functions_of(path)
    helpers = frozenset(one.name for one in functions if not one.name.startswith("test_") and asserts(one))
    tests = [one for one in functions if one.name.startswith("test_")]
    assert tests
    assert [one.name for one in tests if not asserts(one, helpers)] == []


@pytest.mark.parametrize("path", TEST_FILES, ids=name_of)
def test_no_test_hides_another_of_its_name(path):
    names = [one.name for one in functions_of(path) if one.name.startswith("test_")]
    assert len(names) == len(set(names))


def test_a_test_without_an_assertion_is_found():
    empty, full = ast.parse("def test_a(): f()\ndef test_b(): assert f()").body
    assert not asserts(empty)
    assert asserts(full)


@pytest.mark.skipif(sys.version_info >= (3, 12), reason="None cannot be given up from Python 3.12 on")
def test_qt_gives_back_every_reference_of_none(qtbot):
    from PySide6.QtWidgets import QLabel

    label = QLabel()
    qtbot.addWidget(label)
    held = sys.getrefcount(None)
    for _ in range(1000):
        label.setText("some text")
    assert abs(sys.getrefcount(None) - held) < 100
