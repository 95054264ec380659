"""How many days would lie outside a baseline's fences by luck alone."""

from __future__ import annotations

_KNOWN_FENCES_RATE = 0.0069766
"""2 Φ(−2.69796): the rate when the fences of a normal law are known, not estimated."""

_FIRST = 5
_NEW_DAY_RATE = (
    0.1969, 0.0934, 0.1044, 0.0542, 0.0956, 0.0555, 0.0644, 0.0392, 0.0613, 0.0396, 0.0466, 0.0312, 0.0452,
    0.0313, 0.0367, 0.0262, 0.0359, 0.0263, 0.0306, 0.0228, 0.0301, 0.0229, 0.0265, 0.0204, 0.0261, 0.0205,
    0.0236, 0.0186, 0.0232, 0.0187, 0.0214, 0.0173, 0.0212, 0.0173, 0.0196, 0.0161, 0.0195, 0.0162, 0.0183,
    0.0153, 0.0182, 0.0153, 0.0172, 0.0146, 0.0171, 0.0145, 0.0163, 0.0139, 0.0162, 0.0139, 0.0155, 0.0134,
    0.0154, 0.0134, 0.0148, 0.0130,
)  # fmt: skip
"""For baselines of 5 to 60 days: mean chance that one more unchanged normal day lies outside the 1.5 fences.

Simulated with 800,000 baselines a length, each baseline's chance taken exactly from the normal law. At n = 5
to 20 the same simulation agrees with the rates of Hoaglin, Iglewicz & Tukey (1986), JASA 81:991-999.
"""

_EXCESS_BY_REMAINDER = (0.349, 0.455, 0.358, 0.443)
"""Above 60 days the excess over the known-fences rate is this over n, by n mod 4 (same simulation)."""


def some_outside_rate(days: int) -> float:
    """Chance that some day of an unchanged log lies outside the log's own fences.

    Args:
        days: number of observations the fences were made of, and judged, at least 5.

    Fitted to simulated normal logs (0.24 at 7 days, 0.28 at 28, 0.40 at 56, 0.90 at 365); the fences of few days
    are so uncertain that one of their own often lies outside.
    """
    return 1 - (1 - 0.10 - 0.75 / days) * (1 - _KNOWN_FENCES_RATE) ** days


def new_day_rate(baseline_days: int, carry_over: float | None = None) -> float:
    """Chance that one more unchanged day lies outside the fences of a baseline of this length.

    Args:
        baseline_days: number of observations the fences were made of, at least 5.
        carry_over: from one day to the next; a short baseline then wanders off its level.

    Raises:
        ValueError: fewer than 5, where no fences are given.
    """
    if baseline_days < _FIRST:
        raise ValueError(f"no fences are given for {baseline_days} observations")
    place = baseline_days - _FIRST
    if place < len(_NEW_DAY_RATE):
        rate = _NEW_DAY_RATE[place]
    else:
        rate = _KNOWN_FENCES_RATE + _EXCESS_BY_REMAINDER[baseline_days % 4] / baseline_days
    r = carry_over or 0.0
    # Fitted to simulated AR(1) baselines of 7 to 28 days: 1.13, 1.36, 1.8 times as many at 0.2, 0.4, 0.6.
    return rate * (1 + 0.5 * r + 0.3 * r**2 + 1.7 * r**3)
