"""``python -m tests.seeded``: plant each fault into a scratch copy and tell which the importer's tests catch."""

from __future__ import annotations

import shutil
import subprocess
import sys
import tempfile
from pathlib import Path
from typing import NamedTuple

ROOT = Path(__file__).parents[2]
TESTS = (
    "test_number_tokens.py",
    "test_day_tokens.py",
    "test_month_names.py",
    "test_units.py",
    "test_rows.py",
    "test_columns.py",
    "test_tolerance.py",
    "test_long_layout.py",
    "test_bring_in.py",
    "test_plain_table.py",
    "test_package.py",
    "test_fast_path.py",
    "test_bring_in_properties.py",
)


class Fault(NamedTuple):
    """One fault: what it does, where, and the text it takes the place of."""

    what: str
    file: str
    right: str
    wrong: str


FAULTS = (
    Fault(
        "day and month swapped", "day_tokens.py", '"dmy": (last, middle, first)', '"dmy": (last, first, middle)'
    ),
    Fault("an open day order is guessed", "day_column.py", "    if len(fitting) != 1:", "    if not fitting:"),
    Fault("an open decimal mark is guessed", "number_tokens.py", "if shown or undecided else", "if shown else"),
    Fault("the sign is lost", "number_tokens.py", "value = float(sign + body", "value = float(body"),
    Fault("a cell too many is cut off", "bring_in.py", '"too many cells" if any(row[width:]) else ""', '""'),
    Fault("an exact repeat is kept", "bring_in.py", '"repeated" if key in seen else ""', '""'),
    Fault("a second value takes the slot of the first", "slots.py", "taken.get(key, 0) + 1", "1"),
    Fault("25 hours are a day", "units.py", '"h": 24.0', '"h": 25.0'),
    Fault("pm is morning", "day_tokens.py", '(12 if match["half"] in "pP" else 0)', "0"),
    Fault(
        "upper and lower turned round",
        "value_column.py",
        "_of_pair(token, token.value)",
        "_of_pair(token, token.second)",
    ),
    Fault("a reversed pair is kept", "value_column.py", "token.value < token.second", "token.value < 0"),
    Fault("a guessed encoding is not said", "source_text.py", '"cp1252", guessed=True', '"cp1252", guessed=False'),
    Fault("the limit of numbers is gone", "number_tokens.py", "LARGEST = 1e9", "LARGEST = 1e19"),
    Fault("spreadsheet days off by two", "day_tokens.py", "date(1899, 12, 30)", "date(1900, 1, 1)"),
    Fault("an hour has 100 minutes", "number_tokens.py", "int(hours) * 60.0", "int(hours) * 100.0"),
    Fault("units of rows are lost", "lanes.py", 'beside[place] = f"{beside[place]} {said[text]}"', "pass"),
    Fault(
        "lines are counted from nought",
        "rows.py",
        "list(range(1, len(rectangle) + 1))",
        "list(range(len(rectangle)))",
    ),
    Fault("Mai is no month", "day_words.py", '"may mai mayo"', '"may mayo"'),
    Fault("a formula with @ is not guarded", "formula_guard.py", '"@", ', ""),
    Fault("numbers go out rounded", "plain_table.py", "else repr(value)", 'else f"{value:.6g}"'),
    Fault(
        "a short year is guessed",
        "day_column.py",
        'raise ExchangeError("which century", choices=list(CENTURIES))',
        "return 2000",
    ),
    Fault("what is left out is counted", "bring_in.py", "place in roles.left_out:", "False:"),
    Fault(
        "a blank is nought",
        "value_column.py",
        "{text: None for text in column.counts",
        "{text: 0.0 for text in column.counts",
    ),
    Fault(
        "bulk days of any year",
        "day_tokens.py",
        "return PlainDays(days, clocks) if in_range else None",
        "return PlainDays(days, clocks)",
    ),
    Fault(
        "an open quote swallows lines",
        "rows.py",
        "if reader.line_num > begins and _swallows(row, separator):",
        "if False:",
    ),
    Fault(
        "an approximate number is exact",
        "number_tokens.py",
        'Refusal("not exact" if',
        'NumberToken("number", 40.0) if text[0] == "~" else Refusal("not exact" if',
    ),
    Fault(
        "a total is a day's value",
        "bring_in.py",
        "if not reason and isinstance(day, str):",
        'if not reason and day == "no such day":',
    ),
    Fault(
        "the order of lines decides the day",
        "day_tokens.py",
        "if all(order in readings for readings in open_readings)",
        "if order in open_readings[0]",
    ),
)


def main() -> int:
    """Plant, run, tell; 1 where a fault was not caught."""
    missed = []
    for number, fault in enumerate(FAULTS, start=1):
        caught = is_caught(fault)
        missed += [] if caught else [fault.what]
        print(f"{number:2} {'caught' if caught else 'MISSED':7} {fault.what}", flush=True)
    print(f"{len(FAULTS) - len(missed)} of {len(FAULTS)} caught")
    return 1 if missed else 0


def is_caught(fault: Fault) -> bool:
    """Whether a test of the importer fails with this fault in it.

    Raises:
        ValueError: the text it takes the place of is not there.
    """
    with tempfile.TemporaryDirectory() as folder:
        for part in ("analysis", "desktop", "resources", "tests"):
            shutil.copytree(ROOT / part, Path(folder, part), ignore=shutil.ignore_patterns("__pycache__"))
        shutil.copy(ROOT / "pyproject.toml", folder)
        place = Path(folder, "desktop/exchange", fault.file)
        text = place.read_text("utf-8")
        if fault.right not in text:
            raise ValueError(f"{fault.what}: “{fault.right}” is not in {fault.file}")
        place.write_text(text.replace(fault.right, fault.wrong), "utf-8")
        done = subprocess.run(
            [sys.executable, "-m", "pytest", "-q", "-x", *(f"tests/desktop/exchange/{name}" for name in TESTS)],
            cwd=folder,
            env={"PATH": "/usr/bin:/bin", "QT_QPA_PLATFORM": "offscreen", "PYTHONPATH": folder},
            capture_output=True,
            timeout=600,
        )
    return done.returncode == 1


if __name__ == "__main__":
    sys.exit(main())
