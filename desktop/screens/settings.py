"""What the window remembers: theme, size of text, its place on the screen and the widths of its panes."""

from __future__ import annotations

import json
from dataclasses import asdict
from pathlib import Path

from PySide6.QtCore import QByteArray, QSettings
from PySide6.QtWidgets import QMainWindow

from desktop.screens.theme import ThemeName
from desktop.wording.caution_table import OwnCautions

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

    @property
    def larger_text(self) -> int:
        """One step larger than the size in force, up to twice the plain size."""
        return min((size for size in TEXT_SIZES if size > self.text_percent), default=TEXT_SIZES[-1])

    @property
    def smaller_text(self) -> int:
        """One step smaller, down to the plain size."""
        return max((size for size in TEXT_SIZES if size < self.text_percent), default=TEXT_SIZES[0])

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

    @property
    def emergency_number(self) -> str:
        """The emergency number the person chose; ``""`` until they do."""
        return str(self._stored.value("emergency", ""))[:40]

    def set_emergency_number(self, number: str) -> None:
        """Remember the emergency number."""
        self._stored.setValue("emergency", number)

    def cautions(self, journal_id: str, measure: int) -> OwnCautions:
        """What the person settled about the cautions of a measure."""
        try:
            stored = json.loads(str(self._stored.value(f"cautions/{journal_id}-{measure}", "{}")))
            return OwnCautions(**stored)
        except (ValueError, TypeError):
            return OwnCautions()

    def set_cautions(self, journal_id: str, measure: int, own: OwnCautions) -> None:
        """Remember what was settled about the cautions of a measure."""
        self._stored.setValue(f"cautions/{journal_id}-{measure}", json.dumps(asdict(own)))

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
