"""The answer to a question about a log: frozen, plain, and the same in Python and in JSON.

Days are day numbers here and ``YYYY-MM-DD`` (the first day of their period) in JSON. None means that a thing does
not apply or was not computed.
"""

from __future__ import annotations

import math
from dataclasses import dataclass, fields, is_dataclass
from datetime import date
from typing import Literal

from analysis.log import Measure
from analysis.points import Points
from analysis.questions.did_it_move import Sureness
from analysis.questions.is_it_so_still import StillWord
from analysis.questions.steadier import SpreadWord

Direction = Literal["more", "less", "none"]


@dataclass(frozen=True)
class SetAsideRow:
    """A row of the table that came in which is in no number."""

    line: int
    reason: str


@dataclass(frozen=True)
class Rows:
    """What became of the rows a log was read from."""

    read: int = 0
    kept: int = 0
    set_aside: tuple[SetAsideRow, ...] = ()


@dataclass(frozen=True)
class Stretch:
    """The days between two changes, with their own fences.

    Attributes:
        name: the baseline, or a stretch after a change.
        label: the change's label; None for the baseline and for an after-stretch without a change.
        change: day of the change that begins it, or None.
        first, last: first day of its first and of its last period.
        observations, blank: periods with and without a value.
        median … upper_fourth: None when there is no observation.
        lower_fence … outer_upper_fence: None under five observations or without a spread.
        below, above: first days of the periods beyond its own inner fences.
    """

    name: Literal["baseline", "after"]
    label: str | None
    change: int | None
    first: int
    last: int
    observations: int
    blank: int
    median: float | None = None
    mean: float | None = None
    lower_fourth: float | None = None
    upper_fourth: float | None = None
    fourth_spread: float | None = None
    lower_fence: float | None = None
    upper_fence: float | None = None
    outer_lower_fence: float | None = None
    outer_upper_fence: float | None = None
    below: tuple[int, ...] = ()
    above: tuple[int, ...] = ()


@dataclass(frozen=True)
class Carried:
    """The baseline's fences carried over the days after.

    Attributes:
        below, above: first days of the periods outside.
        expected_by_luck: how many would be outside if nothing had changed.
        per_100_days: the same for 100 days.
    """

    below: tuple[int, ...]
    above: tuple[int, ...]
    expected_by_luck: float
    per_100_days: float


@dataclass(frozen=True)
class Shift:
    """By how much the level moved; after less before.

    Attributes:
        estimate, low, high: in the measure's unit, with a 95 % range.
        share_of_pairs, share_low, share_high: how often an after-day is higher than a before-day.
        better_days: after-days strictly beyond the old median, the way the aim (else the shift) points, or inside
            the range aimed at.
        days: observations after.
        control_median_p: two-sided chance by luck that so many days after lie on one side of the old median.
    """

    estimate: float
    low: float
    high: float
    share_of_pairs: float
    share_low: float
    share_high: float
    better_days: int
    days: int
    control_median_p: float


@dataclass(frozen=True)
class Luck:
    """How often a gap this big turns up if nothing changed: two-sided, and out of 100 logs."""

    p: float
    in_100: int


@dataclass(frozen=True)
class Since:
    """The likeliest first period of the new level, and the first and last that fit about as well."""

    likely: int
    first: int
    last: int
    before_change: bool


@dataclass(frozen=True)
class HowOften:
    """Days with more than nothing, out of days, before and after; the difference of shares with its range."""

    before: tuple[int, int]
    after: tuple[int, int]
    low: float
    high: float
    p: float | None = None


@dataclass(frozen=True)
class HowMuch:
    """The median of the days with more than nothing, before and after; their shift's range."""

    before: float
    after: float
    low: float
    high: float


@dataclass(frozen=True)
class WeekTotal:
    """The median of the totals of whole weeks, before and after; their shift's range; how many weeks."""

    before: float
    after: float
    low: float
    high: float
    weeks_before: int
    weeks_after: int


@dataclass(frozen=True)
class Goal:
    """Days inside the range aimed at, out of days, before and after; the difference of shares with its range."""

    before: tuple[int, int]
    after: tuple[int, int]
    low: float
    high: float


@dataclass(frozen=True)
class AtLevel:
    """Days at a level or beyond it, out of days, before and after; the difference of shares with its range.

    Attributes:
        level: in the measure's unit.
        beyond: which side of the level counts, the level itself included.
    """

    level: float
    beyond: Literal["or more", "or less"]
    before: tuple[int, int]
    after: tuple[int, int]
    low: float
    high: float


@dataclass(frozen=True)
class Still:
    """What became of the move, and the median of the last 14 periods."""

    state: StillWord
    last_14: float | None


@dataclass(frozen=True)
class SpreadChange:
    """Whether the days lie closer to their middle than before, and the chance by luck."""

    word: SpreadWord
    p: float


@dataclass(frozen=True)
class Slope:
    """Change a period inside each stretch, in the measure's unit; the chance by luck of the one before."""

    before: float | None
    after: float | None
    p_before: float | None


@dataclass(frozen=True)
class WeekdayRhythm:
    """The chance by luck of weekends' difference from weekdays, and whether it was taken off."""

    p: float
    used: bool


@dataclass(frozen=True)
class Switches:
    """With how many of the changes the level moved.

    Attributes:
        moved: changes whose own comparison, with the stretch before it, is a claim.
        of: changes with enough days on both sides for an answer.
        to_and_fro: each move is the other way from the move before it.
    """

    moved: int
    of: int
    to_and_fro: bool = False


@dataclass(frozen=True)
class Season:
    """Whether the usual place of each month in the year is taken off every number of the review."""

    taken_off: bool


@dataclass(frozen=True)
class StillNeeded:
    """Further logged days that would show a move of ``for_amount`` in 80 of 100 logs.

    Attributes:
        days: 0 = there are enough; None = no number is enough with this baseline.
        low, high: its range; None where not computed.
        for_amount: size of the move, in the measure's unit.
    """

    days: int | None
    low: int | None
    high: int | None
    for_amount: float


@dataclass(frozen=True)
class Doubt:
    """Something in this log that could explain the answer, or keep it from being one.

    Attributes:
        name: an id of the closed list in ``analysis.doubts``.
        fields: the numbers its sentence needs, by name.
        alters: whether the answer turns on it.
        sentence: in plain words, filled in by the wording.
    """

    name: str
    fields: tuple[tuple[str, float | str], ...]
    alters: bool
    sentence: str = ""


@dataclass(frozen=True)
class Answer:
    """One stretch compared with another: everything the four questions ask."""

    carried: Carried | None = None
    shift: Shift | None = None
    luck: Luck | None = None
    sureness: Sureness | None = None
    direction: Direction | None = None
    since: Since | None = None
    still: Still | None = None
    spread_change: SpreadChange | None = None
    slope: Slope | None = None
    how_often: HowOften | None = None
    how_much: HowMuch | None = None
    week_total: WeekTotal | None = None
    goal: Goal | None = None
    at_level: AtLevel | None = None
    carry_over: float | None = None
    weekday_rhythm: WeekdayRhythm | None = None
    season: Season | None = None
    bound: float | None = None
    still_needed: StillNeeded | None = None


@dataclass(frozen=True)
class Comparison:
    """The answer for one stretch of several, against the baseline or the stretch before it."""

    stretch: int
    against: Literal["baseline", "before"]
    answer: Answer


@dataclass(frozen=True)
class Review:
    """Everything the analysis has to say about a log.

    Attributes:
        measure: what the log is of, with the period the answer is in.
        stretches: the baseline first; empty for a log without any value.
        answer: the last stretch against the baseline.
        doubts: worst first.
        comparisons: every stretch after the baseline, when there is more than one.
        findings, caution: in plain words, filled in by the wording.
        rows: what became of the rows of the table, where one was read.
        today: day number of the last day looked at; None for a log without any value. Not part of the JSON.
        to_come: day numbers of changes marked for after ``today``; not part of the JSON.
        points: one observation a period, for the chart; not part of the JSON.
        worth_a_look: among many logs, whether this one is; None when reviewed alone. Not part of the JSON.
    """

    measure: Measure
    stretches: tuple[Stretch, ...]
    answer: Answer
    points: Points
    doubts: tuple[Doubt, ...] = ()
    today: int | None = None
    to_come: tuple[int, ...] = ()
    switches: Switches | None = None
    comparisons: tuple[Comparison, ...] = ()
    findings: tuple[str, ...] = ()
    caution: str = ""
    rows: Rows = Rows()
    worth_a_look: bool | None = None

    def to_json(self) -> dict[str, object]:
        """The answer as plain lists, dicts, numbers and texts; every key of the contract is there."""
        stretches = []
        for stretch in self.stretches:
            shown = _plain(stretch)
            shown["change"] = _day(stretch.change)
            stretches.append(shown | _days(stretch, "first", "last", "below", "above"))
        return {
            "measure": self.measure.title,
            "unit": self.measure.unit or None,
            "kind": self.measure.kind,
            "period": self.measure.period,
            "rows": _plain(self.rows),
            "stretches": stretches,
            **_answer_json(self.answer),
            "doubts": [
                {"name": doubt.name, "sentence": doubt.sentence, "alters": doubt.alters} for doubt in self.doubts
            ],
            "switches": {"with": self.switches.moved, "of": self.switches.of} if self.switches else None,
            "comparisons": [
                {"stretch": one.stretch, "against": one.against, **_answer_json(one.answer)}
                for one in self.comparisons
            ],
            "findings": list(self.findings),
            "caution": self.caution,
        }


def _answer_json(answer: Answer) -> dict[str, object]:
    shown = _plain(answer)
    if answer.carried is not None:
        shown["carried"] = _plain(answer.carried) | _days(answer.carried, "below", "above")
    if answer.since is not None:
        shown["since"] = _plain(answer.since) | _days(answer.since, "likely", "first", "last")
    return shown


def _plain(record: object) -> dict[str, object]:
    assert is_dataclass(record)
    return {one.name: _plain_value(getattr(record, one.name)) for one in fields(record)}


def _plain_value(value: object) -> object:
    if is_dataclass(value):
        return _plain(value)
    if isinstance(value, tuple):
        return [_plain_value(one) for one in value]
    if isinstance(value, float) and not math.isfinite(value):
        return None
    return value


def _days(record: object, *names: str) -> dict[str, object]:
    shown: dict[str, object] = {}
    for name in names:
        value = getattr(record, name)
        shown[name] = [_day(day) for day in value] if isinstance(value, tuple) else _day(value)
    return shown


def _day(day: int | None) -> str | None:
    return None if day is None else date.fromordinal(day).isoformat()
