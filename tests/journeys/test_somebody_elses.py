"""Somebody else's journal is read as data into a new one; a hostile one is refused in words."""

import sqlite3

import pytest
from PySide6.QtGui import QAction
from PySide6.QtWidgets import QFileDialog

from desktop.storage.store import Store
from tests.journeys.test_erase import chooses
from tests.journeys.test_first_four_weeks import starts_a_log, types_four_weeks

MENU = "Open somebody &else's journal…"


@pytest.fixture
def theirs(person, monkeypatch):
    """A journal that came by mail, and answers to which file and where to."""
    person.starts_the_program()
    starts_a_log(person)
    types_four_weeks(person)
    person.quits()
    path = person.folder / "theirs.dayfence"
    person.window.own_journal.rename(path)
    monkeypatch.setattr(QFileDialog, "getOpenFileName", lambda *_: (str(path), ""))
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_: (str(person.folder / "mine.dayfence"), ""))
    for copy in (person.folder / "journal copies").iterdir():
        copy.unlink()
    person.starts_the_program()
    return path


def opens(person):
    next(one for one in person.window.findChildren(QAction) if one.text() == MENU).trigger()


def test_its_values_are_in_a_new_journal(person, theirs, monkeypatch):
    before = theirs.read_bytes()
    opens(person)
    assert person.window.session.path == person.folder / "mine.dayfence"
    assert len(person.window.session.journal.entries[1]) == 28
    assert theirs.read_bytes() == before
    person.quits()
    with Store.open(person.folder / "mine.dayfence") as store:
        store.verify()
        assert len(store.steps()) == 1


def test_one_with_a_trap_is_refused_in_words(person, theirs):
    connection = sqlite3.connect(theirs)
    connection.execute("CREATE TRIGGER trap AFTER INSERT ON note BEGIN DELETE FROM entry; END")
    connection.close()
    said = []
    chooses(person, lambda box: (said.append(box.text()), box.reject()), MENU)
    assert said[0].startswith("theirs.dayfence was not read: it is damaged, or holds something")
    assert person.window.session is None


def test_another_file_and_thinking_better_of_it(person, theirs, monkeypatch):
    theirs.write_bytes(b"day,minutes\n" * 100)
    said = []
    chooses(person, lambda box: (said.append(box.text()), box.reject()), MENU)
    assert "is not a journal of this program" in said[0]
    monkeypatch.setattr(QFileDialog, "getOpenFileName", lambda *_: ("", ""))
    opens(person)
    assert person.window.session is None


def test_no_place_for_it(person, theirs, monkeypatch):
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_: ("", ""))
    opens(person)
    assert person.window.session is None
