"""Files that are dropped onto the window: a journal is opened, anything else is brought in as a table."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, cast

from PySide6.QtCore import QEvent, QMimeData, QObject, QTimer
from PySide6.QtGui import QDropEvent

from desktop.screens.caseload_opening import is_caseload
from desktop.storage.database import application_id_of
from desktop.storage.schema import APPLICATION_ID

if TYPE_CHECKING:
    from desktop.screens.main_window import MainWindow


class FileDrops(QObject):
    """Takes one file at a time; more than one is left where it is."""

    def __init__(self, window: MainWindow) -> None:
        super().__init__(window)
        self._window = window
        window.setAcceptDrops(True)
        window.installEventFilter(self)

    def eventFilter(self, _watched: QObject, event: QEvent) -> bool:
        """Say that a file can be dropped here, and take it."""
        if event.type() not in (QEvent.Type.DragEnter, QEvent.Type.DragMove, QEvent.Type.Drop):
            return False
        dropped = cast(QDropEvent, event)
        path = _one_file(dropped.mimeData())
        if path is None:
            return False
        dropped.acceptProposedAction()
        if event.type() == QEvent.Type.Drop:
            # Questions must not be asked while the other program still waits for the end of the drop.
            QTimer.singleShot(0, self._window, lambda: self._take(path))
        return True

    def _take(self, path: Path) -> None:
        if application_id_of(path) == APPLICATION_ID or is_caseload(path):
            self._window.open_journal(path)
        else:
            self._window.bring_in_file(path)


def _one_file(data: QMimeData) -> Path | None:
    files = [url.toLocalFile() for url in data.urls() if url.isLocalFile()]
    return Path(files[0]) if len(files) == 1 else None
