"""The rows about a coach's caseload: a thousand journals of two years, opened for the first time and again."""

from __future__ import annotations

import os
import subprocess
import sys
from collections.abc import Iterator
from datetime import date, timedelta
from pathlib import Path
from tempfile import TemporaryDirectory

import numpy as np

from desktop.journal.clients import Coach
from desktop.journal.journal import Journal
from desktop.journal.records import Change, Entry, Measure, Person
from desktop.storage.store import CaseloadStore
from tests.bench.measuring import Row, row_of
from tests.scoreboard.clients_folder import write_journal

JOURNALS, DAYS = 1_000, 730
FEW = 100
FIRST_ROWS_MOST, SECOND_LEAST, MEMORY_MOST = 3.0, 10.0, 2.0


def rows() -> Iterator[Row]:
    """Every row; the folder is written anew, which takes longer than what is measured."""
    os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
    with TemporaryDirectory() as place:
        many, few = (_caseload(Path(place) / str(number), number) for number in (JOURNALS, FEW))
        # Each beside a bare window of its own, so that whatever else the machine does slows both.
        unread = [(_opened(many, "first")[0], _bare()) for _ in range(5)]
        first = _opened(many)
        again, bare = [], []
        for _ in range(5):
            again.append(_opened(many))
            bare.append(_bare())
        small = _opened(few)
    names = ("ours", "bare")
    pairs = [(one[0], other) for one, other in zip(again, bare, strict=True)]
    yield row_of("first rows of 1,000 journals, none read yet / a bare window", unread, FIRST_ROWS_MOST, names)
    yield row_of("first rows of 1,000 journals remembered / a bare window", pairs, FIRST_ROWS_MOST, names)
    ratios = [(one[1], first[1]) for one in again]
    yield row_of(
        "all 1,000 there again / read for the first time, from the start of Python",
        ratios,
        1 / SECOND_LEAST,
        ("again", "first"),
    )
    grown = first[2] / small[2]
    detail = f"1,000 {first[2]:.0f} MB, 100 {small[2]:.0f} MB"
    yield Row("peak memory, 1,000 journals / 100 journals", grown, grown, grown, MEMORY_MOST, detail)


def _caseload(place: Path, journals: int) -> Path:
    """A caseload file beside a folder of journals of two years each."""
    logs = place / "logs"
    logs.mkdir(parents=True)
    rng = np.random.default_rng(4)
    today = date.today()
    for number in range(1, journals + 1):
        values = np.round(rng.normal(40, 8, DAYS))
        records = [
            Person(f"{number:032x}"),
            Measure(1, 0, "Walking", "minutes", "amount", aim="more"),
            Change(1, today - timedelta(60), "earlier stop"),
            *(
                Entry(1, today - timedelta(DAYS - at), value=float(value), original=f"{value:g}")
                for at, value in enumerate(values)
            ),
        ]
        write_journal(logs / f"client {number:04}.dayfence", Journal.of(records), today)
    path = place / "clients.caseload"
    CaseloadStore.create(path, Coach("c" * 32, "", str(logs))).close()
    return path


def _opened(path: Path, *how: str) -> tuple[float, float, float]:
    command = [sys.executable, "-m", "tests.bench.caseload_start", str(path), *how]
    done = subprocess.run(command, capture_output=True, text=True, check=True, timeout=600)
    first, whole, peak = map(float, done.stdout.split())
    return first, whole, peak


def _bare() -> float:
    command = [sys.executable, "-m", "tests.bench.window_start", "bare", "-"]
    done = subprocess.run(command, capture_output=True, text=True, check=True, timeout=120)
    return float(done.stdout.split()[0])
