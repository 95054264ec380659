"""A journal as one table, and the table as a journal again."""

import csv
import io
from datetime import date, datetime

from hypothesis import given, settings
from hypothesis import strategies as st

from desktop.edits.bring_in import bring_in
from desktop.edits.ids import Ids
from desktop.exchange.bring_in import read_table
from desktop.exchange.formula_guard import guarded, unguarded
from desktop.exchange.plain_table import plain_table
from desktop.journal.journal import Journal
from desktop.journal.records import Entry, Measure, Person
from tests.desktop.exchange.journals import FULL, TEXTS, journals

DANGEROUS = "=+-@\t\r\n"


def test_the_archive_form_is_rfc_4180():
    data = plain_table(FULL)
    lines = data.decode().split("\r\n")
    assert lines[0] == "date,measure,slot,value,unit,status,kind,note"
    assert lines[1] == '2024-02-29,Pressure ↑,morning,-0.30000000000000004,mmHg,excluded,extra,"said ""ok""\n"'
    assert data.endswith(b"\r\n")
    assert not data.startswith(b"\xef\xbb\xbf")
    (_, *rows) = csv.reader(io.StringIO(data.decode(), newline=""), strict=True)
    assert [row[3:6] for row in rows] == [
        ["-0.30000000000000004", "mmHg", "excluded"],
        ["0", "min", "recorded"],
        ["", "min", "missing"],
        ["31.5", "min", "excluded"],
    ]


def test_the_spreadsheet_form_guards_words_and_leaves_numbers_bare():
    text = plain_table(FULL, "spreadsheet", ",").decode()
    assert text.startswith('\ufeff"date";"measure"')
    assert ";-0,30000000000000004;" in text
    assert '"\'=Walk; long"' in text
    assert "\"''=cmd\"" in text


@settings(max_examples=200)
@given(journals())
def test_no_cell_of_the_spreadsheet_form_can_run(journal):
    text = plain_table(journal, "spreadsheet").decode().removeprefix("\ufeff")
    for row in csv.reader(io.StringIO(text, newline=""), strict=True):
        for place, cell in enumerate(row):
            assert place == 3 or not cell.lstrip().startswith(tuple(DANGEROUS))
            assert place == 3 or not cell.startswith(tuple(DANGEROUS))


@given(
    st.one_of(TEXTS, st.builds(str.__add__, st.sampled_from(["=", "+", "-", "@", "'", " =", "\t", "''="]), TEXTS))
)
def test_a_guarded_text_comes_back_equal(text):
    assert unguarded(guarded(text)) == text


TITLES = st.sampled_from(["Walk", "=Walk", "Sleep, deep", 'The "run"', "-Rest-", "Größe"])


@settings(max_examples=200, deadline=None)
@given(
    st.dictionaries(
        st.tuples(st.dates(date(1990, 1, 1), date(2040, 12, 31)), TITLES, st.sampled_from(["", "morning", "2"])),
        st.integers(-10_000, 1_000_000).map(lambda tenths: tenths / 10),
        min_size=1,
        max_size=15,
    ),
    st.sampled_from([("archive", "."), ("spreadsheet", "."), ("spreadsheet", ",")]),
)
def test_journal_to_table_to_journal_to_table_is_the_same_table(logged, form):
    titles = list(dict.fromkeys(title for _, title, _ in sorted(logged)))
    measures = {title: Measure(place + 1, place, title, "points") for place, title in enumerate(titles)}
    entries = [Entry(measures[title].id, day, slot, value) for (day, title, slot), value in logged.items()]
    journal = Journal.of([Person("0" * 32), *measures.values(), *entries])
    data = plain_table(journal, *form)
    back = journal_of(data, form[1])
    assert plain_table(back) == plain_table(journal)


def journal_of(data: bytes, decimal: str) -> Journal:
    """The table brought into a new journal, as the window does it."""
    reading = read_table(data, decimal=decimal)
    new = [Measure(-place, 0, column.name, column.unit) for place, column in enumerate(reading.columns)]
    entries = [
        Entry(measure.id, value.day, value.slot, value.value, "value", "", value.original, "table")
        for measure, column in zip(new, reading.columns, strict=True)
        for value in column.values
    ]
    journal = Journal.of([Person("0" * 32)])
    journal.apply(bring_in(journal, Ids({}), new, entries, now=datetime(2026, 1, 1)).edit.changes)
    return journal


def test_a_persons_own_table_comes_back_as_it_was_read():
    source = b"day;Weight (kg);Steps\n2024-01-01;71,5;8000\n2024-01-02;;9000\n2024-01-03;70;\n"
    once = plain_table(journal_of(source, ","))
    assert plain_table(journal_of(once, ".")) == once
    assert once.decode().split("\r\n")[1:5] == [
        "2024-01-01,Weight,day,71.5,kg,recorded,value,",
        "2024-01-01,Steps,day,8000,,recorded,value,",
        "2024-01-02,Steps,day,9000,,recorded,value,",
        "2024-01-03,Weight,day,70,kg,recorded,value,",
    ]
