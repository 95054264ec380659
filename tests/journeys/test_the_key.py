"""What the marks mean: under the chart, by F1 on it, by the menu."""

from PySide6.QtCore import Qt
from PySide6.QtGui import QAction
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QLabel, QTableWidget

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


def test_the_keys_are_a_table_with_every_shortcut_of_the_menus(person):
    window = person.starts_the_program()
    rows = []

    def looks(dialog):
        table = dialog.findChild(QTableWidget)
        for row in range(table.rowCount()):
            rows.append(tuple(table.item(row, place).text() for place in (0, 1) if table.item(row, place)))
            assert table.columnSpan(row, 0) == (2 if len(rows[-1]) == 1 else 1)
        dialog.reject()

    person.answers(looks)
    chooses(person, "Help", "Keys")
    groups = [row[0] for row in rows if len(row) == 1]
    assert len(groups) >= 4
    assert ("Enter", "Keep it and go to the next day") in rows
    assert len(rows) - len(groups) >= 20
    told = " ".join(row[0] for row in rows if len(row) == 2)
    standard = {"Ctrl+N", "Ctrl+O", "Ctrl+Q"}
    for action in window.findChildren(QAction):
        shortcut = action.shortcut().toString()
        if shortcut and shortcut not in standard and shortcut not in ("Ctrl+2", "Ctrl+3"):
            assert shortcut in told, action.text()


def test_cut_months_are_said_under_the_chart(person):
    window = person.starts_the_program()
    starts_a_log(person)
    types_four_weeks(person)
    pane = window.workspace.chart_pane
    assert not pane.left_out.isVisible()
    window.choose_period("week")
    person.qtbot.waitUntil(lambda: pane.periods.currentText() == "one mark a week")
    assert not pane.left_out.isVisible()
    window.choose_period("month")
    person.qtbot.waitUntil(pane.left_out.isVisible)
    assert pane.left_out.text() == "Not counted, since it is not whole: March 2031."
