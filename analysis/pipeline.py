"""From a log to its review, in the order the questions are asked."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import replace
from datetime import date

import numpy as np

from analysis.answer import (
    Answer,
    Carried,
    Comparison,
    Direction,
    Goal,
    HowMuch,
    HowOften,
    Luck,
    Review,
    Shift,
    Since,
    StillNeeded,
    Stretch,
)
from analysis.batch.fences import Fences, fences, is_above, is_below
from analysis.batch.fourths import fourths
from analysis.batch.luck import new_day_rate
from analysis.doubts.catalogue import Seen, doubts_of
from analysis.errors import AnalysisError
from analysis.log import Change, Log, Measure, Values
from analysis.points import Points, first_logged_day, points_of
from analysis.questions.by_how_much import difference_of_shares, share_range, shift
from analysis.questions.days_still_needed import days_needed_after
from analysis.questions.did_it_move import FEWEST_BEFORE, rank_sum, sureness
from analysis.questions.since_when import plausible_splits
from analysis.series.carry_over import carry_over, widening

ZERO_HEAVY_SHARE = 0.25
"""From this share of zeros in the baseline on, *how often* and *how much on those days* are told apart."""


def review(
    log: Log,
    changes: Sequence[Change] = (),
    baseline: tuple[date, date] | None = None,
    today: date | None = None,
    worth: float | None = None,
) -> Review:
    """Answer whether a log moved, by how much and since when.

    Args:
        log: what was written down; any log is answered, an empty one too.
        changes: in any order; those of one day are one change.
        baseline: first and last day to judge against; the days up to the first change when left out.
        today: the day after which nothing is used; the last day of the log when left out.
        worth: the smallest move that would be worth it, in the measure's unit.

    Raises:
        AnalysisError: the baseline ends before it begins, or reaches into a change.
    """
    end = today.toordinal() if today is not None else (int(log.days[-1]) if len(log) else None)
    points = points_of(log, end)
    begin = first_logged_day(log, end)
    if begin is None or end is None or not points.known.any():
        _check(baseline, merged(changes))
        return Review(log.measure, (), Answer(), points)
    marked = [change for change in merged(changes) if change.day.toordinal() <= end]
    _check(baseline, marked)
    edges = _edges(marked, baseline, begin, end)
    stretches = tuple(_stretch(points, edge, is_after=place > 0) for place, edge in enumerate(edges))
    rows = [_stretch_values(points, first, last) for _, first, last in edges]
    comparisons = tuple(_comparisons(log.measure, points, stretches, edges, rows, worth))
    answer = next(
        (one.answer for one in comparisons if one.stretch == len(stretches) - 1 and one.against == "baseline"),
        Answer(),
    )
    return Review(
        log.measure,
        stretches,
        answer,
        points,
        doubts_of(Seen(log.measure, stretches, answer)),
        comparisons=comparisons if len(stretches) > 2 else (),
    )


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


def _check(baseline: tuple[date, date] | None, changes: Sequence[Change]) -> None:
    if baseline is None:
        return
    first, last = baseline
    if first > last:
        raise AnalysisError("baseline_backwards", first=first, last=last)
    if changes and last >= changes[0].day:
        raise AnalysisError("baseline_after_change", last=last, change=changes[0].day)


def _edges(changes: Sequence[Change], baseline: tuple[date, date] | None, begin: int, end: int) -> list[Edge]:
    """The stretches as days: the baseline, then one after each change, settling-in days left out."""
    first = max(begin, baseline[0].toordinal()) if baseline else begin
    if changes:
        last = baseline[1].toordinal() if baseline else changes[0].day.toordinal() - 1
        edges: list[Edge] = [(None, first, last)]
        following = [change.day.toordinal() - 1 for change in changes[1:]] + [end]
        for change, stretch_end in zip(changes, following, strict=True):
            edges.append((change, change.day.toordinal() + change.settle_days, stretch_end))
        return edges
    if baseline is None:
        return [(None, first, end)]
    last = min(end, baseline[1].toordinal())
    return [(None, first, last), (None, last + 1, end)] if last < end else [(None, first, last)]


def _stretch_values(points: Points, first: int, last: int) -> Values:
    return points.values[points.within(first, last)]


def _stretch(points: Points, edge: Edge, *, is_after: bool) -> Stretch:
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
    below, above = _outside(starts, values, own)
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


def _outside(starts: np.ndarray, values: Values, own: Fences) -> tuple[tuple[int, ...], tuple[int, ...]]:
    return (
        tuple(starts[is_below(values, own.lower)].tolist()),
        tuple(starts[is_above(values, own.upper)].tolist()),
    )


def _comparisons(
    measure: Measure,
    points: Points,
    stretches: Sequence[Stretch],
    edges: Sequence[Edge],
    rows: Sequence[Values],
    worth: float | None,
) -> Iterable[Comparison]:
    for place in range(1, len(stretches)):
        yield Comparison(place, "baseline", _answer(measure, points, stretches, edges, rows, 0, place, worth))
        if place > 1:
            answer = _answer(measure, points, stretches, edges, rows, place - 1, place, worth)
            yield Comparison(place, "before", answer)


def _answer(
    measure: Measure,
    points: Points,
    stretches: Sequence[Stretch],
    edges: Sequence[Edge],
    rows: Sequence[Values],
    against: int,
    place: int,
    worth: float | None,
) -> Answer:
    """One stretch against an earlier one."""
    before, after = (row[~np.isnan(row)] for row in (rows[against], rows[place]))
    carried = _carried(points, stretches[against], edges[place])
    if not len(before) or not len(after):
        return Answer(carried=carried, sureness="too early", direction="none")
    r = carry_over([rows[against], rows[place]])
    widened = widening(r)
    test = rank_sum(before, after, widened)
    estimate, low, high = shift(before, after, widened)
    share_low, share_high = share_range(test.share, len(before), len(after), widened)
    word = sureness(len(before), len(after), test.p, low > 0 or high < 0)
    direction: Direction = "none"
    if word not in ("too early", "cannot tell"):
        direction = _sign(estimate) if estimate else _sign(test.share - 0.5)
    old_median = fourths(before).median
    return Answer(
        carried=carried,
        shift=Shift(
            estimate,
            low,
            high,
            test.share,
            share_low,
            share_high,
            _better_days(measure, after, old_median, estimate),
            len(after),
        ),
        luck=Luck(test.p, in_100(test.p)),
        sureness=word,
        direction=direction,
        since=_since(points, edges, against, place, widened) if place == against + 1 else None,
        how_often=_how_often(measure, before, after, widened),
        how_much=_how_much(measure, before, after, widened),
        goal=_goal(measure, before, after, widened),
        carry_over=r,
        bound=max(abs(low), abs(high)) if word == "cannot tell" else None,
        still_needed=_still_needed(before, after, worth, widened),
    )


def _still_needed(before: Values, after: Values, worth: float | None, widened: float) -> StillNeeded | None:
    if not worth:
        return None
    needed = days_needed_after(before, worth, widened)
    return StillNeeded(None if needed is None else max(0, needed - len(after)), None, None, abs(worth))


def in_100(p: float) -> int:
    """A chance as a whole number of logs in 100."""
    return int(np.floor(100 * p + 0.5))


def _sign(number: float) -> Direction:
    return "more" if number > 0 else "less" if number < 0 else "none"


def _carried(points: Points, baseline: Stretch, edge: Edge) -> Carried | None:
    if baseline.lower_fence is None or baseline.upper_fence is None:
        return None
    _, first, last = edge
    inside = points.within(first, last) & points.known
    starts, values = points.first[inside], points.values[inside]
    own = Fences(baseline.lower_fence, baseline.upper_fence, baseline.lower_fence, baseline.upper_fence)
    below, above = _outside(starts, values, own)
    rate = new_day_rate(baseline.observations)
    return Carried(below, above, rate * len(values), 100 * rate)


def _better_days(measure: Measure, after: Values, old_median: float, estimate: float) -> int:
    if isinstance(measure.aim, tuple):
        return _days_in_range(after, measure.aim)
    wants_less = measure.aim == "less" or (measure.aim == "none" and estimate < 0)
    return int(np.sum(after < old_median) if wants_less else np.sum(after > old_median))


def _days_in_range(values: Values, aim: tuple[float, float]) -> int:
    return int(np.sum((values >= aim[0]) & (values <= aim[1])))


def _since(points: Points, edges: Sequence[Edge], against: int, place: int, widened: float) -> Since | None:
    """Where the row of both stretches splits into two levels best."""
    _, first, before_last = edges[against]
    change, after_first, last = edges[place]
    inside = (points.within(first, before_last) | points.within(after_first, last)) & points.known
    splits = plausible_splits(points.values[inside], widened)
    if splits is None:
        return None
    starts = points.first[inside]
    best, earliest, latest = (int(starts[split]) for split in splits)
    marked = change.day.toordinal() if change else after_first
    return Since(best, earliest, latest, latest < marked)


def _is_zero_heavy(measure: Measure, before: Values) -> bool:
    can_be_zero = measure.kind in ("amount", "count") and bool(np.all(before >= 0))
    return can_be_zero and float(np.mean(before == 0)) >= ZERO_HEAVY_SHARE


def _how_often(measure: Measure, before: Values, after: Values, widened: float) -> HowOften | None:
    if measure.kind != "yes/no" and not _is_zero_heavy(measure, before):
        return None
    done_before = (int(np.sum(before > 0)), len(before))
    done_after = (int(np.sum(after > 0)), len(after))
    low, high = difference_of_shares(done_before, done_after, widened)
    return HowOften(done_before, done_after, low, high)


def _how_much(measure: Measure, before: Values, after: Values, widened: float) -> HowMuch | None:
    active_before, active_after = before[before > 0], after[after > 0]
    if not _is_zero_heavy(measure, before) or min(len(active_before), len(active_after)) < FEWEST_BEFORE // 2:
        return None
    _, low, high = shift(active_before, active_after, widened)
    return HowMuch(fourths(active_before).median, fourths(active_after).median, low, high)


def _goal(measure: Measure, before: Values, after: Values, widened: float) -> Goal | None:
    if not isinstance(measure.aim, tuple):
        return None
    met_before = (_days_in_range(before, measure.aim), len(before))
    met_after = (_days_in_range(after, measure.aim), len(after))
    low, high = difference_of_shares(met_before, met_after, widened)
    return Goal(met_before, met_after, low, high)
