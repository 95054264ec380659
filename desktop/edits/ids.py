"""Ids for new records: never one that the file has used before, even for a record that is gone."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Literal

IdTable = Literal["measure", "change", "span", "plan", "client"]


class Ids:
    """Hands out ids, each once.

    An id handed out for an edit that is then not written is not handed out again either.
    """

    def __init__(self, highest: Mapping[str, int]) -> None:
        """Go on from the highest id each table has ever used, as ``Store.highest_ids`` tells it."""
        self._highest = dict(highest)

    def new(self, table: IdTable) -> int:
        """The next id of a table."""
        number = self._highest.get(table, 0) + 1
        self._highest[table] = number
        return number
