"""A plan of so many days a week: on which days it was done, and the whole weeks it was in force for."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import date

from analysis.log import COUNTED_KINDS
from analysis.questions.plan_kept import PlannedDays, WeekOfPlan, weeks_of_plan
from desktop.journal.journal import Journal


def plans_of(journal: Journal, measure: int) -> list[PlannedDays]:
    """The plans of a measure, oldest first."""
    plans = [plan for plan in journal.plans.values() if plan.measure == measure]
    return [
        PlannedDays(one.first, one.times, one.spare) for one in sorted(plans, key=lambda one: (one.first, one.id))
    ]


def days_done(journal: Journal, measure: int) -> list[int]:
    """Day numbers on which there was more than nothing, ascending."""
    entries = journal.entries.get(measure, {}).values()
    return sorted(
        {
            entry.day.toordinal()
            for entry in entries
            if entry.kind in COUNTED_KINDS and entry.value is not None and entry.value > 0
        }
    )


def pauses_of(journal: Journal, measure: int | None = None) -> list[tuple[int, int]]:
    """First and last day numbers of illness and absence, of one measure or of any."""
    spans = journal.spans.values() if measure is None else journal.spans_of(measure)
    named = [(one.first.toordinal(), one.last.toordinal()) for one in spans if one.kind in ("ill", "away")]
    return sorted(named)


def weeks_under_plan(journal: Journal, measure: int, today: date) -> Sequence[WeekOfPlan]:
    """The whole weeks of a measure's plans up to yesterday, oldest first; none without a plan."""
    plans = plans_of(journal, measure)
    if not plans:
        return []
    return weeks_of_plan(
        days_done(journal, measure),
        plans,
        plans[0].first.toordinal(),
        today.toordinal() - 1,
        pauses_of(journal, measure),
    )
