"""The promise of the queue, on a slice of the caseloads that ``python -m tests.scoreboard`` counts."""

from __future__ import annotations

import numpy as np

from tests.scoreboard.caseload import FIRST_ROWS, monday, told


def test_true_cases_come_first_and_luck_names_few():
    mondays = [monday(seed) for seed in range(10)]
    assert np.mean([one.true_in_first for one in mondays]) >= 10
    assert all(one.silent_on_top for one in mondays)
    assert np.mean([one.unchanged_flagged for one in mondays]) <= 1.5
    # The rule of thumb beside it names many more, and finds fewer.
    assert np.mean([one.naive_flagged for one in mondays]) > 3 * np.mean(
        [one.unchanged_flagged for one in mondays]
    )
    assert np.mean([one.naive_true for one in mondays]) < np.mean([one.true_in_first for one in mondays])
    assert f"the first {FIRST_ROWS} rows" in "\n".join(told(mondays))
