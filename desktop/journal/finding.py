"""Finding words in a journal: in notes, in the labels of changes and named days, in what was typed."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date
from typing import Literal

from desktop.journal.journal import Journal

Place = Literal["note", "entry", "change", "span"]
MOST = 500


@dataclass(frozen=True)
class Found:
    """One place that holds the words.

    Attributes:
        day: which day it is about; of named days the first.
        place: where they stand.
        measure: id of the measure, or None where it is of no single one.
        text: what stands there.
    """

    day: date
    place: Place
    measure: int | None
    text: str


def find(journal: Journal, words: str) -> list[Found]:
    """Every place that holds all these words, newest day first, at most ``MOST``.

    Capitals do not matter; a number finds the values that were typed so.
    """
    wanted = words.casefold().split()
    if not wanted:
        return []
    held = [one for one in _texts(journal) if all(word in one.text.casefold() for word in wanted)]
    return sorted(held, key=lambda one: (one.day, one.place), reverse=True)[:MOST]


def _texts(journal: Journal) -> Iterator[Found]:
    for note in journal.notes.values():
        yield Found(note.day, "note", None, note.text)
    for change in journal.changes.values():
        yield Found(change.day, "change", change.measures[0] if len(change.measures) == 1 else None, change.label)
    for span in journal.spans.values():
        yield Found(span.first, "span", span.measures[0] if len(span.measures) == 1 else None, span.label)
    for measure, entries in journal.entries.items():
        for entry in entries.values():
            text = " ".join(part for part in (entry.original, entry.note) if part)
            if text:
                yield Found(entry.day, "entry", measure, text)
