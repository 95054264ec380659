"""What the window remembers: theme, size of text, its place on the screen and the widths of its panes."""

from __future__ import annotations

from pathlib import Path

from PySide6.QtCore import QByteArray, QSettings
from PySide6.QtWidgets import QMainWindow

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
    def copies_place(self) -> Path | None:
        """The second place for copies, or None."""
        stored = str(self._stored.value("copies", ""))
        return Path(stored) if stored else None

    def set_copies_place(self, place: Path) -> None:
        """Remember a second place for copies."""
        self._stored.setValue("copies", str(place))

    def keep_places(self, window: QMainWindow, panes: QByteArray | None) -> None:
        """Remember where the window is and, where the person chose them, the widths of its panes."""
        self._stored.setValue("geometry", window.saveGeometry())
        if panes is not None:
            self._stored.setValue("panes", panes)
        self._stored.sync()

    def restore_places(self, window: QMainWindow) -> QByteArray | None:
        """Put the window where it was; returns the widths the person chose for its panes, if any."""
        geometry, panes = self._stored.value("geometry"), self._stored.value("panes")
        if isinstance(geometry, QByteArray):
            window.restoreGeometry(geometry)
        return panes if isinstance(panes, QByteArray) else None
