"""What is kept in one file, in memory: changed only by row changes, each of which says what it starts from."""

from __future__ import annotations

from abc import ABC, abstractmethod
from collections.abc import Iterable

from desktop.journal.records import Record
from desktop.journal.row_change import RowChange, key_of


class Kept(ABC):
    """Every record of one file."""

    @abstractmethod
    def find(self, like: Record) -> Record | None:
        """The record with the key of ``like`` as it stands, or None."""

    @abstractmethod
    def _put(self, record: Record) -> None:
        """Put a record under its key; a ``ValueError`` for one that has no place here."""

    @abstractmethod
    def _remove(self, record: Record) -> None:
        """Take a record away; a ``ValueError`` for one that stays."""

    def apply(self, changes: Iterable[RowChange]) -> None:
        """Make the changes, in order.

        Raises:
            ValueError: a change starts from a record that is not what is held; nothing after it is made.
        """
        for change in changes:
            if self.find(change.record) != change.before:
                raise ValueError(f"what is held is not what {key_of(change.record)} starts from")
            if change.after is not None:
                self._put(change.after)
            elif change.before is not None:
                self._remove(change.before)
