"""The right pane: the answer in words."""

from __future__ import annotations

from collections.abc import Sequence
from html import escape

from PySide6.QtCore import QEvent, QTimer, QUrl
from PySide6.QtGui import QFontInfo, QResizeEvent
from PySide6.QtWidgets import QFrame, QTextBrowser, QVBoxLayout, QWidget

from analysis import Choice, Review
from desktop.wording.findings import findings_of
from desktop.wording.telling import Section
from desktop.wording.what_if import TITLE, what_if_sentences
from desktop.wording.worked_out import worked_out

_HOW = "how"
_AFTER = 20
"""Milliseconds."""
_HEADLINE = 1.5
"""The headline's letters, of the plain ones; in a pane of fewer than so many letters across they are smaller."""
_LEAST_HEADLINE = 1.1
_ACROSS = 11


class FindingsPane(QWidget):
    """Headline, the four questions, what would settle it, how it was worked out."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._review: Review | None = None
        self._choices: Sequence[Choice] = ()
        self._beside: tuple[Section, ...] = ()
        self._shows_how = False
        self._headline = 0
        self._text = QTextBrowser()
        self._text.setOpenLinks(False)
        self._text.setFrameShape(QFrame.Shape.NoFrame)
        self._text.setAccessibleName("Findings")
        self._text.anchorClicked.connect(self._follow)
        layout = QVBoxLayout(self)
        layout.setContentsMargins(0, 0, 0, 0)
        layout.setSpacing(0)
        layout.addWidget(self._text, 1)
        # The chart comes first: the words follow a moment later, and only those of the last review of several.
        self._fill_later = QTimer(self)
        self._fill_later.setSingleShot(True)
        self._fill_later.setInterval(_AFTER)
        self._fill_later.timeout.connect(self._fill)
        self._fill()

    @property
    def text(self) -> str:
        """What is read in the pane."""
        if self._fill_later.isActive():
            self._fill()
        return self._text.toPlainText()

    def show_review(self, review: Review | None, beside: tuple[Section, ...] = ()) -> None:
        """Tell a review, and beside it what the journal says apart from it; None where there is no measure yet."""
        if review is not self._review or beside != self._beside:
            self._review, self._beside = review, beside
            self._choices = ()
            self._fill_later.start()

    def show_choices(self, choices: Sequence[Choice]) -> None:
        """Tell what other choices of days would make of the answer that is told."""
        if choices != self._choices:
            self._choices = choices
            self._fill()

    def changeEvent(self, event: QEvent) -> None:
        """Follow the text size."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.FontChange:
            self._fill()

    def resizeEvent(self, event: QResizeEvent) -> None:
        """A narrow pane has a smaller headline."""
        super().resizeEvent(event)
        if self._headline_size() != self._headline:
            self._fill()

    def _headline_size(self) -> int:
        size = QFontInfo(self.font()).pixelSize()
        return round(min(size * _HEADLINE, max(size * _LEAST_HEADLINE, self.width() / _ACROSS)))

    def _fill(self) -> None:
        self._fill_later.stop()
        if self._review is None:
            self._text.setHtml("<p>Add a measure to begin (Log, Add a measure).</p>")
            return
        at = self._text.verticalScrollBar().value()
        told = findings_of(self._review)
        size = QFontInfo(self.font()).pixelSize()
        self._headline = self._headline_size()
        parts = [f'<p style="font-size:{self._headline}px; font-weight:bold;">{escape(told.headline)}</p>']
        weighed = what_if_sentences(self._choices)
        for section in (*told.sections, *self._beside, *([Section(TITLE, weighed)] if weighed else [])):
            if section.title:
                parts.append(f'<p style="font-weight:bold; margin-bottom:0;">{escape(section.title)}</p>')
            style = "margin-top:2px; margin-bottom:6px;"
            parts += [f'<p style="{style}">{escape(one)}</p>' for one in section.sentences]
        mark = "Close: how was this worked out?" if self._shows_how else "How was this worked out?"
        parts.append(f'<p><a href="{_HOW}">{mark}</a></p>')
        if self._shows_how:
            small = round(size * 0.92)
            parts += [f'<p style="font-size:{small}px;">{escape(line)}</p>' for line in worked_out(self._review)]
        self._text.document().setDocumentMargin(size * 0.8)
        self._text.setHtml("".join(parts))
        self._text.verticalScrollBar().setValue(at)

    def _follow(self, link: QUrl) -> None:
        if link.toString() == _HOW:
            self._shows_how = not self._shows_how
            self._fill()
