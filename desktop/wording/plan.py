"""A plan of days a week, and how it was kept, in plain words: no praise, no blame, no run of days."""

from __future__ import annotations

from collections.abc import Sequence

from analysis.questions.plan_kept import WeekOfPlan
from desktop.wording.numbers import count

TITLE = "Your plan"
LATELY = 4


def plan_words(times: int, spare: int) -> str:
    """``5 days a week, 1 to spare``."""
    return f"{count(times, 'day')} a week" + (f", {spare} to spare" if spare else "")


def plan_sentences(weeks: Sequence[WeekOfPlan]) -> tuple[str, ...]:
    """How a plan was kept over whole weeks, each judged by the plan of its time; none without a week."""
    if not weeks:
        return ()
    kept = sum(week.is_kept for week in weeks)
    now = weeks[-1]
    plans = {(week.times, week.spare) for week in weeks}
    held = " Each week is held against the plan of its time." if len(plans) > 1 else ""
    told = [f"{plan_words(now.times, now.spare)}: kept in {kept} of {count(len(weeks), 'whole week')}.{held}"]
    if len(weeks) > LATELY:
        lately = weeks[-LATELY:]
        done = ", ".join(str(week.done) for week in lately)
        told.append(f"Days done in the last {LATELY} weeks: {done}.")
    return (told[0][0].upper() + told[0][1:], *told[1:])
