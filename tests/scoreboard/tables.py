"""The tables of the scoreboard, each a list of cells to count and a way to print what was counted."""

from __future__ import annotations

from collections import Counter
from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass, replace
from math import sqrt

import numpy as np
from scipy.stats import norm

from analysis import Measure, Review
from tests.scoreboard.cells import SIZES, Case, Make, is_claim, is_naive_claim, reviewed
from tests.scoreboard.families import (
    CONTINUOUS,
    HARDER,
    LEVEL,
    SESSION_MEASURE,
    Family,
    poisson,
    sessions,
)

MOVES = (0.5, 1.0, 1.5, 2.0)
Facts = Callable[[Case, Review], Iterable[str]]


@dataclass(frozen=True)
class Cell:
    """What to simulate and what to look for.

    Attributes:
        table, row, column: where it stands.
        make: draws one case.
        facts: what holds of one case and its review.
    """

    table: str
    row: str
    column: str
    make: Make
    facts: Facts


def _of_family(family: Family, m: int, n: int, move: float) -> Make:
    measure = Measure("x", **family.measure)  # type: ignore[arg-type]
    return lambda rng: Case(family.log(rng, m, n, move), m, measure)


def claim_facts(case: Case, answer: Review) -> Iterable[str]:
    """What the answer claims, by our rule and by the rule of thumb, and what it doubts."""
    if is_claim(answer):
        yield "claim"
        yield f"claim {answer.answer.direction}"
    if answer.answer.sureness == "as sure as a log can be":
        yield "as sure"
    if is_naive_claim(answer):
        yield "naive"
    if answer.doubts:
        yield "any doubt"
    yield from (f"doubt {doubt.name}" for doubt in answer.doubts)
    if any(doubt.alters for doubt in answer.doubts):
        yield "doubt that alters"
    yield from (f"alter:{doubt.name}" for doubt in answer.doubts if doubt.alters)


def unchanged() -> list[Cell]:
    """A: nothing changed."""
    cells = []
    for m, n in SIZES:
        for family in (*CONTINUOUS, *HARDER):
            cells.append(Cell("A", family.name, f"{m},{n}", _of_family(family, m, n, 0.0), claim_facts))
        others: dict[str, Make] = {
            "counts, mean 6": lambda rng, m=m, n=n: Case(poisson(rng, m + n), m, Measure("x", kind="count")),
        }
        for name, a_week, fixed in (
            ("3 a week, any days", 3, False),
            ("3 a week, fixed days", 3, True),
            ("1 a week", 1, False),
        ):
            others[name] = lambda rng, m=m, n=n, a_week=a_week, fixed=fixed: Case(
                sessions(rng, m + n, a_week, fixed=fixed), m, Measure("x", **SESSION_MEASURE)
            )
        cells += [Cell("A", name, f"{m},{n}", make, claim_facts) for name, make in others.items()]
    return cells


def moved() -> list[Cell]:
    """B: a real change, in standard deviations; sessions from 3 to 4, 5 and 6 a week."""
    cells = []
    for m, n in SIZES[1:]:
        for family in (*CONTINUOUS, *HARDER):
            for move in MOVES:
                cells.append(
                    Cell("B", family.name, f"{m},{n} {move}", _of_family(family, m, n, move), claim_facts)
                )
        for a_week in (4, 5, 6):

            def make(rng: np.random.Generator, m: int = m, n: int = n, a_week: int = a_week) -> Case:
                values = np.r_[sessions(rng, m, 3, fixed=False), sessions(rng, n, a_week, fixed=False)]
                return Case(values, m, Measure("x", **SESSION_MEASURE))  # type: ignore[arg-type]

            cells.append(Cell("B", "3 a week, any days", f"{m},{n} to {a_week}", make, claim_facts))
    return cells


def oracle_of(row: str, column: str) -> float:
    """The share of claims the best test would make in a cell of B."""
    size, _, move = column.partition(" ")
    m, n = map(int, size.split(","))
    if move.startswith("to "):
        # Days a week are drawn without replacement, so that the test for two proportions is the plain one.
        p, q = 3 / 7, int(move[3:]) / 7
        pooled = (m * p + n * q) / (m + n)
        null, real = sqrt(pooled * (1 - pooled) * (1 / m + 1 / n)), sqrt(p * (1 - p) / m + q * (1 - q) / n)
        return float(norm.cdf((q - p - 1.959964 * null) / real))
    family = next(one for one in (*CONTINUOUS, *HARDER) if one.name == row)
    return family.oracle(m, n, float(move))


EARLY = 7
"""Days before the change on which an early move began."""


def ranges() -> list[Cell]:
    """C and D: whether the ranges of the shift and of the start hold the truth."""
    cells = []
    for m, n in SIZES:
        for family in (*CONTINUOUS, HARDER[0]):
            for move in (0.0, 1.0):

                def facts(case: Case, answer: Review, move: float = move) -> Iterable[str]:
                    found = answer.answer.shift
                    if found is not None and found.low <= move <= found.high:
                        yield "covers"

                column = f"{m},{n} {move}"
                cells.append(Cell("C", family.name, column, _of_family(family, m, n, move), facts))
    for m, n in SIZES[1:]:
        for family in (CONTINUOUS[0], CONTINUOUS[3], CONTINUOUS[4]):
            for move in (1.0, 1.5, 2.0):
                cells.append(
                    Cell("D", family.name, f"{m},{n} {move}", _of_family(family, m, n, move), _since_facts)
                )

            def early(rng: np.random.Generator, family: Family = family, m: int = m, n: int = n) -> Case:
                values = LEVEL + family.draw(rng, m + n)
                values[m - EARLY :] += 1.5
                return Case(values, m)

            cells.append(Cell("D", family.name, f"{m},{n} early", early, _since_early_facts))
    return cells


def _since_facts(case: Case, answer: Review, moved: int = 0) -> Iterable[str]:
    """Whether the range of the start holds the day it moved, so many days after the change."""
    since = answer.answer.since
    if since is None:
        return
    if since.first <= answer.stretches[1].first + moved <= since.last:
        yield "covers"
    if since.before_change:
        yield "before change"


def _since_early_facts(case: Case, answer: Review) -> Iterable[str]:
    return _since_facts(case, answer, -EARLY)


def luck() -> list[Cell]:
    """E: days outside, expected against counted, when nothing changed."""
    cells = []
    families = (CONTINUOUS[0], CONTINUOUS[3], CONTINUOUS[4], HARDER[2])
    for m in (7, 10, 14, 21, 28):
        for family in families:
            cells.append(Cell("E", family.name, str(m), _of_family(family, m, 28, 0.0), _outside_facts))
        cells.append(
            Cell(
                "E",
                "counts, mean 6",
                str(m),
                lambda rng, m=m: Case(poisson(rng, m + 28), m, Measure("x", kind="count")),
                _outside_facts,
            )
        )
    return cells


def _outside_facts(case: Case, answer: Review) -> Iterable[str]:
    carried_on = answer.answer.carried
    if carried_on is not None:
        yield "judged"
        yield from ["outside"] * (len(carried_on.below) + len(carried_on.above))
        # Counted in thousandths of a day, so that one counter holds it.
        yield from ["expected"] * round(1000 * carried_on.expected_by_luck)


SO_FAR = 7
LONGEST = 400
"""A forecast beyond so many days is no number: nobody waits for it."""


def forecasts() -> list[Cell]:
    """F: a week after a move of 1.5 standard deviations, days still needed to see one of that size."""
    cells = []
    for m in (14, 28):
        for family in (CONTINUOUS[0], CONTINUOUS[1], CONTINUOUS[3], CONTINUOUS[4], CONTINUOUS[6], HARDER[1]):
            measure = Measure("x", **family.measure)  # type: ignore[arg-type]

            def make(rng: np.random.Generator, family: Family = family, m: int = m, measure=measure) -> Case:  # type: ignore[no-untyped-def]
                values = family.log(rng, m, LONGEST, 1.5)
                return Case(values[: m + SO_FAR], m, measure, worth=1.5, later=values[m + SO_FAR :])

            cells.append(Cell("F", family.name, f"{m},{SO_FAR}", make, _forecast_facts))
    return cells


def _forecast_facts(case: Case, answer: Review) -> Iterable[str]:
    needed = answer.answer.still_needed
    assert needed is not None
    assert case.later is not None
    if needed.days is None or needed.days > LONGEST - SO_FAR:
        return
    yield "number"
    if needed.high is not None:
        yield "number and end"
    # So many logged days from now on.
    logged = np.cumsum(~np.isnan(case.later))
    days = int(np.searchsorted(logged, needed.days)) + 1 if needed.days else 0
    then = reviewed(replace(case, values=np.r_[case.values, case.later[:days]]))
    if is_claim(then) and then.answer.direction == "more":
        yield "right then"


def faded() -> list[Cell]:
    """G: moved for three weeks and then back, against a move that stays."""
    cells = []
    for m in (14, 28):
        for family in (CONTINUOUS[0], CONTINUOUS[3], CONTINUOUS[4]):

            def back(rng: np.random.Generator, family: Family = family, m: int = m) -> Case:
                values = LEVEL + family.draw(rng, m + 56)
                values[m : m + 21] += 1.5
                return Case(values, m)

            cells.append(Cell("G", family.name, f"{m} faded", back, _still_facts))
            cells.append(Cell("G", family.name, f"{m} steady", _of_family(family, m, 56, 1.5), _still_facts))
    return cells


def _still_facts(case: Case, answer: Review) -> Iterable[str]:
    still = answer.answer.still
    if still is not None:
        yield still.state


def traps() -> list[Cell]:
    """Logs made to look moved: slope, worst week, blanks on bad days, keen first week, wandering, device."""
    cells = []
    for m, n in SIZES:

        def slope(rng: np.random.Generator, m: int = m, n: int = n) -> Case:
            return Case(LEVEL + rng.standard_normal(m + n) + 0.05 * np.arange(m + n), m)

        def worst(rng: np.random.Generator, n: int = n) -> Case:
            days = LEVEL + rng.standard_normal(56 + n)
            weeks = [days[start : start + 7].mean() for start in range(0, 56, 7)]
            place = int(np.argmin(weeks)) * 7
            order = np.r_[np.delete(np.arange(56), np.s_[place : place + 7]), np.arange(place, place + 7)]
            return Case(np.r_[days[order], days[56:]], 56, Measure("x", aim="more"))

        def blanks(rng: np.random.Generator, m: int = m, n: int = n) -> Case:
            days = LEVEL + rng.standard_normal(m + n)
            bad = (np.arange(m + n) >= m) & (days < LEVEL + norm.ppf(1 / 3)) & (rng.random(m + n) < 0.5)
            return Case(np.where(bad, np.nan, days), m, Measure("x", aim="more"))

        def keen(rng: np.random.Generator, m: int = m, n: int = n) -> Case:
            days = 4 + rng.standard_normal(m + n)
            days[:7] *= 1.2
            return Case(days, m, Measure("x", aim="more"))

        def wander(rng: np.random.Generator, m: int = m, n: int = n) -> Case:
            return Case(LEVEL + rng.standard_normal(m + n) + np.cumsum(0.3 * rng.standard_normal(m + n)), m)

        for name, make in (
            ("steady slope", slope),
            ("worst week of eight first", worst),
            ("bad days unlogged after", blanks),
            ("keen first week", keen),
            ("wandering level", wander),
        ):
            cells.append(Cell("T", name, f"{m},{n}", make, _trap_facts))
    return cells


def _trap_facts(case: Case, answer: Review) -> Iterable[str]:
    yield from claim_facts(case, answer)
    values = case.values
    before, after = values[: case.change], values[case.change :]
    before, after = before[~np.isnan(before)], after[~np.isnan(after)]
    ranks = np.argsort(np.argsort(np.r_[before, after])) + 1
    u = ranks[len(before) :].sum() - len(after) * (len(after) + 1) / 2
    z = (u - len(before) * len(after) / 2) / sqrt(len(before) * len(after) * (len(before) + len(after) + 1) / 12)
    if abs(z) > 1.959964:
        yield "plain claim"


TABLES: Mapping[str, Callable[[], list[Cell]]] = {
    "A": unchanged,
    "B": moved,
    "CD": ranges,
    "E": luck,
    "F": forecasts,
    "G": faded,
    "T": traps,
}

Counts = dict[tuple[str, str, str], Counter[str]]
