"""Everything a person can do, as the records it changes."""

from dataclasses import replace
from datetime import date, datetime

import pytest

from desktop.edits.bring_in import bring_in
from desktop.edits.changes import edit_change, mark_change, mark_span, remove_change, remove_span
from desktop.edits.days import (
    PastedValue,
    clear,
    kind_of_value,
    paste_values,
    put_back,
    put_value,
    set_aside,
    set_kind,
    write_note,
)
from desktop.edits.edit import DayCell
from desktop.edits.history import STEPS_KEPT, UndoHistory, redo_edit, undo_edit
from desktop.edits.ids import Ids
from desktop.edits.measures import add_measures, archive_measure, remove_measure, set_measure
from desktop.edits.person import set_person
from desktop.journal.journal import Journal
from desktop.journal.records import Change, Entry, Measure, Person, Plan, Span
from desktop.journal.row_change import RowChange, Step

DAY = date(2031, 3, 10)
NOW = datetime(2031, 3, 10, 21, 4)
EXERCISE = Measure(1, 0, "Exercise", "minutes", "amount", missed="zero")
WEIGHT = Measure(2, 1, "Weight", "kg", "reading")


def journal(*more):
    return Journal.of([Person("0" * 32), EXERCISE, WEIGHT, *more])


def made(held, edit):
    held.apply(edit.changes)
    return held


def typed(held, value, measure=1, day=DAY, text=None, now=NOW):
    return made(held, put_value(held, measure, day, value, text or f"{value:g}", now=now))


def test_a_value_is_kept_with_its_text_and_its_time():
    entry = typed(journal(), 30, text="0:30").entry(1, DAY)
    assert (entry.value, entry.original, entry.kind) == (30, "0:30", "value")
    assert entry.entered_at == "2031-03-10T21:04:00"


def test_the_same_value_typed_again_changes_nothing():
    held = typed(journal(), 30)
    assert not put_value(held, 1, DAY, 30, "30", now=datetime(2031, 3, 20, 9, 0))


@pytest.mark.parametrize(
    ("measure", "value", "source", "entered", "kind"),
    [
        (EXERCISE, 0.0, "typed", DAY, "zero"),
        (WEIGHT, 0.0, "typed", DAY, "value"),
        (EXERCISE, 30.0, "typed", date(2031, 3, 11), "value"),
        (EXERCISE, 30.0, "typed", date(2031, 3, 12), "late"),
        (EXERCISE, 0.0, "typed", date(2031, 3, 12), "late"),
        (EXERCISE, 30.0, "table", date(2031, 4, 12), "value"),
        (EXERCISE, 30.0, "sample", date(2031, 4, 12), "value"),
    ],
)
def test_what_kind_of_day_a_value_makes(measure, value, source, entered, kind):
    assert kind_of_value(measure, DAY, value, source, entered) == kind


def test_a_value_keeps_the_note_that_is_there():
    held = journal(Entry(1, DAY, value=20, note="rain", original="20"))
    assert typed(held, 30).entry(1, DAY).note == "rain"


def test_an_extra_reading_stays_extra():
    held = journal()
    made(held, put_value(held, 2, DAY, 71.5, "71.5", now=NOW, kind="extra"))
    assert held.entry(2, DAY).kind == "extra"


def test_clearing_takes_away_what_is_there_and_only_once():
    held = typed(journal(), 30)
    edit = clear(held, [DayCell(1, DAY), DayCell(1, DAY), DayCell(2, DAY)])
    assert len(edit.changes) == 1
    assert made(held, edit).entry(1, DAY) is None


@pytest.mark.parametrize("kind", ["rest", "ill", "away", "blank"])
def test_a_kind_of_day_holds_no_value(kind):
    held = typed(journal(), 30)
    entry = made(held, set_kind(held, 1, DAY, kind, now=NOW)).entry(1, DAY)
    assert (entry.kind, entry.value) == (kind, None)
    assert not set_kind(held, 1, DAY, kind, now=NOW)


def test_a_day_set_aside_keeps_its_value_and_comes_back():
    held = typed(journal(), 30)
    made(held, set_aside(held, 1, DAY, "watch left at home"))
    entry = held.entry(1, DAY)
    assert (entry.kind, entry.value, entry.note) == ("set aside", 30, "watch left at home")
    assert not set_aside(held, 1, DAY, "again")
    made(held, put_back(held, 1, DAY))
    assert held.entry(1, DAY).kind == "value"
    assert not put_back(held, 1, DAY)


def test_a_late_value_that_was_set_aside_comes_back_late():
    held = typed(journal(), 30, now=datetime(2031, 3, 14, 8, 0))
    made(held, set_aside(held, 1, DAY, ""))
    assert made(held, put_back(held, 1, DAY)).entry(1, DAY).kind == "late"


def test_nothing_is_set_aside_where_there_is_no_value():
    assert not set_aside(journal(), 1, DAY, "x")


def test_an_entry_without_a_time_comes_back_as_a_value():
    held = journal(Entry(1, DAY, value=30, kind="set aside"))
    assert made(held, put_back(held, 1, DAY)).entry(1, DAY).kind == "value"


def test_a_note_is_written_changed_and_taken_away():
    held = journal()
    made(held, write_note(held, DAY, "sunny"))
    assert held.note(DAY) == "sunny"
    made(held, write_note(held, DAY, "  "))
    assert held.note(DAY) == ""
    assert not write_note(held, DAY, "")


def test_of_two_pasted_values_for_one_cell_the_later_one_stays():
    held = journal()
    block = [PastedValue(DayCell(1, DAY), 20.0, "20"), PastedValue(DayCell(1, DAY), 25.0, "25")]
    edit = paste_values(held, block, now=NOW)
    assert edit.act == "paste values"
    assert made(held, edit).entry(1, DAY).value == 25


def test_a_pasted_kind_of_day_holds_no_value():
    held = journal()
    made(held, paste_values(held, [PastedValue(DayCell(1, DAY), None, "", "ill")], now=NOW))
    assert held.entry(1, DAY).kind == "ill"


def test_a_value_for_a_measure_that_is_not_there_is_refused():
    with pytest.raises(KeyError):
        put_value(journal(), 9, DAY, 1, "1", now=NOW)


def test_measures_are_added_together_after_those_there_are():
    held = journal()
    edit = add_measures(held, Ids({"measure": 7}), [Measure(0, 0, "Upper"), Measure(0, 0, "Lower")])
    assert [(one.after.id, one.after.position) for one in edit.changes] == [(8, 2), (9, 3)]


def test_a_measure_gets_other_words_and_nothing_when_they_are_the_same():
    held = journal()
    made(held, set_measure(held, replace(EXERCISE, title="Walking")))
    assert held.measures[1].title == "Walking"
    assert not set_measure(held, held.measures[1])
    with pytest.raises(KeyError):
        set_measure(held, replace(EXERCISE, id=9))


def test_an_archived_measure_leaves_the_table_and_comes_back():
    held = journal()
    made(held, archive_measure(held, 1))
    assert [measure.id for measure in held.columns()] == [2]
    made(held, archive_measure(held, 1, archived=False))
    assert [measure.id for measure in held.columns()] == [1, 2]


def test_a_removed_measure_takes_what_is_about_it_alone_and_undo_brings_it_back():
    held = journal(
        Entry(1, DAY, value=30),
        Plan(1, 1, DAY, 3),
        Change(1, DAY, "both", measures=(1, 2)),
        Change(2, DAY, "only exercise", measures=(1,)),
        Change(3, DAY, "all"),
        Span(1, DAY, DAY, "ill", measures=(1,)),
    )
    before = sorted(map(repr, held.records()))
    edit = remove_measure(held, 1)
    made(held, edit)
    assert 1 not in held.measures
    assert not held.entries[1]
    assert not held.plans
    assert {number: change.measures for number, change in held.changes.items()} == {1: (2,), 3: ()}
    assert not held.spans
    made(held, undo_edit(Step(2, "", "do", edit.act, None, edit.changes)))
    assert sorted(map(repr, held.records())) == before


def test_a_change_is_marked_edited_and_removed():
    held, ids = journal(), Ids({})
    made(held, mark_change(held, ids, DAY, "stairs", why="planned", settle_days=2, measures=(1,)))
    assert held.changes[1] == Change(1, DAY, "stairs", "planned", 2, (1,))
    made(held, edit_change(held, replace(held.changes[1], label="more stairs")))
    assert held.changes[1].label == "more stairs"
    assert not edit_change(held, held.changes[1])
    made(held, remove_change(held, 1))
    assert not held.changes
    with pytest.raises(KeyError):
        remove_change(held, 1)
    with pytest.raises(KeyError):
        edit_change(held, Change(1, DAY))


def test_an_id_is_never_used_again():
    held, ids = journal(), Ids({"change": 4})
    made(held, mark_change(held, ids, DAY, "a"))
    made(held, remove_change(held, 5))
    made(held, mark_change(held, ids, DAY, "b"))
    assert list(held.changes) == [6]


def test_named_days_have_their_ends_in_order():
    held = journal()
    made(held, mark_span(held, Ids({}), date(2031, 3, 12), DAY, "away", "lake", measures=(2,)))
    assert held.spans[1] == Span(1, DAY, date(2031, 3, 12), "away", "lake", (2,))
    made(held, remove_span(held, 1))
    assert not held.spans


def test_the_person_changes_only_what_is_said():
    held = journal()
    made(held, set_person(held, name="M."))
    made(held, set_person(held, question="Is this enough?"))
    assert (held.person.name, held.person.question) == ("M.", "Is this enough?")
    assert not set_person(held)


def test_a_table_adds_replaces_and_leaves_alone():
    held = typed(typed(journal(), 30), 40, day=date(2031, 3, 9))
    entries = [
        Entry(1, DAY, value=30, original="30", source="table"),
        Entry(1, date(2031, 3, 9), value=45, original="45", source="table"),
        Entry(0, DAY, value=7.5, original="7.5", source="table"),
    ]
    brought = bring_in(held, Ids({"measure": 2}), [Measure(0, 0, "Sleep", "hours")], entries, now=NOW)
    assert (brought.added, brought.replaced, brought.untouched) == (1, 1, 1)
    made(held, brought.edit)
    assert held.entry(1, date(2031, 3, 9)).value == 45
    assert held.entry(brought.measures[0].id, DAY).value == 7.5


def test_the_same_table_brought_in_again_changes_nothing():
    held = journal()
    entries = [Entry(1, DAY, value=0, original="0", source="table"), Entry(2, DAY, value=71.5, original="71.5")]
    first = bring_in(held, Ids({}), [], entries, now=NOW)
    made(held, first.edit)
    assert held.entry(1, DAY).kind == "zero"
    again = bring_in(held, Ids({}), [], entries, now=datetime(2031, 5, 1, 8, 0))
    assert (again.added, again.replaced, again.untouched) == (0, 0, 2)
    assert not again.edit


def test_a_replaced_value_keeps_the_note_that_was_there():
    held = journal(Entry(1, DAY, value=20, note="rain", original="20"))
    made(held, bring_in(held, Ids({}), [], [Entry(1, DAY, value=25, original="25")], now=NOW).edit)
    assert held.entry(1, DAY).note == "rain"


def test_a_blank_of_the_table_takes_no_value_away():
    held = typed(journal(), 30)
    brought = bring_in(held, Ids({}), [], [Entry(1, DAY, kind="blank", source="table")], now=NOW)
    assert (brought.untouched, bool(brought.edit)) == (1, False)


@pytest.mark.parametrize(
    ("measures", "entries", "error"),
    [
        ([Measure(5, 0, "x")], [], ValueError),
        ([], [Entry(1, DAY, value=1), Entry(1, DAY, value=2)], ValueError),
        ([], [Entry(9, DAY, value=1)], KeyError),
    ],
    ids=["a real id", "twice the same day", "no such measure"],
)
def test_a_table_that_contradicts_itself_is_refused(measures, entries, error):
    with pytest.raises(error):
        bring_in(journal(), Ids({}), measures, entries, now=NOW)


def step(number, kind="do", of=None, act="put value"):
    change = RowChange(None, Entry(1, DAY, value=float(number)))
    return Step(number, "", kind, act, of, (change,))


def test_undo_and_redo_go_back_and_forth_in_order():
    history = UndoHistory([step(1, act="start journal"), step(2), step(3)])
    assert history.undoable.number == 3
    history.record(step(4, "undo", 3))
    assert (history.undoable.number, history.redoable.number) == (2, 3)
    history.record(step(5, "redo", 3))
    assert (history.undoable.number, history.redoable) == (3, None)


def test_a_new_act_ends_redo():
    history = UndoHistory([step(1), step(2, "undo", 1), step(3)])
    assert history.redoable is None
    assert history.undoable.number == 3


def test_the_start_of_a_journal_cannot_be_taken_back():
    assert UndoHistory([step(1, act="start journal")]).undoable is None


def test_a_history_read_from_the_middle_still_knows_what_was_undone():
    history = UndoHistory([step(9, "undo", 4)])
    assert history.redoable.number == 4
    assert redo_edit(history.redoable).changes == undo_edit(step(9)).changes
    assert UndoHistory([step(9, "redo", 4)]).undoable.number == 4


def test_only_so_many_acts_are_kept():
    history = UndoHistory(step(number) for number in range(1, STEPS_KEPT + 50))
    taken = 0
    while history.undoable is not None:
        history.record(step(1000 + taken, "undo", history.undoable.number))
        taken += 1
    assert taken == STEPS_KEPT


def test_undo_is_the_exact_inverse():
    held = journal()
    edit = paste_values(
        held, [PastedValue(DayCell(1, DAY), 20.0, "20"), PastedValue(DayCell(2, DAY), 71.0, "71")], now=NOW
    )
    before = sorted(map(repr, held.records()))
    made(held, edit)
    done = Step(2, "", "do", edit.act, None, edit.changes)
    made(held, undo_edit(done))
    assert sorted(map(repr, held.records())) == before
    made(held, redo_edit(done))
    assert held.entry(2, DAY).value == 71
