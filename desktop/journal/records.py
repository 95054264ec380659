"""What a journal holds: frozen records, one row of the file each.

A day is a ``datetime.date``. Values are kept as typed (``original``) beside the number they were read as.
"""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date
from typing import Literal

from analysis.log import Combine, DayKind, MeasureKind, Missed, Period
from desktop.journal.clients import Client, Coach, CoachingSession

Source = Literal["typed", "table", "sample"]
SpanKind = Literal["ill", "away", "device", "other"]
WhyThatDay = Literal["bad spell", "planned", "advised", "other"]
AimWord = Literal["more", "less", "none", "range"]


@dataclass(frozen=True)
class Person:
    """Whose journal it is; the one record every journal has.

    Attributes:
        journal_id: 32 hex digits, made once with the journal; copies handed over say whether they keep it.
        name: may be empty.
        question: the person's question for the appointment.
    """

    journal_id: str
    name: str = ""
    question: str = ""


@dataclass(frozen=True)
class Measure:
    """One column of the journal.

    Attributes:
        id: a number that is never used again.
        position: place among the columns, from 0.
        title, unit: the person's words, e.g. "Exercise" and "minutes".
        kind, period, missed, combine: how days become observations; see ``analysis.log.Measure``.
        aim: which way is wanted; ``range`` uses ``goal_low`` and ``goal_high``.
        goal_low, goal_high: the range wanted, both ends included; None where open or not set.
        likely_low, likely_high: outside these the screen asks before it keeps a value; None = never asks.
        decimals: digits after the mark on screen.
        pair: measures written down together share a word here, e.g. "pressure"; else "".
        worth: the smallest move that would be worth it, in the unit; None = not said.
        look_day: the day agreed on to judge; None = not agreed.
        archived: hidden from the table, kept in the file.
        limit_low, limit_high: the limits the person's clinic gave them, both still within; None = none given.
        limit_words: what the clinic said to do beyond them, in its own words.
    """

    id: int
    position: int
    title: str
    unit: str = ""
    kind: MeasureKind = "reading"
    period: Period = "day"
    missed: Missed = "blank"
    combine: Combine | None = None
    aim: AimWord = "none"
    goal_low: float | None = None
    goal_high: float | None = None
    likely_low: float | None = None
    likely_high: float | None = None
    decimals: int = 0
    pair: str = ""
    worth: float | None = None
    look_day: date | None = None
    archived: bool = False
    limit_low: float | None = None
    limit_high: float | None = None
    limit_words: str = ""


@dataclass(frozen=True)
class Entry:
    """What is written down for one measure on one day in one slot.

    Attributes:
        measure: the measure's id.
        day: the calendar day it is about.
        slot: "" for the whole day, else e.g. "morning".
        value: the number, or None (blank, rest, ill, away).
        kind: kind of day; a ``set aside`` entry keeps its value.
        note: the person's words, or the reason it was set aside.
        original: the text as typed or read from the file.
        source: how it came in.
        entered_at: local clock time, ISO 8601 with seconds; information only, never an order.
    """

    measure: int
    day: date
    slot: str = ""
    value: float | None = None
    kind: DayKind = "value"
    note: str = ""
    original: str = ""
    source: Source = "typed"
    entered_at: str = ""


@dataclass(frozen=True)
class Change:
    """A dated, labelled change.

    Attributes:
        id: a number that is never used again.
        day: the first day of the new stretch.
        label: the person's words.
        why: why that day, or None when not said.
        settle_days: days from ``day`` on that are in no number.
        measures: ids of the measures it concerns; empty = all.
    """

    id: int
    day: date
    label: str = ""
    why: WhyThatDay | None = None
    settle_days: int = 0
    measures: tuple[int, ...] = ()


@dataclass(frozen=True)
class Span:
    """Named days, both ends included. ``measures`` empty = concerns all."""

    id: int
    first: date
    last: date
    kind: SpanKind = "other"
    label: str = ""
    measures: tuple[int, ...] = ()


@dataclass(frozen=True)
class Plan:
    """``times`` days a week with ``spare`` days, in force from ``first`` until the next plan of the measure."""

    id: int
    measure: int
    first: date
    times: int
    spare: int = 0


@dataclass(frozen=True)
class DayNote:
    """The person's words about one day, whatever was measured on it."""

    day: date
    text: str


JournalRecord = Person | Measure | Entry | Change | Span | Plan | DayNote
"""Every kind of record a journal holds."""

CaseloadRecord = Coach | Client | CoachingSession
"""Every kind of record a coach's caseload holds."""

Record = JournalRecord | CaseloadRecord
