"""Families of simulated logs; each has day-to-day noise of known law and standard deviation 1 before rounding.

A family draws ``m`` days before the change and ``n`` after it. What changes at the change is added outside, in
standard deviations, so that the same noise serves the unchanged and the moved log.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field
from math import erf, exp, sqrt

import numpy as np
from numpy.typing import NDArray

Values = NDArray[np.float64]
Draw = Callable[[np.random.Generator, int], Values]
LEVEL = 10.0
"""Middle of the continuous families, far enough from zero."""


@dataclass(frozen=True)
class Family:
    """One law of daily values.

    Attributes:
        name: as the table calls it.
        draw: so many days of noise, mean 0 and standard deviation 1, in order of day.
        finish: what becomes of level plus noise plus move: rounding, blanks.
        measure: fields of the measure.
        carry: lag-1 carry-over of the noise.
        information: Fisher information of the level, against 1 for the normal law; the oracle's.
        logged: share of days that are logged.
    """

    name: str
    draw: Draw
    finish: Callable[[np.random.Generator, Values], Values] = lambda _, values: values
    measure: dict[str, object] = field(default_factory=dict)
    carry: float = 0.0
    information: float = 1.0
    logged: float = 1.0

    def log(self, rng: np.random.Generator, m: int, n: int, move: float) -> Values:
        """One log, the move added to the days after."""
        values = LEVEL + self.draw(rng, m + n)
        values[m:] += move
        return self.finish(rng, values)

    def oracle(self, m: int, n: int, move: float) -> float:
        """Chance that the best test, which knows law and carry-over, claims the move in its direction."""
        precision = 1 / (
            1 / _precision(round(m * self.logged), self.carry) + 1 / _precision(round(n * self.logged), self.carry)
        )
        return _above(move * sqrt(precision * self.information))


def _precision(n: int, carry: float) -> float:
    """Inverse variance of the best estimate of the level of ``n`` days of a stationary AR(1) of variance 1."""
    # 1' R^-1 1 of an AR(1): (n - (n - 2) r) / (1 + r).
    return (n - (n - 2) * carry) / (1 + carry)


def _above(effect: float) -> float:
    return 0.5 * (1 + erf((effect - 1.959964) / sqrt(2)))


def normal(rng: np.random.Generator, n: int) -> Values:
    """Independent normal days."""
    return rng.standard_normal(n)


def carried(r: float) -> Draw:
    """A stationary AR(1)."""

    def draw(rng: np.random.Generator, n: int) -> Values:
        steps = rng.standard_normal(n) * sqrt(1 - r * r)
        days = np.empty(n)
        days[0] = rng.standard_normal()
        for day in range(1, n):
            days[day] = r * days[day - 1] + steps[day]
        return days

    return draw


def lognormal(rng: np.random.Generator, n: int) -> Values:
    """Skewed upwards: the exponential of a normal with standard deviation 0.5, centred and scaled."""
    mean, sd = exp(0.125), sqrt((exp(0.25) - 1) * exp(0.25))
    return (np.exp(0.5 * rng.standard_normal(n)) - mean) / sd


def heavy(rng: np.random.Generator, n: int) -> Values:
    """Student's t with 3 degrees of freedom, scaled."""
    return rng.standard_t(3, n) / sqrt(3)


def weekend(rng: np.random.Generator, n: int) -> Values:
    """Normal days, Saturdays and Sundays two standard deviations higher."""
    return rng.standard_normal(n) + 2.0 * (np.arange(n) % 7 >= 5)


def wild(rng: np.random.Generator, n: int) -> Values:
    """Normal days with one wild one early on."""
    days = rng.standard_normal(n)
    days[rng.integers(0, 7)] += 8.0
    return days


def _rounded_to(step: float, scale: float, level: float, low: float, high: float) -> Callable[..., Values]:
    def finish(rng: np.random.Generator, values: Values) -> Values:
        return np.clip(np.round(((values - LEVEL) * scale + level) / step) * step, low, high)

    return finish


def _blank(rng: np.random.Generator, values: Values) -> Values:
    return np.where(rng.random(len(values)) < 0.2, np.nan, values)


CONTINUOUS = (
    Family("normal", normal),
    Family("lognormal 0.5", lognormal, information=3.0),
    Family("t, 3 df", heavy, information=2.0),
    Family("carry-over 0.2", carried(0.2), carry=0.2),
    Family("carry-over 0.4", carried(0.4), carry=0.4),
    Family("one wild day", wild),
    Family("20 % blank", normal, _blank, logged=0.8),
)
"""Families whose days are of a continuous law and carry over at most 0.4."""

HARDER = (
    Family("carry-over 0.6", carried(0.6), carry=0.6),
    Family("weekend +2", weekend),
    Family("score 0 to 10", normal, _rounded_to(1.0, 1.5, 5.0, 0.0, 10.0), {"kind": "score"}),
    Family("minutes to 5", normal, _rounded_to(5.0, 8.0, 30.0, 0.0, 600.0), {"kind": "amount"}),
)


def poisson(rng: np.random.Generator, days: int, move: float = 0.0) -> Values:
    """Counts with mean 6; the move in standard deviations of the count."""
    return rng.poisson(6 + move * sqrt(6), days).astype(float)


def sessions(rng: np.random.Generator, days: int, a_week: int, *, fixed: bool) -> Values:
    """Minutes on so many days of each week, zero on the rest; the days fixed, or drawn anew each week."""
    minutes = np.zeros(days)
    for start in range(0, days, 7):
        chosen = np.array([0, 2, 4, 5, 1, 6, 3][:a_week]) if fixed else rng.permutation(7)[:a_week]
        places = start + chosen
        places = places[places < days]
        minutes[places] = np.round(rng.gamma(9, 4, len(places)) + 5)
    return minutes


SESSION_MEASURE: dict[str, object] = {"kind": "amount", "missed": "zero"}
