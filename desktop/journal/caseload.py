"""A coach's caseload as it stands: every record in memory."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field
from datetime import date

from desktop.journal.clients import Client, Coach, CoachingSession
from desktop.journal.kept import Kept
from desktop.journal.records import Record


@dataclass
class Caseload(Kept):
    """Every record of one caseload; changed only through :meth:`apply`.

    Attributes:
        coach: whose it is.
        clients: by id.
        sessions: for each client's id, the sessions by day.
    """

    coach: Coach
    clients: dict[int, Client] = field(default_factory=dict)
    sessions: dict[int, dict[date, CoachingSession]] = field(default_factory=dict)

    @classmethod
    def of(cls, records: Iterable[Record]) -> Caseload:
        """A caseload of these records.

        Raises:
            ValueError: no ``Coach`` among them, or a record that belongs into a journal.
        """
        listed = list(records)
        coach = next((record for record in listed if isinstance(record, Coach)), None)
        if coach is None:
            raise ValueError("a caseload needs its coach record")
        caseload = cls(coach)
        for record in listed:
            caseload._put(record)
        return caseload

    def find(self, like: Record) -> Record | None:
        """The record with the key of ``like`` as it stands, or None."""
        match like:
            case Coach():
                return self.coach
            case Client():
                return self.clients.get(like.id)
            case CoachingSession():
                return self.sessions.get(like.client, {}).get(like.day)
            case _:
                return None

    def client_of(self, journal_id: str) -> Client | None:
        """The client whose journal has this id, or None."""
        return next((one for one in self.clients.values() if one.journal_id == journal_id), None)

    def sessions_of(self, client: int) -> list[CoachingSession]:
        """A client's sessions, in order of day."""
        return [session for _, session in sorted(self.sessions.get(client, {}).items())]

    def _put(self, record: Record) -> None:
        match record:
            case Coach():
                self.coach = record
            case Client():
                self.clients[record.id] = record
            case CoachingSession():
                self.sessions.setdefault(record.client, {})[record.day] = record
            case _:
                raise ValueError(f"a {type(record).__name__} is not part of a caseload")

    def _remove(self, record: Record) -> None:
        match record:
            case Client():
                del self.clients[record.id]
            case CoachingSession():
                del self.sessions[record.client][record.day]
            case _:
                raise ValueError(f"the {type(record).__name__} record cannot be removed")
