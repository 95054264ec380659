"""Flipped bits, destroyed pages, a full disk: noticed, refused whole, won back."""

from __future__ import annotations

import contextlib
import resource
import sqlite3
from dataclasses import replace
from datetime import UTC, datetime
from pathlib import Path
from random import Random

from desktop.errors import StorageError
from desktop.storage.backups import copies_of, take_copy
from desktop.storage.database import check_header, connect_still
from desktop.storage.rows import TABLES
from desktop.storage.salvage import put_in_place, win_back, write_won_back
from desktop.storage.store import Store
from tests.desktop.storage.samples import EXERCISE, PERSON, added, minutes
from tests.desktop.storage.test_salvage import NOW, entry, grow, share
from tests.endurance.figures import Figure, folder

PAGE = 4096


def flips(many: int) -> Figure:
    """Single bits: every one that changes or hides what the journal says is noticed at opening."""
    random = Random(4)
    changing = unnoticed = quick = 0
    with folder() as place:
        path = place / "log.dayfence"
        whole_journal = grow(path, 300)
        whole = path.read_bytes()
        wanted = set(map(repr, whole_journal.records()))
        for _ in range(many):
            contents = bytearray(whole)
            contents[random.randrange(len(whole))] ^= 1 << random.randrange(8)
            path.write_bytes(contents)
            if _says(path) == wanted:
                continue
            changing += 1
            quick += not _quick_check_passes(path)
            unnoticed += not _is_noticed(path)
    return Figure(
        "single bits that change or hide a value",
        changing,
        unnoticed,
        f"of {many:,} bits flipped",
        f"a quick check alone notices {quick} of {changing}",
        0 < quick < changing,
    )


def _says(path: Path) -> set[str] | None:
    """What a program that checks nothing would read."""
    try:
        connection = connect_still(path)
        try:
            rows = [(table, row) for table in TABLES.values() for row in connection.execute(table.select)]
            return {repr(table.record(row)) for table, row in rows}
        finally:
            connection.close()
    except (sqlite3.Error, ValueError, TypeError, UnicodeDecodeError):
        return None


def _quick_check_passes(path: Path) -> bool:
    connection = connect_still(path)
    try:
        check_header(path)
        return connection.execute("PRAGMA quick_check(1)").fetchone() == ("ok",)
    except (sqlite3.Error, StorageError, UnicodeDecodeError):
        return False
    finally:
        connection.close()


def _is_noticed(path: Path) -> bool:
    try:
        with Store.open(path) as store:
            store.verify()
    except StorageError:
        return True
    return False


def pages(many: int) -> Figure:
    """One page destroyed: what is won back into a new file, with the copy of the day before beside it."""
    random = Random(5)
    with folder() as place:
        path = place / "log.dayfence"
        whole_journal = grow(path)
        whole = path.read_bytes()
        copies = copies_of(path)
        places = [random.randrange(len(whole) // PAGE) for _ in range(many)]
        shares, alone, wrong = [], [], 0
        for number, page in enumerate(places):
            contents = bytearray(whole)
            contents[page * PAGE : (page + 1) * PAGE] = bytes(PAGE)
            path.write_bytes(contents)
            won = win_back(path, copies)
            shares.append(share(won, whole_journal))
            alone.append(share(win_back(path, []), whole_journal))
            new = place / f"new {number}.dayfence"
            write_won_back(new, won, NOW)
            aside = put_in_place(new, path, NOW)
            wrong += aside.read_bytes() != contents or _is_noticed(path)
            aside.unlink()
        mean, worst = 100 * sum(shares) / many, 100 * min(shares)
        mean_alone, worst_alone = 100 * sum(alone) / many, 100 * min(alone)
    return Figure(
        "one page destroyed",
        many,
        wrong,
        f"days won back: {mean:.2f} % mean, {worst:.1f} % worst; "
        f"without an earlier copy {mean_alone:.2f} % and {worst_alone:.1f} %",
        "",
        mean >= 99,
    )


def full_disk() -> Figure:
    """No room, in three ways: the step is refused whole, and what was there stays, copies included."""
    wrong = tried = 0
    reasons = set()
    for limit in (_no_pages, _no_size):
        for value in range(1, 21):
            with folder() as place:
                path = place / "log.dayfence"
                Store.create(path, [PERSON, EXERCISE]).close()
                first = take_copy(path, datetime(2026, 3, 10, tzinfo=UTC))
                tried += 1
                with Store.open(path) as store:
                    reason = limit(store, value)
                    reasons.add(reason)
                    store.verify()
                    wrong += reason == "" or first not in copies_of(path)
    return Figure("disk full", tried, wrong, f"said: {', '.join(sorted(reasons))}", "", "disk full" in reasons)


def _no_pages(store: Store, value: int) -> str:
    connection = store._database._connection
    pages = connection.execute("PRAGMA page_count").fetchone()[0]
    connection.execute(f"PRAGMA max_page_count = {pages + value % 3}")
    return _fills(store)


def _no_size(store: Store, value: int) -> str:
    soft, hard = resource.getrlimit(resource.RLIMIT_FSIZE)
    resource.setrlimit(resource.RLIMIT_FSIZE, (store.path.stat().st_size + value * 512, hard))
    try:
        said = _fills(store)
        with contextlib.suppress(StorageError):
            take_copy(store.path, datetime(2026, 3, 11, tzinfo=UTC))
        return said
    finally:
        resource.setrlimit(resource.RLIMIT_FSIZE, (soft, hard))


def _fills(store: Store) -> str:
    """Write until it is refused; each step is there whole or not at all."""
    for number in range(400):
        before = store.last_step_number
        try:
            days = [entry(number * 3 + place, 1.0).day for place in range(3)]
            store.write(
                "paste values", added(*(replace(minutes(1, 1.0), day=day, note="x" * 3000) for day in days))
            )
        except StorageError as error:
            return error.reason if store.read() and store.last_step_number == before else ""
    return ""
