"""Finding a day by a word that was written, or a number that was typed."""

from __future__ import annotations

from datetime import date

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest

from desktop.edits.days import write_note
from desktop.journal.finding import MOST, find
from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Span
from desktop.screens.find_dialog import FindDialog
from desktop.wording.finding import found_count, found_line
from tests.journeys.test_first_four_weeks import BEFORE, FIRST, marks_the_change, starts_a_log

JOURNAL = Journal.of(
    [
        Person("0" * 32),
        Measure(1, 0, "Walking", "minutes"),
        DayNote(date(2031, 3, 4), "Slept badly,\nrain all day"),
        Change(1, date(2031, 3, 5), "Off the bus early", measures=(1,)),
        Span(1, date(2031, 3, 6), date(2031, 3, 8), "ill", "a bad cold"),
        Entry(1, date(2031, 3, 7), value=31.5, original="31,5", note="badly laced shoes"),
        Entry(2, date(2031, 3, 9), value=1.0, original="rain"),
    ]
)


@pytest.mark.parametrize(
    ("words", "lines"),
    [
        ("", []),
        ("nothing like it", []),
        (
            "BADLY",
            [
                "Friday 7 March 2031, Walking: 31,5 badly laced shoes",
                "Tuesday 4 March 2031, note: Slept badly, rain all day",
            ],
        ),
        ("rain badly", ["Tuesday 4 March 2031, note: Slept badly, rain all day"]),
        (
            "rain",
            [
                "Sunday 9 March 2031, a measure that is gone: rain",
                "Tuesday 4 March 2031, note: Slept badly, rain all day",
            ],
        ),
        ("bus", ["Wednesday 5 March 2031, change: Off the bus early"]),
        ("cold", ["Thursday 6 March 2031, named days: a bad cold"]),
        ("31,5", ["Friday 7 March 2031, Walking: 31,5 badly laced shoes"]),
    ],
)
def test_what_holds_the_words_newest_first(words, lines):
    assert [found_line(one, JOURNAL) for one in find(JOURNAL, words)] == lines


def test_a_long_note_is_shortened_and_many_places_are_counted():
    notes = [DayNote(date.fromordinal(740_000 + at), "word " * 100) for at in range(MOST + 5)]
    many = Journal.of([Person("0" * 32), *notes])
    found = find(many, "word")
    assert len(found) == MOST
    assert found[0].day == notes[-1].day
    assert found_line(found[0], many).endswith("…")
    assert found_count(MOST, MOST) == "The newest 500 places."
    assert found_count(1, MOST) == "1 place."
    assert found_count(0, MOST) == "Nothing holds these words."


def test_a_day_is_found_by_the_words_of_its_note_with_keys_alone(person):
    window = person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("".join(f"{value}⏎" for value in BEFORE))
    marks_the_change(person, "off the bus one stop early")
    session = window.session
    session.do(write_note(session.journal, date(2031, 3, 6), "knee hurt on the stairs"))

    def search(dialog):
        assert isinstance(dialog, FindDialog)
        QTest.keyClicks(dialog.words, "e")
        assert dialog.places.count() == 2
        QTest.keyClick(dialog.words, Qt.Key.Key_Down)
        assert dialog.places.currentRow() == 1
        QTest.keyClicks(dialog.words, "xyz")
        assert not dialog.go.isEnabled()
        dialog.words.clear()
        QTest.keyClicks(dialog.words, "knee")
        QTest.keyClick(dialog.words, Qt.Key.Key_Return)

    person.answers(search)
    person.holds_control_and_presses(Qt.Key.Key_F)
    days = window.workspace.days
    assert days.days.day(days.currentIndex().row()) == date(2031, 3, 6)
