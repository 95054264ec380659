"""The menus: every command with its keys. Each calls one method of the window."""

from __future__ import annotations

from functools import partial
from typing import TYPE_CHECKING

from PySide6.QtGui import QAction, QActionGroup
from PySide6.QtWidgets import QMenu

from analysis.log import PERIODS
from desktop.edits.days import EmptyKind
from desktop.screens.actions import Keys, add_action
from desktop.screens.bring_in_dialog import bring_in_pasted
from desktop.screens.chart_pane import PERIOD_WORDS, show_key_of
from desktop.screens.earlier_copies import show_earlier_copies
from desktop.screens.erase_dialog import erase_for_good
from desktop.screens.file_commands import keep_elsewhere, open_stranger, show_own_caseload
from desktop.screens.find_dialog import show_find
from desktop.screens.hand_over_dialog import hand_over
from desktop.screens.held_dialog import show_held
from desktop.screens.help import show_about, show_how_often_wrong, show_keys
from desktop.screens.tables_out import copy_findings, save_as_table
from desktop.wording.acts import act_phrase
from desktop.wording.days import full_day

if TYPE_CHECKING:
    from desktop.screens.log_commands import LogCommands
    from desktop.screens.main_window import MainWindow


class Menus:
    """Fills the window's menu bar and keeps it in step with the open journal."""

    def __init__(self, window: MainWindow) -> None:
        self._window = window
        self._reading: list[QAction] = []
        self._writing: list[QAction] = []
        bar = window.menuBar()
        file, edit, log, view, help_menu = map(bar.addMenu, ("&File", "&Edit", "&Log", "&View", "&Help"))
        self._fill_file(file)
        self._fill_edit(edit)
        self._fill_log(log)
        self._fill_view(view)
        add_action(help_menu, "&Keys", partial(show_keys, window), Keys.HelpContents)
        add_action(help_menu, "What the &marks mean", partial(show_key_of, window.workspace.chart_pane))
        add_action(help_menu, "How often is it &wrong?", partial(show_how_often_wrong, window))
        add_action(help_menu, "&About Dayfence", partial(show_about, window))

    def follow(self) -> None:
        """Offer what can be done with the journal as it stands."""
        session = self._window.session
        can_change = session is not None and not session.read_only
        for action in self._writing:
            action.setEnabled(can_change)
        for action in self._reading:
            action.setEnabled(session is not None)
        undoable, redoable = (session.undoable, session.redoable) if session else (None, None)
        for action, step, word in ((self._undo, undoable, "&Undo"), (self._redo, redoable, "&Redo")):
            action.setEnabled(step is not None)
            phrase = act_phrase(step, session.journal) if step is not None and session is not None else ""
            action.setText(f"{word}: {phrase}" if phrase else word)
        if session is not None and session.review is not None:
            self._periods[PERIODS.index(session.review.measure.period)].setChecked(True)

    def _fill_file(self, file: QMenu) -> None:
        window = self._window
        add_action(file, "&New journal…", window.new_journal, Keys.New)
        add_action(file, "&Open a journal…", window.open_file, Keys.Open)
        add_action(file, "Open somebody &else's journal…", partial(open_stranger, window))
        add_action(file, "Open the &sample journal", window.open_sample)
        add_action(file, "A coach's &caseload…", partial(show_own_caseload, window))
        file.addSeparator()
        add_action(file, "&Bring in a table…", window.bring_in_table, "Ctrl+I")
        add_action(
            file, "Bring in the &pasted block as a table…", partial(bring_in_pasted, window), "Ctrl+Shift+V"
        )
        self._reading.append(add_action(file, "The &page…", partial(_show_page, window), Keys.Print))
        file.addSeparator()
        self._reading += [
            add_action(file, "&Earlier copies…", partial(show_earlier_copies, window)),
            add_action(file, "Save a &copy…", partial(keep_elsewhere, window)),
            add_action(file, "Save a copy as a &table…", partial(save_as_table, window)),
            add_action(file, "A copy to &hand over…", partial(hand_over, window)),
        ]
        self._writing.append(add_action(file, "Erase for &good…", partial(erase_for_good, window)))
        file.addSeparator()
        add_action(file, "&Quit", window.close, Keys.Quit)

    def _fill_edit(self, edit: QMenu) -> None:
        window = self._window
        self._undo = add_action(edit, "&Undo", window.undo, Keys.Undo)
        self._redo = add_action(edit, "&Redo", window.redo, "Ctrl+Shift+Z")
        edit.addSeparator()
        self._reading += [
            add_action(edit, "&Copy days", window.workspace.days.copy),
            add_action(edit, "Copy chart as p&icture", partial(_copy_chart, window)),
            add_action(edit, "Copy &findings as text", partial(copy_findings, window)),
        ]
        self._writing.append(add_action(edit, "&Paste days", window.workspace.days.paste))

    def _fill_log(self, log: QMenu) -> None:
        window, commands = self._window, self._window.log
        self._writing.append(add_action(log, "&Add a measure…", window.start_log, "Ctrl+Shift+A"))
        mark = add_action(log, "&Mark a change…", commands.mark_change, "Ctrl+M")
        name = add_action(log, "&Name days…", commands.name_days, "Ctrl+Shift+D")
        aside = add_action(log, "&Set the day aside, or put it back…", commands.set_day_aside, "Ctrl+D")
        kinds = log.addMenu("The chosen &days were")
        self._writing += [mark, name, aside, kinds.menuAction(), *fill_kinds(kinds, commands)]
        # The same by the other mouse button on the table, or by the menu key.
        window.workspace.days.offered = [mark, name, aside, kinds.menuAction()]
        changes, spans = log.addMenu("&Changes"), log.addMenu("Days with a na&me")
        changes.aboutToShow.connect(partial(self._list_changes, changes))
        spans.aboutToShow.connect(partial(self._list_spans, spans))
        log.addSeparator()
        self._writing += [
            add_action(log, "Settings of this m&easure…", commands.measure_settings, "Ctrl+E"),
            add_action(log, "A &plan of days a week…", commands.plan),
            add_action(log, "Ca&utions of this measure…", commands.caution_settings),
            add_action(log, "Move the column &left", partial(commands.move_measure, -1), "Ctrl+Shift+Left"),
            add_action(log, "Move the column &right", partial(commands.move_measure, 1), "Ctrl+Shift+Right"),
            add_action(log, "Put this measure awa&y", commands.archive_measure),
            add_action(log, "Remove this measure…", commands.remove_measure),
        ]
        away = log.addMenu("Measures put a&way")
        away.aboutToShow.connect(partial(self._list_put_away, away))
        log.addSeparator()
        self._reading += [
            add_action(log, "What this day has &held…", partial(show_held, window), "Ctrl+H"),
            changes.menuAction(),
            spans.menuAction(),
            away.menuAction(),
            add_action(log, "&Find…", partial(show_find, window), Keys.Find),
            add_action(log, "Go to &today", window.go_to_today, "Ctrl+T"),
            add_action(log, "&Go to a day…", commands.go_to_day, "Ctrl+G"),
        ]

    def _fill_view(self, view: QMenu) -> None:
        window = self._window
        measures = view.addMenu("&Measure")
        measures.aboutToShow.connect(partial(self._list_measures, measures))
        group = QActionGroup(window)
        for place, period in enumerate(PERIODS, start=1):
            action = add_action(
                view, PERIOD_WORDS[period].capitalize(), partial(window.choose_period, period), f"Ctrl+{place}"
            )
            action.setCheckable(True)
            group.addAction(action)
        self._periods = group.actions()
        whole = add_action(view, "&Whole chart", window.show_whole_chart, "Ctrl+0")
        self._reading += [measures.menuAction(), *self._periods, whole]
        view.addSeparator()
        themes = view.addMenu("&Theme")
        add_action(themes, "As the computer is set", partial(window.set_theme, "system"))
        add_action(themes, "Light", partial(window.set_theme, "light"))
        add_action(themes, "Dark", partial(window.set_theme, "dark"))
        add_action(view, "&Larger text", window.larger_text, "Ctrl++")
        add_action(view, "S&maller text", window.smaller_text, "Ctrl+-")

    def _list_changes(self, menu: QMenu) -> None:
        menu.clear()
        session = self._window.session
        changes = sorted(session.journal.changes.values(), key=lambda one: one.day) if session else []
        if not changes:
            menu.addAction("No change is marked yet").setEnabled(False)
        for change in changes:
            one = menu.addMenu(f"{full_day(change.day)}: {change.label or 'no label'}")
            add_action(one, "Edit…", partial(self._window.log.edit_change, change.id))
            add_action(one, "Remove", partial(self._window.log.remove_change, change.id))

    def _list_spans(self, menu: QMenu) -> None:
        menu.clear()
        session = self._window.session
        spans = sorted(session.journal.spans.values(), key=lambda one: one.first) if session else []
        if not spans:
            menu.addAction("No days have a name yet").setEnabled(False)
        for span in spans:
            days = (
                f"{full_day(span.first)} to {full_day(span.last)}"
                if span.last > span.first
                else full_day(span.first)
            )
            one = menu.addMenu(f"{days}: {span.label or span.kind}")
            add_action(one, "Take the name away", partial(self._window.log.remove_span, span.id))

    def _list_put_away(self, menu: QMenu) -> None:
        menu.clear()
        session = self._window.session
        away = [one for one in session.journal.measures.values() if one.archived] if session else []
        if not away:
            menu.addAction("No measure is put away").setEnabled(False)
        for measure in away:
            add_action(
                menu, f"Bring back {measure.title}", partial(self._window.log.bring_back_measure, measure.id)
            )

    def _list_measures(self, menu: QMenu) -> None:
        menu.clear()
        session = self._window.session
        for measure in session.journal.columns() if session else []:
            action = add_action(menu, measure.title, partial(self._window.show_measure, measure.id))
            action.setCheckable(True)
            action.setChecked(session is not None and measure.id == session.measure)


def _show_page(window: MainWindow) -> None:
    from desktop.screens.page_dialog import show_page  # What draws on paper is not needed to show the window.

    show_page(window)


def _copy_chart(window: MainWindow) -> None:
    from desktop.screens.page_dialog import copy_chart

    copy_chart(window)


def fill_kinds(menu: QMenu, commands: LogCommands) -> list[QAction]:
    """Offer every kind of day that holds no value; each with the letter that says it in a cell."""
    kinds: tuple[tuple[str, EmptyKind], ...] = (
        ("&Rest days\tr", "rest"),
        ("&Ill\ti", "ill"),
        ("&Away or paused\ta", "away"),
        ("&Not known", "blank"),
    )
    return [add_action(menu, words, partial(commands.set_kind, kind)) for words, kind in kinds]
