"""The rows about the answer itself: short logs, long logs, many logs."""

from __future__ import annotations

import time
import tracemalloc
from collections.abc import Iterator
from datetime import date, timedelta

import numpy as np

from analysis import Change, Log, Measure, Review, review, review_many
from analysis.answer import Answer
from tests.bench.by_libraries import review_by_libraries
from tests.bench.measuring import Row, compared, row_of

FIRST = date(2001, 1, 1)


def log_of_days(count: int, seed: int = 1) -> Log:
    """A log of minutes with a weekly rhythm and some carry-over; the later half is higher."""
    rng = np.random.default_rng(seed)
    noise = rng.normal(0, 8, count)
    noise[1:] += 0.2 * noise[:-1]
    values = 40 + noise + 6 * (np.arange(count) % 7 >= 5)
    values[count // 2 :] += 12
    numbers = range(FIRST.toordinal(), FIRST.toordinal() + count)
    return Log.from_columns(Measure("x", "minutes"), numbers, np.round(values), ("value",) * count)


def reviewed(log: Log) -> Review:
    """The whole review, doubts included, with a change in the middle."""
    return review(log, [Change(FIRST + timedelta(len(log) // 2), "x")], worth=10.0)


def rows() -> Iterator[Row]:
    """Every row, each measured in one go."""
    short, years, long = log_of_days(56), log_of_days(3650), log_of_days(36500)
    change = len(short) // 2
    yield compared(
        "review of 56 days / the same through library calls",
        lambda: reviewed(short),
        lambda: review_by_libraries(short.days, short.values, change),
        1 / 5,
        names=("review", "libraries"),
    )
    yield compared(
        "review of ten years, doubts included / of 56 days",
        lambda: reviewed(years),
        lambda: reviewed(short),
        40,
        names=("ten years", "56 days"),
    )
    yield compared(
        "review of 36,500 days / of 3,650 (n log n: 14 at most)",
        lambda: reviewed(long),
        lambda: reviewed(years),
        14,
        rounds=5,
        names=("36,500", "3,650"),
    )
    yield _memory(years, long)
    yield _many()


def _memory(years: Log, long: Log) -> Row:
    """Peak memory of a review ten times as long: linear, no table of all differences."""
    peaks = []
    for log in (long, years):
        tracemalloc.start()
        reviewed(log)
        peaks.append(tracemalloc.get_traced_memory()[1])
        tracemalloc.stop()
    detail = f"36,500 {peaks[0] / 1e6:.1f} MB, 3,650 {peaks[1] / 1e6:.1f} MB"
    ratio = peaks[0] / peaks[1]
    return Row("peak memory of a review of 36,500 days / of 3,650", ratio, ratio, ratio, 12, detail)


def _many() -> Row:
    """A caseload on every core against the sum of single reviews."""
    asked = [(log_of_days(730, seed), {"changes": [Change(FIRST + timedelta(365), "x")]}) for seed in range(1000)]
    pairs = []
    for _ in range(3):
        start = time.perf_counter()
        singles: list[Answer] = [review(log, **how).answer for log, how in asked]  # type: ignore[arg-type]
        middle = time.perf_counter()
        many = review_many(asked)
        end = time.perf_counter()
        assert [one.answer for one in many] == singles
        pairs.append((end - middle, middle - start))
    return row_of("1,000 logs of 730 days on every core / one by one", pairs, 0.7, ("together", "singly"))
