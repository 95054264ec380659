"""Small clients for tests: fixed days, so that every number can be checked by hand."""

from __future__ import annotations

from datetime import date, timedelta

from desktop.journal.clients import Client, CoachingSession
from desktop.journal.journal import Journal
from desktop.journal.records import Entry, Measure, Person, Record

MONDAY = date(2031, 3, 31)
JOURNAL_ID = "a" * 32
CLIENT = Client(1, JOURNAL_ID, "K7")

WALKING = Measure(1, 0, "Walking", "minutes", "amount", missed="blank", aim="more")
KNEE = Measure(2, 1, "Knee score", "", "score", aim="less")

_WAVE = (0, 4, -3, 2, -4, 1, 3, -2, 5, -1, -5)
"""Goes round the middle without a weekly rhythm."""


def day(ago: int) -> date:
    return MONDAY - timedelta(ago)


def entries(measure: int, values: dict[int, float | None], **fields: object) -> list[Entry]:
    """Entries by days ago, typed on the evening of the day."""
    return [
        Entry(measure, day(ago), value=value, entered_at=f"{day(ago)}T21:00:00", **fields)  # type: ignore[arg-type]
        for ago, value in values.items()
    ]


def level(measure: int, first: int, last: int, middle: float, step: float = 1.0) -> list[Entry]:
    """A value a day from ``first`` to ``last`` days ago, around a middle."""
    return entries(measure, {ago: middle + step * _WAVE[ago % len(_WAVE)] for ago in range(first, last - 1, -1)})


def journal(*records: Record) -> Journal:
    measures = [] if any(isinstance(one, Measure) for one in records) else [WALKING, KNEE]
    return Journal.of([Person(JOURNAL_ID, "Ana"), *measures, *records])


def session(ago: int, agreed: str = "", **fields: object) -> CoachingSession:
    return CoachingSession(1, day(ago), agreed, **fields)  # type: ignore[arg-type]
