"""Monthly and yearly series, as data frame programs write them: the rows of an open data set among them."""

import warnings
from datetime import date

import pandas as pd
import pytest

from desktop.exchange.bring_in import read_table
from desktop.exchange.reading import Reading


@pytest.fixture(scope="module")
def nile() -> pd.DataFrame:
    """Yearly flow of the Nile 1871-1970, public domain, carried by statsmodels."""
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        from statsmodels.datasets import nile

    return nile.load_pandas().data


def check_nile(reading: Reading, name: str) -> None:
    assert (reading.period, reading.candidates, reading.set_aside) == ("year", (name,), ())
    values = reading.columns[0].values
    assert [values[place].day.year for place in (0, 27, 99)] == [1871, 1898, 1970]
    assert [values[place].value for place in (0, 27, 99)] == [1120, 1100, 740]


def test_a_frame_with_its_index_column(nile):
    assert nile.to_csv().startswith(",year,volume")
    check_nile(read_table(nile.to_csv().encode()), "volume")


def test_a_frame_without_its_index_column(nile):
    check_nile(read_table(nile.to_csv(index=False).encode()), "volume")


def test_a_frame_with_whole_years(nile):
    check_nile(read_table(nile.astype({"year": int}).to_csv(index=False).encode()), "volume")


def test_a_frame_with_decimal_commas(nile):
    check_nile(read_table(nile.to_csv(sep=";", decimal=",").encode()), "volume")


def test_a_named_series_by_year(nile):
    check_nile(read_table(nile.set_index("year")["volume"].to_csv().encode()), "volume")


def test_a_series_without_any_name(nile):
    series = pd.Series(nile["volume"].to_numpy(), index=nile["year"].to_numpy())
    assert series.to_csv().startswith(",0")
    check_nile(read_table(series.to_csv().encode()), "0")


def test_a_series_without_a_header(nile):
    source = nile.set_index("year")["volume"].to_csv(header=False)
    check_nile(read_table(source.encode()), "column 2")


def test_a_filtered_frame_whose_index_has_gaps(nile):
    reading = read_table(nile[nile["year"] > 1900].to_csv().encode())
    assert (reading.candidates, len(reading.columns[0].values)) == (("volume",), 70)


def test_years_written_as_first_of_january(nile):
    dated = pd.Series(nile["volume"].to_numpy(), index=pd.to_datetime(nile["year"].astype(int).astype(str)))
    reading = read_table(dated.to_csv().encode())
    assert (reading.columns[0].values[0].day, len(reading.columns[0].values)) == (date(1871, 1, 1), 100)


def test_months(nile):
    months = pd.Series(range(24), index=pd.period_range("2023-01", periods=24, freq="M"), name="rides")
    reading = read_table(months.to_csv().encode())
    assert (reading.period, reading.columns[0].values[-1].day) == ("month", date(2024, 12, 1))


def test_a_daily_index_with_a_blank_value():
    days = pd.Series([1.5, None, 3.0], index=pd.date_range("2024-02-28", periods=3), name="hours")
    reading = read_table(days.to_csv().encode())
    assert [fate.status for fate in reading.fates] == ["kept", "blank", "kept"]
    assert reading.columns[0].values[-1].day == date(2024, 3, 1)


def test_a_year_written_twice_keeps_both_values():
    reading = read_table(b"year,volume\n1871,10\n1872,11\n1872,12\n1873,12\n")
    assert reading.several_a_day == (date(1872, 1, 1),)


def test_a_value_column_that_could_be_years_is_no_day_column_beside_a_gap_free_one():
    reading = read_table(b"a,b\n1871,1520\n1872,1600\n1873,1800\n")
    assert (reading.day_column, reading.candidates) == ("a", ("b",))
