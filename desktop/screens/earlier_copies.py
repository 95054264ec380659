"""Earlier copies: what each holds, what differs from now, and going back to one, whole or day by day."""

from __future__ import annotations

from functools import partial
from pathlib import Path
from typing import TYPE_CHECKING

from PySide6.QtWidgets import (
    QAbstractItemView,
    QDialog,
    QDialogButtonBox,
    QFileDialog,
    QHBoxLayout,
    QHeaderView,
    QLabel,
    QListWidget,
    QPushButton,
    QTableWidget,
    QTableWidgetItem,
    QVBoxLayout,
)

from desktop.edits.earlier import put_back_earlier, restore
from desktop.errors import DayfenceError
from desktop.journal.differences import Difference, differences
from desktop.journal.journal import Journal
from desktop.journal.records import DayNote, Entry
from desktop.models.keeping import Keeping
from desktop.models.session import Session
from desktop.screens.room import give_room
from desktop.storage.backups import EarlierCopy
from desktop.wording.earlier import (
    NO_COPIES,
    RESTORE_HINT,
    difference_cells,
    differs_sentence,
    holds_sentence,
    moment,
    place_sentence,
)
from desktop.wording.problems import problem_sentence

if TYPE_CHECKING:
    from desktop.screens.main_window import MainWindow

_SHOWN = 500
"""A table longer than this is read by nobody; the sentence above it counts all."""


def show_earlier_copies(window: MainWindow) -> None:
    """Show the copies of the open journal."""
    if window.session is not None and window.keeping is not None:
        window.workspace.days.finish_typing()
        EarlierCopiesDialog(window, window.session, window.keeping).exec()


class EarlierCopiesDialog(QDialog):
    """Copies on the left; beside them what the chosen one holds and how it differs from now."""

    def __init__(self, window: MainWindow, session: Session, keeping: Keeping) -> None:
        super().__init__(window)
        self.setWindowTitle("Earlier copies")
        self._window, self._session, self._keeping = window, session, keeping
        self._copies: list[EarlierCopy] = []
        self._earlier: Journal | None = None
        self._found: list[Difference] = []
        self.listed = QListWidget()
        self.listed.setAccessibleName("Earlier copies, newest first")
        self.listed.setMinimumWidth(220)
        self.holds, self.differs, self.place = QLabel(), QLabel(), QLabel()
        for label in (self.holds, self.differs, self.place):
            label.setWordWrap(True)
        self.table = QTableWidget(0, 3)
        self.table.setHorizontalHeaderLabels(["What", "Now", "In the copy"])
        self.table.setAccessibleName("What differs")
        self.table.verticalHeader().setVisible(False)
        self.table.setSelectionBehavior(QAbstractItemView.SelectionBehavior.SelectRows)
        self.table.setEditTriggers(QAbstractItemView.EditTrigger.NoEditTriggers)
        self.table.horizontalHeader().setSectionResizeMode(QHeaderView.ResizeMode.Stretch)
        self.put_back = QPushButton("&Put back the chosen days")
        self.restore = QPushButton("&Restore the whole copy")
        self.restore.setToolTip(RESTORE_HINT)
        self.choose_place = QPushButton("Choose a &folder…")
        self.copy_now = QPushButton("&Copy now")
        for button in (self.put_back, self.restore, self.choose_place, self.copy_now):
            button.setAutoDefault(False)
        close = QDialogButtonBox(QDialogButtonBox.StandardButton.Close)
        close.rejected.connect(self.reject)
        self._lay_out(close)
        self.listed.currentRowChanged.connect(self._read)
        self.table.itemSelectionChanged.connect(self._offer)
        self.put_back.clicked.connect(self._put_back)
        self.restore.clicked.connect(self._restore)
        self.choose_place.clicked.connect(self._choose_place)
        self.copy_now.clicked.connect(self._keeping.copy_now)
        self._keeping.copied.connect(self._fill)
        self._keeping.not_copied.connect(self._say)
        self._fill()
        give_room(self, 100, 26)
        self.listed.setFocus()

    def _lay_out(self, close: QDialogButtonBox) -> None:
        acts = QHBoxLayout()
        acts.addWidget(self.put_back)
        acts.addWidget(self.restore)
        acts.addStretch(1)
        right = QVBoxLayout()
        for part in (self.holds, self.differs):
            right.addWidget(part)
        right.addWidget(self.table, 1)
        right.addLayout(acts)
        panes = QHBoxLayout()
        panes.addWidget(self.listed)
        panes.addLayout(right, 1)
        second = QHBoxLayout()
        second.addWidget(self.place, 1)
        second.addWidget(self.choose_place)
        second.addWidget(self.copy_now)
        layout = QVBoxLayout(self)
        layout.addLayout(panes, 1)
        layout.addLayout(second)
        layout.addWidget(close)

    def _fill(self) -> None:
        self._copies = self._keeping.copies()
        self.listed.clear()
        self.listed.addItems([moment(copy.made) for copy in self._copies])
        sent = self._keeping.last_sent()
        self.place.setText(place_sentence(self._keeping.place, sent.made if sent else None, self._session.today))
        self.copy_now.setEnabled(not self._session.read_only)
        if self._copies:
            self.listed.setCurrentRow(0)
        else:
            self._show(None)
            self.holds.setText(NO_COPIES)

    def _read(self, row: int) -> None:
        if 0 <= row < len(self._copies):
            self._show(None)
            copy = self._copies[row]
            self._keeping.read(copy, partial(self._receive, copy), self._say)

    def _receive(self, copy: EarlierCopy, earlier: Journal) -> None:
        row = self.listed.currentRow()
        if 0 <= row < len(self._copies) and self._copies[row] == copy:
            self._show(earlier)

    def _show(self, earlier: Journal | None) -> None:
        journal = self._session.journal
        self._earlier = earlier
        self._found = differences(journal, earlier) if earlier is not None else []
        self.holds.setText(holds_sentence(earlier) if earlier is not None else "")
        self.differs.setText(differs_sentence(self._found) if earlier is not None else "")
        self.table.clearSelection()
        self.table.setRowCount(0)
        if earlier is not None:
            shown = self._found[:_SHOWN]
            self.table.setRowCount(len(shown))
            for row, one in enumerate(shown):
                for column, text in enumerate(difference_cells(one, journal, earlier)):
                    item = QTableWidgetItem(text)
                    item.setToolTip(text)
                    self.table.setItem(row, column, item)
        self._offer()

    def _offer(self) -> None:
        can_change = not self._session.read_only
        self.restore.setEnabled(can_change and bool(self._found))
        self.put_back.setEnabled(can_change and bool(self._chosen()))

    def _chosen(self) -> list[Entry | DayNote]:
        """The chosen days the copy has something for, of measures that are still there."""
        rows = sorted({index.row() for index in self.table.selectedIndexes()})
        then = [self._found[row].then for row in rows]
        return [
            record
            for record in then
            if isinstance(record, DayNote)
            or (isinstance(record, Entry) and record.measure in self._session.journal.measures)
        ]

    def _put_back(self) -> None:
        self._session.do(put_back_earlier(self._session.journal, self._chosen()))
        self._show(self._earlier)

    def _restore(self) -> None:
        assert self._earlier is not None
        try:
            edit = restore(self._session.journal, self._earlier)
        except ValueError:
            self.differs.setText("This is a copy of another journal, so it is not put in the place of this one.")
            return
        self._session.do(edit)
        self.accept()
        self._window.say(f"Everything is as it was on {self.listed.currentItem().text()}. Undo takes it back.")

    def _choose_place(self) -> None:
        start = str(self._keeping.place or Path.home())
        chosen = QFileDialog.getExistingDirectory(self, "A second place for copies", start)
        if chosen:
            self._window.settings.set_copies_place(Path(chosen))
            self._keeping.place = Path(chosen)
            self._keeping.copy_now()

    def _say(self, error: Exception) -> None:
        if isinstance(error, DayfenceError):
            self.differs.setText(problem_sentence(error))
