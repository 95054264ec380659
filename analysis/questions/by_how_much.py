"""By how much: the shift, the share of pairs, and proportions of days."""

from __future__ import annotations

from math import floor, sqrt

import numpy as np

from analysis.log import Values

Z95 = 1.959963984540054
"""The normal law's two-sided 95 % point."""

_SMALL_TABLE = 4096
"""Up to this many pairs the differences are written out; beyond, they are only counted."""


def shift(before: Values, after: Values, widened: float = 1.0) -> tuple[float, float, float]:
    """The middle of all after-minus-before differences, and its 95 % range.

    Args:
        before: shape (m,), m ≥ 1, no NaN.
        after: shape (n,), n ≥ 1, no NaN.
        widened: factor on the variance for carry-over, at least 1.

    Returns:
        Estimate, low and high, in the unit of the values. No table of m × n differences is kept.

    Source: Hodges & Lehmann (1963); interval by inverting the rank-sum test, Hollander & Wolfe (1999), sect. 4.3.
    """
    m, n = len(before), len(after)
    cut = max(1, floor(m * n / 2 - Z95 * sqrt(widened * m * n * (m + n + 1) / 12)))
    middle = [(m * n + 1) // 2, (m * n + 2) // 2]
    low, below, above, high = ordered_differences(before, after, [cut, *middle, m * n + 1 - cut])
    return below / 2 + above / 2, low, high


def ordered_differences(before: Values, after: Values, places: list[int]) -> list[float]:
    """The after-minus-before differences at the given places of their ascending order.

    Args:
        before: shape (m,).
        after: shape (n,).
        places: from 1 to m·n.
    """
    if len(before) * len(after) <= _SMALL_TABLE:
        differences = np.sort((after[:, None] - before[None, :]).ravel())
        return [float(differences[place - 1]) for place in places]
    low_side, high_side = np.sort(before), np.sort(after)
    return [_difference_at(low_side, high_side, place) for place in places]


def _difference_at(before: Values, after: Values, place: int) -> float:
    """The difference at one place by halving: count how many are at most a guess, never list them."""
    low = float(after[0] - before[-1])
    high = float(after[-1] - before[0])
    while True:
        guess = low / 2 + high / 2
        if not low < guess < high:
            break
        # after - before <= guess, counted for each before by where before + guess falls among the afters.
        if int(np.searchsorted(after, before + guess, side="right").sum()) >= place:
            high = guess
        else:
            low = guess
    # The halving ends between two neighbouring floats; the difference itself is the one nearest to them.
    spots = np.searchsorted(after, before + high, side="left")
    near = np.concatenate([after[np.clip(spots + step, 0, len(after) - 1)] - before for step in (-1, 0, 1)])
    return float(near[np.argmin(np.abs(near - high))])


def share_range(share: float, m: int, n: int, widened: float = 1.0) -> tuple[float, float]:
    """95 % range for the share of pairs in which after is higher.

    Args:
        share: the share seen, ties counted half.
        m: days before.
        n: days after.
        widened: factor on the variance for carry-over, at least 1.

    Source: Newcombe (2006), Stat. Med. 25:559-573, method 5, with its variance times ``widened``.
    """
    half = (m + n) / 2 - 1

    def reach(theta: float) -> float:
        variance = theta * (1 - theta) * (1 + half * (1 - theta) / (2 - theta) + half * theta / (1 + theta))
        return Z95 * sqrt(widened * variance / (m * n))

    def solve(inner: float, outer: float, sign: int) -> float:
        for _ in range(60):
            middle = (inner + outer) / 2
            if sign * (middle - share) <= reach(middle):
                inner = middle
            else:
                outer = middle
        return (inner + outer) / 2

    low = 0.0 if share == 0 else solve(share, 0.0, -1)
    high = 1.0 if share == 1 else solve(share, 1.0, 1)
    return low, high


def wilson(met: int, days: int, widened: float = 1.0) -> tuple[float, float]:
    """95 % range of a share of days.

    Args:
        met: days that count, 0 … ``days``.
        days: at least 1.
        widened: factor on the variance for carry-over; the days count as ``days / widened``.

    Source: Wilson (1927), JASA 22:209-212.
    """
    n = days / widened
    share = met / days
    centre = (share + Z95**2 / (2 * n)) / (1 + Z95**2 / n)
    half = Z95 * sqrt(share * (1 - share) / n + Z95**2 / (4 * n**2)) / (1 + Z95**2 / n)
    low = 0.0 if met == 0 else max(0.0, centre - half)
    high = 1.0 if met == days else min(1.0, centre + half)
    return low, high


def difference_of_shares(
    before: tuple[int, int], after: tuple[int, int], widened: float = 1.0
) -> tuple[float, float]:
    """95 % range of the after-share less the before-share.

    Args:
        before: days that count, days in all (at least 1).
        after: the same after the change.
        widened: factor on the variance for carry-over, at least 1.

    Source: Newcombe (1998), Stat. Med. 17:873-890, method 10.
    """
    share_b, share_a = before[0] / before[1], after[0] / after[1]
    low_b, high_b = wilson(*before, widened)
    low_a, high_a = wilson(*after, widened)
    gap = share_a - share_b
    low = gap - sqrt((share_a - low_a) ** 2 + (high_b - share_b) ** 2)
    high = gap + sqrt((high_a - share_a) ** 2 + (share_b - low_b) ** 2)
    return max(low, -1.0), min(high, 1.0)
