"""How far one day carries over into the next."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from analysis.batch.ranks import midranks
from analysis.log import Values

_MOST = 0.9
"""Above this the widening would have no end; no short log can tell 0.9 from 1."""


def carry_over(stretches: Sequence[Values]) -> float | None:
    """Day-to-day carry-over: the lag-1 correlation of ranks within stretches, corrected and clipped to [0, 0.9].

    Each stretch is ranked by itself, centred and divided by its length, so that a move between stretches does not
    look like carry-over. Only neighbouring days that both hold a value form a pair.

    Args:
        stretches: each of shape (k,), one value a period in order, NaN where blank.

    Returns:
        None for eight values or fewer, where the correction is not defined.

    Source: bias E r = ρ − (1 + 4ρ)/n of Kendall (1954) and Marriott & Pope (1954), Biometrika 41; pooling two
    stretches doubles it, which (N r + 2)/(N − 8) takes back.
    """
    products = squares = 0.0
    count = pairs = most_pairs = 0
    for values in stretches:
        known = ~np.isnan(values)
        n = int(known.sum())
        if n == 0:
            continue
        centred = np.full(len(values), np.nan)
        centred[known] = (midranks(values[known]) - (n + 1) / 2) / n
        lagged = centred[1:] * centred[:-1]
        products += float(np.nansum(lagged))
        squares += float(np.nansum(centred**2))
        pairs += int(np.sum(~np.isnan(lagged)))
        most_pairs += n - 1
        count += n
    if count <= 8:
        return None
    # Blank days break pairs: the sum of products is brought up to what a full row would hold.
    raw = products / squares * most_pairs / pairs if squares > 0 and pairs > 0 else 0.0
    return float(np.clip((count * raw + 2) / (count - 8), 0.0, _MOST))


def widening(carried: float | None) -> float:
    """The factor by which carry-over widens the variance of a comparison: (1 + r)/(1 − r)."""
    r = carried or 0.0
    return (1 + r) / (1 - r)
