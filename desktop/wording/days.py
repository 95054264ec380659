"""Days in plain words; the month is always a word, so that no order of day and month can be misread."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date, datetime

from analysis.log import Period

MONTHS = (
    "January", "February", "March", "April", "May", "June",
    "July", "August", "September", "October", "November", "December",
)  # fmt: skip
WEEKDAYS = ("Monday", "Tuesday", "Wednesday", "Thursday", "Friday", "Saturday", "Sunday")


def short_day(day: date) -> str:
    """``Tue 3 Mar``, as the day column shows it."""
    return f"{WEEKDAYS[day.weekday()][:3]} {day.day} {MONTHS[day.month - 1][:3]}"


def long_day(day: date) -> str:
    """``Tuesday 3 March 2026``."""
    return f"{WEEKDAYS[day.weekday()]} {full_day(day)}"


def full_day(day: date) -> str:
    """``3 March 2026``."""
    return f"{day.day} {MONTHS[day.month - 1]} {day.year}"


def saved_words(at: datetime, today: date) -> str:
    """``Saved at 14:05``, ``Saved on 30 March``; with the year where it is another one."""
    if at.date() == today:
        return f"Saved at {at:%H:%M}"
    said = full_day(at.date())
    return f"Saved on {said if at.year != today.year else said.rpartition(' ')[0]}"


@dataclass(frozen=True)
class DayWords:
    """How the periods of one answer are named.

    Attributes:
        period: what a period is.
        with_year: whether days and weeks need their year, since the log spans more than one.
    """

    period: Period
    with_year: bool

    def name(self, day: int) -> str:
        """The period that begins on a day: ``3 March``, ``the week of 3 March``, ``March 2026``, ``1907``."""
        at = date.fromordinal(day)
        if self.period == "year":
            return str(at.year)
        if self.period == "month":
            return f"{MONTHS[at.month - 1]} {at.year}"
        said = full_day(at) if self.with_year else f"{at.day} {MONTHS[at.month - 1]}"
        return f"the week of {said}" if self.period == "week" else said

    def day(self, day: int) -> str:
        """A calendar day, whatever the period is; a year alone where the period is a year that it begins."""
        at = date.fromordinal(day)
        if self.period == "year" and (at.month, at.day) == (1, 1):
            return str(at.year)
        if self.period == "month" and at.day == 1:
            return f"{MONTHS[at.month - 1]} {at.year}"
        return full_day(at) if self.with_year else f"{at.day} {MONTHS[at.month - 1]}"
