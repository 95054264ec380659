"""What is said of a copy to hand over."""

from datetime import date

from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Span
from desktop.wording.hand_over import goes_lines

DAY = date(2031, 3, 4)


def test_one_line_for_each_thing_that_goes():
    records = [
        Person("0" * 32, "Ana", "Does it help?"),
        Measure(1, 0, "Walk"),
        Measure(2, 1, "Mood"),
        Entry(1, DAY, value=1.0, note="rain"),
        Entry(1, date(2031, 3, 6), value=2.0),
        Change(1, DAY),
        Span(1, DAY, DAY, "ill"),
        DayNote(DAY, "a"),
    ]
    assert goes_lines(records) == [
        "Walk: 2 values, 4 March 2031 to 6 March 2031, 1 remark",
        "Mood: 0 values",
        "the change of 4 March 2031: no label",
        "named days from 4 March 2031: ill",
        "1 note about days",
        "your name and question: Ana, Does it help?",
    ]
    assert goes_lines([Person("0" * 32)]) == []
