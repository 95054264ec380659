"""What the marks of the chart mean: one line under it, and a window that tells of all of them."""

from __future__ import annotations

from PySide6.QtCore import QRectF, QSize, Signal
from PySide6.QtGui import QFontInfo, QMouseEvent, QPainter, QPaintEvent
from PySide6.QtWidgets import (
    QDialog,
    QDialogButtonBox,
    QGridLayout,
    QLabel,
    QScrollArea,
    QSizePolicy,
    QVBoxLayout,
    QWidget,
)

from desktop.chart.key import KEY_LINES, paint_key, paint_sign, signs_of
from desktop.chart.look import LIGHT, Look
from desktop.chart.pieces import Picture
from desktop.chart.style import Style
from desktop.screens.room import give_room
from desktop.wording.chart_key import KEY_HINT, KEY_TITLE, SIGN_WORDS, Sign

_LETTERS, _LINES = 74, 30


class KeyLine(QWidget):
    """The marks that are on the chart now, each with a word or two.

    Signals:
        wanted: the window of all the marks.
    """

    wanted = Signal()

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._look = LIGHT
        self._signs: list[Sign] = []
        self.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)
        self.setAccessibleName(KEY_TITLE)
        self.setToolTip(KEY_HINT)

    @property
    def signs(self) -> list[Sign]:
        """The marks that are explained."""
        return self._signs

    def show_picture(self, picture: Picture) -> None:
        """Explain the marks of a picture."""
        self._signs = signs_of(picture)
        self.setAccessibleDescription("; ".join(SIGN_WORDS[sign][0] for sign in self._signs))
        self.update()

    def set_look(self, look: Look) -> None:
        """Draw with other inks."""
        self._look = look
        self.update()

    def sizeHint(self) -> QSize:
        """One line."""
        return QSize(0, round(self._style().size * KEY_LINES))

    def mouseReleaseEvent(self, event: QMouseEvent) -> None:
        """A click opens the window."""
        self.wanted.emit()

    def paintEvent(self, event: QPaintEvent) -> None:
        """Samples and words; what has no room is in the window."""
        style = self._style()
        with QPainter(self) as painter:
            painter.fillRect(self.rect(), style.look.colour("paper"))
            inside = QRectF(self.rect()).adjusted(style.size * 0.6, 0, -style.size * 0.3, 0)
            paint_key(painter, inside, self._signs, style)

    def _style(self) -> Style:
        return Style(self._look, self.font(), float(QFontInfo(self.font()).pixelSize()))


class _Sample(QWidget):
    """One sign, drawn as on the chart."""

    def __init__(self, sign: Sign, style: Style) -> None:
        super().__init__()
        self._sign, self._style = sign, style
        self.setFixedSize(round(style.size * 2.6), round(style.size * 1.6))

    def paintEvent(self, event: QPaintEvent) -> None:
        """On the chart's own paper."""
        with QPainter(self) as painter:
            painter.fillRect(self.rect(), self._style.look.colour("paper"))
            inside = QRectF(self.rect()).adjusted(self._style.size * 0.3, 0, -self._style.size * 0.3, 0)
            paint_sign(painter, inside, self._sign, self._style)


class KeyWindow(QDialog):
    """Every sign with its sentence."""

    def __init__(self, look: Look, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setWindowTitle(KEY_TITLE)
        style = Style(look, self.font(), float(QFontInfo(self.font()).pixelSize()))
        inside = QWidget()
        grid = QGridLayout(inside)
        grid.setColumnStretch(2, 1)
        grid.setHorizontalSpacing(round(style.size))
        for row, (sign, (short, whole)) in enumerate(SIGN_WORDS.items()):
            name, says = QLabel(short), QLabel(whole)
            name.setFont(style.face(bold=True))
            says.setWordWrap(True)
            for column, widget in enumerate((_Sample(sign, style), name, says)):
                grid.addWidget(widget, row, column)
        grid.setRowStretch(len(SIGN_WORDS), 1)
        area = QScrollArea()
        area.setWidget(inside)
        area.setWidgetResizable(True)
        area.setAccessibleName(KEY_TITLE)
        buttons = QDialogButtonBox(QDialogButtonBox.StandardButton.Close)
        buttons.rejected.connect(self.reject)
        layout = QVBoxLayout(self)
        layout.addWidget(area)
        layout.addWidget(buttons)
        give_room(self, _LETTERS, _LINES)
