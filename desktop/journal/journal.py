"""The journal as it stands: every record in memory, and what the analysis is asked about it."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field
from datetime import date

import analysis.log
from desktop.journal.clients import Client, Coach, CoachingSession
from desktop.journal.kept import Kept
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Plan, Record, Span

EntryKey = tuple[date, str]


@dataclass
class Journal(Kept):
    """Every record of one journal; changed only through :meth:`apply`.

    Attributes:
        person: whose journal it is.
        measures, changes, spans, plans: by id.
        entries: for each measure's id, its entries by (day, slot).
        notes: the note of each day that has one.
    """

    person: Person
    measures: dict[int, Measure] = field(default_factory=dict)
    entries: dict[int, dict[EntryKey, Entry]] = field(default_factory=dict)
    changes: dict[int, Change] = field(default_factory=dict)
    spans: dict[int, Span] = field(default_factory=dict)
    plans: dict[int, Plan] = field(default_factory=dict)
    notes: dict[date, DayNote] = field(default_factory=dict)

    @classmethod
    def of(cls, records: Iterable[Record]) -> Journal:
        """A journal of these records.

        Raises:
            ValueError: no ``Person`` among them.
        """
        listed = list(records)
        person = next((record for record in listed if isinstance(record, Person)), None)
        if person is None:
            raise ValueError("a journal needs its person record")
        journal = cls(person)
        for record in listed:
            journal._put(record)
        return journal

    def records(self) -> list[Record]:
        """Every record, in no order that matters."""
        entries = [entry for by_day in self.entries.values() for entry in by_day.values()]
        return [
            self.person,
            *self.measures.values(),
            *entries,
            *self.changes.values(),
            *self.spans.values(),
            *self.plans.values(),
            *self.notes.values(),
        ]

    def find(self, like: Record) -> Record | None:
        """The record with the key of ``like`` as it stands, or None."""
        match like:
            case Person():
                return self.person
            case Entry():
                return self.entries.get(like.measure, {}).get((like.day, like.slot))
            case Measure():
                return self.measures.get(like.id)
            case Change():
                return self.changes.get(like.id)
            case Span():
                return self.spans.get(like.id)
            case Plan():
                return self.plans.get(like.id)
            case DayNote():
                return self.notes.get(like.day)
            case Coach() | Client() | CoachingSession():
                return None

    def columns(self) -> list[Measure]:
        """The measures shown in the table, in their order."""
        shown = [measure for measure in self.measures.values() if not measure.archived]
        return sorted(shown, key=lambda measure: (measure.position, measure.id))

    def together(self, measure: int) -> list[int]:
        """The ids of the two measures written down together with this one among them, or its own alone.

        Raises:
            KeyError: no such measure.
        """
        word = self.measures[measure].pair
        pair = [one.id for one in self.columns() if word and one.pair == word]
        return pair if len(pair) == 2 and measure in pair else [measure]

    def entry(self, measure: int, day: date, slot: str = "") -> Entry | None:
        """What is written down for a measure on a day, or None."""
        return self.entries.get(measure, {}).get((day, slot))

    def note(self, day: date) -> str:
        """The note of a day, or ``""``."""
        note = self.notes.get(day)
        return note.text if note else ""

    def days(self) -> tuple[date, date] | None:
        """First and last day anything is written about, or None for an empty journal."""
        days = [day for by_day in self.entries.values() for day, _ in by_day]
        days += self.notes.keys()
        return (min(days), max(days)) if days else None

    def changes_of(self, measure: int) -> list[Change]:
        """The changes that concern a measure, in order of day."""
        concerned = [
            change for change in self.changes.values() if not change.measures or measure in change.measures
        ]
        return sorted(concerned, key=lambda change: (change.day, change.id))

    def spans_of(self, measure: int) -> list[Span]:
        """The spans that concern a measure, in order of first day."""
        concerned = [span for span in self.spans.values() if not span.measures or measure in span.measures]
        return sorted(concerned, key=lambda span: (span.first, span.id))

    def log_of(self, measure: int, period: analysis.log.Period | None = None) -> analysis.log.Log:
        """The log the analysis is asked about.

        Args:
            measure: the measure's id.
            period: what one observation stands for; the measure's own when left out.

        Raises:
            KeyError: no such measure.
        """
        record = self.measures[measure]
        by_day = self.entries.get(measure, {})
        entries = [by_day[key] for key in sorted(by_day)]
        return analysis.log.Log.from_columns(
            analysis_measure(record, period),
            [entry.day.toordinal() for entry in entries],
            [float("nan") if entry.value is None else entry.value for entry in entries],
            [_kind_in_numbers(record, entry) for entry in entries],
            [entry.slot for entry in entries],
            [analysis.log.Span(span.first, span.last, span.kind, span.label) for span in self.spans_of(measure)],
        )

    def analysis_changes(self, measure: int) -> list[analysis.log.Change]:
        """The changes that concern a measure, as the analysis takes them."""
        return [
            analysis.log.Change(change.day, change.label, change.settle_days)
            for change in self.changes_of(measure)
        ]

    def _put(self, record: Record) -> None:
        match record:
            case Person():
                self.person = record
            case Entry():
                self.entries.setdefault(record.measure, {})[(record.day, record.slot)] = record
            case Measure():
                self.measures[record.id] = record
            case Change():
                self.changes[record.id] = record
            case Span():
                self.spans[record.id] = record
            case Plan():
                self.plans[record.id] = record
            case DayNote():
                self.notes[record.day] = record
            case Coach() | Client() | CoachingSession():
                raise ValueError("what a coach keeps is never in a journal")

    def _remove(self, record: Record) -> None:
        match record:
            case Person():
                raise ValueError("the person record cannot be removed")
            case Entry():
                del self.entries[record.measure][(record.day, record.slot)]
            case Measure():
                del self.measures[record.id]
            case Change():
                del self.changes[record.id]
            case Span():
                del self.spans[record.id]
            case Plan():
                del self.plans[record.id]
            case DayNote():
                del self.notes[record.day]
            case Coach() | Client() | CoachingSession():
                raise ValueError("what a coach keeps is never in a journal")


def _kind_in_numbers(measure: Measure, entry: Entry) -> analysis.log.DayKind:
    """A day that the person called not known is no missed day, which would count as zero."""
    return "away" if entry.kind == "blank" and measure.missed == "zero" else entry.kind


def analysis_measure(measure: Measure, period: analysis.log.Period | None = None) -> analysis.log.Measure:
    """A measure of the journal as the analysis takes it."""
    aim: analysis.log.Aim
    if measure.aim == "range":
        low = -float("inf") if measure.goal_low is None else measure.goal_low
        high = float("inf") if measure.goal_high is None else measure.goal_high
        aim = (low, high)
    else:
        aim = measure.aim
    return analysis.log.Measure(
        measure.title,
        measure.unit,
        measure.kind,
        period or measure.period,
        measure.missed,
        measure.combine,
        aim,
    )
