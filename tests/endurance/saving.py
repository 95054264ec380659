"""How long one value takes to be on the disk, on the disk that holds the temporary folder."""

from __future__ import annotations

import time
from dataclasses import replace
from datetime import date, timedelta
from pathlib import Path
from statistics import quantiles
from tempfile import TemporaryDirectory

from desktop.storage.store import Store
from tests.desktop.storage.samples import EXERCISE, PERSON, added, minutes
from tests.endurance.figures import Figure


def saving(many: int) -> Figure:
    """Values written one by one, each until the commit has returned."""
    taken: list[float] = []
    with TemporaryDirectory() as place, Store.create(Path(place) / "log.dayfence", [PERSON, EXERCISE]) as store:
        for number in range(many):
            entry = replace(minutes(1, float(number)), day=date(2000, 1, 1) + timedelta(number))
            began = time.perf_counter()
            store.write("put value", added(entry))
            taken.append(1000 * (time.perf_counter() - began))
        store.verify()
    cuts = quantiles(taken, n=20)
    return Figure("one value on the disk", many, 0, f"median {cuts[9]:.1f} ms, 95 of 100 within {cuts[18]:.1f} ms")
