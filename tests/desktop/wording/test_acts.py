"""What a person did, in a few words."""

from datetime import date
from typing import get_args

import pytest

from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Span
from desktop.journal.row_change import Act, RowChange, Step
from desktop.wording.acts import act_phrase

DAY = date(2031, 5, 4)
MEASURE = Measure(1, 0, "Exercise", "minutes")
JOURNAL = Journal.of([Person("0" * 32), MEASURE])
VALUE = Entry(1, DAY, value=30.0)


def phrase(act: str, *records, gone: bool = False) -> str:
    changes = tuple(RowChange(one, None) if gone else RowChange(None, one) for one in records)
    return act_phrase(Step(1, "", "do", act, None, changes), JOURNAL)


@pytest.mark.parametrize("act", get_args(Act))
def test_every_act_has_a_phrase(act):
    told = phrase(act, Person("1" * 32))
    assert told.startswith("the ")
    assert "the the" not in told


@pytest.mark.parametrize(
    ("record", "told"),
    [
        (VALUE, "30 minutes on 4 May"),
        (Entry(1, DAY, kind="rest"), "rest on 4 May"),
        (Entry(1, DAY, value=30.0, kind="set aside"), "set aside on 4 May"),
        (MEASURE, "the measure “Exercise”"),
        (Change(1, DAY, "earlier bus"), "the change “earlier bus”"),
        (Change(1, DAY), "the change on 4 May"),
        (Span(1, DAY, DAY, "ill", "cold"), "the named days “cold”"),
        (Span(1, DAY, DAY, "away"), "the named days “away”"),
        (DayNote(DAY, "rain"), "the note on 4 May"),
    ],
)
def test_an_act_on_one_record_names_it(record, told):
    assert phrase("put value", record) == told


def test_a_value_taken_away_is_a_day_made_blank():
    assert phrase("clear values", VALUE, gone=True) == "the day made blank on 4 May"


def test_a_value_of_a_measure_that_is_gone_still_has_a_phrase():
    assert phrase("put value", Entry(9, DAY, value=30.0)) == "the day made blank on 4 May"


def test_many_records_are_counted():
    days = [Entry(1, date(2031, 5, number), value=1.0) for number in range(1, 13)]
    assert phrase("paste values", *days) == "the pasted block, 12 days"
    assert phrase("bring in table", MEASURE, VALUE) == "the table brought in, 1 day"
