"""Copies are taken by themselves, looked at, and gone back to: whole or a single day."""

from datetime import timedelta
from pathlib import Path

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QFileDialog, QMenu

from desktop.screens.earlier_copies import EarlierCopiesDialog
from desktop.storage.backups import copies_of, read_copy, take_copy
from tests.journeys.test_first_four_weeks import FIRST, starts_a_log, types_four_weeks


def looks_at_earlier_copies(person, act):
    """Choose File, Earlier copies, and do ``act`` with what opens."""

    def when_filled(dialog):
        assert isinstance(dialog, EarlierCopiesDialog)
        act(dialog)

    person.answers(when_filled)
    (action,) = [
        action
        for menu in person.window.menuBar().findChildren(QMenu)
        for action in menu.actions()
        if action.text() == "&Earlier copies…"
    ]
    action.trigger()


def is_read(person, dialog):
    person.qtbot.waitUntil(lambda: dialog.holds.text().startswith("It holds"))


@pytest.fixture
def four_weeks(person):
    """A person who typed four weeks yesterday and opens the journal today."""
    person.starts_the_program()
    starts_a_log(person)
    types_four_weeks(person)
    person.quits()
    person.now += timedelta(days=1)
    person.starts_the_program()
    return person


def kept(person):
    return copies_of(person.window.own_journal)


def test_a_long_evening_ends_with_a_copy_and_a_quiet_day_takes_none(four_weeks):
    (copy,) = kept(four_weeks)
    assert len(read_copy(copy.path).entries[1]) == 28
    four_weeks.quits()
    assert kept(four_weeks) == [copy]


def test_the_first_opening_of_a_day_after_a_change_takes_one(four_weeks):
    four_weeks.types("12⏎")
    four_weeks.quits()
    assert len(kept(four_weeks)) == 1
    four_weeks.now += timedelta(days=1)
    four_weeks.starts_the_program()
    four_weeks.qtbot.waitUntil(lambda: len(kept(four_weeks)) == 2)
    four_weeks.quits()


def test_a_copy_is_put_in_place_and_undo_takes_that_back(four_weeks):
    person = four_weeks
    person.goes_to(FIRST)
    person.types("99⏎")
    person.presses(Qt.Key.Key_Delete)
    before = set(person.window.session.journal.records())

    def restores(dialog):
        is_read(person, dialog)
        assert dialog.holds.text() == "It holds 28 days in 1 measure, the last of them 30 March 2031."
        assert dialog.differs.text() == "1 value differs, 1 value is only in the copy."
        rows = [[dialog.table.item(row, column).text() for column in range(3)] for row in range(2)]
        assert rows == [["3 March 2031, Exercise", "99", "20"], ["4 March 2031, Exercise", "nothing", "25"]]
        assert not dialog.put_back.isEnabled()
        QTest.mouseClick(dialog.restore, Qt.MouseButton.LeftButton)

    looks_at_earlier_copies(person, restores)
    assert person.window.session.journal.entry(1, FIRST).value == 20
    assert person.window.workspace.status.said.text().startswith("Everything is as it was on 30 March 2031, ")
    person.window.session.wait_until_written()
    assert len(kept(person)) == 2
    person.holds_control_and_presses(Qt.Key.Key_Z)
    assert set(person.window.session.journal.records()) == before


def test_a_single_day_is_put_back(four_weeks):
    person = four_weeks
    person.goes_to(FIRST)
    person.types("99⏎77⏎")

    def puts_back(dialog):
        is_read(person, dialog)
        dialog.table.selectRow(0)
        QTest.mouseClick(dialog.put_back, Qt.MouseButton.LeftButton)
        assert dialog.differs.text() == "1 value differs."
        dialog.reject()

    looks_at_earlier_copies(person, puts_back)
    assert person.window.session.journal.entry(1, FIRST).value == 20
    assert person.window.session.journal.entry(1, FIRST + timedelta(1)).value == 77


def test_a_second_place_gets_every_copy(four_weeks, monkeypatch):
    person = four_weeks
    stick = person.folder / "stick"
    stick.mkdir()
    monkeypatch.setattr(QFileDialog, "getExistingDirectory", lambda *_: str(stick))

    def chooses(dialog):
        assert dialog.place.text().startswith("Second place: none.")
        QTest.mouseClick(dialog.choose_place, Qt.MouseButton.LeftButton)
        person.qtbot.waitUntil(lambda: "Last copied" in dialog.place.text())
        assert f"Second place: {stick}. Last copied today, 31 March 2031, " in dialog.place.text()
        dialog.reject()

    looks_at_earlier_copies(person, chooses)
    (sent,) = copies_of(person.window.own_journal, stick)
    assert read_copy(sent.path) == person.window.session.journal
    person.types("12⏎")
    person.quits()
    person.now += timedelta(days=30)
    person.starts_the_program()
    person.qtbot.waitUntil(lambda: len(copies_of(person.window.own_journal, stick)) == 2)

    def is_gone(dialog):
        Path.rename(stick, person.folder / "elsewhere")
        QTest.mouseClick(dialog.copy_now, Qt.MouseButton.LeftButton)
        person.qtbot.waitUntil(lambda: dialog.differs.text().startswith("There is no file"))
        dialog.reject()

    looks_at_earlier_copies(person, is_gone)


def test_without_a_copy_the_window_says_when_there_will_be_one(person):
    person.starts_the_program()
    starts_a_log(person)

    def reads(dialog):
        assert dialog.holds.text().startswith("There is no earlier copy yet.")
        assert not dialog.restore.isEnabled()
        dialog.reject()

    looks_at_earlier_copies(person, reads)


def test_a_damaged_copy_and_a_copy_of_another_journal_are_not_put_in_place(four_weeks):
    person = four_weeks
    (copy,) = kept(person)
    other = person.folder / "sample.dayfence"
    person.window.open_sample()
    take_copy(other, person.now)
    (foreign,) = copies_of(other)
    person.window.open_own()
    foreign.path.rename(copy.path.with_name("20310331T235900Z-900.dayfence"))
    copy.path.write_bytes(copy.path.read_bytes()[:-3000])

    def tries(dialog):
        is_read(person, dialog)
        QTest.mouseClick(dialog.restore, Qt.MouseButton.LeftButton)
        assert dialog.differs.text().startswith("This is a copy of another journal")
        dialog.listed.setCurrentRow(1)
        person.qtbot.waitUntil(lambda: "is damaged" in dialog.differs.text())
        assert not dialog.restore.isEnabled()
        dialog.reject()

    looks_at_earlier_copies(person, tries)
    assert len(person.window.session.journal.entries[1]) == 28
