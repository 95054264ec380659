"""A doubt in plain words: a fact, and what it does to the answer."""

from __future__ import annotations

from collections.abc import Callable

from analysis.answer import Doubt
from desktop.wording.numbers import Speech

Fields = dict[str, float | str]


def doubt_sentence(doubt: Doubt, speech: Speech) -> str:
    """The sentence of a doubt.

    Raises:
        KeyError: a doubt without a sentence; a test looks for one.
    """
    return SENTENCES[doubt.name](dict(doubt.fields), speech)


def _few_days(fields: Fields, speech: Speech) -> str:
    before, after = int(fields["before"]), int(fields["after"])
    return f"Few {speech.many}: {before} before the change and {after} after."


def _no_spread(fields: Fields, speech: Speech) -> str:
    value = speech.with_unit(float(fields["value"]))
    return (
        f"No spread to measure with: half or more of the {int(fields['days'])} baseline {speech.many} "
        f"are {value}. So there are no fences."
    )


def _blank_days(fields: Fields, speech: Speech) -> str:
    return (
        f"{int(fields['blank'])} of {int(fields['periods'])} {speech.many} are blank. "
        "If those were unlike the rest, the answer could be off."
    )


def _day_to_day(_fields: Fields, speech: Speech) -> str:
    return (
        f"One {speech.one} carries over into the next, so {speech.many} count for less than their number. "
        "The range is wider for it."
    )


def _no_low_day(_fields: Fields, speech: Speech) -> str:
    return f"No low {speech.one} can stand out: the lower fence is at zero or below it."


SENTENCES: dict[str, Callable[[Fields, Speech], str]] = {
    "few_days": _few_days,
    "no_spread": _no_spread,
    "blank_days": _blank_days,
    "day_to_day": _day_to_day,
    "no_low_day": _no_low_day,
}
"""A sentence for every doubt of the catalogue."""
