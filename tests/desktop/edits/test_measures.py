from __future__ import annotations

from dataclasses import replace
from datetime import date
from pathlib import Path

import pytest

from desktop.edits.edit import Edit
from desktop.edits.history import undo_edit
from desktop.edits.ids import Ids
from desktop.edits.measures import (
    add_measures,
    archive_measure,
    convert_measure,
    move_measure,
    remove_measure,
    set_measure,
)
from desktop.edits.person import set_person
from desktop.journal.journal import Journal
from desktop.journal.records import Change, Entry, Measure, Person, Plan, Span
from desktop.journal.row_change import RowChange
from desktop.storage.store import Store

PERSON = Person("0" * 32, "Ana", "Does it help?")
DAY = date(2026, 3, 1)
UPPER = Measure(0, 0, "Upper", "mmHg", pair="pressure")
LOWER = Measure(0, 0, "Lower", "mmHg", pair="pressure")


def test_the_first_measures() -> None:
    edit = add_measures(Journal(PERSON), Ids({}), [UPPER, LOWER])
    assert edit == Edit(
        "add measure",
        (
            RowChange(None, replace(UPPER, id=1, position=0)),
            RowChange(None, replace(LOWER, id=2, position=1)),
        ),
    )
    assert not add_measures(Journal(PERSON), Ids({}), [])


def test_more_go_after_those_there() -> None:
    journal = Journal.of([PERSON, replace(UPPER, id=4, position=6, archived=True)])
    (change,) = add_measures(journal, Ids({"measure": 9, "change": 30}), [LOWER]).changes
    assert change.after == replace(LOWER, id=10, position=7)


def test_ids_are_handed_out_once() -> None:
    ids = Ids({"measure": 3})
    assert [ids.new("measure"), ids.new("change"), ids.new("measure"), ids.new("change")] == [4, 1, 5, 2]
    assert (ids.new("span"), ids.new("plan")) == (1, 1)


def test_an_id_that_is_gone_is_not_used_again(tmp_path: Path) -> None:
    """Neither after undoing an addition, nor after a removal and a restart."""
    path = tmp_path / "log"
    with Store.create(path, PERSON) as store:
        journal, ids = store.read(), Ids(store.highest_ids())
        edit = add_measures(journal, ids, [UPPER, LOWER])
        step = store.write(edit.act, edit.changes)
        undo = undo_edit(step)
        store.write(undo.act, undo.changes, kind="undo", of=step.number)
        (change,) = add_measures(journal, ids, [LOWER]).changes
        assert change.record == replace(LOWER, id=3)
    with Store.open(path) as store:
        assert store.read() == journal
        assert Ids(store.highest_ids()).new("measure") == 3


def test_other_words_and_places_at_once() -> None:
    first, second = Measure(1, 0, "a"), Measure(2, 1, "b")
    journal = Journal.of([PERSON, first, second])
    swapped = (replace(first, position=1), replace(second, position=0, title="c"))
    edit = set_measure(journal, *swapped)
    assert edit == Edit("set measure", (RowChange(first, swapped[0]), RowChange(second, swapped[1])))
    assert set_measure(journal, first, swapped[1]).changes == (RowChange(second, swapped[1]),)
    assert not set_measure(journal, first, second)
    with pytest.raises(KeyError):
        set_measure(journal, Measure(3, 0, "c"))


def test_hidden_and_shown_again() -> None:
    measure = Measure(1, 0, "a")
    journal = Journal.of([PERSON, measure, Entry(1, DAY, value=1.0)])
    edit = archive_measure(journal, 1)
    assert edit == Edit("set measure", (RowChange(measure, replace(measure, archived=True)),))
    journal.apply(edit.changes)
    assert journal.columns() == []
    assert len(journal.log_of(1)) == 1
    assert not archive_measure(journal, 1)
    journal.apply(archive_measure(journal, 1, archived=False).changes)
    assert journal.columns() == [measure]
    with pytest.raises(KeyError):
        archive_measure(journal, 2)


def test_a_measure_goes_with_all_that_is_about_it_alone(tmp_path: Path) -> None:
    gone = [
        Measure(1, 0, "a"),
        Entry(1, DAY, value=1.0),
        Entry(1, DAY, "am", value=2.0),
        Plan(1, 1, DAY, 3),
        Change(1, DAY, "only a", measures=(1,)),
        Span(1, DAY, DAY, label="only a", measures=(1,)),
    ]
    narrowed = [Change(2, DAY, "a and b", measures=(1, 2)), Span(2, DAY, DAY, measures=(2, 1))]
    stay = [
        PERSON,
        Measure(2, 1, "b"),
        Entry(2, DAY, value=3.0),
        Plan(2, 2, DAY, 4),
        Change(3, DAY, "all"),
        Change(4, DAY, "b", measures=(2,)),
        Span(3, DAY, DAY),
    ]
    with Store.create(tmp_path / "log", [*gone, *narrowed, *stay]) as store:
        journal = before = store.read()
        edit = remove_measure(journal, 1)
        step = store.write(edit.act, edit.changes)
        after = Journal.of([*stay, *(replace(mark, measures=(2,)) for mark in narrowed)])  # type: ignore[type-var]
        assert store.read() == after
        assert after.changes_of(2) == [replace(narrowed[0], measures=(2,)), *stay[4:6]]  # type: ignore[type-var]
        undo = undo_edit(step)
        store.write(undo.act, undo.changes, kind="undo", of=step.number)
        assert store.read() == before
        store.verify()
    with pytest.raises(KeyError):
        remove_measure(after, 1)


def test_a_measure_that_was_never_written_in() -> None:
    measure = Measure(1, 0, "a")
    edit = remove_measure(Journal.of([PERSON, measure]), 1)
    assert edit == Edit("remove measure", (RowChange(measure, None),))


def test_whose_journal_it_is() -> None:
    journal = Journal(PERSON)
    edit = set_person(journal, question="")
    assert edit == Edit("set person", (RowChange(PERSON, replace(PERSON, question="")),))
    assert set_person(journal, name="Bo").changes[0].after == replace(PERSON, name="Bo")
    assert not set_person(journal)
    assert not set_person(journal, name="Ana", question="Does it help?")


def test_another_unit_turns_every_number_over_as_one_act() -> None:
    weight = Measure(1, 0, "Weight", "kg", likely_low=25.0, likely_high=300.0, worth=2.0, decimals=1)
    aside = Entry(1, DAY, "am", value=70.5, kind="set aside", note="shoes on", original="70,5")
    journal = Journal.of(
        [PERSON, weight, Entry(1, DAY, value=80.0, original="80"), aside, Entry(1, DAY, "pm", kind="ill")]
    )
    edit = convert_measure(journal, replace(weight, unit="lb"), 1 / 0.45359237, 0.0)
    journal.apply(edit.changes)
    assert edit.act == "set measure"
    assert journal.measures[1].unit == "lb"
    assert journal.measures[1].worth == pytest.approx(4.40924524)
    assert (journal.measures[1].likely_low, journal.measures[1].goal_low) == (pytest.approx(55.1155655), None)
    assert journal.entry(1, DAY).value == 176.36981
    assert replace(journal.entry(1, DAY, "am"), value=70.5) == aside
    assert journal.entry(1, DAY, "pm") == Entry(1, DAY, "pm", kind="ill")


def test_a_zero_is_none_of_another_scale() -> None:
    measure = Measure(1, 0, "Chill", "°C", kind="amount", worth=1.0)
    journal = Journal.of([PERSON, measure, Entry(1, DAY, value=0.0, kind="zero")])
    journal.apply(convert_measure(journal, replace(measure, unit="°F"), 1.8, 32.0).changes)
    assert (journal.entry(1, DAY).value, journal.entry(1, DAY).kind) == (32.0, "value")
    assert journal.measures[1].worth == 1.8


def test_columns_change_places_with_their_neighbours() -> None:
    first, hidden, second = Measure(1, 0, "a"), Measure(2, 1, "b", archived=True), Measure(3, 2, "c")
    journal = Journal.of([PERSON, first, hidden, second])
    journal.apply(move_measure(journal, 1, 1).changes)
    assert [measure.id for measure in journal.columns()] == [3, 1]
    assert not move_measure(journal, 1, 1)
    assert not move_measure(journal, 3, -1)
    assert not move_measure(journal, 2, 1)
    with pytest.raises(KeyError):
        move_measure(journal, 9, 1)
