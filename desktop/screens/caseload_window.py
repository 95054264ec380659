"""The coach's window: the queue on the left, the session card of the client under the hand on the right."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from datetime import datetime
from functools import partial
from pathlib import Path

from PySide6.QtCore import Qt, QTimer
from PySide6.QtGui import QCloseEvent
from PySide6.QtWidgets import (
    QApplication,
    QDialog,
    QHBoxLayout,
    QLabel,
    QMainWindow,
    QMessageBox,
    QPushButton,
    QSizePolicy,
    QSplitter,
    QVBoxLayout,
    QWidget,
)

from desktop.caseload.card import card_of
from desktop.caseload.queue import QueueRow, Reason
from desktop.edits.clients import mark_looked_at, set_client, set_coach, write_session
from desktop.edits.edit import Edit
from desktop.errors import DayfenceError, StorageError
from desktop.journal.clients import Client
from desktop.journal.journal import Journal
from desktop.models.caseload_desk import CaseloadDesk
from desktop.screens import theme
from desktop.screens.card_pane import CardPane
from desktop.screens.caseload_menus import CaseloadMenus
from desktop.screens.caseload_opening import ask_clients_folder
from desktop.screens.client_dialog import ClientDialog
from desktop.screens.queue_pane import QueuePane
from desktop.screens.session_form import SessionForm
from desktop.screens.settings import Settings
from desktop.storage.store import CaseloadStore
from desktop.wording.caseload import (
    CASELOAD_KEYS,
    NO_CLIENTS,
    NO_FOLDER,
    client_title,
    looked_through_line,
    progress_line,
)
from desktop.wording.problems import problem_sentence

_CALENDAR_LOOK = 60_000
_NAP = 20
"""Milliseconds that a client stays under the hand before the journal is read: a key held down stays quick."""


class CaseloadWindow(QMainWindow):
    """Everything on screen around one open caseload."""

    def __init__(
        self,
        store: CaseloadStore,
        folder: Path,
        *,
        now: Callable[[], datetime] = datetime.now,
        parent: QWidget | None = None,
    ) -> None:
        """A window for an open caseload; the settings are those kept in ``folder``."""
        super().__init__(parent)
        self.settings = Settings(folder)
        self.desk = CaseloadDesk(store, now=now, parent=self)
        self.queue, self.card, self.form = QueuePane(), CardPane(), SessionForm()
        self.client_tells_first = False
        self.status, self.stop_button = QLabel(), QPushButton("Stop")
        self.status.setWordWrap(True)
        self.stop_button.hide()
        self._read_later = QTimer(self)
        self._read_later.setSingleShot(True)
        self._read_later.setInterval(_NAP)
        self._lay_out()
        self._menus = CaseloadMenus(self)
        self._connect()
        self._clock = QTimer(self)
        self._clock.timeout.connect(self._look_at_calendar)
        self._clock.start(_CALENDAR_LOOK)
        self._today = self.desk.today
        self.resize(1360, 820)
        self.apply_theme()
        self._follow()
        self._show_client()
        self.queue.view.setFocus()

    def begin(self) -> None:
        """Look through the folder; ask for it where there is none yet."""
        self.desk.look_after()
        if self.desk.folder is None:
            self.say(NO_FOLDER)
        else:
            self.look_again()

    # Commands.

    def choose_folder(self) -> None:
        """Ask which folder the clients' journals are put into, and look through it."""
        chosen = ask_clients_folder(self, self.desk.folder)
        if chosen is not None:
            self.take_folder(chosen)

    def take_folder(self, folder: Path) -> None:
        """Look through this folder from now on."""
        coach = self.desk.caseload.coach
        if self._do(set_coach(self.desk.caseload, replace(coach, folder=str(folder)))):
            self.look_again()

    def look_again(self) -> None:
        """Read what is new in the folder."""
        if self.desk.folder is None:
            self.choose_folder()
            return
        self.keep_session()
        self.desk.look_again()
        self.stop_button.setVisible(self.desk.is_reading)
        self._menus.follow()

    def looked_at(self) -> None:
        """Mark the client as looked at and go on to the next one."""
        row = self.queue.current
        if row is None or row.client.id not in self.desk.caseload.clients:
            return
        place = self.queue.view.currentIndex().row()
        self.keep_session()
        if self._do(mark_looked_at(self.desk.caseload, row.client.id, self.desk.today, row.marks)):
            is_gone = self.queue.model.place_of(row.client.id) != place
            self.queue.go_on(place if is_gone else place + 1)

    def write_session(self) -> None:
        """Put the hand into the session's form."""
        if self.form.isEnabled():
            self.form.agreed.setFocus()

    def back_to_queue(self) -> None:
        """Keep what was typed and put the hand back on the queue."""
        self.keep_session()
        self.queue.view.setFocus()

    def keep_session(self) -> bool:
        """Keep what was filled in; False where it could not be written, and the coach knows why."""
        if not self.form.is_changed:
            return True
        session, client = self.form.session, self.form.client
        assert client is not None
        held = self.desk.caseload.clients[client.id]
        following = replace(held, next_session=client.next_session)
        if not self._do(write_session(self.desk.caseload, session, following)):
            return False
        self._show_form(client.id)
        self.say("Kept.")
        return True

    def edit_client(self) -> None:
        """Ask about the settings of the client under the hand."""
        row = self.queue.current
        client = self.desk.caseload.clients.get(row.client.id) if row is not None else None
        if client is None or not self.keep_session():
            return
        taken = {one.code for one in self.desk.caseload.clients.values() if one.id != client.id}
        measures = self._journal.columns() if self._journal is not None else []
        dialog = ClientDialog(client, measures, taken, self)
        if dialog.exec() == QDialog.DialogCode.Accepted:
            self._do(set_client(self.desk.caseload, dialog.chosen))
            self.look_again()

    def bring_back(self, client: int) -> None:
        """Put a client whose coaching had ended back into the queue."""
        held = self.desk.caseload.clients[client]
        self._do(set_client(self.desk.caseload, replace(held, ended=False)))

    def set_client_tells_first(self, is_first: bool) -> None:
        """Cover every answer until Space is pressed, or only in sessions of today."""
        self.client_tells_first = is_first
        self._show_client()

    def larger_text(self) -> None:
        """One step larger, up to twice the plain size."""
        self._set_text_size(self.settings.larger_text)

    def smaller_text(self) -> None:
        """One step smaller, down to the plain size."""
        self._set_text_size(self.settings.smaller_text)

    def show_keys(self) -> None:
        """List the keys."""
        QMessageBox.information(self, "Keys", CASELOAD_KEYS)

    def undo(self) -> None:
        """Take back the last act, that of writing what is typed among them."""
        if self.keep_session() and self._try(self.desk.undo):
            self._show_client()

    def redo(self) -> None:
        """Do the act last taken back again."""
        if not self.form.is_changed and self._try(self.desk.redo):
            self._show_client()

    def print_pages(self) -> None:
        """The pages of today's clients in one file."""
        from desktop.screens.coach_pages import save_pages  # What draws on paper is not needed to show the window.

        if self.keep_session():
            save_pages(self)

    def say(self, sentence: str) -> None:
        """Say something in the line below."""
        self.status.setText(sentence)

    def warn(self, error: DayfenceError) -> None:
        """Say what went wrong."""
        QMessageBox.warning(self, "Dayfence", problem_sentence(error))

    def closeEvent(self, event: QCloseEvent) -> None:
        """Keep what was typed, and let go of the file."""
        if not self.keep_session():
            event.ignore()
            return
        self.desk.close()
        event.accept()

    def apply_theme(self) -> None:
        """Take the theme and the size of text that are in force."""
        app = QApplication.instance()
        assert isinstance(app, QApplication)
        look = theme.apply_theme(app, self.settings.theme, self.settings.text_percent)
        self.card.set_face(app.font())
        self.card.set_look(look)

    # Inside.

    def _lay_out(self) -> None:
        right = QWidget()
        column = QVBoxLayout(right)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(0)
        column.addWidget(self.card, 1)
        column.addWidget(self.form)
        self.form.setSizePolicy(QSizePolicy.Policy.Preferred, QSizePolicy.Policy.Fixed)
        self.panes = QSplitter(Qt.Orientation.Horizontal)
        self.panes.setChildrenCollapsible(False)
        self.panes.setHandleWidth(7)
        self.panes.addWidget(self.queue)
        self.panes.addWidget(right)
        self.panes.setSizes([700, 660])
        below = QHBoxLayout()
        below.setContentsMargins(12, 4, 12, 6)
        below.addWidget(self.status, 1)
        below.addWidget(self.stop_button)
        whole = QWidget()
        layout = QVBoxLayout(whole)
        layout.setContentsMargins(0, 0, 0, 0)
        layout.setSpacing(0)
        layout.addWidget(self.panes, 1)
        layout.addLayout(below)
        self.setCentralWidget(whole)

    def _connect(self) -> None:
        desk = self.desk
        self._journal: Journal | None = None
        desk.changed.connect(self._follow)
        desk.progressed.connect(lambda done, of: self.say(progress_line(done, of)))
        desk.looked_through.connect(self._say_looked_through)
        desk.not_readable.connect(self.warn)
        desk.not_kept.connect(self.warn)
        self.stop_button.clicked.connect(desk.stop)
        self.queue.client_chosen.connect(self._client_chosen)
        self.queue.view.uncover_wanted.connect(self.card.show_answer)
        self.card.uncovered.connect(partial(self.queue.cover, False))
        self.queue.view.looked_wanted.connect(self.looked_at)
        self.queue.view.activated.connect(self.write_session)
        self.form.keep_wanted.connect(self.back_to_queue)
        self._read_later.timeout.connect(self._read_journal)

    def _follow(self) -> None:
        """Show the queue as it stands."""
        before = self.queue.current
        rows = [*self.desk.rows(), *self._strange_rows()]
        self.queue.show_rows(rows, is_typing=self.form.is_changed)
        after = self.queue.current
        if after != before:
            self._show_client()
        name = self.desk.caseload.coach.name
        self.setWindowTitle(" · ".join(part for part in ("Caseload", name, self.desk.path.name) if part))
        self._menus.follow()

    def _strange_rows(self) -> list[QueueRow]:
        return [
            QueueRow(Client(-place, "", name), None, (Reason("unreadable", "", error=error),))
            for place, (name, error) in enumerate(sorted(self.desk.strange.items()), start=1)
        ]

    def _client_chosen(self, _client: int) -> None:
        self.keep_session()
        self._show_client()

    def _show_client(self) -> None:
        """Show what is known of the client under the hand; the journal is read in a moment."""
        row = self.queue.current
        self._journal = None
        nobody = NO_CLIENTS if self.desk.folder is not None else NO_FOLDER
        title = client_title(row.client, self.desk.today) if row is not None else nobody
        covered = row is not None and (self.client_tells_first or row.client.next_session == self.desk.today)
        self.card.show_row(row, title, covered=covered)
        self.queue.cover(covered)
        client = row.client.id if row is not None else 0
        # What is being typed stays, whatever is read meanwhile.
        if not (self.form.is_changed and self.form.is_of(client)):
            self._show_form(client)
        self._read_later.start()

    def _show_form(self, client: int) -> None:
        held = self.desk.caseload.clients.get(client)
        today = self.desk.today
        session = self.desk.caseload.sessions.get(client, {}).get(today)
        self.form.show_client(None if self.desk.read_only else held, session, today)

    def _read_journal(self) -> None:
        row = self.queue.current
        if row is None or row.client.journal_id not in self.desk.files:
            return
        self.desk.read_journal(row.client, partial(self._show_card, row), self._not_read)

    def _show_card(self, row: QueueRow, journal: Journal) -> None:
        from desktop.chart.picture import picture_of

        if self.queue.current != row:
            return  # The hand has gone on meanwhile.
        self._journal = journal
        # What is agreed today is for the next time.
        today = self.desk.today
        earlier = [one for one in self.desk.caseload.sessions_of(row.client.id) if one.day < today]
        card = card_of(journal, row, earlier, today)
        main = card.main
        has_values = main is not None and bool(main.overall.stretches)
        self.card.show_card(card, picture_of(main.overall, journal, main.measure) if main and has_values else None)

    def _not_read(self, _error: Exception) -> None:
        """The line of the queue says what is wrong with the file."""

    def _say_looked_through(self, added: int) -> None:
        self.stop_button.hide()
        if self.queue.current is None:
            self._show_client()
        clients = sum(not client.ended for client in self.desk.caseload.clients.values())
        unread = len(self.desk.strange)
        told = looked_through_line(clients, added, unread, all_read=self.desk.all_read)
        self.say(told if clients or unread else NO_CLIENTS)
        self._menus.follow()

    def _do(self, edit: Edit) -> bool:
        return self._try(partial(self.desk.do, edit))

    def _try(self, act: Callable[[], object]) -> bool:
        try:
            act()
        except StorageError as error:
            self.warn(error)
            return False
        return True

    def _look_at_calendar(self) -> None:
        """After midnight the queue is another, but not under someone who is typing."""
        if self.desk.today != self._today and not self.form.is_changed:
            self._today = self.desk.today
            self._follow()
            self._show_client()

    def _set_text_size(self, percent: int) -> None:
        self.settings.set_text_percent(percent)
        self.apply_theme()
