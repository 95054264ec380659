"""The answer for every other sensible choice of days: does it hang on one of them?"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from datetime import date, timedelta

import numpy as np
from numpy.typing import NDArray

from analysis.answer import Direction, Review
from analysis.batch.fences import is_above, is_below
from analysis.log import Change, Log
from analysis.pipeline import review
from analysis.questions.did_it_move import CLAIMS, Sureness
from analysis.series.weekday_rhythm import is_weekend

WEEK = 7
BASELINES = (14, 28)
SETTLING = (3, 7)


@dataclass(frozen=True)
class Choice:
    """One other choice of days, and the answer it gives.

    Attributes:
        name: ``last days before``, ``without first week``, ``without last week``, ``settling in``, ``without odd
            days``, ``without late days``, ``weekdays alone``, ``missed as blank`` or ``blank as zero``.
        days: the number in its name, where it has one.
        sureness, direction: of its answer.
        holds: whether it claims what the answer claims, the same way.
    """

    name: str
    days: int | None
    sureness: Sureness
    direction: Direction
    holds: bool


_Other = tuple[str, int | None, Log, Sequence[Change], tuple[date, date] | None]


def other_choices(answer: Review, log: Log, changes: Sequence[Change], today: date | None = None) -> list[Choice]:
    """The answer computed again for every other choice of days that leaves enough of them.

    Args:
        answer: the review of the same log, changes and day; with several changes the last one is looked at.
        log: what was written down.
        changes: as for ``review``.
        today: as for ``review``.

    Returns:
        Nothing where the answer is "too early" or there is no change.
    """
    sureness, direction = answer.answer.sureness, answer.answer.direction
    if sureness is None or sureness == "too early" or len(answer.stretches) < 2:
        return []
    claimed = direction if sureness in CLAIMS else "none"
    found = []
    for name, days, other, marked, baseline in _others(answer, log, changes):
        again = review(other, marked, baseline, today).answer
        if again.sureness is None or again.sureness == "too early" or again.direction is None:
            continue
        claims = again.direction if again.sureness in CLAIMS else "none"
        found.append(Choice(name, days, again.sureness, again.direction, claims == claimed))
    return found


def _others(answer: Review, log: Log, changes: Sequence[Change]) -> Iterator[_Other]:
    first_stretch, last_stretch = answer.stretches[0], answer.stretches[-1]
    first, last = (date.fromordinal(day) for day in (first_stretch.first, first_stretch.last))
    length = (last - first).days + 1
    is_daily = log.measure.period == "day"
    # A row of weeks or longer names its last period by its first day.
    whole = (first, last) if is_daily else None
    if is_daily:
        for days in BASELINES:
            if days < length:
                yield "last days before", days, log, changes, (last - timedelta(days - 1), last)
        if length >= 2 * WEEK:
            yield "without first week", None, log, changes, (first + timedelta(WEEK), last)
            yield "without last week", None, log, changes, (first, last - timedelta(WEEK))
        change = last_stretch.change
        for days in SETTLING:
            marked = [
                replace(one, settle_days=days) if one.day.toordinal() == change and one.settle_days < days else one
                for one in changes
            ]
            if marked != list(changes):
                yield "settling in", days, log, marked, whole
        yield from _without(log, is_weekend(log.days), "weekdays alone", changes, whole)
    odd = _beyond_outer_fences(answer, log)
    yield from _without(log, odd, "without odd days", changes, whole)
    late = np.array([kind == "late" for kind in log.kinds], dtype=bool)
    yield from _without(log, late, "without late days", changes, whole)
    if answer.points.filled.any():
        yield "missed as blank", None, log.measured_as(missed="blank"), changes, whole
    elif (
        log.measure.missed == "blank"
        and log.measure.kind in ("amount", "count")
        and first_stretch.blank + last_stretch.blank
    ):
        yield "blank as zero", None, log.measured_as(missed="zero"), changes, whole


def _beyond_outer_fences(answer: Review, log: Log) -> NDArray[np.bool_]:
    odd = np.zeros(len(log), dtype=bool)
    if log.measure.period != "day":
        return odd
    for stretch in (answer.stretches[0], answer.stretches[-1]):
        if stretch.outer_lower_fence is None or stretch.outer_upper_fence is None:
            continue
        inside = (log.days >= stretch.first) & (log.days <= stretch.last)
        outside = is_below(log.values, stretch.outer_lower_fence) | is_above(log.values, stretch.outer_upper_fence)
        odd |= inside & outside
    return odd


def _without(
    log: Log,
    dropped: NDArray[np.bool_],
    name: str,
    changes: Sequence[Change],
    baseline: tuple[date, date] | None,
) -> Iterator[_Other]:
    """The log with some entries left out of every number; nothing where there are none."""
    if dropped.any():
        kinds = tuple("away" if drop else kind for kind, drop in zip(log.kinds, dropped, strict=True))
        values = np.where(dropped, np.nan, log.values)
        yield name, None, replace(log, kinds=kinds, values=values), changes, baseline
