"""A journal as a folder of tables: everything in it comes back, and nothing that does not belong comes in."""

import csv
import io
import json
from dataclasses import fields
from pathlib import Path
from typing import get_args

import pytest
from hypothesis import HealthCheck, given, settings

from desktop.errors import ExchangeError
from desktop.exchange.package import package_files, package_place, read_package
from desktop.exchange.package_tables import TABLES
from desktop.journal.journal import Journal
from desktop.journal.records import JournalRecord, Record
from tests.desktop.exchange.journals import FULL, journals


def written(journal: Journal, folder: Path) -> Path:
    folder.mkdir(exist_ok=True)
    for name, data in package_files(journal).items():
        (folder / name).write_bytes(data)
    return folder


def test_every_field_of_every_record_has_its_column():
    assert [table.record for table in TABLES] != []
    assert {table.record for table in TABLES} == set(get_args(JournalRecord))
    for table in TABLES:
        assert [field.name for field in table.fields] == [field.name for field in fields(table.record)]


def test_a_full_journal_comes_back_equal_in_everything(tmp_path):
    assert read_package(written(FULL, tmp_path)) == FULL


@settings(max_examples=200, suppress_health_check=[HealthCheck.function_scoped_fixture, HealthCheck.too_slow])
@given(journal=journals())
def test_any_journal_comes_back_equal_in_everything(journal, tmp_path):
    back = read_package(written(journal, tmp_path))
    assert back == journal or _tidied(back) == _tidied(journal)


def _tidied(journal: Journal) -> list[Record]:
    return sorted(journal.records(), key=repr)


def test_the_same_journal_gives_the_same_files_in_any_order_of_records():
    turned = Journal.of(reversed(FULL.records()))
    assert package_files(turned) == package_files(FULL)


def test_the_tables_are_plain_csv():
    (header, *rows) = csv.reader(io.StringIO(package_files(FULL)["entries.csv"].decode(), newline=""), strict=True)
    assert header == [
        "measure", "day", "slot", "value", "kind", "note", "original", "source", "entered_at",
    ]  # fmt: skip
    assert rows[0] == [
        "7", "2024-02-29", "morning", "-0.30000000000000004", "extra", 'said "ok"\n', "−0,3", "table",
        "2026-03-09T21:04:05+02:00",
    ]  # fmt: skip


def test_the_package_is_valid_under_its_standard(tmp_path):
    frictionless = pytest.importorskip("frictionless")
    written(FULL, tmp_path)
    with pytest.MonkeyPatch.context() as patch:
        patch.chdir(tmp_path)
        report = frictionless.validate("datapackage.json")
    assert report.valid, report.to_summary()


def test_its_standard_finds_what_we_break(tmp_path):
    frictionless = pytest.importorskip("frictionless")
    written(FULL, tmp_path)
    entries = tmp_path / "entries.csv"
    entries.write_bytes(entries.read_bytes().replace(b"2024-03-02", b"2024-02-30"))
    with pytest.MonkeyPatch.context() as patch:
        patch.chdir(tmp_path)
        assert not frictionless.validate("datapackage.json").valid


def test_a_folder_and_its_descriptor_both_lead_to_it(tmp_path):
    written(FULL, tmp_path / "a")
    assert package_place(tmp_path / "a") == package_place(tmp_path / "a" / "datapackage.json") == tmp_path / "a"
    assert package_place(tmp_path / "a" / "entries.csv") is None
    assert package_place(tmp_path) is None


@pytest.mark.parametrize(
    ("file", "old", "new", "line"),
    [
        pytest.param("entries.csv", "2024-03-02", "2024-02-30", 6, id="no such day"),
        pytest.param("entries.csv", "2024-03-02", "20240302", 6, id="another way to write a day"),
        pytest.param("entries.csv", "31.5,", "nan,", 6, id="nan"),
        pytest.param("entries.csv", "31.5,", "1e999,", 6, id="infinite"),
        pytest.param("entries.csv", "31.5,", "3_1,", 6, id="underscore"),
        pytest.param("entries.csv", "31.5,set aside", "31.5,gone", 6, id="unknown kind"),
        pytest.param("entries.csv", "31.5,set aside", ",set aside", 6, id="a value that is none"),
        pytest.param("entries.csv", ",0,zero", ",1,zero", 4, id="a zero that is none"),
        pytest.param("entries.csv", "2024-03-02", "2024-03-01", 6, id="a key twice"),
        pytest.param("entries.csv", "measure,day", "day,measure", 1, id="other columns"),
        pytest.param("entries.csv", ",cuff slipped", ",cuff,slipped", 6, id="a cell too many"),
        pytest.param("entries.csv", "9,2024-03-02", "8,2024-03-02", 0, id="a measure that is not there"),
        pytest.param("measures.csv", "9,4,", "-9,4,", 3, id="an id below zero"),
        pytest.param("changes.csv", "7 9", "7  9", 2, id="ids with a gap"),
        pytest.param("spans.csv", "2199-12-31", "2026-01-01", 2, id="a span turned round"),
        pytest.param("person.csv", "0123", "xxxx", 3, id="no id of a journal"),
        pytest.param("datapackage.json", "{", "{{", 0, id="no JSON"),
        pytest.param("datapackage.json", '"name": "person"', '"name": 1, "name": 2', 0, id="a name twice"),
        pytest.param("datapackage.json", '"utf-8"', "NaN", 0, id="NaN in JSON"),
    ],
)
def test_what_is_not_as_it_was_written_is_refused_with_its_place(file, old, new, line, tmp_path):
    path = written(FULL, tmp_path) / file
    text = path.read_bytes().decode()
    assert old in text
    path.write_bytes(text.replace(old, new, 1).encode())
    with pytest.raises(ExchangeError) as caught:
        read_package(tmp_path)
    assert (caught.value.reason, caught.value.fields["file"]) == ("package damaged", file)
    assert caught.value.fields["line"] in (line, line + 1, line - 1)


def test_a_descriptor_made_to_fill_the_stack_is_refused(tmp_path):
    (written(FULL, tmp_path) / "datapackage.json").write_text("[" * 100_000)
    with pytest.raises(ExchangeError, match="package damaged"):
        read_package(tmp_path)


def test_a_package_of_something_else_is_not_taken(tmp_path):
    (tmp_path / "datapackage.json").write_text(json.dumps({"name": "x", "resources": []}))
    with pytest.raises(ExchangeError, match="not a package"):
        read_package(tmp_path)


def test_a_path_in_the_descriptor_is_never_followed(tmp_path):
    folder = written(FULL, tmp_path / "a")
    text = (folder / "datapackage.json").read_text()
    (folder / "datapackage.json").write_text(text.replace("entries.csv", "../../etc/passwd"))
    assert read_package(folder) == FULL


def test_a_missing_table_is_said(tmp_path):
    (written(FULL, tmp_path) / "plans.csv").unlink()
    with pytest.raises(ExchangeError, match="missing"):
        read_package(tmp_path)
