"""The right pane: the answer in words, and the caution that never goes away."""

from __future__ import annotations

from collections.abc import Sequence
from html import escape

from PySide6.QtCore import QEvent, QUrl
from PySide6.QtGui import QFont, QFontInfo
from PySide6.QtWidgets import QFrame, QLabel, QTextBrowser, QVBoxLayout, QWidget

from analysis import Choice, Review
from desktop.screens.theme import CAUTION_INK
from desktop.wording.cautions import CAUTION
from desktop.wording.findings import findings_of
from desktop.wording.telling import Section
from desktop.wording.what_if import TITLE, what_if_sentences
from desktop.wording.worked_out import worked_out

_HOW = "how"
_CAUTION_PART = 0.9
"""The caution is a little smaller than the rest, so that it leaves the findings room in large text."""


class FindingsPane(QWidget):
    """Headline, the four questions, what would settle it, how it was worked out; below, the caution."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._review: Review | None = None
        self._choices: Sequence[Choice] = ()
        self._shows_how = False
        self._text = QTextBrowser()
        self._text.setOpenLinks(False)
        self._text.setFrameShape(QFrame.Shape.NoFrame)
        self._text.setAccessibleName("Findings")
        self._text.anchorClicked.connect(self._follow)
        self._caution = QLabel(CAUTION)
        self._caution.setWordWrap(True)
        self._caution.setMargin(10)
        self._caution.setAccessibleName("Caution")
        layout = QVBoxLayout(self)
        layout.setContentsMargins(0, 0, 0, 0)
        layout.setSpacing(0)
        layout.addWidget(self._text, 1)
        layout.addWidget(self._caution)
        self.set_dark(False)

    @property
    def text(self) -> str:
        """What is read in the pane."""
        return self._text.toPlainText()

    def set_dark(self, dark: bool) -> None:
        """Take the colours of the theme."""
        paper, ink = CAUTION_INK["dark" if dark else "light"]
        self._caution.setStyleSheet(f"background: {paper}; color: {ink};")
        self._fill()

    def show_review(self, review: Review | None) -> None:
        """Tell a review; None where there is no measure yet."""
        if review is not self._review:
            self._review = review
            self._choices = ()
            self._fill()

    def show_choices(self, choices: Sequence[Choice]) -> None:
        """Tell what other choices of days would make of the answer that is told."""
        if choices != self._choices:
            self._choices = choices
            self._fill()

    def changeEvent(self, event: QEvent) -> None:
        """Follow the text size."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.FontChange:
            small = QFont(self.font())
            small.setPixelSize(round(QFontInfo(self.font()).pixelSize() * _CAUTION_PART))
            self._caution.setFont(small)
            self._fill()

    def _fill(self) -> None:
        if self._review is None:
            self._text.setHtml("<p>Add a measure to begin (Log, Add a measure).</p>")
            return
        at = self._text.verticalScrollBar().value()
        told = findings_of(self._review)
        size = QFontInfo(self.font()).pixelSize()
        parts = [f'<p style="font-size:{round(size * 1.5)}px; font-weight:bold;">{escape(told.headline)}</p>']
        weighed = what_if_sentences(self._choices)
        for section in (*told.sections, *([Section(TITLE, weighed)] if weighed else [])):
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
