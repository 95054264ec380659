"""A client's settings: the coach's own word for them, which measures to look at, and the end of the coaching."""

from __future__ import annotations

from dataclasses import replace

from PySide6.QtWidgets import (
    QCheckBox,
    QComboBox,
    QDialog,
    QDialogButtonBox,
    QLabel,
    QLineEdit,
    QVBoxLayout,
    QWidget,
)

from desktop.journal.clients import Client
from desktop.journal.records import Measure
from desktop.screens.room import give_room, roomy_form

GUESSED = "as the program thinks best"


class ClientDialog(QDialog):
    """Everything about a client that the coach settles."""

    def __init__(
        self, client: Client, measures: list[Measure], taken: set[str], parent: QWidget | None = None
    ) -> None:
        """Ask about a client.

        Args:
            client: as it stands.
            measures: of the client's journal; none where it could not be read.
            taken: codes of the other clients.
            parent: the window.
        """
        super().__init__(parent)
        self.setWindowTitle(f"{client.code}: settings")
        self._client, self._taken = client, taken
        self.code = QLineEdit(client.code)
        self.doing, self.outcome = QComboBox(), QComboBox()
        for box, chosen in ((self.doing, client.doing), (self.outcome, client.outcome)):
            box.addItem(GUESSED, None)
            for measure in measures:
                box.addItem(measure.title, measure.id)
            box.setCurrentIndex(max(0, box.findData(chosen)))
        self.ended = QCheckBox("The coaching has ended; out of the queue, nothing is deleted")
        self.ended.setChecked(client.ended)
        form = roomy_form()
        form.addRow("Your code or name for this client", self.code)
        form.addRow("What they do", self.doing)
        form.addRow("What is to come of it", self.outcome)
        form.addRow("", self.ended)
        for box in (self.doing, self.outcome):
            form.setRowVisible(box, bool(measures))
        self._problem = QLabel()
        self._problem.setWordWrap(True)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Ok | QDialogButtonBox.StandardButton.Cancel)
        buttons.button(QDialogButtonBox.StandardButton.Ok).setText("Keep")
        buttons.accepted.connect(self.accept)
        buttons.rejected.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.addLayout(form)
        layout.addWidget(self._problem)
        layout.addWidget(buttons)
        give_room(self, 70)
        self.code.selectAll()

    def accept(self) -> None:
        """Take what was filled in; two clients with one code would be taken for each other."""
        code = self.code.text().strip()
        if not code:
            self._problem.setText("A client needs a code or a name.")
        elif code in self._taken:
            self._problem.setText(f"Another client is called “{code}” already. Choose another code.")
        elif self.doing.currentData() is not None and self.doing.currentData() == self.outcome.currentData():
            self._problem.setText("Choose two different measures, or leave one to the program.")
        else:
            super().accept()
            return
        self.code.setFocus()

    @property
    def chosen(self) -> Client:
        """What was filled in."""
        return replace(
            self._client,
            code=self.code.text().strip(),
            doing=self.doing.currentData(),
            outcome=self.outcome.currentData(),
            ended=self.ended.isChecked(),
        )
