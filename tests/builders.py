"""Logs and journals for tests; every scenario is invented."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from datetime import date, timedelta

from analysis import Change, Log, Measure, Review, review

FIRST_DAY = date(2031, 3, 3)  # a Monday


def day(number: int) -> date:
    """The day ``number`` days after the first one."""
    return FIRST_DAY + timedelta(number)


def number(offset: int) -> int:
    """The same as a day number."""
    return day(offset).toordinal()


def log_of(values: Iterable[float | None], **measure: object) -> Log:
    """A daily log from 3 March 2031 on; None is a blank day."""
    return Log.from_pairs([(day(place), value) for place, value in enumerate(values)], Measure(**measure))


def reviewed(
    values: Sequence[float | None], change: int | None = None, settle: int = 0, **measure: object
) -> Review:
    """The review of a daily log with a change so many days after the first."""
    changes = [] if change is None else [Change(day(change), "off the bus one stop early", settle)]
    return review(log_of(values, **measure), changes)
