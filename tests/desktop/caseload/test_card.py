"""The session card: every section from days that can be checked by hand."""

from __future__ import annotations

from dataclasses import replace

import pytest

from desktop.caseload.card import card_of
from desktop.caseload.facts import facts_of
from desktop.caseload.queue import row_of
from desktop.journal.records import Change, Entry, Measure, Span
from desktop.wording.caseload import COVERED_TITLES, card_sections, client_title, question_of, two_by_two
from tests.desktop.caseload.journals import CLIENT, MONDAY, day, entries, journal, level, session


def card(*records, sessions=(), client=CLIENT):
    held = journal(*records)
    row = row_of(client, facts_of(held, "", 1, client, sessions), None, MONDAY)
    return card_of(held, row, sessions, MONDAY)


def told(shown) -> dict[str, str]:
    return told_of(card_sections(shown))


def told_of(sections) -> dict[str, str]:
    return {section.title: " ".join(section.sentences) for section in sections}


KEPT = level(1, 41, 1, 30)
SAME_KNEE = level(2, 41, 1, 5, 0.2)
BETTER_KNEE = [*level(2, 41, 15, 6, 0.2), *level(2, 14, 1, 3, 0.2)]
PLAN = [session(14, "stairs at work", times=5, spare=1, note="was tired")]


def test_every_section_in_order():
    shown = card(*KEPT, *BETTER_KNEE, sessions=PLAN)
    assert list(told(shown)) == [
        "Agreed",
        "Kept",
        "Moved",
        "Missing",
        "Did it, and did it move?",
        "A question to ask",
        "Your notes",
    ]
    assert told(shown)["Agreed"] == ("On 17 March 2031: stairs at work. Plan: 5 days a week, 1 to spare.")
    assert told(shown)["Kept"] == "In 2 of 2 weeks. Days done, week by week: 7, 7."
    assert told(shown)["Moved"].startswith("Knee score since the session: It moved: ")
    assert told(shown)["Missing"] == "14 of 14 days since the session have an entry."
    assert told(shown)["Did it, and did it move?"] == (
        "The plan was kept in 2 of 2 weeks, and it moved: Knee score."
    )
    assert told(shown)["Your notes"] == "17 March 2031. Agreed: stairs at work. was tired"
    assert set(told(shown)) >= COVERED_TITLES
    # A page may be read by others: what the coach noted is not on it.
    assert "tired" not in " ".join(told_of(card_sections(shown, with_notes=False)).values())


def test_a_note_alone_moves_nothing_and_the_plan_stays_in_force():
    rang = session(3, note="rang, no answer")
    agreed = card(*KEPT, *BETTER_KNEE, sessions=PLAN)
    noted = card(*KEPT, *BETTER_KNEE, sessions=[*PLAN, rang])
    shown, before = told(noted), told(agreed)
    for title in ("Agreed", "Kept", "Moved", "Missing"):
        assert shown[title] == before[title]
    assert shown["Your notes"].startswith("28 March 2031. rang, no answer 17 March 2031.")
    later = card(*KEPT, *BETTER_KNEE, sessions=[*PLAN, session(7, "longer walks")])
    assert told(later)["Agreed"] == (
        "On 24 March 2031: longer walks. Plan since 17 March 2031: 5 days a week, 1 to spare."
    )


def test_kept_and_not_moved_says_by_how_much_it_can_have_moved_at_most():
    both = two_by_two(card(*KEPT, *SAME_KNEE, sessions=PLAN))
    assert both.startswith("The plan was kept in 2 of 2 weeks. If it moved at all, it was by less than ")
    assert both.endswith(": Knee score.")


def test_missed_and_moved_or_not():
    once = entries(1, {12: 30.0, 4: 30.0, 1: 20.0})
    moved = two_by_two(card(*once, *BETTER_KNEE, sessions=PLAN))
    assert moved == (
        "The plan was kept in 0 of 2 weeks only, and still it moved: Knee score. Something else may be behind it."
    )
    same = two_by_two(card(*once, *SAME_KNEE, sessions=PLAN))
    assert (
        same == "The plan was kept in 0 of 2 weeks only, so this log cannot say what it would do for Knee score."
    )


@pytest.mark.parametrize(
    "shown",
    [
        lambda: card(*KEPT, *SAME_KNEE),  # No plan.
        lambda: card(*KEPT, sessions=PLAN),  # No outcome.
        lambda: card(*KEPT, *level(2, 15, 12, 5), sessions=PLAN),  # Too few days of it.
    ],
)
def test_nothing_is_said_of_two_where_one_is_not_known(shown):
    assert two_by_two(shown()) == ""
    assert "Did it, and did it move?" not in told(shown())


def test_what_is_missing_since_the_session():
    kept = [one for one in KEPT if (day(0) - one.day).days not in (9, 8, 7, 3)]
    late = [replace(one, entered_at=f"{day(1)}T21:00:00") for one in kept if one.day >= day(6)]
    early = [one for one in kept if one.day < day(6)]
    shown = card(*early, *late, sessions=PLAN)
    assert told(shown)["Missing"] == (
        "10 of 14 days since the session have an entry. The longest gap: 3 days, Sat 22 Mar to Mon 24 Mar. "
        "3 of 10 entries were typed two days or more after the day they are about; 5 on one day at most."
    )


def test_silence_up_to_yesterday_is_a_gap_too():
    shown = card(*level(1, 41, 6, 30), sessions=PLAN)
    assert "The longest gap: 5 days, Wed 26 Mar to Sun 30 Mar." in told(shown)["Missing"]
    one = card(*level(1, 41, 2, 30), sessions=PLAN)
    assert "The longest gap: 1 day, Sun 30 Mar." in told(one)["Missing"]


def test_before_the_first_session():
    shown = told(card(*KEPT, *SAME_KNEE))
    assert shown["Agreed"] == "Nothing is agreed yet."
    assert shown["Kept"] == "There is no plan of days a week to look at, or no whole week under it yet."
    assert shown["Missing"] == "41 of 41 days in all have an entry."


def test_an_empty_journal_has_a_card_too():
    shown = told(card())
    assert shown["Missing"] == "0 of 0 days in all have an entry."
    assert shown["Moved"] == "Knee score: No answer yet. Walking: No answer yet."


def test_without_a_measure():
    bare = journal(Measure(9, 0, "x", archived=True))
    row = row_of(CLIENT, facts_of(bare, "", 1, CLIENT, []), None, MONDAY)
    shown = card_of(bare, row, [], MONDAY)
    assert shown.main is None
    assert told(shown)["Moved"] == "There is no measure to look at."


@pytest.mark.parametrize(
    ("records", "sessions", "question"),
    [
        (level(1, 41, 12, 30), (), "How have the last days been, with the log and without it?"),
        (
            [*entries(1, {14: 30.0, 7: 30.0}), *SAME_KNEE],
            [session(20, times=5)],
            "What got in the way from the week of 17 March 2031 on? Would fewer days fit better?",
        ),
        (
            [*KEPT, *level(2, 41, 15, 6, 0.2), *level(2, 14, 1, 3, 0.2)],
            [session(14)],
            "What was different from about 17 March 2031 on?",
        ),
        (
            [*level(1, 41, 11, 30), *level(1, 10, 1, 40), Span(1, day(10), day(-9), "device")],
            (),
            "What is new about the way it is measured?",
        ),
        (KEPT, (), "How has it been since then?"),
        (level(1, 90, 1, 30), (), "Is the log still a help, or is it time to write down less?"),
        ([], (), "How has it been since then?"),
    ],
)
def test_a_question_to_ask_and_no_verdict(records, sessions, question):
    assert question_of(card(*records, sessions=sessions)) == question


def test_a_move_that_has_gone_back_is_asked_about_as_that():
    faded = [*level(1, 60, 31, 30), *level(1, 30, 13, 55), *level(1, 12, 1, 30), Change(1, day(30))]
    assert question_of(card(*faded)) == "What was different in the time it moved, and what came after?"


def test_a_value_past_the_clinics_limit_is_the_clinics_to_judge():
    pressure = Measure(1, 0, "Upper pressure", "mmHg", limit_high=150.0)
    values = level(1, 41, 1, 130)
    shown = card(pressure, *values[:-1], replace(values[-1], value=171.0))
    assert question_of(shown) == "What did your clinic ask you to do beyond its limit, and what has come of it?"


def test_the_title_says_when_the_next_session_is():
    assert client_title(CLIENT, MONDAY) == "K7"
    assert client_title(replace(CLIENT, next_session=MONDAY), MONDAY) == "K7, session today"
    later = replace(CLIENT, next_session=day(-1))
    assert client_title(later, MONDAY) == "K7, session on Tuesday 1 April 2031"


def test_entries_without_a_time_are_not_called_late():
    shown = card(*[replace(one, entered_at="") for one in KEPT], sessions=PLAN)
    assert (shown.late, shown.typed, shown.one_evening) == (0, 0, 0)
    assert isinstance(KEPT[0], Entry)
