"""Blank days neither hide how far values hang together nor blow it up."""

from __future__ import annotations

import numpy as np

from analysis.questions.did_it_move import CLAIMS
from analysis.series.carry_over import carry_over
from tests.builders import reviewed

LOGS = 150


def drawn(rng: np.random.Generator, length: int, carried: float) -> np.ndarray:
    row = np.empty(length)
    row[0] = rng.normal()
    for at in range(1, length):
        row[at] = carried * row[at - 1] + np.sqrt(1 - carried**2) * rng.normal()
    return 50 + 10 * row


def claims(make) -> int:
    """Of 100 logs, how many say that it moved."""
    found = 0
    for seed in range(LOGS):
        values, change = make(np.random.default_rng(seed))
        found += reviewed(list(values), change, unit="kg").answer.sureness in CLAIMS
    return round(100 * found / LOGS)


def every_other_day(rng):
    values = [None] * 56
    values[::2] = drawn(rng, 28, 0.7).round(1).tolist()
    return values, 28


def three_days_a_week(rng):
    row = drawn(rng, 112, 0.8).round(1)
    return [value if at % 7 in (0, 2, 4) else None for at, value in enumerate(row)], 56


def some_blank(move: float):
    def make(rng):
        row = 50 + 10 * (rng.normal(size=56) + move * (np.arange(56) >= 28))
        blank = rng.random(56) < 0.5
        return [None if gone else round(value, 1) for value, gone in zip(row, blank, strict=True)], 28

    return make


def test_values_of_every_other_day_that_hang_together_are_no_move():
    assert claims(every_other_day) <= 12
    assert claims(three_days_a_week) <= 12


def test_half_of_the_days_blank_costs_days_and_not_trust():
    assert claims(some_blank(1.5)) >= 78
    assert claims(some_blank(0.0)) <= 6


def test_blanks_between_values_make_no_other_carry_over():
    row = drawn(np.random.default_rng(3), 40, 0.6)
    gappy = np.full(80, np.nan)
    gappy[::2] = row
    assert carry_over([gappy]) == carry_over([row])
