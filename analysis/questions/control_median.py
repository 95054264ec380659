"""Days above the old middle: how often luck alone would put so many of them on one side."""

from __future__ import annotations

from math import exp, lgamma

import numpy as np

from analysis.log import Values


def control_median(before: Values, after: Values) -> float:
    """Two-sided chance that so many after-days lie on one side of the baseline's median, if nothing changed.

    The median of a short baseline is itself uncertain, so that fair coins would promise too much. With an even
    number of days before, only after-days beyond the upper and the lower of the two middle values count as above
    and below. Days on the median count for neither side. No allowance is made for carry-over.

    Args:
        before: shape (m,), m ≥ 1, no NaN.
        after: shape (n,), n ≥ 1, no NaN.

    Source: Mathisen (1943), Ann. Math. Stat. 14:188-194.
    """
    row = np.sort(before)
    m, n = len(row), len(after)
    lower, upper = row[(m - 1) // 2], row[m // 2]
    above, below = int(np.sum(after > upper)), int(np.sum(after < lower))
    few = n - max(above, below)
    # Seen from the value that decides, so many baseline days lie on the side that few after-days are on.
    near = m // 2
    chances = [_chance(j, n, near, m - 1 - near) for j in range(few + 1)]
    return min(1.0, 2 * sum(chances))


def _chance(j: int, n: int, near: int, far: int) -> float:
    """Chance that exactly ``j`` of ``n`` days lie on the near side of a value between so many baseline days.

    Every order of the ``n`` and the baseline's days is as likely as every other.
    """

    def ways(chosen: int, of: int) -> float:
        return lgamma(of + 1) - lgamma(chosen + 1) - lgamma(of - chosen + 1)

    m = near + far + 1
    return exp(ways(j, j + near) + ways(n - j, n - j + far) - ways(n, m + n))
