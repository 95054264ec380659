"""Several measures: Holm's adjustment, against a general-purpose library and a published example."""

import numpy as np
import pytest
from statsmodels.stats.multitest import multipletests

from analysis.questions.several_measures import holm

# Benjamini & Hochberg (1995), JRSS B 57:289-300: their fifteen chances, as the scipy docs print them.
CHANCES = (
    0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.3240, 0.4262, 0.5719, 0.6528,
    0.7590, 1.0,
)  # fmt: skip


def test_the_published_chances_are_adjusted_as_the_step_down_rule_says():
    assert holm(CHANCES)[:9] == pytest.approx(
        (0.0015, 0.0056, 0.0247, 0.1140, 0.2211, 0.2780, 0.2780, 0.2780, 0.3213), abs=1e-9
    )
    assert holm(CHANCES)[9:] == (1.0,) * 6
    assert sum(one < 0.05 for one in holm(CHANCES)) == 3


def test_any_chances_are_adjusted_as_a_library_does():
    rng = np.random.default_rng(9)
    for count in (1, 2, 3, 7):
        chances = np.round(rng.random(count) ** 3, 3)
        assert holm(chances.tolist()) == pytest.approx(multipletests(chances, method="holm")[1])
    assert holm(()) == ()
