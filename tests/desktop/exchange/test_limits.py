"""What a journal can hold of a table."""

from datetime import date

import pytest

from desktop.errors import ExchangeError
from desktop.exchange.bring_in import read_table
from desktop.exchange.limits import for_journal
from desktop.wording.bring_in import REASONS
from desktop.wording.problems import problem_sentence

TABLE = b"day,a,b\n1850-01-01,1,2\n1899-12-31,3,\n1900-01-01,4,5\n2199-12-31,6,7\n"


def test_days_that_no_journal_holds_are_set_aside_with_their_reason():
    reading = for_journal(read_table(TABLE))
    assert [(fate.line, fate.status, fate.reason, fate.text) for fate in reading.fates] == [
        (2, "set aside", "before 1900", "1850-01-01"),
        (3, "set aside", "before 1900", "1899-12-31"),
        (4, "kept", "", ""),
        (5, "kept", "", ""),
    ]
    assert [[(value.day, value.value) for value in column.values] for column in reading.columns] == [
        [(date(1900, 1, 1), 4), (date(2199, 12, 31), 6)],
        [(date(1900, 1, 1), 5), (date(2199, 12, 31), 7)],
    ]
    assert {fate.reason for fate in reading.set_aside} <= set(REASONS)


def test_a_table_within_the_years_is_left_as_it_is():
    reading = read_table(b"day,a\n1900-01-01,1\n2199-12-31,2\n")
    assert for_journal(reading) is reading


def test_a_review_takes_earlier_years():
    assert read_table(TABLE).columns[0].values[0].day == date(1850, 1, 1)


@pytest.mark.parametrize(
    "table",
    [
        b"day,minutes\n",
        b"Date;Steps;Note\r\n",
        b"Export of a log\n\ndate,minutes\n",
        b"when,minutes\n",
        b"day,minutes (min)",
    ],
)
def test_a_header_alone_is_said_to_be_one(table):
    with pytest.raises(ExchangeError) as error:
        read_table(table)
    assert error.value.reason == "header alone"
    assert problem_sentence(error.value).startswith("The table has a header line and no days.")


@pytest.mark.parametrize("table", [b"2031-03-04,5\n", b"day,minutes\n2031-03-04,5\n"])
def test_one_row_of_a_day_is_a_table(table):
    assert len(read_table(table).columns[0].values) == 1
