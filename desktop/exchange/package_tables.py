"""The tables of a package: which files, which columns, and how each field is written as a cell and read back."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass
from datetime import date
from typing import Literal, get_args

from analysis.log import Combine, DayKind, MeasureKind, Missed, Period
from desktop.exchange.plain_table import number_text
from desktop.journal.records import (
    AimWord,
    Change,
    DayNote,
    Entry,
    Measure,
    Person,
    Plan,
    Record,
    Source,
    Span,
    SpanKind,
    WhyThatDay,
)

FieldType = Literal["text", "word", "number", "whole", "day", "yes/no", "ids"]

LARGEST = 1e9
LONGEST_TEXT = 16_000
_LARGEST_ID = 2_000_000_000
_YEARS = range(1900, 2200)


@dataclass(frozen=True)
class Field:
    """One column of a table.

    Attributes:
        name: of the column and of the record's field.
        type: how a cell is read.
        words: the only words a ``word`` may be.
        optional: an empty cell is None.
        longest: bytes a text may have.
    """

    name: str
    type: FieldType = "text"
    words: tuple[str, ...] = ()
    optional: bool = False
    longest: int = LONGEST_TEXT


@dataclass(frozen=True)
class PackageTable:
    """One file of a package.

    Attributes:
        name: of the resource; the file is called after it.
        record: what a row is.
        fields: its columns, in order.
        key: the columns no two rows agree in.
        added: the last columns, which packages of earlier versions lack.
    """

    name: str
    record: type[Record]
    fields: tuple[Field, ...]
    key: tuple[str, ...]
    added: tuple[str, ...] = ()

    @property
    def headers(self) -> tuple[tuple[str, ...], ...]:
        """The header lines there can be: of this version, of an earlier one."""
        names = tuple(field.name for field in self.fields)
        return names, names[: len(names) - len(self.added)]

    @property
    def file(self) -> str:
        """The file's name."""
        return f"{self.name}.csv"


_SHORT = 400
_ID = Field("id", "whole")
_LABEL = Field("label")
_MEASURES = Field("measures", "ids")


def _text(name: str) -> Field:
    return Field(name, longest=_SHORT)


def _word(name: str, words: tuple[str, ...], *, optional: bool = False) -> Field:
    return Field(name, "word", words, optional)


def _number(name: str) -> Field:
    return Field(name, "number", optional=True)


TABLES: tuple[PackageTable, ...] = (
    PackageTable("person", Person, (_text("journal_id"), _text("name"), Field("question")), ("journal_id",)),
    PackageTable(
        "measures",
        Measure,
        (
            _ID,
            Field("position", "whole"),
            _text("title"),
            _text("unit"),
            _word("kind", get_args(MeasureKind)),
            _word("period", get_args(Period)),
            _word("missed", get_args(Missed)),
            _word("combine", get_args(Combine), optional=True),
            _word("aim", get_args(AimWord)),
            _number("goal_low"),
            _number("goal_high"),
            _number("likely_low"),
            _number("likely_high"),
            Field("decimals", "whole"),
            _text("pair"),
            _number("worth"),
            Field("look_day", "day", optional=True),
            Field("archived", "yes/no"),
            _number("limit_low"),
            _number("limit_high"),
            Field("limit_words"),
        ),
        ("id",),
        added=("limit_low", "limit_high", "limit_words"),
    ),
    PackageTable(
        "entries",
        Entry,
        (
            Field("measure", "whole"),
            Field("day", "day"),
            _text("slot"),
            _number("value"),
            _word("kind", get_args(DayKind)),
            Field("note"),
            Field("original"),
            _word("source", get_args(Source)),
            _text("entered_at"),
        ),
        ("measure", "day", "slot"),
    ),
    PackageTable(
        "changes",
        Change,
        (
            _ID,
            Field("day", "day"),
            _LABEL,
            _word("why", get_args(WhyThatDay), optional=True),
            Field("settle_days", "whole"),
            _MEASURES,
        ),
        ("id",),
    ),
    PackageTable(
        "spans",
        Span,
        (_ID, Field("first", "day"), Field("last", "day"), _word("kind", get_args(SpanKind)), _LABEL, _MEASURES),
        ("id",),
    ),
    PackageTable(
        "plans",
        Plan,
        (_ID, Field("measure", "whole"), Field("first", "day"), Field("times", "whole"), Field("spare", "whole")),
        ("id",),
    ),
    PackageTable("notes", DayNote, (Field("day", "day"), Field("text")), ("day",)),
)
"""Every table of a package, each after those it refers to."""


def cell_of(field: Field, value: object) -> str:
    """A field of a record as a cell."""
    if value is None:
        return ""
    if field.type == "number":
        assert isinstance(value, float | int)
        return number_text(float(value))
    if field.type == "day":
        assert isinstance(value, date)
        return value.isoformat()
    if field.type == "yes/no":
        return "true" if value else "false"
    if field.type == "ids":
        assert isinstance(value, tuple)
        return " ".join(map(str, value))
    return str(value)


def value_of(field: Field, cell: str) -> object:
    """A cell as the field of a record.

    Raises:
        ValueError: it cannot be one.
    """
    if not cell and field.optional:
        return None
    match field.type:
        case "word":
            if cell not in field.words:
                raise ValueError(cell)
            return cell
        case "number":
            return _number_of(cell)
        case "whole":
            return _whole_of(cell)
        case "day":
            return _day_of(cell)
        case "yes/no":
            return {"true": True, "false": False}[cell] if cell in ("true", "false") else _refuse(cell)
        case "ids":
            return tuple(_whole_of(part) for part in cell.split(" ")) if cell else ()
        case _:
            if len(cell.encode()) > field.longest or "\0" in cell:
                raise ValueError(cell)
            return cell


def record_of(table: PackageTable, row: Mapping[str, str]) -> Record:
    """A row as a record.

    Raises:
        ValueError: a cell cannot be its field, or the fields do not go together.
    """
    values = {field.name: value_of(field, row[field.name]) for field in table.fields if field.name in row}
    record = table.record(**values)  # type: ignore[arg-type]
    if isinstance(record, Entry):
        if (record.value is None) != (record.kind in ("blank", "rest", "ill", "away")):
            raise ValueError("a kind of day without its value")
        if record.kind == "zero" and record.value != 0:
            raise ValueError("a zero that is none")
    if isinstance(record, Span) and record.first > record.last:
        raise ValueError("a span turned round")
    if isinstance(record, Person) and not _is_journal_id(record.journal_id):
        raise ValueError("no id of a journal")
    return record


def _is_journal_id(text: str) -> bool:
    return len(text) == 32 and set(text) <= set("0123456789abcdef")


def _number_of(cell: str) -> float:
    if not cell.isascii() or "_" in cell:
        raise ValueError(cell)
    value = float(cell)
    if not math.isfinite(value) or abs(value) > LARGEST:
        raise ValueError(cell)
    return value


def _whole_of(cell: str) -> int:
    if not (cell.isascii() and cell.isdecimal() and len(cell) <= 10) or int(cell) > _LARGEST_ID:
        raise ValueError(cell)
    return int(cell)


def _day_of(cell: str) -> date:
    day = date.fromisoformat(cell)
    if len(cell) != 10 or day.isoformat() != cell or day.year not in _YEARS:
        raise ValueError(cell)
    return day


def _refuse(cell: str) -> object:
    raise ValueError(cell)
