"""Which part of its day a value belongs to, where days have several values."""

from __future__ import annotations

from collections import Counter
from collections.abc import Sequence
from datetime import date, time


def slots_of_day(days: Sequence[date], times: Sequence[time | None]) -> list[str]:
    """A slot for each value, so that no two of one day share one.

    Args:
        days: the day of each value.
        times: the time of day of each value, None where it is not written.

    Returns:
        All ``""`` where no day has several values. Else ``morning``, ``midday`` or ``evening`` where there
        is a time, ``""`` where there is none; a second one in the same slot has a 2 behind it.
    """
    if len(set(days)) == len(days):
        return [""] * len(days)
    taken: Counter[tuple[date, str]] = Counter()
    slots = []
    for day, clock in zip(days, times, strict=True):
        part = _part_of_day(clock)
        taken[day, part] += 1
        number = taken[day, part]
        slots.append(part if number == 1 else f"{part} {number}".strip())
    return slots


def _part_of_day(clock: time | None) -> str:
    if clock is None:
        return ""
    if clock.hour < 12:
        return "morning"
    return "midday" if clock.hour < 15 else "evening"
