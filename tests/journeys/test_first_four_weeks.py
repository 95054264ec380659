"""From the first entry to the answer: start a log, type two weeks, mark a change, type two more, come back."""

from datetime import date, datetime, timedelta

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QDialogButtonBox, QLineEdit, QMessageBox

BEFORE = [20, 25, 0, 30, 15, 10, 22, 24, 18, 31, 12, 0, 26, 21]
AFTER = [38, 41, 35, 44, 29, 33, 47, 40, 36, 52, 31, 39, 45, 37]
FIRST = date(2031, 3, 3)
CHANGE = date(2031, 3, 17)


def starts_a_log(person, row=0):
    def choose(dialog):
        dialog.choices.setFocus()
        for _ in range(row):
            QTest.keyClick(dialog.choices, Qt.Key.Key_Down)
        QTest.keyClick(dialog.choices, Qt.Key.Key_Return)

    person.answers(choose)
    QTest.keyClick(person.window.start_screen.start, Qt.Key.Key_Space)


def marks_the_change(person, label):
    def fill(dialog):
        QTest.keyClicks(dialog.label, label)
        QTest.keyClick(dialog.label, Qt.Key.Key_Return)

    person.answers(fill)
    person.holds_control_and_presses(Qt.Key.Key_M)


def types_four_weeks(person):
    person.goes_to(FIRST)
    person.types("".join(f"{value}⏎" for value in BEFORE))
    assert person.days.days.day(person.days.currentIndex().row()) == CHANGE
    marks_the_change(person, "off the bus one stop early")
    person.types("".join(f"{value}⏎" for value in AFTER))


def test_four_weeks_with_a_change_are_answered_and_are_there_tomorrow(person):
    window = person.starts_the_program()
    assert window.start_screen.isVisible()
    starts_a_log(person)
    assert window.workspace.isVisible()
    types_four_weeks(person)

    assert person.findings.startswith("It moved: 38.5 minutes on a middle day, 20.5 before.")
    for part in (
        "As sure as a log can be: 14 days before, 14 after.",
        "The difference is probably between",
        "outside the old fences",
        "by luck alone",
        "cannot tell what caused a difference",
    ):
        assert part in person.findings
    told = window.workspace.chart_pane.chart.accessibleDescription()
    assert "Baseline: 14 days, middle 20.5 minutes" in told
    person.qtbot.waitUntil(lambda: person.status == "Saved at 20:15")
    answer = window.session.review.to_json()
    person.quits()

    person.now = datetime(2031, 3, 31, 7, 30)
    window = person.starts_the_program()
    assert window.workspace.isVisible()
    assert window.session.review.to_json() == answer
    assert person.days.days.day(person.days.currentIndex().row()) == date(2031, 3, 31)

    # Undo survives the restart: the last value goes and comes back.
    person.holds_control_and_presses(Qt.Key.Key_Z)
    assert window.session.journal.entry(1, date(2031, 3, 30)) is None
    person.holds_control_and_presses(Qt.Key.Key_Z, shift=True)
    assert window.session.review.to_json() == answer


def test_blood_pressure_is_two_columns_and_blank_is_never_zero(person):
    person.starts_the_program()
    starts_a_log(person, row=1)
    assert [person.days.days.measure(column).title for column in range(2)] == ["Upper pressure", "Lower pressure"]
    person.goes_to(FIRST)
    person.types("128/79⏎131/82⏎")
    person.goes_to(FIRST + timedelta(4))
    person.types("126/80⏎")
    journal = person.window.session.journal
    assert journal.entry(1, FIRST).value == 128
    assert journal.entry(2, FIRST).value == 79
    points = person.window.session.review.points
    assert points.known.tolist() == [True, True, False, False, True]
    shown = person.days.model().index(person.days.days.row(FIRST + timedelta(2)), 0).data()
    assert shown == "blank"


def test_a_decimal_comma_and_a_time_are_understood(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("1:05⏎7,5⏎0⏎")
    journal = person.window.session.journal
    assert [journal.entry(1, FIRST + timedelta(place)).value for place in range(3)] == [65, 7.5, 0]
    assert journal.entry(1, FIRST + timedelta(2)).original == "0"


def test_rest_ill_and_away_are_one_key_each(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("30⏎")
    for key in (Qt.Key.Key_R, Qt.Key.Key_I, Qt.Key.Key_A):
        person.presses(key)
    person.types("25⏎")
    model = person.days.model()
    first = person.days.days.row(FIRST)
    assert [model.index(first + place, 0).data() for place in range(5)] == ["30", "rest", "ill", "away", "25"]
    points = person.window.session.review.points
    assert points.values[1] == 0
    assert not points.known[2]
    assert not points.known[3]


def test_what_cannot_be_read_stays_in_the_cell_and_is_explained(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("12x⏎")
    assert person.days.model().index(person.days.days.row(FIRST), 0).data() == "12x ?"
    assert "12x" in person.window.workspace.status.said.text()
    assert person.window.session.journal.entry(1, FIRST) is None


def test_a_number_far_off_is_asked_about_and_kept_only_when_right(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    asked = []

    def says_no(box):
        asked.append(box.text())
        QTest.keyClick(box, Qt.Key.Key_Escape)

    person.answers(says_no)
    person.types("1800")
    QTest.keyClick(person.days.viewport().findChild(QLineEdit), Qt.Key.Key_Return)
    person.qtbot.waitUntil(lambda: bool(asked))
    assert asked == ["You typed 1800 minutes for 3 March 2031. Is that right?"]
    assert person.window.session.journal.entry(1, FIRST) is None
    # The editor of before is on its way out; the cell is open anew with what was typed.
    person.qtbot.waitUntil(lambda: QApplication.activeModalWidget() is None)
    person.qtbot.waitUntil(lambda: len(person.days.viewport().findChildren(QLineEdit)) == 1)
    person.qtbot.waitUntil(lambda: person.days.state() == person.days.State.EditingState)
    assert person.days.viewport().findChild(QLineEdit).text() == "1800"
    person.days.viewport().findChild(QLineEdit).selectAll()
    person.types("180⏎")
    assert person.window.session.journal.entry(1, FIRST).value == 180


def test_a_day_is_set_aside_with_a_reason_and_keeps_its_value(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("30⏎25⏎")
    person.goes_to(FIRST)

    def gives_reason(dialog):
        box = dialog.findChild(QLineEdit)
        QTest.keyClicks(box, "watch left at home")
        QTest.keyClick(box, Qt.Key.Key_Return)

    person.answers(gives_reason)
    person.holds_control_and_presses(Qt.Key.Key_D)
    entry = person.window.session.journal.entry(1, FIRST)
    assert (entry.kind, entry.value, entry.note) == ("set aside", 30, "watch left at home")
    person.holds_control_and_presses(Qt.Key.Key_D)
    assert person.window.session.journal.entry(1, FIRST).kind in ("value", "late")


def test_a_table_is_brought_in_after_its_question_and_can_be_taken_back(person, tmp_path):
    table = tmp_path / "sleep.csv"
    rows = [f"{place % 9 + 1:02d}/{place % 5 + 1:02d}/2031,{6 + place % 4}" for place in range(9)]
    table.write_text("day,sleep\n" + "\n".join(dict.fromkeys(rows)) + "\n")
    person.starts_the_program()
    asked = []

    def brings_in(dialog):
        dialog.findChild(QDialogButtonBox).button(QDialogButtonBox.StandardButton.Ok).click()

    def picks_day_first(box):
        assert isinstance(box, QMessageBox)
        asked.append(box.text())
        person.answers(brings_in)
        next(button for button in box.buttons() if button.text() == "Day, month, year").click()

    person.answers(picks_day_first)
    person.window.bring_in_file(table)
    assert len(asked) == 1
    journal = person.window.session.journal
    assert len(journal.entries[1]) == 9
    assert journal.entry(1, date(2031, 1, 1)).value == 6
    person.holds_control_and_presses(Qt.Key.Key_Z)
    assert not journal.measures


def test_without_a_change_the_odd_day_is_named(person):
    person.starts_the_program()
    starts_a_log(person)
    person.goes_to(FIRST)
    person.types("".join(f"{value}⏎" for value in [20, 25, 22, 30, 25, 20, 22, 24, 28, 31, 120, 20, 26, 21]))
    assert "1 day is out of line with the rest." in person.findings
    assert "13 March: 120 minutes, above the upper fence" in person.findings


def test_the_sample_journal_opens_from_the_start_screen(person):
    window = person.starts_the_program()
    QTest.keyClick(window.start_screen.sample, Qt.Key.Key_Space)
    assert [measure.title for measure in window.session.journal.columns()] == [
        "Walking",
        "Sleep",
        "Upper pressure",
        "Lower pressure",
    ]
    assert person.findings.startswith("It moved")


@pytest.mark.parametrize("content", ["not a journal at all", "", "SQLite format 3\x00 and then nothing"])
def test_a_file_that_is_no_journal_is_refused_with_a_sentence(person, tmp_path, content):
    path = tmp_path / "other.dayfence"
    path.write_text(content)
    window = person.starts_the_program()
    said = []

    def reads(box):
        said.append(box.text())
        QTest.keyClick(box, Qt.Key.Key_Return)

    person.answers(reads)
    assert not window.open_journal(path)
    assert len(said) == 1
    assert said[0].endswith(".")
    assert "Traceback" not in said[0]
    assert path.read_text() == content
