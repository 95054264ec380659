"""The coach's own file: kept by the same rules as a journal, and never taken for one."""

from __future__ import annotations

import sqlite3
from dataclasses import replace
from datetime import UTC, datetime
from pathlib import Path

import pytest

from desktop.journal.caseload import Caseload
from desktop.journal.clients import Client, Coach, CoachingSession
from desktop.journal.records import Record
from desktop.journal.row_change import RowChange
from desktop.storage.backups import check_file, copies_of, newest_good_of, read_copy_of, take_copy
from desktop.storage.database import application_id_of
from desktop.storage.layout import CASELOAD
from desktop.storage.schema import APPLICATION_ID, CASELOAD_ID
from desktop.storage.store import CaseloadStore, SeenFile, Store
from desktop.storage.stranger import read_stranger
from tests.desktop.storage.samples import CASELOAD_FULL, EXERCISE, PERSON, added, refusal

NOON = datetime(2026, 3, 10, 12, tzinfo=UTC)


@pytest.fixture
def path(tmp_path: Path) -> Path:
    return tmp_path / "clients.caseload"


@pytest.fixture
def store(path: Path):
    with CaseloadStore.create(path, CASELOAD_FULL) as opened:
        yield opened


def client_of(store: CaseloadStore) -> Client:
    return next(iter(store.read().clients.values()))


def test_what_was_written_is_read_and_the_history_gives_it(store: CaseloadStore, path: Path) -> None:
    client = client_of(store)
    store.write("set client", [RowChange(client, replace(client, code="K8"))])
    store.close()
    with CaseloadStore.open(path) as again:
        again.verify()
        read = again.read()
        assert read == Caseload.of([CASELOAD_FULL[0], replace(client, code="K8"), CASELOAD_FULL[2]])
        assert [step.act for step in again.steps()] == ["start caseload", "set client"]
        assert again.highest_ids() == {"client": 3}


def test_a_caseload_is_of_one_coach(path: Path) -> None:
    with pytest.raises(ValueError, match="exactly one coach"):
        CaseloadStore.create(path, CASELOAD_FULL[1:])
    assert not path.exists()


@pytest.mark.parametrize("record", CASELOAD_FULL, ids=lambda one: type(one).__name__)
def test_a_journal_takes_nothing_of_a_coach(tmp_path: Path, record: Record) -> None:
    with Store.create(tmp_path / "log.dayfence", PERSON) as journal:
        assert refusal(lambda: journal.write("set client", added(record))).reason in ("damaged", "refused value")
        journal.verify()
        with pytest.raises(ValueError, match="never in a journal"):
            journal.read().apply(added(record))


def test_a_caseload_takes_nothing_of_a_person(store: CaseloadStore) -> None:
    assert refusal(lambda: store.write("add measure", added(EXERCISE))).reason in ("damaged", "refused value")
    store.verify()
    with pytest.raises(ValueError, match="not part of a caseload"):
        store.read().apply(added(EXERCISE))


def test_neither_is_opened_as_the_other(store: CaseloadStore, path: Path, tmp_path: Path) -> None:
    store.close()
    before = path.read_bytes()
    assert refusal(lambda: Store.open(path)).reason == "not a journal"
    assert refusal(lambda: read_stranger(path)).reason == "not a journal"
    assert path.read_bytes() == before
    journal = tmp_path / "log.dayfence"
    Store.create(journal, PERSON).close()
    assert refusal(lambda: CaseloadStore.open(journal)).reason == "not a journal"
    assert [application_id_of(one) for one in (path, journal)] == [CASELOAD_ID, APPLICATION_ID]


def test_what_is_no_file_of_sqlite_has_no_kind(tmp_path: Path) -> None:
    text = tmp_path / "log.csv"
    text.write_text("day,minutes\n")
    assert application_id_of(text) is None
    assert application_id_of(tmp_path / "gone") is None


def test_two_clients_are_never_of_one_journal(store: CaseloadStore) -> None:
    twin = replace(client_of(store), id=4)
    assert refusal(lambda: store.write("add clients", added(twin))).reason == "refused value"


def test_a_session_needs_its_client(store: CaseloadStore) -> None:
    lost = CoachingSession(99, datetime(2026, 3, 3).date(), "walks")
    assert refusal(lambda: store.write("write session", added(lost))).reason == "refused value"


def test_the_coach_record_stays(store: CaseloadStore, path: Path) -> None:
    store.close()
    connection = sqlite3.connect(path)
    with pytest.raises(sqlite3.IntegrityError, match="stays"):
        connection.execute("DELETE FROM coach")
    connection.close()


def test_what_is_remembered_of_files_is_in_no_history(store: CaseloadStore, path: Path) -> None:
    steps = store.last_step_number
    store.remember({"a.dayfence": SeenFile("1", "{}"), "b.dayfence": SeenFile("1", "{}")})
    store.remember({"a.dayfence": SeenFile("2", "[]")}, gone=["b.dayfence", "never there"])
    assert store.remembered() == {"a.dayfence": SeenFile("2", "[]")}
    assert store.last_step_number == steps
    store.verify()


def test_a_copy_is_taken_checked_and_read(store: CaseloadStore, path: Path) -> None:
    copy = take_copy(path, NOON, layout=CASELOAD)
    assert read_copy_of(copy.path, CASELOAD) == store.read()
    assert newest_good_of(copies_of(path), CASELOAD) == (copy, store.read())
    check_file(path, CASELOAD)
    assert refusal(lambda: check_file(path)).reason == "damaged"


def test_only_what_is_held_is_taken_away() -> None:
    caseload = Caseload.of(CASELOAD_FULL)
    coach, client, session = CASELOAD_FULL
    assert isinstance(client, Client)
    assert isinstance(session, CoachingSession)
    assert caseload.client_of(client.journal_id) == client
    assert caseload.client_of("0" * 32) is None
    assert caseload.sessions_of(client.id) == [session]
    caseload.apply([RowChange(session, None), RowChange(client, None)])
    assert (caseload.clients, caseload.sessions_of(client.id)) == ({}, [])
    with pytest.raises(ValueError, match="cannot be removed"):
        caseload.apply([RowChange(coach, None)])
    with pytest.raises(ValueError, match="starts from"):
        caseload.apply([RowChange(client, None)])
    with pytest.raises(ValueError, match="needs its coach"):
        Caseload.of([client])
    caseload.apply([RowChange(coach, Coach("0" * 32))])
    assert caseload.coach == Coach("0" * 32)
