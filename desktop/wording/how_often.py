"""On how many days, in plain words: for yes/no measures, and for those of which many days hold nothing."""

from __future__ import annotations

import math

from analysis.answer import HowMuch, HowOften, WeekTotal
from desktop.wording.numbers import Speech


def often_words(often: HowOften, speech: Speech) -> str:
    """``8 of 28 days there was some, on 4 of 28 before``; of a yes/no measure the days with a yes."""
    (done, of), (was, was_of) = often.after, often.before
    if speech.measure.kind == "yes/no":
        return f"{done} of {of} {speech.many} it was a yes, on {was} of {was_of} before"
    return f"{done} of {of} {speech.many} there was some, on {was} of {was_of} before"


def often_range(often: HowOften, speech: Speech) -> str:
    """Between which shares the difference lies, counted in 100 days."""
    low, high = round(100 * often.low), round(100 * often.high)
    if low >= 0 or high <= 0:
        near, far = sorted((abs(low), abs(high)))
        way = "more" if high > 0 else "fewer"
        return f"That is probably between {near} and {far} {speech.many} {way} in 100."
    return f"In 100 {speech.many} that may be anywhere from {-low} fewer to {high} more."


def often_bound(often: HowOften, speech: Speech) -> str:
    """By how much the share can have changed at most."""
    most = math.ceil(100 * max(abs(often.low), abs(often.high)))
    return f"If it changed at all, it was by fewer than {most} in 100 {speech.many}."


def much_range(much: HowMuch, speech: Speech) -> str:
    """The middle of the days with some, before and since, and the range of its difference."""
    was, now = speech.number(much.before), speech.with_unit(much.after)
    told = f"On those {speech.many} the middle was {was} before and is {now} since"
    if much.low <= 0 <= much.high:
        return f"{told}; that may be no difference."
    return f"{told}: {speech.between_amounts(much.low, much.high)}."


def week_words(total: WeekTotal, speech: Speech) -> str:
    """The middle week before and since, and the range of the difference."""
    was, now = speech.number(total.before), speech.with_unit(total.after)
    told = f"A middle week came to {was} before and comes to {now} since"
    if total.low <= 0 <= total.high:
        return f"{told}; that may be no difference."
    return f"{told}: {speech.between_amounts(total.low, total.high)}."
