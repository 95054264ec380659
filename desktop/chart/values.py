"""The values of days outside the fences, beside their marks."""

from __future__ import annotations

from collections.abc import Iterable

import numpy as np
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QFontMetricsF, QPainter, QPainterPath, QPen

from desktop.chart.pieces import SHAPES, Picture
from desktop.chart.places import Places
from desktop.chart.style import Style

_RIM = 0.3
"""Width of the paper around a number, of a letter."""


def paint_values(painter: QPainter, plot: QRectF, picture: Picture, places: Places, style: Style) -> None:
    """Write each value beside its mark; one that would touch a word or another mark is left to its mark."""
    if not picture.marks.labels:
        return
    face = style.face(bold=True, part=0.92)
    metrics = QFontMetricsF(face)
    painter.setFont(face)
    rim = QPen(style.look.colour("paper"), style.size * _RIM)
    rim.setJoinStyle(Qt.PenJoinStyle.RoundJoin)
    # The farthest days first: where room is short, they keep their numbers.
    middle = float(np.median(places.y))
    for place in sorted(picture.marks.labels, key=lambda at: -abs(float(places.y[at]) - middle)):
        if not plot.left() <= places.x[place] <= plot.right():
            continue
        text = picture.marks.labels[place]
        width, height = metrics.horizontalAdvance(text) + 2, metrics.height() * 0.85
        is_high = SHAPES[int(picture.marks.shape[place])] == "above"
        box = places.take_first(_beside(place, width, height, plot, places, is_high=is_high), plot, place)
        if box is not None:
            # Lines that pass behind a number stop at its rim.
            outline = QPainterPath()
            middle = box.center().y() + (metrics.ascent() - metrics.descent()) / 2
            outline.addText(QPointF(box.center().x() - metrics.horizontalAdvance(text) / 2, middle), face, text)
            painter.strokePath(outline, rim)
            painter.setPen(style.look.colour("ink"))
            painter.drawText(box, Qt.AlignmentFlag.AlignCenter | Qt.TextFlag.TextDontClip, text)


def _beside(
    place: int, width: float, height: float, plot: QRectF, places: Places, *, is_high: bool
) -> Iterable[QRectF]:
    """The boxes beyond a mark, on its other side, and right and left of it; moved inside the plot at its sides."""
    x, y, away = float(places.x[place]), float(places.y[place]), float(places.half[place]) * 1.2
    left = min(max(x - width / 2, plot.left()), plot.right() - width)
    above, below = QRectF(left, y - away - height, width, height), QRectF(left, y + away, width, height)
    yield from (above, below) if is_high else (below, above)
    yield QRectF(x + away, y - height / 2, width, height)
    yield QRectF(x - away - width, y - height / 2, width, height)
