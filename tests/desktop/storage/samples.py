"""Records for tests."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from datetime import date
from pathlib import Path

import pytest

from desktop.errors import StorageError
from desktop.journal.clients import Client, Coach, CoachingSession
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Plan, Record, Span
from desktop.journal.row_change import RowChange

PERSON = Person("0123456789abcdef" * 2, "Ana Ünal", "Does the walk help?")
EXERCISE = Measure(1, 0, "Exercise", "minutes", kind="amount", missed="zero", aim="more")

# Every field differs from its default and from its neighbours.
FULL: tuple[Record, ...] = (
    PERSON,
    Measure(
        7,
        3,
        "Pressure ↑",
        "mmHg",
        kind="score",
        period="week",
        missed="zero",
        combine="median",
        aim="range",
        goal_low=110.5,
        goal_high=129.25,
        likely_low=60.125,
        likely_high=1e9,
        decimals=2,
        pair="pressure",
        worth=0.1,
        look_day=date(2026, 12, 31),
        archived=True,
        limit_low=88.5,
        limit_high=170.25,
        limit_words="call the ward, before noon",
    ),
    Entry(
        7,
        date(2024, 2, 29),
        "morning / left",
        -0.30000000000000004,
        "extra",
        'said "ok"\n\\ 😀',
        "−0,3",
        "table",
        "2026-03-09T21:04:05+02:00",
    ),
    Change(4, date(1900, 1, 1), "new routine", "bad spell", 14, (7, 12)),
    Span(5, date(2026, 1, 2), date(2199, 12, 31), "device", "new cuff", (7,)),
    Plan(6, 7, date(2026, 1, 5), 5, 2),
    DayNote(date(2026, 1, 6), "slept badly"),
)

CASELOAD_FULL: tuple[Record, ...] = (
    Coach("fedcba9876543210" * 2, "Coach Ünal", "/home/coach/logs"),
    Client(
        3,
        "0123456789abcdef" * 2,
        "K7 ↑",
        2,
        5,
        date(2026, 4, 1),
        date(2026, 3, 2),
        "moved-2-more firm-more",
        ended=True,
    ),
    CoachingSession(3, date(2026, 3, 1), "stairs, not the lift", 5, 2, 'said "fine"\nand laughed'),
)


def minutes(day: int, value: float | None = 30.0, **fields: object) -> Entry:
    """An entry of ``EXERCISE`` in March 2026."""
    entry = Entry(1, date(2026, 3, day), value=value, original=str(value), entered_at="2026-03-10T21:00:00")
    return replace(entry, **fields)  # type: ignore[arg-type]


def added(*records: Record) -> list[RowChange]:
    return [RowChange(None, record) for record in records]


def refusal(act: Callable[[], object]) -> StorageError:
    """What the act is refused with."""
    with pytest.raises(StorageError) as caught:
        act()
    assert caught.value.reason in StorageError.reasons
    return caught.value


def names(folder: Path) -> list[str]:
    return sorted(path.name for path in folder.iterdir())
