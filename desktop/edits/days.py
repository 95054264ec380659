"""Writing into days: values, kinds of day, what is set aside, notes."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, replace
from datetime import date, datetime
from typing import Literal

from analysis.log import COUNTED_KINDS, DayKind
from desktop.edits.edit import DayCell, Edit, edit_putting
from desktop.journal.journal import Journal
from desktop.journal.records import DayNote, Entry, Measure, Source
from desktop.journal.row_change import RowChange

ValueKind = Literal["value", "extra"]
EmptyKind = Literal["rest", "ill", "away", "blank"]

EMPTY_KINDS: frozenset[DayKind] = frozenset({"rest", "ill", "away", "blank"})
"""Kinds of day that hold no value."""

LATE_AFTER_DAYS = 2
"""A value typed this many days after its day, or more, is from memory."""


@dataclass(frozen=True)
class PastedValue:
    """One cell of a pasted block; ``value`` is None for a kind of day that holds none."""

    cell: DayCell
    value: float | None
    original: str
    kind: DayKind = "value"


def put_value(
    journal: Journal,
    measure: int,
    day: date,
    value: float,
    original: str,
    *,
    now: datetime,
    kind: ValueKind = "value",
    slot: str = "",
    source: Source = "typed",
) -> Edit:
    """Write down a value; a note already there stays.

    Args:
        journal: as it stands.
        measure: the measure's id.
        day: the day it is about.
        value: the number.
        original: the text it was read from.
        now: local time; decides whether it is late.
        kind: an ``extra`` reading is in no number; a ``value`` becomes ``zero`` or ``late`` where it is one.
        slot: time of day.
        source: how it came in.

    Raises:
        KeyError: no such measure.
    """
    cell = DayCell(measure, day, slot)
    return edit_putting(journal, "put value", [_entry_putting(journal, cell, value, original, kind, source, now)])


def paste_values(
    journal: Journal, values: Iterable[PastedValue], *, now: datetime, source: Source = "table"
) -> Edit:
    """Write down a block of values at once; of two for one cell the later one stays.

    Args:
        journal: as it stands.
        values: the cells of the block.
        now: local time.
        source: how they came in; what was kept in a table is not late.

    Raises:
        KeyError: no such measure.
    """
    entries = {
        pasted.cell: _entry_putting(journal, pasted.cell, pasted.value, pasted.original, pasted.kind, source, now)
        for pasted in values
    }
    return edit_putting(journal, "paste values", entries.values())


def clear(journal: Journal, cells: Iterable[DayCell]) -> Edit:
    """Take away what is written down in these cells."""
    entries = (journal.entry(cell.measure, cell.day, cell.slot) for cell in dict.fromkeys(cells))
    return Edit("clear values", tuple(RowChange(entry, None) for entry in entries if entry is not None))


def set_kind(journal: Journal, measure: int, day: date, kind: EmptyKind, *, now: datetime, slot: str = "") -> Edit:
    """Say that a day was a rest day, ill, away or is not known; a note already there stays.

    Raises:
        KeyError: no such measure.
    """
    cell = DayCell(measure, day, slot)
    return edit_putting(journal, "set kind", [_entry_putting(journal, cell, None, "", kind, "typed", now)])


def set_aside(journal: Journal, measure: int, day: date, reason: str, *, slot: str = "") -> Edit:
    """Leave a value out of every number and keep it, with the reason as its note.

    Nothing changes where there is no value that is in the numbers. Without a reason the note stays.
    """
    entry = journal.entry(measure, day, slot)
    if entry is None or entry.kind not in COUNTED_KINDS:
        return Edit("set aside", ())
    aside = replace(entry, kind="set aside", note=reason or entry.note)
    return edit_putting(journal, "set aside", [aside])


def put_back(journal: Journal, measure: int, day: date, *, slot: str = "") -> Edit:
    """Count a value again that was set aside; its note stays.

    Nothing changes where no value is set aside.

    Raises:
        KeyError: no such measure.
    """
    entry = journal.entry(measure, day, slot)
    if entry is None or entry.kind != "set aside":
        return Edit("put back", ())
    entered = date.fromisoformat(entry.entered_at[:10]) if entry.entered_at else day
    kind = kind_of_value(journal.measures[measure], day, entry.value, entry.source, entered)
    return edit_putting(journal, "put back", [replace(entry, kind=kind)])


def write_note(journal: Journal, day: date, text: str) -> Edit:
    """Write the note of a day; without words the note is taken away."""
    if text.strip():
        return edit_putting(journal, "write note", [DayNote(day, text)])
    note = journal.notes.get(day)
    return Edit("write note", () if note is None else (RowChange(note, None),))


def kind_of_value(measure: Measure, day: date, value: float | None, source: Source, entered: date) -> DayKind:
    """The kind of day a counted value makes: typed days afterwards, none of it, or plainly a value.

    Args:
        measure: what it is of.
        day: the day it is about.
        value: the number.
        source: how it came in.
        entered: the day it came in.
    """
    if source == "typed" and (entered - day).days >= LATE_AFTER_DAYS:
        return "late"
    if value == 0 and measure.kind in ("amount", "count"):
        return "zero"
    return "value"


def _entry_putting(
    journal: Journal,
    cell: DayCell,
    value: float | None,
    original: str,
    kind: DayKind,
    source: Source,
    now: datetime,
) -> Entry:
    """The entry a cell holds afterwards; the one it holds already when the person said the same again."""
    if kind == "value":
        kind = kind_of_value(journal.measures[cell.measure], cell.day, value, source, now.date())
    there = journal.entry(cell.measure, cell.day, cell.slot)
    if there is not None and (there.value, there.original) == (value, original):
        # Typing a value again days afterwards does not make it late.
        same_kind = there.kind == kind or {there.kind, kind} <= COUNTED_KINDS
        if same_kind:
            return there
    return Entry(
        cell.measure,
        cell.day,
        cell.slot,
        None if kind in EMPTY_KINDS else value,
        kind,
        there.note if there is not None else "",
        original,
        source,
        now.isoformat(timespec="seconds"),
    )
