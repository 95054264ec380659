"""Earlier copies of a journal: taken whole, checked before they count, thinned out with age.

A copy is an ordinary journal file in a folder beside the journal. Its name tells when it was taken and how far
the history reached, so that neither a clock nor the file itself has to be asked.
"""

from __future__ import annotations

import contextlib
import re
import sqlite3
from collections.abc import Callable, Iterable
from dataclasses import dataclass
from datetime import UTC, date, datetime
from pathlib import Path
from typing import Any

from desktop.errors import StorageError
from desktop.journal.journal import Journal
from desktop.storage.chain import check_whole, damaged, position
from desktop.storage.database import check_header, connect, connect_still, storage_errors
from desktop.storage.layout import JOURNAL, Layout, State
from desktop.storage.migrations import expected_schema, migrate, schema_of, version_of
from desktop.storage.new_files import file_errors, making

ENDING = ".dayfence"

KEPT_LAST, KEPT_DAYS, KEPT_WEEKS, KEPT_MONTHS = 5, 7, 5, 12
"""How many copies stay: the last ones, then the newest of each of so many days, weeks and months."""

CHANGES_AT_CLOSE = 20
"""A session with more changes than this ends with a copy."""

_TIME = "%Y%m%dT%H%M%SZ"
_NAME = re.compile(rf"(\d{{8}}T\d{{6}}Z)-(\d+)(-v\d+)?{re.escape(ENDING)}")


@dataclass(frozen=True, order=True)
class EarlierCopy:
    """One copy, as its name tells.

    Attributes:
        made: when it was taken, in UTC.
        seq: number of the last change it holds.
        path: the file.
        before_version: it was taken before the file was brought to a newer version, and stays.
    """

    made: datetime
    seq: int
    path: Path
    before_version: bool = False


def copies_folder(journal: Path, place: Path | None = None) -> Path:
    """Where the copies of a journal are.

    Args:
        journal: the journal's file.
        place: a folder to hold them; the journal's own when left out.
    """
    return (place or journal.parent) / f"{journal.name.removesuffix(ENDING)} copies"


def copies_of(journal: Path, place: Path | None = None) -> list[EarlierCopy]:
    """The copies there are, oldest first; none where the folder cannot be read."""
    found: list[EarlierCopy] = []
    with contextlib.suppress(OSError):
        for path in copies_folder(journal, place).iterdir():
            match = _NAME.fullmatch(path.name)
            with contextlib.suppress(ValueError):
                if match:
                    made = datetime.strptime(match[1], _TIME).replace(tzinfo=UTC)
                    found.append(EarlierCopy(made, int(match[2]), path, match[3] is not None))
    return sorted(found)


def take_copy(
    journal: Path, now: datetime, *, before_version: bool = False, layout: Layout[Any] = JOURNAL
) -> EarlierCopy:
    """Copy a journal as it stands at one moment, check the copy, and let older ones go.

    The file may be open and written to; nothing older goes before the new copy is on the disk.

    Args:
        journal: the file.
        now: the time, local where it names no zone.
        before_version: the copy is taken before the file is brought to a newer version.
        layout: the kind of file.

    Returns:
        The new copy, or the one there is of this very moment.

    Raises:
        StorageError: there is no new copy, and none of the older ones has gone.
    """
    folder = copies_folder(journal)
    with file_errors(folder):
        folder.mkdir(mode=0o700, exist_ok=True)
    made = now.astimezone(UTC).replace(microsecond=0)
    with storage_errors(journal), contextlib.closing(connect(journal, "ro")) as source:
        source.execute("BEGIN")
        seq = position(source).seq
        version = f"-v{version_of(source)}" if before_version else ""
        copy = EarlierCopy(made, seq, folder / f"{made:{_TIME}}-{seq}{version}{ENDING}", before_version)
        if not copy.path.exists():
            _copy(source, copy.path, layout)
    _let_go(copies_of(journal), copy.made)
    return copy


def save_copy(journal: Path, path: Path) -> None:
    """Copy a journal as it stands to a place of the person's choice, and check the copy.

    Raises:
        StorageError: something is there already, or there is no copy.
    """
    with storage_errors(journal), contextlib.closing(connect(journal, "ro")) as source:
        source.execute("BEGIN")
        position(source)
        _copy(source, path, JOURNAL)


def send_copy(copy: EarlierCopy, journal: Path, place: Path) -> None:
    """Put a finished copy into a second place, and let older ones there go.

    Args:
        copy: of ``take_copy``.
        journal: the file it is a copy of.
        place: a folder the person named, on a stick or in a synced place.

    Raises:
        StorageError: the place is not there, is full, or cannot be written.
    """
    folder = copies_folder(journal, place)
    with file_errors(folder):
        folder.mkdir(mode=0o700, exist_ok=True)
        target = folder / copy.path.name
        if not target.exists():
            with making(target) as part:
                part.write_bytes(copy.path.read_bytes())
    _let_go(copies_of(journal, place), copy.made)


def read_copy(path: Path) -> Journal:
    """The journal in a finished copy, read without changing a byte of it.

    Raises:
        StorageError: it is gone, damaged, or of another version.
    """
    return read_copy_of(path, JOURNAL)


def read_copy_of(path: Path, layout: Layout[State]) -> State:
    """What a finished copy of any kind of file holds, read without changing a byte of it.

    Raises:
        StorageError: it is gone, damaged, or of another version.
    """
    check_header(path, layout)
    with (
        storage_errors(path),
        contextlib.closing(connect_still(path)) as still,
        contextlib.closing(sqlite3.connect(":memory:", isolation_level=None)) as memory,
    ):
        _check(still, path, layout)
        still.backup(memory)
        migrate(memory, layout.steps, layout.application_id)
        rows = [(table, row) for table in layout.tables.values() for row in memory.execute(table.select)]
    return layout.state(table.record(row) for table, row in rows)


def check_file(journal: Path, layout: Layout[Any] = JOURNAL) -> None:
    """Check the whole of a journal, open or not; writing to it waits only while it is copied into memory.

    Raises:
        StorageError: the file is damaged or cannot be read.
    """
    with (
        storage_errors(journal),
        contextlib.closing(sqlite3.connect(":memory:", isolation_level=None)) as memory,
    ):
        with contextlib.closing(connect(journal, "ro")) as source:
            source.backup(memory)
        _check(memory, journal, layout)


def newest_good(copies: Iterable[EarlierCopy]) -> tuple[EarlierCopy, Journal] | None:
    """The newest copy of a journal that is whole, with what it holds; None when there is none."""
    return newest_good_of(copies, JOURNAL)


def newest_good_of(copies: Iterable[EarlierCopy], layout: Layout[State]) -> tuple[EarlierCopy, State] | None:
    """The same for any kind of file."""
    for copy in sorted(copies, reverse=True):
        with contextlib.suppress(StorageError):
            return copy, read_copy_of(copy.path, layout)
    return None


def is_due_at_opening(copies: Iterable[EarlierCopy], seq: int, now: datetime) -> bool:
    """Whether the first copy of a calendar day is due: something changed, and none was taken today.

    Args:
        copies: those there are.
        seq: number of the journal's last change.
        now: the time; its zone, or that of this computer, says what a day is.
    """
    last = max(copies, default=None, key=lambda copy: (copy.seq, copy.made))
    if last is None:
        # A journal that was only just started has nothing to lose.
        return seq > 1
    return last.seq != seq and _day(last, now) != now.date()


def is_due_at_closing(copies: Iterable[EarlierCopy], seq: int) -> bool:
    """Whether more changed since the last copy than should be in one place only."""
    return seq - max((copy.seq for copy in copies), default=0) > CHANGES_AT_CLOSE


def kept(copies: Iterable[EarlierCopy], now: datetime) -> set[EarlierCopy]:
    """The copies that stay: the newest, those of every age, those of older versions, those from the future.

    Args:
        copies: those there are.
        now: when this is asked; what was made later is of a clock that was wrong then or is wrong now.
    """
    newest_first = sorted(copies, reverse=True)
    past = [copy for copy in newest_first if copy.made <= now.astimezone(UTC)]
    staying = {copy for copy in newest_first if copy.before_version or copy.made > now.astimezone(UTC)}
    staying.update(newest_first[:1], past[:KEPT_LAST])
    # Where a clock went back, the copy that holds most is not the one that says it is newest.
    staying.update(sorted(newest_first, key=lambda copy: (copy.seq, copy.made))[-1:])
    period_of: tuple[tuple[int, Callable[[EarlierCopy], object]], ...] = (
        (KEPT_DAYS, lambda copy: copy.made.date()),
        (KEPT_WEEKS, lambda copy: copy.made.date().isocalendar()[:2]),
        (KEPT_MONTHS, lambda copy: (copy.made.year, copy.made.month)),
    )
    for many, period in period_of:
        newest: dict[object, EarlierCopy] = {}
        for copy in past:
            newest.setdefault(period(copy), copy)
        staying.update(list(newest.values())[:many])
    return staying


def _copy(source: sqlite3.Connection, path: Path, layout: Layout[Any]) -> None:
    """Copy what a transaction sees, end it, and check the copy."""
    with making(path) as part, contextlib.closing(sqlite3.connect(part)) as target:
        # The copy is put on the disk as a whole, so nothing has to be done twice for the parts.
        target.execute("PRAGMA journal_mode = OFF")
        target.execute("PRAGMA synchronous = OFF")
        source.backup(target)
        # The journal can be written to again while its copy is checked.
        source.execute("COMMIT")
        _check(target, part, layout)


def _let_go(copies: list[EarlierCopy], now: datetime) -> None:
    staying = kept(copies, now)
    for copy in copies:
        if copy not in staying:
            # One that cannot be removed is in nobody's way.
            with contextlib.suppress(OSError):
                copy.path.unlink()


def _day(copy: EarlierCopy, now: datetime) -> date:
    return copy.made.astimezone(now.astimezone().tzinfo if now.tzinfo is None else now.tzinfo).date()


def _check(connection: sqlite3.Connection, path: Path, layout: Layout[Any]) -> None:
    connection.execute("PRAGMA trusted_schema = OFF")
    version = version_of(connection)
    if schema_of(connection) != expected_schema(layout.steps[:version]):
        raise damaged(path, "the tables are not those of a journal")
    if version == len(layout.steps):
        check_whole(connection, path, layout.tables)
        return
    # The records of today are not those of an older version, which stays as it is.
    with contextlib.closing(sqlite3.connect(":memory:", isolation_level=None)) as memory:
        connection.backup(memory)
        migrate(memory, layout.steps, layout.application_id)
        check_whole(memory, path, layout.tables)
