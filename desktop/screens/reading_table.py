"""Reading a table off the screen's thread, with a way to stop, and the questions only the person can answer."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from PySide6.QtCore import QEventLoop, QObject, Qt, Signal
from PySide6.QtWidgets import QMessageBox, QProgressDialog, QWidget

from desktop.errors import ExchangeError
from desktop.exchange.reading import Reading
from desktop.models.background import Background
from desktop.wording.problems import choice_label, problem_sentence

_ANSWERS = {
    "which day order": "day_order",
    "which decimal mark": "decimal",
    "which day column": "day_column",
    "which century": "century",
    "which name column": "name_column",
}
"""The argument of the importer that answers each of its questions."""
Read = Callable[..., Reading]
"""``read_file`` or ``read_table`` with what is to be read."""
_SHOWN_AFTER = 1_000
"""Milliseconds; a table that is read sooner shows no progress."""


class StoppedError(Exception):
    """The person stopped the reading."""


class TableReader(QObject):
    """Reads one table on a thread of its own.

    Signals:
        advanced: the share of the work that is done, in hundredths.
        ended: the reading, or the error that ended it.
    """

    advanced = Signal(int)
    ended = Signal(object)

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._stopped = False
        self._worker = Background(self)

    def start(self, read: Read, answers: dict[str, Any]) -> None:
        """Begin; ``ended`` follows, also after ``stop``."""
        self._worker.run(lambda: read(told=self._go_on, **answers), self.ended.emit, self.ended.emit)

    def stop(self) -> None:
        """Leave off at the next step."""
        self._stopped = True

    def _go_on(self, share: float) -> None:
        if self._stopped:
            raise StoppedError
        self.advanced.emit(round(100 * share))


def read_with_questions(parent: QWidget, name: str, read: Read) -> Reading | None:
    """Read a table, asking whatever only the person can know.

    Args:
        parent: the window.
        name: of the file, or of whatever is read.
        read: reads it, with the answers by name.

    Returns:
        None when the person did not answer or stopped it, or the file cannot be brought in; that was said.
    """
    answers: dict[str, Any] = {}
    while True:
        outcome = _read(parent, name, read, answers)
        if isinstance(outcome, Reading):
            return outcome
        if isinstance(outcome, StoppedError):
            return None
        if not isinstance(outcome, ExchangeError):
            raise outcome
        argument = _ANSWERS.get(outcome.reason)
        if argument is None:
            QMessageBox.warning(parent, "Bring in a table", problem_sentence(outcome))
            return None
        answer = _ask(parent, outcome)
        if answer is None:
            return None
        answers[argument] = answer


def _read(parent: QWidget, name: str, read: Read, answers: dict[str, Any]) -> Reading | Exception:
    reader = TableReader(parent)
    progress = QProgressDialog(f"Reading {name}", "Stop", 0, 100, parent)
    progress.setWindowTitle("Bring in a table")
    progress.setWindowModality(Qt.WindowModality.WindowModal)
    progress.setMinimumDuration(_SHOWN_AFTER)
    progress.setAutoClose(False)
    progress.setAutoReset(False)
    progress.setValue(0)
    waiting = QEventLoop()
    outcomes: list[Reading | Exception] = []
    reader.advanced.connect(progress.setValue)
    reader.ended.connect(outcomes.append)
    reader.ended.connect(waiting.quit)
    progress.canceled.connect(reader.stop)
    reader.start(read, answers)
    waiting.exec()
    progress.close()
    progress.deleteLater()
    reader.deleteLater()
    return outcomes[0]


def _ask(parent: QWidget, error: ExchangeError) -> object:
    """One question with a button for each answer; nothing is brought in yet."""
    box = QMessageBox(parent)
    box.setWindowTitle("Bring in a table")
    box.setText(problem_sentence(error))
    box.setInformativeText("Nothing is brought in yet.")
    choices = error.fields["choices"]
    assert isinstance(choices, list)
    buttons = {
        box.addButton(choice_label(error.reason, choice), QMessageBox.ButtonRole.AcceptRole): choice
        for choice in choices
    }
    box.addButton(QMessageBox.StandardButton.Cancel)
    box.exec()
    return next((choice for button, choice in buttons.items() if button is box.clickedButton()), None)
