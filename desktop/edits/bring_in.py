"""Bringing in a table that was read from a file, as one edit."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, replace
from datetime import datetime

from analysis.log import COUNTED_KINDS
from desktop.edits.days import kind_of_value
from desktop.edits.edit import Edit, edit_putting
from desktop.edits.ids import Ids, IdTable
from desktop.edits.measures import new_measures
from desktop.journal.journal import Journal
from desktop.journal.records import Change, Entry, Measure, Plan, Span
from desktop.journal.row_change import key_of


@dataclass(frozen=True)
class BroughtIn:
    """What bringing in a table would do.

    Attributes:
        edit: the whole of it.
        measures: the measures it adds, with their real ids.
        added: entries where there were none.
        replaced: entries that take the place of others; the history keeps those.
        untouched: entries that say what the journal says already, or say nothing where it says something.
    """

    edit: Edit
    measures: tuple[Measure, ...]
    added: int
    replaced: int
    untouched: int


def bring_in(
    journal: Journal, ids: Ids, measures: Sequence[Measure], entries: Iterable[Entry], *, now: datetime
) -> BroughtIn:
    """Add measures and entries at once; where a day says something else already, the new entry wins.

    Args:
        journal: as it stands.
        ids: gives the ids of the measures added.
        measures: those to add, each with an id below 1 that only stands for it in ``entries``.
        entries: of these measures and of those in the journal.
        now: local time, noted on entries that have none.

    Raises:
        KeyError: an entry is of no measure in either.
        ValueError: a measure to add has an id of 1 or more, or two entries have the same day and slot.
    """
    if any(measure.id > 0 for measure in measures):
        raise ValueError("measures to bring in have ids below 1")
    added_measures = new_measures(journal, ids, measures)
    new_of = {old.id: new for old, new in zip(measures, added_measures, strict=True)}
    known = {**journal.measures, **new_of}
    clock = now.isoformat(timespec="seconds")

    put: dict[tuple[str | int, ...], Entry] = {}
    added = replaced = untouched = 0
    for given in entries:
        measure = known[given.measure]
        entry = _settled(given, measure, clock)
        key = key_of(entry)
        if key in put:
            raise ValueError(f"{key} is brought in twice")
        there = journal.entry(measure.id, entry.day, entry.slot)
        if there is None:
            added += 1
        elif _says_nothing_new(there, entry):
            untouched += 1
            entry = there
        else:
            replaced += 1
            entry = replace(entry, note=entry.note or there.note)
        put[key] = entry

    edit = edit_putting(journal, "bring in table", [*added_measures, *put.values()])
    return BroughtIn(edit, tuple(added_measures), added, replaced, untouched)


def bring_in_journal(journal: Journal, ids: Ids, other: Journal, *, now: datetime) -> BroughtIn:
    """Add everything another journal holds, at once; where a day says something else already, the other wins.

    Measures of the same title, unit and kind become one. Changes, spans and plans that are there already are not
    added again. The name and the question come where this journal has none.

    Args:
        journal: as it stands.
        ids: gives the ids of what is added.
        other: the other journal.
        now: local time, noted on entries that have none.
    """
    same = {_likeness(measure): measure.id for measure in journal.measures.values()}
    known = {one.id: same[_likeness(one)] for one in other.measures.values() if _likeness(one) in same}
    new = sorted((one for one in other.measures.values() if one.id not in known), key=lambda one: one.position)
    numbered = [replace(measure, id=-place) for place, measure in enumerate(new)]
    known |= {old.id: stand_in.id for old, stand_in in zip(new, numbered, strict=True)}
    entries = [
        replace(entry, measure=known[entry.measure])
        for by_day in other.entries.values()
        for entry in by_day.values()
    ]
    brought = bring_in(journal, ids, numbered, entries, now=now)
    added = {stand_in.id: real for stand_in, real in zip(numbered, brought.measures, strict=True)}
    real = {old: added[there].id if there in added else there for old, there in known.items()}
    marks = [
        *_new_marks(journal.changes.values(), other.changes.values(), "change", ids, real),
        *_new_marks(journal.spans.values(), other.spans.values(), "span", ids, real),
        *_new_marks(journal.plans.values(), other.plans.values(), "plan", ids, real),
        *other.notes.values(),
    ]
    person = replace(
        journal.person,
        name=journal.person.name or other.person.name,
        question=journal.person.question or other.person.question,
    )
    rest = edit_putting(journal, "bring in table", [person, *marks])
    return replace(brought, edit=Edit("bring in table", (*brought.edit.changes, *rest.changes)))


def _likeness(measure: Measure) -> tuple[str, str, str]:
    return measure.title, measure.unit, measure.kind


Mark = Change | Span | Plan


def _new_marks(
    there: Iterable[Mark], others: Iterable[Mark], table: IdTable, ids: Ids, measures: Mapping[int, int]
) -> list[Mark]:
    """The marks that say what none says yet, with ids of their own."""
    said = {replace(mark, id=0) for mark in there}
    new: list[Mark] = []
    for mark in others:
        alike = replace(_with_measures(mark, measures), id=0)
        if alike not in said:
            said.add(alike)
            new.append(replace(alike, id=ids.new(table)))
    return new


def _with_measures(mark: Mark, measures: Mapping[int, int]) -> Mark:
    if isinstance(mark, Plan):
        return replace(mark, measure=measures[mark.measure])
    concerned = tuple(measures[one] for one in mark.measures)
    return replace(mark, measures=concerned)


def _settled(entry: Entry, measure: Measure, clock: str) -> Entry:
    kind = entry.kind
    if kind == "value" and not entry.entered_at:
        kind = kind_of_value(measure, entry.day, entry.value, "table", entry.day)
    return replace(entry, measure=measure.id, kind=kind, entered_at=entry.entered_at or clock)


def _says_nothing_new(there: Entry, entry: Entry) -> bool:
    if entry.value is None:
        return entry.kind in ("blank", there.kind)
    # A value the person set aside stays so when the same table is brought in again.
    return there.value == entry.value and (there.kind == entry.kind or entry.kind in COUNTED_KINDS)
