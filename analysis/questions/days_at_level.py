"""Scores with few values: how many days were at a level or beyond it, before and after."""

from __future__ import annotations

import numpy as np

from analysis.answer import AtLevel
from analysis.log import Values
from analysis.questions.by_how_much import difference_of_shares
from analysis.sides import Sides

_SHARE = 0.25
"""The level is the one that nearest to this share of the baseline's days reached."""

_MOST_VALUES = 11


def days_at_level(sides: Sides, moved: float, widened: float) -> AtLevel | None:
    """Days at the level that the baseline's worst quarter of days reached.

    The worst days are the high ones where less is wanted, the low ones where more is; without an aim, those on the
    side that the level moved away from.

    Args:
        sides: both hold an observation.
        moved: its sign is the way of the shift.
        widened: factor on the variance for carry-over, at least 1.

    Returns:
        None for other measures than scores, scores of more than eleven values, and a baseline of one value.
    """
    before, after = sides.known_before, sides.known_after
    values = np.unique(np.concatenate([before, after]))
    if sides.measure.kind != "score" or not 2 <= len(values) <= _MOST_VALUES:
        return None
    aim = sides.measure.aim
    high = aim == "less" or (aim != "more" and moved < 0)

    def reached(days: Values, level: float) -> int:
        return int(np.sum(days >= level) if high else np.sum(days <= level))

    levels = [level for level in values.tolist() if 0 < reached(before, level) < len(before)]
    if not levels:
        return None
    level = min(levels, key=lambda one: abs(reached(before, one) / len(before) - _SHARE))
    was, now = (reached(before, level), len(before)), (reached(after, level), len(after))
    low, most = difference_of_shares(was, now, widened)
    return AtLevel(level, "or more" if high else "or less", was, now, low, most)
