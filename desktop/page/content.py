"""What stands on the page, in words and pictures, and nothing about paper, ink or Qt."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from datetime import date

import numpy as np
from numpy.typing import NDArray

from analysis import Log, Review
from analysis.answer import Stretch
from analysis.batch.fourths import fourths
from analysis.log import COUNTED_KINDS
from desktop.chart.picture import empty_picture, picture_of
from desktop.chart.pieces import Picture
from desktop.journal.journal import Journal
from desktop.journal.plans import weeks_under_plan
from desktop.wording.days import full_day
from desktop.wording.findings import findings_of
from desktop.wording.page import (
    HEADS,
    ROW_HEADS,
    UNNAMED,
    after_head,
    always_lines,
    answer_lines,
    averaging_line,
    change_line,
    doubt_lines,
    fact_parts,
    foot_line,
    last_head,
    short_answer_lines,
    short_dates,
    short_names,
    shortened,
    title_of_two,
    title_with_unit,
    unit_words,
)
from desktop.wording.plan import plan_sentences
from desktop.wording.telling import Section, speech_of

LATELY = 14
MOST_AFTER = 4
"""Stretches after the baseline that the table has room for; earlier ones are told by number."""

LONGEST_QUESTION = 240
"""Letters of the question that the page has room for."""

_LONGEST_TITLE, _LONGEST_LABEL, _LONGEST_UNIT = 60, 60, 20


@dataclass(frozen=True)
class Subject:
    """One measure on the page: its id in the journal, its log, and the answer."""

    measure: int
    log: Log
    review: Review


@dataclass(frozen=True)
class Row:
    """One row of the table.

    Attributes:
        head: which days.
        cells: by the name of the column in ``HEADS``.
        gives_way: whether it may be left out where room is short.
    """

    head: str
    cells: dict[str, str]
    gives_way: bool = False


@dataclass(frozen=True)
class AnswerWords:
    """The answer for one measure; ``title`` only where the page has two."""

    title: str
    headline: str
    lines: tuple[str, ...]


@dataclass(frozen=True)
class ChartWords:
    """One chart; ``title`` only where the page has two."""

    title: str
    picture: Picture


@dataclass(frozen=True)
class PageContent:
    """Everything on the page, in reading order.

    Attributes:
        title, unit: what is measured, and in what.
        facts: dates, how the values came in, whose log, when it was printed.
        question: the person's own words, or ``""`` for a line to write on.
        answers: one for each measure.
        columns: names of the table's columns, in order.
        rows: of the table; none for a log without a value.
        notes: below the table: the changes, the averaging rule.
        charts: one for each measure.
        doubts: what to know before trusting it, worst first; the last ones give way where room is short.
        always: what is said there in any case.
        foot: the rule, the version, the caution.
        plan: how the plan of days a week was kept; ``""`` without one.
        sections: the coach's form of the page has these in place of question and answers.
    """

    title: str
    unit: str
    facts: tuple[str, ...]
    question: str
    answers: tuple[AnswerWords, ...]
    columns: tuple[str, ...]
    rows: tuple[Row, ...]
    notes: tuple[str, ...]
    charts: tuple[ChartWords, ...]
    doubts: tuple[str, ...]
    always: tuple[str, ...]
    foot: str
    plan: str = ""
    sections: tuple[Section, ...] = ()


def content_of(
    journal: Journal, subjects: Sequence[Subject], printed: date, question: str | None = None
) -> PageContent:
    """The page of one measure, or of two that are written down together.

    Args:
        journal: whose log it is, its question, named days, kinds of day.
        subjects: one or two.
        printed: the day of printing.
        question: in place of the journal's own.
    """
    subjects = [_bounded(one) for one in subjects]
    reviews = [one.review for one in subjects]
    is_pair = len(subjects) > 1
    titles = [_title(one) for one in reviews]
    names = short_names(titles) if is_pair else [""]
    rows = [row for one, name in zip(subjects, names, strict=True) for row in _Rows(one, name).rows()]
    asked = journal.person.question if question is None else question
    hidden = max(0, len(reviews[0].stretches) - 1 - MOST_AFTER)
    notes = [*dict.fromkeys(change_line(one, hidden) for one in reviews)]
    if is_pair:
        notes = [" ".join([*notes, averaging_line(subjects[0].log, reviews[0])]).strip()]
    return PageContent(
        title=title_of_two(titles) if is_pair else titles[0],
        unit=unit_words(reviews[0]),
        facts=_facts(journal, subjects[0], printed),
        question=shortened(asked, LONGEST_QUESTION),
        answers=tuple(
            AnswerWords(_title(one), findings_of(one).headline, short_answer_lines(one))
            if is_pair
            else AnswerWords("", findings_of(one).headline, answer_lines(one))
            for one in reviews
        ),
        columns=_columns(rows),
        rows=tuple(_ordered(rows, len(subjects))),
        notes=tuple(note for note in notes if note),
        charts=tuple(
            ChartWords(title_with_unit(one.review) if is_pair else "", _picture(one, journal, printed))
            for one in subjects
        ),
        doubts=doubt_lines(reviews),
        always=always_lines(reviews),
        foot=foot_line(reviews[0]),
        plan=" ".join(plan_sentences(weeks_under_plan(journal, subjects[0].measure, printed))),
    )


def coach_content_of(
    journal: Journal, subject: Subject, printed: date, code: str, sections: Sequence[Section]
) -> PageContent:
    """The coach's form of the page: agreed, kept, moved, missing and a question to ask, then numbers and chart.

    Args:
        journal: the client's.
        subject: the measure that the answer is about.
        printed: the day of printing.
        code: the coach's word for the client.
        sections: of the session card.
    """
    content = content_of(journal, [subject], printed, "")
    bounded = tuple(
        Section(section.title, tuple(shortened(line, LONGEST_QUESTION) for line in section.sentences))
        for section in sections
    )
    title = f"{shortened(code, _LONGEST_TITLE)}: {content.title}"
    return replace(content, title=title, answers=(), plan="", sections=bounded)


def _title(review: Review) -> str:
    return review.measure.title or UNNAMED


def _picture(subject: Subject, journal: Journal, printed: date) -> Picture:
    if subject.review.stretches:
        return picture_of(subject.review, journal, subject.measure)
    return empty_picture(journal.measures[subject.measure], printed)


def _bounded(subject: Subject) -> Subject:
    """The subject with every word of the person's at a length the page has room for."""
    review = subject.review
    measure = replace(
        review.measure,
        title=shortened(review.measure.title, _LONGEST_TITLE),
        unit=shortened(review.measure.unit, _LONGEST_UNIT),
    )
    stretches = tuple(
        one if one.label is None else replace(one, label=shortened(one.label, _LONGEST_LABEL))
        for one in review.stretches
    )
    doubts = tuple(
        replace(
            doubt,
            fields=tuple(
                (name, shortened(value, _LONGEST_LABEL) if isinstance(value, str) else value)
                for name, value in doubt.fields
            ),
        )
        for doubt in review.doubts
    )
    return replace(subject, review=replace(review, measure=measure, stretches=stretches, doubts=doubts))


def _facts(journal: Journal, subject: Subject, printed: date) -> tuple[str, ...]:
    dated = fact_parts(subject.review, list(journal.entries.get(subject.measure, {}).values()))
    name = shortened(journal.person.name, _LONGEST_TITLE)
    return (*dated, *([name] if name else []), f"printed {full_day(printed)}")


def _columns(rows: Sequence[Row]) -> tuple[str, ...]:
    """The columns that say something: readings only where a day holds several."""
    used = {name for row in rows for name, cell in row.cells.items() if cell}
    if all(row.cells["readings"] == row.cells["logged"].partition(" ")[0] for row in rows):
        used -= {"readings"}
    return tuple(name for name in HEADS if name in used)


def _ordered(rows: list[Row], subjects: int) -> list[Row]:
    """Rows of two measures with the same days are put under one another."""
    half = len(rows) // 2
    upper, lower = rows[:half], rows[half:]
    if subjects < 2 or [_days_of(row) for row in upper] != [_days_of(row) for row in lower]:
        return rows
    return [row for both in zip(upper, lower, strict=True) for row in both]


def _days_of(row: Row) -> tuple[str, str]:
    return row.head, row.cells["dates"]


class _Rows:
    """The table's rows of one measure: before, settling in, after, lately."""

    def __init__(self, subject: Subject, name: str) -> None:
        self.log, self.review, self.name = subject.log, subject.review, name
        self.points = subject.review.points
        self.speech = speech_of(subject.review)
        known = np.flatnonzero(self.points.known)
        ends = (self.points.first[known[0]], self.points.last[known[-1]]) if len(known) else (1, 1)
        self.with_year = len({date.fromordinal(int(day)).year for day in ends}) > 1
        counted = np.array([kind in COUNTED_KINDS for kind in self.log.kinds], dtype=bool)
        self.counted_days = (
            self.log.days[counted & np.isfinite(self.log.values)] if len(self.log) else self.log.days
        )

    def rows(self) -> list[Row]:
        stretches = self.review.stretches
        if not stretches:
            return []
        before, after = stretches[0], stretches[1:]
        rows = [self._of_stretch(ROW_HEADS["before" if after else "all"], before)]
        for place, stretch in enumerate(after, start=1):
            if place <= len(after) - MOST_AFTER:
                continue
            if stretch is after[-1] and stretch.change is not None and stretch.first > stretch.change:
                settling = self._inside(stretch.change, stretch.first - 1)
                rows += [self._extra(ROW_HEADS["settling"], settling)] if settling.any() else []
            rows.append(self._of_stretch(after_head(place, len(after)), stretch))
        last = self._inside(stretches[-1].first, stretches[-1].last)
        if last.sum() > LATELY:
            lately = np.zeros(len(self.points), dtype=bool)
            lately[np.flatnonzero(last)[-LATELY:]] = True
            rows.append(self._extra(last_head(LATELY, self.points.period), lately))
        return rows

    def _inside(self, first: int, last: int) -> NDArray[np.bool_]:
        inside: NDArray[np.bool_] = (self.points.first >= first) & (self.points.first <= last)
        return inside

    def _extra(self, head: str, inside: NDArray[np.bool_]) -> Row:
        return replace(self._row(head, inside), gives_way=True)

    def _of_stretch(self, head: str, stretch: Stretch) -> Row:
        return self._row(head, self._inside(stretch.first, stretch.last), stretch)

    def _row(self, head: str, inside: NDArray[np.bool_], stretch: Stretch | None = None) -> Row:
        """A row over some periods; the numbers of a stretch are those of the review."""
        points, number = self.points, self.speech.number
        firsts, lasts = points.first[inside], points.last[inside]
        first, last = (int(firsts[0]), int(lasts[-1])) if len(firsts) else self._bare_days(stretch)
        values = points.values[inside & points.known]
        logged = int((inside & points.known & ~points.filled).sum())
        readings = int(((self.counted_days >= first) & (self.counted_days <= last)).sum())
        cells = {
            "dates": short_dates(first, last, points.period, with_year=self.with_year),
            "logged": f"{logged} of {int(inside.sum())}",
            "readings": str(readings),
            "which": self.name,
        }
        if not len(values):
            return Row(head, cells)
        lower, middle, upper = fourths(values)
        mean = float(np.mean(values))
        if stretch is not None and stretch.median is not None and stretch.mean is not None:
            assert stretch.lower_fourth is not None
            assert stretch.upper_fourth is not None
            lower, middle, upper, mean = stretch.lower_fourth, stretch.median, stretch.upper_fourth, stretch.mean
        cells |= {
            "middle": number(middle),
            "average": number(mean),
            "half": f"{number(lower)} to {number(upper)}",
            "reach": f"{number(float(values.min()))} to {number(float(values.max()))}",
        }
        aim = self.review.measure.aim
        if isinstance(aim, tuple):
            cells["goal"] = f"{int(((values >= aim[0]) & (values <= aim[1])).sum())} of {len(values)}"
        return Row(head, cells)

    @staticmethod
    def _bare_days(stretch: Stretch | None) -> tuple[int, int]:
        assert stretch is not None
        return stretch.first, stretch.last
