"""A value that cannot be written: what is said, what is offered, and that nothing on screen is lost."""

from datetime import date, timedelta

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QFileDialog, QPushButton

from desktop.errors import StorageError
from desktop.storage.store import Store
from tests.journeys.test_first_four_weeks import FIRST, starts_a_log


@pytest.fixture
def typing(person):
    """One value typed and saved."""
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("30⏎")
    person.window.session.wait_until_written()
    return person


def button(person, text):
    found = [one for one in person.window.workspace.status.findChildren(QPushButton) if one.text() == text]
    assert found[0].isVisible()
    return found[0]


def is_told(person, words):
    person.qtbot.waitUntil(lambda: person.status.startswith(words))


def values_in(path):
    with Store.open(path) as store:
        store.verify()
        by_day = store.read().entries[1]
        return [by_day[key].value for key in sorted(by_day)]


def keeps_it_elsewhere(person, monkeypatch):
    target = person.folder / "elsewhere.dayfence"
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_: (str(target), ""))
    QTest.mouseClick(button(person, "Keep it in another file…"), Qt.MouseButton.LeftButton)
    assert person.window.session.path == target
    assert person.window.workspace.status.said.text() == f"A copy is in {target}."
    person.types("12⏎")
    person.quits()
    return target


def test_a_full_disk_then_room_again(typing, monkeypatch):
    with monkeypatch.context() as patch:
        patch.setattr(typing.window.session._store, "write", refusing("disk full"))
        typing.types("45⏎")
        is_told(typing, "Not saved: the disk is full.")
        assert typing.days.model().index(typing.days.days.row(FIRST + timedelta(1)), 0).data() == "45"
    QTest.mouseClick(button(typing, "Try again"), Qt.MouseButton.LeftButton)
    is_told(typing, "Saved")
    typing.quits()
    assert values_in(typing.window.own_journal) == [30, 45]


def refusing(reason):
    def write(*_):
        raise StorageError(reason)

    return write


def test_a_full_disk_and_another_place(typing, monkeypatch):
    monkeypatch.setattr(typing.window.session._store, "write", refusing("disk full"))
    typing.types("45⏎")
    is_told(typing, "Not saved: the disk is full.")
    assert values_in(keeps_it_elsewhere(typing, monkeypatch)) == [30, 45, 12]


def test_a_file_taken_away_while_it_is_open(typing, monkeypatch):
    typing.window.own_journal.rename(typing.folder / "moved.dayfence")
    typing.types("45⏎")
    is_told(typing, "Not saved: the file was moved or exchanged while it was open.")
    assert values_in(keeps_it_elsewhere(typing, monkeypatch)) == [30, 45, 12]
    assert values_in(typing.folder / "moved.dayfence") == [30]


def test_an_older_copy_written_over_the_open_file(typing, monkeypatch):
    older = typing.window.own_journal.read_bytes()
    typing.types("45⏎")
    typing.window.session.wait_until_written()
    with typing.window.own_journal.open("r+b") as file:
        file.write(older)
        file.truncate()
    typing.types("50⏎")
    is_told(typing, "Not saved: another copy has taken this file's place")
    assert values_in(keeps_it_elsewhere(typing, monkeypatch)) == [30, 45, 50, 12]
    assert values_in(typing.window.own_journal) == [30]


def test_going_back_to_what_is_saved(typing, monkeypatch):
    with monkeypatch.context() as patch:
        patch.setattr(typing.window.session._store, "write", refusing("disk error"))
        typing.types("45⏎")
        is_told(typing, "Not saved: the disk did not take it.")
    QTest.mouseClick(button(typing, "Go back to what is saved"), Qt.MouseButton.LeftButton)
    assert list(typing.window.session.journal.entries[1]) == [(FIRST, "")]


def test_a_place_to_read_only_is_left_for_another(typing, monkeypatch):
    typing.quits()
    with monkeypatch.context() as patch:
        patch.setattr("os.access", lambda *_: False)
        typing.starts_the_program()
    assert typing.window.session.read_only
    typing.goes_to(FIRST + timedelta(1))
    assert values_in(keeps_it_elsewhere(typing, monkeypatch)) == [30, 12]


def test_another_place_that_cannot_be_written_or_is_not_wanted(typing, monkeypatch):
    monkeypatch.setattr(typing.window.session._store, "write", refusing("disk full"))
    typing.types("45⏎")
    is_told(typing, "Not saved")
    target = typing.folder / "there.dayfence"
    target.write_bytes(b"mine")
    answers = iter(["", str(target)])
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_: (next(answers), ""))
    elsewhere = button(typing, "Keep it in another file…")
    QTest.mouseClick(elsewhere, Qt.MouseButton.LeftButton)
    said = []
    typing.answers(lambda box: (said.append(box.text()), box.reject()))
    QTest.mouseClick(elsewhere, Qt.MouseButton.LeftButton)
    assert "cannot be opened or made here" in said[0]
    assert target.read_bytes() == b"mine"
    assert typing.window.session.trouble is not None
    QTest.mouseClick(button(typing, "Go back to what is saved"), Qt.MouseButton.LeftButton)


def test_a_clock_that_went_back_is_mentioned(typing):
    typing.quits()
    typing.now -= timedelta(days=2)
    typing.starts_the_program()
    assert typing.window.workspace.status.said.text().startswith("This computer's date, 28 March 2031, is before")
    assert typing.window.session.journal.entry(1, FIRST).value == 30


def test_midnight_brings_a_new_today_but_not_under_a_hand_that_types(typing):
    typing.window.go_to_today()
    typing.types("4")
    typing.now += timedelta(hours=5)
    typing.window._look_at_calendar()
    assert typing.days.days.day(typing.days.days.rowCount() - 1) == date(2031, 3, 30)
    typing.types("0⏎")
    typing.window._look_at_calendar()
    assert typing.days.days.day(typing.days.days.rowCount() - 1) == date(2031, 3, 31)
    assert typing.window.session.journal.entry(1, date(2031, 3, 30)).value == 40
