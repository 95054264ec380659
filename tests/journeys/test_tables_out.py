"""Out as tables and back in again, at the window."""

from PySide6.QtWidgets import QApplication, QMessageBox

from desktop.exchange.package import read_package
from desktop.screens import tables_out
from desktop.screens.tables_out import FormDialog
from desktop.wording.cautions import CAUTION
from desktop.wording.findings import findings_of


def chosen(window, menu: str, words: str) -> None:
    actions = next(one for one in window.menuBar().actions() if one.text() == menu).menu().actions()
    next(action for action in actions if words in action.text()).trigger()


def test_a_journal_goes_out_as_a_folder_and_comes_back(person, tmp_path, monkeypatch):
    window = person.starts_the_program()
    window.open_sample()
    journal = window.session.journal
    out = tmp_path / "journal tables"
    monkeypatch.setattr(tables_out, "ask_folder", lambda *_: out)
    person.answers(lambda dialog: dialog.accept())
    chosen(window, "&File", "as a &table")
    assert read_package(out).measures == journal.measures
    before = len(journal.changes)

    def agrees(box: QMessageBox) -> None:
        assert "Undo takes it all back" in box.text()
        box.button(QMessageBox.StandardButton.Yes).click()

    person.answers(agrees)
    window.bring_in_file(out / "datapackage.json")
    assert len(window.session.journal.changes) == before
    assert window.session.undoable is None or window.session.undoable.act != "bring in table"


def test_a_folder_can_be_the_first_journal(person, tmp_path, monkeypatch):
    window = person.starts_the_program()
    window.open_sample()
    out = tmp_path / "out"
    monkeypatch.setattr(tables_out, "ask_folder", lambda *_: out)
    person.answers(lambda dialog: dialog.accept())
    chosen(window, "&File", "as a &table")
    expected = read_package(out)
    person.quits()
    again = person.starts_the_program()
    assert again.session is None
    person.answers(lambda box: box.button(QMessageBox.StandardButton.Yes).click())
    again.bring_in_file(out)
    assert again.session.journal == expected


def test_each_form_of_table_can_be_chosen(qtbot, tmp_path):
    dialog = FormDialog()
    qtbot.addWidget(dialog)
    assert dialog.form == 0
    dialog._group.button(2).click()
    assert dialog.form == 2


def test_the_findings_are_copied_as_text(person):
    window = person.starts_the_program()
    window.open_sample()
    chosen(window, "&Edit", "findings as text")
    text = QApplication.clipboard().text()
    for line in findings_of(window.session.review).lines():
        assert line in text
    assert text.rstrip().endswith(CAUTION)
