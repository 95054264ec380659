"""Bringing in a table: questions first, then what every line becomes, then one act that can be taken back."""

from __future__ import annotations

from collections.abc import Sequence
from functools import partial
from typing import TYPE_CHECKING

from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtWidgets import (
    QCheckBox,
    QComboBox,
    QDialog,
    QDialogButtonBox,
    QGridLayout,
    QLabel,
    QLineEdit,
    QPlainTextEdit,
    QScrollArea,
    QVBoxLayout,
    QWidget,
)

from analysis.log import MeasureKind, Missed
from desktop.edits.bring_in import bring_in
from desktop.exchange.bring_in import read_table
from desktop.exchange.limits import for_journal
from desktop.exchange.reading import ReadColumn, Reading
from desktop.journal.records import Entry, Measure
from desktop.screens.bring_in_preview import lines_set_aside, summary_of
from desktop.screens.reading_table import Read, read_with_questions
from desktop.screens.room import give_room
from desktop.wording.bring_in import NOTHING_PASTED, NOTHING_TO_BRING_IN, PASTED_BLOCK
from desktop.wording.numbers import count, decimals_of

if TYPE_CHECKING:
    from desktop.screens.main_window import MainWindow

_KINDS: tuple[tuple[str, MeasureKind, Missed], ...] = (
    ("a reading: blank stays blank", "reading", "blank"),
    ("an amount: a missed day is zero", "amount", "zero"),
    ("an amount: blank stays blank", "amount", "blank"),
    ("a score: blank stays blank", "score", "blank"),
)
_MOST_WITHOUT_SCROLLING = 8


class BringInDialog(QDialog):
    """What was read: a row a column with the measure it becomes, and the lines set aside."""

    def __init__(
        self, name: str, reading: Reading, known: Sequence[Measure], parent: QWidget | None = None
    ) -> None:
        """Show what was read.

        Args:
            name: of the table's file.
            reading: what it came to.
            known: the measures of the open journal; a column of the same name is added to one.
            parent: the window.
        """
        super().__init__(parent)
        self.setWindowTitle("Bring in a table")
        self._reading = reading
        self._known = {measure.title: measure for measure in known}
        self.chosen: tuple[list[Measure], list[Entry]] | None = None
        self._rows: list[tuple[QCheckBox, QLineEdit, QComboBox, ReadColumn]] = []
        layout = QVBoxLayout(self)
        summary = QLabel(summary_of(name, reading))
        summary.setWordWrap(True)
        layout.addWidget(summary)
        layout.addWidget(self._columns())
        layout.addWidget(self._set_aside())
        self._problem = QLabel()
        self._problem.setWordWrap(True)
        layout.addWidget(self._problem)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        buttons.button(QDialogButtonBox.StandardButton.Ok).setText("Bring in")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout.addWidget(buttons)
        give_room(self, 78)

    def accept(self) -> None:
        """Bring in the chosen columns, or say what keeps them out."""
        chosen = [row for row in self._rows if row[0].isChecked()]
        if not chosen:
            self._problem.setText("Choose at least one column.")
            return
        if not any(len(column.values) for _, _, _, column in chosen):
            self._problem.setText(NOTHING_TO_BRING_IN)
            return
        self.chosen = self._records(chosen)
        super().accept()

    def _columns(self) -> QWidget:
        inside = QWidget()
        grid = QGridLayout(inside)
        grid.setContentsMargins(0, 0, 0, 0)
        for place, heading in enumerate(("Column", "Measure", "It is")):
            grid.addWidget(QLabel(heading), 0, place)
        for row, column in enumerate(self._reading.columns, start=1):
            wanted = QCheckBox(f"{column.name}, {count(len(column.values), 'value')}")
            wanted.setChecked(True)
            title = QLineEdit(column.name)
            title.setAccessibleName(f"Measure for {column.name}")
            kind = QComboBox()
            kind.addItems([text for text, _, _ in _KINDS])
            kind.setAccessibleName(f"What {column.name} is")
            same = self._known.get(column.name)
            if same is not None:
                kind.setEnabled(False)
                kind.setToolTip("The measure of this name is in the journal; the values are added to it.")
            grid.addWidget(wanted, row, 0)
            grid.addWidget(title, row, 1)
            grid.addWidget(kind, row, 2)
            self._rows.append((wanted, title, kind, column))
        if len(self._rows) <= _MOST_WITHOUT_SCROLLING:
            return inside
        area = QScrollArea()
        area.setWidget(inside)
        area.setWidgetResizable(True)
        return area

    def _set_aside(self) -> QWidget:
        lines = lines_set_aside(self._reading)
        if not lines:
            return QLabel("No line is set aside.")
        box = QPlainTextEdit("\n".join(lines))
        box.setReadOnly(True)
        box.setAccessibleName("Lines set aside")
        box.setTextInteractionFlags(
            Qt.TextInteractionFlag.TextSelectableByMouse | Qt.TextInteractionFlag.TextSelectableByKeyboard
        )
        return box

    def _records(
        self, chosen: list[tuple[QCheckBox, QLineEdit, QComboBox, ReadColumn]]
    ) -> tuple[list[Measure], list[Entry]]:
        known = dict(self._known)
        measures: list[Measure] = []
        entries: list[Entry] = []
        for place, (_, title_box, kind_box, column) in enumerate(chosen):
            title = title_box.text().strip() or column.name
            measure = known.get(title)
            if measure is None:
                _, kind, missed = _KINDS[kind_box.currentIndex()]
                measure = Measure(
                    -place,
                    0,
                    title,
                    column.unit,
                    kind,
                    missed=missed,
                    period=self._reading.period,
                    decimals=decimals_of(value.value for value in column.values),
                    pair="pressure" if column.pair else "",
                )
                measures.append(measure)
                known[title] = measure
            entries += [
                Entry(measure.id, value.day, value.slot, value.value, "value", "", value.original, "table")
                for value in column.values
            ]
        return measures, entries


def bring_in_pasted(window: MainWindow) -> None:
    """Bring in the table that is on the clipboard; by the same rules as one from a file."""
    text = QGuiApplication.clipboard().text()
    if text.strip():
        bring_in_rows(window, PASTED_BLOCK, partial(read_table, text.encode(errors="replace")))
    else:
        window.say(NOTHING_PASTED)


def bring_in_rows(window: MainWindow, name: str, read: Read) -> None:
    """Read a table, show what it becomes, and bring in what is chosen.

    A new journal is made only then: whoever leaves the preview has none.
    """
    reading = read_with_questions(window, name, read)
    if reading is None:
        return
    known = window.session.journal.columns() if window.session is not None else []
    dialog = BringInDialog(name, for_journal(reading), known, window)
    if dialog.exec() != QDialog.DialogCode.Accepted or dialog.chosen is None:
        return
    session = window.session or window.start_journal(window.own_journal)
    if session is None:
        return
    measures, entries = dialog.chosen
    brought = bring_in(session.journal, session.ids, measures, entries, now=session.now())
    session.do(brought.edit)
    window.say_brought(brought)
