"""What is won back of a damaged journal, and that the damaged file is never written to."""

from __future__ import annotations

import os
import shutil
import sqlite3
from datetime import UTC, date, datetime, timedelta
from pathlib import Path
from random import Random

import pytest

from desktop.errors import StorageError
from desktop.journal.journal import Journal
from desktop.journal.records import Change, DayNote, Entry, Record
from desktop.journal.row_change import RowChange
from desktop.storage.backups import EarlierCopy, copies_folder, copies_of, take_copy
from desktop.storage.salvage import WonBack, copy_to, put_in_place, win_back, write_won_back
from desktop.storage.store import Store
from desktop.storage.stranger import read_stranger
from tests.desktop.storage.samples import EXERCISE, FULL, PERSON, names, refusal

PAGE = 4096
NOW = datetime(2026, 3, 10, 21, 4, 5)
FIRST = date(2024, 1, 1)


def entry(number: int, value: float) -> Entry:
    day = FIRST + timedelta(number)
    return Entry(1, day, value=value, original=str(value), entered_at="2026-03-10T21:00:00")


def grow(path: Path, steps: int = 500, seed: int = 1) -> Journal:
    """A journal of several hundred days, some written again, with a copy of its first half beside it."""
    random = Random(seed)
    with Store.create(path, [PERSON, EXERCISE], clock=lambda: NOW) as store:
        journal = store.read()
        for number in range(steps):
            day = number if random.random() < 0.8 else random.randrange(number + 1)
            records: list[Record] = [entry(day, float(random.randrange(200)))]
            if number % 25 == 0:
                records.append(DayNote(FIRST + timedelta(number), f"note {number}"))
            if number % 100 == 0:
                records.append(Change(number // 100 + 1, FIRST + timedelta(number), f"change {number}"))
            changes = [RowChange(journal.find(record), record) for record in records]
            changes = [change for change in changes if change.before != change.after]
            if changes:
                store.write("put value", changes)
                journal.apply(changes)
            if number == steps // 2:
                take_copy(path, NOW.replace(tzinfo=UTC))
        return journal


@pytest.fixture(scope="module")
def grown(tmp_path_factory: pytest.TempPathFactory) -> tuple[Path, Journal]:
    path = tmp_path_factory.mktemp("grown") / "log.dayfence"
    return path, grow(path)


@pytest.fixture
def damaged(grown: tuple[Path, Journal], journal_folder: Path) -> Path:
    path = journal_folder / "log.dayfence"
    shutil.copyfile(grown[0], path)
    shutil.copytree(copies_folder(grown[0]), copies_folder(path))
    return path


def harm(path: Path, *pages: int) -> None:
    contents = bytearray(path.read_bytes())
    for page in pages:
        contents[page * PAGE : (page + 1) * PAGE] = bytes(PAGE)
    path.write_bytes(contents)


def values(journal: Journal) -> dict[date, float | None]:
    return {day: held.value for (day, _), held in journal.entries.get(1, {}).items()}


def share(won: WonBack, whole: Journal) -> float:
    wanted, found = values(whole), values(won.journal)
    return sum(found.get(day) == value for day, value in wanted.items()) / len(wanted)


def pages_of(path: Path) -> int:
    return path.stat().st_size // PAGE


def test_a_whole_file_gives_everything(damaged: Path, grown: tuple[Path, Journal]) -> None:
    before = damaged.read_bytes()
    won = win_back(damaged, [])
    assert set(won.journal.records()) == set(grown[1].records())
    assert won.proven == len(won.sureness) == len(values(grown[1]))
    assert (won.copy, won.behind) == (None, 0)
    assert damaged.read_bytes() == before


@pytest.mark.parametrize("with_copy", [True, False])
def test_any_one_page_destroyed(damaged: Path, grown: tuple[Path, Journal], with_copy: bool) -> None:
    copies = copies_of(damaged) if with_copy else []
    shares = []
    sure = []
    for page in range(pages_of(grown[0])):
        shutil.copyfile(grown[0], damaged)
        harm(damaged, page)
        before = damaged.read_bytes()
        won = win_back(damaged, copies)
        assert damaged.read_bytes() == before
        shares.append(share(won, grown[1]))
        sure.append(won.proven / len(won.sureness))
        # What is said to be proven is true.
        wanted = values(grown[1])
        for (_, key), how in won.sureness.items():
            day = date.fromisoformat(key.split("/")[1])
            assert how != "proven" or values(won.journal)[day] == wanted[day]
    assert len(shares) > 40
    assert min(shares) >= 0.97
    assert sum(shares) / len(shares) >= (0.999 if with_copy else 0.995)
    assert sum(sure) / len(sure) > 0.5


def test_the_first_pages_destroyed(damaged: Path, grown: tuple[Path, Journal]) -> None:
    for copies in ([], copies_of(damaged)):
        harm(damaged, 0, 1, 2)
        won = win_back(damaged, copies)
        assert share(won, grown[1]) == 1
        assert won.journal.person == PERSON


@pytest.mark.parametrize("page", range(16))
def test_a_damaged_journal_of_an_older_version(journal_folder: Path, page: int) -> None:
    whole = Path(__file__).parents[2] / "old_journals" / "version_1.dayfence"
    path = journal_folder / "log.dayfence"
    shutil.copyfile(whole, path)
    harm(path, page)
    won = win_back(path, [])
    wanted = read_stranger(whole)
    kept = [
        key for measure in wanted.entries for key in wanted.entries[measure] if _same(won, wanted, measure, key)
    ]
    assert len(kept) >= 8
    assert won.journal.measures[1].limit_words == ""


def _same(won: WonBack, wanted: Journal, measure: int, key: tuple[date, str]) -> bool:
    return won.journal.entries.get(measure, {}).get(key) == wanted.entries[measure][key]


def test_cut_short(damaged: Path, grown: tuple[Path, Journal]) -> None:
    damaged.write_bytes(grown[0].read_bytes()[: pages_of(grown[0]) // 2 * PAGE + 100])
    with_copy, without = win_back(damaged, copies_of(damaged)), win_back(damaged, [])
    assert share(with_copy, grown[1]) >= 0.45
    assert share(with_copy, grown[1]) >= share(without, grown[1])
    assert with_copy.behind > 0


@pytest.mark.parametrize("seed", range(6))
def test_three_pages_and_bytes_at_random(damaged: Path, grown: tuple[Path, Journal], seed: int) -> None:
    random = Random(seed)
    harm(damaged, *random.sample(range(1, pages_of(damaged)), 3))
    contents = bytearray(damaged.read_bytes())
    for _ in range(16):
        contents[random.randrange(len(contents))] = random.randrange(256)
    damaged.write_bytes(contents)
    won = win_back(damaged, copies_of(damaged))
    assert share(won, grown[1]) >= 0.9
    target = damaged.with_name("new.dayfence")
    write_won_back(target, won, NOW)
    with Store.open(target) as store:
        store.verify()
        assert set(store.read().records()) == set(won.journal.records())


def test_rubbish_gives_what_the_copy_holds_and_alone_nothing(damaged: Path) -> None:
    damaged.write_bytes(Random(1).randbytes(PAGE * 30))
    won = win_back(damaged, copies_of(damaged))
    assert 200 < len(won.sureness) < 300
    assert won.behind == 0
    assert refusal(lambda: win_back(damaged, [])).reason == "damaged"
    damaged.write_bytes(b"")
    assert refusal(lambda: win_back(damaged, [])).reason == "damaged"
    assert refusal(lambda: win_back(damaged.with_name("none"), [])).reason == "missing"


def test_a_value_altered_outside_is_what_the_history_proves(damaged: Path, grown: tuple[Path, Journal]) -> None:
    connection = sqlite3.connect(damaged)
    connection.execute("UPDATE entry SET value = 999 WHERE day = '2024-01-05'")
    connection.execute("INSERT INTO note VALUES ('2031-01-01', 'nobody wrote this')")
    connection.commit()
    connection.close()
    won = win_back(damaged, [])
    assert set(won.journal.records()) == set(grown[1].records())


def test_the_newest_values_come_from_the_tables_where_the_history_ends_early(
    damaged: Path, grown: tuple[Path, Journal]
) -> None:
    connection = sqlite3.connect(damaged, isolation_level=None)
    connection.execute("PRAGMA ignore_check_constraints = ON")
    for name in ("history_stays", "history_as_written"):
        connection.execute(f"DROP TRIGGER {name}")
    last = connection.execute("SELECT max(seq) FROM history").fetchone()[0]
    connection.execute("DELETE FROM history WHERE seq > ?", (last - 40,))
    connection.execute("UPDATE history SET after = 'x' WHERE seq = 5")
    connection.execute("DELETE FROM entry WHERE day = '2024-02-03'")
    connection.execute("UPDATE entry SET kind = 'odd' WHERE day = '2024-02-04'")
    connection.close()
    # The triggers are missing now, so the declarations of a fresh journal are put in.
    won = win_back(damaged, [])
    assert share(won, grown[1]) == 1
    hows = list(won.sureness.values())
    assert hows.count("in one record") >= 20
    assert hows.count("earlier") == 2
    assert won.steps
    target = damaged.with_name("new.dayfence")
    write_won_back(target, won, NOW)
    with Store.open(target) as store:
        store.verify()
        assert store.steps(1)[0].act == "win back"
        assert store.steps()[: len(won.steps)] == won.steps


def test_nothing_of_the_history_and_no_copy(damaged: Path, grown: tuple[Path, Journal]) -> None:
    connection = sqlite3.connect(damaged, isolation_level=None)
    connection.execute("PRAGMA foreign_keys = OFF")
    connection.execute("DROP TRIGGER history_stays")
    connection.execute("DELETE FROM history")
    connection.execute("DROP TRIGGER person_stays")
    connection.execute("DELETE FROM person")
    connection.execute("DELETE FROM measure")
    connection.close()
    won = win_back(damaged, [])
    assert values(won.journal) == values(grown[1])
    assert won.journal.measures[1].title == "Measure 1"
    assert won.journal.person != PERSON
    assert won.proven == 0
    assert won.steps == []
    target = damaged.with_name("new.dayfence")
    write_won_back(target, won, NOW)
    with Store.open(target) as store:
        store.verify()
        assert [step.act for step in store.steps()] == ["start journal"]


def test_the_whole_history_is_written_again_as_it_was(damaged: Path, grown: tuple[Path, Journal]) -> None:
    with Store.open(damaged) as store:
        steps = store.steps()
    harm(damaged, 0)
    won = win_back(damaged, [])
    target = damaged.with_name("new.dayfence")
    write_won_back(target, won, NOW)
    with Store.open(target) as store:
        store.verify()
        assert store.steps() == steps == won.steps


def test_every_kind_of_record(journal_folder: Path) -> None:
    path = journal_folder / "log.dayfence"
    Store.create(path, FULL).close()
    contents = path.read_bytes()
    found = []
    for page in range(1, len(contents) // PAGE):
        path.write_bytes(contents)
        harm(path, page)
        try:
            found.append(len(win_back(path, []).journal.records()))
        except StorageError:
            found.append(0)
    assert found.count(len(FULL)) >= len(found) - 2


def test_the_damaged_file_gives_up_its_name_and_stays(damaged: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (copy,) = copies_of(damaged)
    for number, links in enumerate((True, False)):
        before = damaged.read_bytes()
        if links:
            Path(f"{damaged}-journal").write_bytes(b"a step cut short")
        new = damaged.with_name("new.dayfence")
        copy_to(copy, new)
        with monkeypatch.context() as patch:
            if not links:
                patch.setattr(os, "link", _no_links)
            aside = put_in_place(new, damaged, NOW + timedelta(seconds=number))
        assert aside.name == f"log damaged 2026-03-10 21.04.0{5 + number}.dayfence"
        assert aside.read_bytes() == before
        assert not links or Path(f"{aside}-journal").read_bytes() == b"a step cut short"
        with Store.open(damaged) as store:
            store.verify()
    assert "new.dayfence" not in names(damaged.parent)
    assert not any(name.endswith(".dayfence-journal") and "damaged" not in name for name in names(damaged.parent))


def _no_links(*_: object) -> None:
    raise OSError(95, "Operation not supported")


def test_nothing_is_exchanged_where_the_other_name_is_taken(damaged: Path) -> None:
    (copy,) = copies_of(damaged)
    new = damaged.with_name("new.dayfence")
    copy_to(copy, new)
    before = damaged.read_bytes()
    damaged.with_name("log damaged 2026-03-10 21.04.05.dayfence").write_bytes(b"mine")
    assert refusal(lambda: put_in_place(new, damaged, NOW)).fields["exists"] is True
    assert damaged.read_bytes() == before
    assert refusal(lambda: copy_to(copy, new)).fields["exists"] is True
    gone = EarlierCopy(copy.made, 1, copy.path.with_name("gone"))
    assert refusal(lambda: copy_to(gone, damaged.with_name("other"))).reason == "missing"
