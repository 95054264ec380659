"""Whether weekends differ from weekdays, and a row without that difference."""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from analysis.log import Days, Values
from analysis.questions.by_how_much import shift
from analysis.questions.did_it_move import rank_sum

FEWEST_WEEKEND_DAYS = 4
"""Two weekends; with fewer, a rhythm cannot be told from two odd days."""

TAKEN_OFF_BELOW = 0.05


class Rhythm(NamedTuple):
    """The difference of weekends from weekdays, in the unit of the values, and its chance by luck."""

    weekend: float
    p: float

    @property
    def used(self) -> bool:
        """Whether it is taken off before stretches are compared."""
        return self.p < TAKEN_OFF_BELOW


def is_weekend(days: Days) -> NDArray[np.bool_]:
    """Which day numbers are a Saturday or a Sunday; shape (n,)."""
    # Day number 1 was a Monday.
    return (days - 1) % 7 >= 5


def weekday_rhythm(days: Sequence[Days], values: Sequence[Values]) -> Rhythm | None:
    """The one planned contrast of weekends with weekdays, over stretches each freed of its own median.

    Args:
        days: day numbers of each stretch.
        values: values of each stretch, NaN where blank.

    Returns:
        None with fewer than two weekends or weeks of values.

    Source: the rank-sum comparison of two groups, Wilcoxon (1945); one contrast instead of seven weekdays, since
    no short log has the power for seven.
    """
    weekend: list[Values] = []
    weekday: list[Values] = []
    for stretch_days, stretch_values in zip(days, values, strict=True):
        known = ~np.isnan(stretch_values)
        if not known.any():
            continue
        centred = stretch_values[known] - np.median(stretch_values[known])
        at_weekend = is_weekend(stretch_days[known])
        weekend.append(centred[at_weekend])
        weekday.append(centred[~at_weekend])
    ends, rest = (np.concatenate(group) if group else np.empty(0) for group in (weekend, weekday))
    if len(ends) < FEWEST_WEEKEND_DAYS or len(rest) < 2 * FEWEST_WEEKEND_DAYS:
        return None
    return Rhythm(shift(rest, ends)[0], rank_sum(rest, ends).p)
