"""A whole chart in one rectangle: all its parts, none beyond its edges, and values that keep off other marks."""

from __future__ import annotations

import numpy as np
import pytest
from PySide6.QtCore import QRectF
from PySide6.QtGui import QImage, QPainter

from desktop.chart.look import LIGHT
from desktop.chart.pieces import SHAPES, Picture
from desktop.chart.places import Places
from desktop.chart.style import Style
from desktop.chart.values import paint_values
from desktop.chart.whole import WHOLE, Parts, least_height, paint_chart, side_widths
from desktop.faces import load_faces
from desktop.page.words import plain_font
from tests.desktop.chart.pictures import HIGH, LOW, drawn

ROOM = QRectF(40, 30, 500, 260)


@pytest.fixture(autouse=True)
def _faces(qapp):
    load_faces()


def style() -> Style:
    return Style(LIGHT, plain_font(), 11.0)


def inked(picture: Picture, parts: Parts = WHOLE) -> np.ndarray:
    """Which pixels are not paper, of a chart with much room around it."""
    image = QImage(620, 340, QImage.Format.Format_RGB32)
    image.fill(LIGHT.colour("paper"))
    with QPainter(image) as painter:
        paint_chart(painter, ROOM, picture, style(), parts=parts)
    return np.frombuffer(image.constBits(), dtype=np.uint32).reshape(340, 620) != 0xFFFFFFFF


@pytest.mark.parametrize("parts", [Parts(), Parts(lane=False), Parts(days=False)])
def test_a_chart_stays_in_its_rectangle(parts):
    ink = inked(drawn(LOW + HIGH, 14), parts)
    outside = ink.copy()
    outside[29:291, 39:541] = False
    assert ink.any()
    assert not outside.any()


def test_parts_that_are_left_out_leave_their_room_to_the_plot():
    lines = [parts.lines for parts in (Parts(), Parts(days=False), Parts(lane=False))]
    assert lines[0] > lines[1] > 0
    assert lines[0] > lines[2] > 0
    assert least_height(style(), Parts(days=False)) < least_height(style())


def test_the_room_at_the_sides_follows_the_longest_words():
    narrow, wide = (drawn([value * by for value in LOW + HIGH], 14) for by in (1, 100_000))
    assert side_widths(wide, style(), 260)[0] > side_widths(narrow, style(), 260)[0]
    assert side_widths(wide, style(), 260)[1] > side_widths(narrow, style(), 260)[1]


def values_written(picture: Picture, x: list[float], y: list[float], plot: QRectF) -> int:
    """How many values are written beside these marks."""

    class Counting(QPainter):
        def drawText(self, *words: object) -> None:
            found.append(words[-1])

    found: list[object] = []
    image = QImage(400, 300, QImage.Format.Format_RGB32)
    with Counting(image) as painter:
        paint_values(painter, plot, picture, Places(np.array(x), np.array(y), np.full(len(x), 3.0), 3.0), style())
    return len(found)


def test_a_value_that_would_touch_another_mark_is_left_to_its_own():
    picture = drawn([*LOW, 90, 20], 14, kind="reading")
    assert [SHAPES[shape] for shape in picture.marks.shape].count("above") >= 1
    plot = QRectF(0, 0, 400, 300)
    apart = [20.0 * place for place in range(16)]
    low = [200.0] * 16
    assert values_written(picture, apart, [*low[:14], 100.0, 200.0], plot) == 1
    # Another mark stands where the value would be: it stands on another side.
    crowded = [*apart[:15], apart[14]]
    assert values_written(picture, crowded, [*low[:14], 100.0, 88.0], plot) == 1
    # Marks on every side.
    at = apart[14]
    around = [*apart[:11], at - 10, at + 10, at, at, at]
    assert values_written(picture, around, [*low[:11], 100.0, 100.0, 88.0, 100.0, 112.0], plot) == 0


def test_a_value_without_room_above_stands_below_its_mark():
    picture = drawn([*LOW, 90, 20], 14, kind="reading")
    at_the_edge = [*[200.0] * 14, 3.0, 200.0]
    assert values_written(picture, [20.0 * place for place in range(16)], at_the_edge, QRectF(0, 0, 400, 300)) == 1
