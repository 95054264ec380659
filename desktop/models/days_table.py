"""The days as a table: one row a day, one column a measure, then the note."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date, timedelta
from typing import Literal

from PySide6.QtCore import QAbstractTableModel, QModelIndex, QPersistentModelIndex, Qt, Signal
from PySide6.QtGui import QColor, QFont

from desktop.edits.days import EmptyKind, PastedValue, clear, paste_values, put_value, set_kind, write_note
from desktop.edits.edit import DayCell
from desktop.exchange.number_tokens import NumberToken, Refusal, read_number, read_typed
from desktop.journal.records import Change, DayNote, Entry, Measure
from desktop.journal.row_change import RowChange
from desktop.models.session import Session
from desktop.wording.days import long_day, short_day
from desktop.wording.entry import KIND_WORDS, cell_text, refusal_sentence, spoken_cell, with_changes

Index = QModelIndex | QPersistentModelIndex

DAYS_BEFORE_TODAY = 27
"""A new log shows four weeks, so that the days before today can be filled in."""

LONGEST_LINE = 14
"""Letters of one line of a title; a longer one would take the room of the other columns."""

KIND_LETTERS: dict[str, EmptyKind] = {"r": "rest", "i": "ill", "a": "away"}


@dataclass(frozen=True)
class Unread:
    """What was typed into a cell and could not be read, kept until it is put right."""

    text: str
    why: str


@dataclass(frozen=True)
class Unlikely:
    """A number outside the measure's likely range, waiting for the person to say that it is right."""

    cell: DayCell
    value: float
    text: str


Typed = Literal["kept", "unread", "unlikely"]


# Put together once: a table asks for them a hundred times for every key.
_READ = Qt.ItemFlag.ItemIsEnabled | Qt.ItemFlag.ItemIsSelectable
_WRITTEN = _READ | Qt.ItemFlag.ItemIsEditable


class DaysTable(QAbstractTableModel):
    """Days of the open journal, oldest first, today last.

    Signals:
        unread: a cell could not be read; the sentence says why.
        unlikely: a number needs a yes before it is kept.
    """

    unread = Signal(str)
    unlikely = Signal(object)

    def __init__(self, session: Session) -> None:
        super().__init__(session)
        self._session = session
        self._unread: dict[DayCell, Unread] = {}
        self._measures: list[Measure] = []
        self._written: dict[int, tuple[date, date]] = {}
        self._changes: dict[date, list[Change]] = {}
        self._first = session.today
        self._rows = 0
        self.quiet_colour = QColor(110, 110, 110)
        self._lay_out(session.today - timedelta(DAYS_BEFORE_TODAY))
        self._find_changes()
        session.edited.connect(self._follow)

    @property
    def first_day(self) -> date:
        """The day of the first row."""
        return self._first

    def day(self, row: int) -> date:
        """The day of a row."""
        return self._first + timedelta(row)

    def row(self, day: date) -> int:
        """The row of a day; may lie outside the table."""
        return (day - self._first).days

    def measure(self, column: int) -> Measure | None:
        """The measure of a column; None for the notes."""
        return self._measures[column] if column < len(self._measures) else None

    def column(self, measure: int) -> int:
        """The column of a measure, 0 when it has none."""
        places = [place for place, one in enumerate(self._measures) if one.id == measure]
        return places[0] if places else 0

    def show_from(self, day: date) -> None:
        """Begin the table no later than this day."""
        if day < self._first:
            self.beginResetModel()
            self._lay_out(day)
            self.endResetModel()

    def start_today(self) -> None:
        """Add the rows up to today after midnight."""
        last = self.day(self._rows - 1)
        today = self._session.today
        if today > last:
            added = (today - last).days
            self.beginInsertRows(QModelIndex(), self._rows, self._rows + added - 1)
            self._rows += added
            self.endInsertRows()

    def rowCount(self, parent: Index = QModelIndex()) -> int:  # noqa: B008
        """One row a day."""
        return 0 if parent.isValid() else self._rows

    def columnCount(self, parent: Index = QModelIndex()) -> int:  # noqa: B008
        """One column a measure, and the notes."""
        return 0 if parent.isValid() else len(self._measures) + 1

    def flags(self, index: Index) -> Qt.ItemFlag:
        """Every cell can be typed into, unless nothing can be changed here."""
        if not index.isValid():
            return Qt.ItemFlag.NoItemFlags
        return _READ if self._session.read_only else _WRITTEN

    def headerData(
        self, section: int, orientation: Qt.Orientation, role: int = Qt.ItemDataRole.DisplayRole
    ) -> object:
        """Titles above, days beside."""
        if orientation == Qt.Orientation.Horizontal:
            return self._title(section, role)
        day = self.day(section)
        is_today = day == self._session.today
        changes = self._changes.get(day, [])
        match role:
            case Qt.ItemDataRole.DisplayRole:
                return "today" if is_today else short_day(day)
            case Qt.ItemDataRole.ToolTipRole | Qt.ItemDataRole.AccessibleTextRole:
                return with_changes(long_day(day), changes)
            case Qt.ItemDataRole.FontRole if is_today or changes:
                return _font(bold=True)
            case Qt.ItemDataRole.ForegroundRole if day.weekday() >= 5 and not is_today:
                return self.quiet_colour
            case Qt.ItemDataRole.TextAlignmentRole:
                return Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter
        return None

    def data(self, index: Index, role: int = Qt.ItemDataRole.DisplayRole) -> object:
        """What a cell shows, says and how it looks."""
        measure = self.measure(index.column())
        day = self.day(index.row())
        if measure is None:
            return self._note_data(day, role)
        entry = self._session.journal.entry(measure.id, day)
        unread = self._unread.get(DayCell(measure.id, day))
        if unread is not None:
            return self._unread_data(unread, role)
        match role:
            case Qt.ItemDataRole.DisplayRole:
                return cell_text(measure, entry, is_passed=self._is_passed(measure, day))
            case Qt.ItemDataRole.EditRole:
                return _edit_text(entry)
            case Qt.ItemDataRole.AccessibleTextRole:
                return with_changes(spoken_cell(measure, entry, day), self._changes_of(day, measure))
            case Qt.ItemDataRole.ToolTipRole:
                said = entry.note or KIND_WORDS[entry.kind] if entry else ""
                return with_changes(said, self._changes_of(day, measure)) or None
            case Qt.ItemDataRole.TextAlignmentRole:
                return Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
            case Qt.ItemDataRole.ForegroundRole if entry is None or entry.value is None:
                return self.quiet_colour
            case Qt.ItemDataRole.FontRole:
                if entry is None or entry.value is None:
                    return _font(italic=True)
                return _font(struck=True) if entry.kind in ("set aside", "extra") else None
        return None

    def setData(self, index: Index, value: object, role: int = Qt.ItemDataRole.EditRole) -> bool:
        """Keep what was typed into a cell; what cannot be read stays in the cell until it is put right."""
        if role != Qt.ItemDataRole.EditRole:
            return False
        measure, day = self.measure(index.column()), self.day(index.row())
        if measure is None:
            self._session.do(write_note(self._session.journal, day, str(value).strip()))
            return True
        return self.type_into(DayCell(measure.id, day), str(value)) == "kept"

    def type_into(self, cell: DayCell, text: str) -> Typed:
        """Read what was typed into a cell and keep it, or say why not."""
        measure = self._session.journal.measures[cell.measure]
        text = text.strip()
        self._unread.pop(cell, None)
        if not text:
            self._session.do(clear(self._session.journal, [cell]))
            return self._typed(cell, "kept")
        kind = KIND_LETTERS.get(text.lower()[:1])
        if kind is not None and kind.startswith(text.lower()):
            self._session.do(
                set_kind(self._session.journal, cell.measure, cell.day, kind, now=self._session.now())
            )
            return self._typed(cell, "kept")
        if self._put_pair(measure, cell.day, text):
            return self._typed(cell, "kept")
        value = read_typed(text, measure.unit)
        if isinstance(value, Refusal):
            why = refusal_sentence(value.reason, text)
            self._unread[cell] = Unread(text, why)
            self.unread.emit(why)
            return self._typed(cell, "unread")
        if _is_unlikely(measure, value):
            self._unread[cell] = Unread(text, "")
            self.unlikely.emit(Unlikely(cell, value, text))
            return self._typed(cell, "unlikely")
        self.keep(cell, value, text)
        return "kept"

    def keep(self, cell: DayCell, value: float, text: str) -> None:
        """Write down a value that was read, likely or not."""
        self._unread.pop(cell, None)
        journal = self._session.journal
        self._session.do(put_value(journal, cell.measure, cell.day, value, text, now=self._session.now()))
        self._typed(cell, "kept")

    def forget_unread(self, cell: DayCell) -> None:
        """Let go of what could not be read, or was not meant."""
        self._unread.pop(cell, None)
        self._typed(cell, "kept")

    @property
    def unread_texts(self) -> list[tuple[date, str]]:
        """What was typed and could not be read, with its day, oldest first."""
        return sorted((cell.day, unread.text) for cell, unread in self._unread.items())

    def holds_a_value(self, index: Index) -> bool:
        """Whether a number is written down in a cell."""
        measure = self.measure(index.column())
        entry = self._session.journal.entry(measure.id, self.day(index.row())) if measure is not None else None
        return entry is not None and entry.value is not None

    def set_kind(self, indexes: list[QModelIndex], kind: EmptyKind) -> None:
        """Say of these cells that the day was a rest day, ill or away."""
        for index in indexes:
            measure = self.measure(index.column())
            if measure is not None:
                day = self.day(index.row())
                edit = set_kind(self._session.journal, measure.id, day, kind, now=self._session.now())
                self._unread.pop(DayCell(measure.id, day), None)
                self._session.do(edit)

    def clear(self, indexes: list[QModelIndex]) -> None:
        """Make these cells blank, as one act; a note among them is taken away by itself."""
        cells = []
        for index in indexes:
            measure, day = self.measure(index.column()), self.day(index.row())
            if measure is None:
                self._session.do(write_note(self._session.journal, day, ""))
            else:
                cells.append(DayCell(measure.id, day))
                self._unread.pop(cells[-1], None)
        self._session.do(clear(self._session.journal, cells))
        for cell in cells:
            self._typed(cell, "kept")

    def paste(self, start: QModelIndex, block: str) -> str:
        """Write a block of cells, rows by line and columns by tab, from a cell on; all of it or nothing.

        Returns:
            ``""``, or the sentence that says which cell cannot be read.
        """
        lines = block.replace("\r\n", "\n").replace("\r", "\n").rstrip("\n").split("\n")
        values: list[PastedValue] = []
        for down, line in enumerate(lines):
            row = start.row() + down
            if row >= self._rows:
                return f"The block reaches past today: it has {len(lines)} rows. Nothing was pasted."
            for right, text in enumerate(line.split("\t")):
                measure = self.measure(start.column() + right)
                if measure is None or not text.strip():
                    continue
                value = read_typed(text.strip(), measure.unit)
                if isinstance(value, Refusal):
                    return (
                        f"Row {down + 1} of the block: {refusal_sentence(value.reason, text.strip())} "
                        "Nothing was pasted."
                    )
                values.append(PastedValue(DayCell(measure.id, self.day(row)), value, text.strip()))
        self._session.do(paste_values(self._session.journal, values, now=self._session.now()))
        return ""

    def _put_pair(self, measure: Measure, day: date, text: str) -> bool:
        """``128/79`` fills the two measures that are written down together."""
        if not measure.pair or "/" not in text:
            return False
        pair = [one for one in self._measures if one.pair == measure.pair]
        token = read_number(text)
        if len(pair) != 2 or not isinstance(token, NumberToken) or token.kind != "pair" or token.second is None:
            return False
        values = [
            PastedValue(DayCell(one.id, day), value, text)
            for one, value in zip(pair, (token.value, token.second), strict=True)
        ]
        self._session.do(paste_values(self._session.journal, values, now=self._session.now(), source="typed"))
        return True

    def _typed(self, cell: DayCell, outcome: Typed) -> Typed:
        """Show the cell anew: it may show something else even where the journal did not change."""
        row = self.row(cell.day)
        if 0 <= row < self._rows:
            self.dataChanged.emit(self.index(row, 0), self.index(row, self.columnCount() - 1))
        return outcome

    def _follow(self, changes: tuple[RowChange, ...]) -> None:
        """Show what an edit changed: a few rows, or everything when the columns or the first day may be others."""
        records = [change.record for change in changes]
        self._written.clear()
        days = [record.day for record in records if isinstance(record, Entry | DayNote)]
        if not changes or any(isinstance(record, Change) for record in records):
            self._find_changes()
        may_be_others = not changes or any(isinstance(record, Measure) for record in records)
        if may_be_others or (days and not self._holds(min(days), max(days))):
            self.beginResetModel()
            self._lay_out(min([self._first, *days]))
            self.endResetModel()
        elif days:
            last_column = self.columnCount() - 1
            self.dataChanged.emit(self.index(self.row(min(days)), 0), self.index(self.row(max(days)), last_column))

    def _changes_of(self, day: date, measure: Measure) -> list[Change]:
        """The changes of a day that concern a measure."""
        return [one for one in self._changes.get(day, []) if not one.measures or measure.id in one.measures]

    def _find_changes(self) -> None:
        """Keep the changes by their day, and show their marks."""
        self._changes.clear()
        for change in self._session.journal.changes.values():
            self._changes.setdefault(change.day, []).append(change)
        if self._rows:
            self.dataChanged.emit(self.index(0, 0), self.index(self._rows - 1, self.columnCount() - 1))
            self.headerDataChanged.emit(Qt.Orientation.Vertical, 0, self._rows - 1)

    def _holds(self, first: date, last: date) -> bool:
        return self.row(first) >= 0 and self.row(last) < self._rows

    def _lay_out(self, no_later_than: date) -> None:
        journal = self._session.journal
        self._measures = journal.columns()
        days = journal.days()
        today = self._session.today
        first, last = days if days is not None else (today, today)
        self._first = min(no_later_than, first)
        # A day after today is only there when the clock was once ahead; it stays to be seen.
        self._rows = (max(today, last) - self._first).days + 1

    def _title(self, section: int, role: int) -> object:
        measure = self.measure(section)
        match role:
            case Qt.ItemDataRole.DisplayRole:
                if measure is None:
                    return "Note"
                unit = "" if measure.unit.casefold() == measure.title.casefold() else measure.unit
                return "\n".join(map(_cut, [*measure.title.split(maxsplit=1), unit])).strip()
            case Qt.ItemDataRole.TextAlignmentRole:
                side = Qt.AlignmentFlag.AlignLeft if measure is None else Qt.AlignmentFlag.AlignRight
                return side | Qt.AlignmentFlag.AlignVCenter
            case Qt.ItemDataRole.ToolTipRole | Qt.ItemDataRole.AccessibleTextRole if measure is not None:
                return measure.title
            case Qt.ItemDataRole.FontRole if measure is not None and measure.id == self._session.measure:
                return _font(bold=True)
        return None

    def _note_data(self, day: date, role: int) -> object:
        note, changes = self._session.journal.note(day), self._changes.get(day, [])
        match role:
            case Qt.ItemDataRole.DisplayRole:
                return note or with_changes("", changes)
            case Qt.ItemDataRole.EditRole:
                return note
            case Qt.ItemDataRole.ToolTipRole:
                return with_changes(note, changes) or None
            case Qt.ItemDataRole.AccessibleTextRole:
                return with_changes(f"{long_day(day)}: note, {note or 'none'}", changes)
            case Qt.ItemDataRole.ForegroundRole if changes and not note:
                return self.quiet_colour
            case Qt.ItemDataRole.FontRole if changes and not note:
                return _font(italic=True)
        return None

    def _unread_data(self, unread: Unread, role: int) -> object:
        match role:
            case Qt.ItemDataRole.DisplayRole:
                return f"{unread.text} ?"
            case Qt.ItemDataRole.EditRole:
                return unread.text
            case Qt.ItemDataRole.ToolTipRole | Qt.ItemDataRole.AccessibleTextRole:
                return unread.why or f"{unread.text}: not kept yet"
            case Qt.ItemDataRole.FontRole:
                return _font(bold=True)
            case Qt.ItemDataRole.TextAlignmentRole:
                return Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
        return None

    def _is_passed(self, measure: Measure, day: date) -> bool:
        """Whether a day lies between the first and the last one written down for a measure."""
        if measure.id not in self._written:
            by_day = self._session.journal.entries.get(measure.id)
            self._written[measure.id] = (min(by_day)[0], max(by_day)[0]) if by_day else (date.max, date.min)
        first, last = self._written[measure.id]
        return first <= day <= last


def _edit_text(entry: Entry | None) -> str:
    if entry is None:
        return ""
    if entry.value is None:
        return entry.kind if entry.kind != "blank" else ""
    return entry.original or f"{entry.value:g}"


def _is_unlikely(measure: Measure, value: float) -> bool:
    too_low = measure.likely_low is not None and value < measure.likely_low
    too_high = measure.likely_high is not None and value > measure.likely_high
    return too_low or too_high


def _font(*, bold: bool = False, italic: bool = False, struck: bool = False) -> QFont:
    font = QFont()
    font.setBold(bold)
    font.setItalic(italic)
    font.setStrikeOut(struck)
    return font


def _cut(line: str) -> str:
    return line if len(line) <= LONGEST_LINE else f"{line[: LONGEST_LINE - 1].rstrip()}…"
