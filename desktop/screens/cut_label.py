"""A line of words that is cut short where there is no room for it."""

from __future__ import annotations

from PySide6.QtCore import QSize, Qt
from PySide6.QtGui import QPainter, QPaintEvent
from PySide6.QtWidgets import QLabel

_LEAST = 4
"""Letters that stay to be seen."""


class CutLabel(QLabel):
    """Never makes the window wider; what is cut is said whole in its tip, and to a screen reader."""

    def minimumSizeHint(self) -> QSize:
        """A few letters."""
        whole = super().minimumSizeHint()
        return QSize(min(whole.width(), self.fontMetrics().averageCharWidth() * _LEAST), whole.height())

    def paintEvent(self, event: QPaintEvent) -> None:
        """Draw what fits, and an ellipsis."""
        box = self.contentsRect()
        words = self.fontMetrics().elidedText(self.text(), Qt.TextElideMode.ElideRight, box.width())
        with QPainter(self) as painter:
            self.style().drawItemText(
                painter,
                box,
                self.alignment() | Qt.AlignmentFlag.AlignVCenter,
                self.palette(),
                self.isEnabled(),
                words,
                self.foregroundRole(),
            )
