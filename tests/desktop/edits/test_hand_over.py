"""What is handed over is what was chosen, and nothing beside it."""

from __future__ import annotations

from dataclasses import replace
from datetime import date

import pytest

from desktop.edits.hand_over import HandOver, records_to_hand_over
from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Plan, Record, Span

PERSON = Person("1" * 32, "Ana", "Does it help?")
WALK, MOOD = Measure(1, 0, "Walk"), Measure(2, 1, "Mood")


def day(number: int) -> date:
    return date(2031, 3, number)


def entry(number: int, measure: int = 1) -> Entry:
    return Entry(measure, day(number), value=float(number), note="said", original=f"{number} min")


@pytest.fixture
def journal() -> Journal:
    return Journal.of(
        [
            PERSON,
            WALK,
            MOOD,
            *(entry(number) for number in range(1, 11)),
            entry(5, 2),
            DayNote(day(5), "rain"),
            DayNote(day(9), "sun"),
            Change(1, day(5), "stairs"),
            Change(2, day(6), "pills", measures=(2,)),
            Change(3, day(6), "both", measures=(1, 2)),
            Change(4, day(9), "later"),
            Span(1, day(1), day(3), label="flu"),
            Span(2, day(7), day(9), label="cuff", measures=(1, 2)),
            Span(3, day(8), day(9), label="after"),
            Span(4, day(5), day(5), label="mood only", measures=(2,)),
            Span(5, day(1), day(2), label="before"),
            Plan(1, 1, day(1), 5),
        ]
    )


CHOSEN = HandOver({1}, day(3), day(7), notes=True, person=True, journal_id="2" * 32)


def test_chosen_measures_and_days(journal: Journal) -> None:
    expected: list[Record] = [
        replace(PERSON, journal_id="2" * 32),
        WALK,
        *(entry(number) for number in range(3, 8)),
        Change(1, day(5), "stairs"),
        Change(3, day(6), "both", measures=(1,)),
        Span(1, day(1), day(3), label="flu"),
        Span(2, day(7), day(9), label="cuff", measures=(1,)),
        DayNote(day(5), "rain"),
    ]
    assert records_to_hand_over(journal, CHOSEN) == expected


def test_without_words_and_name(journal: Journal) -> None:
    bare = replace(CHOSEN, notes=False, person=False)
    records = records_to_hand_over(journal, bare)
    assert records[0] == Person("2" * 32)
    assert not any(isinstance(record, DayNote) for record in records)
    entries = [record for record in records if isinstance(record, Entry)]
    assert {(one.note, one.original) for one in entries} == {("", "")}
    assert [one.value for one in entries] == [3, 4, 5, 6, 7]


def test_everything(journal: Journal) -> None:
    whole = HandOver({1, 2}, day(1), day(31), notes=True, person=True, journal_id=PERSON.journal_id)
    plans = {record for record in journal.records() if isinstance(record, Plan)}
    assert set(records_to_hand_over(journal, whole)) == set(journal.records()) - plans
