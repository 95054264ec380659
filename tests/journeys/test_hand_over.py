"""A copy to hand over holds what was listed and nothing else."""

from datetime import date

import pytest
from PySide6.QtCore import QDate, Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QFileDialog

from desktop.storage.store import Store
from tests.journeys.test_erase import chooses
from tests.journeys.test_first_four_weeks import CHANGE, starts_a_log, types_four_weeks

MENU = "A copy to &hand over…"


@pytest.fixture
def four_weeks(person):
    person.starts_the_program()
    starts_a_log(person)
    types_four_weeks(person)
    person.presses(Qt.Key.Key_Tab)
    person.types("secret words⏎")
    return person


def test_what_is_listed_goes_and_nothing_else(four_weeks, monkeypatch):
    person = four_weeks
    target = person.folder / "for the clinic.dayfence"
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_: (str(target), ""))

    def hands_over(dialog):
        dialog.first.setDate(QDate(2031, 3, 10))
        assert dialog.goes.toPlainText().splitlines() == [
            "Exercise: 21 values, 10 March 2031 to 30 March 2031",
            "the change of 17 March 2031: off the bus one stop early",
        ]
        QTest.mouseClick(dialog.write, Qt.MouseButton.LeftButton)

    chooses(person, hands_over, MENU)
    assert b"secret words" not in target.read_bytes()
    with Store.open(target) as store:
        store.verify()
        journal = store.read()
        assert len(journal.entries[1]) == 21
        assert [change.day for change in journal.changes.values()] == [CHANGE]
        assert journal.person.journal_id != person.window.session.journal.person.journal_id
        assert len(store.steps()) == 1

    said = []

    def hands_over_again(dialog):
        person.answers(lambda box: (said.append(box.text()), box.reject()))
        dialog.accept()

    chooses(person, hands_over_again, MENU)
    assert "cannot be opened or made here" in said[0]


def test_notes_name_and_mark_go_only_when_they_are_chosen(four_weeks, monkeypatch):
    person = four_weeks
    target = person.folder / "whole.dayfence"
    answers = iter(["", str(target)])
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_: (next(answers), ""))

    def chooses_all(dialog):
        for box in (dialog.notes, dialog.person, dialog.keeps_id):
            box.setChecked(True)
        assert dialog.goes.toPlainText().splitlines()[-1] == "1 note about days"
        dialog.measures.item(0).setCheckState(Qt.CheckState.Unchecked)
        assert not dialog.write.isEnabled()
        dialog.measures.item(0).setCheckState(Qt.CheckState.Checked)
        QTest.mouseClick(dialog.write, Qt.MouseButton.LeftButton)

    chooses(person, chooses_all, MENU)
    assert not target.exists()
    chooses(person, chooses_all, MENU)
    with Store.open(target) as store:
        journal = store.read()
        assert journal.person == person.window.session.journal.person
        assert len(journal.entries[1]) == 28
        assert journal.note(date(2031, 3, 30)) or journal.notes
    chooses(person, lambda dialog: dialog.reject(), MENU)
