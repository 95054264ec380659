"""The inks of the chart: one set for light paper, one for dark, one for printing without colour.

The colours are those of Okabe & Ito's palette for all kinds of colour vision, darkened where text needs a
contrast of 4.5 to 1 on white. Every meaning is also told by shape, line style or word.
"""

from __future__ import annotations

from dataclasses import dataclass

from PySide6.QtGui import QColor


@dataclass(frozen=True)
class Look:
    """Inks as ``#rrggbb``.

    Attributes:
        paper: behind everything.
        ink: text and marks outside the fences.
        quiet: axes and lesser words; 4.5 to 1 on paper.
        grid: level lines at the axis numbers; carries no meaning.
        before, after: marks, lines and words of the baseline and of the days after.
        lane: behind the names of stretches.
        band: how much of a stretch's ink its fence band takes, of 255; fourths take more.
        inner_band: the same for the band of the fourths.
    """

    paper: str
    ink: str
    quiet: str
    grid: str
    before: str
    after: str
    lane: str
    band: int = 20
    inner_band: int = 42

    def colour(self, name: str, alpha: int = 255) -> QColor:
        """An ink by the name of its field."""
        colour = QColor(getattr(self, name))
        colour.setAlpha(alpha)
        return colour


LIGHT = Look("#ffffff", "#1c1c1c", "#5b6068", "#e4e4e0", "#0067a3", "#96406f", "#f1efe8")
DARK = Look("#1d2024", "#f0eeea", "#a9aeb6", "#33373d", "#56b4e9", "#d991b8", "#2a2e34", band=30, inner_band=60)
GREY = Look("#ffffff", "#000000", "#4a4a4a", "#dddddd", "#333333", "#333333", "#eeeeee", band=16, inner_band=40)
