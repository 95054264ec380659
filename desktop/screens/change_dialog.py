"""What changed, on which day, why that day, and what was agreed: the size worth it and the day to look."""

from __future__ import annotations

from dataclasses import replace
from datetime import date, timedelta

from PySide6.QtWidgets import (
    QCheckBox,
    QComboBox,
    QDialog,
    QDialogButtonBox,
    QFormLayout,
    QHBoxLayout,
    QLabel,
    QLineEdit,
    QSpinBox,
    QVBoxLayout,
    QWidget,
)

from desktop.exchange.number_tokens import Refusal, read_typed
from desktop.journal.records import Change, Measure, WhyThatDay
from desktop.screens.dialogs import DayBox
from desktop.screens.room import give_room, roomy_form
from desktop.wording.entry import number_text

_WHY: tuple[tuple[str, WhyThatDay | None], ...] = (
    ("not said", None),
    ("things had been bad", "bad spell"),
    ("it was planned", "planned"),
    ("somebody advised it", "advised"),
    ("another reason", "other"),
)
USUAL_DAYS_TO_LOOK = 28


class ChangeDialog(QDialog):
    """A change as one talks about it; everything but the day may be left as it is."""

    def __init__(
        self,
        day: date,
        measures: list[Measure],
        parent: QWidget | None = None,
        change: Change | None = None,
        judged: Measure | None = None,
    ) -> None:
        """Ask about a new change, or about the one given.

        Args:
            day: the day proposed.
            measures: those it may concern.
            parent: the window.
            change: the change to edit, or None for a new one.
            judged: the measure that the answer is looked at for; None asks nothing of size and look-day.
        """
        super().__init__(parent)
        self.setWindowTitle("Edit the change" if change else "Mark a change")
        self._change = change
        self._judged = judged
        self.label = QLineEdit(change.label if change else "")
        self.label.setPlaceholderText("for example: off the bus one stop early")
        self.day = DayBox(change.day if change else day)
        self.why = QComboBox()
        self.why.addItems([text for text, _ in _WHY])
        self.why.setCurrentIndex([why for _, why in _WHY].index(change.why if change else None))
        self.settle = QSpinBox()
        self.settle.setRange(0, 365)
        self.settle.setValue(change.settle_days if change else 0)
        self.settle.setToolTip("Days from the change on, shown but not counted. 1 leaves just the day out.")
        self.concerns = QComboBox()
        self.concerns.addItem("every measure", ())
        for measure in measures:
            self.concerns.addItem(f"only {measure.title}", (measure.id,))
        if change:
            self.concerns.setCurrentIndex(max(0, self.concerns.findData(change.measures)))
        form = roomy_form()
        form.addRow("What changed?", self.label)
        form.addRow("First day", self.day)
        form.addRow("Why that day?", self.why)
        form.addRow("Settling-in days", self.settle)
        if len(measures) > 1:
            form.addRow("It concerns", self.concerns)
        self.worth, self.look, self.look_day = QLineEdit(), QCheckBox("on"), DayBox(self.day.chosen)
        if judged is not None:
            self._ask_what_is_agreed(form, judged)
        self._problem = QLabel()
        self._problem.setWordWrap(True)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        buttons.button(QDialogButtonBox.StandardButton.Ok).setText("Keep" if change else "Mark")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.addLayout(form)
        layout.addWidget(self._problem)
        layout.addWidget(buttons)
        give_room(self, 75)
        self.label.setFocus()

    def accept(self) -> None:
        """Take what was filled in, or say what cannot be read."""
        if isinstance(self._read_worth(), Refusal):
            self._problem.setText("The size worth it is a number, such as 10; or leave it empty.")
            self.worth.setFocus()
            return
        super().accept()

    @property
    def chosen(self) -> Change:
        """What was filled in; the id is that of the change edited, else 0."""
        concerns = self.concerns.currentData()
        return Change(
            self._change.id if self._change else 0,
            self.day.chosen,
            self.label.text().strip(),
            _WHY[self.why.currentIndex()][1],
            self.settle.value(),
            tuple(concerns or ()),
        )

    @property
    def agreed(self) -> Measure | None:
        """The judged measure with the size worth it and the look-day."""
        worth = self._read_worth()
        if self._judged is None or isinstance(worth, Refusal):
            return None
        look_day = self.look_day.chosen if self.look.isChecked() else None
        return replace(self._judged, worth=worth, look_day=look_day)

    def _ask_what_is_agreed(self, form: QFormLayout, judged: Measure) -> None:
        if judged.worth is not None:
            self.worth.setText(number_text(judged, judged.worth))
        self.worth.setPlaceholderText("not said")
        sized = QHBoxLayout()
        sized.addWidget(self.worth)
        sized.addWidget(QLabel(judged.unit))
        form.addRow(f"What size of move in {judged.title} is worth it?", sized)
        self.look.setChecked(judged.look_day is not None)
        self.look.setAccessibleName("Agree on a day to look")
        proposed = self.day.chosen + timedelta(USUAL_DAYS_TO_LOOK)
        self.look_day.choose(judged.look_day or proposed)
        self.look_day.setEnabled(self.look.isChecked())
        self.look.toggled.connect(self.look_day.setEnabled)
        look = QHBoxLayout()
        look.addWidget(self.look)
        look.addWidget(self.look_day, 1)
        form.addRow("When will you look at the answer?", look)

    def _read_worth(self) -> float | Refusal | None:
        text = self.worth.text().strip()
        if not text or self._judged is None:
            return None
        worth = read_typed(text, self._judged.unit)
        return worth if isinstance(worth, Refusal) else abs(worth) or None
