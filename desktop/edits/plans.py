"""A plan of so many days a week, in force from a day until the next one."""

from __future__ import annotations

from datetime import date

from desktop.edits.edit import Edit, edit_putting
from desktop.edits.ids import Ids
from desktop.journal.journal import Journal
from desktop.journal.records import Plan


def plan_in_force(journal: Journal, measure: int, day: date) -> Plan | None:
    """The plan of a measure that is in force on a day; one of no days counts as none."""
    plans = [plan for plan in journal.plans.values() if plan.measure == measure and plan.first <= day]
    last = max(plans, key=lambda plan: (plan.first, plan.id), default=None)
    return last if last is not None and last.times else None


def set_plan(journal: Journal, ids: Ids, measure: int, first: date, times: int, spare: int = 0) -> Edit:
    """Put a plan in force from a day on; earlier weeks stay judged by the plan of their time.

    Args:
        journal: as it stands.
        ids: gives a new id.
        measure: the measure's id.
        first: the first day of the plan; another plan of the same day is replaced.
        times: days a week; 0 ends the plan.
        spare: of those days, how many may be missed.

    Raises:
        KeyError: no such measure.
        ValueError: more spare days than days.
    """
    if spare > times:
        raise ValueError("a plan cannot have more spare days than days")
    journal.measures[measure]
    same = next((one for one in journal.plans.values() if one.measure == measure and one.first == first), None)
    plan = Plan(same.id if same is not None else ids.new("plan"), measure, first, times, spare)
    return edit_putting(journal, "set plan", [plan])
