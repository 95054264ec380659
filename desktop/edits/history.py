"""Taking back and doing again, derived from the steps of the history so that it survives a restart."""

from __future__ import annotations

from collections import deque
from collections.abc import Iterable
from dataclasses import replace

from desktop.edits.edit import Edit
from desktop.journal.row_change import Step

STEPS_KEPT = 200
"""How many acts can be taken back; the history in the file keeps all."""


class UndoHistory:
    """What can be taken back and done again."""

    def __init__(self, steps: Iterable[Step] = ()) -> None:
        """From the last steps of a history, oldest first; it may start anywhere."""
        self._done: deque[Step] = deque(maxlen=STEPS_KEPT)
        self._undone: deque[Step] = deque(maxlen=STEPS_KEPT)
        for step in steps:
            self.record(step)

    @property
    def undoable(self) -> Step | None:
        """The act that is taken back next, or None."""
        return self._done[-1] if self._done else None

    @property
    def redoable(self) -> Step | None:
        """The act that is done again next, or None."""
        return self._undone[-1] if self._undone else None

    def record(self, step: Step) -> None:
        """Take note of the next step of the history."""
        if step.kind == "undo":
            self._undone.append(_taken(self._done, step))
        elif step.kind == "redo":
            self._done.append(_taken(self._undone, step))
        else:
            self._undone.clear()
            if step.act != "start journal":
                self._done.append(step)


def undo_edit(step: Step) -> Edit:
    """The edit that takes an act back; written with kind "undo" and the number of the act."""
    return Edit(step.act, tuple(change.inverse() for change in reversed(step.changes)))


def redo_edit(step: Step) -> Edit:
    """The edit that does an act again; written with kind "redo" and the number of the act."""
    return Edit(step.act, step.changes)


def _taken(pile: deque[Step], step: Step) -> Step:
    """The act a step concerns, off its pile, or made from the step when the act came before the first step."""
    if pile:
        return pile.pop()
    changes = undo_edit(step).changes if step.kind == "undo" else step.changes
    return replace(step, number=step.of or step.number, kind="do", of=None, changes=changes)
