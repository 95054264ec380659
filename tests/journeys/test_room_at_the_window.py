"""What has room at the window: days, note, chart and caution in every size of window and text."""

from datetime import timedelta

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QLabel

from desktop.chart.look import DARK
from desktop.journal.records import Change, DayNote, Entry, Measure, Person
from desktop.storage.store import Store
from desktop.wording.cautions import CAUTION
from tests.journeys.test_first_four_weeks import starts_a_log

DEFAULT, SMALL = (1360, 820), (1024, 640)
TITLES = [("Walking", "minutes"), ("Upper pressure", "mmHg"), ("Lower pressure", "mmHg")]


@pytest.fixture
def opens(person):
    """Open a journal of so many measures in a window of a size."""

    def open_it(measures, size, text=100):
        today = person.now.date()
        records = [Person("0" * 32), DayNote(today, "a note that is longer than the room there is for it")]
        records += [Measure(at + 1, at, *TITLES[at], kind="amount", aim="more") for at in range(measures)]
        records += [Change(1, today - timedelta(20), "off the bus one stop early")]
        records += [
            Entry(measure + 1, today - timedelta(at), value=float(20 + at * 7 % 11 + 15 * (at <= 20)))
            for measure in range(measures)
            for at in range(41)
        ]
        Store.create(person.folder / "journal.dayfence", records, clock=lambda: person.now).close()
        window = person.starts_the_program()
        window.resize(*size)
        window._set_text_size(text)
        settle()
        return window

    return open_it


def settle():
    """Let every layout that follows from another one be made."""
    for _ in range(3):
        QApplication.processEvents()


@pytest.mark.parametrize("measures", [1, 2])
def test_days_values_and_note_fit_their_pane(person, opens, measures):
    opens(measures, DEFAULT)
    assert person.days.horizontalScrollBar().maximum() == 0
    note = person.days.visualRect(person.days.model().index(0, measures))
    assert note.right() <= person.days.viewport().width()
    assert note.width() >= 7 * person.days.fontMetrics().averageCharWidth()


@pytest.mark.parametrize("size", [DEFAULT, SMALL])
@pytest.mark.parametrize("text", [100, 200])
def test_no_column_of_values_is_seen_in_part(person, opens, size, text):
    opens(3, size, text)
    person.days.horizontalScrollBar().setValue(0)
    room = person.days.viewport().width()
    columns = [person.days.visualRect(person.days.model().index(0, place)) for place in range(3)]
    assert columns[0].right() <= room
    assert not [one for one in columns if one.left() < room - 1 and one.right() > room]


def in_view(person) -> bool:
    shown = person.days.visualRect(person.days.currentIndex())
    return shown.isValid() and person.days.viewport().rect().contains(shown)


def test_the_current_day_stays_in_view_when_the_window_or_the_text_change(person, opens):
    window = opens(2, DEFAULT)
    for size, text in ((SMALL, 100), (DEFAULT, 200), (SMALL, 200), (DEFAULT, 150), (SMALL, 100)):
        window.resize(*size)
        window._set_text_size(text)
        settle()
        assert in_view(person), (size, text)


def test_rows_are_as_low_as_before_after_a_larger_text(person, opens):
    window = opens(1, DEFAULT)
    before = person.days.rowHeight(0), person.days.verticalHeader().width()
    window._set_text_size(200)
    settle()
    assert person.days.rowHeight(0) > before[0]
    window._set_text_size(100)
    settle()
    assert (person.days.rowHeight(0), person.days.verticalHeader().width()) == before


def test_the_chart_keeps_room_in_a_small_window_with_large_text(person, opens):
    window = opens(1, SMALL, 200)
    person.qtbot.waitUntil(lambda: window.session.review is not None)
    settle()
    plot = window.workspace.chart_pane.chart.getViewBox().rect()
    letter = person.days.fontInfo().pixelSize()
    assert plot.width() >= window.width() * 0.16
    assert plot.height() >= 7 * letter


@pytest.mark.parametrize("text", [100, 150, 200])
def test_the_caution_is_whole_and_takes_little_of_a_small_window(person, opens, text):
    window = opens(1, SMALL, text)
    line = window.workspace.caution_line
    assert line.isVisible()
    assert line.text() == CAUTION
    assert line.height() >= line.heightForWidth(line.width())
    assert line.height() < window.height() / 8
    # 9 points of 96 to the inch are 12 pixels.
    assert line.fontInfo().pixelSize() >= 12 * text / 100


def test_a_long_title_is_cut_and_said_whole_elsewhere(person, opens, monkeypatch):
    long = "Minutes of slow walking on the way home from the bus, as was suggested in spring"
    monkeypatch.setattr(f"{__name__}.TITLES", [(long, "minutes")])
    window = opens(1, SMALL)
    assert window.width() == SMALL[0]
    titles = [
        person.days.model().headerData(0, Qt.Orientation.Horizontal, role)
        for role in (Qt.ItemDataRole.DisplayRole, Qt.ItemDataRole.ToolTipRole, Qt.ItemDataRole.AccessibleTextRole)
    ]
    assert titles == ["Minutes\nof slow walki…\nminutes", long, long]
    assert person.days.columnWidth(0) < SMALL[0] / 4


@pytest.mark.parametrize(("size", "text"), [(DEFAULT, 100), (SMALL, 100), (SMALL, 200)])
def test_the_three_ways_to_begin_are_large_buttons_that_say_what_they_do(person, size, text):
    window = person.starts_the_program()
    window._set_text_size(text)
    window.resize(*size)
    settle()
    assert (window.width(), window.height()) == size
    start = window.start_screen
    ways = [start.start, start.table, start.sample]
    letter = window.fontInfo().pixelSize() if text == 100 else 30
    for way in ways:
        assert way.isVisible()
        assert way.height() >= 3.5 * letter
        assert way.width() >= min(30 * letter, 900)
        name, hint = way.findChildren(QLabel)
        assert (name.text(), hint.text()) == (way.accessibleName(), way.accessibleDescription())
        assert name.font().bold()
        assert hint.height() >= hint.heightForWidth(hint.width())
        assert name.font().pixelSize() > hint.font().pixelSize() == 15 * text / 100
    caution = start.caution_line
    assert caution.isVisible()
    assert caution.height() >= caution.heightForWidth(caution.width())
    assert len({way.accessibleDescription() for way in ways}) == 3


def test_a_way_to_begin_is_pressed_on_its_words(person):
    window = person.starts_the_program()
    settle()
    pressed = []
    window.start_screen.sample_wanted.disconnect()
    window.start_screen.sample_wanted.connect(lambda: pressed.append("sample"))
    words = window.start_screen.sample.findChildren(QLabel)[0]
    QTest.mouseClick(
        window.windowHandle(), Qt.MouseButton.LeftButton, pos=words.mapTo(window, words.rect().center())
    )
    assert pressed == ["sample"]


def test_quiet_words_of_the_days_have_the_ink_of_the_theme_from_the_start(person):
    window = person.starts_the_program()
    window.set_theme("dark")
    starts_a_log(person)
    weekend = next(row for row in range(7) if person.days.days.day(row).weekday() == 6)
    ink = person.days.days.headerData(weekend, Qt.Orientation.Vertical, Qt.ItemDataRole.ForegroundRole)
    assert ink == DARK.colour("quiet")
    window.set_theme("light")
