"""Set up before any test: no display, no network, nothing of the person's own folders."""

import gc
import os
import sys

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
os.environ.setdefault("PYQTGRAPH_QT_LIB", "PySide6")

import pytest

_opened_sockets: list[str] = []


def _watch_sockets(event: str, arguments: tuple) -> None:
    if event == "socket.connect" or event == "socket.bind":
        _opened_sockets.append(f"{event} {arguments[1:]!r}")


sys.addaudithook(_watch_sockets)


# As in the program, no worker thread collects: it would free widgets that are the main thread's.
gc.disable()


@pytest.fixture(autouse=True)
def _collect_between_tests():
    """Python's collector runs between tests, on the main thread, when it is due."""
    yield
    due = [place for place in range(3) if gc.get_count()[place] > gc.get_threshold()[place]]
    if due:
        gc.collect(max(due))


@pytest.fixture(autouse=True)
def _no_network():
    """Dayfence opens no network connection: any test that sees one fails."""
    _opened_sockets.clear()
    yield
    assert not _opened_sockets
