"""The median and the two fourths of one batch of numbers."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import ArrayLike


class Fourths(NamedTuple):
    """Median and fourths of one batch, in the batch's unit."""

    lower: float
    median: float
    upper: float

    @property
    def spread(self) -> float:
        """The fourth spread: upper less lower fourth."""
        return self.upper - self.lower


def fourths(values: ArrayLike) -> Fourths:
    """Tukey's fourths: the depth of a fourth is half of one more than the whole depth of the median.

    A depth that ends in a half averages its two neighbours. No quantile rule of a numeric library gives these
    for every length of batch.

    Args:
        values: shape (n,), n ≥ 1, all finite.

    Raises:
        ValueError: the batch is empty.

    Source: Tukey (1977), Exploratory Data Analysis, ch. 2; Hoaglin, Mosteller & Tukey (1983), ch. 2.
    """
    ordered = np.sort(np.asarray(values, dtype=np.float64))
    n = len(ordered)
    if n == 0:
        raise ValueError("the fourths of no numbers are not defined")
    median_depth = (n + 1) / 2
    fourth_depth = (int(median_depth) + 1) / 2
    return Fourths(
        _at_depth(ordered, fourth_depth),
        _at_depth(ordered, median_depth),
        _at_depth(ordered[::-1], fourth_depth),
    )


def _at_depth(ordered: np.ndarray[tuple[int], np.dtype[np.float64]], depth: float) -> float:
    inner = float(ordered[int(depth) - 1])
    if depth == int(depth):
        return inner
    # Halved before adding: the sum of two huge values may not be a number.
    return inner / 2 + float(ordered[int(depth)]) / 2
