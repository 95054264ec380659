"""A journal to hand over: chosen measures, days and words only, and nothing of the history."""

from __future__ import annotations

from collections.abc import Collection
from dataclasses import dataclass, replace
from datetime import date

from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Record, Span


@dataclass(frozen=True)
class HandOver:
    """What goes into a copy that is handed over.

    Attributes:
        measures: ids of the measures that go.
        first, last: the days that go, both included.
        notes: whether the words about days and values go.
        person: whether the name and the question go.
        journal_id: the id of the copy; the journal's own says that both are the same journal.
    """

    measures: Collection[int]
    first: date
    last: date
    notes: bool
    person: bool
    journal_id: str


def records_to_hand_over(journal: Journal, chosen: HandOver) -> list[Record]:
    """The records of the copy, the person first.

    Changes and named days go where they touch the chosen days and concern a chosen measure.
    """
    person = journal.person if chosen.person else Person("")
    records: list[Record] = [replace(person, journal_id=chosen.journal_id)]
    for record in journal.records():
        match record:
            case Measure() if record.id in chosen.measures:
                records.append(record)
            case Entry() if record.measure in chosen.measures and _within(record.day, chosen):
                records.append(record if chosen.notes else replace(record, note="", original=""))
            case DayNote() if chosen.notes and _within(record.day, chosen):
                records.append(record)
            case Change() if _concerns(record.measures, chosen) and _within(record.day, chosen):
                records.append(replace(record, measures=_left(record.measures, chosen)))
            case Span() if _concerns(record.measures, chosen):
                if record.first <= chosen.last and chosen.first <= record.last:
                    records.append(replace(record, measures=_left(record.measures, chosen)))
    return records


def _within(day: date, chosen: HandOver) -> bool:
    return chosen.first <= day <= chosen.last


def _concerns(measures: tuple[int, ...], chosen: HandOver) -> bool:
    return not measures or any(measure in chosen.measures for measure in measures)


def _left(measures: tuple[int, ...], chosen: HandOver) -> tuple[int, ...]:
    return tuple(measure for measure in measures if measure in chosen.measures)
