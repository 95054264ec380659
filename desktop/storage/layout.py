"""The two kinds of file, a journal and a coach's caseload: the same rules, other tables."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass
from typing import Generic, TypeVar

from desktop.journal.caseload import Caseload
from desktop.journal.clients import Coach
from desktop.journal.journal import Journal
from desktop.journal.records import Person, Record
from desktop.journal.row_change import Act
from desktop.storage.migrations import CASELOAD_MIGRATIONS, MIGRATIONS, Migration
from desktop.storage.rows import CASELOAD_TABLES, TABLES, Table
from desktop.storage.schema import APPLICATION_ID, CASELOAD_ID

State = TypeVar("State", Journal, Caseload)


@dataclass(frozen=True)
class Layout(Generic[State]):
    """What one kind of file is made of.

    Attributes:
        application_id: bytes 68 to 71 of its header.
        steps: its migrations, version 1 first.
        tables: its tables of records, by name.
        root: the type of the one record that every file of the kind has.
        first_act: the act of its first step.
        state: makes its state of all its records.
    """

    application_id: int
    steps: tuple[Migration, ...]
    tables: Mapping[str, Table]
    root: type[Record]
    first_act: Act
    state: Callable[[Iterable[Record]], State]


JOURNAL: Layout[Journal] = Layout(APPLICATION_ID, MIGRATIONS, TABLES, Person, "start journal", Journal.of)
CASELOAD: Layout[Caseload] = Layout(
    CASELOAD_ID, CASELOAD_MIGRATIONS, CASELOAD_TABLES, Coach, "start caseload", Caseload.of
)
