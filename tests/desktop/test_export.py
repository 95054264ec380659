"""`dayfence export` end to end: a journal out, and the same journal back."""

import stat

import pytest

from desktop.__main__ import main
from desktop.exchange.package import package_files, read_package
from desktop.exchange.plain_table import plain_table
from desktop.storage.store import Store
from tests.desktop.exchange.journals import FULL


@pytest.fixture
def journal(tmp_path):
    path = tmp_path / "own.dayfence"
    Store.create(path, FULL.records()).close()
    return path


def test_a_folder_holds_the_whole_journal(journal, tmp_path):
    out = tmp_path / "out"
    assert main(["export", str(journal), "-o", str(out)]) == 0
    assert {path.name: path.read_bytes() for path in out.iterdir()} == package_files(FULL)


def test_a_journal_made_from_its_folder_is_equal_in_everything(journal, tmp_path):
    assert main(["export", str(journal), "-o", str(tmp_path / "out")]) == 0
    again = tmp_path / "again.dayfence"
    Store.create(again, read_package(tmp_path / "out").records()).close()
    with_store = Store.open(again)
    back = with_store.read()
    with_store.close()
    assert back == FULL


@pytest.mark.parametrize(
    ("options", "form"),
    [
        ([], ("archive", ".")),
        (["--for-spreadsheet"], ("spreadsheet", ".")),
        (["--for-spreadsheet", "--decimal", ","], ("spreadsheet", ",")),
    ],
)
def test_a_csv_file_holds_every_value(journal, tmp_path, options, form):
    out = tmp_path / "out.csv"
    assert main(["export", str(journal), "-o", str(out), *options]) == 0
    assert out.read_bytes() == plain_table(FULL, *form)
    assert stat.S_IMODE(out.stat().st_mode) == 0o600


def test_only_the_owner_can_read_the_folder(journal, tmp_path):
    main(["export", str(journal), "-o", str(tmp_path / "out")])
    assert stat.S_IMODE((tmp_path / "out").stat().st_mode) == 0o700
    assert {stat.S_IMODE(path.stat().st_mode) for path in (tmp_path / "out").iterdir()} == {0o600}


@pytest.mark.parametrize("name", ["out", "out.csv"])
def test_nothing_that_is_there_is_written_over_unasked(journal, tmp_path, name, capsys):
    out = tmp_path / name
    out.write_text("mine") if "." in name else out.mkdir()
    assert main(["export", str(journal), "-o", str(out)]) == 2
    assert "is there already" in capsys.readouterr().err
    assert out.is_dir() or out.read_text() == "mine"


def test_a_file_is_written_over_where_that_is_asked_for(journal, tmp_path):
    out = tmp_path / "out.csv"
    out.write_text("mine")
    assert main(["export", str(journal), "-o", str(out), "--force"]) == 0
    assert out.read_bytes() == plain_table(FULL)


def test_a_place_that_cannot_be_written_is_one_sentence(journal, tmp_path, capsys):
    assert main(["export", str(journal), "-o", str(tmp_path / "no" / "out")]) == 2
    assert capsys.readouterr().err.count("\n") == 1


def test_what_is_no_journal_is_one_sentence(tmp_path, capsys):
    (tmp_path / "a.csv").write_text("day,x\n")
    assert main(["export", str(tmp_path / "a.csv"), "-o", str(tmp_path / "out")]) == 2
    assert "not a journal" in capsys.readouterr().err
