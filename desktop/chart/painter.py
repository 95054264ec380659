"""Draws a picture with a QPainter, in points or pixels alike: on screen, on the page, into a file.

Each function paints one part into the rectangle it is given. A ``Frame`` says which days and values lie where.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from itertools import product

from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QBrush, QFont, QFontMetricsF, QPainter, QPen

from desktop.chart.days import paint_days, places_of
from desktop.chart.pieces import EndLabel, LanePart, Line, Picture
from desktop.chart.places import Places, along
from desktop.chart.style import Style
from desktop.chart.ticks import day_ticks, value_ticks

LANE_LINES = 1.9
"""Height of the lane, in lines of text."""

BELOW_LINES = 3.6
"""Height of the part below the plot: ticks, days, the bracket."""

BELOW_LINES_BARE = 2.0
"""The same without the days, where another chart stands under this one."""

BELOW_LINES_SHORT = 2.3
"""The same without the bracket, where a chart is too low for everything; the findings say when it began."""

_BRACKET = 0.7
_MOST_FOR_NAMES = 0.25
"""The most of a chart's width for the names of its levels."""

_EDGE_ROWS = 3
"""Lines from an edge of the plot in which words about a fence may stand."""

_TICK_STRIP = 0.7
_FIRST_NAME = 0.6
"""The part of the room that a change's name takes where named days begin on the same day."""

_DASHES = {
    "fence": Qt.PenStyle.SolidLine,
    "carried fence": Qt.PenStyle.DashLine,
    "carried median": Qt.PenStyle.DashDotLine,
}


@dataclass(frozen=True)
class Frame:
    """Which part of a picture fills a rectangle."""

    rect: QRectF
    x0: float
    x1: float
    y0: float
    y1: float

    def x(self, day: float) -> float:
        """The place across of a day number."""
        return self.rect.left() + (day - self.x0) / (self.x1 - self.x0) * self.rect.width()

    def y(self, value: float) -> float:
        """The place up of a value."""
        return self.rect.bottom() - (value - self.y0) / (self.y1 - self.y0) * self.rect.height()

    @property
    def day_width(self) -> float:
        """The width of one day."""
        return self.rect.width() / (self.x1 - self.x0)


def paint_plot(painter: QPainter, frame: Frame, picture: Picture, style: Style) -> None:
    """Bands, levels, changes, days and the values of days outside the fences."""
    painter.save()
    painter.setClipRect(frame.rect)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    _grid(painter, frame, style)
    _spans(painter, frame, picture, style)
    _bands(painter, frame, picture, style)
    _levels(painter, frame, picture.lines, style)
    painter.setPen(QPen(style.look.colour("ink"), style.size / 9))
    for day in picture.uprights:
        painter.drawLine(QLineF(frame.x(day), frame.rect.top(), frame.x(day), frame.rect.bottom()))
    edges = (frame.x0, frame.x1, frame.y0, frame.y1)
    places = places_of(frame.rect, edges, picture, style)
    top, height = frame.rect.top(), frame.rect.height()
    places.walls.extend(QRectF(frame.x(day) - 1, top, 2, height) for day in picture.uprights)
    _edge_words(painter, frame, picture, places, style)
    paint_days(painter, frame.rect, edges, picture, places, style)
    painter.restore()


def paint_lane(painter: QPainter, rect: QRectF, frame: Frame, picture: Picture, style: Style) -> None:
    """The lane above the plot: what each stretch and each named row of days is called."""
    painter.save()
    painter.setClipRect(rect)
    painter.fillRect(rect, style.look.colour("lane"))
    spans = [part for part in picture.lane if part.kind == "span"]
    named: list[tuple[float, float]] = []
    newest = _before_its_line(picture, frame, style)
    for part in picture.lane:
        if part.kind in ("stretch", "change"):
            room = _lane_room(part, spans, frame)
            bold = part.kind == "change"
            painter.setPen(style.look.colour("ink" if bold else "quiet"))
            left = frame.x(part.x0)
            if newest is not None and part is newest[0]:
                _fitted(painter, rect, frame, newest[1], left, part.text, style.face(bold=True))
            else:
                room = min(room, newest[1]) if newest is not None else room
                named.append((left, _fitted(painter, rect, frame, left, room, part.text, style.face(bold=bold))))
            if bold:
                painter.setPen(QPen(style.look.colour("ink"), style.size / 9))
                painter.drawLine(QLineF(frame.x(part.x0), rect.top(), frame.x(part.x0), rect.bottom()))
        elif part.kind == "span":
            _hatched(painter, frame, part, rect, style)
            painter.setPen(style.look.colour("quiet"))
            # Days that begin under another name have theirs behind it.
            begin = max([frame.x(part.x0), *(right for left, right in named if left <= frame.x(part.x0) < right)])
            changes = (one.x0 for one in picture.lane if one.kind == "change" and one.x0 > part.x0)
            end = frame.x(min([part.x1, *changes]))
            _fitted(painter, rect, frame, begin, end, part.text, style.face(italic=True, part=0.9))
    painter.restore()


def paint_value_axis(painter: QPainter, rect: QRectF, frame: Frame, picture: Picture, style: Style) -> None:
    """Numbers at the left, and in words what they count and which end is more."""
    painter.save()
    face = style.face(part=0.92)
    painter.setFont(face)
    painter.setPen(style.look.colour("quiet"))
    height = QFontMetricsF(face).height()
    right = Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
    for value, text in _value_ticks(frame, style):
        box = QRectF(rect.left(), frame.y(value) - height / 2, rect.width() - style.size * 0.5, height)
        painter.drawText(box, right, text)
    italic = style.face(italic=True, part=0.92)
    painter.setFont(italic)
    painter.translate(rect.left() + height * 0.6, frame.rect.center().y())
    painter.rotate(-90)
    length = frame.rect.height()
    box = QRectF(-length / 2, -height / 2, length, height)
    sides = (Qt.AlignmentFlag.AlignLeft, Qt.AlignmentFlag.AlignHCenter, Qt.AlignmentFlag.AlignRight)
    low, unit, high = (QFontMetricsF(italic).horizontalAdvance(f" {words} ") for words in picture.axis_words)
    for side, words in zip(sides, picture.axis_words, strict=True):
        if words == picture.axis_words[1] and unit + 2 * max(low, high) > length:
            continue  # A short axis names its ends; the unit is said above it.
        painter.drawText(box, side | Qt.AlignmentFlag.AlignVCenter, words)
    painter.restore()


def value_axis_width(frame: Frame, style: Style) -> float:
    """How wide the left axis must be for its numbers and its words."""
    metrics = QFontMetricsF(style.face(part=0.92))
    widest = max((metrics.horizontalAdvance(text) for _, text in _value_ticks(frame, style)), default=0.0)
    return widest + metrics.height() * 1.3 + style.size


def paint_end_labels(painter: QPainter, rect: QRectF, frame: Frame, picture: Picture, style: Style) -> None:
    """The levels' names with their numbers, at the right end of their lines and never over one another."""
    painter.save()
    height = QFontMetricsF(style.face()).height()
    shown = [label for label in picture.end_labels if frame.y0 <= label.y <= frame.y1]
    shown.sort(key=lambda label: (frame.y(label.y), label.strong))
    # Half a pixel: a side is given whole ones.
    is_brief = end_labels_width(picture.end_labels, style) > rect.width() + 0.5
    for label, middle in zip(shown, _parted([frame.y(one.y) for one in shown], height, frame.rect), strict=True):
        painter.setFont(style.face(bold=label.strong))
        painter.setPen(style.side(label.side))
        box = QRectF(rect.left() + style.size * 0.5, middle - height / 2, rect.width(), height)
        words = label.number if is_brief else label.text
        painter.drawText(box, Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter, words)
    painter.restore()


def end_labels_width(labels: Iterable[EndLabel], style: Style, within: float | None = None) -> float:
    """How wide the right side must be for these labels.

    Args:
        labels: the names of the levels.
        style: with the type.
        within: the width of the whole chart; where the names would take much of it, their numbers stand alone.
    """
    metrics = QFontMetricsF(style.face(bold=True))
    labels = list(labels)
    widths = [
        max(map(metrics.horizontalAdvance, words), default=0.0) + style.size
        for words in ([label.text for label in labels], [label.number for label in labels])
    ]
    return widths[0] if within is None or widths[0] <= within * _MOST_FOR_NAMES else widths[1]


def paint_below(
    painter: QPainter, rect: QRectF, frame: Frame, picture: Picture, style: Style, *, with_days: bool = True
) -> None:
    """Under the plot: a tick for days blank, ill, away or late, the days, and where the new level began."""
    painter.save()
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    strip = style.size * _TICK_STRIP
    painter.setPen(QPen(style.look.colour("quiet"), style.size / 12))
    painter.drawLine(QLineF(frame.rect.left(), rect.top(), frame.rect.right(), rect.top()))
    for tick in picture.ticks:
        at = frame.x(tick.x)
        if frame.rect.left() <= at <= frame.rect.right():
            length = strip * (0.5 if tick.kind == "late" else 1.0)
            painter.drawLine(QLineF(at, rect.top(), at, rect.top() + length))
    below = rect.top() + strip
    if with_days:
        below += _days_axis(painter, rect, below, frame, style)
    if below + style.size * _BRACKET <= rect.bottom():
        _bracket(painter, below, frame, picture, style)
    painter.restore()


def _days_axis(painter: QPainter, rect: QRectF, top: float, frame: Frame, style: Style) -> float:
    """The days in words, none over another; returns their height."""
    face = style.face(part=0.92)
    metrics = QFontMetricsF(face)
    painter.setFont(face)
    line = metrics.height()
    widest = metrics.horizontalAdvance("28 Sep 2031")
    free_from = rect.left()
    for day, text in day_ticks(frame.x0, frame.x1, int(frame.rect.width() / widest)):
        at, width = frame.x(day), metrics.horizontalAdvance(text)
        left = min(max(at - width / 2, rect.left()), rect.right() - width)
        if left < free_from:
            continue
        free_from = left + width + metrics.averageCharWidth()
        painter.drawText(QRectF(left, top, width + 2, line), Qt.AlignmentFlag.AlignLeft, text)
    return line


def _bracket(painter: QPainter, top: float, frame: Frame, picture: Picture, style: Style) -> None:
    if picture.bracket is None or picture.bracket.x1 < frame.x0 or picture.bracket.x0 > frame.x1:
        return
    left = max(frame.x(picture.bracket.x0), frame.rect.left())
    right = min(max(frame.x(picture.bracket.x1), left + 2), frame.rect.right())
    down = draw_bracket(painter, left, right, top, style)
    face = style.face(part=0.92)
    painter.setFont(face)
    metrics = QFontMetricsF(face)
    width = metrics.horizontalAdvance(picture.bracket.text)
    begin = right + style.size * 0.5
    if begin + width > frame.rect.right():
        begin = left - style.size * 0.5 - width
    if begin < frame.rect.left():
        return  # No room beside the bracket; the findings say it too.
    box = QRectF(begin, down - metrics.height() * 0.7, width + 2, metrics.height())
    painter.drawText(box, Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter, picture.bracket.text)


def draw_bracket(painter: QPainter, left: float, right: float, top: float, style: Style) -> float:
    """The bracket alone; returns the height of its foot."""
    up, down = top + style.size * 0.15, top + style.size * 0.6
    painter.setPen(QPen(style.look.colour("ink"), style.size / 9))
    painter.drawPolyline([QPointF(left, up), QPointF(left, down), QPointF(right, down), QPointF(right, up)])
    return down


def _value_ticks(frame: Frame, style: Style) -> list[tuple[float, str]]:
    return value_ticks(frame.y0, frame.y1, int(frame.rect.height() / (style.size * 3.2)))


def _grid(painter: QPainter, frame: Frame, style: Style) -> None:
    painter.setPen(QPen(style.look.colour("grid"), style.size / 14))
    for value, _ in _value_ticks(frame, style):
        painter.drawLine(QLineF(frame.rect.left(), frame.y(value), frame.rect.right(), frame.y(value)))


def _spans(painter: QPainter, frame: Frame, picture: Picture, style: Style) -> None:
    face = style.face(italic=True, part=0.92)
    line = QFontMetricsF(face).height()
    for part in picture.lane:
        if part.kind in ("span", "settling in"):
            _hatched(painter, frame, part, frame.rect, style)
        if part.kind == "settling in":
            foot = QRectF(frame.rect.left(), frame.rect.bottom() - 1.4 * line, frame.rect.width(), line)
            painter.setPen(style.look.colour("quiet"))
            _fitted(painter, foot, frame, frame.x(part.x0), frame.x(part.x1), part.text, face)


def _hatched(painter: QPainter, frame: Frame, part: LanePart, rect: QRectF, style: Style) -> None:
    left, right = frame.x(part.x0), frame.x(part.x1)
    box = QRectF(left, rect.top(), right - left, rect.height()).intersected(rect)
    painter.fillRect(box, QBrush(style.look.colour("quiet", 110), Qt.BrushStyle.BDiagPattern))


def _bands(painter: QPainter, frame: Frame, picture: Picture, style: Style) -> None:
    for band in sorted(picture.bands, key=lambda one: one.inner):
        alpha = style.look.inner_band if band.inner else style.look.band
        left, right = frame.x(band.x0), frame.x(band.x1)
        top, bottom = frame.y(band.y1), frame.y(band.y0)
        painter.fillRect(QRectF(left, top, right - left, bottom - top), style.side(band.side, alpha))


def _levels(painter: QPainter, frame: Frame, lines: Iterable[Line], style: Style) -> None:
    # The medians come last: a fence at the same value must not hide one.
    for line in sorted(lines, key=lambda one: one.role == "median"):
        painter.setPen(level_pen(line, style))
        painter.drawLine(QLineF(frame.x(line.x0), frame.y(line.y), frame.x(line.x1), frame.y(line.y)))


def level_pen(line: Line, style: Style) -> QPen:
    """The line style of a level: by it, too, old and new, median and fence differ without colour."""
    if line.role != "median":
        dashes = Qt.PenStyle.DotLine if line.role == "fence" and line.side == "after" else _DASHES[line.role]
        return QPen(style.side(line.side), style.size / 11, dashes)
    pen = QPen(style.side(line.side), style.size / 4.2)
    pen.setCapStyle(Qt.PenCapStyle.FlatCap)
    if line.side == "after":
        pen.setDashPattern([6.0, 0.7])
    return pen


def _edge_words(painter: QPainter, frame: Frame, picture: Picture, places: Places, style: Style) -> None:
    """Fences beyond the picture, in words at its edges where no mark is; said shorter where room is short."""
    face = style.face(part=0.85)
    metrics = QFontMetricsF(face)
    painter.setFont(face)
    height = metrics.height()
    inside = frame.rect.adjusted(0, 2, -style.size * 0.6, -2)
    for edge, text in picture.edge_words:
        rows = [inside.top() + height * row for row in range(_EDGE_ROWS)]
        if edge == "below":
            rows = [inside.bottom() - height * (row + 1) for row in range(_EDGE_ROWS)]
        for words, top in product((text, text.partition(",")[0]), rows):
            width = metrics.horizontalAdvance(words) + 1
            box = places.take_first(along(inside, width, height, top, from_right=True), inside)
            if box is not None:
                painter.setPen(style.side("after" if text.startswith("own") else "before"))
                painter.drawText(box, Qt.AlignmentFlag.AlignRight | Qt.TextFlag.TextDontClip, words)
                break


def _before_its_line(picture: Picture, frame: Frame, style: Style) -> tuple[LanePart, float] | None:
    """A change so new that its name has no room after its line: it ends there, and begins at this place."""
    changes = [part for part in picture.lane if part.kind == "change"]
    if not changes:
        return None
    last = changes[-1]
    metrics = QFontMetricsF(style.face(bold=True))
    wanted = metrics.horizontalAdvance(last.text) + 3 * metrics.averageCharWidth()
    line, edge = frame.x(last.x0), frame.x(last.x1)
    room = min(edge, frame.rect.right()) - line
    since = [frame.x(part.x0) for part in changes[:-1]]
    before = line - max([frame.rect.left(), *since])
    if not frame.rect.left() < line <= frame.rect.right() or room >= wanted or room >= before:
        return None
    return last, max(line - wanted, line - before)


def _lane_room(part: LanePart, spans: Iterable[LanePart], frame: Frame) -> float:
    """Where the words of a lane part must end: at its edge, or at the named days inside it."""
    ends = [part.x1]
    for span in spans:
        if part.x0 < span.x0 < part.x1:
            ends.append(span.x0)
        elif span.x0 == part.x0:
            # Both begin here and share the room.
            ends.append(part.x0 + _FIRST_NAME * (min(part.x1, span.x1) - part.x0))
    return frame.x(min(ends))


def _fitted(
    painter: QPainter, rect: QRectF, frame: Frame, begin: float, end: float, text: str, face: QFont
) -> float:
    """Write what fits between two places across, and return where it ends."""
    begin = max(begin, frame.rect.left())
    metrics = QFontMetricsF(face)
    pad = metrics.averageCharWidth()
    box = QRectF(begin + pad, rect.top(), end - begin - 1.2 * pad, rect.height())
    if box.width() < 3 * pad:
        return begin
    painter.setFont(face)
    words = metrics.elidedText(text, Qt.TextElideMode.ElideRight, box.width())
    painter.drawText(box, Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter, words)
    return box.left() + metrics.horizontalAdvance(words)


def _parted(middles: list[float], height: float, rect: QRectF) -> list[float]:
    """Places from top to bottom moved apart so that no two are nearer than a line, and all are inside."""
    placed: list[float] = []
    for middle in middles:
        placed.append(max(middle, placed[-1] + height) if placed else max(middle, rect.top() + height / 2))
    lowest = rect.bottom() - height / 2
    for at in range(len(placed) - 1, -1, -1):
        placed[at] = min(placed[at], lowest)
        lowest = placed[at] - height
    return placed
