"""Days still needed, against simulation from a log's own days and against a general-purpose library."""

import numpy as np
import pytest
from statsmodels.stats.proportion import power_proportions_2indep

from analysis.questions.days_still_needed import days_needed_after, days_of_share, forecast
from analysis.questions.did_it_move import FAIRLY_SURE_BELOW, rank_sum

MINUTES = np.array(
    [20, 25, 25, 30, 15, 40, 35, 20, 30, 25, 45, 10, 30, 25, 20, 35, 30, 50, 25, 20, 15, 30, 40, 25, 35, 20.0]
)
"""An invented log of evening walks, rounded to five minutes."""


@pytest.mark.parametrize("amount", [10.0, 15.0])
@pytest.mark.parametrize("m", [20, 40])
def test_at_the_days_needed_the_move_is_seen_in_about_80_of_100_logs(amount, m):
    rng = np.random.default_rng(12)
    seen = told = 0
    for _ in range(600):
        before = rng.choice(MINUTES, m)
        days = days_needed_after(before, amount)
        if days is None or days > 300:
            continue
        told += 1
        after = rng.choice(MINUTES, days) + amount
        test = rank_sum(before, after)
        seen += test.p < FAIRLY_SURE_BELOW and test.share > 0.5
    assert told >= 400
    # Two standard errors of 600 logs are 3 in 100; a forecast from few days is itself uncertain.
    assert 0.72 * told <= seen <= 0.90 * told


def test_no_number_of_days_is_enough_for_a_small_amount_after_a_short_baseline():
    assert days_needed_after(MINUTES[:7], 3.0) is None
    assert days_needed_after(MINUTES, 0.5) is None
    assert days_needed_after(np.full(14, 30.0), 5.0) is not None


def test_more_is_needed_for_less_and_for_days_that_hang_together():
    few, more = days_needed_after(MINUTES, 20.0), days_needed_after(MINUTES, 12.0)
    assert few < more < days_needed_after(MINUTES, 12.0, widened=1.5)


def test_two_shares_agree_with_the_textbook_power():
    for m in (42, 58, 90):
        days = days_of_share(np.tile([0.0, 1.0], m // 2), 0.25)
        power = power_proportions_2indep(-0.25, 0.75, m, ratio=days / m, return_results=False)
        assert 0.80 <= power < 0.812


def test_minutes_of_a_log_told_by_days_become_days():
    # On half of 28 days there are 30 minutes: 7.5 minutes more a day are days with some on a quarter more.
    before = np.tile([0.0, 30.0], 14)
    assert days_of_share(before, 7.5) == days_of_share(np.sign(before), 0.25)
    assert days_of_share(np.zeros(20), 5.0) is None


def test_the_range_holds_the_guess_and_narrows_with_the_baseline():
    short = forecast(np.tile(MINUTES[:14], 1), 15.0, 0.1, 21, by_share=False)
    long = forecast(np.tile(MINUTES[:14], 3), 15.0, 0.1, 63, by_share=False)
    assert short.low <= short.days
    assert long.low <= long.days <= long.high
    assert short.high is None or short.high - short.low > long.high - long.low
