from __future__ import annotations

from dataclasses import replace
from datetime import date

import pytest

from desktop.edits.changes import edit_change, mark_change, mark_span, remove_change, remove_span
from desktop.edits.edit import Edit
from desktop.edits.ids import Ids
from desktop.journal.journal import Journal
from desktop.journal.records import Change, Measure, Person, Span
from desktop.journal.row_change import RowChange

FIRST, LAST = date(2026, 3, 1), date(2026, 3, 9)
CHANGE = Change(3, FIRST, "new routine", "planned", 7, (1, 2))
SPAN = Span(5, FIRST, LAST, "ill", "flu", (1,))
JOURNAL = Journal.of([Person("0" * 32), CHANGE, SPAN])


def test_marking_a_change() -> None:
    edit = mark_change(JOURNAL, Ids({"change": 3}), FIRST, "more", why="advised", settle_days=2, measures=(1,))
    assert edit == Edit("mark change", (RowChange(None, Change(4, FIRST, "more", "advised", 2, (1,))),))
    plain = mark_change(JOURNAL, Ids({"change": 3}), LAST, "")
    assert plain.changes == (RowChange(None, Change(4, LAST)),)


def test_editing_a_change() -> None:
    other = replace(CHANGE, day=LAST, label="other")
    assert edit_change(JOURNAL, other) == Edit("edit change", (RowChange(CHANGE, other),))
    assert edit_change(JOURNAL, CHANGE) == Edit("edit change", ())
    with pytest.raises(KeyError):
        edit_change(JOURNAL, replace(CHANGE, id=4))


def test_what_was_agreed_with_a_change_is_one_act_with_it() -> None:
    measure = Measure(1, 0, "Walking", "minutes")
    agreed = replace(measure, worth=10.0, look_day=LAST)
    journal = Journal.of([Person("0" * 32), measure, CHANGE])
    edit = mark_change(journal, Ids({"change": 3}), FIRST, "more", agreed=agreed)
    assert edit.changes == (RowChange(None, Change(4, FIRST, "more")), RowChange(measure, agreed))
    assert edit_change(journal, CHANGE, agreed).changes == (RowChange(measure, agreed),)
    assert not edit_change(journal, CHANGE, measure)


def test_removing_a_change() -> None:
    assert remove_change(JOURNAL, 3) == Edit("remove change", (RowChange(CHANGE, None),))
    with pytest.raises(KeyError):
        remove_change(JOURNAL, 4)


@pytest.mark.parametrize(("one", "other"), [(FIRST, LAST), (LAST, FIRST)])
def test_naming_days(one: date, other: date) -> None:
    edit = mark_span(JOURNAL, Ids({"span": 5}), one, other, "away", "trip", measures=(2,))
    assert edit == Edit("mark span", (RowChange(None, Span(6, FIRST, LAST, "away", "trip", (2,))),))


def test_removing_named_days() -> None:
    assert remove_span(JOURNAL, 5) == Edit("remove span", (RowChange(SPAN, None),))
    with pytest.raises(KeyError):
        remove_span(JOURNAL, 6)
