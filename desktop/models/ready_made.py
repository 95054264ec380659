"""What comes with the program: ready-made measures, and the sample journal of invented logs."""

from __future__ import annotations

import json
from collections.abc import Callable
from datetime import date, datetime, time, timedelta
from pathlib import Path
from typing import Any
from uuid import uuid4

from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Record, Span
from desktop.resource_files import resource
from desktop.storage.store import Store


def ready_measures() -> list[tuple[str, list[Measure]]]:
    """Each ready-made choice with its measures; their ids and positions are still to be given."""
    listed: list[dict[str, Any]] = json.loads(resource("ready_measures.json").read_text("utf-8"))
    return [(one["name"], [Measure(0, 0, **fields) for fields in one["measures"]]) for one in listed]


def new_person() -> Person:
    """The person record of a new journal, with an id of its own."""
    return Person(uuid4().hex)


def make_sample(path: Path, now: Callable[[], datetime] = datetime.now) -> None:
    """Make the sample journal at ``path``, its last day within the week that ends yesterday.

    Raises:
        StorageError: it cannot be made there.
    """
    Store.create(path, sample_records(now().date()), clock=now).close()


def sample_records(today: date) -> list[Record]:
    """The invented logs as records; whole weeks are moved, so that weekends stay weekends."""
    sample: dict[str, Any] = json.loads(resource("sample_journal.json").read_text("utf-8"))
    last_sunday = today - timedelta(today.weekday() + 1)
    first = last_sunday - timedelta(sample["days"] - 1)

    def day(offset: int) -> date:
        return first + timedelta(offset)

    def ids(places: list[int]) -> tuple[int, ...]:
        return tuple(place + 1 for place in places)

    def evening(offset: int) -> str:
        return datetime.combine(day(offset), time(21, 4)).isoformat(timespec="seconds")

    records: list[Record] = [Person(uuid4().hex, "Sample journal, invented")]
    records += [Measure(place + 1, place, **fields) for place, fields in enumerate(sample["measures"])]
    records += [
        Entry(place + 1, day(at), "", value, kind, "", text, "sample", evening(at))
        for place, at, value, kind, text in sample["entries"]
    ]
    records += [
        Change(place + 1, day(one["day"]), one["label"], one["why"], one["settle_days"], ids(one["measures"]))
        for place, one in enumerate(sample["changes"])
    ]
    records += [
        Span(place + 1, day(one["first"]), day(one["last"]), one["kind"], one["label"], ids(one["measures"]))
        for place, one in enumerate(sample["spans"])
    ]
    records += [DayNote(day(at), text) for at, text in sample["notes"]]
    return records
