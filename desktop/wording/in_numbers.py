"""The closing block of an answer without a window: each stretch with its fences, and the days outside them."""

from __future__ import annotations

from collections.abc import Sequence

from analysis.answer import Review, Stretch
from analysis.batch.fences import FEWEST_TO_DRAW
from desktop.wording.telling import Section, day_words_of, speech_of

TITLE = "In numbers"
_MOST_DAYS = 20
_OF_WINDOW, _OF_COMMAND = "(Log, Mark a change)", "with --change DAY=LABEL"


def for_command(sentence: str) -> str:
    """A sentence that says what to do, as it is done without a window."""
    return sentence.replace(_OF_WINDOW, _OF_COMMAND)


def in_numbers(review: Review) -> Section:
    """Stretches, fences and days outside; the days of a stretch after are held against the baseline's fences."""
    told = [_stretch_line(review, stretch) for stretch in review.stretches]
    carried = review.answer.carried
    if review.stretches and review.stretches[0].lower_fence is not None:
        baseline = review.stretches[0]
        many = speech_of(review).many
        whose = f"{many.capitalize()} outside the fences"
        whose = f"{whose} in the baseline" if len(review.stretches) > 1 else whose
        told.append(f"{whose}: {_days(review, [*baseline.below, *baseline.above])}.")
        if carried is not None:
            since = [*carried.below, *carried.above]
            for one in review.comparisons:
                if one.against == "baseline" and one.answer.carried is not None:
                    since += [*one.answer.carried.below, *one.answer.carried.above]
            told.append(f"{many.capitalize()} outside the old fences since: {_days(review, since)}.")
    return Section(TITLE, tuple(told))


def _stretch_line(review: Review, stretch: Stretch) -> str:
    speech, days = speech_of(review), day_words_of(review)
    name = "Baseline"
    if stretch.name == "after":
        name = f"After “{stretch.label}”" if stretch.label else "After"
    span = f"{days.name(stretch.first)} to {days.name(stretch.last)}"
    if stretch.median is None:
        return f"{name}, {span}: no value."
    told = f"{name}, {span}: {speech.periods(stretch.observations)}, middle {speech.with_unit(stretch.median)}"
    if stretch.lower_fence is None or stretch.upper_fence is None:
        few = stretch.observations < FEWEST_TO_DRAW
        return f"{told}; no fences, since {'there are too few' if few else 'too many values are alike'}."
    low, high = speech.number(stretch.lower_fence), speech.with_unit(stretch.upper_fence)
    return f"{told}, fences {low} and {high}."


def _days(review: Review, days: Sequence[int]) -> str:
    """Days with their values, in order; ``none`` where there is none."""
    if not days:
        return "none"
    speech, words = speech_of(review), day_words_of(review)
    values = dict(zip(review.points.first.tolist(), review.points.values.tolist(), strict=True))
    listed = [f"{words.name(day)} ({speech.number(values[day])})" for day in sorted(set(days))]
    more = len(listed) - _MOST_DAYS
    return ", ".join(listed[:_MOST_DAYS]) + (f" and {more} more" if more > 0 else "")
