"""One window for one journal, and free again however its holder went."""

from __future__ import annotations

import os
import signal
import sqlite3
import stat
import subprocess
import sys
from pathlib import Path

import pytest

from desktop.errors import StorageError
from desktop.storage import alone
from desktop.storage.alone import Alone
from desktop.storage.store import Store
from tests.desktop.storage.samples import PERSON, added, minutes, names, refusal

ROOT = Path(__file__).parents[3]
HOLD = """
import sys
from pathlib import Path
from desktop.storage.store import Store
from desktop.errors import StorageError
try:
    store = Store.open(Path(sys.argv[1]), alone=True)
except StorageError as error:
    print(error.reason, flush=True)
else:
    print("held", flush=True)
    sys.stdin.read()
    store.close()
"""


def window(path: Path) -> subprocess.Popen[str]:
    return subprocess.Popen(
        [sys.executable, "-c", HOLD, str(path)],
        cwd=ROOT,
        stdin=subprocess.PIPE,
        stdout=subprocess.PIPE,
        text=True,
    )


def says(program: subprocess.Popen[str]) -> str:
    assert program.stdout is not None
    return program.stdout.readline().strip()


def test_a_second_window_is_refused_and_may_read(store: Store, path: Path) -> None:
    store.write("put value", added(minutes(1)))
    store.close()
    with window(path) as first:
        assert says(first) == "held"
        with window(path) as second:
            assert says(second) == "open already"
        assert refusal(lambda: Store.open(path, alone=True)).reason == "open already"
        with Store.open(path, to_read=True, alone=True) as reader:
            assert len(reader.read().entries[1]) == 1
        first.communicate()
    with window(path) as third:
        assert says(third) == "held"
        third.communicate()
    assert names(path.parent) == [path.name]


@pytest.mark.parametrize("how", [signal.SIGKILL, signal.SIGTERM])
def test_it_is_free_again_after_its_holder_was_killed(store: Store, path: Path, how: signal.Signals) -> None:
    store.close()
    for _ in range(3):
        with window(path) as first:
            assert says(first) == "held"
            first.send_signal(how)
    assert names(path.parent) == [f".{path.name}.lock", path.name]
    with Store.open(path, alone=True) as opened:
        assert opened.ended_abruptly
        assert stat.S_IMODE((path.parent / f".{path.name}.lock").stat().st_mode) == 0o600
        opened.write("put value", added(minutes(1)))
    assert names(path.parent) == [path.name]


def test_a_new_journal_is_held_from_its_start(journal_folder: Path) -> None:
    path = journal_folder / "log"
    with Store.create(path, PERSON, alone=True) as made:
        assert not made.ended_abruptly
    with Store.open(path, alone=True) as opened, window(path) as second:
        assert not opened.ended_abruptly
        assert says(second) == "open already"
        second.communicate()
    assert names(journal_folder) == ["log"]


def test_a_first_read_that_does_not_work_frees_it(
    store: Store, path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    store.close()
    with monkeypatch.context() as patch:
        patch.setattr("desktop.storage.store.position", lambda _: 1 / 0)
        with pytest.raises(ZeroDivisionError):
            Store.open(path, alone=True)
    with window(path) as other:
        assert says(other) == "held"
        other.communicate()


def test_where_no_lock_file_can_be_made(path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def refuse(*_: object) -> int:
        raise PermissionError(13, "Permission denied")

    with monkeypatch.context() as patch:
        patch.setattr(os, "open", refuse)
        assert Alone.hold(path) is None


def test_where_nothing_can_be_locked(path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def no_locks(lock: Path) -> sqlite3.Connection:
        return sqlite3.connect(f"{lock.as_uri()}?mode=nonsense", uri=True)

    monkeypatch.setattr(alone, "_locked", no_locks)
    assert Alone.hold(path) is None


def test_a_lock_file_that_goes_while_it_is_being_locked(path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """The window before closes at the worst moment: its file is gone, and nobody must hold what has no name."""
    locked = alone._locked
    seen: list[Path] = []

    def goes_first(lock: Path) -> sqlite3.Connection:
        connection = locked(lock)
        if not seen:
            lock.unlink()
        seen.append(lock)
        return connection

    monkeypatch.setattr(alone, "_locked", goes_first)
    held = Alone.hold(path)
    assert held is not None
    assert len(seen) == 2
    with pytest.raises(StorageError):
        Alone.hold(path)
    held.release()
    assert names(path.parent) == []
