from __future__ import annotations

import json
import shutil
import sqlite3
from collections.abc import Iterator
from dataclasses import replace
from pathlib import Path

import pytest

from desktop.edits.history import UndoHistory
from desktop.errors import StorageError
from desktop.journal.row_change import RowChange
from desktop.storage.backups import copies_of, read_copy
from desktop.storage.chain import HISTORY, HistoryRow, Position, check_whole
from desktop.storage.database import open_database
from desktop.storage.layout import JOURNAL
from desktop.storage.migrations import (
    MIGRATIONS,
    Migration,
    create_version_1,
    expected_schema,
    migrate,
    schema_of,
    version_of,
)
from desktop.storage.schema import APPLICATION_ID, VERSION_1
from desktop.storage.store import Store
from desktop.storage.stranger import read_stranger
from tests.desktop.storage.samples import EXERCISE, PERSON, added, minutes


def add_mood(connection: sqlite3.Connection) -> None:
    connection.execute("ALTER TABLE note ADD COLUMN mood TEXT")


def rebuild_then_break(connection: sqlite3.Connection) -> None:
    connection.execute("CREATE TABLE halfway (a)")
    connection.execute("DELETE FROM entry")
    raise RuntimeError("cut short")


def leave_orphans(connection: sqlite3.Connection) -> None:
    connection.execute("DELETE FROM measure")


@pytest.fixture
def empty() -> Iterator[sqlite3.Connection]:
    connection = sqlite3.connect(":memory:", isolation_level=None)
    yield connection
    connection.close()


def header(connection: sqlite3.Connection) -> tuple[int, int]:
    return version_of(connection), connection.execute("PRAGMA application_id").fetchone()[0]


def test_version_1_makes_the_tables_and_marks_the_file(empty: sqlite3.Connection) -> None:
    migrate(empty)
    assert header(empty) == (len(MIGRATIONS), APPLICATION_ID)
    names = {row[0] for row in empty.execute("SELECT name FROM sqlite_schema WHERE type = 'table'")}
    assert names >= {"person", "measure", "entry", "change", "span", "plan", "note", "history"}
    assert empty.execute("PRAGMA foreign_keys").fetchone() == (1,)


def test_every_table_is_strict(empty: sqlite3.Connection) -> None:
    migrate(empty)
    tables = [row for row in empty.execute("PRAGMA table_list") if not row[1].startswith("sqlite_")]
    assert len(tables) == 8
    assert all(row[5] == 1 for row in tables)
    assert len(VERSION_1) == 8 + 5


def test_a_step_at_a_time_or_all_at_once_is_the_same(empty: sqlite3.Connection) -> None:
    steps: tuple[Migration, ...] = (create_version_1, add_mood)
    migrate(empty, steps[:1])
    assert version_of(empty) == 1
    migrate(empty, steps)
    assert version_of(empty) == 2
    assert schema_of(empty) == expected_schema(steps) != expected_schema(steps[:1])
    migrate(empty, steps)
    assert version_of(empty) == 2


@pytest.mark.parametrize(
    ("step", "error"), [(rebuild_then_break, RuntimeError), (leave_orphans, sqlite3.IntegrityError)]
)
def test_a_step_cut_short_leaves_the_version_before(
    store: Store, path: Path, step: Migration, error: type[Exception]
) -> None:
    store.write("put value", added(minutes(1), minutes(2)))
    journal = store.read()
    store.close()
    with pytest.raises(error):
        open_database(path, replace(JOURNAL, steps=(*MIGRATIONS, step)))
    with Store.open(path) as reopened:
        assert reopened.read() == journal
        reopened.verify()


def test_an_older_file_is_brought_to_the_newest_version_at_opening(store: Store, path: Path) -> None:
    store.write("put value", added(minutes(1)))
    store.close()
    newer = replace(JOURNAL, steps=(*MIGRATIONS, add_mood))
    for _ in range(2):
        database = open_database(path, newer)
        with database.reading() as connection:
            assert header(connection) == (len(MIGRATIONS) + 1, APPLICATION_ID)
            assert connection.execute("SELECT count(*) FROM entry").fetchone() == (1,)
            assert connection.execute("PRAGMA foreign_keys").fetchone() == (1,)
        database.close()
    with pytest.raises(StorageError) as caught:
        Store.open(path)
    assert caught.value.reason == "newer version"


VERSION_1_FILE = Path(__file__).parents[2] / "old_journals" / "version_1.dayfence"
"""As the program of that version wrote it: its history holds a measure set, and set back."""


def test_a_journal_of_version_1_is_opened_checked_and_written_on(path: Path) -> None:
    shutil.copyfile(VERSION_1_FILE, path)
    with Store.open(path) as store:
        store.verify()
        journal = store.read()
        assert [len(entries) for entries in journal.entries.values()] == [8, 8]
        pressure = journal.measures[1]
        assert (pressure.title, pressure.worth, pressure.limit_high, pressure.limit_words) == (
            "Upper pressure",
            None,
            None,
            "",
        )
        assert [held.record for held in store.history_of(("measure", 1))][1] == replace(pressure, worth=5.0)
        limits = replace(pressure, limit_high=170.0, limit_words="call the ward")
        store.write("set measure", [RowChange(pressure, limits)])
        store.verify()
    with Store.open(path) as again:
        assert again.read().measures[1] == limits
        assert UndoHistory(again.steps()).undoable.changes == (RowChange(pressure, limits),)
    (copy,) = copies_of(path)
    assert copy.before_version
    assert read_copy(copy.path) == journal


def test_somebody_elses_journal_of_version_1_is_read(path: Path) -> None:
    shutil.copyfile(VERSION_1_FILE, path)
    before = path.read_bytes()
    assert len(read_stranger(path).entries[1]) == 8
    assert path.read_bytes() == before


def test_a_row_of_the_history_that_is_no_record_is_noticed(path: Path) -> None:
    with Store.create(path, PERSON) as store:
        store.write("add measure", added(EXERCISE))
    rewritten = json.dumps({"id": 1, "title": "Exercise"})
    connection = sqlite3.connect(path)
    connection.execute("DROP TRIGGER history_as_written")
    chain = Position().chain
    for cells in connection.execute(f"SELECT {HISTORY} FROM history ORDER BY seq").fetchall():
        row = HistoryRow.of_cells(cells)
        if row.tbl == "measure":
            row = row._replace(after=rewritten)
        chain = row.chained(chain)
        connection.execute("UPDATE history SET after = ?, chain = ? WHERE seq = ?", (row.after, chain, row.seq))
    with pytest.raises(StorageError) as caught:
        check_whole(connection, path)
    connection.close()
    assert caught.value.fields["detail"] == "a row of the history is not a record"


def test_statistics_of_another_program_do_not_count(store: Store, path: Path) -> None:
    store.close()
    connection = sqlite3.connect(path)
    connection.execute("ANALYZE")
    connection.close()
    with Store.open(path) as reopened:
        reopened.verify()
        assert reopened.last_step_number == 1
