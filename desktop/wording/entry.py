"""Words of the days table: what a cell shows, how it is read aloud, why something typed cannot be read."""

from __future__ import annotations

from datetime import date

from analysis.log import DayKind
from desktop.journal.records import Change, Entry, Measure
from desktop.wording.days import long_day, short_day
from desktop.wording.numbers import plain

KIND_WORDS: dict[DayKind, str] = {
    "value": "",
    "zero": "none on this day",
    "blank": "blank: not known",
    "rest": "rest day",
    "ill": "ill, not counted",
    "away": "away, not counted",
    "set aside": "set aside, not counted",
    "late": "typed days afterwards",
    "extra": "extra reading, not counted",
}
"""What each kind of day says beside its value."""

LAST_DAY = "That is the last day of the table. Press the arrow up for the days before."
HOLDS_A_VALUE = "This day holds a number. Press Delete first, then the letter; or use Log, The chosen days were."

_REFUSALS = {
    "duration without unit": "“{text}” looks like hours and minutes. Type plain numbers for this measure.",
    "unclear duration": "“{text}” is not a time such as 1:05 or 1h05.",
    "not exact": "“{text}” is not one exact number. Type the number alone.",
    "pair": "“{text}” is two numbers. Type one, or put them in two measures written down together.",
    "unknown unit": "“{text}” has a word Dayfence does not know. Type the number alone.",
    "other unit": "“{text}” is in another unit than this measure. Type it in the measure's unit.",
    "out of range": "“{text}” is larger than a journal can hold.",
}


def number_text(measure: Measure, value: float) -> str:
    """A value as the table shows it: with the measure's digits, or more where it was typed with more."""
    shown = plain(value, 6)
    digits = len(shown.partition(".")[2])
    return shown if digits >= measure.decimals else f"{value:.{measure.decimals}f}".replace("-", "−")


def cell_text(measure: Measure, entry: Entry | None, *, is_passed: bool) -> str:
    """What a cell shows.

    Args:
        measure: the column.
        entry: what is written down, or None.
        is_passed: whether the day lies between the first and the last one written down.
    """
    if entry is None:
        return ("missed" if measure.missed == "zero" else "blank") if is_passed else ""
    if entry.value is None:
        return entry.kind
    return number_text(measure, entry.value)


def spoken_cell(measure: Measure, entry: Entry | None, day: date) -> str:
    """A cell as it is read aloud: ``Tuesday 3 March 2026, Exercise: 33 minutes``."""
    name = f"{long_day(day)}, {measure.title}"
    if entry is None:
        return f"{name}: nothing written down"
    kind = KIND_WORDS[entry.kind]
    if entry.value is None:
        return f"{name}: {kind}"
    said = f"{number_text(measure, entry.value)} {measure.unit}".strip()
    return f"{name}: {said}, {kind}" if kind else f"{name}: {said}"


def with_changes(said: str, changes: list[Change]) -> str:
    """A cell's words, and after them the changes that begin on its day."""
    marked = [f"change: {change.label}" if change.label else "change" for change in changes]
    return "; ".join([*([said] if said else []), *marked])


def pair_sentence(titles: list[str]) -> str:
    """Why measures that are written down together are not named while they are set up."""
    return (
        f"These are {len(titles)} measures: {' and '.join(titles)}. "
        "To give one another name, use Log, Settings of this measure, later."
    )


def unread_sentence(unread: list[tuple[date, str]]) -> str:
    """What was typed, could not be read, and would be gone with the window."""
    listed = "; ".join(f"“{text}” on {short_day(day)}" for day, text in unread[:3])
    more = f" and {len(unread) - 3} more" if len(unread) > 3 else ""
    return f"Not kept, since it is no number: {listed}{more}. Leave without it?"


def refusal_sentence(reason: str, text: str) -> str:
    """Why something typed is no value, and what to type."""
    pattern = _REFUSALS.get(reason, "“{text}” is not a number. Type a number such as 30, or r, i or a.")
    return pattern.format(text=text)
