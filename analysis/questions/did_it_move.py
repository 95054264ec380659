"""Did it move: the rank-sum comparison of two stretches, and how sure its answer can be."""

from __future__ import annotations

from dataclasses import dataclass
from math import erfc, sqrt
from typing import Literal, get_args

import numpy as np

from analysis.batch.ranks import midranks, tie_sum
from analysis.log import Values

Sureness = Literal["too early", "cannot tell", "leaning", "fairly sure", "as sure as a log can be"]
SURENESS: tuple[Sureness, ...] = get_args(Sureness)
"""The five words, from least to most sure."""

CLAIMS: frozenset[Sureness] = frozenset({"fairly sure", "as sure as a log can be"})
"""The words that say it moved."""

FEWEST_BEFORE = 7
FEWEST_AFTER = 4
FEWEST_FOR_MOST_SURE = 14

LEANING_BELOW = 0.20
FAIRLY_SURE_BELOW = 0.05
MOST_SURE_BELOW = 0.003

_EXACT_UP_TO = 30
"""Up to this many days together the tie-exact chance is counted; beyond, the normal law is near enough."""


def at_most(word: Sureness, most: Sureness) -> Sureness:
    """The less sure of two words."""
    return min(word, most, key=SURENESS.index)


@dataclass(frozen=True)
class RankSum:
    """How often an after-day is higher than a before-day, and how often luck alone would part them so far.

    Attributes:
        pairs_won: pairs in which after is higher, ties counted half (the U of the after-days).
        share: the same as a share of all pairs.
        p: two-sided chance of a gap at least this big if nothing had changed, widened for carry-over.
    """

    pairs_won: float
    share: float
    p: float


def rank_sum(before: Values, after: Values, widened: float = 1.0) -> RankSum:
    """Compare two stretches by ranks.

    Args:
        before: shape (m,), m ≥ 1, no NaN.
        after: shape (n,), n ≥ 1, no NaN.
        widened: factor on the variance for carry-over, at least 1.

    Returns:
        ``p`` is the larger of the tie-exact chance (counted up to 30 days together) and the widened normal
        chance.

    Source: Wilcoxon (1945); Mann & Whitney (1947); tie-corrected variance of Hollander & Wolfe (1999), sect. 4.1.
    """
    m, n = len(before), len(after)
    both = np.concatenate([before, after])
    ranks = midranks(both)
    won = float(ranks[m:].sum()) - n * (n + 1) / 2
    total = m + n
    variance = widened * m * n / 12 * ((total + 1) - tie_sum(both) / (total * (total - 1)))
    if variance <= 0:
        return RankSum(won, won / (m * n), 1.0)
    gap = abs(won - m * n / 2)
    if total <= _EXACT_UP_TO:
        p = max(_exact_chance(ranks, m), erfc(gap / sqrt(2 * variance)))
    else:
        p = erfc(max(gap - 0.5, 0.0) / sqrt(2 * variance))
    return RankSum(won, won / (m * n), min(p, 1.0))


def _exact_chance(ranks: Values, m: int) -> float:
    """Share of all choices of ``m`` of these ranks whose sum is at least as far from the middle; ties kept.

    Counts the choices by number taken and sum, one rank at a time (doubled, so that midranks are whole).
    """
    doubled = np.rint(2 * ranks).astype(np.int64)
    taken = min(m, len(ranks) - m)
    chosen = doubled[:m] if taken == m else doubled[m:]
    most = int(np.sort(doubled)[len(doubled) - taken :].sum())
    ways = np.zeros((taken + 1, most + 1))
    ways[0, 0] = 1.0
    for rank in doubled:
        ways[1:, rank:] += ways[:-1, : most + 1 - rank]
    sums = np.arange(most + 1)
    middle = taken * (len(ranks) + 1)
    far = np.abs(sums - middle) >= abs(int(chosen.sum()) - middle)
    return float(ways[taken, far].sum() / ways[taken].sum())


def sureness(before: int, after: int, p: float) -> Sureness:
    """The word for how sure the answer is.

    - *too early*: fewer than 7 observations before or 4 after;
    - *leaning*: a gap this big turns up by luck in fewer than 20 of 100 unchanged logs;
    - *fairly sure*: in fewer than 5 of 100;
    - *as sure as a log can be*: in fewer than 3 of 1,000, with 14 observations or more on both sides;
    - *cannot tell*: everything else.

    Args:
        before: observations in the baseline.
        after: observations after the change.
        p: two-sided chance by luck, widened for carry-over.
    """
    if before < FEWEST_BEFORE or after < FEWEST_AFTER:
        return "too early"
    if p >= LEANING_BELOW:
        return "cannot tell"
    if p >= FAIRLY_SURE_BELOW:
        return "leaning"
    if p >= MOST_SURE_BELOW or min(before, after) < FEWEST_FOR_MOST_SURE:
        return "fairly sure"
    return "as sure as a log can be"
