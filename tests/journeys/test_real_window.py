"""The real window on a real display, worked with real keys: start a log, answer, close, come back."""

import os
from datetime import date, timedelta

import numpy as np
import pytest
from PySide6.QtGui import QImage

from desktop.caseload.facts import Facts
from desktop.journal.clients import Coach
from desktop.storage.store import CaseloadStore
from tests.journeys.real_desk import Desk, missing_tools, wait_for
from tests.scoreboard.caseload import client_journal
from tests.scoreboard.clients_folder import forty, write_journal

BEFORE = [20, 25, 0, 30, 15, 10, 22, 24, 18, 31, 12, 0, 26, 21]
AFTER = [38, 41, 35, 44, 29, 33, 47, 40, 36, 52]
DAYS_SHOWN = 28


@pytest.fixture
def desk(tmp_path):
    missing = missing_tools()
    if missing and not os.environ.get("CI"):
        pytest.skip(f"a real display takes {', '.join(missing)}, which this machine lacks")
    assert not missing, f"CI must have {', '.join(missing)}"
    one = Desk(tmp_path)
    yield one
    one.close()


def ends_well(program) -> bool:
    return program.wait(30) == 0


def test_a_log_is_started_answered_and_there_again_after_a_restart(desk, tmp_path):
    program = desk.starts_the_program()
    first = date.today() - timedelta(DAYS_SHOWN - 1)
    desk.presses("space")
    desk.sees("Start a log")
    desk.presses("Return")
    desk.sees("Dayfence")
    desk.presses(*["Up"] * (DAYS_SHOWN - 1))
    desk.types_days(BEFORE)
    desk.waits_for_values(len(BEFORE))
    desk.presses("ctrl+m")
    desk.sees("Mark a change")
    desk.types("off the bus one stop early")
    desk.presses("Return")
    desk.sees("Dayfence")
    desk.types_days(AFTER)
    shown = desk.waits_for_values(len(BEFORE) + len(AFTER))

    assert (shown["measure"], shown["unit"], shown["kind"]) == ("Exercise", "minutes", "amount")
    assert [stretch["observations"] for stretch in shown["stretches"]] == [14, 10]
    assert [stretch["median"] for stretch in shown["stretches"]] == [20.5, 39.0]
    assert [stretch["label"] for stretch in shown["stretches"]] == [None, "off the bus one stop early"]
    assert shown["stretches"][0]["first"] == first.isoformat()
    assert shown["stretches"][1]["change"] == (first + timedelta(14)).isoformat()
    assert shown["direction"] == "more"
    assert shown["findings"][0].startswith(("It moved: 39 minutes", "It may have moved: 39 minutes"))

    desk.presses("ctrl+q")
    assert ends_well(program)
    assert desk.reviewed() == shown
    assert [path.name for path in desk.journal.parent.glob("journal*.*")] == ["journal.dayfence"]

    program = desk.starts_the_program()
    # Today is current again: a value typed now is the last day's, and can be taken back.
    desk.types_days([44])
    more = desk.waits_for_values(DAYS_SHOWN)
    assert more["rows"]["read"] == len(BEFORE) + len(AFTER) + 1
    assert more["stretches"][1]["last"] == date.today().isoformat()
    desk.takes_a_screenshot(tmp_path / "window.png")
    seen = QImage(str(tmp_path / "window.png"))
    assert len({seen.pixel(x, y) for x in range(0, seen.width(), 4) for y in range(0, seen.height(), 4)}) > 50
    desk.presses("ctrl+z")
    desk.waits_for_values(len(BEFORE) + len(AFTER))
    assert desk.reviewed() == shown
    desk.presses("ctrl+q")
    assert ends_well(program)


def test_the_sample_journal_is_opened_by_keys_and_the_chart_is_worked_by_keys(desk):
    program = desk.starts_the_program()
    desk.presses("Tab", "Tab", "space")
    sample = desk.journal.with_name("sample.dayfence")
    wait_for("the sample journal", sample.exists)
    was = sample.read_bytes()
    # Zoom, move and step on the chart change nothing that is kept.
    desk.presses("ctrl+0", "ctrl+2", "ctrl+1", "ctrl+plus", "ctrl+minus")
    desk.presses("ctrl+q")
    assert ends_well(program)
    assert sample.read_bytes() == was
    assert not desk.journal.exists()


def kept_caseload(path):
    """The caseload as it is on the disk."""
    with CaseloadStore.open(path, to_read=True) as store:
        return store.read()


def test_a_monday_of_forty_clients_with_notes_that_last(desk, tmp_path):
    today = date.today()
    logs, file = tmp_path / "logs", tmp_path / "clients.caseload"
    truths = {journal_id: truth for journal_id, (truth, _) in forty(logs, today=today).items()}
    CaseloadStore.create(file, Coach("c" * 32, "", str(logs))).close()
    program = desk.starts_with(file, "Caseload")
    wait_for("forty clients", lambda: len(kept_caseload(file).clients) == 40)

    # The silent two are on top; the first is looked at, and the next one's session is written down.
    desk.presses("l")
    wait_for("one looked at", lambda: any(one.looked_on for one in kept_caseload(file).clients.values()))
    (looked,) = [one for one in kept_caseload(file).clients.values() if one.looked_on]
    assert truths[looked.journal_id] == "silent"
    desk.presses("Return")
    desk.types("ring on Thursday")
    desk.presses("ctrl+Return")
    wait_for("a session", lambda: kept_caseload(file).sessions)
    ((client, days),) = kept_caseload(file).sessions.items()
    noted = kept_caseload(file).clients[client]
    assert truths[noted.journal_id] == "silent"
    assert [(one.day, one.agreed) for one in days.values()] == [(today, "ring on Thursday")]
    desk.takes_a_screenshot(tmp_path / "monday.png")
    assert len(set(QImage(str(tmp_path / "monday.png")).convertToFormat(QImage.Format.Format_RGB32).bits())) > 20
    desk.presses("ctrl+w")
    assert ends_well(program)

    # The client sends a newer journal: it takes the older one's place, and the notes are there.
    number = int(noted.code.removeprefix("client "))
    path = logs / f"client {number:02}.dayfence"
    path.unlink()
    newer, _ = client_journal(number, "up", np.random.default_rng(5), today)
    write_journal(path, newer, today)
    program = desk.starts_with(file, "Caseload")

    def facts_of_the_newer() -> bool:
        with CaseloadStore.open(file, to_read=True) as store:
            facts = Facts.of_text(store.remembered()[path.name].facts)
        return facts.last == today.toordinal() - 1

    wait_for("the newer journal", facts_of_the_newer)
    desk.presses("ctrl+w")
    assert ends_well(program)
    assert kept_caseload(file).sessions[client][today].agreed == "ring on Thursday"
    assert len(kept_caseload(file).clients) == 40
