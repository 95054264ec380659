"""What the chart draws, from a review: places, shapes and words, and nothing about ink or Qt."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from datetime import date
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from analysis.answer import Review, Stretch
from analysis.batch.fences import FEWEST_TO_DRAW
from analysis.points import Points
from analysis.questions.did_it_move import CLAIMS
from desktop.chart.pieces import (
    SHAPES,
    Band,
    Bracket,
    EndLabel,
    LanePart,
    Line,
    Marks,
    Picture,
    Side,
    Tick,
    TickKind,
)
from desktop.chart.spoken import Spoken
from desktop.journal.journal import Journal
from desktop.journal.records import Measure
from desktop.wording.chart_key import left_out_sentence
from desktop.wording.days import DayWords, long_day
from desktop.wording.findings import findings_of
from desktop.wording.numbers import Speech, count
from desktop.wording.telling import day_words_of, speech_of

_ROOM = 0.06
"""Empty part above and below the days, of their range."""

_FENCE_REACH = 0.3
"""A fence no further beyond the days than this part of their range is drawn; beyond, it is told in words."""

_EDGE_ROOM = 0.09
"""Room for a line of words at the upper edge, of the values' range."""

_MOST_LABELS = 40

_SOON = 7
"""A change not further beyond the last day than so many days is on the chart."""


def picture_of(review: Review, journal: Journal, measure: int) -> Picture:
    """The picture of a review.

    Args:
        review: the answer to draw.
        journal: for named days, kinds of day and set-aside values.
        measure: the measure's id in the journal.
    """
    return _Composer(review, journal, measure).compose()


def empty_picture(measure: Measure | None, today: date) -> Picture:
    """A chart without any day, as a new log has it."""
    none = np.empty(0)
    marks = Marks(none, none, none.astype(np.int8), none.astype(bool), none.astype(bool), {}, ())
    unit = (measure.unit or measure.title) if measure else ""
    end = float(today.toordinal())
    return Picture(
        "day", end - 27.5, end + 0.5, 0.0, 10.0, ("", unit, ""), marks, told="There is no value in this log yet."
    )


class _Composer:
    def __init__(self, review: Review, journal: Journal, measure: int) -> None:
        self.review = review
        self.points: Points = review.points
        self.speech: Speech = speech_of(review)
        self.days: DayWords = day_words_of(review)
        self.journal = journal
        self.measure = measure
        self.entries = list(journal.entries.get(measure, {}).values())
        self.stretches = review.stretches
        self.last_day = float(self.points.last[-1]) + 0.5
        self.first_day = float(self.points.first[0]) - 0.5
        # Marked, and no day followed yet: it is to be seen at once, beyond the last day.
        ends = float(self.points.last[-1])
        self.next_changes = [
            one.day.toordinal()
            for one in journal.changes_of(measure)
            if ends < one.day.toordinal() <= ends + _SOON and self.points.period == "day"
        ]

    def compose(self) -> Picture:
        marks = self._marks()
        left_out = self._left_out(marks)
        low, high = self._value_range(marks.y)
        bands, lines, labels, edge_words = self._levels(low, high)
        if words_above := sum(edge == "above" for edge, _ in edge_words):
            # They get room of their own, so that no mark stands in them; a fence that it holds is drawn after all.
            high += (high - low) * _EDGE_ROOM * words_above
            bands, lines, labels, edge_words = self._levels(low, high)
        return Picture(
            period=self.points.period,
            x0=self.first_day,
            x1=max([self.last_day, *(one + 0.5 for one in self.next_changes)]),
            y0=low,
            y1=high,
            axis_words=self._axis_words(),
            marks=marks,
            bands=tuple(bands),
            lines=tuple(lines),
            end_labels=tuple(labels),
            lane=tuple(self._lane()),
            uprights=tuple(
                one - 0.5
                for one in (*(one.change for one in self.stretches if one.change is not None), *self.next_changes)
            ),
            ticks=tuple(self._ticks()),
            bracket=self._bracket(),
            edge_words=tuple(edge_words),
            left_out=left_out,
            told=f"{self._told()} {left_out}".strip(),
        )

    def _marks(self) -> Marks:
        known = self.points.known
        starts, values = self.points.first[known], self.points.values[known]
        x = (starts + self.points.last[known]) / 2
        shape = np.full(len(x), SHAPES.index("uncounted"), dtype=np.int8)
        for place, stretch in enumerate(self.stretches):
            if stretch.observations:
                inside = (starts >= stretch.first) & (starts <= stretch.last)
                shape[inside] = SHAPES.index("after" if place else "before")
        above, below = self._outside()
        shape[np.isin(starts, above)] = SHAPES.index("above")
        shape[np.isin(starts, below)] = SHAPES.index("below")
        is_zero = (values == 0) & (self.review.measure.kind in ("amount", "count"))
        places = np.flatnonzero(known)
        joined = np.r_[False, np.diff(places) == 1] if len(places) else np.empty(0, dtype=bool)
        outside = np.flatnonzero(shape >= SHAPES.index("above"))
        labels = {}
        if len(outside) <= _MOST_LABELS:
            labels = {
                int(at): self.speech.number(float(values[at]))
                for at in outside
                if values[at] != 0 or not is_zero[at]
            }

        def tell(place: int) -> str:
            if place < len(starts):
                return self._spoken(int(starts[place]), float(values[place]), int(shape[place]))
            return self._spoken_aside(*aside[place - len(starts)])

        aside = [(entry.day.toordinal(), entry.value) for entry in self.entries if entry.kind == "set aside"]
        if aside and self.points.period == "day":
            x = np.r_[x, [float(day) for day, _ in aside]]
            values = np.r_[values, [float(value or 0.0) for _, value in aside]]
            shape = np.r_[shape, np.full(len(aside), SHAPES.index("set aside"), dtype=np.int8)]
            is_zero = np.r_[is_zero, np.zeros(len(aside), dtype=bool)]
            joined = np.r_[joined, np.zeros(len(aside), dtype=bool)]
        return Marks(x, values, shape, is_zero, joined, labels, Spoken(len(x), tell))

    def _left_out(self, marks: Marks) -> str:
        """The periods that the ends of the log, or a change inside them, cut."""
        if self.points.period == "day":
            return ""
        known = self.points.known
        starts, ends = self.points.first[known], self.points.last[known]
        uncounted = marks.shape == SHAPES.index("uncounted")
        cut = np.zeros(len(starts), dtype=bool)
        cut[[0, -1]] = True
        for stretch in self.stretches:
            if stretch.change is not None:
                cut |= (starts < stretch.change) & (stretch.change <= ends)
        return left_out_sentence([self.days.name(int(start)) for start in starts[cut & uncounted]])

    def _outside(self) -> tuple[Sequence[int], Sequence[int]]:
        """Days beyond the baseline's fences: its own, and the days after beyond the carried ones."""
        baseline, carried = self.stretches[0], self.review.answer.carried
        if carried is None or not _draws_fences(baseline):
            drawn = _draws_fences(baseline) and len(self.stretches) == 1
            return (baseline.above, baseline.below) if drawn else ((), ())
        above, below = list(baseline.above), list(baseline.below)
        for one in self.review.comparisons or ():
            if one.against == "baseline" and one.answer.carried is not None:
                above += one.answer.carried.above
                below += one.answer.carried.below
        return [*above, *carried.above], [*below, *carried.below]

    def _value_range(self, values: NDArray[np.float64]) -> tuple[float, float]:
        low, high = float(np.min(values)), float(np.max(values))
        from_zero = self.review.measure.kind in ("amount", "count", "score", "yes/no") and low >= 0
        if from_zero:
            low = 0.0
        reach = (high - low) * _FENCE_REACH
        baseline = self.stretches[0]
        if _draws_fences(baseline):
            assert baseline.lower_fence is not None
            assert baseline.upper_fence is not None
            if baseline.upper_fence <= high + reach:
                high = max(high, baseline.upper_fence)
            if baseline.lower_fence >= low - reach and not from_zero:
                low = min(low, baseline.lower_fence)
        if low == high:
            low, high = (0.0, max(1.0, high)) if from_zero else (low - 1, high + 1)
        room = (high - low) * _ROOM
        # Below zero there is only room for the marks that stand on it.
        return (low - room / 3 if from_zero else low - room), high + room

    def _levels(
        self, low: float, high: float
    ) -> tuple[list[Band], list[Line], list[EndLabel], list[tuple[Literal["above", "below"], str]]]:
        bands: list[Band] = []
        lines: list[Line] = []
        labels: list[EndLabel] = []
        edge_words: list[tuple[Literal["above", "below"], str]] = []
        for place, stretch in enumerate(self.stretches):
            if stretch.median is None or stretch.lower_fourth is None or stretch.upper_fourth is None:
                continue
            if stretch.observations < FEWEST_TO_DRAW:
                continue
            side: Side = "after" if place else "before"
            x0, x1 = self._edges(stretch)
            bands.append(Band(x0, x1, stretch.lower_fourth, stretch.upper_fourth, side, inner=True))
            lines.append(Line(x0, x1, stretch.median, side, "median"))
            if place == len(self.stretches) - 1:
                labels.append(self._end_label("middle", stretch.median, side, strong=True))
            if stretch.lower_fence is None or stretch.upper_fence is None:
                continue
            bottom, top = max(stretch.lower_fence, low), min(stretch.upper_fence, high)
            bands.append(Band(x0, x1, bottom, top, side, inner=False))
            for fence in (stretch.lower_fence, stretch.upper_fence):
                if low <= fence <= high:
                    lines.append(Line(x0, x1, fence, side, "fence"))
            edge_words += self._beyond(stretch, low, high, side)
        self._carry_on(lines, labels, low, high)
        return bands, lines, labels, edge_words

    def _carry_on(self, lines: list[Line], labels: list[EndLabel], low: float, high: float) -> None:
        """The baseline's fences and median over the days after it, or their labels where it is alone."""
        baseline = self.stretches[0]
        if baseline.observations < FEWEST_TO_DRAW or baseline.median is None:
            return
        is_alone = len(self.stretches) == 1
        _, x0 = self._edges(baseline)
        if not is_alone:
            lines.append(Line(x0, self.last_day, baseline.median, "before", "carried median"))
            labels.append(self._end_label("was", baseline.median, "before"))
        for fence in (baseline.lower_fence, baseline.upper_fence):
            if fence is None or not low <= fence <= high:
                continue
            if not is_alone:
                lines.append(Line(x0, self.last_day, fence, "before", "carried fence"))
            labels.append(self._end_label("fence", fence, "before"))

    def _end_label(self, word: str, y: float, side: Side, *, strong: bool = False) -> EndLabel:
        number = self.speech.number(y)
        return EndLabel(y, f"{word} {number}", number, side, strong)

    def _beyond(
        self, stretch: Stretch, low: float, high: float, side: Side
    ) -> Iterable[tuple[Literal["above", "below"], str]]:
        whose = "own" if side == "after" else "old" if len(self.stretches) > 1 else "the"
        assert stretch.upper_fence is not None
        assert stretch.lower_fence is not None
        if stretch.upper_fence > high:
            yield "above", f"{whose} upper fence {self.speech.number(stretch.upper_fence)}, above this picture"
        cannot_be_below = self.review.measure.kind != "reading" and stretch.lower_fence < 0
        if stretch.lower_fence < low and not cannot_be_below:
            yield "below", f"{whose} lower fence {self.speech.number(stretch.lower_fence)}, below this picture"

    def _edges(self, stretch: Stretch) -> tuple[float, float]:
        """Left and right edge of a stretch: to the next change, so that neighbours meet."""
        last = self.points.last[np.searchsorted(self.points.first, stretch.last, side="right") - 1]
        return float(stretch.first) - 0.5, float(last) + 0.5

    def _lane(self) -> Iterable[LanePart]:
        for place, stretch in enumerate(self.stretches):
            x0, x1 = float(stretch.first) - 0.5, float(stretch.last) + 0.5
            if place + 1 < len(self.stretches):
                following = self.stretches[place + 1]
                x1 = float(following.change if following.change is not None else following.first) - 0.5
            else:
                x1 = self.last_day
            if place == 0:
                held = self.speech.periods(stretch.observations)
                yield LanePart(x0, x1, f"baseline, {held}" if len(self.stretches) > 1 else held, "stretch")
                continue
            begins = float(stretch.change) - 0.5 if stretch.change is not None else x0
            if stretch.change is not None and stretch.first > stretch.change:
                yield LanePart(begins, min(x0, self.last_day), "settling in", "settling in")
            yield LanePart(begins, max(x1, begins), stretch.label or "after", "change")
        for change in self.journal.changes_of(self.measure):
            day = change.day.toordinal()
            if day in self.next_changes:
                yield LanePart(day - 0.5, day + 0.5, change.label or "after", "change")
        for span in self.journal.spans_of(self.measure):
            yield LanePart(
                span.first.toordinal() - 0.5, span.last.toordinal() + 0.5, span.label or span.kind, "span"
            )

    def _ticks(self) -> Iterable[Tick]:
        """Days that are not in the numbers or came late; blanks too while there is room for single days."""
        kinds: dict[str, TickKind] = {"ill": "ill", "away": "away", "late": "late"}
        for entry in self.entries:
            if entry.kind in kinds:
                yield Tick(float(entry.day.toordinal()), kinds[entry.kind])
        if self.points.period == "day":
            said = {entry.day.toordinal() for entry in self.entries if entry.kind != "blank"}
            for day in self.points.first[~self.points.known].tolist():
                if day not in said:
                    yield Tick(float(day), "blank")

    def _bracket(self) -> Bracket | None:
        since, sureness = self.review.answer.since, self.review.answer.sureness
        if since is None or sureness not in (*CLAIMS, "leaning"):
            return None
        last = self.points.last[np.searchsorted(self.points.first, since.last)]
        return Bracket(since.first - 0.5, float(last) + 0.5, "began about here")

    def _axis_words(self) -> tuple[str, str, str]:
        measure = self.review.measure
        season = self.review.answer.season
        taken_off = ", time of year taken off" if season is not None and season.taken_off else ""
        return self.speech.way(-1), (measure.unit or measure.title) + taken_off, self.speech.way(1)

    def _spoken(self, start: int, value: float, shape: int) -> str:
        where = {"above": "above the upper fence", "below": "below the lower fence"}.get(SHAPES[shape], "")
        at = date.fromordinal(start)
        name = long_day(at) if self.points.period == "day" else self.days.name(start)
        said = f"{name[0].upper()}{name[1:]}: {self.speech.with_unit(value)}"
        if not where:
            return f"{said}."
        baseline = self.stretches[0]
        fence = baseline.upper_fence if SHAPES[shape] == "above" else baseline.lower_fence
        return f"{said}, {where} of {self.speech.number(fence)}." if fence is not None else f"{said}."

    def _spoken_aside(self, day: int, value: float | None) -> str:
        said = "" if value is None else f" {self.speech.with_unit(value)},"
        return f"{long_day(date.fromordinal(day))}:{said} set aside, not counted."

    def _told(self) -> str:
        """The chart in sentences: what, from when to when, each stretch, and the answer."""
        measure = self.review.measure
        name = self.days.name
        told = [
            f"Chart of {measure.title or 'the log'} by {self.speech.one}, "
            f"{name(int(self.points.first[0]))} to {name(int(self.points.first[-1]))}, "
            f"{count(int(self.points.known.sum()), 'value')}."
        ]
        for place, stretch in enumerate(self.stretches):
            if stretch.median is None or stretch.lower_fourth is None or stretch.upper_fourth is None:
                continue
            which = f"After {stretch.label or 'it'}" if place else "Baseline"
            told.append(
                f"{which}: {self.speech.periods(stretch.observations)}, "
                f"middle {self.speech.with_unit(stretch.median)}, "
                f"middle half {self.speech.number(stretch.lower_fourth)} to "
                f"{self.speech.with_unit(stretch.upper_fourth)}."
            )
        above, below = self._outside()
        told.append(f"Outside the fences: {len(set(above))} above, {len(set(below))} below.")
        told.append(findings_of(self.review).headline)
        return " ".join(told)


def _draws_fences(stretch: Stretch) -> bool:
    return stretch.observations >= FEWEST_TO_DRAW and stretch.lower_fence is not None
