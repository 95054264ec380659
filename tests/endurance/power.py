"""Power cuts: the writer's real file operations are recorded, and every state they can leave is opened."""

from __future__ import annotations

import os
import shutil
import subprocess
import sys
from collections.abc import Iterator
from hashlib import blake2b
from pathlib import Path
from random import Random

from desktop.errors import StorageError
from desktop.storage.store import Store
from tests.endurance.disk import Disk, State
from tests.endurance.figures import Figure, folder
from tests.endurance.writer import AS_IT_IS, NO_SYNC, start

ROOT = Path(__file__).parents[2]
TRACER = ("strace", "-f", "--seccomp-bpf")
CALLS = "openat,close,write,pwrite64,ftruncate,fsync,fdatasync,unlink"


def can_record() -> bool:
    return shutil.which("strace") is not None


def power_cuts(states: int) -> Figure:
    """States of the journal as it is, and of one that does not wait for the disk."""
    wrong, tried = trial(AS_IT_IS, states)
    bad, of = trial(NO_SYNC, min(states, 300))
    return Figure(
        "power cut at any moment",
        tried,
        wrong,
        "",
        f"without waiting for the disk: {bad} of {of} states damaged or short",
        bad > of // 10,
    )


def trial(how: str, states: int) -> tuple[int, int]:
    """How many of at least so many different states are wrong, and how many there were."""
    with folder() as place:
        seen: set[bytes] = set()
        wrong, seed = 0, 0
        for floor, state in recorded_states(how, place):
            key = blake2b(repr((floor, sorted(state.items()))).encode()).digest()
            if key in seen:
                continue
            seen.add(key)
            seed += 1
            wrong += not is_good(state, floor, place / "cut")
            if len(seen) >= states:
                break
        return wrong, len(seen)


def recorded_states(how: str, place: Path, halves: int = 1) -> Iterator[tuple[int, State]]:
    """States after power cuts with the last step told by then; goes on with new recordings for ever."""
    random = Random(7)
    round_number = 0
    while True:
        journal = place / f"round {round_number}"
        journal.mkdir()
        path = journal / "log.dayfence"
        start(path, 20 + round_number)
        disk = Disk.of(journal)
        with Store.open(path) as store:
            disk.told = store.last_step_number
        record = record_writer(path, 12, how, place / "record")
        for line in record.read_text("ascii").splitlines():
            if disk.take(line):
                for state in disk.states(random, halves):
                    yield disk.told, state
        shutil.rmtree(journal)
        round_number += 1
        halves = 2


def record_writer(path: Path, steps: int, how: str, record: Path) -> Path:
    """Run the writer and record what it does to files."""
    writer = [sys.executable, "-m", "tests.endurance.writer", str(path), str(steps), how]
    subprocess.run(
        [
            "strace",
            "-f",
            "--seccomp-bpf",
            "-xx",
            "-s",
            "100000",
            "-e",
            f"trace={CALLS}",
            "-o",
            str(record),
            *writer,
        ],
        cwd=ROOT,
        check=True,
        stdout=subprocess.DEVNULL,
        stderr=subprocess.DEVNULL,
        env={**os.environ, "OPENBLAS_NUM_THREADS": "1"},
    )
    return record


def is_good(state: State, floor: int, place: Path) -> bool:
    """Whether a journal in this state opens, is whole, and holds every step that was told."""
    place.mkdir(exist_ok=True)
    for path in place.iterdir():
        path.unlink()
    for name, contents in state.items():
        (place / name).write_bytes(contents)
    try:
        with Store.open(place / "log.dayfence") as store:
            store.verify()
            return floor <= store.last_step_number <= floor + 1
    except StorageError:
        return False
