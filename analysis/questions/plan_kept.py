"""Was a plan of so many days a week kept: whole weeks, each by the plan in force on its first day."""

from __future__ import annotations

from collections.abc import Collection, Iterable, Sequence
from dataclasses import dataclass
from datetime import date

_WEEK = 7


@dataclass(frozen=True)
class PlannedDays:
    """``times`` days a week, of which ``spare`` may be missed, from ``first`` until the next plan."""

    first: date
    times: int
    spare: int = 0


@dataclass(frozen=True)
class WeekOfPlan:
    """One whole week under a plan.

    Attributes:
        first: day number of its first day.
        done: days on which it was done.
        times, spare: of the plan in force.
    """

    first: int
    done: int
    times: int
    spare: int

    @property
    def is_kept(self) -> bool:
        """Whether no more days were missed than the plan has to spare."""
        return self.done >= self.times - self.spare


def weeks_of_plan(
    done: Collection[int],
    plans: Sequence[PlannedDays],
    first: int,
    last: int,
    paused: Iterable[tuple[int, int]] = (),
    week_start: int = 0,
) -> list[WeekOfPlan]:
    """The whole weeks between two days that a plan was in force for, oldest first.

    A week with a day of illness or absence in it is not judged.

    Args:
        done: day numbers on which it was done.
        plans: in any order; one of 0 times ends the plan before it.
        first: day number; weeks that begin before it are left out.
        last: day number; weeks that end after it are left out.
        paused: first and last day numbers of illness and absence.
        week_start: first day of a week, 0 = Monday … 6 = Sunday.
    """
    in_order = sorted(plans, key=lambda plan: plan.first)
    pauses = list(paused)
    # Day number 1 was a Monday.
    start = first + (week_start - (first - 1)) % _WEEK
    weeks = []
    for begin in range(start, last - _WEEK + 2, _WEEK):
        end = begin + _WEEK - 1
        plan = next((one for one in reversed(in_order) if one.first.toordinal() <= begin), None)
        if plan is None or not plan.times or any(low <= end and high >= begin for low, high in pauses):
            continue
        days = sum(begin <= day <= end for day in done)
        weeks.append(WeekOfPlan(begin, days, plan.times, plan.spare))
    return weeks


def missed_running(weeks: Sequence[WeekOfPlan]) -> int:
    """How many of the last weeks, one after the other, were not kept."""
    running = 0
    for week in reversed(weeks):
        if week.is_kept:
            break
        running += 1
    return running
