"""A table out of rows: where its header is, what its columns are called, which rows fit it."""

from __future__ import annotations

from collections import Counter
from collections.abc import Sequence
from dataclasses import dataclass
from itertools import zip_longest

from desktop.errors import ExchangeError
from desktop.exchange.day_tokens import DayToken, parse_day
from desktop.exchange.day_words import DAY_HEADERS, INDEX_HEADERS, is_total, simple
from desktop.exchange.number_tokens import NumberToken, is_blank, read_number
from desktop.exchange.rows import Row, split_rows
from desktop.exchange.source_text import decode
from desktop.exchange.units import split_header

Cells = tuple[str, ...]


@dataclass(frozen=True)
class SkippedLine:
    """A line above the table: a title or a comment."""

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


class DaySeen(dict[str, DayToken | None]):
    """What each different text is as a day; a log repeats few texts, so each is looked at once."""

    def __init__(self) -> None:
        super().__init__()
        self._periods: dict[str, str] = {}

    def __missing__(self, text: str) -> DayToken | None:
        token = self[text] = parse_day(text)
        self._periods[text] = token.period if token else ""
        return token

    def count(self, cells: Sequence[str], *, years: bool) -> int:
        """How many cells hold a day or month or, with ``years``, a year."""
        for text in set(cells):
            if text not in self:
                self.__missing__(text)
        periods = Counter(map(self._periods.__getitem__, cells))
        return periods["year"] if years else periods["day"] + periods["month"]


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
        ExchangeError: ``workbook``, ``not text``, ``empty``, ``too large``, ``not a table``.
    """
    text = decode(source)
    found = split_rows(text.text)
    seen = DaySeen()
    if max(map(len, found.cells), default=0) < 2:
        raise ExchangeError("not a table")
    place = _day_place(found.cells, seen)
    header, begins = _header_and_first(found.cells, place, seen)
    headers = _headers(found.cells, header, begins, place)
    above = header if header is not None else begins
    rows = found.cells[begins:]
    return Table(
        separator=found.separator,
        encoding=text.encoding,
        encoding_guessed=text.guessed,
        header_line=None if header is None else found.lines[header],
        columns=_columns(headers, rows),
        lines=found.lines[begins:],
        rows=rows,
        broken=found.broken,
        skipped=tuple(
            SkippedLine(line, found.separator.join(cells))
            for line, cells in zip(found.lines[:above], found.cells[:above], strict=True)
        ),
        seen=seen,
    )


def _usual_width(rows: Sequence[Row]) -> int:
    widths = Counter(map(len, rows))
    return max(widths, key=lambda width: (widths[width], width))


def _day_place(rows: Sequence[Row], seen: DaySeen) -> int | None:
    """The column most days stand in; years count only where the table has no days."""
    columns = list(zip_longest(*rows, fillvalue=""))
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


def _columns(headers: Sequence[str], rows: Sequence[Row]) -> tuple[Column, ...]:
    width = len(headers)
    if all(len(row) == width for row in rows):
        cells: list[Cells] = list(zip(*rows, strict=True))
    else:
        padded = (row[:width] + [""] * (width - len(row)) for row in rows)
        cells = list(zip(*padded, strict=True))
    cells = cells or [()] * width
    names: list[str] = []
    columns: list[Column] = []
    for number, (header, column) in enumerate(zip(headers, cells, strict=True), start=1):
        name, unit = split_header(_unguarded(" ".join(header.split())))
        names.append(_unique(name or f"column {number}", names))
        columns.append(Column(names[-1], unit, header, column))
    return tuple(columns)


def _unguarded(text: str) -> str:
    """The text without the apostrophe that keeps a spreadsheet from running it as a formula."""
    return text[1:] if len(text) > 1 and text[0] == "'" and text[1] in "=+-@'" else text


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
