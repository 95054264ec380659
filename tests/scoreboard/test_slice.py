"""A slice of the scoreboard with loose limits: what no change to the method may break.

The limits are far from the figures the full run gives; they are not what the families were counted at.
"""

import numpy as np
import pytest

from tests.scoreboard.cells import Case, count
from tests.scoreboard.families import Family, carried, heavy, lognormal, normal
from tests.scoreboard.tables import claim_facts

LOGS = 250


def claims(family, m, n, move):
    def make(rng):
        return Case(family.log(rng, m, n, move), m)

    return count(make, LOGS, claim_facts, "slice", family.name, m, n, move)


@pytest.mark.parametrize(
    "family",
    [Family("normal", normal), Family("t3", heavy), Family("skewed", lognormal), Family("carried", carried(0.4))],
    ids=lambda family: family.name,
)
@pytest.mark.parametrize(("m", "n"), [(14, 14), (28, 28)])
def test_an_unchanged_log_is_seldom_told_as_moved(family, m, n):
    held = claims(family, m, n, 0.0)
    assert held["claim"] <= 0.10 * LOGS
    assert held["naive"] >= 0.20 * LOGS


def test_a_move_of_one_and_a_half_standard_deviations_is_mostly_seen():
    held = claims(Family("normal", normal), 28, 28, 1.5)
    assert held["claim more"] >= 0.85 * LOGS
    assert held["claim less"] == 0


def test_a_steady_slope_is_not_told_as_a_move():
    def make(rng):
        days = 10 + rng.standard_normal(84) + 0.05 * np.arange(84)
        return Case(days, 28)

    held = count(make, LOGS, claim_facts, "slice", "slope")
    assert held["claim"] <= 0.15 * LOGS
    assert held["doubt slope_before"] >= 0.70 * LOGS
