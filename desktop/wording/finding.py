"""What was found, in words."""

from __future__ import annotations

from desktop.journal.finding import Found
from desktop.journal.journal import Journal
from desktop.wording.days import long_day
from desktop.wording.numbers import count

_LONGEST = 90


def found_line(found: Found, journal: Journal) -> str:
    """``Monday 3 March 2031, note: slept badly``."""
    text = " ".join(found.text.split())
    short = text if len(text) <= _LONGEST else text[: _LONGEST - 1].rstrip() + "…"
    return f"{long_day(found.day)}, {_where(found, journal)}: {short}"


def found_count(found: int, most: int) -> str:
    """How many places there are."""
    if not found:
        return "Nothing holds these words."
    return f"The newest {count(most, 'place')}." if found >= most else f"{count(found, 'place')}."


def _where(found: Found, journal: Journal) -> str:
    measure = journal.measures.get(found.measure) if found.measure is not None else None
    match found.place:
        case "note":
            return "note"
        case "change":
            return "change"
        case "span":
            return "named days"
        case "entry":
            return measure.title if measure is not None else "a measure that is gone"
