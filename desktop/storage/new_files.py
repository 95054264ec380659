"""Files that are there complete or not at all, and for their owner only."""

from __future__ import annotations

import contextlib
import errno
import os
import secrets
from collections.abc import Iterator
from pathlib import Path

from desktop.errors import StorageError

_REASONS: dict[int | None, str] = {
    errno.ENOENT: "missing",
    errno.ENOTDIR: "missing",
    errno.EACCES: "read only",
    errno.EPERM: "read only",
    errno.EROFS: "read only",
    errno.ENOSPC: "disk full",
    errno.EDQUOT: "disk full",
}


@contextlib.contextmanager
def making(path: Path) -> Iterator[Path]:
    """A file to fill under another name beside its place; it takes its place when the block ends well.

    Args:
        path: where; nothing may be there yet.

    Yields:
        An empty file that is gone afterwards.

    Raises:
        StorageError: something is there already, or the file cannot be made.
    """
    part = path.with_name(f".{path.name}.{secrets.token_hex(4)}.part")
    with file_errors(path):
        # SQLite alone would make a file that others on this computer can read.
        os.close(os.open(part, os.O_CREAT | os.O_EXCL | os.O_WRONLY, 0o600))
        try:
            yield part
            _to_disk(part, os.O_RDWR)
            _take_place(part, path)
        finally:
            part.unlink(missing_ok=True)


@contextlib.contextmanager
def file_errors(path: Path) -> Iterator[None]:
    """Turn what the system raises into a ``StorageError`` with the reason a person can act on."""
    try:
        yield
    except FileExistsError as error:
        raise StorageError("cannot open", path=str(path), exists=True) from error
    except OSError as error:
        reason = _REASONS.get(error.errno, "cannot open")
        raise StorageError(reason, path=str(path), detail=error.strerror) from error


def names_to_disk(folder: Path) -> None:
    """Put the names in a folder on the disk; systems where a folder cannot be opened do it themselves."""
    with contextlib.suppress(OSError):
        _to_disk(folder, os.O_RDONLY)


def _to_disk(path: Path, flags: int) -> None:
    opened = os.open(path, flags)
    try:
        os.fsync(opened)
    finally:
        os.close(opened)


def _take_place(part: Path, path: Path) -> None:
    try:
        # Unlike a renamed file a linked one never takes the place of another.
        os.link(part, path)
    except FileExistsError:
        raise
    except OSError:
        # Not every file system has links.
        if path.exists():
            raise FileExistsError from None
        part.rename(path)
    names_to_disk(path.parent)
