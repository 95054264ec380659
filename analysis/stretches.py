"""The stretches of a log: which days lie between which changes, and the numbers of each stretch."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import replace
from datetime import date

import numpy as np

from analysis.answer import Stretch
from analysis.batch.fences import Fences, fences, is_above, is_below
from analysis.batch.fourths import fourths
from analysis.errors import AnalysisError
from analysis.log import Change, Days, Values
from analysis.points import Points


def merged(changes: Iterable[Change]) -> list[Change]:
    """Changes in order of day; those of one day become one: labels joined, the longest settling-in kept."""
    by_day: dict[date, Change] = {}
    for change in sorted(changes, key=lambda one: one.day):
        same = by_day.get(change.day)
        if same is not None:
            label = " + ".join(part for part in (same.label, change.label) if part)
            change = Change(change.day, label, max(same.settle_days, change.settle_days))
        by_day[change.day] = change
    return list(by_day.values())


Edge = tuple[Change | None, int, int]
"""The change that begins a stretch, and its first and last day number; the days between may be none."""


def check_baseline(baseline: tuple[date, date] | None, changes: Sequence[Change]) -> None:
    """Refuse a baseline that contradicts itself or the changes.

    Raises:
        AnalysisError: it ends before it begins, or reaches into the first change.
    """
    if baseline is None:
        return
    first, last = baseline
    if first > last:
        raise AnalysisError("baseline_backwards", first=first, last=last)
    if changes and last >= changes[0].day:
        raise AnalysisError("baseline_after_change", last=last, change=changes[0].day)


def edges_of(changes: Sequence[Change], baseline: tuple[date, date] | None, begin: int, end: int) -> list[Edge]:
    """The stretches as days: the baseline, then one after each change, settling-in days left out."""
    first = max(begin, baseline[0].toordinal()) if baseline else begin
    if changes:
        last = baseline[1].toordinal() if baseline else changes[0].day.toordinal() - 1
        edges: list[Edge] = [(None, first, last)]
        following = [change.day.toordinal() - 1 for change in changes[1:]] + [end]
        for change, stretch_end in zip(changes, following, strict=True):
            # A settling-in longer than the calendar ends with it.
            first_counted = min(change.day.toordinal() + change.settle_days, date.max.toordinal())
            edges.append((change, first_counted, stretch_end))
        return edges
    if baseline is None:
        return [(None, first, end)]
    last = min(end, baseline[1].toordinal())
    return [(None, first, last), (None, last + 1, end)] if last < end else [(None, first, last)]


def stretch_of(points: Points, edge: Edge, *, is_after: bool) -> Stretch:
    """The numbers of one stretch, its own fences and the periods beyond them included."""
    change, first, last = edge
    inside = points.within(first, last)
    known = inside & points.known
    starts, values = points.first[known], points.values[known]
    periods = points.first[inside]
    stretch = Stretch(
        name="after" if is_after else "baseline",
        label=change.label if change else None,
        change=change.day.toordinal() if change else None,
        first=int(periods[0]) if len(periods) else first,
        last=int(periods[-1]) if len(periods) else max(first, last),
        observations=len(values),
        blank=len(periods) - len(values),
    )
    if not len(values):
        return stretch
    batch = fourths(values)
    own = fences(batch, len(values))
    stretch = replace(
        stretch,
        median=batch.median,
        mean=_mean(values),
        lower_fourth=batch.lower,
        upper_fourth=batch.upper,
        fourth_spread=batch.spread,
    )
    if own is None:
        return stretch
    below, above = outside(starts, values, own)
    return replace(
        stretch,
        lower_fence=own.lower,
        upper_fence=own.upper,
        outer_lower_fence=own.outer_lower,
        outer_upper_fence=own.outer_upper,
        below=below,
        above=above,
    )


def _mean(values: Values) -> float:
    # Scaled so that the sum of huge values stays a number.
    scale = float(np.max(np.abs(values)))
    return float(np.mean(values / scale) * scale) if scale > 1e150 else float(np.mean(values))


def outside(starts: Days, values: Values, own: Fences) -> tuple[tuple[int, ...], tuple[int, ...]]:
    """First days of the periods below and above the inner fences."""
    return (
        tuple(starts[is_below(values, own.lower)].tolist()),
        tuple(starts[is_above(values, own.upper)].tolist()),
    )
