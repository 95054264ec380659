"""A journal as one table with a row a value: the archive form, or the form for a spreadsheet."""

from __future__ import annotations

import csv
import io
from collections.abc import Iterable, Sequence
from typing import Literal

from desktop.exchange.formula_guard import guarded
from desktop.exchange.lanes import LEFT_OUT, WHOLE_DAY
from desktop.journal.journal import Journal
from desktop.journal.records import Entry

Form = Literal["archive", "spreadsheet"]

HEADER = ("date", "measure", "slot", "value", "unit", "status", "kind", "note")
_NUMBER = HEADER.index("value")
_STATUS = {"set aside": LEFT_OUT, "extra": LEFT_OUT}


def number_text(value: float) -> str:
    """A number with as many digits as it takes to read it back exactly; whole numbers without a mark."""
    return str(int(value)) if value.is_integer() else repr(value)


def plain_table(journal: Journal, form: Form = "archive", decimal: str = ".") -> bytes:
    """Every entry of a journal, one a row, in order of day, measure and slot.

    Args:
        journal: the journal.
        form: ``archive`` is RFC 4180 in UTF-8; ``spreadsheet`` begins with a byte order mark, and no text in
            it can run as a formula.
        decimal: the decimal mark of the spreadsheet; with a comma the cells are parted by semicolons.

    Source: RFC 4180, section 2: a header, lines that end with CR LF, quotes doubled inside quotes.
    """
    rows = [_row(journal, entry) for entry in _in_order(journal)]
    if form == "archive":
        return csv_bytes([HEADER, *rows])
    separator = ";" if decimal == "," else ","
    lines = [separator.join(map(_quoted, HEADER))]
    for row in rows:
        cells = map(_quoted, row)
        number = row[_NUMBER].replace(".", decimal)
        lines.append(separator.join(number if at == _NUMBER else cell for at, cell in enumerate(cells)))
    return ("\ufeff" + "".join(f"{line}\r\n" for line in lines)).encode()


def csv_bytes(rows: Iterable[Sequence[str]]) -> bytes:
    """Rows as RFC 4180 has them, in UTF-8 without a mark."""
    text = io.StringIO(newline="")
    csv.writer(text, lineterminator="\r\n").writerows(rows)
    return text.getvalue().encode()


def _in_order(journal: Journal) -> list[Entry]:
    entries = [entry for by_day in journal.entries.values() for entry in by_day.values()]
    return sorted(
        entries, key=lambda one: (one.day, journal.measures[one.measure].position, one.measure, one.slot)
    )


def _row(journal: Journal, entry: Entry) -> tuple[str, ...]:
    measure = journal.measures[entry.measure]
    return (
        entry.day.isoformat(),
        measure.title,
        entry.slot or WHOLE_DAY,
        "" if entry.value is None else number_text(entry.value),
        measure.unit,
        "missing" if entry.value is None else _STATUS.get(entry.kind, "recorded"),
        entry.kind,
        entry.note,
    )


def _quoted(text: str) -> str:
    return '"' + guarded(text).replace('"', '""') + '"'
