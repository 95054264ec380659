from __future__ import annotations

from dataclasses import replace
from datetime import date, datetime

import pytest

from desktop.edits.days import (
    PastedValue,
    clear,
    kind_of_value,
    paste_values,
    put_back,
    put_value,
    set_aside,
    set_kind,
    write_note,
)
from desktop.edits.edit import DayCell, Edit
from desktop.journal.journal import Journal
from desktop.journal.records import DayNote, Entry, Measure, Person
from desktop.journal.row_change import RowChange

NOW = datetime(2026, 3, 10, 21, 4, 5, 678)
AT = "2026-03-10T21:04:05"
TODAY = date(2026, 3, 10)
MINUTES, SESSIONS, PRESSURE, PAIN, DONE = 1, 2, 3, 4, 5
MEASURES = (
    Measure(MINUTES, 0, "Exercise", "minutes", kind="amount", missed="zero"),
    Measure(SESSIONS, 1, "Sessions", kind="count", missed="zero"),
    Measure(PRESSURE, 2, "Pressure", "mmHg"),
    Measure(PAIN, 3, "Pain", kind="score"),
    Measure(DONE, 4, "Stretched", kind="yes/no"),
)


def journal_of(*records: Entry | DayNote) -> Journal:
    return Journal.of([Person("0" * 32), *MEASURES, *records])


def only(edit: Edit) -> RowChange:
    assert len(edit.changes) == 1
    return edit.changes[0]


def test_a_value_where_there_was_none() -> None:
    journal = journal_of()
    edit = put_value(journal, PRESSURE, TODAY, 128.5, "128,5", now=NOW)
    entry = Entry(PRESSURE, TODAY, "", 128.5, "value", "", "128,5", "typed", AT)
    assert edit == Edit("put value", (RowChange(None, entry),))
    assert edit
    assert journal.entries == {}
    journal.apply(edit.changes)
    assert journal.entry(PRESSURE, TODAY) == entry


def test_a_value_in_the_place_of_another_keeps_the_note() -> None:
    there = Entry(PRESSURE, TODAY, value=130.0, note="after coffee", original="130")
    change = only(put_value(journal_of(there), PRESSURE, TODAY, 120.0, "120", now=NOW))
    assert change.before == there
    assert change.after == replace(there, value=120.0, original="120", entered_at=AT)


def test_a_slot_is_a_place_of_its_own() -> None:
    there = Entry(PRESSURE, TODAY, value=130.0, original="130")
    change = only(put_value(journal_of(there), PRESSURE, TODAY, 130.0, "130", now=NOW, slot="evening"))
    assert change.before is None
    assert isinstance(change.after, Entry)
    assert change.after.slot == "evening"


@pytest.mark.parametrize(
    ("measure", "value", "kind"),
    [
        (MINUTES, 0.0, "zero"),
        (SESSIONS, 0.0, "zero"),
        (PRESSURE, 0.0, "value"),
        (PAIN, 0.0, "value"),
        (DONE, 0.0, "value"),
        (MINUTES, 0.1, "value"),
        (SESSIONS, 1.0, "value"),
    ],
)
def test_none_of_it_is_a_kind_of_day(measure: int, value: float, kind: str) -> None:
    after = only(put_value(journal_of(), measure, TODAY, value, str(value), now=NOW)).after
    assert isinstance(after, Entry)
    assert (after.kind, after.value) == (kind, value)


@pytest.mark.parametrize(
    ("day", "kind"),
    [(11, "value"), (10, "value"), (9, "value"), (8, "late"), (7, "late"), (1, "late")],
)
@pytest.mark.parametrize("value", [0.0, 30.0])
def test_two_days_afterwards_is_late(day: int, kind: str, value: float) -> None:
    after = only(put_value(journal_of(), PAIN, date(2026, 3, day), value, "x", now=NOW)).after
    assert isinstance(after, Entry)
    assert after.kind == kind


def test_midnight_decides_and_not_the_hour() -> None:
    for hour, kind in ((0, "value"), (23, "value")):
        after = only(
            put_value(journal_of(), PAIN, date(2026, 3, 9), 1.0, "1", now=datetime(2026, 3, 10, hour))
        ).after
        assert isinstance(after, Entry)
        assert after.kind == kind


@pytest.mark.parametrize("source", ["table", "sample"])
def test_what_was_kept_elsewhere_is_not_late(source: str) -> None:
    day = date(2026, 1, 1)
    for value, kind in ((0.0, "zero"), (30.0, "value")):
        edit = put_value(journal_of(), MINUTES, day, value, "x", now=NOW, source=source)  # type: ignore[arg-type]
        after = only(edit).after
        assert isinstance(after, Entry)
        assert (after.kind, after.source) == (kind, source)


def test_an_extra_reading_stays_one() -> None:
    day = date(2026, 1, 1)
    edit = put_value(journal_of(), PRESSURE, day, 150.0, "150", now=NOW, kind="extra", slot="again")
    after = only(edit).after
    assert isinstance(after, Entry)
    assert after.kind == "extra"


@pytest.mark.parametrize("kind", ["value", "zero", "late"])
def test_the_same_again_changes_nothing(kind: str) -> None:
    there = Entry(MINUTES, date(2026, 3, 1), value=0.0, kind=kind, original="0", entered_at="2026-03-01T08:00:00")  # type: ignore[arg-type]
    edit = put_value(journal_of(there), MINUTES, there.day, 0.0, "0", now=NOW)
    assert edit == Edit("put value", ())
    assert not edit


def test_the_same_number_in_other_words_is_kept_as_typed() -> None:
    there = Entry(MINUTES, TODAY, value=30.0, original="30")
    after = only(put_value(journal_of(there), MINUTES, TODAY, 30.0, "30,0", now=NOW)).after
    assert isinstance(after, Entry)
    assert after.original == "30,0"


@pytest.mark.parametrize("kind", ["set aside", "extra"])
def test_the_same_value_typed_where_it_did_not_count_counts(kind: str) -> None:
    there = Entry(MINUTES, TODAY, value=30.0, kind=kind, original="30")  # type: ignore[arg-type]
    after = only(put_value(journal_of(there), MINUTES, TODAY, 30.0, "30", now=NOW)).after
    assert isinstance(after, Entry)
    assert after.kind == "value"


def test_a_measure_that_is_not_there() -> None:
    with pytest.raises(KeyError):
        put_value(journal_of(), 99, TODAY, 1.0, "1", now=NOW)


@pytest.mark.parametrize("kind", ["rest", "ill", "away", "blank"])
def test_a_kind_of_day_holds_no_value_and_keeps_the_note(kind: str) -> None:
    there = Entry(MINUTES, TODAY, value=30.0, note="tired", original="30")
    change = only(set_kind(journal_of(there), MINUTES, TODAY, kind, now=NOW))  # type: ignore[arg-type]
    assert change.after == Entry(MINUTES, TODAY, "", None, kind, "tired", "", "typed", AT)  # type: ignore[arg-type]
    fresh = only(set_kind(journal_of(), MINUTES, TODAY, kind, now=NOW, slot="am"))  # type: ignore[arg-type]
    assert fresh == RowChange(None, Entry(MINUTES, TODAY, "am", None, kind, "", "", "typed", AT))  # type: ignore[arg-type]


def test_the_same_kind_again_changes_nothing() -> None:
    there = Entry(MINUTES, TODAY, kind="ill", entered_at="2026-03-10T08:00:00")
    assert not set_kind(journal_of(there), MINUTES, TODAY, "ill", now=NOW)
    assert set_kind(journal_of(there), MINUTES, TODAY, "away", now=NOW)


def test_clearing_takes_away_what_is_there() -> None:
    first = Entry(MINUTES, TODAY, value=30.0)
    second = Entry(PRESSURE, TODAY, "am", value=120.0)
    cells = [
        DayCell(MINUTES, TODAY),
        DayCell(MINUTES, date(2026, 3, 9)),
        DayCell(PRESSURE, TODAY, "am"),
        DayCell(PRESSURE, TODAY),
        DayCell(MINUTES, TODAY),
    ]
    edit = clear(journal_of(first, second), cells)
    assert edit == Edit("clear values", (RowChange(first, None), RowChange(second, None)))
    assert not clear(journal_of(), cells)


@pytest.mark.parametrize("kind", ["value", "zero", "late"])
def test_what_is_set_aside_keeps_its_value(kind: str) -> None:
    there = Entry(MINUTES, TODAY, value=0.0, kind=kind, note="hot", original="0", entered_at=AT)  # type: ignore[arg-type]
    change = only(set_aside(journal_of(there), MINUTES, TODAY, "watch not worn"))
    assert change == RowChange(there, replace(there, kind="set aside", note="watch not worn"))
    change = only(set_aside(journal_of(there), MINUTES, TODAY, ""))
    assert change.after == replace(there, kind="set aside")


@pytest.mark.parametrize("kind", ["rest", "ill", "away", "blank", "extra", "set aside"])
def test_what_does_not_count_is_not_set_aside(kind: str) -> None:
    there = Entry(MINUTES, TODAY, value=1.0, kind=kind)  # type: ignore[arg-type]
    assert not set_aside(journal_of(there), MINUTES, TODAY, "a reason")
    assert not set_aside(journal_of(), MINUTES, TODAY, "a reason")


@pytest.mark.parametrize("kind", ["value", "zero", "late", "rest", "ill", "away", "blank", "extra"])
def test_only_what_is_set_aside_is_put_back(kind: str) -> None:
    there = Entry(MINUTES, TODAY, value=1.0, kind=kind)  # type: ignore[arg-type]
    assert put_back(journal_of(there), MINUTES, TODAY) == Edit("put back", ())
    assert not put_back(journal_of(), MINUTES, TODAY)


@pytest.mark.parametrize(
    ("value", "entered_at", "source", "kind"),
    [
        (30.0, "2026-03-01T21:00:00", "typed", "value"),
        (30.0, "2026-03-02T21:00:00", "typed", "value"),
        (30.0, "2026-03-03T00:00:00", "typed", "late"),
        (30.0, "", "typed", "value"),
        (30.0, "2026-03-09T00:00:00", "table", "value"),
        (0.0, "2026-03-01T21:00:00", "typed", "zero"),
        (0.0, "2026-03-09T00:00:00", "typed", "late"),
        (0.0, "2026-03-09T00:00:00", "sample", "zero"),
    ],
)
def test_what_is_put_back_is_what_it_was(value: float, entered_at: str, source: str, kind: str) -> None:
    aside = Entry(MINUTES, date(2026, 3, 1), "", value, "set aside", "why", "x", source, entered_at)  # type: ignore[arg-type]
    assert only(put_back(journal_of(aside), MINUTES, aside.day)).after == replace(aside, kind=kind)  # type: ignore[arg-type]


def test_aside_and_back_in_a_slot() -> None:
    there = Entry(MINUTES, TODAY, "am", 30.0, original="30", entered_at=AT)
    journal = journal_of(there)
    journal.apply(set_aside(journal, MINUTES, TODAY, "", slot="am").changes)
    assert journal.log_of(MINUTES).kinds == ("set aside",)
    journal.apply(put_back(journal, MINUTES, TODAY, slot="am").changes)
    assert journal.entry(MINUTES, TODAY, "am") == there


def test_notes_of_a_day() -> None:
    journal = journal_of()
    edit = write_note(journal, TODAY, "slept badly")
    assert edit == Edit("write note", (RowChange(None, DayNote(TODAY, "slept badly")),))
    journal.apply(edit.changes)
    assert not write_note(journal, TODAY, "slept badly")
    assert only(write_note(journal, TODAY, "slept well")).after == DayNote(TODAY, "slept well")
    for nothing in ("", " \n"):
        assert write_note(journal, TODAY, nothing).changes == (RowChange(DayNote(TODAY, "slept badly"), None),)
        assert not write_note(journal_of(), TODAY, nothing)


def test_a_block_is_one_edit() -> None:
    old = Entry(MINUTES, date(2026, 1, 1), value=10.0, note="cold", original="10")
    same = Entry(MINUTES, date(2026, 1, 2), value=20.0, original="20")
    block = [
        PastedValue(DayCell(MINUTES, date(2026, 1, 1)), 11.0, "11"),
        PastedValue(DayCell(MINUTES, date(2026, 1, 2)), 20.0, "20"),
        PastedValue(DayCell(MINUTES, date(2026, 1, 3)), 0.0, "0"),
        PastedValue(DayCell(PRESSURE, date(2026, 1, 3), "am"), 5.0, "5"),
        PastedValue(DayCell(PRESSURE, date(2026, 1, 3), "am"), 6.0, "6"),
        PastedValue(DayCell(MINUTES, date(2026, 1, 4)), None, "R", kind="rest"),
        PastedValue(DayCell(PRESSURE, date(2026, 1, 4)), 7.0, "7", kind="extra"),
    ]
    edit = paste_values(journal_of(old, same), block, now=NOW)
    assert edit.act == "paste values"
    assert [(change.before, change.after) for change in edit.changes] == [
        (old, Entry(MINUTES, date(2026, 1, 1), "", 11.0, "value", "cold", "11", "table", AT)),
        (None, Entry(MINUTES, date(2026, 1, 3), "", 0.0, "zero", "", "0", "table", AT)),
        (None, Entry(PRESSURE, date(2026, 1, 3), "am", 6.0, "value", "", "6", "table", AT)),
        (None, Entry(MINUTES, date(2026, 1, 4), "", None, "rest", "", "R", "table", AT)),
        (None, Entry(PRESSURE, date(2026, 1, 4), "", 7.0, "extra", "", "7", "table", AT)),
    ]
    assert not paste_values(journal_of(old), [], now=NOW)


def test_a_block_typed_from_memory_is_late() -> None:
    block = [PastedValue(DayCell(MINUTES, date(2026, 1, 1)), 11.0, "11")]
    after = only(paste_values(journal_of(), block, now=NOW, source="typed")).after
    assert isinstance(after, Entry)
    assert after.kind == "late"


def test_a_day_without_a_value_never_takes_one_along() -> None:
    block = [PastedValue(DayCell(MINUTES, TODAY), 5.0, "5 R", kind="rest")]
    after = only(paste_values(journal_of(), block, now=NOW)).after
    assert isinstance(after, Entry)
    assert after.value is None


def test_late_goes_before_none_of_it() -> None:
    assert kind_of_value(MEASURES[0], date(2026, 3, 1), 0.0, "typed", date(2026, 3, 3)) == "late"
    assert kind_of_value(MEASURES[0], date(2026, 3, 1), 0.0, "typed", date(2026, 3, 2)) == "zero"
