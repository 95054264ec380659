"""Words of bringing in a table: what was read, and why a line was set aside."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date

from desktop.wording.days import full_day
from desktop.wording.numbers import count

REASONS: dict[str, str] = {
    "no day": "no day is written on it",
    "no such day": "its day is not in the calendar",
    "day out of range": "its year is too far away",
    "not a day": "its day cannot be read",
    "before 1900": "a journal begins with the year 1900, and its day is earlier",
    "other period": "it is about another span of time than the other rows",
    "total row": "it is a closing total",
    "header again": "it is the header once more",
    "repeated": "the very same line stands above it",
    "too many cells": "it has more cells than the header",
    "too few cells": "it has too few cells",
    "open quote": "a quote on it is not closed",
    "left out there": "the table itself leaves its value out",
    "not exact": "its value is not one exact number",
    "not a number": "its value is not a number",
    "other decimal mark": "its value has the other decimal mark",
    "out of range": "its value is larger than a journal can hold",
    "unknown unit": "a word beside its value is not known",
    "other unit": "its value is in another unit",
    "unclear duration": "its value is not a clear number of hours and minutes",
    "duration without unit": "it has hours and minutes where the others are plain numbers",
    "pair": "it has two numbers where the others have one",
    "not a pair": "it has one number where the others have two",
    "pair reversed": "its lower number is above its upper one",
    "negative": "its value is below zero",
    "more than a day": "its value is longer than a day",
}
"""Why a line was set aside, by the reason the importer gives."""

PASTED_BLOCK = "the pasted block"
NOTHING_PASTED = "There is no text on the clipboard. Copy a block of cells first."
NOTHING_TO_BRING_IN = "Nothing chosen here holds a value that can be kept. The list above says why."


@dataclass(frozen=True)
class Preview:
    """What a preview tells of a table that was read.

    Attributes:
        lines, blank, aside: lines read, lines with a day and no value, lines set aside.
        days: the first and the last day, or None.
        several: days with more than one value.
        guessed: how the letters are written is a guess.
        durations: columns that were hours and minutes, with their unit.
    """

    lines: int
    blank: int
    aside: int
    days: tuple[date, date] | None
    several: int = 0
    guessed: bool = False
    durations: Sequence[tuple[str, str]] = ()


def preview_sentences(name: str, preview: Preview) -> str:
    """What was read, in a few sentences; the counts add up to the lines of the table."""
    kept = preview.lines - preview.blank - preview.aside
    blank = f", {preview.blank} with a day and no value" if preview.blank else ""
    told = [f"{name}: {count(preview.lines, 'line')} read, {kept} kept{blank}, {preview.aside} set aside."]
    if preview.days is not None:
        first, last = preview.days
        told.append(f"Days from {full_day(first)} to {full_day(last)}.")
    if preview.several:
        told.append(f"{count(preview.several, 'day')} with more than one value: all are kept.")
    for column, unit in preview.durations:
        told.append(
            f"“{column}” was read as hours and minutes, so 1:30 is {'1.5 h' if unit == 'h' else '90 min'}."
        )
    if preview.guessed:
        told.append("Nothing in the file says how its letters are written; do the names below look right?")
    return " ".join(told)


def aside_line(line: int, reason: str, text: str) -> str:
    """``line 12: its value is not one exact number: ~40``.

    Raises:
        KeyError: a reason without words; a test looks for one.
    """
    return f"line {line}: {REASONS[reason]}: {text}"
