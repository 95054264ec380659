"""The table of cautions: which line a value meets when it is kept, before and apart from any statistics."""

from __future__ import annotations

import json
import re
from collections.abc import Mapping
from dataclasses import dataclass, replace
from datetime import date, timedelta
from functools import cache
from typing import Any, Literal

from desktop.journal.journal import Journal
from desktop.journal.records import Measure
from desktop.resource_files import resource

Side = Literal["from", "to", "above", "below"]


@dataclass(frozen=True)
class CautionLine:
    """One line of the table.

    Attributes:
        kind: what the measure is, e.g. ``glucose``.
        words: which words are said.
        side: ``from`` is at or above, ``to`` at or below, ``above`` and ``below`` leave the limit itself out.
        limit: the number, by unit.
        source: where the line comes from.
        days: on how many of how many last days it must be met, or None.
        gain: over how many days a gain is looked at, or None where the value itself is.
        heart_failure: only for someone who said that they have heart failure.
    """

    kind: str
    words: str
    side: Side
    limit: Mapping[str, float]
    source: str
    days: tuple[int, int] | None = None
    gain: int | None = None
    heart_failure: bool = False


@dataclass(frozen=True)
class OwnCautions:
    """What a person settled for one measure.

    Attributes:
        off: nothing is said about this measure.
        low, high: their own limits, both still within; with either, no line of the table counts.
        heart_failure: they have heart failure.
        gain: the gain of weight their clinic named, over ``gain_days`` days.
        gain_days: the days of ``gain``.
        words: what their clinic said to do beyond their own limits, in its words.
    """

    off: bool = False
    low: float | None = None
    high: float | None = None
    heart_failure: bool = False
    gain: float | None = None
    gain_days: int = 1
    words: str = ""

    def with_limits_of(self, measure: Measure) -> OwnCautions:
        """The same with the limits that the journal holds, where it holds any."""
        if measure.limit_low is None and measure.limit_high is None:
            return self
        return replace(self, low=measure.limit_low, high=measure.limit_high, words=measure.limit_words)


@dataclass(frozen=True)
class Met:
    """A line that a value meets.

    Attributes:
        words: which words are said; ``own low``, ``own high`` and ``own gain`` are the person's own limits.
        limit: the number of the line.
        unit: of the number.
        days: over how many days, where it is a gain.
    """

    words: str
    limit: float
    unit: str
    days: int = 0


@cache
def _table() -> dict[str, Any]:
    table: dict[str, Any] = json.loads(resource("cautions.json").read_text("utf-8"))
    return table


@cache
def caution_lines() -> tuple[CautionLine, ...]:
    """Every line, the more pressing one of a kind and side first."""
    lines = (dict(line) for line in _table()["lines"])
    return tuple(
        CautionLine(**(line | {"days": tuple(line["days"]) if "days" in line else None})) for line in lines
    )


@cache
def emergency_numbers() -> tuple[tuple[str, str], ...]:
    """Region and emergency number; which one holds, only the person can say."""
    return tuple((one["region"], one["number"]) for one in _table()["numbers"])


def kind_and_unit(measure: Measure) -> tuple[str, str] | None:
    """What kind of the table a measure is, and in which of its units; None where it is none of them."""
    words = set(re.findall(r"[a-z0-9]+", measure.title.casefold()))
    written = measure.unit.strip().casefold()
    for kind in _table()["kinds"]:
        if words & set(kind["words"]):
            for unit, spellings in kind["units"].items():
                if written in spellings:
                    return kind["kind"], unit
    return None


def line_met(journal: Journal, measure: int, day: date, slot: str, own: OwnCautions) -> Met | None:
    """The line that a value just kept meets; a value that is set aside is looked at like any other.

    Args:
        journal: with the value in it.
        measure: its id.
        day: the day it is about.
        slot: its part of the day.
        own: what the person settled for this measure.

    Raises:
        KeyError: no such measure.
    """
    record = journal.measures[measure]
    entry = journal.entry(measure, day, slot)
    if own.off or entry is None or entry.value is None:
        return None
    value = entry.value
    if own.high is not None or own.low is not None:
        if own.high is not None and value > own.high:
            return Met("own high", own.high, record.unit)
        return Met("own low", own.low, record.unit) if own.low is not None and value < own.low else None
    if own.heart_failure and own.gain is not None:
        gained = _gain(journal, measure, day, value, own.gain_days)
        is_met = gained is not None and _is_met(gained, own.gain, "from")
        return Met("own gain", own.gain, record.unit, own.gain_days) if is_met else None
    found = kind_and_unit(record)
    if found is None:
        return None
    kind, unit = found
    for line in caution_lines():
        applies = line.kind == kind and (own.heart_failure or not line.heart_failure)
        if applies and _line_is_met(line, journal, measure, day, value, unit):
            return Met(line.words, line.limit[unit], unit, line.gain or 0)
    return None


def _line_is_met(line: CautionLine, journal: Journal, measure: int, day: date, value: float, unit: str) -> bool:
    limit = line.limit[unit]
    if line.gain is not None:
        gained = _gain(journal, measure, day, value, line.gain)
        return gained is not None and _is_met(gained, limit, line.side)
    if not _is_met(value, limit, line.side):
        return False
    if line.days is None:
        return True
    often, last = line.days
    entries = journal.entries[measure].values()
    recent = [one for one in entries if one.value is not None and day - timedelta(last) < one.day <= day]
    met = {one.day for one in recent if one.value is not None and _is_met(one.value, limit, line.side)}
    return len(met) >= often


def _is_met(value: float, limit: float, side: Side) -> bool:
    # A gain is a difference, whose last digits are not those that were typed.
    value = round(value, 6)
    match side:
        case "from":
            return value >= limit
        case "to":
            return value <= limit
        case "above":
            return value > limit
        case "below":
            return value < limit


def _gain(journal: Journal, measure: int, day: date, value: float, days: int) -> float | None:
    """The gain over the lowest value of the days before, as many as are given; None without any."""
    entries = journal.entries[measure].values()
    before = [one.value for one in entries if one.value is not None and day - timedelta(days) <= one.day < day]
    return value - min(before) if before else None
