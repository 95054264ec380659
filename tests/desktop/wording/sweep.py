"""A broad sweep of reviews: every kind of measure, period, aim and length, and a log for each doubt."""

from __future__ import annotations

from collections.abc import Iterator
from datetime import date, timedelta
from functools import cache

import numpy as np

from analysis import Change, Log, Measure, Review, review
from analysis.log import Span
from tests.builders import FIRST_DAY, day, log_of, number, reviewed

UNITS = {"amount": "minutes", "count": "steps", "reading": "mmHg", "score": "points", "yes/no": ""}
MEASURES = [
    Measure("Exercise", "minutes", "amount", missed="zero", aim="more"),
    Measure("Exercise", "minutes", "amount", aim="less"),
    Measure("Steps", "steps", "count"),
    Measure("Upper pressure", "mmHg", "reading", aim="less"),
    Measure("Weight", "kg", "reading", aim=(60.0, 70.0)),
    Measure("Balance", "", "reading"),
    Measure("Pain", "points", "score", aim="less"),
    Measure("Took a walk", "", "yes/no", aim="more"),
]
LENGTHS = [(0, 5), (1, 1), (5, 2), (6, 9), (7, 4), (9, 1), (10, 10), (14, 14), (21, 30), (40, 28), (90, 60)]


@cache
def sweep() -> tuple[Review, ...]:
    """Every review of the sweep; the same ones each time."""
    return (*_made_by_lot(), *(doubted() for doubted in DOUBTED.values()), *_long_ones(), *_without_a_change())


def drawn(rng: np.random.Generator, measure: Measure, days: int, moved: float) -> list[float | None]:
    """Invented days of a measure; ``moved`` in day-to-day standard deviations."""
    noise = rng.normal(moved, 1, days)
    if measure.kind == "yes/no":
        values = (noise > 0.3).astype(float)
    elif measure.kind == "score":
        values = np.clip(np.round(5 + 2 * noise), 0, 10)
    elif measure.kind in ("amount", "count"):
        values = np.clip(np.round(20 + 12 * noise), 0, None) * (rng.random(days) > 0.2)
    else:
        values = np.round(65 + 3 * noise, 1) if measure.unit else np.round(noise * 4, 2)
    return [None if rng.random() < 0.08 else float(value) for value in values]


def _made_by_lot() -> Iterator[Review]:
    rng = np.random.default_rng(20310303)
    for measure in MEASURES:
        for before, after in LENGTHS:
            for moved in (0.0, 0.7, -2.5):
                values = drawn(rng, measure, before, 0.0) + drawn(rng, measure, after, moved)
                log = Log.from_pairs([(day(place), value) for place, value in enumerate(values)], measure)
                marked = Change(day(before), "off the bus one stop early", int(rng.integers(0, 3)))
                yield review(log, [marked], worth=float(rng.choice([0.0, 5.0])) or None)


def _long_ones() -> Iterator[Review]:
    rng = np.random.default_rng(5)
    for period in ("week", "month", "year"):
        for kind, missed in (("amount", "zero"), ("reading", "blank")):
            for years, moved in ((1, 4), (8, 0), (30, 4)):
                days = 365 * years
                values = np.round(40 + 8 * rng.normal(size=days) + moved * (np.arange(days) > days / 2))
                pairs = [(FIRST_DAY + timedelta(place), float(value)) for place, value in enumerate(values)]
                measure = Measure("Sleep", "minutes", kind, period, missed)
                yield review(Log.from_pairs(pairs, measure), [Change(day(days // 2), "moved house")])


def _without_a_change() -> Iterator[Review]:
    rng = np.random.default_rng(6)
    for measure in MEASURES:
        for days in (0, 1, 4, 6, 7, 15, 60):
            values = drawn(rng, measure, days, 0.0)
            odd = [400.0, -300.0] if measure.kind == "reading" else [400.0] * 4
            for one in (values, values + odd, sorted(value for value in values if value is not None)):
                yield review(Log.from_pairs([(day(place), value) for place, value in enumerate(one)], measure))


LOW, HIGH = [20, 25, 19, 30, 15, 11, 22, 24, 18, 31, 12, 17, 26, 21], [38, 41, 35, 44, 29, 33, 47, 40, 36, 52]
BEFORE_ODD = [17, 23, 18, 24, 16, 24, 20, 15, 19, 20, 21, 16, 16, 21, 18, 21, 23, 13, 21, 25]
AFTER_ODD = [20, 18, 25, 23, 90, 20, 16, 92, 91, 25, 22, 15, 17, 25, 24, 93, 21, 23, 23, 25]
LONG_LOW = [LOW[(place * 5) % 14] for place in range(42)]


def _with_kinds(
    values: list[float], kinds: dict[int, str], spans: list[Span] | None = None, **more: object
) -> Review:
    names = [kinds.get(place, "value") for place in range(len(values))]
    days = [number(place) for place in range(len(values))]
    log = Log.from_columns(Measure("Exercise", "minutes", "amount"), days, values, names, spans=spans or [])
    return review(log, [Change(day(14), "stairs")], **more)


def _two_changes(first: int, second: int) -> Review:
    log = Log.from_pairs([(day(place), value) for place, value in enumerate(LOW + HIGH)], Measure(unit="minutes"))
    return review(log, [Change(day(first), "stairs"), Change(day(second), "no coffee")])


def _on_weekdays_before() -> Review:
    values = [value if day(place).weekday() < 5 else None for place, value in enumerate(LOW * 2)]
    return reviewed(values + HIGH * 2, 28, unit="minutes")


def _first_week_high() -> Review:
    return reviewed([60, 58, 62, 59, 61, 63, 57, *LONG_LOW[:28], *HIGH], 35, unit="minutes")


def _season_apart() -> Review:
    log = [(day(place), LOW[place % 14]) for place in range(60)]
    log += [(day(200 + place), HIGH[place % 10]) for place in range(60)]
    return review(Log.from_pairs(log), [Change(day(200), "stairs")], (FIRST_DAY, date(2031, 5, 1)))


def _evenings_stop() -> Review:
    pairs = [(day(place), 120 + place % 5, "morning") for place in range(28)]
    pairs += [(day(place), 131 + place % 7, "evening") for place in range(14)]
    return review(Log.from_pairs(pairs), [Change(day(14), "stairs")])


def _carried_over() -> Review:
    rng = np.random.default_rng(3)
    row = [0.0]
    for _ in range(59):
        row.append(0.75 * row[-1] + float(rng.normal()))
    return reviewed([round(value + (place >= 30) * 1.6, 1) for place, value in enumerate(row)], 30)


def _looked_at(**how: object) -> Review:
    return review(log_of(LOW + [value + 6 for value in LOW], unit="minutes"), [Change(day(14), "stairs")], **how)


DOUBTED = {
    "few_days": lambda: reviewed(LOW[:5] + HIGH[:2], 5, unit="minutes"),
    "no_spread": lambda: reviewed([5] * 14 + [6] * 14, 14, unit="minutes"),
    "device_mark": lambda: _with_kinds(LOW + HIGH, {}, [Span(day(14), day(23), "device", "new watch")]),
    "slope_before": lambda: reviewed(
        [10 + place + LOW[place % 14] / 6 for place in range(42)], 21, unit="minutes"
    ),
    "worst_spell": lambda: reviewed([*LONG_LOW, *[6, 4, 7, 5, 3, 6, 5], *HIGH], 49, kind="amount", aim="more"),
    "first_days": _first_week_high,
    "odd_day": lambda: reviewed(BEFORE_ODD + AFTER_ODD, 20, unit="minutes"),
    "missing_more": lambda: reviewed(
        [*LOW, 38, None, None, None, 35, None, None, 44, None, None, 39, None, 41], 14
    ),
    "no_zero": lambda: reviewed(
        [value if place % 2 else None for place, value in enumerate(LOW * 2 + HIGH)], 28, kind="amount"
    ),
    "other_slots": _evenings_stop,
    "late_entries": lambda: _with_kinds(LOW + HIGH, dict.fromkeys(range(3, 10), "late")),
    "weekdays_only": _on_weekdays_before,
    "early_look": lambda: _looked_at(look_day=day(40)),
    "several_measures": lambda: _looked_at(others=(0.3, 0.6, 0.04)),
    "close_change": lambda: _two_changes(14, 18),
    "several_changes": lambda: _two_changes(14, 14),
    "equal_in_row": lambda: reviewed(LOW + [30] * 6 + HIGH, 14, unit="minutes"),
    "season": _season_apart,
    "day_to_day": _carried_over,
    "blank_days": lambda: reviewed(
        [value if place % 2 else None for place, value in enumerate(LOW * 2 + HIGH)], 28
    ),
    "round_numbers": lambda: reviewed([round(value, -1) for value in LOW * 2 + HIGH], 28, unit="minutes"),
    "no_low_day": lambda: reviewed(
        [5, 30, 12, 44, 2, 60, 25, 18, 9, 33, 50, 41, 7, 21], 8, kind="amount", aim="less"
    ),
}
"""For each doubt of the catalogue, by its id, a log that gives reason for it."""
