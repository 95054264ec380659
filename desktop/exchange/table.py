"""A table out of rows: where its header is, what its columns are called, which rows fit it."""

from __future__ import annotations

import re
from collections import Counter
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from functools import cached_property

from desktop.errors import ExchangeError
from desktop.exchange.day_tokens import DayToken, PlainDays, is_no_year, parse_day, plain_days
from desktop.exchange.day_words import DAY_HEADERS, INDEX_HEADERS, is_total, simple
from desktop.exchange.formula_guard import unguarded
from desktop.exchange.number_tokens import NumberToken, is_blank, read_number
from desktop.exchange.rows import LEAST_RECTANGLE, Cells, Rectangle, Row, columns_of, split_rows
from desktop.exchange.source_text import decode
from desktop.exchange.units import known_unit, split_header

_HEAD = 20
"""So many rows may be a title and a header before a long column of days."""
_BRACKETED = re.compile(r"[(\[]\s*(.+?)\s*[)\]]")
_DAY_PATTERN = re.compile(r"[(\[]?(?:[dmyjat]{1,4}[-/. ]?){3}[)\]]?|dates?|days?|text|unit", re.IGNORECASE)
"""What stands in a row of units over the days: ``yyyy-mm-dd``, ``TT.MM.JJJJ``, ``date``."""


@dataclass(frozen=True)
class SkippedLine:
    """A line above the values: a title, a comment, or units under the header."""

    line: int
    text: str


@dataclass(frozen=True)
class Column:
    """One column of the table.

    Attributes:
        name: its header without the unit, made unique; ``column 2`` where there is none.
        unit: the unit in its header, or ``""``.
        header: its header as it stands in the file.
        cells: one cell a row; ``""`` where a row is too short to have one.
    """

    name: str
    unit: str
    header: str
    cells: Cells

    @cached_property
    def counts(self) -> Mapping[str, int]:
        """How often each different text stands in it."""
        return Counter(self.cells)

    @cached_property
    def filled(self) -> dict[str, int]:
        """The same without the texts that say there is no value."""
        return {text: number for text, number in self.counts.items() if not is_blank(text)}


class DaySeen(dict[str, DayToken | None]):
    """What each different text is as a day; a log repeats few texts, so each is looked at once."""

    def __init__(self) -> None:
        super().__init__()
        self._periods: dict[str, str] = {}
        self._plain: dict[int, tuple[Sequence[str], PlainDays | None]] = {}
        self._counted: dict[int, tuple[Sequence[str], Mapping[str, int]]] = {}

    def __missing__(self, text: str) -> DayToken | None:
        token = self[text] = parse_day(text)
        self._periods[text] = token.period if token else ""
        return token

    def periods(self, cells: Sequence[str]) -> Mapping[str, int]:
        """How many cells are a ``day``, a ``month`` or a ``year``."""
        known = self._counted.get(id(cells))
        if known is None:
            # The cells are kept too, so that no others can take their place in memory.
            known = self._counted[id(cells)] = (cells, self._count(cells))
        return known[1]

    def count(self, cells: Sequence[str], *, years: bool) -> int:
        """How many cells hold a day or month or, with ``years``, a year."""
        found = self.periods(cells)
        return found["year"] if years else found["day"] + found["month"]

    def plain(self, cells: Sequence[str]) -> PlainDays | None:
        """The days of cells that all begin like ``2031-03-04``; None where one of them is anything else."""
        known = self._plain.get(id(cells))
        if known is None:
            known = self._plain[id(cells)] = (cells, self._plain_days(cells))
        return known[1]

    def _plain_days(self, cells: Sequence[str]) -> PlainDays | None:
        for body, found in self._plain.values():
            rest = len(cells) - len(body)
            if found and 0 < rest <= _HEAD and cells[-1] == body[-1] and cells[rest:] == body:
                # The same column with a few more rows in front.
                head = plain_days(cells[:rest])
                return None if head is None else _joined(head, found)
        return plain_days(cells)

    def _count(self, cells: Sequence[str]) -> Mapping[str, int]:
        if self.plain(cells):
            return {"day": len(cells), "month": 0, "year": 0}
        if len(cells) > LEAST_RECTANGLE:
            body = cells[_HEAD:]
            if self.plain(body) is not None:
                head = self._count(cells[:_HEAD])
                return {**head, "day": head["day"] + len(body)}
        periods = self._periods
        different = set(cells)
        for text in different.difference(periods):
            if is_no_year(text):
                periods[text] = ""
            else:
                self.__missing__(text)
        if not any(map(periods.__getitem__, different)):
            return {"day": 0, "month": 0, "year": 0}
        found = list(map(periods.__getitem__, cells))
        return {period: found.count(period) for period in ("day", "month", "year")}


def _joined(head: PlainDays, body: PlainDays) -> PlainDays:
    clocks = None
    if head.clocks or body.clocks:
        clocks = [
            clock for part in (head, body) for clock in (part.clocks if part.clocks else [None] * len(part.days))
        ]
    return PlainDays([*head.days, *body.days], clocks)


@dataclass(frozen=True)
class Table:
    """A table as it stands in the file, before anything in it is read.

    Attributes:
        separator: what stands between cells.
        encoding: how its letters were read.
        encoding_guessed: nothing in the file named the encoding.
        header_line: the line of the header; None where there is none.
        columns: in the order of the file.
        lines: the line of the file of each row.
        rows: the cells of each row, however many there are.
        broken: lines whose quotes do not close.
        skipped: lines above the table.
        seen: the days met so far.
    """

    separator: str
    encoding: str
    encoding_guessed: bool
    header_line: int | None
    columns: tuple[Column, ...]
    lines: Sequence[int]
    rows: Sequence[Row]
    broken: frozenset[int]
    skipped: tuple[SkippedLine, ...]
    seen: DaySeen

    def text(self, place: int) -> str:
        """A row as one line, for showing it."""
        return self.separator.join(self.rows[place])

    def repeats_header(self, place: int) -> bool:
        """Whether a row is the header once more, as in files that were put together."""
        names = [column.header for column in self.columns]
        return self.header_line is not None and self.rows[place] == names[: len(self.rows[place])]


def find_table(source: bytes) -> Table:
    """Find the table in a file or pasted block.

    Raises:
        ExchangeError: ``workbook``, ``not text``, ``empty``, ``too large``, ``not a table``, ``header alone``.
    """
    text = decode(source)
    found = split_rows(text.text)
    seen = DaySeen()
    if _widest(found.cells) < 2:
        raise ExchangeError("not a table")
    place = _day_place(found.cells, seen)
    if place is None and _ends_with_header(found.cells, seen):
        raise ExchangeError("header alone")
    header, begins = _header_and_first(found.cells, place, seen)
    header, begins, units = _with_units_row(found.cells, header, begins, seen)
    headers = _headers(found.cells, header, begins, place)
    above = [number for number in range(begins) if number != header]
    rows = found.cells[begins:]
    return Table(
        separator=found.separator,
        encoding=text.encoding,
        encoding_guessed=text.guessed,
        header_line=None if header is None else found.lines[header],
        columns=_columns(headers, units, rows),
        lines=found.lines[begins:],
        rows=rows,
        broken=found.broken,
        skipped=tuple(
            SkippedLine(found.lines[number], found.separator.join(found.cells[number])) for number in above
        ),
        seen=seen,
    )


def _widest(rows: Sequence[Row]) -> int:
    return len(rows.columns) if isinstance(rows, Rectangle) else max(map(len, rows), default=0)


def _ends_with_header(rows: Sequence[Row], seen: DaySeen) -> bool:
    """Whether the last row names columns, so that no row of days follows it."""
    last = rows[len(rows) - 1]
    return _names_days(last, seen) or (len(rows) == 1 and _is_header(last, len(last)))


def _usual_width(rows: Sequence[Row]) -> int:
    if isinstance(rows, Rectangle):
        return len(rows.columns)
    widths = Counter(map(len, rows))
    return max(widths, key=lambda width: (widths[width], width))


def _day_place(rows: Sequence[Row], seen: DaySeen) -> int | None:
    """The column most days stand in; years count only where the table has no days."""
    columns = columns_of(rows)
    for years in (False, True):
        counts = [seen.count(column, years=years) for column in columns]
        if max(counts):
            return counts.index(max(counts))
    return None


def _header_and_first(rows: Sequence[Row], place: int | None, seen: DaySeen) -> tuple[int | None, int]:
    """The place of the header, or None, and of the first row that is data."""
    begins = _first_with_day(rows, place, seen) if place is not None else _first_with_number(rows)
    named = [above for above, row in enumerate(rows[:begins]) if _names_days(row, seen)]
    if named:
        return named[-1], named[-1] + 1
    width = _usual_width(rows[begins:])
    for above in range(begins - 1, -1, -1):
        if _is_header(rows[above], width):
            return above, above + 1
        if not _is_data(rows[above], seen):
            break
        begins = above
    return None, begins


def _with_units_row(
    rows: Sequence[Row], header: int | None, begins: int, seen: DaySeen
) -> tuple[int | None, int, Row]:
    """The header and the first row of data once more, with the row of units between them, or ``[]``."""
    if header is None:
        return header, begins, []
    if begins < len(rows) and _is_units(rows[begins], seen):
        return header, begins + 1, rows[begins]
    width = _usual_width(rows[begins:])
    if header and not _names_days(rows[header], seen) and _is_units(rows[header], seen):
        over = rows[header - 1]
        if len(over) == len(rows[header]) and _is_header(over, width):
            return header - 1, begins, rows[header]
    return header, begins, []


def _is_units(row: Row, seen: DaySeen) -> bool:
    """Whether a row holds nothing but units, some of them known, and perhaps the pattern of the days."""
    filled = [cell for cell in row if not is_blank(cell)]
    known = [cell for cell in filled if known_unit(_bare(cell))]
    others = [cell for cell in filled if cell not in known and not _DAY_PATTERN.fullmatch(cell)]
    return bool(known) and not seen.count(filled, years=True) and all(_bare(cell) != cell for cell in others)


def _bare(text: str) -> str:
    """The text without the brackets around the whole of it."""
    match = _BRACKETED.fullmatch(text)
    return match.group(1) if match else text


def _first_with_day(rows: Sequence[Row], place: int, seen: DaySeen) -> int:
    days = (number for number, row in enumerate(rows) if place < len(row) and seen[row[place]])
    return next(days)


def _first_with_number(rows: Sequence[Row]) -> int:
    data = (number for number, row in enumerate(rows) if len(row) > 1 and any(map(_is_number, row)))
    return next(data, 0)


def _is_number(text: str) -> bool:
    return any(isinstance(read_number(text, mark), NumberToken) for mark in (".", ","))


def _is_data(row: Row, seen: DaySeen) -> bool:
    return len(row) > 1 and any(_is_number(cell) or seen[cell] for cell in row)


def _names_days(row: Row, seen: DaySeen) -> bool:
    """Whether a row is sure to be a header: one of its cells is a word for days, and none is a day."""
    return len(row) > 1 and any(map(_is_day_word, row)) and not seen.count(row, years=False)


def _is_day_word(text: str) -> bool:
    return simple(text.lstrip("# ")) in DAY_HEADERS


def _is_header(row: Row, width: int) -> bool:
    """Whether a row names columns: words, as many as the table has columns, and no values under them."""
    if len(row) < max(width, 2) or is_total(row[0]):
        return False
    filled = [cell for cell in row if not is_blank(cell)]
    words = [cell for cell in filled if not _is_number(cell)]
    worded = 2 * len(words) > len(filled) and any(map(str.isalpha, "".join(words)))
    return worded or _is_numbered(row)


def _is_numbered(row: Row) -> bool:
    """Whether a row is the column numbers that stand for missing names: blank, 0, 1 and so on."""
    return not row[0] and row[1:] == [str(number) for number in range(len(row) - 1)]


def _headers(rows: Sequence[Row], header: int | None, begins: int, place: int | None) -> list[str]:
    body = rows[begins:]
    width = _usual_width(body) if body else 0
    if header is None:
        return [""] * width
    headers = [rows[header][0].lstrip("# "), *rows[header][1:]]
    while len(headers) > width and not headers[-1]:
        headers.pop()
    if place and place < width == len(headers) + 1 and _is_day_word(headers[place - 1]):
        # Some programs write row numbers without giving their column a header.
        headers.insert(0, "")
    return headers


def _columns(headers: Sequence[str], units: Row, rows: Sequence[Row]) -> tuple[Column, ...]:
    cells = columns_of(rows, len(headers))
    names: list[str] = []
    columns: list[Column] = []
    for number, (header, column) in enumerate(zip(headers, cells, strict=True), start=1):
        name, unit = split_header(unguarded(" ".join(header.split())))
        if not unit and number <= len(units) and not _DAY_PATTERN.fullmatch(units[number - 1]):
            bare = "" if is_blank(units[number - 1]) else _bare(units[number - 1])
            unit = known_unit(bare) or bare
        names.append(_unique(name or f"column {number}", names))
        columns.append(Column(names[-1], unit, header, column))
    return tuple(columns)


def _unique(name: str, taken: Sequence[str]) -> str:
    number, unique = 1, name
    while unique in taken:
        number += 1
        unique = f"{name} {number}"
    return unique


def is_index(column: Column, *, first: bool, has_header: bool) -> bool:
    """Whether a column only numbers the rows: it has no real name, and counts, or is all different numbers."""
    if not first or simple(column.header) not in INDEX_HEADERS:
        return False
    cells = [cell for cell in column.cells if cell]
    if not cells or not all(cell.isdecimal() and len(cell) < 10 for cell in cells):
        return False
    numbers = {int(cell) for cell in cells}
    counts = min(numbers) in (0, 1) and max(numbers) - min(numbers) == len(numbers) - 1
    if column.header:
        return counts
    return len(numbers) == len(cells) and (counts or has_header)
