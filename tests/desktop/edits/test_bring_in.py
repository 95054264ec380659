from __future__ import annotations

from dataclasses import replace
from datetime import date, datetime

import pytest

from desktop.edits.bring_in import BroughtIn, bring_in
from desktop.edits.ids import Ids
from desktop.journal.journal import Journal
from desktop.journal.records import Entry, Measure, Person
from desktop.journal.row_change import RowChange

NOW = datetime(2026, 3, 10, 21, 4, 5)
AT = "2026-03-10T21:04:05"
EXERCISE = Measure(1, 0, "Exercise", "minutes", kind="amount", missed="zero")
SLEEP = Measure(0, 0, "Sleep", "hours")
DAY = date(2026, 1, 5)


def read(day: int, value: float | None, kind: str = "value", **fields: object) -> Entry:
    """An entry as a table gives it."""
    entry = Entry(1, date(2026, 1, day), value=value, original=str(value), source="table")
    return replace(entry, kind=kind, **fields)  # type: ignore[arg-type]


def brought(*entries: Entry, there: tuple[Entry, ...] = ()) -> BroughtIn:
    journal = Journal.of([Person("0" * 32), EXERCISE, *there])
    return bring_in(journal, Ids({"measure": 1}), [], entries, now=NOW)


def counts(found: BroughtIn) -> tuple[int, int, int]:
    return found.added, found.replaced, found.untouched


def test_new_measures_and_entries_are_one_edit() -> None:
    journal = Journal.of([Person("0" * 32), EXERCISE])
    mood = replace(SLEEP, id=-1, title="Mood")
    entries = [
        read(1, 7.5, measure=0),
        read(1, 3.0, measure=-1),
        read(1, 30.0),
        read(2, None, kind="blank", measure=0),
    ]
    found = bring_in(journal, Ids({"measure": 4}), [SLEEP, mood], entries, now=NOW)
    measures = (replace(SLEEP, id=5, position=1), replace(mood, id=6, position=2))
    assert found.measures == measures
    assert counts(found) == (4, 0, 0)
    assert found.edit.act == "bring in table"
    assert found.edit.changes == tuple(
        RowChange(None, record)
        for record in (
            *measures,
            *(
                replace(entry, measure=new, entered_at=AT)
                for entry, new in zip(entries, (5, 6, 1, 5), strict=True)
            ),
        )
    )
    journal.apply(found.edit.changes)
    assert len(journal.columns()) == 3


def test_the_same_table_again_changes_nothing() -> None:
    entries = [read(1, 30.0), read(2, 0.0), read(3, None, kind="rest"), read(4, None, kind="blank")]
    first = brought(*entries)
    assert counts(first) == (4, 0, 0)
    there = tuple(change.record for change in first.edit.changes)
    again = brought(*entries, there=there)  # type: ignore[arg-type]
    assert counts(again) == (0, 0, 4)
    assert not again.edit


def test_a_different_value_wins_and_keeps_the_note() -> None:
    there = read(1, 30.0, note="my words", entered_at="2026-01-01T08:00:00")
    found = brought(read(1, 31.0), there=(there,))
    assert counts(found) == (0, 1, 0)
    assert found.edit.changes == (RowChange(there, read(1, 31.0, note="my words", entered_at=AT)),)
    found = brought(read(1, 31.0, note="theirs"), there=(there,))
    assert found.edit.changes[0].after == read(1, 31.0, note="theirs", entered_at=AT)


@pytest.mark.parametrize("kind", ["value", "late", "set aside", "extra"])
def test_the_same_value_leaves_the_day_as_it_is(kind: str) -> None:
    there = read(1, 30.0, kind=kind, original="thirty", source="typed")
    found = brought(read(1, 30.0), there=(there,))
    assert counts(found) == (0, 0, 1)
    assert not found.edit


def test_a_blank_takes_nothing_away() -> None:
    there = (read(1, 30.0), read(2, None, kind="ill"), read(3, None, kind="blank"))
    found = brought(*(read(day, None, kind="blank") for day in (1, 2, 3, 4)), there=there)
    assert counts(found) == (1, 0, 3)


@pytest.mark.parametrize(
    ("old", "new"),
    [
        (read(1, None, kind="rest"), read(1, 30.0)),
        (read(1, None, kind="blank"), read(1, 30.0)),
        (read(1, 30.0), read(1, None, kind="rest")),
        (read(1, None, kind="ill"), read(1, None, kind="away")),
        (read(1, 30.0), read(1, 30.0, kind="set aside")),
        (read(1, 30.0), read(1, 30.0, kind="extra")),
    ],
)
def test_another_kind_of_day_is_another_answer(old: Entry, new: Entry) -> None:
    found = brought(new, there=(old,))
    assert counts(found) == (0, 1, 0)
    assert found.edit.changes == (RowChange(old, replace(new, entered_at=AT)),)


def test_none_of_it_is_a_kind_of_day_here_too() -> None:
    (change,) = brought(read(1, 0.0)).edit.changes
    assert change.after == read(1, 0.0, kind="zero", entered_at=AT)
    (change,) = brought(read(1, 5.0, kind="late", entered_at="2026-01-09T08:00:00")).edit.changes
    assert change.after == read(1, 5.0, kind="late", entered_at="2026-01-09T08:00:00")


def test_slots_are_places_of_their_own() -> None:
    found = brought(read(1, 1.0, slot="am"), read(1, 2.0, slot="pm"), there=(read(1, 1.0),))
    assert counts(found) == (2, 0, 0)


def test_what_the_reader_of_a_table_must_not_give() -> None:
    with pytest.raises(ValueError, match="twice"):
        brought(read(1, 1.0), read(1, 2.0))
    with pytest.raises(ValueError, match="twice"):
        brought(read(1, 1.0), read(1, 2.0), there=(read(1, 1.0),))
    with pytest.raises(KeyError):
        brought(read(1, 1.0, measure=2))
    journal = Journal.of([Person("0" * 32), EXERCISE])
    with pytest.raises(ValueError, match="below 1"):
        bring_in(journal, Ids({}), [EXERCISE], [], now=NOW)


def test_nothing_at_all() -> None:
    found = brought()
    assert (counts(found), found.measures, bool(found.edit)) == ((0, 0, 0), (), False)
