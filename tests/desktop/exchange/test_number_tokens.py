"""Number tokens against a table written by hand; no constant here comes from the code."""

import math

import pytest

from desktop.exchange.number_tokens import (
    NumberToken,
    Refusal,
    decide_decimal_mark,
    is_blank,
    read_number,
    read_typed,
)

READ_WITH_POINT = [
    ("7", 7.0, ""),
    ("0", 0.0, ""),
    ("007", 7.0, ""),
    ("7.5", 7.5, ""),
    (".5", 0.5, ""),
    ("0.250", 0.25, ""),
    ("-5", -5.0, ""),
    ("−5", -5.0, ""),
    ("+5", 5.0, ""),
    ("−7.25", -7.25, ""),
    ("1,234", 1234.0, ""),
    ("1,234.5", 1234.5, ""),
    ("12,345,678", 12345678.0, ""),
    ("1 234", 1234.0, ""),
    ("1\u00a0234.5", 1234.5, ""),
    ("1\u202f234", 1234.0, ""),
    ("1'234", 1234.0, ""),
    ("1’234.5", 1234.5, ""),
    (" 42 ", 42.0, ""),
    ("٤٢", 42.0, ""),
    ("４２．５", 42.5, ""),
    ("१२", 12.0, ""),
    ("45 min", 45.0, "min"),
    ("45min", 45.0, "min"),
    ("45 Minuten", 45.0, "min"),
    ("71.3 kg", 71.3, "kg"),
    ("1.5 h", 1.5, "h"),
    ("8,432 steps", 8432.0, "steps"),
    ("97 %", 97.0, "%"),
    ("36.6 °C", 36.6, "°C"),
    ("7/10", 7.0, "/10"),
    ("10/10", 10.0, "/10"),
    ("1000000000", 1e9, ""),
    ("-1000000000", -1e9, ""),
    ("0.00001", 0.00001, ""),
]

READ_WITH_COMMA = [
    ("7,5", 7.5, ""),
    (",5", 0.5, ""),
    ("1.234", 1234.0, ""),
    ("1.234,5", 1234.5, ""),
    ("12.345.678,25", 12345678.25, ""),
    ("1 234,5", 1234.5, ""),
    ("−0,5", -0.5, ""),
    ("71,3 kg", 71.3, "kg"),
    ("٧٫٥", 7.5, ""),
]

DURATIONS = [
    ("1:05", 65.0),
    ("0:45", 45.0),
    ("01:05", 65.0),
    ("1:05:30", 65.5),
    ("1h05", 65.0),
    ("6h45", 405.0),
    ("6 h 45 min", 405.0),
    ("6H5", 365.0),
    ("24:00", 1440.0),
]

REFUSED_WITH_POINT = [
    ("", "blank"),
    ("  ", "blank"),
    ("-", "blank"),
    ("–", "blank"),
    ("NA", "blank"),
    ("n/a", "blank"),
    ("null", "blank"),
    ("~40", "not exact"),
    (">30", "not exact"),
    ("<5", "not exact"),
    ("≥ 30", "not exact"),
    ("ca. 40", "not exact"),
    ("about 40", "not exact"),
    ("nan", "not a number"),
    ("inf", "not a number"),
    ("infinity", "not a number"),
    ("-inf", "not a number"),
    ("1_000", "not a number"),
    ("0x1F", "not a number"),
    ("1e5", "not a number"),
    ("1e999", "not a number"),
    ("9" * 400, "not a number"),
    ("1-2", "not a number"),
    ("30-40", "not a number"),
    ("5-", "not a number"),
    ("--5", "not a number"),
    ("(5)", "not a number"),
    ("5.", "not a number"),
    ("1,23,456", "not a number"),
    ("1.2.3", "not a number"),
    ("12 34", "not a number"),
    ("1,234 567", "not a number"),
    ("4x5", "not a number"),
    ("rest", "not a number"),
    ("none", "not a number"),
    ("½", "not a number"),
    ("²", "not a number"),
    ("=5", "not a number"),
    ("$5", "not a number"),
    ("3 sets of squats", "not a number"),
    ("12/8", "not a number"),
    ("1000000001", "out of range"),
    ("-1,000,000,001", "out of range"),
    ("45 reps", "unknown unit"),
    ("7,5", "other decimal mark"),
    ("0,250", "other decimal mark"),
    ("1.234,5", "other decimal mark"),
    ("45:30", "unclear duration"),
]


@pytest.mark.parametrize(("text", "value", "unit"), READ_WITH_POINT)
def test_a_number_is_read_with_a_decimal_point(text, value, unit):
    assert read_number(text, ".") == NumberToken("number", value, unit)


@pytest.mark.parametrize(("text", "value", "unit"), READ_WITH_COMMA)
def test_a_number_is_read_with_a_decimal_comma(text, value, unit):
    assert read_number(text, ",") == NumberToken("number", value, unit)


@pytest.mark.parametrize(("text", "minutes"), DURATIONS)
def test_hours_and_minutes_are_a_duration_in_minutes(text, minutes):
    assert read_number(text) == NumberToken("duration", minutes)


@pytest.mark.parametrize(("text", "reason"), REFUSED_WITH_POINT)
def test_anything_else_is_refused_with_its_reason(text, reason):
    assert read_number(text, ".") == Refusal(reason)


@pytest.mark.parametrize("text", ["128/79", "128 / 79", "１２８/７９"])
def test_two_numbers_with_a_stroke_are_a_pair(text):
    assert read_number(text) == NumberToken("pair", 128.0, "", 79.0)


def test_a_pair_keeps_its_unit():
    assert read_number("128/79 mmHg") == NumberToken("pair", 128.0, "mmHg", 79.0)


def test_a_negative_zero_is_zero():
    token = read_number("-0.0")
    assert isinstance(token, NumberToken)
    assert math.copysign(1, token.value) == 1


@pytest.mark.parametrize("text", ["9" * 4000, "1," * 2000, "1 " * 2000, "9" * 3999 + "x", "~" * 4000])
def test_a_very_long_text_is_refused(text):
    assert read_number(text) == Refusal("not a number")


@pytest.mark.parametrize(
    ("tokens", "mark"),
    [
        pytest.param(["5", "7", "12"], ".", id="no mark at all"),
        pytest.param([], ".", id="nothing"),
        pytest.param(["7.5", "8"], ".", id="one digit behind a point"),
        pytest.param(["7,5", "8"], ",", id="one digit behind a comma"),
        pytest.param(["71,25"], ",", id="two digits behind a comma"),
        pytest.param(["1.2345"], ".", id="four digits behind a point"),
        pytest.param(["1234.567"], ".", id="four digits before a point"),
        pytest.param(["0.250", "1.250"], ".", id="leading zero before a point"),
        pytest.param(["0,250", "1,250"], ",", id="leading zero before a comma"),
        pytest.param([".250"], ".", id="nothing before the point"),
        pytest.param(["1.234,5"], ",", id="point then comma"),
        pytest.param(["1,234.5"], ".", id="comma then point"),
        pytest.param(["1.234", "1.234,5"], ",", id="both marks in one cell settle the others"),
        pytest.param(["1.234.567"], ",", id="two points are thousands"),
        pytest.param(["1,234,567"], ".", id="two commas are thousands"),
        pytest.param(["1 234.567"], ".", id="a blank as thousands mark"),
        pytest.param(["1'234,567"], ",", id="an apostrophe as thousands mark"),
        pytest.param(["1.234"], None, id="one point and three digits"),
        pytest.param(["1,234"], None, id="one comma and three digits"),
        pytest.param(["1.234", "843", "12.500"], None, id="plain numbers settle nothing"),
        pytest.param(["-1.234 kg"], None, id="sign and unit settle nothing"),
        pytest.param(["7.5", "7,5"], None, id="contradiction"),
        pytest.param(["1.234", "1,234"], None, id="both marks, neither settled"),
        pytest.param(["1.234", "0.5"], ".", id="another cell settles it"),
        pytest.param(["12:30", "3.5.2024", "x.y", "~1,5"], ".", id="texts that are no numbers have no say"),
    ],
)
def test_the_decimal_mark_is_decided_by_all_cells_together(tokens, mark):
    assert decide_decimal_mark(tokens) == mark
    assert decide_decimal_mark(reversed(tokens)) == mark


@pytest.mark.parametrize("text", ["", " ", "-", "–", "—", "NA", "na", "N/A", "n.a.", "#N/A", "NULL"])
def test_these_cells_are_blank(text):
    assert is_blank(text)


@pytest.mark.parametrize("text", ["0", "none", "nan", "no", "x", "--"])
def test_these_cells_are_not_blank(text):
    assert not is_blank(text)


@pytest.mark.parametrize(
    ("text", "unit", "value"),
    [
        ("30", "minutes", 30.0),
        ("7,5", "hours", 7.5),
        ("7.5", "hours", 7.5),
        ("1,234", "", 1.234),
        ("1.234", "", 1.234),
        (" 71,3 ", "kg", 71.3),
        ("−2", "", -2.0),
        ("12 500", "steps", 12500.0),
        ("1:05", "minutes", 65.0),
        ("1h05", "min", 65.0),
        ("1:30", "hours", 1.5),
        ("6h45", "h", 6.75),
        ("45 min", "minutes", 45.0),
        ("90 min", "hours", 1.5),
        ("2 h", "min", 120.0),
        ("71,3 kg", "kg", 71.3),
        ("7/10", "/10", 7.0),
    ],
)
def test_a_typed_number_is_read_in_the_unit_of_its_measure(text, unit, value):
    assert read_typed(text, unit) == pytest.approx(value, abs=1e-12)


def test_one_hour_and_five_minutes_are_a_little_over_one_hour():
    assert read_typed("1:05", "hours") == pytest.approx(1.0833, abs=5e-5)


@pytest.mark.parametrize(
    ("text", "unit", "reason"),
    [
        ("", "min", "blank"),
        ("1.234,5", "", "not a number"),
        ("1.2.3", "", "not a number"),
        ("abc", "", "not a number"),
        ("nan", "", "not a number"),
        ("~40", "min", "not exact"),
        ("128/79", "mmHg", "pair"),
        ("1:05", "", "duration without unit"),
        ("1:05", "kg", "duration without unit"),
        ("45:30", "min", "unclear duration"),
        ("70 kg", "lb", "other unit"),
        ("70 kg", "", "other unit"),
        ("5 reps", "", "unknown unit"),
        ("2000000000", "", "out of range"),
    ],
)
def test_a_typed_text_that_is_no_value_is_refused(text, unit, reason):
    assert read_typed(text, unit) == Refusal(reason)
