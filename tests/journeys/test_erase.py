"""Erasing for good, after its limits were read."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QMenu

from desktop.storage.backups import copies_of
from tests.journeys.test_first_four_weeks import CHANGE, FIRST, starts_a_log, types_four_weeks


@pytest.fixture
def four_weeks(person):
    person.starts_the_program()
    starts_a_log(person)
    types_four_weeks(person)
    person.goes_to(FIRST)
    return person


def chooses(person, act, text="Erase for &good…"):
    person.answers(act)
    actions = [one for menu in person.window.menuBar().findChildren(QMenu) for one in menu.actions()]
    next(one for one in actions if one.text() == text).trigger()


def clicks(button):
    QTest.mouseClick(button, Qt.MouseButton.LeftButton)


def erases(choice):
    def act(dialog):
        assert not dialog.erase.isEnabled()
        dialog.choices[choice].setChecked(True)
        assert not dialog.erase.isEnabled()
        dialog.sure.setChecked(True)
        clicks(dialog.erase)

    return act


def test_a_day_is_erased_and_undo_does_not_bring_it_back(four_weeks):
    person = four_weeks
    chooses(person, erases(0))
    said = person.window.workspace.status.said.text()
    assert said == "Erased for good: the day 3 March 2031: its values in all measures, and its note."
    journal = person.window.session.journal
    assert journal.entry(1, FIRST) is None
    assert len(journal.entries[1]) == 27
    while person.window.session.undoable is not None:
        person.window.undo()
    assert not person.window.session.journal.entries.get(1)
    while person.window.session.redoable is not None:
        person.window.redo()
    assert person.window.session.journal.entry(1, FIRST) is None
    assert len(person.window.session.journal.entries[1]) == 27


def test_a_measure_is_erased(four_weeks):
    chooses(four_weeks, erases(1))
    journal = four_weeks.window.session.journal
    assert (journal.measures, journal.entries) == ({}, {})
    assert [change.day for change in journal.changes.values()] == [CHANGE]


def test_everything_is_erased(four_weeks):
    chooses(four_weeks, erases(2))
    assert four_weeks.window.session is None
    assert four_weeks.window.start_screen.isVisible()
    assert not four_weeks.window.own_journal.exists()
    assert copies_of(four_weeks.window.own_journal) == []


def test_thinking_better_of_it_changes_nothing(four_weeks):
    chooses(four_weeks, lambda dialog: dialog.reject())
    assert len(four_weeks.window.session.journal.entries[1]) == 28


def test_what_cannot_be_erased_is_said(four_weeks, monkeypatch):
    def full(*_):
        raise OSError(28, "No space left on device")

    said = []

    def erases_without_room(dialog):
        monkeypatch.setattr("desktop.storage.new_files.os.link", full)
        monkeypatch.setattr("desktop.storage.new_files.Path.rename", full)
        four_weeks.answers(lambda box: (said.append(box.text()), box.reject()))
        erases(0)(dialog)

    chooses(four_weeks, erases_without_room)
    assert said[0].startswith("Not saved: the disk is full.")
    assert four_weeks.window.session.journal.entry(1, FIRST).value == 20


def test_a_second_place_that_is_away_is_told(four_weeks):
    four_weeks.window.settings.set_copies_place(four_weeks.folder / "stick")
    chooses(four_weeks, erases(0))
    assert "the copies there still hold it" in four_weeks.window.workspace.status.said.text()
