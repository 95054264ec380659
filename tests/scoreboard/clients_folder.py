"""A folder of invented clients' journals on disk, for the coach's journeys, screens and benches."""

from __future__ import annotations

from datetime import date, datetime, timedelta
from pathlib import Path

import numpy as np

from desktop.journal.clients import CoachingSession
from desktop.journal.journal import Journal
from desktop.journal.records import Person
from desktop.journal.row_change import RowChange
from desktop.storage.store import Store
from tests.scoreboard.caseload import MONDAY, TRUTHS, client_journal


def write_journal(path: Path, journal: Journal, today: date = MONDAY) -> None:
    """Write a journal to disk the way a client does: the person first, then the rest in one step."""
    person = journal.person
    others = [record for record in journal.records() if not isinstance(record, Person)]
    clock = lambda: datetime.combine(today, datetime.min.time()) - timedelta(hours=3)  # noqa: E731
    with Store.create(path, person, clock=clock) as store:
        store.write("bring in table", [RowChange(None, record) for record in others])


def forty(
    folder: Path, seed: int = 1, today: date = MONDAY, most: int = 40
) -> dict[str, tuple[str, list[CoachingSession]]]:
    """Write forty clients' journals, or the first of them.

    Returns:
        What is true of each, and its session, by the journal's id.
    """
    folder.mkdir(parents=True, exist_ok=True)
    rng = np.random.default_rng(seed)
    truths = rng.permutation([truth for truth, many in TRUTHS.items() for _ in range(many)]).tolist()
    told = {}
    for number, truth in enumerate(truths[:most], start=1):
        journal, sessions = client_journal(number, truth, rng, today)
        write_journal(folder / f"client {number:02}.dayfence", journal, today)
        told[journal.person.journal_id] = (truth, sessions)
    return told
