"""What a person did, as the records it changes: nothing is changed until the edit is written and applied."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from datetime import date

from desktop.journal.caseload import Caseload
from desktop.journal.journal import Journal
from desktop.journal.records import Record
from desktop.journal.row_change import Act, RowChange


@dataclass(frozen=True)
class Edit:
    """One act and every record it changes, in order; false when nothing would change.

    Attributes:
        act: what the person did.
        changes: for ``Store.write`` and ``Journal.apply``.
    """

    act: Act
    changes: tuple[RowChange, ...]

    def __bool__(self) -> bool:
        """Whether anything would change."""
        return bool(self.changes)


@dataclass(frozen=True)
class DayCell:
    """The place of one entry: a measure on a day, in a slot (``""`` for the whole day)."""

    measure: int
    day: date
    slot: str = ""


def edit_putting(kept: Journal | Caseload, act: Act, records: Iterable[Record]) -> Edit:
    """The edit that puts each record where the journal or caseload has another, or none, under its key.

    Args:
        kept: as it stands.
        act: what the person did.
        records: no two with the same key.
    """
    pairs = ((kept.find(record), record) for record in records)
    return Edit(act, tuple(RowChange(before, after) for before, after in pairs if before != after))
