"""Doubts about what this log can measure: too few days, no spread, no low days, days that hang together."""

from __future__ import annotations

from analysis.answer import Doubt
from analysis.doubts.seen import Seen
from analysis.questions.did_it_move import FAIRLY_SURE_BELOW, FEWEST_AFTER, FEWEST_BEFORE

NO_LOW_DAY_RATIO = 0.6
"""When the lower fourth is at most this share of the upper, the lower fence is at or below zero."""


def few_days(seen: Seen) -> Doubt | None:
    """Fewer observations than an answer needs, on either side of the change."""
    if len(seen.stretches) == 1:
        return None
    before, after = seen.baseline.observations, seen.stretches[-1].observations
    if before >= FEWEST_BEFORE and after >= FEWEST_AFTER:
        return None
    return Doubt("few_days", (("before", before), ("after", after)), alters=False)


def no_spread(seen: Seen) -> Doubt | None:
    """Half of the baseline or more shares one value, so that fences would have no width."""
    baseline = seen.baseline
    # Between a yes and a no there are no fences to draw.
    if seen.measure.kind == "yes/no" or baseline.observations < FEWEST_BEFORE or baseline.fourth_spread != 0:
        return None
    assert baseline.median is not None
    return Doubt("no_spread", (("value", baseline.median), ("days", baseline.observations)), alters=False)


def day_to_day(seen: Seen) -> Doubt | None:
    """Days hang together so much that a gap which plain days would make sure is not."""
    level = seen.level
    if level is None or level.carry_over is None or level.sureness == "too early":
        return None
    if not level.plain_p < FAIRLY_SURE_BELOW <= level.p:
        return None
    return Doubt("day_to_day", (("carry_over", level.carry_over),), alters=False)


def no_low_day(seen: Seen) -> Doubt | None:
    """A measure wanted lower that cannot go below zero, whose lower fence is there: no low day can be outside."""
    low, high = seen.baseline.lower_fourth, seen.baseline.upper_fourth
    cannot_be_negative = seen.measure.kind in ("amount", "count", "score")
    if seen.baseline.lower_fence is None or low is None or high is None or not cannot_be_negative:
        return None
    if seen.measure.aim != "less" or low < 0 or low > NO_LOW_DAY_RATIO * high:
        return None
    return Doubt("no_low_day", (), alters=False)
