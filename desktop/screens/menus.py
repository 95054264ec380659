"""The menus: every command with its keys. Each calls one method of the window."""

from __future__ import annotations

from collections.abc import Callable
from functools import partial
from typing import TYPE_CHECKING

from PySide6.QtGui import QAction, QActionGroup, QKeySequence
from PySide6.QtWidgets import QMenu

from analysis.log import PERIODS
from desktop.edits.days import EmptyKind
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

Keys = QKeySequence.StandardKey


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
        _add(help_menu, "&Keys", partial(show_keys, window), Keys.HelpContents)
        _add(help_menu, "What the &marks mean", partial(show_key_of, window.workspace.chart_pane))
        _add(help_menu, "How often is it &wrong?", partial(show_how_often_wrong, window))
        _add(help_menu, "&About Dayfence", partial(show_about, window))

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
        _add(file, "&New journal…", window.new_journal, Keys.New)
        _add(file, "&Open a journal…", window.open_file, Keys.Open)
        _add(file, "Open somebody &else's journal…", partial(open_stranger, window))
        _add(file, "Open the &sample journal", window.open_sample)
        _add(file, "A coach's &caseload…", partial(show_own_caseload, window))
        file.addSeparator()
        _add(file, "&Bring in a table…", window.bring_in_table, "Ctrl+I")
        _add(file, "Bring in the &pasted block as a table…", partial(bring_in_pasted, window), "Ctrl+Shift+V")
        self._reading.append(_add(file, "The &page…", partial(_show_page, window), Keys.Print))
        file.addSeparator()
        self._reading += [
            _add(file, "&Earlier copies…", partial(show_earlier_copies, window)),
            _add(file, "Save a &copy…", partial(keep_elsewhere, window)),
            _add(file, "Save a copy as a &table…", partial(save_as_table, window)),
            _add(file, "A copy to &hand over…", partial(hand_over, window)),
        ]
        self._writing.append(_add(file, "Erase for &good…", partial(erase_for_good, window)))
        file.addSeparator()
        _add(file, "&Quit", window.close, Keys.Quit)

    def _fill_edit(self, edit: QMenu) -> None:
        window = self._window
        self._undo = _add(edit, "&Undo", window.undo, Keys.Undo)
        self._redo = _add(edit, "&Redo", window.redo, "Ctrl+Shift+Z")
        edit.addSeparator()
        self._reading += [
            _add(edit, "&Copy days", window.workspace.days.copy),
            _add(edit, "Copy chart as p&icture", partial(_copy_chart, window)),
            _add(edit, "Copy &findings as text", partial(copy_findings, window)),
        ]
        self._writing.append(_add(edit, "&Paste days", window.workspace.days.paste))

    def _fill_log(self, log: QMenu) -> None:
        window, commands = self._window, self._window.log
        self._writing.append(_add(log, "&Add a measure…", window.start_log, "Ctrl+Shift+A"))
        mark = _add(log, "&Mark a change…", commands.mark_change, "Ctrl+M")
        name = _add(log, "&Name days…", commands.name_days, "Ctrl+Shift+D")
        aside = _add(log, "&Set the day aside, or put it back…", commands.set_day_aside, "Ctrl+D")
        kinds = log.addMenu("The chosen &days were")
        self._writing += [mark, name, aside, kinds.menuAction(), *fill_kinds(kinds, commands)]
        # The same by the other mouse button on the table, or by the menu key.
        window.workspace.days.offered = [mark, name, aside, kinds.menuAction()]
        changes, spans = log.addMenu("&Changes"), log.addMenu("Days with a na&me")
        changes.aboutToShow.connect(partial(self._list_changes, changes))
        spans.aboutToShow.connect(partial(self._list_spans, spans))
        log.addSeparator()
        self._writing += [
            _add(log, "Settings of this m&easure…", commands.measure_settings, "Ctrl+E"),
            _add(log, "A &plan of days a week…", commands.plan),
            _add(log, "Ca&utions of this measure…", commands.caution_settings),
            _add(log, "Move the column &left", partial(commands.move_measure, -1), "Ctrl+Shift+Left"),
            _add(log, "Move the column &right", partial(commands.move_measure, 1), "Ctrl+Shift+Right"),
            _add(log, "Put this measure awa&y", commands.archive_measure),
            _add(log, "Remove this measure…", commands.remove_measure),
        ]
        away = log.addMenu("Measures put a&way")
        away.aboutToShow.connect(partial(self._list_put_away, away))
        log.addSeparator()
        self._reading += [
            _add(log, "What this day has &held…", partial(show_held, window), "Ctrl+H"),
            changes.menuAction(),
            spans.menuAction(),
            away.menuAction(),
            _add(log, "&Find…", partial(show_find, window), Keys.Find),
            _add(log, "Go to &today", window.go_to_today, "Ctrl+T"),
            _add(log, "&Go to a day…", commands.go_to_day, "Ctrl+G"),
        ]

    def _fill_view(self, view: QMenu) -> None:
        window = self._window
        measures = view.addMenu("&Measure")
        measures.aboutToShow.connect(partial(self._list_measures, measures))
        group = QActionGroup(window)
        for place, period in enumerate(PERIODS, start=1):
            action = _add(
                view, PERIOD_WORDS[period].capitalize(), partial(window.choose_period, period), f"Ctrl+{place}"
            )
            action.setCheckable(True)
            group.addAction(action)
        self._periods = group.actions()
        whole = _add(view, "&Whole chart", window.show_whole_chart, "Ctrl+0")
        self._reading += [measures.menuAction(), *self._periods, whole]
        view.addSeparator()
        themes = view.addMenu("&Theme")
        _add(themes, "As the computer is set", partial(window.set_theme, "system"))
        _add(themes, "Light", partial(window.set_theme, "light"))
        _add(themes, "Dark", partial(window.set_theme, "dark"))
        _add(view, "&Larger text", window.larger_text, "Ctrl++")
        _add(view, "S&maller text", window.smaller_text, "Ctrl+-")

    def _list_changes(self, menu: QMenu) -> None:
        menu.clear()
        session = self._window.session
        changes = sorted(session.journal.changes.values(), key=lambda one: one.day) if session else []
        if not changes:
            menu.addAction("No change is marked yet").setEnabled(False)
        for change in changes:
            one = menu.addMenu(f"{full_day(change.day)}: {change.label or 'no label'}")
            _add(one, "Edit…", partial(self._window.log.edit_change, change.id))
            _add(one, "Remove", partial(self._window.log.remove_change, change.id))

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
            _add(one, "Take the name away", partial(self._window.log.remove_span, span.id))

    def _list_put_away(self, menu: QMenu) -> None:
        menu.clear()
        session = self._window.session
        away = [one for one in session.journal.measures.values() if one.archived] if session else []
        if not away:
            menu.addAction("No measure is put away").setEnabled(False)
        for measure in away:
            _add(menu, f"Bring back {measure.title}", partial(self._window.log.bring_back_measure, measure.id))

    def _list_measures(self, menu: QMenu) -> None:
        menu.clear()
        session = self._window.session
        for measure in session.journal.columns() if session else []:
            action = _add(menu, measure.title, partial(self._window.show_measure, measure.id))
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
    return [_add(menu, words, partial(commands.set_kind, kind)) for words, kind in kinds]


def _add(menu: QMenu, text: str, do: Callable[[], object], keys: Keys | str | None = None) -> QAction:
    action = menu.addAction(text)
    if keys is not None:
        action.setShortcut(QKeySequence(keys))
    # Qt would hand the check mark on to the command.
    action.triggered.connect(lambda: do())
    return action
