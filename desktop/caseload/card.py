"""What the coach needs for one session: what was agreed, kept, moved and missing since the last one."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date
from itertools import pairwise

import numpy as np

from analysis import Review
from analysis.questions.plan_kept import WeekOfPlan
from desktop.caseload.facts import base_of, measures_of, review_overall, review_since
from desktop.caseload.queue import QueueRow, weeks_until
from desktop.journal.clients import CoachingSession
from desktop.journal.journal import Journal

LATE_DAYS = 2
"""An entry made so many days after its day is a late one."""


@dataclass(frozen=True)
class MeasureSince:
    """One measure since the last session.

    Attributes:
        measure, title: which.
        since: the days since the session against those before; None where there is nothing to compare.
        overall: with every change that was marked or agreed.
    """

    measure: int
    title: str
    since: Review | None
    overall: Review


@dataclass(frozen=True)
class Card:
    """Everything on a session card, as numbers.

    Attributes:
        row: the client's line in the queue.
        session: the last session that anything was agreed in; None before the first.
        sessions: all of them with the notes, in order of day.
        weeks: the whole weeks of the plan since then (all that are known, before the first session).
        doing, outcome: the two measures; None where the journal has none of the kind.
        logged, of: days with an entry since the session, out of the days since then up to today.
        longest_gap: first and last day number of the longest time without an entry since then; None without any.
        late, typed: entries since then made days after their day, out of those with a known time of entry.
        one_evening: the most entries made on one calendar day.
    """

    row: QueueRow
    session: CoachingSession | None
    sessions: tuple[CoachingSession, ...]
    weeks: tuple[WeekOfPlan, ...]
    doing: MeasureSince | None
    outcome: MeasureSince | None
    logged: int
    of: int
    longest_gap: tuple[int, int] | None
    late: int
    typed: int
    one_evening: int

    @property
    def main(self) -> MeasureSince | None:
        """The measure that the answer is about: the outcome where it has values, else what was done."""
        known = [one for one in (self.outcome, self.doing) if one is not None]
        return next((one for one in known if one.overall.stretches), known[0] if known else None)


def card_of(journal: Journal, row: QueueRow, sessions: Sequence[CoachingSession], today: date) -> Card:
    """The card of a client whose journal could be read.

    Args:
        journal: the client's.
        row: their line in the queue.
        sessions: with this client, in order of day.
        today: the calendar day.
    """
    session = base_of(sessions)
    doing, outcome = (
        _since(journal, measure, sessions, session) if measure is not None else None
        for measure in measures_of(journal, row.client)
    )
    first = session.day.toordinal() if session else None
    weeks = weeks_until(row.facts, today) if row.facts else []
    entries = [
        entry
        for by_day in journal.entries.values()
        for entry in by_day.values()
        if entry.kind != "blank" and (first is None or entry.day.toordinal() >= first)
    ]
    days = np.unique([entry.day.toordinal() for entry in entries]) if entries else np.empty(0, dtype=np.int64)
    begin = first if first is not None else (int(days[0]) if len(days) else today.toordinal())
    timed = [(entry.day, date.fromisoformat(entry.entered_at[:10])) for entry in entries if entry.entered_at]
    evenings = [at for _, at in timed]
    return Card(
        row,
        session,
        tuple(sessions),
        tuple(week for week in weeks if first is None or week.first >= first),
        doing,
        outcome,
        len(days),
        max(0, today.toordinal() - begin),
        _longest_gap(days.tolist(), begin, today.toordinal() - 1),
        sum((at - day).days >= LATE_DAYS for day, at in timed),
        len(timed),
        max((evenings.count(at) for at in set(evenings)), default=0),
    )


def _since(
    journal: Journal, measure: int, sessions: Sequence[CoachingSession], session: CoachingSession | None
) -> MeasureSince:
    since = review_since(journal, measure, sessions, session.day) if session is not None else None
    title = journal.measures[measure].title
    return MeasureSince(measure, title, since, review_overall(journal, measure, sessions))


def _longest_gap(days: Sequence[int], first: int, last: int) -> tuple[int, int] | None:
    """The longest run of days without an entry between two days; the later one of two that are as long."""
    edges = [first - 1, *[day for day in days if first <= day <= last], last + 1]
    gaps = [(after - before - 1, before + 1, after - 1) for before, after in pairwise(edges)]
    longest = max(gaps, default=(0, 0, 0))
    return (longest[1], longest[2]) if longest[0] > 0 else None
