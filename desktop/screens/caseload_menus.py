"""The menus of a caseload's window: every command with its keys."""

from __future__ import annotations

from collections.abc import Callable
from functools import partial
from typing import TYPE_CHECKING

from PySide6.QtGui import QAction, QKeySequence
from PySide6.QtWidgets import QMenu

from desktop.screens.help import show_about, show_how_often_wrong
from desktop.wording.acts import plain_act_phrase

if TYPE_CHECKING:
    from desktop.screens.caseload_window import CaseloadWindow

Keys = QKeySequence.StandardKey


class CaseloadMenus:
    """Fills the window's menu bar and keeps it in step with the caseload."""

    def __init__(self, window: CaseloadWindow) -> None:
        self._window = window
        bar = window.menuBar()
        file, edit, client, view, help_menu = map(bar.addMenu, ("&File", "&Edit", "&Client", "&View", "&Help"))
        self._folder = _add(file, "The clients' &folder…", window.choose_folder)
        self._again = _add(file, "&Look through the folder again", window.look_again, "F5")
        _add(file, "&Stop reading", window.desk.stop, "Ctrl+.")
        file.addSeparator()
        _add(file, "&Pages for today's clients…", window.print_pages, Keys.Print)
        file.addSeparator()
        _add(file, "&Close", window.close, Keys.Close)
        self._undo = _add(edit, "&Undo", window.undo, Keys.Undo)
        self._redo = _add(edit, "&Redo", window.redo, Keys.Redo)
        self._writing = [
            _add(client, "Mark as &looked at, and go on\tL", window.looked_at),
            _add(client, "&Write the session", window.write_session, "Ctrl+N"),
            _add(client, "&Keep what is written", window.back_to_queue, "Ctrl+Return"),
            _add(client, "&Settings of this client…", window.edit_client, "F2"),
        ]
        self._ended = client.addMenu("Coaching that has &ended")
        self._ended.aboutToShow.connect(self._list_ended)
        first = _add(view, "&Client tells first: cover every answer", lambda: None, "Ctrl+T")
        first.setCheckable(True)
        first.toggled.connect(window.set_client_tells_first)
        _add(view, "Show or fold away those with &nothing new", window.queue.fold.toggle, "Ctrl+0")
        _add(view, "&Find a client", window.queue.filter.setFocus, Keys.Find)
        view.addSeparator()
        _add(view, "&Larger text", window.larger_text, "Ctrl++")
        _add(view, "S&maller text", window.smaller_text, "Ctrl+-")
        _add(help_menu, "&Keys", window.show_keys, Keys.HelpContents)
        _add(help_menu, "How often is it &wrong?", partial(show_how_often_wrong, window))
        _add(help_menu, "&About Dayfence", partial(show_about, window))

    def follow(self) -> None:
        """Offer what can be done with the caseload as it stands."""
        desk = self._window.desk
        for action in (*self._writing, self._folder):
            action.setEnabled(not desk.read_only)
        self._again.setEnabled(not desk.is_reading)
        for action, step, word in ((self._undo, desk.undoable, "&Undo"), (self._redo, desk.redoable, "&Redo")):
            action.setEnabled(step is not None)
            action.setText(f"{word}: {plain_act_phrase(step.act)}" if step is not None else word)

    def _list_ended(self) -> None:
        self._ended.clear()
        ended = [one for one in self._window.desk.caseload.clients.values() if one.ended]
        if not ended:
            self._ended.addAction("Nobody's coaching has ended").setEnabled(False)
        for client in sorted(ended, key=lambda one: one.code.casefold()):
            _add(self._ended, f"Bring back {client.code}", partial(self._window.bring_back, client.id))


def _add(menu: QMenu, text: str, do: Callable[[], object], keys: Keys | str | None = None) -> QAction:
    action = menu.addAction(text)
    if keys is not None:
        action.setShortcut(QKeySequence(keys))
    # Qt would hand the check mark on to the command.
    action.triggered.connect(lambda: do())
    return action
