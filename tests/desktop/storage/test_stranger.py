"""A hostile file is refused at once, and a good one is read as data."""

from __future__ import annotations

import sqlite3
import time
from datetime import date, timedelta
from pathlib import Path

import pytest

from desktop.journal.records import DayNote
from desktop.storage import stranger
from desktop.storage.store import Store
from desktop.storage.stranger import read_stranger
from tests.desktop.storage.samples import FULL, added, minutes, refusal


@pytest.fixture
def file(path: Path) -> Path:
    with Store.create(path, FULL) as store:
        store.write("put value", added(minutes(1, measure=7), minutes(2, measure=7)))
    return path


def alter(path: Path, *statements: str) -> None:
    connection = sqlite3.connect(path, isolation_level=None)
    connection.execute("PRAGMA writable_schema = ON")
    for statement in statements:
        connection.execute(statement)
    connection.close()


def test_a_good_one_is_read_and_left_as_it_is(file: Path) -> None:
    before, at = file.read_bytes(), file.stat().st_mtime_ns
    journal = read_stranger(file)
    assert set(FULL) < set(journal.records())
    assert len(journal.entries[7]) == 3
    assert (file.read_bytes(), file.stat().st_mtime_ns) == (before, at)


@pytest.mark.parametrize(
    "statements",
    [
        ("CREATE VIEW more AS WITH RECURSIVE a(b) AS (SELECT 1 UNION ALL SELECT b FROM a) SELECT b FROM a",),
        ("CREATE TRIGGER more AFTER INSERT ON note BEGIN DELETE FROM entry; END",),
        ("CREATE TABLE more (a, b AS (hex(zeroblob(400000000))))", "INSERT INTO more (a) VALUES (1)"),
        ("DROP TRIGGER history_stays",),
        ("DROP TABLE plan", "CREATE VIEW plan AS SELECT 1 AS id"),
        ("UPDATE sqlite_schema SET sql = replace(sql, 'STRICT', '') WHERE name = 'note'",),
        ("UPDATE sqlite_schema SET sql = 'CREATE TABLE note (day, text, x AS (randomblob(900000000)))'"
         " WHERE name = 'note'",),
    ],
)  # fmt: skip
def test_what_declares_anything_of_its_own_is_refused_at_once(file: Path, statements: tuple[str, ...]) -> None:
    alter(file, *statements)
    began = time.monotonic()
    assert refusal(lambda: read_stranger(file)).reason == "damaged"
    assert time.monotonic() - began < 1


def test_values_of_an_unlikely_size(file: Path) -> None:
    alter(
        file,
        "PRAGMA ignore_check_constraints = ON",
        "UPDATE note SET text = hex(zeroblob(30000000))",
    )
    assert refusal(lambda: read_stranger(file)).reason in ("refused value", "damaged")


def test_a_value_that_no_history_leads_to(file: Path) -> None:
    alter(file, "UPDATE note SET text = 'other'")
    assert refusal(lambda: read_stranger(file)).reason == "damaged"


def test_other_files(file: Path, journal_folder: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    assert refusal(lambda: read_stranger(journal_folder / "none")).reason == "missing"
    assert refusal(lambda: read_stranger(journal_folder)).reason == "not a journal"
    other = journal_folder / "other"
    other.write_bytes(b"day,minutes\n" * 100)
    assert refusal(lambda: read_stranger(other)).reason == "not a journal"
    for end in ("-journal", "-wal"):
        beside = file.with_name(file.name + end)
        beside.touch()
        assert refusal(lambda: read_stranger(file)).fields["detail"] == "a step of it is not finished"
        beside.unlink()
    contents = bytearray(file.read_bytes())
    contents[18:20] = b"\x02\x02"
    other.write_bytes(contents)
    assert refusal(lambda: read_stranger(other)).fields["detail"] == "it needs a second file"
    alter(file, "PRAGMA user_version = 99")
    assert refusal(lambda: read_stranger(file)).reason == "newer version"
    monkeypatch.setattr(stranger, "MOST_BYTES", 1000)
    assert refusal(lambda: read_stranger(file)).fields["detail"] == "larger than a journal"


def test_reading_that_takes_too_long_is_given_up(file: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(stranger, "SECONDS", -1.0)
    with Store.open(file) as store:
        store.write("put value", added(*(minutes(day, measure=7) for day in range(3, 31))))
        for number in range(40):
            store.write("write note", added(*(_note(number * 20 + place) for place in range(20))))
    assert refusal(lambda: read_stranger(file)).reason == "damaged"


def _note(number: int) -> DayNote:
    return DayNote(date(2020, 1, 1) + timedelta(number), "x" * 200)


def test_only_the_tables_can_be_read(file: Path) -> None:
    connection = sqlite3.connect(file)
    connection.set_authorizer(stranger._allow)
    assert connection.execute('SELECT "day" FROM "note"').fetchall()
    for statement in (
        "DELETE FROM note",
        "ATTACH ':memory:' AS a",
        "PRAGMA writable_schema = ON",
        "SELECT sql FROM sqlite_schema",
        "SELECT * FROM history",
        "SELECT hex(day) FROM note",
        "CREATE TABLE a (b)",
    ):
        with pytest.raises(sqlite3.DatabaseError, match=r"not authorized|prohibited"):
            connection.execute(statement)
    connection.close()
