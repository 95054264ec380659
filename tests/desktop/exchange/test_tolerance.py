"""The list of what files out in the world are like, one test a line, each expectation written by hand."""

import csv
import io
from datetime import date

import pytest

from tests.desktop.exchange.reading import FIRST, SECOND, THIRD, aside, pairs, read, refusal

BODY = "2024-01-01,7.5\n2024-01-02,8\n"
TWO_DAYS = [(FIRST, 7.5), (SECOND, 8.0)]


@pytest.mark.parametrize(
    ("text", "encoding"),
    [
        pytest.param(f"day,x\n{BODY}", "utf-8-sig", id="byte order mark"),
        pytest.param(f"day,x\n{BODY}", "utf-16", id="UTF-16 with a mark"),
        pytest.param(f"day,größe\n{BODY}", "cp1252", id="Western code page"),
        pytest.param(f"day,x\n{BODY}".replace(",", ";"), "utf-8", id="semicolon"),
        pytest.param(f"day,x\n{BODY}".replace(",", "\t"), "utf-8", id="tab"),
        pytest.param(f"day,x\n{BODY}".replace(",", "|"), "utf-8", id="upright stroke"),
        pytest.param("day;x\n2024-01-01;7,5\n2024-01-02;8\n", "utf-8", id="decimal comma"),
        pytest.param(f"day,x\n{BODY}".replace("\n", "\r\n"), "utf-8", id="CRLF"),
        pytest.param(f"day,x\n{BODY}".replace("\n", "\r"), "utf-8", id="CR"),
        pytest.param(f"day,x\n{BODY}", "utf-8", id="LF"),
        pytest.param(f"\n\nday,x\n\n{BODY}\n\n", "utf-8", id="blank lines"),
        pytest.param(f"The log of a year\nkept at home\nday,x\n{BODY}", "utf-8", id="title lines"),
        pytest.param('day,x,note\n2024-01-01,7.5,"a\nb"\n2024-01-02,8,\n', "utf-8", id="quoted newline"),
        pytest.param("day,x,\n2024-01-01,7.5,\n2024-01-02,8,\n", "utf-8", id="trailing comma"),
        pytest.param("day,x\n2024-01-02,8\n2024-01-01,7.5\n", "utf-8", id="unsorted"),
        pytest.param("day,x\n2024-01-01T23:59:59+14:00,7.5\n2024-01-02T00:00:00-12:00,8\n", "utf-8", id="zones"),
        pytest.param("day,x\n2024-01-01,7h30\n2024-01-02,8h00\n".replace("x", "x (h)"), "utf-8", id="7h30"),
    ],
)
def test_this_shape_of_file_is_read(text, encoding):
    reading = read(text, encoding)
    assert sorted(pairs(reading)) == TWO_DAYS
    assert reading.encoding_guessed == (encoding == "cp1252")


def test_ragged_rows_are_told_and_never_shift():
    reading = read("day,x,y\n2024-01-01,1,2\n2024-01-02,3\n2024-01-03,4,5,6\n")
    assert aside(reading) == [(3, "too few cells"), (4, "too many cells")]
    assert (pairs(reading, "x"), pairs(reading, "y")) == ([(FIRST, 1)], [(FIRST, 2)])


def test_a_third_cell_on_every_line_does_not_become_the_value():
    assert refusal("day,x\n2024-01-01,5,9\n2024-01-02,6,8\n").reason == "no days read"


def test_header_names_that_stand_twice():
    reading = read("day,x,x\n2024-01-01,1,2\n")
    assert (pairs(reading, "x"), pairs(reading, "x 2")) == ([(FIRST, 1)], [(FIRST, 2)])


def test_duplicate_days_are_all_kept_and_told():
    reading = read("day,x\n2024-01-01,1\n2024-01-01,2\n")
    assert (pairs(reading), reading.several_a_day) == ([(FIRST, 1), (FIRST, 2)], (FIRST,))


def test_missing_days_stay_missing():
    assert pairs(read("day,x\n2024-01-01,1\n2024-01-03,2\n")) == [(FIRST, 1), (THIRD, 2)]


def test_128_over_79_is_upper_and_lower():
    reading = read("day,x\n2024-01-01,128/79\n")
    assert (pairs(reading, "x upper"), pairs(reading, "x lower")) == ([(FIRST, 128)], [(FIRST, 79)])


@pytest.mark.parametrize(
    ("cell", "minutes"), [("1:05", 65), ("1h05", 65), ("6h45", 405), ("45 min", 45), ("0:00", 0)]
)
def test_a_duration_becomes_minutes(cell, minutes):
    column = read(f"day,x (min)\n2024-01-01,{cell}\n").columns[0]
    assert ([value.value for value in column.values], column.unit) == ([minutes], "min")


def test_minutes_and_seconds_are_not_taken_for_hours():
    assert aside(read("day,x (min)\n2024-01-01,30\n2024-01-02,45:30\n")) == [(3, "unclear duration")]


@pytest.mark.parametrize(
    ("cell", "reason"),
    [
        ("~40", "not exact"),
        (">30", "not exact"),
        ("<5", "not exact"),
        ("45 reps", "unknown unit"),
        ("-5", "negative"),
        ("1500", "more than a day"),
        ("1_000", "not a number"),
        ("nan", "not a number"),
        ("infinity", "not a number"),
        ("1e999", "not a number"),
        ("9" * 400, "not a number"),
        ("1e-400", "not a number"),
        ("1e400", "not a number"),
        ("None", "not a number"),
        ("True", "not a number"),
        ("0x1F", "not a number"),
        ("1 2", "not a number"),
        ("5" * 20, "out of range"),
    ],
)
def test_a_cell_that_is_no_value_is_set_aside_with_its_line(cell, reason):
    assert aside(read(f"day,x (min)\n2024-01-01,30\n2024-01-02,31\n2024-01-03,{cell}\n")) == [(4, reason)]


def test_25_hours_of_sleep_are_refused():
    assert aside(read("day,x (h)\n2024-01-01,8\n2024-01-02,25\n")) == [(3, "more than a day")]


def test_a_lower_pressure_above_the_upper_is_refused():
    assert aside(read("day,x\n2024-01-01,128/79\n2024-01-02,79/128\n")) == [(3, "pair reversed")]


@pytest.mark.parametrize("cell", ["NA", "N/A", "null", "NULL", "", "-"])
def test_words_for_nothing_are_blank_and_never_zero(cell):
    reading = read(f"day,x\n2024-01-01,5\n2024-01-02,{cell}\n")
    assert (pairs(reading), [fate.status for fate in reading.fates]) == ([(FIRST, 5)], ["kept", "blank"])


@pytest.mark.parametrize(
    ("cell", "value"),
    [("−5", -5), ("٤٢", 42), ("４２", 42), ("1٫5", 1.5), ("1\u00a0250", 1250), ("1’250.5", 1250.5)],
)
def test_signs_and_digits_of_other_scripts_are_read(cell, value):
    decimals = {} if "٫" not in cell else {"decimal": ","}
    assert pairs(read(f"day;x\n2024-01-01;3\n2024-01-02;{cell}\n", **decimals)) == [(FIRST, 3), (SECOND, value)]


@pytest.mark.parametrize(
    ("text", "reason"),
    [
        pytest.param("day,x\n45292,5\n45293,6\n", "which day column", id="spreadsheet numbers"),
        pytest.param("day,x\n20240101,5\n20240102,6\n", "which day column", id="eight digits"),
        pytest.param("day,x\n03/04/2026,5\n", "which day order", id="day or month first"),
        pytest.param("day,x\n3-Mar-26,5\n", "which century", id="two-digit year"),
        pytest.param('day,x\n2024-01-01,"1.234"\n', "which decimal mark", id="German thousand or decimals"),
        pytest.param('day,x\n2024-01-01,"1,234"\n', "which decimal mark", id="English thousand or decimals"),
    ],
)
def test_what_is_open_is_asked(text, reason):
    assert refusal(text).reason == reason


@pytest.mark.parametrize("year", ["68", "69", "99", "00"])
def test_no_two_digit_year_turns_at_a_hidden_year(year):
    assert refusal(f"day,x\n1-Mar-{year},5\n").reason == "which century"


@pytest.mark.parametrize("lines", [["13/02/2024,5", "01/02/2024,6"], ["01/02/2024,6", "13/02/2024,5"]])
def test_the_order_of_lines_does_not_decide_the_order_of_the_day(lines):
    found = dict(pairs(read("day,x\n" + "\n".join(lines) + "\n")))
    assert found == {date(2024, 2, 13): 5, date(2024, 2, 1): 6}


def test_a_week_date_is_no_day():
    assert aside(read("day,x\n2024-01-01,5\n2024-W01-2,6\n")) == [(3, "not a day")]


def test_an_unclosed_quote_swallows_no_other_line():
    text = 'day,x,note\n2024-01-01,5,"oh\n2024-01-02,6,y\n2024-01-03,7,z\n'
    assert len(list(csv.reader(io.StringIO(text)))) == 2
    reading = read(text)
    assert (pairs(reading), aside(reading)) == ([(SECOND, 6), (THIRD, 7)], [(2, "open quote")])


def test_a_zero_byte_is_no_text():
    assert refusal("day,x\n2024-01-01,5\0\n").reason == "not text"


@pytest.mark.parametrize(
    ("text", "what"),
    [
        pytest.param("2024-01-01" + ",5" * 100_000 + "\n", "columns", id="100,001 columns"),
        pytest.param("2024-01-01,5," + "x" * 140_000 + "\n", "cell", id="140,000 letters"),
        pytest.param("2024-01-01,5\n" * 200_003, "rows", id="too many rows"),
    ],
)
def test_a_file_made_to_fill_the_memory_is_refused(text, what):
    assert refusal(text).fields["what"] == what


def test_an_apostrophe_that_guards_a_formula_is_taken_off():
    assert read("day,'=1+1\n2024-01-01,5\n").candidates == ("=1+1",)


def test_a_formula_in_a_cell_is_never_worked_out():
    assert aside(read("day,x\n2024-01-01,5\n2024-01-02,=2+3\n")) == [(3, "not a number")]
