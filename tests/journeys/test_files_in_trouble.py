"""A file that is damaged, gone, open elsewhere, newer, or left by a program that was cut short."""

import sqlite3
from datetime import timedelta

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QDialogButtonBox, QMessageBox

from desktop.screens.opening import DamageDialog
from desktop.storage.alone import Alone
from desktop.storage.backups import copies_folder
from desktop.storage.store import Store
from tests.journeys.test_first_four_weeks import AFTER, BEFORE, FIRST, starts_a_log, types_four_weeks


@pytest.fixture
def four_weeks(person):
    """Four weeks typed, a copy taken at the end of them, two more values after it; the window is closed."""
    person.starts_the_program()
    starts_a_log(person)
    types_four_weeks(person)
    person.quits()
    person.now += timedelta(days=1)
    person.starts_the_program()
    person.types("12⏎")
    person.goes_to(FIRST)
    person.types("21⏎")
    person.quits()
    return person


def journal_of(person):
    return person.folder / "journal.dayfence"


def values(person):
    by_day = person.window.session.journal.entries[1]
    return [by_day[day].value for day in sorted(by_day)]


ALL = [21, *(BEFORE + AFTER)[1:], 12]


def harms(path):
    """Destroy one page of the middle."""
    contents = bytearray(path.read_bytes())
    pages = len(contents) // 4096
    start = (pages // 2) * 4096
    contents[start : start + 4096] = bytes(4096)
    path.write_bytes(contents)
    return bytes(contents)


def alters_a_value(path):
    """Change a value as no quick check could notice."""
    connection = sqlite3.connect(path)
    connection.execute("UPDATE entry SET value = 555 WHERE day = ?", (FIRST.isoformat(),))
    connection.commit()
    connection.close()


def clicks(button):
    QTest.mouseClick(button, Qt.MouseButton.LeftButton)


def is_read(person, dialog):
    assert isinstance(dialog, DamageDialog)
    person.qtbot.waitUntil(lambda: "can be read" in dialog.readable.text() and dialog.build.isEnabled())


def asides(person):
    return sorted(path for path in person.folder.iterdir() if " damaged " in path.name)


def test_a_destroyed_page_is_told_and_everything_is_won_back(four_weeks):
    person = four_weeks
    harmed = harms(journal_of(person))

    def builds(dialog):
        is_read(person, dialog)
        assert dialog.says.text() == "journal.dayfence is damaged. It was not changed."
        assert "values can be read" in dialog.readable.text()
        assert dialog.copied.text().startswith("The newest good copy is of 30 March 2031, ")
        assert journal_of(person).read_bytes() == harmed
        clicks(dialog.build)

    person.answers(builds)
    person.starts_the_program()
    assert values(person) == ALL
    (aside,) = asides(person)
    assert aside.read_bytes() == harmed
    person.goes_to(FIRST)
    person.types("33⏎")
    person.quits()
    with Store.open(journal_of(person)) as store:
        store.verify()


def test_a_value_altered_outside_is_noticed_after_the_window_is_there(four_weeks):
    person = four_weeks
    alters_a_value(journal_of(person))

    def builds(dialog):
        is_read(person, dialog)
        assert dialog.readable.text() == "All 29 values can be read with certainty."
        clicks(dialog.build)

    person.answers(builds)
    person.starts_the_program()
    person.qtbot.waitUntil(lambda: bool(asides(person)) and person.window.session is not None)
    assert values(person) == ALL


def test_the_newest_copy_may_be_opened_instead(four_weeks):
    person = four_weeks
    harms(journal_of(person))

    def opens_the_copy(dialog):
        is_read(person, dialog)
        assert "It lacks 2 things of this" in dialog.copied.text()
        assert dialog.copy.text().startswith("Open the copy of 30 March 2031, ")
        clicks(dialog.copy)

    person.answers(opens_the_copy)
    person.starts_the_program()
    assert values(person) == BEFORE + AFTER
    assert len(asides(person)) == 1


def test_it_may_be_left_as_it_is(four_weeks):
    person = four_weeks
    harmed = harms(journal_of(person))
    person.answers(lambda dialog: clicks(dialog.leave))
    window = person.starts_the_program()
    assert window.session is None
    assert window.start_screen.isVisible()
    assert journal_of(person).read_bytes() == harmed
    assert asides(person) == []


def test_rubbish_without_a_copy_is_said_to_be_nothing(four_weeks):
    person = four_weeks
    for copy in copies_folder(journal_of(person)).iterdir():
        copy.unlink()
    contents = journal_of(person).read_bytes()
    journal_of(person).write_bytes(contents[:100] + bytes(len(contents) - 100))

    def reads(dialog):
        person.qtbot.waitUntil(lambda: dialog.readable.text().startswith("Nothing of it can be read"))
        assert not dialog.build.isEnabled()
        assert not dialog.copy.isVisible()
        dialog.reject()

    person.answers(reads)
    assert person.starts_the_program().session is None


def test_the_new_file_that_cannot_be_made_is_said(four_weeks, monkeypatch):
    person = four_weeks
    harmed = harms(journal_of(person))
    refused = []

    def no_room(*_):
        raise OSError(28, "No space left on device")

    def builds(dialog):
        is_read(person, dialog)
        monkeypatch.setattr("desktop.storage.new_files.os.link", no_room)
        monkeypatch.setattr("desktop.storage.new_files.Path.rename", no_room)
        person.answers(lambda box: (refused.append(box.text()), box.reject()))
        clicks(dialog.build)

    person.answers(builds)
    assert person.starts_the_program().session is None
    assert refused[0].startswith("Not saved: the disk is full.")
    assert journal_of(person).read_bytes() == harmed


def test_a_journal_that_is_gone_is_offered_from_its_copy(four_weeks):
    person = four_weeks
    journal_of(person).unlink()

    def says_yes(box):
        assert "There is a copy of it, taken 30 March 2031, " in box.text()
        clicks(box.button(QMessageBox.StandardButton.Yes))

    person.answers(says_yes)
    person.starts_the_program()
    assert values(person) == BEFORE + AFTER
    person.quits()
    journal_of(person).unlink()
    person.answers(lambda box: clicks(box.button(QMessageBox.StandardButton.No)))
    assert person.starts_the_program().session is None
    assert not journal_of(person).exists()


def test_one_that_never_was_is_only_said(person):
    person.starts_the_program()
    said = []
    person.answers(lambda box: (said.append(box.text()), box.reject()))
    assert not person.window.open_journal(person.folder / "none.dayfence")
    assert said[0].startswith("There is no file ")


def test_a_journal_open_elsewhere_is_opened_to_read(four_weeks):
    person = four_weeks
    held = Alone.hold(journal_of(person))

    def reads(box):
        assert "is open already in another window" in box.text()
        assert box.buttons()[0].text() == "Open it to read"
        clicks(box.buttons()[0])

    person.answers(reads)
    window = person.starts_the_program()
    assert values(person) == ALL
    assert window.session.read_only
    assert person.status == "You can read everything, but nothing can be changed in this place."
    person.goes_to(FIRST)
    QTest.keyClicks(person.days, "9")
    assert values(person) == ALL
    person.quits()
    person.answers(lambda box: clicks(box.button(QMessageBox.StandardButton.Cancel)))
    assert person.starts_the_program().session is None
    held.release()


def test_a_session_that_was_cut_short_is_mentioned_quietly(four_weeks):
    person = four_weeks
    lock = person.folder / ".journal.dayfence.lock"
    lock.touch()
    window = person.starts_the_program()
    assert window.workspace.status.said.text() == (
        "The last session ended abruptly. Everything saved before is here: 29 values, the last of 31 March 2031."
    )
    person.quits()
    assert not lock.exists()
    person.starts_the_program()
    assert window.workspace.status.said.text() != person.window.workspace.status.said.text()


def test_a_newer_file_is_left_alone(four_weeks):
    person = four_weeks
    connection = sqlite3.connect(journal_of(person))
    connection.execute("PRAGMA user_version = 99")
    connection.close()
    before = journal_of(person).read_bytes()
    said = []
    person.answers(lambda box: (said.append(box.text()), box.reject()))
    assert person.starts_the_program().session is None
    assert "made by a newer version" in said[0]
    assert journal_of(person).read_bytes() == before


def test_damage_waits_for_another_question_to_be_answered(four_weeks):
    person = four_weeks
    person.starts_the_program()
    person.qtbot.waitUntil(lambda: len(list(copies_folder(journal_of(person)).iterdir())) >= 1)
    person.window.keeping._worker.wait()
    alters_a_value(journal_of(person))
    seen = []

    def stands_in_the_way(dialog):
        person.window.keeping.begin()
        person.window.keeping._worker.wait()
        QApplication.processEvents()
        seen.append(type(dialog).__name__)
        person.answers(lambda damage: (seen.append(type(damage).__name__), damage.reject()))
        clicks(dialog.findChild(QDialogButtonBox).button(QDialogButtonBox.StandardButton.Cancel))

    person.answers(stands_in_the_way)
    person.holds_control_and_presses(Qt.Key.Key_M)
    person.qtbot.waitUntil(lambda: person.window.session is None)
    assert seen == ["ChangeDialog", "DamageDialog"]
