"""A question in one line, asked once: what were the days on which nothing was written down?"""

from __future__ import annotations

from datetime import date

from PySide6.QtCore import Qt, QTimer, Signal
from PySide6.QtWidgets import QHBoxLayout, QLabel, QPushButton, QWidget

from desktop.journal.gaps import unasked_gap
from desktop.models.session import Session
from desktop.wording.days import short_day
from desktop.wording.numbers import count

_QUIET = 400
"""Milliseconds of no typing before the days are looked through."""


class GapBar(QWidget):
    """Above the panes while there is something to ask.

    Signals:
        none_meant: the days from the first to the last were days without any.
        not_known: nobody knows.
    """

    none_meant = Signal(object, object)
    not_known = Signal(object, object)

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._session: Session | None = None
        self._gap: tuple[date, date] | None = None
        self._words = QLabel()
        self._words.setWordWrap(True)
        self.none, self.unknown = QPushButton(), QPushButton("Not known")
        self.none.clicked.connect(lambda: self.none_meant.emit(*self._asked()))
        self.unknown.clicked.connect(lambda: self.not_known.emit(*self._asked()))
        layout = QHBoxLayout(self)
        layout.setContentsMargins(14, 4, 14, 6)
        layout.addWidget(self._words, 1)
        layout.addWidget(self.none)
        layout.addWidget(self.unknown)
        self.setAttribute(Qt.WidgetAttribute.WA_StyledBackground)
        self._later = QTimer(self)
        self._later.setSingleShot(True)
        self._later.setInterval(_QUIET)
        self._later.timeout.connect(self._look)
        self.hide()

    def follow(self, session: Session) -> None:
        """Look through the days of a session's measure, once nothing happens for a moment."""
        self._session = session
        self._later.start()

    def forget(self) -> None:
        """No journal is open."""
        self._session = None
        self._later.stop()
        self.hide()

    def _asked(self) -> tuple[date, date]:
        assert self._gap is not None
        return self._gap

    def _look(self) -> None:
        session = self._session
        measure = session.current if session is not None and not session.read_only else None
        self._gap = (
            unasked_gap(session.journal, measure.id) if session is not None and measure is not None else None
        )
        self.setVisible(self._gap is not None)
        if self._gap is None or measure is None:
            return
        first, last = self._gap
        days = (last - first).days + 1
        self._words.setText(
            f"Nothing is written down from {short_day(first)} to {short_day(last)}, {count(days, 'day')}. "
            f"They count as days without any {measure.title.lower()}. Is that so?"
        )
        self.none.setText("Yes, none on those days")
