"""The window: the start screen or an open journal, and one method for each command."""

from __future__ import annotations

from collections.abc import Callable
from datetime import date, datetime, timedelta
from functools import partial
from pathlib import Path
from typing import TYPE_CHECKING

from PySide6.QtCore import Qt, QTimer
from PySide6.QtGui import QCloseEvent
from PySide6.QtWidgets import QApplication, QDialog, QMainWindow, QMessageBox, QStackedWidget, QWidget

from analysis.log import Period
from desktop.edits.bring_in import BroughtIn
from desktop.edits.measures import add_measures
from desktop.errors import DayfenceError, StorageError
from desktop.exchange.bring_in import read_file
from desktop.exchange.package import package_place
from desktop.journal.row_change import RowChange
from desktop.models.days_table import DaysTable, Unlikely
from desktop.models.keeping import Keeping
from desktop.models.ready_made import make_sample, new_person
from desktop.models.session import Session
from desktop.screens.bring_in_dialog import bring_in_rows
from desktop.screens.caseload_opening import is_caseload
from desktop.screens.days_pane import DaysPane
from desktop.screens.dialogs import MeasureDialog, ask_if_right, ask_to_leave_unread
from desktop.screens.drops import FileDrops
from desktop.screens.file_commands import keep_elsewhere, show_caseload
from desktop.screens.file_questions import JOURNAL_ENDING, ask_journal, ask_new_journal, ask_table
from desktop.screens.log_commands import LogCommands
from desktop.screens.menus import Menus
from desktop.screens.opening import mend, open_with_questions
from desktop.screens.settings import Settings
from desktop.screens.start_screen import StartScreen
from desktop.screens.status_line import trouble_sentence
from desktop.screens.tables_out import bring_in_package
from desktop.screens.theme import ThemeName, apply_theme, is_dark
from desktop.screens.workspace import Workspace
from desktop.storage.backups import copies_of
from desktop.storage.store import Store
from desktop.wording.damage import abrupt_sentence, clock_sentence
from desktop.wording.numbers import count
from desktop.wording.problems import not_copied_sentence, problem_sentence

if TYPE_CHECKING:
    from desktop.screens.caseload_window import CaseloadWindow

_MEND_LATER = 500
_CLOCK_LOOK = 60_000
"""Milliseconds between two looks at the calendar."""


class MainWindow(QMainWindow):
    """Everything on screen around one open journal, or the start screen without one."""

    def __init__(
        self, folder: Path, *, now: Callable[[], datetime] = datetime.now, parent: QWidget | None = None
    ) -> None:
        """A window that keeps its own journal and its settings in ``folder``."""
        super().__init__(parent)
        self.folder = folder
        self.own_journal = folder / f"journal{JOURNAL_ENDING}"
        self.session: Session | None = None
        self.keeping: Keeping | None = None
        self.caseloads: dict[Path, CaseloadWindow] = {}
        self.now = now
        self.settings = Settings(folder)
        self.setWindowTitle("Dayfence")
        self.start_screen = StartScreen()
        self.workspace = Workspace()
        self._pages = QStackedWidget()
        self._pages.addWidget(self.start_screen)
        self._pages.addWidget(self.workspace)
        self.setCentralWidget(self._pages)
        self.log = LogCommands(self)
        FileDrops(self)
        self._menus = Menus(self)
        self._connect()
        self._clock = QTimer(self)
        self._clock.timeout.connect(self._look_at_calendar)
        self._clock.start(_CLOCK_LOOK)
        self.resize(1360, 820)
        self.workspace.restore_panes(self.settings.restore_places(self))
        self._apply_theme()
        self._follow_session()

    # Opening and starting.

    def open_own(self) -> None:
        """Open the person's own journal when there is one; else the start screen stays."""
        if self.own_journal.exists() or copies_of(self.own_journal):
            self.open_journal(self.own_journal)

    def open_journal(self, path: Path) -> bool:
        """Open a journal in place of the one that is open; says so when it cannot be."""
        if is_caseload(path):
            return show_caseload(self, path)
        if self.session is not None and self.session.path.resolve() == path.resolve():
            return True
        # What is open is let go only when the other one is there: else it stays, or the start screen does.
        store = open_with_questions(self, path, self.now)
        if store is not None and not self.let_go():
            store.close()
            return False
        return self._show_opened(store)

    def show_start(self) -> None:
        """Show the start screen where no journal is open."""
        self._follow_session()

    def open_sample(self) -> None:
        """Open the sample journal, making it first where there is none."""
        path = self.folder / f"sample{JOURNAL_ENDING}"
        if not path.exists():
            try:
                make_sample(path, self.now)
            except StorageError as error:
                self._warn(error)
                return
        self.open_journal(path)

    def start_log(self) -> None:
        """Ask what to log, and begin: in the open journal, or in a new one of the person's own."""
        dialog = MeasureDialog(self, first=self.session is None)
        if dialog.exec() != QDialog.DialogCode.Accepted:
            return
        session = self.session or self.start_journal(self.own_journal)
        if session is None:
            return
        edit = add_measures(session.journal, session.ids, dialog.measures)
        session.do(edit)
        self.show_measure(max(session.journal.measures) - len(edit.changes) + 1)
        self.go_to_today()

    def new_journal(self) -> None:
        """Start another journal in a file of the person's choice."""
        path = ask_new_journal(self, self.folder)
        if path is not None:
            if self.let_go() and self.start_journal(path) is not None:
                self.start_log()
            self._follow_session()

    def open_file(self) -> None:
        """Open a journal from a file of the person's choice."""
        path = ask_journal(self, self.folder)
        if path is not None:
            self.open_journal(path)

    def bring_in_table(self) -> None:
        """Bring in a table from a file of the person's choice."""
        path = ask_table(self)
        if path is not None:
            self.bring_in_file(path)

    def bring_in_file(self, path: Path) -> None:
        """Bring in a table; without an open journal a new one is started for it."""
        folder = package_place(path)
        if folder is not None:
            bring_in_package(self, folder)
            return
        bring_in_rows(self, path.name, partial(read_file, path))

    def say_brought(self, brought: BroughtIn) -> None:
        """Show what was brought in, and say how much it was."""
        if brought.measures:
            self.show_measure(brought.measures[0].id)
        self.say(
            f"{count(brought.added, 'value')} brought in, {brought.replaced} replaced, "
            f"{brought.untouched} there already."
        )

    # The log.

    def go_to_today(self) -> None:
        """Make today current."""
        if self.session is not None:
            self._go_to(self.session.today)

    def show_day(self, day: date) -> None:
        """Make a day current; the table begins earlier where it must."""
        if self.session is not None:
            self.workspace.days.days.show_from(day - timedelta(7))
            self._go_to(min(day, self.session.today))

    def undo(self) -> None:
        """Take back the last act."""
        if self.session is not None:
            self.session.undo()

    def redo(self) -> None:
        """Do the act last taken back again."""
        if self.session is not None:
            self.session.redo()

    # The view.

    def load_chart(self) -> None:
        """Bring the chart in, once the days are on screen."""
        self.workspace.chart_pane.load_chart()

    def show_measure(self, measure: int) -> None:
        """Put a measure on the chart and under the hand that types."""
        if self.session is not None:
            self.session.choose_measure(measure)
            self.workspace.days.go_to_column(self.workspace.days.days.column(measure))

    def choose_period(self, period: Period) -> None:
        """Make a point of a day, a week, a month or a year."""
        if self.session is not None:
            self.session.choose_period(period)

    def show_whole_chart(self) -> None:
        """Bring every day into view."""
        if self.workspace.chart_pane.chart is not None:
            self.workspace.chart_pane.chart.show_all()

    def set_theme(self, theme: ThemeName) -> None:
        """Light, dark, or as the computer is set."""
        self.settings.set_theme(theme)
        self._apply_theme()

    def larger_text(self) -> None:
        """One step larger, up to twice the plain size."""
        self._set_text_size(self.settings.larger_text)

    def smaller_text(self) -> None:
        """One step smaller, down to the plain size."""
        self._set_text_size(self.settings.smaller_text)

    def say(self, sentence: str) -> None:
        """Say something in the status line."""
        self.workspace.status.say(sentence)

    def closeEvent(self, event: QCloseEvent) -> None:
        """Write what is left; ask before leaving something that could not be written."""
        if not self.let_go():
            event.ignore()
            return
        self.settings.keep_places(self, self.workspace.chosen_panes)
        event.accept()

    # Inside.

    def _connect(self) -> None:
        self.start_screen.log_wanted.connect(self.start_log)
        self.start_screen.table_wanted.connect(self.bring_in_table)
        self.start_screen.sample_wanted.connect(self.open_sample)
        self.workspace.days.said.connect(self.say)
        self.workspace.chart_pane.period_chosen.connect(self.choose_period)
        self.workspace.gap.none_meant.connect(self.log.gap_was_none)
        self.workspace.gap.not_known.connect(self.log.gap_is_not_known)
        self.workspace.status.try_again_wanted.connect(self._try_again)
        self.workspace.status.give_up_wanted.connect(self._give_up)
        self.workspace.status.keep_elsewhere_wanted.connect(partial(keep_elsewhere, self))

    def start_journal(self, path: Path) -> Session | None:
        """Make a new journal and open it; None when it cannot be made, which is said."""
        try:
            store = Store.create(path, new_person(), clock=self.now, alone=True)
        except StorageError as error:
            self._warn(error)
            return None
        return self._take(store)

    def _show_opened(self, store: Store | None) -> bool:
        if store is None:
            self._follow_session()
            return False
        session = self._take(store)
        if session.saved_at[:10] > session.today.isoformat():
            self.say(clock_sentence(session.today, date.fromisoformat(session.saved_at[:10])))
        elif store.ended_abruptly:
            self.say(abrupt_sentence(session.journal))
        return True

    def _take(self, store: Store) -> Session:
        """Show a store's journal; no other is open."""
        session = Session(store, now=self.now, parent=self)
        self.session = session
        table = DaysTable(session)
        table.quiet_colour = self.workspace.chart_pane.look.colour("quiet")
        table.unread.connect(self.say)
        # Queued: the question must not stand inside the editor's own commit.
        table.unlikely.connect(self._ask_unlikely, Qt.ConnectionType.QueuedConnection)
        session.edited.connect(self._after_edit)
        session.saved.connect(self._follow_session)
        session.save_failed.connect(self._follow_session)
        session.measure_chosen.connect(self._follow_session)
        session.reviewed.connect(self._show_review)
        session.history_read.connect(self._menus.follow)
        session.weighed.connect(self.workspace.findings.show_choices)
        self._apply_theme()
        self.workspace.days.show_days(table)
        self.workspace.days.selectionModel().currentColumnChanged.connect(self._follow_column)
        self._pages.setCurrentWidget(self.workspace)
        self.workspace.fit_days()
        self._follow_session()
        session.make_review()
        self.workspace.days.setFocus()
        self.keeping = Keeping(session, self.settings.copies_place, session)
        self.keeping.not_copied.connect(self._say_not_copied)
        self.keeping.damaged.connect(self._mend)
        self.keeping.begin()
        return session

    def let_go(self, *, leave_unsaved: bool = False) -> bool:
        """Close the open journal; False when the person would rather keep it open.

        Args:
            leave_unsaved: what could not be written is kept elsewhere, so nobody is asked about it.
        """
        session = self.session
        if session is None:
            return True
        self.workspace.days.finish_typing()
        session.wait_until_written()
        QApplication.processEvents()
        if self.workspace.days.state() == DaysPane.State.EditingState:
            # What was being typed was asked about, and is being typed again.
            return False
        if not ask_to_leave_unread(self, self.workspace.days.days.unread_texts):
            return False
        if session.trouble is not None and not leave_unsaved:
            sentence = f"{trouble_sentence(session.trouble)}\n\nLeave without what is not saved?"
            if QMessageBox.question(self, "Dayfence", sentence) != QMessageBox.StandardButton.Yes:
                return False
        self.session = None
        self.workspace.caution.hide()
        self.workspace.days.setModel(None)
        if self.keeping is not None:
            self.keeping.close()
        self.keeping = None
        session.close()
        session.deleteLater()
        return True

    def _follow_session(self) -> None:
        """Make titles, menus and the status line say what is open."""
        self._menus.follow()
        if self.session is None:
            self._pages.setCurrentWidget(self.start_screen)
        else:
            self.workspace.show_session(self.session)

    def _after_edit(self, changes: tuple[RowChange, ...]) -> None:
        self.say("")
        self.log.look_for_cautions(changes)
        self._follow_session()

    def _show_review(self) -> None:
        if self.session is not None:
            self.workspace.show_review(self.session)
            self._menus.follow()

    def _try_again(self) -> None:
        if self.session is not None:
            self.session.try_again()
            self._follow_session()

    def _give_up(self) -> None:
        if self.session is not None:
            try:
                self.session.give_up_unsaved()
            except StorageError as error:
                self._warn(error)
            self._follow_session()

    def _ask_unlikely(self, unlikely: Unlikely) -> None:
        """A number far from what this measure usually is: ask, and keep it when it is right."""
        if self.session is None:
            return
        days = self.workspace.days
        measure = self.session.journal.measures[unlikely.cell.measure]
        if ask_if_right(self, measure, unlikely.value, unlikely.cell.day):
            days.days.keep(unlikely.cell, unlikely.value, unlikely.text)
            return
        index = days.days.index(days.days.row(unlikely.cell.day), days.days.column(measure.id))
        days.setCurrentIndex(index)
        days.edit(index)

    def _follow_column(self) -> None:
        """The measure being typed is the one on the chart."""
        if self.session is not None and self.workspace.days.model() is not None:
            measure = self.workspace.days.days.measure(self.workspace.days.currentIndex().column())
            if measure is not None:
                self.session.choose_measure(measure.id)

    def _go_to(self, day: date) -> None:
        self.workspace.days.go_to_row(self.workspace.days.days.row(day))
        self.workspace.days.setFocus()

    def current_day(self, session: Session) -> date:
        """The day under the hand that types, else today."""
        index = self.workspace.days.currentIndex()
        return self.workspace.days.days.day(index.row()) if index.isValid() else session.today

    def _set_text_size(self, percent: int) -> None:
        self.settings.set_text_percent(percent)
        self._apply_theme()

    def _apply_theme(self) -> None:
        app = QApplication.instance()
        assert isinstance(app, QApplication)
        look = apply_theme(app, self.settings.theme, self.settings.text_percent)
        self.workspace.set_face(app.font())
        self.start_screen.set_face(app.font())
        self.workspace.days.set_paper(look.paper)
        self.workspace.chart_pane.set_look(look)
        for page in (self.workspace, self.start_screen.caution_line):
            page.set_dark(is_dark(self.settings.theme))
        model = self.workspace.days.model()
        if isinstance(model, DaysTable):
            model.quiet_colour = look.colour("quiet")

    def _look_at_calendar(self) -> None:
        """After midnight a new today is there, but not under someone who is typing."""
        if self.session is not None and self.workspace.days.state() != DaysPane.State.EditingState:
            self.workspace.days.days.start_today()

    def _mend(self) -> None:
        """The open file was found to be damaged: close it, and show what can be read."""
        if self.session is None:
            return
        if QApplication.activeModalWidget() is not None:
            # Not in the middle of another question.
            QTimer.singleShot(_MEND_LATER, self, self._mend)
            return
        path = self.session.path
        if self.let_go():
            store = None
            try:
                store = mend(self, path, self.now)
            except StorageError as error:
                self._warn(error)
            self._show_opened(store)

    def _say_not_copied(self, error: DayfenceError) -> None:
        self.say(not_copied_sentence(error))

    def _warn(self, error: DayfenceError) -> None:
        QMessageBox.warning(self, "Dayfence", problem_sentence(error))
