"""One open journal and everything on screen that follows it."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from contextlib import suppress
from dataclasses import dataclass
from datetime import date, datetime
from functools import partial

from PySide6.QtCore import QObject, QTimer, Signal

import analysis
from analysis import Choice, Log, Review, other_choices
from analysis.log import Period
from desktop.edits.edit import Edit
from desktop.edits.history import STEPS_KEPT, UndoHistory, redo_edit, undo_edit
from desktop.edits.ids import Ids
from desktop.errors import StorageError
from desktop.journal.journal import Journal
from desktop.journal.records import Measure
from desktop.journal.row_change import Act, Step, StepKind
from desktop.models.background import Background
from desktop.models.other_measures import Asked, OtherMeasures, ask
from desktop.storage.backups import take_copy
from desktop.storage.store import Held, Store

_COPIED_BEFORE: frozenset[Act] = frozenset({"bring in table", "restore copy"})
"""Acts that alter much at once: the journal is copied before them."""

_AT_ONCE = 1_000
"""Reviews of up to this many entries are quicker than a frame and are made at once."""


_QUIET = 400
"""Milliseconds without a new review before other choices of days are looked at."""


class Session(QObject):
    """The journal in memory, the store it is written to, and the review of the measure on the chart.

    An edit is on screen at once and written by the one thread that owns the store; ``saved`` follows the commit.
    When a write fails, the edit stays on screen and is kept to be tried again, with all that come after it.

    Signals:
        edited: these row changes were made to the journal; none = anything may have changed.
        saved: everything handed in so far is on the disk.
        save_failed: a write failed with this error; nothing was written since.
        measure_chosen: another measure is on the chart.
        reviewed: the review of the measure on the chart is new.
        history_read: what can be taken back is known; a long history is read after the window is up.
        weighed: the answers for other choices of days are there, a moment after the review they belong to.
    """

    edited = Signal(tuple)
    saved = Signal(object)
    save_failed = Signal(object)
    measure_chosen = Signal(int)
    reviewed = Signal(object)
    weighed = Signal(tuple)
    history_read = Signal()

    def __init__(
        self, store: Store, *, now: Callable[[], datetime] = datetime.now, parent: QObject | None = None
    ) -> None:
        super().__init__(parent)
        self.now = now
        self.journal: Journal = store.read()
        self.read_only = store.read_only
        self.path = store.path
        self._store = store
        self._writer = Background(self)
        self._reviewer = Background(self)
        self._history = UndoHistory()
        # Steps made before a long history is read; None once it is.
        self._made_before_history: list[Step] | None = []
        self._ids = Ids(store.highest_ids())
        self._steps = store.last_step_number
        self._unsaved: list[tuple[Edit, StepKind, int | None]] = []
        self._writing = 0
        self.saved_at = store.last_at
        self._blocked: Exception | None = None
        self._others = OtherMeasures()
        self._generation = 0
        self._asked: _Question | None = None
        self._weigh_later = QTimer(self)
        self._weigh_later.setSingleShot(True)
        self._weigh_later.setInterval(_QUIET)
        self._weigh_later.timeout.connect(self._weigh)
        self._closed = False
        columns = self.journal.columns()
        self.measure: int | None = columns[0].id if columns else None
        self.period: Period | None = None
        self.review: Review | None = None
        if store.last_change_number <= _AT_ONCE:
            self._receive_history(store.steps(STEPS_KEPT))
        else:
            # Days and answer are shown first; what can be taken back follows.
            self._writer.run(partial(store.steps, STEPS_KEPT), self._receive_history, self._go_without_history)

    @property
    def today(self) -> date:
        """The calendar day on this computer."""
        return self.now().date()

    @property
    def ids(self) -> Ids:
        """Gives ids that were never used in this journal."""
        return self._ids

    @property
    def current(self) -> Measure | None:
        """The measure on the chart."""
        return self.journal.measures.get(self.measure) if self.measure is not None else None

    @property
    def undoable(self) -> Step | None:
        """The act that Undo takes back, or None."""
        return None if self.read_only else self._history.undoable

    @property
    def redoable(self) -> Step | None:
        """The act that Redo does again, or None."""
        return None if self.read_only else self._history.redoable

    @property
    def is_saved(self) -> bool:
        """Whether everything on screen is on the disk."""
        return not self._unsaved and not self._writing

    @property
    def last_change_number(self) -> int:
        """Number of the last row change on the disk."""
        return self._store.last_change_number

    @property
    def trouble(self) -> Exception | None:
        """What keeps edits from being written, or None."""
        return self._blocked

    def do(self, edit: Edit) -> None:
        """Make an edit: on screen at once, then on the disk. An edit of nothing does nothing."""
        if edit and not self.read_only:
            self._make(edit, "do", None)

    def undo(self) -> None:
        """Take back the last act."""
        if (step := self.undoable) is not None:
            self._make(undo_edit(step), "undo", step.number)

    def redo(self) -> None:
        """Do the act last taken back again."""
        if (step := self.redoable) is not None:
            self._make(redo_edit(step), "redo", step.number)

    def try_again(self) -> None:
        """Write everything that could not be written."""
        waiting, self._unsaved, self._blocked = self._unsaved, [], None
        for edit, kind, of in waiting:
            self._write(edit, kind, of)

    def give_up_unsaved(self) -> None:
        """Go back to what is on the disk; what could not be written is gone from the screen.

        Raises:
            StorageError: the file cannot be read either.
        """
        self.journal = self._store.read()
        self._made_before_history = []
        self._receive_history(self._store.steps(STEPS_KEPT))
        self._steps = self._store.last_step_number
        self._unsaved, self._blocked = [], None
        self._others.forget(())
        self._settle_measure()
        self.edited.emit(())
        self.make_review()

    def choose_measure(self, measure: int) -> None:
        """Put another measure on the chart."""
        if measure != self.measure and measure in self.journal.measures:
            self.measure = measure
            self.period = None
            self.measure_chosen.emit(measure)
            self.make_review()

    def choose_period(self, period: Period) -> None:
        """Answer for days, weeks, months or years."""
        if period != self.period:
            self.period = period
            self.make_review()

    def make_review(self) -> None:
        """Review the measure on the chart, off the screen's thread when that takes longer than a frame."""
        self._generation += 1
        measure = self.current
        if measure is None:
            self._asked = None
            self._receive_review(self._generation, None)
            return
        log = self.journal.log_of(measure.id, self.period)
        beside = self._others.beside(self.journal, measure)
        unknown = self._others.unknown(self.journal, beside)
        question = _Question(
            log,
            self.journal.analysis_changes(measure.id),
            self.today,
            measure.worth,
            measure.look_day,
            self._others.known(beside),
            unknown,
        )
        self._asked = question
        if len(log) + sum(len(other) for _, other, _ in unknown) <= _AT_ONCE:
            self._receive_answer(self._generation, question.answer())
            return
        self._reviewer.run(question.answer, partial(self._receive_answer, self._generation), _raise)

    def tell_held(
        self,
        key: tuple[str | int, ...],
        done: Callable[[list[Held]], None],
        failed: Callable[[Exception], None],
    ) -> None:
        """Look up everything a key has ever held, newest first; then call ``done`` or ``failed``."""
        self._writer.run(partial(self._store.history_of, key), done, failed)

    def wait_until_written(self) -> None:
        """Return when the writer has nothing left to do; for closing and for tests."""
        self._writer.wait()

    def close(self) -> None:
        """Write what is left and let go of the file."""
        self._closed = True
        self._writer.wait()
        self._reviewer.wait()
        self._store.close()

    def _make(self, edit: Edit, kind: StepKind, of: int | None) -> None:
        self.journal.apply(edit.changes)
        self._others.forget(edit.changes)
        self._steps += 1
        at = self.now().isoformat(timespec="seconds")
        step = Step(self._steps, at, kind, edit.act, of, edit.changes)
        self._history.record(step)
        if self._made_before_history is not None:
            self._made_before_history.append(step)
        self._write(edit, kind, of)
        self._settle_measure()
        self.edited.emit(edit.changes)
        self.make_review()

    def _write(self, edit: Edit, kind: StepKind, of: int | None) -> None:
        self._unsaved.append((edit, kind, of))
        if self._blocked is None:
            self._writing += 1
            self._writer.run(partial(self._to_disk, edit, kind, of), self._written, self._not_written)

    def _to_disk(self, edit: Edit, kind: StepKind, of: int | None) -> Step:
        """Called on the writer's thread."""
        if edit.act in _COPIED_BEFORE:
            # Without a copy the act can still be taken back; the next copy that is due says what is wrong.
            with suppress(StorageError):
                take_copy(self.path, self.now())
        return self._store.write(edit.act, edit.changes, kind, of)

    def _written(self, step: Step) -> None:
        self._writing -= 1
        self._unsaved.pop(0)
        self.saved_at = step.at
        if not self._writing and self._blocked is None:
            self.saved.emit(step.at)

    def _not_written(self, error: Exception) -> None:
        self._writing -= 1
        # Edits behind the failed one start from what it would have written: they fail too, and wait with it.
        if self._blocked is None:
            self._blocked = error
            self.save_failed.emit(error)

    def _receive_history(self, steps: list[Step]) -> None:
        if self._made_before_history is None:
            return  # The file was read anew meanwhile.
        self._history = UndoHistory([*steps, *self._made_before_history])
        self._made_before_history = None
        self.history_read.emit()

    def _go_without_history(self, _error: Exception) -> None:
        """The check of the whole file, which runs beside this, says what is wrong with it."""
        self._made_before_history = None

    def _settle_measure(self) -> None:
        """Keep a measure on the chart when one is added or the one shown is removed."""
        columns = self.journal.columns()
        if self.measure not in {measure.id for measure in columns}:
            self.measure = columns[0].id if columns else None
            if self.measure is not None:
                self.measure_chosen.emit(self.measure)

    def _receive_answer(self, generation: int, answer: tuple[Review, Chances]) -> None:
        review, learnt = answer
        if generation == self._generation:
            self._others.learn(learnt)
        self._receive_review(generation, review)

    def _receive_review(self, generation: int, review: Review | None) -> None:
        if generation == self._generation and not self._closed:
            self.review = review
            self._weigh_later.start()
            self.reviewed.emit(review)

    def _weigh(self) -> None:
        """Ask for the answers of other choices of days, off the screen's thread."""
        if self._asked is None or self.review is None or self._closed:
            return
        question, review, generation = self._asked, self.review, self._generation

        def ask_others() -> list[Choice]:
            return other_choices(review, question.log, question.changes, question.today)

        def receive(choices: list[Choice]) -> None:
            if generation == self._generation and not self._closed:
                self.weighed.emit(tuple(choices))

        self._reviewer.run(ask_others, receive, _raise)


Chances = dict[int, float | None]


@dataclass(frozen=True)
class _Question:
    """A review to be made, whole in itself so that it can be made off the screen's thread."""

    log: Log
    changes: Sequence[analysis.Change]
    today: date
    worth: float | None
    look_day: date | None
    others: tuple[float, ...]
    unknown: Sequence[Asked]

    def answer(self) -> tuple[Review, Chances]:
        """The review, and the chances of other measures that were asked for it."""
        learnt = ask(self.unknown, self.today)
        others = (*self.others, *(chance for chance in learnt.values() if chance is not None))
        review = analysis.review(
            self.log,
            self.changes,
            today=self.today,
            worth=self.worth,
            look_day=self.look_day,
            others=others,
        )
        return review, learnt


def _raise(error: Exception) -> None:
    raise error
