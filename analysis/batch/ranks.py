"""Ranks of one batch of numbers."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray


def midranks(values: NDArray[np.float64]) -> NDArray[np.float64]:
    """Ranks from 1, equal values sharing the average of theirs; shape (n,)."""
    _, place, count = np.unique(values, return_inverse=True, return_counts=True)
    last = np.cumsum(count)
    shared: NDArray[np.float64] = (last - (count - 1) / 2)[place]
    return shared


def tie_sum(values: NDArray[np.float64]) -> float:
    """The sum of t³ − t over groups of t equal values."""
    _, count = np.unique(values, return_counts=True)
    return float(np.sum(count.astype(np.float64) ** 3 - count))
