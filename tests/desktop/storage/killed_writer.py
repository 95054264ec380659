"""Writes steps of three entries until it is killed, and names each step on its output once it is written."""

from __future__ import annotations

import sys
from dataclasses import replace
from datetime import date, timedelta
from pathlib import Path

from desktop.journal.row_change import RowChange
from desktop.storage.store import Store
from tests.desktop.storage.samples import minutes


def main() -> None:
    with Store.open(Path(sys.argv[1])) as store:
        journal = store.read()
        while True:
            number = store.last_step_number + 1
            days = [date(2000, 1, 1) + timedelta((number * 3 + i) % 500) for i in range(3)]
            entries = [replace(minutes(1, float(number)), day=day, note="x" * 200) for day in days]
            changes = [RowChange(journal.find(entry), entry) for entry in entries]
            journal.apply(changes)
            store.write("paste values", changes)
            print(number, flush=True)


if __name__ == "__main__":
    main()
