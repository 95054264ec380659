"""What a table came to: values, and the fate of every line."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from datetime import date
from typing import Literal, NamedTuple, overload

from desktop.exchange.day_tokens import DayOrder, RowPeriod
from desktop.exchange.number_tokens import DecimalMark
from desktop.exchange.table import SkippedLine

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


class ValueList(Sequence[ReadValue]):
    """Values kept as columns, since a long table has many; each is put together when asked for."""

    def __init__(
        self,
        lines: Sequence[int],
        days: Sequence[date],
        slots: Sequence[str],
        numbers: Sequence[float],
        originals: Sequence[str],
    ) -> None:
        self.lines, self.days, self.slots = lines, days, slots
        self.numbers, self.originals = numbers, originals

    def __len__(self) -> int:
        return len(self.lines)

    @overload
    def __getitem__(self, place: int) -> ReadValue: ...
    @overload
    def __getitem__(self, place: slice) -> list[ReadValue]: ...
    def __getitem__(self, place: int | slice) -> ReadValue | list[ReadValue]:
        columns = (self.lines, self.days, self.slots, self.numbers, self.originals)
        if isinstance(place, slice):
            return list(map(ReadValue._make, zip(*(column[place] for column in columns), strict=True)))
        return ReadValue._make(column[place] for column in columns)

    def __iter__(self) -> Iterator[ReadValue]:
        columns = (self.lines, self.days, self.slots, self.numbers, self.originals)
        return map(ReadValue._make, zip(*columns, strict=True))

    def __eq__(self, other: object) -> bool:
        return isinstance(other, ValueList) and list(self) == list(other)

    __hash__ = None  # type: ignore[assignment]


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
        rows: the places of the rows it is about in a table with a row a reading; None = every row.
    """

    name: str
    unit: str
    decimal: DecimalMark
    durations: bool
    pair: str
    values: ValueList
    blanks: tuple[tuple[int, date], ...]
    refused: tuple[Fate, ...]
    rows: Sequence[int] | None = None


class FateList(Sequence[Fate]):
    """The fate of each line, in the order of the file; those plainly kept are only made when asked for."""

    def __init__(self, lines: Sequence[int], others: Mapping[int, Fate]) -> None:
        """Fates of these lines: ``others`` by line, all the rest kept."""
        self.lines = lines
        self.others = others

    def __len__(self) -> int:
        return len(self.lines)

    @overload
    def __getitem__(self, place: int) -> Fate: ...
    @overload
    def __getitem__(self, place: slice) -> list[Fate]: ...
    def __getitem__(self, place: int | slice) -> Fate | list[Fate]:
        if isinstance(place, slice):
            return [self._of(line) for line in self.lines[place]]
        return self._of(self.lines[place])

    def __eq__(self, other: object) -> bool:
        return isinstance(other, FateList) and list(self) == list(other)

    __hash__ = None  # type: ignore[assignment]

    def _of(self, line: int) -> Fate:
        return self.others.get(line) or Fate(line, "kept")


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
    fates: FateList
    several_a_day: tuple[date, ...]

    @property
    def values(self) -> Mapping[str, ValueList]:
        """The values of each column that was read, by its name."""
        return {column.name: column.values for column in self.columns}

    @property
    def set_aside(self) -> tuple[Fate, ...]:
        """The lines of which nothing was kept, with the reason."""
        others = self.fates.others
        return tuple(others[line] for line in sorted(others) if others[line].status == "set aside")
