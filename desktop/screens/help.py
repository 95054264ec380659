"""Short help, notices, and the figures of the scoreboard."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtGui import QFont, QFontDatabase, QFontInfo
from PySide6.QtWidgets import (
    QDialog,
    QDialogButtonBox,
    QHeaderView,
    QMessageBox,
    QPlainTextEdit,
    QTableWidget,
    QTableWidgetItem,
    QVBoxLayout,
    QWidget,
)

from desktop.resource_files import resource
from desktop.screens.room import give_room
from desktop.wording.help import ABOUT, KEY_GROUPS


def show_keys(parent: QWidget) -> None:
    """List the keys, each beside what it does."""
    dialog = QDialog(parent)
    dialog.setWindowTitle("Keys")
    table = QTableWidget(sum(1 + len(keys) for _, keys in KEY_GROUPS), 2)
    table.setAccessibleName("Keys")
    table.setHorizontalHeaderLabels(["Key", "What it does"])
    table.horizontalHeader().setDefaultAlignment(Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter)
    table.horizontalHeader().setStretchLastSection(True)
    table.verticalHeader().hide()
    table.setShowGrid(False)
    table.setEditTriggers(QTableWidget.EditTrigger.NoEditTriggers)
    table.setSelectionBehavior(QTableWidget.SelectionBehavior.SelectRows)
    strong = QFont(dialog.font())
    strong.setBold(True)
    row = 0
    for title, keys in KEY_GROUPS:
        heading = QTableWidgetItem(title)
        heading.setFont(strong)
        table.setItem(row, 0, heading)
        table.setSpan(row, 0, 1, 2)
        for place, (key, what) in enumerate(keys, start=row + 1):
            table.setItem(place, 0, QTableWidgetItem(key))
            table.setItem(place, 1, QTableWidgetItem(what))
        row += 1 + len(keys)
    table.resizeColumnToContents(0)
    # Rows grow with their words, also where large text needs two lines.
    table.verticalHeader().setSectionResizeMode(QHeaderView.ResizeMode.ResizeToContents)
    buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Close)
    buttons.rejected.connect(dialog.reject)
    layout = QVBoxLayout(dialog)
    layout.addWidget(table)
    layout.addWidget(buttons)
    give_room(dialog, 84, 32)
    dialog.exec()


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
