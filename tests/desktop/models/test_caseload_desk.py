"""One open caseload: the queue follows the folder, and a coach's edits are on the disk when they are made."""

from __future__ import annotations

import shutil
from dataclasses import replace
from datetime import datetime
from pathlib import Path

import pytest

from desktop.edits.clients import add_clients, mark_looked_at, set_client, set_coach, write_session
from desktop.errors import StorageError
from desktop.journal.clients import Client, Coach, CoachingSession
from desktop.models.caseload_desk import CaseloadDesk
from desktop.storage.backups import copies_of
from desktop.storage.store import CaseloadStore
from tests.desktop.caseload.journals import JOURNAL_ID, MONDAY, day, journal, level
from tests.scoreboard.clients_folder import write_journal

NOW = datetime(2031, 3, 31, 8)


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    place = tmp_path / "logs"
    place.mkdir()
    write_journal(place / "ana.dayfence", journal(*level(1, 40, 3, 30)))
    return place


@pytest.fixture
def path(tmp_path: Path, folder: Path) -> Path:
    place = tmp_path / "clients.caseload"
    CaseloadStore.create(place, Coach("c" * 32, "", str(folder))).close()
    return place


@pytest.fixture
def desk(path: Path, qtbot):
    one = CaseloadDesk(CaseloadStore.open(path, clock=lambda: NOW, alone=True), now=lambda: NOW)
    yield one
    one.close()


def look(desk: CaseloadDesk, qtbot) -> int:
    with qtbot.waitSignal(desk.looked_through, timeout=20_000) as told:
        desk.look_again()
    return told.args[0]


def reopened(path: Path) -> CaseloadStore:
    return CaseloadStore.open(path, to_read=True)


def test_a_new_journal_becomes_a_client_named_after_its_owner(desk, path, qtbot):
    assert look(desk, qtbot) == 1
    (row,) = desk.rows()
    assert (row.client.code, row.client.journal_id) == ("Ana", JOURNAL_ID)
    assert look(desk, qtbot) == 0
    desk.close()
    with reopened(path) as store:
        assert store.read() == desk.caseload
        assert list(store.remembered()) == ["ana.dayfence"]


def test_taking_new_clients_back_and_again_survives_a_restart(desk, path, qtbot):
    look(desk, qtbot)
    desk.undo()
    assert desk.caseload.clients == {}
    assert desk.redoable is not None
    desk.redo()
    desk.close()
    again = CaseloadDesk(CaseloadStore.open(path, clock=lambda: NOW), now=lambda: NOW)
    assert again.undoable.act == "add clients"
    assert [one.code for one in again.caseload.clients.values()] == ["Ana"]
    again.close()


def test_a_newer_copy_takes_the_older_ones_place_and_the_notes_stay(desk, folder, qtbot):
    look(desk, qtbot)
    client = next(iter(desk.caseload.clients))
    desk.do(write_session(desk.caseload, CoachingSession(client, day(14), "stairs", note="tired")))
    newer = folder.parent / "newer.dayfence"
    write_journal(newer, journal(*level(1, 40, 1, 30)))
    shutil.move(newer, folder / "ana.dayfence")
    assert look(desk, qtbot) == 0
    assert desk.facts[JOURNAL_ID].last == day(1).toordinal()
    assert desk.caseload.sessions_of(client)[0].note == "tired"


@pytest.mark.parametrize("name", ["a older.dayfence", "z older.dayfence"])
def test_of_two_files_of_one_journal_the_one_that_reaches_farther_counts(desk, folder, qtbot, name):
    write_journal(folder / name, journal(*level(1, 40, 10, 30)))
    assert look(desk, qtbot) == 1
    assert desk.facts[JOURNAL_ID].last == day(3).toordinal()
    assert desk.files[JOURNAL_ID].name == "ana.dayfence"


def test_a_file_that_is_gone_leaves_a_client_without_a_journal(desk, folder, path, qtbot):
    look(desk, qtbot)
    (folder / "ana.dayfence").unlink()
    look(desk, qtbot)
    (row,) = desk.rows()
    assert [one.kind for one in row.reasons] == ["missing"]
    desk.close()
    with reopened(path) as store:
        assert store.remembered() == {}


def test_a_file_that_gets_damaged_keeps_what_was_known(desk, folder, qtbot):
    look(desk, qtbot)
    contents = bytearray((folder / "ana.dayfence").read_bytes())
    contents[4096:8192] = bytes(4096)
    (folder / "ana.dayfence").write_bytes(contents)
    look(desk, qtbot)
    (row,) = desk.rows()
    assert row.reasons[-1].kind == "unreadable"
    assert row.facts is not None
    (folder / "ana.dayfence").unlink()
    write_journal(folder / "ana.dayfence", journal(*level(1, 40, 1, 30)))
    look(desk, qtbot)
    assert desk.rows()[0].reasons == ()


def test_a_strangers_file_is_named_and_belongs_to_nobody(desk, folder, qtbot):
    (folder / "notes.dayfence").write_bytes(b"no journal")
    assert look(desk, qtbot) == 1
    assert desk.strange["notes.dayfence"].reason == "not a journal"
    (folder / "notes.dayfence").unlink()
    look(desk, qtbot)
    assert desk.strange == {}


def test_a_folder_that_is_gone_is_told(desk, folder, qtbot):
    shutil.rmtree(folder)
    with qtbot.waitSignal(desk.not_readable) as told:
        desk.look_again()
    assert told.args[0].reason == "missing"
    qtbot.waitUntil(lambda: not desk.is_reading)


def test_what_is_agreed_today_is_for_the_next_time(desk, qtbot):
    look(desk, qtbot)
    client = next(iter(desk.caseload.clients))
    desk.do(write_session(desk.caseload, CoachingSession(client, MONDAY, "stairs")))
    look(desk, qtbot)
    assert desk.facts[JOURNAL_ID].session is None


def test_an_edit_that_cannot_be_written_changes_nothing(desk, qtbot, monkeypatch):
    look(desk, qtbot)
    client = next(iter(desk.caseload.clients.values()))

    def fails(*_, **__):
        raise StorageError("disk full", path="x")

    monkeypatch.setattr(desk._store, "write", fails)
    with pytest.raises(StorageError):
        desk.do(set_client(desk.caseload, replace(client, code="K8")))
    assert desk.caseload.clients[client.id] == client


def test_the_copy_of_the_day_is_taken_and_damage_is_told(desk, path, qtbot):
    look(desk, qtbot)
    desk.look_after()
    desk.wait()
    assert len(copies_of(path)) == 1
    contents = bytearray(path.read_bytes())
    contents[4096:8192] = bytes(4096)
    path.write_bytes(contents)
    with qtbot.waitSignal(desk.not_kept) as told:
        desk.look_after()
    assert told.args[0].reason == "damaged"


def test_opened_to_read_nothing_is_added(path, folder, qtbot):
    desk = CaseloadDesk(CaseloadStore.open(path, to_read=True), now=lambda: NOW)
    with qtbot.waitSignal(desk.looked_through):
        desk.look_again()
    assert desk.caseload.clients == {}
    assert (desk.undoable, desk.redoable) == (None, None)
    desk.close()


def test_a_journal_is_read_beside_the_folder(desk, qtbot):
    look(desk, qtbot)
    client = next(iter(desk.caseload.clients.values()))
    got = []
    desk.read_journal(client, got.append, got.append)
    qtbot.waitUntil(lambda: bool(got))
    assert got[0].person.journal_id == JOURNAL_ID


def test_the_edits_of_a_coach(desk, qtbot):
    caseload = desk.caseload
    found = [("1" * 32, "Ana"), ("2" * 32, "Ana"), ("1" * 32, "twice"), ("3" * 32, " ")]
    desk.do(add_clients(caseload, desk._ids, found))
    assert [one.code for one in caseload.clients.values()] == ["Ana", "Ana 2", "client"]
    assert not add_clients(caseload, desk._ids, found)
    desk.do(mark_looked_at(caseload, 1, MONDAY, "quiet-7"))
    assert caseload.clients[1] == Client(1, "1" * 32, "Ana", looked_on=MONDAY, looked_reasons="quiet-7")
    desk.do(set_coach(caseload, replace(caseload.coach, name="Coach")))
    assert caseload.coach.name == "Coach"
    written = CoachingSession(1, MONDAY, "stairs")
    desk.do(write_session(caseload, written))
    assert not write_session(caseload, written)
    desk.do(write_session(caseload, CoachingSession(1, MONDAY)))
    assert caseload.sessions_of(1) == []
    assert not write_session(caseload, CoachingSession(1, MONDAY))
    with pytest.raises(ValueError, match="spare"):
        write_session(caseload, CoachingSession(1, MONDAY, times=1, spare=2))


def test_another_clients_journal_under_the_old_name_is_the_other_clients(desk, folder, qtbot):
    write_journal(folder / "bob.dayfence", others("b" * 32))
    look(desk, qtbot)
    anna = desk.caseload.client_of(JOURNAL_ID)
    shutil.copyfile(folder / "bob.dayfence", folder / "ana.dayfence")
    got = []
    # Before the folder is looked at again the file is refused, since it is not Anna's.
    desk.read_journal(anna, got.append, got.append)
    qtbot.waitUntil(lambda: bool(got))
    assert isinstance(got[0], StorageError)
    look(desk, qtbot)
    assert JOURNAL_ID not in desk.files
    assert {row.client.id: [one.kind for one in row.reasons] for row in desk.rows()}[anna.id] == ["missing"]


def others(journal_id: str):
    whole = journal(*level(1, 40, 1, 300))
    return replace(whole, person=replace(whole.person, journal_id=journal_id, name="Bob"))


def test_a_whole_older_copy_counts_while_the_newer_one_is_damaged(desk, folder, qtbot):
    write_journal(folder / "z newer.dayfence", journal(*level(1, 40, 1, 30)))
    look(desk, qtbot)
    assert desk.facts[JOURNAL_ID].last == day(1).toordinal()
    (folder / "z newer.dayfence").write_bytes(b"no journal any more")
    look(desk, qtbot)
    assert desk.facts[JOURNAL_ID].last == day(3).toordinal()
    assert JOURNAL_ID not in desk.errors
    assert list(desk.strange) == ["z newer.dayfence"]


def test_what_is_remembered_is_shown_before_anything_is_read(desk, path, folder, qtbot):
    look(desk, qtbot)
    desk.close()
    shutil.rmtree(folder)
    again = CaseloadDesk(CaseloadStore.open(path, clock=lambda: NOW), now=lambda: NOW)
    (row,) = again.rows()
    assert row.facts is not None
    with qtbot.waitSignal(again.not_readable):
        again.look_again()
    (row,) = again.rows()
    assert [one.kind for one in row.reasons] == []
    again.close()


def test_another_folder_chosen_while_one_is_read_is_read(desk, tmp_path, qtbot):
    other = tmp_path / "other"
    other.mkdir()
    write_journal(other / "bob.dayfence", others("b" * 32))
    desk.look_again()
    desk.do(set_coach(desk.caseload, replace(desk.caseload.coach, folder=str(other))))
    with qtbot.waitSignal(desk.looked_through, timeout=20_000):
        desk.look_again()
    assert list(desk.files) == ["b" * 32]
    assert desk.all_read


def test_a_session_with_the_next_one_is_one_act(desk, qtbot):
    look(desk, qtbot)
    client = next(iter(desk.caseload.clients.values()))
    written = CoachingSession(client.id, MONDAY, "stairs")
    desk.do(write_session(desk.caseload, written, replace(client, next_session=day(-14))))
    assert desk.caseload.clients[client.id].next_session == day(-14)
    desk.undo()
    assert desk.caseload.clients[client.id] == client
    assert desk.caseload.sessions_of(client.id) == []
    only_next = write_session(
        desk.caseload, CoachingSession(client.id, MONDAY), replace(client, next_session=day(-7))
    )
    assert (only_next.act, len(only_next.changes)) == ("set client", 1)


def test_closed_while_reading_nothing_is_written_afterwards(desk, folder, qtbot):
    for number in range(6):
        write_journal(folder / f"x{number}.dayfence", others(f"{number:032x}"))
    desk.look_again()
    desk.close()
    qtbot.waitUntil(lambda: not desk.is_reading)
    assert desk.caseload.clients == {}
