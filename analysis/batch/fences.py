"""Fences around a batch, and the days beyond them."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from analysis.batch.fourths import Fourths

FEWEST_FOR_FENCES = 5
"""Below this many observations no fence is given (common practice, no single source)."""

FEWEST_TO_DRAW = 7
"""From this many observations on, fences are drawn."""

INNER_STEP = 1.5
OUTER_STEP = 3.0

_ROUNDING = 1e-9
"""A value this near to a fence, relative to the numbers it was made of, is on it."""


class Fences(NamedTuple):
    """Inner and outer fences of one batch, in the batch's unit."""

    lower: float
    upper: float
    outer_lower: float
    outer_upper: float


def fences(batch: Fourths, observations: int) -> Fences | None:
    """Fences 1.5 (inner) and 3 (outer) fourth spreads beyond the fourths.

    Args:
        batch: the fourths of the batch.
        observations: how many numbers they were made of.

    Returns:
        None where a fence would mean nothing: under five observations, or no spread.

    Source: Tukey (1977), Exploratory Data Analysis, ch. 2.
    """
    if observations < FEWEST_FOR_FENCES or batch.spread <= 0 or not np.isfinite(batch.spread * OUTER_STEP):
        return None
    inner = INNER_STEP * batch.spread
    outer = OUTER_STEP * batch.spread
    return Fences(batch.lower - inner, batch.upper + inner, batch.lower - outer, batch.upper + outer)


def is_below(values: NDArray[np.float64], fence: float) -> NDArray[np.bool_]:
    """Which values lie strictly below a fence; NaN never does, and a value on the fence does not."""
    return values < fence - _ROUNDING * np.maximum(np.abs(values), abs(fence))


def is_above(values: NDArray[np.float64], fence: float) -> NDArray[np.bool_]:
    """Which values lie strictly above a fence; NaN never does, and a value on the fence does not."""
    return values > fence + _ROUNDING * np.maximum(np.abs(values), abs(fence))
