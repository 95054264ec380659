"""Small things of an evening at the table: leaving a cell, going on, pasting, taking back."""

from datetime import date, timedelta

from PySide6.QtCore import QEvent, Qt
from PySide6.QtGui import QGuiApplication, QKeyEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QMessageBox

from tests.journeys.test_first_four_weeks import FIRST, starts_a_log


def shown(person, day, column=0):
    return person.days.model().index(person.days.days.row(day), column).data()


def test_escape_leaves_a_cell_as_it_was(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("30⏎")
    person.goes_to(FIRST)
    person.types("99")
    QTest.keyClick(QApplication.focusWidget(), Qt.Key.Key_Escape)
    person.qtbot.waitUntil(lambda: person.days.state() != person.days.State.EditingState)
    assert shown(person, FIRST) == "30"


def test_the_quickest_hand_loses_nothing(person):
    """Every key is there before the first is looked at, as on a slow computer."""
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person._is_at_the_window()
    for key in "12⏎0⏎26⏎21⏎":
        code = Qt.Key.Key_Return if key == "⏎" else Qt.Key(ord(key))
        text = "\r" if key == "⏎" else key
        event = QKeyEvent(QEvent.Type.KeyPress, code, Qt.KeyboardModifier.NoModifier, text)
        QApplication.postEvent(person.window.windowHandle(), event)
    person.qtbot.waitUntil(lambda: shown(person, FIRST + timedelta(3)) == "21")
    assert [shown(person, FIRST + timedelta(place)) for place in range(4)] == ["12", "0", "26", "21"]


def test_tab_goes_to_the_note_and_a_note_is_kept(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.presses(Qt.Key.Key_Tab)
    person.types("rain⏎")
    assert shown(person, FIRST, 1) == "rain"
    assert person.window.session.journal.note(FIRST) == "rain"


def test_delete_makes_a_day_blank_and_undo_brings_it_back(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("30⏎25⏎")
    person.goes_to(FIRST)
    person.presses(Qt.Key.Key_Delete)
    assert person.window.session.journal.entry(1, FIRST) is None
    person.holds_control_and_presses(Qt.Key.Key_Z)
    assert shown(person, FIRST) == "30"


def test_a_column_from_a_spreadsheet_is_pasted_as_one_act(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    QGuiApplication.clipboard().setText("20\n25\n30\n")
    person.holds_control_and_presses(Qt.Key.Key_V)
    assert [shown(person, FIRST + timedelta(place)) for place in range(3)] == ["20", "25", "30"]
    person.holds_control_and_presses(Qt.Key.Key_Z)
    assert shown(person, FIRST) == ""


def test_an_earlier_day_is_reached_by_its_date(person):
    person.starts_the_program()
    starts_a_log(person)

    def types_a_day(dialog):
        from desktop.screens.dialogs import DayBox

        dialog.findChild(DayBox).setDate(date(2030, 12, 24))
        QTest.keyClick(dialog.findChild(DayBox), Qt.Key.Key_Return)

    person.answers(types_a_day)
    person.holds_control_and_presses(Qt.Key.Key_G)
    assert person.days.days.day(person.days.currentIndex().row()) == date(2030, 12, 24)
    person.types("15⏎")
    assert person.window.session.journal.entry(1, date(2030, 12, 24)).kind == "late"


def test_a_letter_does_not_take_a_number_away_and_today_says_where_earlier_days_are(person):
    window = person.starts_the_program()
    starts_a_log(person)
    person.types("30⏎")
    assert "arrow up" in window.workspace.status.said.text()
    person.presses(Qt.Key.Key_A)
    assert window.session.journal.entry(1, window.session.today).value == 30
    assert "Press Delete first" in window.workspace.status.said.text()


def test_what_could_not_be_read_is_asked_about_before_it_is_gone(person):
    window = person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("12x⏎30⏎")
    asked = []

    def answer(button):
        def press(box):
            asked.append(box.text())
            box.button(button).click()

        return press

    person.answers(answer(QMessageBox.StandardButton.No))
    assert not window.close()
    assert asked == ["Not kept, since it is no number: “12x” on Mon 3 Mar. Leave without it?"]
    person.answers(answer(QMessageBox.StandardButton.Yes))
    assert window.close()
