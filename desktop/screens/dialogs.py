"""Short questions: a measure, a change, a reason, a day."""

from __future__ import annotations

from dataclasses import replace
from datetime import date

from PySide6.QtCore import QDate, Qt
from PySide6.QtWidgets import (
    QComboBox,
    QDateEdit,
    QDialog,
    QDialogButtonBox,
    QInputDialog,
    QLabel,
    QLineEdit,
    QListWidget,
    QMessageBox,
    QVBoxLayout,
    QWidget,
)

from analysis.log import MeasureKind, Missed
from desktop.exchange.number_tokens import Refusal, read_typed
from desktop.journal.records import AimWord, Measure
from desktop.models.ready_made import ready_measures
from desktop.screens.room import roomy_form
from desktop.wording.days import full_day
from desktop.wording.entry import number_text, pair_sentence, unread_sentence

_OWN = "My own measure"

ZERO_ANSWERS: tuple[tuple[str, MeasureKind, Missed], ...] = (
    ("Yes, and a day without an entry is zero", "amount", "zero"),
    ("Yes, but a day without an entry is not known", "amount", "blank"),
    ("No: it is a reading, such as a weight", "reading", "blank"),
    ("It is a score, such as pain 0 to 10", "score", "blank"),
)
AIMS: tuple[tuple[str, AimWord], ...] = (
    ("More is better", "more"),
    ("Less is better", "less"),
    ("Within a range", "range"),
    ("Just watching", "none"),
)


class MeasureDialog(QDialog):
    """What is measured, in two questions; a ready-made measure answers them."""

    def __init__(self, parent: QWidget | None = None, *, first: bool = False) -> None:
        super().__init__(parent)
        self.setWindowTitle("Start a log" if first else "Add a measure")
        self._ready = ready_measures()
        self._measures: list[Measure] = []
        self.choices = QListWidget()
        self.choices.addItems([name for name, _ in self._ready] + [_OWN])
        self.choices.setAccessibleName("What to log")
        self.title = QLineEdit()
        self.unit = QLineEdit()
        self.zero = QComboBox()
        self.zero.addItems([text for text, _, _ in ZERO_ANSWERS])
        self.aim = QComboBox()
        self.aim.addItems([text for text, _ in AIMS])
        self.low, self.high = QLineEdit(), QLineEdit()
        self._problem = QLabel()
        self._problem.setWordWrap(True)
        self._form = roomy_form()
        self._form.addRow("Name", self.title)
        self.why_fixed = QLabel()
        self.why_fixed.setWordWrap(True)
        self._form.addRow("", self.why_fixed)
        self._form.addRow("Unit", self.unit)
        self._form.addRow("Can a day truly be zero?", self.zero)
        self._form.addRow("What is wanted?", self.aim)
        self._form.addRow("Range from", self.low)
        self._form.addRow("to", self.high)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        buttons.button(QDialogButtonBox.StandardButton.Ok).setText("Start" if first else "Add")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.addWidget(QLabel("What do you want to log?"))
        layout.addWidget(self.choices)
        layout.addLayout(self._form)
        layout.addWidget(self._problem)
        layout.addWidget(buttons)
        self.choices.currentRowChanged.connect(self._fill)
        self.choices.itemDoubleClicked.connect(lambda _: self.accept())
        self.aim.currentIndexChanged.connect(self._show_range)
        self.choices.setCurrentRow(0)
        self.choices.setFocus()

    @property
    def measures(self) -> list[Measure]:
        """What was chosen; ids and positions are still to be given."""
        return self._measures

    def accept(self) -> None:
        """Take what was filled in, or say what is missing."""
        problem = self._read()
        self._problem.setText(problem)
        if not problem:
            super().accept()

    def _fill(self, row: int) -> None:
        own = [Measure(0, 0, "", kind="amount", missed="zero")]
        ready = self._ready[row][1] if row < len(self._ready) else own
        first = ready[0]
        is_pair = len(ready) > 1
        self.title.setText(" and ".join(measure.title for measure in ready))
        self.title.setEnabled(not is_pair)
        why = pair_sentence([measure.title for measure in ready]) if is_pair else ""
        self.why_fixed.setText(why)
        self.title.setAccessibleDescription(why)
        self._form.setRowVisible(self.why_fixed, is_pair)
        self.unit.setText(first.unit)
        kinds = [(kind, missed) for _, kind, missed in ZERO_ANSWERS]
        kind = "amount" if first.kind == "count" else first.kind
        self.zero.setCurrentIndex(kinds.index((kind, first.missed)))
        self.aim.setCurrentIndex([aim for _, aim in AIMS].index(first.aim))
        self._show_range()

    def _show_range(self) -> None:
        wants_range = AIMS[self.aim.currentIndex()][1] == "range"
        for box in (self.low, self.high):
            self._form.setRowVisible(box, wants_range)

    def _read(self) -> str:
        row = self.choices.currentRow()
        ready = self._ready[row][1] if 0 <= row < len(self._ready) else [Measure(0, 0, "")]
        title = self.title.text().strip()
        if len(ready) == 1 and not title:
            self.title.setFocus()
            return "Give the measure a name, such as Walking."
        _, kind, missed = ZERO_ANSWERS[self.zero.currentIndex()]
        aim = AIMS[self.aim.currentIndex()][1]
        low = high = None
        if aim == "range":
            read = [read_typed(box.text().strip(), self.unit.text().strip()) for box in (self.low, self.high)]
            if any(isinstance(one, Refusal) for one in read):
                return "Give both ends of the range as numbers, such as 40 and 60."
            low, high = sorted(one for one in read if not isinstance(one, Refusal))
        self._measures = []
        for measure in ready:
            is_count = measure.kind == "count" and kind == "amount"
            self._measures.append(
                replace(
                    measure,
                    title=title if len(ready) == 1 else measure.title,
                    unit=self.unit.text().strip(),
                    kind="count" if is_count else kind,
                    missed=missed,
                    aim=aim,
                    goal_low=low,
                    goal_high=high,
                    # The likely range was made for the ready-made unit.
                    likely_low=measure.likely_low if self.unit.text().strip() == measure.unit else None,
                    likely_high=measure.likely_high if self.unit.text().strip() == measure.unit else None,
                )
            )
        return ""


class DayBox(QDateEdit):
    """A day, typed or picked; the month is a word."""

    def __init__(self, day: date, parent: QWidget | None = None) -> None:
        super().__init__(QDate(day.year, day.month, day.day), parent)
        self.setDisplayFormat("d MMM yyyy")
        self.setCalendarPopup(True)
        self.setDateRange(QDate(1900, 1, 1), QDate(2199, 12, 31))

    def choose(self, day: date) -> None:
        """Put a day into the box."""
        self.setDate(QDate(day.year, day.month, day.day))

    @property
    def chosen(self) -> date:
        """The day in the box."""
        shown = self.date()
        return date(shown.year(), shown.month(), shown.day())


def ask_day(parent: QWidget, title: str, day: date) -> date | None:
    """Ask for a day; None when the person thought better of it."""
    dialog = QDialog(parent)
    dialog.setWindowTitle(title)
    box = DayBox(day)
    buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
    buttons.accepted.connect(dialog.accept)
    buttons.rejected.connect(dialog.reject)
    layout = QVBoxLayout(dialog)
    layout.addWidget(box)
    layout.addWidget(buttons)
    return box.chosen if dialog.exec() == QDialog.DialogCode.Accepted else None


def ask_reason(parent: QWidget) -> str | None:
    """Ask why a day is set aside; None when the person thought better of it."""
    text, accepted = QInputDialog.getText(
        parent,
        "Set the day aside",
        "Why does this day not count? The value is kept.",
        QLineEdit.EchoMode.Normal,
        "",
        Qt.WindowType.Dialog,
    )
    return text.strip() if accepted else None


def ask_if_right(parent: QWidget, measure: Measure, value: float, day: date) -> bool:
    """Ask whether a number far from what this measure usually is was meant."""
    typed = f"{number_text(measure, value)} {measure.unit}".strip()
    box = QMessageBox(parent)
    box.setWindowTitle("Is that right?")
    box.setText(f"You typed {typed} for {full_day(day)}. Is that right?")
    keep = box.addButton("Keep it", QMessageBox.ButtonRole.AcceptRole)
    again = box.addButton("Type it again", QMessageBox.ButtonRole.RejectRole)
    box.setDefaultButton(again)
    box.setEscapeButton(again)
    box.exec()
    return box.clickedButton() is keep


def ask_to_leave_unread(parent: QWidget, unread: list[tuple[date, str]]) -> bool:
    """Ask before what could not be read is gone; nothing is asked where there is nothing."""
    if not unread:
        return True
    yes = QMessageBox.StandardButton.Yes
    return QMessageBox.question(parent, "Dayfence", unread_sentence(unread)) == yes
