"""Everything one day has ever held, and putting any of it back."""

from __future__ import annotations

from typing import TYPE_CHECKING

from PySide6.QtWidgets import QDialog, QDialogButtonBox, QLabel, QListWidget, QVBoxLayout

from desktop.edits.earlier import put_back_earlier
from desktop.journal.records import DayNote, Entry, Measure
from desktop.journal.row_change import key_of
from desktop.models.session import Session
from desktop.screens.room import give_room
from desktop.storage.store import Held
from desktop.wording.held import NEVER, held_line, held_title

if TYPE_CHECKING:
    from desktop.screens.main_window import MainWindow


def show_held(window: MainWindow) -> None:
    """Show what the current cell has held: a measure's day, or the note of a day."""
    session = window.session
    if session is None:
        return
    window.workspace.days.finish_typing()
    index = window.workspace.days.currentIndex()
    measure = window.workspace.days.days.measure(index.column()) if index.isValid() else None
    day = window.current_day(session)
    record = Entry(measure.id, day) if measure is not None else DayNote(day, "")
    HeldDialog(window, session, record, measure).exec()


class HeldDialog(QDialog):
    """What a day has held, newest first."""

    def __init__(
        self, window: MainWindow, session: Session, like: Entry | DayNote, measure: Measure | None
    ) -> None:
        super().__init__(window)
        self.setWindowTitle("What this day has held")
        self._session, self._like, self._measure = session, like, measure
        self._held: list[Held] = []
        self.title = QLabel(held_title(like.day, measure))
        self.title.setWordWrap(True)
        self.listed = QListWidget()
        self.listed.setAccessibleName("What this day has held, newest first")
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Close)
        self.put_back = buttons.addButton("&Put this back", QDialogButtonBox.ButtonRole.ActionRole)
        self.put_back.clicked.connect(self._put_back)
        buttons.rejected.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.addWidget(self.title)
        layout.addWidget(self.listed)
        layout.addWidget(buttons)
        self.listed.currentRowChanged.connect(self._offer)
        self._offer()
        give_room(self, 70, 16)
        session.tell_held(key_of(like), self._show, lambda _: self.title.setText(NEVER))

    def _show(self, held: list[Held]) -> None:
        self._held = held
        self.listed.addItems([held_line(one.at, one.act, one.record, self._measure) for one in held])
        if held:
            self.listed.setCurrentRow(0)
            self.listed.setFocus()
        else:
            self.title.setText(NEVER)

    def _offer(self) -> None:
        self.put_back.setEnabled(self._chosen() is not None and not self._session.read_only)

    def _chosen(self) -> Entry | DayNote | None:
        """The record of the chosen line, where it holds one that is not there now."""
        row = self.listed.currentRow()
        record = self._held[row].record if 0 <= row < len(self._held) else None
        if isinstance(record, Entry | DayNote) and self._session.journal.find(self._like) != record:
            return record
        return None

    def _put_back(self) -> None:
        record = self._chosen()
        if record is not None:
            self._session.do(put_back_earlier(self._session.journal, [record]))
            self.accept()
