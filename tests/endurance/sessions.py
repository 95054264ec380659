"""Long random sessions: always as the model, every value ever entered found, undo exact, no network."""

from __future__ import annotations

import os
import subprocess
import sys
from collections.abc import Callable
from random import Random

from desktop.edits.history import redo_edit, undo_edit
from tests.desktop.storage.test_random_sessions import Session, held_by
from tests.endurance.figures import Figure, folder
from tests.endurance.power import ROOT, TRACER

ACTS = 30


def sessions(many: int) -> Figure:
    """Random sessions against a plain model."""
    wrong = sum(not _goes_well(seed) for seed in range(many))
    forgetful = sum(not _goes_well(seed, _forgets) for seed in range(10))
    return Figure(
        f"sessions of {ACTS} acts: state, chain, every value found",
        many,
        wrong,
        "",
        f"with a history that forgets a value: {forgetful} of 10 found",
        forgetful >= 8,
    )


def _goes_well(seed: int, spoil: Callable[[Session], object] | None = None) -> bool:
    with folder() as place:
        session = Session(place / "log.dayfence", Random(seed), days=6)
        try:
            for _ in range(ACTS):
                session.act(5, 2, 1, 1, 3, 2, 1)
                assert held_by(session.journal, session) == session.model
            session.store.verify()
            if spoil is not None:
                spoil(session)
            session.check()
        except AssertionError:
            return False
        finally:
            session.store.close()
        return True


def _forgets(session: Session) -> None:
    """As if a value that was typed had never come into the history."""
    session.ever.add(((1, 0), 12345.0))


def undo(many: int) -> Figure:
    """Everything taken back gives the start, everything done again gives the end."""
    wrong = 0
    for seed in range(many):
        with folder() as place:
            session = Session(place / "log.dayfence", Random(1000 + seed), days=8)
            begin = session.store.read()
            for _ in range(ACTS):
                session.act(5, 2, 2, 2, 0, 0, 1)
            end = session.store.read()
            while (step := session.history.undoable) is not None:
                session.write(undo_edit(step), "undo", step.number)
            wrong += session.store.read() != begin
            session.restart()
            while (step := session.history.redoable) is not None:
                session.write(redo_edit(step), "redo", step.number)
            wrong += session.store.read() != end
            session.store.verify()
            session.store.close()
    return Figure("undo and redo of everything, over a restart", many, wrong)


WINDOW = """
import sys
from pathlib import Path
from PySide6.QtWidgets import QApplication
app = QApplication([])
from desktop.screens.main_window import MainWindow
window = MainWindow(Path(sys.argv[1]))
window.show()
window.open_sample()
window.load_chart()
for _ in range(50):
    app.processEvents()
window.close()
assert "PySide6.QtNetwork" not in sys.modules
assert "libQt6Network" not in Path("/proc/self/maps").read_text()
"""
SOCKET = "import socket; socket.socket(socket.AF_INET)"


def network() -> Figure:
    """Internet sockets the window opens, seen by the system's own record."""
    opened, control = sockets_of(WINDOW), sockets_of(SOCKET)
    return Figure(
        "internet sockets of a whole session", 1, opened, "", f"a program with one: {control} seen", control > 0
    )


def sockets_of(script: str) -> int:
    """How many internet sockets a script asks for."""
    with folder() as place:
        record = place / "record"
        subprocess.run(
            [*TRACER, "-e", "trace=socket", "-o", str(record), sys.executable, "-c", script, str(place)],
            cwd=ROOT,
            check=True,
            capture_output=True,
            env={**os.environ, "QT_QPA_PLATFORM": "offscreen", "HOME": str(place), "XDG_DATA_HOME": str(place)},
        )
        return sum("AF_INET" in line for line in record.read_text().splitlines())
