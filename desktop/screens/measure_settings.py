"""A measure's settings: name, unit, what is wanted, what is asked about, and what was agreed."""

from __future__ import annotations

from dataclasses import replace

from PySide6.QtWidgets import (
    QComboBox,
    QDialog,
    QDialogButtonBox,
    QHBoxLayout,
    QLabel,
    QLineEdit,
    QMessageBox,
    QVBoxLayout,
    QWidget,
)

from desktop.exchange.number_tokens import Refusal, read_typed
from desktop.exchange.units import conversion
from desktop.journal.records import Measure
from desktop.screens.dialogs import AIMS, ZERO_ANSWERS
from desktop.screens.room import give_room, roomy_form
from desktop.wording.entry import number_text
from desktop.wording.numbers import count


class MeasureSettings(QDialog):
    """Everything about one measure that can be changed later."""

    def __init__(self, measure: Measure, values: int, parent: QWidget | None = None) -> None:
        """Ask about a measure.

        Args:
            measure: as it stands.
            values: how many numbers it holds, for the question about another unit.
            parent: the window.
        """
        super().__init__(parent)
        self.setWindowTitle(f"{measure.title}: settings")
        self._measure, self._values = measure, values
        self._chosen = measure
        self._conversion: tuple[float, float] | None = None
        self.title, self.unit = QLineEdit(measure.title), QLineEdit(measure.unit)
        self.zero = QComboBox()
        self.zero.addItems([text for text, _, _ in ZERO_ANSWERS])
        answers = [(kind, missed) for _, kind, missed in ZERO_ANSWERS]
        kind = "amount" if measure.kind == "count" else measure.kind
        self._kept_kind = (kind, measure.missed) not in answers
        if self._kept_kind:
            self.zero.addItem("As it is")
            self.zero.setCurrentIndex(len(answers))
        else:
            self.zero.setCurrentIndex(answers.index((kind, measure.missed)))
        self.aim = QComboBox()
        self.aim.addItems([text for text, _ in AIMS])
        self.aim.setCurrentIndex([aim for _, aim in AIMS].index(measure.aim))
        self.goal_low, self.goal_high = self._number(measure.goal_low), self._number(measure.goal_high)
        self.likely_low, self.likely_high = self._number(measure.likely_low), self._number(measure.likely_high)
        self.worth = self._number(measure.worth)
        self._form = roomy_form()
        self._form.addRow("Name", self.title)
        self._form.addRow("Unit", self.unit)
        self._form.addRow("Can a day truly be zero?", self.zero)
        self._form.addRow("What is wanted?", self.aim)
        self._goal_row = self._form.rowCount()
        self._form.addRow("The range, from and to", _side_by_side(self.goal_low, self.goal_high))
        self._form.addRow("Ask me about values below and above", _side_by_side(self.likely_low, self.likely_high))
        self._form.addRow("What size of move is worth it?", self.worth)
        self._problem = QLabel()
        self._problem.setWordWrap(True)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        buttons.button(QDialogButtonBox.StandardButton.Ok).setText("Keep")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.addLayout(self._form)
        layout.addWidget(self._problem)
        layout.addWidget(buttons)
        give_room(self, 80)
        self.aim.currentIndexChanged.connect(self._show_range)
        self._show_range()

    @property
    def chosen(self) -> Measure:
        """The measure as filled in; its numbers are still those of the old unit."""
        return self._chosen

    @property
    def conversion(self) -> tuple[float, float] | None:
        """Factor and offset for every number, or None where the numbers stay as they are."""
        return self._conversion

    def accept(self) -> None:
        """Take what was filled in, or say what is missing; another unit is asked about."""
        problem = self._read()
        self._problem.setText(problem)
        if not problem and self._is_unit_settled():
            super().accept()

    def _number(self, value: float | None) -> QLineEdit:
        box = QLineEdit("" if value is None else number_text(self._measure, value))
        box.setPlaceholderText("not set")
        return box

    def _show_range(self) -> None:
        self._form.setRowVisible(self._goal_row, AIMS[self.aim.currentIndex()][1] == "range")

    def _read(self) -> str:
        title = self.title.text().strip()
        if not title:
            self.title.setFocus()
            return "Give the measure a name, such as Walking."
        numbers: dict[str, float | None] = {}
        for name in ("goal_low", "goal_high", "likely_low", "likely_high", "worth"):
            box = getattr(self, name)
            text = box.text().strip()
            value = read_typed(text, self._measure.unit) if text else None
            if isinstance(value, Refusal):
                box.setFocus()
                return f"“{text}” is not a number. Type a number such as 30, or leave it empty."
            numbers[name] = value
        aim = AIMS[self.aim.currentIndex()][1]
        if aim != "range":
            numbers["goal_low"] = numbers["goal_high"] = None
        elif numbers["goal_low"] is None and numbers["goal_high"] is None:
            self.goal_low.setFocus()
            return "Give one end of the range or both, such as 40 and 60."
        for low, high in (("goal_low", "goal_high"), ("likely_low", "likely_high")):
            least, most = numbers[low], numbers[high]
            if least is not None and most is not None and least > most:
                numbers[low], numbers[high] = most, least
        worth = numbers["worth"]
        chosen = replace(
            self._measure,
            title=title,
            unit=self.unit.text().strip(),
            aim=aim,
            goal_low=numbers["goal_low"],
            goal_high=numbers["goal_high"],
            likely_low=numbers["likely_low"],
            likely_high=numbers["likely_high"],
            worth=abs(worth) if worth else None,
        )
        place = self.zero.currentIndex()
        if place < len(ZERO_ANSWERS):
            _, kind, missed = ZERO_ANSWERS[place]
            is_count = self._measure.kind == "count" and kind == "amount"
            chosen = replace(chosen, kind="count" if is_count else kind, missed=missed)
        self._chosen = chosen
        return ""

    def _is_unit_settled(self) -> bool:
        """Ask what another unit means for the numbers there are; False when the person thought better of it."""
        self._conversion = None
        old, new = self._measure.unit, self._chosen.unit
        known = conversion(old, new)
        if old == new or not self._values or known is None:
            return True
        box = QMessageBox(self)
        box.setWindowTitle("Another unit")
        numbers = count(self._values, "value")
        box.setText(f"{numbers} are written down in {old}. Turn them into {new}, or was {new} meant all along?")
        turn = box.addButton(f"Turn them into {new}", QMessageBox.ButtonRole.AcceptRole)
        keep = box.addButton("Keep the numbers", QMessageBox.ButtonRole.AcceptRole)
        back = box.addButton("Go back", QMessageBox.ButtonRole.RejectRole)
        box.setDefaultButton(back)
        box.setEscapeButton(back)
        box.exec()
        if box.clickedButton() is turn:
            self._conversion = known
        return box.clickedButton() in (turn, keep)


def _side_by_side(left: QWidget, right: QWidget) -> QHBoxLayout:
    row = QHBoxLayout()
    row.addWidget(left)
    row.addWidget(right)
    return row
