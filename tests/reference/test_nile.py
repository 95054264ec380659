"""The main job from end to end on the Nile's annual flow, 1871-1970.

Data: statsmodels 0.15 (public domain), from Cobb (1978), Biometrika 65:243-251, who finds a change near 1898.
The expected numbers were worked out with scipy, statsmodels and R apart from this project.
"""

from datetime import date

import numpy as np
import pytest
import statsmodels.api as sm
from statsmodels.tsa.stattools import acf

from analysis import Change, Log, Measure, review
from analysis.batch.ranks import midranks
from analysis.questions.since_when import plausible_splits, split_profile
from analysis.series.carry_over import carry_over


def years(*numbers):
    return tuple(date(number, 1, 1).toordinal() for number in numbers)


@pytest.fixture(scope="module")
def flow():
    return sm.datasets.nile.load_pandas().data["volume"].to_numpy(dtype=float)


@pytest.fixture(scope="module")
def nile(flow):
    log = Log.from_pairs(
        [(date(1871 + place, 1, 1), value) for place, value in enumerate(flow)], Measure("volume", period="year")
    )
    return review(log, [Change(date(1899, 1, 1), "dam")], (date(1871, 1, 1), date(1898, 12, 31)))


def test_fences_of_the_first_28_years(nile):
    baseline = nile.stretches[0]
    assert (baseline.lower_fourth, baseline.median, baseline.upper_fourth) == (994.5, 1130, 1195)
    assert (baseline.lower_fence, baseline.upper_fence) == (693.75, 1495.75)
    assert baseline.below == baseline.above == ()
    after = nile.stretches[1]
    assert (after.lower_fourth, after.median, after.upper_fourth) == (761.5, 842.5, 918.5)


def test_four_years_outside_and_1902_is_not_one(nile, flow):
    assert nile.answer.carried.below == years(1907, 1913, 1940, 1941)
    assert nile.answer.carried.above == ()
    # 1902 (694) is inside by a quarter; numpy's quartiles would put it outside.
    low, high = np.quantile(flow[:28], [0.25, 0.75])
    assert flow[31] == 694
    assert low - 1.5 * (high - low) > 694


def test_it_moved_by_260_less_and_surely(nile):
    answer = nile.answer
    assert answer.shift.estimate == -260
    assert answer.shift.share_of_pairs == pytest.approx(0.0989583, abs=1e-6)
    assert answer.sureness in ("fairly sure", "as sure as a log can be")
    assert answer.direction == "less"
    # The range is wider than the plain one, -316 to -196, since years carry over.
    assert answer.shift.low <= -316
    assert answer.shift.high >= -196
    assert answer.shift.high < -100


def test_it_began_about_1899(nile):
    since = nile.answer.since
    assert since.first <= date(1899, 1, 1).toordinal() <= since.last
    assert since.likely == date(1899, 1, 1).toordinal()
    assert not since.before_change


def test_least_squares_gives_the_break_after_1898(flow):
    # Least squares on the raw flow: the least sum of squares is 1597457.19, and the last years of the old level
    # within 1.92 of the best are 1897 and 1898.
    places, loss = split_profile(flow)
    best = int(places[np.argmin(loss)])
    assert 1871 + best - 1 == 1898
    assert np.var(flow[:best]) * best + np.var(flow[best:]) * (100 - best) == pytest.approx(1597457.19, abs=0.01)
    assert (1871 + places[loss <= 1.92] - 1).tolist() == [1897, 1898]


def test_ranks_put_the_break_where_pettitts_statistic_does(flow):
    # Pettitt (1979), Appl. Stat. 28:126-135: K = 1617 after the 28th year; R's documentation says near 1898.
    ranks = midranks(flow)
    statistic = 2 * np.cumsum(ranks) - np.arange(1, 101) * 101
    assert (int(np.argmax(np.abs(statistic))) + 1, np.abs(statistic).max()) == (28, 1617)
    assert plausible_splits(flow)[0] == 28


def test_carry_over_is_taken_within_the_stretches(flow, nile):
    whole = acf(flow, nlags=1, fft=False)[1]
    assert whole == pytest.approx(0.49840818)
    assert carry_over([flow]) > 0.4
    # Within the stretches it is 0.12 and 0.18: the persistence of the whole is mostly the step.
    assert nile.answer.carry_over < 0.25
