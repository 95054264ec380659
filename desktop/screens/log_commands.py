"""The commands of the Log menu: changes, named days, kinds of day, measures."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from datetime import date
from typing import TYPE_CHECKING

from PySide6.QtWidgets import QDialog, QMessageBox

from desktop.edits.changes import edit_change, mark_change, mark_span, remove_change, remove_span
from desktop.edits.days import EmptyKind, put_back, set_aside
from desktop.edits.edit import Edit
from desktop.edits.gaps import gap_is_not_known, gap_was_none
from desktop.edits.measures import archive_measure, convert_measure, move_measure, remove_measure, set_measure
from desktop.edits.plans import plan_in_force, set_plan
from desktop.journal.records import Measure
from desktop.journal.row_change import RowChange
from desktop.models.session import Session
from desktop.screens.caution_settings import CautionSettings
from desktop.screens.change_dialog import ChangeDialog
from desktop.screens.dialogs import ask_day, ask_reason
from desktop.screens.measure_settings import MeasureSettings
from desktop.screens.plan_dialog import PlanDialog
from desktop.screens.span_dialog import SpanDialog
from desktop.wording.numbers import count

if TYPE_CHECKING:
    from desktop.screens.main_window import MainWindow


class LogCommands:
    """Asks what a command needs and hands the edit to the open journal; without one it does nothing."""

    def __init__(self, window: MainWindow) -> None:
        self._window = window

    def mark_change(self) -> None:
        """Mark a change on the current day."""
        session = self._session
        if session is None:
            return
        day = self._window.current_day(session)
        dialog = ChangeDialog(day, session.journal.columns(), self._window, judged=session.current)
        if dialog.exec() == QDialog.DialogCode.Accepted:
            chosen = dialog.chosen
            edit = mark_change(
                session.journal,
                session.ids,
                chosen.day,
                chosen.label,
                why=chosen.why,
                settle_days=chosen.settle_days,
                measures=chosen.measures,
                agreed=dialog.agreed,
            )
            session.do(edit)

    def edit_change(self, number: int) -> None:
        """Edit a change by its id."""
        session = self._session
        if session is None:
            return
        change = session.journal.changes[number]
        judged = session.current
        dialog = ChangeDialog(change.day, session.journal.columns(), self._window, change, judged)
        if dialog.exec() == QDialog.DialogCode.Accepted:
            session.do(edit_change(session.journal, dialog.chosen, dialog.agreed))

    def remove_change(self, number: int) -> None:
        """Take a change away by its id; Undo puts it back."""
        if self._session is not None:
            self._session.do(remove_change(self._session.journal, number))

    def name_days(self) -> None:
        """Name the days chosen in the table, or any others."""
        session = self._session
        if session is None:
            return
        days = sorted(self._window.workspace.days.chosen_days) or [self._window.current_day(session)]
        dialog = SpanDialog(days[0], days[-1], session.journal.columns(), self._window)
        if dialog.exec() == QDialog.DialogCode.Accepted:
            span = dialog.chosen
            edit = mark_span(
                session.journal,
                session.ids,
                span.first,
                span.last,
                span.kind,
                span.label,
                measures=span.measures,
            )
            session.do(edit)

    def remove_span(self, number: int) -> None:
        """Take named days away by their id; the days themselves stay as they are."""
        if self._session is not None:
            self._session.do(remove_span(self._session.journal, number))

    def set_kind(self, kind: EmptyKind) -> None:
        """Say what the chosen days were."""
        days = self._window.workspace.days
        if self._session is not None and days.model() is not None:
            days.days.set_kind(days.selectedIndexes(), kind)

    def set_day_aside(self) -> None:
        """Set the current day aside with a reason, or put it back."""
        session = self._session
        if session is None:
            return
        index = self._window.workspace.days.currentIndex()
        measure = self._window.workspace.days.days.measure(index.column()) if index.isValid() else None
        day = self._window.current_day(session)
        entry = session.journal.entry(measure.id, day) if measure is not None else None
        if measure is None or entry is None or entry.value is None:
            self._window.say("There is no value on this day to set aside.")
        elif entry.kind == "set aside":
            session.do(put_back(session.journal, measure.id, day))
        elif (reason := ask_reason(self._window)) is not None:
            session.do(set_aside(session.journal, measure.id, day, reason))

    def measure_settings(self) -> None:
        """Change the settings of the measure on the chart."""
        session, measure = self._current
        if session is None or measure is None:
            return
        entries = session.journal.entries.get(measure.id, {}).values()
        values = sum(entry.value is not None for entry in entries)
        dialog = MeasureSettings(measure, values, self._window)
        if dialog.exec() != QDialog.DialogCode.Accepted:
            return
        if dialog.conversion is not None:
            session.do(convert_measure(session.journal, dialog.chosen, *dialog.conversion))
        else:
            session.do(set_measure(session.journal, dialog.chosen))

    def go_to_day(self) -> None:
        """Ask for a day and make it current."""
        session = self._session
        if session is not None:
            day = ask_day(self._window, "Go to a day", self._window.current_day(session))
            if day is not None:
                self._window.show_day(day)

    def plan(self) -> None:
        """Ask about the plan of days a week of the measure on the chart."""
        session, measure = self._current
        if session is None or measure is None:
            return
        day = self._window.current_day(session)
        dialog = PlanDialog(measure, plan_in_force(session.journal, measure.id, day), day, self._window)
        if dialog.exec() == QDialog.DialogCode.Accepted:
            times, spare = dialog.times.value(), dialog.spare.value()
            session.do(set_plan(session.journal, session.ids, measure.id, dialog.first.chosen, times, spare))

    def caution_settings(self) -> None:
        """Settle what is said about the measure on the chart, and the emergency number."""
        session, measure = self._current
        if session is None or measure is None:
            return
        settings, journal_id = self._window.settings, session.journal.person.journal_id
        own = settings.cautions(journal_id, measure.id).with_limits_of(measure)
        dialog = CautionSettings(measure, own, settings.emergency_number, self._window)
        if dialog.exec() == QDialog.DialogCode.Accepted:
            chosen = dialog.chosen
            settings.set_emergency_number(dialog.number)
            if session.read_only:
                settings.set_cautions(journal_id, measure.id, chosen)
                return
            # The limits belong to the log: they go where it goes.
            settings.set_cautions(journal_id, measure.id, replace(chosen, low=None, high=None, words=""))
            limits = replace(measure, limit_low=chosen.low, limit_high=chosen.high, limit_words=chosen.words)
            session.do(set_measure(session.journal, limits))

    def look_for_cautions(self, changes: tuple[RowChange, ...]) -> None:
        """Say what there is to say about values that were just typed."""
        session = self._session
        if session is not None and changes:
            settings, journal_id = self._window.settings, session.journal.person.journal_id
            self._window.workspace.caution.look_at(
                session.journal,
                changes,
                lambda measure: settings.cautions(journal_id, measure).with_limits_of(
                    session.journal.measures[measure]
                ),
                settings.emergency_number,
            )

    def move_measure(self, step: int) -> None:
        """Move the measure's column to the left or right."""
        self._of_measure(lambda session, measure: move_measure(session.journal, measure.id, step))

    def archive_measure(self) -> None:
        """Hide the measure on the chart from the table."""
        session, measure = self._current
        if session is not None and measure is not None:
            session.do(archive_measure(session.journal, measure.id))
            self._window.say(f"{measure.title} is put away, not gone: Log, Measures put away.")

    def bring_back_measure(self, number: int) -> None:
        """Show a measure again that was put away, and put it on the chart."""
        if self._session is not None:
            self._session.do(archive_measure(self._session.journal, number, archived=False))
            self._window.show_measure(number)

    def remove_measure(self) -> None:
        """Remove the measure on the chart with all its days, after asking."""
        session, measure = self._current
        if session is None or measure is None:
            return
        days = count(len(session.journal.entries.get(measure.id, {})), "day")
        box = QMessageBox(self._window)
        box.setWindowTitle("Remove a measure")
        box.setText(
            f"Remove {measure.title} with its {days}? Undo brings it back, and the history keeps it. "
            "To only hide it, put it away instead."
        )
        remove = box.addButton("Remove", QMessageBox.ButtonRole.DestructiveRole)
        keep = box.addButton("Keep it", QMessageBox.ButtonRole.RejectRole)
        box.setDefaultButton(keep)
        box.setEscapeButton(keep)
        box.exec()
        if box.clickedButton() is remove:
            session.do(remove_measure(session.journal, measure.id))

    def gap_was_none(self, first: date, last: date) -> None:
        """The empty days were days without any."""
        self._of_measure(
            lambda session, measure: gap_was_none(session.journal, measure.id, first, last, now=session.now())
        )

    def gap_is_not_known(self, first: date, last: date) -> None:
        """Nobody knows what the empty days were."""
        self._of_measure(lambda session, _: gap_is_not_known(session.journal, session.ids, first, last))

    def look_on(self, day: date | None) -> None:
        """Agree on a day to judge the measure on the chart, or on none."""
        self._of_measure(lambda session, measure: set_measure(session.journal, replace(measure, look_day=day)))

    @property
    def _session(self) -> Session | None:
        return self._window.session

    @property
    def _current(self) -> tuple[Session | None, Measure | None]:
        session = self._session
        return session, session.current if session is not None else None

    def _of_measure(self, edit: Callable[[Session, Measure], Edit]) -> None:
        session, measure = self._current
        if session is not None and measure is not None:
            session.do(edit(session, measure))
