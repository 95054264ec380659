"""Bringing in a table, one habit of files a test; what is expected is written by hand."""

from datetime import date

import pytest

from desktop.errors import ExchangeError
from desktop.exchange.bring_in import Reading, choose_column, read_file, read_table

FIRST, SECOND, THIRD, FOURTH = (date(2024, 1, number) for number in (1, 2, 3, 4))


def read(text: str, encoding: str = "utf-8", **answers) -> Reading:
    return read_table(text.encode(encoding), **answers)


def pairs(reading: Reading, name: str | None = None) -> list[tuple[date, float]]:
    column = choose_column(reading, name).columns[0]
    return [(value.day, value.value) for value in column.values]


def aside(reading: Reading) -> list[tuple[int, str]]:
    return [(fate.line, fate.reason) for fate in reading.set_aside]


def refusal(text: str, **answers) -> ExchangeError:
    with pytest.raises(ExchangeError) as caught:
        read(text, **answers)
    assert caught.value.reason in ExchangeError.reasons
    return caught.value


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


def test_a_header_that_stands_twice_gets_a_number():
    reading = read("day,minutes,minutes\n2024-01-01,5,6\n")
    assert reading.candidates == ("minutes", "minutes 2")


def test_an_apostrophe_against_formulas_is_taken_off_a_name():
    assert read("day,'=minutes\n2024-01-01,5\n").candidates == ("=minutes",)


@pytest.mark.parametrize(
    ("header", "name", "unit"),
    [
        ("minutes (min)", "minutes", "min"),
        ("Weight [kg]", "Weight", "kg"),
        ("Weight (lbs)", "Weight", "lb"),
        ("BP upper [mmHg]", "BP upper", "mmHg"),
        ("Pressure (mm[Hg])", "Pressure", "mmHg"),
        ("Pain (/10)", "Pain", "/10"),
        ("Weight (morning)", "Weight (morning)", ""),
        ("minutes", "minutes", ""),
    ],
)
def test_a_known_unit_in_the_header_is_split_off(header, name, unit):
    column = read(f"day,{header}\n2024-01-01,5\n").columns[0]
    assert (column.name, column.unit) == (name, unit)


def test_the_unit_most_cells_have_is_the_unit_of_the_column():
    reading = read("day,weight\n2024-01-01,71 kg\n2024-01-02,72 kg\n2024-01-03,158 lbs\n2024-01-04,73\n")
    assert reading.columns[0].unit == "kg"
    assert aside(reading) == [(4, "other unit")]


def test_minutes_and_hours_are_brought_to_the_unit_of_the_header():
    reading = read("day,sleep (h)\n2024-01-01,7.5\n2024-01-02,6h45\n2024-01-03,420 min\n2024-01-04,8:00\n")
    assert [value for _, value in pairs(reading)] == [7.5, 6.75, 7.0, 8.0]


def test_durations_alone_are_minutes_and_said_to_be_durations():
    column = read("day,walk\n2024-01-01,1:05\n2024-01-02,0:45\n2024-01-03,0\n").columns[0]
    assert ([value.value for value in column.values], column.unit, column.durations) == ([65, 45, 0], "min", True)


def test_durations_among_numbers_without_a_unit_are_not_guessed():
    reading = read("day,sleep\n2024-01-01,7\n2024-01-02,6h45\n2024-01-03,8\n")
    assert aside(reading) == [(3, "duration without unit")]


def test_a_column_of_pairs_becomes_two():
    reading = read("day,BP (mmHg)\n2024-01-01,128/79\n2024-01-02,131/82\n2024-01-03,\n2024-01-04,140\n")
    assert pairs(reading, "BP upper") == [(FIRST, 128), (SECOND, 131)]
    assert pairs(reading, "BP lower") == [(FIRST, 79), (SECOND, 82)]
    assert aside(reading) == [(5, "not a pair")]
    assert {(column.unit, column.pair) for column in reading.columns} == {("mmHg", "BP")}


def test_a_pair_with_the_lower_number_first_is_set_aside():
    assert aside(read("day,BP\n2024-01-01,128/79\n2024-01-02,79/128\n")) == [(3, "pair reversed")]


def test_a_column_of_pairs_asked_for_by_its_own_name_is_a_question():
    with pytest.raises(ExchangeError) as caught:
        choose_column(read("day,BP\n2024-01-01,128/79\n"), "BP")
    assert caught.value.reason == "which value column"
    assert caught.value.fields["choices"] == ["BP upper", "BP lower"]


def test_several_values_of_a_day_are_all_kept_and_listed():
    reading = read("day,minutes\n2024-01-01,20\n2024-01-01,10\n2024-01-01,5\n2024-01-02,30\n")
    assert [(value.slot, value.value) for value in reading.columns[0].values] == [
        ("", 20),
        ("2", 10),
        ("3", 5),
        ("", 30),
    ]
    assert reading.several_a_day == (FIRST,)


def test_one_value_a_day_has_no_slot_even_with_a_time():
    reading = read("day,pulse\n2024-01-01T08:00,60\n2024-01-02T20:00,61\n")
    assert [value.slot for value in reading.columns[0].values] == ["", ""]


@pytest.mark.parametrize(
    "text",
    [
        pytest.param(
            "day,pulse\n2024-01-01T08:00,60\n2024-01-01 12:00,61\n2024-01-01 15:00,62\n2024-01-01 15:10,63\n"
            "2024-01-02 11:59,64\n",
            id="beside the day",
        ),
        pytest.param(
            "day,time,pulse\n2024-01-01,08:00,60\n2024-01-01,12:00,61\n2024-01-01,15:00,62\n"
            "2024-01-01,15:10,63\n2024-01-02,11:59,64\n",
            id="in a column of its own",
        ),
        pytest.param(
            "day,at,pulse\n2024-01-01,8:00 am,60\n2024-01-01,12:00 pm,61\n2024-01-01,3:00 pm,62\n"
            "2024-01-01,3:10 pm,63\n2024-01-02,11:59 am,64\n",
            id="with am and pm",
        ),
    ],
)
def test_times_of_day_become_slots_where_days_have_several_values(text):
    values = read(text).columns[0].values
    assert [value.slot for value in values] == ["morning", "midday", "evening", "evening 2", "morning"]


def test_a_column_named_time_that_is_the_only_one_holds_the_values():
    assert pairs(read("day,time\n2024-01-01,1:05\n")) == [(FIRST, 65)]


@pytest.mark.parametrize(
    ("text", "reason", "choices"),
    [
        pytest.param("day,n\n03/04/2026,5\n", "which day order", ["dmy", "mdy"], id="day order"),
        pytest.param(
            "day,n\n13/04/2026,5\n04/13/2026,5\n", "which day order", ["dmy", "mdy"], id="contradictory order"
        ),
        pytest.param("day,n\n24-03-15,5\n", "which day order", ["dmy", "ymd"], id="order of a short year"),
        pytest.param("day,n\n3-Mar-24,5\n", "which century", [1900, 2000], id="century"),
        pytest.param('day,n\n2026-04-03,"1,234"\n', "which decimal mark", [".", ","], id="thousand or decimal"),
        pytest.param("day;n\n2026-04-03;1.234\n", "which decimal mark", [".", ","], id="the same with a point"),
        pytest.param("day;n\n2026-04-03;1.5\n2026-04-04;1,5\n", "which decimal mark", [".", ","], id="both"),
        pytest.param(
            "start,end,n\n2026-04-03,2026-04-05,5\n", "which day column", ["start", "end"], id="two day columns"
        ),
        pytest.param("a;b\n1871;1600\n1873;1700\n", "which day column", ["a", "b"], id="two columns of years"),
        pytest.param("when,n\n45292,5\n45293,6\n", "which day column", ["when"], id="spreadsheet numbers"),
        pytest.param("when,n\n20240101,5\n20240102,6\n", "which day column", ["when"], id="eight digits"),
    ],
)
def test_what_is_open_is_asked_and_nothing_is_read(text, reason, choices):
    error = refusal(text)
    assert (error.reason, error.fields["choices"]) == (reason, choices)


@pytest.mark.parametrize(
    ("text", "answers", "expected"),
    [
        pytest.param("day,n\n01/02/2024,5\n", {"day_order": "dmy"}, (date(2024, 2, 1), 5), id="day first"),
        pytest.param("day,n\n01/02/2024,5\n", {"day_order": "mdy"}, (date(2024, 1, 2), 5), id="month first"),
        pytest.param(
            "day,n\n24-03-15,5\n", {"day_order": "ymd", "century": 2000}, (date(2024, 3, 15), 5), id="short year"
        ),
        pytest.param("day;n\n2024-01-01;1.234\n", {"decimal": ","}, (FIRST, 1234), id="thousands"),
        pytest.param("day;n\n2024-01-01;1.234\n", {"decimal": "."}, (FIRST, 1.234), id="decimals"),
        pytest.param("a,b,n\n2023-12-31,2024-01-01,5\n", {"day_column": "b"}, (FIRST, 5), id="day column"),
        pytest.param("when,n\n45292,5\n", {"day_column": "When"}, (FIRST, 5), id="spreadsheet numbers"),
        pytest.param("when,n\n20240101,5\n", {"day_column": "when"}, (FIRST, 5), id="eight digits"),
    ],
)
def test_an_answer_settles_what_was_open(text, answers, expected):
    assert pairs(read(text, **answers), "n") == [expected]


def test_an_answer_does_not_overrule_what_the_cells_prove():
    assert pairs(read("day;n\n2024-01-01;7,5\n", decimal=".")) == [(FIRST, 7.5)]


def test_a_cell_with_the_other_decimal_mark_is_set_aside_once_the_mark_is_settled():
    reading = read("day;n\n2024-01-01;7.5\n2024-01-02;7,5\n", decimal=".")
    assert aside(reading) == [(3, "other decimal mark")]


def test_two_digit_years_beside_years_written_out_take_their_century():
    reading = read("day,n\n31/12/2023,4\n01/01/24,5\n02/01/24,6\n", day_order="dmy")
    assert [day.year for day, _ in pairs(reading)] == [2023, 2024, 2024]


def test_several_value_columns_are_all_read_when_none_is_named():
    reading = read("day,steps,minutes\n2024-01-01,100,5\n")
    assert {name: [value.value for value in values] for name, values in reading.values.items()} == {
        "steps": [100],
        "minutes": [5],
    }


def test_only_the_columns_asked_for_are_read():
    reading = read("day,steps,minutes\n2024-01-01,100,5\n", columns=["Minutes"])
    assert (list(reading.values), reading.candidates) == (["minutes"], ("steps", "minutes"))


def test_an_open_decimal_mark_in_another_column_is_not_asked():
    reading = read("day;steps;minutes\n2024-01-01;1.234;5\n", columns=["minutes"])
    assert pairs(reading) == [(FIRST, 5)]


def test_a_column_asked_for_by_its_whole_header_is_found():
    assert list(read("day,Weight [kg]\n2024-01-01,70\n", columns=["weight [KG]"]).values) == ["Weight"]


@pytest.mark.parametrize("name", ["Weight [kg]", "weight", "Weight", "bp UPPER"])
def test_a_name_that_finds_a_column_also_chooses_it(name):
    reading = read("day,Weight [kg],BP\n2024-01-01,70,128/79\n", columns=[name])
    assert len(choose_column(reading, name).columns) == 1


def test_half_of_a_column_that_holds_no_pairs_is_not_there():
    reading = read("day,BP\n2024-01-01,128\n", columns=["BP upper"])
    with pytest.raises(ExchangeError, match="unknown column"):
        choose_column(reading, "BP upper")


@pytest.mark.parametrize(
    "answers", [{"columns": ["hours upper"]}, {"columns": ["hours"]}, {"day_column": "hours"}]
)
def test_a_column_that_is_not_there_is_told_with_the_choices(answers):
    error = refusal("day,steps,minutes\n2024-01-01,100,5\n", **answers)
    assert error.reason == "unknown column"
    assert {"steps", "minutes"} <= set(error.fields["choices"])


def test_choosing_none_of_several_columns_is_a_question():
    with pytest.raises(ExchangeError) as caught:
        choose_column(read("day,steps,minutes\n2024-01-01,100,5\n"))
    assert caught.value.reason == "which value column"
    assert caught.value.fields["choices"] == ["steps", "minutes"]


def test_choosing_a_column_that_is_not_there_is_refused():
    with pytest.raises(ExchangeError) as caught:
        choose_column(read("day,steps,minutes\n2024-01-01,100,5\n"), "hours")
    assert caught.value.reason == "unknown column"


def test_the_fate_of_a_line_is_that_of_the_column_chosen():
    reading = read("day,steps,minutes\n2024-01-01,100,5\n2024-01-02,~9,6\n2024-01-03,,7\n2024-02-30,1,1\n")
    assert [fate.status for fate in reading.fates] == ["kept", "kept", "kept", "set aside"]
    chosen = choose_column(reading, "steps")
    assert [(fate.status, fate.reason) for fate in chosen.fates] == [
        ("kept", ""),
        ("set aside", "not exact"),
        ("blank", ""),
        ("set aside", "no such day"),
    ]


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
