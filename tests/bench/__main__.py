"""``python -m tests.bench``: measure every row and print the table.

Option: ``--rows analysis`` only the rows of that part.
"""

from __future__ import annotations

import argparse
import os
import platform
from collections.abc import Callable, Iterator, Mapping
from datetime import date

import numpy as np

from tests.bench import analysis_rows, caseload_rows, exchange_rows, page_rows, window_rows
from tests.bench.measuring import Row

PARTS: Mapping[str, Callable[[], Iterator[Row]]] = {
    "analysis": analysis_rows.rows,
    "exchange": exchange_rows.rows,
    "page": page_rows.rows,
    "window": window_rows.rows,
    "caseload": caseload_rows.rows,
}


def main() -> None:
    """Measure and print; a row that falls short says so."""
    parser = argparse.ArgumentParser(prog="python -m tests.bench")
    parser.add_argument("--rows", default=",".join(PARTS), help="parts, with commas between")
    options = parser.parse_args()
    print(
        f"{date.today():%Y-%m-%d}, {os.cpu_count()} cores, Python {platform.python_version()}, numpy "
        f"{np.__version__}. Median ratio, its fourths, and what it may be at most."
    )
    for part in options.rows.split(","):
        for row in PARTS[part]():
            print(row.line(), flush=True)


if __name__ == "__main__":
    main()
