"""Other choices of days: which are asked, and whether the answer hangs on one of them."""

from datetime import timedelta

import pytest

from analysis import Change, Log, Measure, other_choices, review
from tests.analysis.test_situations import days
from tests.builders import day, log_of, number


def asked(log, change, **how):
    changes = [Change(day(change), "stairs", **how)]
    answer = review(log, changes)
    return answer, {(one.name, one.days): one for one in other_choices(answer, log, changes)}


def test_a_plain_move_holds_whatever_days_are_chosen():
    answer, choices = asked(log_of(days(1, 35, 20) + days(2, 28, 32)), 35)
    assert answer.answer.sureness == "as sure as a log can be"
    assert set(choices) == {
        ("last days before", 14),
        ("last days before", 28),
        ("without first week", None),
        ("without last week", None),
        ("settling in", 3),
        ("settling in", 7),
        ("weekdays alone", None),
    }
    assert all(one.holds and one.direction == "more" for one in choices.values())


def test_an_answer_that_hangs_on_how_far_back_the_baseline_goes_says_so():
    # The move came two weeks before the change.
    answer, choices = asked(log_of(days(38, 21, 20, 4) + days(88, 14, 27, 4) + days(128, 28, 28, 4)), 35)
    assert answer.answer.sureness == "fairly sure"
    assert {key for key, one in choices.items() if not one.holds} == {("last days before", 14)}


def test_days_far_out_of_line_and_late_days_are_left_out_in_turn():
    values = days(6, 14, 20, 3) + days(7, 14, 26, 3)
    values[20] = 90
    kinds = ["value"] * 28
    kinds[3:8] = ["late"] * 5
    log = Log.from_columns(Measure(), range(number(0), number(28)), values, kinds)
    _, choices = asked(log, 14)
    assert {"without odd days", "without late days"} <= {name for name, _ in choices}


@pytest.mark.parametrize(
    ("measure", "name"),
    [
        ({"kind": "amount", "missed": "zero"}, "missed as blank"),
        ({"kind": "amount", "missed": "blank"}, "blank as zero"),
        ({"kind": "reading", "missed": "blank"}, None),
    ],
)
def test_blank_days_are_taken_the_other_way_where_that_makes_sense(measure, name):
    values = [None if place % 4 == 3 else value for place, value in enumerate(days(8, 56, 30))]
    _, choices = asked(log_of(values, **measure), 28)
    blanks = {one for one, _ in choices} & {"missed as blank", "blank as zero"}
    assert blanks == ({name} if name else set())


def test_settling_in_that_is_longer_already_is_no_other_choice():
    _, choices = asked(log_of(days(9, 28, 20) + days(10, 28, 30)), 28, settle_days=5)
    assert {days for name, days in choices if name == "settling in"} == {7}


def test_choices_that_leave_too_few_days_are_not_asked():
    _, choices = asked(log_of(days(11, 8, 20) + days(12, 6, 40)), 8)
    assert ("without first week", None) not in choices
    assert ("settling in", 7) not in choices


def test_without_a_change_or_an_answer_there_is_nothing_to_choose():
    log = log_of(days(13, 30, 20))
    assert other_choices(review(log), log, []) == []
    early = review(log, [Change(day(28))])
    assert other_choices(early, log, [Change(day(28))]) == []


def test_weeks_are_asked_as_weeks():
    pairs = [(day(0) + timedelta(7 * place), value) for place, value in enumerate(days(14, 40, 20))]
    log = Log.from_pairs(pairs, Measure(period="week"))
    _, choices = asked(log, 140)
    assert not {name for name, _ in choices} & {"weekdays alone", "last days before"}
