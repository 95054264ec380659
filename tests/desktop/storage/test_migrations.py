from __future__ import annotations

import sqlite3
from collections.abc import Iterator
from pathlib import Path

import pytest

from desktop.errors import StorageError
from desktop.storage.database import open_database
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
from tests.desktop.storage.samples import added, minutes


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
        open_database(path, (create_version_1, step))
    with Store.open(path) as reopened:
        assert reopened.read() == journal
        reopened.verify()


def test_an_older_file_is_brought_to_the_newest_version_at_opening(store: Store, path: Path) -> None:
    store.write("put value", added(minutes(1)))
    store.close()
    steps = (create_version_1, add_mood)
    for _ in range(2):
        database = open_database(path, steps)
        with database.reading() as connection:
            assert header(connection) == (2, APPLICATION_ID)
            assert connection.execute("SELECT count(*) FROM entry").fetchone() == (1,)
            assert connection.execute("PRAGMA foreign_keys").fetchone() == (1,)
        database.close()
    with pytest.raises(StorageError) as caught:
        Store.open(path)
    assert caught.value.reason == "newer version"


def test_statistics_of_another_program_do_not_count(store: Store, path: Path) -> None:
    store.close()
    connection = sqlite3.connect(path)
    connection.execute("ANALYZE")
    connection.close()
    with Store.open(path) as reopened:
        reopened.verify()
        assert reopened.last_step_number == 1
