"""Shift, share of pairs, ranges and chances against handbook examples and general-purpose libraries."""

import itertools

import numpy as np
import pytest
import scipy.stats
from statsmodels.stats.proportion import confint_proportions_2indep, proportion_confint

from analysis.questions.by_how_much import (
    difference_of_shares,
    ordered_differences,
    share_range,
    shift,
    wilson,
)
from analysis.questions.did_it_move import rank_sum


def floats(*values):
    return np.array(values, dtype=float)


# Hollander & Wolfe (1973), p. 69, as in R's documentation of wilcox.test.
PERMEABILITY_X = floats(0.80, 0.83, 1.89, 1.04, 1.45, 1.38, 1.91, 1.64, 0.73, 1.46)
PERMEABILITY_Y = floats(1.15, 0.88, 0.90, 0.74, 1.21)
# Brunner & Munzel (2000), Biom. J. 42:17-25: pain on the third day.
PAIN_Y = floats(1, 2, 1, 1, 1, 1, 1, 1, 1, 1, 2, 4, 1, 1)
PAIN_N = floats(3, 3, 4, 3, 1, 2, 3, 1, 1, 5, 4)
# Hogarty & Kromrey (1999), data in public documentation.
TEN_DAYS = floats(10, 10, 20, 20, 20, 30, 30, 30, 40, 50)
SIX_DAYS = floats(10, 20, 30, 40, 40, 50)


def test_permeability_example_of_hollander_and_wolfe():
    test = rank_sum(PERMEABILITY_Y, PERMEABILITY_X)
    assert test.pairs_won == 35
    assert test.share == pytest.approx(0.70)
    # Two-sided exact: twice the printed one-sided .1272061; the normal chance is smaller.
    assert test.p == pytest.approx(2 * 0.1272061, abs=1e-6)
    estimate, low, high = shift(PERMEABILITY_Y, PERMEABILITY_X)
    assert estimate == pytest.approx(0.305)
    # R prints -.15 to .76 (true 96.0 %); the normal rule takes the difference before, -.17, at the lower end.
    assert low == pytest.approx(-0.17)
    assert high == pytest.approx(0.76)


def test_pain_example_of_brunner_and_munzel():
    assert rank_sum(PAIN_Y, PAIN_N).share == pytest.approx(0.788961, abs=1e-6)


def test_wins_ties_and_losses_of_hogarty_and_kromrey():
    assert rank_sum(SIX_DAYS, TEN_DAYS).share == pytest.approx(0.375)


def test_tied_example_agrees_with_full_enumeration_and_not_with_the_table_without_ties():
    before, after = floats(0, 0, 15, 20, 30), floats(15, 30, 30, 45, 60)
    both = scipy.stats.rankdata(np.concatenate([before, after]))
    sums = np.array([sum(one) for one in itertools.combinations(both, 5)])
    exact = np.mean(np.abs(sums - sums.mean()) >= abs(both[5:].sum() - sums.mean()) - 1e-9)
    assert exact == pytest.approx(20 / 252)
    assert rank_sum(before, after).p == pytest.approx(20 / 252)
    assert scipy.stats.mannwhitneyu(after, before, method="exact").pvalue == pytest.approx(0.0952, abs=1e-4)
    assert shift(before, after)[0] == 25


@pytest.mark.parametrize(("m", "n", "smallest"), [(4, 4, 0.0286), (5, 3, 0.0357), (5, 5, 0.0079), (7, 7, 0.00058)])
def test_smallest_chances_of_complete_separation(m, n, smallest):
    # Tables of the rank-sum test, e.g. Hollander & Wolfe (1973), table A.5; two-sided.
    before, after = np.arange(m, dtype=float), 100 + np.arange(n, dtype=float)
    exact = scipy.stats.mannwhitneyu(after, before, method="exact").pvalue
    assert exact == pytest.approx(smallest, rel=0.01)
    assert rank_sum(before, after).p >= exact


def test_chance_agrees_with_scipy_on_many_tied_logs():
    rng = np.random.default_rng(2)
    for m, n in [(14, 28), (28, 28), (40, 60)]:
        before, after = rng.poisson(6, m).astype(float), rng.poisson(7, n).astype(float)
        theirs = scipy.stats.mannwhitneyu(after, before, method="asymptotic")
        ours = rank_sum(before, after)
        assert ours.pairs_won == theirs.statistic
        assert ours.p == pytest.approx(theirs.pvalue, rel=1e-9)


def test_exact_chance_agrees_with_scipy_without_ties():
    rng = np.random.default_rng(3)
    for m, n in [(7, 14), (14, 14), (5, 9)]:
        before, after = rng.normal(size=m), rng.normal(0.8, 1, size=n)
        exact = scipy.stats.mannwhitneyu(after, before, method="exact").pvalue
        plain = scipy.stats.mannwhitneyu(after, before, method="asymptotic", use_continuity=False).pvalue
        assert rank_sum(before, after).p == pytest.approx(max(exact, plain), rel=1e-9)


@pytest.mark.parametrize(
    ("m", "n", "place"), [(10, 5, 9), (5, 5, 3), (7, 7, 9), (7, 14, 23), (14, 14, 56), (4, 4, 1)]
)
def test_the_range_of_the_shift_stands_at_the_tabled_place(m, n, place):
    # R's qwilcox(.025, m, n); the normal rule may give the place before it, which is the wider range.
    before, after = np.zeros(m), np.zeros(n)
    before[:], after[:] = np.arange(m) * 1000.0, np.arange(n) * 1.0
    differences = sorted(a - b for a in after for b in before)
    _, low, high = shift(before, after)
    assert low in (differences[place - 1], differences[max(place - 2, 0)])
    assert high in (differences[-place], differences[-max(place - 1, 1)])


@pytest.mark.parametrize(("m", "n"), [(90, 110), (200, 300), (65, 64)])
def test_counting_differences_gives_the_same_as_writing_them_out(m, n):
    rng = np.random.default_rng(m)
    for before, after in (
        (rng.normal(size=m), rng.normal(size=n)),
        (rng.poisson(4, m).astype(float), rng.poisson(5, n).astype(float)),
        (np.zeros(m), np.zeros(n)),
        (rng.normal(0, 1e-12, m), rng.normal(1e9, 1, n)),
    ):
        listed = np.sort((after[:, None] - before[None, :]).ravel())
        places = [1, 2, m * n // 3, m * n // 2, m * n - 1, m * n]
        assert ordered_differences(before, after, places) == [listed[place - 1] for place in places]


@pytest.mark.parametrize(
    ("share", "low", "high"),
    [(0.5, 0.3031, 0.6969), (0.7, 0.4825, 0.8481), (0.8, 0.5863, 0.9132), (0.9, 0.7049, 0.9684)],
)
def test_range_of_the_share_of_pairs_for_two_fortnights(share, low, high):
    # Newcombe (2006), method 5; the formula from memory, the values computed from it apart from this project.
    assert share_range(share, 14, 14) == pytest.approx((low, high), abs=5e-5)


@pytest.mark.parametrize(("days", "low"), [(5, 0.6427), (7, 0.7260), (10, 0.8002), (14, 0.8552), (28, 0.9281)])
def test_range_of_a_complete_separation_does_not_collapse(days, low):
    assert share_range(1.0, days, days) == pytest.approx((low, 1.0), abs=5e-5)


def test_ratings_example_of_hanley_and_mcneil():
    # Hanley & McNeil (1982), Radiology 143:29-36, table of ratings (data and .893 from memory).
    normal = np.repeat([1.0, 2, 3, 4, 5], [33, 6, 6, 11, 2])
    abnormal = np.repeat([1.0, 2, 3, 4, 5], [3, 2, 2, 11, 33])
    share = rank_sum(normal, abnormal).share
    assert share == pytest.approx(0.893171, abs=1e-6)
    assert share_range(share, 58, 51) == pytest.approx((0.8117, 0.9400), abs=5e-5)


@pytest.mark.parametrize(
    ("first", "second", "low", "high"),
    [
        ((56, 70), (48, 80), 0.0524, 0.3339),
        ((9, 10), (3, 10), 0.1705, 0.8090),
        ((6, 7), (2, 7), 0.0582, 0.8062),
        ((5, 56), (0, 29), -0.0381, 0.1926),
        ((0, 10), (0, 20), -0.1611, 0.2775),
        ((0, 10), (0, 10), -0.2775, 0.2775),
        ((10, 10), (0, 20), 0.6791, 1.0000),
        ((10, 10), (0, 10), 0.6075, 1.0000),
    ],
)
def test_differences_of_shares_of_newcombes_table_two(first, second, low, high):
    # Newcombe (1998), Stat. Med. 17:873-890, table II, method 10 (the first row read, the others from memory).
    assert difference_of_shares(second, first) == pytest.approx((low, high), abs=5e-5)


@pytest.mark.parametrize(
    ("met", "days", "low", "high"),
    [
        (81, 263, 0.2553, 0.3662),
        (15, 148, 0.0624, 0.1605),
        (0, 20, 0.0, 0.1611),
        (1, 29, 0.0061, 0.1718),
        (18, 20, 0.698966, 0.972134),
        (4, 20, 0.080658, 0.416017),
    ],
)
def test_ranges_of_one_share(met, days, low, high):
    # Newcombe (1998), Stat. Med. 17:857-872, table I (from memory), and reference values of statsmodels' tests.
    assert wilson(met, days) == pytest.approx((low, high), abs=5e-5)


def test_shares_agree_with_statsmodels():
    for met_b, n_b, met_a, n_a in [(3, 14, 10, 14), (5, 14, 11, 14), (0, 7, 7, 7), (12, 28, 20, 28)]:
        theirs = confint_proportions_2indep(met_a, n_a, met_b, n_b, method="newcomb", compare="diff")
        assert difference_of_shares((met_b, n_b), (met_a, n_a)) == pytest.approx(theirs, abs=1e-9)
        assert wilson(met_a, n_a) == pytest.approx(proportion_confint(met_a, n_a, method="wilson"), abs=1e-9)
