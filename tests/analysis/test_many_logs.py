"""Many logs at once: the answers of single reviews, in order, flagged within the budget, stoppable."""

from datetime import timedelta

import numpy as np
import pytest

from analysis import AnalysisError, Change, Log, Measure, Span, chance_of, review, review_many
from tests.builders import FIRST_DAY, day, log_of

LOGS = 70
"""Enough for the work to be shared."""


def noise(seed, count=28, moved_from=None, by=0.0):
    values = np.random.default_rng(seed).normal(30, 5, count)
    if moved_from is not None:
        values[moved_from:] += by
    return log_of(np.round(values, 1).tolist())


def changed(seed, by=0.0):
    return noise(seed, 28, 14, by), {"changes": [Change(day(14), "stairs")]}


def test_shared_work_gives_the_answers_of_single_reviews_in_order():
    asked = [changed(seed, 8.0 * (seed % 2)) for seed in range(LOGS)]
    seen = []
    many = review_many(asked, on_review=lambda place, one: seen.append((place, one)))
    assert [one.to_json() for one in many] == [review(log, **how).to_json() for log, how in asked]
    assert [place for place, _ in seen] == list(range(LOGS))
    assert [one for _, one in seen] == many


def test_a_log_may_come_without_arguments():
    assert review_many([noise(1)])[0].to_json() == review(noise(1)).to_json()
    assert review_many([]) == []


@pytest.mark.parametrize("logs", [10, LOGS])
def test_stopping_returns_what_is_done_by_then(logs):
    done = []
    many = review_many(
        [changed(seed) for seed in range(logs)],
        on_review=lambda place, _: done.append(place),
        is_stopped=lambda: len(done) >= 5,
    )
    assert len(many) == 5
    assert done == [0, 1, 2, 3, 4]


@pytest.mark.parametrize("logs", [3, LOGS])
def test_contradictory_arguments_are_said_whoever_did_the_work(logs):
    wrong = (noise(1), {"baseline": (day(20), day(3))})
    with pytest.raises(AnalysisError) as raised:
        review_many([changed(seed) for seed in range(logs)] + [wrong])
    assert raised.value.reason == "baseline_backwards"


def test_flags_stay_near_the_budget_on_unchanged_logs_and_find_the_moved_ones():
    unchanged = review_many([changed(seed) for seed in range(1000)])
    # One in forty is 25 of 1,000, two standard errors are 10.
    assert sum(one.worth_a_look for one in unchanged) <= 35
    moved = review_many([changed(seed, 8.0) for seed in range(200)])
    assert sum(one.worth_a_look for one in moved) >= 160


def test_without_a_change_the_last_two_weeks_are_held_against_those_before():
    steady = review_many([noise(seed, 60) for seed in range(200)])
    assert sum(one.worth_a_look for one in steady) <= 10
    lately = review_many([noise(seed, 60, 46, 9.0) for seed in range(50)])
    assert sum(one.worth_a_look for one in lately) >= 45
    assert review_many([noise(1, 12)])[0].worth_a_look is False
    assert review_many([Log.from_pairs([])])[0].worth_a_look is False


def test_a_new_device_at_the_change_is_not_worth_a_look():
    values = np.round(np.random.default_rng(4).normal(30, 3, 28) + np.repeat([0, 15], 14), 1)
    kinds = ["value"] * 28
    numbers = [(FIRST_DAY + timedelta(place)).toordinal() for place in range(28)]
    how = {"changes": [Change(day(14), "stairs")]}
    plain = Log.from_columns(Measure(), numbers, values, kinds)
    marked = Log.from_columns(
        Measure(), numbers, values, kinds, spans=[Span(day(14), day(27), "device", "new watch")]
    )
    assert [one.worth_a_look for one in review_many([(plain, how), (marked, how)])] == [True, False]


def test_the_chance_of_a_log_is_that_of_its_review():
    log, how = changed(3, 6.0)
    assert chance_of(log, **how) == review(log, **how).answer.luck.p
    assert chance_of(log) is None
    assert chance_of(noise(1, 16), [Change(day(14))]) is None
