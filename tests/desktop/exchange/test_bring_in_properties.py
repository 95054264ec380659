"""What must hold for any file at all, and for tables put together from tokens whose meaning is written by hand."""

import math
import random
from datetime import date, timedelta

import pytest
from hypothesis import HealthCheck, example, given, settings
from hypothesis import strategies as st

from desktop.errors import ExchangeError
from desktop.exchange.bring_in import choose_column, read_table
from desktop.exchange.reading import Reading

ORDERS = {"dmy": "%d/%m/%Y", "mdy": "%m/%d/%Y", "ymd": "%Y-%m-%d"}
SCRAPS = st.sampled_from(
    ["2024-01-01", "03/04/2025", "13/04/2025", "1871", "45292", "5", "7,5", "1.234", "128/79", "1:05", "~40",
     "NA", "Total", "day", "minutes (min)", '"', '""', ",", ";", "\t", "|", "\n", "\r\n", " ", "\ufeff", "−5",
     "1_000", "nan", "\u2028", "\x0b", "٤٢", "=1+1", "31-12-99", "8:15 pm", "x", "#", "a\nb", "2024-02-30"]
)  # fmt: skip
HEADS = st.sampled_from([b"", b"\xef\xbb\xbf", b"\xff\xfe", b"\xfe\xff", b"PK\x03\x04"])


def lines_of(reading: Reading) -> list[int]:
    return [fate.line for fate in reading.fates]


def reading_or_error(source: bytes) -> Reading | ExchangeError:
    try:
        return read_table(source)
    except ExchangeError as error:
        return error


def check_invariants(source: bytes) -> None:
    reading = reading_or_error(source)
    if isinstance(reading, ExchangeError):
        assert reading.reason in ExchangeError.reasons
        return
    lines = lines_of(reading)
    assert lines == sorted(set(lines))
    for column in reading.columns:
        chosen = choose_column(reading, column.name)
        assert lines_of(chosen) == lines
        statuses = [fate.status for fate in chosen.fates]
        assert statuses.count("kept") == len(column.values)
        assert statuses.count("blank") == len(column.blanks)
        assert all(math.isfinite(value.value) and abs(value.value) <= 1e9 for value in column.values)
        assert len({(value.day, value.slot) for value in column.values}) == len(column.values)
    assert all(fate.reason for fate in reading.set_aside)


@settings(max_examples=300)
@given(st.binary(max_size=400))
@example(b"2024-01-01;5\x85\n")
def test_any_bytes_give_a_reading_or_one_refusal(source):
    check_invariants(source)


@settings(max_examples=500)
@given(HEADS, st.lists(SCRAPS, max_size=60), st.sampled_from(["utf-8", "utf-16-le", "cp1252"]))
def test_any_scraps_of_tables_give_a_reading_or_one_refusal(head, scraps, encoding):
    check_invariants(head + "".join(scraps).encode(encoding, errors="replace"))


@settings(max_examples=300)
@given(
    st.sampled_from([";", ",", "\t", "|"]),
    st.lists(
        st.lists(SCRAPS.filter(lambda scrap: len(scrap) > 1), min_size=1, max_size=4), min_size=1, max_size=12
    ),
)
def test_any_rows_of_scraps_give_a_reading_or_one_refusal(separator, rows):
    check_invariants("\n".join(separator.join(row) for row in rows).encode())


DAYS = st.dates(date(1990, 1, 1), date(2035, 12, 31))
TENTHS = st.integers(-99_999, 99_999)


@settings(max_examples=400, suppress_health_check=[HealthCheck.too_slow])
@given(
    logged=st.dictionaries(DAYS, TENTHS, min_size=1, max_size=30),
    order=st.sampled_from(sorted(ORDERS)),
    mark=st.sampled_from([".", ","]),
    separator=st.sampled_from([";", "\t"]),
    encoding=st.sampled_from(["utf-8", "utf-8-sig", "utf-16"]),
    newline=st.sampled_from(["\n", "\r\n"]),
    header=st.booleans(),
)
def test_a_table_comes_back_as_it_was_written(logged, order, mark, separator, encoding, newline, header):
    rows = [
        f"{day.strftime(ORDERS[order])}{separator}{f'{tenths / 10:.1f}'.replace('.', mark)}"
        for day, tenths in logged.items()
    ]
    text = newline.join(([f"day{separator}größe"] if header else []) + rows) + newline
    reading = read_table(text.encode(encoding), day_order=None if order == "ymd" else order)
    read = {value.day: value.value for value in reading.columns[0].values}
    assert read == {day: tenths / 10 for day, tenths in logged.items()}
    assert reading.candidates == (("größe",) if header else ("column 2",))


@settings(max_examples=200)
@given(
    days=st.lists(DAYS, min_size=1, max_size=30, unique=True),
    order=st.sampled_from(["dmy", "mdy"]),
)
def test_an_order_is_settled_by_a_day_past_the_twelfth_or_asked(days, order):
    source = "".join(f"{day.strftime(ORDERS[order])};5\n" for day in days).encode()
    if all(day.day <= 12 for day in days) and any(day.day != day.month for day in days):
        with pytest.raises(ExchangeError, match="which day order"):
            read_table(source)
    else:
        assert {value.day for value in read_table(source).columns[0].values} == set(days)


@settings(max_examples=200)
@given(st.lists(st.integers(1, 999), min_size=1, max_size=20), st.sampled_from([".", ","]))
def test_thousands_or_decimals_are_asked_and_the_answer_is_followed(heads, mark):
    first = date(2024, 1, 1)
    days = [first + timedelta(number) for number in range(len(heads))]
    source = "".join(f"{day};{head}{mark}250\n" for day, head in zip(days, heads, strict=True)).encode()
    with pytest.raises(ExchangeError, match="which decimal mark"):
        read_table(source)
    decimals = read_table(source, decimal=mark).columns[0].values
    assert [value.value for value in decimals] == [head + 0.25 for head in heads]
    thousands = read_table(source, decimal="," if mark == "." else ".").columns[0].values
    assert [value.value for value in thousands] == [head * 1000 + 250 for head in heads]


DAY_MEANINGS = [
    ("2025-03-05", date(2025, 3, 5)),
    ("2025/03/06", date(2025, 3, 6)),
    ("7.3.2025", date(2025, 3, 7)),
    ("08-03-2025", date(2025, 3, 8)),
    ("31/03/2025", date(2025, 3, 31)),
    ("9 March 2025", date(2025, 3, 9)),
    ("10. März 2025", date(2025, 3, 10)),
    ("mardi 11 mars 2025", date(2025, 3, 11)),
    ("12 de marzo de 2025", date(2025, 3, 12)),
    ("Mar 13, 2025", date(2025, 3, 13)),
    ("2025-03-14T23:59:59-11:00", date(2025, 3, 14)),
    ("2025-03-15 00:01Z", date(2025, 3, 15)),
    ("16/03/2025 8:15 pm", date(2025, 3, 16)),
    ("Mo 17.03.2025", date(2025, 3, 17)),
    ("30 February 2025", "no such day"),
    ("2025-02-29", "no such day"),
    ("1025-03-05", "day out of range"),
    ("20250318", "not a day"),
    ("2025-W12-2", "not a day"),
    ("soon", "not a day"),
    ("2025", "other period"),
    ("Summe", "total row"),
    ("", "no day"),
]
NUMBER_MEANINGS = [
    ("5", 5.0),
    ("7.5", 7.5),
    ("0.250", 0.25),
    ("-3", -3.0),
    ("−3.5", -3.5),
    ("1,234.5", 1234.5),
    ("12 500", 12500.0),
    ("٤٢", 42.0),
    ("6 points", 6.0),
    ("", None),
    ("NA", None),
    ("-", None),
    ("nan", "not a number"),
    ("1e3", "not a number"),
    ("1_000", "not a number"),
    ("0x10", "not a number"),
    ("~40", "not exact"),
    (">30", "not exact"),
    ("9999999999", "out of range"),
    ("5 kg", "other unit"),
    ("5 hugs", "unknown unit"),
    ("128/79", "pair"),
    ("1:05", "duration without unit"),
]


@settings(max_examples=300)
@given(
    st.lists(st.tuples(st.sampled_from(DAY_MEANINGS), st.sampled_from(NUMBER_MEANINGS)), max_size=20),
    st.sampled_from([";", "\t", "|"]),
)
def test_tokens_in_any_company_mean_what_they_mean_alone(pairs, separator):
    known = [("2024-12-31", "1.5"), ("30/12/2024", "2.5 points")] * 15
    rows = [(f"{day}", f"{number}") for (day, _), (number, _) in pairs]
    table = [(day, number, f"note {place}") for place, (day, number) in enumerate(known + rows)]
    source = f"day{separator}n{separator}note\n" + "\n".join(map(separator.join, table))
    reading = read_table(source.encode(), columns=["n"])
    for fate, ((_, day), (_, value)) in zip(reading.fates[len(known) :], pairs, strict=True):
        reason = day if isinstance(day, str) else value if isinstance(value, str) else ""
        assert fate.reason == reason
    expected = [value for (_, day), (_, value) in pairs if isinstance(day, date) and isinstance(value, float)]
    assert [value.value for value in reading.columns[0].values[len(known) :]] == expected


# A quote may run on into the next line, and words above all days are a header: there the place does matter.
NOT_BY_ITSELF = {'"', '""', "day", "minutes (min)", "x", "#"}
CELLS = SCRAPS.filter(lambda scrap: scrap.isprintable() and scrap not in NOT_BY_ITSELF)


@settings(max_examples=400)
@given(
    st.lists(st.tuples(CELLS, CELLS), min_size=2, max_size=15),
    st.randoms(use_true_random=False),
)
def test_the_order_of_lines_is_irrelevant(rows, shuffle: random.Random):
    lines = [f"{day.replace(';', '')};{value.replace(';', '')}" for day, value in rows]
    mixed = list(lines)
    shuffle.shuffle(mixed)
    assert outcome(lines) == outcome(mixed)


def outcome(lines: list[str]) -> object:
    reading = reading_or_error("\n".join(["day;n", *lines]).encode())
    if isinstance(reading, ExchangeError):
        return reading.reason
    values = sorted((value.day, value.value) for column in reading.columns for value in column.values)
    return values, sorted(fate.reason for fate in reading.fates)
