"""Doubts from what else is marked: a device or method, another change close by, several in one day."""

from __future__ import annotations

from analysis.answer import Doubt
from analysis.doubts.seen import Seen

NEAR_DAYS = 3
CLOSE_DAYS = 7


def device_mark(seen: Seen) -> Doubt | None:
    """A device or method mark: at the change it explains a step by itself; elsewhere its days are left out."""
    sides, change = seen.sides, seen.stretches[-1].change
    spans = [span for span in seen.log.spans if span.kind == "device"]
    if sides is None or change is None or not spans:
        return None
    for span in spans:
        first, last = span.first.toordinal(), span.last.toordinal()
        label = (("label", span.label),)
        if abs(first - change) <= NEAR_DAYS:
            return Doubt("device_mark", label, alters=True)
        before = (sides.before_days >= first) & (sides.before_days <= last)
        after = (sides.after_days >= first) & (sides.after_days <= last)
        if before.any() or after.any():
            left = seen.too_few_left(before, after)
            return Doubt("device_mark", (*label, *left), seen.turns_on_days(before, after))
    return None


def close_change(seen: Seen) -> Doubt | None:
    """Another change within a week: the two cannot be told apart by this log."""
    change = seen.stretches[-1].change
    if change is None:
        return None
    days = sorted({one.day.toordinal() for one in seen.changes} - {change}, key=lambda day: abs(day - change))
    if not days or abs(days[0] - change) > CLOSE_DAYS:
        return None
    label = next((one.label for one in seen.changes if one.day.toordinal() == days[0]), "")
    return Doubt("close_change", (("label", label), ("days", abs(days[0] - change))), alters=False)


def several_changes(seen: Seen) -> Doubt | None:
    """Several changes in one day: they are judged as one."""
    change = seen.stretches[-1].change
    same_day = [one.label for one in seen.changes if one.day.toordinal() == change]
    if len(same_day) < 2:
        return None
    return Doubt("several_changes", (("count", len(same_day)),), alters=False)
