"""Marking what changed, and named days."""

from __future__ import annotations

from datetime import date

from desktop.edits.edit import Edit, edit_putting
from desktop.edits.ids import Ids
from desktop.journal.journal import Journal
from desktop.journal.records import Change, Measure, Span, SpanKind, WhyThatDay
from desktop.journal.row_change import RowChange


def mark_change(
    journal: Journal,
    ids: Ids,
    day: date,
    label: str,
    *,
    why: WhyThatDay | None = None,
    settle_days: int = 0,
    measures: tuple[int, ...] = (),
    agreed: Measure | None = None,
) -> Edit:
    """Mark a change.

    Args:
        journal: as it stands.
        ids: gives the new id.
        day: the first day of the new stretch.
        label: the person's words.
        why: why that day.
        settle_days: days from ``day`` on that are in no number.
        measures: ids of the measures it concerns; empty = all.
        agreed: a measure with the size worth it and the day to look, as agreed with the change.
    """
    change = Change(ids.new("change"), day, label, why, settle_days, measures)
    return edit_putting(journal, "mark change", [change, *([agreed] if agreed else [])])


def edit_change(journal: Journal, change: Change, agreed: Measure | None = None) -> Edit:
    """Put a change in the place of the one with its id, and a measure with what was agreed with it.

    Raises:
        KeyError: no such change.
    """
    journal.changes[change.id]
    return edit_putting(journal, "edit change", [change, *([agreed] if agreed else [])])


def remove_change(journal: Journal, change: int) -> Edit:
    """Take a change away.

    Raises:
        KeyError: no such change.
    """
    return Edit("remove change", (RowChange(journal.changes[change], None),))


def mark_span(
    journal: Journal,
    ids: Ids,
    first: date,
    last: date,
    kind: SpanKind,
    label: str = "",
    *,
    measures: tuple[int, ...] = (),
) -> Edit:
    """Name days, both ends included and in either order.

    Args:
        journal: as it stands.
        ids: gives the new id.
        first: one end.
        last: the other end.
        kind: what the days were.
        label: the person's words.
        measures: ids of the measures it concerns; empty = all.
    """
    span = Span(ids.new("span"), min(first, last), max(first, last), kind, label, measures)
    return edit_putting(journal, "mark span", [span])


def remove_span(journal: Journal, span: int) -> Edit:
    """Take named days away.

    Raises:
        KeyError: no such span.
    """
    return Edit("remove span", (RowChange(journal.spans[span], None),))
