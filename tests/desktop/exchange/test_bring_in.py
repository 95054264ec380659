"""Bringing in a table, one habit of files a test; what is expected is written by hand."""

from datetime import date

import pytest

from desktop.errors import ExchangeError
from desktop.exchange.bring_in import read_file, read_table
from tests.desktop.exchange.reading import FIRST, FOURTH, SECOND, THIRD, aside, pairs, read, refusal

TWO_DAYS = [(FIRST, 7.5), (SECOND, 8.0)]


@pytest.mark.parametrize(
    ("text", "encoding"),
    [
        pytest.param("day,hours\n2024-01-01,7.5\n2024-01-02,8\n", "utf-8", id="plain"),
        pytest.param("day,hours\r\n2024-01-01,7.5\r\n2024-01-02,8\r\n", "utf-8", id="CRLF"),
        pytest.param("day,hours\r2024-01-01,7.5\r2024-01-02,8\r", "utf-8", id="CR"),
        pytest.param("day,hours\n2024-01-01,7.5\n2024-01-02,8", "utf-8", id="no last line end"),
        pytest.param("day,hours\n2024-01-01,7.5\n2024-01-02,8\n", "utf-8-sig", id="byte order mark"),
        pytest.param("day,hours\n2024-01-01,7.5\n2024-01-02,8\n", "utf-16", id="UTF-16 with mark"),
        pytest.param("\ufeffday,hours\n2024-01-01,7.5\n2024-01-02,8\n", "utf-16-be", id="UTF-16 big end first"),
        pytest.param("day;hours\n2024-01-01;7,5\n2024-01-02;8\n", "utf-8", id="semicolon and decimal comma"),
        pytest.param("day\thours\n2024-01-01\t7.5\n2024-01-02\t8\n", "utf-8", id="tab"),
        pytest.param("day|hours\n2024-01-01|7.5\n2024-01-02|8\n", "utf-8", id="upright stroke"),
        pytest.param("\n\nday,hours\n\n2024-01-01,7.5\n\n2024-01-02,8\n\n", "utf-8", id="blank lines"),
        pytest.param("day,hours\n,\n2024-01-01,7.5\n,,\n2024-01-02,8\n", "utf-8", id="lines of separators"),
        pytest.param("day,hours,\n2024-01-01,7.5,\n2024-01-02,8,\n", "utf-8", id="trailing separators"),
        pytest.param("day,hours\n2024-01-01,7.5,\n2024-01-02,8,,\n", "utf-8", id="trailing in data only"),
        pytest.param("day , hours\n 2024-01-01 , 7.5\n2024-01-02,\t8 \n", "utf-8", id="blanks around cells"),
        pytest.param('"day","hours"\n"2024-01-01","7.5"\n"2024-01-02","8"\n', "utf-8", id="all quoted"),
        pytest.param('day, "hours"\n2024-01-01, "7,5"\n2024-01-02, "8"\n', "utf-8", id="blank before a quote"),
        pytest.param('day,hours\n2024-01-01,"7,5"\n2024-01-02,8\n', "utf-8", id="quoted decimal comma"),
        pytest.param("day,hours\n2024-01-02,8\n2024-01-01,7.5\n", "utf-8", id="unsorted"),
        pytest.param("day,hours\n20240101x,9\n2024-01-01,7.5\n2024-01-02,8\n", "utf-8", id="first line broken"),
        pytest.param("day,hours\n2024-01-01,7.5 h\n2024-01-02,8 hours\n", "utf-8", id="unit in the cells"),
        pytest.param("day,hours (h)\n2024-01-01,7.5\n2024-01-02,8\n", "utf-8", id="unit in the header"),
        pytest.param("day,hours\n2024-01-01,7:30\n2024-01-02,8:00\n", "utf-8", id="h:mm"),
        pytest.param("day,hours\n2024-01-01,7h30\n2024-01-02,8\n", "utf-8", id="h and minutes"),
        pytest.param("sep=;\nday;hours\n2024-01-01;7.5\n2024-01-02;8\n", "utf-8", id="separator named on top"),
        pytest.param("My log\n\nday,hours\n2024-01-01,7.5\n2024-01-02,8\n", "utf-8", id="title line"),
        pytest.param("# by me\n# day,hours\n2024-01-01,7.5\n2024-01-02,8\n", "utf-8", id="comment lines"),
        pytest.param("Name;Ann\nday;hours\n2024-01-01;7.5\n2024-01-02;8\n", "utf-8", id="title of two cells"),
        pytest.param("Made;2024-05-01\nday;hours\n2024-01-01;7.5\n2024-01-02;8\n", "utf-8", id="title with a day"),
        pytest.param(",day,hours\n0,2024-01-01,7.5\n1,2024-01-02,8\n", "utf-8", id="index without a name"),
        pytest.param(",day,hours\n7,2024-01-01,7.5\n3,2024-01-02,8\n", "utf-8", id="index with gaps"),
        pytest.param("Unnamed: 0,day,hours\n0,2024-01-01,7.5\n1,2024-01-02,8\n", "utf-8", id="index made up"),
        pytest.param("no.,day,hours\n1,2024-01-01,7.5\n2,2024-01-02,8\n", "utf-8", id="running number"),
        pytest.param("1,2024-01-01,7.5\n2,2024-01-02,8\n", "utf-8", id="running number, no header"),
        pytest.param("day,hours\n1,2024-01-01,7.5\n2,2024-01-02,8\n", "utf-8", id="index without a header"),
        pytest.param("day,note,hours\n2024-01-01,slept 3 times,7.5\n2024-01-02,,8\n", "utf-8", id="notes"),
        pytest.param('day,note,hours\n2024-01-01,"a\nb",7.5\n2024-01-02,,8\n', "utf-8", id="quoted newline"),
        pytest.param('day,note,hours\n2024-01-01,"a ""b""",7.5\n2024-01-02,,8\n', "utf-8", id="doubled quote"),
        pytest.param('day,note,hours\n2024-01-01,5" tall,7.5\n2024-01-02,,8\n', "utf-8", id="quote inside"),
        pytest.param("weekday,day,hours\nMon,2024-01-01,7.5\nTue,2024-01-02,8\n", "utf-8", id="weekday column"),
        pytest.param("hours,day\n7.5,2024-01-01\n8,2024-01-02\n", "utf-8", id="day column last"),
        pytest.param(
            "from,to,hours\n2024-01-01,2024-01-01,7.5\n2024-01-02,2024-01-02,8\n", "utf-8", id="day twice"
        ),
        pytest.param("day,hours\n2024-01-01T22:00+05:00,7.5\n2024-01-02T01:00Z,8\n", "utf-8", id="time and zone"),
        pytest.param("day,hours\n13/01/2024,9\n01/01/2024,7.5\n02/01/2024,8\n", "utf-8", id="day first"),
        pytest.param("day;hours\nMonday, 1 January 2024;7.5\nTuesday, 2 January 2024;8\n", "utf-8", id="in words"),
        pytest.param('day,hours\n"Jan 1, 2024",7.5\n"Jan 2, 2024",8\n', "utf-8", id="comma in the day"),
        pytest.param("day,hours\n2024-01-01,7.5\n2024-01-02,8\nTotal,15.5\n", "utf-8", id="closing total"),
        pytest.param("day,hours\n２０２４-０１-０１,７.５\n2024-01-02,٨\n", "utf-8", id="other digits"),
        pytest.param("day,hours,hours\n2024-01-01,7.5,x\n2024-01-02,8,y\n", "utf-8", id="header twice"),
        pytest.param("day,hours" + "," * 300 + "\n2024-01-01,7.5\n2024-01-02,8\n", "utf-8", id="wide and blank"),
    ],
)
def test_a_file_in_this_shape_gives_the_same_two_days(text, encoding):
    found = [pair for pair in pairs(read(text, encoding)) if pair[0] in (FIRST, SECOND)]
    assert sorted(found) == TWO_DAYS


def test_letters_of_an_unnamed_encoding_are_a_guess_and_said_to_be_one():
    reading = read("Tag;Größe\n2024-01-01;5\n", "cp1252")
    assert (reading.encoding_guessed, reading.candidates) == (True, ("Größe",))


def test_letters_in_utf_8_are_no_guess():
    assert not read("Tag;Größe\n2024-01-01;5\n").encoding_guessed


@pytest.mark.parametrize(
    ("source", "reason"),
    [
        pytest.param(b"", "empty", id="nothing"),
        pytest.param(b"\xef\xbb\xbf", "empty", id="only a mark"),
        pytest.param(b" \r\n\t\n", "empty", id="only blanks"),
        pytest.param(b"PK\x03\x04rest", "workbook", id="zipped workbook"),
        pytest.param(b"\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1", "workbook", id="older workbook"),
        pytest.param(b"2024-01-01,5\0", "not text", id="zero byte"),
        pytest.param("2024-01-01,5".encode("utf-16-le"), "not text", id="UTF-16 without a mark"),
        pytest.param(b"\xff\xfe5", "not text", id="half a letter"),
        pytest.param(b"\xef\xbb\xbf\xff", "not text", id="mark of UTF-8, then not UTF-8"),
        pytest.param("2024-01-01,5".encode("utf-32"), "not text", id="UTF-32"),
        pytest.param(b"2024-01-01,\x81", "not text", id="letters no page has"),
        pytest.param(b"hello", "not a table", id="one word"),
        pytest.param(b"day\n2024-01-01\n2024-01-02\n", "not a table", id="days alone"),
        pytest.param(b"a,b\nc,d\n", "no day column", id="words"),
        pytest.param(b"a,b\n1,2\n3,4\n", "no day column", id="numbers"),
        pytest.param(b"day,note\n2024-01-01,fine\n", "no value column", id="notes alone"),
        pytest.param(b"day,minutes\n2024-01-01,\n", "no value column", id="blanks alone"),
        pytest.param(b"day,minutes\n2024-02-30,5\n2024-13-01,6\n", "no days read", id="no day of the calendar"),
    ],
)
def test_what_is_no_table_of_days_is_refused_with_one_reason(source, reason):
    with pytest.raises(ExchangeError) as caught:
        read_table(source)
    assert caught.value.reason == reason
    assert reason in ExchangeError.reasons


@pytest.mark.parametrize(
    ("source", "what"),
    [
        pytest.param(b"x" * 50_000_001, "bytes", id="bytes"),
        pytest.param(b"2024-01-01,5\n" * 200_002, "rows", id="rows"),
        pytest.param(b"\n" * 2_000_000 + b"x", "rows", id="blank lines"),
        pytest.param(b"2024-01-01" + b",5" * 64 + b"\n", "columns", id="columns"),
        pytest.param(b"2024-01-01,5," + b"x" * 4_001 + b"\n", "cell", id="cell"),
        pytest.param(b'2024-01-01,5,"' + b"x" * 200_000 + b'"\n', "cell", id="quoted cell"),
        pytest.param(b"," * 1_000_000, "cell", id="one long line"),
    ],
)
def test_what_is_too_large_says_what_and_the_limit(source, what):
    with pytest.raises(ExchangeError) as caught:
        read_table(source)
    assert caught.value.reason == "too large"
    assert caught.value.fields["what"] == what
    assert caught.value.fields["found"] > caught.value.fields["limit"]


def test_the_largest_table_is_read():
    days = [date.fromordinal(693_000 + number).isoformat() for number in range(100_000)]
    source = "day,n\n" + "".join(f"{day},{n}\n" for n in (1, 2) for day in days)
    assert len(read(source).fates) == 200_000


def test_sixty_four_columns_are_read():
    assert len(read("2024-01-01" + ",5" * 63 + "\n").candidates) == 63


@pytest.mark.parametrize(
    ("line", "reason"),
    [
        pytest.param(",5", "no day", id="no day"),
        pytest.param("n/a,5", "no day", id="day not available"),
        pytest.param("2024-02-30,5", "no such day", id="30 February"),
        pytest.param("1024-02-20,5", "day out of range", id="year 1024"),
        pytest.param("someday,5", "not a day", id="a word for a day"),
        pytest.param("2024-W01-1,5", "not a day", id="week day"),
        pytest.param("20240105,5", "not a day", id="eight digits among days"),
        pytest.param("45292,5", "not a day", id="spreadsheet number among days"),
        pytest.param("2024,5", "other period", id="a year among days"),
        pytest.param("2024-01,5", "other period", id="a month among days"),
        pytest.param("Total,5", "total row", id="total"),
        pytest.param("Summe:,5", "total row", id="total in German"),
        pytest.param("Average per day,5", "total row", id="average"),
        pytest.param("day,minutes", "header again", id="header again"),
        pytest.param("2024-01-01,30", "repeated", id="the same line again"),
        pytest.param("2024-01-05,5,9", "too many cells", id="a cell too many"),
        pytest.param("2024-01-05", "too few cells", id="a cell too few"),
        pytest.param('2024-01-05,"5', "open quote", id="open quote"),
        pytest.param('2024-01-05,"5"6', "open quote", id="letters behind a quote"),
        pytest.param("2024-01-05,~40", "not exact", id="about"),
        pytest.param("2024-01-05,>30", "not exact", id="more than"),
        pytest.param("2024-01-05,<5", "not exact", id="less than"),
        pytest.param("2024-01-05,ill", "not a number", id="a word for a number"),
        pytest.param("2024-01-05,nan", "not a number", id="nan"),
        pytest.param("2024-01-05,inf", "not a number", id="inf"),
        pytest.param("2024-01-05,1_000", "not a number", id="underscore"),
        pytest.param("2024-01-05,1e5", "not a number", id="exponent"),
        pytest.param("2024-01-05,=5", "not a number", id="formula"),
        pytest.param("2024-01-05,5000000000", "out of range", id="telephone number"),
        pytest.param("2024-01-05,5 reps", "unknown unit", id="unknown unit"),
        pytest.param("2024-01-05,5 km", "other unit", id="another unit"),
        pytest.param("2024-01-05,128/79", "pair", id="a pair among numbers"),
        pytest.param("2024-01-05,45:30", "unclear duration", id="minutes and seconds"),
        pytest.param("2024-01-05,-5", "negative", id="negative minutes"),
        pytest.param("2024-01-05,1500", "more than a day", id="25 hours"),
    ],
)
def test_one_line_is_set_aside_and_the_others_are_kept(line, reason):
    reading = read(
        f"day,minutes (min)\n2024-01-01,30\n2024-01-02,31.5\n{line}\n2024-01-04,33\n".replace(
            "day,minutes\n", "day,minutes (min)\n"
        )
    )
    assert aside(reading) == [(4, reason)]
    assert pairs(reading) == [(FIRST, 30), (SECOND, 31.5), (FOURTH, 33)]
    assert [fate.line for fate in reading.fates] == [2, 3, 4, 5]


def test_the_text_of_a_line_set_aside_is_kept():
    reading = read("day,minutes\n2024-01-01,30\n2024-02-30,5\n2024-01-02,~40\n")
    assert [fate.text for fate in reading.set_aside] == ["2024-02-30,5", "~40"]


@pytest.mark.parametrize("cell", ["", "-", "NA", "n/a", "null", "–", " "])
def test_a_blank_cell_is_a_day_without_a_value(cell):
    reading = read(f"day,minutes\n2024-01-01,30\n2024-01-02,{cell}\n")
    assert [fate.status for fate in reading.fates] == ["kept", "blank"]
    assert reading.columns[0].blanks == ((3, SECOND),)


def test_missing_days_stay_missing():
    assert pairs(read("day,minutes\n2024-01-01,30\n2024-01-04,31\n")) == [(FIRST, 30), (FOURTH, 31)]


def test_a_total_whose_day_is_blank_is_known_by_its_word():
    reading = read("day,note,minutes\n2024-01-01,x,30\n2024-01-02,y,30\n,Total,60\n")
    assert aside(reading) == [(4, "total row")]


def test_a_total_has_no_say_in_the_decimal_mark():
    assert pairs(read("day;steps\n2024-01-01;900\n2024-01-02;400\nTotal;1.300\n")) == [(FIRST, 900), (SECOND, 400)]


def test_an_open_quote_costs_its_own_line_and_no_other():
    text = 'day,minutes,note\n2024-01-01,30,"ill\n2024-01-02,31,x\n2024-01-03,32,"\n2024-01-04,33,"y\nz"\n'
    reading = read(text)
    assert aside(reading) == [(2, "open quote"), (4, "open quote")]
    assert [(value.line, value.day) for value in reading.columns[0].values] == [(3, SECOND), (5, FOURTH)]


def test_an_open_quote_far_from_the_next_one_costs_one_line():
    body = "".join(f"2024-01-{number:02},{number},x\n" for number in range(2, 32))
    reading = read(f'day,minutes,note\n2024-01-01,1,"x\n{body}2024-02-01,1,"x"\n')
    assert aside(reading) == [(2, "open quote")]
    assert len(reading.columns[0].values) == 31


def test_lines_are_counted_as_an_editor_counts_them():
    reading = read('title\n\nday,minutes,note\n2024-01-01,30,"a\nb\nc"\n\n2024-01-02,~5,\n')
    assert [fate.line for fate in reading.fates] == [4, 8]
    assert (reading.header_line, [skipped.line for skipped in reading.skipped]) == (3, [1])


def test_a_short_line_is_never_shifted():
    reading = read("day,steps,minutes\n2024-01-01,100,30\n2024-01-02,40\n2024-01-03,300,50\n")
    assert aside(reading) == [(3, "too few cells")]


def test_a_line_short_of_a_note_only_is_kept():
    reading = read("day,minutes,note\n2024-01-01,30,x\n2024-01-02,40\n2024-01-03,50,y\n")
    assert pairs(reading) == [(FIRST, 30), (SECOND, 40), (THIRD, 50)]


def test_a_decimal_comma_cut_in_two_is_never_read_as_a_value():
    error = refusal("day,value\n2024-01-01,5,9\n2024-01-02,6,1\n")
    assert (error.reason, error.fields["reasons"]) == ("no days read", {"too many cells": 2})


def test_columns_without_a_header_are_numbered():
    reading = read("2024-01-01;5\n2024-01-02;6\n")
    assert (reading.header_line, reading.day_column, reading.candidates) == (None, "column 1", ("column 2",))


def test_a_title_is_not_taken_for_the_header():
    reading = read("My minutes\n2024-01-01;5\n2024-01-02;6\n")
    assert (reading.header_line, [skipped.text for skipped in reading.skipped]) == (None, ["My minutes"])


def test_a_broken_first_line_without_a_header_is_set_aside_and_not_lost():
    assert aside(read("2024-02-30;4\n2024-01-01;5\n2024-01-02;6\n")) == [(1, "no such day")]


def test_a_file_that_is_missing_says_so(tmp_path):
    with pytest.raises(ExchangeError) as caught:
        read_file(tmp_path / "no.csv")
    assert (caught.value.reason, caught.value.fields) == ("missing", {"path": str(tmp_path / "no.csv")})


@pytest.mark.parametrize("name", ["", "a\0b"])
def test_a_path_that_is_no_file_cannot_be_opened(tmp_path, name):
    with pytest.raises(ExchangeError) as caught:
        read_file(tmp_path / name)
    assert caught.value.reason == "cannot open"


def test_a_file_is_read_like_its_bytes(tmp_path):
    (tmp_path / "log.csv").write_bytes(b"day,minutes\n2024-01-01,5\n")
    assert read_file(tmp_path / "log.csv") == read("day,minutes\n2024-01-01,5\n")
