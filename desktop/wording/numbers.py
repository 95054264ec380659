"""Numbers in plain words: as many digits as the log itself has, units, counts, chances."""

from __future__ import annotations

import math
from collections.abc import Iterable
from dataclasses import dataclass

from analysis.log import Measure, Period

_MOST_DECIMALS = 3
_ONE = {"minutes": "minute", "hours": "hour", "steps": "step", "days": "day", "times": "time", "points": "point"}
_PACES: dict[Period, tuple[tuple[str, float], ...]] = {
    "day": (("week", 7.0), ("month", 30.44), ("year", 365.25)),
    "week": (("week", 1.0), ("year", 52.18)),
    "month": (("month", 1.0), ("year", 12.0)),
    "year": (("year", 1.0),),
}
"""For each period what a slope is told by: the name, and how many periods it holds."""
_PERIODS = {"day": "days", "week": "weeks", "month": "months", "year": "years"}


def decimals_of(values: Iterable[float]) -> int:
    """How many digits after the mark these values are written with, at most three."""
    listed = [value for value in values if math.isfinite(value)]
    for digits in range(_MOST_DECIMALS):
        if all(math.isclose(value, round(value, digits), rel_tol=1e-12, abs_tol=1e-9) for value in listed):
            return digits
    return _MOST_DECIMALS


def decimals_for(values: Iterable[float]) -> int:
    """Digits after the mark for what is said of these values: theirs, but no finer than the range is worth.

    Averages of many readings have long tails of digits that say nothing.
    """
    listed = [value for value in values if math.isfinite(value)]
    if not listed:
        return 0
    spread = max(listed) / 2 - min(listed) / 2
    useful = 2 - math.floor(math.log10(spread)) if spread > 0 else _MOST_DECIMALS
    return min(decimals_of(listed), max(0, useful - 1))


def plain(value: float, decimals: int) -> str:
    """A number with at most this many digits after the mark, without trailing zeros."""
    if abs(value) >= 1e15:
        return f"{value:.3g}"
    text = f"{value:.{decimals}f}"
    if "." in text:
        text = text.rstrip("0").rstrip(".")
    return "0" if text == "-0" else text.replace("-", "−")


def count(number: int, noun: str) -> str:
    """``1 day``, ``2 days``."""
    return f"{number} {noun}" if number == 1 else f"{number} {noun}s"


def chance_in_100(p: float) -> str:
    """A chance as logs in 100, one denominator everywhere."""
    if p < 0.01:
        return "fewer than 1 of 100"
    if p > 0.99:
        return "more than 99 of 100"
    # Rounded as the answer rounds it.
    return f"about {math.floor(100 * p + 0.5)} of 100"


@dataclass(frozen=True)
class Speech:
    """How the numbers and periods of one measure are said.

    Attributes:
        measure: with the period of the answer.
        decimals: digits after the mark of the log's own values.
    """

    measure: Measure
    decimals: int

    @property
    def one(self) -> str:
        """``day``, ``week``, ``month`` or ``year``."""
        return self.measure.period

    @property
    def many(self) -> str:
        """``days``, ``weeks``, ``months`` or ``years``."""
        return _PERIODS[self.measure.period]

    @property
    def is_amount(self) -> bool:
        """Whether more and less are said of it, rather than higher and lower."""
        return self.measure.kind in ("amount", "count", "yes/no")

    def number(self, value: float) -> str:
        """A value, a median or a fence: one digit more than the log's values where it needs it."""
        return plain(value, self.decimals + 1)

    def with_unit(self, value: float) -> str:
        """``34 minutes``, ``1 minute``, ``128 mmHg``, or the bare number where there is no unit."""
        number = self.number(value)
        unit = self.measure.unit
        if not unit:
            return number
        return f"{number} {_ONE.get(unit, unit) if number in ('1', '−1') else unit}"

    def sized(self, value: float) -> str:
        """The size of a difference with its direction: ``11 minutes more``, ``7 mmHg lower``."""
        return f"{self.with_unit(abs(value))} {self.way(value)}"

    def way(self, value: float) -> str:
        """``more`` or ``less`` of an amount, ``higher`` or ``lower`` of a reading or score."""
        if self.is_amount:
            return "more" if value >= 0 else "less"
        return "higher" if value >= 0 else "lower"

    def pace(self, slope: float) -> str:
        """A slope a period as people say it: ``0.3 kg lower a week``, ``1.3 ppm higher a year``.

        Told by the shortest time in which it comes to more than rounding.
        """
        paces = _PACES[self.measure.period]
        least = 2 * 10.0 ** -(self.decimals + 1)
        name, periods = next((pace for pace in paces if abs(slope) * pace[1] >= least), paces[-1])
        return f"{self.sized(slope * periods)} a {name}"

    def rate(self) -> str:
        """`` a day`` behind an amount; nothing behind a reading."""
        return f" a {self.one}" if self.is_amount else ""

    def between(self, low: float, high: float) -> str:
        """The range of a difference: ``between 3 and 16 minutes more a day``."""
        if low >= 0 or high <= 0:
            near, far = sorted((abs(low), abs(high)))
            if self.number(near) == self.number(far):
                return f"about {self.sized(low)}{self.rate()}"
            return f"between {self.number(near)} and {self.sized(math.copysign(far, low + high))}{self.rate()}"
        return f"anywhere from {self.sized(low)} to {self.sized(high)}{self.rate()}"

    def between_amounts(self, low: float, high: float) -> str:
        """The range of a difference that is of no period: ``between 20 and 60 minutes more``."""
        near, far = sorted((abs(low), abs(high)))
        if self.number(near) == self.number(far):
            return f"about {self.sized(low or high)}"
        return f"between {self.number(near)} and {self.sized(math.copysign(far, low + high))}"

    def periods(self, number: int) -> str:
        """``1 day``, ``14 days``, ``3 weeks``."""
        return count(number, self.one)
