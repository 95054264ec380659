"""The folder the clients' journals are put into: each file read as a stranger's, guarded, and made into facts."""

from __future__ import annotations

import hashlib
import os
from collections.abc import Callable, Generator, Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import islice
from pathlib import Path
from typing import TYPE_CHECKING

from analysis import AnalysisError
from desktop.caseload.facts import FACTS_VERSION, Facts, facts_of
from desktop.errors import StorageError
from desktop.journal.clients import Client, CoachingSession
from desktop.storage.new_files import file_errors
from desktop.storage.store import SeenFile
from desktop.storage.stranger import look_at_stranger

if TYPE_CHECKING:
    from concurrent.futures import Future

JOURNAL_ENDING = ".dayfence"

_WORTH_A_PROCESS = 48
"""Starting another process takes as long as reading this many journals."""
_CHUNK = 8

Known = Mapping[str, tuple[Client, tuple[CoachingSession, ...]]]
"""The clients and their sessions, by the journal's id."""


@dataclass(frozen=True)
class FileSeen:
    """What became of one file of the folder.

    Attributes:
        name: of the file.
        seen: what to remember of it; None where nothing was learnt.
        facts: of the journal; what was last known of it where the file cannot be read now.
        error: why it cannot be read.
    """

    name: str
    seen: SeenFile | None
    facts: Facts | None
    error: StorageError | None = None


def journals_in(folder: Path) -> list[Path]:
    """The journals of a folder, by name.

    Raises:
        StorageError: the folder is not there or cannot be read.
    """
    with file_errors(folder):
        return sorted(
            path
            for path in folder.iterdir()
            if path.name.endswith(JOURNAL_ENDING) and not path.name.startswith(".")
        )


def look_through(
    paths: Sequence[Path],
    remembered: Mapping[str, SeenFile],
    known: Known,
    is_stopped: Callable[[], bool] = lambda: False,
) -> Iterator[FileSeen]:
    """Make every file into facts: first those that are as they were remembered, then the others, on every core.

    Args:
        paths: of :func:`journals_in`.
        remembered: of an earlier time, by the name of the file.
        known: the clients.
        is_stopped: asked between files; once it says so, nothing more is read.
    """
    unread: list[Path] = []
    for path in paths:
        as_it_was = _as_remembered(path, remembered.get(path.name), known)
        if as_it_was is None:
            unread.append(path)
        else:
            yield as_it_was
    cores = os.cpu_count() or 1
    reading = _one_by_one(unread, known) if len(unread) < _WORTH_A_PROCESS or cores < 2 else _shared(unread, known)
    for one in reading:
        if is_stopped():
            reading.close()
            return
        # What was known of a file that cannot be read now is still known.
        if one.error is not None and one.name in remembered:
            one = FileSeen(one.name, None, _facts_in(remembered[one.name]), one.error)
        yield one


def look_at(path: Path, known: Known) -> FileSeen:
    """Make one file into facts."""
    before = _file_stamp(path)
    try:
        stranger = look_at_stranger(path)
        journal_id = stranger.journal.person.journal_id
        client, sessions = known.get(journal_id, (None, ()))
        facts = facts_of(stranger.journal, stranger.last_at, stranger.last_change, client, sessions)
    except StorageError as error:
        return FileSeen(path.name, None, None, error)
    except (AnalysisError, ArithmeticError, ValueError) as error:
        # No file of a client's may keep the others from being read.
        detail = StorageError("damaged", path=str(path), detail=type(error).__name__)
        return FileSeen(path.name, None, None, detail)
    return FileSeen(path.name, SeenFile(f"{before} {asked_of(client, sessions)}", facts.to_text()), facts)


def asked_of(client: Client | None, sessions: Sequence[CoachingSession]) -> str:
    """A mark that is another one when something else is asked of the same journal."""
    asked = repr((FACTS_VERSION, client and (client.doing, client.outcome), [_counted(one) for one in sessions]))
    return hashlib.blake2b(asked.encode(), digest_size=8).hexdigest()


def _counted(session: CoachingSession) -> tuple[object, ...]:
    return session.day, session.agreed, session.times, session.spare


def _file_stamp(path: Path) -> str:
    try:
        found = path.stat()
    except OSError:
        return "gone"
    return f"{found.st_size} {found.st_mtime_ns} {found.st_ino}"


def _as_remembered(path: Path, seen: SeenFile | None, known: Known) -> FileSeen | None:
    """What is remembered of a file, where the file and what is asked of it are the same."""
    if seen is None or not seen.stamp.startswith(f"{_file_stamp(path)} "):
        return None
    facts = _facts_in(seen)
    if facts is None or not seen.stamp.endswith(asked_of(*known.get(facts.journal_id, (None, ())))):
        return None
    return FileSeen(path.name, seen, facts)


def _facts_in(seen: SeenFile) -> Facts | None:
    try:
        return Facts.of_text(seen.facts)
    except ValueError:
        return None


def _one_by_one(paths: Sequence[Path], known: Known) -> Generator[FileSeen, None, None]:
    for path in paths:
        yield look_at(path, known)


def _shared(paths: Sequence[Path], known: Known) -> Generator[FileSeen, None, None]:
    """The same on every core; the very first is read before the others start, to have something to see."""
    yield from _one_by_one(paths[:1], known)
    # Other processes are only needed where many files are read, and not to show the window.
    from concurrent.futures import ProcessPoolExecutor
    from multiprocessing import get_context

    chunks = (paths[start : start + _CHUNK] for start in range(_CHUNK, len(paths), _CHUNK))
    cores = os.cpu_count() or 1
    # Spawned: a forked child of a program with a window may hang on a lock that another thread held.
    with ProcessPoolExecutor(cores, mp_context=get_context("spawn"), initializer=_know, initargs=(known,)) as pool:
        waiting: list[Future[list[FileSeen]]] = [
            pool.submit(_look_at_all, chunk) for chunk in islice(chunks, 2 * cores)
        ]
        try:
            yield from _one_by_one(paths[1:_CHUNK], known)
            while waiting:
                chunk = waiting.pop(0).result()
                waiting += [pool.submit(_look_at_all, more) for more in islice(chunks, 1)]
                yield from chunk
        finally:
            for one in waiting:
                one.cancel()


_known_here: Known = {}


def _know(known: Known) -> None:
    global _known_here
    _known_here = known


def _look_at_all(paths: Sequence[Path]) -> list[FileSeen]:
    return [look_at(path, _known_here) for path in paths]
