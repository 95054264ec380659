"""A whole chart in one rectangle: the plot with its axes, lane and names, by the painter's own parts."""

from __future__ import annotations

from dataclasses import dataclass

from PySide6.QtCore import QRectF
from PySide6.QtGui import QPainter

from desktop.chart.key import KEY_LINES, paint_key, signs_of
from desktop.chart.painter import (
    BELOW_LINES,
    BELOW_LINES_BARE,
    LANE_LINES,
    Frame,
    end_labels_width,
    paint_below,
    paint_end_labels,
    paint_lane,
    paint_plot,
    paint_value_axis,
    value_axis_width,
)
from desktop.chart.pieces import Picture
from desktop.chart.style import Style

LEAST_PLOT = 5.5
"""The least height of the plot itself, in lines of text."""

_OVERHANG = 0.5
_ROOMY = 1.4
"""So many times its least height a chart must have before a line of it goes to the key."""


@dataclass(frozen=True)
class Parts:
    """What stands around the plot; of charts under one another each part is needed once.

    Attributes:
        lane: the names of the stretches above it.
        days: the days below it.
        key: what its marks mean, in one line at its foot where there is room.
    """

    lane: bool = True
    days: bool = True
    key: bool = False

    @property
    def lines(self) -> float:
        """The height of these parts, in lines of text."""
        return self.lines_above + (BELOW_LINES if self.days else BELOW_LINES_BARE)

    @property
    def lines_above(self) -> float:
        """The height of what stands above the plot; without the lane, of what hangs over its edge."""
        return LANE_LINES if self.lane else _OVERHANG


WHOLE = Parts()


def least_height(style: Style, parts: Parts = WHOLE) -> float:
    """The height under which a chart cannot be read."""
    return style.size * (LEAST_PLOT + parts.lines)


def key_height(height: float, style: Style, parts: Parts) -> float:
    """The height of the key at the foot of a chart of this height; 0 where the chart needs the room itself."""
    has_room = parts.key and height >= least_height(style, parts) * _ROOMY
    return style.size * KEY_LINES if has_room else 0.0


def side_widths(picture: Picture, style: Style, height: float, parts: Parts = WHOLE) -> tuple[float, float]:
    """The room for the values at the left and for the levels' names at the right of a chart of this height."""
    plot = QRectF(0.0, 0.0, 1.0, height - style.size * parts.lines - key_height(height, style, parts))
    frame = Frame(plot, picture.x0, picture.x1, picture.y0, picture.y1)
    return value_axis_width(frame, style), max(end_labels_width(picture.end_labels, style), style.size)


def paint_chart(
    painter: QPainter,
    rect: QRectF,
    picture: Picture,
    style: Style,
    *,
    parts: Parts = WHOLE,
    sides: tuple[float, float] | None = None,
    days: tuple[float, float] | None = None,
) -> None:
    """Paint a whole chart.

    Args:
        painter: at any scale.
        rect: what the chart fills.
        picture: what to draw.
        style: inks and type.
        parts: what stands around the plot.
        sides: room at the left and right; what the chart itself needs when left out. Charts under one another
            are given the same, so that their days stand under one another too.
        days: the days from edge to edge; the picture's own when left out.
    """
    foot = key_height(rect.height(), style, parts)
    left, right = sides or side_widths(picture, style, rect.height(), parts)
    top = style.size * parts.lines_above
    height = rect.height() - style.size * parts.lines - foot
    plot = QRectF(rect.left() + left, rect.top() + top, rect.width() - left - right, height)
    x0, x1 = days or (picture.x0, picture.x1)
    frame = Frame(plot, x0, x1, picture.y0, picture.y1)
    if parts.lane:
        paint_lane(painter, QRectF(plot.left(), rect.top(), plot.width(), top), frame, picture, style)
    paint_value_axis(painter, QRectF(rect.left(), plot.top(), left, height), frame, picture, style)
    paint_plot(painter, frame, picture, style)
    paint_end_labels(painter, QRectF(plot.right(), plot.top(), right, height), frame, picture, style)
    below = QRectF(plot.left(), plot.bottom(), plot.width(), rect.bottom() - foot - plot.bottom())
    paint_below(painter, below, frame, picture, style, with_days=parts.days)
    if foot:
        line = QRectF(plot.left(), rect.bottom() - foot, rect.right() - plot.left(), foot)
        paint_key(painter, line, signs_of(picture), style)
