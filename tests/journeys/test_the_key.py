"""What the marks mean: under the chart, by F1 on it, by the menu."""

from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QLabel

from desktop.screens.chart_key import KeyWindow
from desktop.wording.chart_key import KEY_TITLE, SIGN_WORDS
from tests.journeys.test_first_four_weeks import starts_a_log, types_four_weeks
from tests.journeys.test_upkeep import chooses


def told_by(seen):
    def look(dialog):
        assert isinstance(dialog, KeyWindow)
        seen.append([label.text() for label in dialog.findChildren(QLabel)])
        dialog.reject()

    return look


def test_the_marks_are_explained_under_the_chart_and_in_a_window(person):
    window = person.starts_the_program()
    starts_a_log(person)
    types_four_weeks(person)
    pane = window.workspace.chart_pane
    person.qtbot.waitUntil(lambda: pane.key.signs[:2] == ["before", "after"])
    assert pane.key.isVisible()
    assert pane.key.accessibleName() == KEY_TITLE
    assert pane.key.accessibleDescription().startswith("before; since the change")
    assert pane.periods.currentText() == "one mark a day"

    seen = []
    person.answers(told_by(seen))
    pane.chart.setFocus()
    QTest.keyClick(pane.chart, Qt.Key.Key_F1)
    person.answers(told_by(seen))
    chooses(person, "Help", KEY_TITLE)
    person.answers(told_by(seen))
    QTest.mouseClick(pane.key, Qt.MouseButton.LeftButton)
    assert len(seen) == 3
    for texts in seen:
        assert texts == [text for pair in SIGN_WORDS.values() for text in pair]
