"""Doubts about how the log was kept: blanks, late entries, equal values, round numbers, weekdays only."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from analysis.answer import Doubt
from analysis.doubts.seen import Seen
from analysis.series.weekday_rhythm import is_weekend
from analysis.sides import chance_of_shares, compare

EQUAL_IN_ROW = 5
VALUES_FOR_DIGITS = 20
LATE_SHARE = 0.2
MANY_BLANK = 1 / 3
BLANK_WITHOUT_ZERO = 1 / 4
_MORE_BLANK_BELOW = 0.06


def missing_more(seen: Seen) -> Doubt | None:
    """More days are blank after than before: if the worse ones went unlogged, a move would appear by itself.

    Computed again with the blank days that are too many set to the baseline's fourth away from the shift.
    """
    sides = seen.sides
    if sides is None or seen.measure.missed == "zero" or seen.level is None:
        return None
    blank_before, blank_after = int(np.isnan(sides.before).sum()), int(np.isnan(sides.after).sum())
    share_before, share_after = blank_before / len(sides.before), blank_after / len(sides.after)
    if share_after <= share_before:
        return None
    if chance_of_shares((blank_before, len(sides.before)), (blank_after, len(sides.after))) >= _MORE_BLANK_BELOW:
        return None
    too_many = round((share_after - share_before) * len(sides.after))
    low, high = seen.baseline.lower_fourth, seen.baseline.upper_fourth
    assert low is not None
    assert high is not None
    filled = sides.after.copy()
    filled[np.flatnonzero(np.isnan(filled))[:too_many]] = low if seen.rose else high
    rival = replace(sides, after=filled)
    fields = (
        ("before", blank_before),
        ("before_of", len(sides.before)),
        ("after", blank_after),
        ("after_of", len(sides.after)),
    )
    return Doubt("missing_more", fields, seen.turns_on(rival))


def blank_days(seen: Seen) -> Doubt | None:
    """A third or more of the compared periods hold no value."""
    compared = {id(stretch): stretch for stretch in (seen.baseline, seen.stretches[-1])}.values()
    blank = sum(stretch.blank for stretch in compared)
    periods = blank + sum(stretch.observations for stretch in compared)
    if not blank or blank < MANY_BLANK * periods or _is_never_zero(seen):
        return None
    return Doubt("blank_days", (("blank", blank), ("periods", periods)), alters=False)


def no_zero(seen: Seen) -> Doubt | None:
    """An amount with many blank days and not one zero: are the blank days days without any?

    Computed again with every blank day counted as zero.
    """
    sides = seen.sides
    if sides is None or not _is_never_zero(seen):
        return None
    rival = replace(sides, before=np.nan_to_num(sides.before, nan=0.0), after=np.nan_to_num(sides.after, nan=0.0))
    again = compare(rival)
    blank = int(np.isnan(sides.before).sum() + np.isnan(sides.after).sum())
    alters = seen.turns_on(rival) or (not seen.is_claim and again.is_claim)
    return Doubt("no_zero", (("blank", blank), ("days", len(sides.before) + len(sides.after))), alters)


def _is_never_zero(seen: Seen) -> bool:
    """Whether no zero was ever written though a quarter of the days or more are blank."""
    sides = seen.sides
    if sides is None or seen.measure.kind not in ("amount", "count") or seen.measure.missed == "zero":
        return False
    values = np.concatenate([sides.before, sides.after])
    blank = float(np.mean(np.isnan(values)))
    return blank >= BLANK_WITHOUT_ZERO and bool(np.nanmin(values) > 0)


def other_slots(seen: Seen) -> Doubt | None:
    """Readings at a time of day that only one stretch has; those both have are compared.

    With none in common the two cannot be compared: it always alters.
    """
    if seen.other_slots is None or seen.level is None:
        return None
    fields = (("left_out", " and ".join(seen.other_slots.left_out)), ("kept", " and ".join(seen.other_slots.kept)))
    return Doubt("other_slots", fields, alters=not seen.other_slots.kept)


def late_entries(seen: Seen) -> Doubt | None:
    """A fifth or more of the compared days were typed days afterwards. Computed again without them."""
    sides = seen.sides
    if sides is None or seen.measure.period != "day":
        return None
    late_days = seen.log.days[np.array([kind == "late" for kind in seen.log.kinds], dtype=bool)]
    before, after = np.isin(sides.before_days, late_days), np.isin(sides.after_days, late_days)
    late = int(before.sum() + after.sum())
    days = len(sides.known_before) + len(sides.known_after)
    if late < 3 or late < LATE_SHARE * days:
        return None
    left = seen.too_few_left(before, after)
    return Doubt("late_entries", (("late", late), ("days", days), *left), seen.turns_on_days(before, after))


def equal_in_row(seen: Seen) -> Doubt | None:
    """The same value many days in a row, in a log that has others: exact, or put down from habit?"""
    sides = seen.sides
    if sides is None or seen.measure.kind in ("score", "yes/no"):
        return None
    longest, chosen = 0, None
    for place, values in enumerate((sides.before, sides.after)):
        start, length = _longest_run(values)
        if length > longest:
            longest, chosen = length, (place, start)
    if longest < EQUAL_IN_ROW or chosen is None:
        return None
    before = np.zeros(len(sides.before), dtype=bool)
    after = np.zeros(len(sides.after), dtype=bool)
    place, start = chosen
    (before, after)[place][start : start + longest] = True
    value = float((sides.before, sides.after)[place][start])
    everything = np.concatenate([sides.known_before, sides.known_after])
    if np.mean(everything == value) > 0.5:
        return None
    left = seen.too_few_left(before, after)
    return Doubt("equal_in_row", (("days", longest), ("value", value), *left), seen.turns_on_days(before, after))


def round_numbers(seen: Seen) -> Doubt | None:
    """Nearly all values end in 0, or in 0 and 5: differences smaller than that cannot be seen."""
    sides = seen.sides
    if sides is None or seen.measure.kind in ("score", "yes/no"):
        return None
    values = np.concatenate([sides.known_before, sides.known_after])
    values = values[values != 0]
    if len(values) < VALUES_FOR_DIGITS or np.ptp(values) < 20 or np.any(values != np.round(values)):
        return None
    for step, share in ((10, 0.8), (5, 0.9)):
        if np.mean(values % step == 0) >= share:
            return Doubt("round_numbers", (("step", step),), alters=False)
    return None


def weekdays_only(seen: Seen) -> Doubt | None:
    """The baseline holds hardly a weekend, the days after do. Computed again on weekdays alone."""
    sides = seen.sides
    if sides is None or seen.measure.period != "day":
        return None
    before, after = is_weekend(sides.before_days), is_weekend(sides.after_days)
    ends_before = int((before & ~np.isnan(sides.before)).sum())
    ends_after = int((after & ~np.isnan(sides.after)).sum())
    if ends_before >= 2 or ends_after < 3 or len(sides.known_before) < 5:
        return None
    left = seen.too_few_left(before, after)
    return Doubt("weekdays_only", (("weekend", ends_before), *left), seen.turns_on_days(before, after))


def _longest_run(values: np.ndarray) -> tuple[int, int]:
    """Start and length of the longest run of equal known values other than zero; 0, 0 where there is none."""
    best_start = best = start = 0
    for place in range(1, len(values) + 1):
        if place == len(values) or values[place] != values[start]:
            if place - start > best and values[start] != 0 and not np.isnan(values[start]):
                best_start, best = start, place - start
            start = place
    return best_start, best
