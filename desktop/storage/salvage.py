"""What can still be read of a damaged journal, won back into a new file; the damaged one is never written to.

Two records tell what a day held: the tables, and the history that led there. A row of the history counts only
where its chain fits the row before it, so what it says is proven; newer copies fill the rows that are gone.
"""

from __future__ import annotations

import contextlib
import os
import shutil
import sqlite3
from collections.abc import Callable, Iterable
from dataclasses import dataclass
from datetime import date, datetime
from itertools import groupby
from pathlib import Path
from typing import Literal, TypeVar
from uuid import uuid4

from desktop.errors import StorageError
from desktop.journal.differences import differences
from desktop.journal.journal import Journal
from desktop.journal.records import Entry, Measure, Person, Record
from desktop.journal.row_change import RowChange, Step, key_of
from desktop.storage.backups import ENDING, EarlierCopy, newest_good
from desktop.storage.chain import HISTORY, HistoryRow, Position
from desktop.storage.database import connect_still, create_file
from desktop.storage.migrations import MIGRATIONS, expected_schema, migrate, schema_of
from desktop.storage.new_files import file_errors, making, names_to_disk
from desktop.storage.rows import TABLES, Cell, Table, key_text
from desktop.storage.store import append_step, step_of

Key = tuple[str, str]
Sureness = Literal["proven", "in one record", "earlier"]
"""What the history proves or both records say; what one record says; the last value that is known of a day."""

Row = TypeVar("Row")

_PAGE = 4096
_LEAST_ROW = 40
"""A row of the history takes at least so many bytes, so a file can hold only so many."""
_MOST_IDS = 5_000
_MARGIN = 400
"""Days looked through before and after the ones that are known of."""


@dataclass(frozen=True)
class WonBack:
    """What a damaged journal still gives.

    Attributes:
        journal: every record, the best that is known of each.
        sureness: of each entry, by its key.
        steps: the part of the history that is whole, from its beginning.
        copy: the newest good copy, that helped; None without one.
        behind: how many records the copy alone would lack or have otherwise.
    """

    journal: Journal
    sureness: dict[Key, Sureness]
    steps: list[Step]
    copy: EarlierCopy | None
    behind: int

    @property
    def proven(self) -> int:
        """How many entries are certain."""
        return sum(sure == "proven" for sure in self.sureness.values())


def win_back(damaged: Path, copies: Iterable[EarlierCopy]) -> WonBack:
    """Read what can be read of a damaged journal; nothing is written.

    Args:
        damaged: the file; no connection to it may be open.
        copies: the earlier copies there are.

    Raises:
        StorageError: the file cannot be read at all, or nothing of it or of a copy can.
    """
    with file_errors(damaged):
        contents = bytearray(damaged.read_bytes())
    good = newest_good(copies)
    copied = good[0].path.read_bytes() if good else None
    known = _history_of(good[0].path) if good else {}
    connection = _opened(contents, copied)
    read: dict[int, tuple[HistoryRow, bytes]] = {}
    top = max(known, default=0)
    held: dict[Key, Record] = {}
    if connection is not None:
        with contextlib.closing(connection):
            most = len(contents) // _LEAST_ROW
            read = _read_history(connection, most)
            top = max(top, _last_number(connection, most), max(read, default=0))
            rows = _accepted(known, read)
            held = _read_tables(connection, rows.values())
    else:
        rows = known
    gaps = [seq for seq in range(1, top + 1) if seq not in rows]
    records, sureness = _united(rows, held, max(gaps, default=0))
    if not records:
        raise StorageError("damaged", path=str(damaged), detail="nothing of it can be read")
    journal = _completed(records)
    return WonBack(
        journal,
        sureness,
        _whole_steps(rows, gaps),
        good[0] if good else None,
        len(differences(journal, good[1])) if good else 0,
    )


def write_won_back(path: Path, won: WonBack, now: datetime) -> None:
    """Make a new journal of what was won back, with the history that is whole.

    Args:
        path: where; nothing may be there yet.
        won: of :func:`win_back`.
        now: local time.

    Raises:
        StorageError: the file cannot be made.
    """

    def fill(connection: sqlite3.Connection) -> None:
        last, state = Position(), None
        for step in won.steps:
            last = append_step(connection, step, last, path)
            if state is None:
                state = Journal.of(change.record for change in step.changes)
            else:
                state.apply(step.changes)
        at = now.isoformat(timespec="seconds")
        if state is None:
            changes = tuple(RowChange(None, record) for record in won.journal.records())
            append_step(connection, Step(1, at, "do", "start journal", None, changes), last, path)
            return
        changes = tuple(RowChange(one.now, one.then) for one in differences(state, won.journal))
        if changes:
            append_step(connection, Step(last.step + 1, at, "do", "win back", None, changes), last, path)

    create_file(path, fill)


def copy_to(copy: EarlierCopy, path: Path) -> None:
    """Make a new journal of an earlier copy.

    Raises:
        StorageError: the file cannot be made, or something is there already.
    """
    with making(path) as part:
        shutil.copyfile(copy.path, part)


def put_in_place(new: Path, damaged: Path, now: datetime) -> Path:
    """Give a new journal the name of a damaged one, which stays beside it under another.

    At every moment there is a file under the name, the old one or the new one.

    Args:
        new: a whole journal in the same folder.
        damaged: the file that gives up its name.
        now: local time, for the other name.

    Returns:
        Where the damaged file is now.

    Raises:
        StorageError: nothing was exchanged.
    """
    aside = aside_name(damaged, "damaged", now)
    with file_errors(damaged):
        try:
            os.link(damaged, aside)
        except FileExistsError:
            raise
        except OSError:
            with making(aside) as part:
                shutil.copyfile(damaged, part)
        # A step that was cut short belongs to the damaged file, and would be taken back in the new one.
        unfinished = Path(f"{damaged}-journal")
        if unfinished.exists():
            unfinished.rename(f"{aside}-journal")
        new.replace(damaged)
        names_to_disk(damaged.parent)
    return aside


def aside_name(journal: Path, word: str, now: datetime) -> Path:
    """A name beside a journal that says what it is and from when: ``journal damaged 2031-03-30 20.15.00``."""
    stem = journal.name.removesuffix(ENDING)
    return journal.with_name(f"{stem} {word} {now:%Y-%m-%d %H.%M.%S}{ENDING}")


def _opened(contents: bytearray, copied: bytes | None) -> sqlite3.Connection | None:
    """The file in memory, as long as it was, with the declarations of another where its own are gone."""
    declared = int.from_bytes(contents[28:32], "big") * _PAGE
    if len(contents) < declared <= 4 * max(len(contents), _PAGE * 64):
        contents.extend(bytes(declared - len(contents)))
    contents.extend(bytes(-len(contents) % _PAGE))
    expected = expected_schema(MIGRATIONS)
    for other in (None, copied, _fresh()):
        candidate = bytearray(contents)
        if other is not None:
            _graft(candidate, other)
        # A memory has no second file, so it cannot be in the mode that needs one.
        candidate[18:20] = b"\x01\x01"
        connection = sqlite3.connect(":memory:", isolation_level=None)
        with contextlib.suppress(sqlite3.Error, UnicodeDecodeError):
            connection.deserialize(bytes(candidate))
            if schema_of(connection) == expected:
                return connection
        connection.close()
    return None


def _fresh() -> bytes:
    """A journal just made: its tables begin on the same pages as those of every journal of its version."""
    with contextlib.closing(sqlite3.connect(":memory:", isolation_level=None)) as connection:
        connection.execute(f"PRAGMA page_size = {_PAGE}")
        migrate(connection)
        return connection.serialize()


def _graft(contents: bytearray, other: bytes) -> None:
    for number in _schema_pages(other):
        start = (number - 1) * _PAGE
        contents[start : start + _PAGE] = other[start : start + _PAGE]
    contents[28:32] = (len(contents) // _PAGE).to_bytes(4, "big")
    # The page count in the header counts only where these two are the same.
    contents[92:96] = contents[24:28]


def _schema_pages(whole: bytes) -> list[int]:
    """The pages that hold the declarations of the tables: the first, and those it leads to."""
    page = whole[:_PAGE]
    cells = int.from_bytes(page[103:105], "big")
    pointers = [int.from_bytes(page[at : at + 2], "big") for at in range(112, 112 + 2 * cells, 2)]
    children = [page[at : at + 4] for at in pointers] + [page[108:112]]
    return [1, *(int.from_bytes(child, "big") for child in children)]


def _halved(read: Callable[[int, int], list[Row]], low: int, high: int) -> list[Row]:
    """Everything that can be read between two numbers, going round what cannot."""
    try:
        return read(low, high)
    except (sqlite3.Error, UnicodeDecodeError):
        if low >= high:
            return []
        middle = (low + high) // 2
        return _halved(read, low, middle) + _halved(read, middle + 1, high)


def _read_history(connection: sqlite3.Connection, most: int) -> dict[int, tuple[HistoryRow, bytes]]:
    sql = f'SELECT {HISTORY} FROM "history" WHERE "seq" BETWEEN ? AND ?'
    rows = _halved(lambda low, high: connection.execute(sql, (low, high)).fetchall(), 1, most)
    return {cells[0]: (HistoryRow.of_cells(cells), cells[-1]) for cells in rows}


def _history_of(copy: Path) -> dict[int, tuple[HistoryRow, bytes]]:
    with contextlib.closing(connect_still(copy)) as connection:
        rows = connection.execute(f'SELECT {HISTORY} FROM "history"').fetchall()
    return {cells[0]: (HistoryRow.of_cells(cells), cells[-1]) for cells in rows}


def _last_number(connection: sqlite3.Connection, most: int) -> int:
    """The number of the last row of the history, as SQLite noted it beside; never more than there is room for."""
    sql = "SELECT coalesce(max(seq), 0) FROM sqlite_sequence WHERE name = 'history' AND typeof(seq) = 'integer'"
    with contextlib.suppress(sqlite3.Error, UnicodeDecodeError):
        return min(int(connection.execute(sql).fetchone()[0]), most)
    return 0


def _accepted(
    known: dict[int, tuple[HistoryRow, bytes]], read: dict[int, tuple[HistoryRow, bytes]]
) -> dict[int, tuple[HistoryRow, bytes]]:
    """The rows whose chain fits the row before them, beside those of a copy that is whole."""
    rows = dict(known)
    for seq in sorted(read.keys() - known.keys()):
        row, chain = read[seq]
        before = rows.get(seq - 1) or read.get(seq - 1)
        previous = Position().chain if seq == 1 else before[1] if before else None
        if previous is not None and isinstance(previous, bytes):
            with contextlib.suppress(TypeError, ValueError):
                if row.chained(previous) == chain:
                    row.change()
                    rows[seq] = row, chain
    return rows


def _read_tables(connection: sqlite3.Connection, rows: Iterable[tuple[HistoryRow, bytes]]) -> dict[Key, Record]:
    """Every record of the tables that can be read and could have been written."""
    entries = [row.key.split("/") for row, _ in rows if row.tbl == "entry"]
    days = [date.fromisoformat(key[1]).toordinal() for key in entries] or [date.today().toordinal()]
    first, last = min(days) - _MARGIN, max(days) + _MARGIN
    found: dict[Key, Record] = {}
    with contextlib.closing(sqlite3.connect(":memory:", isolation_level=None)) as checker:
        migrate(checker)
        checker.execute("PRAGMA foreign_keys = OFF")
        for table in TABLES.values():
            for cells in _read_table(connection, table, first, last, {int(key[0]) for key in entries}):
                with contextlib.suppress(sqlite3.Error, ValueError, TypeError):
                    record = table.record(cells)
                    checker.execute(table.insert, cells)
                    found[table.name, key_text(key_of(record))] = record
    return found


def _read_table(
    connection: sqlite3.Connection, table: Table, first: int, last: int, measures: set[int]
) -> list[tuple[Cell, ...]]:
    def between(where: str, low: object, high: object, *more: object) -> list[tuple[Cell, ...]]:
        return connection.execute(f"{table.select} WHERE {where} BETWEEN ? AND ?", (*more, low, high)).fetchall()

    def by_days(where: str, *more: object) -> list[tuple[Cell, ...]]:
        def read(low: int, high: int) -> list[tuple[Cell, ...]]:
            return between(where, _day(low), _day(high), *more)

        return _halved(read, first, last)

    with contextlib.suppress(sqlite3.Error, UnicodeDecodeError):
        return connection.execute(table.select).fetchall()
    match table.name:
        case "person":
            return []
        case "note":
            return by_days('"day"')
        case "entry":
            return [row for measure in sorted(measures) for row in by_days('"measure" = ? AND "day"', measure)]
    return _halved(lambda low, high: between('"id"', low, high), 1, _MOST_IDS)


def _day(ordinal: int) -> str:
    return date.fromordinal(max(ordinal, 1)).isoformat()


def _united(
    rows: dict[int, tuple[HistoryRow, bytes]], held: dict[Key, Record], last_gap: int
) -> tuple[dict[Key, Record], dict[Key, Sureness]]:
    """The best that is known under each key, and how sure that is for entries."""
    told: dict[Key, tuple[int, Record | None]] = {}
    for seq in sorted(rows):
        row = rows[seq][0]
        told[row.tbl, row.key] = seq, row.change().after
    records: dict[Key, Record] = {}
    sureness: dict[Key, Sureness] = {}
    for key in told | held:
        seq, after = told.get(key, (0, None))
        there = held.get(key)
        sure: Sureness = "proven"
        record = after
        if seq < last_gap and there != after:
            # Something was written after what the history still tells; the table may have it.
            record, sure = (there, "in one record") if there is not None else (after, "earlier")
        if record is not None:
            records[key] = record
            if isinstance(record, Entry):
                sureness[key] = sure
    return records, sureness


def _completed(records: dict[Key, Record]) -> Journal:
    """A journal of the records, with a stand-in for a measure or a person that is gone."""
    listed = list(records.values())
    there = {record.id for record in listed if isinstance(record, Measure)}
    wanted = {record.measure for record in listed if isinstance(record, Entry)} - there
    listed += [Measure(number, number, f"Measure {number}") for number in sorted(wanted)]
    if not any(isinstance(record, Person) for record in listed):
        listed.append(Person(uuid4().hex))
    return Journal.of(listed)


def _whole_steps(rows: dict[int, tuple[HistoryRow, bytes]], gaps: list[int]) -> list[Step]:
    end = min(gaps, default=len(rows) + 1)
    listed = [rows[seq][0] for seq in range(1, end)]
    steps = [step_of(list(group)) for _, group in groupby(listed, key=lambda row: row.step)]
    # The rows of the last step may go on in the gap.
    return steps[:-1] if gaps else steps
