"""The key to the marks: complete, drawn by the chart's own painter, told apart without colour."""

from itertools import combinations

import pytest
from PySide6.QtCore import QRectF
from PySide6.QtGui import QColor, QFont, QImage, QPainter

from desktop.chart.key import paint_key, paint_sign, signs_of
from desktop.chart.look import GREY, LIGHT
from desktop.chart.pieces import SHAPES
from desktop.chart.style import Style
from desktop.chart.whole import WHOLE, Parts, key_height, least_height, paint_chart
from desktop.wording.chart_key import SIGN_WORDS
from tests.desktop.chart.pictures import HIGH, LOW, drawn


@pytest.fixture(autouse=True)
def _application(qapp):
    """Letters need an application."""


def image(width: int, height: int) -> QImage:
    one = QImage(width, height, QImage.Format.Format_RGB32)
    one.fill(QColor("#ffffff"))
    return one


def sample(sign, look=GREY) -> bytes:
    one = image(40, 24)
    with QPainter(one) as painter:
        paint_sign(painter, QRectF(4, 0, 32, 24), sign, Style(look, QFont(), 15))
    return bytes(one.constBits())


def test_every_sign_is_drawn_and_no_two_look_alike_without_colour():
    samples = {sign: sample(sign) for sign in SIGN_WORDS}
    assert bytes(image(40, 24).constBits()) not in samples.values()
    assert [pair for pair in combinations(samples, 2) if samples[pair[0]] == samples[pair[1]]] == []


def test_every_shape_of_the_chart_is_explained():
    assert {"outside" if shape in ("above", "below") else shape for shape in SHAPES} <= set(SIGN_WORDS)


@pytest.mark.parametrize(
    ("picture", "signs"),
    [
        (lambda: drawn([20, 30]), ["before"]),
        (lambda: drawn(LOW + HIGH, 14), ["before", "after", "outside", "half"]),
        (
            lambda: drawn([*LOW, "ill", *HIGH], 14, 3, kinds={2: "late", 5: "set aside"}),
            ["before", "after", "outside", "uncounted", "set aside", "half", "tick", "late"],
        ),
        (lambda: drawn([0, 3, 0, 4, 2, 0, 5, 2]), ["before", "zero", "half"]),
    ],
)
def test_the_line_explains_the_marks_that_are_there(picture, signs):
    assert signs_of(picture()) == signs


def test_what_has_no_room_is_left_out_whole():
    style = Style(LIGHT, QFont(), 13)
    page = image(900, 30)
    with QPainter(page) as painter:
        every = paint_key(painter, QRectF(0, 0, 900, 20), ["before", "after", "outside"], style)
        some = paint_key(painter, QRectF(0, 0, 90, 20), ["before", "after", "outside"], style)
    assert every == ["before", "after", "outside"]
    assert some == ["before"]


def test_a_chart_on_the_page_has_its_key_at_the_foot_where_there_is_room():
    style, parts = Style(LIGHT, QFont(), 11), Parts(key=True)
    low, roomy = least_height(style), least_height(style) * 2
    assert key_height(low, style, parts) == 0
    assert key_height(roomy, style, WHOLE) == 0
    foot = key_height(roomy, style, parts)
    assert foot > style.size
    inked = []
    for one in (parts, WHOLE):
        page = image(500, round(roomy))
        with QPainter(page) as painter:
            paint_chart(painter, QRectF(0, 0, 500, roomy), drawn(LOW + HIGH, 14), style, parts=one)
        rows = range(round(roomy - foot * 0.7), round(roomy - foot * 0.3))
        inked.append(any(page.pixelColor(x, y).lightness() < 128 for y in rows for x in range(60, 200)))
    assert inked == [True, False]
