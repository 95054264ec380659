"""Somebody else's journal, read as data alone: nothing in it can run, write, or take more than its share."""

from __future__ import annotations

import contextlib
import sqlite3
import time
from dataclasses import dataclass
from pathlib import Path

from desktop.errors import StorageError
from desktop.journal.journal import Journal
from desktop.journal.records import Record
from desktop.storage.chain import check_whole, damaged
from desktop.storage.database import check_header, storage_errors
from desktop.storage.migrations import MIGRATIONS, expected_schema, migrate, schema_of, version_of
from desktop.storage.new_files import file_errors
from desktop.storage.rows import TABLES

MOST_BYTES = 64_000_000
SECONDS = 5.0
"""Reading that takes longer is given up."""

_LIMITS = {
    sqlite3.SQLITE_LIMIT_LENGTH: 1_000_000,
    sqlite3.SQLITE_LIMIT_SQL_LENGTH: 100_000,
    sqlite3.SQLITE_LIMIT_COLUMN: 100,
    sqlite3.SQLITE_LIMIT_EXPR_DEPTH: 100,
    sqlite3.SQLITE_LIMIT_COMPOUND_SELECT: 3,
    sqlite3.SQLITE_LIMIT_VDBE_OP: 25_000,
    sqlite3.SQLITE_LIMIT_FUNCTION_ARG: 8,
    sqlite3.SQLITE_LIMIT_ATTACHED: 0,
    sqlite3.SQLITE_LIMIT_LIKE_PATTERN_LENGTH: 100,
    sqlite3.SQLITE_LIMIT_VARIABLE_NUMBER: 10,
    sqlite3.SQLITE_LIMIT_TRIGGER_DEPTH: 10,
}
_READING = {sqlite3.SQLITE_SELECT, sqlite3.SQLITE_READ}
_BESIDE = ("-journal", "-wal")


@dataclass(frozen=True)
class Stranger:
    """A journal that came from elsewhere.

    Attributes:
        journal: its values, each checked again.
        last_at: local clock time of its last step, ISO 8601; ``""`` without a history.
        last_change: number of its last row change; 0 without a history.
    """

    journal: Journal
    last_at: str
    last_change: int


def read_stranger(path: Path) -> Journal:
    """The values of a journal that came from elsewhere, as :func:`look_at_stranger` reads them."""
    return look_at_stranger(path).journal


def look_at_stranger(path: Path) -> Stranger:
    """A journal that came from elsewhere: its values, each checked again, and how far its history reaches.

    The file is read once, as bytes; SQLite sees only a memory with limits, and only tables declared exactly
    as ours.

    Raises:
        StorageError: it is no journal, newer, damaged, declares anything of its own, is too large, or takes
            too long.
    """
    with file_errors(path):
        if not path.is_file():
            raise StorageError("missing" if not path.exists() else "not a journal", path=str(path))
        if path.stat().st_size > MOST_BYTES:
            raise damaged(path, "larger than a journal")
        check_header(path)
        if any(path.with_name(path.name + end).exists() for end in _BESIDE):
            raise damaged(path, "a step of it is not finished")
        contents = path.read_bytes()
    if contents[18:20] != b"\x01\x01":
        raise damaged(path, "it needs a second file")
    with (
        storage_errors(path),
        contextlib.closing(sqlite3.connect(":memory:", isolation_level=None)) as connection,
    ):
        _guard(connection)
        connection.deserialize(contents)
        connection.execute("PRAGMA trusted_schema = OFF")
        if schema_of(connection) != expected_schema(MIGRATIONS[: version_of(connection)]):
            raise damaged(path, "the tables are not those of a journal")
        migrate(connection)
        check_whole(connection, path)
        last = connection.execute('SELECT "at", "seq" FROM "history" ORDER BY "seq" DESC LIMIT 1').fetchone()
        connection.set_authorizer(_allow)
        rows = [(table, row) for table in TABLES.values() for row in connection.execute(table.select)]
        return Stranger(Journal.of(_checked([(table.name, row) for table, row in rows])), *(last or ("", 0)))


def _guard(connection: sqlite3.Connection) -> None:
    for limit, value in _LIMITS.items():
        connection.setlimit(limit, value)
    end = time.monotonic() + SECONDS
    connection.set_progress_handler(lambda: time.monotonic() > end, 10_000)


def _allow(action: int, first: str | None, _second: str | None, _database: str | None, source: str | None) -> int:
    """Reading the tables is allowed, and nothing that is reached through something else."""
    known = action in _READING and source is None and (first is None or first in TABLES)
    return sqlite3.SQLITE_OK if known else sqlite3.SQLITE_DENY


def _checked(rows: list[tuple[str, tuple[object, ...]]]) -> list[Record]:
    """The records, after a fresh journal has taken each of them."""
    with contextlib.closing(sqlite3.connect(":memory:", isolation_level=None)) as fresh:
        migrate(fresh)
        fresh.execute("BEGIN")
        for name, row in rows:
            fresh.execute(TABLES[name].insert, row)
        fresh.execute("COMMIT")
        return [table.record(row) for table in TABLES.values() for row in fresh.execute(table.select).fetchall()]
