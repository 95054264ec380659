"""``python -m tests.scoreboard``: count every cell, print the tables, and keep the figures that help shows.

Options: ``--logs N`` logs a cell (2,000), ``--tables A,B`` only some of them, ``--keep`` write the table to
``resources/how_often_wrong.txt``.
"""

from __future__ import annotations

import argparse
from collections import Counter
from concurrent.futures import ProcessPoolExecutor
from datetime import date
from multiprocessing import get_context
from pathlib import Path

from tests.scoreboard import caseload
from tests.scoreboard.cells import SIZES, count
from tests.scoreboard.families import CONTINUOUS
from tests.scoreboard.tables import TABLES, Counts, oracle_of

CASELOAD_TABLE, CASELOADS = "H", 50
"""The table of the coach's queue, and over how many caseloads it is counted."""

KEPT = Path(__file__).parents[2] / "resources" / "how_often_wrong.txt"


def count_all(names: list[str], logs: int, processes: int = 2) -> Counts:
    """Count the cells of the named tables, on both cores."""
    jobs = [(name, place, logs) for name in names for place in range(len(TABLES[name]()))]
    # Forked: each worker starts with everything imported. The pool says so when a worker dies.
    with ProcessPoolExecutor(processes, mp_context=get_context("fork")) as pool:
        return dict(pool.map(_counted, jobs, chunksize=2))


def _counted(job: tuple[str, int, int]) -> tuple[tuple[str, str, str], Counter[str]]:
    name, place, logs = job
    cell = TABLES[name]()[place]
    held = count(cell.make, logs, cell.facts, cell.table, cell.row, cell.column)
    return (cell.table, cell.row, cell.column), held


def told(counts: Counts, logs: int) -> str:
    """Every table in words and numbers."""
    lines = [
        f"How often the answer is wrong, counted on {date.today():%Y-%m-%d}: {logs:,} simulated logs a cell, each",
        "through the whole review. Columns are days before and after the change. All figures are logs in 100,",
        "unless said otherwise.",
    ]
    sizes = [f"{m},{n}" for m, n in SIZES]
    share = lambda fact: lambda held: 100 * held[fact] / logs  # noqa: E731
    for title, table, fact, columns in (
        ("A. Nothing changed: the answer says that it moved", "A", "claim", sizes),
        ("   the same, as sure as a log can be", "A", "as sure", sizes),
        ("   rule of thumb beside it: any day outside the fences", "A", "naive", sizes),
        ("   a doubt is shown", "A", "any doubt", sizes),
        ("Traps: the answer says that it moved", "T", "claim", sizes),
        ("   the plain rank test beside it", "T", "plain claim", sizes),
        ("   the doubt of a steady slope is named", "T", "doubt slope_before", sizes),
        ("   the doubt of the worst week is named", "T", "doubt worst_spell", sizes),
        ("   the doubt of more blank days is named", "T", "doubt missing_more", sizes),
        ("   the doubt of the first week is named", "T", "doubt first_days", sizes),
    ):
        lines += _table(counts, title, table, columns, share(fact))
    lines += _moved(counts, logs)
    for title, table, fact in (
        ("C. The range of the shift holds the truth (move in standard deviations)", "C", "covers"),
        ("D. The range of the start holds the truth", "D", "covers"),
        ("   it says that the move began before the change (early: a week before, by 1.5)", "D", "before change"),
        ("F. A week after a move of 1.5: days still needed are forecast", "F", "number"),
        ("   with an end to their range", "F", "number and end"),
        ("G. Told as faded (faded: up for three weeks, then back)", "G", "faded"),
    ):
        lines += _table(counts, title, table, None, share(fact))
    lines += _table(
        counts,
        "E. Days outside by luck, expected for 100 counted",
        "E",
        None,
        lambda held: 100 * held["expected"] / 1000 / max(held["outside"], 1),
    )
    lines += _table(
        counts,
        "F. On the day forecast, of 100 logs with a forecast: the answer is the right one",
        "F",
        None,
        lambda held: 100 * held["right then"] / max(held["number"], 1),
    )
    return "\n".join(lines) + "\n"


def _moved(counts: Counts, logs: int) -> list[str]:
    moved = {key: held for key, held in counts.items() if key[0] == "B"}
    if not moved:
        return []

    def ratio(key: tuple[str, str, str]) -> float:
        return 100 * moved[key]["claim more"] / logs / oracle_of(key[1], key[2])

    lines = _table(
        counts, "B. It moved: the answer says so", "B", None, lambda held: 100 * held["claim more"] / logs
    )
    lines += _table(
        counts, "   a doubt alters the answer", "B", None, lambda held: 100 * held["doubt that alters"] / logs
    )
    continuous = {family.name for family in CONTINUOUS}
    lines += [
        "",
        "   as a part of what the best test could claim, which knows law and carry-over, mean in 100:",
    ]
    for title, rows, least in (
        ("continuous, 14 and 14 days or more", continuous, 28),
        ("continuous, 28 and 28 days or more", continuous, 56),
        ("carry-over 0.6", {"carry-over 0.6"}, 28),
        ("weekend +2", {"weekend +2"}, 28),
        ("3 sessions a week", {"3 a week, any days"}, 28),
    ):
        chosen = [
            ratio(key) for key in moved if key[1] in rows and sum(map(int, key[2].split()[0].split(","))) >= least
        ]
        capped = [min(one, 100.0) for one in chosen]
        lines.append(
            f"   {title:38}{sum(chosen) / len(chosen):8.1f}   "
            f"(each counted as 100 at most: {sum(capped) / len(capped):.1f})"
        )
    return lines


def _table(counts, title, table, columns, value) -> list[str]:  # type: ignore[no-untyped-def]
    rows = list(dict.fromkeys(row for name, row, _ in sorted(counts) if name == table))
    if not rows:
        return []
    columns = columns or sorted({column for name, _, column in counts if name == table}, key=_order)
    lines = ["", title, " " * 28 + "".join(f"{column:>11}" for column in columns)]
    for row in rows:
        cells = [counts.get((table, row, column)) for column in columns]
        lines.append(f"{row:28}" + "".join(" " * 11 if held is None else f"{value(held):11.1f}" for held in cells))
    return lines


def _order(column: str) -> tuple[list[int], str]:
    size, _, rest = column.partition(" ")
    return [int(part) for part in size.split(",") if part.isdecimal()], rest


def main() -> None:
    """Count and print."""
    parser = argparse.ArgumentParser(prog="python -m tests.scoreboard")
    parser.add_argument("--logs", type=int, default=2000)
    parser.add_argument("--tables", default=",".join([*TABLES, CASELOAD_TABLE]))
    parser.add_argument("--keep", action="store_true")
    options = parser.parse_args()
    names = options.tables.split(",")
    text = told(count_all([name for name in names if name in TABLES], options.logs), options.logs)
    if CASELOAD_TABLE in names:
        text += "\n" + "\n".join(caseload.told([caseload.monday(seed) for seed in range(CASELOADS)])) + "\n"
    print(text, end="")
    if options.keep:
        KEPT.write_text(text, "utf-8")


if __name__ == "__main__":
    main()
