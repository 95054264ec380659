"""What would settle it: how many more days would show a move of a given size."""

from __future__ import annotations

from math import ceil

import numpy as np

from analysis.log import Values

_Z_BOTH = 1.959963984540054 + 0.8416212335729143
"""The normal law's points for a two-sided 5 in 100 and a power of 80 in 100."""


def days_needed_after(before: Values, amount: float, widened: float = 1.0) -> int | None:
    """Days needed after the change so that a shift by ``amount`` is seen in 80 of 100 logs.

    The baseline's own days are taken as the law of a day; the same days moved by ``amount`` are the law after.

    Args:
        before: shape (m,), m ≥ 1, no NaN.
        amount: size of the shift, in the unit of the values; its sign does not matter.
        widened: factor on the variance for carry-over, at least 1.

    Returns:
        None when no number of days is enough with this baseline.

    Source: Noether (1987), JASA 82:645-647, solved for one stretch when the other is given.
    """
    m = len(before)
    gaps = before[:, None] - before[None, :] if m <= 400 else before[:400, None] - before[None, :400]
    share = float(np.mean(gaps < abs(amount)) + np.mean(gaps == abs(amount)) / 2)
    if share <= 0.5:
        return None
    k = widened * _Z_BOTH**2 / (12 * (share - 0.5) ** 2)
    return None if m <= k else ceil(k * m / (m - k))
