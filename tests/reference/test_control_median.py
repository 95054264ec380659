"""The control-median test, against counted values and against drawing at random."""

import numpy as np
import pytest

from analysis.questions.control_median import control_median


@pytest.mark.parametrize(
    ("before", "after", "below", "one_sided"),
    [(15, 14, 0, 0.0014993), (15, 14, 1, 0.0094953), (15, 14, 2, 0.0329), (7, 7, 0, 0.0349650)],
)
def test_counted_chances_of_an_odd_baseline(before, after, below, one_sided):
    """Counted from P(V = j) = C(j+r, r) C(m-j+r, r) / C(m+n, n), and simulated, outside this project."""
    old = np.arange(before, dtype=float)
    new = np.r_[np.full(below, -1.0), np.full(after - below, 99.0)]
    assert control_median(old, new) == pytest.approx(2 * one_sided, abs=5e-5)
    assert control_median(-old, -new) == pytest.approx(2 * one_sided, abs=5e-5)


@pytest.mark.parametrize("before", [7, 8, 14, 15, 28])
def test_unchanged_logs_are_called_seldom_enough(before):
    rng = np.random.default_rng(before)
    called = sum(control_median(rng.normal(size=before), rng.normal(size=14)) < 0.05 for _ in range(2000))
    # 5 of 100 and two standard errors; a discrete test stays below.
    assert called <= 120


def test_days_on_the_old_median_are_on_neither_side():
    assert control_median(np.full(9, 5.0), np.full(9, 5.0)) == 1.0
    assert control_median(np.arange(9.0), np.r_[np.full(5, 4.0), 9.0, 9.0, 9.0, 9.0]) > 0.5
