"""A person at the window: keys typed, menus chosen, dialogs answered, on a clock the test holds."""

from __future__ import annotations

import shutil
from collections.abc import Callable
from datetime import datetime
from pathlib import Path
from tempfile import mkdtemp

import pytest
from PySide6.QtCore import Qt, QTimer
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QAbstractItemDelegate, QApplication, QLineEdit

from desktop.faces import load_faces
from desktop.screens.main_window import MainWindow


class Person:
    """Works the window the way a person does."""

    def __init__(self, qtbot, folder: Path) -> None:
        self.qtbot = qtbot
        self.folder = folder
        self.now = datetime(2031, 3, 30, 20, 15)
        self.window: MainWindow | None = None

    def starts_the_program(self) -> MainWindow:
        load_faces()
        self.window = MainWindow(self.folder, now=lambda: self.now)
        self.qtbot.addWidget(self.window, before_close_func=_leave_unread)
        self.window.show()
        self._is_at_the_window()
        self.window.open_own()
        self.window.load_chart()
        return self.window

    def quits(self) -> None:
        assert self.window.close()

    def answers(self, act: Callable[[object], None]) -> None:
        """Do ``act`` with the dialog that opens next."""

        def when_open() -> None:
            dialog = QApplication.activeModalWidget()
            if dialog is None:
                QTimer.singleShot(20, when_open)
                return
            # A dialog that is still there after seconds is left, so that the test fails instead of waiting.
            QTimer.singleShot(10_000, dialog, dialog.reject)
            try:
                act(dialog)
            except BaseException:
                dialog.reject()
                raise

        QTimer.singleShot(20, when_open)

    def types(self, keys: str) -> None:
        """Type into whatever cell is current; ``⏎`` is Enter."""
        self._is_at_the_window()
        for key in keys:
            # No pause between two keys: the quickest hand, or the slowest computer.
            focus = QApplication.focusWidget()
            target = focus if focus is not None and self.days.isAncestorOf(focus) else self.days
            if key == "⏎":
                QTest.keyClick(target, Qt.Key.Key_Return)
            else:
                QTest.keyClicks(target, key)

    def presses(self, *keys) -> None:
        QTest.keyClick(self.days, *keys)

    def holds_control_and_presses(self, key, *, shift: bool = False) -> None:
        self._is_at_the_window()
        held = Qt.KeyboardModifier.ControlModifier
        self.presses(key, held | Qt.KeyboardModifier.ShiftModifier if shift else held)

    def goes_to(self, day) -> None:
        """Press Up or Down until a day is current."""
        wanted = self.days.days.row(day)
        while self.days.currentIndex().row() != wanted:
            key = Qt.Key.Key_Up if self.days.currentIndex().row() > wanted else Qt.Key.Key_Down
            QTest.keyClick(self.days, key)

    def _is_at_the_window(self) -> None:
        """Without a window manager nobody gives the window its focus back after a dialog."""
        self.window.activateWindow()
        self.qtbot.waitUntil(self.window.isActiveWindow)

    @property
    def days(self):
        return self.window.workspace.days

    @property
    def findings(self) -> str:
        return self.window.workspace.findings.text

    @property
    def status(self) -> str:
        return self.window.workspace.status.saved.text()


def _leave_unread(window: MainWindow) -> None:
    """At the end of a test nobody answers whether what could not be read may go."""
    if window.session is not None:
        window.workspace.days.days._unread.clear()


@pytest.fixture
def journal_folder():
    """A folder for journals, on a RAM disk where there is one: durability is tested elsewhere."""
    shared = Path("/dev/shm")
    folder = Path(mkdtemp(prefix="dayfence-", dir=shared if shared.is_dir() else None))
    yield folder
    shutil.rmtree(folder)


@pytest.fixture
def person(qtbot, journal_folder):
    one = Person(qtbot, journal_folder)
    yield one
    if one.window is not None and one.window.session is not None:
        # A test that failed half-way leaves an open cell, whose question nobody would answer.
        for editor in one.days.viewport().findChildren(QLineEdit):
            one.days.closeEditor(editor, QAbstractItemDelegate.EndEditHint.RevertModelCache)
        one.window.close()
