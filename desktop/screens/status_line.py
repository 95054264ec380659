"""The line at the foot: what is saved, how much is written down, what was just said, where the file is."""

from __future__ import annotations

from datetime import datetime

from PySide6.QtCore import Qt, Signal
from PySide6.QtWidgets import QHBoxLayout, QLabel, QPushButton, QSizePolicy, QWidget

from desktop.errors import DayfenceError, StorageError
from desktop.models.session import Session
from desktop.screens.cut_label import CutLabel
from desktop.wording.days import saved_words
from desktop.wording.numbers import count
from desktop.wording.problems import problem_sentence


class StatusLine(QWidget):
    """Says when everything is on the disk, and what to do when it is not.

    Signals:
        try_again_wanted: write again what could not be written.
        give_up_wanted: go back to what is on the disk.
        keep_elsewhere_wanted: keep what is on screen in another file, and go on there.
    """

    try_again_wanted = Signal()
    give_up_wanted = Signal()
    keep_elsewhere_wanted = Signal()

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.saved, self._counted, self.said, self._place = QLabel(), QLabel(), CutLabel(), CutLabel()
        self.saved.setAccessibleName("Saved")
        self.said.setAccessibleName("Message")
        self._place.setAccessibleName("Journal file")
        self._place.setAlignment(Qt.AlignmentFlag.AlignRight)
        # A long path or sentence never makes the window wider.
        for label in (self.said, self._place):
            label.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Preferred)
        self._try_again = QPushButton("Try again")
        self._try_again.clicked.connect(self.try_again_wanted)
        self._give_up = QPushButton("Go back to what is saved")
        self._give_up.clicked.connect(self.give_up_wanted)
        self._elsewhere = QPushButton("Keep it in another file…")
        self._elsewhere.clicked.connect(self.keep_elsewhere_wanted)
        layout = QHBoxLayout(self)
        layout.setContentsMargins(14, 4, 14, 6)
        layout.setSpacing(18)
        for widget in (self.saved, self._try_again, self._elsewhere, self._give_up, self._counted):
            layout.addWidget(widget)
        layout.addWidget(self.said, 2)
        layout.addWidget(self._place, 1)

    def say(self, sentence: str) -> None:
        """Say something about what was just done, or could not be."""
        self.said.setText(sentence)
        self.said.setToolTip(sentence)

    def show_session(self, session: Session) -> None:
        """Tell how things stand with an open journal."""
        self.saved.setText(_saved_words(session))
        trouble = session.trouble
        self._try_again.setVisible(trouble is not None)
        self._give_up.setVisible(trouble is not None)
        self._elsewhere.setVisible(trouble is not None or session.read_only)
        days = len(session.journal.entries.get(session.measure or 0, {}))
        self._counted.setText(f"{count(days, 'day')} written down")
        self._place.setText(session.path.name)
        self._place.setToolTip(str(session.path))


def trouble_sentence(trouble: Exception) -> str:
    """Why something is not saved."""
    if isinstance(trouble, DayfenceError):
        return problem_sentence(trouble)
    return "Not saved: something went wrong in the program. Your earlier entries are kept."


def _saved_words(session: Session) -> str:
    if session.read_only:
        return problem_sentence(StorageError("read only"))
    if session.trouble is not None:
        return trouble_sentence(session.trouble)
    if not session.is_saved:
        return "Saving…"
    at = session.saved_at
    return saved_words(datetime.fromisoformat(at), session.today) if at else ""
