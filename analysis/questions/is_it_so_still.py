"""Is it so still: what became of a move since the change."""

from __future__ import annotations

from typing import Literal

import numpy as np

from analysis.log import Values
from analysis.questions.by_how_much import shift
from analysis.questions.did_it_move import rank_sum
from analysis.questions.since_when import normal_scores, split_profile
from analysis.series.carry_over import carry_over, widening

StillWord = Literal["still so", "faded", "growing", "come late", "unclear"]

FEWEST_AFTER = 14
LATELY = 14
_PARTED_BELOW = 0.01
"""The split of the days after is searched for, so that its two parts must differ clearly."""

_MOVED_BELOW = 0.05
_MUCH_LESS = 0.5
_MUCH_MORE = 1.5


def still_state(before: Values, after: Values) -> StillWord | None:
    """What became of a move, from the best split of the days after into an earlier and a later level.

    - *faded*: the earlier part had moved, the later part differs from it and is back to less than half of it;
    - *come late*: the earlier part had not moved by half of what the later part did;
    - *growing*: both moved, the later part by half as much again;
    - *still so*: no clear split, or one that leaves the move; *unclear* where nothing moved.

    Args:
        before: observations of the baseline, shape (m,), no NaN.
        after: observations after the change in order of day, shape (n,), no NaN.

    Returns:
        None with fewer than 14 observations after.
    """
    if len(after) < FEWEST_AFTER or len(before) < FEWEST_AFTER // 2:
        return None
    places, loss = split_profile(normal_scores(after))
    split = int(places[np.argmin(loss)])
    early, late = after[:split], after[split:]
    widened = widening(carry_over([before, early, late]))
    whole = rank_sum(before, after, widened).p < _MOVED_BELOW
    if rank_sum(early, late, widened).p >= _PARTED_BELOW:
        return "still so" if whole else "unclear"
    moved_early, moved_late = shift(before, early)[0], shift(before, late)[0]
    early_moved = rank_sum(before, early, widened).p < _MOVED_BELOW
    late_moved = rank_sum(before, late, widened).p < _MOVED_BELOW
    is_less = moved_early * moved_late <= 0 or abs(moved_late) < _MUCH_LESS * abs(moved_early)
    if early_moved and is_less and not (late_moved and moved_early * moved_late < 0):
        return "faded"
    if late_moved and abs(moved_early) < _MUCH_LESS * abs(moved_late):
        return "come late"
    if early_moved and late_moved and abs(moved_late) > _MUCH_MORE * abs(moved_early):
        return "growing"
    return "still so" if late_moved else "unclear"
