"""Every screen of the program as a scene that can be set up, in any look."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from datetime import date, datetime, timedelta
from pathlib import Path

import numpy as np
from PySide6.QtCore import QDeadlineTimer, QTimer
from PySide6.QtWidgets import QApplication, QDialog, QMainWindow, QWidget

from desktop.journal.records import Change, DayNote, Entry, Measure, Person, Record, Span
from desktop.screens.main_window import MainWindow
from desktop.screens.theme import ThemeName
from desktop.storage.store import Store
from tests.screens.caseload_scenes import visit_caseload

NOW = datetime(2031, 3, 30, 20, 15)
SETTLED = 700
"""Milliseconds until answers made in the background are on screen."""

LOOKS: dict[str, tuple[ThemeName, int, tuple[int, int]]] = {
    "light": ("light", 100, (1360, 820)),
    "dark": ("dark", 100, (1360, 820)),
    "small": ("light", 100, (1024, 640)),
    "large text": ("light", 200, (1360, 820)),
    "small and large": ("light", 200, (1024, 640)),
}
"""Theme, size of text in 100, size of the window."""

JOURNALS: dict[str, Callable[[], list[Record]]] = {
    "four weeks": lambda: _four_weeks(),
    "empty": lambda: [Person("0" * 32), Measure(1, 0, "Walking", "minutes", "amount", missed="zero")],
    "longest words": lambda: _longest_words(),
    "ten years": lambda: _ten_years(),
}

COMMANDS: tuple[tuple[str, ...], ...] = (
    ("Log", "Mark a change…"),
    ("Log", "Name days…"),
    ("Log", "Add a measure…"),
    ("Log", "Settings of this measure…"),
    ("Log", "What this day has held…"),
    ("Log", "Go to a day…"),
    ("Log", "Find…"),
    ("Log", "A plan of days a week…"),
    ("File", "The page…"),
    ("File", "Earlier copies…"),
    ("File", "A copy to hand over…"),
    ("File", "Erase for good…"),
    ("Help", "Keys"),
    ("Help", "What the marks mean"),
    ("Help", "How often is it wrong?"),
    ("Help", "About Dayfence"),
)
"""Every command of the menus that opens a dialog of ours."""


@dataclass
class Scene:
    """One screen to look at; ``shown`` is the window or the dialog over it."""

    name: str
    shown: QWidget


def let_pass(milliseconds: int) -> None:
    """Let the window do what it has to do for so long."""
    end = QDeadlineTimer(milliseconds)
    while not end.hasExpired():
        QApplication.processEvents()


@contextmanager
def window_with(folder: Path, journal: str | None, look: str) -> Iterator[MainWindow]:
    """A window in a look, with one of the journals or the start screen; closed afterwards."""
    theme, text, size = LOOKS[look]
    path = folder / "journal.dayfence"
    if journal is not None and not path.exists():
        Store.create(path, JOURNALS[journal](), clock=lambda: NOW).close()
    window = MainWindow(folder, now=lambda: NOW)
    window.resize(*size)
    window.show()
    window.set_theme(theme)
    window.settings.set_text_percent(text)
    window.set_theme(theme)
    window.open_own()
    window.load_chart()
    let_pass(SETTLED)
    try:
        yield window
    finally:
        window.close()


def visit(folder: Path, look: str, see: Callable[[Scene], object]) -> None:
    """Set up every screen in one look and hand it over while it is there."""
    (folder / "start").mkdir(parents=True)
    with window_with(folder / "start", None, look) as window:
        see(Scene("start screen", window))
    for journal in JOURNALS:
        place = folder / journal
        place.mkdir()
        with window_with(place, journal, look) as window:
            see(Scene(journal, window))
            if journal == "four weeks":
                for command in COMMANDS:
                    _see_dialog(window, command, see)
    visit_caseload(folder / "caseload", *LOOKS[look], lambda name, shown: see(Scene(name, shown)))


def menu_action(window: QMainWindow, *texts: str):  # type: ignore[no-untyped-def]
    """The action under these texts of the menu bar."""
    found = window.menuBar().actions()
    for text in texts[:-1]:
        menu = next(one for one in found if one.text().replace("&", "") == text).menu()
        found = menu.actions()
    return next(one for one in found if one.text().replace("&", "") == texts[-1])


def _see_dialog(window: MainWindow, command: tuple[str, ...], see: Callable[[Scene], object]) -> None:
    """Open what a command opens, hand it over, and close it."""
    problems: list[BaseException] = []

    def when_open() -> None:
        dialog = QApplication.activeModalWidget()
        if dialog is None:
            QTimer.singleShot(30, when_open)
            return
        assert isinstance(dialog, QDialog)
        try:
            let_pass(60)
            see(Scene(command[-1].strip("…").lower(), dialog))
        except BaseException as problem:
            problems.append(problem)
        dialog.reject()

    QTimer.singleShot(30, when_open)
    menu_action(window, *command).trigger()
    if problems:
        raise problems[0]


def _four_weeks() -> list[Record]:
    rng = np.random.default_rng(8)
    first = NOW.date() - timedelta(41)
    records: list[Record] = [
        Person("0" * 32, "", "Is the walk enough?"),
        Measure(1, 0, "Walking", "minutes", "amount", missed="zero", aim="more", worth=5.0),
        Measure(2, 1, "Upper pressure", "mmHg", pair="pressure"),
        Measure(3, 2, "Lower pressure", "mmHg", pair="pressure"),
        Change(1, first + timedelta(21), "off the bus one stop early", "planned"),
        Span(1, first + timedelta(8), first + timedelta(10), "ill", "a cold"),
        DayNote(first + timedelta(8), "in bed"),
    ]
    for at in range(42):
        day = first + timedelta(at)
        values = (np.round(rng.normal(18 + 14 * (at >= 21), 6)), *np.round(rng.normal((138, 86), 5)))
        records += [
            Entry(measure, day, value=float(max(value, 0)), original=f"{value:g}")
            for measure, value in enumerate(values, start=1)
            if not (measure == 1 and at in (9, 10)) and not (measure > 1 and at % 9 == 4)
        ]
    return records


def _longest_words() -> list[Record]:
    long = "Minutes of slow walking on the way home from the bus, as the physiotherapist suggested"
    records = _four_weeks()
    records[0] = Person(
        "0" * 32, "Somebody with a rather long name indeed", "A question that goes on and on? " * 6
    )
    records[1] = Measure(1, 0, long, "minutes in all weathers", "amount", missed="zero", aim="more")
    records[4] = Change(1, NOW.date() - timedelta(20), f"{long}, and earlier to bed", "advised")
    return records


def _ten_years() -> list[Record]:
    rng = np.random.default_rng(3)
    last: date = NOW.date()
    records: list[Record] = [
        Person("0" * 32),
        Measure(1, 0, "Steps", "steps", "count", aim="more"),
        Change(1, last - timedelta(1200), "moved house"),
    ]
    values = np.round(rng.normal(6000, 1500, 3650))
    records += [Entry(1, last - timedelta(3649 - at), value=float(value)) for at, value in enumerate(values)]
    return records
