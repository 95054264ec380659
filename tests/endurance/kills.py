"""Kill −9 at a random moment of writing: nothing that was told is lost, and no half of a step is left."""

from __future__ import annotations

import os
import select
import signal
from pathlib import Path
from random import Random

from desktop.errors import StorageError
from desktop.storage.store import Store
from tests.endurance.figures import Figure, folder
from tests.endurance.writer import AS_IT_IS, NO_TRANSACTION, TOLD_TOO_EARLY, start, write

FRESH = 100
"""Kills a journal takes before another one is begun: it grows, and opening it would take most of the time."""


def kills(many: int, seed: int = 1) -> Figure:
    """The journal as it is, and two ways of writing that must be found out."""
    wrong, steps = trial(many, AS_IT_IS, seed)
    controls = {how: first_found(how, 300) for how in (NO_TRANSACTION, TOLD_TOO_EARLY)}
    found = ", ".join(f"{how}: found at kill {kill}" for how, kill in controls.items())
    return Figure(
        "killed while writing",
        many,
        wrong,
        f"{steps:,} steps written",
        found,
        all(controls.values()),
    )


def trial(many: int, how: str, seed: int) -> tuple[int, int]:
    """How many of so many kills left something wrong, and how many steps were written in all."""
    random, wrong, steps = Random(seed), 0, 0
    for first in range(0, many, FRESH):
        with folder() as place:
            path = place / "log.dayfence"
            start(path)
            told = 0
            for kill in range(min(FRESH, many - first)):
                told, good = killed_once(path, how, random, told, whole=kill % 10 == 9)
                wrong += not good
            steps += told
            with Store.open(path) as store:
                store.verify()
    return wrong, steps


def first_found(how: str, most: int) -> int:
    """At which kill a bad way of writing is found out; 0 when it is not."""
    with folder() as place:
        path = place / "log.dayfence"
        start(path)
        random, told = Random(2), 0
        for kill in range(1, most + 1):
            told, good = killed_once(path, how, random, told, whole=True)
            if not good:
                return kill
        return 0


def killed_once(path: Path, how: str, random: Random, floor: int, *, whole: bool) -> tuple[int, bool]:
    """The last step there is after one kill, and whether everything is as it must be."""
    reading, writing = os.pipe()
    child = os.fork()
    if child == 0:
        os.close(reading)
        try:
            write(path, lambda number: os.write(writing, b"%d\n" % number), None, how)
        finally:
            os._exit(1)
    os.close(writing)
    told = os.read(reading, 100)
    # A wait of random length, the only way to a random moment.
    select.select([], [], [], random.uniform(0, 0.015))
    os.kill(child, signal.SIGKILL)
    os.waitpid(child, 0)
    while part := os.read(reading, 65536):
        told += part
    os.close(reading)
    # The kill may cut the last line short, never so that it names a later step.
    floor = max(floor, *map(int, told.split()))
    try:
        with Store.open(path) as store:
            if whole:
                store.verify()
            last = store.last_step_number
            torn = any(len(step.changes) != 3 for step in store.steps(3) if step.number > 1)
    except StorageError:
        return floor, False
    return last, floor <= last <= floor + 1 and not torn
