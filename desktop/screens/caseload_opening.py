"""Starting and opening a caseload, with the questions that only the coach can answer."""

from __future__ import annotations

import secrets
from pathlib import Path

from PySide6.QtWidgets import QFileDialog, QMessageBox, QWidget

from desktop.errors import StorageError
from desktop.journal.clients import Coach
from desktop.screens.opening import Clock, wants_to_read
from desktop.storage.backups import copies_of, newest_good_of
from desktop.storage.database import application_id_of
from desktop.storage.layout import CASELOAD
from desktop.storage.salvage import aside_name, copy_to, put_in_place
from desktop.storage.schema import CASELOAD_ID
from desktop.storage.store import CaseloadStore
from desktop.wording.earlier import moment
from desktop.wording.problems import damaged_caseload_sentence, problem_sentence

CASELOAD_ENDING = ".caseload"


def is_caseload(path: Path) -> bool:
    """Whether a file says that it is a coach's caseload."""
    return application_id_of(path) == CASELOAD_ID


def open_caseload(parent: QWidget, path: Path, now: Clock) -> CaseloadStore | None:
    """Open a caseload, or start it where there is none; None when it stays closed, and the coach knows why."""
    try:
        if not path.exists() and not copies_of(path):
            return CaseloadStore.create(path, Coach(secrets.token_hex(16)), clock=now, alone=True)
        return CaseloadStore.open(path, clock=now, alone=True)
    except StorageError as error:
        try:
            match error.reason:
                case "open already":
                    is_read = wants_to_read(parent, path)
                    return CaseloadStore.open(path, clock=now, to_read=True) if is_read else None
                case "damaged" | "missing":
                    return _open_copy(parent, path, now, error)
        except StorageError as second:
            error = second
        QMessageBox.warning(parent, "Dayfence", problem_sentence(error))
        return None


def ask_clients_folder(parent: QWidget, folder: Path | None) -> Path | None:
    """Which folder the clients' journals are put into."""
    chosen = QFileDialog.getExistingDirectory(
        parent, "The folder of your clients' journals", str(folder or Path.home())
    )
    return Path(chosen) if chosen else None


def _open_copy(parent: QWidget, path: Path, now: Clock, error: StorageError) -> CaseloadStore | None:
    """Go on with the newest copy that is whole; the damaged file stays beside it under another name."""
    good = newest_good_of(copies_of(path), CASELOAD)
    if good is None:
        raise error
    sentence = damaged_caseload_sentence(path, moment(good[0].made), is_gone=error.reason == "missing")
    if QMessageBox.question(parent, "Dayfence", sentence) != QMessageBox.StandardButton.Yes:
        return None
    if path.exists():
        new = aside_name(path, "new", now())
        copy_to(good[0], new)
        put_in_place(new, path, now())
    else:
        copy_to(good[0], path)
    return CaseloadStore.open(path, clock=now, alone=True)
