"""Numbers in words: no digit that says nothing, the unit beside them, the direction by the kind of measure."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from analysis import Measure
from desktop.wording.numbers import Speech, chance_in_100, count, decimals_for, decimals_of, plain

MINUTES = Speech(Measure("Exercise", "minutes", "amount"), 0)
PRESSURE = Speech(Measure("Upper pressure", "mmHg", "reading"), 0)


@pytest.mark.parametrize(
    ("value", "decimals", "shown"),
    [(34.0, 1, "34"), (34.5, 1, "34.5"), (0.125, 2, "0.12"), (-3.0, 1, "−3"), (-0.04, 1, "0"), (0.0, 3, "0"),
     (1e6, 0, "1000000"), (1e15, 1, "1e+15"), (100.0, 0, "100"), (1200.0, 2, "1200")],
)  # fmt: skip
def test_a_number_has_no_trailing_zeros_and_a_true_minus(value, decimals, shown):
    assert plain(value, decimals) == shown


@given(st.floats(-1e9, 1e9), st.integers(0, 3))
def test_a_shown_number_is_the_number_rounded(value, decimals):
    assert math.isclose(float(plain(value, decimals).replace("−", "-")), round(value, decimals), abs_tol=1e-9)


@pytest.mark.parametrize(
    ("values", "digits"),
    [([], 0), ([5.0, 7.0], 0), ([5.5], 1), ([0.25, 1.0], 2), ([1 / 3], 3), ([1e9, 2.0], 0), ([math.nan, 1.5], 1)],
)
def test_a_log_tells_how_many_digits_it_has(values, digits):
    assert decimals_of(values) == digits


def test_averages_with_long_tails_are_said_no_finer_than_their_range_is_worth():
    assert decimals_for([100 / 3, 200 / 3, 500 / 3]) == 0
    assert decimals_for([0.0123, 0.0456]) == 3
    assert decimals_for([]) == 0


def test_one_of_a_thing_is_one():
    assert count(1, "day") == "1 day"
    assert count(0, "day") == "0 days"
    assert MINUTES.with_unit(1) == "1 minute"
    assert MINUTES.with_unit(-1) == "−1 minute"
    assert PRESSURE.with_unit(1) == "1 mmHg"
    assert Speech(Measure(), 1).with_unit(2.25) == "2.25"


@pytest.mark.parametrize(
    ("p", "said"),
    [(0.0, "fewer than 1 of 100"), (0.0099, "fewer than 1 of 100"), (0.01, "about 1 of 100"),
     (0.5, "about 50 of 100"), (0.99, "about 99 of 100"), (1.0, "more than 99 of 100")],
)  # fmt: skip
def test_a_chance_is_out_of_a_hundred_and_never_none_or_all(p, said):
    assert chance_in_100(p) == said


@pytest.mark.parametrize(
    ("low", "high", "said"),
    [
        (3, 16, "between 3 and 16 minutes more a day"),
        (-16, -3, "between 3 and 16 minutes less a day"),
        (-3, 16, "anywhere from 3 minutes less to 16 minutes more a day"),
        (0, 16, "between 0 and 16 minutes more a day"),
        (-16, 0, "between 0 and 16 minutes less a day"),
        (5, 5, "about 5 minutes more a day"),
        (-1, -1, "about 1 minute less a day"),
    ],
)
def test_a_range_says_its_direction_once(low, high, said):
    assert MINUTES.between(low, high) == said


def test_a_reading_is_higher_or_lower_and_not_a_day():
    assert PRESSURE.between(-9, -4) == "between 4 and 9 mmHg lower"
    assert PRESSURE.between(-2, 5) == "anywhere from 2 mmHg lower to 5 mmHg higher"


def test_periods_are_named_by_the_measure():
    weekly = Speech(Measure(period="week", kind="amount", unit="minutes"), 0)
    assert (weekly.one, weekly.many, weekly.periods(3), weekly.rate()) == ("week", "weeks", "3 weeks", " a week")
