"""The menus of a caseload's window: every command with its keys."""

from __future__ import annotations

from functools import partial
from typing import TYPE_CHECKING

from desktop.screens.actions import Keys, add_action
from desktop.screens.help import show_about, show_how_often_wrong
from desktop.wording.acts import plain_act_phrase

if TYPE_CHECKING:
    from desktop.screens.caseload_window import CaseloadWindow


class CaseloadMenus:
    """Fills the window's menu bar and keeps it in step with the caseload."""

    def __init__(self, window: CaseloadWindow) -> None:
        self._window = window
        bar = window.menuBar()
        file, edit, client, view, help_menu = map(bar.addMenu, ("&File", "&Edit", "&Client", "&View", "&Help"))
        self._folder = add_action(file, "The clients' &folder…", window.choose_folder)
        self._again = add_action(file, "&Look through the folder again", window.look_again, "F5")
        add_action(file, "&Stop reading", window.desk.stop, "Ctrl+.")
        file.addSeparator()
        add_action(file, "&Pages for today's clients…", window.print_pages, Keys.Print)
        file.addSeparator()
        add_action(file, "&Close", window.close, Keys.Close)
        self._undo = add_action(edit, "&Undo", window.undo, Keys.Undo)
        self._redo = add_action(edit, "&Redo", window.redo, Keys.Redo)
        self._writing = [
            add_action(client, "Mark as &looked at, and go on\tL", window.looked_at),
            add_action(client, "&Write the session", window.write_session, "Ctrl+N"),
            add_action(client, "&Keep what is written", window.back_to_queue, "Ctrl+Return"),
            add_action(client, "&Settings of this client…", window.edit_client, "F2"),
        ]
        self._ended = client.addMenu("Coaching that has &ended")
        self._ended.aboutToShow.connect(self._list_ended)
        first = add_action(view, "&Client tells first: cover every answer", lambda: None, "Ctrl+T")
        first.setCheckable(True)
        first.toggled.connect(window.set_client_tells_first)
        add_action(view, "Show or fold away those with &nothing new", window.queue.fold.toggle, "Ctrl+0")
        add_action(view, "&Find a client", window.queue.filter.setFocus, Keys.Find)
        view.addSeparator()
        add_action(view, "&Larger text", window.larger_text, "Ctrl++")
        add_action(view, "S&maller text", window.smaller_text, "Ctrl+-")
        add_action(help_menu, "&Keys", window.show_keys, Keys.HelpContents)
        add_action(help_menu, "How often is it &wrong?", partial(show_how_often_wrong, window))
        add_action(help_menu, "&About Dayfence", partial(show_about, window))

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
            add_action(self._ended, f"Bring back {client.code}", partial(self._window.bring_back, client.id))
