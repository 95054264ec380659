"""What a journal can hold of a table: days from the year 1900 on; later than 2199 no table is read."""

from __future__ import annotations

from dataclasses import replace
from datetime import date

from desktop.exchange.reading import Fate, FateList, ReadColumn, Reading, ValueList

_FIRST = date(1900, 1, 1)


def for_journal(reading: Reading) -> Reading:
    """The reading with every line set aside whose day no journal can hold.

    A review without a journal takes any year, so this is asked for only where a journal is to be filled.
    """
    aside = {
        value.line: Fate(value.line, "set aside", "before 1900", value.day.isoformat())
        for column in reading.columns
        if column.values and min(column.values.days) < _FIRST
        for value in column.values
        if value.day < _FIRST
    }
    if not aside:
        return reading
    return replace(
        reading,
        columns=tuple(_without(column, aside) for column in reading.columns),
        fates=FateList(reading.fates.lines, {**reading.fates.others, **aside}),
        several_a_day=tuple(day for day in reading.several_a_day if day >= _FIRST),
    )


def _without(column: ReadColumn, aside: dict[int, Fate]) -> ReadColumn:
    kept = [value for value in column.values if value.line not in aside]
    values = ValueList(
        [value.line for value in kept],
        [value.day for value in kept],
        [value.slot for value in kept],
        [value.value for value in kept],
        [value.original for value in kept],
    )
    return replace(column, values=values)
