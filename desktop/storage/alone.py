"""One window for one journal: a lock on a small file beside it, which is free again when its holder is gone.

The lock is never on the journal itself, where it would stand in SQLite's way. It is one of SQLite's own locks,
since those end with the process on every system, killed or not.
"""

from __future__ import annotations

import contextlib
import os
import sqlite3
from pathlib import Path

from desktop.errors import StorageError

_TRIES = 5


class Alone:
    """Holds a journal for one window.

    Attributes:
        was_left: the window before did not let go by itself: it was killed, or the power went.
    """

    def __init__(self, lock: Path, connection: sqlite3.Connection, was_left: bool) -> None:
        """Of a lock that is held; use :meth:`hold`."""
        self.was_left = was_left
        self._lock = lock
        self._connection = connection

    @classmethod
    def hold(cls, journal: Path) -> Alone | None:
        """Hold a journal.

        Args:
            journal: the file.

        Returns:
            None in a place that has no locks, where nobody can be alone.

        Raises:
            StorageError: another window holds it.
        """
        lock = journal.absolute().with_name(f".{journal.name}.lock")
        for _ in range(_TRIES):
            try:
                os.close(os.open(lock, os.O_CREAT | os.O_EXCL | os.O_WRONLY, 0o600))
                was_left = False
            except FileExistsError:
                was_left = True
            except OSError:
                return None
            before = _number(lock)
            try:
                connection = _locked(lock)
            except sqlite3.OperationalError as error:
                if error.sqlite_errorname == "SQLITE_BUSY":
                    raise StorageError("open already", path=str(journal)) from error
                continue
            # The window before may have taken its file away between our opening it and locking it.
            if before is not None and _number(lock) == before:
                return cls(lock, connection, was_left)
            connection.close()
        return None

    def release(self) -> None:
        """Let others have it."""
        with contextlib.suppress(OSError):
            self._lock.unlink()
        self._connection.close()


def _locked(lock: Path) -> sqlite3.Connection:
    connection = sqlite3.connect(
        f"{lock.as_uri()}?mode=rw", uri=True, timeout=0, isolation_level=None, check_same_thread=False
    )
    try:
        # Nothing is ever written into it, so no second file beside it is wanted either.
        connection.execute("PRAGMA journal_mode = MEMORY")
        connection.execute("BEGIN EXCLUSIVE")
    except BaseException:
        connection.close()
        raise
    return connection


def _number(lock: Path) -> int | None:
    try:
        return lock.stat().st_ino
    except OSError:
        return None
