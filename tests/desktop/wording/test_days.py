"""Days in words: the month is never a number."""

from datetime import date, datetime

import pytest
from hypothesis import given
from hypothesis import strategies as st

from desktop.wording.days import MONTHS, WEEKDAYS, DayWords, full_day, long_day, saved_words, short_day
from desktop.wording.telling import day_words_of
from tests.builders import day, number, reviewed

DAY = date(2026, 3, 3)


def test_a_day_is_told_short_whole_and_long():
    assert short_day(DAY) == "Tue 3 Mar"
    assert full_day(DAY) == "3 March 2026"
    assert long_day(DAY) == "Tuesday 3 March 2026"


@given(st.dates(date(1900, 1, 1), date(2199, 12, 31)))
def test_the_weekday_and_the_month_are_those_of_the_calendar(at):
    weekday, number, month, year = long_day(at).split()
    assert WEEKDAYS.index(weekday) == at.weekday()
    assert date(int(year), MONTHS.index(month) + 1, int(number)) == at


@pytest.mark.parametrize(
    ("period", "with_year", "name", "marked"),
    [
        ("day", False, "3 March", "3 March"),
        ("day", True, "3 March 2026", "3 March 2026"),
        ("week", False, "the week of 3 March", "3 March"),
        ("week", True, "the week of 3 March 2026", "3 March 2026"),
        ("month", True, "March 2026", "3 March 2026"),
        ("year", True, "2026", "3 March 2026"),
    ],
)
def test_a_period_is_named_by_its_first_day(period, with_year, name, marked):
    words = DayWords(period, with_year)
    assert words.name(DAY.toordinal()) == name
    assert words.day(DAY.toordinal()) == marked


def test_a_marked_day_that_begins_its_year_or_month_is_named_by_it():
    assert DayWords("year", True).day(date(1899, 1, 1).toordinal()) == "1899"
    assert DayWords("month", True).day(date(1899, 5, 1).toordinal()) == "May 1899"


def test_the_year_is_told_only_where_a_log_spans_more_than_one():
    within, beyond = reviewed([1.0] * 30), reviewed([1.0] * 400)
    assert day_words_of(within).name(number(0)) == "3 March"
    assert day_words_of(beyond).name(number(0)) == "3 March 2031"
    assert day(399).year == 2032


@pytest.mark.parametrize(
    ("at", "said"),
    [
        (datetime(2031, 3, 30, 14, 5), "Saved at 14:05"),
        (datetime(2031, 3, 30, 0, 0), "Saved at 00:00"),
        (datetime(2031, 3, 29, 23, 59), "Saved on 29 March"),
        (datetime(2030, 12, 31, 9, 0), "Saved on 31 December 2030"),
    ],
)
def test_when_it_was_saved_is_said_in_words(at, said):
    assert saved_words(at, date(2031, 3, 30)) == said
