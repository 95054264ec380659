"""Where no window can be shown, one sentence says why and what to do, and Qt is never let to end the program."""

import ctypes
import os
import subprocess
import sys
from pathlib import Path

import pytest

from desktop import display
from desktop.display import missing_for_drawing, missing_for_window

ROOT = Path(__file__).parents[2]
WITHOUT_A_WINDOW = "For the answer without a window: dayfence review FILE."

pytestmark = pytest.mark.skipif(not sys.platform.startswith("linux"), reason="only Linux lacks displays")


def lacks_nothing(*_: object) -> object:
    return object()


@pytest.fixture
def loads(monkeypatch):
    """Whether libraries load is decided here, and nothing is really loaded."""

    def decide(load) -> None:
        monkeypatch.setattr(ctypes, "CDLL", load)

    return decide


@pytest.mark.parametrize("environment", [{}, {"DISPLAY": ""}, {"QT_QPA_PLATFORM": "xcb"}])
def test_without_a_display_the_command_is_named(environment):
    assert missing_for_window(environment) == f"There is no display to show a window on. {WITHOUT_A_WINDOW}"


def test_an_answer_that_needs_no_display_lacks_nothing():
    assert missing_for_window({"QT_QPA_PLATFORM": "offscreen"}) is None
    assert missing_for_window({"QT_QPA_PLATFORM": "minimal:enable_fonts"}) is None


@pytest.mark.parametrize(
    ("library", "package"),
    [("libxcb-cursor.so.0", "libxcb-cursor0"), ("libxkbcommon-x11.so.0", "libxkbcommon-x11-0"),
     ("libxcb-icccm.so.4", "libxcb-icccm4"), ("libxcb-keysyms.so.1", "libxcb-keysyms1")],
)  # fmt: skip
def test_a_missing_library_is_told_with_the_package_that_has_it(loads, library, package):
    def load(_path: str) -> None:
        raise OSError(f"{library}: cannot open shared object file: No such file or directory")

    loads(load)
    assert missing_for_window({"DISPLAY": ":1"}) == (
        f"The window needs {library}, which this machine lacks. "
        f"Install it with: apt-get install {package}. {WITHOUT_A_WINDOW}"
    )


def test_a_library_that_qt_itself_needs_is_told_too(monkeypatch):
    monkeypatch.setitem(sys.modules, "PySide6", None)
    said = missing_for_window({"DISPLAY": ":1"})
    assert said.startswith("The window needs ")
    assert said.endswith(WITHOUT_A_WINDOW)


def test_what_drawing_needs_is_told_in_the_same_way(monkeypatch):
    assert missing_for_drawing() is None
    monkeypatch.setitem(sys.modules, "PySide6", None)
    said = missing_for_drawing()
    assert said.startswith("Drawing needs ")
    assert said.endswith(WITHOUT_A_WINDOW)


@pytest.mark.parametrize("library", display._PACKAGES)
def test_every_library_in_the_list_is_found_in_the_linkers_message(library):
    said = display._library_sentence(f"{library}: cannot open shared object file: No such file or directory")
    assert f"apt-get install {display._PACKAGES[library]}." in said
    assert library in said


def test_a_library_not_in_the_list_is_named_all_the_same():
    said = display._library_sentence("libnew-thing.so.7: cannot open shared object file")
    assert said.startswith("The window needs libnew-thing.so.7, which this machine lacks.")
    assert display._library_sentence("no such thing").startswith("The window needs a library")


def test_a_display_that_does_not_answer_is_named():
    # Display 9871 has no socket, so that nothing can answer.
    assert not Path("/tmp/.X11-unix/X9871").exists()
    said = missing_for_window({"DISPLAY": ":9871"})
    if "lacks" not in said:
        assert said == f"The display :9871 does not answer, so no window can be shown. {WITHOUT_A_WINDOW}"
    assert said.endswith(WITHOUT_A_WINDOW)


def test_a_display_that_answers_lacks_nothing(loads, monkeypatch):
    loads(lacks_nothing)
    monkeypatch.setattr(display, "_answers", lambda name: name == ":7")
    assert missing_for_window({"DISPLAY": ":7"}) is None
    assert ":8" in missing_for_window({"DISPLAY": ":8"})


def test_wayland_is_taken_where_its_socket_is_there(tmp_path):
    there = {"WAYLAND_DISPLAY": "wayland-0", "XDG_RUNTIME_DIR": str(tmp_path)}
    assert "no display" in missing_for_window(there | {"QT_QPA_PLATFORM": "wayland"})
    (tmp_path / "wayland-0").touch()
    assert missing_for_window(there) is None


def test_other_systems_always_have_a_display(monkeypatch):
    monkeypatch.setattr(sys, "platform", "darwin")
    assert missing_for_window({}) is None


def window(**environment: str) -> subprocess.CompletedProcess:
    bare = {name: value for name, value in os.environ.items() if name not in ("DISPLAY", "WAYLAND_DISPLAY")}
    return subprocess.run(
        [sys.executable, "-m", "desktop"],
        cwd=ROOT,
        env=bare | {"QT_QPA_PLATFORM": "", **environment},
        capture_output=True,
        text=True,
        timeout=60,
        check=False,
    )


@pytest.mark.parametrize("environment", [{}, {"DISPLAY": ":9871"}])
def test_the_program_ends_with_one_sentence_and_no_abort(environment):
    done = window(**environment)
    assert done.returncode == 2
    assert done.stdout == ""
    assert done.stderr.count("\n") == 1
    assert done.stderr.endswith(f"{WITHOUT_A_WINDOW}\n")


def test_a_folder_that_cannot_be_made_is_told(tmp_path):
    (tmp_path / "file").touch()
    done = window(QT_QPA_PLATFORM="offscreen", XDG_DATA_HOME=str(tmp_path / "file"))
    assert done.returncode == 2
    assert "for your journal cannot be made" in done.stderr
    assert "Traceback" not in done.stderr
