"""Doubts about the course of the log: it was moving already, began oddly, or began at its worst."""

from __future__ import annotations

import numpy as np

from analysis.answer import Doubt
from analysis.batch.fences import is_above, is_below
from analysis.doubts.seen import Seen
from analysis.questions.did_it_move import CLAIMS, rank_sum, sureness
from analysis.series.carry_over import carry_over, widening
from analysis.series.slope import common_slope
from analysis.sides import Sides, compare

WEEK = 7
WEEKS_FOR_WORST_SPELL = 5
DAYS_FOR_FIRST_WEEK = 21
SEASON_DAYS = 100
YEAR, MOST_OF_A_YEAR = 365, 300
_SAME_WEEKS = 14
"""Days to either side that are still the same time of the year."""
_LOOKED_AT = 60
"""Days after that the circle of the year is looked at from; more would make a table of every pair."""
_SLOPE_BELOW = 0.10
_SHORTEST_STEP = 5
_PART_OF_SHIFT = 0.6
"""A slope that would make less than this part of the shift does not explain it."""
_HIGH_FIRST_WEEK_BELOW = 0.30
"""New logs mostly begin high, so that a high first week needs less to be named than a low one."""
_LOW_FIRST_WEEK_BELOW = 0.05


def slope_before(seen: Seen) -> Doubt | None:
    """A steady slope through both stretches, the way of the shift: the change may only lie on it.

    Computed again with the slope taken off.
    """
    if seen.level is None:
        return None
    sides = seen.level.sides
    at, values = [sides.before_at, sides.after_at], [sides.before, sides.after]
    slope = common_slope(at, values)
    if slope is None or slope.p >= _SLOPE_BELOW or (slope.a_period > 0) != seen.rose:
        return None
    level_rows = sides.less(slope.a_period)
    slope = common_slope(at, values, widening(carry_over([level_rows.before, level_rows.after])))
    if slope is None or slope.p >= _SLOPE_BELOW:
        return None
    apart = float(np.mean(sides.after_at) - np.mean(sides.before_at))
    if abs(slope.a_period) * apart < _PART_OF_SHIFT * abs(seen.level.estimate):
        return None
    price = _price_of_slope(sides)
    is_line = _line_fits_better(sides)
    if seen.is_claim:
        alters = seen.turns_on(level_rows, price)
    else:
        alters = is_line and _is_all_slope(seen, level_rows, price)
    # A start days after the change makes a slope too; then it is said as what it could be, and not as what it was.
    shape = () if is_line else (("shape", "step"),)
    return Doubt("slope_before", (("slope", slope.a_period), *shape), alters)


def _line_fits_better(sides: Sides) -> bool:
    """Whether one line through both stretches leaves less than one step, wherever that lies (least squares)."""
    at, values = np.concatenate([sides.before_at, sides.after_at]), np.concatenate([sides.before, sides.after])
    known = ~np.isnan(values)
    x, y = at[known].astype(float), values[known]
    x, y = x - x.mean(), y - y.mean()
    if len(y) < 2 * _SHORTEST_STEP or not (y @ y) > 0:
        return True
    by_line = float((x @ y) ** 2 / (x @ x))
    early = np.cumsum(y)[_SHORTEST_STEP - 1 : -_SHORTEST_STEP]
    sizes = np.arange(_SHORTEST_STEP, len(y) - _SHORTEST_STEP + 1, dtype=float)[: len(early)]
    by_step = float(np.max(early**2 * (1 / sizes + 1 / (len(y) - sizes))))
    return by_line >= by_step


def _is_all_slope(seen: Seen, level_rows: Sides, price: float) -> bool:
    """Whether a steep slope is all there is, though nothing was claimed: its own carry-over hid the gap.

    With the carry-over of the days around the slope the gap would be claimed, and without the slope it is not.
    """
    assert seen.level is not None
    before, after = seen.level.sides.known_before, seen.level.sides.known_after
    around = widening(carry_over([level_rows.before, level_rows.after]))
    word = sureness(len(before), len(after), rank_sum(before, after, around).p)
    return word in CLAIMS and not compare(level_rows, price).is_claim


def _price_of_slope(sides: Sides) -> float:
    """By how much the variance of a step grows when a slope is estimated beside it (least squares)."""
    before, after = sides.before_at[~np.isnan(sides.before)], sides.after_at[~np.isnan(sides.after)]
    around = np.sum((before - before.mean()) ** 2) + np.sum((after - after.mean()) ** 2)
    apart = after.mean() - before.mean()
    return float(1 + apart**2 / (around * (1 / len(before) + 1 / len(after))))


def worst_spell(seen: Seen) -> Doubt | None:
    """The last week before the change was the baseline's lowest (or highest): some way back was due anyway.

    Looked for on the side that the change was to lead away from, and on the side that it did lead away from.
    """
    sides = seen.sides
    if sides is None or seen.measure.period != "day" or len(sides.known_before) < WEEKS_FOR_WORST_SPELL * WEEK:
        return None
    known = np.flatnonzero(~np.isnan(sides.before))
    values = sides.before[known]
    weeks = len(values) // WEEK
    # Whole weeks counted back from the change.
    means = values[len(values) - weeks * WEEK :].reshape(weeks, WEEK).mean(axis=1)
    is_lowest, is_highest = means[-1] < means[:-1].min(), means[-1] > means[:-1].max()
    leads_up = seen.rose or seen.measure.aim == "more"
    leads_down = not seen.rose or seen.measure.aim == "less"
    if not (is_lowest and leads_up) and not (is_highest and leads_down):
        return None
    spell = np.zeros(len(sides.before), dtype=bool)
    spell[known[-WEEK:]] = True
    nothing = np.zeros(len(sides.after), dtype=bool)
    return Doubt(
        "worst_spell",
        (("weeks", weeks), ("way", "lowest" if is_lowest else "highest")),
        seen.turns_on_days(spell, nothing),
    )


def first_days(seen: Seen) -> Doubt | None:
    """The first week of the log is unlike the rest of the baseline: logging itself may have been the change."""
    sides = seen.sides
    if sides is None or seen.measure.period != "day" or len(sides.known_before) < DAYS_FOR_FIRST_WEEK:
        return None
    if sides.before_days[0] != seen.log.days[0]:
        return None
    known = np.flatnonzero(~np.isnan(sides.before))
    values = sides.before[known]
    test = rank_sum(values[WEEK:], values[:WEEK], widening(seen.level.carry_over if seen.level else None))
    is_high = test.share > 0.5
    if test.p >= (_HIGH_FIRST_WEEK_BELOW if is_high else _LOW_FIRST_WEEK_BELOW):
        return None
    week = np.zeros(len(sides.before), dtype=bool)
    week[known[:WEEK]] = True
    nothing = np.zeros(len(sides.after), dtype=bool)
    way = "higher" if is_high else "lower"
    left = seen.too_few_left(week, nothing)
    return Doubt("first_days", (("way", way), *left), seen.turns_on_days(week, nothing))


def odd_day(seen: Seen) -> Doubt | None:
    """Days beyond a stretch's outer fences on which the claim hangs."""
    sides = seen.sides
    if sides is None or not seen.is_claim:
        return None
    odd = []
    for values, stretch in ((sides.before, seen.baseline), (sides.after, seen.stretches[-1])):
        if stretch.outer_lower_fence is None or stretch.outer_upper_fence is None:
            odd.append(np.zeros(len(values), dtype=bool))
        else:
            odd.append(is_below(values, stretch.outer_lower_fence) | is_above(values, stretch.outer_upper_fence))
    days = int(odd[0].sum() + odd[1].sum())
    if not days or not seen.turns_on_days(odd[0], odd[1]):
        return None
    return Doubt("odd_day", (("days", days),), alters=True)


def season(seen: Seen) -> Doubt | None:
    """The middles of the two stretches lie months apart, or the days after are of a part of the year only.

    Behind a baseline of a whole year the answer is computed again against the same weeks of the year before.
    """
    if seen.sides is None or seen.measure.period == "year":
        return None
    before, after = seen.sides.before_days, seen.sides.after_days
    if not len(after):
        return None
    if len(before) * _days_a_period(seen) >= YEAR:
        return _part_of_the_year(seen)
    apart = float(np.median(after) - np.median(before))
    return Doubt("season", (("months", round(apart / 30.4)),), alters=False) if apart >= SEASON_DAYS else None


def _part_of_the_year(seen: Seen) -> Doubt | None:
    assert seen.sides is not None
    before, after = seen.sides.before_days, seen.sides.after_days
    if len(after) * _days_a_period(seen) >= MOST_OF_A_YEAR:
        return None
    # Around the circle of the year, how far each day before is from the nearest day after.
    away = np.abs((before[:, None] - after[None, :: max(1, len(after) // _LOOKED_AT)]) % YEAR)
    same = np.minimum(away, YEAR - away).min(axis=1) <= _SAME_WEEKS
    nothing = np.zeros(len(after), dtype=bool)
    return Doubt("season", (("same", int(same.sum())),), seen.turns_on_days(~same, nothing))


def _days_a_period(seen: Seen) -> int:
    return {"day": 1, "week": 7, "month": 30, "year": 365}[seen.measure.period]
