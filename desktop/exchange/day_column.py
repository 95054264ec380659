"""Which column holds the days, and what day each row is: settled by all rows together, or asked."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from datetime import date, time

from desktop.errors import ExchangeError
from desktop.exchange.day_tokens import (
    DAILY_YEARS,
    DAY_ORDERS,
    SERIES_YEARS,
    DayOrder,
    DayToken,
    RowPeriod,
    compact_day,
    fitting_orders,
    parse_time,
    says_half_of_day,
    serial_day,
)
from desktop.exchange.day_words import DAY_HEADERS, TIME_HEADERS, is_total, simple
from desktop.exchange.number_tokens import is_blank
from desktop.exchange.table import Column, Table

CENTURIES = (1900, 2000)


@dataclass(frozen=True)
class DaysRead:
    """What the days of a table are.

    Attributes:
        place: the column they stand in.
        order: the order of day and month; None where no day needed one.
        period: what a row stands for.
        days: the day of each row, or the reason it has none.
        other_places: further columns with the same days.
        all_days: every row has a day.
    """

    place: int
    order: DayOrder | None
    period: RowPeriod
    days: Sequence[date | str]
    other_places: tuple[int, ...] = ()
    all_days: bool = False


def read_days(
    table: Table,
    *,
    day_order: DayOrder | None = None,
    day_column: str | None = None,
    century: int | None = None,
) -> DaysRead:
    """Find the day column and read it.

    Args:
        table: the table.
        day_order: the person's answer where the cells leave the order open.
        day_column: the person's answer where several columns could be the days; a column of spreadsheet day
            numbers or of eight digits is only taken as days when it is named here.
        century: the person's answer where all years have two digits, e.g. 2000.

    Raises:
        ExchangeError: ``no day column``, ``which day column``, ``which day order``, ``which century``,
            ``unknown column``.
    """
    place, others = _find_place(table, day_column)
    column = table.columns[place]
    others = _same_days(table, place, others)
    plain = table.seen.plain(column.cells)
    if plain is not None:
        return DaysRead(place, None, "day", plain.days, others, all_days=True)
    texts = list(column.counts)
    tokens = {text: token for text in texts if (token := table.seen[text])}
    if not tokens:
        return _read_numbered(place, column)
    period = _period(table, column)
    counted = [token for token in tokens.values() if token.period == period]
    order = _settle_order(counted, day_order)
    century = _settle_century(counted, order, century)
    days = {text: _day_or_reason(text, tokens.get(text), period, order, century) for text in texts}
    return DaysRead(place, order, period, [days[text] for text in column.cells], others)


def _find_place(table: Table, day_column: str | None) -> tuple[int, tuple[int, ...]]:
    names = [column.name for column in table.columns]
    if day_column is not None:
        return names.index(find_name(day_column, table.columns)), ()
    places = _day_places(table) or _year_places(table)
    if len(places) > 1 and not _agree(table, places):
        raise ExchangeError("which day column", choices=[names[place] for place in places])
    if places:
        return places[0], tuple(places[1:])
    numbered = [names[place] for place, column in enumerate(table.columns) if _is_numbered(column)]
    if numbered:
        raise ExchangeError("which day column", choices=numbered, numbered=True)
    raise ExchangeError("no day column", columns=names)


def find_name(wanted: str, columns: Sequence[Column]) -> str:
    """The name of the column a person means: its name or its header, else the same but for case.

    Raises:
        ExchangeError: ``unknown column``, with ``name`` and ``choices``.
    """
    looks: tuple[Callable[[Column], tuple[str, ...]], ...] = (
        lambda column: (column.name, column.header),
        lambda column: (column.name.casefold(), column.header.casefold()),
    )
    for look, text in zip(looks, (wanted.strip(), wanted.strip().casefold()), strict=True):
        found = [column.name for column in columns if text in look(column)]
        if found:
            return found[0]
    raise ExchangeError("unknown column", name=wanted, choices=[column.name for column in columns])


def _day_places(table: Table) -> list[int]:
    counts = [table.seen.count(column.cells, years=False) for column in table.columns]
    return [place for place, count in enumerate(counts) if count and 2 * count >= max(counts)]


def _year_places(table: Table) -> list[int]:
    """Columns that could be the years of a yearly series: hardly anything else in them, few twice."""
    places = [place for place, column in enumerate(table.columns) if _is_years(table, column)]
    for rule in (_is_named_day, _has_no_gap):
        fitting = [place for place in places if rule(table, table.columns[place])]
        if len(fitting) == 1:
            return fitting
    return places


def _is_years(table: Table, column: Column) -> bool:
    filled = sum(column.filled.values())
    count = table.seen.count(column.cells, years=True)
    return count > 0 and 2 * count > filled and 2 * len(column.filled) > filled


def _is_named_day(_: Table, column: Column) -> bool:
    return simple(column.header) in DAY_HEADERS


def _has_no_gap(table: Table, column: Column) -> bool:
    tokens = [table.seen[cell] for cell in column.cells]
    years = {token.settled[0] for token in tokens if token and token.settled}
    return max(years) - min(years) == len(years) - 1


def _agree(table: Table, places: Sequence[int]) -> bool:
    """Whether columns of days hold the same day on every row."""
    rows = zip(*(table.columns[place].cells for place in places), strict=True)
    return all(_same_day([table.seen[text] for text in row]) for row in rows)


def _same_day(tokens: Sequence[DayToken | None]) -> bool:
    days = {(token.period, token.settled, token.open) if token else None for token in tokens}
    return len(days) == 1


def _same_days(table: Table, place: int, others: Sequence[int]) -> tuple[int, ...]:
    """Further columns that hold days, so that they are not taken for values."""
    named = (number for number in _day_places(table) if number != place)
    return tuple(dict.fromkeys((*others, *named)))


def _is_numbered(column: Column) -> bool:
    """Whether every filled cell is a spreadsheet's day number, or every one eight digits that make a day."""
    filled = column.filled
    return bool(filled) and (all(map(serial_day, filled)) or all(map(compact_day, filled)))


def _read_numbered(place: int, column: Column) -> DaysRead:
    days = {text: serial_day(text) or compact_day(text) or _no_day_reason(text) for text in column.counts}
    return DaysRead(place, None, "day", [days[text] for text in column.cells])


def _period(table: Table, column: Column) -> RowPeriod:
    found = table.seen.periods(column.cells)
    periods: tuple[RowPeriod, ...] = ("day", "month", "year")
    return max(periods, key=found.__getitem__)


def _settle_order(tokens: Sequence[DayToken], answer: DayOrder | None) -> DayOrder | None:
    if not any(token.open for token in tokens):
        return None
    if answer:
        return answer
    fitting = fitting_orders(tokens)
    if len(fitting) != 1:
        raise ExchangeError("which day order", choices=list(fitting or DAY_ORDERS[:2]))
    return fitting[0]


def _settle_century(tokens: Sequence[DayToken], order: DayOrder | None, answer: int | None) -> int | None:
    """The century of two-digit years: the one in which they lie among or next to the years written out."""
    short = [token for token in tokens if token.short_year]
    if answer is not None or not short:
        return answer
    written = {day.year for token in tokens if not token.short_year for day in token.readings().values()}
    for century in CENTURIES:
        days = [_in_order(token, order, century) for token in short]
        years = {day.year for day in days if day}
        if written and years and min(written) - 1 <= min(years) and max(years) <= max(written) + 1:
            return century
    raise ExchangeError("which century", choices=list(CENTURIES))


def _in_order(token: DayToken, order: DayOrder | None, century: int | None) -> date | None:
    if token.settled and not token.short_year:
        try:
            return date(*token.settled)
        except ValueError:
            return None
    readings = token.readings(century)
    return readings.get(None) or readings.get(order)


def _day_or_reason(
    text: str, token: DayToken | None, period: RowPeriod, order: DayOrder | None, century: int | None
) -> date | str:
    if token is None:
        return _no_day_reason(text)
    if token.period != period:
        return "other period"
    year = token.settled[0] if token.settled else token.open[2] if token.open else 0
    if not token.short_year and year not in (DAILY_YEARS if period == "day" else SERIES_YEARS):
        return "day out of range"
    return _in_order(token, order, century) or "no such day"


def _no_day_reason(text: str) -> str:
    if is_blank(text):
        return "no day"
    return "total row" if is_total(text) else "not a day"


def find_times(table: Table, days: DaysRead, spare: Sequence[int]) -> tuple[int | None, list[time | None] | None]:
    """The column with the time of day, if there is one, and the time of each row; None where no row has one.

    Args:
        table: the table.
        days: its days.
        spare: columns that could hold times and need not hold values.
    """
    for place in spare:
        if _is_times(table.columns[place]):
            return place, [parse_time(cell) for cell in table.columns[place].cells]
    for place in (days.place, *days.other_places):
        column = table.columns[place]
        plain = table.seen.plain(column.cells)
        if plain is not None:
            if plain.clocks is not None and any(plain.clocks):
                return None, list(plain.clocks)
            continue
        timed = {text: token.clock for text in column.counts if (token := table.seen[text])}
        if any(timed.values()):
            return None, [timed.get(text) for text in column.cells]
    return None, None


def _is_times(column: Column) -> bool:
    filled = column.filled
    if not filled or not all(map(parse_time, filled)):
        return False
    return simple(column.header) in TIME_HEADERS or any(map(says_half_of_day, filled))
