"""Saving a journal as a table, copying the findings as text, bringing a saved journal back in."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from PySide6.QtCore import QLocale, Qt
from PySide6.QtWidgets import (
    QApplication,
    QButtonGroup,
    QDialog,
    QDialogButtonBox,
    QLabel,
    QMessageBox,
    QRadioButton,
    QVBoxLayout,
    QWidget,
)

from desktop.edits.bring_in import bring_in_journal
from desktop.errors import DayfenceError, ExchangeError
from desktop.exchange.package import read_package
from desktop.export import write_package, write_table
from desktop.screens.file_questions import ask_folder, ask_output
from desktop.storage.store import Store
from desktop.wording.findings import findings_text
from desktop.wording.out import SAVED_FORMS, package_sentence, saved_sentence
from desktop.wording.page import cannot_be_written
from desktop.wording.problems import problem_sentence

if TYPE_CHECKING:
    from desktop.screens.main_window import MainWindow


class FormDialog(QDialog):
    """Which form a copy is to have."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setWindowTitle("Save a copy as a table")
        layout = QVBoxLayout(self)
        self._group = QButtonGroup(self)
        for place, (title, hint) in enumerate(SAVED_FORMS):
            button = QRadioButton(title)
            button.setAccessibleDescription(hint)
            button.setChecked(place == 0)
            self._group.addButton(button, place)
            words = QLabel(hint)
            words.setWordWrap(True)
            words.setIndent(24)
            words.setAlignment(Qt.AlignmentFlag.AlignTop)
            layout.addWidget(button)
            layout.addWidget(words)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        buttons.button(QDialogButtonBox.StandardButton.Ok).setText("Choose where…")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout.addWidget(buttons)
        self.setMinimumWidth(520)

    @property
    def form(self) -> int:
        """The place of the form chosen in the list of forms."""
        return self._group.checkedId()


def save_as_table(window: MainWindow) -> None:
    """Ask for the form and the place, and save the open journal there."""
    session = window.session
    if session is None:
        return
    window.workspace.days.finish_typing()
    dialog = FormDialog(window)
    if dialog.exec() != QDialog.DialogCode.Accepted:
        return
    title = dialog.windowTitle()
    is_folder = dialog.form == 0
    path = (
        ask_folder(window, title, "journal tables") if is_folder else ask_output(window, title, "journal", ".csv")
    )
    if path is None:
        return
    try:
        if is_folder:
            write_package(path, session.journal)
        else:
            decimal = QLocale().decimalPoint()
            write_table(path, session.journal, "archive" if dialog.form == 1 else "spreadsheet", decimal)
    except OSError as error:
        QMessageBox.warning(window, title, cannot_be_written(path.name, error.strerror or ""))
        return
    window.say(saved_sentence(path.name))


def copy_findings(window: MainWindow) -> None:
    """Put the findings of the measure on the chart on the clipboard, as plain text with the caution."""
    session = window.session
    if session is not None and session.review is not None:
        QApplication.clipboard().setText(findings_text(session.review))
        window.say("The findings are copied as text.")


def bring_in_package(window: MainWindow, folder: Path) -> None:
    """Bring in a journal that was saved as a folder of tables: into the open one, or as a new one of its own."""
    title = "Bring in a table"
    try:
        other = read_package(folder)
        session = window.session
        question = package_sentence(other, into_open=session is not None)
        if QMessageBox.question(window, title, question) != QMessageBox.StandardButton.Yes:
            return
        if session is not None:
            brought = bring_in_journal(session.journal, session.ids, other, now=session.now())
            session.do(brought.edit)
            window.say_brought(brought)
        elif window.own_journal.exists():
            raise ExchangeError("cannot open", path=str(window.own_journal))
        else:
            Store.create(window.own_journal, other.records()).close()
            window.open_own()
    except DayfenceError as error:
        QMessageBox.warning(window, title, problem_sentence(error))
