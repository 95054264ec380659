"""Paints the boxes of a laid-out page with a QPainter, one unit a point."""

from __future__ import annotations

from PySide6.QtCore import QPointF, Qt
from PySide6.QtGui import QPainter, QPen

from desktop.chart.look import LIGHT, Look
from desktop.chart.whole import paint_chart
from desktop.page.layout import Box, Page
from desktop.page.words import font_of

_RULE, _FRAME, _WRITING = 0.5, 1.0, 0.7
_RULE_ALPHA = 110


def paint_sheet(painter: QPainter, page: Page, sheet: int, look: Look = LIGHT) -> None:
    """Paint one sheet.

    Args:
        painter: scaled so that one unit is one point.
        page: laid out.
        sheet: which one, from 0.
        look: the inks.
    """
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    for box in page.sheets[sheet]:
        _paint_box(painter, box, look)


def _paint_box(painter: QPainter, box: Box, look: Look) -> None:
    painter.save()
    painter.setBrush(Qt.BrushStyle.NoBrush)
    if box.framed:
        painter.setPen(QPen(look.colour("ink"), _FRAME))
        painter.drawRect(box.rect)
    painter.setPen(QPen(look.colour("quiet", _RULE_ALPHA), _RULE))
    painter.drawLines(list(box.rules))
    painter.setPen(QPen(look.colour("quiet"), _WRITING))
    painter.drawLines(list(box.writing))
    for words in box.words:
        painter.setFont(font_of(words.face))
        painter.setPen(look.colour("quiet" if words.face.quiet else "ink"))
        painter.drawText(QPointF(words.x, words.y), words.text)
    painter.restore()
    if box.chart is not None:
        chart = box.chart
        paint_chart(
            painter, chart.rect, chart.picture, chart.style, parts=chart.parts, sides=chart.sides, days=chart.days
        )
