"""The left pane of a caseload: a filter, the queue, those with nothing new, counts by answer."""

from __future__ import annotations

from PySide6.QtCore import QEvent, QItemSelectionModel, Qt, Signal
from PySide6.QtGui import QFont, QFontInfo, QFontMetrics, QKeyEvent, QResizeEvent
from PySide6.QtWidgets import (
    QAbstractItemView,
    QHeaderView,
    QLabel,
    QLineEdit,
    QPushButton,
    QTableView,
    QVBoxLayout,
    QWidget,
)

from desktop.caseload.queue import QueueRow, counts_of
from desktop.models.queue_table import CODE, HEADS, LAST, NEXT, WHY, QueueTable
from desktop.wording.caseload import BUDGET_LINE, counts_line

_SAMPLES = {CODE: "client 404", LAST: "Wed 30 Mar", NEXT: "Wed 30 Mar"}
"""What the columns have room for; the reason takes what is left."""
_LONGEST_CODE = 24
_SMALL = 0.9
_LEAST_REASON = 36
"""Letters of the reason that are to be seen before the days are."""


class QueueView(QTableView):
    """The queue; Space shows a covered answer, L marks as looked at.

    Signals:
        uncover_wanted: the covered answer is to be shown.
        looked_wanted: the client was looked at.
    """

    uncover_wanted = Signal()
    looked_wanted = Signal()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Two keys of its own; letters would else jump about in the table."""
        if event.key() == Qt.Key.Key_Space:
            self.uncover_wanted.emit()
        elif event.key() == Qt.Key.Key_L and event.modifiers() == Qt.KeyboardModifier.NoModifier:
            self.looked_wanted.emit()
        else:
            super().keyPressEvent(event)


class QueuePane(QWidget):
    """Every client with the reason for looking, the most pressing first.

    Signals:
        client_chosen: another client, by id; 0 for none.
    """

    client_chosen = Signal(int)

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.model = QueueTable(self)
        self.filter = QLineEdit()
        self.filter.setPlaceholderText("Show only clients with these words, such as “plan” or a code")
        self.filter.setAccessibleName("Filter")
        self.filter.setClearButtonEnabled(True)
        self.view = QueueView()
        self.view.setModel(self.model)
        self.view.setAccessibleName("Clients")
        self.view.setSelectionBehavior(QAbstractItemView.SelectionBehavior.SelectRows)
        self.view.setSelectionMode(QAbstractItemView.SelectionMode.SingleSelection)
        self.view.setTabKeyNavigation(False)
        self.view.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.view.setWordWrap(False)
        self.view.verticalHeader().setVisible(False)
        self.view.verticalHeader().setSectionResizeMode(QHeaderView.ResizeMode.Fixed)
        self.view.horizontalHeader().setSectionResizeMode(WHY, QHeaderView.ResizeMode.Stretch)
        self.view.horizontalHeader().setDefaultAlignment(
            Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter
        )
        self.view.setShowGrid(False)
        self.view.setAlternatingRowColors(True)
        self.fold = QPushButton()
        self.fold.setCheckable(True)
        self.counts, self.budget = QLabel(), QLabel(BUDGET_LINE)
        for label in (self.counts, self.budget):
            label.setWordWrap(True)
        layout = QVBoxLayout(self)
        layout.setContentsMargins(10, 8, 4, 8)
        layout.addWidget(self.filter)
        layout.addWidget(self.view, 1)
        layout.addWidget(self.fold, 0, Qt.AlignmentFlag.AlignLeft)
        layout.addWidget(self.counts)
        layout.addWidget(self.budget)
        self._chosen = 0
        self._was_moved = False
        self._is_filling = self._is_settling = False
        self.filter.textChanged.connect(self._filter_by)
        self.fold.toggled.connect(self._unfold)
        self.view.selectionModel().currentRowChanged.connect(self._follow)
        self._fit_face()

    @property
    def current(self) -> QueueRow | None:
        """The client under the hand."""
        place = self.view.currentIndex().row()
        return self.model.rows[place] if 0 <= place < len(self.model.rows) else None

    def show_rows(self, rows: list[QueueRow], *, is_typing: bool = False) -> None:
        """Take another queue; the client under the hand stays under it, folded away only when nothing is typed."""
        self._was_moved = self._was_moved or is_typing
        self._keeping_client(lambda: self.model.show_rows(rows, self._chosen if is_typing else 0))
        self._fit_face()
        self.counts.setText(counts_line(counts_of([row for row in rows if row.client.id > 0])))
        folded = self.model.folded
        self.fold.setVisible(folded > 0)
        word = "Fold away" if self.fold.isChecked() else "Show"
        self.fold.setText(f"{word} {folded} with nothing new")

    def cover(self, is_covered: bool) -> None:
        """Hide every reason while a client looks on."""
        self.view.setColumnHidden(WHY, is_covered)
        self.counts.setVisible(not is_covered)

    def choose(self, client: int) -> None:
        """Put a client under the hand, where it is shown."""
        place = self.model.place_of(client)
        if place is not None:
            self._go_to(place)

    def go_on(self, place: int) -> None:
        """Put the client at a place under the hand, or the last one where there are fewer."""
        if self.model.rows:
            self._go_to(min(place, len(self.model.rows) - 1))

    def changeEvent(self, event: QEvent) -> None:
        """Follow the size of text."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.FontChange:
            self._fit_face()

    def _fit_face(self) -> None:
        metrics = QFontMetrics(self.font())
        bold = QFont(self.font())
        bold.setBold(True)
        head = QFontMetrics(bold)
        for column, sample in _SAMPLES.items():
            # A code is seen whole up to a length; of two long ones the beginnings alone could be alike.
            words = max([sample, *self.model.codes], key=len)[:_LONGEST_CODE] if column == CODE else sample
            wanted = max(metrics.horizontalAdvance(words), head.horizontalAdvance(HEADS[column]))
            self.view.setColumnWidth(column, wanted + metrics.averageCharWidth() * 2)
        self.view.verticalHeader().setDefaultSectionSize(round(metrics.height() * 1.6))
        small = QFont(self.font())
        small.setPixelSize(round(QFontInfo(small).pixelSize() * _SMALL))
        self.budget.setFont(small)
        self._fit_columns()

    def resizeEvent(self, event: QResizeEvent) -> None:
        """In little room the reason goes before the days; the card and the order tell those too."""
        super().resizeEvent(event)
        self._fit_columns()

    def _fit_columns(self) -> None:
        metrics = QFontMetrics(self.font())
        left = self.width() - self.view.columnWidth(CODE) - _LEAST_REASON * metrics.averageCharWidth()
        for column in (NEXT, LAST):
            left -= self.view.columnWidth(column) or self.view.horizontalHeader().sectionSizeHint(column)
            self.view.setColumnHidden(column, left < 0)

    def _filter_by(self, words: str) -> None:
        self._keeping_client(lambda: self.model.filter(words))

    def _unfold(self, is_unfolded: bool) -> None:
        self._keeping_client(lambda: self.model.unfold(is_unfolded))
        self.fold.setText(f"{'Fold away' if is_unfolded else 'Show'} {self.model.folded} with nothing new")

    def _keeping_client(self, change: object) -> None:
        assert callable(change)
        self._is_filling = True
        change()
        self._is_filling = False
        # Until the hand has moved it stays on the first, whoever that is by then.
        place = self.model.place_of(self._chosen) if self._was_moved else None
        if place is None:
            place = 0 if self.model.rows else None
        if place is not None:
            self._settle_on(place)
        else:
            self._follow()

    def _settle_on(self, place: int) -> None:
        self._is_settling = True
        self._go_to(place)
        self._is_settling = False

    def _go_to(self, place: int) -> None:
        index = self.model.index(place, CODE)
        self.view.selectionModel().setCurrentIndex(
            index, QItemSelectionModel.SelectionFlag.ClearAndSelect | QItemSelectionModel.SelectionFlag.Rows
        )
        self.view.scrollTo(index)

    def _follow(self) -> None:
        row = self.current
        client = row.client.id if row is not None else 0
        if not self._is_filling and client != self._chosen:
            self._was_moved = self._was_moved or not self._is_settling
            self._chosen = client
            self.client_chosen.emit(client)
