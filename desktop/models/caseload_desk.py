"""One open caseload and everything on screen that follows it."""

from __future__ import annotations

import threading
import time
from collections.abc import Callable
from contextlib import suppress
from datetime import date, datetime
from functools import partial
from pathlib import Path

from PySide6.QtCore import QObject, Signal

from desktop.caseload.facts import Facts
from desktop.caseload.folder import FileSeen, Known, journals_in, look_through
from desktop.caseload.queue import QueueRow, rows_of
from desktop.edits.clients import add_clients
from desktop.edits.edit import Edit
from desktop.edits.history import STEPS_KEPT, UndoHistory, redo_edit, undo_edit
from desktop.edits.ids import Ids
from desktop.errors import DayfenceError, StorageError
from desktop.journal.caseload import Caseload
from desktop.journal.clients import Client
from desktop.journal.journal import Journal
from desktop.journal.row_change import Step, StepKind
from desktop.models.background import Background
from desktop.storage.backups import check_file, copies_of, is_due_at_closing, is_due_at_opening, take_copy
from desktop.storage.layout import CASELOAD
from desktop.storage.store import CaseloadStore, SeenFile
from desktop.storage.stranger import read_stranger

_AT_LEAST = 0.1
"""Seconds between two times that what was read is handed to the screen."""


class CaseloadDesk(QObject):
    """The caseload in memory, the file it is written to, and what is known of every client's journal.

    An edit is on the disk when the method returns: a coach's edits are few, and each is worth the wait.

    Signals:
        changed: the queue may be another.
        progressed: so many files of so many are read.
        looked_through: every file is read, or reading was stopped; how many new clients there are.
        not_readable: the folder itself cannot be read, with the error.
        not_kept: the coach's own file is damaged or could not be copied, with the error.
    """

    changed = Signal()
    progressed = Signal(int, int)
    looked_through = Signal(int)
    not_readable = Signal(object)
    not_kept = Signal(object)
    _read = Signal(object)

    def __init__(
        self, store: CaseloadStore, *, now: Callable[[], datetime] = datetime.now, parent: QObject | None = None
    ) -> None:
        super().__init__(parent)
        self.now = now
        self.caseload: Caseload = store.read()
        self.path = store.path
        self.read_only = store.read_only
        self.facts: dict[str, Facts] = {}
        self.errors: dict[str, DayfenceError] = {}
        self.strange: dict[str, DayfenceError] = {}
        self.files: dict[str, Path] = {}
        self._store = store
        self._ids = Ids(store.highest_ids())
        self._history = UndoHistory(store.steps(STEPS_KEPT))
        self._remembered: dict[str, SeenFile] = store.remembered()
        self._learnt: dict[str, SeenFile] = {}
        self._reader = Background(self)
        # A card is not to wait until a thousand journals are read.
        self._opener = Background(self)
        self._stop = threading.Event()
        self._reading = 0
        self._begins_again = self._closed = False
        self.all_read = False
        # What is known of each file; rows stand on what is remembered until the file itself is read.
        self._seen: dict[str, FileSeen] = {
            name: FileSeen(name, seen, facts)
            for name, seen in self._remembered.items()
            if (facts := _facts_of(seen)) is not None
        }
        self._read.connect(self._receive)
        self._settle()

    @property
    def today(self) -> date:
        """The calendar day on this computer."""
        return self.now().date()

    @property
    def folder(self) -> Path | None:
        """Where the clients' journals are; None before the coach chose it."""
        return Path(self.caseload.coach.folder) if self.caseload.coach.folder else None

    @property
    def is_reading(self) -> bool:
        """Whether files are being read."""
        return self._reading > 0

    @property
    def undoable(self) -> Step | None:
        """The act that Undo takes back, or None."""
        return None if self.read_only else self._history.undoable

    @property
    def redoable(self) -> Step | None:
        """The act that Redo does again, or None."""
        return None if self.read_only else self._history.redoable

    def rows(self) -> list[QueueRow]:
        """Every client in the order of the queue."""
        return rows_of(self.caseload, self.facts, self.errors, self.today, all_read=self.all_read)

    def do(self, edit: Edit) -> None:
        """Make an edit; it is on the disk afterwards. An edit of nothing does nothing.

        Raises:
            StorageError: nothing was changed.
        """
        if edit:
            self._make(edit, "do", None)

    def undo(self) -> None:
        """Take back the last act.

        Raises:
            StorageError: nothing was changed.
        """
        if (step := self.undoable) is not None:
            self._make(undo_edit(step), "undo", step.number)

    def redo(self) -> None:
        """Do the act last taken back again.

        Raises:
            StorageError: nothing was changed.
        """
        if (step := self.redoable) is not None:
            self._make(redo_edit(step), "redo", step.number)

    def look_again(self) -> None:
        """Read the folder, off the screen's thread; the queue follows as files are read.

        While it is being read, reading is stopped and begins again.
        """
        if self.folder is None:
            return
        if self.is_reading:
            self._begins_again = True
            self.stop()
            return
        self._stop.clear()
        self._reading += 1
        known: Known = {
            # What is agreed today is for the next time.
            client.journal_id: (
                client,
                tuple(one for one in self.caseload.sessions_of(client.id) if one.day < self.today),
            )
            for client in self.caseload.clients.values()
        }
        job = partial(self._look_through, self.folder, dict(self._remembered), known)
        self._reader.run(job, self._done, self._failed)

    def look_after(self) -> None:
        """Check the whole of the coach's own file and take the copy of the day when it is due."""
        self._reader.run(partial(self._look_after, self._store.last_change_number), _nothing, self.not_kept.emit)

    def read_journal(
        self, client: Client, done: Callable[[Journal], None], failed: Callable[[Exception], None]
    ) -> None:
        """Read a client's journal, guarded and off the screen's thread; then call ``done`` or ``failed``.

        It fails where the file is another client's by now.

        Raises:
            KeyError: there is no file of the client's.
        """
        path = self.files[client.journal_id]

        def read() -> Journal:
            journal = read_stranger(path)
            if journal.person.journal_id != client.journal_id:
                raise StorageError("missing", path=str(path))
            return journal

        self._opener.run(read, done, failed)

    def stop(self) -> None:
        """Read no further; what was read stays."""
        self._stop.set()

    def wait(self) -> None:
        """Return when nothing is being read; for closing and for tests."""
        self._reader.wait()
        self._opener.wait()

    def close(self) -> None:
        """Stop reading and let go of the file."""
        self._closed = True
        self.stop()
        self._reader.wait()
        self._opener.wait()
        if not self.read_only and is_due_at_closing(copies_of(self.path), self._store.last_change_number):
            # Nobody is left to be told; the next opening finds that there is none.
            with suppress(StorageError):
                take_copy(self.path, self.now(), layout=CASELOAD)
        self._store.close()

    def _make(self, edit: Edit, kind: StepKind, of: int | None) -> None:
        step = self._store.write(edit.act, edit.changes, kind, of)
        self.caseload.apply(edit.changes)
        self._history.record(step)
        self.changed.emit()

    def _look_after(self, last_change: int) -> None:
        """Called on the reader's thread."""
        check_file(self.path, CASELOAD)
        if not self.read_only and is_due_at_opening(copies_of(self.path), last_change, self.now()):
            take_copy(self.path, self.now(), layout=CASELOAD)

    def _look_through(self, folder: Path, remembered: dict[str, SeenFile], known: Known) -> tuple[Path, list[str]]:
        """Called on the reader's thread; gives the folder and the names of the files there are."""
        paths = journals_in(folder)
        waiting: list[FileSeen] = []
        told = -_AT_LEAST  # The first is shown at once.
        for count, one in enumerate(look_through(paths, remembered, known, self._stop.is_set), start=1):
            waiting.append(one)
            if time.monotonic() - told >= _AT_LEAST or count == len(paths):
                self._read.emit((folder, waiting, count, len(paths)))
                waiting, told = [], time.monotonic()
        if waiting:
            self._read.emit((folder, waiting, len(paths), len(paths)))
        return folder, [path.name for path in paths]

    def _receive(self, read: tuple[Path, list[FileSeen], int, int]) -> None:
        folder, seen, count, of = read
        if self._closed or folder != self.folder:
            return
        for one in seen:
            self._seen[one.name] = one
            if one.seen is not None:
                self._learnt[one.name] = one.seen
        self._settle()
        self.progressed.emit(count, of)
        self.changed.emit()

    def _settle(self) -> None:
        """Which file stands for which journal: of those that can be read the one that reaches farthest.

        A file that cannot be read stands for the journal it was, where no other copy of that is whole.
        """
        self.facts, self.errors, self.files, self.strange = {}, {}, {}, {}
        folder = self.folder or Path()
        for whole in (True, False):
            for one in sorted(self._seen.values(), key=lambda one: one.name):
                if (one.error is None) is not whole:
                    continue
                held = self.facts.get(one.facts.journal_id) if one.facts is not None else None
                if one.facts is None or (not whole and held is not None):
                    if one.error is not None:
                        self.strange[one.name] = one.error
                elif held is None or _reach(one.facts) > _reach(held):
                    journal_id = one.facts.journal_id
                    self.facts[journal_id], self.files[journal_id] = one.facts, folder / one.name
                    if one.error is not None:
                        self.errors[journal_id] = one.error

    def _done(self, read: tuple[Path, list[str]]) -> None:
        folder, names = read
        self._reading -= 1
        if self._closed:
            return
        if self._begins_again:
            self._begins_again = False
            self.look_again()
            return
        self.all_read = not self._stop.is_set() and folder == self.folder
        if self.all_read:
            self._seen = {name: one for name, one in self._seen.items() if name in set(names)}
            self._settle()
        added = self._add_new()
        self._remember(set(self._remembered) - set(names) if self.all_read else set())
        self.changed.emit()
        self.looked_through.emit(added)

    def _failed(self, error: Exception) -> None:
        self._reading -= 1
        if self._closed:
            return
        self.all_read = self._begins_again = False
        self.looked_through.emit(0)
        if not isinstance(error, DayfenceError):
            raise error
        self.not_readable.emit(error)

    def _add_new(self) -> int:
        """A client for each journal that belongs to none, called as its owner or its file is called."""
        if self.read_only:
            return 0
        found = sorted((self.files[one].name, one) for one in self.facts if self.caseload.client_of(one) is None)
        words = [(one, self.facts[one].owner or self.files[one].stem) for _, one in found]
        edit = add_clients(self.caseload, self._ids, words)
        try:
            self.do(edit)
        except StorageError as error:
            self.not_readable.emit(error)
            return 0
        return len(edit.changes)

    def _remember(self, gone: set[str]) -> None:
        """Keep what was learnt; without it the next opening only takes longer."""
        if self.read_only or not (self._learnt or gone):
            return
        try:
            self._store.remember(self._learnt, gone)
        except StorageError as error:
            self.not_readable.emit(error)
            return
        self._remembered = {
            name: seen for name, seen in (self._remembered | self._learnt).items() if name not in gone
        }
        self._learnt = {}


def _facts_of(seen: SeenFile) -> Facts | None:
    try:
        return Facts.of_text(seen.facts)
    except ValueError:
        return None


def _nothing(_: object) -> None:
    pass


def _reach(facts: Facts) -> tuple[int, str]:
    return facts.last_change, facts.last_at
