"""Slope, spread, scores and early looks against scipy and published values; differences of definition as such."""

from __future__ import annotations

from datetime import date

import numpy as np
import pytest
import statsmodels.api as sm
from scipy import stats

from analysis import Change, Log, Measure, review
from analysis.batch.ranks import midranks
from analysis.questions.since_when import normal_scores
from analysis.questions.steadier import spread_change
from analysis.series.carry_over import carry_over
from analysis.series.slope import common_slope
from desktop.wording.findings import findings_of

SEEDS = range(12)


def row(seed: int, length: int = 40, slope: float = 0.0) -> np.ndarray:
    rng = np.random.default_rng(seed)
    return np.round(50 + slope * np.arange(length) + rng.normal(0, 5, length), 1)


@pytest.mark.parametrize("seed", SEEDS)
@pytest.mark.parametrize("slope", [0.0, 0.2, -0.3])
def test_the_amount_is_that_of_theil_and_sen(seed, slope):
    values, at = row(seed, slope=slope), np.arange(40)
    assert common_slope([at], [values]).a_period == pytest.approx(stats.theilslopes(values, at).slope, abs=1e-12)


def test_a_worked_example():
    """Fourteen temperatures of J. Little's worked example of a trend test (College of the Holy Cross)."""
    values = np.array([12.9, 14.8, 13.2, 15.7, 13.8, 15.6, 12.9, 11.0, 17.3, 15.9, 19.0, 18.3, 20.1, 21.7])
    assert common_slope([np.arange(14)], [values]).a_period == pytest.approx(0.566667, abs=1e-6)


def test_the_nile_slope():
    """-2.6 a year over 1871-1970, on the series that statsmodels carries."""
    values = sm.datasets.nile.load_pandas().data["volume"].to_numpy(dtype=float)
    at = np.arange(len(values))
    assert common_slope([at], [values]).a_period == pytest.approx(-2.6, abs=1e-9)
    assert stats.theilslopes(values, at).slope == pytest.approx(-2.6, abs=1e-9)


def test_the_nile_in_words():
    """It moved, since about 1899, to less: the change that everyone who dated this series agrees on."""
    values = sm.datasets.nile.load_pandas().data["volume"].to_numpy(dtype=float)
    log = Log.from_pairs(
        [(date(1871 + at, 1, 1), float(value)) for at, value in enumerate(values)],
        Measure("Flow", "10^8 m3", period="year"),
    )
    said = findings_of(
        review(log, [Change(date(1899, 1, 1), "dam")], (date(1871, 1, 1), date(1898, 1, 1)))
    ).lines()
    assert said[0].startswith("It moved: ")
    assert said[1].startswith("As sure as a log can be: 28 years before, 72 after.")
    assert any(line.startswith("Most likely since 1899; any start from 1897 to 1900") for line in said)


@pytest.mark.parametrize("seed", SEEDS)
def test_the_chance_is_that_of_spearmans_correlation(seed):
    """By the normal law of rho times the root of n - 1; scipy takes Student's law, which differs little at 40."""
    values, at = row(seed, slope=0.1), np.arange(40)
    found = stats.spearmanr(at, values)
    ours = common_slope([at], [values]).p
    normal = 2 * stats.norm.sf(abs(found.statistic) * np.sqrt(len(values) - 1))
    assert ours == pytest.approx(normal, rel=1e-9)
    assert ours == pytest.approx(found.pvalue, abs=0.015)


@pytest.mark.parametrize("seed", SEEDS)
def test_scores_are_the_normal_quantiles_of_ranks(seed):
    values = np.round(row(seed), 0)
    expected = stats.norm.ppf(stats.rankdata(values) / (len(values) + 1))
    assert normal_scores(values) == pytest.approx(expected, abs=1e-12)
    assert midranks(values) == pytest.approx(stats.rankdata(values), abs=0)


def test_spread_agrees_with_fligner_and_killeen_where_they_ask_the_same():
    """They take scores of all distances, we take their ranks: the chances differ, the verdict hardly ever."""
    differ = 0
    for seed in range(60):
        rng = np.random.default_rng(seed)
        before, after = rng.normal(0, 1, 28), rng.normal(0, 1 if seed % 2 else 3, 28)
        ours = spread_change(before, after)
        theirs = stats.fligner(before, after).pvalue
        differ += (ours.word != "alike") != (theirs < 0.05)
        if seed % 2 == 0:
            assert ours.word == "more scattered"
            assert theirs < 0.05
    assert differ <= 4


def test_the_correction_of_carry_over_is_the_published_one():
    """Marriott & Pope (1954), Kendall (1954): E r = rho - (1 + 4 rho) / n, here for the ranks of two stretches.

    Checked against what it is to give: the mean over many rows of a known carry-over.
    """
    for rho in (0.0, 0.3, 0.6):
        found = []
        for seed in range(400):
            rng = np.random.default_rng(seed)
            rows = []
            for _ in range(2):
                one = np.empty(28)
                one[0] = rng.normal()
                for at in range(1, 28):
                    one[at] = rho * one[at - 1] + np.sqrt(1 - rho**2) * rng.normal()
                rows.append(one)
            centred = [stats.rankdata(one) - 14.5 for one in rows]
            raw = sum(one[1:] @ one[:-1] for one in centred) / sum(one @ one for one in centred)
            assert carry_over(rows) == pytest.approx(np.clip((56 * raw + 2) / 48, 0, 0.9), abs=1e-9)
            found.append((56 * raw + 2) / 48)
        # Ranks of a normal row hang together a little less than its values.
        assert np.mean(found) == pytest.approx(6 / np.pi * np.arcsin(rho / 2), abs=0.03)


@pytest.mark.parametrize(
    ("share", "limit"), [(0.2, 4.383), (0.4, 3.099), (0.6, 2.530), (0.8, 2.191), (1.0, 1.960)]
)
def test_early_looks_are_judged_by_the_shape_of_obrien_and_fleming(share, limit):
    """The limit is that of the last look divided by the root of the share of days that are in.

    With five looks their limits are 4.56, 3.23, 2.63, 2.28, 2.04 (published, here from memory): the same shape
    from 2.04, which pays for the looks; here the day agreed on is judged by the usual limit.
    """
    usual = stats.norm.ppf(0.975)
    assert usual / np.sqrt(share) == pytest.approx(limit, abs=0.001)
    published = {0.2: 4.56, 0.4: 3.23, 0.6: 2.63, 0.8: 2.28, 1.0: 2.04}
    assert published[share] / (usual / np.sqrt(share)) == pytest.approx(2.04 / usual, rel=0.01)
