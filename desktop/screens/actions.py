"""One command of a menu."""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtGui import QAction, QKeySequence
from PySide6.QtWidgets import QMenu

Keys = QKeySequence.StandardKey


def add_action(menu: QMenu, text: str, do: Callable[[], object], keys: Keys | str | None = None) -> QAction:
    """Add a command with its keys to a menu; ``do`` is called with nothing."""
    action = menu.addAction(text)
    if keys is not None:
        action.setShortcut(QKeySequence(keys))
    # Qt would hand the check mark on to the command.
    action.triggered.connect(lambda: do())
    return action
