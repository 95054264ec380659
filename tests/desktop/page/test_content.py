"""What stands on a page: every number is the review's, every word one that anyone in the room may read."""

from __future__ import annotations

import re
from dataclasses import fields
from datetime import date

import pytest

from desktop.journal.records import Entry, Measure, Span
from desktop.page.content import LONGEST_QUESTION, PageContent
from desktop.wording.page import more_in_the_app, short_names, shortened, title_of_two
from tests.builders import day
from tests.desktop.chart.pictures import HIGH, LOW, journal_of
from tests.desktop.page.pages import JOURNALS, QUESTION, asked, page_of, pressure_journal, subjects_of
from tests.desktop.page.reading import missing, numbers_of, plain
from tests.desktop.wording.readability import grade
from tests.desktop.wording.test_plain_words import BANNED, HARDEST

ORDINARY = [name for name in JOURNALS if not name.startswith("longest")]


def texts_of(content: PageContent) -> list[str]:
    """Every text that is the program's, in reading order."""
    answers = [text for answer in content.answers for text in (answer.headline, *answer.lines)]
    return [*answers, *content.notes, *content.doubts, *content.always, content.foot]


def table(content: PageContent) -> dict[tuple[str, str], dict[str, str]]:
    return {(row.head, row.cells["which"]): row.cells for row in content.rows}


@pytest.mark.parametrize("name", ORDINARY)
def test_the_table_has_every_number_of_the_review(name):
    journal = JOURNALS[name]()
    content = page_of(journal)
    said = " | ".join(cell for row in content.rows for cell in row.cells.values())
    said += " | ".join(texts_of(content))
    for subject in subjects_of(journal):
        if len(subject.review.stretches) <= 5:
            assert missing(numbers_of(subject.review), said) == []


def test_days_logged_are_those_written_down_of_those_possible():
    content = page_of(journal_of([*LOW[:10], None, "ill", *HIGH], change=12, missed="zero"))
    assert table(content)["Before", ""]["logged"] == "10 of 12"
    assert table(content)["After", ""]["logged"] == "14 of 14"


def test_settling_in_days_have_a_row_of_their_own_and_are_in_no_other():
    content = page_of(pressure_journal(settle=14))
    rows = table(content)
    assert rows["Settling in", "Upper"]["dates"] == "31\u00a0Mar – 13\u00a0Apr"
    assert rows["After", "Upper"]["dates"] == "14\u00a0Apr – 27\u00a0Apr"
    assert rows["Before", "Lower"]["readings"] == "52"


def test_two_measures_written_down_together_share_a_page_row_by_row():
    content = page_of(pressure_journal(), measure=2)
    assert (content.title, content.unit) == ("Upper and lower pressure", "mmHg")
    assert [(row.head, row.cells["which"]) for row in content.rows[:2]] == [
        ("Before", "Upper"),
        ("Before", "Lower"),
    ]
    assert [chart.title for chart in content.charts] == ["Upper pressure, mmHg", "Lower pressure, mmHg"]
    assert len(content.answers) == 2
    assert "Each day: the average of its readings, day 1 included." in content.notes[0]


def test_the_averaging_rule_says_when_first_days_are_left_out():
    from analysis import review
    from desktop.wording.page import averaging_line

    journal = pressure_journal()
    log = journal.log_of(1)
    for begin, said in ((1, "day 1 left out"), (3, "days 1 to 3 left out")):
        answer = review(log, journal.analysis_changes(1), baseline=(day(begin), day(27)))
        assert said in averaging_line(log, answer)


def test_measures_with_other_changes_are_told_one_after_the_other():
    journal = pressure_journal()
    journal.changes[1] = type(journal.changes[1])(1, day(28), "dose change", None, 0, (1,))
    rows = page_of(journal).rows
    assert [row.cells["which"] for row in rows] == sorted((row.cells["which"] for row in rows), reverse=True)


def test_a_pair_of_three_or_one_that_is_archived_is_no_pair():
    journal = pressure_journal()
    journal.measures[3] = Measure(3, 3, "Third pressure", "mmHg", pair="pressure")
    assert journal.together(1) == [1]
    assert pressure_journal().together(1) == [1, 2]
    assert journal_of(LOW).together(1) == [1]


def test_readings_are_told_only_where_a_day_holds_several():
    assert "readings" in page_of(pressure_journal()).columns
    assert "readings" not in page_of(journal_of(LOW)).columns
    assert "goal" not in page_of(journal_of(LOW)).columns


def test_weeks_say_how_they_are_made_and_still_count_readings():
    content = page_of(journal_of(LOW * 4 + HIGH * 4, change=56), period="week")
    assert "one point a week: the sum" in content.facts
    assert table(content)["Before", ""]["readings"] == "56"
    assert content.answers[0].headline.startswith("It moved")


def test_years_are_told_as_years():
    pairs = [(date(1871 + place, 1, 1), 1100.0 + 40 * (place % 5) - 250 * (place > 28)) for place in range(60)]
    journal = journal_of([])
    journal.measures[1] = Measure(1, 0, "Flow", "", period="year")
    journal.entries[1] = {(at, ""): Entry(1, at, value=value, source="table") for at, value in pairs}
    content = page_of(journal)
    assert content.facts[:3] == ("1871 to 1930", "one point a year", "from a table")
    assert content.rows[0].cells["dates"] == "1871 – 1930"


def test_late_days_and_the_table_they_came_from_are_told():
    journal = journal_of(LOW + HIGH, change=14, kinds=dict.fromkeys((3, 4), "late"))
    assert "written down at the time on 26 of 28 days" in page_of(journal).facts
    journal.entries[1][day(40), ""] = Entry(1, day(40), value=3.0, source="table")
    assert "typed and from a table, 2 typed days afterwards" in page_of(journal).facts


def test_the_persons_words_stand_on_it_at_a_length_there_is_room_for():
    journal = asked(journal_of(LOW), "Two\n  lines " + "and more " * 100, "Ada Example")
    content = page_of(journal)
    assert content.question.startswith("Two lines and more")
    assert content.question.endswith("…")
    assert len(content.question) <= LONGEST_QUESTION
    assert "Ada Example" in content.facts
    assert page_of(asked(journal_of(LOW))).question == QUESTION


def test_nine_changes_keep_the_last_four_and_tell_the_others_by_number():
    content = page_of(JOURNALS["nine changes"]())
    heads = [row.head for row in content.rows]
    assert heads == ["Before", *(f"After change {place}" for place in (6, 7, 8, 9)), "Last 14 days"]
    assert "5 earlier changes are in the app." in content.notes[0]
    assert content.notes[0].startswith("Changes: 6: ")


def test_an_empty_log_has_a_page_without_a_table():
    content = page_of(journal_of([]))
    assert content.rows == ()
    assert content.answers[0].headline == "No answer yet."
    assert content.facts == ("printed 1 March 2032",)


def test_a_doubt_both_measures_have_alike_is_said_once_and_another_names_its_measure():
    doubts = page_of(pressure_journal(days=33)).doubts
    assert len(set(doubts)) == len(doubts)
    assert any(doubt.startswith(("Few days", "Upper pressure: ", "Lower pressure: ")) for doubt in doubts)


@pytest.mark.parametrize("name", ORDINARY)
def test_words_are_plain_and_speak_to_everyone_in_the_room(name):
    content = page_of(JOURNALS[name]())
    said = texts_of(content)
    for phrase in BANNED:
        assert [text for text in said if re.search(phrase, text, re.IGNORECASE)] == []
    assert [text for text in said[:-1] if re.search(r"\byour?\b|median", text, re.IGNORECASE)] == []
    told = [re.sub(r"\b(?:minutes?|mmHg)\b", "steps", text) for answer in content.answers for text in answer.lines]
    assert {text: round(grade(text), 1) for text in told if grade(text) > HARDEST} == {}


def test_what_stands_in_the_way_is_below_on_the_page():
    spans = [Span(1, day(14), day(30), "device", "new watch")]
    content = page_of(journal_of(LOW + HIGH + HIGH, change=14, spans=spans))
    said = " ".join(content.answers[0].lines)
    assert "the first point below stands in the way" in said
    assert "new watch" in content.doubts[0]


def test_texts_are_kept_short_at_a_word():
    assert shortened("one  two\nthree", 40) == "one two three"
    assert shortened("one two three four", 14) == "one two three…"
    assert shortened("W" * 50, 10) == "W" * 9 + "…"
    assert more_in_the_app(2) == "And 2 more in the app."


@pytest.mark.parametrize(
    ("titles", "names", "whole"),
    [
        (["Upper pressure", "Lower pressure"], ["Upper", "Lower"], "Upper and lower pressure"),
        (["bp upper", "bp lower"], ["upper", "lower"], "bp upper and lower"),
        (["Sleep", "Mood"], ["Sleep", "Mood"], "Sleep and Mood"),
        (["Pain", "Pain"], ["Pain", "Pain"], "Pain and Pain"),
    ],
)
def test_two_titles_say_what_they_share_once(titles, names, whole):
    assert (short_names(titles), title_of_two(titles)) == (names, whole)


def test_the_content_is_frozen_and_made_of_plain_things():
    content = page_of(journal_of(LOW, change=7))
    with pytest.raises(AttributeError):
        content.title = "other"
    assert all("Q" not in type(getattr(content, one.name)).__name__ for one in fields(content))
    assert plain(content.facts[-1]) == "printed 1 March 2032"
    assert page_of(journal_of([1.0])).facts[0] == f"{date(2031, 3, 3).day} March 2031"


def test_a_plan_that_there_was_is_told_and_none_is_not_mentioned():
    told = page_of(JOURNALS["ten months"]()).plan
    assert re.match(r"5 days a week, 1 to spare: kept in \d+ of \d+ whole weeks\.", told)
    assert page_of(JOURNALS["four weeks"]()).plan == ""
