"""A steady slope inside stretches: how much a period, and whether it is more than luck."""

from __future__ import annotations

from collections.abc import Sequence
from math import erfc, sqrt
from typing import NamedTuple

import numpy as np

from analysis.batch.ranks import midranks
from analysis.log import Days, Values

_MOST_PAIRED = 200
"""Longer stretches are first made into this many blocks of neighbours, so that pairs stay few."""

FEWEST = 5


class Slope(NamedTuple):
    """Change a period in the unit of the values, and its two-sided chance by luck."""

    a_period: float
    p: float


def common_slope(at: Sequence[Days], values: Sequence[Values], widened: float = 1.0) -> Slope | None:
    """One slope for several stretches, whatever steps lie between them.

    The amount is the median of all slopes between two periods of one stretch, by their real distance. Whether it
    is more than luck is asked of the ranks within each stretch against time.

    Args:
        at: running numbers of the periods of each stretch.
        values: values of each stretch, NaN where blank.
        widened: factor on the variance for carry-over, at least 1.

    Returns:
        None when no stretch has five values.

    Source: Theil (1950) and Sen (1968), JASA 63:1379-1389, for the amount; Spearman's rank correlation within
    strata for the chance.
    """
    slopes: list[Values] = []
    found = variance = 0.0
    for stretch_at, stretch_values in zip(at, values, strict=True):
        known = ~np.isnan(stretch_values)
        t, y = stretch_at[known].astype(float), stretch_values[known]
        if len(y) < FEWEST:
            continue
        slopes.append(_pairwise(t, y))
        place, rank = t - t.mean(), midranks(y)
        rank = rank - rank.mean()
        # Divided by the length, stretches of different length weigh as their periods do.
        found += float(place @ rank) / len(y)
        variance += float(place @ place) * float(rank @ rank) / (len(y) - 1) / len(y) ** 2
    if not slopes:
        return None
    p = erfc(abs(found) / sqrt(2 * widened * variance)) if variance > 0 else 1.0
    return Slope(float(np.median(np.concatenate(slopes))), p)


def _pairwise(t: Values, y: Values) -> Values:
    if len(t) > _MOST_PAIRED:
        edges = np.linspace(0, len(t), _MOST_PAIRED + 1).astype(int)
        starts, sizes = edges[:-1], np.diff(edges)
        t, y = np.add.reduceat(t, starts) / sizes, np.add.reduceat(y / sizes.repeat(sizes), starts)
    first, second = np.triu_indices(len(t), 1)
    slopes: Values = (y[second] - y[first]) / (t[second] - t[first])
    return slopes
