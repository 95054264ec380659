"""Several measures looked at for one change: each counts, a pair counts once, and an edit is noticed."""

import shutil
from datetime import date, datetime, timedelta
from pathlib import Path
from tempfile import mkdtemp

import pytest

from desktop.edits.days import put_value
from desktop.journal.records import Change, Entry, Measure, Person
from desktop.models import session as session_module
from desktop.models.session import Session
from desktop.storage.store import Store

FIRST = date(2031, 3, 3)
NOW = datetime(2031, 3, 30, 20, 15)
LOW = [20, 25, 18, 30, 15, 10, 22, 24, 18, 31, 12, 16, 26, 21]
BARELY = [value + 6 for value in LOW]
"""A move that luck makes in 2 of 100 logs: sure by itself, not as one of four."""


@pytest.fixture
def open_journal(qtbot):
    shared = Path("/dev/shm")
    folder = Path(mkdtemp(prefix="dayfence-", dir=shared if shared.is_dir() else None))
    opened = []

    def opened_with(*measures, change=None):
        records = [Person("0" * 32), change or Change(1, FIRST + timedelta(14), "stairs")]
        for number, (values, more) in enumerate(measures, start=1):
            records.append(Measure(number, number - 1, f"Measure {number}", "points", **more))
            records += [Entry(number, FIRST + timedelta(at), value=float(one)) for at, one in enumerate(values)]
        opened.append(Session(Store.create(folder / "log.dayfence", records, clock=lambda: NOW), now=lambda: NOW))
        return opened[-1]

    yield opened_with
    for one in opened:
        one.close()
    shutil.rmtree(folder)


def doubts(session):
    session.make_review()
    return [doubt.name for doubt in session.review.doubts]


def test_a_claim_among_four_measures_is_counted_with_them(open_journal):
    session = open_journal((LOW + BARELY, {}), *[(LOW + LOW[::-1], {})] * 3)
    assert "several_measures" in doubts(session)
    assert session.review.answer.sureness == "leaning"


def test_one_measure_or_a_pair_is_looked_at_once(open_journal):
    session = open_journal((LOW + BARELY, {"pair": "pressure"}), (LOW + LOW[::-1], {"pair": "pressure"}))
    assert "several_measures" not in doubts(session)
    assert session.review.answer.sureness == "fairly sure"


def test_a_change_that_concerns_one_measure_is_looked_at_in_that_one(open_journal):
    alone = Change(1, FIRST + timedelta(14), "stairs", measures=(1,))
    session = open_journal((LOW + BARELY, {}), *[(LOW + LOW[::-1], {})] * 3, change=alone)
    assert "several_measures" not in doubts(session)


def test_what_is_known_of_other_measures_is_asked_again_only_after_an_edit(open_journal, monkeypatch):
    asked = []
    ask = session_module.ask
    monkeypatch.setattr(
        session_module, "ask", lambda these, today: asked.append([one for one, _, _ in these]) or ask(these, today)
    )
    session = open_journal((LOW + BARELY, {}), *[(LOW + LOW[::-1], {})] * 2)
    session.make_review()
    assert asked[-1] == [2, 3]
    session.do(put_value(session.journal, 1, FIRST, 21, "21", now=NOW))
    assert asked[-1] == []
    session.do(put_value(session.journal, 3, FIRST, 21, "21", now=NOW))
    assert asked[-1] == [3]
    session.undo()
    assert asked[-1] == [3]


def test_before_the_agreed_day_the_answer_is_an_early_look(open_journal):
    session = open_journal((LOW + BARELY, {"look_day": date(2031, 4, 30)}))
    assert "early_look" in doubts(session)
    assert session.review.answer.sureness == "leaning"
    session.now = lambda: datetime(2031, 4, 30, 8, 0)
    assert "early_look" not in doubts(session)
    assert session.review.answer.sureness == "fairly sure"
