"""Steadier or more scattered: the distances of the days from their own middle."""

from __future__ import annotations

from typing import Literal, NamedTuple

import numpy as np

from analysis.log import Values
from analysis.questions.did_it_move import rank_sum

SpreadWord = Literal["steadier", "more scattered", "alike"]

FEWEST = 7
_DIFFERS_BELOW = 0.05


class Spread(NamedTuple):
    """The word, and the two-sided chance of a difference this big by luck."""

    word: SpreadWord
    p: float


def spread_change(before: Values, after: Values, widened: float = 1.0) -> Spread | None:
    """Compare how far the days of two stretches lie from their own medians.

    Args:
        before: shape (m,), no NaN.
        after: shape (n,), no NaN.
        widened: factor on the variance for carry-over, at least 1.

    Returns:
        None with fewer than seven observations on either side.

    Source: the rank test of distances from the median, after Fligner & Killeen (1976), JASA 71:210-213.
    """
    if min(len(before), len(after)) < FEWEST:
        return None
    test = rank_sum(np.abs(before - np.median(before)), np.abs(after - np.median(after)), widened)
    if test.p >= _DIFFERS_BELOW or test.share == 0.5:
        return Spread("alike", test.p)
    return Spread("more scattered" if test.share > 0.5 else "steadier", test.p)
