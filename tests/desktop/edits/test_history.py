from __future__ import annotations

from dataclasses import replace
from datetime import date

from desktop.edits.edit import Edit
from desktop.edits.history import STEPS_KEPT, UndoHistory, redo_edit, undo_edit
from desktop.journal.records import DayNote, Person
from desktop.journal.row_change import RowChange, Step, StepKind

DAY = date(2026, 3, 1)
START = Step(1, "", "do", "start journal", None, (RowChange(None, Person("0" * 32)),))


def note(number: int) -> tuple[RowChange, ...]:
    return RowChange(None, DayNote(DAY, str(number))), RowChange(DayNote(DAY, str(number)), None)


def done(number: int) -> Step:
    return Step(number, f"at {number}", "do", "write note", None, note(number))


def later(number: int, kind: StepKind, of: Step) -> Step:
    edit = undo_edit(of) if kind == "undo" else redo_edit(of)
    return Step(number, f"at {number}", kind, edit.act, of.number, edit.changes)


def state(history: UndoHistory) -> tuple[int | None, int | None]:
    return (
        history.undoable.number if history.undoable else None,
        history.redoable.number if history.redoable else None,
    )


def test_nothing_yet() -> None:
    assert state(UndoHistory()) == (None, None)


def test_starting_a_journal_is_not_taken_back() -> None:
    assert state(UndoHistory([START])) == (None, None)
    assert state(UndoHistory([START, done(2)])) == (2, None)


def test_back_and_again() -> None:
    history = UndoHistory([START, done(2), done(3)])
    history.record(later(4, "undo", done(3)))
    assert state(history) == (2, 3)
    history.record(later(5, "undo", done(2)))
    assert state(history) == (None, 2)
    history.record(later(6, "redo", done(2)))
    assert state(history) == (2, 3)
    history.record(later(7, "redo", done(3)))
    assert state(history) == (3, None)
    assert history.undoable == done(3)


def test_doing_something_else_ends_what_can_be_done_again() -> None:
    history = UndoHistory([START, done(2), done(3), later(4, "undo", done(3)), done(5)])
    assert state(history) == (5, None)
    history.record(later(6, "undo", done(5)))
    assert state(history) == (2, 5)


def test_a_start_in_the_middle_of_a_history() -> None:
    """The acts concerned came before the first step known; they are made from what is known."""
    steps = [later(9, "undo", done(8)), later(10, "undo", done(7)), later(11, "redo", done(7))]
    history = UndoHistory(steps)
    assert state(history) == (7, 8)
    for found, act in ((history.undoable, done(7)), (history.redoable, done(8))):
        assert found is not None
        assert replace(found, at="") == replace(act, at="")
    again = UndoHistory([later(10, "redo", done(7))])
    assert state(again) == (7, None)
    assert again.undoable == replace(done(7), at="at 10")


def test_any_start_gives_the_same_end() -> None:
    steps = [START, *map(done, range(2, 8))]
    steps += [later(8, "undo", done(7)), later(9, "undo", done(6)), later(10, "redo", done(6))]
    whole = UndoHistory(steps)
    for start in range(7):
        assert state(UndoHistory(steps[start:])) == state(whole) == (6, 7)


def test_the_edit_that_takes_back_goes_the_other_way_round() -> None:
    first, second = note(1)
    step = Step(4, "", "do", "paste values", None, (first, second))
    assert undo_edit(step) == Edit("paste values", (second.inverse(), first.inverse()))
    assert redo_edit(step) == Edit("paste values", (first, second))


def test_it_does_not_grow_for_ever() -> None:
    history = UndoHistory(map(done, range(1, 1000)))
    taken = 0
    while (step := history.undoable) is not None:
        history.record(later(1000 + taken, "undo", step))
        taken += 1
    assert taken == STEPS_KEPT
    assert state(history) == (None, 999 - STEPS_KEPT + 1)
