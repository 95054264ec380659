"""Earlier copies: whole, checked, thinned out with age, and never at the cost of the ones there are."""

from __future__ import annotations

import os
import sqlite3
import stat
from collections.abc import Callable
from dataclasses import replace
from datetime import UTC, datetime, timedelta, timezone
from pathlib import Path
from random import Random

import pytest

from desktop.journal.journal import Journal
from desktop.journal.records import Person
from desktop.storage import backups
from desktop.storage.backups import (
    EarlierCopy,
    check_file,
    copies_folder,
    copies_of,
    is_due_at_closing,
    is_due_at_opening,
    kept,
    newest_good,
    read_copy,
    save_copy,
    send_copy,
    take_copy,
)
from desktop.storage.database import open_database
from desktop.storage.layout import JOURNAL, Layout
from desktop.storage.store import Store
from tests.desktop.storage.samples import PERSON, added, minutes, names, refusal
from tests.desktop.storage.test_migrations import add_mood

NOON = datetime(2026, 3, 10, 12, 0, 0, tzinfo=UTC)


def copy_at(made: datetime, seq: int = 1, *, before_version: bool = False) -> EarlierCopy:
    return EarlierCopy(made, seq, Path(f"{made.isoformat()}-{seq}"), before_version)


def test_a_copy_holds_everything_and_is_a_journal_itself(store: Store, path: Path) -> None:
    store.write("put value", added(minutes(1), minutes(2)))
    copy = take_copy(path, NOON)
    assert copy.path.name == "20260310T120000Z-4.dayfence"
    assert copy.seq == store.last_change_number == 4
    assert copies_of(path) == [copy]
    assert read_copy(copy.path) == store.read()
    assert stat.S_IMODE(copy.path.stat().st_mode) == 0o600
    assert stat.S_IMODE(copy.path.parent.stat().st_mode) == 0o700
    assert names(copies_folder(path)) == [copy.path.name]
    with Store.open(copy.path) as opened:
        opened.verify()
        assert opened.steps() == store.steps()


def test_reading_a_copy_changes_nothing_of_it(store: Store, path: Path) -> None:
    copy = take_copy(path, NOON)
    before = copy.path.read_bytes()
    os.utime(copy.path, ns=(7, 7))
    read_copy(copy.path)
    assert copy.path.read_bytes() == before
    assert copy.path.stat().st_mtime_ns == 7
    assert names(copies_folder(path)) == [copy.path.name]


def test_a_copy_is_taken_while_the_journal_is_written_to(store: Store, path: Path) -> None:
    copies = []
    for day in range(1, 9):
        store.write("put value", added(minutes(day)))
        copies.append(take_copy(path, NOON + timedelta(seconds=day)))
    assert [len(read_copy(copy.path).entries[1]) for copy in copies[-5:]] == [4, 5, 6, 7, 8]


def test_a_second_copy_of_the_same_moment_is_the_first(store: Store, path: Path) -> None:
    first = take_copy(path, NOON)
    inode = first.path.stat().st_ino
    assert take_copy(path, NOON) == first
    assert first.path.stat().st_ino == inode


def test_the_hour_is_written_as_it_is_everywhere(store: Store, path: Path) -> None:
    there = datetime(2026, 3, 10, 23, 30, tzinfo=timezone(timedelta(hours=-5)))
    assert take_copy(path, there).made == datetime(2026, 3, 11, 4, 30, tzinfo=UTC)
    assert take_copy(path, datetime(2026, 3, 10, 12)).made.tzinfo == UTC


def test_a_damaged_journal_gives_no_copy_and_takes_none_away(store: Store, path: Path) -> None:
    good = take_copy(path, NOON)
    store.close()
    connection = sqlite3.connect(path)
    connection.execute("UPDATE measure SET title = 'other'")
    connection.commit()
    connection.close()
    assert refusal(lambda: take_copy(path, NOON + timedelta(1))).reason == "damaged"
    assert copies_of(path) == [good]
    assert names(copies_folder(path)) == [good.path.name]


def test_a_file_of_other_tables_gives_no_copy(store: Store, path: Path) -> None:
    store.close()
    connection = sqlite3.connect(path)
    connection.execute("CREATE TABLE more (a)")
    connection.close()
    assert refusal(lambda: take_copy(path, NOON)).fields["detail"] == "the tables are not those of a journal"


def test_no_copies_where_there_is_no_folder(journal_folder: Path) -> None:
    assert copies_of(journal_folder / "none") == []
    assert newest_good([]) is None


def test_other_files_in_the_folder_are_left_alone(store: Store, path: Path) -> None:
    folder = copies_folder(path)
    folder.mkdir()
    others = ["mine.txt", "20261340T000000Z-1.dayfence", "20260310T120000Z-4.dayfence.bak", "x.dayfence"]
    for name in others:
        (folder / name).write_text("mine")
    for day in range(40):
        take_copy(path, NOON + timedelta(day))
    assert set(others) < set(names(folder))
    assert len(copies_of(path)) == 11


def test_a_folder_that_cannot_be_made_or_filled(store: Store, path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    first = take_copy(path, NOON)
    with monkeypatch.context() as patch:
        patch.setattr(os, "open", _no_room)
        assert refusal(lambda: take_copy(path, NOON + timedelta(1))).reason == "disk full"
        assert refusal(lambda: send_copy(first, path, path.parent / "gone")).reason == "missing"
    assert copies_of(path) == [first]
    folder = copies_folder(path)
    first.path.unlink()
    folder.rmdir()
    folder.write_text("in the way")
    assert refusal(lambda: take_copy(path, NOON)).reason == "cannot open"


def _no_room(*_: object) -> int:
    raise OSError(28, "No space left on device")


def test_a_copy_that_cannot_be_removed_is_no_trouble(
    store: Store, path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    for hour in range(7):
        take_copy(path, NOON + timedelta(hours=hour))
    assert len(copies_of(path)) == 5
    unlink = Path.unlink

    def refuse(self: Path, missing_ok: bool = False) -> None:
        if self.suffix == ".dayfence":
            raise PermissionError(1, "Operation not permitted")
        unlink(self, missing_ok)

    monkeypatch.setattr(Path, "unlink", refuse)
    take_copy(path, NOON + timedelta(hours=8))
    assert len(copies_of(path)) == 6


def test_the_second_place(store: Store, path: Path, journal_folder: Path) -> None:
    stick = journal_folder / "stick"
    copy = take_copy(path, NOON)
    assert refusal(lambda: send_copy(copy, path, stick)).reason == "missing"
    stick.mkdir()
    for _ in range(2):
        send_copy(copy, path, stick)
    (sent,) = copies_of(path, stick)
    assert (sent.made, sent.seq) == (copy.made, copy.seq)
    assert read_copy(sent.path) == store.read()
    assert stat.S_IMODE(sent.path.stat().st_mode) == 0o600
    for hour in range(1, 9):
        send_copy(take_copy(path, NOON + timedelta(hours=hour)), path, stick)
    assert len(copies_of(path, stick)) == 5
    copy.path.unlink(missing_ok=True)
    assert refusal(lambda: send_copy(copy, path, stick)).reason == "missing"


def test_the_newest_good_copy(store: Store, path: Path) -> None:
    first = take_copy(path, NOON)
    store.write("put value", added(minutes(1)))
    second = take_copy(path, NOON + timedelta(1))
    assert newest_good(copies_of(path)) == (second, store.read())
    second.path.write_bytes(second.path.read_bytes()[:-100])
    found = newest_good(copies_of(path))
    assert found is not None
    assert found[0] == first
    # Altered so that only the history tells.
    connection = sqlite3.connect(first.path)
    connection.execute("UPDATE measure SET title = 'other'")
    connection.commit()
    connection.close()
    assert newest_good(copies_of(path)) is None
    first.path.write_bytes(b"")
    assert newest_good(copies_of(path)) is None


@pytest.mark.parametrize(("seq", "days", "due"), [(2, 1, True), (2, 0, False), (1, 1, False), (2, -1, True)])
def test_due_on_the_first_opening_of_a_day_if_anything_changed(seq: int, days: int, due: bool) -> None:
    assert is_due_at_opening([copy_at(NOON)], seq, NOON + timedelta(days)) is due


def test_a_day_is_one_of_the_place_where_the_person_is() -> None:
    there = timezone(timedelta(hours=-5))
    late = datetime(2026, 3, 10, 23, 30, tzinfo=there)
    assert not is_due_at_opening([copy_at(late.astimezone(UTC))], 2, late + timedelta(minutes=5))
    assert is_due_at_opening([copy_at(late.astimezone(UTC))], 2, late + timedelta(hours=1))
    here = datetime(2026, 3, 10, 12)
    assert not is_due_at_opening([copy_at(here.astimezone(UTC))], 2, here)
    assert is_due_at_opening([], 2, here)
    assert not is_due_at_opening([], 1, here)


@pytest.mark.parametrize(("seq", "due"), [(0, False), (20, False), (21, True), (41, True)])
def test_due_at_closing(seq: int, due: bool) -> None:
    assert is_due_at_closing([], seq) is due
    assert is_due_at_closing([copy_at(NOON, 7), copy_at(NOON + timedelta(1), 3)], seq + 7) is due


def test_what_stays_after_three_years() -> None:
    """A copy on most days for three years: few stay, and they reach back about a year."""
    random = Random(3)
    copies: set[EarlierCopy] = set()
    most = 0
    for day in range(3 * 365):
        now = NOON + timedelta(day, random.uniform(0, 40_000))
        for _ in range(random.choice((0, 1, 1, 1, 3))):
            now += timedelta(seconds=random.randrange(1, 3_000))
            copies.add(copy_at(now, day))
            newest = max(copies)
            copies = kept(copies, now)
            assert newest in copies
            assert kept(copies, now) == copies
            most = max(most, len(copies))
    assert 20 <= most <= 29
    ages = sorted((now - copy.made).days for copy in copies)
    assert 300 <= ages[-1] <= 366
    assert sum(age < 7 for age in ages) >= 7


def test_the_newest_of_each_day_week_and_month_stays() -> None:
    hours = [NOON - timedelta(hours=hour) for hour in range(24 * 400)]
    staying = kept((copy_at(made) for made in hours), NOON)
    days = {copy.made.date() for copy in staying}
    assert {(NOON - timedelta(day)).date() for day in range(7)} <= days
    assert max(copy.made for copy in staying if copy.made.month == 1) == datetime(2026, 1, 31, 23, tzinfo=UTC)
    assert min(days).isoformat() == "2025-04-30"
    sundays = {copy.made for copy in staying if copy.made.hour == 23 and copy.made.weekday() == 6}
    assert {datetime(2026, 3, day, 23, tzinfo=UTC) for day in (8, 1)} <= sundays


def test_what_never_goes() -> None:
    """Copies of older versions, copies a clock dated ahead, and the one that holds most."""
    old = copy_at(NOON - timedelta(3000), 5, before_version=True)
    ahead = [copy_at(NOON + timedelta(day), 50) for day in range(1, 30)]
    most = copy_at(NOON - timedelta(2000), 900)
    many = [copy_at(NOON - timedelta(hours=hour), 40) for hour in range(2000)]
    staying = kept([old, *ahead, most, *many], NOON)
    assert {old, *ahead, most} <= staying
    assert many[0] in staying
    assert len(staying) < 29 + 31


def test_a_file_of_an_older_version_is_copied_before_it_is_changed(
    store: Store, path: Path, monkeypatch: pytest.MonkeyPatch, clock: Callable[[], datetime]
) -> None:
    store.write("put value", added(minutes(1)))
    store.close()
    newer = replace(JOURNAL, steps=(*JOURNAL.steps, add_mood))
    with monkeypatch.context() as patch:
        patch.setattr(backups, "_check", _damaged)
        refused = lambda: open_database(path, newer, before_migrating=lambda old: take_copy(old, NOON))  # noqa: E731
        assert refusal(refused).reason == "damaged"
    database = open_database(path, newer, before_migrating=lambda old: take_copy(old, NOON, before_version=True))
    database.close()
    (copy,) = copies_of(path)
    assert copy.path.name == "20260310T120000Z-3-v2.dayfence"
    assert copy.before_version
    assert len(read_copy(copy.path).entries[1]) == 1
    with Store.open(copy.path, clock=clock) as opened:
        opened.verify()


def _damaged(*_: object) -> None:
    raise backups.damaged(Path("x"), "made to fail")


def test_the_store_takes_that_copy_by_itself(
    store: Store, path: Path, clock: Callable[[], datetime], monkeypatch: pytest.MonkeyPatch
) -> None:
    store.close()
    asked: list[Path] = []

    def older(
        path: Path, layout: Layout[Journal], *, to_read: bool, before_migrating: Callable[[Path], object]
    ) -> object:
        before_migrating(path)
        asked.append(path)
        return open_database(path, layout, to_read=to_read)

    monkeypatch.setattr("desktop.storage.store.open_database", older)
    Store.open(path, clock=clock).close()
    assert asked == [path]
    assert [copy.before_version for copy in copies_of(path)] == [True]


def test_two_journals_in_one_folder_have_their_own_copies(store: Store, path: Path, journal_folder: Path) -> None:
    with Store.create(journal_folder / "other.dayfence", Person("f" * 32)) as other:
        take_copy(other.path, NOON)
    take_copy(path, NOON)
    assert names(journal_folder) == ["log copies", "log.dayfence", "other copies", "other.dayfence"]
    assert read_copy(copies_of(path)[0].path).person == PERSON


def test_opened_to_read_only(store: Store, path: Path) -> None:
    store.close()
    with Store.open(path, to_read=True) as opened:
        assert opened.read_only
        assert refusal(lambda: opened.write("put value", added(minutes(1)))).reason == "read only"


def test_a_file_is_checked_while_it_is_written_to(store: Store, path: Path) -> None:
    with store._database.writing() as connection:
        connection.execute("UPDATE measure SET title = 'other'")
        # What is not yet committed is not looked at, and nobody waits.
        check_file(path)
    assert refusal(lambda: check_file(path)).reason == "damaged"
    assert refusal(lambda: check_file(path.parent / "none")).reason == "cannot open"


def test_a_copy_at_a_place_of_ones_own(store: Store, path: Path) -> None:
    store.write("put value", added(minutes(1)))
    target = path.with_name("mine.dayfence")
    save_copy(path, target)
    assert refusal(lambda: save_copy(path, target)).fields["exists"] is True
    with Store.open(target) as copy:
        copy.verify()
        assert copy.steps() == store.steps()
    assert copies_of(path) == []
