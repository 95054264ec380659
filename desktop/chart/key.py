"""The key to the marks: each sign drawn as the chart draws it, with its words."""

from __future__ import annotations

from collections.abc import Iterable

import numpy as np
from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QBrush, QFontMetricsF, QPainter, QPen

from desktop.chart.days import draw_middles, draw_shapes
from desktop.chart.painter import draw_bracket, level_pen
from desktop.chart.pieces import SHAPES, Line, Picture
from desktop.chart.style import Style
from desktop.wording.chart_key import SIGN_WORDS, Sign

KEY_LINES = 1.5
"""Height of the key's one line, in lines of text."""

_PART = 0.85
_SAMPLE = 1.7
"""Width of a sample, in letters."""

_LINES: dict[Sign, Line] = {
    "middle": Line(0, 1, 0, "before", "median"),
    "middle after": Line(0, 1, 0, "after", "median"),
    "carried middle": Line(0, 1, 0, "before", "carried median"),
    "fence": Line(0, 1, 0, "before", "fence"),
    "carried fence": Line(0, 1, 0, "before", "carried fence"),
    "own fence": Line(0, 1, 0, "after", "fence"),
}
_IN_ONE_LINE: tuple[Sign, ...] = (
    "before", "after", "outside", "zero", "uncounted", "set aside", "half", "tick", "late",
)  # fmt: skip
"""Lines and named days have words of their own on the chart."""


def signs_of(picture: Picture) -> list[Sign]:
    """The marks of a picture that one line of a key explains."""
    shapes = {SHAPES[place] for place in np.unique(picture.marks.shape).tolist()}
    found: dict[Sign, bool] = {
        "before": "before" in shapes,
        "after": "after" in shapes,
        "outside": bool(shapes & {"above", "below"}),
        "zero": bool(picture.marks.is_zero.any()),
        "uncounted": "uncounted" in shapes,
        "set aside": "set aside" in shapes,
        "half": bool(picture.bands),
        "tick": any(tick.kind != "late" for tick in picture.ticks),
        "late": any(tick.kind == "late" for tick in picture.ticks),
    }
    return [sign for sign in _IN_ONE_LINE if found[sign]]


def paint_key(painter: QPainter, rect: QRectF, signs: Iterable[Sign], style: Style) -> list[Sign]:
    """One line of samples with their words; returns those that had room."""
    face = style.face(part=_PART)
    metrics = QFontMetricsF(face)
    told: list[Sign] = []
    painter.save()
    left = rect.left()
    for sign in signs:
        words = SIGN_WORDS[sign][0]
        width = style.size * (_SAMPLE + 0.4) + metrics.horizontalAdvance(words) + 1
        if left + width > rect.right() + 0.5:
            break
        paint_sign(painter, QRectF(left, rect.top(), style.size * _SAMPLE, rect.height()), sign, style)
        painter.setFont(face)
        painter.setPen(style.look.colour("quiet"))
        box = QRectF(left + style.size * (_SAMPLE + 0.3), rect.top(), width, rect.height())
        painter.drawText(box, Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter, words)
        left += width + style.size
        told.append(sign)
    painter.restore()
    return told


def paint_sign(painter: QPainter, box: QRectF, sign: Sign, style: Style) -> None:
    """One sign in the middle of a box, drawn by what draws it on the chart."""
    painter.save()
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    middle, radius, ink = box.center(), style.size / 3.4, style.look.colour("ink")
    if sign in _LINES:
        painter.setPen(level_pen(_LINES[sign], style))
        painter.drawLine(QLineF(box.left(), middle.y(), box.right(), middle.y()))
    elif sign == "outside":
        for shape, lean in (("above", -1.2), ("below", 1.2)):
            _mark(painter, shape, middle + QPointF(lean * radius * 1.3, 0), radius * 0.8, style)
    elif sign == "zero":
        _mark(painter, "before", middle, radius, style, hollow=True)
    elif sign in SHAPES:
        _mark(painter, sign, middle, radius, style)
    elif sign == "middles":
        bar = (middle.x(), middle.y() + radius * 1.6, middle.y(), middle.y() - radius * 2)
        draw_middles(painter, [bar], "before", style)
    elif sign == "half":
        tall = QRectF(box.left(), middle.y() - radius * 1.6, box.width(), radius * 3.2)
        painter.fillRect(tall, style.side("before", style.look.band))
        inner = tall.adjusted(0, radius * 0.8, 0, -radius * 0.8)
        painter.fillRect(inner, style.side("before", style.look.inner_band))
    elif sign == "span":
        tall = QRectF(box.left(), middle.y() - radius * 1.6, box.width(), radius * 3.2)
        painter.fillRect(tall, QBrush(style.look.colour("quiet", 110), Qt.BrushStyle.BDiagPattern))
    elif sign == "began":
        draw_bracket(painter, box.left(), box.right(), middle.y() - style.size * 0.4, style)
    else:
        long = {"change": box.height(), "tick": style.size * 0.7, "late": style.size * 0.35}[sign]
        thin = QPen(style.look.colour("quiet"), style.size / 12)
        painter.setPen(QPen(ink, style.size / 9) if sign == "change" else thin)
        painter.drawLine(QLineF(middle.x(), middle.y() - long / 2, middle.x(), middle.y() + long / 2))
    painter.restore()


def _mark(
    painter: QPainter, shape: str, at: QPointF, radius: float, style: Style, *, hollow: bool = False
) -> None:
    draw_shapes(painter, shape, np.array([at.x()]), np.array([at.y()]), np.array([hollow]), radius, style)
