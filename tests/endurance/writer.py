"""Writes steps of three entries and tells each one once it is written; also in ways that are known to be bad."""

from __future__ import annotations

import os
import sys
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from dataclasses import replace
from datetime import date, timedelta
from pathlib import Path

from desktop.journal.row_change import RowChange
from desktop.storage import database
from desktop.storage.database import Database
from desktop.storage.store import Store
from tests.desktop.storage.samples import EXERCISE, PERSON, minutes

DAYS = 120
AS_IT_IS, NO_SYNC, NO_TRANSACTION, TOLD_TOO_EARLY = "as it is", "no sync", "no transaction", "told too early"


def start(path: Path, steps: int = 20) -> None:
    """A journal to begin with."""
    Store.create(path, [PERSON, EXERCISE]).close()
    write(path, lambda _: None, steps)


def write(path: Path, tell: Callable[[int], object], steps: int | None = None, how: str = AS_IT_IS) -> None:
    """Write so many steps, or until killed."""
    spoil(how)
    with Store.open(path) as store:
        journal = store.read()
        while steps is None or steps > 0:
            number = store.last_step_number + 1
            days = [date(2000, 1, 1) + timedelta((number * 3 + i) % DAYS) for i in range(3)]
            entries = [replace(minutes(1, float(number)), day=day, note=f"{number} " * 20) for day in days]
            changes = [RowChange(journal.find(entry), entry) for entry in entries]
            journal.apply(changes)
            if how == TOLD_TOO_EARLY:
                tell(number)
            store.write("paste values", changes)
            if how != TOLD_TOO_EARLY:
                tell(number)
            steps = None if steps is None else steps - 1


def spoil(how: str) -> None:
    """Make this process write badly, for a trial that must find it."""
    if how == NO_SYNC:
        settings = [one for one in database.SETTINGS if one[0] != "synchronous"]
        database.SETTINGS = (*settings, ("synchronous", "OFF", 0))
    if how == NO_TRANSACTION:
        Database._transaction = _no_transaction  # type: ignore[method-assign]


@contextmanager
def _no_transaction(self: Database, begin: str) -> Iterator[object]:
    yield self._connection


def main() -> None:
    path, steps, how = sys.argv[1:]
    write(Path(path), lambda number: os.write(1, b"%d\n" % number), int(steps), how)


if __name__ == "__main__":
    main()
