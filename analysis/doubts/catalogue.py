"""The closed list of doubts: what in this log could explain the answer, or keep it from being one."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

from analysis.answer import Answer, Doubt, Stretch
from analysis.log import Measure
from analysis.questions.did_it_move import CLAIMS, FEWEST_AFTER, FEWEST_BEFORE

MOST_SHOWN = 5

NO_LOW_DAY_RATIO = 0.6
"""When the lower fourth is at most this share of the upper, the lower fence is at or below zero."""


@dataclass(frozen=True)
class Seen:
    """What a doubt looks at.

    Attributes:
        measure: what the log is of.
        stretches: the baseline first; at least one.
        answer: the last stretch against the baseline.
    """

    measure: Measure
    stretches: Sequence[Stretch]
    answer: Answer

    @property
    def baseline(self) -> Stretch:
        """The stretch everything is measured against."""
        return self.stretches[0]


def few_days(seen: Seen) -> Doubt | None:
    """Fewer observations than an answer needs, on either side of the change."""
    if len(seen.stretches) == 1:
        return None
    before, after = seen.baseline.observations, seen.stretches[-1].observations
    if before >= FEWEST_BEFORE and after >= FEWEST_AFTER:
        return None
    return Doubt("few_days", (("before", before), ("after", after)), alters=False)


def no_spread(seen: Seen) -> Doubt | None:
    """Half of the baseline or more shares one value, so fences would have no width."""
    baseline = seen.baseline
    if baseline.observations < FEWEST_BEFORE or baseline.fourth_spread != 0:
        return None
    assert baseline.median is not None
    return Doubt("no_spread", (("value", baseline.median), ("days", baseline.observations)), alters=False)


def no_low_day(seen: Seen) -> Doubt | None:
    """A measure that cannot go below zero, whose lower fence is there or lower: no low day can be outside."""
    low, high = seen.baseline.lower_fourth, seen.baseline.upper_fourth
    cannot_be_negative = seen.measure.kind in ("amount", "count", "score")
    if seen.baseline.lower_fence is None or low is None or high is None or not cannot_be_negative:
        return None
    if low < 0 or low > NO_LOW_DAY_RATIO * high:
        return None
    return Doubt("no_low_day", (), alters=False)


def blank_days(seen: Seen) -> Doubt | None:
    """A quarter or more of the periods of a compared stretch hold no value."""
    compared = (seen.baseline, seen.stretches[-1])
    blank = sum(stretch.blank for stretch in compared[: len(seen.stretches)])
    periods = blank + sum(stretch.observations for stretch in compared[: len(seen.stretches)])
    if blank * 4 < periods or not blank:
        return None
    return Doubt("blank_days", (("blank", blank), ("periods", periods)), alters=False)


def day_to_day(seen: Seen) -> Doubt | None:
    """Days hang together so much that the range had to be widened a good deal."""
    r = seen.answer.carry_over
    if r is None or r < 0.4 or seen.answer.sureness in (None, "too early", *CLAIMS):
        return None
    return Doubt("day_to_day", (("carry_over", r),), alters=False)


CATALOGUE: tuple[Callable[[Seen], Doubt | None], ...] = (
    few_days,
    no_spread,
    blank_days,
    day_to_day,
    no_low_day,
)
"""Every doubt there is, worst first."""


def doubts_of(seen: Seen) -> tuple[Doubt, ...]:
    """The doubts this log gives reason for, worst first, at most five."""
    raised = [doubt for look in CATALOGUE if (doubt := look(seen)) is not None]
    return tuple(raised[:MOST_SHOWN])
