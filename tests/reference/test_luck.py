"""The chance that an unchanged day lies outside, against published rates and a simulation of its own."""

from math import erfc, sqrt

import numpy as np
import pytest

from analysis.batch.fences import fences, is_above, is_below
from analysis.batch.fourths import fourths
from analysis.batch.luck import new_day_rate, some_outside_rate


def _simulated(n, baselines, rng):
    """Days outside per 100, own points outside per 100, share of baselines with any own point outside."""
    new = own = some = 0
    for _ in range(baselines):
        values = rng.standard_normal(n)
        fence = fences(fourths(values), n)
        later = rng.standard_normal(40)
        new += is_above(later, fence.upper).sum() + is_below(later, fence.lower).sum()
        inside = is_above(values, fence.upper).sum() + is_below(values, fence.lower).sum()
        own += inside
        some += inside > 0
    return 100 * new / baselines / 40, 100 * own / baselines / n, some / baselines


def test_known_fences_of_the_normal_law_leave_out_seven_in_a_thousand():
    # 2 Φ(−4 z.75); recomputed from the normal law, quoted as 0.7 % by Hoaglin, Iglewicz & Tukey (1986).
    step = 4 * 0.6744897501960817
    assert erfc(step / sqrt(2)) == pytest.approx(0.0069766, abs=5e-8)
    assert new_day_rate(10_000) == pytest.approx(0.0069766, abs=5e-5)


@pytest.mark.parametrize(("n", "own_percent", "some"), [(5, 8.6, 0.332), (20, 1.65, 0.233)])
def test_own_days_outside_agree_with_the_1986_study(n, own_percent, some):
    # Hoaglin, Iglewicz & Tukey (1986): 8.6 % of observations outside at n = 5, 1.7 % at n = 20; all inside in 67 %
    # of samples at n = 5. Another public simulation of 100,000 samples gives 0.233 with any outside at n = 20.
    _, own, any_outside = _simulated(n, 20_000, np.random.default_rng(5))
    assert own == pytest.approx(own_percent, abs=0.3)
    assert any_outside == pytest.approx(some, abs=0.012)


@pytest.mark.parametrize(("n", "percent"), [(7, 10.44), (14, 3.96), (28, 2.04)])
def test_new_days_outside_agree_with_an_independent_count(n, percent):
    counted, _, _ = _simulated(n, 30_000, np.random.default_rng(n))
    assert 100 * new_day_rate(n) == pytest.approx(percent, abs=0.15)
    assert counted == pytest.approx(100 * new_day_rate(n), abs=0.25)


@pytest.mark.parametrize("n", range(56, 130))
def test_the_rate_has_no_step_where_the_table_ends(n):
    assert 0 < new_day_rate(n) - new_day_rate(n + 4) < 0.001


def test_no_rate_where_there_are_no_fences():
    with pytest.raises(ValueError, match="no fences"):
        new_day_rate(4)


@pytest.mark.parametrize(("days", "share"), [(7, 0.24), (9, 0.32), (28, 0.28), (56, 0.40), (365, 0.90)])
def test_some_day_outside_its_own_fences_is_as_common_as_counted(days, share):
    # Counted with 4,000 plain normal logs of each length; the pattern in days modulo 4 is left out of the rate.
    assert some_outside_rate(days) == pytest.approx(share, abs=0.10)
