"""Where an axis has its numbers: whole days, weeks, months or years across; round values up."""

from __future__ import annotations

import math
from datetime import date

from desktop.wording.days import MONTHS

_ROUND = (1.0, 2.0, 2.5, 5.0, 10.0)
_DAY_STEPS = (1, 2, 7, 14)
_MONTH_STEPS = (1, 2, 3, 6)
_FEWEST_VALUES = 2
_YEAR_STEPS = (1, 2, 5, 10, 20, 50, 100)


def day_ticks(x0: float, x1: float, most: int, week_start: int = 0) -> list[tuple[float, str]]:
    """Places and words of the axis of days, at most about ``most`` of them.

    Args:
        x0: left edge, a day number.
        x1: right edge.
        most: how many words have room.
        week_start: weeks begin on this weekday, 0 = Monday.
    """
    span, most = max(x1 - x0, 1.0), max(most, 2)
    first, last = math.ceil(max(x0, 1)), math.floor(x1)
    for step in _DAY_STEPS:
        if span / step <= most:
            return _day_ticks(first, last, step, week_start)
    for step in _MONTH_STEPS:
        if span / 30.4 / step <= most:
            # A little more than four weeks may hold no first of a month.
            return _month_ticks(first, last, step) or _day_ticks(first, last, _DAY_STEPS[-1], week_start)
    fitting = [step for step in _YEAR_STEPS if span / 365.25 / step <= most] or [_YEAR_STEPS[-1]]
    # A few years may hold no round one: then finer steps are tried, down to single years.
    finer = [step for step in reversed(_YEAR_STEPS) if step <= fitting[0]]
    return next((ticks for step in finer if (ticks := _year_ticks(first, last, step))), [])


def _day_ticks(first: int, last: int, step: int, week_start: int) -> list[tuple[float, str]]:
    # Whole weeks begin on the week's first day; day number 1 was a Monday.
    begin = first if step < 7 else first + (week_start + 1 - first) % 7
    return [(float(day), _day_word(date.fromordinal(day))) for day in range(begin, last + 1, step)]


def _day_word(day: date) -> str:
    return f"{day.day} {MONTHS[day.month - 1][:3]}"


def _month_ticks(first: int, last: int, step: int) -> list[tuple[float, str]]:
    ticks: list[tuple[float, str]] = []
    start = date.fromordinal(first)
    month = start.year * 12 + start.month - 1
    while True:
        if month % step == 0:
            day = date(month // 12, month % 12 + 1, 1)
            if day.toordinal() > last:
                return ticks
            if day.toordinal() >= first:
                word = (
                    f"{MONTHS[day.month - 1][:3]} {day.year}"
                    if day.month == 1 or not ticks
                    else MONTHS[day.month - 1][:3]
                )
                ticks.append((float(day.toordinal()), word))
        month += 1


def _year_ticks(first: int, last: int, step: int) -> list[tuple[float, str]]:
    years = range(date.fromordinal(first).year, date.fromordinal(last).year + 1)
    places = [(date(year, 1, 1).toordinal(), str(year)) for year in years if year % step == 0]
    return [(float(day), word) for day, word in places if first <= day <= last]


def value_ticks(y0: float, y1: float, most: int) -> list[tuple[float, str]]:
    """Places and numbers of the upright axis, at most about ``most`` of them."""
    span = y1 - y0
    if not (math.isfinite(span) and span > 0):
        return []
    most = max(most, 2)
    step, digits, places = _value_steps(y0, y1, span / most)
    while len(places) < _FEWEST_VALUES:
        # One number alone gives no scale.
        most += 1
        step, digits, places = _value_steps(y0, y1, span / most)
    return [(place * step, f"{place * step:,.{digits}f}".replace("-", "−").replace(",", " ")) for place in places]


def _value_steps(y0: float, y1: float, rough: float) -> tuple[float, int, range]:
    """The round step next to a rough one, its decimals, and the multiples of it in between."""
    power = 10.0 ** math.floor(math.log10(rough))
    step = next(power * part for part in _ROUND if power * part >= rough * 0.999)
    digits = max(0, -math.floor(math.log10(step) + 1e-9)) + (1 if step / power == 2.5 and power <= 1 else 0)
    return step, digits, range(math.ceil(y0 / step - 1e-9), math.floor(y1 / step + 1e-9) + 1)
