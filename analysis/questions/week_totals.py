"""How much in a week: the totals of whole weeks before and after, for measures of which many days hold nothing."""

from __future__ import annotations

import numpy as np

from analysis.answer import WeekTotal
from analysis.batch.fourths import fourths
from analysis.log import Values
from analysis.questions.by_how_much import shift
from analysis.sides import Sides

FEWEST_WEEKS = 4
"""Of each stretch; the middle of fewer totals says little."""

_WEEK = 7


def week_totals(sides: Sides) -> WeekTotal | None:
    """The middle of the weekly totals before and after, and the range of their shift.

    Weeks are counted back from the change and on from it, so that each belongs to one stretch; one with a day
    that is not known has no total.

    Args:
        sides: two stretches of days.

    Returns:
        None for other measures and periods, and where a stretch has fewer than four whole weeks.
    """
    if not sides.is_zero_heavy or sides.measure.period != "day" or sides.measure.kind not in ("amount", "count"):
        return None
    before, after = _totals(sides.before[::-1]), _totals(sides.after)
    if min(len(before), len(after)) < FEWEST_WEEKS:
        return None
    _, low, high = shift(before, after, 1.0)
    return WeekTotal(fourths(before).median, fourths(after).median, low, high, len(before), len(after))


def _totals(days: Values) -> Values:
    whole = days[: len(days) // _WEEK * _WEEK].reshape(-1, _WEEK)
    totals: Values = whole.sum(axis=1)
    return totals[~np.isnan(totals)]
