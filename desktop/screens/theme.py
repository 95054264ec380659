"""Light and dark, type and its size, for the whole window."""

from __future__ import annotations

from typing import Literal

from PySide6.QtCore import Qt
from PySide6.QtGui import QColor, QFont, QGuiApplication, QPalette
from PySide6.QtWidgets import QApplication, QStyleFactory

from desktop.chart.look import DARK, LIGHT, Look
from desktop.faces import FACE

ThemeName = Literal["light", "dark", "system"]

PLAIN_SIZE = 15
"""Height of plain text in pixels at 100 %."""

_PALETTES: dict[str, dict[str, str]] = {
    "light": {
        "Window": "#f5f4ef", "WindowText": "#1c1c1c", "Base": "#ffffff", "AlternateBase": "#f7f6f2",
        "Text": "#1c1c1c", "Button": "#efede6", "ButtonText": "#1c1c1c", "Highlight": "#cfe3f2",
        "HighlightedText": "#101418", "ToolTipBase": "#fffdf5", "ToolTipText": "#1c1c1c", "Link": "#0067a3",
        "PlaceholderText": "#63676e", "BrightText": "#ffffff", "Mid": "#c9c6bc", "Light": "#ffffff",
        "Midlight": "#e6e4dc", "Dark": "#8d8a80", "Shadow": "#6b6860",
    },
    "dark": {
        "Window": "#16181b", "WindowText": "#f0eeea", "Base": "#1d2024", "AlternateBase": "#212429",
        "Text": "#f0eeea", "Button": "#2a2e34", "ButtonText": "#f0eeea", "Highlight": "#2f5d7c",
        "HighlightedText": "#ffffff", "ToolTipBase": "#2a2e34", "ToolTipText": "#f0eeea", "Link": "#7cc4ef",
        "PlaceholderText": "#a9aeb6", "BrightText": "#ffffff", "Mid": "#3c4047", "Light": "#3c4047",
        "Midlight": "#33373d", "Dark": "#0d0e10", "Shadow": "#000000",
    },
}  # fmt: skip

_EDGES = {"light": "#7d7a72", "dark": "#8d939c"}
"""Edges of what can be typed into, ticked or pressed: 3 to 1 and more against the window."""

_EDGED = ("QCheckBox", "QRadioButton", "QLineEdit", "QComboBox", "QAbstractSpinBox", "QPushButton")
_DARKENED = 140
"""By how much of 100 the style darkens the window's colour for an edge."""

CAUTION_INK = {"light": ("#f6efd9", "#4f3d00"), "dark": ("#37300f", "#f2e6bd")}
"""Paper and ink of the caution: 4.5 to 1 and more in both."""


def is_dark(theme: ThemeName) -> bool:
    """Whether a theme means dark on this computer."""
    if theme == "system":
        return QGuiApplication.styleHints().colorScheme() == Qt.ColorScheme.Dark
    return theme == "dark"


def apply_theme(app: QApplication, theme: ThemeName, text_percent: int) -> Look:
    """Give every widget the theme's colours and the size of text; returns the chart's inks."""
    name = "dark" if is_dark(theme) else "light"
    app.setStyle(QStyleFactory.create("Fusion"))
    palette = QPalette()
    for role, colour in _PALETTES[name].items():
        palette.setColor(QPalette.ColorRole[role], QColor(colour))
    for role in ("WindowText", "Text", "ButtonText"):
        quiet = QColor(_PALETTES[name]["PlaceholderText"])
        palette.setColor(QPalette.ColorGroup.Disabled, QPalette.ColorRole[role], quiet)
    app.setPalette(palette)
    # The style draws the edges of boxes a little darker than the window, which in the dark nobody sees.
    palette.setColor(QPalette.ColorRole.Window, QColor(_EDGES[name]).lighter(_DARKENED))
    for widget in _EDGED:
        app.setPalette(palette, widget)  # type: ignore[arg-type]  # Text is what it takes; its types say bytes.
    face = QFont(FACE)
    face.setPixelSize(round(PLAIN_SIZE * text_percent / 100))
    app.setFont(face)
    return DARK if name == "dark" else LIGHT
