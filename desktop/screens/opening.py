"""Opening a journal with the questions that only the person can answer, and mending one that is damaged."""

from __future__ import annotations

from collections.abc import Callable
from datetime import datetime
from pathlib import Path

from PySide6.QtWidgets import QDialog, QHBoxLayout, QLabel, QMessageBox, QPushButton, QVBoxLayout, QWidget

from desktop.errors import StorageError
from desktop.models.background import Background
from desktop.storage.backups import copies_of, newest_good
from desktop.storage.salvage import WonBack, aside_name, copy_to, put_in_place, win_back, write_won_back
from desktop.storage.store import Store
from desktop.wording.damage import (
    BUILD,
    LEAVE,
    NOTHING_LEFT,
    READ_ONLY,
    READING,
    STAYS,
    copy_sentence,
    damaged_sentence,
    missing_sentence,
    open_copy,
    open_elsewhere_sentence,
    readable_sentence,
)
from desktop.wording.earlier import moment
from desktop.wording.problems import problem_sentence

Clock = Callable[[], datetime]


def open_with_questions(parent: QWidget, path: Path, now: Clock) -> Store | None:
    """Open a journal; None when it stays closed, and the person knows why."""
    try:
        try:
            return Store.open(path, clock=now, alone=True)
        except StorageError as error:
            match error.reason:
                case "open already":
                    return Store.open(path, clock=now, to_read=True) if wants_to_read(parent, path) else None
                case "damaged":
                    return mend(parent, path, now)
                case "missing":
                    return _open_copy_of_missing(parent, path, now, error)
                case _:
                    raise
    except StorageError as error:
        QMessageBox.warning(parent, "Dayfence", problem_sentence(error))
        return None


def mend(parent: QWidget, path: Path, now: Clock) -> Store | None:
    """Show what is left of a damaged journal and open what the person chooses; None when it is left as it is.

    Args:
        parent: the window.
        path: the damaged file; nothing may have it open.
        now: gives local time.

    Raises:
        StorageError: what was chosen could not be made; the damaged file is as it was.
    """
    dialog = DamageDialog(path, parent)
    if dialog.exec() != QDialog.DialogCode.Accepted or dialog.won is None:
        return None
    new = aside_name(path, "new", now())
    if dialog.takes_copy and dialog.won.copy is not None:
        copy_to(dialog.won.copy, new)
    else:
        write_won_back(new, dialog.won, now())
    put_in_place(new, path, now())
    return Store.open(path, clock=now, alone=True)


class DamageDialog(QDialog):
    """What can be read of a damaged journal, and what the newest copy holds beside it."""

    def __init__(self, path: Path, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setWindowTitle("A damaged journal")
        self.won: WonBack | None = None
        self.takes_copy = False
        self.says, self.readable, self.copied = QLabel(damaged_sentence(path)), QLabel(READING), QLabel()
        stays = QLabel(STAYS)
        self.build, self.copy, self.leave = QPushButton(BUILD), QPushButton(), QPushButton(LEAVE)
        self.build.setEnabled(False)
        self.copy.setVisible(False)
        self.build.clicked.connect(self.accept)
        self.copy.clicked.connect(self._take_copy)
        self.leave.clicked.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.setSpacing(12)
        for label in (self.says, self.readable, self.copied, stays):
            label.setWordWrap(True)
            layout.addWidget(label)
        buttons = QHBoxLayout()
        buttons.addWidget(self.build)
        buttons.addWidget(self.copy)
        buttons.addStretch(1)
        buttons.addWidget(self.leave)
        layout.addLayout(buttons)
        self.setMinimumWidth(720)
        self._reader = Background(self)
        self._reader.run(lambda: win_back(path, copies_of(path)), self._show, self._show_nothing)

    def done(self, result: int) -> None:
        """Close; what is still being read is waited for."""
        self._reader.wait()
        super().done(result)

    def _show(self, won: WonBack) -> None:
        self.won = won
        made = moment(won.copy.made) if won.copy is not None else None
        self.readable.setText(readable_sentence(won.proven, len(won.sureness)))
        self.copied.setText(copy_sentence(made, won.behind))
        self.build.setEnabled(True)
        self.build.setDefault(True)
        if made is not None:
            self.copy.setText(open_copy(made))
            self.copy.setVisible(True)

    def _show_nothing(self, _: Exception) -> None:
        self.readable.setText(NOTHING_LEFT)

    def _take_copy(self) -> None:
        self.takes_copy = True
        self.accept()


def wants_to_read(parent: QWidget, path: Path) -> bool:
    """Ask whether a file that another window has open is to be opened for reading."""
    box = QMessageBox(QMessageBox.Icon.Information, "Dayfence", open_elsewhere_sentence(path), parent=parent)
    read = box.addButton(READ_ONLY, QMessageBox.ButtonRole.AcceptRole)
    box.addButton(QMessageBox.StandardButton.Cancel)
    box.exec()
    return box.clickedButton() is read


def _open_copy_of_missing(parent: QWidget, path: Path, now: Clock, error: StorageError) -> Store | None:
    good = newest_good(copies_of(path))
    if good is None:
        raise error
    sentence = missing_sentence(path, moment(good[0].made))
    if QMessageBox.question(parent, "Dayfence", sentence) != QMessageBox.StandardButton.Yes:
        return None
    copy_to(good[0], path)
    return Store.open(path, clock=now, alone=True)
