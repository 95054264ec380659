"""What is written down in a session: what was agreed, a plan, notes, and when the next one is."""

from __future__ import annotations

from dataclasses import replace
from datetime import date, timedelta

from PySide6.QtCore import QEvent, Signal
from PySide6.QtGui import QFontMetrics
from PySide6.QtWidgets import (
    QCheckBox,
    QGridLayout,
    QHBoxLayout,
    QLabel,
    QLineEdit,
    QPlainTextEdit,
    QPushButton,
    QSpinBox,
    QWidget,
)

from desktop.journal.clients import Client, CoachingSession
from desktop.screens.dialogs import DayBox
from desktop.wording.days import long_day

NOTE_LINES = 2
_UNTIL_NEXT = 14


class SessionForm(QWidget):
    """One client's session of today.

    Signals:
        keep_wanted: what was filled in is to be kept.
    """

    keep_wanted = Signal()

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._client: Client | None = None
        self._held = CoachingSession(0, date.min)
        self.head = QLabel()
        self.agreed = QLineEdit()
        self.agreed.setPlaceholderText("what you agree on; it becomes a change mark in your file only")
        self.times, self.spare = QSpinBox(), QSpinBox()
        self.times.setRange(0, 7)
        self.times.setSpecialValueText("plan as before")
        self.times.setSuffix(" days a week")
        self.times.setAccessibleName("Days a week")
        self.spare.setRange(0, 0)
        self.spare.setSpecialValueText("none to spare")
        self.spare.setSuffix(" to spare")
        self.spare.setAccessibleName("Days to spare")
        self.spare.setToolTip("Days of the plan that may be missed in a week, and it is kept all the same.")
        self.times.valueChanged.connect(self.spare.setMaximum)
        self.note = QPlainTextEdit()
        self.note.setPlaceholderText("your notes; they never go into the client's journal")
        self.note.setTabChangesFocus(True)
        self.note.setAccessibleName("Notes")
        self.has_next = QCheckBox("on")
        self.has_next.setAccessibleName("There is a next session")
        self.next_day = DayBox(date.today())
        self.has_next.toggled.connect(self.next_day.setEnabled)
        self.keep = QPushButton("Keep")
        self.keep.setToolTip("Ctrl+Return. It is also kept when you go to another client.")
        self.keep.clicked.connect(self.keep_wanted)
        plan = QHBoxLayout()
        plan.addWidget(self.times)
        plan.addWidget(self.spare)
        plan.addStretch(1)
        following = QHBoxLayout()
        following.addWidget(self.has_next)
        following.addWidget(self.next_day, 1)
        form = QGridLayout(self)
        form.setContentsMargins(12, 4, 12, 8)
        form.addWidget(self.head, 0, 0, 1, 2)
        form.addWidget(self.keep, 0, 2)
        rows: tuple[tuple[str, QWidget, QWidget | QHBoxLayout], ...] = (
            ("A&greed", self.agreed, self.agreed),
            ("&Plan", self.times, plan),
            ("&Notes", self.note, self.note),
            ("Ne&xt session", self.has_next, following),
        )
        for place, (words, buddy, field) in enumerate(rows, start=1):
            label = QLabel(words)
            label.setBuddy(buddy)
            form.addWidget(label, place, 0)
            if isinstance(field, QWidget):
                form.addWidget(field, place, 1, 1, 2)
            else:
                form.addLayout(field, place, 1, 1, 2)
        form.setColumnStretch(1, 1)
        self.setEnabled(False)
        self._fit_notes()

    @property
    def session(self) -> CoachingSession:
        """What was filled in."""
        return replace(
            self._held,
            agreed=self.agreed.text().strip(),
            times=self.times.value(),
            spare=self.spare.value(),
            note=self.note.toPlainText().strip(),
        )

    @property
    def client(self) -> Client | None:
        """The client with the next session that was filled in."""
        if self._client is None:
            return None
        return replace(self._client, next_session=self.next_day.chosen if self.has_next.isChecked() else None)

    @property
    def is_changed(self) -> bool:
        """Whether anything was filled in that is not kept yet."""
        if self._client is None:
            return False
        client = self.client
        return self.session != self._held or (
            client is not None and client.next_session != self._client.next_session
        )

    def is_of(self, client: int) -> bool:
        """Whether the form is that of a client, by id."""
        return self._client is not None and self._client.id == client

    def show_client(self, client: Client | None, session: CoachingSession | None, today: date) -> None:
        """Take a client.

        Args:
            client: whose session; None empties the form.
            session: what is written down for today already.
            today: the calendar day.
        """
        self._client = client
        self._held = session or CoachingSession(client.id if client else 0, today)
        self.head.setText(f"Session of {long_day(today)}")
        self.agreed.setText(self._held.agreed)
        self.times.setValue(self._held.times)
        self.spare.setMaximum(self._held.times)
        self.spare.setValue(self._held.spare)
        self.note.setPlainText(self._held.note)
        following = client.next_session if client is not None else None
        self.has_next.setChecked(following is not None)
        self.next_day.choose(following or today + timedelta(_UNTIL_NEXT))
        self.next_day.setEnabled(following is not None)
        self.setEnabled(client is not None)

    def changeEvent(self, event: QEvent) -> None:
        """Give the notes their lines at the size of text."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.FontChange:
            self._fit_notes()

    def _fit_notes(self) -> None:
        self.note.setFixedHeight(QFontMetrics(self.font()).lineSpacing() * NOTE_LINES + 12)
