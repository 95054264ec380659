"""The middle pane: the chart, what the keys or the mouse are on, and how a point is made."""

from __future__ import annotations

from functools import partial
from typing import TYPE_CHECKING

from PySide6.QtCore import Signal
from PySide6.QtGui import QFontInfo, QResizeEvent
from PySide6.QtWidgets import QComboBox, QHBoxLayout, QLabel, QSizePolicy, QVBoxLayout, QWidget

from analysis import Review
from analysis.log import PERIODS, Period
from desktop.chart.look import LIGHT, Look
from desktop.chart.picture import empty_picture, picture_of
from desktop.chart.pieces import Picture
from desktop.models.session import Session
from desktop.screens.chart_key import KeyLine, KeyWindow

if TYPE_CHECKING:
    from desktop.chart.plot import Chart

PERIOD_WORDS: dict[Period, str] = {
    "day": "each day",
    "week": "each week",
    "month": "each month",
    "year": "each year",
}
POINT_WORDS: dict[Period, str] = {
    "day": "one mark a day",
    "week": "one mark a week",
    "month": "one mark a month",
    "year": "one mark a year",
}
"""The drop-down says by itself what it is about."""


_LOW = 18
"""Lines of text."""


class ChartPane(QWidget):
    """Holds the chart's place until ``load_chart``: the days can be read before pyqtgraph is.

    Signals:
        period_chosen: a point is to be made of a day, a week, a month or a year.
    """

    period_chosen = Signal(str)

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.chart: Chart | None = None
        self._look = LIGHT
        self._picture: Picture | None = None
        self._shown_for: tuple[int | None, str] | None = None
        self._read_out = QLabel()
        self._read_out.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Preferred)
        self._read_out.setAccessibleName("Day on the chart")
        self.periods = QComboBox()
        self.periods.addItems([POINT_WORDS[period] for period in PERIODS])
        self.periods.setAccessibleName("How a point is made")
        self.periods.setToolTip("How a point is made")
        self.periods.activated.connect(lambda place: self.period_chosen.emit(PERIODS[place]))
        self.left_out = QLabel()
        self.left_out.setWordWrap(True)
        self.left_out.setContentsMargins(8, 4, 8, 2)
        self.left_out.setAccessibleName("Not counted")
        self.left_out.hide()
        self.key = KeyLine()
        self.key.wanted.connect(partial(show_key_of, self))
        below = QHBoxLayout()
        below.setContentsMargins(8, 2, 8, 6)
        below.addWidget(self._read_out, 1)
        below.addWidget(self.periods)
        self._layout = QVBoxLayout(self)
        self._layout.setContentsMargins(0, 0, 0, 0)
        self._layout.setSpacing(0)
        self._place = QWidget()
        self._layout.addWidget(self._place, 1)
        self._layout.addWidget(self.left_out)
        self._layout.addWidget(self.key)
        self._layout.addLayout(below)

    def resizeEvent(self, event: QResizeEvent) -> None:
        """Where the chart is low, its key is in the window alone."""
        super().resizeEvent(event)
        self.key.setVisible(self.height() >= _LOW * QFontInfo(self.font()).pixelSize())

    @property
    def look(self) -> Look:
        """The inks of the chart."""
        return self._look

    def load_chart(self) -> None:
        """Bring the chart in; reads pyqtgraph, which takes longer than the rest of the window."""
        if self.chart is not None:
            return
        from desktop.chart.plot import Chart

        self.chart = Chart()
        self.chart.day_read.connect(self._read_out.setText)
        self.chart.key_wanted.connect(partial(show_key_of, self))
        self.chart.set_look(self._look)
        self._layout.replaceWidget(self._place, self.chart)
        self._place.deleteLater()
        if self._picture is not None:
            self.chart.show_picture(self._picture, keep_view=False)

    def set_look(self, look: Look) -> None:
        """Draw with other inks."""
        self._look = look
        self.key.set_look(look)
        if self.chart is not None:
            self.chart.set_look(look)

    def show_review(self, review: Review | None, session: Session) -> None:
        """Draw a review of the session's measure."""
        measure = session.current
        if review is None or measure is None or not review.points.known.any():
            self._picture = empty_picture(measure, session.today)
        else:
            self._picture = picture_of(review, session.journal, measure.id)
        self.key.show_picture(self._picture)
        self.left_out.setText(self._picture.left_out)
        self.left_out.setVisible(bool(self._picture.left_out))
        period = review.measure.period if review is not None else "day"
        self.periods.setCurrentIndex(PERIODS.index(period))
        shown_for = (session.measure, period)
        if self.chart is not None:
            self.chart.show_picture(self._picture, keep_view=shown_for == self._shown_for)
        self._shown_for = shown_for


def show_key_of(pane: ChartPane) -> None:
    """Tell of every mark, in the inks of the chart."""
    KeyWindow(pane.look, pane.window()).exec()
