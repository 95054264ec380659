"""The two stretches of one comparison, and the comparison of their levels.

Doubts compute it again on sides with some days left out or some rival explanation taken off.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from math import erfc, sqrt

import numpy as np
from numpy.typing import NDArray

from analysis.answer import Direction
from analysis.log import Days, Measure, Values
from analysis.questions.by_how_much import shift
from analysis.questions.did_it_move import CLAIMS, Sureness, rank_sum, sureness
from analysis.series.carry_over import carry_over, widening
from analysis.series.weekday_rhythm import Rhythm, is_weekend, weekday_rhythm

ZERO_HEAVY_SHARE = 0.25
"""From this share of zeros in the baseline on, *how often* and *how much on those days* are told apart."""

OFTEN_PART = 0.8
"""Of the chance of a false claim on a zero-heavy log, how much goes to *how often*; the rest to *how much*."""

FEWEST_ACTIVE = 4
WEEK = 7
FEWEST_WEEKS = 4
REGULAR_PART = 0.5
"""Weeks that vary by less than this part of what lots would make are taken as kept to a plan."""


@dataclass(frozen=True, eq=False)
class Sides:
    """Two rows of periods without holes, NaN where blank, and what they are of.

    Attributes:
        measure: with the period of the answer.
        before_days, after_days: first day number of each period, shapes (m,) and (n,).
        before_at, after_at: the same as running numbers of periods, so that slopes are a period.
        before, after: the observations, shapes (m,) and (n,).
    """

    measure: Measure
    before_days: Days
    before_at: Days
    before: Values
    after_days: Days
    after_at: Days
    after: Values

    @property
    def known_before(self) -> Values:
        """The observations before, without blanks."""
        return self.before[~np.isnan(self.before)]

    @property
    def known_after(self) -> Values:
        """The observations after, without blanks."""
        return self.after[~np.isnan(self.after)]

    @property
    def is_zero_heavy(self) -> bool:
        """Whether a quarter or more of the baseline is zero, of an amount or count."""
        before = self.known_before
        if self.measure.kind not in ("amount", "count") or not len(before) or np.min(before) < 0:
            return False
        return float(np.mean(before == 0)) >= ZERO_HEAVY_SHARE

    @property
    def told_by_share(self) -> bool:
        """Whether a share of days says more than a median: yes/no logs and zero-heavy ones."""
        return self.measure.kind == "yes/no" or self.is_zero_heavy

    def without(self, before: NDArray[np.bool_], after: NDArray[np.bool_]) -> Sides:
        """The same with some periods made blank; masks of shapes (m,) and (n,)."""
        return replace(
            self, before=np.where(before, np.nan, self.before), after=np.where(after, np.nan, self.after)
        )

    def less(self, slope: float) -> Sides:
        """The same with a steady slope a period taken off."""
        return replace(
            self,
            before=self.before - slope * (self.before_at - self.before_at[0]),
            after=self.after - slope * (self.after_at - self.before_at[0]),
        )


@dataclass(frozen=True, eq=False)
class Level:
    """What the comparison of two levels gives.

    Attributes:
        rhythm: weekends against weekdays; None where it cannot be asked.
        sides: the sides compared, a rhythm in use taken off.
        carry_over: see ``analysis.series.carry_over``.
        widened: the factor it puts on variances.
        share: share of pairs in which after is higher.
        p: two-sided chance of a gap this big by luck, widened.
        plain_p: the same without carry-over.
        sureness, direction: the word, and the way it moved from "leaning" up.
        estimate, low, high: the shift with its range.
    """

    rhythm: Rhythm | None
    sides: Sides
    carry_over: float | None
    widened: float
    share: float
    p: float
    plain_p: float
    sureness: Sureness
    direction: Direction
    estimate: float
    low: float
    high: float

    @property
    def is_claim(self) -> bool:
        """Whether it says that the level moved."""
        return self.sureness in CLAIMS


def compare(sides: Sides, also_widened: float = 1.0) -> Level:
    """Compare the levels of two sides.

    Args:
        sides: both hold an observation.
        also_widened: factor on the variance beside that for carry-over.
    """
    rhythm = None
    if sides.measure.period == "day" and not sides.told_by_share:
        rhythm = weekday_rhythm([sides.before_days, sides.after_days], [sides.before, sides.after])
        if rhythm is not None and rhythm.used:
            sides = replace(
                sides,
                before=sides.before - rhythm.weekend * is_weekend(sides.before_days),
                after=sides.after - rhythm.weekend * is_weekend(sides.after_days),
            )
    before, after = sides.known_before, sides.known_after
    r = carry_over([sides.before, sides.after])
    widened = widening(r) * also_widened
    test = rank_sum(before, after, widened)
    p, plain_p = test.p, rank_sum(before, after).p if widened > 1 else test.p
    if sides.told_by_share:
        p, plain_p = _chance_by_share(sides, widened), _chance_by_share(sides, 1.0)
    estimate, low, high = shift(before, after, widened)
    word = sureness(len(before), len(after), p)
    direction: Direction = "none"
    if word not in ("too early", "cannot tell"):
        direction = _way(sides, estimate, test.share)
    return Level(rhythm, sides, r, widened, test.share, p, plain_p, word, direction, estimate, low, high)


def chance_of_shares(before: tuple[int, int], after: tuple[int, int], widened: float = 1.0) -> float:
    """Two-sided chance of a gap between two shares of days at least this big, by luck.

    Args:
        before: days that count, days in all (at least 1).
        after: the same after the change.
        widened: factor on the variance for carry-over, at least 1.

    Source: the score test of two proportions (pooled variance), e.g. Newcombe (1998), Stat. Med. 17:873-890.
    """
    days = before[1] + after[1]
    pooled = (before[0] + after[0]) / days
    variance = widened * pooled * (1 - pooled) * (1 / before[1] + 1 / after[1])
    if variance <= 0:
        return 1.0
    gap = abs(after[0] / after[1] - before[0] / before[1])
    return erfc(gap / sqrt(2 * variance))


def _chance_by_share(sides: Sides, widened: float) -> float:
    """The chance for a log told by shares: how often, and for amounts how much on those days, together."""
    often = _chance_often(sides, widened)
    if sides.measure.kind == "yes/no":
        return often
    return min(1.0, often / OFTEN_PART, _chance_much(sides, widened) / (1 - OFTEN_PART))


def _chance_often(sides: Sides, widened: float) -> float:
    """The chance of a gap in how many days there was some; by whole weeks where those are kept to a plan."""
    by_week = _chance_by_week(sides)
    if by_week is not None:
        return by_week
    before, after = sides.known_before, sides.known_after
    done_before, done_after = int(np.sum(before > 0)), int(np.sum(after > 0))
    return chance_of_shares((done_before, len(before)), (done_after, len(after)), widened)


def _chance_much(sides: Sides, widened: float) -> float:
    """The chance of a gap in how much there was on days with some; 1 where either side has hardly any."""
    before, after = sides.known_before, sides.known_after
    before, after = before[before > 0], after[after > 0]
    if sides.measure.kind == "yes/no" or min(len(before), len(after)) < FEWEST_ACTIVE:
        return 1.0
    return rank_sum(before, after, widened).p


def _chance_by_week(sides: Sides) -> float | None:
    """The chance for days done a week, where the weeks are more alike than days drawn by lot would be.

    Someone who keeps to so many days a week leaves less to luck than the count of days knows. Asked only of
    weeks within their stretch, so that a move does not decide which test is used.

    Returns:
        None with fewer than four whole weeks on either side, or weeks as unlike as luck makes them.
    """
    if sides.measure.period != "day":
        return None
    before, after = _days_done_a_week(sides.before), _days_done_a_week(sides.after)
    if min(len(before), len(after)) < FEWEST_WEEKS:
        return None
    by_lot = within = 0.0
    for weeks in (before, after):
        share = float(np.mean(weeks)) / WEEK
        by_lot += WEEK * share * (1 - share) * (len(weeks) - 1)
        within += float(np.sum((weeks - np.mean(weeks)) ** 2))
    return rank_sum(before, after).p if within < REGULAR_PART * by_lot else None


def _days_done_a_week(values: Values) -> Values:
    """Days with more than nothing in each whole week from the first day on; weeks with a blank are left out."""
    weeks = values[: len(values) // WEEK * WEEK].reshape(-1, WEEK)
    weeks = weeks[~np.isnan(weeks).any(axis=1)]
    done: Values = np.sum(weeks > 0, axis=1).astype(np.float64)
    return done


def _way(sides: Sides, estimate: float, share: float) -> Direction:
    """The way the level moved; where the middle difference is none, the way most pairs or days go."""
    if sides.told_by_share:
        before, after = sides.known_before, sides.known_after
        often = _chance_often(sides, 1.0) / OFTEN_PART
        much = _chance_much(sides, 1.0) / (1 - OFTEN_PART)
        if often <= much:
            estimate = float(np.mean(after > 0) - np.mean(before > 0))
        else:
            estimate = rank_sum(before[before > 0], after[after > 0]).share - 0.5
    moved = estimate or share - 0.5
    return "more" if moved > 0 else "less" if moved < 0 else "none"
