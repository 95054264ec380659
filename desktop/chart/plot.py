"""The chart on screen: pyqtgraph gives the place, the zoom and the pan; the painter draws."""

from __future__ import annotations

from typing import Any, cast

import numpy as np
import pyqtgraph as pg
from PySide6.QtCore import QEvent, QObject, QPointF, QRectF, Qt, Signal
from PySide6.QtGui import QAccessible, QAccessibleEvent, QFontInfo, QKeyEvent, QPainter
from PySide6.QtWidgets import QGraphicsItem, QStyleOptionGraphicsItem, QWidget

from desktop.chart.look import LIGHT, Look
from desktop.chart.painter import (
    BELOW_LINES,
    BELOW_LINES_SHORT,
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

_FEWEST_DAYS_SHOWN = 5
_ZOOM = 1.5
_PAN = 0.15
_LOW = 16
"""Lines of text; a chart lower than this keeps its room for the plot."""


class Chart(pg.PlotWidget):
    """The chart of one measure; the wheel and + and − zoom in time, dragging and Ctrl+arrows move, Home shows all.

    Left and Right step from day to day and read each one out.

    Signals:
        day_read: the sentence of the day the keys or the mouse are on.
        key_wanted: F1 was pressed here: what do the marks mean?
    """

    day_read = Signal(str)
    key_wanted = Signal()

    def __init__(self, parent: QWidget | None = None) -> None:
        self._picture: Picture | None = None
        self._look = LIGHT
        self._at: int | None = None
        self._sides = {name: _Side(name, self._paint_side) for name in ("left", "right", "top", "bottom")}
        super().__init__(parent, axisItems=self._sides, enableMenu=False)
        item = self.getPlotItem()
        item.hideButtons()
        item.showAxis("top")
        item.showAxis("right")
        item.setContentsMargins(0, 0, 0, 0)
        item.layout.setSpacing(0)
        view = item.getViewBox()
        view.setMouseEnabled(x=True, y=False)
        view.disableAutoRange()
        view.setDefaultPadding(0)
        self._drawn = _Drawn(self._paint_plot)
        self._drawn.setParentItem(view)
        view.sigResized.connect(self._settle)
        view.sigRangeChanged.connect(self._drawn.update_view)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setFrameShape(self.Shape.NoFrame)
        self.setAccessibleName("Chart")
        self.setMouseTracking(True)
        self._own_help = _OwnHelp(self)
        self.installEventFilter(self._own_help)

    @property
    def picture(self) -> Picture | None:
        """What is drawn."""
        return self._picture

    def show_picture(self, picture: Picture, *, keep_view: bool) -> None:
        """Draw another picture; the days in view stay in view when ``keep_view`` and they are still there."""
        was = self._picture
        view = self.getViewBox()
        shown_all = was is None or self._shows_all(was)
        self._picture = picture
        view.setLimits(
            xMin=picture.x0,
            xMax=picture.x1,
            minXRange=min(_FEWEST_DAYS_SHOWN, picture.x1 - picture.x0),
            maxXRange=picture.x1 - picture.x0,
        )
        if shown_all or not keep_view:
            view.setXRange(picture.x0, picture.x1, padding=0)
        view.setYRange(picture.y0, picture.y1, padding=0)
        self._settle()
        self.setAccessibleDescription(picture.told)
        QAccessible.updateAccessibility(QAccessibleEvent(self, QAccessible.Event.DescriptionChanged))

    def set_look(self, look: Look) -> None:
        """Draw with other inks."""
        self._look = look
        self.setBackground(look.colour("paper"))
        self._settle()

    def show_all(self) -> None:
        """Bring every day into view."""
        if self._picture is not None:
            self.getViewBox().setXRange(self._picture.x0, self._picture.x1, padding=0)

    def zoom(self, factor: float) -> None:
        """Show ``factor`` times fewer days, around the middle."""
        self.getViewBox().scaleBy(x=1 / factor)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Zoom, move, and step from day to day."""
        with_control = bool(event.modifiers() & Qt.KeyboardModifier.ControlModifier)
        match event.key():
            case Qt.Key.Key_Plus | Qt.Key.Key_Equal:
                self.zoom(_ZOOM)
            case Qt.Key.Key_Minus:
                self.zoom(1 / _ZOOM)
            case Qt.Key.Key_F1:
                self.key_wanted.emit()
            case Qt.Key.Key_Home:
                self.show_all()
            case Qt.Key.Key_Left | Qt.Key.Key_Right as key if with_control:
                x0, x1 = self.getViewBox().viewRange()[0]
                step = (x1 - x0) * _PAN
                self.getViewBox().translateBy(x=step if key == Qt.Key.Key_Right else -step)
            case Qt.Key.Key_Left:
                self._step(-1)
            case Qt.Key.Key_Right:
                self._step(1)
            case _:
                QWidget.keyPressEvent(self, event)
                return
        event.accept()

    def mouseMoveEvent(self, event: Any) -> None:  # noqa: ANN401 - pyqtgraph passes its own event on
        """Read out the day under the mouse."""
        super().mouseMoveEvent(event)
        if self._picture is None or not len(self._picture.marks.x):
            return
        at = self.getViewBox().mapSceneToView(self.mapToScene(event.position().toPoint()))
        nearest = int(np.argmin(np.abs(self._picture.marks.x - at.x())))
        if abs(self._picture.marks.x[nearest] - at.x()) <= 0.5 * self._period_width():
            self._read(nearest)

    def changeEvent(self, event: QEvent) -> None:
        """Follow the text size."""
        super().changeEvent(event)
        is_closed = self.plotItem is None  # So pyqtgraph leaves it; the widget may live on a little.
        if event.type() == QEvent.Type.FontChange and self._picture is not None and not is_closed:
            self._settle()

    def style_of_chart(self) -> Style:
        """Inks and type as the chart uses them."""
        return Style(self._look, self.font(), float(QFontInfo(self.font()).pixelSize()))

    def _step(self, by: int) -> None:
        if self._picture is None or not len(self._picture.marks.spoken):
            return
        order = np.argsort(self._picture.marks.x, kind="stable")
        last = len(order) - 1
        place = last if self._at is None else int(np.flatnonzero(order == min(self._at, last))[0]) + by
        self._read(int(order[min(max(place, 0), last)]))
        x0, x1 = self.getViewBox().viewRange()[0]
        day = float(self._picture.marks.x[self._at or 0])
        if not x0 <= day <= x1:
            self.getViewBox().translateBy(x=day - (x0 + x1) / 2)

    def _read(self, place: int) -> None:
        if place != self._at:
            self._at = place
            assert self._picture is not None
            self.day_read.emit(self._picture.marks.spoken[place])
            self._drawn.update()

    def _period_width(self) -> float:
        return {"day": 1.0, "week": 7.0, "month": 31.0, "year": 366.0}[
            self._picture.period if self._picture else "day"
        ]

    def _shows_all(self, picture: Picture) -> bool:
        x0, x1 = self.getViewBox().viewRange()[0]
        return bool(x0 <= picture.x0 + 0.01 and x1 >= picture.x1 - 0.01)

    def _settle(self) -> None:
        """Give the sides the room their words need, and draw."""
        if self._picture is None:
            return
        style = self.style_of_chart()
        frame = self._frame(self.getViewBox().rect())
        names = end_labels_width(self._picture.end_labels, style, self.width())
        self._sides["left"].setWidth(value_axis_width(frame, style))
        self._sides["right"].setWidth(max(names, style.size))
        self._sides["top"].setHeight(style.size * LANE_LINES)
        is_low = self.height() < style.size * _LOW
        self._sides["bottom"].setHeight(style.size * (BELOW_LINES_SHORT if is_low else BELOW_LINES))
        for side in self._sides.values():
            side.update()
        if self._at is not None and self._at >= len(self._picture.marks.spoken):
            self._at = None
        self._drawn.update_view()

    def _frame(self, rect: QRectF) -> Frame:
        (x0, x1), (y0, y1) = self.getViewBox().viewRange()
        return Frame(rect, x0, x1, y0, y1)

    def _paint_plot(self, painter: QPainter) -> None:
        if self._picture is None:
            return
        frame, style = self._frame(self.getViewBox().rect()), self.style_of_chart()
        paint_plot(painter, frame, self._picture, style)
        if self._at is not None and self.hasFocus():
            at = QPointF(frame.x(self._picture.marks.x[self._at]), frame.y(self._picture.marks.y[self._at]))
            painter.setPen(pg.mkPen(self._look.colour("ink"), width=1.5))
            painter.setBrush(Qt.BrushStyle.NoBrush)
            painter.drawEllipse(at, style.size * 0.65, style.size * 0.65)

    def _paint_side(self, name: str, painter: QPainter, rect: QRectF) -> None:
        if self._picture is None:
            return
        view = self.getViewBox().rect()
        style = self.style_of_chart()
        if name in ("top", "bottom"):
            frame = self._frame(QRectF(rect.left(), view.top(), rect.width(), view.height()))
            paint = paint_lane if name == "top" else paint_below
        else:
            frame = self._frame(QRectF(view.left(), rect.top(), view.width(), rect.height()))
            paint = paint_value_axis if name == "left" else paint_end_labels
        paint(painter, rect, frame, self._picture, style)


class _OwnHelp(QObject):
    """F1 is the chart's where it has the focus, not the window's."""

    def eventFilter(self, chart: QObject, event: QEvent) -> bool:
        """Called by Qt before the chart sees an event."""
        is_help = event.type() == QEvent.Type.ShortcutOverride and cast(QKeyEvent, event).key() == Qt.Key.Key_F1
        if is_help:
            event.accept()
        return is_help


class _Drawn(pg.GraphicsObject):
    """Fills the view and paints in its pixels."""

    def __init__(self, paint: Any) -> None:  # noqa: ANN401 - a bound method of the chart
        super().__init__()
        self._paint = paint
        self.setFlag(QGraphicsItem.GraphicsItemFlag.ItemStacksBehindParent, False)
        self.setAcceptedMouseButtons(Qt.MouseButton.NoButton)

    def update_view(self, *_: object) -> None:
        """The view moved or changed its size."""
        self.prepareGeometryChange()
        self.update()

    def boundingRect(self) -> QRectF:
        """The whole view."""
        parent = self.parentItem()
        return parent.rect() if parent is not None else QRectF()

    def paint(self, painter: QPainter, option: QStyleOptionGraphicsItem, widget: QWidget | None = None) -> None:
        """Called by Qt."""
        self._paint(painter)


class _Side(pg.AxisItem):
    """A side of the plot: pyqtgraph lays it out and links it to the view; the painter fills it."""

    def __init__(self, name: str, paint: Any) -> None:  # noqa: ANN401 - a bound method of the chart
        super().__init__(name)
        self._name = name
        self._paint = paint
        self.enableAutoSIPrefix(False)

    def boundingRect(self) -> QRectF:
        """Its place in the layout, with room for words that hang over."""
        return self.mapRectFromParent(self.geometry()).adjusted(-2, -2, 2, 2)

    def paint(self, painter: QPainter, option: QStyleOptionGraphicsItem, widget: QWidget | None = None) -> None:
        """Called by Qt."""
        self._paint(self._name, painter, self.mapRectFromParent(self.geometry()))
