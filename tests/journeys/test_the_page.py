"""The week before an appointment: the page is looked at, gets its question, and is saved."""

from __future__ import annotations

from datetime import datetime

import pytest
from PySide6.QtCore import QMarginsF, Qt
from PySide6.QtGui import QGuiApplication, QPageLayout, QPageSize
from PySide6.QtPrintSupport import QPrinter
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QMessageBox

from desktop.screens import page_dialog
from desktop.screens.page_dialog import PageDialog, print_page, subjects_of
from tests.desktop.page.reading import pdf_text

QUESTION = "Is this enough walking?"


def opens_the_sample(person):
    person.now = datetime(2031, 6, 2, 8, 0)
    window = person.starts_the_program()
    window.open_sample()
    return window


def shows_the_page(person, act):
    person.answers(act)
    person.holds_control_and_presses(Qt.Key.Key_P)


def closes(dialog):
    QTest.keyClick(dialog, Qt.Key.Key_Escape)


@pytest.fixture
def saved_as(monkeypatch, tmp_path):
    """Answers every question for a file with one in the test's folder; tells which was suggested."""
    suggested = []

    def name(ending):
        def answer(parent, title, suggestion, *endings):
            suggested.append(suggestion + endings[0])
            return tmp_path / f"page{ending}"

        monkeypatch.setattr(page_dialog, "ask_output", answer)
        return tmp_path / f"page{ending}"

    name.suggested = suggested
    return name


def test_the_page_gets_its_question_and_is_saved(person, saved_as):
    window = opens_the_sample(person)
    path = saved_as(".pdf")

    def asks_and_saves(dialog):
        assert dialog.focusWidget() is dialog.question
        QTest.keyClicks(dialog.question, QUESTION)
        QTest.mouseClick(dialog.pdf_button, Qt.MouseButton.LeftButton)
        assert dialog.said.text() == f"Saved: {path}"
        closes(dialog)

    shows_the_page(person, asks_and_saves)
    said = pdf_text(path.read_bytes())
    assert f"My question today: {QUESTION}" in said
    assert "It moved: 31 minutes on a middle day, 17 before." in said
    assert saved_as.suggested == ["walking-2031-06-02.pdf"]
    assert window.session.journal.person.question == QUESTION
    person.qtbot.waitUntil(lambda: window.session.is_saved)

    # It is there next time, and Undo takes it back.
    found = []
    shows_the_page(person, lambda dialog: (found.append(dialog.question.text()), closes(dialog)))
    assert found == [QUESTION]
    person.holds_control_and_presses(Qt.Key.Key_Z)
    assert window.session.journal.person.question == ""


def test_every_kind_of_file_is_written_from_the_page(person, saved_as):
    opens_the_sample(person)
    written = {}

    def saves(dialog):
        for button, ending in (
            (dialog.html_button, ".html"), (dialog.chart_button, ".svg"), (dialog.chart_button, ".png"),
        ):  # fmt: skip
            path = saved_as(ending)
            QTest.mouseClick(button, Qt.MouseButton.LeftButton)
            written[ending] = path.read_bytes()
        closes(dialog)

    shows_the_page(person, saves)
    assert written[".html"].startswith(b"<!DOCTYPE html>")
    assert b"<svg" in written[".svg"]
    assert written[".png"].startswith(b"\x89PNG")


def test_a_place_where_nothing_can_be_written_is_told(person, saved_as, monkeypatch, tmp_path):
    opens_the_sample(person)
    told = []
    monkeypatch.setattr(QMessageBox, "warning", lambda *words: told.append(words[2]))
    monkeypatch.setattr(page_dialog, "ask_output", lambda *_: tmp_path / "nowhere" / "page.pdf")

    def saves(dialog):
        QTest.mouseClick(dialog.pdf_button, Qt.MouseButton.LeftButton)
        assert dialog.said.text() == ""
        closes(dialog)

    shows_the_page(person, saves)
    assert told == [
        f"{tmp_path}/nowhere/page.pdf cannot be written: No such file or directory. Choose another place."
    ]


def test_paper_and_large_print_change_the_sheets_at_once(person):
    opens_the_sample(person)

    def changes(dialog):
        dialog.paper.setCurrentIndex(dialog.paper.findData("letter"))
        assert dialog.page.size == (612.0, 792.0)
        one = dialog.sheets.height()
        QTest.keyClick(dialog.large_print, Qt.Key.Key_Space)
        assert len(dialog.page.sheets) == 2
        assert dialog.sheets.height() > 2 * one - 5
        assert "It moved: 31 minutes" in dialog.sheets.accessibleDescription().replace("  ", " ")
        picture = dialog.sheets.grab().toImage()
        assert picture.pixelColor(3, 3).name() == "#ffffff"
        assert len({picture.pixelColor(x, 60).name() for x in range(picture.width())}) > 3
        closes(dialog)

    shows_the_page(person, changes)


def test_the_page_says_what_the_window_says_whichever_measure_is_shown(person):
    window = opens_the_sample(person)
    for measure in (1, 2, 3, 4):
        window.show_measure(measure)
        subjects = subjects_of(window.session)
        assert len(subjects) == (1 if measure < 3 else 2)
        shown = next(one for one in subjects if one.measure == measure)
        assert shown.review.to_json() == window.session.review.to_json()


def test_a_printer_gets_the_same_sheets(person, tmp_path):
    window = opens_the_sample(person)
    page = PageDialog(window.session, window).page
    printer = QPrinter(QPrinter.PrinterMode.HighResolution)
    printer.setOutputFormat(QPrinter.OutputFormat.PdfFormat)
    printer.setOutputFileName(str(tmp_path / "printed.pdf"))
    printer.setPageLayout(
        QPageLayout(QPageSize(QPageSize.PageSizeId.A4), QPageLayout.Orientation.Portrait, QMarginsF())
    )
    printer.setFullPage(True)
    print_page(page, printer)
    said = pdf_text((tmp_path / "printed.pdf").read_bytes())
    assert "It moved: 31 minutes on a middle day, 17 before." in said
    assert "come first." in said


def test_the_chart_is_copied_as_a_picture(person):
    window = opens_the_sample(person)
    QGuiApplication.clipboard().clear()
    page_dialog.copy_chart(window)
    image = QGuiApplication.clipboard().image()
    assert image.width() > 2000
    assert window.workspace.status.said.text() == "The chart is copied as a picture."


def test_without_a_measure_there_is_no_page_yet(person):
    window = person.starts_the_program()
    page_dialog.show_page(window)
    page_dialog.copy_chart(window)
    assert window.session is None
