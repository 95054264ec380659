"""What the file itself refuses, whoever writes into it."""

from __future__ import annotations

import re
import sqlite3
from collections.abc import Iterator
from dataclasses import replace
from datetime import date
from types import NoneType
from typing import Any, get_args, get_type_hints

import pytest

from desktop.journal.records import Change, Entry, Measure, Plan, Record, Span
from desktop.journal.row_change import Step
from desktop.storage.migrations import migrate
from desktop.storage.rows import TABLES, Cell, table_of
from desktop.storage.schema import VERSION_1
from tests.desktop.storage.samples import EXERCISE, FULL, minutes

DAY = date(2026, 3, 1)


@pytest.fixture
def connection() -> Iterator[sqlite3.Connection]:
    opened = sqlite3.connect(":memory:", isolation_level=None)
    migrate(opened)
    put(opened, EXERCISE)
    yield opened
    opened.close()


def put(connection: sqlite3.Connection, record: Record, **cells: object) -> None:
    """Insert a record with some cells as given, past any check of ours."""
    table = table_of(record)
    row = dict(zip(table.columns, table.cells(record), strict=True)) | cells
    connection.execute(table.insert, list(row.values()))


def test_every_kind_of_record_is_taken(connection: sqlite3.Connection) -> None:
    for record in FULL:
        put(connection, record)
        table = table_of(record)
        assert record in [table.record(row) for row in connection.execute(table.select)]


@pytest.mark.parametrize("day", ["1900-01-01", "2024-02-29", "2000-02-29", "2026-12-31", "2199-12-31"])
def test_days_that_exist(connection: sqlite3.Connection, day: str) -> None:
    put(connection, minutes(1), day=day)
    assert connection.execute("SELECT day FROM entry").fetchall() == [(day,)]


@pytest.mark.parametrize(
    "day",
    [
        "2023-02-29",
        "2024-02-30",
        "2024-04-31",
        "1900-02-29",
        "2026-00-10",
        "2026-13-01",
        "2026-01-00",
        "2026-1-1",
        "20260101",
        "2026-01-01 ",
        "2026-01-01T00:00",
        "1899-12-31",
        "2200-01-01",
        "now",
        "",
        "12345.6",
        None,
        5,
        b"2026-01-01",
    ],
)
@pytest.mark.parametrize(("table", "column"), [("entry", "day"), ("plan", "first"), ("note", "day")])
def test_days_that_do_not(connection: sqlite3.Connection, day: object, table: str, column: str) -> None:
    record = next(record for record in FULL if table_of(record).name == table)
    with pytest.raises(sqlite3.IntegrityError):
        put(connection, record, **{column: day})


def test_a_day_that_may_be_missing(connection: sqlite3.Connection) -> None:
    put(connection, replace(EXERCISE, id=2, look_day=None))
    with pytest.raises(sqlite3.IntegrityError):
        put(connection, replace(EXERCISE, id=3), look_day="2026-02-30")
    with pytest.raises(sqlite3.IntegrityError):
        put(connection, replace(EXERCISE, id=3), look_day="now")


@pytest.mark.parametrize("value", [-1e9, 1e9, 0.0, 0.1])
def test_numbers_in_range(connection: sqlite3.Connection, value: float) -> None:
    put(connection, minutes(1, value))
    assert connection.execute("SELECT value FROM entry").fetchall() == [(value,)]


@pytest.mark.parametrize(
    "value", [float("inf"), float("-inf"), float("nan"), 1.1e9, -1.1e9, "5x", b"5", 10**18, None]
)
def test_numbers_out_of_range(connection: sqlite3.Connection, value: object) -> None:
    with pytest.raises(sqlite3.IntegrityError):
        put(connection, minutes(1), value=value)


def text_columns() -> list[tuple[str, str]]:
    closed = {(name, column) for name, column, _ in word_columns()}
    strict = {"journal_id", "measures", "entered_at"}
    return [
        (table_of(record).name, column)
        for record in FULL
        for column, hint in get_type_hints(type(record)).items()
        if hint is str and (table_of(record).name, column) not in closed and column not in strict
    ]


def word_columns() -> list[tuple[str, str, tuple[object, ...]]]:
    """Table, column and words of every field that takes a few words only."""
    found = []
    for record in FULL:
        for column, hint in get_type_hints(type(record)).items():
            parts = [part for part in get_args(hint) if part is not NoneType]
            words = get_args(parts[0]) if parts and not isinstance(parts[0], str) else tuple(parts)
            if words and all(isinstance(word, str) for word in words):
                found.append((table_of(record).name, column, words))
    return found


@pytest.mark.parametrize(("table", "column"), text_columns())
def test_texts_are_counted_in_bytes_and_hold_no_zero_byte(
    connection: sqlite3.Connection, table: str, column: str
) -> None:
    record = next(record for record in FULL if table_of(record).name == table)
    (declared,) = connection.execute("SELECT sql FROM sqlite_schema WHERE name = ?", (table,)).fetchone()
    limit = int(re.search(rf'CAST\("{column}" AS BLOB\)\) <= (\d+)', declared).group(1))  # type: ignore[union-attr]
    connection.execute("PRAGMA foreign_keys = OFF")
    for bad in ("x" * (limit + 1), "ü" * (limit // 2 + 1), "a\0b", "\0" + "x" * limit, None, b"x"):
        with pytest.raises(sqlite3.IntegrityError):
            put(connection, record, **{column: bad})
    put(connection, record, **{column: "x" * limit})
    assert connection.execute(f'SELECT 1 FROM "{table}" WHERE length("{column}") = {limit}').fetchone()


def test_there_are_closed_words_to_check() -> None:
    assert len(word_columns()) == 9


@pytest.mark.parametrize(("table", "column", "words"), word_columns())
def test_the_words_of_the_records_are_those_of_the_file(table: str, column: str, words: tuple[str, ...]) -> None:
    declared = next(statement for statement in VERSION_1 if f'CREATE TABLE "{table}"' in statement)
    listed = re.search(rf'"{column}" IN \(([^)]*)\)', declared)
    assert listed is not None
    assert sorted(re.findall(r"'([^']*)'", listed.group(1))) == sorted(words)


@pytest.mark.parametrize(("table", "column", "words"), word_columns())
def test_other_words_are_refused(
    connection: sqlite3.Connection, table: str, column: str, words: tuple[str, ...]
) -> None:
    record = next(record for record in FULL if table_of(record).name == table)
    for bad in ("", "other words", words[0].upper(), words[0] + " "):
        with pytest.raises(sqlite3.IntegrityError):
            put(connection, record, **{column: bad})


@pytest.mark.parametrize("kind", ["blank", "rest", "ill", "away"])
def test_days_without_a_value_hold_none(connection: sqlite3.Connection, kind: str) -> None:
    put(connection, minutes(1, None), kind=kind)
    with pytest.raises(sqlite3.IntegrityError):
        put(connection, minutes(2, 5.0), kind=kind)


@pytest.mark.parametrize("kind", ["value", "zero", "set aside", "late", "extra"])
def test_days_with_a_value_hold_one(connection: sqlite3.Connection, kind: str) -> None:
    put(connection, minutes(1, 0.0), kind=kind)
    with pytest.raises(sqlite3.IntegrityError):
        put(connection, minutes(2, None), kind=kind)


def test_a_zero_is_zero(connection: sqlite3.Connection) -> None:
    with pytest.raises(sqlite3.IntegrityError):
        put(connection, minutes(1, 0.5, kind="zero"))


MORE_REFUSED: list[tuple[Record, dict[str, Any]]] = [
    (FULL[0], {"journal_id": "0" * 31}),
    (FULL[0], {"journal_id": "G" * 32}),
    (FULL[0], {"journal_id": "0" * 31 + "\0"}),
    (Measure(0, 0, "x"), {}),
    (Measure(2, -1, "x"), {}),
    (Measure(2, 0, "x", decimals=10), {}),
    (Measure(2, 0, "x", goal_low=2.0, goal_high=1.0), {}),
    (Measure(2, 0, "x", likely_low=2.0, likely_high=1.0), {}),
    (Measure(2, 0, "x", worth=0.0), {}),
    (Measure(2, 0, "x"), {"archived": 2}),
    (Entry(1, DAY, value=1.0, entered_at="yesterday"), {}),
    (Entry(1, DAY, value=1.0, entered_at="2026-03-01"), {}),
    (Entry(1, DAY, value=1.0, entered_at="2026-03-01T21:04:05\0"), {}),
    (Entry(1, DAY, value=1.0, entered_at="2026-03-01T21:04:05" + "x" * 30), {}),
    (Entry(9, DAY, value=1.0), {}),
    (Plan(1, 9, DAY, 5), {}),
    (Plan(1, 1, DAY, 8), {}),
    (Plan(1, 1, DAY, 5, -1), {}),
    (Change(1, DAY, settle_days=-1), {}),
    (Change(1, DAY), {"measures": "x"}),
    (Change(1, DAY), {"measures": "1,"}),
    (Change(1, DAY), {"measures": ",1"}),
    (Change(1, DAY), {"measures": "1,,2"}),
    (Change(1, DAY), {"measures": "01"}),
    (Change(1, DAY), {"measures": "1,0"}),
    (Change(1, DAY), {"measures": "1\0x"}),
    (Span(1, date(2026, 3, 2), date(2026, 3, 1)), {}),
]


@pytest.mark.parametrize(("record", "cells"), MORE_REFUSED)
def test_what_else_is_refused(connection: sqlite3.Connection, record: Record, cells: dict[str, Cell]) -> None:
    with pytest.raises(sqlite3.IntegrityError):
        put(connection, record, **cells)


def test_there_is_one_person_who_stays(connection: sqlite3.Connection) -> None:
    put(connection, FULL[0])
    with pytest.raises(sqlite3.IntegrityError):
        put(connection, FULL[0], journal_id="f" * 32)
    with pytest.raises(sqlite3.IntegrityError, match="stays"):
        connection.execute(TABLES["person"].delete)


def test_one_entry_for_a_day_and_slot(connection: sqlite3.Connection) -> None:
    put(connection, minutes(1))
    put(connection, minutes(1, slot="morning"))
    with pytest.raises(sqlite3.IntegrityError):
        put(connection, minutes(1, 31.0))


GOOD_STEP = {
    "seq": 1,
    "step": 1,
    "at": "2026-03-01T21:04:05",
    "kind": "do",
    "act": "put value",
    "of": None,
    "tbl": "note",
    "key": "2026-03-01",
    "before": None,
    "after": "{}",
    "chain": bytes(16),
}


def note_step(connection: sqlite3.Connection, verb: str = "INSERT", **cells: object) -> None:
    row = GOOD_STEP | cells
    columns = ", ".join(f'"{name}"' for name in row)
    connection.execute(f"{verb} INTO history ({columns}) VALUES ({', '.join('?' * len(row))})", list(row.values()))


def test_the_history_only_grows(connection: sqlite3.Connection) -> None:
    note_step(connection)
    note_step(connection, seq=2, step=2, kind="undo", of=1)
    before = connection.execute("SELECT * FROM history").fetchall()
    for statement in ("DELETE FROM history", "UPDATE history SET act = 'x'", "UPDATE history SET seq = 9"):
        with pytest.raises(sqlite3.IntegrityError, match="only grows"):
            connection.execute(statement)
    for verb in ("INSERT OR REPLACE", "INSERT OR IGNORE", "REPLACE"):
        with pytest.raises(sqlite3.IntegrityError, match="only grows"):
            note_step(connection, verb, act="something else")
    assert connection.execute("SELECT * FROM history").fetchall() == before


@pytest.mark.parametrize(
    "cells",
    [
        {"step": 0},
        {"step": 2},
        {"at": "today"},
        {"at": ""},
        {"kind": "import"},
        {"kind": "undo"},
        {"kind": "do", "of": 1},
        {"tbl": "history"},
        {"after": None},
        {"chain": bytes(15)},
        {"chain": "0123456789abcdef"},
        {"chain": None},
        {"act": "a\0"},
    ],
)
def test_a_step_must_make_sense(connection: sqlite3.Connection, cells: dict[str, object]) -> None:
    with pytest.raises(sqlite3.IntegrityError):
        note_step(connection, **cells)


def test_a_step_cannot_take_itself_back(connection: sqlite3.Connection) -> None:
    note_step(connection)
    with pytest.raises(sqlite3.IntegrityError):
        note_step(connection, seq=2, step=2, kind="undo", of=2)
    assert {"at", "kind", "act", "of"} < set(get_type_hints(Step))
