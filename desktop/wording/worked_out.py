"""How an answer was worked out: the numbers, the rules and where they come from, in the trade's words."""

from __future__ import annotations

from analysis.answer import Review, Stretch
from desktop.wording.numbers import Speech, plain
from desktop.wording.telling import day_words_of, speech_of

RULES = (
    "Fourths: sort the values; a fourth is as deep from its end as half of one more than the whole depth of "
    "the median (Tukey 1977). Fences: 1.5 fourth spreads beyond the fourths. A value on a fence is inside.",
    "Shift: the median of all differences, one day after less one day before (Hodges and Lehmann 1963). "
    "Its range holds the true shift in about 95 of 100 logs.",
    "Chance by luck: the rank-sum comparison of the two stretches, ties kept, widened where one day carries over "
    "into the next.",
    "Share of pairs: of all pairs of one day before and one after, the share in which after is higher "
    "(range: Newcombe 2006).",
    "Control-median test: how often luck would put so many values beyond the median of a short baseline "
    "(Mathisen 1943).",
    "Since when: the split into two levels that fits best, and those that fit nearly as well.",
    "Weekends: where they differ from weekdays by more than luck, the difference is taken off first.",
    "Logs with many zeros: judged by how many days there was some, and by how much on those days.",
    "Early looks: before the agreed day the limit for a claim is stricter, by the share of days that are in "
    "(O'Brien and Fleming 1979). Several measures for one change: their chances are counted together (Holm 1979).",
    "Days still needed: in 80 of 100 logs a move of that size would be claimed by then (Noether 1987); the range "
    "holds in about two of three.",
    "A doubt alters the answer when it is computed again without the doubtful days, or with the other explanation "
    "in, and is no longer sure. Then the answer is at most leaning.",
    "The five words. Too early: fewer than 7 before or 4 after. Leaning: a gap this big turns up by luck in fewer "
    "than 20 of 100 unchanged logs. Fairly sure: in fewer than 5 of 100. "
    "As sure as a log can be: in fewer than 3 of 1,000, with 14 or more on both sides. Cannot tell: all else.",
)
"""The rules in force; the code that computes them names the same sources."""


def worked_out(review: Review) -> tuple[str, ...]:
    """The numbers behind a review, then the rules."""
    speech = speech_of(review)
    lines = [_stretch_line(stretch, review, speech) for stretch in review.stretches]
    answer = review.answer
    if answer.shift is not None:
        shift = answer.shift
        lines.append(
            f"Shift {speech.number(shift.estimate)}, "
            f"range {speech.number(shift.low)} to {speech.number(shift.high)}. "
            f"Share of pairs {plain(shift.share_of_pairs, 3)}, range {plain(shift.share_low, 3)} to "
            f"{plain(shift.share_high, 3)}."
        )
        lines.append(
            f"Control-median test of the {speech.many} beyond the old median, without carry-over: "
            f"{shift.control_median_p:.2g} by luck (two-sided)."
        )
    if answer.luck is not None:
        lines.append(f"Chance by luck (two-sided) {answer.luck.p:.2g}.")
    if answer.carry_over is not None:
        lines.append(f"Carry-over from one {speech.one} to the next {plain(answer.carry_over, 2)}.")
    if answer.carried is not None:
        lines.append(
            f"Outside by luck: {plain(answer.carried.per_100_days, 1)} of 100 unchanged {speech.many} with a "
            f"baseline of this length."
        )
    return (*lines, *RULES)


def _stretch_line(stretch: Stretch, review: Review, speech: Speech) -> str:
    days = day_words_of(review)
    name = stretch.label or ("baseline" if stretch.name == "baseline" else "after")
    head = f"{name[0].upper()}{name[1:]}, {days.name(stretch.first)} to {days.name(stretch.last)}"
    if stretch.median is None or stretch.lower_fourth is None or stretch.upper_fourth is None:
        return f"{head}: no value."
    told = (
        f"{head}: {speech.periods(stretch.observations)} with a value, {stretch.blank} blank; "
        f"median {speech.number(stretch.median)}, average {speech.number(stretch.mean or 0.0)}, "
        f"fourths {speech.number(stretch.lower_fourth)} and {speech.number(stretch.upper_fourth)}"
    )
    if stretch.lower_fence is None or stretch.upper_fence is None:
        return f"{told}; no fences."
    return f"{told}; fences {speech.number(stretch.lower_fence)} and {speech.number(stretch.upper_fence)}."
