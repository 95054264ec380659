"""The season of monthly logs, against a general-purpose library and open data."""

from datetime import date

import numpy as np
import pytest
import statsmodels.api as sm
from scipy import stats

from analysis import Change, Log, Measure, review
from analysis.series.season import chi_square_beyond, kruskal_wallis
from desktop.wording.findings import findings_of


@pytest.mark.parametrize("freedom", [1, 2, 3, 6, 11])
def test_the_chi_square_agrees_with_a_library(freedom):
    for value in (0.01, 0.7, 3.2, 11.0, 40.0, 300.239):
        assert chi_square_beyond(value, freedom) == pytest.approx(stats.chi2.sf(value, freedom), rel=1e-10)
    assert chi_square_beyond(0.0, freedom) == 1.0


def test_groups_agree_with_a_published_example_and_a_library():
    # Hollander & Wolfe (1973), p. 116, as printed in R's help: H = 0.7714286, p = 0.6799648.
    groups = [[2.9, 3.0, 2.5, 2.6, 3.2], [3.8, 2.7, 4.0, 2.4], [2.8, 3.4, 3.7, 2.2, 2.0]]
    assert kruskal_wallis([np.array(group) for group in groups]) == pytest.approx(0.6799648, abs=1e-7)
    tied = [np.array([1.0, 2, 2, 3]), np.array([2.0, 3, 3, 4]), np.array([4.0, 4, 1, 5])]
    assert kruskal_wallis(tied) == pytest.approx(stats.kruskal(*tied).pvalue)
    assert kruskal_wallis([np.ones(4), np.ones(5)]) == 1.0


def sea_temperature() -> Log:
    """Monthly sea temperature Nino 1+2, 1950-2010, which statsmodels carries (public domain), one row a month."""
    table = sm.datasets.elnino.load_pandas().data
    pairs = [
        (date(int(row.iloc[0]), month, 1), float(row.iloc[month]))
        for _, row in table.iterrows()
        for month in range(1, 13)
    ]
    return Log.from_pairs(pairs, Measure("Sea temperature", "°C", period="month"))


BASELINE = (date(1950, 1, 1), date(1980, 12, 31))


def test_sea_temperature_has_its_season_taken_off_before_a_fence_means_something():
    answer = review(sea_temperature(), [Change(date(1981, 1, 1), "later")], BASELINE)
    baseline = answer.stretches[0]
    assert answer.answer.season.taken_off
    # Fourths -0.525, 0, 0.735 and fences -2.415, 2.625 around the level: by scipy and numpy alone.
    assert baseline.lower_fourth - baseline.median == pytest.approx(-0.525, abs=0.006)
    assert baseline.upper_fourth - baseline.median == pytest.approx(0.735, abs=0.006)
    assert baseline.lower_fence - baseline.median == pytest.approx(-2.415, abs=0.006)
    assert baseline.upper_fence - baseline.median == pytest.approx(2.625, abs=0.006)
    high = [date.fromordinal(day) for day in answer.answer.carried.above]
    # The two largest events of the century stand out: 1982-83 ten months in a row, 1997-98 fourteen.
    assert answer.answer.carried.below == ()
    assert len(high) == 25
    assert high[:10] == [date(1982 + (at > 12), (at - 1) % 12 + 1, 1) for at in range(11, 21)]
    assert high[10] == date(1992, 5, 1)
    assert high[11:] == [date(1997 + (at > 12), (at - 1) % 12 + 1, 1) for at in range(5, 19)]
    early = [date.fromordinal(day).isoformat()[:7] for day in baseline.above]
    assert early == ["1957-05", "1957-06", "1972-06", "1972-07", "1972-08"]
    assert baseline.below == ()
    assert "The time of year is taken off: each month is held against its own usual level." in (
        findings_of(answer).lines()
    )


def test_without_that_no_month_would_be_outside():
    log = sea_temperature()
    weekly = review(Log.from_columns(Measure(period="day"), log.days, log.values, log.kinds), [], BASELINE)
    assert weekly.answer.season is None
    before = weekly.stretches[0]
    assert (round(before.lower_fence, 2), round(before.upper_fence, 2)) == (15.43, 30.31)
    assert weekly.answer.carried.above == weekly.answer.carried.below == ()


def test_months_without_a_season_are_left_as_they_are():
    rng = np.random.default_rng(6)
    pairs = [(date(2020 + at // 12, at % 12 + 1, 1), float(rng.normal(30, 4))) for at in range(72)]
    answer = review(Log.from_pairs(pairs, Measure(period="month")))
    assert answer.answer.season.taken_off is False
    assert answer.points.values.tolist() == [value for _, value in pairs]
    assert review(Log.from_pairs(pairs[:30], Measure(period="month"))).answer.season is None


def test_carbon_dioxide_is_a_steady_rise_and_not_a_move_at_a_change():
    """Weekly carbon dioxide 1958-2001, which statsmodels carries (public domain): 1.35 ppm a year."""
    table = sm.datasets.co2.load_pandas().data["co2"]
    pairs = [(day.date(), None if np.isnan(value) else float(value)) for day, value in table.items()]
    log = Log.from_pairs(pairs, Measure("Carbon dioxide", "ppm", period="week"))
    for change in (date(1964, 1, 4), date(1980, 1, 5)):
        answer = review(log, [Change(change, "a change that was none")])
        said = findings_of(answer)
        assert answer.answer.sureness == "leaning"
        assert said.headline == "It was moving all along, by about 1.3 ppm higher a year."
        assert "It moves steadily, so weeks outside the old fences say nothing here." in said.lines()
        assert not any("outside the old fences," in line for line in said.lines())
        assert "Since when?" not in {section.title for section in said.sections}
    alone = findings_of(review(log))
    assert alone.headline == "No week is out of line with the rest."
    assert "It is moving steadily, by about 1.4 ppm higher a year." in alone.lines()
