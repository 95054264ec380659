"""The closed list of doubts: what in this log could explain the answer, or keep it from being one.

Each says in its own docstring when it is raised and how the answer is computed again. A doubt alters when a claim
is lost or turned round by it; a device mark at the change always does, several changes in one day never do. Where
nothing is claimed, there is nothing to lose: such a doubt is named, and no effect is said of it.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace

from analysis.answer import Doubt
from analysis.doubts.course import first_days, odd_day, season, slope_before, worst_spell
from analysis.doubts.keeping import (
    blank_days,
    equal_in_row,
    late_entries,
    missing_more,
    no_zero,
    other_slots,
    round_numbers,
    weekdays_only,
)
from analysis.doubts.looking import early_look, several_measures
from analysis.doubts.marks import close_change, device_mark, several_changes
from analysis.doubts.measuring import day_to_day, few_days, no_low_day, no_spread
from analysis.doubts.seen import Seen

MOST_SHOWN = 5

CATALOGUE: tuple[Callable[[Seen], Doubt | None], ...] = (
    few_days,
    no_spread,
    other_slots,
    device_mark,
    slope_before,
    worst_spell,
    first_days,
    odd_day,
    missing_more,
    late_entries,
    weekdays_only,
    early_look,
    several_measures,
    close_change,
    several_changes,
    equal_in_row,
    season,
    day_to_day,
    no_zero,
    blank_days,
    round_numbers,
    no_low_day,
)
"""Every doubt there is, worst first among those that alter and among those that do not."""


def doubts_of(seen: Seen) -> tuple[Doubt, ...]:
    """The doubts this log gives reason for, at most five: those that alter the answer first."""
    raised = [doubt for look in CATALOGUE if (doubt := look(seen)) is not None]
    raised.sort(key=lambda doubt: not doubt.alters)
    if not seen.is_claim:
        raised = [doubt if doubt.alters else _untested(doubt) for doubt in raised]
    return tuple(raised[:MOST_SHOWN])


def _untested(doubt: Doubt) -> Doubt:
    return replace(doubt, fields=(*doubt.fields, ("untested", "no claim")))
