"""The answer from end to end on invented logs."""

import json
from dataclasses import replace
from datetime import date

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from analysis import AnalysisError, Change, Log, Measure, review
from desktop.wording.findings import worded
from tests.builders import FIRST_DAY, day, log_of, number, reviewed

KEYS = set(
    """measure unit kind period rows stretches carried shift luck sureness direction since still spread_change
    slope how_often how_much goal carry_over weekday_rhythm season bound still_needed doubts switches comparisons
    findings caution""".split()  # noqa: SIM905
)
STRETCH_KEYS = set(
    """name label first last observations blank median mean lower_fourth upper_fourth fourth_spread lower_fence
    upper_fence outer_lower_fence outer_upper_fence below above""".split()  # noqa: SIM905
)

rng = np.random.default_rng(20310303)
STEADY = rng.integers(10, 30, 28).tolist()
MOVED = rng.integers(25, 45, 28).tolist()


def test_every_key_of_the_contract_is_always_there():
    for one in (reviewed([]), reviewed([5]), reviewed(STEADY), reviewed(STEADY + MOVED, 28)):
        shown = one.to_json()
        assert set(shown) >= KEYS
        for stretch in shown["stretches"]:
            assert set(stretch) >= STRETCH_KEYS
        json.dumps(shown, allow_nan=False)


def test_a_moved_log_is_told_as_moved():
    answer = reviewed(STEADY + MOVED, 28).answer
    assert answer.sureness == "as sure as a log can be"
    assert answer.direction == "more"
    assert answer.shift.low <= answer.shift.estimate <= answer.shift.high
    assert number(26) <= answer.since.likely <= number(30)


def test_an_unmoved_log_is_not():
    answer = reviewed(STEADY[:14] + STEADY[14:], 14).answer
    assert answer.sureness in ("cannot tell", "leaning")
    assert answer.bound is None or answer.bound >= abs(answer.shift.estimate)


def test_without_a_change_there_is_one_stretch_and_no_comparison():
    shown = reviewed(STEADY).to_json()
    assert len(shown["stretches"]) == 1
    assert all(shown[key] is None for key in ("carried", "shift", "luck", "sureness", "direction"))


def test_a_log_without_any_value_has_no_stretch():
    assert reviewed([]).stretches == ()
    assert reviewed([None, None], 1).stretches == ()


@pytest.mark.parametrize(("before", "after"), [(6, 28), (28, 3), (0, 10), (5, 0)])
def test_too_few_days_are_too_early(before, after):
    answer = reviewed(STEADY[:before] + MOVED[:after], before).answer
    if after:
        assert answer.sureness == "too early"
        assert answer.direction == "none"
    else:
        assert answer.sureness is None


def test_a_change_on_the_first_day_leaves_no_baseline():
    one = reviewed(STEADY, 0)
    assert [stretch.observations for stretch in one.stretches] == [0, 28]
    assert one.answer.sureness == "too early"


def test_a_change_after_today_is_not_yet_one():
    assert len(reviewed(STEADY, 40).stretches) == 1


def test_a_change_whose_settling_in_lasts_beyond_today_is_too_early():
    one = reviewed(STEADY, 20, settle=30)
    assert one.stretches[1].observations == 0
    assert one.answer.sureness == "too early"


@pytest.mark.parametrize(
    ("baseline", "reason"),
    [((day(9), day(2)), "baseline_backwards"), ((day(0), day(20)), "baseline_after_change")],
)
def test_contradictory_arguments_are_refused(baseline, reason):
    with pytest.raises(AnalysisError, match=reason):
        review(log_of(STEADY), [Change(day(14))], baseline)


def test_changes_of_one_day_are_one_change():
    one = review(log_of(STEADY + MOVED), [Change(day(28), "no coffee"), Change(day(28), "earlier bed")])
    assert [stretch.label for stretch in one.stretches] == [None, "no coffee + earlier bed"]


def test_three_stretches_are_compared_with_the_baseline_and_the_one_before():
    values = STEADY[:14] + MOVED[:14] + STEADY[14:]
    one = review(log_of(values), [Change(day(14), "on"), Change(day(28), "off")])
    assert [(c.stretch, c.against) for c in one.comparisons] == [(1, "baseline"), (2, "baseline"), (2, "before")]
    first, last, last_to_before = (c.answer for c in one.comparisons)
    assert one.answer == last
    assert (first.direction, last_to_before.direction) == ("more", "less")
    assert last.since is None


def test_equal_baseline_days_give_no_fences_and_a_doubt_says_so():
    one = reviewed([5] * 14 + [6] * 14, 14)
    assert one.stretches[0].lower_fence is None
    assert one.answer.carried is None
    assert "no_spread" in [doubt.name for doubt in one.doubts]


def test_fences_need_five_observations():
    assert reviewed([1, 2, 3, 4]).stretches[0].lower_fence is None
    assert reviewed([1, 2, 3, 4, 5]).stretches[0].lower_fence is not None


def test_one_odd_day_is_outside_its_own_stretch():
    values = STEADY.copy()
    values[9] = 120
    assert reviewed(values).stretches[0].above == (number(9),)


def test_below_zero_is_a_value_like_any_other():
    one = reviewed([value - 20 for value in STEADY] + [-90], kind="reading")
    assert one.stretches[0].below == (number(28),)
    assert "no_low_day" not in [doubt.name for doubt in one.doubts]


def test_sessions_a_week_are_told_as_how_often_and_how_much():
    three = [0, 40, 0, 35, 0, 30, 0] * 4
    five = [30, 40, 0, 35, 30, 30, 0] * 4
    answer = reviewed(three + five, 28, kind="amount", missed="zero").answer
    assert answer.how_often.before == (12, 28)
    assert answer.how_often.after == (20, 28)
    assert answer.how_much.before == 35


def test_days_in_the_range_aimed_at_are_counted():
    answer = reviewed(STEADY + MOVED, 28, aim=(20.0, 30.0)).answer
    assert answer.goal.before == (sum(20 <= value <= 30 for value in STEADY), 28)
    assert answer.goal.after == (sum(20 <= value <= 30 for value in MOVED), 28)
    assert answer.shift.better_days == answer.goal.after[0]


@pytest.mark.parametrize(("aim", "expected"), [("more", 28), ("less", 0), ("none", 28)])
def test_better_days_follow_the_aim(aim, expected):
    assert reviewed(list(range(10, 24)) + list(range(50, 78)), 14, aim=aim).answer.shift.better_days == expected


def test_input_order_and_blank_rows_do_not_matter():
    values = STEADY + MOVED
    pairs = [(day(place), value) for place, value in enumerate(values)]
    shuffled = [pairs[place] for place in np.random.default_rng(1).permutation(len(pairs))]
    blanks = [(day(60), None)]
    expected = review(Log.from_pairs(pairs), [Change(day(28))]).to_json()
    assert review(Log.from_pairs(shuffled + blanks), [Change(day(28))], today=day(55)).to_json() == expected


log_values = st.one_of(
    st.none(),
    st.just(0.0),
    st.integers(-5, 12).map(float),
    st.floats(allow_nan=True, allow_infinity=True),
    st.sampled_from([1e300, -1e300, 5e-324, 1.7e308]),
)


@settings(deadline=None, max_examples=300)
@given(
    values=st.lists(log_values, max_size=70),
    change=st.integers(-3, 80),
    settle=st.integers(0, 9),
    period=st.sampled_from(["day", "week", "month", "year"]),
    kind=st.sampled_from(["amount", "count", "reading", "score", "yes/no"]),
    missed=st.sampled_from(["zero", "blank"]),
    combine=st.sampled_from([None, "sum", "mean", "median", "first", "last", "max", "min"]),
    slots=st.lists(st.sampled_from(["", "morning", "evening"]), min_size=70, max_size=70),
    asked=st.fixed_dictionaries(
        {
            "worth": st.sampled_from([None, 0.0, 1e-300, 3.0, 1e300]),
            "look_day": st.sampled_from([None, day(0), day(30), day(90)]),
            "others": st.sampled_from([(), (0.0, 1.0), (0.01,)]),
        }
    ),
)
def test_no_log_makes_a_review_raise_or_warn(values, change, settle, period, kind, missed, combine, slots, asked):
    measure = Measure("x", kind=kind, period=period, missed=missed, combine=combine)
    rows = [(day(place), value, slots[place]) for place, value in enumerate(values)]
    one = review(Log.from_pairs(rows, measure), [Change(day(change), "x", settle)], **asked)
    assert json.dumps(worded(one).to_json(), allow_nan=False)


@settings(deadline=None, max_examples=60)
@given(
    st.lists(st.integers(0, 40), min_size=20, max_size=60),
    st.integers(-1000, 1000),
    st.sampled_from([2.0, 0.5, 4.0]),
)
def test_shifting_and_scaling_change_the_answer_only_as_they_must(values, added, factor):
    plain = reviewed([float(value) for value in values], 10)
    other = reviewed([value * factor + added for value in values], 10)
    assert other.answer.sureness == plain.answer.sureness
    assert other.answer.shift.estimate == pytest.approx(plain.answer.shift.estimate * factor)
    assert other.answer.shift.share_of_pairs == plain.answer.shift.share_of_pairs
    if plain.answer.carried is not None:
        assert other.answer.carried.above == plain.answer.carried.above


@settings(deadline=None, max_examples=60)
@given(st.lists(st.integers(0, 40), min_size=20, max_size=60))
def test_turning_the_values_round_turns_the_answer_round(values):
    plain = reviewed([float(value) for value in values], 10, aim="more").answer
    turned = reviewed([-float(value) for value in values], 10, aim="less").answer
    assert (turned.sureness, turned.luck.p) == (plain.sureness, pytest.approx(plain.luck.p))
    assert turned.shift.estimate == pytest.approx(-plain.shift.estimate)
    assert turned.shift.better_days == plain.shift.better_days
    assert {"more": "less", "less": "more", "none": "none"}[turned.direction] == plain.direction


@settings(deadline=None, max_examples=60)
@given(st.lists(st.integers(0, 40), min_size=20, max_size=60))
def test_the_aim_changes_which_days_are_better_and_nothing_of_the_level(values):
    more, less = (reviewed([float(value) for value in values], 10, aim=aim).answer for aim in ("more", "less"))
    assert (more.luck, more.since, more.carried) == (less.luck, less.since, less.carried)
    assert replace(more.shift, better_days=0) == replace(less.shift, better_days=0)


def test_a_log_of_two_centuries_is_answered_with_little_memory():
    values = np.random.default_rng(4).normal(100, 10, 36_500)
    log = Log.from_columns(
        Measure(),
        range(date(1930, 1, 1).toordinal(), date(1930, 1, 1).toordinal() + 36_500),
        values,
        ["value"] * 36_500,
    )
    one = review(log, [Change(date(1980, 1, 1), "x")])
    assert one.answer.shift.days > 18_000


def test_the_first_day_is_a_monday_as_the_builders_say():
    assert FIRST_DAY.weekday() == 0
