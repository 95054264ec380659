"""The coach's queue, cards and counts in plain words: facts and questions, never a verdict on a person."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from datetime import date
from pathlib import Path

from analysis.questions.did_it_move import CLAIMS
from analysis.questions.plan_kept import WeekOfPlan, missed_running
from desktop.caseload.card import Card, MeasureSince
from desktop.caseload.facts import Facts, PastLimit
from desktop.caseload.queue import QueueRow, Reason, Verdict
from desktop.errors import StorageError
from desktop.journal.clients import Client, CoachingSession
from desktop.wording.days import full_day, long_day, short_day
from desktop.wording.findings import findings_of
from desktop.wording.numbers import count, plain
from desktop.wording.plan import plan_words
from desktop.wording.problems import stranger_sentence
from desktop.wording.telling import Section, speech_of

BUDGET_LINE = (
    "A move is named when luck alone would name about 1 of 40 clients with nothing new. "
    "So now and then a name stands here by luck."
)
"""How often the queue is wrong, always beside it."""

NOT_FOUND = "No journal of this client is in the folder."
NO_FOLDER = "No folder is chosen yet. Choose the folder that your clients' journals are put into."
NO_CLIENTS = "There is no journal in this folder yet. Put your clients' journals there and look again."
NOTHING_NEW = "Nothing new."
COVERED = "Covered, so that your client can tell first."
UNCOVER = "Show it (Space)"
NOT_READ_YET = "Not read yet."
CASELOAD_KEYS = (
    "Up and down: another client.\n"
    "L: mark as looked at, and go on to the next one.\n"
    "Enter: write the session. Ctrl+Return: keep it and go back to the clients.\n"
    "Space: show an answer that is covered. Ctrl+T: cover every answer.\n"
    "Ctrl+F: find a client or a reason. Ctrl+0: show or fold away those with nothing new.\n"
    "F2: settings of the client. F5: look through the folder again. Ctrl+P: pages for today's clients.\n"
    "Ctrl+Z and Ctrl+Y: take back, do again."
)
NOBODY_TODAY = "No client has a session today. Choose a client, or write down the next session."
PAGES_TITLE = "Pages for today's clients"
MOST_NOTES = 5
LONG_LOG, FULL_PART = 60, 0.95
MOST_PLACES = 4
"""Digits after the mark of a value that is shown as it was written."""

_VERDICTS: Mapping[Verdict, str] = {
    "wanted way": "moved the way they wanted",
    "other way": "moved the other way",
    "moved": "moved, no way wanted",
    "no sign": "no sign of a move",
    "not enough days": "not enough days",
}


def reason_sentence(reason: Reason, facts: Facts | None) -> str:
    """Why a client is in the queue."""
    match reason.kind:
        case "session today":
            return "Session today."
        case "quiet":
            return _quiet(reason, facts)
        case "plan missed":
            return _plan_missed(reason.weeks)
        case "moved":
            day = f" {_day(facts.session)}" if facts is not None and facts.session is not None else ""
            return " ".join(f"{one.title} since{day}: {_short(one.headline)}" for one in reason.said)
        case "firm":
            (said,) = reason.said
            return f"{said.title}{'' if said.is_faded else ', firm now'}: {_short(said.headline)}"
        case "past limit":
            return " ".join(past_limit_sentence(one) for one in reason.past)
        case "device":
            return f"A new device since {_day(reason.days[-1])}: numbers before and after may not compare."
        case "unreadable":
            assert isinstance(reason.error, StorageError)
            if reason.error.reason == "not a journal":
                return f"{Path(str(reason.error.fields['path'])).name} is not a journal. It was not changed."
            return stranger_sentence(reason.error)
        case "missing":
            return NOT_FOUND


def row_sentences(row: QueueRow) -> tuple[str, ...]:
    """Every reason of a client in words; one line that nothing is new where there is none."""
    if row.reasons:
        return tuple(reason_sentence(reason, row.facts) for reason in row.reasons)
    if row.facts is None:
        return (NOT_READ_YET,)
    looked = row.client.looked_on
    return (f"Nothing new since {_day(looked.toordinal())}." if looked else NOTHING_NEW,)


def past_limit_sentence(past: PastLimit) -> str:
    """That values went past a limit of the client's own clinic; what it means is the clinic's to say."""
    days = f"on {count(len(past.days), 'day')}"
    last = f"last {_value(past.last, past.unit)} on {_day(past.days[-1])}"
    words = f" The clinic's own words: “{past.words}”." if past.words else ""
    return f"{past.title} past the clinic's own limit of {_value(past.limit, past.unit)} {days}, {last}.{words}"


def last_entry_words(facts: Facts | None) -> str:
    """The last day anything was said, for the queue's column."""
    return "" if facts is None or facts.last is None else short_day(date.fromordinal(facts.last))


def counts_line(counts: Mapping[Verdict, int]) -> str:
    """How many clients each answer has, in numbers and never in percent."""
    total = sum(counts.values())
    if not total:
        return ""
    told = ", ".join(f"{number} {_VERDICTS[verdict]}" for verdict, number in counts.items() if number)
    return f"{count(total, 'client')}: {told}."


def progress_line(done: int, of: int) -> str:
    """How many of the files are read."""
    return f"{done} of {count(of, 'journal')} read."


def looked_through_line(clients: int, added: int, unread: int, *, all_read: bool = True) -> str:
    """What came of looking through the folder."""
    if not all_read:
        return "Stopped before everything was read. What is not read yet stands as it was known before."
    left = f" {count(unread, 'file')} could not be read: see the end of the list." if unread else ""
    new = (
        f" {count(added, 'new client')}, named after {'its journal' if added == 1 else 'their journals'}."
        if added
        else ""
    )
    return f"{count(clients, 'client')}.{new}{left}"


def pages_line(done: int, of: int) -> str:
    """How many of the pages are drawn."""
    return f"{done} of {count(of, 'page')} drawn."


def pages_written(written: str, unread: Sequence[str]) -> str:
    """Where the pages are, and whose are not among them."""
    if not unread:
        return written
    return f"{written} Not among them, since their journals cannot be read: {', '.join(unread)}."


def client_title(client: Client, today: date) -> str:
    """Above the card: who, and when the next session is."""
    when = client.next_session
    if when is None:
        return client.code
    if when < today:
        return f"{client.code}, session was on {long_day(when)}"
    return f"{client.code}, session {'today' if when == today else f'on {long_day(when)}'}"


def card_sections(card: Card, *, with_notes: bool = True) -> tuple[Section, ...]:
    """The card in reading order: agreed, kept, moved, missing, did it and did it move, a question to ask.

    Args:
        card: as numbers.
        with_notes: the coach's notes too, which are nobody else's to read.
    """
    sections = [
        Section("Agreed", _agreed(card)),
        Section("Kept", _kept(card)),
        Section("Moved", _moved(card)),
        Section("Missing", _missing(card)),
    ]
    both = two_by_two(card)
    if both:
        sections.append(Section("Did it, and did it move?", (both,)))
    sections.append(Section("A question to ask", (question_of(card),)))
    notes = [one for one in reversed(card.sessions) if one.note or (one is not card.session and one.agreed)]
    if with_notes and notes:
        sections.append(Section("Your notes", tuple(map(_noted, notes[:MOST_NOTES]))))
    return tuple(sections)


COVERED_TITLES = frozenset({"Moved", "Did it, and did it move?", "A question to ask"})
"""The parts of a card that stay covered until the client has told."""


def two_by_two(card: Card) -> str:
    """Whether it was done, and whether it moved; ``""`` where one of the two is not known."""
    if not card.weeks or card.outcome is None:
        return ""
    review = card.outcome.since or card.outcome.overall
    sureness = review.answer.sureness
    if sureness is None or sureness == "too early":
        return ""
    kept = sum(week.is_kept for week in card.weeks)
    of = f"{kept} of {count(len(card.weeks), 'week')}"
    has_moved = sureness in CLAIMS and not any(doubt.alters for doubt in review.doubts)
    title = card.outcome.title
    if 2 * kept >= len(card.weeks):
        if has_moved:
            return f"The plan was kept in {of}, and it moved: {title}."
        bound = review.answer.bound
        if bound and review.answer.how_often is None:
            size = speech_of(review).with_unit(bound)
            return f"The plan was kept in {of}. If it moved at all, it was by less than {size}: {title}."
        return f"The plan was kept in {of}; this log cannot tell if it moved: {title}."
    if has_moved:
        return f"The plan was kept in {of} only, and still it moved: {title}. Something else may be behind it."
    return f"The plan was kept in {of} only, so this log cannot say what it would do for {title}."


def question_of(card: Card) -> str:
    """One open question, from the most pressing reason that there is something to ask about."""
    for reason in card.row.held:
        match reason.kind:
            case "quiet":
                return "How have the last days been, with the log and without it?"
            case "plan missed":
                week = date.fromordinal(reason.weeks[0].first)
                return f"What got in the way from the week of {full_day(week)} on? Would fewer days fit better?"
            case "past limit":
                return "What did your clinic ask you to do beyond its limit, and what has come of it?"
            case "moved" | "firm" if any(said.is_faded for said in reason.said):
                return "What was different in the time it moved, and what came after?"
            case "moved" | "firm":
                return f"What was different {_since_words(card, reason)}?"
            case "device":
                return "What is new about the way it is measured?"
    # To write down less is only for a log that is long and has hardly a day missing.
    is_full = card.of >= LONG_LOG and card.logged >= FULL_PART * card.of
    return (
        "Is the log still a help, or is it time to write down less?" if is_full else "How has it been since then?"
    )


def _since_words(card: Card, reason: Reason) -> str:
    """From when on the measure of the reason is another."""
    named = {said.measure for said in reason.said}
    one = next((one for one in (card.outcome, card.doing) if one is not None and one.measure in named), None)
    review = None if one is None else one.since if reason.kind == "moved" else one.overall
    if review is None or review.answer.since is None:
        return "since then"
    return f"from about {full_day(date.fromordinal(review.answer.since.likely))} on"


def _quiet(reason: Reason, facts: Facts | None) -> str:
    quiet = reason.quiet
    assert quiet is not None
    if facts is not None and facts.last is None:
        return f"No entry yet, {count(quiet.for_days, 'day')} after the session."
    # Whether the person or the post is silent, only the coach can know.
    copied = (
        f" The copy is of {short_day(date.fromisoformat(facts.last_at[:10]))}." if facts and facts.last_at else ""
    )
    told = f"Quiet for {count(quiet.for_days, 'day')}"
    if quiet.usual_longest is None:
        return f"{told}; the log is too short to say what is usual.{copied}"
    if not quiet.usual_longest:
        return f"{told}; no day was left out before.{copied}"
    return f"{told}; the longest before was {quiet.usual_longest}.{copied}"


def _plan_missed(weeks: Sequence[WeekOfPlan]) -> str:
    done = ", ".join(str(week.done) for week in weeks)
    return f"{_plan(weeks[-1].times, weeks[-1].spare)} missed {len(weeks)} weeks running: {done} days done."


def _plan(times: int, spare: int) -> str:
    spared = f" with {spare} to spare" if spare else ""
    return f"The plan of {count(times, 'day')} a week{spared} was"


def _agreed(card: Card) -> tuple[str, ...]:
    session = card.session
    if session is None:
        return ("Nothing is agreed yet.",)
    told = [f"On {full_day(session.day)}: {session.agreed.rstrip('.') or 'nothing new'}."]
    planned = next((one for one in reversed(card.sessions) if one.times), None)
    if planned is not None:
        since = "" if planned is session else f" since {full_day(planned.day)}"
        told.append(f"Plan{since}: {plan_words(planned.times, planned.spare)}.")
    return tuple(told)


def _noted(session: CoachingSession) -> str:
    """One earlier session in a line."""
    agreed = f" Agreed: {session.agreed.rstrip('.')}." if session.agreed else ""
    return f"{full_day(session.day)}.{agreed} {session.note}".strip()


def _short(headline: str) -> str:
    """A headline behind the name of its measure: the numbers first."""
    return headline.removeprefix("It moved: ")


def _kept(card: Card) -> tuple[str, ...]:
    if not card.weeks:
        return ("There is no plan of days a week to look at, or no whole week under it yet.",)
    kept = sum(week.is_kept for week in card.weeks)
    weeks = ", ".join(str(week.done) for week in card.weeks)
    told = [f"In {kept} of {count(len(card.weeks), 'week')}. Days done, week by week: {weeks}."]
    running = missed_running(card.weeks)
    if running > 1:
        told.append(f"Not in the last {running}.")
    return tuple(told)


def _moved(card: Card) -> tuple[str, ...]:
    told: list[str] = []
    for one in (card.outcome, card.doing):
        if one is not None:
            told += _moved_of(one)
    return tuple(told) or ("There is no measure to look at.",)


def _moved_of(one: MeasureSince) -> list[str]:
    overall = findings_of(one.overall).headline
    if one.since is None:
        return [f"{one.title}: {overall}"]
    since = findings_of(one.since).headline
    told = [f"{one.title} since the session: {since}"]
    if overall != since:
        days = one.overall.stretches[0].observations if one.overall.stretches else 0
        told.append(f"Against the first {count(days, 'day')}, before any change: {overall}")
    return told


def _missing(card: Card) -> tuple[str, ...]:
    since = "since the session" if card.session else "in all"
    told = [f"{card.logged} of {count(card.of, 'day')} {since} have an entry."]
    if card.longest_gap is not None:
        first, last = card.longest_gap
        days = last - first + 1
        span = _day(first) if days == 1 else f"{_day(first)} to {_day(last)}"
        told.append(f"The longest gap: {count(days, 'day')}, {span}.")
    if card.late:
        were = "was" if card.late == 1 else "were"
        told.append(
            f"{card.late} of {card.typed} entries {were} typed two days or more after the day they are about; "
            f"{card.one_evening} on one day at most."
        )
    return tuple(told)


def _day(day: int) -> str:
    return short_day(date.fromordinal(day))


def _value(value: float, unit: str) -> str:
    return f"{plain(value, MOST_PLACES)} {unit}".strip()
