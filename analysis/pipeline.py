"""From a log to its review, in the order the questions are asked."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import replace
from datetime import date
from itertools import pairwise

import numpy as np

from analysis.answer import (
    Answer,
    Carried,
    Comparison,
    Goal,
    HowMuch,
    HowOften,
    Luck,
    Review,
    Season,
    Shift,
    Since,
    Slope,
    SpreadChange,
    Still,
    StillNeeded,
    Stretch,
    Switches,
    WeekdayRhythm,
)
from analysis.batch.fences import Fences
from analysis.batch.fourths import fourths
from analysis.batch.luck import new_day_rate
from analysis.doubts.catalogue import doubts_of
from analysis.doubts.seen import Seen
from analysis.log import Change, Log, Measure, Values
from analysis.points import Points, first_logged_day, points_of
from analysis.questions.by_how_much import difference_of_shares, share_range, shift
from analysis.questions.control_median import control_median
from analysis.questions.days_at_level import days_at_level
from analysis.questions.days_still_needed import forecast
from analysis.questions.did_it_move import at_most
from analysis.questions.is_it_so_still import LATELY, still_state
from analysis.questions.since_when import plausible_splits
from analysis.questions.steadier import spread_change
from analysis.questions.week_totals import week_totals
from analysis.series.carry_over import carry_over, widening
from analysis.series.season import without_season
from analysis.series.slope import common_slope
from analysis.sides import Level, Sides, chance_of_shares, compare
from analysis.slots import like_slots
from analysis.stretches import Edge, check_baseline, edges_of, merged, outside, stretch_of

FEWEST_FOR_HOW_MUCH = 3


def review(
    log: Log,
    changes: Sequence[Change] = (),
    baseline: tuple[date, date] | None = None,
    today: date | None = None,
    worth: float | None = None,
    look_day: date | None = None,
    others: Sequence[float] = (),
) -> Review:
    """Answer whether a log moved, by how much and since when.

    Args:
        log: what was written down; any log is answered, an empty one too.
        changes: in any order; those of one day are one change.
        baseline: first and last day to judge against; the days up to the first change when left out.
        today: the day after which nothing is used; the last day of the log when left out.
        worth: the smallest move that would be worth it, in the measure's unit.
        look_day: the day agreed on to judge; before it the answer is an early look.
        others: the chance by luck (see ``chance_of``) of every other measure looked at for the same change.

    Raises:
        AnalysisError: the baseline ends before it begins, or reaches into a change.
    """
    end = today.toordinal() if today is not None else (int(log.days[-1]) if len(log) else None)
    points = points_of(log, end)
    begin = first_logged_day(log, end)
    in_force = [one for one in changes if end is None or one.day.toordinal() <= end]
    marked = merged(in_force)
    check_baseline(baseline, marked)
    if begin is None or end is None or not points.known.any():
        return Review(log.measure, (), Answer(), points)
    edges = edges_of(marked, baseline, begin, end)
    log, other_slots = like_slots(log, edges[0], edges[-1])
    if other_slots is not None:
        points = points_of(log, end)
    season = without_season(points, edges[0][1], edges[0][2])
    if season is not None:
        points = season[0]
    stretches = tuple(stretch_of(points, edge, is_after=place > 0) for place, edge in enumerate(edges))
    asked = _Asked(log.measure, points, stretches, edges, worth)
    comparisons = [asked.compared(place, 0) for place in range(1, len(stretches))]
    befores = [asked.compared(place, place - 1) for place in range(2, len(stretches))]
    last = comparisons[-1] if comparisons else None
    seen = Seen(
        log,
        in_force,
        stretches,
        last.sides if last else None,
        last.level if last else None,
        end,
        look_day.toordinal() if look_day is not None else None,
        tuple(others),
        other_slots,
    )
    doubts = doubts_of(seen)
    answer = last.answer if last else Answer(slope=_slope_of_one(points, edges[0]))
    if any(doubt.alters for doubt in doubts):
        answer = _capped(answer)
    if season is not None:
        answer = replace(answer, season=Season(season[1]))
    several = len(stretches) > 2
    return Review(
        log.measure,
        stretches,
        answer,
        points,
        doubts,
        today=end,
        to_come=tuple(sorted(one.day.toordinal() for one in changes if one.day.toordinal() > end)),
        switches=_switches([comparisons[0], *befores]) if several else None,
        comparisons=tuple(_listed(comparisons, befores)) if several else (),
    )


def chance_of(
    log: Log,
    changes: Sequence[Change] = (),
    baseline: tuple[date, date] | None = None,
    today: date | None = None,
) -> float | None:
    """How often luck alone parts the last stretch from the baseline so far; arguments as for ``review``.

    Returns:
        None where there is nothing to compare, or too little for an answer.

    Raises:
        AnalysisError: as ``review``.
    """
    answer = review(log, changes, baseline, today).answer
    return None if answer.luck is None or answer.sureness == "too early" else answer.luck.p


class _Asked:
    """Everything one comparison needs of a log, and the answer to it."""

    def __init__(
        self,
        measure: Measure,
        points: Points,
        stretches: Sequence[Stretch],
        edges: Sequence[Edge],
        worth: float | None,
    ) -> None:
        self.measure, self.points, self.stretches, self.edges, self.worth = (
            measure,
            points,
            stretches,
            edges,
            worth,
        )

    def compared(self, place: int, against: int) -> _Compared:
        """One stretch against an earlier one."""
        sides = self._sides(against, place)
        carried = None
        if not len(sides.known_before) or not len(sides.known_after):
            return _Compared(
                None, None, Answer(self._carried(against, place, None), sureness="too early", direction="none")
            )
        level = compare(sides)
        carried = self._carried(against, place, level)
        since = self._since(sides, level, place) if place == against + 1 else None
        return _Compared(sides, level, _answer(sides, level, carried, since, self.worth))

    def _sides(self, against: int, place: int) -> Sides:
        at = np.arange(len(self.points), dtype=np.int64)
        rows = []
        for one in (against, place):
            _, first, last = self.edges[one]
            inside = self.points.within(first, last)
            rows.append((self.points.first[inside], at[inside], self.points.values[inside]))
        (before_days, before_at, before), (after_days, after_at, after) = rows
        return Sides(self.measure, before_days, before_at, before, after_days, after_at, after)

    def _carried(self, against: int, place: int, level: Level | None) -> Carried | None:
        baseline = self.stretches[against]
        if baseline.lower_fence is None or baseline.upper_fence is None:
            return None
        _, first, last = self.edges[place]
        inside = self.points.within(first, last) & self.points.known
        own = Fences(baseline.lower_fence, baseline.upper_fence, baseline.lower_fence, baseline.upper_fence)
        values = self.points.values[inside]
        below, above = outside(self.points.first[inside], values, own)
        rate = new_day_rate(baseline.observations, level.carry_over if level else None)
        return Carried(below, above, rate * len(values), 100 * rate)

    def _since(self, sides: Sides, level: Level, place: int) -> Since | None:
        """Where the row of both stretches splits into two levels best."""
        row = np.concatenate([level.sides.before, level.sides.after])
        days = np.concatenate([sides.before_days, sides.after_days])
        known = ~np.isnan(row)
        splits = plausible_splits(row[known])
        if splits is None:
            return None
        likely, earliest, latest = (int(days[known][split]) for split in splits)
        change = self.edges[place][0]
        marked = change.day.toordinal() if change else self.edges[place][1]
        return Since(likely, earliest, latest, latest < marked)


class _Compared:
    """The sides and levels of one comparison beside its answer; None where a side is empty."""

    def __init__(self, sides: Sides | None, level: Level | None, answer: Answer) -> None:
        self.sides, self.level, self.answer = sides, level, answer


def _listed(comparisons: Sequence[_Compared], befores: Sequence[_Compared]) -> Iterable[Comparison]:
    for place, one in enumerate(comparisons, start=1):
        yield Comparison(place, "baseline", one.answer)
        if place > 1:
            yield Comparison(place, "before", befores[place - 2].answer)


def _switches(compared: Sequence[_Compared]) -> Switches:
    """How many of the changes the level moved with, of those with enough days on both sides."""
    enough = [one for one in compared if one.level is not None and one.answer.sureness != "too early"]
    ways = [one.answer.direction for one in enough if one.level is not None and one.level.is_claim]
    to_and_fro = len(ways) > 1 and all(one != other for one, other in pairwise(ways))
    return Switches(len(ways), len(enough), to_and_fro)


def _capped(answer: Answer) -> Answer:
    """A doubt that alters leaves at most "leaning"."""
    if answer.sureness is None:
        return answer
    return replace(answer, sureness=at_most(answer.sureness, "leaning"))


def _answer(
    sides: Sides, level: Level, carried: Carried | None, since: Since | None, worth: float | None
) -> Answer:
    before, after = sides.known_before, sides.known_after
    share_low, share_high = share_range(level.share, len(before), len(after), level.widened)
    old_median = fourths(before).median
    better = _better_days(sides.measure, after, old_median, level.estimate)
    spread = spread_change(level.sides.known_before, level.sides.known_after, level.widened)
    rhythm = level.rhythm
    return Answer(
        carried=carried,
        shift=Shift(
            level.estimate,
            level.low,
            level.high,
            level.share,
            share_low,
            share_high,
            better,
            len(after),
            control_median(level.sides.known_before, level.sides.known_after),
        ),
        luck=Luck(level.p, in_100(level.p)),
        sureness=level.sureness,
        direction=level.direction,
        since=since,
        still=_still(sides, level),
        spread_change=SpreadChange(spread.word, spread.p) if spread else None,
        slope=_slope(level.sides),
        how_often=_how_often(sides, level.widened),
        how_much=_how_much(sides, level.widened),
        week_total=week_totals(sides),
        goal=_goal(sides, level.widened),
        at_level=days_at_level(sides, level.estimate or level.share - 0.5, level.widened),
        carry_over=level.carry_over,
        weekday_rhythm=WeekdayRhythm(rhythm.p, rhythm.used) if rhythm else None,
        bound=max(abs(level.low), abs(level.high)) if level.sureness == "cannot tell" else None,
        still_needed=_still_needed(sides, level, worth),
    )


def in_100(p: float) -> int:
    """A chance as a whole number of logs in 100."""
    return int(np.floor(100 * p + 0.5))


def _better_days(measure: Measure, after: Values, old_median: float, estimate: float) -> int:
    if isinstance(measure.aim, tuple):
        return _days_in_range(after, measure.aim)
    wants_less = measure.aim == "less" or (measure.aim == "none" and estimate < 0)
    return int(np.sum(after < old_median) if wants_less else np.sum(after > old_median))


def _days_in_range(values: Values, aim: tuple[float, float]) -> int:
    return int(np.sum((values >= aim[0]) & (values <= aim[1])))


def _still(sides: Sides, level: Level) -> Still | None:
    after = level.sides.known_after
    state = still_state(level.sides.known_before, after)
    if state is None:
        return None
    # The last days as they were written down, whatever was taken off to compare them.
    lately = sides.after[-LATELY:]
    lately = lately[~np.isnan(lately)]
    return Still(state, fourths(lately).median if len(lately) else None)


def _slope_of_one(points: Points, edge: Edge) -> Slope | None:
    """The slope of a log without a change."""
    _, first, last = edge
    values = points.values[points.within(first, last)]
    at = np.arange(len(values), dtype=np.int64)
    rough = common_slope([at], [values])
    if rough is None:
        return None
    # Carry-over is that of the days around the slope, which by itself would look like nothing else.
    row = common_slope([at], [values], widening(carry_over([values - rough.a_period * at])))
    return Slope(row.a_period, None, row.p) if row else None


def _slope(sides: Sides) -> Slope | None:
    before = common_slope([sides.before_at], [sides.before])
    after = common_slope([sides.after_at], [sides.after])
    if before is None and after is None:
        return None
    return Slope(
        before.a_period if before else None, after.a_period if after else None, before.p if before else None
    )


def _days_with_some(values: Values) -> tuple[int, int]:
    return int(np.sum(values > 0)), len(values)


def _how_often(sides: Sides, widened: float) -> HowOften | None:
    if not sides.told_by_share:
        return None
    before, after = _days_with_some(sides.known_before), _days_with_some(sides.known_after)
    low, high = difference_of_shares(before, after, widened)
    return HowOften(before, after, low, high, chance_of_shares(before, after, widened))


def _how_much(sides: Sides, widened: float) -> HowMuch | None:
    before, after = sides.known_before, sides.known_after
    before, after = before[before > 0], after[after > 0]
    if not sides.is_zero_heavy or min(len(before), len(after)) < FEWEST_FOR_HOW_MUCH:
        return None
    _, low, high = shift(before, after, widened)
    return HowMuch(fourths(before).median, fourths(after).median, low, high)


def _goal(sides: Sides, widened: float) -> Goal | None:
    aim = sides.measure.aim
    if not isinstance(aim, tuple):
        return None
    before, after = sides.known_before, sides.known_after
    met_before = (_days_in_range(before, aim), len(before))
    met_after = (_days_in_range(after, aim), len(after))
    low, high = difference_of_shares(met_before, met_after, widened)
    return Goal(met_before, met_after, low, high)


def _still_needed(sides: Sides, level: Level, worth: float | None) -> StillNeeded | None:
    if not worth:
        return None
    if level.is_claim:
        return StillNeeded(0, 0, 0, abs(worth))
    # A weekly rhythm in use is taken off, as it will be when the move is looked for.
    before, so_far = level.sides.known_before, len(sides.known_after)
    logged = len(before) + so_far
    needed = forecast(before, worth, level.carry_over, logged, by_share=sides.told_by_share)
    days, low, high = (
        None if one is None else max(0, one - so_far) for one in (needed.days, needed.low, needed.high)
    )
    return StillNeeded(days, low, high, abs(worth))
