"""What differs between two states of a journal."""

from __future__ import annotations

from dataclasses import dataclass

from desktop.journal.journal import Journal
from desktop.journal.records import DayNote, Entry, Measure, Record
from desktop.journal.row_change import key_of


@dataclass(frozen=True)
class Difference:
    """One record that is not the same in two states of a journal.

    Attributes:
        now: as the journal stands; None = only in the other.
        then: as the other has it; None = only in the journal.
    """

    now: Record | None
    then: Record | None

    @property
    def record(self) -> Record:
        """One of the two, for what both have in common."""
        record = self.then if self.then is not None else self.now
        assert record is not None
        return record


def differences(journal: Journal, earlier: Journal) -> list[Difference]:
    """What differs between two states of a journal: measures first, then days in their order, then the rest."""
    now = {key_of(record): record for record in journal.records()}
    then = {key_of(record): record for record in earlier.records()}
    differing = [Difference(now.get(key), then.get(key)) for key in now | then if now.get(key) != then.get(key)]
    return sorted(differing, key=lambda one: _place(one.record))


def _place(record: Record) -> tuple[int, str, str]:
    first = 0 if isinstance(record, Measure) else 1 if isinstance(record, Entry | DayNote) else 2
    day = record.day.isoformat() if isinstance(record, Entry | DayNote) else ""
    return first, day, str(key_of(record))
