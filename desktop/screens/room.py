"""Room for a dialog's words, in letters: it grows with the text size and stays within the window under it."""

from __future__ import annotations

from PySide6.QtGui import QFontMetrics
from PySide6.QtWidgets import QDialog, QFormLayout, QWidget

_EDGE = 40
"""Pixels of the window that stay free around a dialog."""


def give_room(dialog: QDialog, letters: int, lines: int = 0) -> None:
    """Make a dialog so many average letters wide, and so many lines high where it scrolls what it holds."""
    metrics = QFontMetrics(dialog.font())
    width, height = letters * metrics.averageCharWidth(), lines * metrics.lineSpacing()
    parent = dialog.parentWidget()
    window: QWidget | None = parent.window() if parent is not None else None
    if window is not None:
        width = min(width, window.width() - _EDGE)
        height = min(height, window.height() - _EDGE)
    dialog.setMinimumWidth(width)
    if lines:
        dialog.resize(width, height)


def roomy_form() -> QFormLayout:
    """A form whose questions stand above their boxes where both do not fit into one line."""
    form = QFormLayout()
    form.setRowWrapPolicy(QFormLayout.RowWrapPolicy.WrapLongRows)
    form.setFieldGrowthPolicy(QFormLayout.FieldGrowthPolicy.AllNonFixedFieldsGrow)
    return form
