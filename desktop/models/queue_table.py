"""The coach's queue as a table: one line a client, those with nothing new folded away."""

from __future__ import annotations

from PySide6.QtCore import QAbstractTableModel, QModelIndex, QObject, QPersistentModelIndex, Qt

from desktop.caseload.queue import QueueRow
from desktop.wording.caseload import last_entry_words, row_sentences
from desktop.wording.days import short_day

HEADS = ("Client", "Why", "Last entry", "Next session")
CODE, WHY, LAST, NEXT = range(len(HEADS))

_Index = QModelIndex | QPersistentModelIndex
_NO_PARENT = QModelIndex()


class QueueTable(QAbstractTableModel):
    """The rows that are shown: those with a reason, all when unfolded, those that hold the filter's words."""

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self.rows: list[QueueRow] = []
        self._all: list[QueueRow] = []
        self._is_unfolded = False
        self._filter = ""
        self._kept = 0

    @property
    def codes(self) -> list[str]:
        """The codes of all clients."""
        return [row.client.code for row in self._all]

    @property
    def folded(self) -> int:
        """How many clients with nothing new there are."""
        return sum(not row.reasons for row in self._all)

    def show_rows(self, rows: list[QueueRow], kept: int = 0) -> None:
        """Take another queue; the client with the id ``kept`` is not folded away."""
        self._all, self._kept = rows, kept
        self._settle()

    def unfold(self, is_unfolded: bool) -> None:
        """Show those with nothing new, or fold them away."""
        self._is_unfolded = is_unfolded
        self._settle()

    def filter(self, words: str) -> None:
        """Show only clients whose code or reasons hold all these words; nothing is folded away then."""
        self._filter = words.casefold()
        self._settle()

    def place_of(self, client: int) -> int | None:
        """The row of a client, by id; None where it is not shown."""
        return next((place for place, row in enumerate(self.rows) if row.client.id == client), None)

    def rowCount(self, parent: _Index = _NO_PARENT) -> int:
        """One for each client shown."""
        return 0 if parent.isValid() else len(self.rows)

    def columnCount(self, parent: _Index = _NO_PARENT) -> int:
        """Client, why, last entry, next session."""
        return 0 if parent.isValid() else len(HEADS)

    def headerData(
        self, section: int, orientation: Qt.Orientation, role: int = Qt.ItemDataRole.DisplayRole
    ) -> object:
        """The heads of the columns."""
        if orientation == Qt.Orientation.Horizontal and role == Qt.ItemDataRole.DisplayRole:
            return HEADS[section]
        return None

    def data(self, index: _Index, role: int = Qt.ItemDataRole.DisplayRole) -> object:
        """The words of a cell; all reasons on hovering and for those who hear the table."""
        row = self.rows[index.row()]
        if role == Qt.ItemDataRole.DisplayRole:
            return self._words(row, index.column())
        if role in (Qt.ItemDataRole.ToolTipRole, Qt.ItemDataRole.AccessibleTextRole):
            return " ".join(row_sentences(row)) if index.column() == WHY else self._words(row, index.column())
        return None

    @staticmethod
    def _words(row: QueueRow, column: int) -> str:
        if column == CODE:
            return row.client.code
        if column == LAST:
            return last_entry_words(row.facts)
        if column == NEXT:
            return short_day(row.client.next_session) if row.client.next_session else ""
        sentences = row_sentences(row)
        # That there is a session today says when, not why.
        told = 2 if row.reasons and row.reasons[0].kind == "session today" else 1
        more = f" (and {len(sentences) - told} more)" if len(sentences) > told else ""
        return " ".join(sentences[:told]) + more

    def _settle(self) -> None:
        words = self._filter.split()
        if words:
            shown = [row for row in self._all if _holds(row, words)]
        else:
            shown = [row for row in self._all if row.reasons or self._is_unfolded or row.client.id == self._kept]
        self.beginResetModel()
        self.rows = shown
        self.endResetModel()


def _holds(row: QueueRow, words: list[str]) -> bool:
    text = " ".join([row.client.code, *row_sentences(row)]).casefold()
    return all(word in text for word in words)
