"""The coach's window as scenes: a full queue, an empty one, an unreadable file, a card, a covered answer."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from contextlib import contextmanager
from dataclasses import replace
from datetime import datetime, timedelta
from pathlib import Path

from PySide6.QtCore import QDeadlineTimer
from PySide6.QtWidgets import QApplication, QWidget

from desktop.edits.clients import set_client, write_session
from desktop.journal.clients import Coach
from desktop.screens.caseload_window import CaseloadWindow
from desktop.screens.client_dialog import ClientDialog
from desktop.screens.theme import ThemeName
from desktop.storage.store import CaseloadStore
from tests.scoreboard.caseload import MONDAY
from tests.scoreboard.clients_folder import forty

NOW = datetime.combine(MONDAY, datetime.min.time()) + timedelta(hours=8)
_SETTLED = 200

See = Callable[[str, QWidget], object]


@contextmanager
def caseload_with(folder: Path, theme: ThemeName, text: int, size: tuple[int, int]) -> Iterator[CaseloadWindow]:
    """A caseload's window over the journals in ``folder/logs``; closed afterwards."""
    path = folder / "clients.caseload"
    CaseloadStore.create(path, Coach("c" * 32, "", str(folder / "logs")), clock=lambda: NOW).close()
    window = CaseloadWindow(CaseloadStore.open(path, clock=lambda: NOW), folder, now=lambda: NOW)
    window.settings.set_theme(theme)
    window.settings.set_text_percent(text)
    window.apply_theme()
    window.resize(*size)
    window.show()
    window.begin()
    settle(window)
    try:
        yield window
    finally:
        window.close()


def settle(window: CaseloadWindow) -> None:
    """Wait until every file is read and the card is there."""
    window.desk.wait()
    end = QDeadlineTimer(_SETTLED)
    while window.desk.is_reading or not end.hasExpired():
        QApplication.processEvents()
    window.desk.wait()
    QApplication.processEvents()


def visit_caseload(folder: Path, theme: ThemeName, text: int, size: tuple[int, int], see: See) -> None:
    """Set up every scene of a caseload in one look and hand it over while it is there."""
    full, empty = folder / "full", folder / "empty"
    truth = forty(full / "logs", most=16)
    (full / "logs" / "notes.dayfence").write_bytes(b"not a journal")
    (empty / "logs").mkdir(parents=True)
    with caseload_with(empty, theme, text, size) as window:
        see("caseload empty", window)
    with caseload_with(full, theme, text, size) as window:
        desk = window.desk
        for client in list(desk.caseload.clients.values()):
            for session in truth[client.journal_id][1]:
                desk.do(write_session(desk.caseload, replace(session, client=client.id, times=5, spare=1)))
        window.look_again()
        settle(window)
        window.queue.go_on(3)
        settle(window)
        see("caseload queue and card", window)
        window.queue.go_on(len(window.queue.model.rows) - 1)
        settle(window)
        see("caseload unreadable file", window)
        client = desk.caseload.clients[min(desk.caseload.clients)]
        desk.do(set_client(desk.caseload, replace(client, next_session=MONDAY)))
        window.queue.go_on(0)
        settle(window)
        see("caseload covered", window)
        dialog = ClientDialog(client, [], set(), window)
        dialog.show()
        see("client settings", dialog)
        dialog.close()
