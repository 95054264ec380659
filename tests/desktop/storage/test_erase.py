"""What is erased is nowhere any more, and everything else is as it was."""

from __future__ import annotations

from dataclasses import replace
from datetime import UTC, date, datetime
from pathlib import Path

import pytest

from desktop.edits.history import UndoHistory, redo_edit, undo_edit
from desktop.errors import StorageError
from desktop.journal.records import Change, DayNote, Plan, Record, Span
from desktop.journal.row_change import RowChange
from desktop.storage.backups import copies_folder, copies_of, send_copy, take_copy
from desktop.storage.erase import erase, erase_everything, of_day, of_measure
from desktop.storage.store import Store
from tests.desktop.storage.samples import EXERCISE, PERSON, added, minutes, names, refusal

NOW = datetime(2026, 3, 10, 21, tzinfo=UTC)
MARK = "ZXQ-secret"
DAY = date(2026, 3, 5)


@pytest.fixture
def written(path: Path) -> Path:
    """A day with a mark in its values, its note and their history; undone, done again, and copied."""
    second = replace(EXERCISE, id=2, position=1, title="Second")
    with Store.create(path, [PERSON, EXERCISE, second]) as store:
        store.write("put value", added(minutes(4), minutes(5, note=MARK), minutes(5, measure=2)))
        step = store.write("put value", [RowChange(minutes(5, note=MARK), minutes(5, 77.0, note=MARK * 2))])
        store.write("put value", undo_edit(step).changes, "undo", step.number)
        store.write("put value", redo_edit(step).changes, "redo", step.number)
        note = DayNote(DAY, f"{MARK} in words")
        store.write("write note", added(note, DayNote(date(2026, 3, 6), "rain")))
        more: list[Record] = [Change(1, DAY, "stairs"), Change(2, DAY, "only", measures=(2,))]
        store.write("mark change", added(*more, Plan(1, 2, DAY, 5), Span(1, DAY, DAY, measures=(1, 2))))
        last = store.write("put value", added(minutes(6), minutes(7, measure=2)))
        store.write("put value", undo_edit(last).changes, "undo", last.number)
        take_copy(path, NOW)
    path.with_name("log damaged 2026-03-01 10.00.00.dayfence").write_text(MARK)
    return path


def holding(folder: Path) -> list[str]:
    return sorted(one.name for one in folder.rglob("*") if one.is_file() and MARK.encode() in one.read_bytes())


def test_a_day_is_nowhere_any_more(written: Path, journal_folder: Path) -> None:
    stick = journal_folder / "stick"
    stick.mkdir()
    send_copy(copies_of(written)[0], written, stick)
    assert len(holding(journal_folder)) == 4
    assert erase(written, of_day(DAY), NOW, stick)
    assert holding(journal_folder) == []
    assert len(copies_of(written)) == len(copies_of(written, stick)) == 1
    assert names(journal_folder) == ["log copies", "log.dayfence", "stick"]
    with Store.open(written) as store:
        store.verify()
        journal = store.read()
        assert [day.day for day, _ in journal.entries[1]] == [4]
        assert list(journal.notes) == [date(2026, 3, 6)]
        assert sorted(journal.changes) == [1, 2]
        assert [step.number for step in store.steps()] == [1, 2, 3, 4, 5, 6]
        assert [step.of for step in store.steps()] == [None] * 5 + [5]
        # Undo goes on from there.
        history = UndoHistory(store.steps())
        assert history.redoable is not None
        assert history.redoable.number == 5
        store.write("put value", redo_edit(history.redoable).changes, "redo", 5)
        store.verify()


def test_a_measure_goes_with_all_that_is_its_alone(written: Path) -> None:
    assert erase(written, of_measure(2), NOW)
    with Store.open(written) as store:
        store.verify()
        journal = store.read()
        assert list(journal.measures) == [1]
        assert list(journal.changes) == [1]
        assert journal.plans == {}
        assert list(journal.spans) == [1]
        assert not journal.entries.get(2)
        assert len(journal.entries[1]) == 2


def test_everything(written: Path, journal_folder: Path) -> None:
    assert erase_everything(written)
    assert names(journal_folder) == []
    assert refusal(lambda: erase_everything(written)).reason == "missing"


def test_the_old_bytes_are_overwritten_not_only_unnamed(written: Path) -> None:
    link = written.with_name("held")
    link.hardlink_to(written)
    copy = copies_of(written)[0].path
    other = written.with_name("held too")
    other.hardlink_to(copy)
    erase(written, of_day(DAY), NOW)
    assert set(link.read_bytes()) == set(other.read_bytes()) == {0}


@pytest.mark.parametrize("everything", [True, False])
def test_a_second_place_that_is_not_there_is_told(written: Path, everything: bool) -> None:
    gone = written.parent / "stick"
    assert not (erase_everything(written, gone) if everything else erase(written, of_day(DAY), NOW, gone))
    assert not gone.exists()


def test_a_second_place_that_cannot_be_written_is_told(
    written: Path, journal_folder: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    stick = journal_folder / "stick"
    stick.mkdir()
    send_copy(copies_of(written)[0], written, stick)
    opened = Path.open

    def refuse(self: Path, *arguments: str) -> object:
        if stick in self.parents:
            raise PermissionError(13, "Permission denied")
        return opened(self, *arguments)

    monkeypatch.setattr(Path, "open", refuse)
    assert not erase(written, of_day(DAY), NOW, stick)
    assert len(copies_of(written, stick)) == 1


def test_a_second_place_that_is_full_keeps_nothing_old(
    written: Path, journal_folder: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    stick = journal_folder / "stick"
    stick.mkdir()
    send_copy(copies_of(written)[0], written, stick)

    def full(*_: object) -> None:
        raise StorageError("disk full")

    monkeypatch.setattr("desktop.storage.erase.send_copy", full)
    assert erase(written, of_day(DAY), NOW, stick)
    assert copies_of(written, stick) == []


def test_other_files_in_the_folder_of_copies_stay(written: Path) -> None:
    mine = copies_folder(written) / "mine.txt"
    mine.write_text("mine")
    assert erase_everything(written)
    assert mine.read_text() == "mine"


def test_a_damaged_journal_is_not_written_anew(written: Path) -> None:
    before = written.read_bytes()[:-4096]
    written.write_bytes(before)
    assert refusal(lambda: erase(written, of_day(DAY), NOW)).reason == "damaged"
    assert written.read_bytes() == before
    assert len(copies_of(written)) == 1


def test_one_that_is_open_elsewhere_is_not_touched(written: Path) -> None:
    with Store.open(written, alone=True):
        assert refusal(lambda: erase(written, of_day(DAY), NOW)).reason == "open already"


def test_without_room_nothing_is_erased(written: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    before = written.read_bytes()

    def full(*_: object) -> None:
        raise StorageError("disk full")

    with monkeypatch.context() as patch:
        patch.setattr("desktop.storage.erase.create_file", full)
        assert refusal(lambda: erase(written, of_day(DAY), NOW)).reason == "disk full"
    assert written.read_bytes() == before
    assert len(copies_of(written)) == 1
