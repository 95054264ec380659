"""Draws the days themselves: each with its mark, or, where many share a pixel, by middles and middle halves."""

from __future__ import annotations

from collections.abc import Sequence
from math import ceil

import numpy as np
from numpy.typing import NDArray
from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QBrush, QColor, QFontMetricsF, QPainter, QPen, QPolygonF

from desktop.chart.pieces import SHAPES, Picture, Shape
from desktop.chart.places import Places, along
from desktop.chart.style import Style
from desktop.chart.values import paint_values
from desktop.wording.numbers import count

_LEAST_JOINED = 7
"""Days nearer to one another than this part of a letter are not joined: the lines would hide the days."""

_LEAST_RIMMED = 1.8
_LEAST_EACH = 10
"""Days nearer to one another than this part of a letter are not drawn each."""

_LEAST_MIDDLE = 3.5
"""Middles stand apart by at least this part of a letter."""

_AMONG_MIDDLES = 5
"""Days outside the fences keep marks of this part of a letter among the middles."""

_WEEK = 7

_TRIANGLE = 1.55
"""A mark outside the fences is so many times as large."""

Edges = tuple[float, float, float, float]


def places_of(rect: QRectF, edges: Edges, picture: Picture, style: Style) -> Places:
    """Where the days of a picture are drawn.

    Args:
        rect: the plot.
        edges: the first and last day, the lowest and highest value that fill it.
        picture: with the marks.
        style: with the type.
    """
    marks = picture.marks
    x0, x1, y0, y1 = edges
    x = rect.left() + (marks.x - x0) / (x1 - x0) * rect.width()
    y = rect.bottom() - (marks.y - y0) / (y1 - y0) * rect.height()
    one = _room_of_one(rect, edges, picture)
    radius = min(max(one * 0.4, style.size / 11), style.size / 3.1)
    if _is_crowded(one, picture, style):
        radius = style.size / _AMONG_MIDDLES
    outside = np.isin(marks.shape, [SHAPES.index("above"), SHAPES.index("below")])
    return Places(x, y, np.where(outside, radius * _TRIANGLE, radius), radius)


def paint_days(
    painter: QPainter, rect: QRectF, edges: Edges, picture: Picture, places: Places, style: Style
) -> None:
    """Draw the observations of a picture; its words keep off the marks and off the words that stand there.

    Args:
        painter: draws in the units of ``rect``.
        rect: the plot.
        edges: the first and last day, the lowest and highest value that fill it.
        picture: with the marks.
        places: of its marks and words.
        style: inks and type.
    """
    marks, x, y = picture.marks, places.x, places.y
    x0, x1 = edges[:2]
    seen = (marks.x >= x0 - 1) & (marks.x <= x1 + 1)
    if not seen.any():
        return
    one = _room_of_one(rect, edges, picture)
    told_apart = seen
    if _is_crowded(one, picture, style):
        weeks = ceil(style.size / _LEAST_MIDDLE / (rect.width() / (x1 - x0) * _WEEK))
        plain = seen & np.isin(marks.shape, [SHAPES.index("before"), SHAPES.index("after")])
        _middles(painter, marks.x, x, y, plain, marks.shape, weeks, style)
        _say_what_they_are(painter, rect, weeks, places, style)
        told_apart = seen & ~plain
    elif one >= style.size / _LEAST_JOINED:
        _joins(painter, x, y, marks.joined, seen, style)
    for place, name in enumerate(SHAPES):
        chosen = told_apart & (marks.shape == place)
        if chosen.any():
            draw_shapes(painter, name, x[chosen], y[chosen], marks.is_zero[chosen], places.radius, style)
    paint_values(painter, rect, picture, places, style)


def _room_of_one(rect: QRectF, edges: Edges, picture: Picture) -> float:
    """The width that each mark in view has."""
    x0, x1 = edges[:2]
    seen = (picture.marks.x >= x0 - 1) & (picture.marks.x <= x1 + 1)
    return rect.width() / max(int(seen.sum()), 1)


def _is_crowded(one: float, picture: Picture, style: Style) -> bool:
    return one < style.size / _LEAST_EACH and picture.period == "day"


def _middles(
    painter: QPainter,
    days: NDArray[np.float64],
    x: NDArray[np.float64],
    y: NDArray[np.float64],
    plain: NDArray[np.bool_],
    shape: NDArray[np.int8],
    weeks: int,
    style: Style,
) -> None:
    """A bar for the middle half of so many weeks, on it their middle; stretches never share one."""
    day, across, up, side = days[plain], x[plain], y[plain], shape[plain]
    if not len(day):
        return
    # Day number 1 was a Monday.
    group: NDArray[np.int64] = np.floor((day - 1) / (_WEEK * weeks)).astype(np.int64) * len(SHAPES) + side
    order = np.lexsort((up, group))
    group, up = group[order], up[order]
    starts = np.flatnonzero(np.r_[True, group[1:] != group[:-1]])
    sizes = np.diff(np.r_[starts, len(group)])
    low, middle, high = (up[starts + np.round(part * (sizes - 1)).astype(int)] for part in (0.25, 0.5, 0.75))
    places = np.add.reduceat(across[order], starts) / sizes
    sides = side[order][starts]
    for which in np.unique(sides).tolist():
        of_side = sides == which
        columns = [row[of_side].tolist() for row in (places, low, middle, high)]
        draw_middles(painter, list(zip(*columns, strict=True)), SHAPES[which], style)


def draw_middles(
    painter: QPainter, bars: Sequence[tuple[float, float, float, float]], shape: Shape, style: Style
) -> None:
    """Middles with their middle halves: for each its place across, one end, the middle, the other end."""
    ink = style.look.colour("after" if shape == "after" else "before")
    faint = QColor(ink)
    faint.setAlpha(110)
    painter.setPen(QPen(faint, style.size / 7))
    painter.drawLines([QLineF(place, top, place, foot) for place, top, _, foot in bars])
    pen = QPen(ink, style.size / 3.6)
    pen.setCapStyle(Qt.PenCapStyle.RoundCap if shape == "before" else Qt.PenCapStyle.SquareCap)
    painter.setPen(pen)
    painter.drawPoints(QPolygonF([QPointF(place, at) for place, _, at, _ in bars]))


def _say_what_they_are(painter: QPainter, rect: QRectF, weeks: int, places: Places, style: Style) -> None:
    """In a free place at the upper edge, else at the lower one; the key says it too."""
    face = style.face(italic=True, part=0.85)
    metrics = QFontMetricsF(face)
    span = "a week" if weeks == 1 else count(weeks, "week")
    words = f"each mark: the middle of {span}, its bar the middle half"
    width, height = metrics.horizontalAdvance(words) + 2, metrics.height()
    inside = rect.adjusted(style.size * 0.5, 2, -style.size * 0.5, -2)
    for top in (inside.top(), inside.top() + height, inside.bottom() - height):
        box = places.take_first(along(inside, width, height, top, from_right=False), inside)
        if box is not None:
            painter.setFont(face)
            painter.setPen(style.look.colour("quiet"))
            painter.drawText(box, Qt.AlignmentFlag.AlignLeft, words)
            return


def _joins(
    painter: QPainter,
    x: NDArray[np.float64],
    y: NDArray[np.float64],
    joined: NDArray[np.bool_],
    seen: NDArray[np.bool_],
    style: Style,
) -> None:
    """Thin lines between neighbouring days, broken at every blank."""
    painter.setPen(QPen(style.look.colour("quiet", 150), 1 if style.size > 9 else 0.5))
    painter.setBrush(Qt.BrushStyle.NoBrush)
    places = np.flatnonzero(seen)
    breaks = np.flatnonzero(~joined[places])
    for run in np.split(places, breaks):
        if len(run) > 1:
            painter.drawPolyline(QPolygonF([QPointF(x[at], y[at]) for at in run]))


def draw_shapes(
    painter: QPainter,
    name: str,
    x: NDArray[np.float64],
    y: NDArray[np.float64],
    is_zero: NDArray[np.bool_],
    radius: float,
    style: Style,
) -> None:
    """All marks of one shape; a counted zero is hollow."""
    look = style.look
    paper = QBrush(look.colour("paper"))
    thin = max(radius * 0.45, 0.6)
    for at_x, at_y, zero in zip(x.tolist(), y.tolist(), is_zero.tolist(), strict=True):
        match name:
            case "before":
                colour = look.colour("before")
                # A rim of paper parts marks that touch; of a very small one it would leave nothing.
                is_rimmed = not zero and radius > _LEAST_RIMMED
                painter.setPen(QPen(look.colour("paper"), thin * 0.5) if is_rimmed else QPen(colour, thin))
                painter.setBrush(paper if zero else QBrush(colour))
                painter.drawEllipse(QPointF(at_x, at_y), radius, radius)
            case "after":
                colour = look.colour("after")
                painter.setPen(QPen(colour, thin))
                painter.setBrush(paper)
                side = radius * (1.3 if zero else 1.8)
                painter.drawRect(QRectF(at_x - side / 2, at_y - side / 2, side, side))
            case "above" | "below":
                _triangle(painter, at_x, at_y, radius * _TRIANGLE, up=name == "above", hollow=zero, style=style)
            case "set aside":
                painter.setPen(QPen(look.colour("ink"), thin))
                for lean in (-radius, radius):
                    painter.drawLine(QLineF(at_x - radius, at_y - lean, at_x + radius, at_y + lean))
            case _:
                painter.setPen(QPen(look.colour("quiet"), thin))
                painter.setBrush(paper)
                painter.drawEllipse(QPointF(at_x, at_y), radius * 0.85, radius * 0.85)


def _triangle(painter: QPainter, x: float, y: float, size: float, *, up: bool, hollow: bool, style: Style) -> None:
    tip = -size if up else size
    ink = style.look.colour("ink")
    is_rimmed = not hollow and size > _LEAST_RIMMED
    painter.setPen(QPen(style.look.colour("paper") if is_rimmed else ink, max(size * 0.2, 0.6)))
    painter.setBrush(QBrush(style.look.colour("paper") if hollow else ink))
    base = y - tip * 0.75
    painter.drawPolygon(QPolygonF([QPointF(x, y + tip), QPointF(x - size, base), QPointF(x + size, base)]))
