from __future__ import annotations

import json
from dataclasses import fields, replace
from datetime import date, datetime
from typing import get_args

import numpy as np
import pytest

from desktop.journal.records import CaseloadRecord, Change, Entry, JournalRecord, Person, Record
from desktop.storage.rows import TABLES, key_text, table_of
from tests.desktop.storage.samples import CASELOAD_FULL, EXERCISE, FULL, PERSON


def test_the_samples_hold_every_kind_of_record_and_no_default() -> None:
    assert {type(record) for record in FULL} == set(get_args(JournalRecord))
    assert {type(record) for record in CASELOAD_FULL} == set(get_args(CaseloadRecord))
    for record in (*FULL, *CASELOAD_FULL):
        for field in fields(record):
            assert getattr(record, field.name) != field.default, (record, field.name)


@pytest.mark.parametrize("record", [*FULL, *CASELOAD_FULL], ids=lambda record: type(record).__name__)
def test_every_field_survives_as_row_and_as_json(record: Record) -> None:
    table = table_of(record)
    cells = table.cells(record)
    assert table.columns == tuple(field.name for field in fields(record))
    assert table.record(cells) == record
    text = table.json(cells)
    assert table.from_json(text) == record
    assert tuple(json.loads(text)) == table.columns


@pytest.mark.parametrize("record", [*FULL, *CASELOAD_FULL], ids=lambda record: type(record).__name__)
def test_a_change_of_any_field_changes_the_row(record: Record) -> None:
    table = table_of(record)
    for index, field in enumerate(fields(record)):
        plain = replace(record, **{field.name: _other(getattr(record, field.name))})
        assert table.cells(plain)[index] != table.cells(record)[index]
        assert table.record(table.cells(plain)) == plain


def _other(value: object) -> object:
    match value:
        case bool():
            return not value
        case int() | float():
            return value + 1
        case str():
            return value + "x"
        case date():
            return date(2000, 1, 1)
        case tuple():
            return ()
    raise AssertionError(value)


def test_fields_that_may_be_none_come_back_as_none() -> None:
    for record in (EXERCISE, Entry(1, date(2026, 3, 1), kind="rest"), Change(1, date(2026, 3, 1))):
        table = table_of(record)
        assert table.from_json(table.json(table.cells(record))) == record


def test_equal_records_give_equal_texts() -> None:
    table = TABLES["entry"]
    plain = Entry(1, date(2026, 3, 1), value=0.0)
    whole = Entry(1, date(2026, 3, 1), value=0)
    array = Entry(1, date(2026, 3, 1), value=np.float64(-0.0))
    texts = {table.json(table.cells(entry)) for entry in (plain, whole, array)}
    assert len(texts) == 1
    assert '"value":0.0' in texts.pop()


@pytest.mark.parametrize(
    "record",
    [
        Entry(1, date(2026, 3, 1), value=float("nan")),
        Entry(1, date(2026, 3, 1), value=float("inf")),
        Entry(1, date(2026, 3, 1), note=None),  # type: ignore[arg-type]
        Entry(1, datetime(2026, 3, 1)),
        Entry(1.5, date(2026, 3, 1)),  # type: ignore[arg-type]
        Person("0" * 32, name=5),  # type: ignore[arg-type]
        Change(1, date(2026, 3, 1), measures=("1",)),  # type: ignore[arg-type]
    ],
)
def test_what_is_not_of_the_field_is_refused(record: Record) -> None:
    with pytest.raises((TypeError, ValueError)):
        table_of(record).cells(record)


@pytest.mark.parametrize(
    "text",
    [
        "",
        "[]",
        "{}",
        '{"day":"2026-03-01","text":"a","more":1}',
        '{"text":"a","day":"2026-03-01"}',
        '{"day":"2026-02-30","text":"a"}',
        '{"day":5,"text":"a"}',
    ],
)
def test_a_text_that_is_no_record_is_refused(text: str) -> None:
    with pytest.raises((TypeError, ValueError)):
        TABLES["note"].from_json(text)


def test_columns_in_another_order_are_refused_even_when_each_would_fit() -> None:
    text = TABLES["person"].json(("0" * 32, "a", "b"))
    assert TABLES["person"].from_json(text) == Person("0" * 32, "a", "b")
    with pytest.raises(ValueError, match="columns of person"):
        TABLES["person"].from_json(text.replace("name", "x").replace("question", "name").replace("x", "question"))


def test_keys_are_readable_and_apart() -> None:
    assert key_text(("person",)) == ""
    assert key_text(("measure", 12)) == "12"
    assert key_text(("entry", 1, "2026-03-04", "")) == "1/2026-03-04/"
    assert key_text(("entry", 1, "2026-03-04", "a/b")) == "1/2026-03-04/a/b"


def test_measures_stand_before_what_refers_to_them() -> None:
    names = list(TABLES)
    assert names.index("measure") < names.index("entry")
    assert PERSON.journal_id in TABLES["person"].json(TABLES["person"].cells(PERSON))
