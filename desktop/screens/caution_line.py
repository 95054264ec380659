"""The caution that never goes away: one strip under the panes, as wide as the window."""

from __future__ import annotations

from PySide6.QtGui import QFont, QFontInfo
from PySide6.QtWidgets import QLabel, QSizePolicy, QWidget

from desktop.screens.theme import CAUTION_INK
from desktop.wording.cautions import CAUTION

_PART = 0.85
"""Of the plain text's size; 12 pixels and more, which is 9 points."""


class CautionLine(QLabel):
    """Across the whole window it takes a line or two in any size of text; in one pane it took half of it."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(CAUTION, parent)
        self.setWordWrap(True)
        self.setContentsMargins(14, 4, 14, 4)
        self.setAccessibleName("Caution")
        self.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Minimum)
        self.set_dark(False)

    def set_dark(self, dark: bool) -> None:
        """Take the colours of the theme."""
        paper, ink = CAUTION_INK["dark" if dark else "light"]
        self.setStyleSheet(f"background: {paper}; color: {ink};")

    def set_face(self, face: QFont) -> None:
        """Follow the size of text."""
        small = QFont(face)
        small.setPixelSize(round(QFontInfo(face).pixelSize() * _PART))
        self.setFont(small)
