"""Forty invented clients on a Monday: does the queue put those first to whom something happened?"""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date, timedelta

import numpy as np

from desktop.caseload.facts import Facts, facts_of
from desktop.caseload.queue import QueueRow, rows_of
from desktop.journal.caseload import Caseload
from desktop.journal.clients import Client, Coach, CoachingSession
from desktop.journal.journal import Journal
from desktop.journal.records import Change, Entry, Measure, Person, Record, Span

MONDAY = date(2031, 3, 31)
BASELINE = 14
FIRST_ROWS = 14

TRUTHS = {"unchanged": 28, "up": 4, "down": 3, "faded": 2, "silent": 2, "device": 1}
"""How many clients of each kind; all but the first are true cases."""

_MIDDLE, _SPREAD, _CARRY_OVER, _BLANK = 40.0, 8.0, 0.2, 0.1
_MOVE = 1.25
"""In standard deviations of a day; a faded move was larger by a fifth for its two weeks."""


@dataclass(frozen=True)
class Monday:
    """One caseload on its Monday.

    Attributes:
        true_in_first: true cases in the first rows.
        silent_on_top: the silent ones are the first two.
        unchanged_flagged: unchanged clients with a reason.
        naive_flagged: unchanged clients with a day outside their baseline's fences in the last seven.
        naive_true: true cases the same rule flags.
    """

    true_in_first: int
    silent_on_top: bool
    unchanged_flagged: int
    naive_flagged: int
    naive_true: int


def client_journal(
    number: int, truth: str, rng: np.random.Generator, today: date = MONDAY
) -> tuple[Journal, list[CoachingSession]]:
    """A client's journal up to yesterday, and the session in which the change was agreed."""
    after = int(rng.integers(21, 36))
    days = BASELINE + after
    noise = np.empty(days)
    noise[0] = rng.normal()
    for day in range(1, days):
        noise[day] = _CARRY_OVER * noise[day - 1] + np.sqrt(1 - _CARRY_OVER**2) * rng.normal()
    level = np.zeros(days)
    spans: list[Record] = []
    first = today - timedelta(days)
    if truth in ("up", "down"):
        level[BASELINE:] = _MOVE if truth == "up" else -_MOVE
    elif truth == "faded":
        level[BASELINE : BASELINE + 14] = 1.2 * _MOVE
    elif truth == "device":
        level[-10:] = _MOVE
        spans.append(Span(1, first + timedelta(days - 10), today + timedelta(60), "device", "new watch"))
    values = np.maximum(0, np.round(_MIDDLE + _SPREAD * (noise + level)))
    kept = rng.random(days) >= _BLANK
    kept[[0, -1]] = True
    if truth == "silent":
        kept[-int(rng.integers(8, 13)) :] = False
    begun = first + timedelta(BASELINE)
    journal = Journal.of(
        [
            Person(f"{number:032x}"),
            Measure(1, 0, "Walking", "minutes", "amount", aim="more"),
            Change(1, begun, "earlier stop"),
            *spans,
            *(
                Entry(
                    1,
                    first + timedelta(day),
                    value=float(values[day]),
                    entered_at=f"{first + timedelta(day)}T21:00:00",
                )
                for day in np.flatnonzero(kept).tolist()
            ),
        ]
    )
    return journal, [CoachingSession(number, begun, "earlier stop")]


def monday(seed: int) -> Monday:
    """Forty clients, put in order by the queue."""
    rng = np.random.default_rng(seed)
    truths = rng.permutation([truth for truth, many in TRUTHS.items() for _ in range(many)]).tolist()
    records: list[Record] = [Coach("0" * 32)]
    facts: dict[str, Facts] = {}
    naive: list[str] = []
    for number, truth in enumerate(truths, start=1):
        journal, sessions = client_journal(number, truth, rng)
        client = Client(number, journal.person.journal_id, f"c{number:02}")
        records += [client, *sessions]
        facts[client.journal_id] = facts_of(journal, "", number, client, sessions)
        if _any_outside_lately(journal):
            naive.append(truth)
    rows = rows_of(Caseload.of(records), facts, {}, MONDAY)
    ordered = [truths[row.client.id - 1] for row in rows]
    return Monday(
        sum(truth != "unchanged" for truth in ordered[:FIRST_ROWS]),
        ordered[:2] == ["silent", "silent"],
        sum(is_flagged(row) and truths[row.client.id - 1] == "unchanged" for row in rows),
        naive.count("unchanged"),
        len(naive) - naive.count("unchanged"),
    )


def is_flagged(row: QueueRow) -> bool:
    """Whether the queue gives a reason to look."""
    return bool(row.reasons)


def _any_outside_lately(journal: Journal) -> bool:
    """The rule of thumb: a day outside the baseline's fences in the last seven."""
    import analysis

    carried = analysis.review(journal.log_of(1), journal.analysis_changes(1)).answer.carried
    last = MONDAY.toordinal() - 7
    return carried is not None and any(day >= last for day in (*carried.below, *carried.above))


def told(mondays: list[Monday]) -> list[str]:
    """The means in words and numbers."""
    mean = lambda name: float(np.mean([getattr(one, name) for one in mondays]))  # noqa: E731
    return [
        f"H. Forty clients on a Monday, {len(mondays)} caseloads: 28 unchanged, 4 up, 3 down, 2 faded, 2 silent,",
        "   1 with a new device; 14 days before, 21 to 35 after; moves of 1.25 standard deviations of a day.",
        f"   true cases among the first {FIRST_ROWS} rows, of 12 (10 asked)   {mean('true_in_first'):.1f}",
        f"   the silent two on top, in 100                     {100 * mean('silent_on_top'):.0f}",
        f"   unchanged clients flagged a Monday (1.5 at most)  {mean('unchanged_flagged'):.2f}",
        f"   rule of thumb, any day outside in the last seven: unchanged flagged {mean('naive_flagged'):.1f},"
        f" true cases flagged {mean('naive_true'):.1f}",
    ]
