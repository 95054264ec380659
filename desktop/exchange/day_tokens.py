"""One day as a person or a spreadsheet writes it; the order of day and month is decided by all cells together."""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence
from datetime import date, time, timedelta
from operator import itemgetter
from typing import Literal, NamedTuple, get_args

from desktop.exchange.day_words import FILLERS, MONTH_NUMBERS, WEEKDAYS, simple
from desktop.exchange.number_tokens import plain_marks

DayOrder = Literal["dmy", "mdy", "ymd"]
RowPeriod = Literal["day", "month", "year"]
ShortYear = Literal["", "first", "last", "either"]
Parts = tuple[int, int, int]

DAY_ORDERS: tuple[DayOrder, ...] = get_args(DayOrder)
DAILY_YEARS = range(1800, 2200)
"""Years a written day may lie in; yearly series of the nineteenth century are often dated by day."""
SERIES_YEARS = range(1500, 2200)
"""Years a row of a monthly or yearly series may lie in."""

_ISO_LENGTH = 10
_MOST_TAILS = 5_000
_LONGEST = 60
_ISO = re.compile(r"([0-9]{4})-([0-9]{2})-([0-9]{2})")
_TIME = re.compile(
    r"(?P<hour>[01]?[0-9]|2[0-3])[:h](?P<minute>[0-5][0-9])(?::[0-5][0-9](?:[.,][0-9]{1,9})?)?"
    r"\s?(?:(?P<half>[ap])\.?\s?m\.?)?\s?(?:z|utc|gmt|[+-][0-9]{2}:?(?:[0-9]{2})?)?",
    re.I,
)
_DAY_AND_TIME = re.compile(r"(.*[^\s,T])(?:(?<=[0-9])T|[\s,]+(?:(?:at|um|à)\s)?)([0-9]{1,2}[:h][0-9].*)", re.I)
_YEAR_FIRST = re.compile(r"([0-9]{4})([-/. ])\s?([0-9]{1,2})\2\s?([0-9]{1,2})")
_YEAR_LAST = re.compile(r"([0-9]{1,2})([-/. ])\s?([0-9]{1,2})\2\s?([0-9]{4})")
_SHORT_YEAR = re.compile(r"([0-9]{1,2})([-/.])\s?([0-9]{1,2})\2\s?([0-9]{1,2})")
_MONTH_ROW = re.compile(r"([0-9]{4})[-/]([0-9]{1,2})|([0-9]{1,2})[-/]([0-9]{4})")
_AMOUNT = re.compile(r"-?[0-9]+(?:[.,][0-9]+)?")
_YEAR_ROW = re.compile(r"([0-9]{4})(?:[.,]0{1,6})?")
_NO_YEAR = re.compile(r"-?[0-9]{1,3}(?:\.[0-9]+)?|-?[0-9]{5,9}(?:\.[0-9]+)?")
_ISO_AND_TIME = re.compile(
    r"([0-9]{4})-([0-9]{2})-([0-9]{2})[T ]([01][0-9]|2[0-3]):([0-5][0-9])(?::[0-5][0-9])?Z?"
)
_LEADING_WORD = re.compile(r"([^\W\d_]+)\.?,?\s+(\S.*)")
_TRAILING_WORD = re.compile(r"(.*[0-9])[\s,]+\(?([^\W\d_]+)\.?\)?")
_NAMED = re.compile(r"[\w\s.,/'-]+")
_NAME_PARTS = re.compile(r"([0-9]+)(?:st|nd|rd|th|er|re|o|a)?(?![^\W\d_])|([^\W\d_]+)")


class DayToken(NamedTuple):
    """A text that has the shape of a day, a month or a year.

    Attributes:
        period: what one such row stands for.
        settled: year, month and day where the text alone settles them; None where the order is open.
        open: the three numbers as written, where the order is open.
        short_year: where a year of two digits may stand, ``""`` when it has four.
        clock: the time of day beside it.
    """

    period: RowPeriod
    settled: Parts | None
    open: Parts | None = None
    short_year: ShortYear = ""
    clock: time | None = None

    def readings(self, century: int | None = None) -> dict[DayOrder | None, date]:
        """Every reading that is a day of the calendar, by order (None where no order is needed)."""
        if self.settled:
            return _dated({None: self.settled}, self.period, self._century(century))
        first, middle, last = self.open or (0, 0, 0)
        parts: dict[DayOrder | None, Parts] = {}
        if self.short_year != "first":
            parts |= {"dmy": (last, middle, first), "mdy": (last, first, middle)}
        if self.short_year in ("first", "either"):
            parts["ymd"] = (first, middle, last)
        return _dated(parts, self.period, self._century(century))

    def _century(self, century: int | None) -> int:
        # 2000 has a 29 February; which days exist is settled again once the century is known.
        return (2000 if century is None else century) if self.short_year else 0


def _dated(parts: dict[DayOrder | None, Parts], period: RowPeriod, century: int) -> dict[DayOrder | None, date]:
    years = DAILY_YEARS if period == "day" else SERIES_YEARS
    dates: dict[DayOrder | None, date] = {}
    for order, (year, month, day) in parts.items():
        if year + century in years:
            try:
                dates[order] = date(year + century, month, day)
            except ValueError:
                continue
    return dates


def parse_day(text: str) -> DayToken | None:
    """The day, month or year a text has the shape of, or None.

    A real day is not promised: ``30 February 2024`` has the shape, and no readings.
    """
    match = _ISO.fullmatch(text)
    if match:
        return DayToken("day", (int(match[1]), int(match[2]), int(match[3])))
    if _AMOUNT.fullmatch(text):
        return _year_row(text)
    match = _ISO_AND_TIME.fullmatch(text)
    if match:
        return DayToken(
            "day",
            (int(match[1]), int(match[2]), int(match[3])),
            clock=time(int(match[4]), int(match[5])),
        )
    if len(text) > _LONGEST or len(text) < 4 or not any(map(str.isdecimal, text)):
        return None
    text = plain_marks(text)
    match = _DAY_AND_TIME.fullmatch(text)
    if match is None:
        return _without_time(text)
    clock = parse_time(match[2])
    token = _without_time(match[1]) if clock else None
    if token is None or token.period != "day":
        return None
    return DayToken("day", token.settled, token.open, token.short_year, clock)


def is_no_year(text: str) -> bool:
    """Whether a text is plainly a number, and none of four digits, so that it is no day, month or year."""
    return _NO_YEAR.fullmatch(text) is not None


class PlainDays(NamedTuple):
    """Days that all stand with the year in front, and their times of day, or None where none has one."""

    days: Sequence[date]
    clocks: Sequence[time | None] | None


def plain_days(texts: Sequence[str]) -> PlainDays | None:
    """The days of texts that all begin like ``2031-03-04``, with nothing or a time behind it.

    Returns:
        What ``parse_day`` makes of each of them; None where one of them is anything else.
    """
    if not texts or len(texts[-1]) < _ISO_LENGTH:
        return None
    heads, clocks = texts, None
    if set(map(len, texts)) != {_ISO_LENGTH}:
        heads = [text[:_ISO_LENGTH] for text in texts]
        tails = [text[_ISO_LENGTH:] for text in texts]
        known = _clocks(set(tails))
        if known is None or set(map(len, heads)) != {_ISO_LENGTH}:
            return None
        clocks = [known[tail] for tail in tails]
    if set(map(itemgetter(7), heads)) != {"-"}:
        return None
    try:
        # Of ten characters with this hyphen no other form is taken, such as days of a week.
        days = list(map(date.fromisoformat, heads))
    except ValueError:
        return None
    in_range = min(days).year in DAILY_YEARS and max(days).year in DAILY_YEARS
    return PlainDays(days, clocks) if in_range else None


def _clocks(tails: set[str]) -> dict[str, time | None] | None:
    """The time of day in each text behind a day; None where one of them is anything else, or they are many."""
    if len(tails) > _MOST_TAILS:
        return None
    known: dict[str, time | None] = {}
    for tail in tails:
        token = parse_day(f"2000-01-01{tail}")
        if token is None or token.period != "day" or token.settled != (2000, 1, 1):
            return None
        known[tail] = token.clock
    return known


def parse_time(text: str) -> time | None:
    """A time of day such as ``08:15``, ``8h15`` or ``8:15 pm``; a zone behind it is dropped."""
    match = _TIME.fullmatch(plain_marks(text))
    if match is None:
        return None
    hour = int(match["hour"])
    if match["half"] and hour <= 12:
        hour = hour % 12 + (12 if match["half"] in "pP" else 0)
    return time(hour, int(match["minute"]))


def says_half_of_day(text: str) -> bool:
    """Whether a time is written with am or pm, so that it cannot be a duration."""
    match = _TIME.fullmatch(plain_marks(text))
    return bool(match and match["half"])


def _without_time(text: str) -> DayToken | None:
    return _numeric(text) or _beside_weekday(text) or _named(text)


def _numeric(text: str) -> DayToken | None:
    match = _YEAR_FIRST.fullmatch(text)
    if match:
        return DayToken("day", (int(match[1]), int(match[3]), int(match[4])))
    match = _YEAR_LAST.fullmatch(text)
    if match:
        return DayToken("day", None, (int(match[1]), int(match[3]), int(match[4])))
    match = _SHORT_YEAR.fullmatch(text)
    if match and 2 in (len(match[1]), len(match[4])):
        return DayToken(
            "day", None, (int(match[1]), int(match[3]), int(match[4])), _short_year(match[1], match[4])
        )
    match = _MONTH_ROW.fullmatch(text)
    if match:
        return DayToken("month", (int(match[1] or match[4]), int(match[2] or match[3]), 1))
    return _year_row(text)


def _year_row(text: str) -> DayToken | None:
    match = _YEAR_ROW.fullmatch(text)
    return DayToken("year", (int(match[1]), 1, 1)) if match and int(match[1]) in SERIES_YEARS else None


def _short_year(first: str, last: str) -> ShortYear:
    if len(first) == len(last):
        return "either"
    return "last" if len(first) == 1 else "first"


def _beside_weekday(text: str) -> DayToken | None:
    for pattern, word, rest in ((_LEADING_WORD, 1, 2), (_TRAILING_WORD, 2, 1)):
        match = pattern.fullmatch(text)
        if match and simple(match[word]) in WEEKDAYS:
            token = _numeric(match[rest]) or _named(match[rest])
            if token and token.period == "day":
                return token
    return None


def _named(text: str) -> DayToken | None:
    if not _NAMED.fullmatch(text):
        return None
    found = _NAME_PARTS.findall(simple(text.replace(".", " ")))
    words = [word for _, word in found if word and word not in FILLERS]
    digits = [number for number, _ in found if number]
    month = MONTH_NUMBERS.get(words[0]) if len(words) == 1 else None
    if month is None or sum(map(str.isdecimal, text)) != sum(map(len, digits)):
        return None
    if len(digits) == 1:
        return DayToken("month", (int(digits[0]), month, 1)) if len(digits[0]) == 4 else None
    return _named_day(digits, month) if len(digits) == 2 else None


def _named_day(digits: list[str], month: int) -> DayToken | None:
    day, year = digits if len(digits[0]) <= 2 else reversed(digits)
    if len(day) > 2 or len(year) not in (2, 4):
        return None
    return DayToken("day", (int(year), month, int(day)), short_year="last" if len(year) == 2 else "")


def fitting_orders(tokens: Iterable[DayToken]) -> tuple[DayOrder, ...]:
    """The orders of day and month under which every token is a day of the calendar.

    Tokens that are no day under any order have no say. Where all orders that fit give the same days, only
    the first is named; where the tokens contradict each other, none is.
    """
    open_readings = [token.readings() for token in tokens if token.open]
    open_readings = [readings for readings in open_readings if readings]
    if not open_readings:
        return ("ymd",)
    fitting = [order for order in DAY_ORDERS if all(order in readings for readings in open_readings)]
    if all(len({readings[order] for order in fitting}) <= 1 for readings in open_readings):
        return tuple(fitting[:1])
    return tuple(fitting)


def decide_day_order(tokens: Iterable[str]) -> DayOrder | None:
    """The order all days of a column together show, or None where it is open or they contradict each other.

    Days that need no order (the year first, a month's name) make it "ymd".
    """
    parsed = (parse_day(text) for text in set(tokens))
    fitting = fitting_orders(token for token in parsed if token)
    return fitting[0] if len(fitting) == 1 else None


def serial_day(text: str) -> date | None:
    """The day of a spreadsheet's day number (20000 to 60000, counted from the end of 1899), or None."""
    match = re.fullmatch(r"([2-6][0-9]{4})(?:\.0+)?", text)
    if match is None or not 20000 <= int(match[1]) <= 60000:
        return None
    return date(1899, 12, 30) + timedelta(days=int(match[1]))


def compact_day(text: str) -> date | None:
    """The day written as eight digits, year first, or None."""
    match = re.fullmatch(r"([0-9]{4})([0-9]{2})([0-9]{2})", text)
    parts: dict[DayOrder | None, Parts] = {None: (int(match[1]), int(match[2]), int(match[3]))} if match else {}
    return _dated(parts, "day", 0).get(None)
