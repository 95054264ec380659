"""Words for erasing for good, its limits among them."""

from __future__ import annotations

from datetime import date

from desktop.wording.days import full_day

LIMITS = (
    "Erasing takes it out of the journal, its whole history and every earlier copy: those are replaced by one "
    "new copy, and Undo cannot bring anything of it back. It cannot reach copies you gave away, copies a synced "
    "folder or a backup of this computer keeps, printed pages, or traces in the memory chips of a disk."
)
SURE = "I know that nobody can bring it back"
NOT_REACHED = "Erased here. The second place was not reached: the copies there still hold it."
EVERYTHING = "Everything: the journal and all its copies"


def this_day(day: date) -> str:
    """One day as a choice."""
    return f"The day {full_day(day)}: its values in all measures, and its note"


def this_measure(title: str) -> str:
    """One measure as a choice."""
    return f"The measure “{title}” with all its values"


def erased_sentence(what: str) -> str:
    """That it is done."""
    return f"Erased for good: {what[0].lower()}{what[1:]}."
