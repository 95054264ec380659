"""Going back to an earlier state of the journal, whole or day by day, as an edit like any other."""

from __future__ import annotations

from collections.abc import Iterable

from desktop.edits.edit import Edit, edit_putting
from desktop.journal.differences import differences
from desktop.journal.journal import Journal
from desktop.journal.records import DayNote, Entry
from desktop.journal.row_change import RowChange


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
