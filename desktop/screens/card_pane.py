"""The session card and the chart of the client under the hand; the answer can be covered until the client told."""

from __future__ import annotations

from dataclasses import replace
from html import escape

from PySide6.QtCore import QRectF, QSize, Qt, Signal
from PySide6.QtGui import QFont, QFontInfo, QPainter, QPaintEvent, QPalette
from PySide6.QtWidgets import QFrame, QLabel, QPushButton, QScrollArea, QSizePolicy, QVBoxLayout, QWidget

from desktop.caseload.card import Card
from desktop.caseload.queue import QueueRow
from desktop.chart.look import LIGHT, Look
from desktop.chart.pieces import Picture
from desktop.chart.style import Style
from desktop.chart.whole import least_height, paint_chart
from desktop.wording.caseload import COVERED, COVERED_TITLES, UNCOVER, card_sections, row_sentences
from desktop.wording.telling import Section

_CHART_PART = 0.86
"""Letters of the chart, of the plain text."""
_CHART_LINES = 15


class CardChart(QWidget):
    """The client's chart, painted as on the page."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._picture: Picture | None = None
        self._look: Look = LIGHT
        self.setAccessibleName("Chart")
        self.setSizePolicy(QSizePolicy.Policy.Expanding, QSizePolicy.Policy.Fixed)

    def show_picture(self, picture: Picture | None) -> None:
        """Take a picture, or none."""
        self._picture = picture
        self.setAccessibleDescription(picture.told if picture else "")
        self.setVisible(picture is not None)
        self.updateGeometry()
        self.update()

    def set_look(self, look: Look) -> None:
        """Take the inks of the theme."""
        self._look = look
        self.update()

    def sizeHint(self) -> QSize:
        """As high as the chart reads well."""
        return QSize(480, round(self._size * _CHART_LINES))

    def minimumSizeHint(self) -> QSize:
        """No lower than it can be read."""
        return QSize(240, round(least_height(self._style)) + 8)

    def paintEvent(self, _event: QPaintEvent) -> None:
        """Paint the chart over the whole widget."""
        if self._picture is None:
            return
        with QPainter(self) as painter:
            painter.setRenderHint(QPainter.RenderHint.Antialiasing)
            painter.fillRect(self.rect(), self._look.colour("paper"))
            paint_chart(painter, QRectF(self.rect()).adjusted(6, 4, -6, -4), self._picture, self._style)

    @property
    def _size(self) -> float:
        return QFontInfo(self.font()).pixelSize() * _CHART_PART

    @property
    def _style(self) -> Style:
        return Style(self._look, self.font(), self._size)


class CardPane(QWidget):
    """One client's card.

    Signals:
        uncovered: the answer that was covered is shown.
    """

    uncovered = Signal()

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._row: QueueRow | None = None
        self._card: Card | None = None
        self._picture: Picture | None = None
        self._is_covered = False
        self.title = QLabel()
        self.title.setWordWrap(True)
        self.text = QLabel()
        self.text.setWordWrap(True)
        self.text.setTextFormat(Qt.TextFormat.RichText)
        self.text.setTextInteractionFlags(
            Qt.TextInteractionFlag.TextSelectableByMouse | Qt.TextInteractionFlag.TextSelectableByKeyboard
        )
        self.text.setAlignment(Qt.AlignmentFlag.AlignTop)
        self.text.setAccessibleName("Session card")
        self.chart = CardChart()
        self.covered = QLabel(COVERED)
        self.covered.setWordWrap(True)
        self.covered.setMargin(10)
        self.uncover = QPushButton(UNCOVER)
        self.uncover.clicked.connect(self.show_answer)
        layout = QVBoxLayout(self)
        layout.setContentsMargins(0, 0, 0, 0)
        layout.setSpacing(0)
        self.title.setMargin(10)
        layout.addWidget(self.title)
        layout.addWidget(self.covered)
        layout.addWidget(self.uncover)
        inner = QWidget()
        inner.setBackgroundRole(QPalette.ColorRole.Base)
        column = QVBoxLayout(inner)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(0)
        column.addWidget(self.chart)
        column.addWidget(self.text, 1)
        self.around = QScrollArea()
        self.around.setFrameShape(QFrame.Shape.NoFrame)
        self.around.setWidgetResizable(True)
        self.around.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.around.setWidget(inner)
        layout.addWidget(self.around, 1)
        self.show_row(None, "", covered=False)

    @property
    def is_covered(self) -> bool:
        """Whether the answer is covered."""
        return self._is_covered

    def show_row(self, row: QueueRow | None, title: str, *, covered: bool) -> None:
        """Take a client; the card itself follows when the journal is read."""
        self._row, self._card, self._picture = row, None, None
        self._is_covered = covered
        self.title.setText(title)
        self._fill()

    def show_card(self, card: Card, picture: Picture | None) -> None:
        """Take the card of the client shown."""
        self._card, self._picture = card, picture
        self._fill()

    def show_answer(self) -> None:
        """Take the cover away."""
        if self._is_covered:
            self._is_covered = False
            self._fill()
            self.uncovered.emit()

    def set_look(self, look: Look) -> None:
        """Take the inks of the theme."""
        self.chart.set_look(look)
        self._fill()

    def set_face(self, face: QFont) -> None:
        """Follow the size of text."""
        large = QFont(face)
        large.setPixelSize(round(QFontInfo(face).pixelSize() * 1.35))
        large.setBold(True)
        self.title.setFont(large)
        self._fill()

    def _fill(self) -> None:
        covered = self._is_covered
        self.covered.setVisible(covered)
        self.uncover.setVisible(covered)
        self.chart.show_picture(None if covered else self._picture)
        size = QFontInfo(self.font()).pixelSize()
        parts = []
        for section in self._sections():
            parts.append(f'<p style="font-weight:bold; margin-bottom:0;">{escape(section.title)}</p>')
            style = "margin-top:2px; margin-bottom:6px;"
            parts += [f'<p style="{style}">{escape(one)}</p>' for one in section.sentences]
        self.text.setMargin(round(size * 0.7))
        self.text.setText("".join(parts))

    def _sections(self) -> list[Section]:
        if self._row is None:
            return []
        told = (
            [] if self._is_covered else [Section("Why", row_sentences(replace(self._row, reasons=self._row.held)))]
        )
        if self._card is None:
            return told
        sections = card_sections(self._card)
        return [*told, *(one for one in sections if not (self._is_covered and one.title in COVERED_TITLES))]
