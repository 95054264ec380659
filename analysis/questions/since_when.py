"""Since when: the likeliest first day of the new level, and the days that fit about as well."""

from __future__ import annotations

from heapq import heappop, heappush
from math import log

import numpy as np
from numpy.typing import NDArray

from analysis.log import Values

FEWEST_EACH_SIDE = 3
CUT = 2.7
"""How much worse a split may fit, in log-likelihood, and still be told; widened for carry-over."""


def plausible_splits(values: Values, widened: float = 1.0, cut: float = CUT) -> tuple[int, int, int] | None:
    """The split of a row into two levels that fits best, and the first and last that fit about as well.

    Each split is judged by the sum of distances to the medians of its two sides (a Laplace profile). A split is
    named by the place of the first observation of the new level.

    Args:
        values: shape (n,), no NaN, in order of day.
        widened: factor on the variance for carry-over, at least 1.
        cut: largest loss of log-likelihood that still counts as fitting.

    Returns:
        Best, first and last place; None with fewer than three observations a side.

    Source: the likelihood profile of Cobb (1978), Biometrika 65:243-251, with the Laplace law.
    """
    n = len(values)
    if n < 2 * FEWEST_EACH_SIDE:
        return None
    # Scaled so that the sums of a row of huge values stay numbers.
    scale = float(np.max(np.abs(values)))
    scaled = values / scale if scale > 0 else values
    head = distances_to_median(scaled)
    tail = distances_to_median(scaled[::-1])[::-1]
    places = np.arange(FEWEST_EACH_SIDE, n - FEWEST_EACH_SIDE + 1)
    loss = head[places - 1] + tail[places]
    best = int(np.argmin(loss))
    # Sums of distances carry rounding: what lies within it of nothing is nothing.
    least = max(float(loss[best]), n * 1e-12)
    fits = np.array([n * log(max(float(one), least) / least) <= cut * widened for one in loss])
    fitting = places[fits]
    return int(places[best]), int(fitting[0]), int(fitting[-1])


def distances_to_median(values: Values) -> NDArray[np.float64]:
    """For each head of a row, the sum of its distances to its own median; shape (n,), in n log n steps."""
    lower: list[float] = []  # the lower half, negated so that its largest comes first
    upper: list[float] = []
    below = above = 0.0
    sums = np.empty(len(values))
    for place, value in enumerate(values.tolist()):
        if lower and value < -lower[0]:
            heappush(lower, -value)
            below += value
        else:
            heappush(upper, value)
            above += value
        if len(lower) > len(upper):
            moved = -heappop(lower)
            heappush(upper, moved)
            below -= moved
            above += moved
        elif len(upper) > len(lower) + 1:
            moved = heappop(upper)
            heappush(lower, -moved)
            above -= moved
            below += moved
        median = upper[0]
        sums[place] = max(above - median * len(upper) + median * len(lower) - below, 0.0)
    return sums
