"""The first screen: three ways to begin."""

from __future__ import annotations

from PySide6.QtCore import Signal, SignalInstance
from PySide6.QtGui import QFont, QFontInfo
from PySide6.QtWidgets import QCommandLinkButton, QHBoxLayout, QLabel, QVBoxLayout, QWidget

from desktop.wording.cautions import CAUTION

_WIDTH = 560


class StartScreen(QWidget):
    """Start a log, bring in a table, or look at the sample journal.

    Signals:
        log_wanted, table_wanted, sample_wanted: the way that was chosen.
    """

    log_wanted = Signal()
    table_wanted = Signal()
    sample_wanted = Signal()

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._title = QLabel("Dayfence")
        lead = QLabel(
            "Keep a daily log, change one thing, and see if it moved: by how much, since when, "
            "and what else could explain it."
        )
        self.start = self._way("Start a log", "Two questions, then type the first day.", self.log_wanted)
        self.table = self._way("Bring in a table", "A CSV file of days and values.", self.table_wanted)
        self.sample = self._way("Open the sample journal", "Invented logs to look around in.", self.sample_wanted)
        caution = QLabel(CAUTION)
        lead.setWordWrap(True)
        caution.setWordWrap(True)
        column = QVBoxLayout()
        column.setSpacing(14)
        column.addStretch(1)
        for widget in (self._title, lead, self.start, self.table, self.sample, caution):
            widget.setFixedWidth(_WIDTH)
            column.addWidget(widget)
        column.addStretch(2)
        layout = QHBoxLayout(self)
        layout.addStretch(1)
        layout.addLayout(column)
        layout.addStretch(1)

    def set_face(self, face: QFont) -> None:
        """Follow the size of text."""
        largest = QFont(face)
        largest.setPixelSize(QFontInfo(face).pixelSize() * 2)
        largest.setBold(True)
        self._title.setFont(largest)

    def _way(self, text: str, hint: str, chosen: SignalInstance) -> QCommandLinkButton:
        button = QCommandLinkButton(text, hint)
        button.setAccessibleName(text)
        button.setAccessibleDescription(hint)
        button.setAutoDefault(True)
        button.clicked.connect(chosen)
        return button
