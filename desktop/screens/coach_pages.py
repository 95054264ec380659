"""The pages of today's clients in one file: each journal read off the screen's thread, then drawn one by one."""

from __future__ import annotations

from functools import partial
from pathlib import Path
from typing import TYPE_CHECKING

from PySide6.QtCore import QLocale, QObject
from PySide6.QtWidgets import QMessageBox

from desktop.caseload.card import card_of
from desktop.caseload.queue import QueueRow
from desktop.journal.journal import Journal
from desktop.page.content import Subject, coach_content_of
from desktop.page.files import pdf_of, write_file
from desktop.page.layout import Page, PaperName, lay_out
from desktop.screens.file_questions import ask_output
from desktop.wording.caseload import NOBODY_TODAY, PAGES_TITLE, card_sections, pages_line, pages_written
from desktop.wording.page import cannot_be_written, written

if TYPE_CHECKING:
    from desktop.screens.caseload_window import CaseloadWindow


def save_pages(window: CaseloadWindow) -> None:
    """Write the pages of the clients with a session today, or of the client under the hand where there is none."""
    today = window.desk.today
    rows = [row for row in window.desk.rows() if row.client.next_session == today]
    if not rows and (row := window.queue.current) is not None:
        rows = [row]
    if not rows:
        window.say(NOBODY_TODAY)
        return
    path = ask_output(window, PAGES_TITLE, f"clients {today.isoformat()}", ".pdf")
    if path is not None:
        CoachPages(window, rows, path).begin()


class CoachPages(QObject):
    """Draws the pages of some clients, one after the other."""

    def __init__(self, window: CaseloadWindow, rows: list[QueueRow], path: Path) -> None:
        super().__init__(window)
        self._window, self._rows, self._path = window, rows, path
        self._pages: list[Page] = []
        self._unread: list[str] = []
        self._paper: PaperName = "letter" if _uses_letter() else "a4"

    def begin(self) -> None:
        """Begin with the first; the file is written after the last."""
        self._next()

    def _next(self) -> None:
        done = len(self._pages) + len(self._unread)
        if done == len(self._rows):
            self._write()
            return
        self._window.say(pages_line(done, len(self._rows)))
        row = self._rows[done]
        if row.client.journal_id not in self._window.desk.files:
            self._leave_out(row)
            return
        self._window.desk.read_journal(row.client, partial(self._draw, row), lambda _: self._leave_out(row))

    def _draw(self, row: QueueRow, journal: Journal) -> None:
        desk = self._window.desk
        earlier = [one for one in desk.caseload.sessions_of(row.client.id) if one.day < desk.today]
        card = card_of(journal, row, earlier, desk.today)
        main = card.main
        if main is None:
            self._leave_out(row)
            return
        subject = Subject(main.measure, journal.log_of(main.measure), main.overall)
        content = coach_content_of(
            journal, subject, desk.today, row.client.code, card_sections(card, with_notes=False)
        )
        self._pages.append(lay_out(content, self._paper))
        self._next()

    def _leave_out(self, row: QueueRow) -> None:
        self._unread.append(row.client.code)
        self._next()

    def _write(self) -> None:
        told = ""
        if self._pages:
            try:
                write_file(self._path, pdf_of(*self._pages))
            except OSError as error:
                QMessageBox.warning(self._window, "Dayfence", cannot_be_written(self._path, error.strerror or ""))
                return
            told = written(self._path)
        self._window.say(pages_written(told, self._unread).strip())
        self.deleteLater()


def _uses_letter() -> bool:
    return QLocale().measurementSystem() == QLocale.MeasurementSystem.ImperialUSSystem
