"""What is opened, what is not, and that a file that is not opened is left as it was."""

from __future__ import annotations

import os
import sqlite3
import stat
import subprocess
import sys
import textwrap
from collections.abc import Callable
from dataclasses import replace
from pathlib import Path

import pytest

from desktop.journal.records import Measure
from desktop.storage import database
from desktop.storage.layout import JOURNAL
from desktop.storage.schema import APPLICATION_ID
from desktop.storage.store import Store
from tests.desktop.storage.samples import EXERCISE, PERSON, added, minutes, names, refusal

NEWEST = len(JOURNAL.steps)

ROOT = Path(__file__).parents[3]
NOBODY = 65534


def as_nobody(code: str, *arguments: Path) -> str:
    """Run code as a user who owns nothing here: root may write everywhere."""
    script = f"import os\nif os.getuid() == 0:\n    os.setgid({NOBODY})\n    os.setuid({NOBODY})\n"
    imports = "import sys\nfrom pathlib import Path\nfrom desktop.storage.store import Store\n"
    imports += "from desktop.errors import StorageError\nfrom tests.desktop.storage.samples import *\n"
    done = subprocess.run(
        [sys.executable, "-B", "-c", imports + script + textwrap.dedent(code), *map(str, arguments)],
        cwd=ROOT,
        capture_output=True,
        text=True,
        check=False,
    )
    assert done.returncode == 0, done.stderr
    return done.stdout.strip()


@pytest.fixture
def open_to_all(journal_folder: Path) -> Path:
    journal_folder.chmod(0o755)
    return journal_folder


def test_every_setting_is_in_force(store: Store) -> None:
    expected = {
        "trusted_schema": 0,
        "cell_size_check": 1,
        "mmap_size": 0,
        "secure_delete": 1,
        "temp_store": 2,
        "journal_mode": "delete",
        "synchronous": 3,
        "fullfsync": 1,
        "foreign_keys": 1,
        "busy_timeout": 3000,
        "application_id": APPLICATION_ID,
        "user_version": NEWEST,
    }
    with store._database.reading() as connection:
        found = {name: connection.execute(f"PRAGMA {name}").fetchone()[0] for name in expected}
    assert found == expected


def test_a_setting_that_does_not_take_is_noticed(
    store: Store, path: Path, journal_folder: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    store.close()
    monkeypatch.setattr(database, "SETTINGS", (("journal_mode", "DELETE", "wal"),))
    assert refusal(lambda: Store.open(path)).fields["setting"] == "journal_mode"
    assert refusal(lambda: Store.create(journal_folder / "b", PERSON)).reason == "cannot open"
    assert names(journal_folder) == [path.name]


def test_a_journal_is_for_its_owner_only(store: Store, path: Path, journal_folder: Path) -> None:
    assert stat.S_IMODE(path.stat().st_mode) == 0o600
    with store._database.writing() as connection:
        connection.execute("UPDATE measure SET title = 'x'")
        journal = next(name for name in names(journal_folder) if name.endswith("-journal"))
        assert stat.S_IMODE((journal_folder / journal).stat().st_mode) == 0o600
    assert names(journal_folder) == [path.name]


@pytest.mark.parametrize("name", ["log", "a b ü ? # % 'q'.dayfence", "-journal", "😀"])
def test_names_of_every_kind(journal_folder: Path, name: str) -> None:
    with Store.create(journal_folder / name, PERSON) as store:
        assert store.path == journal_folder / name
    assert names(journal_folder) == [name]
    with Store.open(journal_folder / name) as store:
        assert store.read().person == PERSON


def test_a_relative_path(store: Store, path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    store.close()
    monkeypatch.chdir(path.parent)
    with Store.open(Path(path.name)) as opened:
        assert opened.path == path


def test_nothing_there(journal_folder: Path, store: Store, path: Path) -> None:
    assert refusal(lambda: Store.open(journal_folder / "none")).reason == "missing"
    assert refusal(lambda: Store.open(journal_folder / "none" / "none")).reason == "missing"
    assert refusal(lambda: Store.open(path / "inside a file")).reason == "missing"
    assert names(journal_folder) == [path.name]


@pytest.mark.parametrize(
    "contents",
    [
        b"",
        b"SQLite format 3\x00",
        b"day,minutes\n2026-03-01,30\n" * 50,
        bytes(4096),
        "Tagebuch über alles".encode("utf-16"),
    ],
)
def test_a_file_of_something_else(journal_folder: Path, contents: bytes) -> None:
    other = journal_folder / "other"
    other.write_bytes(contents)
    os.utime(other, ns=(1, 1))
    assert refusal(lambda: Store.open(other)).reason == "not a journal"
    assert other.read_bytes() == contents
    assert other.stat().st_mtime_ns == 1


@pytest.mark.parametrize(("application", "version"), [(0, 1), (1, 1), (APPLICATION_ID, 0)])
def test_another_database(journal_folder: Path, application: int, version: int) -> None:
    other = journal_folder / "other"
    connection = sqlite3.connect(other)
    connection.executescript(
        f"CREATE TABLE a (b); PRAGMA application_id = {application}; PRAGMA user_version = {version}"
    )
    connection.close()
    before = other.read_bytes()
    assert refusal(lambda: Store.open(other)).reason == "not a journal"
    assert other.read_bytes() == before


def test_a_path_that_leads_nowhere(journal_folder: Path) -> None:
    loop = journal_folder / "loop"
    loop.symlink_to(loop)
    assert refusal(lambda: Store.open(loop)).reason == "cannot open"
    assert refusal(lambda: Store.open(journal_folder / ("x" * 5000))).reason == "cannot open"


def test_a_header_that_cannot_be_read(store: Store, path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    store.close()
    with monkeypatch.context() as patch:
        patch.setattr(Path, "open", _failing(5))
        assert refusal(lambda: Store.open(path)).reason == "cannot open"
    Store.open(path).close()


def test_a_folder(journal_folder: Path) -> None:
    assert refusal(lambda: Store.open(journal_folder)).reason == "not a journal"


@pytest.mark.parametrize("version", [NEWEST + 1, 99, 2**31 - 1])
def test_a_newer_version_is_left_alone(store: Store, path: Path, version: int) -> None:
    store.close()
    connection = sqlite3.connect(path)
    connection.execute(f"PRAGMA user_version = {version}")
    connection.close()
    before = path.read_bytes()
    os.utime(path, ns=(5, 5))
    error = refusal(lambda: Store.open(path))
    assert error.reason == "newer version"
    assert (error.fields["version"], error.fields["newest"]) == (version, NEWEST)
    assert path.read_bytes() == before
    assert path.stat().st_mtime_ns == 5
    assert names(path.parent) == [path.name]


@pytest.mark.parametrize(
    "statement",
    [
        "DROP TRIGGER history_stays",
        "CREATE TABLE more (a)",
        "CREATE VIEW more AS SELECT 1",
        "CREATE TRIGGER more AFTER INSERT ON entry BEGIN DELETE FROM note; END",
        "ALTER TABLE note RENAME COLUMN text TO words",
    ],
)
def test_other_tables_than_ours(store: Store, path: Path, statement: str) -> None:
    store.close()
    connection = sqlite3.connect(path, isolation_level=None)
    connection.execute(statement)
    connection.close()
    before = path.read_bytes()
    assert refusal(lambda: Store.open(path)).reason == "damaged"
    assert path.read_bytes() == before


def test_a_page_of_zeros(store: Store, path: Path) -> None:
    store.write("put value", added(*(minutes(day, note="x" * 3000) for day in range(1, 29))))
    store.close()
    contents = bytearray(path.read_bytes())
    contents[-4096:] = bytes(4096)
    path.write_bytes(contents)
    assert refusal(lambda: Store.open(path)).reason == "damaged"
    assert path.read_bytes() == contents


def test_a_row_the_tables_would_refuse(store: Store, path: Path) -> None:
    store.close()
    connection = sqlite3.connect(path, isolation_level=None)
    connection.execute("PRAGMA ignore_check_constraints = ON")
    connection.execute("UPDATE measure SET kind = 'other'")
    connection.close()
    assert refusal(lambda: Store.open(path)).reason == "damaged"


def test_a_file_cut_short(store: Store, path: Path) -> None:
    store.close()
    path.write_bytes(path.read_bytes()[:-2000])
    assert refusal(lambda: Store.open(path)).reason == "damaged"


def test_a_file_without_its_person(store: Store, path: Path) -> None:
    store.close()
    connection = sqlite3.connect(path, isolation_level=None)
    trigger = connection.execute("SELECT sql FROM sqlite_schema WHERE name = 'person_stays'").fetchone()[0]
    connection.execute("DROP TRIGGER person_stays")
    connection.execute("DELETE FROM person")
    connection.execute(trigger)
    connection.close()
    with Store.open(path) as opened:
        assert refusal(opened.read).reason == "damaged"


def test_once_in_a_process(store: Store, path: Path, journal_folder: Path) -> None:
    link = journal_folder / "link"
    link.symlink_to(path)
    assert refusal(lambda: Store.open(path)).reason == "open already"
    assert refusal(lambda: Store.open(link)).reason == "open already"
    store.close()
    store.close()
    with Store.open(link) as opened:
        assert opened.read().measures == {1: EXERCISE}


def test_closing_one_leaves_the_others_held(store: Store, path: Path, journal_folder: Path) -> None:
    for name in ("b", "c"):
        Store.create(journal_folder / name, PERSON).close()
    with Store.open(journal_folder / "b"):
        Store.open(journal_folder / "c").close()
        assert refusal(lambda: Store.open(path)).reason == "open already"
        assert refusal(lambda: Store.open(journal_folder / "b")).reason == "open already"


def test_a_store_that_is_forgotten_lets_go(store: Store, path: Path) -> None:
    store.close()
    held = [Store.open(path)]
    held[0]._database._connection.close()
    held.clear()
    with Store.open(path) as opened:
        assert opened.last_step_number == 1


def test_a_first_read_that_does_not_work_lets_go(
    store: Store, path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    store.close()
    with monkeypatch.context() as patch:
        patch.setattr("desktop.storage.store.position", lambda _: 1 / 0)
        with pytest.raises(ZeroDivisionError):
            Store.open(path)
    Store.open(path).close()


def test_a_file_left_in_the_other_journal_mode_is_brought_back(store: Store, path: Path) -> None:
    store.close()
    connection = sqlite3.connect(path)
    assert connection.execute("PRAGMA journal_mode = WAL").fetchone() == ("wal",)
    connection.close()
    assert path.read_bytes()[18:20] == b"\x02\x02"
    with Store.open(path) as opened:
        opened.write("put value", added(minutes(1)))
        assert names(path.parent) == [path.name]
    assert path.read_bytes()[18:20] == b"\x01\x01"


def test_never_over_something_that_is_there(store: Store, path: Path) -> None:
    before = path.read_bytes()
    error = refusal(lambda: Store.create(path, PERSON))
    assert (error.reason, error.fields["exists"]) == ("cannot open", True)
    store.close()
    assert path.read_bytes() == before
    assert names(path.parent) == [path.name]


@pytest.mark.parametrize("there", [False, True])
def test_where_there_are_no_links(journal_folder: Path, monkeypatch: pytest.MonkeyPatch, there: bool) -> None:
    def no_links(part: Path, target: Path) -> None:
        raise OSError(95, "Operation not supported")

    monkeypatch.setattr(os, "link", no_links)
    path = journal_folder / "log"
    if there:
        path.write_bytes(b"mine")
        assert refusal(lambda: Store.create(path, PERSON)).fields["exists"] is True
        assert path.read_bytes() == b"mine"
    else:
        with Store.create(path, PERSON) as made:
            assert made.read().person == PERSON
    assert names(journal_folder) == ["log"]


def test_where_no_file_can_be_made(journal_folder: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    assert refusal(lambda: Store.create(journal_folder / "no" / "log", PERSON)).reason == "missing"
    for number, reason in ((28, "disk full"), (30, "read only"), (5, "cannot open")):
        with monkeypatch.context() as patch:
            patch.setattr(os, "open", _failing(number))
            assert refusal(lambda: Store.create(journal_folder / "log", PERSON)).reason == reason
    assert names(journal_folder) == []


def _failing(number: int) -> Callable[..., int]:
    def fail(*_: object) -> int:
        raise OSError(number, os.strerror(number))

    return fail


def test_a_first_record_that_is_refused_makes_no_file(journal_folder: Path) -> None:
    records = [PERSON, Measure(1, 0, "x" * 500)]
    assert refusal(lambda: Store.create(journal_folder / "log", records)).reason == "refused value"
    assert names(journal_folder) == []


@pytest.mark.parametrize("records", [[], [EXERCISE], [PERSON, PERSON]])
def test_a_journal_is_of_one_person(journal_folder: Path, records: list[Measure]) -> None:
    with pytest.raises(ValueError, match="one person"):
        Store.create(journal_folder / "log", records)
    assert names(journal_folder) == []


READ_AND_TRY = """
    store = Store.open(Path(sys.argv[1]))
    print(store.read_only, len(store.read().entries[1]), len(store.steps()))
    store.verify()
    try:
        store.write("put value", added(minutes(2)))
    except StorageError as error:
        print(error.reason)
"""


@pytest.mark.parametrize(("folder_mode", "file_mode"), [(0o755, 0o444), (0o755, 0o666), (0o777, 0o444)])
def test_a_place_to_read_only(
    store: Store, path: Path, open_to_all: Path, folder_mode: int, file_mode: int
) -> None:
    store.write("put value", added(minutes(1)))
    store.close()
    path.chmod(file_mode)
    open_to_all.chmod(folder_mode)
    before = path.read_bytes()
    assert as_nobody(READ_AND_TRY, path) == "True 1 2\nread only"
    assert path.read_bytes() == before
    assert names(open_to_all) == [path.name]


def test_where_the_system_says_it_cannot_be_written(
    store: Store, path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    store.close()
    monkeypatch.setattr(os, "access", lambda *_: False)
    with Store.open(path) as opened:
        assert opened.read_only
        assert opened.read().measures == {1: EXERCISE}
        assert refusal(lambda: opened.write("put value", added(minutes(1)))).reason == "read only"
        # And SQLite itself would not write either.
        with pytest.raises(sqlite3.OperationalError, match="readonly"):
            opened._database._connection.execute("DELETE FROM entry")
    newer = replace(JOURNAL, steps=(*JOURNAL.steps, lambda _: None))
    assert refusal(lambda: database.open_database(path, newer)).reason == "read only"


OPEN_ONLY = """
    try:
        print(Store.open(Path(sys.argv[1])).read_only)
    except StorageError as error:
        print(error.reason)
"""


def test_a_file_of_somebody_else(store: Store, path: Path, open_to_all: Path) -> None:
    store.close()
    assert as_nobody(OPEN_ONLY, path) == "cannot open"
    path.chmod(0o666)
    open_to_all.chmod(0o700)
    assert as_nobody(OPEN_ONLY, path) == "cannot open"


def test_no_journal_is_made_where_nothing_can_be_written(open_to_all: Path) -> None:
    made = as_nobody(
        """
        try:
            Store.create(Path(sys.argv[1]), PERSON)
        except StorageError as error:
            print(error.reason)
        """,
        open_to_all / "log",
    )
    assert made == "read only"
    assert names(open_to_all) == []


def test_an_older_version_where_nothing_can_be_written(store: Store, path: Path, open_to_all: Path) -> None:
    store.close()
    path.chmod(0o444)
    code = """
        from dataclasses import replace
        from desktop.storage.database import open_database
        from desktop.storage.layout import JOURNAL
        try:
            open_database(Path(sys.argv[1]), replace(JOURNAL, steps=(*JOURNAL.steps, lambda connection: None)))
        except StorageError as error:
            print(error.reason)
    """
    assert as_nobody(code, path) == "read only"


def test_a_step_cut_short_where_nothing_can_be_written(store: Store, path: Path, open_to_all: Path) -> None:
    """The half-made step cannot be taken back there, so nothing of the file can be trusted."""
    store.write("put value", added(*(minutes(day) for day in range(1, 29))))
    store.close()
    cut_short = open_to_all / "cut short"
    writer = sqlite3.connect(path, isolation_level=None)
    writer.execute("PRAGMA cache_size = 1")
    writer.execute("BEGIN IMMEDIATE")
    writer.execute("UPDATE entry SET note = hex(zeroblob(7000))")
    copies = {"": path.read_bytes(), "-journal": Path(f"{path}-journal").read_bytes()}
    writer.execute("ROLLBACK")
    writer.close()
    for suffix, contents in copies.items():
        Path(f"{cut_short}{suffix}").write_bytes(contents)
        Path(f"{cut_short}{suffix}").chmod(0o444)
    assert as_nobody(OPEN_ONLY, cut_short) == "cannot open"
    with Store.open(cut_short) as opened:
        opened.verify()
        assert {entry.note for entry in opened.read().entries[1].values()} == {""}
