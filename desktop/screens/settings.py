"""What the window remembers: theme, size of text, its place on the screen and the widths of its panes."""

from __future__ import annotations

from pathlib import Path

from PySide6.QtCore import QSettings
from PySide6.QtWidgets import QMainWindow, QSplitter

from desktop.screens.theme import ThemeName

TEXT_SIZES = (100, 125, 150, 175, 200)
"""Sizes of text in percent."""


class Settings:
    """Kept in one file beside the journal; what cannot be read there is as if it were not set."""

    def __init__(self, folder: Path) -> None:
        self._stored = QSettings(str(folder / "settings.ini"), QSettings.Format.IniFormat)

    @property
    def text_percent(self) -> int:
        """The size of text in force."""
        stored = str(self._stored.value("text", ""))
        return int(stored) if stored.isdecimal() and int(stored) in TEXT_SIZES else TEXT_SIZES[0]

    def set_text_percent(self, percent: int) -> None:
        """Remember a size of text."""
        self._stored.setValue("text", percent)

    @property
    def theme(self) -> ThemeName:
        """The theme in force."""
        stored = str(self._stored.value("theme", ""))
        return "light" if stored == "light" else "dark" if stored == "dark" else "system"

    def set_theme(self, theme: ThemeName) -> None:
        """Remember a theme."""
        self._stored.setValue("theme", theme)

    @property
    def has_panes(self) -> bool:
        """Whether the person's own widths of the panes are known."""
        return self._stored.value("panes") is not None

    def keep_places(self, window: QMainWindow, panes: QSplitter) -> None:
        """Remember where the window is and how wide its panes are."""
        self._stored.setValue("geometry", window.saveGeometry())
        self._stored.setValue("panes", panes.saveState())
        self._stored.sync()

    def restore_places(self, window: QMainWindow, panes: QSplitter) -> None:
        """Put the window and its panes where they were."""
        geometry, widths = self._stored.value("geometry"), self._stored.value("panes")
        if geometry is not None:
            window.restoreGeometry(geometry)
        if widths is not None:
            panes.restoreState(widths)
