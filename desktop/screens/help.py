"""Short help, notices, and the figures of the scoreboard."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtGui import QFontDatabase, QFontInfo
from PySide6.QtWidgets import QDialog, QDialogButtonBox, QMessageBox, QPlainTextEdit, QVBoxLayout, QWidget

from desktop.resource_files import resource
from desktop.wording.help import ABOUT, KEYS


def show_keys(parent: QWidget) -> None:
    """List the keys."""
    QMessageBox.information(parent, "Keys", KEYS)


def show_about(parent: QWidget) -> None:
    """Version, caution and notices."""
    QMessageBox.about(parent, "About Dayfence", ABOUT)


def show_how_often_wrong(parent: QWidget) -> None:
    """The figures of the scoreboard, as it was last counted."""
    _show_table(parent, "How often is it wrong?", resource("how_often_wrong.txt").read_text("utf-8"))


def _show_table(parent: QWidget, title: str, text: str) -> None:
    """Show a text whose columns stand under one another."""
    dialog = QDialog(parent)
    dialog.setWindowTitle(title)
    box = QPlainTextEdit(text)
    box.setReadOnly(True)
    box.setLineWrapMode(QPlainTextEdit.LineWrapMode.NoWrap)
    face = QFontDatabase.systemFont(QFontDatabase.SystemFont.FixedFont)
    face.setPixelSize(round(QFontInfo(dialog.font()).pixelSize() * 0.9))
    box.setFont(face)
    box.setAccessibleName(title)
    box.setTextInteractionFlags(
        Qt.TextInteractionFlag.TextSelectableByMouse | Qt.TextInteractionFlag.TextSelectableByKeyboard
    )
    buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Close)
    buttons.rejected.connect(dialog.reject)
    layout = QVBoxLayout(dialog)
    layout.addWidget(box)
    layout.addWidget(buttons)
    dialog.resize(900, 620)
    dialog.exec()
