"""What a test can see of every screen: nothing without a name, nothing out of reach of the keys, no word cut."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QFontMetrics
from PySide6.QtWidgets import (
    QAbstractButton,
    QAbstractItemView,
    QComboBox,
    QDialog,
    QLabel,
    QLineEdit,
    QScrollArea,
    QTextEdit,
    QWidget,
)

from desktop.faces import load_faces
from tests.screens.scenes import LOOKS, visit

WORKED = (QAbstractButton, QAbstractItemView, QComboBox, QLineEdit, QTextEdit)
"""What a person works with: each must have a name for a screen reader."""


def shown_widgets(scene, kind=QWidget):
    return [one for one in scene.shown.findChildren(kind) if one.isVisible() and one.width() > 0]


def name_of(widget) -> str:
    """What a screen reader has to say: the name given, its own words, or its buddy label's."""
    own = widget.text() if isinstance(widget, QAbstractButton | QLabel) else ""
    given = widget.accessibleName() or own or widget.toolTip()
    if given:
        return given
    if isinstance(widget, QLineEdit) and widget.placeholderText():
        return widget.placeholderText()
    top = widget.window()
    labels = [label.text() for label in top.findChildren(QLabel) if label.buddy() is widget and label.text()]
    return labels[0] if labels else ""


def is_part_of_another(widget) -> bool:
    """A piece that Qt makes inside a table, a box or a bar."""
    parent = widget.parentWidget()
    return (
        widget.objectName().startswith("qt_")
        or isinstance(parent, QComboBox | QAbstractItemView)
        or parent.metaObject().className()
        in ("QDateEdit", "QSpinBox", "QDoubleSpinBox", "QMenuBar", "QScrollArea")
    )


@pytest.mark.parametrize("look", LOOKS)
def test_screens_have_names_reach_and_room(qtbot, tmp_path, look):
    load_faces()
    unnamed, unreachable, cut, seen = [], [], [], []

    def see(scene):
        seen.append(scene.name)
        for widget in shown_widgets(scene):
            what = f"{scene.name}: {type(widget).__name__} {widget.objectName() or name_of(widget)!r}"
            if isinstance(widget, WORKED) and not is_part_of_another(widget):
                if not name_of(widget):
                    unnamed.append(what)
                if widget.isEnabled() and widget.focusPolicy() == Qt.FocusPolicy.NoFocus:
                    unreachable.append(what)
            if isinstance(widget, QAbstractButton) and widget.text() and not is_part_of_another(widget):
                words = QFontMetrics(widget.font()).horizontalAdvance(widget.text().replace("&", ""))
                if words > widget.width():
                    cut.append(f"{what} needs {words}, has {widget.width()}")
            if isinstance(widget, QLabel) and widget.wordWrap() and widget.text():
                needed = widget.heightForWidth(widget.width())
                in_area = any(isinstance(one, QScrollArea) for one in _parents(widget))
                if needed > widget.height() + 2 and not in_area:
                    cut.append(f"{what} needs height {needed}, has {widget.height()}")

    visit(tmp_path / "journals", look, see)
    assert len(seen) >= 15
    assert (unnamed, unreachable, cut) == ([], [], [])


def _parents(widget):
    parent = widget.parentWidget()
    while parent is not None:
        yield parent
        parent = parent.parentWidget()


def test_dialogs_fit_a_small_screen(qtbot, tmp_path):
    load_faces()
    too_large = []

    def see(scene):
        size = (scene.shown.width(), scene.shown.height())
        if isinstance(scene.shown, QDialog) and (size[0] > 1024 or size[1] > 640):
            too_large.append((scene.name, *size))

    visit(tmp_path / "journals", "small", see)
    assert too_large == []
