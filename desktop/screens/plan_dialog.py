"""A plan of so many days a week, with days to spare, from a day on."""

from __future__ import annotations

from datetime import date

from PySide6.QtWidgets import QDialog, QDialogButtonBox, QLabel, QSpinBox, QVBoxLayout, QWidget

from desktop.journal.records import Measure, Plan
from desktop.screens.dialogs import DayBox
from desktop.screens.room import give_room, roomy_form
from desktop.wording.plan import plan_words

_USUAL_DAYS, _USUAL_SPARE = 5, 1


class PlanDialog(QDialog):
    """How many days a week, how many of them may be missed, and from when."""

    def __init__(self, measure: Measure, plan: Plan | None, first: date, parent: QWidget | None = None) -> None:
        """Ask about the plan of a measure.

        Args:
            measure: the measure.
            plan: the one in force, or None.
            first: the day proposed for the new one.
            parent: the window.
        """
        super().__init__(parent)
        self.setWindowTitle(f"{measure.title}: a plan of days a week")
        self.times, self.spare, self.first = QSpinBox(), QSpinBox(), DayBox(first)
        self.times.setRange(0, 7)
        self.times.setSpecialValueText("no plan from then on")
        self.times.setSuffix(" days a week")
        self.spare.setSpecialValueText("none")
        self.spare.setRange(0, 7)
        self.times.valueChanged.connect(self.spare.setMaximum)
        self.times.setValue(plan.times if plan else _USUAL_DAYS)
        self.spare.setMaximum(self.times.value())
        self.spare.setValue(plan.spare if plan else _USUAL_SPARE)
        in_force = QLabel(f"In force: {plan_words(plan.times, plan.spare)}." if plan else "There is no plan yet.")
        hint = QLabel(
            "Days to spare may be missed, and the week is kept all the same. Earlier weeks stay judged by the "
            "plan of their time. A week with illness or absence in it is not judged."
        )
        for label in (in_force, hint):
            label.setWordWrap(True)
        form = roomy_form()
        form.addRow("On how many days?", self.times)
        form.addRow("Days to spare", self.spare)
        form.addRow("From", self.first)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        buttons.button(QDialogButtonBox.StandardButton.Ok).setText("Keep")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.addWidget(in_force)
        layout.addLayout(form)
        layout.addWidget(hint)
        layout.addWidget(buttons)
        give_room(self, 70)
        self.times.setFocus()
