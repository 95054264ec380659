"""Inks and type of a chart."""

from __future__ import annotations

from dataclasses import dataclass

from PySide6.QtGui import QColor, QFont

from desktop.chart.look import Look
from desktop.chart.pieces import Side


@dataclass(frozen=True)
class Style:
    """Inks and type.

    Attributes:
        look: the inks.
        font: the plain face.
        size: height of its letters, in the painter's unit.
    """

    look: Look
    font: QFont
    size: float

    def face(self, *, bold: bool = False, italic: bool = False, part: float = 1.0) -> QFont:
        """The face, bold or italic, at a part of its size."""
        face = QFont(self.font)
        face.setPixelSize(max(6, round(self.size * part)))
        face.setBold(bold)
        face.setItalic(italic)
        return face

    def side(self, side: Side, alpha: int = 255) -> QColor:
        """The ink of the baseline or of the days after."""
        return self.look.colour(side, alpha)
