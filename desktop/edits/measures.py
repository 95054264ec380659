"""Adding, changing and removing measures."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import replace

from desktop.edits.edit import Edit, edit_putting
from desktop.edits.ids import Ids
from desktop.journal.journal import Journal
from desktop.journal.records import Change, Entry, Measure, Span
from desktop.journal.row_change import RowChange


def add_measures(journal: Journal, ids: Ids, measures: Iterable[Measure]) -> Edit:
    """Add measures after those there are, all at once; their ids and positions are given here.

    Args:
        journal: as it stands.
        ids: gives the new ids.
        measures: several are written down together, as the two of a blood pressure.
    """
    return edit_putting(journal, "add measure", new_measures(journal, ids, measures))


def new_measures(journal: Journal, ids: Ids, measures: Iterable[Measure]) -> list[Measure]:
    """The measures with new ids and the next positions, in the same order."""
    place = 1 + max((measure.position for measure in journal.measures.values()), default=-1)
    return [
        replace(measure, id=ids.new("measure"), position=position)
        for position, measure in enumerate(measures, start=place)
    ]


def set_measure(journal: Journal, *measures: Measure) -> Edit:
    """Give measures other words, rules or positions, all at once.

    Raises:
        KeyError: no such measure.
    """
    pairs = [(journal.measures[measure.id], measure) for measure in measures]
    return Edit("set measure", tuple(RowChange(old, new) for old, new in pairs if old != new))


def convert_measure(journal: Journal, measure: Measure, factor: float, offset: float) -> Edit:
    """Give a measure another unit and turn every number of it over, as one act; what was typed stays beside it.

    Args:
        journal: as it stands.
        measure: the measure as it is to be, its limits and amounts still in the old unit.
        factor: for every number, before the offset.
        offset: is added to values and limits, not to the size of a move.

    Raises:
        KeyError: no such measure.
    """

    def turned(value: float | None) -> float | None:
        return None if value is None else _tidy(factor * value + offset)

    def is_moved(entry: Entry) -> bool:
        return bool(offset) and entry.kind == "zero"

    new = replace(
        measure,
        goal_low=turned(measure.goal_low),
        goal_high=turned(measure.goal_high),
        likely_low=turned(measure.likely_low),
        likely_high=turned(measure.likely_high),
        limit_low=turned(measure.limit_low),
        limit_high=turned(measure.limit_high),
        worth=None if measure.worth is None else _tidy(abs(factor) * measure.worth),
    )
    entries = [
        # A true zero of one unit is none of the other only where there is no offset.
        RowChange(
            entry, replace(entry, value=turned(entry.value), kind="value" if is_moved(entry) else entry.kind)
        )
        for entry in journal.entries.get(measure.id, {}).values()
        if entry.value is not None
    ]
    return Edit("set measure", (RowChange(journal.measures[measure.id], new), *entries))


def _tidy(value: float) -> float:
    """A converted number without the tail of digits that only the arithmetic made."""
    return float(f"{value:.9g}")


def move_measure(journal: Journal, measure: int, step: int) -> Edit:
    """Move a measure's column to the left (-1) or right (1) among those shown.

    Raises:
        KeyError: no such measure.
    """
    columns = journal.columns()
    place = [one.id for one in columns].index(measure) if measure in {one.id for one in columns} else -1
    there = place + step
    if place < 0 or not 0 <= there < len(columns):
        journal.measures[measure]
        return Edit("set measure", ())
    moved, other = columns[place], columns[there]
    return set_measure(journal, replace(moved, position=other.position), replace(other, position=moved.position))


def archive_measure(journal: Journal, measure: int, archived: bool = True) -> Edit:
    """Hide a measure from the table, or show it again; it stays in the file.

    Raises:
        KeyError: no such measure.
    """
    return set_measure(journal, replace(journal.measures[measure], archived=archived))


def remove_measure(journal: Journal, measure: int) -> Edit:
    """Remove a measure with everything that is about it alone; the history keeps it all.

    Changes and spans that concern other measures too stay with those.

    Raises:
        KeyError: no such measure.
    """
    removed = journal.measures[measure]
    entries = journal.entries.get(measure, {}).values()
    plans = (plan for plan in journal.plans.values() if plan.measure == measure)
    marks: list[Change | Span] = [*journal.changes.values(), *journal.spans.values()]
    return Edit(
        "remove measure",
        (
            *(RowChange(entry, None) for entry in entries),
            *(RowChange(plan, None) for plan in plans),
            *(_without(mark, measure) for mark in marks if measure in mark.measures),
            RowChange(removed, None),
        ),
    )


def _without(mark: Change | Span, measure: int) -> RowChange:
    others = tuple(other for other in mark.measures if other != measure)
    # No measures at all would mean every measure.
    return RowChange(mark, replace(mark, measures=others) if others else None)
