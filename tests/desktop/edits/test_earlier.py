"""Going back to an earlier state, whole or day by day."""

from __future__ import annotations

from copy import deepcopy
from dataclasses import replace
from datetime import date

import pytest

from desktop.edits.earlier import put_back_earlier, restore
from desktop.edits.edit import Edit
from desktop.edits.history import undo_edit
from desktop.journal.differences import Difference, differences
from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Span
from desktop.journal.row_change import Step

PERSON = Person("0" * 32)
WALK = Measure(1, 0, "Walking", "minutes")


def entry(day: int, value: float = 30.0, measure: int = 1) -> Entry:
    return Entry(measure, date(2026, 3, day), value=value)


@pytest.fixture
def earlier() -> Journal:
    return Journal.of([PERSON, WALK, entry(1), entry(2), entry(3), DayNote(date(2026, 3, 2), "rain")])


@pytest.fixture
def journal(earlier: Journal) -> Journal:
    """Since then: a day altered, one emptied, one added, a measure and a change more, the note gone."""
    return Journal.of(
        [
            replace(PERSON, name="Ana"),
            WALK,
            Measure(2, 1, "Sleep"),
            entry(1),
            entry(2, 45.0),
            entry(4),
            Change(1, date(2026, 3, 2), "stairs"),
        ]
    )


def test_what_differs_measures_first_then_days(journal: Journal, earlier: Journal) -> None:
    assert differences(journal, earlier) == [
        Difference(Measure(2, 1, "Sleep"), None),
        Difference(entry(2, 45.0), entry(2)),
        Difference(None, DayNote(date(2026, 3, 2), "rain")),
        Difference(None, entry(3)),
        Difference(entry(4), None),
        Difference(Change(1, date(2026, 3, 2), "stairs"), None),
        Difference(replace(PERSON, name="Ana"), PERSON),
    ]
    assert differences(journal, journal) == []


def test_restoring_makes_it_as_it_was_and_is_taken_back_like_any_act(journal: Journal, earlier: Journal) -> None:
    before = deepcopy(journal)
    edit = restore(journal, earlier)
    assert edit.act == "restore copy"
    journal.apply(edit.changes)
    assert set(journal.records()) == set(earlier.records())
    assert not restore(journal, earlier)
    journal.apply(undo_edit(Step(2, "", "do", edit.act, None, edit.changes)).changes)
    assert set(journal.records()) == set(before.records())


def test_a_copy_of_another_journal_is_not_restored(journal: Journal) -> None:
    with pytest.raises(ValueError, match="another journal"):
        restore(journal, Journal.of([Person("1" * 32), WALK, Span(1, date(2026, 3, 1), date(2026, 3, 2))]))


def test_single_days_are_put_back(journal: Journal) -> None:
    note = DayNote(date(2026, 3, 2), "rain")
    edit = put_back_earlier(journal, [entry(1), entry(2), note])
    assert edit == Edit("put earlier back", edit.changes)
    journal.apply(edit.changes)
    assert journal.entry(1, date(2026, 3, 2)) == entry(2)
    assert journal.note(date(2026, 3, 2)) == "rain"
    assert len(edit.changes) == 2
    with pytest.raises(KeyError):
        put_back_earlier(journal, [entry(1, measure=9)])
