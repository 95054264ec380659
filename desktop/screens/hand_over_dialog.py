"""A copy to hand over: what goes is chosen, shown line by line, and written as a new journal."""

from __future__ import annotations

from typing import TYPE_CHECKING
from uuid import uuid4

from PySide6.QtCore import Qt
from PySide6.QtWidgets import (
    QCheckBox,
    QDialog,
    QDialogButtonBox,
    QFormLayout,
    QLabel,
    QListWidget,
    QListWidgetItem,
    QMessageBox,
    QPlainTextEdit,
    QVBoxLayout,
)

from desktop.edits.hand_over import HandOver, records_to_hand_over
from desktop.errors import StorageError
from desktop.journal.records import Record
from desktop.models.session import Session
from desktop.screens.dialogs import DayBox
from desktop.screens.file_questions import ask_new_journal
from desktop.screens.room import give_room
from desktop.storage.store import Store
from desktop.wording.damage import kept_elsewhere
from desktop.wording.hand_over import NOT_SECRET, SAME, STAYS, goes_lines
from desktop.wording.problems import problem_sentence

if TYPE_CHECKING:
    from desktop.screens.main_window import MainWindow


def hand_over(window: MainWindow) -> None:
    """Ask what goes, and write it to a place of the person's choice."""
    session = window.session
    if session is None:
        return
    window.workspace.days.finish_typing()
    dialog = HandOverDialog(window, session)
    if dialog.exec() != QDialog.DialogCode.Accepted:
        return
    path = ask_new_journal(window, window.folder)
    if path is None:
        return
    try:
        Store.create(path, dialog.records, clock=session.now).close()
    except StorageError as error:
        QMessageBox.warning(window, "Dayfence", problem_sentence(error))
        return
    window.say(kept_elsewhere(path))


class HandOverDialog(QDialog):
    """Measures, days, words, name; below them exactly what goes."""

    def __init__(self, window: MainWindow, session: Session) -> None:
        super().__init__(window)
        self.setWindowTitle("A copy to hand over")
        self._journal = session.journal
        self._new_id = uuid4().hex
        self.measures = QListWidget()
        self.measures.setAccessibleName("Measures that go")
        for measure in session.journal.columns():
            item = QListWidgetItem(measure.title)
            item.setData(Qt.ItemDataRole.UserRole, measure.id)
            is_current = measure.id == session.measure
            item.setCheckState(Qt.CheckState.Checked if is_current else Qt.CheckState.Unchecked)
            self.measures.addItem(item)
        first, last = session.journal.days() or (session.today, session.today)
        self.first, self.last = DayBox(first), DayBox(last)
        self.notes, self.person = QCheckBox("Notes and remarks"), QCheckBox("Your name and question")
        self.keeps_id = QCheckBox(SAME)
        self.goes = QPlainTextEdit()
        self.goes.setReadOnly(True)
        self.goes.setAccessibleName("What goes")
        stays = QLabel(f"{STAYS} {NOT_SECRET}")
        stays.setWordWrap(True)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        self.write = buttons.button(QDialogButtonBox.StandardButton.Ok)
        self.write.setText("&Save the copy…")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        form = QFormLayout()
        form.addRow("Measures", self.measures)
        form.addRow("First day", self.first)
        form.addRow("Last day", self.last)
        form.addRow("Also", self.notes)
        for box in (self.person, self.keeps_id):
            form.addRow("", box)
        form.addRow("What goes", self.goes)
        layout = QVBoxLayout(self)
        layout.addLayout(form)
        layout.addWidget(stays)
        layout.addWidget(buttons)
        self.measures.itemChanged.connect(self._show)
        for day in (self.first, self.last):
            day.dateChanged.connect(self._show)
        for box in (self.notes, self.person, self.keeps_id):
            box.toggled.connect(self._show)
        self.records: list[Record] = []
        self._show()
        give_room(self, 78, 32)

    def _show(self) -> None:
        items = [self.measures.item(row) for row in range(self.measures.count())]
        chosen = {
            int(item.data(Qt.ItemDataRole.UserRole))
            for item in items
            if item.checkState() == Qt.CheckState.Checked
        }
        self.records = records_to_hand_over(
            self._journal,
            HandOver(
                chosen,
                self.first.chosen,
                self.last.chosen,
                self.notes.isChecked(),
                self.person.isChecked(),
                self._journal.person.journal_id if self.keeps_id.isChecked() else self._new_id,
            ),
        )
        self.goes.setPlainText("\n".join(goes_lines(self.records)) or "Nothing is chosen.")
        self.write.setEnabled(bool(chosen))
