"""Opening the file: what is checked before SQLite touches it, the settings of a connection, transactions.

The file is never opened by other means while a connection to it is open: closing that other handle would
drop SQLite's lock on some systems, and a second process could then write in the middle of a transaction.
"""

from __future__ import annotations

import contextlib
import os
import sqlite3
import stat
import weakref
from collections.abc import Callable, Iterator
from pathlib import Path
from typing import Any

from desktop.errors import StorageError
from desktop.storage.layout import JOURNAL, Layout
from desktop.storage.migrations import expected_schema, migrate, schema_of, version_of
from desktop.storage.new_files import making

_BUSY_SECONDS = 3.0
_HEADER_BYTES = 100
_MAGIC = b"SQLite format 3\x00"

SETTINGS: tuple[tuple[str, str, object], ...] = (
    # A file from elsewhere must not run functions through its schema.
    ("trusted_schema", "OFF", 0),
    ("cell_size_check", "ON", 1),
    # A stray pointer cannot write into a file that is not mapped.
    ("mmap_size", "0", 0),
    # What was removed leaves no trace in free pages, and nothing goes into temporary files.
    ("secure_delete", "ON", 1),
    ("temp_store", "MEMORY", 2),
    # One file at rest, and a file moved or replaced underneath is noticed.
    ("journal_mode", "DELETE", "delete"),
    # Below EXTRA a power cut can take back the last step that was already told as saved.
    ("synchronous", "EXTRA", 3),
    ("fullfsync", "ON", 1),
    ("foreign_keys", "ON", 1),
    ("busy_timeout", str(int(_BUSY_SECONDS * 1000)), int(_BUSY_SECONDS * 1000)),
)
"""Name, value to set, value read back; in the order they are set on every connection."""

# The first that fits the start of SQLite's name of the error decides.
_REASONS: tuple[tuple[str, str], ...] = (
    ("SQLITE_FULL", "disk full"),
    ("SQLITE_READONLY_DBMOVED", "moved"),
    # The last step was cut short and this place does not let us take it back.
    ("SQLITE_READONLY_ROLLBACK", "cannot open"),
    ("SQLITE_READONLY", "read only"),
    ("SQLITE_BUSY", "busy"),
    ("SQLITE_LOCKED", "busy"),
    ("SQLITE_CONSTRAINT", "refused value"),
    ("SQLITE_TOOBIG", "refused value"),
    ("SQLITE_CANTOPEN", "cannot open"),
    ("SQLITE_PERM", "cannot open"),
    ("SQLITE_AUTH", "cannot open"),
    ("SQLITE_CORRUPT", "damaged"),
    ("SQLITE_NOTADB", "damaged"),
    # Only a stranger's file is given up for taking too long.
    ("SQLITE_INTERRUPT", "damaged"),
    # Every statement is one the schema answers, so one that fails met other tables.
    ("SQLITE_ERROR", "damaged"),
)


class Database:
    """One open connection to one journal file.

    Attributes:
        path: where the file was when it was opened.
        read_only: the file or its folder cannot be written.
    """

    def __init__(self, connection: sqlite3.Connection, path: Path, read_only: bool) -> None:
        self._connection = connection
        self.path = path
        self.read_only = read_only

    @contextlib.contextmanager
    def reading(self) -> Iterator[sqlite3.Connection]:
        """Everything read inside is of one moment.

        Raises:
            StorageError: the file cannot be read.
        """
        with self._transaction("BEGIN") as connection:
            yield connection

    @contextlib.contextmanager
    def writing(self) -> Iterator[sqlite3.Connection]:
        """Everything written inside is kept, and is on the disk afterwards; after an error nothing of it is.

        Raises:
            StorageError: the file cannot be written, or refuses a value.
        """
        if self.read_only:
            raise StorageError("read only", path=str(self.path))
        with self._transaction("BEGIN IMMEDIATE") as connection:
            yield connection

    @contextlib.contextmanager
    def _transaction(self, begin: str) -> Iterator[sqlite3.Connection]:
        with storage_errors(self.path):
            # SQLite trusts the pages it remembers when a counter in the file is the one it knows. A copy
            # with one other edit has that counter too, so nothing is remembered from one act to the next.
            self._connection.execute("PRAGMA shrink_memory")
            self._connection.execute(begin)
            try:
                yield self._connection
                self._connection.execute("COMMIT")
            finally:
                if self._connection.in_transaction:
                    self._connection.execute("ROLLBACK")

    def close(self) -> None:
        """Let go of the file; closing twice does nothing."""
        self._connection.close()
        for key, database in list(_open_files.items()):
            if database is self:
                del _open_files[key]


_open_files: weakref.WeakValueDictionary[tuple[int, int], Database] = weakref.WeakValueDictionary()


@contextlib.contextmanager
def storage_errors(path: Path) -> Iterator[None]:
    """Turn what SQLite raises into a ``StorageError`` with the reason a person can act on."""
    try:
        yield
    except sqlite3.Error as error:
        name = getattr(error, "sqlite_errorname", None)
        if name is None and not isinstance(error, sqlite3.OperationalError):
            raise
        # An error without a name is a text in the file that Python cannot read.
        reasons = (reason for start, reason in _REASONS if (name or "SQLITE_CORRUPT").startswith(start))
        reason = next(reasons, "disk error")
        raise StorageError(reason, path=str(path), code=name, detail=str(error)) from error
    except UnicodeDecodeError as error:
        # The words of an error quote the file, which may hold anything.
        raise StorageError("damaged", path=str(path), detail="a text cannot be read") from error


def open_database(
    path: Path,
    layout: Layout[Any] = JOURNAL,
    *,
    to_read: bool = False,
    before_migrating: Callable[[Path], object] | None = None,
) -> Database:
    """Open a journal file, checked and brought to the newest version.

    Args:
        path: the file.
        layout: the kind of file.
        to_read: nothing is to be written.
        before_migrating: called with the file before it is brought to a newer version; what it raises stops that.

    Raises:
        StorageError: there is no file, it cannot be opened, is not a journal, is damaged, was made by a newer
            version, or is open already.
    """
    path = path.absolute()
    key = _identity(path)
    if key in _open_files:
        raise StorageError("open already", path=str(path))
    check_header(path, layout)
    read_only = to_read or not (os.access(path, os.W_OK) and os.access(path.parent, os.W_OK))
    with storage_errors(path):
        connection = connect(path, "ro" if read_only else "rw")
        try:
            _check_contents(connection, path, layout)
            if version_of(connection) < len(layout.steps):
                if read_only:
                    raise StorageError("read only", path=str(path))
                if before_migrating is not None:
                    before_migrating(path)
                migrate(connection, layout.steps, layout.application_id)
                _check_contents(connection, path, layout)
        except BaseException:
            connection.close()
            raise
    database = Database(connection, path, read_only)
    _open_files[key] = database
    return database


def create_file(path: Path, fill: Callable[[sqlite3.Connection], None], layout: Layout[Any] = JOURNAL) -> None:
    """Make a file, complete or not at all.

    It is made under another name beside its place, so a file half made is never found there.

    Args:
        path: where; nothing may be there yet.
        fill: writes the first rows, inside a transaction.
        layout: the kind of file.

    Raises:
        StorageError: something is there already, or the file cannot be made.
    """
    path = path.absolute()
    with making(path) as part, storage_errors(path), contextlib.closing(connect(part, "rw")) as connection:
        migrate(connection, layout.steps, layout.application_id)
        connection.execute("BEGIN IMMEDIATE")
        fill(connection)
        connection.execute("COMMIT")


def connect(path: Path, mode: str) -> sqlite3.Connection:
    """A connection with every setting in force.

    Args:
        path: a file that is there.
        mode: "ro" or "rw".

    Raises:
        StorageError: a setting does not take.
        sqlite3.Error: the file cannot be opened.
    """
    connection = sqlite3.connect(
        f"{path.as_uri()}?mode={mode}",
        uri=True,
        timeout=_BUSY_SECONDS,
        isolation_level=None,
        check_same_thread=False,
    )
    try:
        for name, value, expected in SETTINGS:
            connection.execute(f"PRAGMA {name} = {value}").fetchall()
            found = connection.execute(f"PRAGMA {name}").fetchone()
            if found != (expected,):
                raise StorageError("cannot open", path=str(path), setting=name)
    except BaseException:
        connection.close()
        raise
    return connection


def connect_still(path: Path) -> sqlite3.Connection:
    """A connection to a file that nobody writes to: no lock is taken, and no journal beside it is looked for."""
    return sqlite3.connect(f"{path.absolute().as_uri()}?mode=ro&immutable=1", uri=True, isolation_level=None)


def _identity(path: Path) -> tuple[int, int]:
    try:
        found = path.stat()
    except (FileNotFoundError, NotADirectoryError) as error:
        raise StorageError("missing", path=str(path)) from error
    except OSError as error:
        raise StorageError("cannot open", path=str(path), detail=error.strerror) from error
    if not stat.S_ISREG(found.st_mode):
        raise StorageError("not a journal", path=str(path))
    return found.st_dev, found.st_ino


def application_id_of(path: Path) -> int | None:
    """What kind of file it says it is, by its first bytes alone; None for what is no file of SQLite's, or none."""
    with contextlib.suppress(OSError), path.open("rb") as file:
        header = file.read(_HEADER_BYTES)
        if header.startswith(_MAGIC):
            return int.from_bytes(header[68:72], "big")
    return None


def check_header(path: Path, layout: Layout[Any] = JOURNAL) -> None:
    """Refuse what is no file of the kind, or one of a newer version, by its first bytes alone.

    Raises:
        StorageError: it is refused, or cannot be read.
    """
    try:
        with path.open("rb") as file:
            header = file.read(_HEADER_BYTES)
    except OSError as error:
        raise StorageError("cannot open", path=str(path), detail=error.strerror) from error
    version = int.from_bytes(header[60:64], "big")
    ours = header.startswith(_MAGIC) and int.from_bytes(header[68:72], "big") == layout.application_id
    if not ours or version < 1:
        raise StorageError("not a journal", path=str(path))
    newest = len(layout.steps)
    if version > newest:
        raise StorageError("newer version", path=str(path), version=version, newest=newest)


def _check_contents(connection: sqlite3.Connection, path: Path, layout: Layout[Any]) -> None:
    version = version_of(connection)
    if schema_of(connection) != expected_schema(layout.steps[:version]):
        raise StorageError("damaged", path=str(path), detail="the tables are not those of a journal")
    found = connection.execute("PRAGMA quick_check(1)").fetchone()
    if found != ("ok",):
        raise StorageError("damaged", path=str(path), detail=found[0])
