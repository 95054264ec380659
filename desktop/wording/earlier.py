"""Words of earlier copies: when one was taken, what it holds, what differs, where the second copies are."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import date, datetime
from pathlib import Path

from desktop.journal.differences import Difference
from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Measure, Plan, Record, Span
from desktop.wording.days import full_day
from desktop.wording.entry import number_text
from desktop.wording.numbers import count

NO_COPIES = (
    "There is no earlier copy yet. One is taken on the first opening of a day when something has changed, "
    "after a long evening of typing, and before a table is brought in."
)
RESTORE_HINT = "What is there now is copied first, and Undo takes the whole of it back."
NO_PLACE = "Second place: none. A stick or a folder that is kept elsewhere helps when this computer is lost."


def moment(made: datetime) -> str:
    """When a copy was taken, by the clock of this computer: ``10 March 2031, 20:15``."""
    here = made.astimezone()
    return f"{full_day(here.date())}, {here:%H:%M}"


def holds_sentence(journal: Journal) -> str:
    """What a copy holds: ``It holds 42 days in 2 measures, the last of them 30 March 2031``."""
    days = journal.days()
    written = {day for by_day in journal.entries.values() for day, _ in by_day}
    if days is None or not written:
        return "It holds no days yet."
    measures = count(len(journal.measures), "measure")
    return f"It holds {count(len(written), 'day')} in {measures}, the last of them {full_day(max(written))}."


def differs_sentence(found: Sequence[Difference]) -> str:
    """How far a copy is from what is there now, in one sentence."""
    if not found:
        return "It is the same as what is there now."
    entries = [one for one in found if isinstance(one.record, Entry)]
    other = len(found) - len(entries)
    parts = [
        (sum(one.now is not None and one.then is not None for one in entries), "differs", "differ"),
        (sum(one.then is None for one in entries), "is only here now", "are only here now"),
        (sum(one.now is None for one in entries), "is only in the copy", "are only in the copy"),
    ]
    said = [f"{count(number, 'value')} {one if number == 1 else many}"
            for number, one, many in parts if number]  # fmt: skip
    if other:
        said.append(f"{other} other {'thing differs' if other == 1 else 'things differ'}")
    return f"{', '.join(said)}."


def difference_cells(one: Difference, journal: Journal, earlier: Journal) -> tuple[str, str, str]:
    """One difference as a row of the table: what, now, in the copy."""
    record = one.record
    return _what(record, journal, earlier), _held(one.now, one.then, journal), _held(one.then, one.now, earlier)


def place_sentence(place: Path | None, last: datetime | None, today: date) -> str:
    """Where the second copies go, and how old the last one is."""
    if place is None:
        return NO_PLACE
    if last is None:
        return f"Second place: {place}. No copy can be found there at the moment."
    days = (today - last.astimezone().date()).days
    age = "today" if days <= 0 else "yesterday" if days == 1 else f"{days} days ago"
    return f"Second place: {place}. Last copied {age}, {moment(last)}."


def _what(record: Record, journal: Journal, earlier: Journal) -> str:
    match record:
        case Entry():
            measure = journal.measures.get(record.measure) or earlier.measures.get(record.measure)
            slot = f", {record.slot}" if record.slot else ""
            return f"{full_day(record.day)}, {measure.title if measure else 'a measure that is gone'}{slot}"
        case DayNote():
            return f"{full_day(record.day)}, note"
        case Measure():
            return f"the measure “{record.title}”"
        case Change():
            return f"the change of {full_day(record.day)}"
        case Span():
            return f"the named days from {full_day(record.first)}"
        case Plan():
            return f"the plan from {full_day(record.first)}"
        case _:
            return "the name or question"


def _held(record: Record | None, other: Record | None, journal: Journal) -> str:
    if record is None:
        return "nothing"
    match record:
        case Entry():
            measure = journal.measures.get(record.measure)
            if record.value is None:
                return record.kind
            value = f"{record.value:g}" if measure is None else number_text(measure, record.value)
            aside = " (set aside)" if record.kind == "set aside" else ""
            same = isinstance(other, Entry) and (other.value, other.kind) == (record.value, record.kind)
            return f"{value}{aside}, “{record.note}”" if same and record.note else value + aside
        case DayNote():
            return record.text
        case Change() | Span():
            return record.label or "no label"
    return "there" if other is None else "otherwise"
