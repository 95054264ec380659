"""Journals of one measure, and the pictures of their reviews."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from analysis import Review, review
from desktop.chart.picture import picture_of
from desktop.chart.pieces import SHAPES, Picture
from desktop.journal.journal import Journal
from desktop.journal.records import Change, Entry, Measure, Person, Span
from tests.builders import day

LOW = [20, 25, 18, 30, 15, 10, 22, 24, 18, 31, 12, 16, 26, 21]
HIGH = [38, 41, 35, 44, 29, 33, 47, 40, 36, 52, 31, 39, 45, 37]
Value = float | str | None
"""A number, a kind of day without one, or None for a day without an entry."""


def journal_of(
    values: Sequence[Value],
    change: int | None = None,
    settle: int = 0,
    kinds: dict[int, str] | None = None,
    spans: Sequence[Span] = (),
    **measure: Any,
) -> Journal:
    """A journal from 3 March 2031 on; ``kinds`` gives a value's kind of day by its place."""
    entries = []
    for place, value in enumerate(values):
        if isinstance(value, str):
            entries.append(Entry(1, day(place), kind=value))
        elif value is not None:
            entries.append(Entry(1, day(place), value=float(value), kind=(kinds or {}).get(place, "value")))
    what: dict[str, Any] = {"title": "Exercise", "unit": "minutes", "kind": "amount"} | measure
    changes = [] if change is None else [Change(1, day(change), "off the bus one stop early", None, settle)]
    return Journal.of([Person("0" * 32), Measure(1, 0, **what), *entries, *changes, *spans])


def reviewed(journal: Journal, **more: Any) -> Review:
    return review(journal.log_of(1), journal.analysis_changes(1), **more)


def drawn(*arguments: Any, **more: Any) -> Picture:
    """The picture of such a journal."""
    journal = journal_of(*arguments, **more)
    return picture_of(reviewed(journal), journal, 1)


def shapes(picture: Picture) -> list[str]:
    """The shape of each mark, in order."""
    return [SHAPES[place] for place in picture.marks.shape]


def lines(picture: Picture, role: str, side: str | None = None) -> list[tuple[float, float, float]]:
    """Left end, right end and height of the lines of a role."""
    return [(one.x0, one.x1, one.y) for one in picture.lines if one.role == role and side in (None, one.side)]
