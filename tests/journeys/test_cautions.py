"""A value that meets a line of the table of cautions, typed at the window."""

from datetime import date

import pytest

from desktop.edits.measures import add_measures
from desktop.journal.records import Entry, Measure
from desktop.journal.row_change import RowChange
from desktop.screens.caution_bar import CautionBar
from desktop.screens.caution_settings import OTHER, CautionSettings
from desktop.screens.settings import Settings
from desktop.wording.caution_table import OwnCautions

PRESSURE = Measure(0, 0, "Upper pressure", "mmHg")


@pytest.fixture
def window(person):
    window = person.starts_the_program()
    window.start_journal(window.own_journal)
    session = window.session
    session.do(add_measures(session.journal, session.ids, [PRESSURE]))
    window.show_measure(1)
    return window


def types(window, text: str) -> str:
    days = window.workspace.days.days
    days.setData(days.index(days.row(window.session.today), days.column(1)), text)
    return window.workspace.caution.text


def test_a_high_value_speaks_and_the_next_one_silences_it(window):
    window.settings.set_emergency_number("999")
    assert types(window, "128") == ""
    said = types(window, "185")
    assert said.startswith("Upper pressure: You typed 185 mmHg")
    assert "call 999 now" in said
    assert types(window, "150") == ""


def test_the_bar_can_be_closed(window):
    types(window, "185")
    window.workspace.caution.close_button.click()
    assert window.workspace.caution.text == ""


def test_own_limits_are_kept_and_used(person, window):
    def settles(dialog: CautionSettings) -> None:
        dialog.high.setText("150")
        dialog.words.setText("call the ward before noon")
        dialog.region.setCurrentIndex(2)
        dialog.accept()

    person.answers(settles)
    window.log.caution_settings()
    assert window.settings.emergency_number == "999"
    assert types(window, "150") == ""
    said = types(window, "151")
    assert "your own limit of 150 mmHg" in said
    assert said.endswith("Your clinic's words: “call the ward before noon”.")
    measure = window.session.current
    assert (measure.limit_low, measure.limit_high) == (None, 150.0)
    for _ in ("151", "150", "the limits"):
        window.session.undo()
    assert "your own limit" not in types(window, "152")
    assert (window.session.current.limit_high, window.session.current.limit_words) == (None, "")


def test_numbers_from_a_table_or_another_unit_are_not_spoken_of(qtbot):
    bar = CautionBar()
    qtbot.addWidget(bar)
    from desktop.journal.journal import Journal
    from desktop.journal.records import Person

    entry = Entry(1, date(2026, 3, 1), value=185.0, source="table")
    measure = Measure(1, 0, "Upper pressure", "mmHg")
    journal = Journal.of([Person("0" * 32), measure, entry])
    bar.look_at(journal, (RowChange(None, entry),), lambda _: OwnCautions(), "")
    assert bar.text == ""


def test_another_emergency_number_can_be_typed(qtbot):
    dialog = CautionSettings(PRESSURE, OwnCautions(), "15")
    qtbot.addWidget(dialog)
    assert (dialog.region.currentText(), dialog.other.text()) == (OTHER, "15")
    dialog.accept()
    assert dialog.number == "15"


def test_what_was_settled_is_there_the_next_time(tmp_path):
    own = OwnCautions(False, 1.5, None, True, 2.0, 3)
    Settings(tmp_path).set_cautions("0" * 32, 4, own)
    assert Settings(tmp_path).cautions("0" * 32, 4) == own
    assert Settings(tmp_path).cautions("0" * 32, 5) == OwnCautions()


def test_heart_failure_is_only_asked_of_a_weight(qtbot):
    pressure, weight = (
        CautionSettings(measure, OwnCautions(heart_failure=True), "")
        for measure in (PRESSURE, Measure(2, 0, "Weight", "kg"))
    )
    for dialog in (pressure, weight):
        qtbot.addWidget(dialog)
        dialog.accept()
    assert not pressure.chosen.heart_failure
    assert weight.chosen.heart_failure
