"""Kill −9 in the middle of copying, erasing or replacing a file: the old one or the new one, never less."""

from __future__ import annotations

import os
import select
import shutil
import signal
from collections.abc import Callable
from contextlib import suppress
from datetime import UTC, date, datetime, timedelta
from pathlib import Path
from random import Random

from desktop.errors import StorageError
from desktop.journal.records import Entry
from desktop.storage.backups import copies_folder, copies_of, read_copy, take_copy
from desktop.storage.erase import erase, of_day
from desktop.storage.salvage import aside_name, put_in_place, win_back, write_won_back
from desktop.storage.store import Store
from tests.endurance.figures import Figure, folder
from tests.endurance.writer import start

DAY = date(2000, 1, 8)
NOW = datetime(2026, 3, 10, 21, tzinfo=UTC)
SECONDS = 0.15
"""Longer than any of the acts takes."""


Act = Callable[[Path], object]
Check = Callable[[Path], bool]


def changeovers(many: int) -> Figure:
    """So many kills of each act."""
    wrong, finished = 0, 0
    acts: tuple[tuple[Act, Check], ...] = ((_copy, _copied), (_erase, _erased), (_replace, _replaced))
    for act, check in acts:
        bad, ended = trial(act, check, many)
        wrong += bad
        finished += ended
    careless, _ = trial(_careless_copy, _copied, 10)
    return Figure(
        "copying, erasing and replacing, killed",
        len(acts) * many,
        wrong,
        f"{finished} of them had ended by then",
        f"a copy that has its name too early: found in {careless} of 10",
        careless > 0,
    )


def trial(act: Act, check: Check, many: int) -> tuple[int, int]:
    """How many of so many kills left something wrong, and how many came too late."""
    random, wrong, finished = Random(9), 0, 0
    with folder() as place:
        whole, tried = place / "whole", place / "tried"
        whole.mkdir()
        start(whole / "log.dayfence", 40)
        take_copy(whole / "log.dayfence", NOW)
        for _ in range(many):
            shutil.copytree(whole, tried)
            finished += killed_in(act, tried / "log.dayfence", random)
            wrong += not check(tried / "log.dayfence")
            shutil.rmtree(tried)
    return wrong, finished


def killed_in(act: Act, path: Path, random: Random) -> bool:
    """Do something in a process that is killed at a random moment; whether it had ended by then."""
    child = os.fork()
    if child == 0:
        with suppress(BaseException):
            act(path)
        os._exit(0)
    select.select([], [], [], random.uniform(0, SECONDS))
    with suppress(ProcessLookupError):
        os.kill(child, signal.SIGKILL)
    return not os.WIFSIGNALED(os.waitpid(child, 0)[1])


def _copy(path: Path) -> None:
    for number in range(1, 9):
        take_copy(path, NOW + timedelta(hours=number))


def _copied(path: Path) -> bool:
    """Every file with the name of a copy is a whole one, and there is at least one."""
    try:
        return all(len(read_copy(copy.path).entries[1]) > 0 for copy in copies_of(path)) and bool(copies_of(path))
    except StorageError:
        return False


def _careless_copy(path: Path) -> None:
    """A copy that has its name from its first byte on."""
    contents = path.read_bytes()
    for number in range(1, 1_000):
        with (copies_folder(path) / f"20260310T2300{number % 60:02}Z-{number}.dayfence").open("wb") as file:
            for at in range(0, len(contents), 512):
                file.write(contents[at : at + 512])
                file.flush()


def _erase(path: Path) -> None:
    erase(path, of_day(DAY), NOW)


def _erased(path: Path) -> bool:
    """The day is in the tables and the history, or in neither."""
    try:
        with Store.open(path) as store:
            store.verify()
            there = (DAY, "") in store.read().entries[1]
            records = (change.record for step in store.steps() for change in step.changes)
            told = any(isinstance(record, Entry) and record.day == DAY for record in records)
            return there == told
    except StorageError:
        return False


def _replace(path: Path) -> None:
    won = win_back(path, copies_of(path))
    new = aside_name(path, "new", NOW)
    write_won_back(new, won, NOW)
    put_in_place(new, path, NOW)


def _replaced(path: Path) -> bool:
    """There is a whole journal under the name at every moment, and the old one is still somewhere."""
    try:
        with Store.open(path) as store:
            store.verify()
            whole = len(store.steps()) > 40
    except StorageError:
        return False
    return whole and copies_folder(path).is_dir()
