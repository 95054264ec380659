"""A log without a change in plain words: is any period out of line with the rest?"""

from __future__ import annotations

from analysis.answer import Stretch
from analysis.batch.luck import some_outside_rate
from analysis.questions.did_it_move import FEWEST_BEFORE
from desktop.wording.moved import STEADY_BELOW
from desktop.wording.telling import Findings, Section, Teller

_LISTED = 3
"""Days outside are named up to this many; beyond, the chart shows them."""


class OneStretchTeller(Teller):
    """Tells a log of one stretch."""

    def tell(self) -> Findings:
        """The headline, the level so far, and which periods are out of line."""
        only, speech = self.review.stretches[0], self.speech
        slope = self.review.answer.slope
        steady = slope is not None and slope.before and (slope.p_before or 1.0) < STEADY_BELOW
        told = [*self._level(only), *self.season(), *self.up_to(), *self.to_come()]
        if slope is not None and slope.before and steady:
            told.append(f"It is moving steadily, by about {speech.pace(slope.before)}.")
        sections = [Section("The log so far", tuple(told))]
        outside = sorted([*only.below, *only.above])
        if only.lower_fence is None or only.upper_fence is None:
            headline = f"Too early to say if a {speech.one} is out of line."
            if only.observations >= FEWEST_BEFORE:
                headline = f"No {speech.one} can be told apart from the rest."
        elif outside:
            verb = "is" if len(outside) == 1 else "are"
            headline = f"{speech.periods(len(outside))} {verb} out of line with the rest."
            sections.append(Section("Which ones?", tuple(self._out_of_line(only, outside))))
        else:
            headline = f"No {speech.one} is out of line with the rest."
        sections += self.doubts()
        if only.observations < FEWEST_BEFORE:
            left = FEWEST_BEFORE - only.observations
            more = (
                f"{speech.periods(left)} more with a value would be enough to draw fences. "
                f"{14} {speech.many} are better."
            )
            sections.append(Section("What would settle it?", (more,)))
        elif speech.one == "day":
            mark = "To ask if something moved it, mark the day of a change (Log, Mark a change)."
            sections.append(Section("What next?", (mark,)))
        return Findings(headline, tuple(sections))

    def _level(self, stretch: Stretch) -> list[str]:
        if stretch.median is None or stretch.lower_fourth is None or stretch.upper_fourth is None:
            return [f"There is no {self.speech.one} with a value."]
        speech = self.speech
        told = [
            f"{speech.periods(stretch.observations)} with a value. The middle {speech.one} is "
            f"{speech.with_unit(stretch.median)}."
        ]
        if stretch.observations >= FEWEST_BEFORE:
            told.append(
                f"The middle half runs from {speech.number(stretch.lower_fourth)} to "
                f"{speech.with_unit(stretch.upper_fourth)}."
            )
        if stretch.lower_fence is not None and stretch.upper_fence is not None:
            if stretch.lower_fence < 0 and self.review.measure.kind in ("amount", "count", "score"):
                told.append(f"The upper fence stands at {speech.with_unit(stretch.upper_fence)}; no lower one.")
            else:
                told.append(
                    f"The fences stand at {speech.number(stretch.lower_fence)} and "
                    f"{speech.with_unit(stretch.upper_fence)}."
                )
        return told

    def _out_of_line(self, only: Stretch, outside: list[int]) -> list[str]:
        value_at = {
            int(day): float(value)
            for day, value in zip(self.review.points.first, self.review.points.values, strict=True)
        }
        told = []
        for day in outside[:_LISTED]:
            assert only.lower_fence is not None
            assert only.upper_fence is not None
            is_high = day in only.above
            side, fence = (
                ("above the upper", only.upper_fence) if is_high else ("below the lower", only.lower_fence)
            )
            name = self.days.name(day)
            told.append(
                f"{name[0].upper()}{name[1:]}: {self.speech.with_unit(value_at[day])}, "
                f"{side} fence of {self.speech.number(fence)}."
            )
        if len(outside) > _LISTED:
            others = len(outside) - _LISTED
            told.append(f"The other {'one is' if others == 1 else f'{others} are'} marked on the chart.")
        in_100 = 10 * round(10 * some_outside_rate(only.observations))
        told.append(
            f"Luck alone puts some {self.speech.one} outside in about {in_100} of 100 steady logs of this length."
        )
        told.append(f"One {self.speech.one} alone says nothing about the level.")
        return told
