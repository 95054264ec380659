"""The left pane: the days, typed one after the other."""

from __future__ import annotations

from datetime import date
from typing import cast

from PySide6.QtCore import QEvent, QModelIndex, QObject, QPersistentModelIndex, Qt, Signal
from PySide6.QtGui import (
    QAction,
    QColor,
    QContextMenuEvent,
    QFont,
    QFontMetrics,
    QGuiApplication,
    QKeyEvent,
    QKeySequence,
    QPainter,
    QResizeEvent,
)
from PySide6.QtWidgets import (
    QAbstractItemDelegate,
    QAbstractItemView,
    QHeaderView,
    QLineEdit,
    QMenu,
    QStyle,
    QStyledItemDelegate,
    QStyleOptionViewItem,
    QTableView,
    QWidget,
)

from desktop.journal.records import Measure
from desktop.models.days_table import KIND_LETTERS, DaysTable
from desktop.wording.entry import HOLDS_A_VALUE, LAST_DAY

_ROW_HEIGHT = 1.7
"""Of a line of text; at least 24 pixels to press."""
_LEAST_HEIGHT = 24
_EDGE = 3
"""Pixels between a cell's edge and its text, besides the letter that parts a number from the note beside it."""
_NOTE, _LEAST_NOTE = 14, 7
"""Room for a note, in letters: wanted, and where the pane is narrow."""


class DaysPane(QTableView):
    """A digit starts typing, Enter keeps it and goes to the next day, Tab to the next measure.

    Signals:
        said: a sentence about what was just done or could not be done.
        layout_changed: the columns, or the room they need, are others.
    """

    said = Signal(str)
    layout_changed = Signal()

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.offered: list[QAction] = []
        self._place: tuple[date, Measure | None] | None = None
        self.setItemDelegate(_CellDelegate(self))
        self.setEditTriggers(
            QAbstractItemView.EditTrigger.AnyKeyPressed
            | QAbstractItemView.EditTrigger.DoubleClicked
            | QAbstractItemView.EditTrigger.EditKeyPressed
        )
        self.setTabKeyNavigation(True)
        self.setShowGrid(False)
        self.setFrameShape(self.Shape.NoFrame)
        self.setHorizontalScrollMode(QAbstractItemView.ScrollMode.ScrollPerPixel)
        self.verticalHeader().setSectionResizeMode(QHeaderView.ResizeMode.Fixed)
        self.verticalHeader().setDefaultAlignment(Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter)
        self.horizontalHeader().setHighlightSections(False)
        self.verticalHeader().setHighlightSections(False)
        self.horizontalHeader().setSectionsMovable(False)
        self.horizontalHeader().setStretchLastSection(False)
        # Without these, rows would keep the least height of a larger text that was shown before.
        self.verticalHeader().setMinimumSectionSize(_LEAST_HEIGHT)
        self.setWordWrap(False)
        self.setCornerButtonEnabled(False)
        self.setAccessibleName("Days")
        self._settle_sizes()

    def show_days(self, model: DaysTable) -> None:
        """Show the days of a journal, today in reach."""
        self.setModel(model)
        self._settle_sizes()
        model.modelReset.connect(self._settle_sizes)
        # Other columns or other words for one leave the hand where it was.
        model.modelAboutToBeReset.connect(self._remember_place)
        model.modelReset.connect(self._go_back_to_place)
        self.go_to_row(model.rowCount() - 1)

    @property
    def days(self) -> DaysTable:
        """The model shown."""
        return cast(DaysTable, self.model())

    @property
    def chosen_days(self) -> set[date]:
        """The days of the cells that are selected."""
        return (
            {self.days.day(index.row()) for index in self.selectedIndexes()} if self.model() is not None else set()
        )

    def go_to_row(self, row: int) -> None:
        """Make a day current, in the measure that is current, and bring it into view."""
        column = max(self.currentIndex().column(), 0)
        self.setCurrentIndex(self.model().index(row, column))
        self.scrollTo(self.currentIndex(), QAbstractItemView.ScrollHint.PositionAtBottom)

    def go_to_column(self, column: int) -> None:
        """Make a measure current, on the day that is current."""
        self.setCurrentIndex(self.model().index(max(self.currentIndex().row(), 0), column))

    def finish_typing(self) -> None:
        """Keep what is in the cell being typed into, if any."""
        if self.state() == QAbstractItemView.State.EditingState:
            editor = self.indexWidget(self.currentIndex()) or self.viewport().findChild(QLineEdit)
            if editor is not None:
                self.commitData(editor)
                super().closeEditor(editor, QAbstractItemDelegate.EndEditHint.NoHint)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Enter goes down; Delete makes blank; r, i and a set the kind of day."""
        harmless = Qt.KeyboardModifier.KeypadModifier | Qt.KeyboardModifier.ShiftModifier
        is_plain = not event.modifiers() & ~harmless
        is_note = self.days.measure(self.currentIndex().column()) is None
        key, text = event.key(), event.text().lower()
        can_change = bool(self.model().flags(self.currentIndex()) & Qt.ItemFlag.ItemIsEditable)
        if self.state() == QAbstractItemView.State.EditingState:
            # The editor has had its keys; one that it lets pass is not for the table.
            event.accept()
        elif key in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
            self._go_down()
        elif key in (Qt.Key.Key_Delete, Qt.Key.Key_Backspace) and can_change:
            self.days.clear(self.selectedIndexes())
        elif is_plain and text in KIND_LETTERS and not is_note and can_change and self._hold_values():
            self.said.emit(HOLDS_A_VALUE)
        elif is_plain and text in KIND_LETTERS and not is_note and can_change:
            self.days.set_kind(self.selectedIndexes(), KIND_LETTERS[text])
            self._go_down()
        elif event.matches(QKeySequence.StandardKey.Paste) and can_change:
            self.paste()
        elif event.matches(QKeySequence.StandardKey.Copy):
            self.copy()
        else:
            super().keyPressEvent(event)

    def paste(self) -> None:
        """Write a block from the clipboard, from the current cell on."""
        text = QGuiApplication.clipboard().text()
        if text.strip():
            self.said.emit(self.days.paste(self.currentIndex(), text))

    def copy(self) -> None:
        """Put the selected block on the clipboard, columns parted by tabs."""
        selection = self.selectionModel().selection()
        if selection.isEmpty():
            return
        block = selection.at(0)
        lines = [
            "\t".join(
                str(self.model().index(row, column).data(Qt.ItemDataRole.EditRole) or "")
                for column in range(block.left(), block.right() + 1)
            )
            for row in range(block.top(), block.bottom() + 1)
        ]
        QGuiApplication.clipboard().setText("\n".join(lines))

    def closeEditor(self, editor: QWidget, hint: QAbstractItemDelegate.EndEditHint) -> None:
        """After Enter the next day is current, not the cell typed into."""
        if hint == QAbstractItemDelegate.EndEditHint.SubmitModelCache:
            super().closeEditor(editor, QAbstractItemDelegate.EndEditHint.NoHint)
            self._go_down()
        else:
            super().closeEditor(editor, hint)

    def contextMenuEvent(self, event: QContextMenuEvent) -> None:
        """What can be done with the chosen days."""
        menu = QMenu(self)
        menu.addActions(self.offered)
        menu.exec(event.globalPos())

    def changeEvent(self, event: QEvent) -> None:
        """Follow the text size."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.FontChange:
            self._settle_sizes()
            self._keep_in_view()

    def resizeEvent(self, event: QResizeEvent) -> None:
        """The note follows the width; the cell that is current stays in view."""
        super().resizeEvent(event)
        self._fit_note()
        self._keep_in_view()

    def _keep_in_view(self) -> None:
        if self.model() is not None and self.currentIndex().isValid():
            self.scrollTo(self.currentIndex())

    def _hold_values(self) -> bool:
        """Whether a number is written down on any of the chosen days: one letter must not take it away."""
        return any(self.days.holds_a_value(index) for index in self.selectedIndexes())

    def _remember_place(self) -> None:
        index = self.currentIndex()
        if index.isValid():
            self._place = (self.days.day(index.row()), self.days.measure(index.column()))

    def _go_back_to_place(self) -> None:
        if self._place is None or not self.days.rowCount():
            return
        day, measure = self._place
        row = min(max(self.days.row(day), 0), self.days.rowCount() - 1)
        column = self.days.columnCount() - 1 if measure is None else self.days.column(measure.id)
        self.setCurrentIndex(self.days.index(row, column))

    def _go_down(self) -> None:
        at = self.currentIndex()
        if at.row() == self.model().rowCount() - 1:
            self.said.emit(LAST_DAY)
        below = min(at.row() + 1, self.model().rowCount() - 1)
        self.setCurrentIndex(self.model().index(below, at.column()))

    def _settle_sizes(self) -> None:
        metrics = QFontMetrics(self.font())
        letter = metrics.averageCharWidth()
        strong = QFont(self.font())
        strong.setBold(True)
        bold = QFontMetrics(strong)
        self.verticalHeader().setDefaultSectionSize(max(_LEAST_HEIGHT, round(metrics.height() * _ROW_HEIGHT)))
        self.verticalHeader().setFixedWidth(metrics.horizontalAdvance("Wed 28 Mar") + 2 * letter + 12)
        if self.model() is None:
            return
        self.horizontalHeader().setMinimumSectionSize(letter * _LEAST_NOTE)
        for column in range(self.model().columnCount() - 1):
            title = str(self.model().headerData(column, Qt.Orientation.Horizontal) or "")
            widest = max(bold.horizontalAdvance(line) for line in [*title.split("\n"), "set aside"])
            self.setColumnWidth(column, widest + 3 * letter)
        self._fit_note()
        self.layout_changed.emit()

    def _fit_note(self) -> None:
        """The note takes what the measures leave, and is cut short where it is longer."""
        if self.model() is not None:
            # Qt's own stretching leaves the column as wide as it was after some changes of the text's size.
            least = QFontMetrics(self.font()).averageCharWidth() * _LEAST_NOTE
            left = self.viewport().width() - self._measures_width
            self.setColumnWidth(self.model().columnCount() - 1, max(left, least))

    def set_paper(self, paper: str) -> None:
        """Give titles and days the paper of the cells, without the style's raised edges."""
        self.setStyleSheet(f"QTableCornerButton::section {{ background: {paper}; border: none; }}")
        # Titles end where the numbers under them do; the padding of a section, not of its header.
        inside = _EDGE + QFontMetrics(self.font()).averageCharWidth()
        for header, padding in ((self.horizontalHeader(), inside), (self.verticalHeader(), 12)):
            header.setStyleSheet(
                f"QHeaderView {{ background: {paper}; border: none; }}"
                f"QHeaderView::section {{ background: {paper}; border: none; padding: 0 {padding}px; }}"
            )

    def width_within(self, most: int) -> int:
        """Wide enough for the days, every measure and a note; else for whole columns, never a part of one."""
        if self.model() is None:
            return self.minimumWidth()
        letter = QFontMetrics(self.font()).averageCharWidth()
        width = self.verticalHeader().width() + self.verticalScrollBar().sizeHint().width()
        for column in range(self.model().columnCount() - 1):
            wider = width + self.columnWidth(column)
            if column and wider > most:
                return width
            width = wider
        return min(most, width + _NOTE * letter) if width + _LEAST_NOTE * letter <= most else width

    @property
    def _measures_width(self) -> int:
        return sum(self.columnWidth(column) for column in range(self.model().columnCount() - 1))


_NOTE_SIDE = Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter
_NUMBER_SIDE = Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
_SURELY_SHORT = 6
"""Letters that fit into every column."""


class _CellDelegate(QStyledItemDelegate):
    """A plain line of text as editor: the model reads it, in any locale alike."""

    def eventFilter(self, editor: QObject, event: QEvent) -> bool:
        """Enter keeps what was typed at once.

        Qt would keep it a moment later; the digits of a quick hand, or on a slow computer, would land in the cell
        that was meant to be done.
        """
        if event.type() == QEvent.Type.KeyPress and isinstance(editor, QLineEdit):
            key = cast(QKeyEvent, event).key()
            if key in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
                self.commitData.emit(editor)
                self.closeEditor.emit(editor, QAbstractItemDelegate.EndEditHint.SubmitModelCache)
                return True
        return super().eventFilter(editor, event)

    def paint(
        self, painter: QPainter, option: QStyleOptionViewItem, index: QModelIndex | QPersistentModelIndex
    ) -> None:
        """Paint a cell as it stands; a number ends, and a note begins, a little inside its column.

        The style asks for every role of a cell, which takes longer than all else between a key and its number.
        """
        model, view = cast(DaysTable, index.model()), cast(QTableView, option.widget)
        state, rect, palette = option.state, option.rect, option.palette
        colour = model.data(index, Qt.ItemDataRole.ForegroundRole)
        face = model.data(index, Qt.ItemDataRole.FontRole)
        is_chosen = bool(state & QStyle.StateFlag.State_Selected)
        if is_chosen or state & QStyle.StateFlag.State_MouseOver:
            view.style().drawPrimitive(QStyle.PrimitiveElement.PE_PanelItemViewItem, option, painter, view)
        if state & QStyle.StateFlag.State_HasFocus:
            painter.setPen(palette.link().color())
            painter.drawRect(rect.adjusted(0, 0, -1, -1))
        font = face.resolve(view.font()) if isinstance(face, QFont) else view.font()
        painter.setFont(font)
        if is_chosen:
            painter.setPen(palette.highlightedText().color())
        else:
            painter.setPen(colour if isinstance(colour, QColor) else palette.text().color())
        metrics = QFontMetrics(font)
        inside = _EDGE + metrics.averageCharWidth()
        is_note = model.measure(index.column()) is None
        room = rect.adjusted(inside, 0, -_EDGE, 0) if is_note else rect.adjusted(_EDGE, 0, -inside, 0)
        text = str(model.data(index) or "")
        if len(text) > _SURELY_SHORT:
            text = metrics.elidedText(" ".join(text.split()), Qt.TextElideMode.ElideRight, room.width())
        painter.drawText(room, _NOTE_SIDE if is_note else _NUMBER_SIDE, text)

    def createEditor(
        self, parent: QWidget, option: QStyleOptionViewItem, index: QModelIndex | QPersistentModelIndex
    ) -> QWidget:
        editor = QLineEdit(parent)
        editor.setFrame(False)
        model = cast(DaysTable, index.model())
        is_note = model.measure(index.column()) is None
        editor.setAlignment(Qt.AlignmentFlag.AlignLeft if is_note else Qt.AlignmentFlag.AlignRight)
        editor.setAccessibleName(str(index.data(Qt.ItemDataRole.AccessibleTextRole) or ""))
        editor.setMaxLength(2000 if is_note else 60)
        return editor
