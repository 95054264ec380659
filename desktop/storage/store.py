"""The journal on disk: what a person has written down, and every step that led there."""

from __future__ import annotations

import sqlite3
from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass
from datetime import datetime
from itertools import groupby
from pathlib import Path
from typing import Any, ClassVar, Generic, Self

from desktop.errors import StorageError
from desktop.journal.caseload import Caseload
from desktop.journal.journal import Journal
from desktop.journal.records import Record
from desktop.journal.row_change import Act, RowChange, Step, StepKind, key_of
from desktop.storage.alone import Alone
from desktop.storage.backups import take_copy
from desktop.storage.chain import HISTORY, HistoryRow, Position, check_whole, damaged, position
from desktop.storage.database import Database, create_file, open_database
from desktop.storage.layout import CASELOAD, JOURNAL, Layout, State
from desktop.storage.rows import Cell, Table, key_cells, key_text, table_of

Clock = Callable[[], datetime]

_APPEND = f'INSERT INTO "history" ({HISTORY}) VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)'


@dataclass(frozen=True)
class Held:
    """What a key held from one step on.

    Attributes:
        step: number of the step.
        at: local clock time of the step, ISO 8601.
        act: what was done then.
        record: the record from then on; None = taken away.
    """

    step: int
    at: str
    act: Act
    record: Record | None


class FileStore(Generic[State]):
    """One open file, a journal or a caseload.

    Exactly one thread uses a store at a time; it may be handed from the thread that opened it to another.

    After a write that failed the file is as it was, and the store can go on. Only when the disk fails at the
    very end of a write may the step be there all the same; the next write then says "stale" and
    :meth:`read` gives what is there.
    """

    layout: ClassVar[Layout[Any]]

    def __init__(self, database: Database, clock: Clock, alone: Alone | None = None) -> None:
        """Of an open database; use :meth:`create` or :meth:`open`."""
        self._database = database
        self._alone = alone
        self._clock = clock
        with database.reading() as connection:
            self._last = position(connection)

    @classmethod
    def create(
        cls,
        path: Path,
        records: Record | Iterable[Record],
        *,
        clock: Clock = datetime.now,
        alone: bool = False,
    ) -> Self:
        """Make a new file; its first step says that it was started.

        Args:
            path: where; nothing may be there yet.
            records: the person or the coach, alone or with other records to begin with.
            clock: gives local time.
            alone: as for :meth:`open`.

        Raises:
            ValueError: not exactly one person or coach among the records.
            StorageError: something is there already, the file cannot be made, or a record is refused.
        """
        listed = list(records) if isinstance(records, Iterable) else [records]
        if sum(isinstance(record, cls.layout.root) for record in listed) != 1:
            raise ValueError(f"a file is started with exactly one {cls.layout.root.__name__.lower()} record")
        changes = tuple(RowChange(None, record) for record in listed)
        step = Step(1, _text_of(clock()), "do", cls.layout.first_act, None, changes)

        def fill(connection: sqlite3.Connection) -> None:
            append_step(connection, step, Position(), path)

        create_file(path, fill, cls.layout)
        return cls.open(path, clock=clock, alone=alone)

    @classmethod
    def open(cls, path: Path, *, clock: Clock = datetime.now, to_read: bool = False, alone: bool = False) -> Self:
        """Open a file; in a place that cannot be written it opens for reading.

        A file of an older version is copied before it is brought to this one.

        Args:
            path: the file.
            clock: gives local time.
            to_read: nothing is to be written.
            alone: where it can be written, no other window may have it until it is closed.

        Raises:
            StorageError: there is no file, it cannot be opened, is not a journal, is damaged, was made by a
                newer version, or is open already.
        """
        database = open_database(
            path,
            cls.layout,
            to_read=to_read,
            before_migrating=lambda old: take_copy(old, clock(), before_version=True, layout=cls.layout),
        )
        held: Alone | None = None
        try:
            if alone and not database.read_only:
                held = Alone.hold(path)
            return cls(database, clock, held)
        except BaseException:
            database.close()
            if held is not None:
                held.release()
            raise

    @property
    def path(self) -> Path:
        """Where the file was when it was opened."""
        return self._database.path

    @property
    def read_only(self) -> bool:
        """Whether nothing can be written in this place."""
        return self._database.read_only

    @property
    def ended_abruptly(self) -> bool:
        """Whether the window that had it alone before was cut short."""
        return self._alone is not None and self._alone.was_left

    @property
    def last_step_number(self) -> int:
        """Number of the last step seen or written."""
        return self._last.step

    @property
    def last_at(self) -> str:
        """Local clock time of the last step in the file, ISO 8601; ``""`` in one without a history.

        Raises:
            StorageError: the file cannot be read.
        """
        with self._database.reading() as connection:
            found = connection.execute('SELECT "at" FROM "history" ORDER BY "seq" DESC LIMIT 1').fetchone()
        return str(found[0]) if found else ""

    @property
    def last_change_number(self) -> int:
        """Number of the last row change seen or written."""
        return self._last.seq

    def read(self) -> State:
        """What stands in the file; from here on this is the state writing goes on from.

        Raises:
            StorageError: the file cannot be read.
        """
        with self._database.reading() as connection:
            last = position(connection)
            rows = [
                (table, row) for table in self.layout.tables.values() for row in connection.execute(table.select)
            ]
        try:
            state: State = self.layout.state(table.record(row) for table, row in rows)
        except (ValueError, TypeError) as error:
            raise damaged(self.path, "a row is not a record") from error
        self._last = last
        return state

    def write(self, act: Act, changes: Sequence[RowChange], kind: StepKind = "do", of: int | None = None) -> Step:
        """Make the changes and note them in the history: all of it, on the disk, or nothing.

        Args:
            act: what the person did.
            changes: at least one, in the order they are made.
            kind: done, taken back or done again.
            of: for the last two, number of the step taken back or done again.

        Returns:
            The step as the history holds it.

        Raises:
            ValueError: no changes.
            StorageError: nothing was written: the file is not as this store last saw it ("stale"), a record is
                refused, or the disk or the place does not allow it.
        """
        if not changes:
            raise ValueError("a step needs a change")
        step = Step(self._last.step + 1, _text_of(self._clock()), kind, act, of, tuple(changes))
        with self._database.writing() as connection:
            if position(connection) != self._last:
                raise StorageError("stale", path=str(self.path))
            last = append_step(connection, step, self._last, self.path)
        self._last = last
        return step

    def steps(self, last: int | None = None) -> list[Step]:
        """The steps of the history, oldest first.

        Args:
            last: how many of the last steps; None = all.

        Raises:
            StorageError: the file cannot be read.
        """
        rows: list[HistoryRow] = []
        with self._database.reading() as connection:
            newest_first = connection.execute(f'SELECT {HISTORY} FROM "history" ORDER BY "seq" DESC')
            floor: int | None = None
            for row in map(HistoryRow.of_cells, newest_first):
                if floor is None:
                    floor = 0 if last is None else row.step - last
                if row.step <= floor:
                    break
                rows.append(row)
            newest_first.close()
        try:
            return [step_of(list(group)) for _, group in groupby(reversed(rows), key=lambda row: row.step)]
        except (ValueError, TypeError) as error:
            raise damaged(self.path, "a row of the history is not a record") from error

    def history_of(self, key: tuple[str | int, ...]) -> list[Held]:
        """Everything a key has ever held, newest first.

        Args:
            key: as ``key_of`` gives it.

        Raises:
            StorageError: the file cannot be read.
        """
        with self._database.reading() as connection:
            rows = connection.execute(
                f'SELECT {HISTORY} FROM "history" WHERE "tbl" = ? AND "key" = ? ORDER BY "seq" DESC',
                (key[0], key_text(key)),
            ).fetchall()
        try:
            return [Held(row.step, row.at, row.act, row.change().after) for row in map(HistoryRow.of_cells, rows)]
        except (ValueError, TypeError) as error:
            raise damaged(self.path, "a row of the history is not a record") from error

    def highest_ids(self) -> dict[str, int]:
        """The highest number each table has ever used as an id, tables that never held a record left out.

        Raises:
            StorageError: the file cannot be read.
        """
        with self._database.reading() as connection:
            rows = connection.execute(
                'SELECT "tbl", max(CAST("key" AS INTEGER)) FROM "history"'
                " WHERE \"tbl\" IN ('measure', 'change', 'span', 'plan', 'client') GROUP BY \"tbl\""
            ).fetchall()
        return dict(rows)

    def verify(self) -> None:
        """Check the whole file: its pages, the chain of the history, and that the history gives the tables.

        Reads everything; a long journal takes a while.

        Raises:
            StorageError: the file is damaged or cannot be read.
        """
        with self._database.reading() as connection:
            check_whole(connection, self.path, self.layout.tables)

    def close(self) -> None:
        """Let go of the file; closing twice does nothing."""
        self._database.close()
        if self._alone is not None:
            self._alone.release()
            self._alone = None

    def __enter__(self) -> Self:
        return self

    def __exit__(self, *_: object) -> None:
        self.close()


class Store(FileStore[Journal]):
    """One open journal."""

    layout = JOURNAL


@dataclass(frozen=True)
class SeenFile:
    """What a caseload remembers of a file in the clients' folder.

    Attributes:
        stamp: tells whether the file, or what was asked of it, is another by now.
        facts: what was made out of it, as text.
    """

    stamp: str
    facts: str


class CaseloadStore(FileStore[Caseload]):
    """One open caseload, with what it remembers of each journal."""

    layout = CASELOAD

    def remembered(self) -> dict[str, SeenFile]:
        """What is remembered, by the name of the file.

        Raises:
            StorageError: the file cannot be read.
        """
        with self._database.reading() as connection:
            rows = connection.execute('SELECT "file", "stamp", "facts" FROM "seen"').fetchall()
        return {file: SeenFile(stamp, facts) for file, stamp, facts in rows}

    def remember(self, seen: Mapping[str, SeenFile], gone: Iterable[str] = ()) -> None:
        """Remember what was made out of some files, in place of what was remembered of them.

        Args:
            seen: by the name of the file.
            gone: names of files that are no longer there.

        Raises:
            StorageError: nothing is remembered.
        """
        with self._database.writing() as connection:
            connection.executemany(
                'INSERT OR REPLACE INTO "seen" ("file", "stamp", "facts") VALUES (?, ?, ?)',
                [(file, one.stamp, one.facts) for file, one in seen.items()],
            )
            connection.executemany('DELETE FROM "seen" WHERE "file" = ?', [(file,) for file in gone])


def append_step(connection: sqlite3.Connection, step: Step, last: Position, path: Path) -> Position:
    """Make the changes of a step and note them, inside the caller's transaction."""
    for change in step.changes:
        table = table_of(change.record)
        key = key_of(change.record)
        try:
            before, after = (
                None if record is None else table.cells(record) for record in (change.before, change.after)
            )
        except (ValueError, TypeError) as error:
            # The key says where; the value stays out of what may end up in a report.
            raise StorageError("refused value", path=str(path), key=key) from error
        _make(connection, table, key_cells(change.record), before, after, path)
        row = HistoryRow(
            last.seq + 1,
            step.number,
            step.at,
            step.kind,
            step.act,
            step.of,
            table.name,
            key_text(key),
            None if before is None else table.json(before),
            None if after is None else table.json(after),
        )
        chain = row.chained(last.chain)
        connection.execute(_APPEND, (*row, chain))
        last = Position(row.seq, row.step, chain)
    return last


def _make(
    connection: sqlite3.Connection,
    table: Table,
    key: tuple[Cell, ...],
    before: tuple[Cell, ...] | None,
    after: tuple[Cell, ...] | None,
    path: Path,
) -> None:
    found = connection.execute(table.select_one, key).fetchone()
    if found != before:
        raise StorageError("stale", path=str(path))
    if after is None:
        connection.execute(table.delete, key)
    elif before is None:
        connection.execute(table.insert, after)
    else:
        connection.execute(table.update, (*after, *key))


def step_of(rows: list[HistoryRow]) -> Step:
    """The step that these rows are, all of them.

    Raises:
        ValueError: a row is not of records.
        TypeError: as above.
    """
    first = rows[0]
    changes = tuple(row.change() for row in rows)
    return Step(first.step, first.at, first.kind, first.act, first.of, changes)


def _text_of(moment: datetime) -> str:
    return moment.isoformat(timespec="seconds")
