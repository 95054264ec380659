"""One record before and after an act, and the step that holds all records of one act."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from desktop.journal.clients import Client, Coach, CoachingSession
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Plan, Record, Span

StepKind = Literal["do", "undo", "redo"]
Act = Literal[
    "start journal",
    "set person",
    "add measure",
    "set measure",
    "remove measure",
    "put value",
    "clear values",
    "set kind",
    "set aside",
    "put back",
    "write note",
    "paste values",
    "bring in table",
    "mark change",
    "edit change",
    "remove change",
    "mark span",
    "remove span",
    "restore copy",
    "put earlier back",
    "win back",
    "set plan",
    "start caseload",
    "set coach",
    "add clients",
    "set client",
    "write session",
    "remove session",
    "mark looked at",
]
"""What the person did, as the history names it; the wording has a phrase for each."""


@dataclass(frozen=True)
class RowChange:
    """One record before and after; None = was not there, or is no longer there.

    At least one side is given, and both sides have the same type and key.
    """

    before: Record | None
    after: Record | None

    def __post_init__(self) -> None:
        """Refuse a change of nothing, or from one record into another.

        Raises:
            ValueError: both sides are None, or the sides are different records.
        """
        if self.before is None and self.after is None:
            raise ValueError("a row change needs a record on one side")
        if self.before is not None and self.after is not None and key_of(self.before) != key_of(self.after):
            raise ValueError(f"{key_of(self.before)} cannot become {key_of(self.after)}")

    @property
    def record(self) -> Record:
        """The record after, or the one that was removed."""
        record = self.after if self.after is not None else self.before
        assert record is not None
        return record

    def inverse(self) -> RowChange:
        """The change that takes this one back."""
        return RowChange(self.after, self.before)


@dataclass(frozen=True)
class Step:
    """One act of the person, in the history for good.

    Attributes:
        number: position in the history, from 1.
        at: local clock time of the act, ISO 8601; information only.
        kind: done, taken back, or done again.
        act: what was done.
        of: for an undo or a redo the number of the step concerned, else None.
        changes: every record it touched.
    """

    number: int
    at: str
    kind: StepKind
    act: Act
    of: int | None
    changes: tuple[RowChange, ...]


def key_of(record: Record) -> tuple[str | int, ...]:
    """Table name and natural key of a record, e.g. ``("entry", 1, "2026-03-04", "")``."""
    match record:
        case Person():
            return ("person",)
        case Entry():
            return ("entry", record.measure, record.day.isoformat(), record.slot)
        case DayNote():
            return ("note", record.day.isoformat())
        case Coach():
            return ("coach",)
        case CoachingSession():
            return ("session", record.client, record.day.isoformat())
        case Client() | Measure() | Change() | Span() | Plan():
            return (type(record).__name__.lower(), record.id)
