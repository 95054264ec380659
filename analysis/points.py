"""From the entries of a log to one observation a period."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date

import numpy as np
from numpy.typing import NDArray

from analysis.log import COUNTED_KINDS, Combine, Days, Log, Period, Values

LARGEST = 1e300
"""Beyond this the difference of two values may be no number any more; no reading is so large."""

_EPOCH = date(1970, 1, 1).toordinal()


@dataclass(frozen=True, eq=False)
class Points:
    """One observation a period, every period from the first logged one to the last, blank ones included.

    Attributes:
        period: what a period is.
        first: first day number of each period, shape (k,), ascending and without holes.
        last: last day number of each period, shape (k,).
        day: day number that decides which stretch the observation belongs to, shape (k,).
        values: the observation, NaN where the period holds no value, shape (k,).
        filled: whether the observation is only days that were missed and counted as zero, shape (k,).
        whole: whether each value says it stands for its whole period, so that no edge can cut it.
    """

    period: Period
    first: Days
    last: Days
    day: Days
    values: Values
    filled: NDArray[np.bool_]
    whole: bool

    def __len__(self) -> int:
        return len(self.first)

    @property
    def known(self) -> NDArray[np.bool_]:
        """Which periods hold an observation, shape (k,)."""
        return ~np.isnan(self.values)

    def within(self, first: int, last: int) -> NDArray[np.bool_]:
        """Which periods belong to the days ``first`` to ``last`` (day numbers, both included), shape (k,).

        A period that reaches beyond either edge does not belong, unless its value stands for the whole of it.
        """
        if self.whole:
            return (self.day >= first) & (self.day <= last)
        return (self.first >= first) & (self.last <= last)


def points_of(log: Log, today: int | None = None) -> Points:
    """One observation a period of the log's measure.

    Args:
        log: the entries.
        today: day number after which nothing is used; None uses all.
    """
    measure = log.measure
    days, values, filled = _counted(log, today)
    if not len(days):
        none = np.empty(0, dtype=np.int64)
        return Points(measure.period, none, none, none, np.empty(0), np.empty(0, dtype=bool), False)
    keys = period_keys(days, measure.period, measure.week_start)
    whole = measure.period != "day" and not filled.any() and _one_value_a_period(days, keys, measure.period)
    every_key = np.arange(keys[0], keys[-1] + 1)
    first = period_firsts(every_key, measure.period, measure.week_start)
    last = period_firsts(every_key + 1, measure.period, measure.week_start) - 1
    starts = np.flatnonzero(np.r_[True, keys[1:] != keys[:-1]])
    place = keys[starts] - keys[0]
    combined = np.full(len(every_key), np.nan)
    # A sum too large to be reckoned with is no observation.
    with np.errstate(over="ignore", invalid="ignore"):
        combined[place] = _combined(values, starts, measure.combine_rule)
    combined[~(np.abs(combined) <= LARGEST)] = np.nan
    only_filled = np.zeros(len(every_key), dtype=bool)
    only_filled[place] = np.logical_and.reduceat(filled, starts)
    day = first.copy()
    if whole:
        day[place] = days[starts]
    return Points(measure.period, first, last, day, combined, only_filled, whole)


def first_logged_day(log: Log, today: int | None = None) -> int | None:
    """Day number of the first entry that says anything, or None."""
    days = _logged_days(log, today)
    return int(days[0]) if len(days) else None


def period_keys(days: Days, period: Period, week_start: int = 0) -> Days:
    """A running number of the period each day lies in, one more for each next period; shape (n,)."""
    if period == "day":
        return days
    if period == "week":
        # Day number 1 was a Monday.
        return (days - 1 - week_start) // 7
    unit = "datetime64[M]" if period == "month" else "datetime64[Y]"
    keys: Days = (days - _EPOCH).astype("datetime64[D]").astype(unit).astype(np.int64)
    return keys


def period_firsts(keys: Days, period: Period, week_start: int = 0) -> Days:
    """The first day number of each period named by :func:`period_keys`; shape (k,)."""
    if period == "day":
        return keys
    if period == "week":
        return keys * 7 + 1 + week_start
    unit = "datetime64[M]" if period == "month" else "datetime64[Y]"
    firsts: Days = keys.astype(unit).astype("datetime64[D]").astype(np.int64) + _EPOCH
    return firsts


def _logged_days(log: Log, today: int | None) -> Days:
    said = np.array([kind != "blank" for kind in log.kinds], dtype=bool)
    if today is not None:
        said &= log.days <= today
    days: Days = log.days[said]
    return days


def _paused(log: Log, days: Days) -> NDArray[np.bool_]:
    """Which days lie in a span of illness or absence: they are in no number, whatever was written down."""
    paused = np.zeros(len(days), dtype=bool)
    for span in log.spans:
        if span.kind in ("ill", "away"):
            paused |= (days >= span.first.toordinal()) & (days <= span.last.toordinal())
    return paused


def _counted(log: Log, today: int | None) -> tuple[Days, Values, NDArray[np.bool_]]:
    """Days, values and whether a value is a missed day counted as zero, in order of day."""
    measure = log.measure
    kinds = np.array(log.kinds, dtype=object)
    counted = np.isin(kinds, list(COUNTED_KINDS)) & np.isfinite(log.values)
    values = log.values
    if measure.kind in ("amount", "count"):
        rest = (kinds == "rest") & np.isnan(values)
        values = np.where(rest, 0.0, values)
        counted |= rest
    within = log.days <= today if today is not None else np.ones(len(log), dtype=bool)
    days, values = log.days[counted & within], values[counted & within]
    paused = _paused(log, days)
    days, values = days[~paused], values[~paused]
    filled = np.zeros(len(days), dtype=bool)
    if measure.missed == "zero":
        logged = _logged_days(log, today)
        if len(logged):
            missed = np.setdiff1d(np.arange(logged[0], logged[-1] + 1), logged)
            missed = missed[~_paused(log, missed)]
            days = np.concatenate([days, missed])
            values = np.concatenate([values, np.zeros(len(missed))])
            filled = np.concatenate([filled, np.ones(len(missed), dtype=bool)])
            order = np.argsort(days, kind="stable")
            days, values, filled = days[order], values[order], filled[order]
    return days, values, filled


def _one_value_a_period(days: Days, keys: Days, period: Period) -> bool:
    """Whether the log holds one value a period, always at the same place in it.

    Such values stand for their whole periods: monthly or yearly rows, or a reading taken every Wednesday. They
    may stand at a fixed distance from the start, or from the end (the last day of each month).
    """
    if len(np.unique(keys)) != len(keys) or len(keys) < 2:
        return False
    if period == "year":
        # The day of a year moves by one after February of a leap year; month and day of the month do not.
        month = period_keys(days, "month")
        place = (month % 12) * 100 + days - period_firsts(month, "month")
        return len(np.unique(place)) == 1
    from_start = days - period_firsts(keys, period)
    from_end = period_firsts(keys + 1, period) - days
    return len(np.unique(from_start)) == 1 or len(np.unique(from_end)) == 1


def _combined(values: Values, starts: NDArray[np.intp], rule: Combine) -> Values:
    """One value for each group of ``values`` that begins at ``starts``; shape (len(starts),)."""
    if len(starts) == len(values):
        return values
    ends = np.r_[starts[1:], len(values)]
    result: Values
    match rule:
        case "sum":
            result = np.add.reduceat(values, starts)
        case "mean":
            result = np.add.reduceat(values, starts) / (ends - starts)
        case "max":
            result = np.maximum.reduceat(values, starts)
        case "min":
            result = np.minimum.reduceat(values, starts)
        case "first":
            result = values[starts]
        case "last":
            result = values[ends - 1]
        case "median":
            groups = zip(starts, ends, strict=True)
            result = np.array([np.median(values[start:end]) for start, end in groups])
    return result
