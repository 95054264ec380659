"""Records as rows of the file, and as the JSON the history keeps: the one place that turns one into the other.

Columns are the fields of the record's dataclass, in their order, so none can be left out.
"""

from __future__ import annotations

import json
import math
import operator
import types
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, fields
from datetime import date
from typing import Any, Literal, Union, get_args, get_origin, get_type_hints

from desktop.journal.clients import Client, Coach, CoachingSession
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Plan, Record, Span
from desktop.journal.row_change import key_of

Cell = str | int | float | None
"""What one column of one row holds."""


_AS_JSON = json.JSONEncoder(ensure_ascii=False, separators=(",", ":"), allow_nan=False)


@dataclass(frozen=True)
class _Column:
    name: str
    optional: bool
    to_cell: Callable[[Any], Cell]
    to_field: Callable[[Any], object] | None


class Table:
    """One table and the record its rows are.

    Attributes:
        name: as in the file and in ``key_of``.
        columns: the names of its columns, in the order of the record's fields.
        select: reads all rows.
        select_one, insert, update, delete: for one row; ``update`` takes the cells, then the key.
    """

    def __init__(
        self, name: str, record: type[Record], key: tuple[str, ...], added: Mapping[str, Cell] | None = None
    ) -> None:
        """A table; ``added`` are the columns of later versions, the last ones, with what they hold before."""
        hints = get_type_hints(record)
        self._record = record
        self._columns = [_column(field.name, hints[field.name]) for field in fields(record)]
        self._to_field = [
            (index, column.optional, column.to_field)
            for index, column in enumerate(self._columns)
            if column.to_field is not None
        ]
        self._added = dict(added or {})
        self.name = name
        self.columns = tuple(column.name for column in self._columns)
        listed = ", ".join(f'"{column}"' for column in self.columns)
        # A name that is no column of the table would be taken for a text if the table did not stand before it.
        chosen = ", ".join(f'"{name}"."{column}"' for column in self.columns)
        found = " AND ".join(f'"{column}" = ?' for column in key) or "1"
        self.select = f'SELECT {chosen} FROM "{name}"'
        self.select_one = f"{self.select} WHERE {found}"
        self.insert = f'INSERT INTO "{name}" ({listed}) VALUES ({", ".join("?" * len(self.columns))})'
        assigned = ", ".join(f'"{column}" = ?' for column in self.columns)
        self.update = f'UPDATE "{name}" SET {assigned} WHERE {found}'
        self.delete = f'DELETE FROM "{name}" WHERE {found}'

    def cells(self, record: Record) -> tuple[Cell, ...]:
        """The row of a record.

        Raises:
            TypeError: a field holds something of another type.
            ValueError: a number is not finite or too long, or a text cannot be written as UTF-8.
        """
        cells: list[Cell] = []
        for column in self._columns:
            value = getattr(record, column.name)
            cells.append(None if value is None and column.optional else column.to_cell(value))
        return tuple(cells)

    def record(self, cells: Sequence[Cell]) -> Record:
        """The record of a row.

        Raises:
            ValueError: a cell does not hold what its column must.
            TypeError: as above.
        """
        values: list[Any] = list(cells)
        for index, optional, to_field in self._to_field:
            if not (optional and values[index] is None):
                values[index] = to_field(values[index])
        return self._record(*values)

    def json(self, cells: Sequence[Cell]) -> str:
        """A row as the history keeps it; the same record always gives the same text."""
        named = dict(zip(self.columns, cells, strict=True))
        return _AS_JSON.encode(named)

    def from_json(self, text: str) -> Record:
        """The record a text of :meth:`json` stands for.

        Raises:
            ValueError: the text is not one.
            TypeError: a value is of another type than its column.
        """
        return self.record(list(self._named(text).values()))

    def completed(self, text: str) -> str:
        """A text of :meth:`json` of this or an older version as this version writes it.

        Raises:
            ValueError: the text is not one.
        """
        return self.json(list(self._named(text).values())) if self._added else text

    def _named(self, text: str) -> dict[str, Cell]:
        named = json.loads(text)
        if isinstance(named, dict):
            # The history keeps what was written, so a row of an older version lacks what came later.
            named |= {column: value for column, value in self._added.items() if column not in named}
        if not isinstance(named, dict) or tuple(named) != self.columns:
            raise ValueError(f"these are not the columns of {self.name}")
        return named


def key_cells(record: Record) -> tuple[str | int, ...]:
    """The key of a record as its table holds it."""
    return key_of(record)[1:]


def key_text(key: tuple[str | int, ...]) -> str:
    """A key of ``key_of`` as the history names it within its table, e.g. ``"1/2026-03-04/morning"``."""
    return "/".join(str(part) for part in key[1:])


def table_of(record: Record) -> Table:
    """The table a record belongs to."""
    return table_named(str(key_of(record)[0]))


def table_named(name: str) -> Table:
    """The table of a journal or a caseload with this name.

    Raises:
        KeyError: neither has one.
    """
    return TABLES[name] if name in TABLES else CASELOAD_TABLES[name]


def _column(name: str, hint: object) -> _Column:
    parts = get_args(hint) if get_origin(hint) in (Union, types.UnionType) else (hint,)
    plain = next(part for part in parts if part is not types.NoneType)
    kind = str if get_origin(plain) is Literal else plain
    to_cell, to_field = _CONVERSIONS[kind]
    return _Column(name, types.NoneType in parts, to_cell, to_field)


def _text(value: object) -> str:
    if not isinstance(value, str):
        raise TypeError(f"a text is wanted, not {type(value).__name__}")
    # Half of a character pair is a text to Python, but not to a file.
    value.encode()
    return value


def _whole(value: int) -> int:
    number = operator.index(value)
    if not -(2**63) <= number < 2**63:
        raise ValueError("the number is too long")
    return number


def _number(value: float) -> float:
    number = float(value)
    if not math.isfinite(number):
        raise ValueError("a number must be finite")
    # SQLite keeps no minus zero, so the history must not either.
    return number + 0.0


def _day(value: date) -> str:
    # A datetime is a date too, but its text is another key.
    if type(value) is not date:
        raise TypeError(f"a day is wanted, not {type(value).__name__}")
    return value.isoformat()


def _ids(value: tuple[int, ...]) -> str:
    return ",".join(str(operator.index(number)) for number in value)


def _from_ids(cell: str) -> tuple[int, ...]:
    return tuple(int(number) for number in cell.split(",")) if cell else ()


_CONVERSIONS: dict[object, tuple[Callable[[Any], Cell], Callable[[Any], object] | None]] = {
    str: (_text, None),
    int: (_whole, None),
    float: (_number, None),
    bool: (int, bool),
    date: (_day, date.fromisoformat),
    tuple[int, ...]: (_ids, _from_ids),
}

TABLES: dict[str, Table] = {
    table.name: table
    for table in (
        Table("person", Person, ()),
        Table("measure", Measure, ("id",), {"limit_low": None, "limit_high": None, "limit_words": ""}),
        Table("entry", Entry, ("measure", "day", "slot")),
        Table("change", Change, ("id",)),
        Table("span", Span, ("id",)),
        Table("plan", Plan, ("id",)),
        Table("note", DayNote, ("day",)),
    )
}
"""Every table of a journal's records, by name; measures before what refers to them."""

CASELOAD_TABLES: dict[str, Table] = {
    table.name: table
    for table in (
        Table("coach", Coach, ()),
        Table("client", Client, ("id",)),
        Table("session", CoachingSession, ("client", "day")),
    )
}
"""Every table of a caseload's records, by name; clients before what refers to them."""
