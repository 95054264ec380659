"""The values of days outside the fences, beside their marks."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from PySide6.QtCore import QRectF, Qt
from PySide6.QtGui import QFontMetricsF, QPainter

from desktop.chart.pieces import SHAPES, Picture
from desktop.chart.style import Style


@dataclass(frozen=True, eq=False)
class Places:
    """Where the marks are drawn, arrays of shape (k,), and how large."""

    x: NDArray[np.float64]
    y: NDArray[np.float64]
    radius: float


def paint_values(painter: QPainter, plot: QRectF, picture: Picture, places: Places, style: Style) -> None:
    """Write each value beside its mark; one that would touch another value or mark is left to its mark."""
    if not picture.marks.labels:
        return
    face = style.face(bold=True, part=0.92)
    metrics = QFontMetricsF(face)
    painter.setFont(face)
    painter.setPen(style.look.colour("ink"))
    taken: list[QRectF] = []
    # The farthest days first: where room is short, they keep their numbers.
    middle = float(np.median(places.y))
    for place in sorted(picture.marks.labels, key=lambda at: -abs(float(places.y[at]) - middle)):
        text = picture.marks.labels[place]
        width, height = metrics.horizontalAdvance(text) + 2, metrics.height() * 0.85
        above, below = _beside(place, width, height, plot, places)
        is_high = SHAPES[int(picture.marks.shape[place])] == "above"
        box = above if is_high else below
        if not plot.contains(box):
            box = below if is_high else above
        if any(box.intersects(other) for other in taken) or _covers_a_mark(box, place, places):
            continue
        taken.append(box)
        painter.drawText(box, Qt.AlignmentFlag.AlignCenter | Qt.TextFlag.TextDontClip, text)


def _beside(place: int, width: float, height: float, plot: QRectF, places: Places) -> tuple[QRectF, QRectF]:
    """The boxes above and below a mark, moved inside the plot at its sides."""
    x, y, away = float(places.x[place]), float(places.y[place]), places.radius * 1.9
    left = min(max(x - width / 2, plot.left()), plot.right() - width)
    return QRectF(left, y - away - height, width, height), QRectF(left, y + away, width, height)


def _covers_a_mark(box: QRectF, own: int, places: Places) -> bool:
    room = places.radius * 0.6
    inside = (
        (places.x > box.left() - room)
        & (places.x < box.right() + room)
        & (places.y > box.top() - room)
        & (places.y < box.bottom() + room)
    )
    inside[own] = False
    return bool(inside.any())
