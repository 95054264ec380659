"""How days become observations."""

from dataclasses import replace
from datetime import date, timedelta

import numpy as np
import pytest

from analysis import Change, Log, Measure, Span, review
from analysis.points import period_firsts, period_keys, points_of
from tests.builders import FIRST_DAY, day, log_of, number


def kinds_log(kinds_and_values, **measure):
    return Log.from_columns(
        Measure(**measure),
        [number(place) for place in range(len(kinds_and_values))],
        [float("nan") if value is None else value for _, value in kinds_and_values],
        [kind for kind, _ in kinds_and_values],
    )


def test_days_of_a_span_of_illness_or_absence_are_in_no_number():
    spans = [Span(day(3), day(5), "ill", "a cold"), Span(day(8), day(9), "device", "new watch")]
    log = log_of([20, 30, 25, 5, None, 6, 28, None, 31, 22], missed="zero", kind="amount")
    points = points_of(replace(log, spans=tuple(spans)))
    assert np.flatnonzero(~points.known).tolist() == [3, 4, 5]
    assert points.values[7] == 0
    assert points.values[8] == 31


def test_a_blank_stays_blank():
    points = points_of(log_of([5, None, 7]))
    assert np.isnan(points.values[1])
    assert len(points) == 3


def test_a_missed_day_counts_as_zero_only_between_the_first_and_the_last_logged_day():
    log = Log.from_pairs(
        [(day(0), None), (day(1), 20), (day(4), 30), (day(6), None)], Measure(kind="amount", missed="zero")
    )
    points = points_of(log)
    assert points.values.tolist() == [20, 0, 0, 30]
    assert points.filled.tolist() == [False, True, True, False]
    assert points.first[0] == number(1)


@pytest.mark.parametrize(
    ("kind", "value", "amount", "reading"),
    [
        ("value", 8, 8, 8),
        ("zero", 0, 0, 0),
        ("late", 8, 8, 8),
        ("rest", None, 0, None),
        ("ill", None, None, None),
        ("away", None, None, None),
        ("set aside", 8, None, None),
        ("extra", 8, None, None),
    ],
)
def test_each_kind_of_day_in_the_numbers(kind, value, amount, reading):
    days = [("value", 5), (kind, value), ("value", 6)]
    for expected, measure in ((amount, "amount"), (reading, "reading")):
        seen = points_of(kinds_log(days, kind=measure)).values[1]
        assert np.isnan(seen) if expected is None else seen == expected


def test_an_ill_day_is_not_a_missed_one():
    days = [("value", 5), ("ill", None), ("blank", None), ("value", 6)]
    points = points_of(kinds_log(days, kind="amount", missed="zero"))
    assert np.isnan(points.values[1])
    assert points.values[2] == 0


@pytest.mark.parametrize(
    ("rule", "expected"),
    [("sum", 60), ("mean", 20), ("median", 15), ("first", 5), ("last", 40), ("max", 40), ("min", 5)],
)
def test_several_a_day_become_one_by_the_rule(rule, expected):
    log = Log.from_pairs(
        [(day(0), 5, "1"), (day(0), 15, "2"), (day(0), 40, "3"), (day(1), 9)], Measure(combine=rule)
    )
    assert points_of(log).values.tolist() == [expected, 9]


def test_weeks_run_from_monday_and_an_unfinished_one_is_left_out():
    # Wednesday 5 March to Tuesday 25 March: two whole weeks, the first and the last are cut.
    log = Log.from_pairs(
        [(date(2031, 3, 5) + timedelta(place), 1) for place in range(21)], Measure(kind="amount", period="week")
    )
    stretch = review(log).stretches[0]
    assert stretch.observations == 2
    assert stretch.median == 7
    assert date.fromordinal(stretch.first) == date(2031, 3, 10)


def test_a_week_cut_by_a_change_belongs_to_neither_side():
    log = log_of([1] * 42, kind="amount", period="week")
    before, after = review(log, [Change(day(17), "later bus")]).stretches
    assert (before.observations, after.observations) == (2, 3)


def test_weeks_can_start_on_another_day():
    days = np.arange(number(0), number(15))
    keys = period_keys(days, "week", week_start=3)
    firsts = [date.fromordinal(int(first)) for first in period_firsts(np.unique(keys), "week", 3)]
    assert all(first.weekday() == 3 for first in firsts)


def test_months_and_years_know_the_calendar():
    days = np.array([date(2031, 1, 31).toordinal(), date(2031, 2, 1).toordinal(), date(2032, 2, 29).toordinal()])
    firsts = period_firsts(period_keys(days, "month"), "month")
    assert [date.fromordinal(int(first)) for first in firsts] == [
        date(2031, 1, 1),
        date(2031, 2, 1),
        date(2032, 2, 1),
    ]
    firsts = period_firsts(period_keys(days, "year"), "year")
    assert [date.fromordinal(int(first)).year for first in firsts] == [2031, 2031, 2032]


def test_days_before_1970_fall_in_their_own_month():
    keys = np.array([date(1899, 12, 31).toordinal()])
    assert date.fromordinal(int(period_firsts(period_keys(keys, "month"), "month")[0])) == date(1899, 12, 1)


def test_monthly_rows_stand_for_their_months_even_the_first_and_the_last():
    rows = [(date(2031, month, 1), month) for month in range(1, 13)]
    assert review(Log.from_pairs(rows, Measure(period="month"))).stretches[0].observations == 12


def test_month_end_rows_stand_for_their_months():
    rows = [(date(2031, month + 1, 1) - timedelta(1), month) for month in range(1, 12)]
    assert review(Log.from_pairs(rows, Measure(period="month"))).stretches[0].observations == 11


def test_yearly_rows_of_one_date_stand_for_their_years_leap_or_not():
    rows = [(date(year, 12, 31), year) for year in range(1890, 1910)]
    assert review(Log.from_pairs(rows, Measure(period="year"))).stretches[0].observations == 20


def test_daily_rows_cut_by_the_edges_of_the_log_are_no_months():
    log = Log.from_pairs(
        [(date(2031, 1, 15) + timedelta(place), 1) for place in range(80)], Measure(kind="amount", period="month")
    )
    assert review(log).stretches[0].observations == 2


def test_nothing_after_today_is_used():
    assert review(log_of(range(30)), today=day(9)).stretches[0].observations == 10


def test_settling_in_days_are_in_no_number():
    log = log_of([10] * 14 + [99] * 3 + [20] * 11)
    before, after = review(log, [Change(day(14), "stretching", settle_days=3)]).stretches
    assert (before.median, after.median) == (10, 20)
    assert after.observations == 11
    assert after.first == number(17)
    assert after.change == number(14)


def test_days_outside_a_chosen_baseline_are_in_no_number():
    log = log_of([99] * 5 + [10] * 10 + [50] * 6 + [20] * 9)
    before, after = review(log, [Change(day(21), "x")], (day(5), day(14))).stretches
    assert (before.median, before.observations) == (10, 10)
    assert (after.median, after.observations) == (20, 9)


def test_a_chosen_baseline_without_a_change_makes_one_after_stretch():
    _, after = review(log_of([10] * 10 + [20] * 10), baseline=(FIRST_DAY, day(9))).stretches
    assert (after.name, after.label, after.change, after.observations) == ("after", None, None, 10)
