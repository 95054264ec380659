"""A long regular table is cut and read in bulk; what comes of it is what comes of it line by line."""

from datetime import date, timedelta

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from desktop.errors import ExchangeError
from desktop.exchange import rows, table
from desktop.exchange.bring_in import read_table
from desktop.exchange.day_tokens import parse_day, plain_days
from desktop.exchange.number_tokens import read_number
from desktop.exchange.rows import Rectangle, split_rows

DAYS = st.dates(date(1990, 1, 1), date(2040, 12, 31)).map(str)
TIMED = st.builds(
    lambda day, tail: day + tail,
    DAYS,
    st.sampled_from([" 08:15", "T20:30:59", "T12:00Z", " 00:00", " 7:05 pm", "T23:59:59.5+02:00", " (Wed)"]),
)
ODD_DAYS = st.sampled_from(
    ["2024-02-30", "1024-01-01", "2024-W01-1", "2024-1-1", "01/02/2024", "13/02/2024", "Total", "", "2024",
     "2024-01-01 08:15", "2024-01-01T25:00", "２０２４-01-01", "1 March 2024", "day"]
)  # fmt: skip
NUMBERS = st.one_of(
    st.integers(-999, 99_999).map(str),
    st.decimals(-99, 9999, places=1).map(str),
    st.decimals(0, 99, places=3).map(str),
)
ODD_CELLS = st.sampled_from(
    ["", "NA", "~40", "7,5", "1.234", "1,234", "128/79", "1:05", "45 min", "5 kg", "x", " 5", "5\t", "−5", "٤٢",
     "1871", "2001", "nan", "9999999999", "1.2345678901", "-0.0", "00.5", "\u00a05"]
)  # fmt: skip
WORDS = st.sampled_from(["walk", "swim", "morning", "evening", "a\u2028b", ""])


@st.composite
def tables(draw) -> str:
    """A table of one width: mostly plain, some odd cells, days unsorted and some of them twice."""
    length = draw(st.integers(2, 30))
    mostly = draw(st.sampled_from([0, 0, 1, 3]))
    separator = draw(st.sampled_from([",", ";", "\t"]))

    def column(plain, odd) -> list[str]:
        cells = draw(st.lists(plain, min_size=length, max_size=length))
        for _ in range(min(mostly, length)):
            cells[draw(st.integers(0, length - 1))] = draw(odd)
        return cells

    days = draw(st.sampled_from([DAYS, TIMED, st.one_of(DAYS, TIMED)]))
    columns = [column(days, ODD_DAYS), column(NUMBERS, ODD_CELLS)]
    if draw(st.booleans()):
        columns.append(column(NUMBERS, ODD_CELLS))
    if draw(st.booleans()):
        columns.insert(draw(st.integers(0, len(columns))), draw(st.lists(WORDS, min_size=length, max_size=length)))
    lines = [separator.join(cell.replace(separator, "") for cell in row) for row in zip(*columns, strict=True)]
    if draw(st.booleans()):
        lines.insert(0, separator.join(["day", "one", "two", "three"][: len(columns)]))
    if draw(st.booleans()):
        lines.append(draw(st.sampled_from(lines)))
    return "\n".join(lines) + draw(st.sampled_from(["", "\n", "\n\n"]))


def outcome(source: bytes) -> object:
    try:
        return read_table(source)
    except ExchangeError as error:
        return error.reason, error.fields


@settings(max_examples=600, deadline=None)
@given(tables())
def test_a_table_read_in_bulk_is_the_same_table(text):
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(rows, "LEAST_RECTANGLE", 10**9)
        patch.setattr(table, "LEAST_RECTANGLE", 10**9)
        patch.setattr(table, "plain_days", lambda _: None)
        singly = outcome(text.encode())
        patch.undo()
        patch.setattr(rows, "LEAST_RECTANGLE", 1)
        patch.setattr(table, "LEAST_RECTANGLE", 1)
        patch.setattr(table, "_HEAD", 2)
        in_bulk = outcome(text.encode())
    assert in_bulk == singly


@given(st.lists(st.one_of(DAYS, TIMED, TIMED.map(lambda text: text + "x"), ODD_DAYS), max_size=4))
def test_days_in_bulk_are_the_days_one_by_one(texts):
    tokens = [parse_day(text) for text in texts]
    singly = [(token.readings().get(None), token.clock) if token else None for token in tokens]
    in_bulk = plain_days(texts)
    if in_bulk is not None:
        assert list(zip(in_bulk.days, in_bulk.clocks or [None] * len(texts), strict=True)) == singly


@pytest.mark.parametrize(
    "text", ["2024-02-30", "1024-01-01", "2024-W01-1", "2024-01-1", "２０２４-01-01", "x" * 10]
)
def test_one_odd_day_ends_the_bulk(text):
    assert plain_days(["2024-01-01", text, "2024-01-02"]) is None


@pytest.mark.parametrize(
    ("text", "value"), [("7.5", 7.5), ("-0.0", 0.0), ("00.5", 0.5), ("999999999.999999999", 1e9), ("-3", -3.0)]
)
def test_a_plain_number_is_read_at_once_and_right(text, value):
    token = read_number(text, ".")
    assert (token.kind, token.value, token.unit) == ("number", value, "")
    assert str(token.value) != "-0.0"


def test_a_long_regular_file_is_cut_all_at_once(monkeypatch):
    text = "day,x\n" + "".join(f"{date(2001, 1, 1) + timedelta(n)},{n}\n" for n in range(1000))
    found = split_rows(text)
    assert isinstance(found.cells, Rectangle)
    assert (found.cells[0], found.cells[1000]) == (["day", "x"], ["2003-09-27", "999"])
    assert list(found.cells[998:]) == [found.cells[998], found.cells[999], found.cells[1000]]
    assert found.lines == list(range(1, 1002))


def test_one_irregular_line_in_a_long_file_changes_no_other():
    lines = [f"{date(2001, 1, 1) + timedelta(n)},{n}" for n in range(1000)]
    regular = read_table("\n".join(["day,x", *lines]).encode())
    lines[500] += ",9"
    reading = read_table("\n".join(["day,x", *lines]).encode())
    assert [(fate.line, fate.reason) for fate in reading.set_aside] == [(502, "too many cells")]
    assert [value for value in regular.columns[0].values if value.line != 502] == list(reading.columns[0].values)
