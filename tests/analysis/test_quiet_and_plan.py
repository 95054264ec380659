"""A log gone quiet against its own habit, and the weeks of a plan."""

from __future__ import annotations

from datetime import date

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from analysis.questions.plan_kept import PlannedDays, WeekOfPlan, missed_running, weeks_of_plan
from analysis.questions.quiet import Quiet, quiet

MONDAY = date(2031, 3, 3).toordinal()


@pytest.mark.parametrize(
    ("days", "today", "expected", "longer"),
    [
        (range(100, 110), 110, Quiet(0, 0), False),
        (range(100, 110), 112, Quiet(2, 0), False),  # A weekend.
        (range(100, 110), 113, Quiet(3, 0), True),
        ([*range(100, 110), *range(113, 120)], 122, Quiet(2, 3), False),
        ([*range(100, 110), *range(113, 120)], 123, Quiet(3, 3), False),
        ([*range(100, 110), *range(113, 120)], 124, Quiet(4, 3), True),
        (range(100, 170, 7), 171, Quiet(7, 6), True),  # A weighing a week: a week and a day.
        (range(100, 170, 7), 170, Quiet(6, 6), False),
        ([100, 101], 107, Quiet(5, None), False),
        ([100, 101], 109, Quiet(7, None), True),
        ([*range(1, 20), 60, *range(200, 210)], 212, Quiet(2, 0), False),  # A gap long ago is no habit.
        ([100, 105], 103, Quiet(2, None), False),  # What comes later is not known yet.
        ([100], 100, Quiet(0, None), False),
    ],
)
def test_how_long_and_whether_that_is_unusual(days, today, expected, longer):
    found = quiet(list(days), today)
    assert found == expected
    assert found.is_longer == longer


def test_a_log_without_an_entry_is_not_quiet():
    assert quiet([], 100) is None
    assert quiet([200], 100) is None


def test_unchanged_loggers_are_rarely_called_quiet():
    """Days left out at random, one in six: on a Monday hardly anybody has gone quiet."""
    rng = np.random.default_rng(1)
    called = 0
    for _ in range(2_000):
        days = np.flatnonzero(rng.random(42) < 5 / 6)
        found = quiet(days.tolist(), 42)
        called += found is not None and found.is_longer
    assert called < 0.01 * 2_000


def test_whole_weeks_by_the_plan_in_force():
    plans = [PlannedDays(date.fromordinal(MONDAY), 5, 1), PlannedDays(date.fromordinal(MONDAY + 14), 3)]
    done = [MONDAY, MONDAY + 1, MONDAY + 2, MONDAY + 3, MONDAY + 8, MONDAY + 14, MONDAY + 15, MONDAY + 16]
    weeks = weeks_of_plan(done, plans, MONDAY - 3, MONDAY + 20)
    assert weeks == [
        WeekOfPlan(MONDAY, 4, 5, 1),
        WeekOfPlan(MONDAY + 7, 1, 5, 1),
        WeekOfPlan(MONDAY + 14, 3, 3, 0),
    ]
    assert [week.is_kept for week in weeks] == [True, False, True]
    assert missed_running(weeks) == 0
    assert missed_running(weeks[:2]) == 1


def test_a_week_that_is_not_over_is_not_judged():
    plan = [PlannedDays(date.fromordinal(MONDAY), 1)]
    assert weeks_of_plan([], plan, MONDAY, MONDAY + 5) == []
    assert len(weeks_of_plan([], plan, MONDAY, MONDAY + 6)) == 1


def test_a_plan_that_begins_in_the_week_is_not_asked_of_it():
    assert weeks_of_plan([], [PlannedDays(date.fromordinal(MONDAY + 1), 5)], MONDAY, MONDAY + 6) == []


def test_a_plan_ends_with_one_of_no_days():
    plans = [PlannedDays(date.fromordinal(MONDAY), 5), PlannedDays(date.fromordinal(MONDAY + 7), 0)]
    assert [week.first for week in weeks_of_plan([], plans, MONDAY, MONDAY + 20)] == [MONDAY]


def test_a_week_with_illness_in_it_is_not_judged():
    plan = [PlannedDays(date.fromordinal(MONDAY), 5)]
    weeks = weeks_of_plan([], plan, MONDAY, MONDAY + 20, paused=[(MONDAY + 9, MONDAY + 9)])
    assert [week.first for week in weeks] == [MONDAY, MONDAY + 14]
    assert missed_running(weeks) == 2


@given(start=st.integers(0, 6), first=st.integers(MONDAY - 20, MONDAY + 20), length=st.integers(0, 60))
def test_weeks_begin_on_their_day_and_stay_within(start, first, length):
    plan = [PlannedDays(date.fromordinal(MONDAY - 100), 3)]
    weeks = weeks_of_plan([], plan, first, first + length, week_start=start)
    assert all(date.fromordinal(week.first).weekday() == start for week in weeks)
    assert all(first <= week.first and week.first + 6 <= first + length for week in weeks)
    assert len(weeks) >= (length + 1) // 7 - 1
