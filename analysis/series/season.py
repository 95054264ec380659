"""The time of year in monthly logs: how far each month lies from the rest, and a row without that."""

from __future__ import annotations

from dataclasses import replace
from datetime import date
from math import erfc, exp, pi, sqrt

import numpy as np
from numpy.typing import NDArray

from analysis.batch.ranks import midranks, tie_sum
from analysis.log import Days, Values
from analysis.points import Points

MONTHS = 12
FEWEST_YEARS = 3
"""With fewer values of a month its own middle is no season."""

TAKEN_OFF_BELOW = 0.01


def without_season(points: Points, first: int, last: int) -> tuple[Points, bool] | None:
    """The points with the usual place of each month taken off, if the baseline has a season.

    The median of each month over the baseline is taken off, and the median of all put back, so that the numbers
    keep their level.

    Args:
        points: of a log.
        first: first day number of the baseline, the only days the season is learnt from.
        last: its last day number.

    Returns:
        The points and whether anything was taken off; None where it cannot be asked: another period than the
        month, or a month with fewer than three values in the baseline.
    """
    if points.period != "month":
        return None
    months = _months(points.first)
    learnt = points.within(first, last) & points.known
    by_month = [points.values[learnt & (months == month)] for month in range(MONTHS)]
    if min(len(values) for values in by_month) < FEWEST_YEARS:
        return None
    if kruskal_wallis(by_month) >= TAKEN_OFF_BELOW:
        return points, False
    usual = np.array([np.median(values) for values in by_month])
    level = float(np.median(points.values[learnt]))
    return replace(points, values=points.values - usual[months] + level), True


def _months(days: Days) -> NDArray[np.int64]:
    return np.array([date.fromordinal(day).month - 1 for day in days.tolist()], dtype=np.int64)


def kruskal_wallis(groups: list[Values]) -> float:
    """Chance by luck that groups of values lie so far apart.

    Args:
        groups: at least two, none empty, no NaN.

    Source: Kruskal & Wallis (1952), JASA 47:583-621, corrected for ties; large-sample chi-square chance.
    """
    everything = np.concatenate(groups)
    total = len(everything)
    ranks = midranks(everything)
    edges = np.cumsum([len(group) for group in groups])[:-1]
    sums = [float(part.sum()) ** 2 / len(part) for part in np.split(ranks, edges)]
    ties = 1 - tie_sum(everything) / (total**3 - total)
    if ties <= 0:
        return 1.0
    h = (12 / (total * (total + 1)) * sum(sums) - 3 * (total + 1)) / ties
    return chi_square_beyond(h, len(groups) - 1)


def chi_square_beyond(value: float, freedom: int) -> float:
    """Chance that a chi-square of so many degrees of freedom is beyond a value.

    Source: the finite sums of Abramowitz & Stegun (1964), 26.4.4 and 26.4.5.
    """
    if value <= 0:
        return 1.0
    if freedom % 2:
        total = erfc(sqrt(value / 2))
        term = sqrt(2 * value / pi) * exp(-value / 2)
        start = 3
    else:
        total = term = exp(-value / 2)
        term *= value / 2
        start = 4
    for degree in range(start, freedom + 1, 2):
        total += term
        term *= value / degree
    return min(total, 1.0)
