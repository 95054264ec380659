"""The other measures looked at for the same change, and what luck makes of each."""

from __future__ import annotations

from collections.abc import Iterable
from datetime import date

import analysis
from analysis import Change, Log
from desktop.journal.journal import Journal
from desktop.journal.records import Entry, Measure
from desktop.journal.row_change import RowChange

Asked = tuple[int, Log, tuple[Change, ...]]
"""A measure's id, its log and its changes: all that its chance is made of."""


class OtherMeasures:
    """Remembers the chance by luck of each measure until something about it is edited."""

    def __init__(self) -> None:
        self._chances: dict[int, float | None] = {}

    def forget(self, changes: Iterable[RowChange]) -> None:
        """Drop what these edits may have altered; no edits named = anything may be new."""
        records = [record for change in changes for record in (change.before, change.after) if record is not None]
        if not records or any(not isinstance(record, Entry) for record in records):
            self._chances.clear()
            return
        for record in records:
            if isinstance(record, Entry):
                self._chances.pop(record.measure, None)

    def beside(self, journal: Journal, measure: Measure) -> list[int]:
        """Ids of the measures with the same last change; a pair written down together is looked at as one."""
        own = journal.changes_of(measure.id)
        if not own:
            return []
        return [
            other.id
            for other in journal.columns()
            if other.id != measure.id
            and not (measure.pair and other.pair == measure.pair)
            and own[-1] in journal.changes_of(other.id)[-1:]
        ]

    def unknown(self, journal: Journal, measures: Iterable[int]) -> list[Asked]:
        """What has to be asked before the chances of these measures are known."""
        return [
            (one, journal.log_of(one), tuple(journal.analysis_changes(one)))
            for one in measures
            if one not in self._chances
        ]

    def learn(self, chances: dict[int, float | None]) -> None:
        """Keep what was found out."""
        self._chances.update(chances)

    def known(self, measures: Iterable[int]) -> tuple[float, ...]:
        """The chances that are known; a measure that cannot be judged has none."""
        chances = (self._chances.get(one) for one in measures)
        return tuple(chance for chance in chances if chance is not None)


def ask(asked: Iterable[Asked], today: date) -> dict[int, float | None]:
    """The chance by luck of each measure; None where its log cannot be judged."""
    return {one: analysis.chance_of(log, changes, today=today) for one, log, changes in asked}
