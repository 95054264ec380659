"""Going back to an earlier state of the journal, whole or day by day, as an edit like any other."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from desktop.edits.edit import Edit, edit_putting
from desktop.journal.journal import Journal
from desktop.journal.records import DayNote, Entry, Measure, Record
from desktop.journal.row_change import RowChange, key_of


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


def restore(journal: Journal, earlier: Journal) -> Edit:
    """The edit that makes everything as it was in an earlier state.

    Raises:
        ValueError: the earlier state is of another journal.
    """
    if journal.person.journal_id != earlier.person.journal_id:
        raise ValueError("a copy of another journal")
    changes = [RowChange(one.now, one.then) for one in differences(journal, earlier)]
    return Edit("restore copy", tuple(changes))


def put_back_earlier(journal: Journal, records: Iterable[Entry | DayNote]) -> Edit:
    """The edit that puts single days back as they once were; the measures must still be there.

    Raises:
        KeyError: an entry is of a measure that is gone.
    """
    listed = list(records)
    for record in listed:
        if isinstance(record, Entry):
            journal.measures[record.measure]
    return edit_putting(journal, "put earlier back", listed)


def _place(record: Record) -> tuple[int, str, str]:
    first = 0 if isinstance(record, Measure) else 1 if isinstance(record, Entry | DayNote) else 2
    day = record.day.isoformat() if isinstance(record, Entry | DayNote) else ""
    return first, day, str(key_of(record))
