"""One act, one step: all of it or nothing, and only on what this store last saw."""

from __future__ import annotations

import os
import shutil
import sqlite3
import threading
from dataclasses import replace
from datetime import datetime
from pathlib import Path

import pytest

from desktop.errors import StorageError
from desktop.journal.records import Change, DayNote, Measure, Record
from desktop.journal.row_change import RowChange, Step, key_of
from desktop.storage.database import storage_errors
from desktop.storage.store import Held, Store
from tests.desktop.storage.samples import EXERCISE, FULL, PERSON, added, minutes, names, refusal

AT = "2026-03-10T21:04:05"


def edited(before: Record, **fields: object) -> RowChange:
    return RowChange(before, replace(before, **fields))  # type: ignore[arg-type]


def test_a_new_journal_holds_what_it_started_with(store: Store, path: Path) -> None:
    journal = store.read()
    assert (journal.person, journal.measures) == (PERSON, {1: EXERCISE})
    assert store.steps() == [Step(1, AT, "do", "start journal", None, tuple(added(PERSON, EXERCISE)))]
    assert (store.path, store.read_only, store.last_step_number) == (path, False, 1)


def test_a_person_alone_is_enough(journal_folder: Path) -> None:
    with Store.create(journal_folder / "other", PERSON) as store:
        assert store.read().records() == [PERSON]
        datetime.fromisoformat(store.steps()[0].at)


def test_every_field_of_every_record_is_there_after_reopening(path: Path) -> None:
    Store.create(path, FULL).close()
    with Store.open(path) as store:
        assert sorted(map(repr, store.read().records())) == sorted(map(repr, FULL))
        assert store.steps()[0].changes == tuple(added(*FULL))
        store.verify()


def test_every_kind_of_record_is_changed_and_removed(path: Path) -> None:
    with Store.create(path, FULL) as store:
        journal = store.read()
        renamed = [
            edited(FULL[0], name="Other", journal_id="f" * 32),
            edited(FULL[1], title="Other"),
            edited(FULL[2], value=5.0),
            edited(FULL[3], label="other"),
            edited(FULL[4], label="other"),
            edited(FULL[5], times=3),
            edited(FULL[6], text="other"),
        ]
        store.write("set person", renamed)
        journal.apply(renamed)
        assert store.read() == journal
        # The measure goes before its entry and its plan: only the end of a step counts.
        store.write("remove measure", [RowChange(change.after, None) for change in renamed[1:]])
        assert store.read().records() == [renamed[0].after]
        store.verify()


def test_a_step_comes_back_as_it_was_written(store: Store) -> None:
    changes = [
        RowChange(None, minutes(1)),
        edited(EXERCISE, title="Walking"),
        RowChange(None, DayNote(minutes(1).day, "note")),
    ]
    written = store.write("paste values", changes)
    assert written == Step(2, AT, "do", "paste values", None, tuple(changes))
    undone = store.write("paste values", [change.inverse() for change in reversed(changes)], kind="undo", of=2)
    assert (undone.number, undone.kind, undone.of) == (3, "undo", 2)
    assert store.steps()[1:] == [written, undone]
    assert store.last_step_number == 3


@pytest.mark.parametrize(("last", "expected"), [(None, 5), (0, 0), (1, 1), (3, 3), (5, 5), (99, 5)])
def test_the_last_steps(store: Store, last: int | None, expected: int) -> None:
    for day in range(1, 9, 2):
        store.write("put value", added(minutes(day), minutes(day + 1)))
    steps = store.steps(last)
    assert [step.number for step in steps] == [1, 2, 3, 4, 5][5 - expected :]
    assert all(len(step.changes) == 2 for step in steps)


def test_everything_a_day_has_held(store: Store) -> None:
    first, second = minutes(1, 30.0), minutes(1, 45.0)
    store.write("put value", added(first))
    store.write("put value", added(minutes(1, 9.0, slot="morning"), minutes(2)))
    store.write("put value", [RowChange(first, second)])
    store.write("clear values", [RowChange(second, None)])
    assert store.history_of(key_of(first)) == [
        Held(5, AT, "clear values", None),
        Held(4, AT, "put value", second),
        Held(2, AT, "put value", first),
    ]
    assert store.history_of(("entry", 1, "2026-03-09", "")) == []
    assert [held.record for held in store.history_of(("person",))] == [PERSON]


def test_ids_that_were_used_are_known_for_good(store: Store) -> None:
    assert store.highest_ids() == {"measure": 1}
    change = Change(12, minutes(1).day)
    store.write("mark change", added(change, Measure(9, 1, "x")))
    store.write("remove change", [RowChange(change, None), RowChange(Measure(9, 1, "x"), None)])
    assert store.highest_ids() == {"measure": 9, "change": 12}


def test_a_step_without_a_change_is_our_mistake(store: Store) -> None:
    with pytest.raises(ValueError, match="needs a change"):
        store.write("put value", [])
    assert store.last_step_number == 1


REFUSED: list[list[RowChange]] = [
    added(minutes(1, 2e9)),
    added(minutes(1, float("nan"))),
    added(minutes(1, note="a\0b")),
    added(minutes(1, note="\ud800")),
    added(minutes(1, note="x" * 20_000)),
    added(replace(minutes(1), measure=5)),
    added(Measure(2**70, 0, "x")),
    [RowChange(EXERCISE, None), RowChange(None, replace(minutes(1), measure=1))],
    [RowChange(PERSON, None)],
]


@pytest.mark.parametrize("bad", REFUSED)
def test_one_bad_record_and_nothing_of_the_step_is_kept(store: Store, path: Path, bad: list[RowChange]) -> None:
    store.write("put value", added(minutes(8)))
    journal = store.read()
    for changes in ([*bad, *added(minutes(9))], [*added(minutes(9)), *bad]):
        error = refusal(lambda changes=changes: store.write("paste values", changes))  # type: ignore[misc]
        assert error.reason == "refused value"
        assert "2000000000" not in str(error)
    assert store.read() == journal
    assert store.last_step_number == 2
    assert names(path.parent) == [path.name]
    store.write("put value", added(minutes(10)))
    store.verify()
    assert len(store.steps()) == 3


def test_a_fault_in_the_middle_leaves_nothing(store: Store) -> None:
    journal = store.read()
    with store._database.writing() as connection:
        connection.execute(
            "CREATE TEMP TRIGGER fault AFTER INSERT ON main.history WHEN NEW.seq = 5"
            " BEGIN SELECT RAISE(ABORT, 'fault'); END"
        )
    days = added(*(minutes(day) for day in range(1, 9)))
    assert refusal(lambda: store.write("paste values", days)).reason == "refused value"
    assert store.read() == journal
    assert len(store.steps()) == 1
    store._database._connection.execute("DROP TRIGGER temp.fault")
    store.write("paste values", days)
    assert len(store.read().entries[1]) == 8
    store.verify()


def test_a_kind_of_step_that_takes_nothing_back_is_refused(store: Store) -> None:
    error = refusal(lambda: store.write("put value", added(minutes(1)), kind="undo", of=2))
    assert error.reason == "refused value"


@pytest.mark.parametrize(
    "change",
    [
        RowChange(minutes(1, 31.0), minutes(1, 32.0)),
        RowChange(minutes(1, 31.0), None),
        RowChange(None, minutes(1)),
        RowChange(minutes(2), None),
        RowChange(minutes(2), minutes(2, 5.0)),
    ],
)
def test_a_change_from_what_is_not_there_is_stale(store: Store, change: RowChange) -> None:
    store.write("put value", added(minutes(1)))
    error = refusal(lambda: store.write("paste values", [*added(minutes(3)), change]))
    assert error.reason == "stale"
    assert list(store.read().entries[1].values()) == [minutes(1)]


def test_an_older_copy_written_over_the_open_file(store: Store, path: Path) -> None:
    store.write("put value", added(minutes(1)))
    older = path.read_bytes()
    store.write("put value", added(minutes(2)))
    path.write_bytes(older)
    assert refusal(lambda: store.write("put value", added(minutes(3)))).reason == "stale"
    assert refusal(lambda: store.write("put value", added(minutes(3)))).reason == "stale"
    assert path.read_bytes() == older
    # Reading says what is there; from then on it goes on from there.
    assert list(store.read().entries[1].values()) == [minutes(1)]
    assert store.write("put value", added(minutes(3))).number == 3
    store.verify()


def test_a_copy_with_as_many_other_edits(path: Path, journal_folder: Path) -> None:
    """SQLite tells its own pages by a counter of edits, which is the same in both copies."""
    Store.create(path, [PERSON, EXERCISE]).close()
    other = journal_folder / "other device"
    shutil.copy(path, other)
    with Store.open(other) as elsewhere:
        elsewhere.write("put value", added(minutes(1, 99.0)))
    theirs = other.read_bytes()
    with Store.open(path) as store:
        store.write("put value", added(minutes(1, 30.0)))
        assert path.read_bytes()[24:40] == theirs[24:40]
        path.write_bytes(theirs)
        assert refusal(lambda: store.write("put value", added(minutes(2)))).reason == "stale"
        assert path.read_bytes() == theirs
        assert [entry.value for entry in store.read().entries[1].values()] == [99.0]
        store.verify()


def another_step(path: Path) -> None:
    """What another program on the same file would do: one more step, well formed."""
    connection = sqlite3.connect(path, isolation_level=None)
    connection.execute(
        "INSERT INTO history SELECT seq + 1, step + 1, at, 'do', 'put value', NULL, tbl, key, after, after, chain"
        " FROM history ORDER BY seq DESC LIMIT 1"
    )
    connection.close()


def test_a_second_writer_is_noticed(store: Store, path: Path) -> None:
    another_step(path)
    assert refusal(lambda: store.write("put value", added(minutes(1)))).reason == "stale"
    assert store.read().entries == {}


def test_nobody_writes_between_the_look_and_the_write(store: Store, path: Path) -> None:
    other = sqlite3.connect(path, isolation_level=None, timeout=0)
    with store._database.writing(), pytest.raises(sqlite3.OperationalError, match="locked"):
        other.execute("BEGIN IMMEDIATE")
    other.execute("BEGIN IMMEDIATE")
    other.close()


def test_a_file_in_use_by_another_program(store: Store, path: Path) -> None:
    store._database._connection.execute("PRAGMA busy_timeout = 10")
    other = sqlite3.connect(path, isolation_level=None)
    other.execute("BEGIN IMMEDIATE")
    assert refusal(lambda: store.write("put value", added(minutes(1)))).reason == "busy"
    assert store.read().entries == {}
    other.execute("ROLLBACK")
    other.execute("BEGIN EXCLUSIVE")
    assert refusal(store.read).reason == "busy"
    other.execute("ROLLBACK")
    other.execute("BEGIN")
    other.execute("SELECT * FROM person").fetchall()
    assert refusal(lambda: store.write("put value", added(minutes(1)))).reason == "busy"
    other.close()
    assert store.write("put value", added(minutes(1))).number == 2
    store.verify()


@pytest.mark.parametrize("how", ["removed", "renamed", "replaced", "folder renamed"])
def test_a_file_taken_away(store: Store, path: Path, journal_folder: Path, how: str) -> None:
    store.write("put value", added(minutes(1)))
    aside = journal_folder / "aside"
    match how:
        case "removed":
            path.unlink()
        case "renamed":
            path.rename(aside)
        case "replaced":
            shutil.copy(path, aside)
            aside.replace(path)
        case _:
            journal_folder.rename(f"{journal_folder} moved")
    before = {file: file.read_bytes() for file in journal_folder.parent.glob(f"{journal_folder.name}*/*")}
    error = refusal(lambda: store.write("put value", added(minutes(2))))
    if how == "folder renamed":
        Path(f"{journal_folder} moved").rename(journal_folder)
        before = {journal_folder / file.name: contents for file, contents in before.items()}
    assert error.reason == "moved"
    assert {file: file.read_bytes() for file in journal_folder.iterdir()} == before
    assert store.last_step_number == 2


@pytest.mark.parametrize("size", [0, 100, 5000])
def test_a_file_cut_short_while_open(store: Store, path: Path, size: int) -> None:
    os.truncate(path, size)
    assert refusal(lambda: store.write("put value", added(minutes(1)))).reason == "damaged"
    assert refusal(store.read).reason == "damaged"
    assert path.stat().st_size == size


def test_a_full_disk(store: Store, path: Path) -> None:
    store.write("put value", added(minutes(1)))
    journal = store.read()
    connection = store._database._connection
    pages = connection.execute("PRAGMA page_count").fetchone()[0]
    connection.execute(f"PRAGMA max_page_count = {pages}")
    many = added(*(minutes(day, note="x" * 4000) for day in range(2, 20)))
    assert refusal(lambda: store.write("paste values", many)).reason == "disk full"
    assert store.read() == journal
    assert names(path.parent) == [path.name]
    # There is room for a small one, and for all of it later.
    store.write("put value", [edited(minutes(1), value=31.0)])
    connection.execute("PRAGMA max_page_count = 1000000")
    store.write("paste values", many)
    store.verify()
    assert store.last_step_number == 4


@pytest.mark.parametrize(
    ("name", "reason"),
    [
        ("SQLITE_FULL", "disk full"),
        ("SQLITE_READONLY", "read only"),
        ("SQLITE_READONLY_DIRECTORY", "read only"),
        ("SQLITE_READONLY_DBMOVED", "moved"),
        ("SQLITE_READONLY_ROLLBACK", "cannot open"),
        ("SQLITE_BUSY_SNAPSHOT", "busy"),
        ("SQLITE_LOCKED", "busy"),
        ("SQLITE_CONSTRAINT_CHECK", "refused value"),
        ("SQLITE_TOOBIG", "refused value"),
        ("SQLITE_CANTOPEN_ISDIR", "cannot open"),
        ("SQLITE_PERM", "cannot open"),
        ("SQLITE_AUTH", "cannot open"),
        ("SQLITE_CORRUPT_INDEX", "damaged"),
        ("SQLITE_NOTADB", "damaged"),
        ("SQLITE_ERROR", "damaged"),
        ("SQLITE_IOERR_FSYNC", "disk error"),
        ("SQLITE_NOMEM", "disk error"),
    ],
)
def test_a_reason_for_every_error(name: str, reason: str) -> None:
    error = sqlite3.OperationalError("words")
    error.sqlite_errorname = name
    with pytest.raises(StorageError) as caught, storage_errors(Path("log")):
        raise error
    assert caught.value.reason == reason
    assert caught.value.fields == {"path": "log", "code": name, "detail": "words"}


def test_our_own_mistakes_stay_what_they_are(store: Store) -> None:
    store.close()
    with pytest.raises(sqlite3.ProgrammingError):
        store.read()


def test_it_may_be_handed_to_another_thread(store: Store) -> None:
    written: list[Step] = []
    thread = threading.Thread(target=lambda: written.append(store.write("put value", added(minutes(1)))))
    thread.start()
    thread.join()
    assert store.steps()[1:] == written
    assert len(written) == 1


def test_times_are_told_and_never_order(path: Path) -> None:
    times = iter([datetime(2026, 1, 1), datetime(1999, 1, 1), datetime(2026, 1, 2)])
    with Store.create(path, PERSON, clock=lambda: next(times)) as store:
        pass
    with Store.open(path, clock=lambda: next(times)) as store:
        store.write("write note", added(DayNote(minutes(1).day, "a")))
        store.write("write note", added(DayNote(minutes(2).day, "b")))
        assert [step.at[:4] for step in store.steps()] == ["2026", "1999", "2026"]
        assert [step.number for step in store.steps()] == [1, 2, 3]


def test_the_same_place_may_be_written_by_its_owner(store: Store) -> None:
    assert not store.read_only
    store.write("put value", added(minutes(1)))
    assert store.last_step_number == 2
