"""Empty days: which are asked about, and what the answers write."""

from __future__ import annotations

from datetime import date, datetime, timedelta

from desktop.edits.gaps import NOT_WRITTEN, gap_is_not_known, gap_was_none
from desktop.edits.ids import Ids
from desktop.journal.gaps import unasked_gap
from desktop.journal.journal import Journal
from desktop.journal.records import Entry, Measure, Person, Span

FIRST = date(2031, 3, 3)
NOW = datetime(2031, 3, 30, 20, 15)
WALKING = Measure(1, 0, "Walking", "minutes", "amount", missed="zero")


def day(place: int) -> date:
    return FIRST + timedelta(place)


def journal_of(places: list[int], *more: object) -> Journal:
    records = [Person("0" * 32), WALKING, *(Entry(1, day(at), value=20.0) for at in places), *more]
    return Journal.of(records)  # type: ignore[arg-type]


def test_three_empty_days_between_two_written_ones_are_asked_about() -> None:
    assert unasked_gap(journal_of([0, 1, 5, 6]), 1) == (day(2), day(4))
    assert unasked_gap(journal_of([0, 1, 4, 6]), 1) is None
    assert unasked_gap(journal_of([0]), 1) is None
    assert unasked_gap(journal_of([]), 1) is None


def test_the_latest_of_several_is_asked_first() -> None:
    assert unasked_gap(journal_of([0, 5, 12, 13]), 1) == (day(6), day(11))


def test_a_day_on_which_anything_was_written_is_no_empty_day() -> None:
    sleep = Measure(2, 1, "Sleep", "hours")
    assert unasked_gap(journal_of([0, 6], sleep, Entry(2, day(3), value=7.0)), 1) is None
    # Days of another measure outside this one's are not between its days.
    assert unasked_gap(journal_of([6, 7], sleep, Entry(2, day(0), value=7.0)), 1) is None


def test_days_named_ill_or_away_are_answered_and_those_with_another_device_are_not() -> None:
    assert unasked_gap(journal_of([0, 6], Span(1, day(1), day(5), "ill")), 1) is None
    assert unasked_gap(journal_of([0, 6], Span(1, day(1), day(5), "device")), 1) == (day(1), day(5))
    assert unasked_gap(journal_of([0, 6], Span(1, day(1), day(5), "away", measures=(2,))), 1) == (day(1), day(5))


def test_where_a_missed_day_stays_blank_nothing_is_asked() -> None:
    blank = Measure(1, 0, "Weight", "kg")
    journal = Journal.of([Person("0" * 32), blank, Entry(1, day(0), value=70.0), Entry(1, day(9), value=71.0)])
    assert unasked_gap(journal, 1) is None


def test_days_without_any_become_zeros_in_one_act_and_are_asked_once() -> None:
    journal = journal_of([0, 1, 5, 6])
    edit = gap_was_none(journal, 1, day(2), day(4), now=NOW)
    assert edit.act == "paste values"
    journal.apply(edit.changes)
    assert [journal.entry(1, day(at)).value for at in (2, 3, 4)] == [0.0, 0.0, 0.0]  # type: ignore[union-attr]
    assert unasked_gap(journal, 1) is None


def test_days_not_known_are_named_and_in_no_number() -> None:
    journal = journal_of([0, 1, 5, 6])
    edit = gap_is_not_known(journal, Ids({}), day(2), day(4))
    journal.apply(edit.changes)
    assert journal.spans[1] == Span(1, day(2), day(4), "away", NOT_WRITTEN)
    assert unasked_gap(journal, 1) is None


def test_a_day_called_not_known_is_no_missed_day() -> None:
    journal = journal_of([0, 1, 3], Entry(1, day(2), kind="blank"))
    assert journal.log_of(1).kinds == ("value", "value", "away", "value")
