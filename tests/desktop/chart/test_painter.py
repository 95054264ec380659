"""The painter draws every picture at every size, in inks that can be seen."""

from datetime import date

import numpy as np
import pytest
from PySide6.QtCore import QRectF
from PySide6.QtGui import QColor, QFont, QImage, QPainter

from desktop.chart.look import DARK, GREY, LIGHT, Look
from desktop.chart.painter import (
    Frame,
    end_labels_width,
    paint_below,
    paint_end_labels,
    paint_lane,
    paint_plot,
    paint_value_axis,
    value_axis_width,
)
from desktop.chart.picture import empty_picture
from desktop.chart.pieces import Picture
from desktop.chart.style import Style
from desktop.journal.records import Span
from desktop.screens.theme import CAUTION_INK
from tests.builders import day, number
from tests.desktop.chart.pictures import HIGH, LOW, drawn

SPANS = [Span(1, day(3), day(5), "ill", "cold"), Span(2, day(20), day(22), "away")]
PICTURES = {
    "nothing yet": lambda: empty_picture(None, date(2031, 3, 30)),
    "one day": lambda: drawn([20]),
    "two days": lambda: drawn([20, 30]),
    "four weeks with a change": lambda: drawn(LOW + HIGH, 14),
    "settling in": lambda: drawn(LOW + HIGH, 14, 5),
    "every kind of day": lambda: drawn(
        [*LOW, "ill", "away", "rest", None, *HIGH], 14, kinds={2: "late", 5: "set aside"}, spans=SPANS
    ),
    "all zero": lambda: drawn([0] * 20),
    "all equal": lambda: drawn([5] * 20, kind="reading"),
    "below zero": lambda: drawn([value - 40 for value in LOW + HIGH], 14, kind="reading"),
    "a thousand million": lambda: drawn([1e9, 9e8, 1e9, -1e9, 5e8, 1e9, 9e8, 0, 1e9, 3], 5, kind="reading"),
    "ten years": lambda: drawn([LOW[place % 14] + place / 400 for place in range(3650)], 1800),
    "years": lambda: drawn([LOW[place % 14] for place in range(3650)], 1800, period="year"),
    "fences beyond": lambda: drawn([10, 90, 12, 88, 14, 86, 11, 89, 13, 87, 50, 52] * 2, 12, kind="reading"),
    "many outside": lambda: drawn([*LOW, *[90 + place for place in range(35)]], 14),
}


@pytest.fixture(autouse=True)
def _application(qapp):
    """Letters need an application."""


def painted(picture: Picture, width: int, height: int, look: Look = LIGHT, size: float = 13) -> dict[str, float]:
    """Paint all five parts; for each the part of its pixels that is not paper, and how many colours."""
    style = Style(look, QFont(), size)
    image = QImage(width, height, QImage.Format.Format_RGB32)
    image.fill(QColor(look.paper))
    frame = Frame(QRectF(0, 0, 1, height - 5 * size), picture.x0, picture.x1, picture.y0, picture.y1)
    left = value_axis_width(frame, style)
    right = max(end_labels_width(picture.end_labels, style), size)
    plot = QRectF(left, 2 * size, max(width - left - right, 20), max(height - 6 * size, 20))
    frame = Frame(plot, picture.x0, picture.x1, picture.y0, picture.y1)
    parts = {
        "plot": plot,
        "lane": QRectF(plot.left(), 0, plot.width(), 2 * size),
        "axis": QRectF(0, plot.top(), left, plot.height()),
        "ends": QRectF(plot.right(), plot.top(), right, plot.height()),
        "below": QRectF(0, plot.bottom(), width, 4 * size),
    }
    with QPainter(image) as painter:
        paint_plot(painter, frame, picture, style)
        paint_lane(painter, parts["lane"], frame, picture, style)
        paint_value_axis(painter, parts["axis"], frame, picture, style)
        paint_end_labels(painter, parts["ends"], frame, picture, style)
        paint_below(painter, parts["below"], frame, picture, style)
    pixels = np.frombuffer(image.constBits(), dtype=np.uint32).reshape(height, width)
    paper = QColor(look.paper).rgb()
    colours = {"colours": float(len(np.unique(pixels)))}
    return colours | {name: _inked(pixels, rect, paper) for name, rect in parts.items()}


def _inked(pixels: np.ndarray, rect: QRectF, paper: int) -> float:
    box = rect.toAlignedRect()
    seen = pixels[max(box.top(), 0) : box.bottom() + 1, max(box.left(), 0) : box.right() + 1]
    return float(np.mean(seen != paper)) if seen.size else 0.0


@pytest.mark.parametrize("look", [LIGHT, DARK, GREY], ids=["light", "dark", "grey"])
@pytest.mark.parametrize(("width", "height"), [(200, 150), (640, 320), (2000, 1000)])
@pytest.mark.parametrize("name", PICTURES)
def test_every_picture_is_painted_at_every_size(name, width, height, look):
    inked = painted(PICTURES[name](), width, height, look)
    assert inked["lane"] > 1 - 7 / width  # All of it but a cut pixel at its edge; the plot is part of the width.
    assert inked["below"] > 0
    if name != "nothing yet":
        assert inked["plot"] > 0.001
        assert inked["axis"] > 0
    assert inked["colours"] >= 3


def test_levels_are_named_beside_the_plot():
    assert painted(drawn(LOW + HIGH, 14), 640, 320)["ends"] > 0.01
    assert painted(drawn([20]), 640, 320)["ends"] < 0.001


def test_larger_text_takes_more_room():
    style = [Style(LIGHT, QFont(), size) for size in (10.0, 26.0)]
    picture = drawn(LOW + HIGH, 14)
    frame = Frame(QRectF(0, 0, 500, 400), picture.x0, picture.x1, picture.y0, picture.y1)
    small, large = (value_axis_width(frame, one) + end_labels_width(picture.end_labels, one) for one in style)
    assert large > 2 * small


def test_a_part_of_the_days_can_be_shown_alone():
    picture = drawn(LOW + HIGH, 14)
    image = QImage(400, 200, QImage.Format.Format_RGB32)
    image.fill(QColor("#ffffff"))
    style = Style(LIGHT, QFont(), 13)
    for x0, x1 in ((number(10), number(15)), (number(100), number(120)), (number(0) - 200, number(0) - 100)):
        frame = Frame(QRectF(0, 0, 400, 200), x0, x1, picture.y0, picture.y1)
        with QPainter(image) as painter:
            paint_plot(painter, frame, picture, style)
            paint_below(painter, QRectF(0, 150, 400, 50), frame, picture, style)
    assert image.pixelColor(0, 0).isValid()
    assert len({image.pixel(x, y) for x in range(0, 400, 7) for y in range(0, 200, 7)}) > 1


def test_a_day_and_a_value_have_their_place():
    frame = Frame(QRectF(100, 50, 200, 100), 10, 20, 0, 50)
    assert (frame.x(10), frame.x(15), frame.x(20)) == (100, 200, 300)
    assert (frame.y(0), frame.y(25), frame.y(50)) == (150, 100, 50)
    assert frame.day_width == 20


# Contrast, after the Web Content Accessibility Guidelines 2.2, success criteria 1.4.3 and 1.4.11.


def luminance(colour: str) -> float:
    parts = [int(colour[place : place + 2], 16) / 255 for place in (1, 3, 5)]
    red, green, blue = (part / 12.92 if part <= 0.04045 else ((part + 0.055) / 1.055) ** 2.4 for part in parts)
    return 0.2126 * red + 0.7152 * green + 0.0722 * blue


def contrast(one: str, other: str) -> float:
    lighter, darker = sorted((luminance(one), luminance(other)), reverse=True)
    return (lighter + 0.05) / (darker + 0.05)


def test_the_contrast_formula_gives_the_published_values():
    assert contrast("#767676", "#ffffff") == pytest.approx(4.54, abs=0.005)
    assert contrast("#000000", "#ffffff") == pytest.approx(21)


@pytest.mark.parametrize("look", [LIGHT, DARK, GREY], ids=["light", "dark", "grey"])
@pytest.mark.parametrize("ink", ["ink", "quiet", "before", "after"])
def test_every_ink_that_writes_words_stands_out_from_the_paper(look, ink):
    # Marks and lines need 3 to 1 only; all these inks also write words.
    assert contrast(getattr(look, ink), look.paper) >= 4.5


@pytest.mark.parametrize("look", [LIGHT, DARK, GREY], ids=["light", "dark", "grey"])
def test_words_stand_out_from_the_lane_too(look):
    assert contrast(look.ink, look.lane) >= 4.5
    assert contrast(look.quiet, look.lane) >= 4.5


@pytest.mark.parametrize("look", [LIGHT, DARK, GREY], ids=["light", "dark", "grey"])
@pytest.mark.parametrize("side", ["before", "after"])
def test_marks_stand_out_from_the_bands_behind_them(look, side):
    """A mark lies on its fence band and the stronger band of the fourths, one over the other."""
    behind = look.paper
    for alpha in (look.band, look.inner_band):
        behind = blended(getattr(look, side), behind, alpha / 255)
    assert contrast(getattr(look, side), behind) >= 3
    assert contrast(look.ink, behind) >= 4.5


def blended(over: str, under: str, part: float) -> str:
    pairs = [(int(over[place : place + 2], 16), int(under[place : place + 2], 16)) for place in (1, 3, 5)]
    return "#" + "".join(f"{round(part * top + (1 - part) * bottom):02x}" for top, bottom in pairs)


@pytest.mark.parametrize("name", CAUTION_INK)
def test_the_caution_can_be_read(name):
    assert contrast(*CAUTION_INK[name]) >= 4.5


def test_the_two_sides_differ_in_grey_too_by_shape_and_line_alone():
    assert GREY.before == GREY.after
    picture = drawn(LOW + HIGH, 14)
    assert {line.side for line in picture.lines} == {"before", "after"}
    assert len(set(picture.marks.shape.tolist())) >= 3


class Writing(QPainter):
    """A painter that remembers which words it wrote where."""

    def __init__(self, image):
        super().__init__(image)
        self.words = []

    def drawText(self, box, flags, words):
        super().drawText(box, flags, words)
        self.words.append((words, self.boundingRect(box, int(flags), words)))


@pytest.mark.parametrize(("width", "height"), [(240, 160), (420, 300), (900, 500)])
@pytest.mark.parametrize(
    "name", ["many outside", "fences beyond", "ten years", "a thousand million", "days in line"]
)
def test_no_word_of_the_plot_lies_over_a_mark_or_another_word(name, width, height):
    more = {"days in line": lambda: drawn([*LOW, *[90 + place % 3 for place in range(30)], 20], 14)}
    picture = (PICTURES | more)[name]()
    image = QImage(width, height, QImage.Format.Format_RGB32)
    image.fill(QColor("#ffffff"))
    frame = Frame(QRectF(0, 0, width, height), picture.x0, picture.x1, picture.y0, picture.y1)
    painter = Writing(image)
    paint_plot(painter, frame, picture, Style(LIGHT, QFont(), 13))
    painter.end()
    marks = [(frame.x(x), frame.y(y)) for x, y in zip(picture.marks.x, picture.marks.y, strict=True)]
    over = [(words, at) for words, box in painter.words for at in marks if box.contains(*at)]
    both = [
        (one, other)
        for place, (one, box) in enumerate(painter.words)
        for other, other_box in painter.words[:place]
        if box.intersects(other_box)
    ]
    assert (over, both) == ([], [])
    if name in ("many outside", "fences beyond") and width > 400:
        assert painter.words


def lane_words(picture, width=500):
    image = QImage(width, 30, QImage.Format.Format_RGB32)
    painter = Writing(image)
    frame = Frame(QRectF(0, 0, width, 200), picture.x0, picture.x1, picture.y0, picture.y1)
    paint_lane(painter, QRectF(0, 0, width, 26), frame, picture, Style(LIGHT, QFont(), 13))
    painter.end()
    return frame, dict(painter.words)


@pytest.mark.parametrize("days_after", [0, 1, 2])
def test_the_name_of_a_new_change_is_written_before_any_day_follows(days_after):
    picture = drawn(LOW + HIGH[:days_after], 14)
    assert number(14) - 0.5 in picture.uprights
    assert picture.x1 >= number(14) + 0.5
    frame, words = lane_words(picture)
    box = words["off the bus one stop early"]
    assert box.right() <= frame.x(number(14) - 0.5) + 1
    assert all(other.right() <= box.left() for text, other in words.items() if other is not box)


def test_the_name_of_a_change_with_room_stands_after_its_line():
    frame, words = lane_words(drawn(LOW + HIGH, 14))
    assert words["off the bus one stop early"].left() >= frame.x(number(14) - 0.5)


def test_a_change_far_ahead_does_not_stretch_the_chart():
    assert drawn(LOW, 40).uprights == ()


def test_a_value_stands_on_its_own_side_of_a_change():
    # Its neighbours take the places above and below; left of it is the line of the change.
    picture = drawn([*LOW, 90, 91, 89, *[20] * 4], 14)
    image = QImage(240, 200, QImage.Format.Format_RGB32)
    frame = Frame(QRectF(0, 0, 240, 200), picture.x0, picture.x1, picture.y0, picture.y1)
    painter = Writing(image)
    paint_plot(painter, frame, picture, Style(LIGHT, QFont(), 13))
    painter.end()
    line = frame.x(number(14) - 0.5)
    values = [box for words, box in painter.words if words in ("90", "91", "89")]
    assert values
    assert all(box.left() > line for box in values)
