"""The page for an appointment before it is printed: the sheet as it will be, the question on it, where it goes."""

from __future__ import annotations

import re
from collections.abc import Callable
from pathlib import Path
from typing import TYPE_CHECKING

from PySide6.QtCore import QLocale, QSize, Qt
from PySide6.QtGui import QGuiApplication, QPainter, QPaintEvent
from PySide6.QtWidgets import (
    QCheckBox,
    QComboBox,
    QDialog,
    QFormLayout,
    QHBoxLayout,
    QLabel,
    QLineEdit,
    QMessageBox,
    QPushButton,
    QScrollArea,
    QSizePolicy,
    QVBoxLayout,
    QWidget,
)

import analysis
from desktop.edits.person import set_person
from desktop.models.other_measures import OtherMeasures, ask
from desktop.models.session import Session
from desktop.page.content import LONGEST_QUESTION, PageContent, Subject, content_of
from desktop.page.files import chart_image, chart_svg, page_layout, pdf_of, png_of, write_file
from desktop.page.html import html_of
from desktop.page.layout import Page, PaperName, lay_out
from desktop.page.painter import paint_sheet
from desktop.screens.file_questions import ask_output
from desktop.screens.room import give_room
from desktop.wording.page import (
    CHART_COPIED,
    NO_MEASURE_YET,
    PAPER_WORDS,
    QUESTION,
    cannot_be_written,
    written,
)

if TYPE_CHECKING:
    from PySide6.QtPrintSupport import QPrinter

    from desktop.screens.main_window import MainWindow

_PREVIEW_WIDTH = 560
_SHEET_GAP = 14


def show_page(window: MainWindow) -> None:
    """Show the page of the measure on the chart."""
    session = window.session
    if session is None or session.current is None:
        window.say(NO_MEASURE_YET)
        return
    window.workspace.days.finish_typing()
    PageDialog(session, window).exec()


def copy_chart(window: MainWindow) -> None:
    """Put the chart on the clipboard as the page draws it."""
    session = window.session
    if session is None or session.current is None:
        window.say(NO_MEASURE_YET)
        return
    QGuiApplication.clipboard().setImage(chart_image(_content(session, subjects_of(session), "")))
    window.say(CHART_COPIED)


def subjects_of(session: Session) -> list[Subject]:
    """The measure on the chart with its answer, and the one it is written down together with, if there is one."""
    journal = session.journal
    subjects = []
    for one in journal.together(session.measure) if session.measure is not None else ():
        measure = journal.measures[one]
        log, changes = journal.log_of(one, session.period), journal.analysis_changes(one)
        looked_at = OtherMeasures()
        beside = looked_at.beside(journal, measure)
        looked_at.learn(ask(looked_at.unknown(journal, beside), session.today))
        answer = analysis.review(
            log,
            changes,
            today=session.today,
            worth=measure.worth,
            look_day=measure.look_day,
            others=looked_at.known(beside),
        )
        subjects.append(Subject(one, log, answer))
    return subjects


def _content(session: Session, subjects: list[Subject], question: str) -> PageContent:
    return content_of(session.journal, subjects, session.today, question)


class PageDialog(QDialog):
    """The page of one measure, or of two that are written down together."""

    def __init__(self, session: Session, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setWindowTitle("The page for an appointment")
        self._session = session
        self._subjects = subjects_of(session)
        self.question = QLineEdit(session.journal.person.question)
        self.question.setMaxLength(LONGEST_QUESTION)
        self.question.setPlaceholderText("for example: is this enough, or should I add the evenings?")
        self.question.setReadOnly(session.read_only)
        self.paper = QComboBox()
        for name, words in PAPER_WORDS.items():
            self.paper.addItem(words, name)
        uses_letter = QLocale().measurementSystem() == QLocale.MeasurementSystem.ImperialUSSystem
        self.paper.setCurrentIndex(self.paper.findData("letter" if uses_letter else "a4"))
        self.large_print = QCheckBox("&Large print, on two sheets")
        self.said = QLabel()
        self.said.setWordWrap(True)
        self.sheets = _Sheets()
        self._lay_out_dialog()
        self.question.textChanged.connect(self._show)
        self.paper.currentIndexChanged.connect(self._show)
        self.large_print.toggled.connect(self._show)
        self._show()
        self.question.setFocus()

    @property
    def page(self) -> Page:
        """The page as it is shown."""
        paper: PaperName = self.paper.currentData()
        return lay_out(self.content, paper, large_print=self.large_print.isChecked())

    @property
    def content(self) -> PageContent:
        """What stands on it."""
        return _content(self._session, self._subjects, self.question.text())

    def save_pdf(self) -> None:
        """Write the page as a PDF where the person says."""
        self._save("Save as PDF", lambda _: pdf_of(self.page), ".pdf")

    def save_html(self) -> None:
        """Write the page as HTML where the person says."""
        self._save("Save as HTML", lambda _: html_of(self.content), ".html")

    def save_chart(self) -> None:
        """Write the chart alone where the person says, drawn or in pixels."""

        def drawn(path: Path) -> bytes:
            return png_of(self.content) if path.suffix.lower() == ".png" else chart_svg(self.content)

        self._save("Save the chart", drawn, ".svg", ".png")

    def print(self) -> None:
        """Print the page on the printer that the person chooses."""
        from PySide6.QtPrintSupport import QPrintDialog, QPrinter  # It looks for printers, which takes a while.

        printer = QPrinter(QPrinter.PrinterMode.HighResolution)
        page = self.page
        printer.setPageLayout(page_layout(page))
        printer.setFullPage(True)
        if QPrintDialog(printer, self).exec() == QDialog.DialogCode.Accepted:
            print_page(page, printer)

    def done(self, result: int) -> None:
        """Keep the question with the journal, and leave."""
        self._keep_question()
        super().done(result)

    def _lay_out_dialog(self) -> None:
        form = QFormLayout()
        form.addRow(QUESTION, self.question)
        form.addRow("Paper", self.paper)
        self.question.setAccessibleName(QUESTION)
        self.paper.setSizePolicy(QSizePolicy.Policy.Maximum, QSizePolicy.Policy.Fixed)
        buttons = QHBoxLayout()
        self.pdf_button = self._button(buttons, "Save as &PDF…", self.save_pdf)
        self.html_button = self._button(buttons, "Save as &HTML…", self.save_html)
        self.chart_button = self._button(buttons, "Save the &chart…", self.save_chart)
        self.print_button = self._button(buttons, "P&rint…", self.print)
        buttons.addStretch(1)
        self._button(buttons, "Close", self.accept)
        form.addRow("", self.large_print)
        scroll = QScrollArea()
        scroll.setWidget(self.sheets)
        scroll.setAlignment(Qt.AlignmentFlag.AlignHCenter)
        scroll.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        layout = QVBoxLayout(self)
        layout.addLayout(form)
        layout.addWidget(scroll, 1)
        layout.addWidget(self.said)
        layout.addLayout(buttons)
        give_room(self, 95, 100)
        self.resize(max(self.width(), _PREVIEW_WIDTH + 120), self.height())

    def _button(self, row: QHBoxLayout, text: str, do: Callable[[], object]) -> QPushButton:
        button = QPushButton(text)
        button.setAutoDefault(False)
        button.clicked.connect(lambda: do())
        row.addWidget(button)
        return button

    def _show(self) -> None:
        self.sheets.show_page(self.page)

    def _save(self, title: str, data_for: Callable[[Path], bytes], *endings: str) -> None:
        self._keep_question()
        name = (
            re.sub(r"[^\w-]+", "-", f"{self.content.title} {self._session.today.isoformat()}").strip("-").lower()
        )
        path = ask_output(self, title, name, *endings)
        if path is None:
            return
        try:
            write_file(path, data_for(path))
        except OSError as error:
            QMessageBox.warning(self, "Dayfence", cannot_be_written(path, error.strerror or ""))
            return
        self.said.setText(written(path))

    def _keep_question(self) -> None:
        self._session.do(set_person(self._session.journal, question=self.question.text().strip()))


def print_page(page: Page, printer: QPrinter) -> None:
    """Paint every sheet on a printer."""
    with QPainter(printer) as painter:
        for sheet in range(len(page.sheets)):
            if sheet:
                printer.newPage()
            painter.save()
            painter.scale(printer.resolution() / 72, printer.resolution() / 72)
            paint_sheet(painter, page, sheet)
            painter.restore()


class _Sheets(QWidget):
    """The sheets as they will be, one under the other, on white whatever the theme is."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._page: Page | None = None
        self.setAccessibleName("The page")

    def show_page(self, page: Page) -> None:
        self._page = page
        words = (one.text for sheet in page.sheets for box in sheet for one in box.words)
        self.setAccessibleDescription(" ".join(words))
        self.setFixedSize(self.sizeHint())
        self.update()

    def sizeHint(self) -> QSize:
        """The sheets at the width of the preview."""
        if self._page is None:
            return QSize(_PREVIEW_WIDTH, _PREVIEW_WIDTH)
        height = self._sheet_height(self._page)
        many = len(self._page.sheets)
        return QSize(_PREVIEW_WIDTH, round(height * many + _SHEET_GAP * (many - 1)))

    def paintEvent(self, event: QPaintEvent) -> None:
        """Paint the very boxes that go on paper."""
        page = self._page
        if page is None:
            return
        width, height = page.size
        scale = _PREVIEW_WIDTH / width
        with QPainter(self) as painter:
            for sheet in range(len(page.sheets)):
                painter.save()
                painter.translate(0, sheet * (self._sheet_height(page) + _SHEET_GAP))
                painter.scale(scale, scale)
                painter.fillRect(0, 0, round(width), round(height), Qt.GlobalColor.white)
                paint_sheet(painter, page, sheet)
                painter.restore()

    @staticmethod
    def _sheet_height(page: Page) -> float:
        return page.size[1] * _PREVIEW_WIDTH / page.size[0]
