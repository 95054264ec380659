"""`dayfence review FILE`: the answer without a window. Nothing here imports Qt."""

from __future__ import annotations

import argparse
import calendar
import io
import json
import os
import sys
import textwrap
from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace
from datetime import date
from pathlib import Path
from typing import NoReturn, get_args

from analysis import AnalysisError, Change, Log, Measure, Review, review
from analysis.answer import Rows, SetAsideRow
from analysis.log import PERIODS, Aim, Combine, MeasureKind, Missed
from desktop.errors import DayfenceError, ExchangeError
from desktop.exchange.bring_in import choose_column, read_file
from desktop.exchange.reading import Reading
from desktop.journal import records
from desktop.journal.journal import Journal
from desktop.wording.findings import findings_of, worded
from desktop.wording.in_numbers import for_command, in_numbers
from desktop.wording.numbers import count
from desktop.wording.problems import problem_sentence

_JOURNAL_MAGIC = b"SQLite format 3\x00"
_WIDTH = 78
_NO_JOURNAL = "0" * 32

DAYS_EPILOG = "DAY, FIRST, LAST: YYYY, YYYY-MM or YYYY-MM-DD."


class RefusedError(Exception):
    """One sentence for stderr, and exit 2."""


@dataclass(frozen=True)
class Asked:
    """A log as the options name it, before it is reviewed.

    Attributes:
        log: what is asked about.
        changes: those of the journal, then those of the options.
        rows: what became of the rows it was read from.
        journal: the journal it is of; of a table, one made for it.
        measure: its id there.
    """

    log: Log
    changes: list[Change]
    rows: Rows
    journal: Journal
    measure: int

    def reviewed(self, options: argparse.Namespace) -> Review:
        """The answer for this log."""
        answer = review(self.log, self.changes, options.baseline, options.today, options.worth)
        return replace(answer, rows=self.rows)


class CommandParser(argparse.ArgumentParser):
    """Says what is wrong with an argument in one sentence instead of a usage text."""

    def error(self, message: str) -> NoReturn:
        """Called by argparse."""
        raise RefusedError(f"{message[0].upper()}{message[1:]}. See dayfence {self.prog.split()[-1]} --help.")


def main(arguments: Sequence[str]) -> int:
    """Run one command.

    Args:
        arguments: what follows ``dayfence`` on the command line, the command's name first.

    Returns:
        0 with an answer, 2 with one sentence on stderr.
    """
    return or_refused(lambda: _answer(arguments[1:]))


def or_refused(command: Callable[[], int]) -> int:
    """The exit code of a command; 2 with one sentence on stderr where it is refused."""
    try:
        return command()
    except RefusedError as refused:
        return _refuse(str(refused))
    except (DayfenceError, AnalysisError) as error:
        return _refuse(problem_sentence(error, in_command=True))


def _answer(arguments: Sequence[str]) -> int:
    options = _review_parser().parse_args(arguments)
    (asked,) = asked_of(options)
    answer = worded(asked.reviewed(options))
    answer = replace(answer, findings=tuple(map(for_command, answer.findings)))
    return _print(_as_json(answer) if options.json else _as_text(answer))


def _print(text: str) -> int:
    """Write the answer out; letters that the terminal does not have are written as escapes."""
    try:
        if isinstance(sys.stdout, io.TextIOWrapper):
            sys.stdout.reconfigure(errors="backslashreplace")
        sys.stdout.write(text)
        sys.stdout.flush()
    except OSError as error:
        # What is still held back must not be tried again when the program ends.
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        if not isinstance(error, BrokenPipeError):
            return _refuse(f"The answer cannot be written out: {error.strerror}.")
    return 0


def _refuse(sentence: str) -> int:
    sys.stderr.write(f"{sentence}\n")
    return 2


def _review_parser() -> argparse.ArgumentParser:
    parser = CommandParser(
        prog="dayfence review",
        description="Say whether a log moved, by how much, since when, and what else could explain it.",
        epilog=DAYS_EPILOG,
    )
    add_log_options(parser)
    parser.add_argument("--json", action="store_true", help="print the answer as JSON")
    return parser


def add_log_options(parser: argparse.ArgumentParser) -> None:
    """The options that say which log is asked about, and how it is to be read."""
    parser.add_argument("file", metavar="FILE|JOURNAL", type=Path, help="a table of days and values, or a journal")
    parser.add_argument("--measure", metavar="COLUMN", help="the column, or the measure of a journal")
    parser.add_argument("--kind", choices=get_args(MeasureKind), help="what sort of number it is")
    parser.add_argument(
        "--change",
        metavar="DAY=LABEL",
        action="append",
        default=[],
        type=_marked_day,
        help="a change: its day and what it was; may be given again",
    )
    parser.add_argument("--baseline", metavar="FIRST..LAST", type=_day_range, help="the days to judge against")
    parser.add_argument("--period", choices=PERIODS, help="what one observation stands for")
    parser.add_argument("--missed", choices=get_args(Missed), help="whether a day without an entry counts as zero")
    parser.add_argument("--combine", choices=get_args(Combine), help="how several values of a period become one")
    parser.add_argument(
        "--aim", metavar="more|less|none|LOW..HIGH", type=_aim, help="what is wanted of the measure"
    )
    parser.add_argument("--settle", metavar="DAYS", type=_whole_number, default=0, help="settling-in days")
    parser.add_argument("--worth", metavar="AMOUNT", type=_amount, help="the smallest move that would be worth it")
    parser.add_argument("--today", metavar="DAY", type=_last_day, help="nothing after this day is used")
    parser.add_argument("--day-order", choices=("dmy", "mdy", "ymd"), help="order of day, month and year")
    parser.add_argument("--day-column", metavar="COLUMN", help="the column that holds the days")
    parser.add_argument(
        "--name-column", metavar="COLUMN", help="the column that names each row's measure, or none"
    )
    parser.add_argument("--century", type=int, choices=(1900, 2000), help="what two-digit years are added to")
    parser.add_argument("--decimal", choices=(".", ","), help="the decimal mark")


def asked_of(options: argparse.Namespace, *, with_pair: bool = False) -> list[Asked]:
    """The log that the options name.

    Args:
        options: those of :func:`add_log_options`.
        with_pair: whether the measure that is written down together with it is asked about too.

    Raises:
        DayfenceError: the file cannot be read, or not without an answer from the person.
    """
    read = _from_journal if _is_journal(options.file) else _from_table
    added = [Change(day, label, options.settle) for day, label in options.change]
    return [replace(one, changes=[*one.changes, *added]) for one in read(options, with_pair)]


def _is_journal(path: Path) -> bool:
    try:
        with path.open("rb") as file:
            return file.read(len(_JOURNAL_MAGIC)) == _JOURNAL_MAGIC
    except OSError:
        return False  # The importer says what is wrong with the file.


def _from_table(options: argparse.Namespace, with_pair: bool) -> list[Asked]:
    reading = read_file(
        options.file,
        day_order=options.day_order,
        decimal=options.decimal,
        day_column=options.day_column,
        columns=None if options.measure is None else [options.measure],
        century=options.century,
        name_column="" if options.name_column == "none" else options.name_column,
    )
    is_pair = len(reading.columns) == 2 and len({column.pair for column in reading.columns} - {""}) == 1
    names = [column.name for column in reading.columns] if with_pair and is_pair else [options.measure]
    chosen = [choose_column(reading, name) for name in names]
    kept: list[records.Record] = [records.Person(_NO_JOURNAL)]
    for number, one in enumerate(chosen, start=1):
        column = one.columns[0]
        kept.append(records.Measure(number, number, column.name, column.unit))
        kept += [
            records.Entry(number, value.day, value.slot, value.value, original=value.original, source="table")
            for value in column.values
        ]
    journal = Journal.of(kept)
    return [
        Asked(_log_of(options, one), [], _rows(one), journal, number) for number, one in enumerate(chosen, start=1)
    ]


def _log_of(options: argparse.Namespace, reading: Reading) -> Log:
    """The log of the one column of a reading."""
    column = reading.columns[0]
    # Rows of months or years alone are a monthly or yearly series.
    measure = _measure(options, Measure(column.name, column.unit, period=reading.period))
    values = [(value.day, value.value, value.slot) for value in column.values]
    blanks = [(day, None, "") for _, day in column.blanks]
    return Log.from_pairs([*values, *blanks], measure)


def _rows(reading: Reading) -> Rows:
    aside = tuple(SetAsideRow(fate.line, fate.reason) for fate in reading.set_aside)
    return Rows(len(reading.fates), len(reading.fates) - len(aside), aside)


def _from_journal(options: argparse.Namespace, with_pair: bool) -> list[Asked]:
    from desktop.storage.store import Store  # sqlite3 only where a journal is read

    store = Store.open(options.file)
    try:
        journal = store.read()
    finally:
        store.close()
    columns = journal.columns()
    titles = [measure.title for measure in columns]
    if not columns:
        raise ExchangeError("no value column", columns=titles)
    named = [one for one in columns if options.measure in (None, one.title)]
    if not named:
        raise ExchangeError("unknown column", name=options.measure, choices=titles)
    together = journal.together(named[0].id) if with_pair else [named[0].id]
    if options.measure is None and len(columns) > len(together):
        raise ExchangeError("which value column", choices=titles)
    asked = []
    for measure in together:
        log = journal.log_of(measure)
        log = replace(log, measure=_measure(options, log.measure))
        rows = Rows(len(log), len(log))
        asked.append(Asked(log, journal.analysis_changes(measure), rows, journal, measure))
    return asked


def _measure(options: argparse.Namespace, found: Measure) -> Measure:
    """The measure as found, with what the options say about it."""
    said = {
        name: getattr(options, name)
        for name in ("kind", "period", "missed", "combine", "aim")
        if getattr(options, name) is not None
    }
    if options.missed == "zero" and options.kind is None:
        said["kind"] = "amount"
    return replace(found, **said)


def _as_json(answer: Review) -> str:
    is_unicode = (sys.stdout.encoding or "").lower().startswith("utf")
    return json.dumps(answer.to_json(), ensure_ascii=not is_unicode, indent=2, allow_nan=False) + "\n"


def _as_text(answer: Review) -> str:
    told = findings_of(answer)
    lines = [*textwrap.wrap(told.headline, _WIDTH), ""]
    for section in (*told.sections, in_numbers(answer)):
        if section.title:
            lines.append(section.title)
        for sentence in map(for_command, section.sentences):
            lines += textwrap.wrap(sentence, _WIDTH, initial_indent="  ", subsequent_indent="  ")
        lines.append("")
    if answer.rows.set_aside:
        lines.append(f"{count(len(answer.rows.set_aside), 'row')} of {answer.rows.read} set aside")
        lines += [f"  line {row.line}: {row.reason}" for row in answer.rows.set_aside[:20]]
        if len(answer.rows.set_aside) > 20:
            lines.append(f"  and {len(answer.rows.set_aside) - 20} more")
        lines.append("")
    lines += textwrap.wrap(answer.caution, _WIDTH)
    return "\n".join(lines) + "\n"


def _days_of(text: str) -> tuple[date, date]:
    """First and last day of a year, a month or a day.

    Raises:
        argparse.ArgumentTypeError: it is none of these.
    """
    parts = text.strip().split("-")
    try:
        if [len(part) for part in parts] not in ([4], [4, 2], [4, 2, 2]) or not all(map(str.isdecimal, parts)):
            raise ValueError
        year, *rest = map(int, parts)
        month = rest[0] if rest else None
        if len(rest) == 2:
            day = date(year, rest[0], rest[1])
            return day, day
        if month is not None:
            return date(year, month, 1), date(year, month, calendar.monthrange(year, month)[1])
        return date(year, 1, 1), date(year, 12, 31)
    except ValueError:
        raise argparse.ArgumentTypeError(f"“{text}” is not a day such as 2031-03-04, 2031-03 or 2031") from None


def _marked_day(text: str) -> tuple[date, str]:
    day, _, label = text.partition("=")
    return _days_of(day)[0], label.strip()


def _last_day(text: str) -> date:
    return _days_of(text)[1]


def _day_range(text: str) -> tuple[date, date]:
    first, dots, last = text.partition("..")
    if not dots:
        raise argparse.ArgumentTypeError(f"“{text}” is not a range such as 2031-03-01..2031-03-28")
    return _days_of(first)[0], _days_of(last)[1]


def _aim(text: str) -> Aim:
    if text in ("more", "less", "none"):
        return text  # type: ignore[return-value]
    low, dots, high = text.partition("..")
    if not dots:
        raise argparse.ArgumentTypeError(f"“{text}” is not more, less, none or a range such as 40..60")
    return _amount(low), _amount(high)


def _whole_number(text: str) -> int:
    if not (text.isascii() and text.isdecimal()) or len(text) > 5:
        raise argparse.ArgumentTypeError(f"“{text}” is not a whole number of days such as 14")
    return int(text)


def _amount(text: str) -> float:
    try:
        value = float(text.replace("−", "-"))
    except ValueError:
        raise argparse.ArgumentTypeError(f"“{text}” is not a number such as 10 or 2.5") from None
    if not abs(value) <= 1e9:
        raise argparse.ArgumentTypeError(f"“{text}” is not a number a log can hold")
    return value
