"""A whole journal brought into another one, as one edit that can be taken back."""

from dataclasses import replace
from datetime import date, datetime

from desktop.edits.bring_in import bring_in_journal
from desktop.edits.ids import Ids
from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Plan, Span

NOW = datetime(2026, 3, 10, 21, 4, 5)
DAY = date(2026, 1, 5)
WALK = Measure(3, 0, "Walk", "min", "amount")
OTHER = Journal.of(
    [
        Person("1" * 32, "Ana", "Why?"),
        WALK,
        Measure(8, 1, "Pulse", "bpm"),
        Entry(3, DAY, value=30.0, original="30", source="typed", entered_at="2026-01-07T08:00:00", kind="late"),
        Entry(8, DAY, "morning", 61.0, "set aside", "cuff slipped"),
        Change(2, DAY, "new shoes", measures=(3,)),
        Span(4, DAY, DAY, "ill", "cold"),
        Plan(5, 3, DAY, 4, 1),
        DayNote(DAY, "rain"),
    ]
)


def brought_into(journal: Journal, highest: dict[str, int]) -> Journal:
    brought = bring_in_journal(journal, Ids(highest), OTHER, now=NOW)
    after = Journal.of(journal.records())
    after.apply(brought.edit.changes)
    undone = Journal.of(after.records())
    undone.apply(change.inverse() for change in reversed(brought.edit.changes))
    assert sorted(undone.records(), key=repr) == sorted(journal.records(), key=repr)
    return after


def test_everything_comes_into_an_empty_journal_with_its_kinds_and_times():
    after = brought_into(Journal.of([Person("0" * 32)]), {})
    assert after.person == Person("0" * 32, "Ana", "Why?")
    assert [measure.title for measure in after.columns()] == ["Walk", "Pulse"]
    walk, pulse = (measure.id for measure in after.columns())
    assert after.entry(walk, DAY) == replace(OTHER.entry(3, DAY), measure=walk)
    kept = after.entry(pulse, DAY, "morning")
    assert (kept.kind, kept.note, kept.value) == ("set aside", "cuff slipped", 61.0)
    assert [(change.label, change.measures) for change in after.changes.values()] == [("new shoes", (walk,))]
    assert [plan.measure for plan in after.plans.values()] == [walk]
    assert (after.note(DAY), len(after.spans)) == ("rain", 1)


def test_a_measure_that_is_there_takes_the_values_and_keeps_its_settings():
    own = Measure(1, 0, "Walk", "min", "amount", aim="more")
    journal = Journal.of(
        [Person("0" * 32, "Me"), own, Entry(1, DAY, value=20.0), Change(9, DAY, "new shoes", measures=(1,))]
    )
    after = brought_into(journal, {"measure": 1, "change": 9})
    assert after.measures[1] == own
    assert (after.entry(1, DAY).value, after.person.name) == (30.0, "Me")
    assert list(after.changes) == [9]


def test_the_same_journal_again_changes_nothing():
    after = brought_into(Journal.of([Person("0" * 32)]), {})
    again = bring_in_journal(after, Ids({"measure": 2, "change": 1, "span": 1, "plan": 1}), OTHER, now=NOW)
    assert not again.edit
    assert (again.added, again.replaced, again.untouched) == (0, 0, 2)
