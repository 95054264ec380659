"""One open journal: on screen at once, saved after the commit, nothing lost when a write fails."""

import shutil
import threading
from datetime import date, datetime, timedelta
from pathlib import Path
from tempfile import mkdtemp

import pytest

from desktop.edits.days import put_value, write_note
from desktop.errors import StorageError
from desktop.journal.journal import Journal, analysis_measure
from desktop.journal.records import Change, Entry, Measure, Person
from desktop.models.days_table import DaysTable
from desktop.models.ready_made import ready_measures, sample_records
from desktop.models.session import Session
from desktop.storage.store import Store

NOW = datetime(2031, 3, 30, 20, 15)
TODAY = NOW.date()


@pytest.fixture
def path():
    shared = Path("/dev/shm")
    folder = Path(mkdtemp(prefix="dayfence-", dir=shared if shared.is_dir() else None))
    yield folder / "log.dayfence"
    shutil.rmtree(folder)


def records(*more):
    return [
        Person("0" * 32),
        Measure(1, 0, "Exercise", "minutes", "amount", missed="zero", likely_low=0, likely_high=600),
        Measure(2, 1, "Upper pressure", "mmHg", pair="pressure"),
        Measure(3, 2, "Lower pressure", "mmHg", pair="pressure"),
        *more,
    ]


@pytest.fixture
def session(qtbot, path):
    one = Session(Store.create(path, records(), clock=lambda: NOW), now=lambda: NOW)
    yield one
    one.close()


def types(session, value, day=TODAY):
    session.do(put_value(session.journal, 1, day, value, f"{value:g}", now=NOW))


def refuse_writes(session, monkeypatch, error):
    def refused(*_):
        raise error

    monkeypatch.setattr(session._store, "write", refused)


def test_an_edit_is_on_screen_at_once_and_saved_after_the_commit(qtbot, session):
    with qtbot.waitSignal(session.saved) as saved:
        types(session, 30)
        assert session.journal.entry(1, TODAY).value == 30
        assert not session.is_saved
    assert saved.args == ["2031-03-30T20:15:00"]
    assert session.is_saved
    assert session._store.read().entry(1, TODAY).value == 30


def test_the_store_is_written_by_another_thread(qtbot, session, monkeypatch):
    threads = []
    write = session._store.write

    def watched(*arguments):
        threads.append(threading.current_thread() is threading.main_thread())
        return write(*arguments)

    monkeypatch.setattr(session._store, "write", watched)
    with qtbot.waitSignal(session.saved):
        types(session, 30)
    assert threads == [False]


def test_a_failed_write_keeps_the_edit_and_all_after_it_until_it_can_be_written(qtbot, session, monkeypatch):
    refuse_writes(session, monkeypatch, StorageError("disk full"))
    with qtbot.waitSignal(session.save_failed) as failed:
        types(session, 30)
    assert failed.args[0].reason == "disk full"
    types(session, 40)
    session.do(write_note(session.journal, TODAY, "rain"))
    assert session.journal.entry(1, TODAY).value == 40
    assert session.trouble is not None
    monkeypatch.undo()
    with qtbot.waitSignal(session.saved):
        session.try_again()
    assert session.trouble is None
    stored = session._store.read()
    assert (stored.entry(1, TODAY).value, stored.note(TODAY)) == (40, "rain")


def test_edits_on_their_way_when_a_write_fails_are_written_in_order_later(qtbot, session, monkeypatch):
    refuse_writes(session, monkeypatch, StorageError("disk full"))
    for value in (10, 20, 30):
        types(session, value)
    session.wait_until_written()
    qtbot.waitUntil(lambda: session._writing == 0)
    monkeypatch.undo()
    with qtbot.waitSignal(session.saved):
        session.try_again()
    session._store.verify()
    assert session._store.read().entry(1, TODAY).value == 30
    assert [step.number for step in session._store.steps()] == [1, 2, 3, 4]


def test_going_back_to_what_is_saved_takes_the_screen_back(qtbot, session, monkeypatch):
    with qtbot.waitSignal(session.saved):
        types(session, 30)
    refuse_writes(session, monkeypatch, StorageError("moved"))
    with qtbot.waitSignal(session.save_failed):
        types(session, 99)
    monkeypatch.undo()
    session.give_up_unsaved()
    assert session.journal.entry(1, TODAY).value == 30
    assert session.is_saved


def test_undo_and_redo_go_on_after_a_restart(qtbot, path):
    first = Session(Store.create(path, records(), clock=lambda: NOW), now=lambda: NOW)
    types(first, 30)
    types(first, 45)
    first.close()
    again = Session(Store.open(path), now=lambda: NOW)
    again.undo()
    assert again.journal.entry(1, TODAY).value == 30
    again.undo()
    assert again.journal.entry(1, TODAY) is None
    again.redo()
    again.redo()
    assert again.journal.entry(1, TODAY).value == 45
    assert again.redoable is None
    again.close()


def test_the_measure_on_the_chart_and_the_period_can_be_chosen(qtbot, session):
    with qtbot.waitSignals([session.measure_chosen, session.reviewed]):
        session.choose_measure(2)
    session.choose_period("week")
    assert session.review.measure.period == "week"
    session.choose_measure(99)
    assert session.measure == 2


def test_a_long_log_is_reviewed_off_the_screens_thread_and_only_the_last_review_is_shown(qtbot, path):
    days = [
        Entry(1, TODAY - timedelta(place), value=float(20 + place % 9), original="x", source="table")
        for place in range(1500)
    ]
    one = Session(Store.create(path, records(*days)), now=lambda: NOW)
    shown = []
    one.reviewed.connect(shown.append)
    for value in (1, 2, 3):
        types(one, value)
    assert shown == []
    qtbot.waitUntil(lambda: bool(shown))
    one._reviewer.wait()
    qtbot.wait(1)
    assert len(shown) == 1
    assert shown[0].points.values[-1] == 3
    one.close()


@pytest.fixture
def table(session):
    return DaysTable(session)


def shows(table, day, column=0):
    return table.index(table.row(day), column).data()


def test_the_table_keeps_qts_rules(qtmodeltester, table, session):
    qtmodeltester.check(table)
    types(session, 30)
    qtmodeltester.check(table)


def test_a_new_log_shows_four_weeks_up_to_today(table):
    assert table.rowCount() == 28
    assert table.day(27) == TODAY
    assert table.headerData(27, table_vertical()) == "today"
    assert table.headerData(26, table_vertical()) == "Sat 29 Mar"


def table_vertical():
    from PySide6.QtCore import Qt

    return Qt.Orientation.Vertical


@pytest.mark.parametrize(
    ("text", "value"), [("30", 30), ("7,5", 7.5), ("7.5", 7.5), ("1:05", 65), ("1h05", 65), ("45 min", 45)]
)
def test_typed_texts_and_what_they_are(table, session, text, value):
    assert table.setData(table.index(27, 0), text)
    assert session.journal.entry(1, TODAY).value == pytest.approx(value)
    assert session.journal.entry(1, TODAY).original == text


def test_two_numbers_fill_the_pair_from_either_column(table, session):
    table.setData(table.index(27, 2), "128/79")
    assert (session.journal.entry(2, TODAY).value, session.journal.entry(3, TODAY).value) == (128, 79)
    session.undo()
    assert session.journal.entry(2, TODAY) is None


def test_junk_is_kept_in_the_cell_until_it_is_put_right(qtbot, table, session):
    with qtbot.waitSignal(table.unread):
        assert not table.setData(table.index(27, 0), "3o")
    assert shows(table, TODAY) == "3o ?"
    table.setData(table.index(27, 0), "30")
    assert shows(table, TODAY) == "30"


def test_a_pasted_block_is_written_as_a_whole_or_not_at_all(table, session):
    start = table.index(20, 0)
    assert "Row 2" in table.paste(start, "10\n1x\n30")
    assert not session.journal.entries.get(1)
    assert table.paste(start, "10\t128\t79\r\n20\t130\t80\n") == ""
    assert session.journal.entry(3, table.day(21)).value == 80
    session.undo()
    assert session.journal.entry(1, table.day(20)) is None


def test_a_block_that_reaches_past_today_is_refused(table):
    assert "past today" in table.paste(table.index(27, 0), "1\n2")


def test_after_midnight_there_is_a_new_today(qtbot, path):
    clock = [NOW]
    one = Session(Store.create(path, records()), now=lambda: clock[0])
    table = DaysTable(one)
    clock[0] = NOW + timedelta(days=1)
    with qtbot.waitSignal(table.rowsInserted):
        table.start_today()
    assert table.day(table.rowCount() - 1) == TODAY + timedelta(1)
    one.close()


def test_an_earlier_day_can_be_shown(table):
    table.show_from(date(2030, 12, 24))
    assert table.day(0) == date(2030, 12, 24)


def test_a_journal_that_cannot_be_written_shows_and_changes_nothing(qtbot, path, session):
    session.read_only = True
    types(session, 30)
    assert session.journal.entry(1, TODAY) is None
    assert session.undoable is None


@pytest.mark.parametrize("today", [date(2031, 3, 3) + timedelta(place) for place in range(7)])
def test_the_sample_is_a_journal_that_ends_last_sunday_with_its_weekends_in_place(today):
    journal = Journal.of(sample_records(today))
    _, last = journal.days()
    assert 0 < (today - last).days <= 8
    change = next(one for one in journal.changes.values() if isinstance(one, Change))
    assert change.day.weekday() == 0
    assert len(journal.columns()) == 4


def test_every_ready_made_measure_can_be_asked_about():
    for _, measures in ready_measures():
        for measure in measures:
            assert analysis_measure(measure).kind == measure.kind
