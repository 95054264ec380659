"""What is said of earlier copies."""

from datetime import date, datetime, timedelta
from pathlib import Path

import pytest

from desktop.errors import StorageError
from desktop.journal.differences import Difference, differences
from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Plan, Span
from desktop.wording.earlier import (
    difference_cells,
    differs_sentence,
    holds_sentence,
    moment,
    place_sentence,
)
from desktop.wording.problems import not_copied_sentence

PERSON = Person("0" * 32)
SLEEP = Measure(1, 0, "Sleep", "hours", decimals=1)
DAY = date(2031, 3, 4)
EMPTY = Journal.of([PERSON])


def entry(day=DAY, value=7.0, **fields):
    return Entry(fields.pop("measure", 1), day, value=value, **fields)


def test_when_a_copy_was_taken_is_told_by_the_clock_on_the_wall():
    assert moment(datetime(2031, 3, 10, 20, 15).astimezone()) == "10 March 2031, 20:15"


def test_what_a_copy_holds():
    assert holds_sentence(EMPTY) == "It holds no days yet."
    assert holds_sentence(Journal.of([PERSON, DayNote(DAY, "rain")])) == "It holds no days yet."
    two = Journal.of([PERSON, SLEEP, Measure(2, 1, "Walk"), entry(), entry(measure=2), entry(DAY + timedelta(1))])
    assert holds_sentence(two) == "It holds 2 days in 2 measures, the last of them 5 March 2031."


def test_how_far_a_copy_is_from_now():
    assert differs_sentence([]) == "It is the same as what is there now."
    found = [
        Difference(entry(), entry(value=8.0)),
        Difference(entry(), None),
        Difference(entry(), None),
        Difference(None, entry()),
        Difference(None, SLEEP),
    ]
    assert differs_sentence(found) == (
        "1 value differs, 2 values are only here now, 1 value is only in the copy, 1 other thing differs."
    )
    assert differs_sentence([Difference(None, SLEEP), Difference(SLEEP, None)]) == "2 other things differ."


@pytest.mark.parametrize(
    ("now", "then", "cells"),
    [
        (entry(), entry(value=8.25), ("4 March 2031, Sleep", "7.0", "8.25")),
        (entry(slot="night"), None, ("4 March 2031, Sleep, night", "7.0", "nothing")),
        (entry(value=None, kind="ill"), entry(), ("4 March 2031, Sleep", "ill", "7.0")),
        (entry(kind="set aside"), entry(), ("4 March 2031, Sleep", "7.0 (set aside)", "7.0")),
        (entry(note="late"), entry(), ("4 March 2031, Sleep", "7.0, “late”", "7.0")),
        (entry(measure=9), None, ("4 March 2031, a measure that is gone", "7", "nothing")),
        (None, DayNote(DAY, "rain"), ("4 March 2031, note", "nothing", "rain")),
        (Change(1, DAY, "stairs"), Change(1, DAY), ("the change of 4 March 2031", "stairs", "no label")),
        (Span(1, DAY, DAY, label="flu"), None, ("the named days from 4 March 2031", "flu", "nothing")),
        (None, Plan(1, 1, DAY, 5), ("the plan from 4 March 2031", "nothing", "there")),
        (SLEEP, Measure(1, 0, "Naps"), ("the measure “Naps”", "otherwise", "otherwise")),
        (PERSON, Person("0" * 32, "Ana"), ("the name or question", "otherwise", "otherwise")),
    ],
)
def test_one_difference_as_a_row(now, then, cells):
    journal = Journal.of([PERSON, SLEEP])
    assert difference_cells(Difference(now, then), journal, journal) == cells


def test_every_difference_of_a_full_journal_has_its_row():
    full = Journal.of([PERSON, SLEEP, entry(), DayNote(DAY, "rain"), Change(1, DAY), Span(1, DAY, DAY)])
    assert all(all(difference_cells(one, EMPTY, full)) for one in differences(EMPTY, full))


@pytest.mark.parametrize(("days", "said"), [(0, "today"), (1, "yesterday"), (21, "21 days ago"), (-3, "today")])
def test_how_old_the_second_copy_is(days, said):
    last = datetime(2031, 3, 10, 20, 15).astimezone()
    sentence = place_sentence(Path("/stick"), last, date(2031, 3, 10) + timedelta(days))
    assert sentence == f"Second place: /stick. Last copied {said}, 10 March 2031, 20:15."


def test_a_second_place_that_is_not_there_or_not_chosen():
    assert "No copy can be found there" in place_sentence(Path("/stick"), None, DAY)
    assert place_sentence(None, None, DAY).startswith("Second place: none.")


def test_a_copy_that_could_not_be_made_is_no_fright():
    assert not_copied_sentence(StorageError("disk full")) == (
        "No new copy of the journal could be made: the disk is full. The journal itself is saved."
    )
    plain = "No new copy of the journal could be made. The journal itself is saved."
    assert not_copied_sentence(StorageError("busy")) == not_copied_sentence(ValueError()) == plain
