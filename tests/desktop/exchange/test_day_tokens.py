"""Day tokens against a table written by hand; no constant here comes from the code."""

from datetime import date, time

import pytest

from desktop.exchange.day_tokens import compact_day, decide_day_order, parse_day, parse_time, serial_day

THIRD_OF_MARCH = date(2025, 3, 3)
FIFTH_OF_MARCH = date(2025, 3, 5)

NEEDS_NO_ORDER = [
    ("2025-03-05", FIFTH_OF_MARCH),
    ("2025-3-5", FIFTH_OF_MARCH),
    ("2025/03/05", FIFTH_OF_MARCH),
    ("2025.03.05", FIFTH_OF_MARCH),
    ("2025 03 05", FIFTH_OF_MARCH),
    ("２０２５-０３-０５", FIFTH_OF_MARCH),
    ("5 March 2025", FIFTH_OF_MARCH),
    ("5th March 2025", FIFTH_OF_MARCH),
    ("March 5, 2025", FIFTH_OF_MARCH),
    ("Mar 5 2025", FIFTH_OF_MARCH),
    ("5-Mar-2025", FIFTH_OF_MARCH),
    ("05 MAR 2025", FIFTH_OF_MARCH),
    ("the 5th of March 2025", FIFTH_OF_MARCH),
    ("2025 March 5", FIFTH_OF_MARCH),
    ("5 mars 2025", FIFTH_OF_MARCH),
    ("1er février 2025", date(2025, 2, 1)),
    ("14 févr. 2025", date(2025, 2, 14)),
    ("31 août 2025", date(2025, 8, 31)),
    ("25 déc. 2025", date(2025, 12, 25)),
    ("5. März 2025", FIFTH_OF_MARCH),
    ("5. Mrz. 2025", FIFTH_OF_MARCH),
    ("3. Okt 2025", date(2025, 10, 3)),
    ("24. Dezember 2025", date(2025, 12, 24)),
    ("5 de marzo de 2025", FIFTH_OF_MARCH),
    ("6 ene 2025", date(2025, 1, 6)),
    ("2 septiembre 2025", date(2025, 9, 2)),
    ("Wed 2025-03-05", FIFTH_OF_MARCH),
    ("Wednesday, 5 March 2025", FIFTH_OF_MARCH),
    ("mercredi 5 mars 2025", FIFTH_OF_MARCH),
    ("Mi. 5. März 2025", FIFTH_OF_MARCH),
    ("mié, 5 mar 2025", FIFTH_OF_MARCH),
    ("mar 4 mars 2025", date(2025, 3, 4)),
    ("2025-03-05 (Wed)", FIFTH_OF_MARCH),
    ("2025-03-05 Mi", FIFTH_OF_MARCH),
    ("2024-02-29", date(2024, 2, 29)),
]

WITH_A_TIME = [
    ("2025-03-05T23:30:00+02:00", FIFTH_OF_MARCH, time(23, 30)),
    ("2025-03-05T00:15:00Z", FIFTH_OF_MARCH, time(0, 15)),
    ("2025-03-05T08:15:59.123456-0500", FIFTH_OF_MARCH, time(8, 15)),
    ("2025-03-05 08:15", FIFTH_OF_MARCH, time(8, 15)),
    ("2025-03-05 8:15 pm", FIFTH_OF_MARCH, time(20, 15)),
    ("2025-03-05 12:05 a.m.", FIFTH_OF_MARCH, time(0, 5)),
    ("2025-03-05, 8h15", FIFTH_OF_MARCH, time(8, 15)),
    ("5 March 2025 at 08:15", FIFTH_OF_MARCH, time(8, 15)),
    ("31 August 2025 08:15", date(2025, 8, 31), time(8, 15)),
]

NEEDS_AN_ORDER = [
    ("03/04/2025", {"dmy": date(2025, 4, 3), "mdy": date(2025, 3, 4)}),
    ("3.4.2025", {"dmy": date(2025, 4, 3), "mdy": date(2025, 3, 4)}),
    ("3. 4. 2025", {"dmy": date(2025, 4, 3), "mdy": date(2025, 3, 4)}),
    ("3-4-2025", {"dmy": date(2025, 4, 3), "mdy": date(2025, 3, 4)}),
    ("03 04 2025", {"dmy": date(2025, 4, 3), "mdy": date(2025, 3, 4)}),
    ("13/02/2025", {"dmy": date(2025, 2, 13)}),
    ("02/13/2025", {"mdy": date(2025, 2, 13)}),
    ("So 03.04.2025", {"dmy": date(2025, 4, 3), "mdy": date(2025, 3, 4)}),
    ("03/04/2025 07:10", {"dmy": date(2025, 4, 3), "mdy": date(2025, 3, 4)}),
    ("32/13/2025", {}),
    ("29/02/2023", {}),
]

NO_SUCH_DAY = ["2025-02-30", "2025-13-01", "2025-00-10", "2023-02-29", "1750-01-01", "2300-01-01", "31 June 2025"]

NO_DAY = [
    "",
    "x",
    "5",
    "7.5",
    "42",
    "1.234",
    "1.234.567",
    "20240101",
    "2024-W01-1",
    "2024-001",
    "45292",
    "1499",
    "2200",
    "1871.5",
    "2025-03/05",
    "2025-03-05-07",
    "2025-03-05T25:00",
    "2025-03-05 and more",
    "03/04/205",
    "March",
    "5 March",
    "Monday",
    "Monday 2025",
    "5 Mar Apr 2025",
    "5 Thermidor 2025",
    "128/79",
    "1:05",
    "08:15",
    "1 2 3",
    "٣",
    "5²03²2025",
    "9" * 5000,
    "2025-03-05" * 500,
]


@pytest.mark.parametrize(("text", "day"), NEEDS_NO_ORDER)
def test_a_day_that_needs_no_order_is_read(text, day):
    token = parse_day(text)
    assert token is not None
    assert (token.period, token.readings()) == ("day", {None: day})


@pytest.mark.parametrize(("text", "day", "clock"), WITH_A_TIME)
def test_the_written_calendar_day_counts_whatever_the_zone(text, day, clock):
    token = parse_day(text)
    assert token is not None
    assert (token.readings(), token.clock) == ({None: day}, clock)


@pytest.mark.parametrize(("text", "readings"), NEEDS_AN_ORDER)
def test_a_day_that_needs_an_order_has_every_reading_of_the_calendar(text, readings):
    token = parse_day(text)
    assert token is not None
    assert token.readings() == readings


@pytest.mark.parametrize("text", NO_SUCH_DAY)
def test_the_shape_of_a_day_is_not_yet_a_day(text):
    token = parse_day(text)
    assert token is not None
    assert token.readings() == {}


@pytest.mark.parametrize("text", NO_DAY)
def test_anything_else_is_no_day(text):
    assert parse_day(text) is None


@pytest.mark.parametrize(
    ("text", "period", "day"),
    [
        ("2024-03", "month", date(2024, 3, 1)),
        ("2024/3", "month", date(2024, 3, 1)),
        ("03/2024", "month", date(2024, 3, 1)),
        ("March 2024", "month", date(2024, 3, 1)),
        ("Mar-2024", "month", date(2024, 3, 1)),
        ("Sept. 2024", "month", date(2024, 9, 1)),
        ("mars 2024", "month", date(2024, 3, 1)),
        ("1749-01", "month", date(1749, 1, 1)),
        ("1871", "year", date(1871, 1, 1)),
        ("1871.0", "year", date(1871, 1, 1)),
        ("1871,0", "year", date(1871, 1, 1)),
        ("1500", "year", date(1500, 1, 1)),
        ("2199", "year", date(2199, 1, 1)),
    ],
)
def test_a_month_and_a_year_are_rows_of_their_own_kind(text, period, day):
    token = parse_day(text)
    assert token is not None
    assert (token.period, token.readings()) == (period, {None: day})


@pytest.mark.parametrize(
    ("text", "century", "readings"),
    [
        ("13/02/99", 1900, {"dmy": date(1999, 2, 13)}),
        ("31.12.24", 2000, {"dmy": date(2024, 12, 31), "ymd": date(2031, 12, 24)}),
        ("5/3/24", 2000, {"dmy": date(2024, 3, 5), "mdy": date(2024, 5, 3)}),
        ("24-03-5", 2000, {"ymd": date(2024, 3, 5)}),
        (
            "24-03-15",
            2000,
            {"dmy": date(2015, 3, 24), "ymd": date(2024, 3, 15)},
        ),
        ("3-Mar-24", 2000, {None: date(2024, 3, 3)}),
        ("29/02/00", 1900, {}),
    ],
)
def test_a_short_year_takes_the_century_it_is_given(text, century, readings):
    token = parse_day(text)
    assert token is not None
    assert token.short_year
    assert token.readings(century) == readings


@pytest.mark.parametrize(
    ("tokens", "order"),
    [
        pytest.param(["2025-03-05", "2025-04-06"], "ymd", id="year first"),
        pytest.param(["5 March 2025"], "ymd", id="a month by name needs no order"),
        pytest.param([], "ymd", id="nothing to order"),
        pytest.param(["01/02/2024", "13/02/2024"], "dmy", id="a later line settles day first"),
        pytest.param(["13/02/2024", "01/02/2024"], "dmy", id="an earlier line settles day first"),
        pytest.param(["01/02/2024", "02/13/2024"], "mdy", id="one line settles month first"),
        pytest.param(["01/02/2024", "32/13/2024", "13/02/2024"], "dmy", id="an impossible line has no say"),
        pytest.param(["03/04/2026"], None, id="two orders fit"),
        pytest.param(["03/04/2026", "05/06/2026"], None, id="two orders fit all lines"),
        pytest.param(["2026-01-01", "03/04/2026"], None, id="year first elsewhere settles nothing"),
        pytest.param(["13/02/2024", "02/13/2024"], None, id="contradiction"),
        pytest.param(["03/03/2024", "04/04/2024"], "dmy", id="both orders give the same days"),
        pytest.param(["24-03-15", "24-03-16"], None, id="a short year at either end"),
        pytest.param(["24-03-15", "24-13-16", "31-03-15"], None, id="a short year at either end, longer"),
    ],
)
def test_the_order_is_decided_by_all_lines_together(tokens, order):
    assert decide_day_order(tokens) == order
    assert decide_day_order(reversed(tokens)) == order


@pytest.mark.parametrize(
    ("text", "clock"),
    [
        ("08:15", time(8, 15)),
        ("8h15", time(8, 15)),
        ("23:59:59", time(23, 59)),
        ("12:00 AM", time(0, 0)),
        ("12:30pm", time(12, 30)),
        ("1:05 p.m.", time(13, 5)),
        ("24:00", None),
        ("8:60", None),
        ("8", None),
        ("morning", None),
    ],
)
def test_a_time_of_day(text, clock):
    assert parse_time(text) == clock


@pytest.mark.parametrize(
    ("text", "day"),
    [
        ("45292", date(2024, 1, 1)),
        ("45292.0", date(2024, 1, 1)),
        ("20000", date(1954, 10, 3)),
        ("60000", date(2064, 4, 8)),
        ("19999", None),
        ("60001", None),
        ("45292.5", None),
    ],
)
def test_a_spreadsheet_day_number(text, day):
    assert serial_day(text) == day


@pytest.mark.parametrize(
    ("text", "day"), [("20240229", date(2024, 2, 29)), ("20230229", None), ("2024022", None), ("x", None)]
)
def test_a_day_of_eight_digits(text, day):
    assert compact_day(text) == day
