"""Days on which nothing at all was written down: were they days without any, or days not known?"""

from __future__ import annotations

from datetime import date, timedelta

from desktop.journal.journal import Journal

FEWEST_DAYS = 3
"""Shorter holes in a log are ordinary; a measure's own rule counts them."""


def unasked_gap(journal: Journal, measure: int) -> tuple[date, date] | None:
    """The latest run of three days or more without any entry, where such days would count as zeros.

    Days named as ill or away are answered already.

    Args:
        journal: as it stands.
        measure: the measure's id.

    Returns:
        First and last day; None where a missed day stays blank, or there is no such run.
    """
    entries = journal.entries.get(measure, {})
    if journal.measures[measure].missed != "zero" or not entries:
        return None
    logged = {day for of_measure in journal.entries.values() for day, _ in of_measure}
    logged |= {
        span.first + timedelta(at)
        for span in journal.spans_of(measure)
        if span.kind in ("ill", "away")
        for at in range((span.last - span.first).days + 1)
    }
    own = sorted(day for day, _ in entries)
    within = sorted(day for day in logged if own[0] <= day <= own[-1])
    for before, after in zip(reversed(within[:-1]), reversed(within[1:]), strict=True):
        if (after - before).days > FEWEST_DAYS:
            return before + timedelta(1), after - timedelta(1)
    return None
