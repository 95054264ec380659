"""Monday morning by keyboard alone: forty clients, a session prepared, notes kept, a client's journal replaced."""

from __future__ import annotations

from dataclasses import replace
from datetime import datetime, timedelta
from pathlib import Path

import pytest
from pypdf import PdfReader
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QFileDialog, QMessageBox

from desktop.errors import StorageError
from desktop.faces import load_faces
from desktop.journal.clients import Coach
from desktop.journal.journal import Journal
from desktop.models.queue_table import WHY
from desktop.screens.caseload_opening import open_caseload
from desktop.screens.caseload_window import CaseloadWindow
from desktop.screens.client_dialog import ClientDialog
from desktop.screens.main_window import MainWindow
from desktop.storage.backups import take_copy
from desktop.storage.layout import CASELOAD
from desktop.storage.store import CaseloadStore
from tests.desktop.caseload.journals import CLIENT, JOURNAL_ID, MONDAY, WALKING, day, journal, level
from tests.scoreboard.clients_folder import forty, write_journal

NOW = datetime.combine(MONDAY, datetime.min.time()) + timedelta(hours=8)
CONTROL = Qt.KeyboardModifier.ControlModifier


class CoachAtWork:
    """Works the caseload's window the way a coach does, with keys."""

    def __init__(self, qtbot, place: Path) -> None:
        self.qtbot, self.place = qtbot, place
        self.logs, self.file = place / "logs", place / "clients.caseload"
        self.logs.mkdir(exist_ok=True)
        self.window: CaseloadWindow | None = None

    def opens(self) -> CaseloadWindow:
        load_faces()
        if not self.file.exists():
            CaseloadStore.create(self.file, Coach("c" * 32, "", str(self.logs))).close()
        store = open_caseload(None, self.file, lambda: NOW)
        assert store is not None
        self.window = CaseloadWindow(store, self.place, now=lambda: NOW)
        self.qtbot.addWidget(self.window)
        self.window.show()
        self.qtbot.waitActive(self.window)
        with self.qtbot.waitSignal(self.window.desk.looked_through, timeout=60_000):
            self.window.begin()
        self.waits_for_the_card()
        return self.window

    def looks_again(self) -> None:
        with self.qtbot.waitSignal(self.window.desk.looked_through, timeout=60_000):
            self.presses(Qt.Key.Key_F5)
        self.waits_for_the_card()

    def presses(self, key, *held) -> None:
        QTest.keyClick(QApplication.focusWidget() or self.window, key, *held)

    def types(self, text: str) -> None:
        QTest.keyClicks(QApplication.focusWidget(), text)

    def waits_for_the_card(self) -> None:
        row = self.window.queue.current
        if row is not None and row.client.journal_id in self.window.desk.files:
            self.qtbot.waitUntil(lambda: "Missing" in self.window.card.text.text(), timeout=10_000)

    @property
    def codes(self) -> list[str]:
        return [row.client.code for row in self.window.queue.model.rows]


@pytest.fixture
def coach(qtbot, tmp_path):
    return CoachAtWork(qtbot, tmp_path)


def one_client(coach: CoachAtWork, *records) -> CaseloadWindow:
    write_journal(coach.logs / "ana.dayfence", journal(*(records or (WALKING, *level(1, 40, 12, 30)))))
    return coach.opens()


def test_a_monday_pass_of_forty_by_keyboard_alone(coach):
    truth = {journal_id: told for journal_id, (told, _) in forty(coach.logs).items()}
    window = coach.opens()
    assert window.status.text() == "40 clients. 40 new clients, named after their journals."
    kinds = [truth[row.client.journal_id] for row in window.queue.model.rows]
    assert kinds[:2] == ["silent", "silent"]
    assert len(kinds) <= 14
    assert window.queue.fold.text() == f"Show {40 - len(kinds)} with nothing new"

    # Prepare the session of the third one: write down the last session, the next one and notes.
    coach.presses(Qt.Key.Key_Down)
    coach.presses(Qt.Key.Key_Down)
    coach.waits_for_the_card()
    third = window.queue.current.client
    coach.presses(Qt.Key.Key_Return)
    coach.types("two stops early")
    coach.presses(Qt.Key.Key_Tab)
    coach.presses(Qt.Key.Key_Up)
    coach.presses(Qt.Key.Key_Tab)
    coach.presses(Qt.Key.Key_Tab)
    coach.types("asked about the knee")
    coach.presses(Qt.Key.Key_Return, CONTROL)
    assert window.queue.view.hasFocus()
    (session,) = window.desk.caseload.sessions_of(third.id)
    assert (session.day, session.agreed, session.times, session.note) == (
        MONDAY,
        "two stops early",
        1,
        "asked about the knee",
    )

    # Look at everyone that has a reason, one after the other.
    coach.presses(Qt.Key.Key_Home, CONTROL)
    flagged = len(window.queue.model.rows)
    for _ in range(flagged):
        coach.presses(Qt.Key.Key_L)
    assert coach.codes == []
    assert window.queue.fold.text() == "Show 40 with nothing new"
    coach.presses(Qt.Key.Key_Z, CONTROL)
    assert len(coach.codes) == 1

    # All of it is there after a restart, and after the client sent a newer journal.
    assert window.close()
    window = coach.opens()
    assert window.desk.caseload.sessions_of(third.id) == [session]
    assert len(coach.codes) == 1
    path = window.desk.files[third.journal_id]
    path.unlink()
    write_journal(path, others_journal(third.journal_id))
    coach.looks_again()
    assert window.desk.caseload.sessions_of(third.id) == [session]
    assert window.desk.facts[third.journal_id].last == day(1).toordinal()
    assert len(window.desk.caseload.clients) == 40


def others_journal(journal_id: str) -> Journal:
    """The days of an unchanged client under this id."""
    whole = journal(WALKING, *level(1, 40, 1, 30))
    return replace(whole, person=replace(whole.person, journal_id=journal_id))


def test_the_answer_is_covered_until_the_client_has_told(coach):
    window = one_client(coach)
    assert "Moved" in window.card.text.text()
    assert not window.card.chart.isHidden()
    coach.presses(Qt.Key.Key_T, CONTROL)
    coach.waits_for_the_card()
    assert window.card.is_covered
    assert "Moved" not in window.card.text.text()
    assert "Quiet" not in window.card.text.text()
    assert window.card.chart.isHidden()
    window.queue.view.setFocus()
    coach.presses(Qt.Key.Key_Space)
    assert "Moved" in window.card.text.text()
    assert not window.card.chart.isHidden()


def test_in_a_session_of_today_it_is_covered_by_itself(coach):
    window = one_client(coach)
    window.form.has_next.setChecked(True)
    window.form.next_day.choose(MONDAY)
    coach.presses(Qt.Key.Key_Return, CONTROL)
    assert window.queue.current.reasons[0].kind == "session today"
    assert window.card.is_covered
    assert window.card.title.text() == "Ana, session today"


def test_what_is_typed_is_kept_when_the_hand_goes_on(coach):
    write_journal(coach.logs / "bo.dayfence", others_journal("b" * 32))
    window = one_client(coach)
    window.queue.fold.setChecked(True)
    first = window.queue.current.client.id
    window.form.note.setPlainText("half a sent")
    coach.presses(Qt.Key.Key_Down)
    assert window.desk.caseload.sessions_of(first)[0].note == "half a sent"
    assert window.form.note.toPlainText() == ""
    window.form.note.setPlainText("and at closing")
    second = window.queue.current.client.id
    assert window.close()
    with CaseloadStore.open(coach.file) as store:
        assert store.read().sessions_of(second)[0].note == "and at closing"


def test_what_cannot_be_kept_stays_in_the_form(coach, monkeypatch):
    window = one_client(coach)
    window.form.note.setPlainText("kept?")
    said = []
    monkeypatch.setattr(QMessageBox, "warning", lambda *words: said.append(words[-1]))

    def fails(*_, **__):
        raise StorageError("disk full", path="clients.caseload")

    with monkeypatch.context() as patch:
        patch.setattr(window.desk._store, "write", fails)
        assert not window.close()
    assert len(said) == 1
    assert "full" in said[0]
    assert window.form.note.toPlainText() == "kept?"
    assert window.close()


def test_a_client_is_found_by_a_word(coach):
    forty(coach.logs)
    window = coach.opens()
    coach.presses(Qt.Key.Key_F, CONTROL)
    coach.types("quiet")
    assert len(coach.codes) == 2
    window.filter = None
    window.queue.filter.setText("client 07")
    assert coach.codes == ["client 07"]
    window.queue.filter.clear()
    coach.presses(Qt.Key.Key_0, CONTROL)
    assert len(coach.codes) == 40


def test_a_client_gets_another_code_and_no_two_the_same(coach, qtbot):
    write_journal(coach.logs / "bo.dayfence", others_journal("b" * 32))
    window = one_client(coach)
    dialog = ClientDialog(CLIENT, [WALKING], {"Ana 2"})
    qtbot.addWidget(dialog)
    for code, problem in (("", "needs a code"), ("Ana 2", "already")):
        dialog.code.setText(code)
        dialog.accept()
        assert problem in dialog._problem.text()
        assert dialog.result() == 0
    dialog.doing.setCurrentIndex(1)
    dialog.outcome.setCurrentIndex(1)
    dialog.code.setText("A1")
    dialog.accept()
    assert "two different" in dialog._problem.text()
    dialog.outcome.setCurrentIndex(0)
    dialog.ended.setChecked(True)
    dialog.accept()
    assert (dialog.chosen.code, dialog.chosen.doing, dialog.chosen.ended) == ("A1", 1, True)
    assert len(window.desk.caseload.clients) == 2


def test_the_folder_is_asked_for_once(coach, monkeypatch, qtbot):
    write_journal(coach.logs / "ana.dayfence", journal(WALKING, *level(1, 40, 12, 30)))
    CaseloadStore.create(coach.file, Coach("c" * 32)).close()
    store = open_caseload(None, coach.file, lambda: NOW)
    window = CaseloadWindow(store, coach.place, now=lambda: NOW)
    qtbot.addWidget(window)
    window.begin()
    assert window.status.text().startswith("No folder is chosen yet.")
    monkeypatch.setattr(QFileDialog, "getExistingDirectory", lambda *_: str(coach.logs))
    with qtbot.waitSignal(window.desk.looked_through):
        window.choose_folder()
    assert [row.client.code for row in window.queue.model.rows] == ["Ana"]
    window.close()


def test_the_pages_of_todays_clients_in_one_file(coach, monkeypatch):
    forty(coach.logs)
    window = coach.opens()
    path = coach.place / "today.pdf"
    monkeypatch.setattr(QFileDialog, "getSaveFileName", lambda *_: (str(path), "PDF (*.pdf)"))
    rows = window.desk.rows()[2:5]
    for row in rows:
        window.queue.choose(row.client.id)
        window.form.has_next.setChecked(True)
        window.form.next_day.choose(MONDAY)
        assert window.keep_session()
    gone = rows[2].client
    window.desk.files[gone.journal_id].unlink()
    window.print_pages()
    coach.qtbot.waitUntil(path.exists, timeout=20_000)
    pages = [page.extract_text() for page in PdfReader(path).pages]
    assert len(pages) == 2
    for row, text in zip(rows, pages, strict=False):
        assert text.replace("\t", " ").startswith(f"{row.client.code}: Walking")
        for head in ("Agreed:", "Kept:", "Moved:", "Missing:", "A question to ask:", "Agreed today"):
            assert head in text.replace("\t", " ")
        assert "My question today" not in text
    coach.qtbot.waitUntil(lambda: "Saved" in window.status.text())
    assert f"Not among them, since their journals cannot be read: {gone.code}." in window.status.text()


def test_a_damaged_caseload_goes_on_with_its_copy(coach, monkeypatch):
    window = one_client(coach)
    window.form.note.setPlainText("kept in the copy")
    window.close()
    take_copy(coach.file, NOW, layout=CASELOAD)
    contents = bytearray(coach.file.read_bytes())
    contents[4096:8192] = bytes(4096)
    coach.file.write_bytes(contents)
    asked = []

    def yes(*words):
        asked.append(words[-1])
        return QMessageBox.StandardButton.Yes

    monkeypatch.setattr(QMessageBox, "question", yes)
    window = coach.opens()
    assert asked[0].startswith("clients.caseload is damaged. It was not changed.")
    assert window.desk.caseload.sessions_of(1)[0].note == "kept in the copy"
    assert any("damaged" in path.name for path in coach.place.iterdir())


def test_a_caseload_without_a_copy_that_is_damaged_is_left_alone(coach, monkeypatch):
    coach.file.write_bytes(b"DyFk no caseload")
    said = []
    monkeypatch.setattr(QMessageBox, "warning", lambda *words: said.append(words[-1]))
    assert open_caseload(None, coach.file, lambda: NOW) is None
    assert coach.file.read_bytes() == b"DyFk no caseload"
    assert len(said) == 1


def test_it_opens_from_the_window_of_a_journal(coach, qtbot):
    load_faces()
    window = MainWindow(coach.place, now=lambda: NOW)
    qtbot.addWidget(window)
    CaseloadStore.create(coach.file, Coach("c" * 32, "", str(coach.logs))).close()
    assert window.open_journal(coach.file)
    assert window.open_journal(coach.file)
    (caseload,) = window.caseloads.values()
    qtbot.addWidget(caseload)
    assert caseload.isVisible()
    assert window.session is None
    assert JOURNAL_ID not in caseload.desk.facts
    caseload.close()
    assert window.open_journal(coach.file)
    assert window.caseloads[coach.file] is not caseload
    qtbot.addWidget(window.caseloads[coach.file])


def test_what_is_typed_while_files_are_read_stays(coach):
    window = one_client(coach)
    window.form.note.setPlainText("half a sentence")
    path = coach.logs / "ana.dayfence"
    path.unlink()
    write_journal(path, journal(WALKING, *level(1, 40, 1, 45)))
    with coach.qtbot.waitSignal(window.desk.looked_through, timeout=20_000):
        window.desk.look_again()
    assert window.form.note.toPlainText() == "half a sentence"
    assert window.form.is_changed


def test_undo_takes_the_text_out_of_the_form_too_and_keeps_what_was_typed_first(coach):
    window = one_client(coach)
    client = window.queue.current.client.id
    window.form.note.setPlainText("note A")
    assert window.keep_session()
    window.undo()
    assert window.desk.caseload.sessions_of(client) == []
    assert window.form.note.toPlainText() == ""
    assert not window.form.is_changed
    window.form.note.setPlainText("note B")
    window.undo()
    assert window.desk.redoable.act == "write session"
    window.redo()
    assert window.form.note.toPlainText() == "note B"


def test_while_the_answer_is_covered_the_queue_tells_no_reasons(coach):
    window = one_client(coach)
    coach.presses(Qt.Key.Key_T, CONTROL)
    assert window.queue.view.isColumnHidden(WHY)
    window.queue.view.setFocus()
    coach.presses(Qt.Key.Key_Space)
    assert not window.queue.view.isColumnHidden(WHY)
