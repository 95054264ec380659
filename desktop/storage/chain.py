"""The history as rows, each tied to all before it, and the check of a whole file."""

from __future__ import annotations

import hashlib
import json
import sqlite3
from collections.abc import Mapping, Sequence
from pathlib import Path
from typing import NamedTuple

from desktop.errors import StorageError
from desktop.journal.row_change import Act, RowChange, StepKind, key_of
from desktop.storage.rows import TABLES, Table, key_text, table_named

HISTORY = '"seq", "step", "at", "kind", "act", "of", "tbl", "key", "before", "after", "chain"'
"""The columns of the history, in the order of ``HistoryRow`` with the chain after it."""


_AS_JSON = json.JSONEncoder(ensure_ascii=False, separators=(",", ":"))


class HistoryRow(NamedTuple):
    """One row of the history without its chain."""

    seq: int
    step: int
    at: str
    kind: StepKind
    act: Act
    of: int | None
    tbl: str
    key: str
    before: str | None
    after: str | None

    @classmethod
    def of_cells(cls, cells: Sequence[object]) -> HistoryRow:
        """The row that was read as these cells, its chain last."""
        return cls(*cells[:-1])  # type: ignore[arg-type]

    def chained(self, previous: bytes) -> bytes:
        """The mark that ties this row to all rows before it."""
        row = _AS_JSON.encode(list(self)).encode()
        return hashlib.blake2b(previous + row, digest_size=16).digest()

    def change(self) -> RowChange:
        """The record before and after.

        Raises:
            ValueError: one of the two is not a record.
            TypeError: as above.
        """
        table = table_named(self.tbl)
        before, after = (None if text is None else table.from_json(text) for text in (self.before, self.after))
        return RowChange(before, after)


class Position(NamedTuple):
    """How far a history reaches."""

    seq: int = 0
    step: int = 0
    chain: bytes = bytes(16)


def position(connection: sqlite3.Connection) -> Position:
    """How far the history of an open file reaches."""
    found = connection.execute('SELECT "seq", "step", "chain" FROM "history" ORDER BY "seq" DESC LIMIT 1')
    return Position(*(found.fetchone() or ()))


def check_whole(connection: sqlite3.Connection, path: Path, tables: Mapping[str, Table] = TABLES) -> None:
    """Check a whole file: its pages, the chain of the history, and that the history gives the tables.

    Args:
        connection: open, inside a transaction or alone with the file.
        path: for the error.
        tables: those of the kind of file.

    Raises:
        StorageError: the file is damaged.
    """
    for check in ("integrity_check(1)", "foreign_key_check"):
        found = connection.execute(f"PRAGMA {check}").fetchall()
        if found not in ([], [("ok",)]):
            raise damaged(path, f"{check}: {found[0][0]}")
    replayed = _replay(connection, path)
    rows = [(table, row) for table in tables.values() for row in connection.execute(table.select)]
    try:
        held = {(table.name, key_text(key_of(table.record(row)))): table.json(row) for table, row in rows}
    except (ValueError, TypeError) as error:
        raise damaged(path, "a row is not a record") from error
    if replayed != held:
        raise damaged(path, "the history does not give what the tables hold")


def damaged(path: Path, detail: str, **fields: object) -> StorageError:
    """The error of a file that holds what it cannot hold; the detail names no value."""
    return StorageError("damaged", path=str(path), detail=detail, **fields)


def _replay(connection: sqlite3.Connection, path: Path) -> dict[tuple[str, str], str]:
    """What the history makes of nothing, each record as its JSON, by table and key."""
    held: dict[tuple[str, str], str] = {}
    chain = Position().chain
    for cells in connection.execute(f'SELECT {HISTORY} FROM "history" ORDER BY "seq"'):
        row = HistoryRow.of_cells(cells)
        chain = row.chained(chain)
        if cells[-1] != chain:
            raise damaged(path, "the chain of the history is broken", seq=row.seq)
        key = (row.tbl, row.key)
        try:
            complete = table_named(row.tbl).completed
            before, after = (None if text is None else complete(text) for text in (row.before, row.after))
        except (KeyError, ValueError) as error:
            raise damaged(path, "a row of the history is not a record", seq=row.seq) from error
        if held.pop(key, None) != before:
            raise damaged(path, "a step starts from what was not there", seq=row.seq)
        if after is not None:
            held[key] = after
    return held
