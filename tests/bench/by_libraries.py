"""The quantities of a review through calls of general-purpose libraries: what the review's speed is held against.

The same questions are asked of the same days: level, shift and range, share of pairs, carry-over, slope, rhythm,
since when, still so, spread, and the recomputations of the doubts that this log gives reason to look at.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray
from scipy import stats
from statsmodels.stats.proportion import confint_proportions_2indep, proportion_confint
from statsmodels.tsa.stattools import acf

Values = NDArray[np.float64]


def level(before: Values, after: Values) -> tuple[float, float, float, float]:
    """Chance by luck, shift and its range, with the factor of carry-over on the variance."""
    chance = stats.mannwhitneyu(after, before, alternative="two-sided").pvalue
    r = max(acf(stats.rankdata(part), nlags=1, fft=False)[1] for part in (before, after))
    widened = (1 + max(r, 0.0)) / (1 - max(r, 0.0))
    gaps = np.sort(np.subtract.outer(after, before).ravel())
    m, n = len(before), len(after)
    cut = max(1, int(m * n / 2 - 1.96 * np.sqrt(widened * m * n * (m + n + 1) / 12)))
    return float(chance), float(np.median(gaps)), float(gaps[cut - 1]), float(gaps[-cut])


def review_by_libraries(days: NDArray[np.int64], values: Values, change: int) -> dict[str, object]:
    """Every quantity of one review of a log without blanks."""
    before, after = values[:change], values[change:]
    at = np.arange(len(values))
    weekend = (days - 1) % 7 >= 5
    found: dict[str, object] = {}
    for name, part in (("before", before), ("after", after)):
        found[f"box {name}"] = (np.median(part), np.mean(part), *np.percentile(part, [25, 75]))
    found["rhythm"] = stats.mannwhitneyu(values[weekend], values[~weekend])
    found["level"] = level(before, after)
    test = stats.brunnermunzel(before, after)
    found["share of pairs"] = (test.statistic, test.pvalue)
    found["since"] = [
        stats.norm.ppf(stats.rankdata(values) / (len(values) + 1))[:split].var()
        for split in range(3, len(values) - 2)
    ]
    found["still"] = [
        stats.mannwhitneyu(after[:split], after[split:]).pvalue for split in range(3, len(after) - 2, 4)
    ]
    found["spread"] = stats.fligner(before, after)
    for name, part, place in (("before", before, at[:change]), ("after", after, at[change:])):
        found[f"slope {name}"] = (stats.theilslopes(part, place), stats.spearmanr(place, part))
    found["better days"] = proportion_confint(int(np.sum(after > np.median(before))), len(after), method="wilson")
    found["goal"] = confint_proportions_2indep(
        int(np.sum(after > 30)), len(after), int(np.sum(before > 30)), len(before), method="newcomb"
    )
    # Recomputations: slope off, worst week, first week, odd days, weekdays alone, late days, equal days.
    slope = stats.theilslopes(values, at).slope
    found["slope off"] = level(before - slope * at[:change], after - slope * at[change:])
    for name, kept in (
        ("worst week", at[:change] < change - 7),
        ("first week", at[:change] >= 7),
        ("odd days", np.abs(before - np.median(before)) < 3 * stats.iqr(before)),
        ("weekdays", ~weekend[:change]),
    ):
        found[name] = level(before[kept], after)
    return found
