"""A steady slope is told as one, however steep; a late start, or a steady log, is not."""

from __future__ import annotations

import numpy as np
import pytest

from analysis.questions.did_it_move import CLAIMS
from desktop.wording.findings import findings_of
from tests.builders import reviewed

LOGS = 30


def told(values, change) -> tuple[str, str]:
    answer = reviewed(values, change, unit="kg")
    return findings_of(answer).headline, str(answer.answer.sureness)


@pytest.mark.parametrize("way", [1, -1])
@pytest.mark.parametrize("steep", [0.1, 0.2, 0.3, 0.5])
@pytest.mark.parametrize(("before", "after"), [(28, 28), (28, 56)])
def test_the_headline_tells_a_slope_however_steep(steep, before, after, way):
    slopes = claims = 0
    for seed in range(LOGS):
        rng = np.random.default_rng(seed)
        row = [100 + 10 * (way * steep * at + rng.normal()) for at in range(before + after)]
        headline, sureness = told(row, before)
        slopes += headline.startswith("It was moving all along")
        claims += sureness in CLAIMS
    assert slopes >= 0.85 * LOGS
    assert claims <= 0.15 * LOGS


def test_a_log_that_does_not_move_is_hardly_ever_told_as_a_slope():
    slopes = 0
    for seed in range(3 * LOGS):
        rng = np.random.default_rng(seed)
        slopes += told([100 + 10 * rng.normal() for _ in range(56)], 28)[0].startswith("It was moving")
    assert slopes <= 0.05 * 3 * LOGS


def test_a_slope_says_nothing_of_outside_days_or_of_luck():
    row = [85 - 0.05 * at + 0.25 * np.sin(2.4 * at) for at in range(56)]
    answer = reviewed(row, 28, unit="kg", aim="less")
    said = " ".join(findings_of(answer).lines())
    assert said.startswith("It was moving all along, by about 0.3")
    assert "It moves steadily, so days outside the old fences say nothing here." in said
    assert "The change adds nothing sure to it." in said
    for wrong in ("It may have moved", "The answer holds beyond that", "Cannot tell:"):
        assert wrong not in said


@pytest.mark.parametrize("late", [7, 10, 14])
def test_a_move_that_came_late_is_hardly_ever_told_as_a_slope(late):
    slopes = 0
    for seed in range(LOGS):
        rng = np.random.default_rng(seed)
        row = [100 + 10 * (2 * (at >= 21 + late) + rng.normal()) for at in range(56)]
        slopes += told(row, 21)[0].startswith("It was moving all along")
    assert slopes <= 0.1 * LOGS
