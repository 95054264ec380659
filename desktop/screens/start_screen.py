"""The first screen: three ways to begin."""

from __future__ import annotations

from PySide6.QtCore import QSize, Qt, Signal, SignalInstance
from PySide6.QtGui import QFont, QFontInfo
from PySide6.QtWidgets import (
    QFrame,
    QHBoxLayout,
    QLabel,
    QPushButton,
    QScrollArea,
    QSizePolicy,
    QVBoxLayout,
    QWidget,
)

from desktop.screens.caution_line import CautionLine

_WIDTH = 36
"""In heights of a letter, so that the lines break alike in every size of text."""
_WIDEST = 960
_NAME_PART = 1.25


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
        self.start = self._way(
            "Start a log", "Say what to log, answer two questions, type the first day.", self.log_wanted
        )
        self.table = self._way(
            "Bring in a table",
            "Days and values from a CSV file. You see first what it becomes.",
            self.table_wanted,
        )
        self.sample = self._way(
            "Open the sample journal",
            "Look around in invented logs. Your own journal is another file.",
            self.sample_wanted,
        )
        self.caution_line = CautionLine()
        lead.setWordWrap(True)
        column = QVBoxLayout()
        column.setSpacing(14)
        column.addStretch(1)
        self._column = (self._title, lead, self.start, self.table, self.sample)
        for widget in self._column:
            column.addWidget(widget)
        column.addStretch(2)
        inside = QWidget()
        row = QHBoxLayout(inside)
        row.addStretch(1)
        row.addLayout(column)
        row.addStretch(1)
        # Large text in a small window scrolls instead of making the window larger.
        area = QScrollArea()
        area.setWidget(inside)
        area.setWidgetResizable(True)
        area.setFrameShape(QFrame.Shape.NoFrame)
        area.setFocusPolicy(Qt.FocusPolicy.NoFocus)
        layout = QVBoxLayout(self)
        layout.setContentsMargins(0, 0, 0, 0)
        layout.addWidget(area, 1)
        layout.addWidget(self.caution_line)

    def set_face(self, face: QFont) -> None:
        """Follow the size of text."""
        size = QFontInfo(face).pixelSize()
        largest = QFont(face)
        largest.setPixelSize(size * 2)
        largest.setBold(True)
        self._title.setFont(largest)
        self.caution_line.set_face(face)
        for widget in self._column:
            widget.setFixedWidth(min(size * _WIDTH, _WIDEST))
        for way in (self.start, self.table, self.sample):
            way.set_face(face)

    def _way(self, text: str, hint: str, chosen: SignalInstance) -> WayButton:
        button = WayButton(text, hint)
        button.clicked.connect(chosen)
        return button


class WayButton(QPushButton):
    """A large button: what it does, and under it a line that says more."""

    def __init__(self, text: str, hint: str, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setAccessibleName(text)
        self.setAccessibleDescription(hint)
        self.setAutoDefault(True)
        self._text, self._hint = QLabel(text), QLabel(hint)
        self._hint.setWordWrap(True)
        self._inside = QVBoxLayout(self)
        self._inside.setContentsMargins(18, 12, 18, 12)
        self._inside.setSpacing(2)
        for label in (self._text, self._hint):
            # The button alone is pressed, reached and read out.
            label.setAttribute(Qt.WidgetAttribute.WA_TransparentForMouseEvents)
            self._inside.addWidget(label)
        rule = QSizePolicy(QSizePolicy.Policy.Preferred, QSizePolicy.Policy.Fixed)
        rule.setHeightForWidth(True)
        self.setSizePolicy(rule)

    def set_face(self, face: QFont) -> None:
        """Follow the size of text."""
        strong = QFont(face)
        strong.setPixelSize(round(QFontInfo(face).pixelSize() * _NAME_PART))
        strong.setBold(True)
        self._text.setFont(strong)
        self._hint.setFont(face)

    def sizeHint(self) -> QSize:
        """Room for both lines."""
        return self._inside.sizeHint()

    def minimumSizeHint(self) -> QSize:
        """The same as wanted."""
        return self._inside.minimumSize()

    def heightForWidth(self, width: int) -> int:
        """Room for the hint on as many lines as it needs."""
        return self._inside.heightForWidth(width)
