"""Ordinary upkeep at the window: settings, columns, kinds of day, named days, empty days, what was agreed."""

from datetime import date, timedelta

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QDialogButtonBox, QMessageBox

from desktop.page.content import content_of
from desktop.screens.page_dialog import subjects_of
from tests.journeys.test_first_four_weeks import AFTER, BEFORE, CHANGE, FIRST, marks_the_change, starts_a_log

WEIGHT = 4
"""Its row among the ready-made measures."""


def menu_action(window, *texts):
    """The action under these texts of the menu bar, without its mark of a key."""
    found = window.menuBar().actions()
    for text in texts[:-1]:
        menu = next(one for one in found if one.text().replace("&", "") == text).menu()
        menu.aboutToShow.emit()
        found = menu.actions()
    return next(one for one in found if one.text().replace("&", "").partition("\t")[0] == texts[-1])


def chooses(person, *texts):
    person._is_at_the_window()
    menu_action(person.window, *texts).trigger()


def presses_ok(dialog):
    dialog.findChild(QDialogButtonBox).button(QDialogButtonBox.StandardButton.Ok).click()


def types_days(person, values, first=FIRST):
    person.goes_to(first)
    person.types("".join(f"{value}⏎" for value in values))


def test_kinds_of_day_are_said_by_key_and_by_menu_and_shown_in_words(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.presses(Qt.Key.Key_R)
    for text in ("Ill", "Away or paused", "Not known"):
        chooses(person, "Log", "The chosen days were", text)
        person.presses(Qt.Key.Key_Down)
    days = person.days.days
    assert [days.index(days.row(FIRST) + at, 0).data() for at in range(4)] == ["rest", "ill", "away", "blank"]


def test_a_change_is_marked_with_what_was_agreed_and_an_early_look_says_so(person):
    person.starts_the_program()
    starts_a_log(person)
    types_days(person, BEFORE)

    def fill(dialog):
        QTest.keyClicks(dialog.label, "off the bus one stop early")
        dialog.why.setCurrentIndex(2)
        QTest.keyClicks(dialog.worth, "10")
        QTest.keyClick(dialog.look, Qt.Key.Key_Space)
        presses_ok(dialog)

    person.answers(fill)
    person.holds_control_and_presses(Qt.Key.Key_M)
    person.types("".join(f"{value}⏎" for value in AFTER))
    journal = person.window.session.journal
    assert journal.changes[1].why == "planned"
    assert (journal.measures[1].worth, journal.measures[1].look_day) == (10.0, CHANGE + timedelta(28))
    assert "You agreed to judge in 15 days. This is an early look" in person.findings
    assert "the 10 minutes you said is worth it" in person.findings
    # One act: taking back the marked change takes back what was agreed with it.
    for _ in range(len(AFTER) + 1):
        person.holds_control_and_presses(Qt.Key.Key_Z)
    assert not journal.changes
    assert journal.measures[1].worth is None


def test_a_size_worth_it_that_is_no_number_is_asked_for_again(person):
    person.starts_the_program()
    starts_a_log(person)
    said = []

    def fill(dialog):
        QTest.keyClicks(dialog.worth, "lots")
        presses_ok(dialog)
        said.append(dialog._problem.text())
        dialog.reject()

    person.answers(fill)
    person.holds_control_and_presses(Qt.Key.Key_M)
    assert said == ["The size worth it is a number, such as 10; or leave it empty."]
    assert not person.window.session.journal.changes


def test_the_settings_of_a_measure_are_changed_and_taken_back(person):
    person.starts_the_program()
    starts_a_log(person)
    types_days(person, BEFORE)

    def fill(dialog):
        dialog.title.setText("Walking")
        dialog.aim.setCurrentIndex(2)
        QTest.keyClicks(dialog.goal_low, "40")
        QTest.keyClicks(dialog.goal_high, "20")
        presses_ok(dialog)

    person.answers(fill)
    person.holds_control_and_presses(Qt.Key.Key_E)
    measure = person.window.session.journal.measures[1]
    assert (measure.title, measure.aim, measure.goal_low, measure.goal_high) == ("Walking", "range", 20.0, 40.0)
    assert person.window.workspace._title.text() == "Walking"
    person.holds_control_and_presses(Qt.Key.Key_Z)
    assert person.window.session.journal.measures[1].title == "Exercise"


@pytest.mark.parametrize(
    ("box", "text", "said"),
    [
        ("title", "", "Give the measure a name, such as Walking."),
        ("worth", "some", "“some” is not a number. Type a number such as 30, or leave it empty."),
    ],
)
def test_settings_that_cannot_be_read_say_what_is_missing(person, box, text, said):
    person.starts_the_program()
    starts_a_log(person)
    problems = []

    def fill(dialog):
        getattr(dialog, box).setText(text)
        presses_ok(dialog)
        problems.append(dialog._problem.text())
        dialog.reject()

    person.answers(fill)
    person.holds_control_and_presses(Qt.Key.Key_E)
    assert problems == [said]


@pytest.mark.parametrize(
    ("answer", "value", "unit"),
    [("Turn them into lb", 176.36981, "lb"), ("Keep the numbers", 80.0, "lb"), ("Go back", 80.0, "kg")],
)
def test_another_unit_asks_what_becomes_of_the_numbers(person, answer, value, unit):
    person.starts_the_program()
    starts_a_log(person, WEIGHT)
    types_days(person, [80, 79.5])

    def press(box):
        assert isinstance(box, QMessageBox)
        assert "2 values are written down in kg." in box.text()
        next(one for one in box.buttons() if one.text().replace("&", "") == answer).click()

    def fill(dialog):
        dialog.unit.setText("lb")
        person.answers(press)
        presses_ok(dialog)
        if dialog.isVisible():
            dialog.reject()

    person.answers(fill)
    person.holds_control_and_presses(Qt.Key.Key_E)
    journal = person.window.session.journal
    assert (journal.measures[1].unit, journal.entry(1, FIRST).value) == (unit, value)


def test_columns_are_moved_put_away_brought_back_and_removed(person):
    window = person.starts_the_program()
    starts_a_log(person, 1)
    titles = lambda: [measure.title for measure in window.session.journal.columns()]  # noqa: E731
    assert titles() == ["Upper pressure", "Lower pressure"]
    chooses(person, "Log", "Move the column right")
    assert titles() == ["Lower pressure", "Upper pressure"]
    chooses(person, "Log", "Put this measure away")
    assert titles() == ["Lower pressure"]
    chooses(person, "Log", "Measures put away", "Bring back Upper pressure")
    assert titles() == ["Lower pressure", "Upper pressure"]
    assert window.session.current.title == "Upper pressure"
    person.answers(lambda box: box.reject())
    chooses(person, "Log", "Remove this measure…")
    assert len(titles()) == 2
    person.answers(lambda box: next(one for one in box.buttons() if one.text() == "Remove").click())
    chooses(person, "Log", "Remove this measure…")
    assert titles() == ["Lower pressure"]
    person.holds_control_and_presses(Qt.Key.Key_Z)
    assert titles() == ["Lower pressure", "Upper pressure"]


def test_chosen_days_are_named_and_the_name_is_taken_away(person):
    window = person.starts_the_program()
    starts_a_log(person)
    types_days(person, BEFORE)
    person.goes_to(FIRST + timedelta(2))
    QTest.keyClick(person.days, Qt.Key.Key_Down, Qt.KeyboardModifier.ShiftModifier)

    def fill(dialog):
        QTest.keyClicks(dialog.label, "a cold")
        presses_ok(dialog)

    person.answers(fill)
    chooses(person, "Log", "Name days…")
    (span,) = window.session.journal.spans.values()
    assert (span.first, span.last, span.kind) == (FIRST + timedelta(2), FIRST + timedelta(3), "ill")
    assert window.session.review.stretches[0].observations == len(BEFORE) - 2
    chooses(person, "Log", "Days with a name", "5 March 2031 to 6 March 2031: a cold", "Take the name away")
    assert not window.session.journal.spans
    assert window.session.review.stretches[0].observations == len(BEFORE)


@pytest.mark.parametrize(("button", "observations"), [("none", 8), ("unknown", 4)])
def test_empty_days_are_asked_about_once(person, button, observations):
    window = person.starts_the_program()
    starts_a_log(person)
    types_days(person, [20, 30])
    types_days(person, [25, 22], FIRST + timedelta(6))
    bar = window.workspace.gap
    person.qtbot.waitUntil(bar.isVisible)
    assert "Nothing is written down from Wed 5 Mar to Sat 8 Mar, 4 days." in bar._words.text()
    QTest.mouseClick(getattr(bar, button), Qt.MouseButton.LeftButton)
    person.qtbot.waitUntil(lambda: not bar.isVisible())
    assert window.session.review.stretches[0].observations == observations


def test_the_other_mouse_button_offers_what_can_be_done_with_days(person):
    person.starts_the_program()
    starts_a_log(person)
    offered = [action.text().replace("&", "") for action in person.days.offered]
    assert offered == [
        "Mark a change…",
        "Name days…",
        "Set the day aside, or put it back…",
        "The chosen days were",
    ]
    assert QApplication.activePopupWidget() is None
    assert date(2031, 3, 30) == person.window.session.today


def test_other_choices_of_days_are_told_a_moment_after_the_answer(person):
    window = person.starts_the_program()
    starts_a_log(person)
    types_days(person, BEFORE)
    person.answers(lambda dialog: (QTest.keyClicks(dialog.label, "stairs"), presses_ok(dialog)))
    person.holds_control_and_presses(Qt.Key.Key_M)
    person.types("".join(f"{value}⏎" for value in AFTER))
    person.qtbot.waitUntil(lambda: "Would another choice of days change it?" in person.findings)
    assert "other choices." in person.findings
    # A new value makes the old ones no longer true.
    person.goes_to(FIRST)
    person.types("22⏎")
    assert "Would another choice" not in window.workspace.findings.text


def test_a_change_is_marked_in_the_table_in_words_and_goes_when_it_is_taken_back(person):
    person.starts_the_program()
    starts_a_log(person)
    types_days(person, BEFORE)
    person.goes_to(CHANGE)
    marks_the_change(person, "off the bus one stop early")
    days = person.days.days
    row = days.row(CHANGE)
    said = "change: off the bus one stop early"
    tip, spoken = Qt.ItemDataRole.ToolTipRole, Qt.ItemDataRole.AccessibleTextRole
    assert days.index(row, 1).data() == said
    assert days.index(row, 1).data(Qt.ItemDataRole.EditRole) == ""
    for told in (
        days.index(row, 0).data(tip),
        days.index(row, 0).data(spoken),
        days.headerData(row, Qt.Orientation.Vertical, tip),
        days.headerData(row, Qt.Orientation.Vertical, spoken),
    ):
        assert told.endswith(said)
    assert days.headerData(row, Qt.Orientation.Vertical, Qt.ItemDataRole.FontRole).bold()
    assert days.index(row - 1, 1).data() == ""
    person.holds_control_and_presses(Qt.Key.Key_Z)
    assert days.index(row, 1).data() == ""
    assert days.index(row, 0).data(tip) is None


def test_a_plan_of_days_a_week_is_told_beside_the_answer_and_taken_back(person):
    window = person.starts_the_program()
    starts_a_log(person)
    types_days(person, [*BEFORE, *AFTER])
    person.goes_to(FIRST)

    def fill(dialog):
        dialog.times.setValue(7)
        dialog.spare.setValue(0)
        presses_ok(dialog)

    person.answers(fill)
    chooses(person, "Log", "A plan of days a week…")
    assert "Your plan\n7 days a week: kept in 1 of 3 whole weeks." in window.workspace.findings.text
    assert window._menus._undo.text() == "&Undo: the plan of days a week"
    content = content_of(window.session.journal, subjects_of(window.session), window.session.today)
    assert content.plan == "7 days a week: kept in 1 of 3 whole weeks."

    def end(dialog):
        assert (dialog.times.value(), dialog.spare.value()) == (7, 0)
        dialog.times.setValue(0)
        presses_ok(dialog)

    person.answers(end)
    chooses(person, "Log", "A plan of days a week…")
    assert "Your plan" not in window.workspace.findings.text
    window.session.undo()
    window.session.undo()
    assert "Your plan" not in window.workspace.findings.text
    assert window.session.journal.plans == {}


def test_why_a_pair_is_not_named_at_first_is_said_beside_the_name(person):
    person.starts_the_program()
    seen = []

    def looks(dialog):
        for row in range(dialog.choices.count()):
            dialog.choices.setCurrentRow(row)
            seen.append((dialog.title.isEnabled(), dialog.why_fixed.isVisible(), dialog.why_fixed.text()))
            assert dialog.title.accessibleDescription() == dialog.why_fixed.text()
        dialog.reject()

    person.answers(looks)
    QTest.keyClick(person.window.start_screen.start, Qt.Key.Key_Space)
    said = (
        "These are 2 measures: Upper pressure and Lower pressure. "
        "To give one another name, use Log, Settings of this measure, later."
    )
    assert seen.count((False, True, said)) == 1
    assert seen.count((True, False, "")) == len(seen) - 1
