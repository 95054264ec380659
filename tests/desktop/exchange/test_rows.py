"""Text to rows: separators, quotes, limits."""

import pytest

from desktop.exchange.rows import choose_separator, split_rows


@pytest.mark.parametrize(
    ("lines", "separator"),
    [
        pytest.param(["2000-01-01;0,0"], ";", id="a decimal comma is no separator"),
        pytest.param(["2000-01-01,0;5"], ",", id="a semicolon in a value"),
        pytest.param(["2000-01-01\t0,5"], "\t", id="tab"),
        pytest.param(["2000-01-01|0,5"], "|", id="upright stroke"),
        pytest.param(["3 March 2025, evening;5", "2025-03-04;6"], ";", id="comma inside a day's cell"),
        pytest.param(["a;b;c", "d;e", "2000-01-01,5", "2000-01-02,6"], ",", id="title lines have no say"),
        pytest.param(["1;2024-01-01;7,5"], ";", id="days in the second cell"),
        pytest.param(['"2000-01-01",5'], ",", id="quoted day"),
        pytest.param(['"Jan 1, 2024",5'], ",", id="quoted day with a comma"),
        pytest.param(["1871;1120", "1872;1160"], ";", id="years"),
        pytest.param(["45292;7,5"], ";", id="no days: the likelier separator first"),
        pytest.param(["a,b"], ",", id="no days: the one there is"),
        pytest.param(["a"], ";", id="none at all"),
    ],
)
def test_the_separator_is_the_one_that_puts_a_day_first(lines, separator):
    assert choose_separator(lines) == separator


@pytest.mark.parametrize(
    ("text", "cells", "lines", "broken"),
    [
        pytest.param("2024-01-01,5", [["2024-01-01", "5"]], [1], set(), id="plain"),
        pytest.param("\n\n2024-01-01, 5 \n\n", [["2024-01-01", "5"]], [3], set(), id="blank lines and blanks"),
        pytest.param(
            '2024-01-01,"a\nb"\n2024-01-02,c', [["2024-01-01", "a\nb"], ["2024-01-02", "c"]], [1, 3], set(),
            id="quoted newline",
        ),
        pytest.param('2024-01-01,"a ""b"", c"', [["2024-01-01", 'a "b", c']], [1], set(), id="doubled quotes"),
        pytest.param(
            '2024-01-01,"a\n2024-01-02,b', [["2024-01-01", '"a'], ["2024-01-02", "b"]], [1, 2], {1},
            id="open to the end",
        ),
        pytest.param(
            '2024-01-01,"a\n2024-01-02,"', [["2024-01-01", '"a'], ["2024-01-02", '"']], [1, 2], {1, 2},
            id="closed only by another open quote",
        ),
        pytest.param(
            '2024-01-01,"a\n2024-01-02,"b\nc"', [["2024-01-01", '"a'], ["2024-01-02", "b\nc"]], [1, 2], {1},
            id="a sound cell of two lines behind an open quote",
        ),
        pytest.param('2024-01-01,"a"b', [["2024-01-01", '"a"b']], [1], {1}, id="letters behind a quote"),
    ],
)  # fmt: skip
def test_rows_keep_their_lines_and_open_quotes_are_named(text, cells, lines, broken):
    rows = split_rows(text)
    assert (rows.cells, rows.lines, rows.broken) == (cells, lines, broken)
