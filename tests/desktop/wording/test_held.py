"""What is said of what a day has held."""

from datetime import date
from typing import get_args

import pytest

from desktop.journal.records import DayNote, Entry, Measure
from desktop.journal.row_change import Act
from desktop.wording.held import held_line, held_title

WALK = Measure(1, 0, "Walking", "minutes")
DAY = date(2031, 3, 4)
AT = "2031-03-05T20:15:00"


@pytest.mark.parametrize(
    ("record", "measure", "act", "line"),
    [
        (Entry(1, DAY, value=45.0), WALK, "put value", "45 minutes, written down 5 March 2031, 20:15"),
        (Entry(1, DAY, kind="ill"), WALK, "set kind", "ill, marked 5 March 2031, 20:15"),
        (
            Entry(1, DAY, value=45.0, kind="set aside"),
            WALK,
            "set aside",
            "45 minutes (set aside), set aside 5 March 2031, 20:15",
        ),
        (None, WALK, "clear values", "nothing, made blank 5 March 2031, 20:15"),
        (DayNote(DAY, "rain"), None, "write note", "“rain”, written 5 March 2031, 20:15"),
    ],
)
def test_one_line(record, measure, act, line):
    assert held_line(AT, act, record, measure) == line


def test_every_act_has_a_line():
    assert all(held_line(AT, act, None, WALK) for act in get_args(Act))


def test_whose_values():
    assert held_title(DAY, WALK) == "Walking, Tuesday 4 March 2031. Newest first."
    assert held_title(DAY, None) == "Note, Tuesday 4 March 2031. Newest first."
