"""Erasing for good: a day, a measure, or everything, after its limits were said."""

from __future__ import annotations

from collections.abc import Callable
from datetime import date
from pathlib import Path
from typing import TYPE_CHECKING

from PySide6.QtWidgets import (
    QButtonGroup,
    QCheckBox,
    QDialog,
    QDialogButtonBox,
    QLabel,
    QMessageBox,
    QRadioButton,
    QVBoxLayout,
    QWidget,
)

from desktop.errors import StorageError
from desktop.journal.records import Measure
from desktop.screens.room import give_room
from desktop.storage.erase import erase, erase_everything, of_day, of_measure
from desktop.wording.erase import EVERYTHING, LIMITS, NOT_REACHED, SURE, erased_sentence, this_day, this_measure
from desktop.wording.problems import problem_sentence

if TYPE_CHECKING:
    from desktop.screens.main_window import MainWindow


def erase_for_good(window: MainWindow) -> None:
    """Ask what is to be erased, close the journal, erase it, and open what is left."""
    session = window.session
    if session is None:
        return
    window.workspace.days.finish_typing()
    path, place = session.path, window.settings.copies_place
    day, measure = window.current_day(session), session.current
    dialog = EraseDialog(day, measure, window)
    if dialog.exec() != QDialog.DialogCode.Accepted or not window.let_go():
        return
    acts: dict[str, Callable[[], bool]] = {
        this_day(day): lambda: erase(path, of_day(day), session.now(), place),
        EVERYTHING: lambda: erase_everything(path, place),
    }
    if measure is not None:
        acts[this_measure(measure.title)] = lambda: erase(path, of_measure(measure.id), session.now(), place)
    said = erased_sentence(dialog.chosen)
    try:
        said = said if acts[dialog.chosen]() else NOT_REACHED
    except StorageError as error:
        QMessageBox.warning(window, "Dayfence", problem_sentence(error))
        said = ""
    _go_on(window, path)
    window.say(said)


def _go_on(window: MainWindow, path: Path) -> None:
    if path.exists():
        window.open_journal(path)
    else:
        window.show_start()


class EraseDialog(QDialog):
    """What goes, what erasing cannot reach, and a yes that is not given by accident."""

    def __init__(self, day: date, measure: Measure | None, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setWindowTitle("Erase for good")
        texts = [this_day(day), *([this_measure(measure.title)] if measure else []), EVERYTHING]
        self.choices = [QRadioButton(text) for text in texts]
        group = QButtonGroup(self)
        self.sure = QCheckBox(SURE)
        limits = QLabel(LIMITS)
        limits.setWordWrap(True)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Cancel)
        self.erase = buttons.addButton("&Erase", QDialogButtonBox.ButtonRole.AcceptRole)
        buttons.button(QDialogButtonBox.StandardButton.Cancel).setDefault(True)
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.setSpacing(10)
        for choice in self.choices:
            group.addButton(choice)
            layout.addWidget(choice)
            choice.toggled.connect(self._offer)
        for widget in (limits, self.sure, buttons):
            layout.addWidget(widget)
        self.sure.toggled.connect(self._offer)
        self._offer()
        give_room(self, 70)
        # Large text in a small window: the dialog's own guess of its height is too low.
        inside = layout.contentsMargins()
        room = self.minimumWidth() - inside.left() - inside.right()
        limits.setMinimumHeight(limits.heightForWidth(room))

    @property
    def chosen(self) -> str:
        """The choice as it is said; empty before one is made."""
        return next((choice.text() for choice in self.choices if choice.isChecked()), "")

    def _offer(self) -> None:
        self.erase.setEnabled(bool(self.chosen) and self.sure.isChecked())
