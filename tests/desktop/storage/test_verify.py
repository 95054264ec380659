"""Values that were changed outside the program are noticed, however well formed the file is."""

from __future__ import annotations

import json
import sqlite3
from collections.abc import Callable
from hashlib import blake2b
from pathlib import Path
from random import Random

import pytest

from desktop.errors import StorageError
from desktop.journal.records import Entry
from desktop.journal.row_change import RowChange
from desktop.storage.rows import TABLES
from desktop.storage.store import Store
from tests.desktop.storage.samples import FULL, added, minutes


@pytest.fixture
def kept(path: Path) -> Path:
    with Store.create(path, FULL) as store:
        store.write("put value", added(*(_entry(day) for day in range(1, 10))))
        store.write("put value", [RowChange(_entry(1, 30.0), _entry(1, 45.0))])
        store.write("clear values", [RowChange(_entry(2, 30.0), None)])
    return path


def _entry(day: int, value: float = 30.0) -> Entry:
    return minutes(day, value, measure=7)


def tamper(path: Path, *statements: str) -> None:
    """Change the file as a careful hand would: no trigger in the way, and none missing afterwards."""
    connection = sqlite3.connect(path, isolation_level=None)
    triggers = connection.execute("SELECT name, sql FROM sqlite_schema WHERE type = 'trigger'").fetchall()
    connection.execute("BEGIN")
    for name, _ in triggers:
        connection.execute(f"DROP TRIGGER {name}")
    for statement in statements:
        assert connection.execute(statement).rowcount > 0
    for _, sql in triggers:
        connection.execute(sql)
    connection.execute("COMMIT")
    connection.close()


def damage_found(path: Path, act: Callable[[Store], object] = Store.verify) -> StorageError:
    with Store.open(path) as store, pytest.raises(StorageError) as caught:
        act(store)
    assert caught.value.reason == "damaged"
    return caught.value


def test_an_untouched_journal_is_whole(kept: Path) -> None:
    tamper(kept)
    with Store.open(kept) as store:
        store.verify()
        assert len(store.steps()) == 4


@pytest.mark.parametrize(
    "statement",
    [
        "UPDATE entry SET value = 31 WHERE day = '2026-03-05'",
        "UPDATE entry SET note = 'other' WHERE day = '2026-03-05'",
        "DELETE FROM entry WHERE day = '2026-03-05'",
        "INSERT INTO entry SELECT measure, '2026-04-01', slot, value, kind, note, original, source, entered_at"
        " FROM entry LIMIT 1",
        "UPDATE person SET question = ''",
        "UPDATE change SET measures = '12,7'",
        "UPDATE history SET before = NULL WHERE seq = 17",
        "UPDATE history SET after = replace(after, '45', '46') WHERE seq = 17",
        "UPDATE history SET at = '2020-01-01T00:00:00' WHERE seq = 3",
        "UPDATE history SET act = 'set kind' WHERE seq = 9",
        "UPDATE history SET chain = x'00112233445566778899aabbccddeeff' WHERE seq = 4",
        "DELETE FROM history WHERE seq = 10",
        "DELETE FROM history WHERE seq = 1",
        "DELETE FROM history WHERE seq = 18",
        "UPDATE history SET seq = 30 WHERE seq = 18",
    ],
)
def test_what_was_changed_outside(kept: Path, statement: str) -> None:
    tamper(kept, statement)
    error = damage_found(kept)
    assert error.fields["detail"]


def test_each_row_of_the_history_is_tied_to_the_one_before(kept: Path) -> None:
    """The rule of the chain, written out a second time."""
    connection = sqlite3.connect(kept)
    rows = connection.execute("SELECT * FROM history ORDER BY seq").fetchall()
    connection.close()
    assert len(rows) == 18
    chain = bytes(16)
    for *cells, found in rows:
        text = json.dumps(cells, ensure_ascii=False, separators=(",", ":"))
        chain = blake2b(chain + text.encode("utf-8"), digest_size=16).digest()
        assert found == chain


def test_a_value_changed_in_table_and_history_alike(kept: Path) -> None:
    tamper(
        kept,
        "UPDATE entry SET value = 46 WHERE value = 45",
        "UPDATE history SET after = replace(after, '\"value\":45.0', '\"value\":46.0') WHERE seq = 17",
    )
    assert damage_found(kept).fields == {
        "path": str(kept),
        "detail": "the chain of the history is broken",
        "seq": 17,
    }


def test_a_step_from_what_was_not_there(kept: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """A true chain over a history that contradicts itself: only a fault of ours could write it."""
    monkeypatch.setattr("desktop.storage.store._make", lambda *_: None)
    with Store.open(kept) as store:
        store.write("put value", [RowChange(_entry(3, 77.0), _entry(3, 30.0))])
    assert damage_found(kept).fields["detail"] == "a step starts from what was not there"


def test_an_entry_of_no_measure(kept: Path) -> None:
    tamper(kept, "UPDATE plan SET measure = 8")
    assert damage_found(kept).fields["detail"] == "foreign_key_check: plan"


def test_a_row_that_is_no_record(kept: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """Checks in the file stop such a row, so the reading of it is made to fail."""

    def no_day(text: str) -> None:
        raise ValueError(text)

    with Store.open(kept) as store:
        monkeypatch.setattr(TABLES["note"], "_to_field", [(0, False, no_day)])
        for act in (store.read, store.verify):
            with pytest.raises(StorageError) as caught:
                act()
            assert (caught.value.reason, caught.value.fields["detail"]) == ("damaged", "a row is not a record")


def test_a_history_that_cannot_be_read(kept: Path) -> None:
    tamper(kept, "UPDATE history SET after = '{\"day\":5}' WHERE tbl = 'note'")
    assert damage_found(kept, lambda store: store.steps()).fields["detail"]
    assert damage_found(kept, lambda store: store.history_of(("note", "2026-01-06"))).fields["detail"]
    with Store.open(kept) as store:
        assert len(store.steps(2)) == 2


def test_a_text_that_is_none(kept: Path) -> None:
    contents = kept.read_bytes()
    assert contents.count(b"slept badly") == 2
    kept.write_bytes(contents.replace(b"slept badly", b"slept \xff\xfe\xfdly"))
    assert damage_found(kept, Store.read).fields["detail"]
    assert damage_found(kept, Store.steps).fields["detail"]
    assert damage_found(kept).fields["detail"]


def test_a_name_of_a_table_that_is_none(kept: Path) -> None:
    kept.write_bytes(kept.read_bytes().replace(b'CREATE TABLE "note"', b'CREATE TABLE "n\xffte"'))
    with pytest.raises(StorageError) as caught:
        Store.open(kept)
    assert caught.value.reason == "damaged"


def test_a_damaged_index(kept: Path) -> None:
    """Quick checks at opening do not look at the contents of an index."""
    tamper(kept, "UPDATE person SET name = name")
    connection = sqlite3.connect(kept, isolation_level=None)
    root = connection.execute("SELECT rootpage FROM sqlite_schema WHERE name = 'one_person'").fetchone()[0]
    connection.close()
    contents = bytearray(kept.read_bytes())
    page = memoryview(contents)[(root - 1) * 4096 : root * 4096]
    page[3:5] = bytes(2)
    page[5:7] = (4096).to_bytes(2, "big")
    kept.write_bytes(contents)
    assert damage_found(kept).fields["detail"].startswith("integrity_check")


def test_single_flipped_bits_that_change_anything_are_noticed(kept: Path) -> None:
    """Every flip either changes nothing that is read, or opening, reading or checking says so."""
    whole = kept.read_bytes()
    with Store.open(kept) as store:
        records, steps = sorted(map(repr, store.read().records())), store.steps()
    random = Random(4)
    noticed = 0
    for _ in range(400):
        contents = bytearray(whole)
        contents[random.randrange(len(whole))] ^= 1 << random.randrange(8)
        kept.write_bytes(contents)
        try:
            with Store.open(kept) as store:
                store.verify()
                assert sorted(map(repr, store.read().records())) == records
                assert store.steps() == steps
        except StorageError:
            noticed += 1
    assert 20 < noticed < 400
