"""What the person settles about cautions: their emergency number, and their own limits for a measure."""

from __future__ import annotations

from PySide6.QtWidgets import (
    QCheckBox,
    QComboBox,
    QDialog,
    QDialogButtonBox,
    QFormLayout,
    QLabel,
    QLineEdit,
    QSpinBox,
    QVBoxLayout,
    QWidget,
)

from desktop.exchange.number_tokens import Refusal, read_typed
from desktop.journal.records import Measure
from desktop.wording.caution_table import OwnCautions, emergency_numbers, kind_and_unit
from desktop.wording.cautions import CAUTION
from desktop.wording.entry import number_text

NOT_CHOSEN = "Not chosen yet"
OTHER = "Another number"


class CautionSettings(QDialog):
    """One measure's cautions, and the number to call that holds for all of them."""

    def __init__(self, measure: Measure, own: OwnCautions, number: str, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setWindowTitle(f"{measure.title}: cautions")
        self._measure = measure
        self._chosen, self._number = own, number
        self.region = QComboBox()
        self.region.addItem(NOT_CHOSEN)
        for region, digits in emergency_numbers():
            self.region.addItem(f"{region}: {digits}", digits)
        self.region.addItem(OTHER)
        self.other = QLineEdit()
        self.other.setPlaceholderText("the number to call where I live")
        place = self.region.findData(number)
        if place > 0:
            self.region.setCurrentIndex(place)
        elif number:
            self.region.setCurrentIndex(self.region.count() - 1)
            self.other.setText(number)
        self.speaks = QCheckBox("Say something when a value I type meets a line")
        self.speaks.setChecked(not own.off)
        self.low, self.high, self.gain = self._box(own.low), self._box(own.high), self._box(own.gain)
        self.words = QLineEdit(own.words)
        self.words.setPlaceholderText("what my clinic said to do then")
        self.gain_days = QSpinBox()
        self.gain_days.setRange(1, 30)
        self.gain_days.setValue(own.gain_days)
        self.heart_failure = QCheckBox("I have heart failure and watch my weight")
        self.heart_failure.setChecked(own.heart_failure)
        form = QFormLayout()
        form.addRow("In an emergency I call", self.region)
        form.addRow("", self.other)
        form.addRow("", self.speaks)
        form.addRow("My own lower limit", self.low)
        form.addRow("My own upper limit", self.high)
        form.addRow("Beyond my limits", self.words)
        kind = kind_and_unit(measure)
        self._has_gain = kind is not None and kind[0] == "weight"
        form.addRow("", self.heart_failure)
        form.addRow("My clinic's limit for a gain", self.gain)
        form.addRow("within so many days", self.gain_days)
        for row in range(form.rowCount() - 3, form.rowCount()):
            form.setRowVisible(row, self._has_gain)
        hint = QLabel(
            "With a limit of your own, only that limit counts. In pregnancy, after birth, or for a child, ask "
            f"your care team for the limits. {CAUTION}"
        )
        hint.setWordWrap(True)
        self._problem = QLabel()
        self._problem.setWordWrap(True)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        buttons.button(QDialogButtonBox.StandardButton.Ok).setText("Keep")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.addLayout(form)
        layout.addWidget(hint)
        layout.addWidget(self._problem)
        layout.addWidget(buttons)
        self.setMinimumWidth(600)
        self.region.currentIndexChanged.connect(self._follow)
        self.heart_failure.toggled.connect(self._follow)
        self._follow()

    @property
    def chosen(self) -> OwnCautions:
        """What was settled for the measure."""
        return self._chosen

    @property
    def number(self) -> str:
        """The emergency number, or ``""``."""
        return self._number

    def accept(self) -> None:
        """Take what was filled in, or say what cannot be read."""
        numbers: list[float | None] = []
        for box in (self.low, self.high, self.gain):
            text = box.text().strip()
            value = read_typed(text, self._measure.unit) if text else None
            if isinstance(value, Refusal):
                box.setFocus()
                self._problem.setText(f"“{text}” is not a number. Type a number such as 30, or leave it empty.")
                return
            numbers.append(value)
        low, high, gain = numbers
        if low is not None and high is not None and low > high:
            low, high = high, low
        declared = self._has_gain and self.heart_failure.isChecked()
        self._chosen = OwnCautions(
            not self.speaks.isChecked(),
            low,
            high,
            declared,
            gain if declared else None,
            self.gain_days.value(),
            self.words.text().strip(),
        )
        is_other = self.region.currentText() == OTHER
        self._number = self.other.text().strip() if is_other else str(self.region.currentData() or "")
        super().accept()

    def _box(self, value: float | None) -> QLineEdit:
        box = QLineEdit("" if value is None else number_text(self._measure, value))
        box.setPlaceholderText("not set")
        return box

    def _follow(self) -> None:
        self.other.setVisible(self.region.currentText() == OTHER)
        self.gain.setEnabled(self.heart_failure.isChecked())
        self.gain_days.setEnabled(self.heart_failure.isChecked())
