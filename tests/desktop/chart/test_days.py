"""Days drawn each, and many days drawn by their middles."""

from collections import defaultdict

import numpy as np
import pytest
from PySide6.QtCore import QRectF
from PySide6.QtGui import QFont

from desktop.chart.days import paint_days, places_of
from desktop.chart.look import LIGHT
from desktop.chart.style import Style
from tests.desktop.chart.pictures import drawn

RECT = QRectF(0, 0, 500, 300)


class Noting:
    """Stands for a painter and notes what it is asked to draw."""

    def __init__(self):
        self.drawn = defaultdict(list)

    def __getattr__(self, name):
        return lambda *what: self.drawn[name].append(what)


@pytest.fixture(autouse=True)
def _application(qapp):
    """Letters need an application."""


def noted(picture, x0=None, x1=None):
    painter = Noting()
    edges = (picture.x0 if x0 is None else x0, picture.x1 if x1 is None else x1, picture.y0, picture.y1)
    style = Style(LIGHT, QFont(), 14)
    paint_days(painter, RECT, edges, picture, places_of(RECT, edges, picture, style), style)
    return painter.drawn


def ten_years():
    values = np.random.default_rng(5).integers(20, 41, 3650)
    return values, drawn([float(one) for one in values], 1820)


def test_ten_years_are_middles_with_their_middle_halves_apart_by_stretch():
    values, picture = ten_years()
    seen = noted(picture)
    before, after = (polygon.toList() for (polygon,) in seen["drawPoints"])
    bars = [line for (lines,) in seen["drawLines"] for line in lines]
    assert len(bars) == len(before) + len(after)
    assert not seen["drawEllipse"]
    # 500 pixels for 521 weeks: each mark of 4 pixels or more stands for 5 weeks.
    assert len(before) == pytest.approx(1820 / 35, abs=1.5)
    assert len(after) == pytest.approx(1830 / 35, abs=2)
    assert max(point.x() for point in before) < min(point.x() for point in after)
    # The second mark is the first of 35 whole days; the log begins on a Monday.
    first_day = 35 - (int(picture.marks.x[0]) - 1) % 35
    days = np.sort(values[first_day : first_day + 35])
    height = lambda value: RECT.bottom() - (value - picture.y0) / (picture.y1 - picture.y0) * RECT.height()  # noqa: E731
    assert before[1].y() == pytest.approx(height(days[17]))
    assert sorted((bars[1].y1(), bars[1].y2())) == pytest.approx(
        [height(days[26]), height(days[8])], abs=height(0) / 50
    )
    said = [what[2] for what in seen["drawText"] if "middle" in str(what[2])]
    assert said == ["each mark: the middle of 5 weeks, its bar the middle half"]


def test_a_few_months_of_the_same_log_are_drawn_day_by_day():
    _, picture = ten_years()
    seen = noted(picture, picture.x0, picture.x0 + 120)
    assert len(seen["drawEllipse"]) == 121
    assert not seen["drawPoints"]


def test_days_outside_the_fences_keep_their_marks_among_the_middles():
    values = [30.0 + place % 7 for place in range(3650)]
    values[400] = 90.0
    seen = noted(drawn(values, 1820))
    assert len(seen["drawPolygon"]) == 1
