"""Naming days: ill, away, another device, or anything else that the chart is to show."""

from __future__ import annotations

from datetime import date

from PySide6.QtWidgets import QComboBox, QDialog, QDialogButtonBox, QLineEdit, QVBoxLayout, QWidget

from desktop.journal.records import Measure, Span, SpanKind
from desktop.screens.dialogs import DayBox
from desktop.screens.room import give_room, roomy_form

_KINDS: tuple[tuple[str, SpanKind], ...] = (
    ("ill: in no number", "ill"),
    ("away or paused: in no number", "away"),
    ("another device or way of measuring", "device"),
    ("something else: shown and counted", "other"),
)


class SpanDialog(QDialog):
    """Which days, and what they were."""

    def __init__(self, first: date, last: date, measures: list[Measure], parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setWindowTitle("Name days")
        self.first, self.last = DayBox(first), DayBox(last)
        self.kind = QComboBox()
        self.kind.addItems([text for text, _ in _KINDS])
        self.label = QLineEdit()
        self.label.setPlaceholderText("for example: a cold, a week by the sea, the new watch")
        self.concerns = QComboBox()
        self.concerns.addItem("every measure", ())
        for measure in measures:
            self.concerns.addItem(f"only {measure.title}", (measure.id,))
        form = roomy_form()
        form.addRow("First day", self.first)
        form.addRow("Last day", self.last)
        form.addRow("These days were", self.kind)
        form.addRow("In your words", self.label)
        if len(measures) > 1:
            form.addRow("It concerns", self.concerns)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        buttons.button(QDialogButtonBox.StandardButton.Ok).setText("Name them")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.addLayout(form)
        layout.addWidget(buttons)
        give_room(self, 70)
        self.kind.setFocus()

    @property
    def chosen(self) -> Span:
        """What was filled in; the id is still to be given, the ends may be in either order."""
        return Span(
            0,
            self.first.chosen,
            self.last.chosen,
            _KINDS[self.kind.currentIndex()][1],
            self.label.text().strip(),
            tuple(self.concerns.currentData() or ()),
        )
