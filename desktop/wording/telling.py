"""What every finding is made of: sections of sentences, and how one review's numbers and days are said."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date

import numpy as np

from analysis.answer import Review
from desktop.wording.days import DayWords, full_day
from desktop.wording.doubts import doubt_sentence
from desktop.wording.numbers import Speech, decimals_for

SILENT_DAYS = 7
"""From so many days without an entry on, it is said how far the answer reaches."""


@dataclass(frozen=True)
class Section:
    """One question and what the log says to it."""

    title: str
    sentences: tuple[str, ...]


@dataclass(frozen=True)
class Findings:
    """An answer as it is read: the headline in the largest type, then the sections."""

    headline: str
    sections: tuple[Section, ...]

    def lines(self) -> tuple[str, ...]:
        """Headline and every sentence, in reading order."""
        return (self.headline, *(one for section in self.sections for one in section.sentences))


def speech_of(review: Review) -> Speech:
    """How the review's numbers are said: with the digits its own values have."""
    values = review.points.values
    return Speech(review.measure, decimals_for(values[~np.isnan(values)].tolist()))


def day_words_of(review: Review) -> DayWords:
    """How the review's periods are named: with their year where it spans more than one."""
    years = {date.fromordinal(day).year for stretch in review.stretches for day in (stretch.first, stretch.last)}
    return DayWords(review.measure.period, with_year=len(years) > 1)


class Teller:
    """Tells one review; holds what every sentence needs."""

    def __init__(self, review: Review) -> None:
        self.review = review
        self.speech = speech_of(review)
        self.days = day_words_of(review)

    def to_come(self) -> list[str]:
        """Changes that are marked for days still to come."""
        return [
            f"A change is marked for {full_day(date.fromordinal(day))}, which is still to come."
            for day in self.review.to_come
        ]

    def season(self) -> list[str]:
        """What is said where the time of year is in no number."""
        season = self.review.answer.season
        if season is None or not season.taken_off:
            return []
        return ["The time of year is taken off: each month is held against its own usual level."]

    def up_to(self) -> list[str]:
        """Where logging stopped days ago, the last day that the answer tells of."""
        points, today = self.review.points, self.review.today
        known = points.known
        if today is None or not known.any():
            return []
        last = int(points.last[known][-1])
        if today - last < SILENT_DAYS:
            return []
        return [f"Nothing is logged after {self.days.day(last)}, so this tells of the time up to then."]

    def doubts(self) -> list[Section]:
        """The doubts, worst first; a log without a change and without doubts has no such section."""
        told = tuple(doubt_sentence(doubt, self.speech) for doubt in self.review.doubts)
        if not told and len(self.review.stretches) == 1:
            return []
        return [Section("What else could explain it?", told)]
