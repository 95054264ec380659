"""Which part of its day a value belongs to, where days have several values."""

from __future__ import annotations

from collections import Counter
from collections.abc import Sequence
from datetime import date, time


def slots_of_day(
    days: Sequence[date], times: Sequence[time | None] | None = None, words: Sequence[str] | None = None
) -> Sequence[str]:
    """A slot for each value, so that no two of one day share one.

    Args:
        days: the day of each value.
        times: the time of day of each value, None where it is not written.
        words: the slot written beside each value, ``""`` for the whole day.

    Returns:
        The slots as written. Without any: all ``""`` where no day has several values, else ``morning``,
        ``midday`` or ``evening`` where there is a time and ``""`` where there is none. A second one in the
        same slot has a 2 behind it.
    """
    if words is None:
        if len(set(days)) == len(days):
            return [""] * len(days)
        words = [_part_of_day(clock) for clock in times] if times is not None else [""] * len(days)
    taken: set[tuple[date, str]] = set()
    again: Counter[tuple[date, str]] = Counter()
    slots = []
    for day, part in zip(days, words, strict=True):
        slot = part
        while (day, slot) in taken:
            again[day, part] += 1
            slot = f"{part} {again[day, part] + 1}".strip()
        taken.add((day, slot))
        slots.append(slot)
    return slots


def _part_of_day(clock: time | None) -> str:
    if clock is None:
        return ""
    if clock.hour < 12:
        return "morning"
    return "midday" if clock.hour < 15 else "evening"
