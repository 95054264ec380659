"""Readings at a time of day: stretches with other times of day are compared by the times they share."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from analysis.log import Log
from analysis.stretches import Edge

_MOSTLY = 0.5
"""A slot is one of a stretch when so many of its days have a reading in it."""

_HARDLY = 0.2
"""And it is none of it when at most so many have."""


@dataclass(frozen=True)
class OtherSlots:
    """Slots that only one of two stretches has.

    Attributes:
        left_out: the slots that are in one stretch alone.
        kept: the slots in both, which alone are compared; none = the two cannot be compared.
    """

    left_out: tuple[str, ...]
    kept: tuple[str, ...]


def like_slots(log: Log, before: Edge, after: Edge) -> tuple[Log, OtherSlots | None]:
    """The log with the slots that both stretches have, where one has a slot that the other has not.

    A day's value made of morning and evening would move by itself when the evenings stop.

    Args:
        log: its slots are times of day, or ``""`` for the whole day.
        before: the baseline's days.
        after: the days it is compared with.
    """
    names = sorted(set(log.slots))
    if len(names) < 2:
        return log, None
    slots, has_value = np.array(log.slots), ~np.isnan(log.values)
    shares = [_shares(log, slots, has_value, names, edge) for edge in (before, after)]
    was, now = shares
    if was is None or now is None:
        return log, None
    left_out = tuple(
        name for name in names if max(was[name], now[name]) >= _MOSTLY and min(was[name], now[name]) <= _HARDLY
    )
    if not left_out:
        return log, None
    kept = tuple(name for name in names if min(was[name], now[name]) >= _MOSTLY)
    other = OtherSlots(left_out, kept)
    if not kept:
        return log, other
    chosen = np.isin(slots, kept)
    return (
        replace(
            log,
            days=log.days[chosen],
            values=log.values[chosen],
            kinds=tuple(kind for kind, is_kept in zip(log.kinds, chosen, strict=True) if is_kept),
            slots=tuple(slots[chosen].tolist()),
        ),
        other,
    )


def _shares(
    log: Log, slots: NDArray[np.str_], has_value: NDArray[np.bool_], names: list[str], edge: Edge
) -> dict[str, float] | None:
    """Of the days with a reading, how many have one in each slot; None without any."""
    inside = has_value & (log.days >= edge[1]) & (log.days <= edge[2])
    days = len(np.unique(log.days[inside]))
    if not days:
        return None
    return {name: len(np.unique(log.days[inside & (slots == name)])) / days for name in names}
