"""What would settle it: how many days after the change would show a move of a given size."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from math import exp, sqrt

import numpy as np

from analysis.log import Values
from analysis.questions.by_how_much import Z95
from analysis.questions.did_it_move import FEWEST_AFTER
from analysis.series.carry_over import widening

_Z80 = 0.8416212335729143
"""The normal law's point for a power of 80 in 100."""

_LONGEST = 365
"""More days than these are no plan: no number is enough."""

_USUAL_CARRY_OVER = 0.25
_USUAL_WEIGHT = 20
"""A short log's carry-over is little more than chance. It is drawn towards the usual one, which counts as much as
this many days: the ratio of its own variance (about 1.7 / N) to that from one person's log to the next (0.3²)."""


@dataclass(frozen=True)
class Forecast:
    """Days needed after the change, in all; each None when no number is enough.

    Attributes:
        days: the best guess.
        low, high: in two of three logs the number lies between.
    """

    days: int | None
    low: int | None
    high: int | None


def forecast(before: Values, amount: float, carried: float | None, logged: int, *, by_share: bool) -> Forecast:
    """Days needed after the change so that a move by ``amount`` is claimed in 80 of 100 logs.

    Args:
        before: the baseline's days, shape (m,), m ≥ 1, no NaN.
        amount: size of the move, in the unit of the values; its sign does not matter.
        carried: carry-over of the log so far, or None.
        logged: days so far, before and after, which ``carried`` is known from.
        by_share: whether the log is told by the share of days with some.
    """
    r = (logged * (carried or 0.0) + _USUAL_WEIGHT * _USUAL_CARRY_OVER) / (logged + _USUAL_WEIGHT)
    days = days_of_share if by_share else days_needed_after
    # On the scale of the variance, in logarithms: carry-over is uncertain, and so is the spread of few days.
    unsure = sqrt((2 / (1 - r * r)) ** 2 * 1.7 / (logged + _USUAL_WEIGHT) + 1.6**2 / (2 * len(before)))
    guess, low, high = (days(before, amount, widening(r) * exp(way * unsure)) for way in (0, -1, 1))
    return Forecast(guess, low, high)


def days_needed_after(before: Values, amount: float, widened: float = 1.0) -> int | None:
    """The same for a known factor of carry-over, by the share of pairs.

    The baseline's own days are the law of a day before; the same days moved by ``amount`` are the law after.

    Args:
        before: shape (m,), m ≥ 1, no NaN.
        amount: size of the move, in the unit of the values.
        widened: factor on the variance.

    Returns:
        None when no number of days is enough with this baseline.

    Source: Noether (1987), JASA 82:645-647, solved for one stretch when the other is given; for the power with the
        variance that the share has after a move, from placements (Sen 1967; DeLong et al. 1988, Biometrics 44).
    """
    m = len(before)
    won, lost = _placements(before, abs(amount))
    share = float(np.mean(won))
    if share <= 0.5:
        return None
    won_twice, lost_twice = (float(np.mean(row**2)) - share**2 for row in (won, lost))

    def is_enough(n: int) -> bool:
        by_luck = sqrt(widened * (m + n + 1) / (12 * m * n))
        own = (share * (1 - share) + (n - 1) * won_twice + (m - 1) * lost_twice) / (m * n)
        return share - 0.5 >= Z95 * by_luck + _Z80 * sqrt(widened * own)

    return _fewest(is_enough)


def _placements(before: Values, amount: float) -> tuple[Values, Values]:
    """How often other days, moved up, are above each day; and how often each day, moved up, is above others.

    Ties count half. Each of shape (m,), in no particular order; halves for a single day.
    """
    m = len(before)
    if m < 2 or not amount:
        return np.full(m, 0.5), np.full(m, 0.5)
    row = np.sort(before)

    def at_most(values: Values) -> Values:
        # A day and itself are no pair; moved, it is above itself.
        below = np.searchsorted(row, values, side="left") + np.searchsorted(row, values, side="right")
        ranked: Values = below / 2
        return ranked

    won = (m - at_most(row - amount) - 1) / (m - 1)
    lost = (at_most(row + amount) - 1) / (m - 1)
    return won, lost


def days_of_share(before: Values, amount: float, widened: float = 1.0) -> int | None:
    """The same for a log told by how often: the move comes from more or fewer days with some.

    Args:
        before: shape (m,), m ≥ 1, no NaN; zero where there was none.
        amount: a day, in the unit of the values; for yes/no logs a share of days.
        widened: factor on the variance.

    Returns:
        None when no number of days is enough with this baseline, or no day has some.

    Source: sample size for two proportions (pooled variance for the test, own variances for the power), e.g.
        Fleiss, Levin & Paik (2003), sect. 4.2; solved for one group when the other is given.
    """
    m = len(before)
    share = float(np.mean(before > 0))
    some = float(np.mean(before[before > 0])) if share else 0.0
    gap = abs(amount) / some if some else 0.0
    moved = share + gap if share + gap < 1 else share - gap
    if not gap or moved <= 0:
        return None

    def is_enough(n: int) -> bool:
        pooled = (m * share + n * moved) / (m + n)
        by_luck = sqrt(widened * pooled * (1 - pooled) * (1 / m + 1 / n))
        own = sqrt(widened * (share * (1 - share) / m + moved * (1 - moved) / n))
        return gap >= Z95 * by_luck + _Z80 * own

    return _fewest(is_enough)


def _fewest(is_enough: Callable[[int], bool]) -> int | None:
    """The fewest days that are enough; none where even the longest log is not."""
    if not is_enough(_LONGEST):
        return None
    low, high = FEWEST_AFTER - 1, _LONGEST
    while high - low > 1:
        middle = (low + high) // 2
        low, high = (low, middle) if is_enough(middle) else (middle, high)
    return high
