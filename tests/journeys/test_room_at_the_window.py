"""What has room at the window: days, note, chart and caution in every size of window and text."""

from datetime import timedelta

import pytest
from PySide6.QtWidgets import QApplication

from desktop.journal.records import Change, DayNote, Entry, Measure, Person
from desktop.storage.store import Store

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
