"""Looking after the open file: the whole of it is checked and copies are taken, all off the screen's thread."""

from __future__ import annotations

from collections.abc import Callable
from contextlib import suppress
from functools import partial
from pathlib import Path

from PySide6.QtCore import QObject, Signal

from desktop.errors import StorageError
from desktop.journal.journal import Journal
from desktop.models.background import Background
from desktop.models.session import Session
from desktop.storage.backups import (
    EarlierCopy,
    check_file,
    copies_of,
    is_due_at_closing,
    is_due_at_opening,
    read_copy,
    send_copy,
    take_copy,
)


class Keeping(QObject):
    """Takes the copies that are due, and those that are asked for.

    Signals:
        damaged: the file is damaged, with the error.
        copied: there is a new copy.
        not_copied: no copy could be taken, or the second place did not take it, with the error.
    """

    damaged = Signal(object)
    copied = Signal(object)
    not_copied = Signal(object)

    def __init__(self, session: Session, place: Path | None = None, parent: QObject | None = None) -> None:
        """For a journal that is open.

        Args:
            session: the open journal.
            place: the second place for copies, or None.
            parent: as ever.
        """
        super().__init__(parent)
        self.place = place
        self._session = session
        self._worker = Background(self)

    def begin(self) -> None:
        """Check the whole file, and take the copy of the day when it is due."""
        if self._session.read_only:
            self._worker.run(partial(check_file, self._session.path), _nothing, self._found)
        else:
            self._worker.run(partial(self._begin, self._session.last_change_number), self._done, self._found)

    def copies(self) -> list[EarlierCopy]:
        """The copies there are, newest first."""
        return sorted(copies_of(self._session.path), reverse=True)

    def last_sent(self) -> EarlierCopy | None:
        """The last copy in the second place; None when there is none, or the place is not there."""
        return max(copies_of(self._session.path, self.place), default=None) if self.place else None

    def copy_now(self) -> None:
        """Take a copy of what is on the disk."""
        self._worker.run(self._take, self._done, self.not_copied.emit)

    def read(
        self, copy: EarlierCopy, done: Callable[[Journal], None], failed: Callable[[Exception], None]
    ) -> None:
        """Read a copy; then call ``done`` or ``failed``."""
        self._worker.run(partial(read_copy, copy.path), done, failed)

    def close(self) -> None:
        """Take a copy when much was changed since the last one; everything is on the disk already."""
        self._worker.wait()
        session = self._session
        if not session.read_only and is_due_at_closing(copies_of(session.path), session.last_change_number):
            # Nobody is left to be told; the next opening finds that there is none.
            with suppress(StorageError):
                self._take()

    def _begin(self, seq: int) -> EarlierCopy | None:
        check_file(self._session.path)
        if is_due_at_opening(copies_of(self._session.path), seq, self._session.now()):
            return self._take()
        return None

    def _take(self) -> EarlierCopy:
        copy = take_copy(self._session.path, self._session.now())
        if self.place is not None:
            send_copy(copy, self._session.path, self.place)
        return copy

    def _done(self, copy: EarlierCopy | None) -> None:
        if copy is not None:
            self.copied.emit(copy)

    def _found(self, error: Exception) -> None:
        if isinstance(error, StorageError) and error.reason == "damaged":
            self.damaged.emit(error)
        elif not self._session.read_only:
            self.not_copied.emit(error)


def _nothing(_: object) -> None:
    pass
