"""Erasing for good: out of the tables, out of the history, out of every copy that can be reached.

The journal is written anew without what is erased and takes the old one's place in one move; what was there
before is overwritten. Whoever is killed in the middle has either the old journal or the new one.
"""

from __future__ import annotations

import os
import secrets
import sqlite3
from collections.abc import Callable
from contextlib import suppress
from dataclasses import replace
from datetime import date, datetime
from pathlib import Path
from typing import BinaryIO

from desktop.errors import StorageError
from desktop.journal.records import Change, DayNote, Entry, Measure, Plan, Record, Span
from desktop.journal.row_change import Step
from desktop.storage.backups import ENDING, copies_folder, copies_of, send_copy, take_copy
from desktop.storage.chain import Position
from desktop.storage.database import create_file
from desktop.storage.new_files import file_errors, names_to_disk
from desktop.storage.store import Store, append_step

Erased = Callable[[Record], bool]
"""Whether a record is erased; the same for all records of one key."""

_PIECE = 1 << 20


def of_day(day: date) -> Erased:
    """Everything that was written down for one day."""
    return lambda record: isinstance(record, Entry | DayNote) and record.day == day


def of_measure(measure: int) -> Erased:
    """One measure, its entries and plans, and what was marked for it alone."""

    def is_erased(record: Record) -> bool:
        match record:
            case Measure():
                return record.id == measure
            case Entry() | Plan():
                return record.measure == measure
            case Change() | Span():
                return record.measures == (measure,)
        return False

    return is_erased


def erase(path: Path, erased: Erased, now: datetime, place: Path | None = None) -> bool:
    """Erase records from a journal that nobody has open, and from its copies.

    All earlier copies and damaged files that were set aside go; one new copy is taken.

    Args:
        path: the journal.
        erased: what goes.
        now: local time, for the new copy.
        place: the second place for copies, or None.

    Returns:
        Whether the second place was reached, or there is none.

    Raises:
        StorageError: nothing was erased; only the new copy may be what could not be made.
    """
    with Store.open(path, alone=True) as store:
        store.verify()
        steps = _without(store.steps(), erased)
    new = path.with_name(f".{path.name}.{secrets.token_hex(4)}.part")

    def fill(connection: sqlite3.Connection) -> None:
        last = Position()
        for step in steps:
            last = append_step(connection, step, last, path)

    create_file(new, fill)
    try:
        with file_errors(path), path.open("r+b") as old:
            new.replace(path)
            names_to_disk(path.parent)
            _overwrite(old)
    finally:
        new.unlink(missing_ok=True)
    with file_errors(path):
        reached = _shred_beside(path, place)
    copy = take_copy(path, now)
    if place is not None and reached:
        with suppress(StorageError):
            send_copy(copy, path, place)
    return reached


def erase_everything(path: Path, place: Path | None = None) -> bool:
    """Erase a journal that nobody has open, with all its copies.

    Returns:
        Whether the second place was reached, or there is none.

    Raises:
        StorageError: it could not be erased, or not all of it.
    """
    with file_errors(path):
        reached = _shred_beside(path, place)
        _shred(path)
        names_to_disk(path.parent)
    return reached


def _without(steps: list[Step], erased: Erased) -> list[Step]:
    """The steps as if what is erased had never been written, numbered without gaps."""
    number_of: dict[int, int] = {}
    left: list[Step] = []
    for step in steps:
        changes = tuple(change for change in step.changes if not erased(change.record))
        if changes:
            number_of[step.number] = len(left) + 1
            # A step and the one that takes it back are of the same records, so they stay or go together.
            of = None if step.of is None else number_of[step.of]
            left.append(replace(step, number=len(left) + 1, of=of, changes=changes))
    return left


def _shred_beside(path: Path, place: Path | None) -> bool:
    """Shred the copies in both places and the damaged files that were set aside; whether both were there."""
    asides = path.parent.glob(f"{path.name.removesuffix(ENDING)} damaged *{ENDING}")
    for one in [*asides, *(copy.path for copy in copies_of(path))]:
        _shred(one)
    with suppress(OSError):
        copies_folder(path).rmdir()
    if place is None:
        return True
    try:
        for copy in copies_of(path, place):
            _shred(copy.path)
    except OSError:
        return False
    return place.is_dir()


def _shred(path: Path) -> None:
    with path.open("r+b") as file:
        _overwrite(file)
    path.unlink()


def _overwrite(file: BinaryIO) -> None:
    size = file.seek(0, os.SEEK_END)
    file.seek(0)
    for start in range(0, size, _PIECE):
        file.write(bytes(min(_PIECE, size - start)))
    file.flush()
    os.fsync(file.fileno())
