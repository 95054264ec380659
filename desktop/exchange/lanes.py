"""What each column of a table is for: values, slots, names of measures, units; and the lanes values run in."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from datetime import date, time

from desktop.errors import ExchangeError
from desktop.exchange.day_column import DaysRead, find_name, find_times
from desktop.exchange.day_words import (
    NAME_HEADERS,
    PARTS_OF_DAY,
    SLOT_HEADERS,
    STATUS_HEADERS,
    UNIT_HEADERS,
    simple,
)
from desktop.exchange.formula_guard import unguarded
from desktop.exchange.number_tokens import is_blank
from desktop.exchange.rows import MOST_COLUMNS
from desktop.exchange.table import Column, Table, is_index
from desktop.exchange.units import known_unit, split_header
from desktop.exchange.value_column import HALVES, holds_values

WHOLE_DAY = "day"
"""How a slot column writes a value of the whole day."""
LEFT_OUT = "excluded"
"""How a status column writes a value that is in no number."""

_STATUSES = frozenset(("recorded", "missing", LEFT_OUT))
_MOST_NAMES_ASKED = 16


@dataclass(frozen=True)
class Lane:
    """One measure of a table: a column, or the rows of a column that carry its name.

    Attributes:
        column: its name, unit and header; the cells are those of every row of the table.
        rows: the places of its rows; None = every row.
    """

    column: Column
    rows: Sequence[int] | None = None

    @property
    def name(self) -> str:
        """The name of the measure."""
        return self.column.name

    def column_of(self, places: Sequence[int]) -> Column:
        """The column with the cells of some rows only, so that no other row has a say in how they are read."""
        cells = self.column.cells
        if len(places) == len(cells):
            return self.column
        return Column(self.column.name, self.column.unit, self.column.header, tuple(cells[at] for at in places))


@dataclass(frozen=True)
class Roles:
    """What the columns of a table are for.

    Attributes:
        lanes: every measure of the table.
        index: the column that only numbers the rows, or None.
        clocks: the time of day of each row; None where no row has one.
        slots: the slot written on each row; None where there is no column of slots.
        left_out: the places of rows whose value is said to be in no number.
        one_column: a single column holds the values of all lanes.
    """

    lanes: tuple[Lane, ...]
    index: int | None
    clocks: Sequence[time | None] | None
    slots: Sequence[str] | None
    left_out: frozenset[int]
    one_column: Column | None = None


def find_roles(table: Table, days: DaysRead, name_column: str | None) -> Roles:
    """Find what each column is for.

    Args:
        table: the table.
        days: its days.
        name_column: the person's answer where a column of words may name the measure of each row: the column,
            or ``""`` for none.

    Raises:
        ExchangeError: ``which name column``, with ``choices``; ``unknown column``.
    """
    width, has_header = len(table.columns), table.header_line is not None
    others = [place for place in range(width) if place != days.place and place not in days.other_places]
    index = next(
        (place for place in others if is_index(table.columns[place], first=place == 0, has_header=has_header)),
        None,
    )
    others = [place for place in others if place != index]
    slot_place = next((place for place in others if _is_slots(table.columns[place])), None)
    others = [place for place in others if place != slot_place]
    places = [place for place in others if holds_values(table.columns[place])]
    time_place, clocks = find_times(table, days, [place for place in others if places != [place]])
    places = [place for place in places if place != time_place]
    words = [place for place in others if place not in (time_place, *places)]
    status = next((place for place in words if _is_status(table.columns[place])), None)
    left_out = () if status is None else table.columns[status].cells
    name_place = _find_names(table, days, places, [place for place in words if place != status], name_column)
    if name_place is None:
        lanes = [Lane(table.columns[place]) for place in places]
    else:
        lanes = _named_lanes(table, table.columns[places[0]], name_place, words)
    return Roles(
        tuple(lanes),
        index,
        clocks,
        None if slot_place is None else _slots(table.columns[slot_place]),
        frozenset(place for place, cell in enumerate(left_out) if simple(cell) == LEFT_OUT),
        None if name_place is None else table.columns[places[0]],
    )


def wanted_lanes(table: Table, days: DaysRead, roles: Roles, names: Sequence[str] | None) -> tuple[Lane, ...]:
    """The lanes a person asks for; all where none is named.

    Raises:
        ExchangeError: ``no value column``, ``unknown column``.
    """
    if not names:
        if not roles.lanes:
            raise ExchangeError("no value column", columns=[column.name for column in table.columns])
        return roles.lanes
    lanes = list(roles.lanes)
    if roles.one_column is None:
        known = {lane.name for lane in lanes}
        columns = (column for place, column in enumerate(table.columns) if place != days.place)
        lanes += [Lane(column) for column in columns if column.name not in known]
    found = {_find_whole(name, [lane.column for lane in lanes]) for name in names}
    order = {column.name: place for place, column in enumerate(table.columns)}
    chosen = [lane for lane in lanes if lane.name in found]
    return tuple(sorted(chosen, key=lambda lane: order.get(lane.name, 0)))


def _find_whole(name: str, columns: Sequence[Column]) -> str:
    """The name of the column meant, where a half of a column of pairs may be named too."""
    try:
        return find_name(name, columns)
    except ExchangeError:
        whole, _, half = name.strip().rpartition(" ")
        if half.casefold() not in HALVES:
            raise
        return find_name(whole, columns)


def _is_slots(column: Column) -> bool:
    if simple(column.header) in SLOT_HEADERS:
        return True
    return bool(column.filled) and all(simple(text) in PARTS_OF_DAY for text in column.filled)


def _slots(column: Column) -> list[str]:
    words = {text: PARTS_OF_DAY.get(simple(text), text) for text in column.counts}
    known = {text: "" if is_blank(text) or simple(word) == WHOLE_DAY else word for text, word in words.items()}
    return [known[text] for text in column.cells]


def _is_status(column: Column) -> bool:
    return simple(column.header) in STATUS_HEADERS and all(simple(text) in _STATUSES for text in column.filled)


def _find_names(
    table: Table, days: DaysRead, places: Sequence[int], words: Sequence[int], answer: str | None
) -> int | None:
    """The column that names the measure of each row, where the table has a row a reading."""
    if answer is not None:
        if not answer.strip():
            return None
        columns = [table.columns[place] for place in words]
        name = find_name(answer, columns)
        return next(place for place in words if table.columns[place].name == name)
    if len(places) != 1:
        return None
    for place in words:
        column = table.columns[place]
        if simple(column.header) in NAME_HEADERS and len(column.filled) <= MOST_COLUMNS:
            return place
    maybe = [table.columns[place].name for place in words if _could_be_names(table, days, place)]
    if maybe:
        raise ExchangeError("which name column", choices=[*maybe, ""])
    return None


def _could_be_names(table: Table, days: DaysRead, place: int) -> bool:
    """Whether words part the readings of each day: never one twice on a day, and each on several days."""
    column = table.columns[place]
    if not 2 <= len(column.filled) <= _MOST_NAMES_ASKED or min(column.filled.values()) < 2:
        return False
    rows = [(day, name) for day, name in zip(days.days, column.cells, strict=True) if isinstance(day, date)]
    several = len({day for day, _ in rows}) < len(rows)
    return several and len(set(rows)) == len(rows) and not any(is_blank(name) for _, name in rows)


def _named_lanes(table: Table, values: Column, name_place: int, words: Sequence[int]) -> list[Lane]:
    rows: dict[str, list[int]] = {}
    spelt: dict[str, str] = {}
    for place, text in enumerate(table.columns[name_place].cells):
        word = unguarded(" ".join(text.split()))
        key = word.casefold()
        spelt.setdefault(key, word)
        rows.setdefault(key, []).append(place)
    if len(rows) > MOST_COLUMNS:
        raise ExchangeError("too large", what="columns", limit=MOST_COLUMNS, found=len(rows), line=None)
    units = next(
        (table.columns[place] for place in words if simple(table.columns[place].header) in UNIT_HEADERS), None
    )
    return [_named_lane(values, spelt[key], places, units) for key, places in rows.items() if key]


def _named_lane(values: Column, word: str, places: list[int], units: Column | None) -> Lane:
    name, unit = split_header(word)
    cells = values.cells
    written = {place: units.cells[place] for place in places} if units is not None else {}
    said = {text: known_unit(text) or unguarded(text.strip()) for text in written.values() if not is_blank(text)}
    if len(set(said.values())) == 1:
        unit = next(iter(said.values()))
    elif said:
        cells = _with_units(cells, written, said)
    return Lane(Column(name or word, unit, word, cells), places)


def _with_units(cells: Sequence[str], written: Mapping[int, str], said: Mapping[str, str]) -> tuple[str, ...]:
    """The cells with the unit of their row behind them, where one measure is written in several units."""
    beside = list(cells)
    for place, text in written.items():
        if not is_blank(text) and not is_blank(beside[place]):
            beside[place] = f"{beside[place]} {said[text]}"
    return tuple(beside)
