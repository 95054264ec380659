"""Long random sessions against a model that knows nothing of records, files or histories."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from datetime import date, datetime, timedelta
from pathlib import Path
from random import Random

import pytest

from desktop.edits.days import PastedValue, clear, paste_values, put_value, set_kind, write_note
from desktop.edits.edit import DayCell, Edit
from desktop.edits.history import UndoHistory, redo_edit, undo_edit
from desktop.journal.journal import Journal
from desktop.journal.records import Entry
from desktop.journal.row_change import StepKind, key_of
from desktop.storage.store import Store
from tests.desktop.storage.samples import EXERCISE, PERSON

NOW = datetime(2026, 3, 10, 21, 0)
Key = tuple[int, int]
Held = tuple[float | None, str]


class Session:
    """A person at a journal, and beside it a plain model of what they did."""

    def __init__(self, path: Path, random: Random, days: int) -> None:
        self.path = path
        self.random = random
        self.days = days
        measures = [EXERCISE, replace(EXERCISE, id=2, position=1, kind="reading")]
        self.store = Store.create(path, [PERSON, *measures])
        self.journal = self.store.read()
        self.history = UndoHistory(self.store.steps())
        self.values = 0
        self.model: dict[Key, Held] = {}
        self.done: list[dict[Key, tuple[Held | None, Held | None]]] = []
        self.undone: list[dict[Key, tuple[Held | None, Held | None]]] = []
        self.ever: set[tuple[Key, float]] = set()

    def day(self, number: int) -> date:
        return date(2026, 3, 9) - timedelta(number)

    def key(self) -> Key:
        return self.random.choice((1, 2)), self.random.randrange(self.days)

    def value(self) -> float:
        # Few different values, so that the same one is written again now and then.
        return self.random.choice((0.0, 30.0, float(self.random.randrange(200)), self.random.random()))

    def expected(self, key: Key, value: float) -> Held:
        if (NOW.date() - self.day(key[1])).days >= 2:
            return value, "late"
        return value, "zero" if value == 0 and key[0] == 1 else "value"

    def write(self, edit: Edit, kind: StepKind = "do", of: int | None = None) -> None:
        self.journal.apply(edit.changes)
        self.history.record(self.store.write(edit.act, edit.changes, kind, of))

    def do(self, edit: Edit, wanted: dict[Key, Held | None]) -> None:
        moved = {key: (self.model.get(key), held) for key, held in wanted.items() if self.model.get(key) != held}
        assert bool(edit) == bool(moved)
        if edit:
            self.write(edit)
            self.done.append(moved)
            self.undone.clear()
            self.put({key: after for key, (_, after) in moved.items()})

    def put(self, held: dict[Key, Held | None]) -> None:
        for key, now in held.items():
            if now is None:
                del self.model[key]
            else:
                self.model[key] = now

    def enter(self) -> None:
        key, value = self.key(), self.value()
        self.values += 1
        self.ever.add((key, value))
        edit = put_value(self.journal, key[0], self.day(key[1]), value, repr(value), now=NOW)
        self.do(edit, {key: self.expected(key, value)})

    def paste(self) -> None:
        cells = {self.key(): self.value() for _ in range(self.random.randrange(1, 6))}
        self.values += len(cells)
        self.ever.update(cells.items())
        pasted = [
            PastedValue(DayCell(key[0], self.day(key[1])), value, repr(value)) for key, value in cells.items()
        ]
        edit = paste_values(self.journal, pasted, now=NOW, source="typed")
        self.do(edit, {key: self.expected(key, value) for key, value in cells.items()})

    def empty(self) -> None:
        keys = {self.key() for _ in range(self.random.randrange(1, 4))}
        edit = clear(self.journal, [DayCell(key[0], self.day(key[1])) for key in keys])
        self.do(edit, dict.fromkeys(keys))

    def rest(self) -> None:
        key = self.key()
        edit = set_kind(self.journal, key[0], self.day(key[1]), "rest", now=NOW)
        self.do(edit, {key: (None, "rest")})

    def undo(self) -> None:
        step = self.history.undoable
        assert (step is None) == (not self.done)
        if step is not None:
            self.write(undo_edit(step), "undo", step.number)
            moved = self.done.pop()
            self.undone.append(moved)
            self.put({key: before for key, (before, _) in moved.items()})

    def redo(self) -> None:
        step = self.history.redoable
        assert (step is None) == (not self.undone)
        if step is not None:
            self.write(redo_edit(step), "redo", step.number)
            moved = self.undone.pop()
            self.done.append(moved)
            self.put({key: after for key, (_, after) in moved.items()})

    def restart(self) -> None:
        self.store.close()
        self.store = Store.open(self.path)
        self.journal = self.store.read()
        self.history = UndoHistory(self.store.steps(200))

    def act(self, *weights: int) -> None:
        acts = (self.enter, self.paste, self.empty, self.rest, self.undo, self.redo, self.restart)
        self.random.choices(acts, weights)[0]()

    def check(self) -> None:
        """The journal in memory and in the file are as the model, and the history is whole."""
        for journal in (self.journal, self.store.read()):
            assert held_by(journal, self) == self.model
        self.store.verify()
        found = {
            (record.measure, record.day, record.value)
            for step in self.store.steps()
            for change in step.changes
            if isinstance(record := change.after, Entry)
        }
        assert {(key[0], self.day(key[1]), value) for key, value in self.ever} <= found


def held_by(journal: Journal, session: Session) -> dict[Key, Held]:
    return {
        (entry.measure, (session.day(0) - entry.day).days): (entry.value, entry.kind)
        for entry in journal.records()
        if isinstance(entry, Entry)
    }


@pytest.mark.parametrize("seed", range(25))
def test_after_every_act_the_journal_is_as_the_model(path: Path, seed: int) -> None:
    """Few days, so that acts meet; undo and redo as often as anything else."""
    session = Session(path, Random(seed), days=4)
    for _ in range(60):
        session.act(3, 1, 2, 1, 4, 3, 1)
        assert held_by(session.journal, session) == session.model
        assert held_by(session.store.read(), session) == session.model
        session.store.verify()
    session.check()
    session.store.close()


def test_twenty_thousand_values(path: Path) -> None:
    """20,000 values entered, edited, taken back and done again at random: not one is lost or altered."""
    session = Session(path, Random(20_000), days=730)
    restarts = 0
    while session.values < 20_000:
        session.act(70, 4, 4, 3, 12, 7, 0)
        if session.values // 2_500 > restarts:
            restarts += 1
            session.restart()
    assert restarts == 8
    session.check()
    for key, value in session.random.sample(sorted(session.ever), 200):
        entry_key = key_of(Entry(key[0], session.day(key[1])))
        held = [held.record for held in session.store.history_of(entry_key)]
        assert value in [record.value for record in held if isinstance(record, Entry)]
    session.store.close()


def test_taking_everything_back_and_doing_it_again(path: Path, clock: Callable[[], datetime]) -> None:
    session = Session(path, Random(1), days=30)
    start = session.store.read()
    for _ in range(100):
        session.act(5, 2, 2, 2, 0, 0, 0)
    session.write(write_note(session.journal, date(2026, 3, 1), "a note"))
    session.done.append({})
    end = session.store.read()
    while session.history.undoable:
        session.undo()
    assert session.store.read() == start
    session.restart()
    while session.history.redoable:
        session.redo()
    assert session.store.read() == end
    session.check()
    session.store.close()
