"""What a coach keeps in a file of their own: the clients, each by their journal's id, and what was agreed.

Nothing of this is ever written into a client's journal.
"""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date


@dataclass(frozen=True)
class Coach:
    """Whose caseload it is; the one record every caseload has.

    Attributes:
        caseload_id: 32 hex digits, made once with the file.
        name: may be empty; stands on the coach's pages.
        folder: the folder the clients' journals are put into.
    """

    caseload_id: str
    name: str = ""
    folder: str = ""


@dataclass(frozen=True)
class Client:
    """One client.

    Attributes:
        id: a number that is never used again.
        journal_id: of the client's journal, whatever its file is called.
        code: the coach's own word for the client.
        doing, outcome: ids of the journal's measures that say what was done and what came of it; None = the
            program's guess.
        next_session: the day agreed on, or None.
        looked_on: the day the coach last marked the client as looked at, or None.
        looked_reasons: the marks of the reasons that were there on that day, a space between them.
        ended: the coaching has ended; no longer in the queue.
    """

    id: int
    journal_id: str
    code: str
    doing: int | None = None
    outcome: int | None = None
    next_session: date | None = None
    looked_on: date | None = None
    looked_reasons: str = ""
    ended: bool = False


@dataclass(frozen=True)
class CoachingSession:
    """A session with a client; one a day.

    Attributes:
        client: the client's id.
        day: when it was.
        agreed: what was agreed, in the coach's words; when not empty, a change is marked on this day.
        times, spare: the plan of so many days a week with so many spare days from this day on; times 0 = none.
        note: the coach's notes.
    """

    client: int
    day: date
    agreed: str = ""
    times: int = 0
    spare: int = 0
    note: str = ""
