"""Find words in notes, changes, named days and values, and go to the day."""

from __future__ import annotations

from typing import TYPE_CHECKING

from PySide6.QtCore import Qt
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import QDialog, QDialogButtonBox, QLabel, QLineEdit, QListWidget, QVBoxLayout, QWidget

from desktop.journal.finding import MOST, Found, find
from desktop.journal.journal import Journal
from desktop.screens.room import give_room
from desktop.wording.finding import found_count, found_line

if TYPE_CHECKING:
    from desktop.screens.main_window import MainWindow


def show_find(window: MainWindow) -> None:
    """Ask for words, and make the day that was chosen current."""
    session = window.session
    if session is None:
        return
    dialog = FindDialog(session.journal, window)
    if dialog.exec() == QDialog.DialogCode.Accepted and (found := dialog.chosen) is not None:
        measure = session.journal.measures.get(found.measure) if found.measure is not None else None
        if measure is not None and not measure.archived:
            window.show_measure(measure.id)
        window.show_day(found.day)


class FindDialog(QDialog):
    """The words, and every place that holds them."""

    def __init__(self, journal: Journal, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setWindowTitle("Find")
        self._journal = journal
        self._found: list[Found] = []
        self.words = QLineEdit()
        self.words.setPlaceholderText("words of a note or a change, or a number that was typed")
        self.words.setAccessibleName("Words to find")
        self.places = QListWidget()
        self.places.setAccessibleName("Places that hold them")
        self.count = QLabel()
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Close)
        self.go = buttons.button(QDialogButtonBox.StandardButton.Ok)
        self.go.setText("Go to the day")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        self.words.textChanged.connect(self._find)
        self.places.itemActivated.connect(self.accept)
        layout = QVBoxLayout(self)
        for widget in (self.words, self.places, self.count, buttons):
            layout.addWidget(widget)
        give_room(self, 80, 18)
        self._find("")

    @property
    def chosen(self) -> Found | None:
        """The place under the hand."""
        place = self.places.currentRow()
        return self._found[place] if 0 <= place < len(self._found) else None

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Up and down move among the places while words are typed."""
        if event.key() in (Qt.Key.Key_Up, Qt.Key.Key_Down) and self._found:
            step = 1 if event.key() == Qt.Key.Key_Down else -1
            self.places.setCurrentRow(min(max(self.places.currentRow() + step, 0), len(self._found) - 1))
        else:
            super().keyPressEvent(event)

    def _find(self, words: str) -> None:
        self._found = find(self._journal, words)
        self.places.clear()
        self.places.addItems([found_line(one, self._journal) for one in self._found])
        self.places.setCurrentRow(0 if self._found else -1)
        self.count.setText(found_count(len(self._found), MOST) if words.strip() else "")
        self.go.setEnabled(bool(self._found))
