"""Which part of its day a value belongs to, where days have several values."""

from __future__ import annotations

from collections import Counter
from collections.abc import Sequence
from datetime import date, time
from itertools import repeat

_PARTS = ("", "morning", "midday", "evening")


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
        return _numbered(days, times or ())
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


def _numbered(days: Sequence[date], times: Sequence[time | None]) -> Sequence[str]:
    if len(set(days)) == len(days):
        return [""] * len(days)
    taken: dict[int, int] = {}
    slots = []
    parts = map(_part_of_day, times) if times else repeat(0, len(days))
    for day, part in zip(days, parts, strict=True):
        key = day.toordinal() * len(_PARTS) + part
        number = taken[key] = taken.get(key, 0) + 1
        slots.append(_PARTS[part] if number == 1 else f"{_PARTS[part]} {number}".strip())
    return slots


def _part_of_day(clock: time | None) -> int:
    if clock is None:
        return 0
    if clock.hour < 12:
        return 1
    return 2 if clock.hour < 15 else 3
