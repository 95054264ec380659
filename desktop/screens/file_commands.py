"""Commands about the file as a whole."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from PySide6.QtWidgets import QMessageBox

from desktop.errors import StorageError
from desktop.screens.caseload_opening import CASELOAD_ENDING, open_caseload
from desktop.screens.file_questions import ask_journal, ask_new_journal
from desktop.storage.backups import save_copy
from desktop.storage.store import Store
from desktop.storage.stranger import read_stranger
from desktop.wording.damage import kept_elsewhere
from desktop.wording.problems import problem_sentence, stranger_sentence

if TYPE_CHECKING:
    from desktop.screens.main_window import MainWindow


def open_stranger(window: MainWindow) -> None:
    """Read somebody else's journal as data alone into a new journal of one's own, and open that."""
    theirs = ask_journal(window, window.folder)
    if theirs is None:
        return
    try:
        journal = read_stranger(theirs)
        path = ask_new_journal(window, window.folder)
        if path is None:
            return
        Store.create(path, journal.records()).close()
    except StorageError as error:
        QMessageBox.warning(window, "Dayfence", stranger_sentence(error))
        return
    window.open_journal(path)


def show_own_caseload(window: MainWindow) -> None:
    """Show the coach's own caseload, started where there is none yet."""
    show_caseload(window, window.folder / f"clients{CASELOAD_ENDING}")


def show_caseload(window: MainWindow, path: Path) -> bool:
    """Show a caseload in a window of its own; one that is shown already comes to the front."""
    # What a coach needs is not needed to show the window of a journal.
    from desktop.screens.caseload_window import CaseloadWindow

    path = path.absolute()
    shown = window.caseloads.get(path)
    if shown is not None and shown.isVisible():
        shown.activateWindow()
        return True
    store = open_caseload(window, path, window.now)
    if store is None:
        return False
    # Without a parent, so that the program ends with the last window whichever that is.
    caseload = window.caseloads[path] = CaseloadWindow(store, window.folder, now=window.now)
    caseload.show()
    caseload.begin()
    return True


def keep_elsewhere(window: MainWindow) -> None:
    """Save a copy at a place of the person's choice; go on there where nothing can be written here.

    What could not be written is in the copy too: then it holds what is on screen, without the history.
    """
    session = window.session
    if session is None:
        return
    window.workspace.days.finish_typing()
    session.wait_until_written()
    path = ask_new_journal(window, window.folder)
    if path is None:
        return
    try:
        if session.trouble is None:
            save_copy(session.path, path)
        else:
            Store.create(path, session.journal.records()).close()
    except StorageError as error:
        QMessageBox.warning(window, "Dayfence", problem_sentence(error))
        return
    if (session.read_only or session.trouble is not None) and window.let_go(leave_unsaved=True):
        window.open_journal(path)
    window.say(kept_elsewhere(path))
