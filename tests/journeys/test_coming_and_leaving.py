"""Leaving a preview, and opening what cannot be opened: what was there stays as it was."""

from datetime import date

import pytest
from PySide6.QtWidgets import QDialogButtonBox, QFileDialog, QLabel, QMessageBox, QPlainTextEdit

from desktop.wording.bring_in import NOTHING_TO_BRING_IN
from tests.journeys.test_first_four_weeks import FIRST, starts_a_log


def presses(button):
    return lambda dialog: dialog.findChild(QDialogButtonBox).button(button).click()


@pytest.fixture
def table(tmp_path):
    path = tmp_path / "old.csv"
    path.write_text("day,steps\n1880-05-01,3\n2031-03-04,5\n2031-03-05,7\n")
    return path


def test_leaving_the_preview_leaves_no_journal_behind(person, table):
    window = person.starts_the_program()
    person.answers(presses(QDialogButtonBox.StandardButton.Cancel))
    window.bring_in_file(table)
    assert not window.own_journal.exists()
    assert window.session is None
    assert window.start_screen.isVisible()
    person.answers(presses(QDialogButtonBox.StandardButton.Ok))
    window.bring_in_file(table)
    assert window.own_journal.exists()
    assert len(window.session.journal.entries[1]) == 2


def test_years_no_journal_holds_are_set_aside_in_the_preview(person, table):
    window = person.starts_the_program()
    seen = []

    def looks(dialog):
        seen.append(dialog.findChild(QPlainTextEdit).toPlainText())
        presses(QDialogButtonBox.StandardButton.Ok)(dialog)

    person.answers(looks)
    window.bring_in_file(table)
    assert seen == ["line 2: a journal begins with the year 1900, and its day is earlier: 1880-05-01"]
    assert min(window.session.journal.entries[1])[0] == date(2031, 3, 4)


def test_a_table_of_which_nothing_can_be_kept_makes_no_journal(person, table):
    table.write_text("year,flow\n1871,1120\n1872,1160\n1873,963\n")
    window = person.starts_the_program()

    def looks(dialog):
        presses(QDialogButtonBox.StandardButton.Ok)(dialog)
        assert NOTHING_TO_BRING_IN in [label.text() for label in dialog.findChildren(QLabel)]
        dialog.reject()

    person.answers(looks)
    window.bring_in_file(table)
    assert not window.own_journal.exists()


def opens(person, monkeypatch, path):
    monkeypatch.setattr(QFileDialog, "getOpenFileName", lambda *_: (str(path), ""))
    said = []

    def reads(box):
        said.append(box.text())
        box.button(QMessageBox.StandardButton.Ok).click()

    person.answers(reads)
    person.window.open_file()
    return said


def test_a_file_that_cannot_be_opened_leaves_the_open_journal_open(person, table, monkeypatch):
    window = person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("30⏎")
    (said,) = opens(person, monkeypatch, table)
    assert "is not a journal" in said
    assert window.workspace.isVisible()
    assert window.session.path == window.own_journal
    person.types("25⏎")
    assert [entry.value for entry in window.session.journal.entries[1].values()] == [30, 25]


def test_a_file_that_cannot_be_opened_leaves_the_start_screen(person, table, monkeypatch):
    window = person.starts_the_program()
    (said,) = opens(person, monkeypatch, table)
    assert "is not a journal" in said
    assert window.start_screen.isVisible()
    assert window.session is None
