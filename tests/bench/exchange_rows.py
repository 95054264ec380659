"""The rows about tables coming in: a long file read and previewed, against a data frame of the same file."""

from __future__ import annotations

import io
import tracemalloc
from collections.abc import Callable, Iterator
from datetime import date, datetime, timedelta

import numpy as np
import pandas as pd

from desktop.exchange.bring_in import read_table
from desktop.exchange.source_text import MOST_BYTES
from desktop.screens.bring_in_preview import lines_set_aside, summary_of
from tests.bench.measuring import Row, compared

ROWS = 100_000


def daily() -> str:
    """A day on every row, two columns of values, none missing."""
    rng = np.random.default_rng(1)
    minutes, weights = rng.integers(0, 90, ROWS), np.round(rng.normal(75, 2, ROWS), 1)
    days = [date.fromordinal(date(1901, 1, 1).toordinal() + number) for number in range(ROWS)]
    lines = [f"{day},{one},{other}" for day, one, other in zip(days, minutes, weights, strict=True)]
    return "date,minutes,weight\n" + "\n".join(lines) + "\n"


def several_a_day() -> str:
    """Nine readings a day with their time, some blank, some not exact."""
    rng = np.random.default_rng(2)
    pulse = rng.integers(50, 130, ROWS)
    cells = [
        "" if number % 97 == 0 else f"~{value}" if number % 1009 == 0 else f"{value}"
        for number, value in enumerate(pulse)
    ]
    begin = datetime(2001, 1, 1, 6)
    times = [begin + timedelta(days=number // 9, hours=number % 9 * 2) for number in range(ROWS)]
    return (
        "time,pulse\n"
        + "\n".join(f"{at:%Y-%m-%d %H:%M},{cell}" for at, cell in zip(times, cells, strict=True))
        + "\n"
    )


def frame_of(source: bytes, day: str) -> pd.DataFrame:
    """The same through a data frame: cells, days, numbers."""
    frame = pd.read_csv(io.BytesIO(source))
    frame[day] = pd.to_datetime(frame[day])
    for name in frame.columns.drop(day):
        frame[name] = pd.to_numeric(frame[name], errors="coerce")
    return frame


def previewed(source: bytes) -> tuple[str, list[str]]:
    """Read, and everything the preview says."""
    reading = read_table(source)
    return summary_of("log.csv", reading), lines_set_aside(reading)


def rows() -> Iterator[Row]:
    """Every row, each measured in one go."""
    for what, make, day in (
        ("a day a row", daily, "date"),
        ("nine readings a day with a time", several_a_day, "time"),
    ):
        source = make().encode()
        yield compared(
            f"100,000 rows, {what}: read and previewed / as a data frame",
            lambda source=source: previewed(source),
            lambda source=source, day=day: frame_of(source, day),
            3,
            names=("ours", "data frame"),
        )
    yield _memory()


def _memory() -> Row:
    """Peak memory of a file as large as is taken, against the size of the file."""
    line = "2031-03-04," + ",".join(["1234.5"] * 38) + "\n"
    source = (line * (MOST_BYTES // len(line))).encode()
    peak = _peak(lambda: read_table(source))
    ratio = peak / len(source)
    return Row("peak memory of a 50 MB file / its size", ratio, ratio, ratio, 15, f"{peak / 1e6:.0f} MB")


def _peak(work: Callable[[], object]) -> int:
    tracemalloc.start()
    work()
    peak = tracemalloc.get_traced_memory()[1]
    tracemalloc.stop()
    return peak
