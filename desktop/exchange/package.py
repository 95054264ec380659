"""A journal as a folder anyone can read: ``datapackage.json`` beside a CSV file a table; out, and back in.

Source: the Data Package standard, version 2, and its Table Schema (datapackage.org).
"""

from __future__ import annotations

import csv
import io
import json
from collections.abc import Iterator
from dataclasses import astuple
from pathlib import Path
from typing import Any

from desktop.errors import ExchangeError
from desktop.exchange.package_tables import TABLES, Field, FieldType, PackageTable, cell_of, record_of
from desktop.exchange.plain_table import csv_bytes
from desktop.exchange.source_text import MOST_BYTES
from desktop.journal.journal import Journal
from desktop.journal.records import Entry, Person, Plan, Record
from desktop.journal.row_change import key_of

DESCRIPTOR = "datapackage.json"
_FORMAT = "dayfence journal 1"
_LONGEST_DESCRIPTOR = 1_000_000
_MOST_RECORDS = 1_000_000
_DEEPEST = 20
_SCHEMA_TYPES: dict[FieldType, str] = {
    "text": "string",
    "word": "string",
    "number": "number",
    "whole": "integer",
    "day": "date",
    "yes/no": "boolean",
    "ids": "string",
}


def package_files(journal: Journal) -> dict[str, bytes]:
    """The files of a journal's package, by name; the history is not among them."""
    files = {
        DESCRIPTOR: (json.dumps(_descriptor(), ensure_ascii=False, indent=2) + "\n").encode(),
    }
    for table in TABLES:
        records = [record for record in journal.records() if isinstance(record, table.record)]
        rows = [[cell_of(*pair) for pair in zip(table.fields, _values(record), strict=True)] for record in records]
        rows.sort(key=lambda row: [cell.rjust(12) for cell in row[: len(table.key)]])
        files[table.file] = csv_bytes([[field.name for field in table.fields], *rows])
    return files


def _values(record: Record) -> tuple[Any, ...]:
    return astuple(record)


def _descriptor() -> dict[str, object]:
    return {
        "$schema": "https://datapackage.org/profiles/2.0/datapackage.json",
        "name": "dayfence-journal",
        "format": _FORMAT,
        "resources": [
            {
                "name": table.name,
                "path": table.file,
                "type": "table",
                "format": "csv",
                "mediatype": "text/csv",
                "encoding": "utf-8",
                "schema": _schema(table),
            }
            for table in TABLES
        ],
    }


def _schema(table: PackageTable) -> dict[str, object]:
    schema: dict[str, object] = {
        "fields": [_described(table, field) for field in table.fields],
        "missingValues": [""],
    }
    # The slot of a whole day is empty, and no part of a key may be.
    return schema if "slot" in table.key else schema | {"primaryKey": list(table.key)}


def _described(table: PackageTable, field: Field) -> dict[str, object]:
    constraints: dict[str, object] = {}
    if field.words:
        constraints["enum"] = list(field.words)
    if field.name in table.key and field.name != "slot":
        constraints["required"] = True
    described: dict[str, object] = {"name": field.name, "type": _SCHEMA_TYPES[field.type]}
    return described | ({"constraints": constraints} if constraints else {})


def package_place(path: Path) -> Path | None:
    """The folder of a package, where a path is one or its descriptor; None where it is anything else."""
    if path.name == DESCRIPTOR:
        return path.parent
    return path if (path / DESCRIPTOR).is_file() else None


def read_package(folder: Path) -> Journal:
    """The journal in a package of this program, every record checked as a stranger's.

    Only files of known names beside the descriptor are read, whatever it says of paths.

    Raises:
        ExchangeError: ``missing``, ``cannot open``, ``too large``, ``not a package``, or ``package damaged``
            with ``file`` and ``line``.
    """
    _check_descriptor(folder / DESCRIPTOR)
    records = [record for table in TABLES for record in _read(folder, table)]
    if sum(isinstance(record, Person) for record in records) != 1:
        raise ExchangeError("package damaged", file="person.csv", line=2)
    journal = Journal.of(records)
    for record in records:
        about = _measures_of(record)
        if not about <= journal.measures.keys():
            raise ExchangeError("package damaged", file=_table_of(record).file, line=0)
    return journal


def _check_descriptor(path: Path) -> None:
    source = _bytes(path, _LONGEST_DESCRIPTOR)
    try:
        text = source.decode("utf-8-sig")
        # A parser that goes down level by level must not be sent down without end.
        if _depth(text) > _DEEPEST:
            raise ValueError("too deep")
        descriptor = json.loads(text, object_pairs_hook=_once, parse_constant=_no_constant)
    except ValueError as error:
        raise ExchangeError("package damaged", file=DESCRIPTOR, line=0) from error
    if not isinstance(descriptor, dict) or descriptor.get("format") != _FORMAT:
        raise ExchangeError("not a package", path=str(path))


def _depth(text: str) -> int:
    deepest = depth = 0
    for char in text:
        depth += (char in "[{") - (char in "]}")
        deepest = max(deepest, depth)
    return deepest


def _once(pairs: list[tuple[str, object]]) -> dict[str, object]:
    found = dict(pairs)
    if len(found) < len(pairs):
        raise ValueError("a name stands twice")
    return found


def _no_constant(name: str) -> object:
    raise ValueError(name)


def _bytes(path: Path, most: int) -> bytes:
    try:
        with path.open("rb") as file:
            source = file.read(most + 1)
    except FileNotFoundError as error:
        raise ExchangeError("missing", path=str(path)) from error
    except OSError as error:
        raise ExchangeError("cannot open", path=str(path)) from error
    if len(source) > most:
        raise ExchangeError("too large", what="bytes", limit=most, found=len(source))
    return source


def _read(folder: Path, table: PackageTable) -> Iterator[Record]:
    source = _bytes(folder / table.file, MOST_BYTES)
    line = 1
    keys: set[tuple[str | int, ...]] = set()
    try:
        reader = csv.DictReader(io.StringIO(source.decode("utf-8-sig"), newline=""), strict=True, restkey="")
        if tuple(reader.fieldnames or ()) not in table.headers:
            raise ValueError("other columns")
        for row in reader:
            line = reader.line_num
            if "" in row or None in row.values():
                raise ValueError("cells too many or too few")
            record = record_of(table, row)
            key = key_of(record)
            if key in keys or len(keys) >= _MOST_RECORDS:
                raise ValueError("a key stands twice")
            keys.add(key)
            yield record
    except (ValueError, csv.Error) as error:
        raise ExchangeError("package damaged", file=table.file, line=line) from error


def _measures_of(record: Record) -> set[int]:
    if isinstance(record, Entry | Plan):
        return {record.measure}
    return set(getattr(record, "measures", ()))


def _table_of(record: Record) -> PackageTable:
    return next(table for table in TABLES if isinstance(record, table.record))
