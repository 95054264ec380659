"""The open file is looked at and copied off the screen's thread, and what goes wrong is told."""

import shutil
from datetime import datetime, timedelta
from pathlib import Path
from tempfile import mkdtemp

import pytest

from desktop.edits.days import put_value
from desktop.errors import StorageError
from desktop.journal.records import Measure, Person
from desktop.models.keeping import Keeping
from desktop.models.session import Session
from desktop.storage.backups import copies_of
from desktop.storage.store import Store

NOW = datetime(2031, 3, 30, 20, 15)


@pytest.fixture
def path():
    shared = Path("/dev/shm")
    folder = Path(mkdtemp(prefix="dayfence-", dir=shared if shared.is_dir() else None))
    with Store.create(folder / "log.dayfence", [Person("0" * 32), Measure(1, 0, "Walk")], clock=lambda: NOW):
        pass
    yield folder / "log.dayfence"
    shutil.rmtree(folder)


@pytest.fixture
def session(qtbot, path):
    one = Session(Store.open(path, clock=lambda: NOW), now=lambda: NOW)
    yield one
    one.close()


def types(session, many=1):
    for number in range(many):
        day = NOW.date() - timedelta(number)
        session.do(put_value(session.journal, 1, day, float(number), f"{number}", now=NOW))
    session.wait_until_written()


def test_the_copy_of_the_day_is_taken_once(qtbot, session, path):
    types(session)
    keeping = Keeping(session)
    with qtbot.waitSignal(keeping.copied):
        keeping.begin()
    assert keeping.copies() == copies_of(path)
    types(session)
    keeping.begin()
    keeping.close()
    assert len(copies_of(path)) == 1


@pytest.mark.parametrize(("many", "copies"), [(20, 0), (21, 1)])
def test_a_long_session_ends_with_a_copy(session, path, many, copies):
    types(session, many - session.last_change_number)
    keeping = Keeping(session)
    keeping.close()
    assert len(copies_of(path)) == copies


def test_a_second_place_that_is_gone_is_told_and_the_copy_here_is_taken(qtbot, session, path):
    types(session)
    keeping = Keeping(session, path.parent / "stick")
    with qtbot.waitSignal(keeping.not_copied) as told:
        keeping.begin()
    assert told.args[0].reason == "missing"
    assert len(copies_of(path)) == 1
    assert keeping.last_sent() is None


def test_closing_where_no_copy_can_be_made_is_quiet(session, path, monkeypatch):
    types(session, 30)
    path.with_name("log copies").write_text("in the way")
    Keeping(session).close()
    assert copies_of(path) == []


def test_damage_is_told_and_nothing_else_where_one_only_reads(qtbot, path, monkeypatch):
    session = Session(Store.open(path, to_read=True), now=lambda: NOW)
    keeping = Keeping(session)
    told = []
    keeping.not_copied.connect(told.append)
    errors = [StorageError("busy"), StorageError("damaged")]

    def finds(_):
        raise errors.pop(0)

    monkeypatch.setattr("desktop.models.keeping.check_file", finds)
    with qtbot.waitSignal(keeping.damaged):
        keeping.begin()
        keeping.begin()
    assert (told, errors) == ([], [])
    monkeypatch.undo()
    keeping.begin()
    keeping.close()
    assert copies_of(path) == []
    session.close()
