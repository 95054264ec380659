"""Bringing in a table: questions first, then what every line becomes, then one act that can be taken back."""

from __future__ import annotations

from pathlib import Path
from typing import Any

from PySide6.QtCore import Qt
from PySide6.QtWidgets import (
    QCheckBox,
    QComboBox,
    QDialog,
    QDialogButtonBox,
    QGridLayout,
    QLabel,
    QLineEdit,
    QMessageBox,
    QPlainTextEdit,
    QVBoxLayout,
    QWidget,
)

from analysis.log import MeasureKind, Missed
from desktop.edits.bring_in import BroughtIn, bring_in
from desktop.errors import ExchangeError
from desktop.exchange.bring_in import read_file
from desktop.exchange.reading import ReadColumn, Reading
from desktop.journal.records import Entry, Measure
from desktop.models.session import Session
from desktop.wording.numbers import count, decimals_of
from desktop.wording.problems import choice_label, problem_sentence

_ANSWERS = {
    "which day order": "day_order",
    "which decimal mark": "decimal",
    "which day column": "day_column",
    "which century": "century",
    "which name column": "name_column",
}
"""The argument of the importer that answers each of its questions."""

_KINDS: tuple[tuple[str, MeasureKind, Missed], ...] = (
    ("a reading: blank stays blank", "reading", "blank"),
    ("an amount: a missed day is zero", "amount", "zero"),
    ("an amount: blank stays blank", "amount", "blank"),
    ("a score: blank stays blank", "score", "blank"),
)
_FATES_SHOWN = 200


def read_with_questions(parent: QWidget, path: Path) -> Reading | None:
    """Read a table, asking whatever only the person can know.

    Returns:
        None when the person did not answer, or the file cannot be brought in; that was said.
    """
    answers: dict[str, Any] = {}
    while True:
        try:
            return read_file(path, **answers)
        except ExchangeError as error:
            argument = _ANSWERS.get(error.reason)
            if argument is None:
                QMessageBox.warning(parent, "Bring in a table", problem_sentence(error))
                return None
            answer = _ask(parent, error)
            if answer is None:
                return None
            answers[argument] = answer


def _ask(parent: QWidget, error: ExchangeError) -> object:
    """One question with a button for each answer; nothing is brought in yet."""
    box = QMessageBox(parent)
    box.setWindowTitle("Bring in a table")
    box.setText(problem_sentence(error))
    box.setInformativeText("Nothing is brought in yet.")
    choices = error.fields["choices"]
    assert isinstance(choices, list)
    buttons = {
        box.addButton(choice_label(error.reason, choice), QMessageBox.ButtonRole.AcceptRole): choice
        for choice in choices
    }
    box.addButton(QMessageBox.StandardButton.Cancel)
    box.exec()
    return next((choice for button, choice in buttons.items() if button is box.clickedButton()), None)


class BringInDialog(QDialog):
    """What was read: a row a column with the measure it becomes, and the lines set aside."""

    def __init__(self, path: Path, reading: Reading, session: Session, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setWindowTitle("Bring in a table")
        self._reading = reading
        self._session = session
        self.brought: BroughtIn | None = None
        self._rows: list[tuple[QCheckBox, QLineEdit, QComboBox, ReadColumn]] = []
        layout = QVBoxLayout(self)
        summary = QLabel(self._summary(path))
        summary.setWordWrap(True)
        layout.addWidget(summary)
        layout.addLayout(self._columns())
        layout.addWidget(self._set_aside())
        self._problem = QLabel()
        self._problem.setWordWrap(True)
        layout.addWidget(self._problem)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        buttons.button(QDialogButtonBox.StandardButton.Ok).setText("Bring in")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout.addWidget(buttons)
        self.setMinimumWidth(620)

    def accept(self) -> None:
        """Bring in the chosen columns, or say what keeps them out."""
        chosen = [row for row in self._rows if row[0].isChecked()]
        if not chosen:
            self._problem.setText("Choose at least one column.")
            return
        days = [value.day for _, _, _, column in chosen for value in column.values]
        if days and not 1900 <= min(days).year <= max(days).year <= 2199:
            self._problem.setText("A journal holds the years 1900 to 2199; this table reaches further.")
            return
        measures, entries = self._records(chosen)
        self.brought = bring_in(
            self._session.journal, self._session.ids, measures, entries, now=self._session.now()
        )
        self._session.do(self.brought.edit)
        super().accept()

    def _summary(self, path: Path) -> str:
        reading = self._reading
        kept = len(reading.fates) - len(reading.set_aside)
        lines, aside = count(len(reading.fates), "line"), len(reading.set_aside)
        told = [f"{path.name}: {lines} read, {kept} kept, {aside} set aside."]
        days = [value.day for column in reading.columns for value in column.values]
        if days:
            told.append(f"Days from {min(days):%Y-%m-%d} to {max(days):%Y-%m-%d}.")
        if reading.several_a_day:
            told.append(f"{count(len(reading.several_a_day), 'day')} with more than one value: all are kept.")
        if reading.encoding_guessed:
            told.append("Nothing in the file says how its letters are written; do the names below look right?")
        return " ".join(told)

    def _columns(self) -> QGridLayout:
        grid = QGridLayout()
        for place, heading in enumerate(("Column", "Measure", "It is")):
            grid.addWidget(QLabel(heading), 0, place)
        known = {measure.title: measure for measure in self._session.journal.columns()}
        for row, column in enumerate(self._reading.columns, start=1):
            wanted = QCheckBox(f"{column.name}, {count(len(column.values), 'value')}")
            wanted.setChecked(True)
            title = QLineEdit(column.name)
            title.setAccessibleName(f"Measure for {column.name}")
            kind = QComboBox()
            kind.addItems([text for text, _, _ in _KINDS])
            kind.setAccessibleName(f"What {column.name} is")
            same = known.get(column.name)
            if same is not None:
                kind.setEnabled(False)
                kind.setToolTip("The measure of this name is in the journal; the values are added to it.")
            grid.addWidget(wanted, row, 0)
            grid.addWidget(title, row, 1)
            grid.addWidget(kind, row, 2)
            self._rows.append((wanted, title, kind, column))
        return grid

    def _set_aside(self) -> QWidget:
        refused = [fate for column in self._reading.columns for fate in column.refused]
        aside = {fate.line: fate for fate in [*self._reading.set_aside, *refused]}
        if not aside:
            return QLabel("No line is set aside.")
        lines = [f"line {fate.line}: {fate.reason}: {fate.text}" for _, fate in sorted(aside.items())]
        if len(lines) > _FATES_SHOWN:
            lines = [*lines[:_FATES_SHOWN], f"and {len(lines) - _FATES_SHOWN} more"]
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
        known = {measure.title: measure for measure in self._session.journal.columns()}
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
