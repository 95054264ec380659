"""Short ways to read a table in a test and to look at what became of it."""

from datetime import date

import pytest

from desktop.errors import ExchangeError
from desktop.exchange.bring_in import choose_column, read_table
from desktop.exchange.reading import Reading

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
