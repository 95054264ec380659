"""From an older version of the file to this one, a step at a time."""

from __future__ import annotations

import sqlite3
from collections.abc import Callable, Sequence
from functools import cache

from desktop.storage import schema

Migration = Callable[[sqlite3.Connection], None]
"""Brings a file of the version before to the version it stands for; runs inside a transaction."""

Schema = tuple[tuple[str | None, ...], ...]


def create_version_1(connection: sqlite3.Connection) -> None:
    """Make the tables of an empty file."""
    for statement in schema.VERSION_1:
        connection.execute(statement)


def bring_to_version_2(connection: sqlite3.Connection) -> None:
    """Measures can have the limits that the person's clinic gave them."""
    for statement in schema.VERSION_2:
        connection.execute(statement)


MIGRATIONS: tuple[Migration, ...] = (create_version_1, bring_to_version_2)
"""Migration number n makes version n of a journal; their count is the newest version."""


def create_caseload_version_1(connection: sqlite3.Connection) -> None:
    """Make the tables of an empty caseload."""
    for statement in schema.CASELOAD_VERSION_1:
        connection.execute(statement)


CASELOAD_MIGRATIONS: tuple[Migration, ...] = (create_caseload_version_1,)
"""The same of a caseload."""


def version_of(connection: sqlite3.Connection) -> int:
    """The version of an open file; 0 for an empty one."""
    return int(connection.execute("PRAGMA user_version").fetchone()[0])


def migrate(
    connection: sqlite3.Connection,
    steps: Sequence[Migration] = MIGRATIONS,
    application_id: int = schema.APPLICATION_ID,
) -> None:
    """Bring a file to the newest version.

    Each step is one transaction with its version number inside, so a file is always of one version or the next.

    Args:
        connection: open for writing, no transaction begun.
        steps: the migrations, version 1 first.
        application_id: of the kind of file.

    Raises:
        sqlite3.Error: a step did not work; the file is as that step found it.
    """
    for number in range(version_of(connection) + 1, len(steps) + 1):
        # A table that is made anew would otherwise take what refers to it along.
        connection.execute("PRAGMA foreign_keys = OFF")
        connection.execute("BEGIN IMMEDIATE")
        try:
            steps[number - 1](connection)
            if connection.execute("PRAGMA foreign_key_check").fetchall():
                raise sqlite3.IntegrityError(f"version {number} leaves references to nothing")
            connection.execute(f"PRAGMA application_id = {application_id}")
            connection.execute(f"PRAGMA user_version = {number}")
            connection.execute("COMMIT")
        finally:
            if connection.in_transaction:
                connection.execute("ROLLBACK")
            connection.execute("PRAGMA foreign_keys = ON")


def schema_of(connection: sqlite3.Connection) -> Schema:
    """Every table, index, view and trigger of a file, as it was declared.

    Statistics that other programs leave in a file they looked at are not counted.
    """
    rows = connection.execute(
        "SELECT type, name, tbl_name, sql FROM sqlite_schema"
        " WHERE name NOT GLOB 'sqlite_stat*' ORDER BY type, name"
    )
    return tuple(rows.fetchall())


@cache
def expected_schema(steps: tuple[Migration, ...]) -> Schema:
    """What :func:`schema_of` gives for a file these steps made."""
    connection = sqlite3.connect(":memory:", isolation_level=None)
    try:
        migrate(connection, steps)
        return schema_of(connection)
    finally:
        connection.close()
