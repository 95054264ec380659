"""A plan of days a week: set, replaced, ended; each week by the plan of its time; told without praise or blame."""

from __future__ import annotations

from datetime import date, timedelta

import pytest

from analysis.questions.plan_kept import WeekOfPlan
from desktop.edits.ids import Ids
from desktop.edits.plans import plan_in_force, set_plan
from desktop.journal.journal import Journal
from desktop.journal.plans import days_done, pauses_of, plans_of, weeks_under_plan
from desktop.journal.records import Entry, Measure, Person, Plan, Span
from desktop.wording.plan import plan_sentences, plan_words

MONDAY = date(2031, 3, 3)


def journal(*done: int) -> Journal:
    """Walked on these days after the Monday; nothing on all the others of four weeks."""
    entries = [
        Entry(1, MONDAY + timedelta(at), value=30.0 if at in done else 0.0, kind="value" if at in done else "zero")
        for at in range(28)
    ]
    return Journal.of([Person("0" * 32), Measure(1, 0, "Walking", "minutes", "amount"), *entries])


def made(held: Journal, *edits) -> Journal:
    for edit in edits:
        held.apply(edit.changes)
    return held


def test_a_plan_holds_from_its_day_until_the_next():
    held, ids = journal(), Ids({})
    made(held, set_plan(held, ids, 1, MONDAY, 5, 1))
    made(held, set_plan(held, ids, 1, MONDAY + timedelta(14), 3))
    assert plan_in_force(held, 1, MONDAY - timedelta(1)) is None
    assert plan_in_force(held, 1, MONDAY + timedelta(13)) == Plan(1, 1, MONDAY, 5, 1)
    assert plan_in_force(held, 1, MONDAY + timedelta(14)) == Plan(2, 1, MONDAY + timedelta(14), 3)
    assert [one.times for one in plans_of(held, 1)] == [5, 3]
    made(held, set_plan(held, ids, 1, MONDAY + timedelta(21), 0))
    assert plan_in_force(held, 1, MONDAY + timedelta(21)) is None


def test_another_plan_of_the_same_day_takes_its_place():
    held, ids = journal(), Ids({})
    made(held, set_plan(held, ids, 1, MONDAY, 5, 1), set_plan(held, ids, 1, MONDAY, 4))
    assert list(held.plans.values()) != []
    made(held, set_plan(held, ids, 1, MONDAY, 4))
    assert plans_of(held, 1)[-1].times == 4
    assert not set_plan(held, ids, 1, MONDAY, 4)


def test_what_cannot_be_a_plan():
    with pytest.raises(ValueError, match="spare"):
        set_plan(journal(), Ids({}), 1, MONDAY, 2, 3)
    with pytest.raises(KeyError):
        set_plan(journal(), Ids({}), 9, MONDAY, 2)


def test_weeks_are_whole_and_judged_by_the_plan_of_their_time():
    held, ids = journal(0, 1, 2, 3, 7, 8, 14, 15, 16, 21), Ids({})
    made(held, set_plan(held, ids, 1, MONDAY, 5, 1))
    made(held, set_plan(held, ids, 1, MONDAY + timedelta(14), 3))
    weeks = weeks_under_plan(held, 1, MONDAY + timedelta(27))
    assert [(week.done, week.is_kept) for week in weeks] == [(4, True), (2, False), (3, True)]
    assert len(weeks_under_plan(held, 1, MONDAY + timedelta(28))) == 4
    assert weeks_under_plan(journal(), 1, MONDAY + timedelta(28)) == []


def test_a_week_of_illness_is_not_judged_and_a_value_set_aside_is_not_done():
    held, ids = journal(0, 1), Ids({})
    held.apply(set_plan(held, ids, 1, MONDAY, 2).changes)
    ill = Span(1, MONDAY + timedelta(8), MONDAY + timedelta(9), "ill")
    held = Journal.of([*held.records(), ill, Entry(1, MONDAY, value=30.0, kind="set aside")])
    assert pauses_of(held, 1) == [(ill.first.toordinal(), ill.last.toordinal())]
    assert pauses_of(held) == pauses_of(held, 1)
    assert days_done(held, 1) == [(MONDAY + timedelta(1)).toordinal()]
    assert [week.first for week in weeks_under_plan(held, 1, MONDAY + timedelta(21))] == [
        MONDAY.toordinal(),
        (MONDAY + timedelta(14)).toordinal(),
    ]


def week(number: int, done: int, times: int = 5, spare: int = 1) -> WeekOfPlan:
    return WeekOfPlan(MONDAY.toordinal() + 7 * number, done, times, spare)


@pytest.mark.parametrize(
    ("weeks", "told"),
    [
        ([], ()),
        ([week(0, 4)], ("5 days a week, 1 to spare: kept in 1 of 1 whole week.",)),
        (
            [week(0, 4), week(1, 2, spare=0)],
            ("5 days a week: kept in 1 of 2 whole weeks. Each week is held against the plan of its time.",),
        ),
        (
            [week(at, at) for at in range(6)],
            (
                "5 days a week, 1 to spare: kept in 2 of 6 whole weeks.",
                "Days done in the last 4 weeks: 2, 3, 4, 5.",
            ),
        ),
    ],
)
def test_how_it_was_kept_is_counted(weeks, told):
    assert plan_sentences(weeks) == told


def test_a_plan_in_words():
    assert plan_words(1, 0) == "1 day a week"
    assert plan_words(5, 2) == "5 days a week, 2 to spare"
