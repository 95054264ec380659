"""One cell of the scoreboard: many logs of one kind through the real review, counted."""

from __future__ import annotations

from collections import Counter
from collections.abc import Callable, Iterable
from dataclasses import dataclass, field
from datetime import date
from zlib import crc32

import numpy as np
from numpy.typing import NDArray

from analysis import Change, Log, Measure, Review, review
from analysis.questions.did_it_move import CLAIMS

Values = NDArray[np.float64]
FIRST = date(2031, 3, 3).toordinal()
SIZES = ((7, 14), (14, 14), (14, 28), (28, 28), (28, 56))
Make = Callable[[np.random.Generator], "Case"]


@dataclass(frozen=True)
class Case:
    """One simulated log with its change, and whatever else the review is told.

    Attributes:
        later: the days yet to come, which the review does not see.
    """

    values: Values
    change: int
    measure: Measure = field(default_factory=Measure)
    kinds: tuple[str, ...] = ()
    baseline_from: int | None = None
    worth: float | None = None
    later: Values | None = None


def reviewed(case: Case) -> Review:
    """The real review of a case; the day of the change is the place of its first day after."""
    count = len(case.values)
    kinds = case.kinds or tuple("blank" if np.isnan(value) else "value" for value in case.values)
    log = Log.from_columns(case.measure, range(FIRST, FIRST + count), case.values, kinds)  # type: ignore[arg-type]
    change = Change(date.fromordinal(FIRST + case.change), "x")
    baseline = None
    if case.baseline_from is not None:
        first = date.fromordinal(FIRST + case.baseline_from)
        baseline = (first, date.fromordinal(FIRST + case.change - 1))
    return review(log, [change], baseline, today=date.fromordinal(FIRST + count - 1), worth=case.worth)


def rng_of(*names: object) -> np.random.Generator:
    """The same random numbers for the same cell, whatever else is run."""
    return np.random.default_rng(crc32(repr(names).encode()))


def is_claim(answer: Review) -> bool:
    """Whether the review says that it moved."""
    return answer.answer.sureness in CLAIMS


def is_naive_claim(answer: Review) -> bool:
    """The rule of thumb: some day after the change lies outside the baseline's fences."""
    carried = answer.answer.carried
    return carried is not None and bool(carried.below or carried.above)


def count(make: Make, logs: int, facts: Callable[[Case, Review], Iterable[str]], *name: object) -> Counter[str]:
    """How many of ``logs`` cases each fact holds for."""
    rng = rng_of(*name)
    held: Counter[str] = Counter()
    for _ in range(logs):
        case = make(rng)
        held.update(facts(case, reviewed(case)))
    return held
