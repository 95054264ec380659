"""``python -m tests.endurance``: a log that cannot be lost, tried in every way, as a table.

Options: ``--long`` the release form, ``--keep`` write the table to ``resources/endurance.txt``.
"""

from __future__ import annotations

import argparse
import os
import platform
import sqlite3
import sys
import time
from collections.abc import Callable
from concurrent.futures import ProcessPoolExecutor
from datetime import date
from functools import partial
from multiprocessing import get_context
from pathlib import Path

from tests.endurance.changeovers import changeovers
from tests.endurance.damage import flips, full_disk, pages
from tests.endurance.faults import faults, recoveries
from tests.endurance.figures import Figure
from tests.endurance.kills import kills
from tests.endurance.power import can_record, power_cuts
from tests.endurance.saving import saving
from tests.endurance.sessions import network, sessions, undo

KEPT = Path(__file__).parents[2] / "resources" / "endurance.txt"
Trial = Callable[[], Figure]

# The longest first, so that both cores end together.
SHORT: tuple[Trial, ...] = (
    partial(faults, 2),
    partial(power_cuts, 1_000),
    partial(kills, 200),
    partial(recoveries, 2),
    partial(pages, 20),
    partial(flips, 1_000),
    partial(sessions, 150),
    partial(undo, 20),
    full_disk,
    network,
    partial(changeovers, 25),
    partial(saving, 200),
)
LONG: tuple[Trial, ...] = (
    partial(kills, 3_000),
    partial(power_cuts, 6_000),
    partial(faults, 1),
    partial(recoveries, 8),
    partial(pages, 120),
    partial(flips, 3_000),
    partial(sessions, 400),
    partial(undo, 100),
    full_disk,
    network,
    partial(changeovers, 200),
    partial(saving, 1_000),
)
TRACED = {faults, power_cuts, recoveries, network}


def tried(trials: tuple[Trial, ...], processes: int = 2) -> list[Figure]:
    """Every trial, on both cores, in the order given."""
    # Each in a process of its own: some trials spoil the process they run in.
    with ProcessPoolExecutor(processes, mp_context=get_context("fork"), max_tasks_per_child=None) as pool:
        return list(pool.map(_call, trials))


def _call(trial: Trial) -> Figure:
    return trial()


def table(figures: list[Figure], seconds: float, skipped: list[str]) -> str:
    """The figures as text, widest column first."""
    lines = [
        f"A log that cannot be lost, tried on {date.today():%Y-%m-%d}: {platform.system()} {platform.machine()}, "
        f"{os.cpu_count()} cores, Python {platform.python_version()}, SQLite {sqlite3.sqlite_version}; "
        f"{seconds:,.0f} seconds.",
        "Wrong counts what was lost, torn, damaged, or not noticed; a control is the same trial against something",
        "known to be bad, which it must find.",
        "",
        f"{'trial':<60}{'tried':>8}{'wrong':>8}",
    ]
    for one in figures:
        lines.append(f"{one.what:<60}{one.tried:>8,}{one.wrong:>8,}{'' if one.is_good else '  NOT GOOD'}")
        lines += [f"    {text}" for text in (one.more, f"control: {one.control}" if one.control else "") if text]
    lines += [f"{name:<60} skipped: this machine cannot trace a program" for name in skipped]
    return "\n".join(lines) + "\n"


def main() -> int:
    parser = argparse.ArgumentParser(prog="python -m tests.endurance")
    parser.add_argument("--long", action="store_true", help="the release form")
    parser.add_argument("--keep", action="store_true", help="write the table to resources/endurance.txt")
    options = parser.parse_args()
    trials = LONG if options.long else SHORT
    here = [trial for trial in trials if can_record() or _function(trial) not in TRACED]
    skipped = [_function(trial).__name__ for trial in trials if trial not in here]
    began = time.monotonic()
    figures = tried(tuple(here))
    text = table(figures, time.monotonic() - began, skipped)
    sys.stdout.write(text)
    if options.keep:
        KEPT.write_text(text, "utf-8")
    return 0 if all(one.is_good for one in figures) else 1


def _function(trial: Trial) -> Callable[..., Figure]:
    return trial.func if isinstance(trial, partial) else trial


if __name__ == "__main__":
    sys.exit(main())
