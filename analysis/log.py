"""The nouns of the analysis: a log, the measure it is of, and what is marked on it.

A day is an integer day number, ``datetime.date.toordinal()``: no clock and no time zone anywhere.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field, replace
from datetime import date
from typing import Literal, get_args

import numpy as np
from numpy.typing import NDArray

from analysis.errors import AnalysisError

MeasureKind = Literal["amount", "count", "reading", "score", "yes/no"]
Period = Literal["day", "week", "month", "year"]
Missed = Literal["zero", "blank"]
Combine = Literal["sum", "mean", "median", "first", "last", "max", "min"]
DayKind = Literal["value", "zero", "blank", "rest", "ill", "away", "set aside", "late", "extra"]
Aim = Literal["more", "less", "none"] | tuple[float, float]
"""What the person wants of the measure; a pair is the range they want to stay within, both ends included."""

PERIODS: tuple[Period, ...] = get_args(Period)
DAY_KINDS: tuple[DayKind, ...] = get_args(DayKind)
COUNTED_KINDS: frozenset[str] = frozenset({"value", "zero", "late"})
"""Kinds of day whose value is in the numbers."""

Days = NDArray[np.int64]
Values = NDArray[np.float64]


@dataclass(frozen=True)
class Measure:
    """One column of a log: what is measured and how its days are to be read.

    Attributes:
        title: the person's own name for it.
        unit: the unit of every value, or ``""``.
        kind: what sort of number it is.
        period: what one observation stands for in the answer.
        missed: whether a day without an entry counts as zero or stays unknown.
        combine: how several values of one period become one; None takes the rule of the kind.
        aim: which way the person wants it to go.
        week_start: first day of a week, 0 = Monday … 6 = Sunday.
    """

    title: str = ""
    unit: str = ""
    kind: MeasureKind = "reading"
    period: Period = "day"
    missed: Missed = "blank"
    combine: Combine | None = None
    aim: Aim = "none"
    week_start: int = 0

    def __post_init__(self) -> None:
        """Refuse a measure that contradicts itself.

        Raises:
            AnalysisError: an unknown word, or a range whose ends are the wrong way round.
        """
        for name, value, allowed in (
            ("kind", self.kind, get_args(MeasureKind)),
            ("period", self.period, PERIODS),
            ("missed", self.missed, get_args(Missed)),
            ("combine", self.combine, (None, *get_args(Combine))),
        ):
            if value not in allowed:
                raise AnalysisError("unknown_word", field=name, value=value, allowed=allowed)
        if isinstance(self.aim, tuple):
            low, high = self.aim
            if not low <= high:
                raise AnalysisError("aim_backwards", low=low, high=high)
        elif self.aim not in ("more", "less", "none"):
            raise AnalysisError("unknown_word", field="aim", value=self.aim, allowed=("more", "less", "none"))

    @property
    def combine_rule(self) -> Combine:
        """How several values of one period become one, the default of the kind filled in."""
        if self.combine is not None:
            return self.combine
        return "sum" if self.kind in ("amount", "count") else "mean"


@dataclass(frozen=True)
class Change:
    """A dated, labelled change: its day is the first day of the new stretch.

    Attributes:
        day: day the change was made.
        label: the person's words for it.
        settle_days: days from ``day`` on that are in no number (1 leaves just the change day out).
    """

    day: date
    label: str = ""
    settle_days: int = 0

    def __post_init__(self) -> None:
        """Refuse a negative settling-in.

        Raises:
            AnalysisError: ``settle_days`` is negative.
        """
        if self.settle_days < 0:
            raise AnalysisError("settle_negative", settle_days=self.settle_days)


@dataclass(frozen=True)
class Span:
    """Named days, both ends included: ``kind`` is ``ill``, ``away``, ``device`` or ``other``."""

    first: date
    last: date
    kind: str = "other"
    label: str = ""


@dataclass(frozen=True, eq=False)
class Log:
    """Everything written down for one measure, in order of day and slot.

    Attributes:
        measure: what the values are of.
        days: day numbers, shape (n,), ascending; several entries a day are allowed.
        values: shape (n,), NaN where the entry holds no value.
        kinds: the kind of day of each entry, length n.
        slots: the time-of-day slot of each entry (``""`` for the whole day), length n.
        spans: named days that concern the measure.
    """

    measure: Measure
    days: Days
    values: Values
    kinds: tuple[DayKind, ...]
    slots: tuple[str, ...]
    spans: tuple[Span, ...] = field(default=())

    def __post_init__(self) -> None:
        """Refuse arrays of different lengths and kinds of day that do not exist.

        Raises:
            AnalysisError: lengths differ, or a kind is unknown.
        """
        lengths = {len(self.days), len(self.values), len(self.kinds), len(self.slots)}
        if len(lengths) != 1:
            raise AnalysisError("lengths_differ", lengths=sorted(lengths))
        unknown = set(self.kinds) - set(DAY_KINDS)
        if unknown:
            raise AnalysisError("unknown_word", field="kind of day", value=min(unknown), allowed=DAY_KINDS)

    def __len__(self) -> int:
        return len(self.days)

    @classmethod
    def from_pairs(
        cls,
        pairs: Iterable[tuple[date, float | None] | tuple[date, float | None, str]],
        measure: Measure | None = None,
    ) -> Log:
        """Build a log from ``(day, value)`` or ``(day, value, slot)`` in any order.

        Args:
            pairs: None, NaN and infinite values are blank days; several entries a day are allowed.
            measure: what the values are of; a plain daily reading when left out.
        """
        rows = [(pair[0].toordinal(), pair[1], pair[2] if len(pair) == 3 else "") for pair in pairs]
        kinds: list[DayKind] = []
        values: list[float] = []
        for _, value, _ in rows:
            known = value is not None and bool(np.isfinite(value))
            values.append(float(value) if value is not None and known else float("nan"))
            kinds.append("value" if known else "blank")
        return cls.from_columns(
            measure or Measure(), [row[0] for row in rows], values, kinds, [row[2] for row in rows]
        )

    @classmethod
    def from_columns(
        cls,
        measure: Measure,
        days: Iterable[int],
        values: Iterable[float],
        kinds: Iterable[DayKind],
        slots: Iterable[str] | None = None,
        spans: Iterable[Span] = (),
    ) -> Log:
        """Build a log from columns in any order of day.

        Args:
            measure: what the values are of.
            days: day numbers.
            values: NaN where an entry holds no value.
            kinds: the kind of day of each entry.
            slots: time-of-day slots; the whole day when left out.
            spans: named days.

        Raises:
            AnalysisError: the columns differ in length, or a kind is unknown.
        """
        day_array = np.asarray(list(days), dtype=np.int64)
        value_array = np.asarray(list(values), dtype=np.float64)
        kind_list = list(kinds)
        slot_list = [""] * len(day_array) if slots is None else list(slots)
        if not len(day_array) == len(value_array) == len(kind_list) == len(slot_list):
            lengths = sorted({len(day_array), len(value_array), len(kind_list), len(slot_list)})
            raise AnalysisError("lengths_differ", lengths=lengths)
        order = np.argsort(day_array, kind="stable")
        if any(slot_list):
            order = np.array(sorted(order.tolist(), key=lambda i: (day_array[i], slot_list[i])), dtype=np.int64)
        return cls(
            measure,
            day_array[order],
            value_array[order],
            tuple(kind_list[i] for i in order),
            tuple(slot_list[i] for i in order),
            tuple(spans),
        )

    def measured_as(self, **changes: object) -> Log:
        """The same entries under a measure with some fields changed."""
        return replace(self, measure=replace(self.measure, **changes))  # type: ignore[arg-type]
