"""Journals of every sort that has to fit on a page; all of them invented."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from datetime import date

import numpy as np

from analysis import review
from desktop.journal.journal import Journal
from desktop.journal.records import Change, Entry, Measure, Person, Plan, Span
from desktop.page.content import PageContent, Subject, content_of
from tests.builders import day
from tests.desktop.chart.pictures import HIGH, LOW, journal_of

PRINTED = date(2032, 3, 1)
QUESTION = "Is this enough walking, or should I add the evenings?"


def subjects_of(journal: Journal, measure: int = 1, **how: object) -> list[Subject]:
    """Each measure of a page with its answer."""
    subjects = []
    for one in journal.together(measure):
        log = journal.log_of(one, how.get("period"))
        subjects.append(Subject(one, log, review(log, journal.analysis_changes(one), today=how.get("today"))))
    return subjects


def page_of(journal: Journal, measure: int = 1, **how: object) -> PageContent:
    return content_of(journal, subjects_of(journal, measure, **how), PRINTED)


def asked(journal: Journal, question: str = QUESTION, name: str = "") -> Journal:
    """The journal with a question."""
    journal.person = replace(journal.person, question=question, name=name)
    return journal


def long_log(days: int) -> list[float | str | None]:
    rng = np.random.default_rng(days)
    values: list[float | str | None] = [
        float(max(0, round(25 + 8 * rng.normal() + 9 * (place > days / 2) - 12 * (place % 7 > 4))))
        for place in range(days)
    ]
    values[3:5] = ["ill", "ill"]
    values[11] = None
    return values


def pressure_journal(settle: int = 14, days: int = 56, change: int = 28, unit: str = "mmHg") -> Journal:
    """Upper and lower pressure, morning and evening."""
    rng = np.random.default_rng(7)
    measures = [
        Measure(place, place, f"{name} pressure", unit, pair="pressure", aim="less")
        for place, name in ((1, "Upper"), (2, "Lower"))
    ]
    entries = []
    for place in range(days):
        if place in (5, 17):
            continue
        for slot in ("morning", "evening"):
            for measure, level, spread, by in ((1, 148, 6, 11), (2, 87, 4, 5)):
                value = float(round(level + spread * rng.normal() - by * (place > change)))
                entries.append(Entry(measure, day(place), slot, value, original=f"{value:g}"))
    changes = [Change(1, day(change), "dose change, as directed", "advised", settle)]
    return Journal.of([Person("0" * 32), *measures, *entries, *changes])


def with_changes(*days: int, length: int = 60) -> Journal:
    journal = journal_of(long_log(length))
    labels = ("off the bus one stop early", "screens off at ten", "new shoes, and a longer way home by the river")
    for place, at in enumerate(days, start=1):
        journal.changes[place] = Change(place, day(at), labels[(place - 1) % 3], None, 3 if place == 1 else 0)
    return journal


def longest(word: str = "early ") -> Journal:
    """The longest words a journal can hold, and as many doubts as one log can give reason for."""
    values = [round(value, -1) for value in (HIGH[:7] + LOW * 2 + HIGH * 2)]
    some_blank: list[float | str | None] = [
        None if place > 40 and place % 3 == 0 else value for place, value in enumerate(values)
    ]
    journal = journal_of(
        some_blank,
        change=35,
        settle=2,
        kinds=dict.fromkeys((36, 38, 40), "late"),
        spans=[Span(1, day(35), day(60), "device", (word * 80)[:390])],
        title=(word * 80)[:390],
        unit=(word * 80)[:390],
        aim="range",
        goal_low=20.0,
        goal_high=40.0,
    )
    for number in (1, 2, 3):
        journal.changes[number] = Change(number, day(35 + 3 * (number - 1)), (word * 80)[:390], None, 2)
    journal.plans = {1: Plan(1, 1, day(1), 6, 2), 2: Plan(2, 1, day(20), 7, 2)}
    return asked(journal, (word * 800)[:4000], (word * 80)[:390])


def planned(journal: Journal) -> Journal:
    """The journal with a plan of days a week."""
    journal.plans = {1: Plan(1, 1, day(1), 5, 1)}
    return journal


def large_numbers() -> Journal:
    values = [123_456_789.5 + 7_654_321.5 * (place % 5) - 3e7 * (place > 20) for place in range(40)]
    return journal_of(values, change=21, unit="steps", title="Steps", kind="count")


JOURNALS: dict[str, Callable[[], Journal]] = {
    "two weeks": lambda: asked(journal_of(LOW[:9] + HIGH[:5], change=9)),
    "two weeks without a change": lambda: asked(journal_of(LOW)),
    "four weeks": lambda: asked(journal_of(LOW + HIGH, change=14)),
    "too early": lambda: journal_of(LOW[:5] + HIGH[:2], change=5),
    "ten months": lambda: planned(asked(journal_of(long_log(300), change=150, missed="zero"))),
    "ten years": lambda: asked(journal_of(long_log(3650), change=1500)),
    "three changes": lambda: asked(with_changes(15, 30, 45)),
    "nine changes": lambda: asked(with_changes(*range(12, 120, 12), length=130)),
    "blood pressure": lambda: asked(pressure_journal()),
    "blood pressure, nothing settling in": lambda: asked(pressure_journal(settle=0, days=80)),
    "a range aimed at": lambda: journal_of(LOW + HIGH, change=14, aim="range", goal_low=20.0, goal_high=35.0),
    "many zeros": lambda: journal_of(
        [0, 0, 25, 0] * 6 + [0, 30, 25, 40] * 6, change=24, missed="zero", aim="more"
    ),
    "no spread": lambda: journal_of([5] * 14 + [6] * 14, change=14),
    "below zero": lambda: journal_of([-5, 3, -8, 2, 0, 4, -1] * 4, change=14, kind="reading", unit="°C"),
    "one day": lambda: journal_of([20]),
    "empty": lambda: journal_of([]),
    "longest words": longest,
    "longest word": lambda: longest("W"),
    "large numbers": large_numbers,
}
"""By name, each made anew."""
