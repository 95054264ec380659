"""The chart on screen: keys and the mouse reach every day, and what is drawn is told."""

import pytest
from PySide6.QtCore import QPoint, QPointF, Qt
from PySide6.QtTest import QTest

from desktop.chart.look import DARK, LIGHT
from desktop.chart.picture import empty_picture
from desktop.chart.plot import Chart
from tests.builders import day, number
from tests.desktop.chart.pictures import HIGH, LOW, drawn

PICTURE = drawn(LOW + HIGH, 14)


@pytest.fixture
def chart(qtbot):
    one = Chart()
    qtbot.addWidget(one)
    one.resize(700, 420)
    one.show()
    one.read = []
    one.day_read.connect(one.read.append)
    one.show_picture(PICTURE, keep_view=False)
    one.setFocus()
    return one


def view(chart) -> tuple[float, float]:
    x0, x1 = chart.getViewBox().viewRange()[0]
    return round(x0, 6), round(x1, 6)


def press(chart, key, held=Qt.KeyboardModifier.NoModifier):
    QTest.keyClick(chart, key, held)


CONTROL = Qt.KeyboardModifier.ControlModifier
WHOLE = (PICTURE.x0, PICTURE.x1)


def test_the_picture_fills_the_view_and_is_told(chart):
    assert view(chart) == WHOLE
    assert chart.getViewBox().viewRange()[1] == [PICTURE.y0, PICTURE.y1]
    assert chart.accessibleDescription() == PICTURE.told
    assert chart.accessibleName() == "Chart"
    assert chart.picture is PICTURE


def test_left_begins_with_the_last_day_and_steps_back(chart):
    for _ in range(3):
        press(chart, Qt.Key.Key_Left)
    assert chart.read == [PICTURE.marks.spoken[place] for place in (27, 26, 25)]


def test_right_stops_at_the_last_day(chart):
    press(chart, Qt.Key.Key_Left)
    press(chart, Qt.Key.Key_Left)
    for _ in range(3):
        press(chart, Qt.Key.Key_Right)
    assert chart.read == [PICTURE.marks.spoken[place] for place in (27, 26, 27)]


def test_every_day_is_reached_by_keys_alone(chart):
    for _ in range(40):
        press(chart, Qt.Key.Key_Left)
    assert chart.read == list(reversed(PICTURE.marks.spoken))


def test_a_day_set_aside_is_read_out_in_its_place(chart):
    aside = drawn(LOW, kinds={4: "set aside"})
    chart.show_picture(aside, keep_view=False)
    for _ in range(len(LOW)):
        press(chart, Qt.Key.Key_Left)
    assert chart.read[9] == "Friday 7 March 2031: 15 minutes, set aside, not counted."
    assert len(chart.read) == len(LOW)


@pytest.mark.parametrize("key", [Qt.Key.Key_Plus, Qt.Key.Key_Equal])
def test_plus_shows_fewer_days_and_minus_more(chart, key):
    press(chart, key)
    x0, x1 = view(chart)
    assert x1 - x0 == pytest.approx(28 / 1.5)
    press(chart, Qt.Key.Key_Minus)
    assert view(chart) == pytest.approx(WHOLE)


def test_zooming_in_ends_at_five_days_and_out_at_all(chart):
    for _ in range(20):
        press(chart, Qt.Key.Key_Plus)
    x0, x1 = view(chart)
    assert x1 - x0 == pytest.approx(5)
    for _ in range(20):
        press(chart, Qt.Key.Key_Minus)
    assert view(chart) == pytest.approx(WHOLE)


def test_control_and_arrows_move_within_the_days(chart):
    press(chart, Qt.Key.Key_Plus)
    was = view(chart)
    press(chart, Qt.Key.Key_Right, CONTROL)
    assert view(chart)[0] > was[0]
    for _ in range(20):
        press(chart, Qt.Key.Key_Right, CONTROL)
    assert view(chart)[1] == pytest.approx(PICTURE.x1)
    for _ in range(40):
        press(chart, Qt.Key.Key_Left, CONTROL)
    assert view(chart)[0] == pytest.approx(PICTURE.x0)
    assert chart.read == []


def test_home_shows_all(chart):
    press(chart, Qt.Key.Key_Plus)
    press(chart, Qt.Key.Key_Plus)
    press(chart, Qt.Key.Key_Home)
    assert view(chart) == pytest.approx(WHOLE)


def test_stepping_out_of_view_brings_the_day_into_view(chart):
    for _ in range(5):
        press(chart, Qt.Key.Key_Plus)
    for _ in range(27):
        press(chart, Qt.Key.Key_Left)
    x0, x1 = view(chart)
    assert x0 <= number(1) <= x1


def test_the_mouse_reads_out_the_day_it_is_on(chart, qtbot):
    at = chart.getViewBox().mapViewToScene(QPointF(number(5), 20))
    QTest.mouseMove(chart.viewport(), chart.mapFromScene(at))
    qtbot.waitUntil(lambda: chart.read == [PICTURE.marks.spoken[5]])


def test_the_mouse_beside_the_days_reads_nothing(chart):
    QTest.mouseMove(chart.viewport(), QPoint(2, 2))
    assert all("March" in sentence for sentence in chart.read)


def test_a_zoomed_view_stays_while_a_day_is_added(chart):
    press(chart, Qt.Key.Key_Plus)
    was = view(chart)
    chart.show_picture(drawn([*LOW, *HIGH, 41], 14), keep_view=True)
    assert view(chart) == was


def test_a_view_of_all_days_grows_with_them(chart):
    longer = drawn([*LOW, *HIGH, 41], 14)
    chart.show_picture(longer, keep_view=True)
    assert view(chart) == (longer.x0, longer.x1)


def test_another_measure_is_shown_whole(chart):
    press(chart, Qt.Key.Key_Plus)
    other = drawn(LOW, kind="reading")
    chart.show_picture(other, keep_view=False)
    assert view(chart) == (other.x0, other.x1)
    assert chart.accessibleDescription() == other.told


def test_an_empty_picture_has_no_day_to_read(chart):
    chart.show_picture(empty_picture(None, day(27)), keep_view=False)
    press(chart, Qt.Key.Key_Left)
    QTest.mouseMove(chart.viewport(), QPoint(300, 200))
    assert chart.read == []
    assert not chart.grab().isNull()


def test_a_day_that_was_read_and_is_gone_is_no_longer_marked(chart):
    press(chart, Qt.Key.Key_Left)
    chart.show_picture(drawn(LOW), keep_view=False)
    press(chart, Qt.Key.Key_Left)
    assert chart.read[-1] == drawn(LOW).marks.spoken[-1]


def test_the_inks_follow_the_theme(chart):
    light = chart.grab().toImage().pixelColor(350, 5).lightness()
    chart.set_look(DARK)
    dark = chart.grab().toImage().pixelColor(350, 5).lightness()
    assert dark < 80 < 200 < light
    chart.set_look(LIGHT)
    assert chart.grab().toImage().pixelColor(350, 5).lightness() == light


def test_other_keys_are_left_to_the_window(chart, qtbot):
    press(chart, Qt.Key.Key_A)
    assert view(chart) == WHOLE
    assert chart.read == []


def test_a_closed_chart_lets_a_larger_text_pass(qapp):
    closed = Chart()
    closed.show_picture(PICTURE, keep_view=False)
    closed.close()
    larger = closed.font()
    larger.setPixelSize(30)
    closed.setFont(larger)
    assert closed.font().pixelSize() == 30
    closed.deleteLater()
