"""What the queue needs to know of one client's journal: small, and the same whatever day it is looked at.

Everything is told up to the last day the journal holds, so that it stays true until the journal changes.
"""

from __future__ import annotations

import json
from collections.abc import Sequence
from dataclasses import asdict, dataclass
from datetime import date
from typing import Any

import analysis
from analysis import Review
from analysis.answer import Direction
from analysis.log import COUNTED_KINDS
from analysis.questions.did_it_move import CLAIMS, Sureness
from analysis.questions.plan_kept import PlannedDays
from analysis.questions.quiet import quiet
from desktop.journal.clients import Client, CoachingSession
from desktop.journal.journal import Journal
from desktop.journal.plans import days_done, pauses_of, plans_of
from desktop.journal.records import Entry, Measure
from desktop.wording.findings import findings_of

FACTS_VERSION = 2
"""Facts of another version are made again."""

LONGEST_BASELINE = 56
"""Days before a session that the days since are held against, where no earlier change limits them."""

_SHORTEST_BASELINE = 14
"""Fewer days between two marks say too little by themselves."""

DONE_KEPT = 10 * 7
"""Days back that the weeks of a plan are counted over."""


@dataclass(frozen=True)
class Said:
    """What the review of one measure says, in a few words.

    Attributes:
        measure, title: which.
        headline: the answer as it is read.
        sureness, direction: of the answer; None where nothing could be compared.
        chance: how often luck alone parts the days so far.
        is_faded: the days look as if it moved and went back; the sureness says how much that is worth.
        is_wanted: whether it moved the way that is wanted; None where no way is, or it did not move.
        is_doubted: a doubt alters the answer.
        change: day number of the change that the last stretch begins with; None without one.
    """

    measure: int
    title: str
    headline: str
    sureness: Sureness | None
    direction: Direction | None
    chance: float | None
    is_faded: bool
    is_wanted: bool | None
    is_doubted: bool
    change: int | None


@dataclass(frozen=True)
class PastLimit:
    """Values beyond a limit that the client's own clinic gave.

    Attributes:
        measure, title, unit: which.
        days: day numbers, ascending.
        last: the last of the values.
        limit: the one that was passed last.
        words: what the clinic said to do then.
    """

    measure: int
    title: str
    unit: str
    days: tuple[int, ...]
    last: float
    limit: float
    words: str


@dataclass(frozen=True)
class Facts:
    """One client's journal, as the queue needs it.

    Attributes:
        journal_id, owner: whose journal it is; the name may be empty.
        last_at, last_change: how far its history reaches; of two files of one journal the farther one counts.
        last: day number of the last day that anything was said of, a pause that was said included; None without.
        usual_gap: the longest time without an entry that was usual; None in a log too short to say.
        session: day number of the last session; None before the first.
        logged, of: days since then with an entry, out of days up to the last one.
        done: the last day numbers on which it was done.
        plans: the plans of days a week.
        pauses: first and last day numbers of illness and absence.
        answer: the outcome (else the doing) since the last change; None without a value.
        lately: each measure looked at since the last session, against the days before it.
        devices: first day numbers of new devices since the last session.
        past: values past a clinic's limit since the last session.
    """

    journal_id: str
    owner: str
    last_at: str
    last_change: int
    last: int | None
    usual_gap: int | None
    session: int | None
    logged: int
    of: int
    done: tuple[int, ...]
    plans: tuple[PlannedDays, ...]
    pauses: tuple[tuple[int, int], ...]
    answer: Said | None
    lately: tuple[Said, ...]
    devices: tuple[int, ...]
    past: tuple[PastLimit, ...]

    def to_text(self) -> str:
        """The facts as a text to remember."""
        return json.dumps(asdict(self), ensure_ascii=False, default=date.isoformat)

    @classmethod
    def of_text(cls, text: str) -> Facts:
        """The facts of a text of :meth:`to_text`.

        Raises:
            ValueError: it is not one.
        """
        try:
            held: dict[str, Any] = json.loads(text)
            return cls(
                **held
                | {
                    "done": tuple(held["done"]),
                    "plans": tuple(
                        PlannedDays(**(one | {"first": date.fromisoformat(one["first"])})) for one in held["plans"]
                    ),
                    "pauses": tuple((first, last) for first, last in held["pauses"]),
                    "answer": _said_of(held["answer"]),
                    "lately": tuple(Said(**one) for one in held["lately"]),
                    "devices": tuple(held["devices"]),
                    "past": tuple(PastLimit(**(one | {"days": tuple(one["days"])})) for one in held["past"]),
                }
            )
        except (TypeError, KeyError, ValueError) as error:
            raise ValueError("these are not facts") from error


def _said_of(held: dict[str, Any] | None) -> Said | None:
    return None if held is None else Said(**held)


def measures_of(journal: Journal, client: Client | None) -> tuple[int | None, int | None]:
    """The measures that say what was done and what came of it, by id; None where there is none.

    The coach's choice counts; else the first measure of an amount, a count or yes and no is what was done, and the
    first other one is what came of it.
    """
    chosen = (client.doing, client.outcome) if client is not None else (None, None)
    doing, outcome = (one if one in journal.measures else None for one in chosen)
    columns = [one for one in journal.columns() if one.id not in (doing, outcome)]
    if doing is None:
        doing = next((one.id for one in columns if one.kind in ("amount", "count", "yes/no")), None)
    if outcome is None:
        others = [one for one in columns if one.id != doing]
        outcome = next((one.id for one in (*[one for one in others if not one.pair], *others)), None)
    return doing, outcome


def base_of(sessions: Sequence[CoachingSession]) -> CoachingSession | None:
    """The last session that anything was agreed in; a note alone moves nothing."""
    return next((one for one in reversed(sessions) if one.agreed or one.times or not one.note), None)


def marks_of(journal: Journal, measure: int, sessions: Sequence[CoachingSession]) -> list[analysis.Change]:
    """The changes of a measure: those the client marked, and what was agreed in sessions."""
    own = journal.analysis_changes(measure)
    # What the client marked on the same day in the same words is the same change.
    marked = {(one.day, one.label.casefold()) for one in own}
    agreed = [one for one in sessions if one.agreed and (one.day, one.agreed.casefold()) not in marked]
    return [*own, *(analysis.Change(one.day, one.agreed) for one in agreed)]


def review_overall(
    journal: Journal, measure: int, sessions: Sequence[CoachingSession], today: date | None = None
) -> Review:
    """The review of a measure with the sessions' marks, up to the last day that holds a value of it."""
    record, log = journal.measures[measure], journal.log_of(measure)
    return analysis.review(log, marks_of(journal, measure, sessions), today=today, worth=record.worth)


def review_since(
    journal: Journal, measure: int, sessions: Sequence[CoachingSession], session: date
) -> Review | None:
    """The review of the days since a session against those before it; None where there are none of one kind.

    The days before begin with the mark before the session, or eight weeks before it, whichever is later, as long
    as two weeks are left.
    """
    log = journal.log_of(measure)
    counted = [
        day
        for day, value, kind in zip(log.days.tolist(), log.values.tolist(), log.kinds, strict=True)
        if kind in COUNTED_KINDS and value == value
    ]
    at = session.toordinal()
    if not counted or counted[0] >= at or counted[-1] < at:
        return None
    marks = [one.day.toordinal() + one.settle_days for one in marks_of(journal, measure, sessions)]
    begins = [day for day in (*marks, at - LONGEST_BASELINE) if day <= at - _SHORTEST_BASELINE]
    first = max(counted[0], *begins) if begins else counted[0]
    return analysis.review(
        log,
        [analysis.Change(session)],
        (date.fromordinal(min(first, at - 1)), date.fromordinal(at - 1)),
        worth=journal.measures[measure].worth,
    )


def said_of(measure: Measure, review: Review) -> Said:
    """What a review says, in a few words."""
    answer = review.answer
    wanted = measure.aim if measure.aim in ("more", "less") else None
    has_moved = answer.sureness in CLAIMS and answer.direction in ("more", "less")
    return Said(
        measure.id,
        measure.title,
        findings_of(review).headline,
        answer.sureness,
        answer.direction,
        answer.luck.p if answer.luck is not None and answer.sureness != "too early" else None,
        answer.still is not None and answer.still.state == "faded",
        answer.direction == wanted if has_moved and wanted is not None else None,
        any(doubt.alters for doubt in review.doubts),
        review.stretches[-1].change if review.stretches else None,
    )


def facts_of(
    journal: Journal,
    last_at: str,
    last_change: int,
    client: Client | None,
    sessions: Sequence[CoachingSession],
) -> Facts:
    """Everything the queue needs of a journal.

    Args:
        journal: as it was read.
        last_at: local clock time of the last step of its history.
        last_change: number of the last row change.
        client: the client it belongs to; None for one that is not known yet.
        sessions: the client's, in order of day.
    """
    chosen = measures_of(journal, client)
    looked_at = [measure for measure in chosen if measure is not None]
    base = base_of(sessions)
    session = base.day if base is not None else None
    # A day after the copy was made is one of a wrong year, or of a clock that was wrong.
    until = date.fromisoformat(last_at[:10]).toordinal() if last_at else None
    said_days = _days_said(journal, until)
    last = said_days[-1] if said_days else None
    usual = quiet(said_days, last) if last is not None else None
    since = session.toordinal() if session is not None else None
    main = next((one for one in reversed(chosen) if one is not None and journal.entries.get(one)), None)
    logged = {day for day in said_days if since is not None and day >= since}
    lately = []
    for measure in looked_at:
        review = review_since(journal, measure, sessions, session) if session is not None else None
        if review is not None:
            lately.append(said_of(journal.measures[measure], review))
    return Facts(
        journal_id=journal.person.journal_id,
        owner=journal.person.name,
        last_at=last_at,
        last_change=last_change,
        last=last,
        usual_gap=usual.usual_longest if usual else None,
        session=since,
        logged=len(logged),
        of=max(0, last - since + 1) if last is not None and since is not None else 0,
        done=_done(journal, chosen[0], last),
        plans=_plans(journal, chosen[0], sessions),
        pauses=tuple(pauses_of(journal)),
        answer=said_of(journal.measures[main], review_overall(journal, main, sessions)) if main else None,
        lately=tuple(lately),
        devices=_devices(journal, looked_at, since),
        past=_past_limits(journal, since),
    )


def _days_said(journal: Journal, until: int | None) -> list[int]:
    """Every day up to one that anything was written about, and every day of a pause."""
    days = {
        entry.day.toordinal()
        for entries in journal.entries.values()
        for entry in entries.values()
        if entry.kind != "blank" and (until is None or entry.day.toordinal() <= until)
    }
    for first, last in pauses_of(journal):
        days.update(range(first, last + 1))
    return sorted(days)


def _done(journal: Journal, doing: int | None, last: int | None) -> tuple[int, ...]:
    if doing is None or last is None:
        return ()
    return tuple(day for day in days_done(journal, doing) if last - DONE_KEPT < day <= last)


def _plans(journal: Journal, doing: int | None, sessions: Sequence[CoachingSession]) -> tuple[PlannedDays, ...]:
    if doing is None:
        return ()
    agreed = [PlannedDays(one.day, one.times, one.spare) for one in sessions if one.times]
    return tuple(sorted([*plans_of(journal, doing), *agreed], key=lambda plan: plan.first))


def _devices(journal: Journal, measures: Sequence[int], since: int | None) -> tuple[int, ...]:
    spans = {span for measure in measures for span in journal.spans_of(measure) if span.kind == "device"}
    return tuple(
        sorted(span.first.toordinal() for span in spans if since is None or span.first.toordinal() >= since)
    )


def _past_limits(journal: Journal, since: int | None) -> tuple[PastLimit, ...]:
    """Values beyond a limit, those set aside included: whether they count is not for a program to say."""
    found = []
    for measure in journal.columns():
        entries = sorted(journal.entries.get(measure.id, {}).values(), key=lambda one: (one.day, one.slot))
        beyond = [
            (entry, limit)
            for entry in entries
            if (since is None or entry.day.toordinal() >= since) and (limit := _passed(measure, entry)) is not None
        ]
        if beyond:
            days = tuple(dict.fromkeys(entry.day.toordinal() for entry, _ in beyond))
            entry, limit = beyond[-1]
            assert entry.value is not None
            found.append(
                PastLimit(measure.id, measure.title, measure.unit, days, entry.value, limit, measure.limit_words)
            )
    return tuple(found)


def _passed(measure: Measure, entry: Entry) -> float | None:
    """The limit that a value is beyond, or None."""
    if entry.value is None:
        return None
    if measure.limit_high is not None and entry.value > measure.limit_high:
        return measure.limit_high
    if measure.limit_low is not None and entry.value < measure.limit_low:
        return measure.limit_low
    return None
