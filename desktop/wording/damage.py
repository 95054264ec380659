"""Words for a file that is damaged, gone, open elsewhere or cut short, and for a clock that went back."""

from __future__ import annotations

from datetime import date
from pathlib import Path

from desktop.journal.journal import Journal
from desktop.wording.days import full_day
from desktop.wording.numbers import count

READING = "Looking at what can be read of it…"
NOTHING_LEFT = "Nothing of it can be read, and there is no good earlier copy."
STAYS = "Either way the damaged file stays beside the new one, unchanged, under another name."
BUILD = "Build a new journal from what can be read"
LEAVE = "Leave it as it is"
READ_ONLY = "Open it to read"


def damaged_sentence(path: Path) -> str:
    """That a file is damaged, and that it was left alone."""
    return f"{path.name} is damaged. It was not changed."


def readable_sentence(proven: int, of: int) -> str:
    """How much of a damaged journal is certain: ``412 of 420 values can be read with certainty.``."""
    if of == 0:
        return "No values were found in it."
    if proven == of:
        return f"All {count(of, 'value')} can be read with certainty." if of > 1 else "Its value can be read."
    rest = of - proven
    more = "one more is" if rest == 1 else f"{rest} more are"
    return (
        f"{proven} of {count(of, 'value')} can be read with certainty; {more} known from one place only, "
        "or as an earlier value of the day."
    )


def copy_sentence(made: str | None, behind: int) -> str:
    """What the newest good copy is worth beside what can be read.

    Args:
        made: when it was taken, in words; None without one.
        behind: how many records it lacks or has otherwise.
    """
    if made is None:
        return "There is no good earlier copy."
    if behind == 0:
        return f"The newest good copy, of {made}, holds all of this too."
    lacks, them = ("one thing", "it") if behind == 1 else (f"{behind} things", "them")
    return f"The newest good copy is of {made}. It lacks {lacks} of this, or has {them} otherwise."


def open_copy(made: str) -> str:
    """The button that opens a copy."""
    return f"Open the copy of {made}"


def missing_sentence(path: Path, made: str) -> str:
    """That a journal is not where it was, but a copy of it is."""
    return (
        f"{path.name} is not where it was. It may have been moved or removed. "
        f"There is a copy of it, taken {made}. Open that copy?"
    )


def open_elsewhere_sentence(path: Path) -> str:
    """That another window has the journal."""
    return (
        f"{path.name} is open already in another window. Go on there, or open it here to read: "
        "nothing can be changed in this window then."
    )


def abrupt_sentence(journal: Journal) -> str:
    """That the program was cut short last time, and that nothing that was saved is gone."""
    days = journal.days()
    entries = sum(len(by_day) for by_day in journal.entries.values())
    if days is None or not entries:
        return "The last session ended abruptly. Everything that was saved is here."
    return (
        f"The last session ended abruptly. Everything saved before is here: {count(entries, 'value')}, "
        f"the last of {full_day(days[1])}."
    )


def clock_sentence(today: date, last: date) -> str:
    """That this computer's date lies before the last thing that was written down."""
    return (
        f"This computer's date, {full_day(today)}, is before your last entry, made on {full_day(last)}. "
        "Check it before you add today."
    )


def kept_elsewhere(path: Path) -> str:
    """That a copy was made at a place of the person's choice."""
    return f"A copy is in {path}."
