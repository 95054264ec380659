"""Text to rows of cells: which separator, and quotes that are kept apart when they do not close."""

from __future__ import annotations

import csv
import re
from collections.abc import Callable, Iterable, Iterator, Sequence
from dataclasses import dataclass
from io import StringIO
from itertools import zip_longest
from operator import itemgetter
from typing import overload

from desktop.errors import ExchangeError
from desktop.exchange.day_tokens import parse_day

SEPARATORS = (";", "\t", "|", ",")
"""Looked at in this order: a comma is the likeliest to stand inside a cell."""
MOST_ROWS = 200_000
MOST_COLUMNS = 64
LONGEST_CELL = 4_000

_MOST_LINES = 1_000_000
_LONGEST_LINE = MOST_COLUMNS * LONGEST_CELL
_LOOKED_AT = 1_000
_MOST_JOINED = 20
_ASCII_BLANKS = " \t\x0b\x0c\x1c\x1d\x1e\x1f"
_BLANKS = re.compile(r"[^\S\n]")

_LINE_END = "\n"
LEAST_RECTANGLE = 200
"""From this many lines on, rows of equal length are cut all at once."""

Row = list[str]
Cells = tuple[str, ...]


class Rectangle(Sequence[Row]):
    """Rows of equal length, kept as columns."""

    def __init__(self, columns: Sequence[Cells]) -> None:
        self.columns = tuple(columns)

    def __len__(self) -> int:
        return len(self.columns[0])

    @overload
    def __getitem__(self, place: int) -> Row: ...
    @overload
    def __getitem__(self, place: slice) -> Rectangle: ...
    def __getitem__(self, place: int | slice) -> Row | Rectangle:
        if isinstance(place, slice):
            return Rectangle([column[place] for column in self.columns])
        return [column[place] for column in self.columns]

    def __iter__(self) -> Iterator[Row]:
        return map(list, zip(*self.columns, strict=True))


def columns_of(rows: Sequence[Row], width: int | None = None) -> list[Cells]:
    """The columns of rows of any length, with ``""`` where a row is too short.

    Args:
        rows: the rows.
        width: how many columns; as many as the longest row has when left out.
    """
    if isinstance(rows, Rectangle):
        return list(rows.columns[:width])
    columns: list[Cells] = list(zip_longest(*rows, fillvalue=""))
    if width is None:
        return columns
    missing = width - len(columns)
    return [*columns[:width], *([("",) * len(rows)] * missing)]


@dataclass(frozen=True)
class Rows:
    """Rows that are not blank, in the order of the file.

    Attributes:
        separator: what stands between cells.
        cells: the cells of each row, without blanks around them.
        lines: the line of the file each row begins on, from 1.
        broken: lines whose quotes do not close; such a row is cut at every separator.
    """

    separator: str
    cells: Sequence[Row]
    lines: list[int]
    broken: frozenset[int]


def split_rows(text: str) -> Rows:
    """Split a text into rows under the separator that puts a day first on most lines.

    Args:
        text: with line feeds as its only line ends.

    Raises:
        ExchangeError: ``too large``, with ``what``, ``limit``, ``found`` and where it helps ``line``.
    """
    if text.count("\n") > _MOST_LINES:
        raise _too_large("rows", MOST_ROWS, text.count("\n"))
    lines = text.split("\n")
    longest = max(map(len, lines))
    if longest > _LONGEST_LINE:
        number = next(number for number, line in enumerate(lines, 1) if len(line) > _LONGEST_LINE)
        raise _too_large("cell", LONGEST_CELL, len(lines[number - 1]), number)
    separator = choose_separator(lines)
    if '"' not in text:
        if longest <= LONGEST_CELL:
            # The memory of the lines serves for the cells.
            lines.clear()
            rectangle = _rectangle(text, separator)
            if rectangle is not None:
                return Rows(separator, rectangle, list(range(1, len(rectangle) + 1)), frozenset())
            lines = text.split("\n")
        return _kept(separator, _plain_records(text, lines, separator), ())
    try:
        return _kept(separator, _strict_records(text, separator), ())
    except csv.Error:
        broken: list[int] = []
        return _kept(separator, _line_records(lines, separator, broken), broken)


def _rectangle(text: str, separator: str) -> Rectangle | None:
    """All rows at once where every line has as many cells as the others; None where they must be taken singly."""
    text = text.rstrip("\n")
    length = text.count("\n") + 1
    if not LEAST_RECTANGLE <= length <= MOST_ROWS + 1:
        return None
    width = text.partition("\n")[0].count(separator) + 1
    if width > MOST_COLUMNS:
        return None
    # Every line end is kept in front of the cell behind it: if all of them stand in the first column, and there
    # as many as rows, then every line has as many cells as the first.
    flat = text.replace("\n", f"{separator}\n").split(separator)
    firsts = flat[width::width]
    if len(flat) != width * length or not all(map(_LINE_END.__eq__, map(itemgetter(slice(1)), firsts))):
        return None
    flat[width::width] = map(itemgetter(slice(1, None)), firsts)
    if not text.isascii() or any(blank in text for blank in _ASCII_BLANKS):
        flat = list(map(str.strip, flat))
    columns = [tuple(flat[place::width]) for place in range(width)]
    if "" in columns[0] and not all(map(any, zip(*columns, strict=True))):
        return None
    return Rectangle(columns)


def choose_separator(lines: list[str]) -> str:
    """The separator under which most lines begin with a day, else hold one, else hold several cells."""
    looked_at = [line for line in lines[:: max(1, len(lines) // _LOOKED_AT)] if line.strip()]
    if len(looked_at) < _LOOKED_AT // 2:
        filled = [line for line in lines if line.strip()]
        looked_at = filled[:: max(1, len(filled) // _LOOKED_AT)]
    rules: tuple[Callable[[str, str], bool], ...] = (_begins_with_day, _holds_day, _holds_cells)
    for rule in rules:
        counts = [sum(rule(line, separator) for line in looked_at) for separator in SEPARATORS]
        if any(counts):
            return SEPARATORS[counts.index(max(counts))]
    return SEPARATORS[0]


def _begins_with_day(line: str, separator: str) -> bool:
    first, found, _ = line.partition(separator)
    if line.startswith('"'):
        first, _, behind = line[1:].partition('"')
        found = separator if behind.startswith(separator) else ""
    return bool(found) and parse_day(first.strip()) is not None


def _holds_day(line: str, separator: str) -> bool:
    cells = line.split(separator)
    return 1 < len(cells) <= MOST_COLUMNS and any(parse_day(cell.strip(' "')) for cell in cells)


def _holds_cells(line: str, separator: str) -> bool:
    return separator in line


def _plain_records(text: str, lines: list[str], separator: str) -> Iterator[tuple[int, Row]]:
    if not _BLANKS.search(text):
        return ((number, line.split(separator)) for number, line in enumerate(lines, 1))
    return ((number, _stripped(line.split(separator))) for number, line in enumerate(lines, 1))


def _stripped(row: Row) -> Row:
    return [cell.strip() for cell in row]


def _strict_records(text: str, separator: str) -> Iterator[tuple[int, Row]]:
    """Rows by the strict rules.

    Raises:
        csv.Error: a quote does not close, or closes only after lines that begin with a day.
    """
    reader = csv.reader(StringIO(text, newline=""), delimiter=separator, strict=True, skipinitialspace=True)
    begins = 1
    for row in reader:
        if reader.line_num > begins and _swallows(row, separator):
            raise csv.Error
        yield begins, _stripped(row)
        begins = reader.line_num + 1


def _swallows(row: Row, separator: str) -> bool:
    """Whether a cell of several lines holds lines of the table, as after a forgotten quote."""
    continued = (line for cell in row for line in cell.split("\n")[1:])
    return any(_begins_with_day(line, separator) for line in continued)


def _line_records(lines: list[str], separator: str, broken: list[int]) -> Iterator[tuple[int, Row]]:
    """Rows line by line; a quote may run over a few lines, a line that stays open goes to ``broken``."""
    odd = [number for number, line in enumerate(lines) if line.count('"') % 2]
    at = place = 0
    while at < len(lines):
        while place < len(odd) and odd[place] < at:
            place += 1
        last = at
        if place + 1 < len(odd) and odd[place] == at and odd[place + 1] - at <= _MOST_JOINED:
            last = odd[place + 1]
        row = _strict_record("\n".join(lines[at : last + 1]), separator)
        if row is None:
            broken.append(at + 1)
            row, last = lines[at].split(separator), at
        yield at + 1, _stripped(row)
        at = last + 1


def _strict_record(text: str, separator: str) -> Row | None:
    try:
        records = list(
            csv.reader(StringIO(text, newline=""), delimiter=separator, strict=True, skipinitialspace=True)
        )
    except csv.Error:
        return None
    if len(records) > 1 or (records and _swallows(records[0], separator)):
        return None
    return records[0] if records else []


def _kept(separator: str, records: Iterable[tuple[int, Row]], broken: Iterable[int]) -> Rows:
    kept: list[Row] = []
    lines: list[int] = []
    for line, row in records:
        if len(row) > MOST_COLUMNS:
            row = _without_trailing_blanks(row, line)
        if any(row):
            kept.append(row)
            lines.append(line)
            if len(kept) > MOST_ROWS + 1:
                raise _too_large("rows", MOST_ROWS, len(kept))
    for line, row in zip(lines, kept, strict=True):
        longest = max(map(len, row))
        if longest > LONGEST_CELL:
            raise _too_large("cell", LONGEST_CELL, longest, line)
    return Rows(separator, kept, lines, frozenset(broken))


def _without_trailing_blanks(cells: Row, line: int) -> Row:
    used = max((place for place, cell in enumerate(cells, start=1) if cell), default=0)
    if used > MOST_COLUMNS:
        raise _too_large("columns", MOST_COLUMNS, used, line)
    return cells[:MOST_COLUMNS]


def _too_large(what: str, limit: int, found: int, line: int | None = None) -> ExchangeError:
    return ExchangeError("too large", what=what, limit=limit, found=found, line=line)
