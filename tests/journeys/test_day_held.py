"""Everything a day has held is listed, and any of it put back."""

from datetime import timedelta

from PySide6.QtCore import Qt
from PySide6.QtTest import QTest

from tests.journeys.test_first_four_weeks import FIRST, starts_a_log


def asks(person, act):
    person.answers(act)
    person.holds_control_and_presses(Qt.Key.Key_H)


def lines(person, dialog):
    person.qtbot.waitUntil(lambda: dialog.listed.count() > 0)
    return [dialog.listed.item(row).text() for row in range(dialog.listed.count())]


def test_a_value_typed_over_is_put_back(person):
    person.starts_the_program()
    starts_a_log(person)
    for keys in ("30⏎", "45⏎"):
        person.goes_to(FIRST)
        person.types(keys)
    person.goes_to(FIRST)
    person.presses(Qt.Key.Key_Delete)

    def puts_back(dialog):
        told = lines(person, dialog)
        assert [line.split(",")[0] for line in told] == ["nothing", "45 minutes", "30 minutes"]
        assert dialog.title.text() == "Exercise, Monday 3 March 2031. Newest first."
        assert not dialog.put_back.isEnabled()
        dialog.listed.setCurrentRow(2)
        QTest.mouseClick(dialog.put_back, Qt.MouseButton.LeftButton)

    asks(person, puts_back)
    assert person.window.session.journal.entry(1, FIRST).value == 30
    person.holds_control_and_presses(Qt.Key.Key_Z)
    assert person.window.session.journal.entry(1, FIRST) is None
    person.goes_to(FIRST + timedelta(1))

    def reads(dialog):
        person.qtbot.waitUntil(lambda: dialog.title.text() == "Nothing was ever written down here.")
        dialog.reject()

    asks(person, reads)


def test_the_note_of_a_day_too(person):
    person.starts_the_program()
    starts_a_log(person)
    for words in ("rain⏎", "sun⏎"):
        person.goes_to(FIRST)
        person.presses(Qt.Key.Key_Tab)
        person.types(words)
        person.presses(Qt.Key.Key_Backtab)
    person.goes_to(FIRST)
    person.presses(Qt.Key.Key_Tab)

    def puts_back(dialog):
        assert [line.split(",")[0] for line in lines(person, dialog)] == ["“sun”", "“rain”"]
        dialog.listed.setCurrentRow(1)
        QTest.mouseClick(dialog.put_back, Qt.MouseButton.LeftButton)

    asks(person, puts_back)
    assert person.window.session.journal.note(FIRST) == "rain"
