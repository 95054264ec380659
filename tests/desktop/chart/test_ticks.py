"""Where the axes have their numbers."""

from datetime import date
from itertools import pairwise

import pytest
from hypothesis import given
from hypothesis import strategies as st

from desktop.chart.ticks import day_ticks, value_ticks

starts = st.dates(date(1900, 1, 1), date(2099, 12, 31)).map(date.toordinal)


@given(first=starts, days=st.integers(10, 36_525), most=st.integers(2, 30), part=st.floats(0, 0.99))
def test_days_are_in_range_in_order_and_not_too_many(first, days, most, part):
    x0, x1 = first - part, first + days + part
    ticks = day_ticks(x0, x1, most)
    places = [place for place, _ in ticks]
    assert places
    assert all(x0 <= place <= x1 and place == int(place) for place in places)
    assert all(one < other for one, other in pairwise(places))
    # One more where both ends fall on a number; months and years differ in length.
    assert len(places) <= most + 2


@given(first=starts, days=st.integers(10, 36_525), most=st.integers(2, 30))
def test_no_two_neighbours_have_the_same_word(first, days, most):
    words = [word for _, word in day_ticks(first, first + days, most)]
    assert all(one != other for one, other in pairwise(words))


@pytest.mark.parametrize(
    ("first", "days", "most", "words"),
    [
        (date(2031, 3, 3), 7, 10, ["3 Mar", "4 Mar", "5 Mar", "6 Mar", "7 Mar", "8 Mar", "9 Mar", "10 Mar"]),
        (date(2031, 3, 5), 28, 5, ["10 Mar", "17 Mar", "24 Mar", "31 Mar"]),
        (date(2030, 11, 15), 120, 5, ["Dec 2030", "Jan 2031", "Feb", "Mar"]),
        (date(2030, 1, 1), 1100, 4, ["2030", "2031", "2032", "2033"]),
        (date(1871, 1, 1), 36_000, 6, ["1880", "1900", "1920", "1940", "1960"]),
    ],
)
def test_days_weeks_months_and_years_each_have_their_words(first, days, most, words):
    assert [word for _, word in day_ticks(first.toordinal(), first.toordinal() + days, most)] == words


def test_four_weeks_without_the_first_of_a_month_still_have_days():
    assert [word for _, word in day_ticks(date(2031, 3, 2).toordinal(), date(2031, 3, 31).toordinal(), 2)] == [
        "3 Mar",
        "17 Mar",
        "31 Mar",
    ]


def test_weeks_begin_on_the_day_they_begin_on():
    first = date(2031, 3, 5).toordinal()
    for week_start in range(7):
        days = [date.fromordinal(int(place)) for place, _ in day_ticks(first, first + 60, 10, week_start)]
        assert {day.weekday() for day in days} == {week_start}


@given(low=st.floats(-1e9, 1e9), span=st.floats(1e-3, 1e9), most=st.integers(2, 30))
def test_values_are_in_range_in_order_and_not_too_many(low, span, most):
    high = low + span
    ticks = value_ticks(low, high, most)
    places = [place for place, _ in ticks]
    edge = 1e-6 * span
    assert 1 <= len(places) <= most + 1
    assert all(low - edge <= place <= high + edge for place in places)
    assert all(one < other for one, other in pairwise(places))


@given(low=st.integers(-1000, 1000), span=st.integers(1, 10_000), most=st.integers(2, 12))
def test_the_word_of_a_value_is_the_value(low, span, most):
    for place, word in value_ticks(low, low + span, most):
        assert float(word.replace("−", "-").replace(" ", "")) == pytest.approx(place, abs=1e-9)


def test_thousands_are_parted_and_halves_keep_their_digit():
    assert [word for _, word in value_ticks(0, 10_000, 5)][1] == "2 000"
    assert [word for _, word in value_ticks(0, 10, 4)] == ["0.0", "2.5", "5.0", "7.5", "10.0"]


@pytest.mark.parametrize(("low", "high"), [(1, 1), (2, 1), (0, float("nan")), (0, float("inf"))])
def test_a_range_that_is_none_has_no_value(low, high):
    assert value_ticks(low, high, 5) == []


@pytest.mark.parametrize(("y0", "y1"), [(-0.9, 49.8), (0.2, 9.9), (101.0, 148.0)])
def test_the_lowest_chart_has_two_numbers_to_read_a_scale_from(y0, y1):
    assert len(value_ticks(y0, y1, 1)) >= 2
