"""Answers to what empty days were."""

from __future__ import annotations

from datetime import date, datetime, timedelta

from desktop.edits.changes import mark_span
from desktop.edits.days import PastedValue, paste_values
from desktop.edits.edit import DayCell, Edit
from desktop.edits.ids import Ids
from desktop.journal.journal import Journal

NOT_WRITTEN = "not written down"
"""The name of days that nobody knows of any more."""


def gap_was_none(journal: Journal, measure: int, first: date, last: date, *, now: datetime) -> Edit:
    """Write a zero on every day of a gap, as one act; they are from memory.

    Raises:
        KeyError: no such measure.
    """
    days = [first + timedelta(at) for at in range((last - first).days + 1)]
    zeros = [PastedValue(DayCell(measure, day), 0.0, "0") for day in days]
    return paste_values(journal, zeros, now=now, source="typed")


def gap_is_not_known(journal: Journal, ids: Ids, first: date, last: date) -> Edit:
    """Name the days of a gap, so that they are in no number."""
    return mark_span(journal, ids, first, last, "away", NOT_WRITTEN)
