"""Since when: the likeliest first day of the new level, and the days that fit about as well."""

from __future__ import annotations

from statistics import NormalDist

import numpy as np
from numpy.typing import NDArray

from analysis.batch.ranks import midranks
from analysis.log import Values
from analysis.series.carry_over import carry_over, widening

FEWEST_EACH_SIDE = 3
CUT = 2.4
"""How much worse a split may fit, in log-likelihood, and still be told; widened for carry-over."""


def plausible_splits(values: Values, cut: float = CUT) -> tuple[int, int, int] | None:
    """The split of a row into two levels that fits best, and the first and last that fit about as well.

    The values are taken as normal scores of their ranks, so that no odd day decides. A split is named by the place
    of the first observation of the new level. Carry-over is estimated within the two sides of the best split, not
    of the marked change: a move that began earlier would look like carry-over there.

    Args:
        values: shape (n,), no NaN, in order of day.
        cut: largest loss of log-likelihood that still counts as fitting.

    Returns:
        Best, first and last place; None with fewer than three observations a side.

    Source: the likelihood profile of Cobb (1978), Biometrika 65:243-251, on van der Waerden scores.
    """
    if len(values) < 2 * FEWEST_EACH_SIDE:
        return None
    places, loss = split_profile(normal_scores(values))
    best = int(places[np.argmin(loss)])
    widened = widening(carry_over([values[:best], values[best:]]))
    fitting = places[loss <= cut * widened]
    return best, int(fitting[0]), int(fitting[-1])


def split_profile(values: Values) -> tuple[NDArray[np.int64], NDArray[np.float64]]:
    """For each split into two levels, how much worse it fits than the best one, in normal log-likelihood.

    Args:
        values: shape (n,), n ≥ 6.

    Returns:
        Places of the first observation of the new level, and the loss of each, both of shape (n − 5,).
    """
    n = len(values)
    places = np.arange(FEWEST_EACH_SIDE, n - FEWEST_EACH_SIDE + 1)
    head = np.cumsum(values - np.mean(values))[places - 1]
    # The sum of squares within the two sides; centred, so that the two heads differ in sign alone.
    around = float(np.sum((values - np.mean(values)) ** 2))
    within = around - head**2 / places - head**2 / (n - places)
    # Rounding can leave less than nothing of a perfect split.
    within = np.maximum(within, max(around, 1.0) * 1e-12)
    loss: NDArray[np.float64] = n / 2 * np.log(within / within.min())
    return places, loss


def normal_scores(values: Values) -> Values:
    """Van der Waerden scores: the normal quantile of rank / (n + 1), equal values sharing theirs; shape (n,)."""
    ranks = midranks(values)
    n = len(values)
    # Midranks are whole or half: one table of quantiles serves all.
    quantile = NormalDist().inv_cdf
    table = {rank: quantile(rank / (n + 1)) for rank in np.unique(ranks).tolist()}
    return np.array([table[rank] for rank in ranks.tolist()])
