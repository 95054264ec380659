"""The three panes of an open journal: type, see, read; above them whose log and which measure."""

from __future__ import annotations

from PySide6.QtCore import QByteArray, Qt
from PySide6.QtGui import QFont, QFontInfo, QResizeEvent
from PySide6.QtWidgets import QHBoxLayout, QSplitter, QVBoxLayout, QWidget

from desktop.journal.plans import weeks_under_plan
from desktop.models.session import Session
from desktop.screens.caution_bar import CautionBar
from desktop.screens.caution_line import CautionLine
from desktop.screens.chart_pane import ChartPane
from desktop.screens.cut_label import CutLabel
from desktop.screens.days_pane import DaysPane
from desktop.screens.findings_pane import FindingsPane
from desktop.screens.gap_bar import GapBar
from desktop.screens.status_line import StatusLine
from desktop.screens.theme import PLAIN_SIZE
from desktop.wording.plan import TITLE, plan_sentences
from desktop.wording.telling import Section

_LEAST_WIDTHS = (200, 280, 240)
_FIRST_WIDTHS = (350, 660, 350)
_TITLE_PART = 1.35
_DAYS_PART, _FINDINGS_PART = 0.36, 0.3
"""The most of the width that each side may take; the rest is the chart's."""
_CHART_PART = 0.36
"""The least of the width for the chart: where the days need much, the findings are narrower."""


class Workspace(QWidget):
    """Days, chart, findings, and the status line."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.days = DaysPane()
        self.chart_pane = ChartPane()
        self.findings = FindingsPane()
        self.status = StatusLine()
        self.gap = GapBar()
        self.caution = CautionBar()
        self.caution_line = CautionLine()
        self._title, self._subtitle = CutLabel(), CutLabel()
        top = QHBoxLayout()
        top.setContentsMargins(14, 8, 14, 6)
        top.setSpacing(14)
        top.addWidget(self._title, 0, Qt.AlignmentFlag.AlignBaseline)
        top.addWidget(self._subtitle, 1, Qt.AlignmentFlag.AlignBaseline)
        self.panes = QSplitter(Qt.Orientation.Horizontal)
        self.panes.setChildrenCollapsible(False)
        self.panes.setHandleWidth(7)
        for pane, least in zip((self.days, self.chart_pane, self.findings), _LEAST_WIDTHS, strict=True):
            pane.setMinimumWidth(least)
            self.panes.addWidget(pane)
        self.panes.setSizes(list(_FIRST_WIDTHS))
        self.panes.setStretchFactor(1, 1)
        self._moved_by_hand = False
        self.panes.splitterMoved.connect(self._keep_as_moved)
        self.days.layout_changed.connect(self.fit_days)
        layout = QVBoxLayout(self)
        layout.setContentsMargins(0, 0, 0, 0)
        layout.setSpacing(0)
        layout.addLayout(top)
        layout.addWidget(self.caution)
        layout.addWidget(self.gap)
        layout.addWidget(self.panes, 1)
        layout.addWidget(self.caution_line)
        layout.addWidget(self.status)

    def restore_panes(self, widths: QByteArray | None) -> None:
        """Take the widths the person gave the panes earlier, if any."""
        if widths is not None:
            self._moved_by_hand = self.panes.restoreState(widths)

    @property
    def chosen_panes(self) -> QByteArray | None:
        """The widths the person gave the panes; None where they were never moved."""
        return self.panes.saveState() if self._moved_by_hand else None

    def fit_days(self) -> None:
        """Give days and findings the room they need, up to their parts, unless the person chose the widths."""
        if self._moved_by_hand:
            return
        whole = self.width()
        days = self.days.width_within(round(whole * _DAYS_PART))
        larger = QFontInfo(self.font()).pixelSize() / PLAIN_SIZE
        findings = min(round(_FIRST_WIDTHS[2] * larger), round(whole * _FINDINGS_PART))
        findings = max(min(findings, round(whole * (1 - _CHART_PART)) - days), _LEAST_WIDTHS[2])
        self.panes.setSizes([days, whole - days - findings, findings])

    def resizeEvent(self, event: QResizeEvent) -> None:
        """Share the width out anew: a narrow window keeps room for the chart."""
        super().resizeEvent(event)
        self.fit_days()

    def _keep_as_moved(self) -> None:
        self._moved_by_hand = True

    def show_session(self, session: Session) -> None:
        """Say whose log and which measure it is, and how things stand."""
        measure = session.current
        self._title.setText(measure.title if measure else "No measure yet")
        self._title.setToolTip(measure.title if measure else "")
        unit = measure.unit if measure else ""
        if measure is not None and unit and measure.kind in ("amount", "count"):
            unit = f"{unit} a {session.period or measure.period}"
        self._subtitle.setText("  ·  ".join(part for part in (unit, session.journal.person.name) if part))
        self.status.show_session(session)
        self.gap.follow(session)

    def show_review(self, session: Session) -> None:
        """Draw and tell the session's review."""
        self.findings.show_review(session.review, _plan_of(session))
        self.chart_pane.show_review(session.review, session)

    def set_face(self, face: QFont) -> None:
        """Follow the size of text."""
        largest = QFont(face)
        largest.setPixelSize(round(QFontInfo(face).pixelSize() * _TITLE_PART))
        largest.setBold(True)
        self._title.setFont(largest)
        self.caution_line.set_face(face)

    def set_dark(self, dark: bool) -> None:
        """Take the colours of the theme."""
        self.caution.set_dark(dark)
        self.caution_line.set_dark(dark)


def _plan_of(session: Session) -> tuple[Section, ...]:
    """How the plan of days a week was kept, where there is one."""
    if session.measure is None:
        return ()
    told = plan_sentences(weeks_under_plan(session.journal, session.measure, session.today))
    return (Section(TITLE, told),) if told else ()
