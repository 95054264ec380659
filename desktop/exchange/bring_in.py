"""Bringing in a table: every line of it ends as kept, blank or set aside with a reason; nothing is guessed."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, replace
from datetime import date, time
from pathlib import Path
from typing import Literal, NamedTuple

from desktop.errors import ExchangeError
from desktop.exchange.day_column import DaysRead, find_name, find_times, read_days
from desktop.exchange.day_tokens import DayOrder, RowPeriod
from desktop.exchange.day_words import is_total
from desktop.exchange.number_tokens import DecimalMark, Refusal
from desktop.exchange.slots import slots_of_day
from desktop.exchange.source_text import file_bytes
from desktop.exchange.table import Column, SkippedLine, Table, find_table, is_index
from desktop.exchange.units import split_header
from desktop.exchange.value_column import HALVES, CellsRead, holds_values, read_values

Status = Literal["kept", "blank", "set aside"]


class ReadValue(NamedTuple):
    """One value: the line and day it stands on, its slot of the day, and its text in the file."""

    line: int
    day: date
    slot: str
    value: float
    original: str


class Fate(NamedTuple):
    """What became of one line: ``kept``, ``blank`` (a day without a value), or ``set aside`` and why."""

    line: int
    status: Status
    reason: str = ""
    text: str = ""


@dataclass(frozen=True)
class ReadColumn:
    """One column of values.

    Attributes:
        name: its name in the table.
        unit: the unit of every value, or ``""``.
        decimal: the decimal mark it was read with.
        durations: some cells were hours and minutes, and are now in ``unit``.
        pair: the name of the column of pairs it is a half of, else ``""``.
        values: in the order of the file.
        blanks: line and day of each blank cell.
        refused: cells that are no value.
    """

    name: str
    unit: str
    decimal: DecimalMark
    durations: bool
    pair: str
    values: tuple[ReadValue, ...]
    blanks: tuple[tuple[int, date], ...]
    refused: tuple[Fate, ...]


@dataclass(frozen=True)
class Reading:
    """A table that was read.

    Attributes:
        separator: what stands between cells.
        encoding: how its letters were read.
        encoding_guessed: nothing in the file named the encoding, so letters may be wrong.
        header_line: the line of the header; None where there is none.
        skipped: lines above the table.
        day_column: the column the days stand in.
        day_order: the order of day and month; None where no day needed one.
        period: what a row stands for.
        candidates: every column that holds values, read or not.
        columns: the columns that were read.
        fates: exactly one for each line of data, in the order of the file.
        several_a_day: days with more than one value in a column.
    """

    separator: str
    encoding: str
    encoding_guessed: bool
    header_line: int | None
    skipped: tuple[SkippedLine, ...]
    day_column: str
    day_order: DayOrder | None
    period: RowPeriod
    candidates: tuple[str, ...]
    columns: tuple[ReadColumn, ...]
    fates: tuple[Fate, ...]
    several_a_day: tuple[date, ...]

    @property
    def values(self) -> Mapping[str, tuple[ReadValue, ...]]:
        """The values of each column that was read, by its name."""
        return {column.name: column.values for column in self.columns}

    @property
    def set_aside(self) -> tuple[Fate, ...]:
        """The lines of which nothing was kept, with the reason."""
        return tuple(fate for fate in self.fates if fate.status == "set aside")


def read_file(
    path: Path,
    *,
    day_order: DayOrder | None = None,
    decimal: DecimalMark | None = None,
    day_column: str | None = None,
    columns: Sequence[str] | None = None,
    century: int | None = None,
) -> Reading:
    """Read the table in a file; the arguments and errors are those of ``read_table``.

    Raises:
        ExchangeError: also ``missing`` and ``cannot open``, with ``path``.
    """
    return read_table(
        file_bytes(path),
        day_order=day_order,
        decimal=decimal,
        day_column=day_column,
        columns=columns,
        century=century,
    )


def read_table(
    source: bytes,
    *,
    day_order: DayOrder | None = None,
    decimal: DecimalMark | None = None,
    day_column: str | None = None,
    columns: Sequence[str] | None = None,
    century: int | None = None,
) -> Reading:
    """Read a table of days and values.

    The named answers settle only what the table leaves open; what its own cells prove stays.

    Args:
        source: a text file or a pasted block.
        day_order: the order of day and month.
        decimal: the decimal mark.
        day_column: the column the days stand in.
        columns: the columns to read; all that hold values when left out.
        century: the century of years with two digits, 1900 or 2000.

    Raises:
        ExchangeError: the file is no table that can be read (``workbook``, ``not text``, ``empty``,
            ``too large``, ``not a table``, ``no day column``, ``no value column``, ``no days read``),
            a column is not there (``unknown column``), or the table leaves something open (``which day
            column``, ``which day order``, ``which century``, ``which decimal mark``, with ``choices``).
    """
    table = find_table(source)
    days = read_days(table, day_order=day_order, day_column=day_column, century=century)
    places, clocks, index = _value_places(table, days)
    wanted = _wanted_places(table, days, places, columns)
    row_days = _row_days(table, days, places, index)
    kept = [place for place, day in enumerate(row_days) if isinstance(day, date)]
    if not kept:
        counted = Counter(fate.reason for fate in row_days if isinstance(fate, Fate))
        raise ExchangeError("no days read", column=table.columns[days.place].name, reasons=dict(counted))
    read_columns = tuple(
        _read_column(table, place, read, row_days, clocks)
        for place in wanted
        for read in read_values(_only(table.columns[place], kept), decimal, one_day=days.period == "day")
    )
    return Reading(
        separator=table.separator,
        encoding=table.encoding,
        encoding_guessed=table.encoding_guessed,
        header_line=table.header_line,
        skipped=table.skipped,
        day_column=table.columns[days.place].name,
        day_order=days.order,
        period=days.period,
        candidates=tuple(table.columns[place].name for place in places),
        columns=read_columns,
        fates=_fates(table, row_days, read_columns),
        several_a_day=_several(read_columns),
    )


def choose_column(reading: Reading, name: str | None = None) -> Reading:
    """The reading narrowed to one column of values, with the fate of each line for that column.

    Args:
        reading: a table that was read.
        name: the column; may be left out where there is only one.

    Raises:
        ExchangeError: ``which value column`` or ``unknown column``, with ``choices``.
    """
    names = [column.name for column in reading.columns]
    if name is None:
        if len(names) != 1:
            raise ExchangeError("which value column", choices=names)
        name = names[0]
    column = _named(reading, name)
    by_line = {fate.line: fate for fate in _column_fates(column)}
    fates = tuple(by_line.get(fate.line, fate) for fate in reading.fates)
    return replace(reading, columns=(column,), fates=fates, several_a_day=_several((column,)))


def _named(reading: Reading, name: str) -> ReadColumn:
    halves = [column.name for column in reading.columns if column.pair.casefold() == name.strip().casefold()]
    if halves and name.strip():
        raise ExchangeError("which value column", choices=halves)
    wanted = (name.strip(), split_header(name.strip())[0])
    for column in reading.columns:
        if column.name in wanted:
            return column
    for column in reading.columns:
        if column.name.casefold() in map(str.casefold, wanted):
            return column
    raise ExchangeError("unknown column", name=name, choices=[column.name for column in reading.columns])


def _value_places(table: Table, days: DaysRead) -> tuple[list[int], list[time | None], int | None]:
    """Where values stand, the time of day of each row, and which column only numbers the rows."""
    others = [
        place for place in range(len(table.columns)) if place != days.place and place not in days.other_places
    ]
    index = next(
        (
            place
            for place in others
            if is_index(table.columns[place], first=place == 0, has_header=table.header_line is not None)
        ),
        None,
    )
    places = [place for place in others if place != index and holds_values(table.columns[place])]
    time_place, clocks = find_times(table, days, [place for place in others if places != [place]])
    return [place for place in places if place != time_place], clocks, index


def _wanted_places(table: Table, days: DaysRead, places: Sequence[int], names: Sequence[str] | None) -> list[int]:
    if not names:
        if not places:
            raise ExchangeError("no value column", columns=[column.name for column in table.columns])
        return list(places)
    choices = [column for place, column in enumerate(table.columns) if place != days.place]
    found = [_find_whole(name, choices) for name in names]
    return [place for place, column in enumerate(table.columns) if column.name in found]


def _find_whole(name: str, columns: Sequence[Column]) -> str:
    """The name of the column meant, where a half of a column of pairs may be named too."""
    try:
        return find_name(name, columns)
    except ExchangeError:
        whole, _, half = name.strip().rpartition(" ")
        if half.casefold() not in HALVES:
            raise
        return find_name(whole, columns)


def _row_days(table: Table, days: DaysRead, places: Sequence[int], index: int | None) -> list[date | Fate]:
    """The day of each row, or why the whole row is set aside."""
    width = len(table.columns)
    needed = max(places, default=0) + 1
    seen: set[tuple[str, ...]] = set()
    result: list[date | Fate] = []
    for place, (row, text) in enumerate(zip(table.rows, table.columns[days.place].cells, strict=True)):
        day = days.days[text]
        fits = len(row) == width and table.lines[place] not in table.broken
        reason = "" if fits else _misfit(table, place, width, needed)
        if not reason and isinstance(day, str):
            reason = _why_no_day(table, place, day)
        if not reason:
            key = tuple(row if index is None else row[:index] + row[index + 1 :])
            reason = "repeated" if key in seen else ""
            seen.add(key)
        if reason or isinstance(day, str):
            result.append(Fate(table.lines[place], "set aside", reason, table.text(place)))
        else:
            result.append(day)
    return result


def _only(column: Column, places: Sequence[int]) -> Column:
    """The column with the cells of some rows only, so that no other row has a say in how they are read."""
    if len(places) == len(column.cells):
        return column
    return replace(column, cells=tuple(column.cells[place] for place in places))


def _misfit(table: Table, place: int, width: int, needed: int) -> str:
    row = table.rows[place]
    if table.lines[place] in table.broken:
        return "open quote"
    if len(row) > width:
        return "too many cells" if any(row[width:]) else ""
    if table.repeats_header(place):
        return "header again"
    alone = len(row) == 1 and is_total(row[0])
    return "too few cells" if len(row) < needed and not alone else ""


def _why_no_day(table: Table, place: int, reason: str) -> str:
    if table.repeats_header(place):
        return "header again"
    if reason == "no day" and any(map(is_total, table.rows[place])):
        return "total row"
    return reason


def _read_column(
    table: Table, place: int, read: CellsRead, row_days: Sequence[date | Fate], clocks: Sequence[time | None]
) -> ReadColumn:
    found: list[tuple[int, date, float, str]] = []
    times: list[time | None] = []
    blanks: list[tuple[int, date]] = []
    refused: list[Fate] = []
    outcomes = read.outcomes
    for line, day, text, clock in zip(table.lines, row_days, table.columns[place].cells, clocks, strict=True):
        if isinstance(day, Fate):
            continue
        outcome = outcomes[text]
        if outcome is None:
            blanks.append((line, day))
        elif isinstance(outcome, Refusal):
            refused.append(Fate(line, "set aside", outcome.reason, text))
        else:
            found.append((line, day, outcome, text))
            times.append(clock)
    slots = slots_of_day([day for _, day, _, _ in found], times)
    values = tuple(
        ReadValue(line, day, slot, value, text)
        for (line, day, value, text), slot in zip(found, slots, strict=True)
    )
    return ReadColumn(
        read.name, read.unit, read.decimal, read.durations, read.pair, values, tuple(blanks), tuple(refused)
    )


def _several(columns: Iterable[ReadColumn]) -> tuple[date, ...]:
    several: set[date] = set()
    for column in columns:
        days = Counter(value.day for value in column.values)
        several.update(day for day, number in days.items() if number > 1)
    return tuple(sorted(several))


def _column_fates(column: ReadColumn) -> Iterable[Fate]:
    for value in column.values:
        yield Fate(value.line, "kept")
    for line, _ in column.blanks:
        yield Fate(line, "blank")
    yield from column.refused


def _fates(table: Table, row_days: Sequence[date | Fate], columns: Sequence[ReadColumn]) -> tuple[Fate, ...]:
    """The fate of each line: kept if any cell was, else set aside if any cell was refused, else blank."""
    strength = {"blank": 0, "set aside": 1, "kept": 2}
    by_line: dict[int, Fate] = {}
    for column in columns:
        for fate in _column_fates(column):
            other = by_line.get(fate.line)
            if other is None or strength[fate.status] > strength[other.status]:
                by_line[fate.line] = fate
    return tuple(
        day if isinstance(day, Fate) else by_line[line] for line, day in zip(table.lines, row_days, strict=True)
    )
