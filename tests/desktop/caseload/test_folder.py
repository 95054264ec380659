"""The folder of journals: each guarded, remembered until it changes, and none keeps the others from being read."""

from __future__ import annotations

import shutil
from dataclasses import replace
from pathlib import Path

import pytest

from desktop.caseload.facts import Facts
from desktop.caseload.folder import journals_in, look_at, look_through
from desktop.errors import StorageError
from desktop.journal.clients import Client, Coach
from desktop.storage.store import CaseloadStore, SeenFile, Store
from tests.desktop.caseload.journals import CLIENT, JOURNAL_ID, day, journal, level, session
from tests.scoreboard.clients_folder import write_journal


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    place = tmp_path / "logs"
    place.mkdir()
    write_journal(place / "ana.dayfence", journal(*level(1, 40, 1, 30)))
    return place


def looked(folder: Path, remembered=None, known=None, **how):
    return list(look_through(journals_in(folder), remembered or {}, known or {}, **how))


def test_a_journal_becomes_facts_and_is_not_touched(folder):
    path = folder / "ana.dayfence"
    before = path.read_bytes(), path.stat().st_mtime_ns
    (one,) = looked(folder)
    assert (one.name, one.error) == ("ana.dayfence", None)
    assert one.facts.journal_id == JOURNAL_ID
    assert one.facts.last == day(1).toordinal()
    assert (path.read_bytes(), path.stat().st_mtime_ns) == before
    assert [one.name for one in folder.iterdir()] == ["ana.dayfence"]


def test_a_file_that_is_as_it_was_is_not_read_again(folder, monkeypatch):
    (one,) = looked(folder)
    monkeypatch.setattr("desktop.caseload.folder.look_at_stranger", lambda path: pytest.fail(f"{path} was read"))
    (again,) = looked(folder, {one.name: one.seen})
    assert again.facts == one.facts


@pytest.mark.parametrize("changed", ["file", "session", "measures", "rubbish"])
def test_what_changed_is_read_again(folder, changed):
    path = folder / "ana.dayfence"
    known = {JOURNAL_ID: (CLIENT, (session(14, "x"),))}
    (one,) = looked(folder, known=known)
    remembered = {one.name: one.seen}
    if changed == "file":
        path.unlink()
        write_journal(path, journal(*level(1, 40, 3, 30)))
    elif changed == "session":
        known = {JOURNAL_ID: (CLIENT, (session(14, "x"), session(7)))}
    elif changed == "measures":
        known = {JOURNAL_ID: (replace(CLIENT, outcome=1), (session(14, "x"),))}
    else:
        remembered = {one.name: SeenFile(one.seen.stamp, "{}")}
    (again,) = looked(folder, remembered, known)
    assert (again.facts == one.facts) is (changed == "rubbish")
    assert again.seen is not None


def test_notes_alone_do_not_make_it_read_again(folder, monkeypatch):
    known = {JOURNAL_ID: (CLIENT, (session(14, "x"),))}
    (one,) = looked(folder, known=known)
    monkeypatch.setattr("desktop.caseload.folder.look_at_stranger", lambda path: pytest.fail(f"{path} was read"))
    noted = {JOURNAL_ID: (replace(CLIENT, code="other", looked_on=day(0)), (session(14, "x", note="tired"),))}
    assert looked(folder, {one.name: one.seen}, noted)[0].facts == one.facts


def spoil(path: Path) -> None:
    contents = bytearray(path.read_bytes())
    contents[4096:8192] = bytes(4096)
    path.write_bytes(contents)


@pytest.mark.parametrize(
    ("make", "reason"),
    [
        (spoil, "damaged"),
        (lambda path: path.write_bytes(b"no journal"), "not a journal"),
        (lambda path: path.write_bytes(b""), "not a journal"),
        (lambda path: (path.unlink(), path.mkdir()), "not a journal"),
        (lambda path: (path.unlink(), CaseloadStore.create(path, Coach("0" * 32)).close()), "not a journal"),
    ],
)
def test_a_file_that_cannot_be_read_says_so_and_the_others_are_read(folder, make, reason):
    shutil.copyfile(folder / "ana.dayfence", folder / "b.dayfence")
    make(folder / "b.dayfence")
    first, second = looked(folder)
    assert first.facts is not None
    assert (second.facts, second.seen) == (None, None)
    assert second.error.reason == reason


def test_what_was_known_of_a_file_is_still_known_when_it_is_damaged(folder):
    (one,) = looked(folder)
    spoil(folder / "ana.dayfence")
    (again,) = looked(folder, {one.name: one.seen})
    assert again.error.reason == "damaged"
    assert again.facts == one.facts


def test_a_fault_of_ours_in_one_file_is_told_of_that_file(folder, monkeypatch):
    def fails(*_):
        raise ZeroDivisionError

    monkeypatch.setattr("desktop.caseload.folder.facts_of", fails)
    assert look_at(folder / "ana.dayfence", {}).error.reason == "damaged"


def test_only_journals_are_looked_at(folder):
    (folder / ".hidden.dayfence").write_bytes(b"x")
    (folder / "notes.txt").write_text("x")
    (folder / "ana copies").mkdir()
    assert [path.name for path in journals_in(folder)] == ["ana.dayfence"]


def test_a_folder_that_is_not_there(tmp_path):
    with pytest.raises(StorageError) as caught:
        journals_in(tmp_path / "gone")
    assert caught.value.reason == "missing"


def test_stopping_leaves_the_rest_unread(folder):
    for number in range(4):
        write_journal(folder / f"x{number}.dayfence", journal(*level(1, 10, 1, 30)))
    seen = []

    def is_stopped() -> bool:
        return len(seen) >= 2

    for one in look_through(journals_in(folder), {}, {}, is_stopped):
        seen.append(one)
    assert len(seen) == 2


def test_many_are_read_on_every_core_with_the_same_facts(folder, monkeypatch):
    for number in range(11):
        write_journal(folder / f"x{number:02}.dayfence", journal(*level(1, 20 + number, 1, 30)))
    one_by_one = {one.name: one.facts for one in looked(folder)}
    monkeypatch.setattr("desktop.caseload.folder._WORTH_A_PROCESS", 1)
    shared = {one.name: one.facts for one in looked(folder)}
    assert shared == one_by_one
    assert len(shared) == 12
    assert all(isinstance(one, Facts) for one in shared.values())


def test_a_client_is_known_by_the_id_and_not_by_the_file(folder):
    known = {JOURNAL_ID: (Client(1, JOURNAL_ID, "K7"), (session(14),))}
    (folder / "ana.dayfence").rename(folder / "renamed.dayfence")
    (one,) = looked(folder, known=known)
    assert one.facts.session == day(14).toordinal()
    with Store.open(folder / "renamed.dayfence") as store:
        store.verify()
