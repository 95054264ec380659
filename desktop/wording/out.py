"""Words of saving a journal as tables and bringing it back."""

from __future__ import annotations

from desktop.journal.journal import Journal
from desktop.wording.numbers import count

SAVED_FORMS: tuple[tuple[str, str], ...] = (
    (
        "A folder that holds everything",
        "All values, words, changes and settings as plain CSV tables, with a description of each column. "
        "It can be brought in again and is then the same journal, without its history.",
    ),
    (
        "One CSV table, to keep",
        "A row a value, just as it is written down. Any program that reads tables can read it.",
    ),
    (
        "One CSV table, for a spreadsheet",
        "The same for opening in a spreadsheet: with its decimal mark, and no words in it can run as a formula.",
    ),
)
"""Each form a copy can have, and what it is good for."""


def saved_sentence(name: str) -> str:
    """That a copy was saved."""
    return f"Saved as {name}. Only you may open it; who it is given to can read everything in it."


def package_sentence(journal: Journal, *, into_open: bool) -> str:
    """What a saved journal holds, as a question whether to bring it in."""
    entries = sum(map(len, journal.entries.values()))
    held = [
        count(len(journal.measures), "measure"),
        "1 entry" if entries == 1 else f"{entries} entries",
        count(len(journal.changes), "change"),
    ]
    if journal.spans:
        held.append(f"{count(len(journal.spans), 'name')} for days")
    told = f"This folder holds a journal: {', '.join(held[:-1])} and {held[-1]}."
    if into_open:
        told += " Where a day of the open journal says something else, the folder wins; Undo takes it all back."
        return f"{told} Bring it in?"
    return f"{told} Make it your journal?"
