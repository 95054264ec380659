"""Bringing in a table: every line of it ends as kept, blank or set aside with a reason; nothing is guessed."""

from __future__ import annotations

from collections import Counter
from collections.abc import Callable, Iterable, Iterator, Mapping, Sequence
from dataclasses import replace
from datetime import date, time
from itertools import compress, islice
from operator import lt, not_
from pathlib import Path
from typing import NamedTuple, cast

from desktop.errors import ExchangeError
from desktop.exchange.day_column import DaysRead, read_days
from desktop.exchange.day_tokens import DayOrder
from desktop.exchange.day_words import is_total
from desktop.exchange.lanes import Lane, Roles, find_roles, wanted_lanes
from desktop.exchange.number_tokens import DecimalMark, Refusal, decide_decimal_mark
from desktop.exchange.reading import Fate, FateList, ReadColumn, Reading, ValueList
from desktop.exchange.rows import Rectangle
from desktop.exchange.slots import slots_of_day
from desktop.exchange.source_text import file_bytes
from desktop.exchange.table import Column, Table, find_table
from desktop.exchange.units import split_header
from desktop.exchange.value_column import read_values


def _untold(_: float) -> None:
    """Nobody asks how far the reading is."""


def read_file(
    path: Path,
    *,
    day_order: DayOrder | None = None,
    decimal: DecimalMark | None = None,
    day_column: str | None = None,
    columns: Sequence[str] | None = None,
    century: int | None = None,
    name_column: str | None = None,
    told: Callable[[float], None] = _untold,
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
        name_column=name_column,
        told=told,
    )


def read_table(
    source: bytes,
    *,
    day_order: DayOrder | None = None,
    decimal: DecimalMark | None = None,
    day_column: str | None = None,
    columns: Sequence[str] | None = None,
    century: int | None = None,
    name_column: str | None = None,
    told: Callable[[float], None] = _untold,
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
        name_column: the column that says which measure a row is about, ``""`` for none.

        told: is called between the steps with the share of them that is done; what it raises ends the reading.

    Raises:
        ExchangeError: the file is no table that can be read (``workbook``, ``not text``, ``empty``,
            ``too large``, ``not a table``, ``header alone``, ``no day column``, ``no value column``,
            ``no days read``), a column is not there (``unknown column``), or the table leaves something
            open (``which day column``, ``which name column``, ``which day order``, ``which century``,
            ``which decimal mark``, with ``choices``).
    """
    told(0.1)
    table = find_table(source)
    told(0.5)
    days = read_days(table, day_order=day_order, day_column=day_column, century=century)
    told(0.6)
    roles = find_roles(table, days, name_column)
    lanes = wanted_lanes(table, days, roles, columns)
    is_once = days.all_days and _all_different(cast("Sequence[date]", days.days))
    whole = {} if is_once and _is_regular(table) else _whole_rows(table, days, roles)
    told(0.8)
    if len(whole) == len(days.days):
        counted = Counter(fate.reason for fate in whole.values())
        raise ExchangeError("no days read", column=table.columns[days.place].name, reasons=dict(counted))
    if roles.one_column is not None:
        # What any row of the one column shows of its decimal mark holds for all of them.
        decimal = decide_decimal_mark(roles.one_column.filled) or decimal
    read_columns = tuple(
        column
        for lane in lanes
        for column in _read_lane(table, days, lane, roles, whole, decimal, is_once=is_once)
    )
    if not read_columns:
        raise ExchangeError("no value column", columns=[column.name for column in table.columns])
    return Reading(
        separator=table.separator,
        encoding=table.encoding,
        encoding_guessed=table.encoding_guessed,
        header_line=table.header_line,
        skipped=table.skipped,
        day_column=table.columns[days.place].name,
        day_order=days.order,
        period=days.period,
        candidates=tuple(lane.name for lane in roles.lanes),
        columns=read_columns,
        fates=_fates(_lines(table, lanes, whole), whole, read_columns, table.lines),
        several_a_day=_several(read_columns),
    )


def choose_column(reading: Reading, name: str | None = None) -> Reading:
    """The reading narrowed to one column of values, with the fate of each line for that column.

    In a table with a row a reading, the lines about other measures are not among them.

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
    about = {
        line
        for one in reading.columns
        for line in (*one.values.lines, *(line for line, _ in one.blanks), *(fate.line for fate in one.refused))
    }
    own = {*column.values.lines, *(line for line, _ in column.blanks), *(fate.line for fate in column.refused)}
    whole = {line: fate for line, fate in reading.fates.others.items() if line not in about}
    lines = [line for line in reading.fates.lines if line in own or line in whole]
    fates = FateList(lines, {**whole, **_told(column)})
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


def _all_different(days: Sequence[date]) -> bool:
    return all(map(lt, days, islice(days, 1, None))) or len(set(days)) == len(days)


def _is_regular(table: Table) -> bool:
    return isinstance(table.rows, Rectangle) and not table.broken


def _whole_rows(table: Table, days: DaysRead, roles: Roles) -> dict[int, Fate]:
    """By its place each row that is set aside as a whole, since it has no day or does not fit."""
    width = len(table.columns)
    needed = max((_place_of(table, lane.column) for lane in roles.lanes), default=0) + 1
    whole: dict[int, Fate] = {}
    seen: set[tuple[str, ...]] = set()
    for place in _suspects(table, days, roles):
        row, day = table.rows[place], days.days[place]
        fits = len(row) == width and table.lines[place] not in table.broken
        reason = "" if fits else _misfit(table, place, width, needed)
        if not reason and isinstance(day, str):
            reason = _why_no_day(table, place, day)
        if not reason:
            key = tuple(row if roles.index is None else row[: roles.index] + row[roles.index + 1 :])
            reason = "repeated" if key in seen else ""
            seen.add(key)
        if not reason and place in roles.left_out:
            reason = "left out there"
        if reason:
            whole[place] = Fate(table.lines[place], "set aside", reason, table.text(place))
    return whole


def _suspects(table: Table, days: DaysRead, roles: Roles) -> Sequence[int]:
    """The rows that have to be looked at one by one."""
    every = range(len(days.days))
    if not isinstance(table.rows, Rectangle) or table.broken:
        return every
    columns = [column for place, column in enumerate(table.rows.columns) if place != roles.index]
    # No cell of a rectangle holds a line end.
    if len(set(map("\n".join, zip(*columns, strict=True)))) < len(every):
        return every
    if days.all_days:
        return sorted(roles.left_out)
    return [place for place, day in enumerate(days.days) if isinstance(day, str) or place in roles.left_out]


def _place_of(table: Table, column: Column) -> int:
    """Where the cells of a lane stand."""
    return next(
        (place for place, one in enumerate(table.columns) if one.name == column.name or one.cells == column.cells),
        0,
    )


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


def _read_lane(
    table: Table,
    days_read: DaysRead,
    lane: Lane,
    roles: Roles,
    whole: Mapping[int, Fate],
    decimal: DecimalMark | None,
    *,
    is_once: bool,
) -> Iterator[ReadColumn]:
    """The column of a lane, or two where its cells are pairs; none where every row of it is set aside."""
    row_days = days_read.days
    rows: Sequence[int] = range(len(row_days)) if lane.rows is None else lane.rows
    places = [place for place in rows if place not in whole] if whole else rows
    if not places:
        return
    column = lane.column_of(places)
    about = column.cells
    every = len(places) == len(row_days)
    lines = table.lines if every else [table.lines[place] for place in places]
    days = cast("Sequence[date]", row_days if every else [row_days[place] for place in places])
    clocks = None if roles.clocks is None else [roles.clocks[place] for place in places]
    words = None if roles.slots is None else [roles.slots[place] for place in places]
    for read in read_values(column, decimal, one_day=days_read.period == "day"):
        outcomes = list(map(read.outcomes.__getitem__, about))
        blanks: list[tuple[int, date]] = []
        refused: list[Fate] = []
        if set(map(type, outcomes)) == {float}:
            kept = _Kept(lines, days, clocks, words, cast("list[float]", outcomes), about)
        else:
            is_good = [isinstance(outcome, float) for outcome in outcomes]
            for place in compress(range(len(places)), map(not_, is_good)):
                outcome = outcomes[place]
                if isinstance(outcome, Refusal):
                    refused.append(Fate(lines[place], "set aside", outcome.reason, about[place]))
                else:
                    blanks.append((lines[place], days[place]))
            kept = _Kept(lines, days, clocks, words, cast("list[float]", outcomes), about).where(is_good)
        once = is_once and kept.words is None
        slots = [""] * len(kept.days) if once else slots_of_day(kept.days, kept.clocks, kept.words)
        values = ValueList(kept.lines, kept.days, slots, kept.numbers, kept.texts)
        yield ReadColumn(
            read.name,
            read.unit,
            read.decimal,
            read.durations,
            read.pair,
            values,
            tuple(blanks),
            tuple(refused),
            lane.rows,
        )


class _Kept(NamedTuple):
    """What is kept of a column, row by row."""

    lines: Sequence[int]
    days: Sequence[date]
    clocks: Sequence[time | None] | None
    words: Sequence[str] | None
    numbers: Sequence[float]
    texts: Sequence[str]

    def where(self, mask: Sequence[bool]) -> _Kept:
        """Some of the rows."""
        return _Kept._make(None if part is None else list(compress(part, mask)) for part in self)


def _several(columns: Iterable[ReadColumn]) -> tuple[date, ...]:
    several: set[date] = set()
    for column in columns:
        if any(column.values.slots):
            days = Counter(column.values.days)
            several.update(day for day, number in days.items() if number > 1)
    return tuple(sorted(several))


def _told(column: ReadColumn) -> dict[int, Fate]:
    """The fate of each line of a column that is not kept."""
    return {
        **{line: Fate(line, "blank") for line, _ in column.blanks},
        **{fate.line: fate for fate in column.refused},
    }


def _lines(table: Table, lanes: Sequence[Lane], whole: Mapping[int, Fate]) -> Sequence[int]:
    """The lines the reading is about: of a table with a row a reading, not those of measures left aside."""
    if any(lane.rows is None for lane in lanes):
        return table.lines
    places = sorted({place for lane in lanes for place in lane.rows or ()} | whole.keys())
    return [table.lines[place] for place in places]


def _fates(
    lines: Sequence[int], whole: Mapping[int, Fate], columns: Sequence[ReadColumn], table_lines: Sequence[int]
) -> FateList:
    """The fate of each line: kept if any cell of it was, else set aside if any was refused, else blank."""
    others: dict[int, Fate] = {}
    lanes: dict[int, list[dict[int, Fate]]] = {}
    for column in columns:
        lanes.setdefault(id(column.rows), []).append(_told(column))
    for told in lanes.values():
        nowhere_kept = set(told[0]).intersection(*told[1:])
        for line in nowhere_kept:
            fates = [fates[line] for fates in told]
            others[line] = next((fate for fate in fates if fate.status == "set aside"), fates[0])
    for place, fate in whole.items():
        others[table_lines[place]] = fate
    return FateList(lines, others)
