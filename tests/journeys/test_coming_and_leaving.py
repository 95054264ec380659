"""Leaving a preview, and opening what cannot be opened: what was there stays as it was."""

from datetime import date

import pytest
from PySide6.QtCore import QMimeData, QPoint, QPointF, Qt, QUrl
from PySide6.QtGui import QDragEnterEvent, QDropEvent, QGuiApplication
from PySide6.QtWidgets import QApplication, QDialogButtonBox, QFileDialog, QLabel, QMessageBox, QPlainTextEdit

from desktop.journal.records import Person
from desktop.storage.store import Store
from desktop.wording.bring_in import NOTHING_PASTED, NOTHING_TO_BRING_IN
from tests.journeys.test_first_four_weeks import FIRST, starts_a_log
from tests.journeys.test_upkeep import menu_action


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


def dropped(window, *paths):
    """Drop files onto the window, as another program does; says whether they were taken."""
    data = QMimeData()
    data.setUrls([QUrl.fromLocalFile(str(path)) for path in paths])
    copy, left, free = Qt.DropAction.CopyAction, Qt.MouseButton.LeftButton, Qt.KeyboardModifier.NoModifier
    enter = QDragEnterEvent(QPoint(200, 200), copy, data, left, free)
    enter.ignore()
    QApplication.sendEvent(window, enter)
    if enter.isAccepted():
        QApplication.sendEvent(window, QDropEvent(QPointF(200, 200), copy, data, left, free))
    return enter.isAccepted()


def test_a_table_dropped_onto_the_window_is_brought_in(person, table, qtbot):
    window = person.starts_the_program()
    person.answers(presses(QDialogButtonBox.StandardButton.Ok))
    assert dropped(window, table)
    qtbot.waitUntil(lambda: window.session is not None)
    assert len(window.session.journal.entries[1]) == 2


def test_a_journal_dropped_onto_the_window_is_opened(person, tmp_path, qtbot):
    window = person.starts_the_program()
    other = tmp_path / "other.dayfence"
    Store.create(other, Person("d" * 32)).close()
    assert dropped(window, other)
    qtbot.waitUntil(lambda: window.session is not None)
    assert window.session.path == other


def test_several_files_at_once_or_none_are_left_where_they_are(person, table, tmp_path):
    window = person.starts_the_program()
    assert not dropped(window, table, tmp_path / "other.csv")
    assert not dropped(window)
    assert window.session is None


def test_a_pasted_block_is_brought_in_like_a_file(person):
    window = person.starts_the_program()
    QGuiApplication.clipboard().setText("")
    menu_action(window, "File", "Bring in the pasted block as a table…").trigger()
    assert NOTHING_PASTED in [label.text() for label in window.workspace.status.findChildren(QLabel)]
    assert window.session is None
    QGuiApplication.clipboard().setText("day\tsteps\tmood\n4 March 2031\t5000\t6\n5 March 2031\t7,5\tx\n")
    seen = []

    def looks(dialog):
        seen.append(dialog.findChildren(QLabel)[0].text())
        presses(QDialogButtonBox.StandardButton.Ok)(dialog)

    person.answers(looks)
    menu_action(window, "File", "Bring in the pasted block as a table…").trigger()
    assert "the pasted block" in seen[0]
    journal = window.session.journal
    assert [measure.title for measure in journal.columns()] == ["steps", "mood"]
    assert journal.entry(1, date(2031, 3, 4)).value == 5000
    window.session.undo()
    assert window.session.journal.columns() == []
