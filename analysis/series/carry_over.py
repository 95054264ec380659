"""How far one day carries over into the next."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from analysis.batch.ranks import midranks
from analysis.log import Values

_MOST = 0.9
"""Above this the widening would have no end; no short log can tell 0.9 from 1."""


def carry_over(stretches: Sequence[Values]) -> float | None:
    """Carry-over from one value to the next: a lag-1 correlation of ranks, corrected and clipped to [0, 0.9].

    Each stretch is ranked by itself, centred and divided by its length, so that a move between stretches does not
    look like carry-over. Blank periods are passed over: what widens a comparison is how far the values that were
    written down hang together, be they of every day or of every other day.

    Args:
        stretches: each of shape (k,), one value a period in order, NaN where blank.

    Returns:
        None for eight values or fewer, where the correction is not defined.

    Source: bias E r = ρ − (1 + 4ρ)/n of Kendall (1954) and Marriott & Pope (1954), Biometrika 41; pooling two
    stretches doubles it, which (N r + 2)/(N − 8) takes back.
    """
    products = squares = 0.0
    count = 0
    for values in stretches:
        known = values[~np.isnan(values)]
        n = len(known)
        if n == 0:
            continue
        centred = (midranks(known) - (n + 1) / 2) / n
        products += float(centred[1:] @ centred[:-1])
        squares += float(centred @ centred)
        count += n
    if count <= 8:
        return None
    raw = products / squares if squares > 0 else 0.0
    return float(np.clip((count * raw + 2) / (count - 8), 0.0, _MOST))


def widening(carried: float | None) -> float:
    """The factor by which carry-over widens the variance of a comparison: (1 + r)/(1 − r)."""
    r = carried or 0.0
    return (1 + r) / (1 - r)
