"""The line that stands above the panes when a value just kept meets a line of the table of cautions."""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QHBoxLayout, QLabel, QPushButton, QWidget

from desktop.journal.journal import Journal
from desktop.journal.records import Entry, Measure
from desktop.journal.row_change import RowChange
from desktop.screens.theme import CAUTION_INK
from desktop.wording.caution_table import OwnCautions
from desktop.wording.entry_cautions import caution_for


class CautionBar(QWidget):
    """Shown until it is closed or another value is kept; a value that meets no line says nothing at all."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._words = QLabel()
        self._words.setWordWrap(True)
        self._words.setAccessibleName("Caution")
        self._words.setTextInteractionFlags(Qt.TextInteractionFlag.TextSelectableByMouse)
        self.close_button = QPushButton("Close")
        self.close_button.clicked.connect(self.hide)
        layout = QHBoxLayout(self)
        layout.setContentsMargins(14, 6, 14, 6)
        layout.addWidget(self._words, 1)
        layout.addWidget(self.close_button, 0, Qt.AlignmentFlag.AlignTop)
        self.setAttribute(Qt.WidgetAttribute.WA_StyledBackground)
        self.set_dark(False)
        self.hide()

    @property
    def text(self) -> str:
        """What stands in the bar; ``""`` while it is hidden."""
        return "" if self.isHidden() else self._words.text()

    def set_dark(self, dark: bool) -> None:
        """Take the colours of the theme."""
        paper, ink = CAUTION_INK["dark" if dark else "light"]
        self.setStyleSheet(f"CautionBar {{ background: {paper}; }} QLabel {{ color: {ink}; }}")

    def look_at(
        self, journal: Journal, changes: tuple[RowChange, ...], own: Callable[[int], OwnCautions], number: str
    ) -> None:
        """Look at the values that were just typed, each by itself and whatever kind of day it is.

        Args:
            journal: with the values in it.
            changes: what was just changed.
            own: what the person settled for a measure, by its id.
            number: the emergency number the person chose, or ``""``.
        """
        if any(isinstance(change.after, Measure) for change in changes):
            # Numbers turned into another unit are not typed anew.
            return
        kept = [change.after for change in changes if _is_new_value(change)]
        if not kept:
            return
        said = [
            caution_for(journal, entry.measure, entry.day, entry.slot, own(entry.measure), number)
            for entry in kept
            if isinstance(entry, Entry)
        ]
        self._words.setText("\n".join(dict.fromkeys(one for one in said if one)))
        self.setVisible(bool(self._words.text()))


def _is_new_value(change: RowChange) -> bool:
    """Whether a number was typed that was not there before."""
    after, before = change.after, change.before
    if not isinstance(after, Entry) or after.value is None or after.source != "typed":
        return False
    return not (isinstance(before, Entry) and before.value == after.value)
